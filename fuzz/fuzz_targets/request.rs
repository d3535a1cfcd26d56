//! Fuzzing of the page: whatever comes over a connection, it ends, and what is answered is an answer.
#![no_main]

#[allow(dead_code, reason = "the page as the program has it")]
#[path = "../../src/page/mod.rs"]
mod page;

use page::{Address, Desk};
use shadowpin::limits::Limits;
use std::sync::{Arc, LazyLock};
use tokio::io::{AsyncReadExt, AsyncWriteExt, duplex};
use tokio::runtime::{Builder, Runtime};

static RUNTIME: LazyLock<Runtime> = LazyLock::new(|| Builder::new_current_thread().enable_time().build().unwrap());

/// A page without a book, under an address that the kept inputs know.
static DESK: LazyLock<Arc<Desk>> = LazyLock::new(|| {
    let host = "127.0.0.1:8080".to_owned();
    let address = Address { origin: format!("http://{host}"), host, token: "0".repeat(32) };
    Arc::new(Desk {
        address,
        limits: Limits::default(),
        cards: None,
        card_name: None,
        card_as_given: false,
        heard: None,
        given: serde_json::Map::new(),
        night: false,
        record: None,
    })
});

libfuzzer_sys::fuzz_target!(|bytes: &[u8]| {
    let answer = RUNTIME.block_on(async {
        let (mut browser, page) = duplex(1 << 20);
        browser.write_all(bytes).await.unwrap();
        browser.shutdown().await.unwrap();
        page::server::connection(page, Arc::clone(&DESK)).await;
        let mut answer = Vec::new();
        browser.read_to_end(&mut answer).await.unwrap();
        answer
    });
    assert!(answer.is_empty() || answer.starts_with(b"HTTP/1."), "{}", String::from_utf8_lossy(&answer));
    // Nothing that a stranger sends is the page's own fault.
    assert!(!answer.starts_with(b"HTTP/1.1 5"), "{}", String::from_utf8_lossy(&answer));
});
