//! Fuzzing of one reader; what it is fed is replayed by the ordinary tests as well.
#![no_main]

libfuzzer_sys::fuzz_target!(|bytes: &[u8]| shadowpin_fuzz::book(bytes));
