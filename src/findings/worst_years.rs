//! The record's worst years: how often each would come again under every level.

use super::ranged::{Ranged, bound_of_certain};
use super::resample::{Ranked, Resamples};
use serde::Serialize;

/// Years of the record that are told.
const WORST_YEARS: usize = 3;
/// Years that differ by less are the same, mm.
const ROUNDING_MM: f64 = 1e-6;

/// One of the record's years with least SWE.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct WorstYear {
    /// The water year.
    pub water_year: i32,
    /// Its SWE in the model at the reference, mm.
    pub swe_mm: f64,
    /// Years of the record with as little or less, itself among them: the plain count of which the simulated one is held.
    pub record_years_as_low: usize,
    /// Years of the record.
    pub record_years: usize,
    /// One entry a level.
    pub levels: Vec<ReturnOfYear>,
}

/// How often a year brings as little at one level.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ReturnOfYear {
    /// The level, degC.
    pub level_c: f64,
    /// Simulated years with as little or less.
    pub years_as_low: usize,
    /// Their share.
    pub chance: Ranged,
    /// Where none is, the one-sided 95 % bound on the chance from above, `1 - 0.05^(1/n)` of n realizations; where all are, from
    /// below, `0.05^(1/n)`.
    pub bound: Option<f64>,
    /// One in so many years, 1 over the chance, with the range turned round, its ends no more than the simulated years; none
    /// where no simulated year has as little: rarer than one in all of them.
    pub return_period_years: Option<Ranged>,
}

/// The record's years with least SWE at the reference, each `(water year, mm)`, under every level; years are ranked, a list a
/// level, of so many realizations.
pub(super) fn worst_years(
    record: &[(i32, f64)],
    years: &[Ranked],
    levels_c: &[f64],
    realizations: usize,
    resamples: &Resamples,
) -> Vec<WorstYear> {
    let mut in_order: Vec<(i32, f64)> = record.iter().copied().filter(|(_, mm)| mm.is_finite()).collect();
    in_order.sort_by(|a, b| a.1.total_cmp(&b.1).then(a.0.cmp(&b.0)));
    let of_year = |(water_year, swe_mm): (i32, f64)| WorstYear {
        water_year,
        swe_mm,
        record_years_as_low: in_order.iter().filter(|(_, mm)| *mm <= swe_mm + ROUNDING_MM).count(),
        record_years: in_order.len(),
        levels: levels_c
            .iter()
            .zip(years)
            .map(|(level_c, years)| return_of_year(*level_c, swe_mm, years, realizations, resamples))
            .collect(),
    };
    in_order.iter().copied().take(WORST_YEARS).map(of_year).collect()
}

fn return_of_year(
    level_c: f64,
    swe_mm: f64,
    years: &Ranked,
    realizations: usize,
    resamples: &Resamples,
) -> ReturnOfYear {
    let count = years.values().len();
    let is_as_low = |(mm, _): &&(f64, usize)| *mm <= swe_mm + ROUNDING_MM;
    let as_low = |weights: &[u32]| {
        let low = years.values().iter().take_while(is_as_low);
        low.map(|(_, realization)| weights[*realization] as usize).sum::<usize>()
    };
    let years_as_low = as_low(&vec![1; realizations]);
    let chance = years_as_low as f64 / count as f64;
    let resampled = resamples.each(|weights| Some(as_low(weights) as f64 / count as f64));
    let chance = Ranged::new(chance, resampled);
    let capped = |chance: f64| if chance * count as f64 > 1.0 { 1.0 / chance } else { count as f64 };
    ReturnOfYear {
        level_c,
        years_as_low,
        chance,
        bound: bound_of_certain(chance.value, realizations),
        return_period_years: (years_as_low > 0).then(|| Ranged {
            value: capped(chance.value),
            q05: chance.q95.map(capped),
            q95: chance.q05.map(capped),
        }),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: two years of the record share 4 mm, so that either is one of the two lowest of three; a year without a number
    /// counts nowhere.
    #[test]
    fn years_of_the_record_that_tie_count_alike() {
        let years = [Ranked::new((1..=100_usize).map(|mm| (mm as f64, mm % 20)))];
        let record = [(1999, 4.0), (1977, 9.0), (2015, 4.0), (2001, f64::NAN)];
        let found = worst_years(&record, &years, &[0.0], 20, &Resamples::new(1, 20));
        let told = found.iter().map(|year| (year.water_year, year.record_years_as_low, year.record_years));
        assert_eq!(told.collect::<Vec<_>>(), [(1999, 2, 3), (2015, 2, 3), (1977, 3, 3)]);
    }

    /// By hand: of 1 to 100 mm, 4 lie at or below 4 mm, one in 25 years; none at or below half a millimetre, which is rarer
    /// than one in 100 and has no period. No end of a range goes beyond the 100 years.
    #[test]
    fn return_periods_stop_at_the_simulated_years() {
        let years = [Ranked::new((1..=100_usize).map(|mm| (mm as f64, mm % 20)))];
        let record = [(1999, 80.0), (1977, 0.5), (2015, 4.0), (2001, 90.0)];
        let found = worst_years(&record, &years, &[0.0], 20, &Resamples::new(1, 20));
        assert_eq!(found.iter().map(|year| year.water_year).collect::<Vec<_>>(), [1977, 2015, 1999]);
        let in_the_record = found.iter().map(|year| [year.record_years_as_low, year.record_years]);
        assert_eq!(in_the_record.collect::<Vec<_>>(), [[1, 4], [2, 4], [3, 4]]);
        assert_eq!((found[0].levels[0].return_period_years, found[0].levels[0].years_as_low), (None, 0));
        assert!(found[0].levels[0].bound.is_some());
        let period = found[1].levels[0].return_period_years.unwrap();
        assert!((period.value - 25.0).abs() < 1e-9);
        assert!(period.q05.unwrap() < 25.0 && period.q95.unwrap() > 25.0 && period.q95.unwrap() <= 100.0);
    }
}
