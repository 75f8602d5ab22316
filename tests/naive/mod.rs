//! The method written out a second time, one band and one day at a time: acos, ifs and divisions, and nothing clever.
//!
//! It is the only second implementation in the project. It was written from the equations and shares no line with the
//! engine, so that where both agree neither has a slip of its own. Temperatures go through daily minima and maxima,
//! not through means and half ranges.

pub mod patches;
mod quadrature;
pub mod sun;
mod types;
pub mod wet_bulb;

pub use types::*;

use std::f64::consts::PI;

/// Sections 3 and 4: the station's temperature at the level, carried to the band.
pub fn temperature(station_c: f64, shape: f64, gradient_c_per_km: f64, band: &Band) -> f64 {
    let above_mean_m = band.elevation_m - band.options.basin_mean_m;
    let level_c =
        band.level_c * (1.0 + band.options.level_change_pct_per_1000m / 100.0 * above_mean_m / 1000.0);
    let warmed = station_c + level_c * shape;
    warmed + gradient_c_per_km * (band.elevation_m - band.station_m) / 1000.0
}

/// Sections 3 and 4: the station's precipitation at the level, carried to the band.
pub fn precipitation(station_mm: f64, month: usize, band: &Band) -> f64 {
    let changed = match band.precipitation_change_pct {
        Some(stated_pct) => station_mm * (1.0 + stated_pct[month - 1] / 100.0),
        None => {
            let pct_per_c = band.precipitation_change_pct_per_c[month - 1];
            station_mm * libm::pow(1.0 + pct_per_c / 100.0, band.level_c)
        }
    };
    let mut elevation_m = band.elevation_m;
    if elevation_m > band.precipitation_top_m {
        elevation_m = band.precipitation_top_m;
    }
    let mut station_m = band.station_m;
    if station_m > band.precipitation_top_m {
        station_m = band.precipitation_top_m;
    }
    let hundreds = (elevation_m - station_m) / 100.0;
    let multiplier = match band.options.gradient_form {
        GradientForm::Linear => 1.0 + band.precipitation_gradient_per_100m * hundreds,
        GradientForm::Compound => libm::pow(1.0 + band.precipitation_gradient_per_100m, hundreds),
    };
    if multiplier < 0.0 { 0.0 } else { changed * multiplier }
}

/// Section 5: the share that falls as snow.
pub fn snow_fraction(phase: Phase, mean_c: f64) -> f64 {
    match phase {
        Phase::Linear { snow_c, rain_c } => {
            if mean_c <= snow_c {
                1.0
            } else if mean_c >= rain_c {
                0.0
            } else {
                (rain_c - mean_c) / (rain_c - snow_c)
            }
        }
        Phase::Tanh => (1.0 - libm::tanh(0.7 * (mean_c - 1.2))) / 2.0,
        Phase::Step { threshold_c } => {
            if mean_c <= threshold_c {
                1.0
            } else {
                0.0
            }
        }
        Phase::SCurve { half_snow_c, mixed_range_c } => {
            let x = (mean_c - half_snow_c) / (1.4 * mixed_range_c);
            let square = if mean_c <= half_snow_c { 6.76 * x * x } else { -6.76 * x * x };
            let rain = 5.0 * x * x * x + square + 3.19 * x + 0.5;
            if rain < 0.0 {
                1.0
            } else if rain > 1.0 {
                0.0
            } else {
                1.0 - rain
            }
        }
    }
}

/// Section 6, the closed form: the means over a day of the positive and of the negative part of a sine.
pub fn sine_degrees(tmin_c: f64, tmax_c: f64, base_c: f64) -> (f64, f64) {
    let mean_c = (tmin_c + tmax_c) / 2.0;
    let half_range_c = (tmax_c - tmin_c) / 2.0;
    if half_range_c <= 0.0 {
        return mean_degrees(mean_c, base_c);
    }
    let x = (base_c - mean_c) / half_range_c;
    let above = if x <= -1.0 {
        mean_c - base_c
    } else if x >= 1.0 {
        0.0
    } else {
        let theta = libm::acos(x);
        ((mean_c - base_c) * theta + half_range_c * libm::sin(theta)) / PI
    };
    (above, above - (mean_c - base_c))
}

