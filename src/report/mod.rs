//! Results as rows and text.
