//! The commands that listen.
