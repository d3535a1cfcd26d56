//! Instants, ship's time, and the scales that the sky is computed in.

mod delta_t;
mod instant;
mod moment;
mod scales;
pub mod text;
mod zone;

pub use delta_t::delta_t_s;
pub use instant::{FIRST_YEAR, LAST_YEAR, UtcInstant};
pub use moment::Moment;
pub use scales::{Tt, Ut1};
pub use zone::Zone;
