//! The engine's rows against the naive loop: 60 and 64 lanes, 30 years, diurnal degrees, linear phase, the weather of a
//! mountain station whose low bands are bare for half the year.
//!
//! Both sides fill the same six tables of a year (SWE, net melt, outflow, bare-ground rain, rain, snowfall); the engine
//! also makes the basin means and closes its ledgers. `cargo bench` prints lane-days per second and, at the end, their ratio,
//! and what part of a run's time it takes to generate its weather.

#[path = "../naive/mod.rs"]
#[allow(dead_code, reason = "the tests use the rest of it")]
mod naive;

mod generating;

use chrono::{Datelike, NaiveDate};
use divan::Bencher;
use divan::counter::ItemsCount;
use rand::rngs::ChaCha8Rng;
use rand::{RngExt, SeedableRng};
use std::hint::black_box;
use std::time::Instant;
use thawline::basin::{Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};
use thawline::perturb::{MonthlyChange, Warming};
use thawline::snow::{DegreeRule, Engine, LaneSpec, Lanes, PhaseRule, SnowParams};
use thawline::weather::{Series, YearSpan};

const YEARS: i32 = 30;
const STATION_M: f64 = 2000.0;
const LAPSE_C_PER_KM: f64 = -6.0;
const PRECIPITATION_PCT_PER_100M: f64 = 4.0;
/// Bands and levels of a case; their product is its lanes.
const CASES: [(usize, usize); 2] = [(10, 6), (8, 8)];

fn main() {
    divan::main();
    if !std::env::args().any(|argument| argument == "--test" || argument == "--list") {
        print_ratios();
        generating::print_share();
    }
}

#[divan::bench(args = CASES, sample_count = 20)]
fn rows(bencher: Bencher<'_, '_>, (bands, levels): (usize, usize)) {
    let case = Bench::new(bands, levels);
    let lanes = case.lanes();
    let mut engine = Engine::new(&lanes, false);
    bencher.counter(ItemsCount::new(case.lane_days())).bench_local(|| case.run_rows(&mut engine));
}

#[divan::bench(args = CASES, sample_count = 20)]
fn naive_loop(bencher: Bencher<'_, '_>, (bands, levels): (usize, usize)) {
    let case = Bench::new(bands, levels);
    let (bands, days) = (case.naive_bands(), case.naive_days());
    bencher.counter(ItemsCount::new(case.lane_days())).bench_local(|| run_naive(&bands, &days));
}

/// The best of several alternating runs of each: what disturbs a run only ever slows it down.
fn print_ratios() {
    println!();
    for (bands, levels) in CASES {
        let case = Bench::new(bands, levels);
        let lanes = case.lanes();
        let mut engine = Engine::new(&lanes, false);
        let (naive_bands, days) = (case.naive_bands(), case.naive_days());
        let (mut rows, mut naive) = (f64::INFINITY, f64::INFINITY);
        for _ in 0..60 {
            rows = rows.min(seconds(|| case.run_rows(&mut engine)));
            naive = naive.min(seconds(|| run_naive(&naive_bands, &days)));
        }
        let millions = |seconds: f64| case.lane_days() as f64 / seconds / 1e6;
        println!(
            "{} lanes: rows {:.0} M lane-days/s, naive loop {:.0} M lane-days/s, ratio {:.2} (at least 6 is wanted); {:.0} % of lane-days bare",
            bands * levels,
            millions(rows),
            millions(naive),
            naive / rows,
            100.0 * case.bare_share(&mut engine),
        );
    }
}

fn seconds(mut work: impl FnMut() -> f64) -> f64 {
    let start = Instant::now();
    black_box(work());
    start.elapsed().as_secs_f64()
}

/// A basin of bands at several levels, and 30 years of weather.
struct Bench {
    basin: Basin,
    elevations_m: Vec<f64>,
    levels_c: Vec<f64>,
    changes: Vec<MonthlyChange>,
    snow: SnowParams,
    series: Series,
}

