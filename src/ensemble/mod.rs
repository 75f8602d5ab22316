//! Run many: every realization under every warming level, on as many threads as there are.

mod bench;
mod climate;
mod cool_season;
mod memory;
mod nodes;
mod operated;
mod plan;
mod realization;
mod record;
mod run;
mod seasons;
mod survey_swe;
mod swe_days;
mod watch;

pub use climate::{BandClimate, WinterMonths, band_climates, snow_that_piles_up};
pub use cool_season::cool_season_mean_c;
pub use nodes::NodeRuns;
pub use operated::OperatedSeasons;
pub use plan::{LevelGroup, Plan};
pub use record::{RecordRun, RecordYear};
pub use run::{run, run_nodes, run_records};
pub use seasons::{BasinSeasons, Seasons};
pub use survey_swe::SurveySwe;
pub use swe_days::{COUNTED_DAYS, SweBins, SweDays};
pub use watch::{Halt, Silent, Watch};
