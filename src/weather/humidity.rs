//! Relative humidity of each day: as measured or from the dew point, sifted, and filled where it was not measured.

use super::columns::{Columns, HumidityColumn};
use super::days::RawDays;
use super::series::Series;
use super::suspicious::{Finder, Suspicion, said};
use serde::Serialize;
use std::ops::RangeInclusive;

/// Humidities of a station lie here; one that reads a little above 100 stands for 100, percent.
const POSSIBLE_PCT: RangeInclusive<f64> = 0.0..=105.0;
/// No station has measured a temperature beyond these, and so no dew point (records: -89.2 and 56.7 degC, World
/// Meteorological Organization), degC.
const POSSIBLE_DEW_POINT_C: RangeInclusive<f64> = -90.0..=60.0;
/// A dew point this far above the day's maximum is hardly one, degC.
const ABOVE_MAXIMUM_C: f64 = 1.0;
/// Humidities of which nearly all are as low as this are fractions, percent: a sensor overshoots, and a mark may slip in.
const MOST_OF_FRACTIONS_PCT: f64 = 1.5;
/// Nearly all.
const NEARLY_ALL: f64 = 0.95;

/// What was met while a record's humidity was read and filled.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, Serialize)]
pub struct HumidityCount {
    /// Days of the file without humidity, those with an impossible cell included.
    pub missing_days: usize,
    /// Days whose humidity came out above 100 percent and stands as 100.
    pub lowered_to_100_days: usize,
    /// Wet days of the years in use.
    pub wet_days: usize,
    /// Those of them whose humidity was not measured: they have the mean of the wet days of their month.
    pub filled_wet_days: usize,
}

/// Saturation vapour pressure over water at a temperature above -237.3 degC, kPa: `0.6108*exp(17.27*T/(T + 237.3))` (Tetens
/// 1930, as in FAO Irrigation and Drainage Paper 56, eq. 11). Within 0.2 % of the steam tables from 0 to 30 degC; below 0 degC
/// it is that over supercooled water.
///
/// ```
/// use thawline::weather::saturation_vapour_pressure_kpa;
/// assert!((saturation_vapour_pressure_kpa(20.0) - 2.338).abs() < 0.001);
/// ```
pub fn saturation_vapour_pressure_kpa(temperature_c: f64) -> f64 {
    0.6108 * libm::exp(17.27 * temperature_c / (temperature_c + 237.3))
}

/// Relative humidity of air with a dew point, percent, at most 100: `100*e_s(dew point)/e_s(T)`, both over water.
pub fn relative_humidity_pct(mean_c: f64, dew_point_c: f64) -> f64 {
    let share = saturation_vapour_pressure_kpa(dew_point_c) / saturation_vapour_pressure_kpa(mean_c);
    (100.0 * share).min(100.0)
}

/// Relative humidity of a file's days, percent, where it was measured.
pub(super) struct Sifted {
    pub pct: Vec<Option<f64>>,
    pub lowered_to_100_days: usize,
    /// Cells beyond what can be.
    pub impossible_cells: usize,
    pub suspicions: Vec<Suspicion>,
}

/// Takes as missing what cannot be, and turns dew points into humidities at the mean of the day's two temperatures. None where
/// no column holds either.
pub(super) fn sift_humidity(days: &RawDays, columns: &Columns) -> Option<Sifted> {
    let mut finder = Finder { first_day: days.first, line: days.line.clone(), found: Vec::new() };
    let mut cells = days.humidity.clone();
    let (impossible_cells, pct, lowered_to_100_days) = match columns.humidity.as_ref()? {
        HumidityColumn::Relative { .. } => {
            let impossible = sift_relative(&mut finder, &mut cells);
            let lowered = cells.iter().flatten().filter(|pct| **pct > 100.0).count();
            (impossible, cells.into_iter().map(|pct| Some(pct?.min(100.0))).collect(), lowered)
        }
        HumidityColumn::DewPoint(_) => {
            let impossible = sift_dew_points(&mut finder, days, &mut cells);
            let both: Vec<Option<(f64, f64)>> =
                (0..cells.len()).map(|day| measured_mean_c(days, day).zip(cells[day])).collect();
            let lowered = both.iter().flatten().filter(|(mean_c, dew_point_c)| dew_point_c > mean_c).count();
            let pct = both
                .into_iter()
                .map(|both| both.map(|(mean_c, dew_point_c)| relative_humidity_pct(mean_c, dew_point_c)));
            (impossible, pct.collect(), lowered)
        }
    };
    Some(Sifted { pct, lowered_to_100_days, impossible_cells, suspicions: finder.found })
}

