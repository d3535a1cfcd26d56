//! The ship's own append-only record.
