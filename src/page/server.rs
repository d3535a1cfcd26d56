//! Connections: how many, for how long, and how much each may say.

use super::desk::Desk;
use super::endpoints;
use hyper::server::conn::http1;
use hyper::service::service_fn;
use hyper_util::rt::{TokioIo, TokioTimer};
use std::convert::Infallible;
use std::io;
use std::sync::Arc;
use std::time::Duration;
use tokio::io::{AsyncRead, AsyncWrite};
use tokio::net::TcpListener;
use tokio::sync::Semaphore;

/// Connections answered at a time; the next ones wait.
const CONNECTIONS: usize = 256;
/// The head of a request must have come within this time.
const HEAD_WITHIN: Duration = Duration::from_secs(3);
/// A connection ends after this time, whatever it does; a book that another program holds is waited for ten seconds.
const WHOLE_WITHIN: Duration = Duration::from_secs(15);
/// The largest head, bytes, and the most headers.
const LARGEST_HEAD: usize = 16 * 1024;
const MOST_HEADERS: usize = 64;
/// Threads that compute or write.
const WORKERS: usize = 4;
/// The pause after a connection that could not be taken, as where too many files are open.
const PAUSE: Duration = Duration::from_millis(50);

/// Answers until the program ends.
///
/// # Errors
/// Where the system gives no event loop.
pub fn serve(listener: std::net::TcpListener, desk: Desk) -> io::Result<()> {
    let runtime = tokio::runtime::Builder::new_current_thread().enable_io().enable_time().max_blocking_threads(WORKERS).build()?;
    listener.set_nonblocking(true)?;
    runtime.block_on(accept(listener, Arc::new(desk)))
}

async fn accept(listener: std::net::TcpListener, desk: Arc<Desk>) -> io::Result<()> {
    let listener = TcpListener::from_std(listener)?;
    let places = Arc::new(Semaphore::new(CONNECTIONS));
    loop {
        let place = Arc::clone(&places).acquire_owned().await.map_err(io::Error::other)?;
        match listener.accept().await {
            Ok((stream, _)) => {
                let desk = Arc::clone(&desk);
                tokio::spawn(async move {
                    connection(stream, desk).await;
                    drop(place);
                });
            }
            Err(_) => tokio::time::sleep(PAUSE).await,
        }
    }
}

/// One request and its answer. What goes wrong on the way is the other end's; a head that cannot be read is answered with 400.
pub async fn connection(stream: impl AsyncRead + AsyncWrite + Unpin, desk: Arc<Desk>) {
    let service = service_fn(|request| {
        let desk = Arc::clone(&desk);
        async move { Ok::<_, Infallible>(endpoints::answer(request, desk).await) }
    });
    let mut http = http1::Builder::new();
    http.timer(TokioTimer::new()).header_read_timeout(HEAD_WITHIN).max_buf_size(LARGEST_HEAD).max_headers(MOST_HEADERS).keep_alive(false);
    let _ = tokio::time::timeout(WHOLE_WITHIN, http.serve_connection(TokioIo::new(stream), service)).await;
}
