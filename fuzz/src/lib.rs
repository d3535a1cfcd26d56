//! What each fuzz target does with its bytes; shared with the test that replays the kept inputs.

include!("../../tests/fuzzed.rs");
