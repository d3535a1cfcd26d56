//! The review measured on logs with known truth.

mod cases;
mod delivered;
mod made;
mod measure;
mod read;
