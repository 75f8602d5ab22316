//! A few stated days through the engine.

use super::case::Case;
use chrono::{Datelike, NaiveDate};
use thawline::basin::{Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};
use thawline::calendar::MonthDay;
use thawline::perturb::{MonthlyChange, Warming};
use thawline::snow::{
    ColdContent, DegreeRule, Detail, Engine, LaneSpec, Lanes, PhaseRule, Radiation, SnowOptions, SnowParams,
    YearBlock, mean_degrees,
};
use thawline::weather::{Series, YearSpan};

/// A snow model without a season, without refreezing and holding unless a case states them.
pub fn plain_snow(case: &Case) -> SnowParams {
    let factor: f64 = case.input_or_none("degree_day_factor").unwrap_or(0.0);
    let [snow_c, rain_c] = case.input_or_none("snow_and_rain_c").unwrap_or([0.0, 0.0]);
    let is_diurnal = case.input_or_none::<Vec<f64>>("half_range_c").is_some();
    SnowParams {
        rain_snow: if snow_c < rain_c {
            PhaseRule::Linear { snow_only_below_c: snow_c, rain_only_above_c: rain_c }
        } else {
            PhaseRule::Step { half_snow_at_c: snow_c }
        },
        degree_rule: if is_diurnal { DegreeRule::Diurnal } else { DegreeRule::Mean },
        degree_day_factor_lowest: factor,
        degree_day_factor_highest: factor,
        highest_on: MonthDay::new(6, 21).expect("a day"),
        melt_base_c: case.input_or_none("melt_base_c").unwrap_or(0.0),
        liquid_holding_fraction: case.input_or_none("liquid_holding_fraction").unwrap_or(0.0),
        refreeze_fraction: case.input_or_none("refreeze_fraction").unwrap_or(0.0),
        options: SnowOptions {
            cold_content: case.input_or_none("cold_share").map(|daily_share| ColdContent { daily_share }),
            radiation: case
                .input_or_none("radiation_factor")
                .map(|factor_mm_per_c_day| Radiation { factor_mm_per_c_day }),
            ..SnowOptions::default()
        },
    }
}

/// Level and open ground unless a case states otherwise.
fn ground(case: &Case) -> Ground {
    Ground {
        slope_deg: case.input_or_none("slope_deg").unwrap_or(0.0),
        aspect_deg: case.input_or_none("aspect_deg").unwrap_or(0.0),
        canopy_fraction: case.input_or_none("canopy_fraction").unwrap_or(0.0),
        accumulation_variation: None,
    }
}

/// What a degree melts on stated days of the year, by the ground.
pub fn melt_factors(case: &Case) {
    let (mut basin, snow) = (flat_basin(), plain_snow(case));
    basin.latitude_deg = case.input("latitude_deg");
    let spec = LaneSpec {
        basin: &basin,
        station_m: 0.0,
        elevation_m: 0.0,
        ground: ground(case),
        change: &MonthlyChange::NONE,
        warming_factor: 1.0,
        snow: &snow,
        share: 1.0,
    };
    let lanes = Lanes::new(&[vec![spec]]);
    let days: Vec<u16> = case.input("day_of_year");
    case.check("melt_factor", &days.iter().map(|day| lanes.melt_factors(*day)[0]).collect::<Vec<f64>>());
}

/// One water year that starts on 1 October 2006: first a day at -40 degC that brings `pack_mm` of snow, then the stated
/// days, then cold dry ones to the year's end.
pub fn one_year(pack_mm: f64, mean_c: &[f64], half_range_c: &[f64], precipitation_mm: &[f64]) -> Series {
    const COLD_C: f64 = -40.0;
    const DAYS: usize = 365;
    let first = NaiveDate::from_ymd_opt(2006, 10, 1).expect("a date");
    let stated = |values: &[f64], before: f64, after: f64| {
        let mut column = vec![before];
        column.extend_from_slice(values);
        column.resize(DAYS, after);
        column
    };
    Series {
        years: vec![YearSpan { water_year: 2007, first, start: 0, days: DAYS, follows: false }],
        mean_c: stated(mean_c, COLD_C, COLD_C),
        half_range_c: stated(half_range_c, 0.0, 0.0),
        precipitation_mm: stated(precipitation_mm, pack_mm, 0.0),
        relative_humidity_pct: Vec::new(),
        month: first.iter_days().take(DAYS).map(|date| date.month0() as u8).collect(),
        day_of_year: first.iter_days().take(DAYS).map(|date| date.ordinal() as u16).collect(),
    }
}

/// A basin without gradients.
pub fn flat_basin() -> Basin {
    Basin {
        latitude_deg: 45.0,
        bands: Vec::new(),
        temperature: TemperatureGradient::constant(0.0),
        precipitation: PrecipitationGradient::new(0.0, None, GradientForm::Linear),
    }
}

/// The case's days under a change, at the station itself.
fn run_one_band(case: &Case, change: &MonthlyChange) -> YearBlock {
    let column = |name| case.input_or_none::<Vec<f64>>(name);
    let (mean_c, precipitation_mm) = (column("mean_c"), column("precipitation_mm"));
    let days = mean_c.as_ref().or(precipitation_mm.as_ref()).map_or(0, Vec::len);
    let or_zeros = |column: Option<Vec<f64>>| column.unwrap_or_else(|| vec![0.0; days]);
    let series = one_year(
        case.input_or_none("pack_mm").unwrap_or(0.0),
        &or_zeros(mean_c),
        &or_zeros(column("half_range_c")),
        &or_zeros(precipitation_mm),
    );
    let (basin, snow) = (flat_basin(), plain_snow(case));
    let spec = LaneSpec {
        basin: &basin,
        station_m: 0.0,
        elevation_m: 0.0,
        ground: ground(case),
        change,
        warming_factor: 1.0,
        snow: &snow,
        share: 1.0,
    };
    let lanes = Lanes::new(&[vec![spec]]);
    let mut engine = Engine::new(&lanes, true);
    engine.year(series.view(&series.years[0])).expect("a closed ledger").clone()
}

