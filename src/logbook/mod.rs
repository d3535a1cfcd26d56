//! The log: its columns and their reading.
