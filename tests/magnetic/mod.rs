//! The magnetic compass: field model, deviation curve, card and swing.

mod card;
mod commands;
mod field_model;
mod latitude;
mod swings;
