//! Being asked to stop: a long run ends behind a whole row and says so.

use std::sync::atomic::{AtomicBool, Ordering};

static ASKED: AtomicBool = AtomicBool::new(false);

/// From now on Ctrl-C, or being told to end, only sets a mark that [`asked`] reads; a second time ends the program at once.
pub fn watch() {
    // Where another handler stands already, the program ends as it always did.
    let _ = ctrlc::set_handler(|| {
        if ASKED.swap(true, Ordering::Relaxed) {
            std::process::exit(130);
        }
    });
}

/// Whether the program was asked to stop.
pub fn asked() -> bool {
    ASKED.load(Ordering::Relaxed)
}
