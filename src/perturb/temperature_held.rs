//! Realizations whose mean temperature of every month is held at the record's (method, section 10).

use super::Generator;
use crate::weather::Series;

/// Another generator's realizations, their temperatures shifted by one number a calendar month so that the month's mean
/// over all their years is the record's. Precipitation, the daily range, and how warm one year is against the next stay.
///
/// What then differs between realizations is precipitation's doing, and not that a realization happened to draw warm
/// years.
pub struct TemperatureHeld<'g> {
    generator: &'g dyn Generator,
    record_c: [Option<f64>; 12],
}

impl<'g> TemperatureHeld<'g> {
    /// Holds a generator's temperatures at those of the record that it was made from.
    pub fn new(generator: &'g dyn Generator, record: &Series) -> Self {
        Self { generator, record_c: monthly_means_c(record) }
    }
}

impl Generator for TemperatureHeld<'_> {
    fn fill(&self, realization: u32, years: usize, into: &mut Series) {
        self.generator.fill(realization, years, into);
        let own_c = monthly_means_c(into);
        let mut shift_c = [0.0; 12];
        for (shift_c, (record_c, own_c)) in shift_c.iter_mut().zip(self.record_c.iter().zip(own_c)) {
            if let (Some(record_c), Some(own_c)) = (record_c, own_c) {
                *shift_c = record_c - own_c;
            }
        }
        for (mean_c, month) in into.mean_c.iter_mut().zip(&into.month) {
            *mean_c += shift_c[usize::from(*month)];
        }
    }
}

/// Mean temperature of each calendar month over all days of a series, degC; none where it has no such month.
fn monthly_means_c(series: &Series) -> [Option<f64>; 12] {
    let mut sums = [(0.0, 0.0); 12];
    for (mean_c, month) in series.mean_c.iter().zip(&series.month) {
        let (sum, days) = &mut sums[usize::from(*month)];
        *sum += mean_c;
        *days += 1.0;
    }
    sums.map(|(sum, days)| (days > 0.0).then(|| sum / days))
}
