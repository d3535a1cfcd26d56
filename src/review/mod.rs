//! What in a log needs an explanation.
