//! The one test program: outside values, properties, bad logs, commands, layers.

mod layers;
mod magnetic;
mod published;