fn sift_relative(finder: &mut Finder, cells: &mut [Option<f64>]) -> usize {
    const KEY: &str = "weather.relative_humidity";
    let what = "values beyond 0 to 105 percent, which no air at a station has";
    let impossible = finder.drop(KEY, what, cells, "percent", |_, pct| !POSSIBLE_PCT.contains(&pct));
    if let Some(newest) = finder.found.last_mut() {
        newest.mend = "Are its unit and the marks for 'not measured' the right ones?".to_owned();
    }
    let measured = cells.iter().flatten().count();
    let low = cells.iter().flatten().filter(|pct| **pct <= MOST_OF_FRACTIONS_PCT).count();
    if measured > 0 && low as f64 >= NEARLY_ALL * measured as f64 {
        let mend = "Are they fractions? Then state unit = \"fraction\"";
        finder.note(KEY, "values of at most 1.5 percent, and hardly one above", mend, |day| {
            cells[day].filter(|pct| *pct <= MOST_OF_FRACTIONS_PCT).map(|pct| said(pct, "percent"))
        });
    }
    impossible
}

fn sift_dew_points(finder: &mut Finder, days: &RawDays, cells: &mut [Option<f64>]) -> usize {
    const KEY: &str = "weather.dew_point";
    let what = "values beyond -90 to 60 degC, which no station has measured";
    let impossible = finder.drop(KEY, what, cells, "degC", |_, value| !POSSIBLE_DEW_POINT_C.contains(&value));
    let mend = "Are both in the units that were stated? There the air is taken for saturated";
    let what = format!("values more than {ABOVE_MAXIMUM_C} degC above the day's maximum");
    finder.note(KEY, what, mend, |day| {
        let (dew_point_c, highest_c) = cells[day].zip(days.tmax_c[day])?;
        (dew_point_c > highest_c + ABOVE_MAXIMUM_C)
            .then(|| format!("{} above {}", said(dew_point_c, "degC"), said(highest_c, "degC")))
    });
    impossible
}

/// The mean of a day's minimum and maximum, where both were measured.
fn measured_mean_c(days: &RawDays, day: usize) -> Option<f64> {
    days.tmin_c[day].zip(days.tmax_c[day]).map(|(low_c, high_c)| (low_c + high_c) / 2.0)
}

/// A mean over days, as they come.
#[derive(Clone, Copy, Default)]
struct Mean {
    sum: f64,
    days: usize,
}

impl Mean {
    fn add(&mut self, value: f64) {
        self.sum += value;
        self.days += 1;
    }

    fn value(self) -> Option<f64> {
        (self.days > 0).then(|| self.sum / self.days as f64)
    }
}

