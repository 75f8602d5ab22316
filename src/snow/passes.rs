//! Passes over rows of lanes: temperature, degrees, rain and snow, the store.
//!
//! Every row is a parameter of its own: so the compiler knows that no two of them overlap, and makes vector code without
//! asking at run time. The equations are the scalar functions of this room.

use super::catch::caught;
use super::{LaneConst, LaneDay, Pack, diurnal_degrees, mean_degrees, step, wet_bulb_c};

/// Station temperature carried to every lane.
#[inline(always)]
pub(super) fn mean_row(mean: &mut [f64], station_c: f64, offset_c: &[f64]) {
    for (mean, offset) in mean.iter_mut().zip(offset_c) {
        *mean = station_c + offset;
    }
}

/// Degrees of the daily mean.
#[inline(always)]
pub(super) fn mean_degrees_row(above: &mut [f64], below: &mut [f64], mean: &[f64], base: &[f64]) {
    let n = above.len();
    let (below, mean, base) = (&mut below[..n], &mean[..n], &base[..n]);
    for lane in 0..n {
        (above[lane], below[lane]) = mean_degrees(mean[lane], base[lane]);
    }
}

/// Degrees of a sine between minimum and maximum.
#[inline(always)]
pub(super) fn diurnal_degrees_row(
    above: &mut [f64],
    below: &mut [f64],
    mean: &[f64],
    base: &[f64],
    offset_c: &[f64],
    half_range_c: f64,
) {
    let n = above.len();
    let (below, mean, base, offset) = (&mut below[..n], &mean[..n], &base[..n], &offset_c[..n]);
    for lane in 0..n {
        (above[lane], below[lane]) = diurnal_degrees(mean[lane], half_range_c + offset[lane], base[lane]);
    }
}

/// Wet-bulb temperature of every lane at its pressure.
#[inline(always)]
pub(super) fn wet_bulb_row(
    wet_bulb: &mut [f64],
    mean: &[f64],
    pressure_kpa: &[f64],
    relative_humidity_pct: f64,
) {
    for ((wet_bulb, mean), pressure) in wet_bulb.iter_mut().zip(mean).zip(pressure_kpa) {
        *wet_bulb = wet_bulb_c(*mean, relative_humidity_pct, *pressure);
    }
}

/// What every lane's precipitation is multiplied by on a day, by its place and its month, `factor`, and by its correction of
/// the gauge's catch, which goes with the snow fraction at the station.
#[inline(always)]
#[expect(clippy::too_many_arguments, reason = "a row a parameter, see the top of this file")]
pub(super) fn catch_row(
    corrected: &mut [f64],
    factor: &[f64],
    of_rain: &[f64],
    of_snow: &[f64],
    warm: &[f64],
    per_c: &[f64],
    station_c: f64,
    snow_fraction: impl Fn(f64, f64, f64) -> f64,
) {
    let n = corrected.len();
    let (factor, of_rain, of_snow) = (&factor[..n], &of_rain[..n], &of_snow[..n]);
    let (warm, per_c) = (&warm[..n], &per_c[..n]);
    for lane in 0..n {
        let snow = snow_fraction(station_c, warm[lane], per_c[lane]);
        corrected[lane] = factor[lane] * caught(snow, of_rain[lane], of_snow[lane]);
    }
}

/// Rain and snow of every lane, and its part of the ledger; `mean` is the temperature that tells them apart.
#[inline(always)]
#[expect(clippy::too_many_arguments, reason = "a row a parameter, see the top of this file")]
pub(super) fn split_row(
    snow: &mut [f64],
    rain: &mut [f64],
    input: &mut [f64],
    mean: &[f64],
    warm: &[f64],
    per_c: &[f64],
    factor: &[f64],
    precipitation_mm: f64,
    snow_fraction: impl Fn(f64, f64, f64) -> f64,
) {
    let n = snow.len();
    let (rain, input, mean) = (&mut rain[..n], &mut input[..n], &mean[..n]);
    let (warm, per_c, factor) = (&warm[..n], &per_c[..n], &factor[..n]);
    for lane in 0..n {
        let fallen = precipitation_mm * factor[lane];
        let frozen = snow_fraction(mean[lane], warm[lane], per_c[lane]) * fallen;
        snow[lane] = frozen;
        rain[lane] = fallen - frozen;
        input[lane] += fallen;
    }
}

/// What each class gets of its band's snowfall, and its part of the ledger.
#[inline(never)]
pub(super) fn patches_row(snow: &mut [f64], input: &mut [f64], multiplier: &[f64]) {
    for ((snow, input), multiplier) in snow.iter_mut().zip(input).zip(multiplier) {
        let of_class = *snow * multiplier;
        *input += of_class - *snow;
        *snow = of_class;
    }
}