/// The stated days of one value of a day.
fn stated_days(case: &Case, block: &YearBlock, column: fn(&YearBlock, &Detail, usize) -> f64) -> Vec<f64> {
    let lengths = ["mean_c", "precipitation_mm"]
        .map(|name| case.input_or_none::<Vec<f64>>(name).map(|days| days.len()));
    let days = lengths.into_iter().flatten().next().expect("days are stated");
    let detail = block.detail.as_ref().expect("detail was asked for");
    (1..=days).map(|day| column(block, detail, day)).collect()
}

/// Stated days at one place: what each of them melts, snows and rains, and what is left.
pub fn days(case: &Case) {
    let block = run_one_band(case, &MonthlyChange::NONE);
    let snow_mm = stated_days(case, &block, |block, _, day| block.snow_mm[day * block.width]);
    let rain_mm = stated_days(case, &block, |block, _, day| block.rain_mm[day * block.width]);
    let ice_mm = stated_days(case, &block, |_, detail, day| detail.ice_mm[day * detail.width]);
    let of_detail = |column: fn(&Detail) -> &Vec<f64>| {
        let detail = block.detail.as_ref().expect("detail was asked for");
        (1..=ice_mm.len()).map(|day| column(detail)[day * detail.width]).collect::<Vec<f64>>()
    };
    case.check("melt_mm", &of_detail(|detail| &detail.melt_mm));
    case.check("refreeze_mm", &of_detail(|detail| &detail.refreeze_mm));
    case.check("liquid_mm", &of_detail(|detail| &detail.liquid_mm));
    if case.input_or_none::<f64>("cold_share").is_some() {
        case.check("cold_content_mm", &of_detail(|detail| &detail.cold_mm));
    }
    case.check("snow_mm", &snow_mm);
    case.check("rain_mm", &rain_mm);
    case.check("pack_at_end_mm", &ice_mm[ice_mm.len() - 1..]);
}

/// A factor on precipitation: sums, wet days, spread.
pub fn precipitation_factor(case: &Case) {
    let change = MonthlyChange { precipitation_factor: [case.input("factor"); 12], ..MonthlyChange::NONE };
    let block = run_one_band(case, &change);
    let rain_mm = stated_days(case, &block, |block, _, day| block.rain_mm[day * block.width]);
    let snow_mm = stated_days(case, &block, |block, _, day| block.snow_mm[day * block.width]);
    let fallen: Vec<f64> = rain_mm.iter().zip(&snow_mm).map(|(rain, snow)| rain + snow).collect();
    let (mean, deviation) = mean_and_deviation(&fallen);
    case.check("each_mm", &fallen);
    case.check("sum_mm", &[fallen.iter().sum()]);
    case.check("wet_days", &[fallen.iter().filter(|mm| **mm > 0.0).count() as f64]);
    case.check("variation", &[deviation / mean]);
}

/// A shift of temperature: mean, spread, frost days, degree-days.
pub fn temperature_shift(case: &Case) {
    let block = run_one_band(case, &Warming::default().at(case.input("level_c")));
    let mean_c = stated_days(case, &block, |_, detail, day| detail.mean_c[day * detail.width]);
    let melt_mm = stated_days(case, &block, |_, detail, day| detail.melt_mm[day * detail.width]);
    let (mean, deviation) = mean_and_deviation(&mean_c);
    case.check("mean_c", &[mean]);
    case.check("deviation_c", &[deviation]);
    case.check("frost_days", &[mean_c.iter().filter(|mean| **mean <= 0.0).count() as f64]);
    case.check("degree_days", &[melt_mm.iter().sum()]);
}

/// Positive degrees of the daily mean, averaged over temperatures that are normal: the middle of 20,000 equal steps within
/// eight standard deviations, each by its density.
pub fn normal_days(case: &Case) {
    const STEPS: i32 = 20_000;
    let (means, deviations): (Vec<f64>, Vec<f64>) = (case.input("mean_c"), case.input("deviation_c"));
    let average = |(mean_c, deviation_c): (&f64, &f64)| {
        let (mut degrees, mut weights) = (0.0, 0.0);
        for step in 0..STEPS {
            let score = 16.0 * ((f64::from(step) + 0.5) / f64::from(STEPS) - 0.5);
            let weight = libm::exp(-score * score / 2.0);
            degrees += weight * mean_degrees(mean_c + score * deviation_c, 0.0).0;
            weights += weight;
        }
        degrees / weights
    };
    case.check("degrees_above_c", &means.iter().zip(&deviations).map(average).collect::<Vec<_>>());
}

/// Mean and standard deviation over n.
fn mean_and_deviation(values: &[f64]) -> (f64, f64) {
    let mean = values.iter().sum::<f64>() / values.len() as f64;
    let squares: f64 = values.iter().map(|value| (value - mean) * (value - mean)).sum();
    (mean, (squares / values.len() as f64).sqrt())
}
