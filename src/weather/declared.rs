//! What a column's values would be, had the scenario declared another unit or another gauge.
//!
//! A slip of a unit shifts whole means, so it is told by means of the file as it stands, before anything is taken as missing.
//! The limits are common practice.

use super::columns::{Columns, Gauge, TemperatureColumn, TemperatureColumns};
use super::days::RawDays;
use crate::fault::Unlikely;
use crate::units::{DepthUnit, TemperatureUnit};
use chrono::{Datelike, NaiveDate};
use std::ops::RangeInclusive;

/// Cells beyond this are no temperature in any unit, degC.
const NO_TEMPERATURE_C: f64 = 500.0;
/// Nor is there so much precipitation in any unit, mm.
const NO_PRECIPITATION_MM: f64 = 1e5;
/// Yearly precipitation beyond these is rarely measured where snow is run, mm.
const USUAL_PRECIPITATION_MM: RangeInclusive<f64> = 100.0..=6000.0;
/// An accumulating gauge rises at least this many times as often as it falls.
const RISES_PER_FALL: usize = 10;
/// Of fewer rises nothing can be told.
const FEWEST_RISES: usize = 20;

/// Where the means of a temperature column lie, or the extremes of the usual ones, degC.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Means {
    year_c: f64,
    warmest_month_c: f64,
}

/// The means that a mountain station's column has.
#[derive(Debug, Clone)]
struct Usual {
    year_c: RangeInclusive<f64>,
    warmest_month_c: RangeInclusive<f64>,
}

const USUAL_MINIMUM: Usual = Usual { year_c: -35.0..=15.0, warmest_month_c: -5.0..=25.0 };
const USUAL_MAXIMUM: Usual = Usual { year_c: -20.0..=30.0, warmest_month_c: 0.0..=45.0 };
const USUAL_MEAN: Usual = Usual { year_c: -25.0..=20.0, warmest_month_c: 0.0..=35.0 };

impl Usual {
    fn holds(&self, means: Means) -> bool {
        self.year_c.contains(&means.year_c) && self.warmest_month_c.contains(&means.warmest_month_c)
    }
}

/// A temperature column as it was declared.
#[derive(Debug, Clone)]
struct Temperature {
    key: &'static str,
    unit: TemperatureUnit,
    means: Means,
    usual: Usual,
}

/// The columns of a record as they were declared, with the means that tell whether they were declared well.
#[derive(Debug, Clone)]
pub(super) struct Declared {
    temperatures: Vec<Temperature>,
    unit: DepthUnit,
    gauge: Gauge,
    /// The cells' sum, read as daily amounts, mm a year.
    as_daily_mm: f64,
    /// The sum of all rises from one day to the next, read as a gauge's, mm a year.
    as_accumulating_mm: f64,
    rises: usize,
    falls: usize,
}

impl Declared {
    /// Of a file's days, before anything is taken as missing.
    pub fn of(days: &RawDays, columns: &Columns) -> Self {
        let temperature = |key, column: &TemperatureColumn, cells: &[Option<f64>], usual| {
            means(days.first, cells).map(|means| Temperature { key, unit: column.unit, means, usual })
        };
        let temperatures = match &columns.temperature {
            TemperatureColumns::Extremes { tmin, tmax } => vec![
                temperature("weather.tmin.unit", tmin, &days.tmin_c, USUAL_MINIMUM),
                temperature("weather.tmax.unit", tmax, &days.tmax_c, USUAL_MAXIMUM),
            ],
            TemperatureColumns::MeanAlone(mean) => {
                vec![temperature("weather.tmean.unit", mean, &days.tmin_c, USUAL_MEAN)]
            }
        };
        let cells: Vec<f64> = days
            .gauge_mm
            .iter()
            .flatten()
            .copied()
            .filter(|amount| (0.0..NO_PRECIPITATION_MM).contains(amount))
            .collect();
        let a_year = |sum: f64| sum / cells.len() as f64 * 365.25;
        let steps = || cells.windows(2).map(|pair| pair[1] - pair[0]);
        Self {
            temperatures: temperatures.into_iter().flatten().collect(),
            unit: columns.precipitation.unit,
            gauge: columns.precipitation.gauge,
            as_daily_mm: a_year(cells.iter().sum()),
            as_accumulating_mm: a_year(steps().filter(|step| *step > 0.0).sum()),
            rises: steps().filter(|step| *step > 0.0).count(),
            falls: steps().filter(|step| *step < 0.0).count(),
        }
    }