/// Humidity of every day of a series: as measured; else, on a wet day, the mean of the wet days measured in that calendar month,
/// or of all wet days if it has none; on a day without precipitation, where nothing hangs on it, the mean of all days measured
/// in the month, or of all. `measured` has one value a day of the series. Notes in `count` what was filled.
///
/// # Errors
/// Fewer than half of the wet days measured: how many are; or no day at all.
pub(super) fn filled(
    measured: &[Option<f64>],
    series: &Series,
    count: &mut HumidityCount,
) -> Result<Vec<f64>, usize> {
    // Of wet days and of all, by month and over the year.
    let (mut wet, mut all) = ([Mean::default(); 13], [Mean::default(); 13]);
    let days = || {
        let is_wet = series.precipitation_mm.iter().map(|amount_mm| *amount_mm > 0.0);
        measured.iter().zip(is_wet).zip(series.month.iter().map(|month| usize::from(*month)))
    };
    for ((pct, is_wet), month) in days() {
        count.wet_days += usize::from(is_wet);
        let Some(pct) = *pct else { continue };
        for at in [month, 12] {
            all[at].add(pct);
            if is_wet {
                wet[at].add(pct);
            }
        }
    }
    let measured_wet_days = wet[12].days;
    count.filled_wet_days = count.wet_days - measured_wet_days;
    let (true, Some(mean)) = (2 * measured_wet_days >= count.wet_days, all[12].value()) else {
        return Err(measured_wet_days);
    };
    let fill = |is_wet: bool, month: usize| {
        let means = if is_wet { &wet } else { &all };
        means[month].value().or(means[12].value()).unwrap_or(mean)
    };
    Ok(days().map(|((pct, is_wet), month)| pct.unwrap_or_else(|| fill(is_wet, month))).collect())
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Steam tables (IAPWS-IF97, Python package iapws 1.5.5, `_PSat_T`), kPa. Tetens' formula has fewer constants: 0.2 %.
    #[test]
    fn saturation_is_near_the_steam_tables() {
        for (temperature_c, kpa) in
            [(0.01, 0.611_657), (10.0, 1.228_184), (20.0, 2.339_215), (30.0, 4.246_688)]
        {
            let found = saturation_vapour_pressure_kpa(temperature_c);
            assert!((found / kpa - 1.0).abs() < 0.002, "{found} for {kpa} at {temperature_c}");
        }
        // The formula itself, in 40 digits (Python's decimal module); rounding alone may part them.
        for (temperature_c, kpa) in [(-30.0, 0.050_173_809_244_147), (5.0, 0.872_310_960_349_712)] {
            assert!((saturation_vapour_pressure_kpa(temperature_c) / kpa - 1.0).abs() < 1e-12);
        }
    }

    fn series(months: &[u8], precipitation_mm: &[f64]) -> Series {
        Series { month: months.to_vec(), precipitation_mm: precipitation_mm.to_vec(), ..Series::default() }
    }

    /// By hand: January's wet days have 80 and 90 %, so 85; February has none measured and takes 86.67, the mean of 80, 90 and
    /// 90; a dry day in January takes the mean of 80, 90 and 30 there.
    #[test]
    fn days_without_humidity_are_like_their_month() {
        let series = series(&[0, 0, 0, 0, 0, 1, 2], &[1.0, 2.0, 0.0, 0.0, 3.0, 4.0, 5.0]);
        let measured = [Some(80.0), Some(90.0), Some(30.0), None, None, None, Some(90.0)];
        let mut count = HumidityCount::default();
        let filled = filled(&measured, &series, &mut count).unwrap();
        let by_hand = [80.0, 90.0, 30.0, 200.0 / 3.0, 85.0, 260.0 / 3.0, 90.0];
        assert!(
            filled.iter().zip(by_hand).all(|(found, by_hand)| (found - by_hand).abs() < 1e-12),
            "{filled:?}"
        );
        assert_eq!((count.wet_days, count.filled_wet_days), (5, 2));
    }

    #[test]
    fn less_than_half_of_the_wet_days_is_too_little() {
        let series = series(&[0, 0, 0, 0], &[1.0, 1.0, 1.0, 0.0]);
        let of = |measured: &[Option<f64>; 4]| filled(measured, &series, &mut HumidityCount::default());
        assert_eq!(of(&[Some(80.0), None, None, Some(40.0)]), Err(1));
        assert!(of(&[Some(80.0), Some(80.0), None, None]).is_ok());
        let dry = Series { precipitation_mm: vec![0.0; 4], ..series.clone() };
        assert_eq!(filled(&[None; 4], &dry, &mut HumidityCount::default()), Err(0), "nothing to fill with");
    }
}
