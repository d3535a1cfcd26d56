//! What must hold for every input: symmetries, no seam anywhere, no answer that is not a number.

mod horizon;
mod log_rows;
