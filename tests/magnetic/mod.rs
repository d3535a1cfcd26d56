//! The magnetic compass: field model, deviation curve, card and swing.

mod field_model;