/// Section 6: degrees of the daily mean.
pub fn mean_degrees(mean_c: f64, base_c: f64) -> (f64, f64) {
    if mean_c > base_c { (mean_c - base_c, 0.0) } else { (0.0, base_c - mean_c) }
}

/// Section 6: the degree-day factor of a calendar day, under the band's trees.
pub fn degree_day_factor(band: &Band, day_of_year: f64) -> f64 {
    let middle = (band.factor_highest + band.factor_lowest) / 2.0;
    let swing = (band.factor_highest - band.factor_lowest) / 2.0;
    let open = middle + swing * libm::cos(2.0 * PI * (day_of_year - band.highest_on_day) / 365.25);
    open * left_by_canopy(band)
}

/// What trees leave of a factor: of 3.51 mm per degC and day in the open 0.16 less for every tenth of the area.
pub fn left_by_canopy(band: &Band) -> f64 {
    1.0 - 0.16 * (band.options.canopy_fraction * 10.0) / 3.51
}

/// What radiation adds to the degree-day factor on every calendar day of a year of 366.
pub fn radiation_factors(band: &Band) -> Vec<f64> {
    let Some(radiation) = band.options.radiation else {
        return vec![0.0; 366];
    };
    let highest = sun::highest_radiation(radiation.latitude_deg);
    let on_day = |day: u32| {
        let day = f64::from(day);
        let found = sun::radiation(radiation.latitude_deg, radiation.slope_deg, radiation.aspect_deg, day);
        radiation.factor_mm_per_c_day * found / highest * left_by_canopy(band)
    };
    (1..=366).map(on_day).collect()
}

/// Sections 3 to 7: one day of one band, or of one class of its snow, from what the day before left.
pub fn day(band: &Band, terms: Terms, before: Pack, day: Day) -> DayResult {
    let month = day.month - 1;
    let tmin_c = temperature(day.tmin_c, band.tmin_shape[month], band.tmin_gradient_c_per_km[month], band);
    let tmax_c = temperature(day.tmax_c, band.tmax_shape[month], band.tmax_gradient_c_per_km[month], band);
    let mean_c = (tmin_c + tmax_c) / 2.0;
    let falling_c = if band.options.is_wet_bulb {
        wet_bulb::wet_bulb_c(mean_c, day.relative_humidity_pct, band.elevation_m)
    } else {
        mean_c
    };
    let fallen_mm = precipitation(day.precipitation_mm, day.month, band);
    let snow_of_band_mm = snow_fraction(band.phase, falling_c) * fallen_mm;
    let rain_mm = fallen_mm - snow_of_band_mm;
    let snow_mm = snow_of_band_mm * terms.snowfall;

    let Pack { mut ice_mm, mut liquid_mm, mut cold_mm } = before;
    let mut result =
        DayResult { mean_c, rain_mm, snow_mm, swe_mm: ice_mm + liquid_mm, ..DayResult::default() };
    if result.swe_mm >= 1.0 {
        result.covered_share = 1.0;
    }
    if ice_mm + liquid_mm == 0.0 && snow_mm == 0.0 {
        result.bare_ground_rain_mm = rain_mm;
        return result;
    }

    // The heat that warms ice by a degree, over the heat that melts it: 2.097 to 333.43.
    let warming_share = 2.097 / 333.43;
    let frost_c = if mean_c < 0.0 { -mean_c } else { 0.0 };

    ice_mm += snow_mm;

    let can_sublime_mm =
        band.options.sublimation_mm_per_day[month] + band.options.sublimation_of_snowfall * snow_mm;
    result.sublimation_mm = if can_sublime_mm > ice_mm { ice_mm } else { can_sublime_mm };
    let ice_of_night_mm = ice_mm - result.sublimation_mm;

    if let Some(share) = band.options.cold_content_daily_share {
        cold_mm += warming_share * snow_mm * frost_c;
        if ice_mm > 0.0 {
            // The pack's temperature stays as it was while ice sublimes.
            let temperature_c = -cold_mm / (warming_share * ice_mm);
            cold_mm = -temperature_c * warming_share * ice_of_night_mm;
        }
        cold_mm += share * (warming_share * ice_of_night_mm * frost_c - cold_mm);
    }
    ice_mm = ice_of_night_mm;

    let (above, below) = match band.degrees {
        Degrees::Mean => mean_degrees(mean_c, band.melt_base_c),
        Degrees::Diurnal => sine_degrees(tmin_c, tmax_c, band.melt_base_c),
    };
    let mut potential_mm = (terms.factor + terms.radiation) * above;
    if mean_c > 0.0 {
        potential_mm += 0.0125 * rain_mm * mean_c;
    }
    result.melt_mm = if potential_mm > ice_mm { ice_mm } else { potential_mm };
    ice_mm -= result.melt_mm;

    liquid_mm += result.melt_mm + rain_mm;

    if ice_mm > 0.0 {
        let can_freeze_mm = cold_mm + band.refreeze_fraction * terms.factor * below;
        result.refreeze_mm = if can_freeze_mm > liquid_mm { liquid_mm } else { can_freeze_mm };
        cold_mm = if result.refreeze_mm > cold_mm { 0.0 } else { cold_mm - result.refreeze_mm };
    } else {
        cold_mm = 0.0;
    }
    ice_mm += result.refreeze_mm;
    liquid_mm -= result.refreeze_mm;

    let held_mm = band.holding_fraction * ice_mm;
    if liquid_mm > held_mm {
        result.outflow_mm = liquid_mm - held_mm;
        liquid_mm -= result.outflow_mm;
    }
    result.ice_mm = ice_mm;
    result.liquid_mm = liquid_mm;
    result.cold_mm = cold_mm;
    result
}

