//! The review measured on logs with known truth.

mod delivered;
mod measure;
mod read;
