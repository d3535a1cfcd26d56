//! What to observe next.