impl Bench {
    fn new(bands: usize, levels: usize) -> Self {
        let levels_c: Vec<f64> = (0..levels).map(|level| level as f64 * 0.5).collect();
        Self {
            basin: Basin {
                latitude_deg: 45.0,
                bands: Vec::new(),
                temperature: TemperatureGradient::constant(LAPSE_C_PER_KM),
                precipitation: PrecipitationGradient::new(
                    PRECIPITATION_PCT_PER_100M,
                    None,
                    GradientForm::Linear,
                ),
            },
            elevations_m: (0..bands)
                .map(|band| 1500.0 + 1500.0 * (band as f64 + 0.5) / bands as f64)
                .collect(),
            changes: levels_c.iter().map(|level| Warming::default().at(*level)).collect(),
            levels_c,
            snow: SnowParams::defaults(DegreeRule::Diurnal, false),
            series: mountain_weather(),
        }
    }

    fn lane_days(&self) -> usize {
        self.series.mean_c.len() * self.elevations_m.len() * self.levels_c.len()
    }

    fn lanes(&self) -> Lanes {
        let group = |change| {
            let specs = self.elevations_m.iter().map(|elevation_m| LaneSpec {
                basin: &self.basin,
                station_m: STATION_M,
                elevation_m: *elevation_m,
                ground: Ground::default(),
                change,
                warming_factor: 1.0,
                snow: &self.snow,
                share: 1.0 / self.elevations_m.len() as f64,
            });
            specs.collect::<Vec<_>>()
        };
        Lanes::new(&self.changes.iter().map(group).collect::<Vec<_>>())
    }

    fn run_rows(&self, engine: &mut Engine<'_>) -> f64 {
        engine.restart();
        let mut seen = 0.0;
        for year in &self.series.years {
            let block = engine.year(self.series.view(year)).expect("a closed ledger");
            seen += block.swe_mm[block.days * block.width - 1];
        }
        seen
    }

    /// Share of the lane-days that begin without snow.
    fn bare_share(&self, engine: &mut Engine<'_>) -> f64 {
        engine.restart();
        let (mut bare, lanes) = (0, self.elevations_m.len() * self.levels_c.len());
        for year in &self.series.years {
            let block = engine.year(self.series.view(year)).expect("a closed ledger");
            for day in 0..block.days {
                let row = &block.row(&block.swe_mm, day)[..lanes];
                bare += row.iter().filter(|swe| **swe == 0.0).count();
            }
        }
        bare as f64 / self.lane_days() as f64
    }

    fn naive_bands(&self) -> Vec<naive::Band> {
        let PhaseRule::Linear { snow_only_below_c, rain_only_above_c } = self.snow.rain_snow else {
            panic!("the default phase rule is linear");
        };
        let band = |level_c: f64, elevation_m: f64| naive::Band {
            elevation_m,
            station_m: STATION_M,
            tmin_gradient_c_per_km: [LAPSE_C_PER_KM; 12],
            tmax_gradient_c_per_km: [LAPSE_C_PER_KM; 12],
            precipitation_gradient_per_100m: PRECIPITATION_PCT_PER_100M / 100.0,
            precipitation_top_m: 1e9,
            level_c,
            tmin_shape: [1.0; 12],
            tmax_shape: [1.0; 12],
            precipitation_change_pct_per_c: [0.0; 12],
            precipitation_change_pct: None,
            phase: naive::Phase::Linear { snow_c: snow_only_below_c, rain_c: rain_only_above_c },
            degrees: naive::Degrees::Diurnal,
            factor_highest: self.snow.degree_day_factor_highest,
            factor_lowest: self.snow.degree_day_factor_lowest,
            highest_on_day: f64::from(self.snow.highest_on.day_of_common_year()),
            melt_base_c: self.snow.melt_base_c,
            refreeze_fraction: self.snow.refreeze_fraction,
            holding_fraction: self.snow.liquid_holding_fraction,
            options: naive::Options::default(),
        };
        let at_level = |level_c: &f64| {
            let level_c = *level_c;
            self.elevations_m.iter().map(move |elevation_m| band(level_c, *elevation_m))
        };
        self.levels_c.iter().flat_map(at_level).collect()
    }

