//! Random scenarios: a basin, a few years of weather, warming levels and snow parameters, and how to run them through
//! the engine and through the naive loop.

use super::with_options::naive_options;
use crate::naive;
use chrono::{Datelike, NaiveDate};
use proptest::array::uniform12;
use proptest::collection::vec;
use proptest::prelude::*;
use rand::rngs::ChaCha8Rng;
use rand::{RngExt, SeedableRng};
use thawline::basin::{Band, Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::perturb::{MonthlyChange, PrecipitationChange, StatedChange, Warming};
use thawline::snow::{
    DegreeRule, Engine, LaneSpec, Lanes, Path, PhaseRule, SnowOptions, SnowParams, YearBlock,
};
use thawline::weather::{Series, YearSpan};

/// One random study, small enough to run hundreds of.
#[derive(Debug, Clone)]
pub struct Scenario {
    pub basin: Basin,
    pub station_m: f64,
    pub precipitation_pct_per_100m: f64,
    pub precipitation_top_m: Option<f64>,
    pub gradient_form: naive::GradientForm,
    pub levels_c: Vec<f64>,
    pub warming: Warming,
    pub snow: SnowParams,
    pub climate: Climate,
}

/// What the weather of a scenario is drawn from.
#[derive(Debug, Clone)]
pub struct Climate {
    pub seed: u64,
    /// Whether each year follows on the one before; the first never does.
    pub follows: Vec<bool>,
    pub first_water_year: i32,
    pub is_southern: bool,
    pub mean_c: f64,
    pub swing_c: f64,
    pub noise_c: f64,
    pub half_range_c: f64,
    pub wet_chance: f64,
    pub wet_day_mm: f64,
}

prop_compose! {
    fn climates()(
        seed in any::<u64>(),
        follows in vec(prop::bool::weighted(0.8), 2..4),
        first_water_year in 1990..2010,
        is_southern in any::<bool>(),
        mean_c in -6.0..9.0,
        swing_c in 2.0..16.0,
        noise_c in 0.5..6.0,
        half_range_c in 0.0..9.0,
        wet_chance in 0.02..0.7,
        wet_day_mm in 1.0..25.0,
    ) -> Climate {
        Climate {
            seed, follows, first_water_year, is_southern, mean_c, swing_c, noise_c, half_range_c, wet_chance, wet_day_mm,
        }
    }
}

fn phase_rules() -> impl Strategy<Value = PhaseRule> {
    prop_oneof![
        (-4.0..1.5, 0.1..6.0).prop_map(|(snow_only_below_c, width_c)| PhaseRule::Linear {
            snow_only_below_c,
            rain_only_above_c: snow_only_below_c + width_c,
        }),
        (-1.0..3.0).prop_map(|half_snow_at_c| PhaseRule::Step { half_snow_at_c }),
        Just(PhaseRule::Tanh),
    ]
}

prop_compose! {
    fn snow_params()(
        rain_snow in phase_rules(),
        is_diurnal in any::<bool>(),
        lowest in 0.0..4.0,
        more in 0.0..5.0,
        month in 1..=12_u32,
        day in 1..=28_u32,
        melt_base_c in -1.0..2.0,
        liquid_holding_fraction in prop_oneof![Just(0.0), 0.0..0.3],
        refreeze_fraction in prop_oneof![Just(0.0), 0.0..0.6],
    ) -> SnowParams {
        SnowParams {
            rain_snow,
            degree_rule: if is_diurnal { DegreeRule::Diurnal } else { DegreeRule::Mean },
            degree_day_factor_lowest: lowest,
            degree_day_factor_highest: lowest + more,
            highest_on: MonthDay::new(month, day).expect("a day of every year"),
            melt_base_c,
            liquid_holding_fraction,
            refreeze_fraction,
            options: SnowOptions::default(),
        }
    }
}

prop_compose! {
    /// Any scenario: gradients and shapes of their own for every month and for minima and maxima, levels of any sign.
    pub fn scenarios()(
        bands in vec((300.0..4500.0, 0.1..200.0), 1..6),
        station_m in 300.0..3500.0,
        tmin_c_per_km in uniform12(-9.0..1.0),
        tmax_c_per_km in uniform12(-9.0..-2.0),
        precipitation_pct_per_100m in -6.0..12.0,
        precipitation_top_m in prop::option::of(500.0..3500.0),
        levels_c in vec(-3.0..6.0, 1..4),
        tmin_monthly_shape in uniform12(0.2..1.8),
        tmax_monthly_shape in uniform12(0.2..1.8),
        pct_per_c in prop_oneof![Just([0.0; 12]), (-8.0..8.0).prop_map(|pct| [pct; 12]), uniform12(-8.0..8.0)],
        pct_by_level in prop::option::of(vec(uniform12(-40.0..40.0), 1..4)),
        snow in snow_params(),
        climate in climates(),
    ) -> Scenario {
        let bands = bands.into_iter().map(|(elevation_m, area_km2)| Band {
            lower_m: elevation_m - 50.0,
            upper_m: elevation_m + 50.0,
            area_km2,
            elevation_m,
            ground: Ground::default(),
        });
        let precipitation = match pct_by_level {
            None => PrecipitationChange::PctPerC(pct_per_c),
            Some(stated) => PrecipitationChange::PctByLevel(
                levels_c.iter().zip(stated).map(|(level_c, pct)| StatedChange { level_c: *level_c, pct }).collect(),
            ),
        };
        let warming = Warming { tmin_monthly_shape, tmax_monthly_shape, precipitation, ..Warming::default() };
        Scenario {
            basin: Basin {
                latitude_deg: if climate.is_southern { -45.0 } else { 45.0 },
                bands: bands.collect(),
                temperature: TemperatureGradient { tmin_c_per_km, tmax_c_per_km },
                precipitation: PrecipitationGradient::new(precipitation_pct_per_100m, precipitation_top_m, GradientForm::Linear),
            },
            station_m,
            precipitation_pct_per_100m,
            precipitation_top_m,
            gradient_form: naive::GradientForm::Linear,
            levels_c,
            warming,
            snow,
            climate,
        }
    }
}

impl Climate {
    /// The day on which water years start in this hemisphere.
    pub fn start(&self) -> WaterYearStart {
        let month = if self.is_southern { 4 } else { 10 };
        WaterYearStart(MonthDay::new(month, 1).expect("a day of every year"))
    }

    /// Daily weather: a yearly wave with noise, and wet days of random amounts.
    pub fn series(&self) -> Series {
        let mut random = ChaCha8Rng::seed_from_u64(self.seed);
        let mut series = Series::default();
        for (number, follows) in self.follows.iter().enumerate() {
            let water_year = self.first_water_year + number as i32;
            let first = self.start().first_day(water_year);
            let days = self.start().days_in(water_year);
            series.years.push(YearSpan {
                water_year,
                first,
                start: series.mean_c.len(),
                days,
                follows: number > 0 && *follows,
            });
            for date in first.iter_days().take(days) {
                self.push_day(&mut random, date, &mut series);
            }
        }
        series
    }

    fn push_day(&self, random: &mut ChaCha8Rng, date: NaiveDate, series: &mut Series) {
        let coldest_day = if self.is_southern { 196.0 } else { 15.0 };
        let angle = std::f64::consts::TAU * (f64::from(date.ordinal()) - coldest_day) / 365.25;
        let noise_c = self.noise_c * (random.random::<f64>() + random.random::<f64>() - 1.0) * 2.0;
        series.mean_c.push(self.mean_c - self.swing_c * libm::cos(angle) + noise_c);
        series.half_range_c.push(self.half_range_c * random.random::<f64>());
        let is_wet = random.random::<f64>() < self.wet_chance;
        let amount_mm = -self.wet_day_mm * libm::log(1.0 - random.random::<f64>());
        series.precipitation_mm.push(if is_wet { amount_mm } else { 0.0 });
        series.relative_humidity_pct.push(100.0 * random.random::<f64>());
        series.month.push(date.month0() as u8);
        series.day_of_year.push(date.ordinal() as u16);
    }
}

impl Scenario {
    /// Lanes of every level's change, one group a level, bands in the order of the basin.
    pub fn lanes(&self, changes: &[MonthlyChange]) -> Lanes {
        let shares = self.basin.shares();
        let group = |change| {
            let bands = self.basin.bands.iter().zip(&shares);
            bands.map(move |(band, share)| LaneSpec {
                basin: &self.basin,
                station_m: self.station_m,
                elevation_m: band.elevation_m,
                ground: band.ground,
                change,
                warming_factor: self.warming.factor_at(band.elevation_m, &self.basin),
                snow: &self.snow,
                share: *share,
            })
        };
        let groups: Vec<Vec<LaneSpec<'_>>> = changes.iter().map(|change| group(change).collect()).collect();
        Lanes::new(&groups)
    }

    /// The changes of the scenario's levels.
    pub fn changes(&self) -> Vec<MonthlyChange> {
        self.levels_c.iter().map(|level_c| self.warming.at(*level_c)).collect()
    }

    /// Runs the engine with all detail and hands over a copy of every year.
    pub fn run(lanes: &Lanes, series: &Series, path: Path) -> Vec<YearBlock> {
        let mut engine = Engine::on_path(lanes, true, path).with_cover();
        let mut blocks = Vec::new();
        for year in &series.years {
            if !year.follows {
                engine.restart();
            }
            let block = engine.year(series.view(year)).expect("the engine's own ledger is closed");
            blocks.push(block.clone());
        }
        blocks
    }

    /// One band at one level, as the naive loop wants it.
    pub fn naive_band(&self, band: usize, level_c: f64) -> naive::Band {
        naive::Band {
            elevation_m: self.basin.bands[band].elevation_m,
            station_m: self.station_m,
            tmin_gradient_c_per_km: self.basin.temperature.tmin_c_per_km,
            tmax_gradient_c_per_km: self.basin.temperature.tmax_c_per_km,
            precipitation_gradient_per_100m: self.precipitation_pct_per_100m / 100.0,
            precipitation_top_m: self.precipitation_top_m.unwrap_or(1e9),
            level_c,
            tmin_shape: self.warming.tmin_monthly_shape,
            tmax_shape: self.warming.tmax_monthly_shape,
            precipitation_change_pct_per_c: match &self.warming.precipitation {
                PrecipitationChange::PctPerC(pct) => *pct,
                PrecipitationChange::PctByLevel(_) => [0.0; 12],
            },
            precipitation_change_pct: match &self.warming.precipitation {
                PrecipitationChange::PctPerC(_) => None,
                PrecipitationChange::PctByLevel(stated) => Some(
                    stated
                        .iter()
                        .find(|stated| stated.level_c == level_c)
                        .map_or([0.0; 12], |stated| stated.pct),
                ),
            },
            phase: match self.snow.rain_snow {
                PhaseRule::Linear { snow_only_below_c, rain_only_above_c } => {
                    naive::Phase::Linear { snow_c: snow_only_below_c, rain_c: rain_only_above_c }
                }
                PhaseRule::Step { half_snow_at_c } => naive::Phase::Step { threshold_c: half_snow_at_c },
                PhaseRule::Tanh => naive::Phase::Tanh,
                PhaseRule::SCurve { half_snow_at_c, mixed_range_c } => {
                    naive::Phase::SCurve { half_snow_c: half_snow_at_c, mixed_range_c }
                }
            },
            degrees: match self.snow.degree_rule {
                DegreeRule::Mean => naive::Degrees::Mean,
                DegreeRule::Diurnal => naive::Degrees::Diurnal,
            },
            factor_highest: self.snow.degree_day_factor_highest,
            factor_lowest: self.snow.degree_day_factor_lowest,
            highest_on_day: f64::from(self.snow.highest_on.day_of_common_year()),
            melt_base_c: self.snow.melt_base_c,
            refreeze_fraction: self.snow.refreeze_fraction,
            holding_fraction: self.snow.liquid_holding_fraction,
            options: naive_options(self, band),
        }
    }
}

/// Station days as the naive loop wants them, and where it starts on bare ground.
pub fn naive_days(series: &Series, snow: &SnowParams) -> (Vec<naive::Day>, Vec<bool>) {
    let mut starts_bare = vec![false; series.mean_c.len()];
    for year in &series.years {
        starts_bare[year.start] = !year.follows || snow.options.start_bare_each_year;
    }
    let days = (0..series.mean_c.len()).map(|day| naive::Day {
        tmin_c: series.mean_c[day] - series.half_range_c[day],
        tmax_c: series.mean_c[day] + series.half_range_c[day],
        precipitation_mm: series.precipitation_mm[day],
        month: usize::from(series.month[day]) + 1,
        day_of_year: f64::from(series.day_of_year[day]),
        relative_humidity_pct: series.relative_humidity_pct[day],
    });
    (days.collect(), starts_bare)
}