/// One day of every lane: the pack, SWE as the next day begins, fluxes and the ledger. The rows of the stores are empty
/// without them.
#[inline(always)]
#[expect(clippy::too_many_arguments, reason = "a row a parameter, see the top of this file")]
pub(super) fn store_row<const IS_WET: bool, const WITH_DETAIL: bool, const WITH_STORES: bool>(
    ice: &mut [f64],
    liquid: &mut [f64],
    melt: &mut [f64],
    refreeze: &mut [f64],
    year_outflow: &mut [f64],
    year_bare: &mut [f64],
    swe: &mut [f64],
    net_melt: &mut [f64],
    outflow: &mut [f64],
    bare_ground_rain: &mut [f64],
    cold: &mut [f64],
    year_sublimation: &mut [f64],
    sublimation: &mut [f64],
    snow: &[f64],
    rain: &[f64],
    mean: &[f64],
    above: &[f64],
    below: &[f64],
    melting: &[f64],
    degree_day: &[f64],
    holding: &[f64],
    refreezing: &[f64],
    stores: StoreRows<'_>,
) {
    let n = ice.len();
    let (liquid, melt, refreeze) = (&mut liquid[..n], &mut melt[..n], &mut refreeze[..n]);
    let (year_outflow, year_bare) = (&mut year_outflow[..n], &mut year_bare[..n]);
    let (swe, net_melt) = (&mut swe[..n], &mut net_melt[..n]);
    let (outflow, bare_ground_rain) = (&mut outflow[..n], &mut bare_ground_rain[..n]);
    let (snow, rain, mean, above, below) = (&snow[..n], &rain[..n], &mean[..n], &above[..n], &below[..n]);
    let (melting, degree_day) = (&melting[..n], &degree_day[..n]);
    let (holding, refreezing) = (&holding[..n], &refreezing[..n]);
    let with_stores = if WITH_STORES { n } else { 0 };
    let (cold, sublimation) = (&mut cold[..with_stores], &mut sublimation[..with_stores]);
    let year_sublimation = &mut year_sublimation[..with_stores];
    let StoreRows { loss_mm, loss_of_snow, cold_per_mm_c, cold_share } = stores.cut(with_stores);
    for lane in 0..n {
        let cold_mm = if WITH_STORES { cold[lane] } else { 0.0 };
        let pack = Pack { ice_mm: ice[lane], liquid_mm: liquid[lane], cold_mm };
        let snow_mm = if IS_WET { snow[lane] } else { 0.0 };
        let day = LaneDay {
            snow_mm,
            rain_mm: if IS_WET { rain[lane] } else { 0.0 },
            mean_c: mean[lane],
            melt_degrees_c: above[lane],
            freeze_degrees_c: below[lane],
            melt_factor: melting[lane],
            degree_day_factor: degree_day[lane],
            sublimation_mm: if WITH_STORES { loss_mm[lane] + loss_of_snow[lane] * snow_mm } else { 0.0 },
        };
        let lane_const = LaneConst {
            holding_fraction: holding[lane],
            refreeze_fraction: refreezing[lane],
            cold_per_mm_c: if WITH_STORES { cold_per_mm_c[lane] } else { 0.0 },
            cold_share: if WITH_STORES { cold_share[lane] } else { 0.0 },
        };
        let (pack, fluxes) = step::<WITH_STORES>(pack, day, lane_const);
        ice[lane] = pack.ice_mm;
        liquid[lane] = pack.liquid_mm;
        swe[lane] = pack.ice_mm + pack.liquid_mm;
        net_melt[lane] = fluxes.melt_mm - fluxes.refreeze_mm;
        outflow[lane] = fluxes.outflow_mm;
        year_outflow[lane] += fluxes.outflow_mm;
        if IS_WET {
            bare_ground_rain[lane] = fluxes.bare_ground_rain_mm;
            year_bare[lane] += fluxes.bare_ground_rain_mm;
        }
        if WITH_STORES {
            cold[lane] = pack.cold_mm;
            sublimation[lane] = fluxes.sublimation_mm;
            year_sublimation[lane] += fluxes.sublimation_mm;
        }
        if WITH_DETAIL {
            melt[lane] = fluxes.melt_mm;
            refreeze[lane] = fluxes.refreeze_mm;
        }
    }
}

/// Rows of what the cold store and the loss to the air need.
#[derive(Clone, Copy)]
pub(super) struct StoreRows<'l> {
    /// Loss of a day, mm.
    pub loss_mm: &'l [f64],
    /// Loss as a share of the day's snowfall.
    pub loss_of_snow: &'l [f64],
    pub cold_per_mm_c: &'l [f64],
    pub cold_share: &'l [f64],
}

impl StoreRows<'_> {
    #[inline(always)]
    fn cut(self, lanes: usize) -> Self {
        Self {
            loss_mm: &self.loss_mm[..lanes],
            loss_of_snow: &self.loss_of_snow[..lanes],
            cold_per_mm_c: &self.cold_per_mm_c[..lanes],
            cold_share: &self.cold_share[..lanes],
        }
    }
}
