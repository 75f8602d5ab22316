//! The snow: its physics, once, and the engine that steps it over many bands and levels at the same time.
//!
//! `phase`, `wet_bulb`, `degrees`, `melt`, `sun`, `patches` and `step` hold the equations, as small scalar functions that read
//! like the method; `params`, `phase_rule` and `options` what may be stated; `lanes` turns a basin, its warming levels and
//! parameters into columns of numbers, `means` puts them together again; `days` runs the equations over rows of lanes,
//! `engine` year by year; `block` is the water year it leaves; `ledger` holds it to account.

mod block;
mod catch;
mod caught_anew;
mod days;
mod degrees;
mod engine;
mod lanes;
mod ledger;
mod means;
mod melt;
mod options;
mod params;
mod passes;
mod patches;
mod phase;
mod phase_rule;
mod step;
mod sun;
mod wet_bulb;

pub use block::{BARE_MM, Detail, YearBlock, cover};
pub use catch::{GaugeMultiplier, StationPhase, correct_catch};
pub use caught_anew::{Catch, CaughtAnew};
pub use degrees::{diurnal_degrees, mean_degrees};
pub use engine::{Engine, Path, Snow};
pub use lanes::{LaneSpec, Lanes, ROW_MULTIPLE};
pub use ledger::OpenLedger;
pub use melt::{RAIN_MELT_PER_MM_C, canopy_share, degree_day_factor, potential_melt};
pub use options::{ColdContent, Patchiness, Radiation, SnowOptions, Sublimation};
pub use params::{DegreeRule, RawSnow, SnowParams};
pub use patches::class_multipliers;
pub use phase::{linear_snow_fraction, s_curve_snow_fraction, step_snow_fraction, tanh_snow_fraction};
pub use phase_rule::PhaseRule;
pub use step::{COLD_PER_MM_C, Fluxes, LaneConst, LaneDay, Pack, step};
pub use sun::{
    day_length_h, declination_rad, extraterrestrial_radiation, highest_radiation, inverse_relative_distance,
    potential_radiation, relative_radiation, sunset_hour_angle_rad,
};
pub use wet_bulb::{standard_pressure_kpa, wet_bulb_c};

/// The larger of two numbers, neither of them NaN: one instruction, where `f64::max` also orders NaN.
#[inline(always)]
fn larger(a: f64, b: f64) -> f64 {
    if a > b { a } else { b }
}

/// The smaller of two numbers, neither of them NaN.
#[inline(always)]
fn smaller(a: f64, b: f64) -> f64 {
    if a < b { a } else { b }
}