    fn naive_days(&self) -> Vec<naive::Day> {
        let series = &self.series;
        let day = |day: usize| naive::Day {
            tmin_c: series.mean_c[day] - series.half_range_c[day],
            tmax_c: series.mean_c[day] + series.half_range_c[day],
            precipitation_mm: series.precipitation_mm[day],
            month: usize::from(series.month[day]) + 1,
            day_of_year: f64::from(series.day_of_year[day]),
            relative_humidity_pct: 100.0,
        };
        (0..series.mean_c.len()).map(day).collect()
    }
}

/// One band at a time, one day at a time, into the same tables that a year block has. Each band's degree-day factors are
/// worked out once, so that the loop is not slowed by a cosine that nobody would leave in it.
fn run_naive(bands: &[naive::Band], days: &[naive::Day]) -> f64 {
    const DAYS: usize = 366;
    let [mut swe, mut net_melt, mut outflow, mut bare, mut rain, mut snow] = [[0.0; DAYS]; 6];
    let mut seen = 0.0;
    for band in bands {
        let mut pack = naive::Pack::default();
        let factors: Vec<f64> =
            (1..=366_u16).map(|day| naive::degree_day_factor(band, f64::from(day))).collect();
        for (number, weather) in days.iter().enumerate() {
            let factor = factors[weather.day_of_year as usize - 1];
            let terms = naive::Terms { factor, radiation: 0.0, snowfall: 1.0 };
            let result = naive::day(band, terms, pack, *weather);
            pack = naive::Pack { ice_mm: result.ice_mm, liquid_mm: result.liquid_mm, cold_mm: 0.0 };
            let at = number % DAYS;
            swe[at] = result.swe_mm;
            net_melt[at] = result.melt_mm - result.refreeze_mm;
            outflow[at] = result.outflow_mm;
            bare[at] = result.bare_ground_rain_mm;
            rain[at] = result.rain_mm;
            snow[at] = result.snow_mm;
        }
        let tables = black_box([&swe, &net_melt, &outflow, &bare, &rain, &snow]);
        seen += tables[0][0] + pack.ice_mm + pack.liquid_mm;
    }
    seen
}

/// Weather like that of a mountain station at 2000 m: 3.5 degC over the year, 9 degC between seasons, a daily range of
/// about 12 degC, and rather more than a third of the days wet, fewer in summer.
fn mountain_weather() -> Series {
    let mut random = ChaCha8Rng::seed_from_u64(1);
    let mut series = Series::default();
    let mut lasting_c = 0.0;
    for water_year in 1991..1991 + YEARS {
        let october = |year| NaiveDate::from_ymd_opt(year, 10, 1).expect("a date");
        let (first, end) = (october(water_year - 1), october(water_year));
        let days = usize::try_from((end - first).num_days()).expect("a year's days");
        series.years.push(YearSpan { water_year, first, start: series.mean_c.len(), days, follows: true });
        for date in first.iter_days().take(days) {
            let warmth = -libm::cos(std::f64::consts::TAU * (f64::from(date.ordinal()) - 20.0) / 365.25);
            lasting_c = 0.7 * lasting_c + 4.0 * (random.random::<f64>() + random.random::<f64>() - 1.0);
            let is_wet = random.random::<f64>() < 0.38 - 0.14 * warmth;
            let amount_mm = -9.0 * libm::log(1.0 - random.random::<f64>());
            series.mean_c.push(3.5 + 9.0 * warmth + lasting_c);
            series.half_range_c.push(4.0 + 4.0 * random.random::<f64>());
            series.precipitation_mm.push(if is_wet { amount_mm } else { 0.0 });
            series.month.push(date.month0() as u8);
            series.day_of_year.push(date.ordinal() as u16);
        }
    }
    series
}
