//! Observed snow water equivalent: what a snow course or a snow pillow measured, as states at the start of a day.
//!
//! `columns` says which column holds what, `read` reads the cells and sifts them, `observations` is what comes of it:
//! S(d), the snow water equivalent as day d begins, which is what the model's states are held against.

mod columns;
mod declared;
mod observations;
mod read;

pub use columns::{Columns, SweColumn};
pub use observations::{Counts, Kind, Observations, State};
pub use read::read;
