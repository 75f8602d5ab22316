//! Run many: every realization under every warming level, on as many threads as there are.

mod climate;
mod plan;
mod realization;
mod record;
mod run;
mod seasons;
mod watch;

pub use climate::{BandClimate, WinterMonths, band_climates};
pub use plan::Plan;
pub use record::{RecordRun, RecordYear};
pub use run::run;
pub use seasons::Seasons;
pub use watch::{Halt, Silent, Watch};
