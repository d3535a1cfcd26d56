//! The bridge's page: a few files and a few endpoints on this machine's loopback. What it shows is computed by the library.

mod desk;
mod endpoints;
mod guard;
mod record;
mod reply;
pub mod server;

pub use desk::{Desk, Heard};
pub use record::Record;
pub use server::serve;

/// What the page answers to: where it listens, and the token that stands first in every path.
#[derive(Debug, Clone)]
pub struct Address {
    /// `127.0.0.1:PORT`, as the Host of every request.
    pub host: String,
    /// `http://127.0.0.1:PORT`, as the Origin of every write.
    pub origin: String,
    /// The token.
    pub token: String,
}

impl Address {
    /// The address of a port with a new token.
    ///
    /// # Errors
    /// Where the system gives no random bytes.
    pub fn new(port: u16) -> Result<Self, getrandom::Error> {
        let mut random = [0_u8; 16];
        getrandom::fill(&mut random)?;
        let host = format!("127.0.0.1:{port}");
        let token = random.iter().map(|byte| format!("{byte:02x}")).collect();
        Ok(Self { origin: format!("http://{host}"), host, token })
    }

    /// What a person opens.
    pub fn url(&self) -> String {
        format!("{}/{}/", self.origin, self.token)
    }
}
