//! One day of one band: the melt equation and the pack's store (method, section 7).

use super::melt::potential_melt;
use super::{larger, smaller};

/// What the snowpack holds, mm of water.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Pack {
    /// Frozen.
    pub ice_mm: f64,
    /// Liquid, held among the ice.
    pub liquid_mm: f64,
}

/// A day's weather as it reaches one lane.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LaneDay {
    /// Snowfall, mm.
    pub snow_mm: f64,
    /// Rain, mm.
    pub rain_mm: f64,
    /// Daily mean temperature, degC.
    pub mean_c: f64,
    /// Degrees above the melt base temperature, mean of the day, degC.
    pub melt_degrees_c: f64,
    /// Degrees below it, degC.
    pub freeze_degrees_c: f64,
    /// Degree-day factor of the day, mm per degC and day.
    pub degree_day_factor: f64,
}

/// What stays the same for a lane.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LaneConst {
    /// Liquid water that the pack holds, a fraction of its ice.
    pub holding_fraction: f64,
    /// Refreezing per degree, a fraction of the degree-day factor.
    pub refreeze_fraction: f64,
}

/// A day's water, mm.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Fluxes {
    /// Ice that melted.
    pub melt_mm: f64,
    /// Liquid that froze.
    pub refreeze_mm: f64,
    /// Water that left the pack.
    pub outflow_mm: f64,
    /// Rain that met no snow.
    pub bare_ground_rain_mm: f64,
}

/// Steps a pack through one day, in the method's order: snowfall, melt, liquid, refreezing, outflow.
///
/// A day that begins without snow and brings none turns its rain into bare-ground rain; with the rain so set aside,
/// every later line of the step is zero by itself, which spares the step a branch.
///
/// SWE (`ice + liquid`) never falls below 0, and `snow + rain = outflow + bare-ground rain + change of SWE` to the
/// last bits of the arithmetic.
#[inline(always)]
pub fn step(pack: Pack, day: LaneDay, lane: LaneConst) -> (Pack, Fluxes) {
    let is_bare = (pack.ice_mm + pack.liquid_mm == 0.0) & (day.snow_mm == 0.0);
    let bare_ground_rain_mm = if is_bare { day.rain_mm } else { 0.0 };
    let rain_mm = if is_bare { 0.0 } else { day.rain_mm };

    let ice_mm = pack.ice_mm + day.snow_mm;
    let potential_mm = potential_melt(day.degree_day_factor, day.melt_degrees_c, rain_mm, day.mean_c);
    let melt_mm = smaller(potential_mm, ice_mm);
    let ice_mm = ice_mm - melt_mm;

    let liquid_mm = pack.liquid_mm + (melt_mm + rain_mm);
    let can_freeze_mm = lane.refreeze_fraction * day.degree_day_factor * day.freeze_degrees_c;
    let refreeze_mm = if ice_mm > 0.0 { smaller(can_freeze_mm, liquid_mm) } else { 0.0 };
    let ice_mm = ice_mm + refreeze_mm;
    let liquid_mm = liquid_mm - refreeze_mm;

    let outflow_mm = larger(liquid_mm - lane.holding_fraction * ice_mm, 0.0);
    let liquid_mm = liquid_mm - outflow_mm;
    (Pack { ice_mm, liquid_mm }, Fluxes { melt_mm, refreeze_mm, outflow_mm, bare_ground_rain_mm })
}
