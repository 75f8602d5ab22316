//! Is the record what it is said to be? Means that a mistyped unit, gauge or hemisphere would spoil.

use super::record::Record;
use crate::calendar::MONTHS;
use crate::fault::Unlikely;
use serde::Serialize;

/// Means of a record's usable years.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Means {
    /// Mean temperature of each month, January first, degC.
    pub month_c: [f64; 12],
    /// Mean temperature of all days, degC.
    pub year_c: f64,
    /// Precipitation of a year as the gauge caught it, mm.
    pub precipitation_mm: f64,
}

/// Of fewer water years than this the chance of the weather is hardly known.
const FEW_YEARS: usize = 10;
/// Noise of a gauge above this share of what it caught is no noise.
const MOST_NOISE: f64 = 0.1;

impl Record {
    /// Means of the usable years.
    pub fn means(&self) -> Means {
        let series = &self.series;
        let mut sums = [(0.0, 0.0); 12];
        for (month, mean_c) in series.month.iter().zip(&series.mean_c) {
            let (sum, days) = &mut sums[usize::from(*month)];
            *sum += mean_c;
            *days += 1.0;
        }
        Means {
            month_c: sums.map(|(sum, days)| sum / days),
            year_c: series.mean_c.iter().sum::<f64>() / series.mean_c.len() as f64,
            precipitation_mm: series.precipitation_mm.iter().sum::<f64>() / series.years.len() as f64,
        }
    }

    /// What about the record is unlikely; the limits are common practice.
    pub fn unlikely(&self, is_southern: bool) -> Vec<Unlikely> {
        let means = self.means();
        let mut found = self.declared.unlikely();
        let mut say = |about: &str, why: String| found.push(Unlikely::new(about, why));
        match self.series.years.len() {
            1 => say(
                "weather.file",
                "one water year is in use, so every realization is that year over and over and chance has no spread"
                    .to_owned(),
            ),
            few if few < FEW_YEARS => say(
                "weather.file",
                format!("only {few} water years are in use: the spread of realizations hardly holds what chance can do"),
            ),
            _ => {}
        }
        if let Some(gauge) = self.counts.gauge
            && gauge.small_falls_mm > MOST_NOISE * means.precipitation_mm * self.series.years.len() as f64
        {
            let falls = gauge.small_falls_mm;
            say(
                "weather.precipitation",
                format!(
                    "{falls:.0} mm of small falls taken for noise: does the gauge accumulate, and in this unit?"
                ),
            );
        }
        let coldest = (0..12).min_by(|a, b| means.month_c[*a].total_cmp(&means.month_c[*b])).unwrap_or(0);
        let is_cold_in_south = (4..=8).contains(&coldest);
        let is_cold_in_north = !(2..=9).contains(&coldest);
        if if is_southern { !is_cold_in_south } else { !is_cold_in_north } {
            say(
                "basin.latitude_deg",
                format!("{} is the coldest month: is the sign of the latitude right?", MONTHS[coldest]),
            );
        }
        found.extend(
            self.suspicions
                .iter()
                .filter(|it| !it.is_as_asked)
                .map(|it| Unlikely::new(it.about, it.to_string())),
        );
        found
    }
}
