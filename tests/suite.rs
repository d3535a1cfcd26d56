//! The one test program: outside values, properties, bad logs, commands, layers.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test that fails should stop")]

mod commands;
mod fuzz_replay;
mod generator;
mod gyro;
mod layers;
mod magnetic;
mod nmea;
mod pages;
mod plan;
mod properties;
mod published;
mod readme;
mod review;
