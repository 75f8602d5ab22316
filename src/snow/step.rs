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
    /// Cold content: how much water would freeze before the pack is at 0 degC.
    pub cold_mm: f64,
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
    /// Melt factor of the day, mm per degC and day.
    pub melt_factor: f64,
    /// Degree-day factor of the day: the melt factor without radiation.
    pub degree_day_factor: f64,
    /// What the air could take of the snow, mm.
    pub sublimation_mm: f64,
}

/// What stays the same for a lane.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LaneConst {
    /// Liquid water that the pack holds, a fraction of its ice.
    pub holding_fraction: f64,
    /// Refreezing per degree, a fraction of the degree-day factor.
    pub refreeze_fraction: f64,
    /// Cold content of 1 mm of ice for each degree below 0, mm: [`COLD_PER_MM_C`], or 0 without a cold store.
    pub cold_per_mm_c: f64,
    /// Share of the difference between the pack's temperature and the air's that a day closes.
    pub cold_share: f64,
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
    /// Snow that went into the air.
    pub sublimation_mm: f64,
}

/// Water that freezes as 1 mm of ice warms by 1 degC, mm: specific heat of ice over latent heat of fusion, 2.097 kJ/(kg degC)
/// and 333.43 kJ/kg at 0 degC (IAPWS R10-06 and R6-95).
pub const COLD_PER_MM_C: f64 = 2.097 / 333.43;

/// Steps a pack through one day, in the method's order: snowfall, melt, liquid, refreezing, outflow.
///
/// A day that begins without snow and brings none turns its rain into bare-ground rain; with the rain so set aside,
/// every later line of the step is zero by itself, which spares the step a branch.
///
/// `WITH_STORES` adds two lines after the snowfall, which the plain model leaves out: the air takes snow, and the cold store
/// follows the weather. Snow brings the cold of the air it fell through, and the pack's mean temperature closes a share of
/// its difference to the air, or to 0 degC where the air is warmer (an antecedent-temperature index; the store is linear in
/// mass and temperature, Jennings, Kittel & Molotch 2018). Snow that sublimes takes its own cold along, so that the pack gets no
/// colder by it. Water that freezes takes the store first.
///
/// SWE (`ice + liquid`) never falls below 0, and `snow + rain = outflow + bare-ground rain + sublimation + change of SWE`
/// to the last bits of the arithmetic.
#[inline(always)]
pub fn step<const WITH_STORES: bool>(pack: Pack, day: LaneDay, lane: LaneConst) -> (Pack, Fluxes) {
    let is_bare = (pack.ice_mm + pack.liquid_mm == 0.0) & (day.snow_mm == 0.0);
    let bare_ground_rain_mm = if is_bare { day.rain_mm } else { 0.0 };
    let rain_mm = if is_bare { 0.0 } else { day.rain_mm };

    let lying_mm = pack.ice_mm + day.snow_mm;
    let sublimation_mm = if WITH_STORES { smaller(day.sublimation_mm, lying_mm) } else { 0.0 };
    let ice_mm = if WITH_STORES { lying_mm - sublimation_mm } else { lying_mm };
    let cold_mm = if WITH_STORES { cold_content(pack.cold_mm, lying_mm, ice_mm, day, lane) } else { 0.0 };

    let potential_mm = potential_melt(day.melt_factor, day.melt_degrees_c, rain_mm, day.mean_c);
    let melt_mm = smaller(potential_mm, ice_mm);
    let ice_mm = ice_mm - melt_mm;

    let liquid_mm = pack.liquid_mm + (melt_mm + rain_mm);
    let can_freeze_mm = lane.refreeze_fraction * day.degree_day_factor * day.freeze_degrees_c;
    let can_freeze_mm = if WITH_STORES { can_freeze_mm + cold_mm } else { can_freeze_mm };
    let refreeze_mm = if ice_mm > 0.0 { smaller(can_freeze_mm, liquid_mm) } else { 0.0 };
    let cold_mm = if WITH_STORES & (ice_mm > 0.0) { larger(cold_mm - refreeze_mm, 0.0) } else { 0.0 };
    let ice_mm = ice_mm + refreeze_mm;
    let liquid_mm = liquid_mm - refreeze_mm;

    let outflow_mm = larger(liquid_mm - lane.holding_fraction * ice_mm, 0.0);
    let liquid_mm = liquid_mm - outflow_mm;
    (
        Pack { ice_mm, liquid_mm, cold_mm },
        Fluxes { melt_mm, refreeze_mm, outflow_mm, bare_ground_rain_mm, sublimation_mm },
    )
}

/// The cold store after the day's snowfall, with the air's share, mm: of `lying_mm` of ice `ice_mm` stay, and what sublimes
/// takes its own cold along.
#[inline(always)]
fn cold_content(cold_mm: f64, lying_mm: f64, ice_mm: f64, day: LaneDay, lane: LaneConst) -> f64 {
    let frost_c = larger(-day.mean_c, 0.0);
    let with_snowfall_mm = cold_mm + lane.cold_per_mm_c * day.snow_mm * frost_c;
    let that_stays_mm = if lying_mm > 0.0 { with_snowfall_mm * (ice_mm / lying_mm) } else { 0.0 };
    let of_the_air_mm = lane.cold_per_mm_c * ice_mm * frost_c;
    that_stays_mm + lane.cold_share * (of_the_air_mm - that_stays_mm)
}
