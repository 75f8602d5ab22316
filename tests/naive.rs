//! The method written out a second time, one band and one day at a time: acos, ifs and divisions, and nothing clever.
//!
//! It is the only second implementation in the project. It was written from the equations and shares no line with the
//! engine, so that where both agree neither has a slip of its own. Temperatures go through daily minima and maxima,
//! not through means and half ranges.

use std::f64::consts::PI;

/// Rain or snow.
#[derive(Debug, Clone, Copy)]
pub enum Phase {
    /// Snow only below `snow_c`, rain only above `rain_c`, degC.
    Linear { snow_c: f64, rain_c: f64 },
    /// Snow at and below the threshold, degC.
    Step { threshold_c: f64 },
    /// The smooth curve for land.
    Tanh,
}

/// Degrees from the day's mean, or from a sine between minimum and maximum.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Degrees {
    /// The mean alone.
    Mean,
    /// A sine through the day.
    Diurnal,
}

/// Everything that does not change from day to day in one band at one warming level.
#[derive(Debug, Clone)]
pub struct Band {
    /// Elevation of the band, m.
    pub elevation_m: f64,
    /// Elevation of the station, m.
    pub station_m: f64,
    /// Temperature gradients of the daily minimum, degC per km, January first.
    pub tmin_gradient_c_per_km: [f64; 12],
    /// The same of the daily maximum.
    pub tmax_gradient_c_per_km: [f64; 12],
    /// Precipitation gradient, a fraction per 100 m.
    pub precipitation_gradient_per_100m: f64,
    /// Elevation above which precipitation grows no further, m.
    pub precipitation_top_m: f64,
    /// Warming level, degC.
    pub level_c: f64,
    /// Monthly shape of the warming of minima.
    pub tmin_shape: [f64; 12],
    /// Monthly shape of the warming of maxima.
    pub tmax_shape: [f64; 12],
    /// Change of precipitation by month, percent per degC, compounded.
    pub precipitation_change_pct_per_c: [f64; 12],
    /// Change of precipitation by month as stated for this level, percent; in place of that per degC.
    pub precipitation_change_pct: Option<[f64; 12]>,
    /// Rain or snow.
    pub phase: Phase,
    /// Degree rule.
    pub degrees: Degrees,
    /// Highest degree-day factor, mm per degC and day.
    pub factor_highest: f64,
    /// Lowest degree-day factor.
    pub factor_lowest: f64,
    /// Day of the highest factor in a year of 365 days.
    pub highest_on_day: f64,
    /// Melt base temperature, degC.
    pub melt_base_c: f64,
    /// Refreezing, a fraction of the degree-day factor.
    pub refreeze_fraction: f64,
    /// Liquid held, a fraction of the ice.
    pub holding_fraction: f64,
}

/// One day at the station.
#[derive(Debug, Clone, Copy)]
pub struct Day {
    /// Minimum, degC.
    pub tmin_c: f64,
    /// Maximum, degC.
    pub tmax_c: f64,
    /// Precipitation, mm.
    pub precipitation_mm: f64,
    /// Month, 1 to 12.
    pub month: usize,
    /// Calendar day of the year, 1 to 366.
    pub day_of_year: f64,
}

/// What one day of one band came to; SWE stands at the day's beginning, ice and liquid at its end.
#[derive(Debug, Clone, Copy, Default)]
pub struct DayResult {
    pub mean_c: f64,
    pub rain_mm: f64,
    pub snow_mm: f64,
    pub melt_mm: f64,
    pub refreeze_mm: f64,
    pub outflow_mm: f64,
    pub bare_ground_rain_mm: f64,
    pub swe_mm: f64,
    pub ice_mm: f64,
    pub liquid_mm: f64,
}

/// Sections 3 and 4: the station's temperature at the level, carried to the band.
pub fn temperature(station_c: f64, shape: f64, gradient_c_per_km: f64, band: &Band) -> f64 {
    let warmed = station_c + band.level_c * shape;
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
    let multiplier = 1.0 + band.precipitation_gradient_per_100m * (elevation_m - station_m) / 100.0;
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

/// Section 6: the degree-day factor of a calendar day.
pub fn degree_day_factor(band: &Band, day_of_year: f64) -> f64 {
    let middle = (band.factor_highest + band.factor_lowest) / 2.0;
    let swing = (band.factor_highest - band.factor_lowest) / 2.0;
    middle + swing * libm::cos(2.0 * PI * (day_of_year - band.highest_on_day) / 365.25)
}

/// Sections 3 to 7: one day of one band, from the ice and liquid that the day before left, with the day's degree-day
/// factor.
pub fn day(band: &Band, factor: f64, ice_mm: f64, liquid_mm: f64, day: Day) -> DayResult {
    let month = day.month - 1;
    let tmin_c = temperature(day.tmin_c, band.tmin_shape[month], band.tmin_gradient_c_per_km[month], band);
    let tmax_c = temperature(day.tmax_c, band.tmax_shape[month], band.tmax_gradient_c_per_km[month], band);
    let mean_c = (tmin_c + tmax_c) / 2.0;
    let fallen_mm = precipitation(day.precipitation_mm, day.month, band);
    let snow_mm = snow_fraction(band.phase, mean_c) * fallen_mm;
    let rain_mm = fallen_mm - snow_mm;

    let mut result =
        DayResult { mean_c, rain_mm, snow_mm, swe_mm: ice_mm + liquid_mm, ..DayResult::default() };
    if ice_mm + liquid_mm == 0.0 && snow_mm == 0.0 {
        result.bare_ground_rain_mm = rain_mm;
        return result;
    }

    let (mut ice_mm, mut liquid_mm) = (ice_mm, liquid_mm);
    ice_mm += snow_mm;

    let (above, below) = match band.degrees {
        Degrees::Mean => mean_degrees(mean_c, band.melt_base_c),
        Degrees::Diurnal => sine_degrees(tmin_c, tmax_c, band.melt_base_c),
    };
    let mut potential_mm = factor * above;
    if mean_c > 0.0 {
        potential_mm += 0.0125 * rain_mm * mean_c;
    }
    result.melt_mm = if potential_mm > ice_mm { ice_mm } else { potential_mm };
    ice_mm -= result.melt_mm;

    liquid_mm += result.melt_mm + rain_mm;

    if ice_mm > 0.0 {
        let can_freeze_mm = band.refreeze_fraction * factor * below;
        result.refreeze_mm = if can_freeze_mm > liquid_mm { liquid_mm } else { can_freeze_mm };
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
    result
}

/// All days of one band, from bare ground wherever `starts_bare` says so for a day.
pub fn run(band: &Band, days: &[Day], starts_bare: &[bool]) -> Vec<DayResult> {
    let (mut ice_mm, mut liquid_mm) = (0.0, 0.0);
    let mut results = Vec::with_capacity(days.len());
    for (weather, is_bare) in days.iter().zip(starts_bare) {
        if *is_bare {
            (ice_mm, liquid_mm) = (0.0, 0.0);
        }
        let factor = degree_day_factor(band, weather.day_of_year);
        let result = day(band, factor, ice_mm, liquid_mm, *weather);
        (ice_mm, liquid_mm) = (result.ice_mm, result.liquid_mm);
        results.push(result);
    }
    results
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
