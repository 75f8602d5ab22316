//! Whether ranges hold what made the snow, as often as they say.

use super::super::invented::{STATION_M, day, pillow, stated, usual, weather_by};
use super::super::resampled_winters::resampled_winters;
use super::super::search::{Search, search};
use super::super::splits::Winter;
use super::super::{Objective, Parameters, Site, Trial, Trials};
use super::*;
use crate::perturb::search_stream;
use crate::snow::OpenLedger;
use crate::weather::Series;
use rand::RngExt;
use std::time::Instant;

/// A truth that is sought: keys, and shares of their usual bounds.
type Sought = [(&'static str, f64)];

/// What is searched for unless the scenario says otherwise.
const USUAL: &Sought = &[
    ("snow.degree_day_factor_mm_per_c_day.highest", 0.35),
    ("snow.degree_day_factor_mm_per_c_day.lowest", 0.4),
    ("snow.rain_snow.half_snow_at_c", 0.5),
    ("weather.gauge_multiplier.snow", 0.4),
];
const FOUR: &Sought = &[
    ("snow.degree_day_factor_mm_per_c_day.highest", 0.5),
    ("snow.melt_base_c", 0.4),
    ("snow.rain_snow.half_snow_at_c", 0.65),
    ("weather.gauge_multiplier.snow", 0.3),
];
const TWO: &Sought =
    &[("snow.degree_day_factor_mm_per_c_day.highest", 0.5), ("weather.gauge_multiplier.snow", 0.4)];

/// A fit and what is known of its uncertainty.
struct Sample {
    space: Space,
    found: Found,
    of_truth: f64,
    uncertainty: Uncertainty,
    tried: usize,
}

/// What a pillow saw of these parameters: each winter's precipitation off by 8 %, a drift of 12 mm that lasts for weeks, and 3 mm of
/// noise.
fn seen(
    weather: &Series,
    truth: &Parameters,
    mut normal: impl FnMut() -> f64,
) -> crate::observed::Observations {
    const LASTS: f64 = 0.98;
    let mut caught = weather.clone();
    for year in &weather.years {
        let factor = libm::exp(0.08 * normal() - 0.5 * 0.08 * 0.08);
        caught.precipitation_mm[year.start..year.start + year.days].iter_mut().for_each(|mm| *mm *= factor);
    }
    let mut drift_mm = 0.0;
    pillow(&caught, truth, |_, mm| {
        drift_mm = LASTS * drift_mm + 12.0 * (1.0 - LASTS * LASTS).sqrt() * normal();
        if mm > 0.0 { (mm + drift_mm + 3.0 * normal()).max(0.0) } else { 0.0 }
    })
}

fn sample(seed: u64, years: i32, sought: &Sought, evaluations: usize) -> Sample {
    let weather = weather_by(1000 + seed, years);
    let keys: Vec<&str> = sought.iter().map(|(key, _)| *key).collect();
    let space = Space::new(&stated(), &usual(&keys));
    let point: Vec<f64> = sought.iter().map(|(_, share)| *share).collect();
    let mut random = search_stream(5000 + seed, 0);
    let normal = move || score_of(random.random::<f64>().clamp(1e-12, 1.0 - 1e-12));
    let seen = seen(&weather, &space.at(&point), normal);
    let sites = [Site { name: "pillow", elevation_m: STATION_M, observations: &seen }];
    let winter = |year: &crate::weather::YearSpan| Winter {
        water_year: year.water_year,
        mean_c: 0.0,
        cool_season_mm: 0.0,
        is_observed: true,
    };
    let winters: Vec<Winter> = weather.years.iter().map(winter).collect();
    let mut choices = vec![vec![1; winters.len()]];
    choices.extend(resampled_winters(&winters, RESAMPLES, seed));
    let at = (40.0, STATION_M);
    let trials = Trials::new(&sites, &weather, at, day(4, 1), Objective::NashSutcliffe, choices);
    let mut tried = 0;
    let mut values = |asked: &[Asked], choice: fn(usize) -> usize| -> Result<Vec<f64>, OpenLedger> {
        tried += asked.len();
        let trial =
            |asked: &Asked| Trial { parameters: space.at(&asked.point), choice: choice(asked.searcher) };
        trials.values(&asked.iter().map(trial).collect::<Vec<_>>())
    };
    let starts = vec![Some(space.start()), None];
    let plan = Search { seed, starts, dimensions: sought.len(), evaluations };
    let mut found = search(&plan, |asked| values(asked, |_| 0)).expect("ledgers close");
    refine(&mut found, |asked| values(asked, |_| 0)).expect("ledgers close");
    let found = if found[1].value > found[0].value { found.remove(1) } else { found.remove(0) };
    let of_truth = values(&[Asked { searcher: 0, point }], |_| 0).expect("ledgers close")[0];
    let uncertainty = uncertainty(&space, &found, winters.len(), 20, |asked| values(asked, |choice| choice))
        .expect("ledgers close");
    Sample { space, found, of_truth, uncertainty, tried }
}

/// Ranges that hold the truth, of each parameter, and their mean length as a share of the bounds; told as they are counted.
#[allow(clippy::print_stdout, reason = "the count that takes minutes is run to be read")]
fn coverage(seeds: u64, years: i32, sought: &Sought, evaluations: usize) -> Vec<(usize, f64)> {
    let began = Instant::now();
    let (mut tried, mut below_truth) = (0, 0);
    let mut covered = vec![(0, 0.0); sought.len()];
    for seed in 0..seeds {
        let sample = sample(seed, years, sought, evaluations);
        tried += sample.tried;
        below_truth += usize::from(sample.found.value < sample.of_truth);
        let ranges = sample.uncertainty.ranges.iter().zip(sample.space.searched());
        for (((held, length), (_, share)), (range, bounded)) in covered.iter_mut().zip(sought).zip(ranges) {
            let [low, high] = bounded.bounds;
            let truth = bounded.value(*share);
            *held += usize::from((range.low..=range.high).contains(&truth));
            *length += (range.high - range.low) / (high - low) / seeds as f64;
        }
    }
    let seconds = began.elapsed().as_secs_f64();
    println!(
        "{seeds} records of {years} winters, {tried} sets tried, {:.0} a second; {below_truth} fits below the truth's own objective",
        tried as f64 / seconds
    );
    for ((key, _), (held, length)) in sought.iter().zip(&covered) {
        let share = 100.0 * *held as f64 / seeds as f64;
        println!("{key}: {share:.1} % hold the truth; {length:.3} of the bounds long");
    }
    covered
}

/// A small version of the counts below: of ten ranges of 90 %, nine hold the truth in the mean, and fewer than seven with a
/// chance of 1.3 % (binomial); and they tell something. Sets lie within the ranges, the best first, and none twice.
#[test]
fn ranges_hold_the_truth() {
    let covered = coverage(5, 10, TWO, 60);
    assert!(covered.iter().map(|(held, _)| held).sum::<usize>() >= 7, "{covered:?}");
    assert!(covered.iter().all(|(_, length)| (0.02..0.6).contains(length)), "{covered:?}");

    let Sample { space, found, uncertainty, .. } = sample(7, 10, TWO, 60);
    let Uncertainty { ranges, sets, .. } = uncertainty;
    assert_eq!(sets.len(), 20);
    assert_eq!(sets[0].values, space.values(&space.at(&found.point)));
    assert!(sets.iter().all(|set| set.objective <= sets[0].objective + 1e-9));
    for (at, set) in sets.iter().enumerate() {
        assert!(sets[..at].iter().all(|other| other.values != set.values));
        for (value, range) in set.values.iter().zip(&ranges) {
            assert_eq!(value.key, range.key);
            let reach = 1e-9 * (range.high - range.low);
            assert!((range.low - reach..=range.high + reach).contains(&value.value), "{set:?}");
        }
    }
}

/// Over 200 records of 20 winters, of every parameter: at least 160 hold the truth. That is less than the 170 of what might be
/// called an interval of 90 %; the count is what the page and the guide quote. Takes minutes: `cargo test --release --lib count_ranges -- --ignored --nocapture`.
#[test]
#[ignore = "takes minutes"]
fn count_ranges_that_hold_the_truth() {
    for sought in [USUAL, FOUR] {
        for ((held, _), (key, _)) in coverage(200, 20, sought, 300).iter().zip(sought) {
            assert!((160..=190).contains(held), "{key}: {held} of 200");
        }
    }
}

/// By hand: ends 0.9 and 1 of all resamples above a best of 0.5 leave it at the lower end.
#[test]
fn the_best_lies_in_its_range() {
    let found = |share: f64| Found { point: vec![share], value: 0.0 };
    let shares: Vec<Found> = (0..99).map(|at| found(0.9 + 0.001 * f64::from(at))).collect();
    assert_eq!(ends(&shares, 0, 0.5, 1.5), [0.5, 1.0]);
}

/// What is counted as the usual parameters are they.
#[test]
fn the_usual_parameters_are_counted() {
    let usual = super::super::PARAMETERS.iter().filter(|parameter| parameter.is_usual);
    let has_value =
        usual.filter(|parameter| parameter.get(&stated()).is_some()).map(|parameter| parameter.key);
    assert_eq!(has_value.collect::<Vec<_>>(), USUAL.iter().map(|(key, _)| *key).collect::<Vec<_>>());
}

/// By hand: 20 winters and 5 parameters leave 15: sqrt(20/15) times t of 15 degrees of freedom, 1.7531, over the normal score, 1.6449
/// (tables, from memory).
#[test]
fn few_winters_draw_ranges_out() {
    let expected = (20.0_f64 / 15.0).sqrt() * 1.7531 / 1.6449;
    assert!((drawn_out(20, 5) - expected).abs() < 1e-3, "{}", drawn_out(20, 5));
    assert!(drawn_out(6, 5) > drawn_out(20, 5) && drawn_out(400, 5) < 1.02);
}
