//! Patchy snow against what can be solved in closed form: one snowfall that lies lognormally, melted at an even rate.

use crate::naive::basin_mean;
use chrono::{Datelike, NaiveDate};
use thawline::basin::{Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};
use thawline::perturb::MonthlyChange;
use thawline::snow::{
    DegreeRule, Engine, LaneSpec, Lanes, Patchiness, PhaseRule, SnowOptions, SnowParams, YearBlock,
};
use thawline::weather::{Series, YearSpan};

const SNOWFALL_MM: f64 = 300.0;
const MELT_MM_PER_DAY: f64 = 5.0;
const DAYS: usize = 365;

/// A first day of snow at -10 degC, then days that melt 5 mm each.
fn season() -> Series {
    let first = NaiveDate::from_ymd_opt(2006, 10, 1).expect("a date");
    let from_the_second =
        |first: f64, then: f64| (0..DAYS).map(|day| if day == 0 { first } else { then }).collect();
    Series {
        years: vec![YearSpan { water_year: 2007, first, start: 0, days: DAYS, follows: false }],
        mean_c: from_the_second(-10.0, 1.0),
        half_range_c: vec![0.0; DAYS],
        precipitation_mm: from_the_second(SNOWFALL_MM, 0.0),
        relative_humidity_pct: Vec::new(),
        month: first.iter_days().take(DAYS).map(|date| date.month0() as u8).collect(),
        day_of_year: first.iter_days().take(DAYS).map(|date| date.ordinal() as u16).collect(),
    }
}

/// A basin of two bands, the second with a variation of its own, in so many classes.
fn run(variation: f64, own_variation: Option<f64>, classes: usize) -> (Lanes, YearBlock) {
    let basin = Basin {
        latitude_deg: 45.0,
        bands: Vec::new(),
        temperature: TemperatureGradient::constant(0.0),
        precipitation: PrecipitationGradient::new(0.0, None, GradientForm::Linear),
    };
    let snow = SnowParams {
        rain_snow: PhaseRule::STEP,
        degree_day_factor_lowest: MELT_MM_PER_DAY,
        degree_day_factor_highest: MELT_MM_PER_DAY,
        melt_base_c: 0.0,
        liquid_holding_fraction: 0.0,
        refreeze_fraction: 0.0,
        options: SnowOptions {
            patchiness: Some(Patchiness { coefficient_of_variation: variation, classes }),
            ..SnowOptions::default()
        },
        ..SnowParams::defaults(DegreeRule::Mean, false)
    };
    let spec = |accumulation_variation: Option<f64>, share: f64| LaneSpec {
        basin: &basin,
        station_m: 0.0,
        elevation_m: 0.0,
        ground: Ground { accumulation_variation, ..Ground::default() },
        change: &MonthlyChange::NONE,
        warming_factor: 1.0,
        snow: &snow,
        share,
    };
    let lanes = Lanes::new(&[vec![spec(None, 0.75), spec(own_variation, 0.25)]]);
    let series = season();
    let block = Engine::new(&lanes, true)
        .with_cover()
        .year(series.view(&series.years[0]))
        .expect("a closed ledger")
        .clone();
    (lanes, block)
}

fn normal_below(score: f64) -> f64 {
    0.5 * libm::erfc(-score / std::f64::consts::SQRT_2)
}

/// Of a lognormal depth X of mean S and a coefficient of variation, what is left after a melt of M: the share of the area with
/// at least 1 mm, P(X >= M + 1), and E[max(X - M, 0)].
fn closed_form(variation: f64, melt_mm: f64) -> (f64, f64) {
    let s = libm::sqrt(libm::log(1.0 + variation * variation));
    let score = |depth_mm: f64| libm::log(SNOWFALL_MM / depth_mm) / s;
    let covered = normal_below(score(melt_mm + 1.0) - s / 2.0);
    let left_mm = SNOWFALL_MM * normal_below(score(melt_mm) + s / 2.0)
        - melt_mm * normal_below(score(melt_mm) - s / 2.0);
    (covered, left_mm)
}

/// The largest errors of the covered share and of SWE over the season, of the first band.
fn errors(variation: f64, classes: usize) -> [f64; 2] {
    let (lanes, block) = run(variation, None, classes);
    let column = lanes.column(0, 0);
    let mut largest = [0.0_f64; 2];
    for day in 2..DAYS {
        let (covered, left_mm) = closed_form(variation, (day - 1) as f64 * MELT_MM_PER_DAY);
        let swe_mm = block.swe_mm[day * block.width + column];
        largest[0] = largest[0].max((block.covered_share(day, column).expect("asked for") - covered).abs());
        largest[1] = largest[1].max((swe_mm - left_mm).abs() / SNOWFALL_MM);
    }
    largest
}

/// Classes of equal area part from the closed form by less than 0.7 of a class of cover (an exponential tail is cut at its mean
/// after 0.63 of it), and by less of SWE the more they are. How much less was computed outside: the largest difference over the
/// season in shares of the snowfall, by `scipy.stats.norm` (scipy 1.17.1) from the class means and the closed form; 2e-5 is the
/// rounding of the values.
#[test]
fn classes_converge_to_the_lognormal() {
    const CLASSES: [usize; 6] = [2, 5, 10, 20, 50, 100];
    let of_variations = [
        (0.2, [0.02663, 0.00972, 0.00428, 0.00209, 0.00077, 0.0004]),
        (0.5, [0.08292, 0.03301, 0.0167, 0.00863, 0.00363, 0.00188]),
        (0.9, [0.16075, 0.07467, 0.04208, 0.02359, 0.01093, 0.00607]),
    ];
    for (variation, of_classes) in of_variations {
        for (classes, expected) in CLASSES.into_iter().zip(of_classes) {
            let [covered, swe] = errors(variation, classes);
            assert!(
                covered <= 0.7 / classes as f64,
                "{variation} in {classes} classes: cover off by {covered}"
            );
            assert!((swe - expected).abs() < 2e-5, "{variation} in {classes} classes: SWE off by {swe}");
        }
    }
}

/// A band's own variation replaces the scenario's; the basin's mean is the bands' by area, and each band's snowfall the
/// stated one whatever its variation.
#[test]
fn a_band_has_a_variation_of_its_own() {
    let (lanes, block) = run(0.3, Some(0.8), 20);
    let (alone, other) = (run(0.8, None, 20), run(0.3, Some(0.0), 20));
    let plain = run(0.0, None, 20);
    let [first, second] = [0, 1].map(|band| lanes.column(0, band));
    for day in 0..=DAYS {
        let row = block.row(&block.swe_mm, day);
        let expected = alone.1.row(&alone.1.swe_mm, day)[alone.0.column(0, 0)];
        assert_eq!(row[second].to_bits(), expected.to_bits(), "as if the whole scenario had it");
        let basin = basin_mean(&[row[first], row[second]], &[0.75, 0.25]);
        assert!((row[block.mixes_at] - basin).abs() < 1e-9);
        let even = other.1.row(&other.1.swe_mm, day)[other.0.column(0, 1)];
        assert_eq!(even.to_bits(), plain.1.row(&plain.1.swe_mm, day)[plain.0.column(0, 1)].to_bits());
    }
    for column in [first, second] {
        assert!((block.snow_mm[column] - SNOWFALL_MM).abs() < 1e-9);
    }
}
