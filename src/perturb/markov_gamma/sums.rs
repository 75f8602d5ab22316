//! What the parts of a year come to: the totals and means that the nesting works on.

use super::common_year::CommonYear;
use super::daily::DrawnDay;
use super::record_days::RecordDays;

/// A part of a generated year before nesting.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct DrawnPart {
    /// Sum of what lies above the wet-day threshold, mm.
    pub excess_mm: f64,
    /// Wet days.
    pub wet_days: f64,
    /// Sum of the usual temperatures, degC.
    pub usual_c: f64,
    /// Sum of the departures from them, degC.
    pub departure_c: f64,
    /// Sums of the squares of both, degC2.
    pub squares_c2: [f64; 2],
}

impl DrawnPart {
    /// Adds a day.
    pub fn add(&mut self, day: &DrawnDay) {
        if let Some(excess_mm) = day.excess_mm {
            self.excess_mm += excess_mm;
            self.wet_days += 1.0;
        }
        self.usual_c += day.usual_c;
        self.departure_c += day.departure_c;
        self.squares_c2[0] += day.usual_c * day.usual_c;
        self.squares_c2[1] += day.departure_c * day.departure_c;
    }
}

/// A part of a year as the record has it.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct RecordPart {
    /// Precipitation, mm.
    pub precipitation_mm: f64,
    /// Mean temperature, degC.
    pub mean_c: f64,
    /// Variance of the daily means about it, degC2.
    pub variance_c2: f64,
}

/// The record's parts, `[year][part]`.
pub fn record_parts(record: &RecordDays, year: &CommonYear) -> Vec<Vec<RecordPart>> {
    let days_of_a_year = year.month.len();
    let of_year = |days: &[super::record_days::RecordDay]| {
        let mut parts = vec![RecordPart::default(); year.parts.len()];
        for day in days {
            let part = &mut parts[year.part[day.place]];
            part.precipitation_mm += day.precipitation_mm;
            part.mean_c += day.temperature[0];
        }
        for (part, (days, _)) in parts.iter_mut().zip(&year.parts) {
            part.mean_c /= *days as f64;
        }
        for day in days {
            let at = year.part[day.place];
            let part = &mut parts[at];
            let apart = day.temperature[0] - part.mean_c;
            part.variance_c2 += apart * apart / year.parts[at].0 as f64;
        }
        parts
    };
    record.days.chunks(days_of_a_year).map(of_year).collect()
}