/// All days of one band, from bare ground wherever `starts_bare` says so for a day. Patchy snow is run class by class, and
/// the band has the classes' mean.
pub fn run(band: &Band, days: &[Day], starts_bare: &[bool]) -> Vec<DayResult> {
    let snowfalls = match band.options.patches {
        Some(patches) if patches.coefficient_of_variation > 0.0 => {
            patches::multipliers(patches.coefficient_of_variation, patches.classes)
        }
        _ => vec![1.0],
    };
    let radiation = radiation_factors(band);
    let mut sums = vec![DayResult::default(); days.len()];
    for snowfall in &snowfalls {
        let mut pack = Pack::default();
        for ((weather, is_bare), sum) in days.iter().zip(starts_bare).zip(&mut sums) {
            if *is_bare {
                pack = Pack::default();
            }
            let terms = Terms {
                factor: degree_day_factor(band, weather.day_of_year),
                radiation: radiation[weather.day_of_year as usize - 1],
                snowfall: *snowfall,
            };
            let result = day(band, terms, pack, *weather);
            pack = Pack { ice_mm: result.ice_mm, liquid_mm: result.liquid_mm, cold_mm: result.cold_mm };
            sum.add(&result);
        }
    }
    for sum in &mut sums {
        sum.divide(snowfalls.len() as f64);
    }
    sums
}

impl DayResult {
    fn values(&mut self) -> [&mut f64; 13] {
        [
            &mut self.mean_c,
            &mut self.rain_mm,
            &mut self.snow_mm,
            &mut self.melt_mm,
            &mut self.refreeze_mm,
            &mut self.outflow_mm,
            &mut self.bare_ground_rain_mm,
            &mut self.swe_mm,
            &mut self.ice_mm,
            &mut self.liquid_mm,
            &mut self.sublimation_mm,
            &mut self.cold_mm,
            &mut self.covered_share,
        ]
    }

    fn add(&mut self, more: &Self) {
        let mut more = *more;
        for (value, more) in self.values().into_iter().zip(more.values()) {
            *value += *more;
        }
    }

    fn divide(&mut self, by: f64) {
        for value in self.values() {
            *value /= by;
        }
    }
}

/// Section 7: an area-weighted mean.
pub fn basin_mean(values: &[f64], areas_km2: &[f64]) -> f64 {
    let (mut sum, mut area) = (0.0, 0.0);
    for (value, area_km2) in values.iter().zip(areas_km2) {
        sum += value * area_km2;
        area += area_km2;
    }
    sum / area
}