    /// What is unlikely as it was declared, and as what it would be likely.
    pub fn unlikely(&self) -> Vec<Unlikely> {
        let mut found: Vec<Unlikely> = self.temperatures.iter().filter_map(Temperature::unlikely).collect();
        found.extend(self.precipitation());
        found
    }

    fn precipitation(&self) -> Option<Unlikely> {
        let looks_accumulating = self.rises >= FEWEST_RISES && self.rises > RISES_PER_FALL * self.falls;
        let (amount_mm, other_mm) = match self.gauge {
            Gauge::Daily => (self.as_daily_mm, self.as_accumulating_mm),
            Gauge::Accumulating { .. } => (self.as_accumulating_mm, self.as_daily_mm),
        };
        if self.gauge == Gauge::Daily && looks_accumulating {
            let why = format!(
                "the column rises on {} days and falls on {}, as an accumulating gauge does; read so it would be {other_mm:.0} \
                 mm a year: gauge = \"accumulating\"?",
                self.rises, self.falls
            );
            return Some(Unlikely::new("weather.precipitation.gauge", why));
        }
        let is_likely_daily = USUAL_PRECIPITATION_MM.contains(&other_mm);
        if self.gauge != Gauge::Daily && !looks_accumulating && is_likely_daily && self.rises >= FEWEST_RISES
        {
            let why = format!(
                "the column falls on {} days and rises on {}, as daily amounts do; read so it would be {other_mm:.0} mm a \
                 year: gauge = \"daily\"?",
                self.falls, self.rises
            );
            return Some(Unlikely::new("weather.precipitation.gauge", why));
        }
        if USUAL_PRECIPITATION_MM.contains(&amount_mm) || amount_mm == 0.0 || amount_mm.is_nan() {
            return None;
        }
        let others = DepthUnit::NAMES.iter().filter_map(|(name, unit)| {
            let other_mm = amount_mm / self.unit.to_millimetres(1.0) * unit.to_millimetres(1.0);
            let is_likely = *unit != self.unit && USUAL_PRECIPITATION_MM.contains(&other_mm);
            is_likely.then(|| format!("read as {name} it would be {other_mm:.0} mm"))
        });
        Some(Unlikely::new(
            "weather.precipitation.unit",
            format!("{amount_mm:.0} mm a year{}", suggested(&others.collect::<Vec<_>>())),
        ))
    }
}

impl Temperature {
    fn unlikely(&self) -> Option<Unlikely> {
        if self.usual.holds(self.means) {
            return None;
        }
        let others = TemperatureUnit::NAMES.iter().filter_map(|(name, unit)| {
            let read = |value_c: f64| unit.to_celsius(self.unit.from_celsius(value_c));
            let means =
                Means { year_c: read(self.means.year_c), warmest_month_c: read(self.means.warmest_month_c) };
            let is_likely = *unit != self.unit && self.usual.holds(means);
            is_likely.then(|| format!("read as {name} it would be {}", degrees(means.year_c)))
        });
        let why = format!(
            "the column's mean is {}, {} in its warmest month{}",
            degrees(self.means.year_c),
            degrees(self.means.warmest_month_c),
            suggested(&others.collect::<Vec<_>>())
        );
        Some(Unlikely::new(self.key, why))
    }
}

/// One decimal, and no zero with a minus sign.
fn degrees(value_c: f64) -> String {
    let text = format!("{value_c:.1} degC");
    text.strip_prefix("-0.0").map_or(text.clone(), |rest| format!("0.0{rest}"))
}

fn suggested(others: &[String]) -> String {
    match others {
        [] => ": is its unit right?".to_owned(),
        others => format!("; {}", others.join(", ")),
    }
}

/// The mean over the months' means and the warmest month's, of months that have cells; none where there are no cells.
fn means(first: NaiveDate, cells: &[Option<f64>]) -> Option<Means> {
    let mut sums = [(0.0, 0.0); 12];
    for (date, cell) in first.iter_days().zip(cells) {
        if let Some(value_c) = cell.filter(|value_c| value_c.abs() < NO_TEMPERATURE_C) {
            let (sum, days) = &mut sums[date.month0() as usize];
            *sum += value_c;
            *days += 1.0;
        }
    }
    let months: Vec<f64> =
        sums.iter().filter(|(_, days)| *days > 0.0).map(|(sum, days)| sum / days).collect();
    let warmest_month_c = months.iter().copied().reduce(f64::max)?;
    Some(Means { year_c: months.iter().sum::<f64>() / months.len() as f64, warmest_month_c })
}
