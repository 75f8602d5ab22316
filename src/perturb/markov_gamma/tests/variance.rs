//! How much seasons and years vary, and with what.

use super::super::MarkovGamma;
use super::super::daily::Walk;
use super::made::Made;
use super::{drawn, recipe};
use crate::weather::Series;
use rand::SeedableRng;
use rand::rngs::ChaCha8Rng;

const YEARS: usize = 40;
const REALIZATIONS: u32 = 200;

/// A record whose years vary much more than a chain of days would have it.
fn record() -> Series {
    Made {
        years: YEARS,
        starts: recipe().water_year_starts,
        seed: 7,
        yearly: [0.3, 1.0],
        dry_months: [false; 12],
    }
    .record()
}

/// Precipitation and mean temperature of the months from October to March, then of whole water years: `[measure][year]`.
fn seasons(series: &Series) -> [Vec<f64>; 4] {
    let mut measures: [Vec<f64>; 4] = Default::default();
    for year in &series.years {
        let view = series.view(year);
        let (mut sums, mut days) = ([0.0; 4], [0.0; 2]);
        for (at, month) in view.month.iter().enumerate() {
            let is_cool = !(3..9).contains(month);
            for season in (0..2).filter(|season| *season == 1 || is_cool) {
                sums[2 * season] += view.precipitation_mm[at];
                sums[2 * season + 1] += view.mean_c[at];
                days[season] += 1.0;
            }
        }
        for (at, measure) in measures.iter_mut().enumerate() {
            measure.push(if at % 2 == 0 { sums[at] } else { sums[at] / days[at / 2] });
        }
    }
    measures
}

fn mean(values: &[f64]) -> f64 {
    values.iter().sum::<f64>() / values.len() as f64
}

fn covariance(a: &[f64], b: &[f64]) -> f64 {
    let (of_a, of_b) = (mean(a), mean(b));
    a.iter().zip(b).map(|(a, b)| (a - of_a) * (b - of_b)).sum::<f64>() / (a.len() - 1) as f64
}

fn deviation(values: &[f64]) -> f64 {
    libm::sqrt(covariance(values, values))
}

/// What the numbers of a series are.
const NAMES: [&str; 14] = [
    "mean of cool-season precipitation",
    "mean of cool-season temperature",
    "mean of precipitation",
    "mean of temperature",
    "deviation of cool-season precipitation",
    "deviation of cool-season temperature",
    "deviation of precipitation",
    "deviation of temperature",
    "lag 1 of cool-season precipitation",
    "lag 1 of cool-season temperature",
    "lag 1 of precipitation",
    "lag 1 of temperature",
    "cool-season precipitation with temperature",
    "precipitation with temperature",
];

/// The numbers of a series: means, standard deviations and lag-1 correlations of the four measures; then both correlations
/// of precipitation with temperature.
fn numbers(series: &Series) -> Vec<f64> {
    let measures = seasons(series);
    let lag_one = |of: &Vec<f64>| {
        let (later, earlier) = (&of[1..], &of[..of.len() - 1]);
        covariance(later, earlier) / (deviation(later) * deviation(earlier))
    };
    let tie = |a: &[f64], b: &[f64]| covariance(a, b) / (deviation(a) * deviation(b));
    let mut numbers: Vec<f64> = measures.iter().map(|of| mean(of)).collect();
    numbers.extend(measures.iter().map(|of| deviation(of)));
    numbers.extend(measures.iter().map(lag_one));
    numbers.extend([tie(&measures[0], &measures[1]), tie(&measures[2], &measures[3])]);
    numbers
}

/// 200 realizations of the record's length centre on the record, though their years vary nearly twice as much as a chain of
/// days would have it, and each remembers the year before.
///
/// What is allowed is three standard errors of the 8000 years drawn and of the 2000 years by which the nesting knows its
/// own chain, whose years count for fewer as they remember each other (1 + 2 r/(1-r), about 2): of means `3 sqrt(2/2000 +
/// 2/8000)` = 0.11 standard deviations; of standard deviations `3 sqrt(1.3/4000 + 1.3/16000)` = 6 %, and 2 % by which 40
/// years that remember each other show less than their own; of correlations 0.1, their bias in 40 years among it.
#[test]
fn realizations_centre_on_the_record() {
    let record = record();
    let generator = MarkovGamma::fit(&record, &recipe());
    let expected = numbers(&record);
    let all: Vec<Vec<f64>> =
        (0..REALIZATIONS).map(|number| numbers(&drawn(&generator, number, YEARS))).collect();
    let mut off = Vec::new();
    for (at, name) in NAMES.iter().enumerate() {
        let values: Vec<f64> = all.iter().map(|of| of[at]).collect();
        let allowed = match at {
            0..4 => 0.11 * expected[at + 4],
            4..8 => 0.08 * expected[at],
            _ => 0.1,
        };
        let found = mean(&values);
        if (found - expected[at]).abs() > allowed {
            off.push(format!("{name}: {found:.4} for {:.4}, allowed {allowed:.4}", expected[at]));
        }
    }
    assert!(off.is_empty(), "{off:#?}");
}

/// WG-08 (Katz & Parlange 1998, J. Climate 11:591): chains of days underestimate how much seasons vary from year to year;
/// nesting gives it back. Of 2000 years the standard deviations of cool seasons and water years are 0.9 to 1.1 of the
/// record's, and those of the same chain before nesting less than 0.7.
#[test]
fn nesting_gives_years_their_variance_back() {
    let record = record();
    let generator = MarkovGamma::fit(&record, &recipe());
    let nested = drawn(&generator, 0, 2000);
    let mut chain = nested.clone();
    let (mut walk, mut random) = (Walk::START, ChaCha8Rng::seed_from_u64(1));
    for day in 0..chain.mean_c.len() {
        let of_day = generator.daily.next(&mut walk, day % 365, &mut random);
        chain.mean_c[day] = of_day.usual_c + of_day.departure_c;
        chain.precipitation_mm[day] = of_day.excess_mm.map_or(0.0, |mm| mm + generator.daily.wet_above_mm);
    }
    let of_record = seasons(&record);
    let ratio = |series: &Series| -> Vec<f64> {
        seasons(series).iter().zip(&of_record).map(|(of, record)| deviation(of) / deviation(record)).collect()
    };
    let (with, without) = (ratio(&nested), ratio(&chain));
    assert!(with.iter().all(|ratio| (0.9..=1.1).contains(ratio)), "{with:?}");
    assert!(without.iter().all(|ratio| *ratio < 0.7), "{without:?}");
}
