//! A year whose temperature is a cosine and whose precipitation never changes: peak and melt-out have closed forms.

use super::case::Case;
use super::days::{flat_basin, plain_snow};
use chrono::{Datelike, NaiveDate};
use thawline::basin::Ground;
use thawline::calendar::{MonthDay, WaterYearStart, date_of};
use thawline::perturb::{MonthlyChange, Warming};
use thawline::season::{Measures, SeasonSettings};
use thawline::snow::{Engine, LaneSpec, Lanes, RAIN_MELT_PER_MM_C, SnowParams};
use thawline::weather::{Series, YearSpan};

/// The year's first day lies this many days before the coldest instant, in the middle of summer.
const DAYS_BEFORE_COLDEST: usize = 183;
const DAYS: usize = 365;

fn first_day() -> NaiveDate {
    NaiveDate::from_ymd_opt(2006, 10, 1).expect("a date")
}

/// The case's cosine year, sampled in the middle of each day, and its snow.
///
/// The closed forms know no melt by rain. Rain falls at the same rate on every warm day, so that its melt is a fixed
/// part of the degree-day factor, and is taken off it here.
pub fn snow_and_weather(case: &Case) -> (SnowParams, Series) {
    let (mean_c, swing_c): (f64, f64) = (case.input("yearly_mean_c"), case.input("swing_c"));
    let precipitation_mm: f64 = case.input("precipitation_mm_per_day");
    let mut snow = plain_snow(case);
    snow.degree_day_factor_highest -= RAIN_MELT_PER_MM_C * precipitation_mm;
    snow.degree_day_factor_lowest = snow.degree_day_factor_highest;
    let temperature = |day: usize| {
        let days_after_coldest = day as f64 + 0.5 - DAYS_BEFORE_COLDEST as f64;
        mean_c - swing_c * libm::cos(std::f64::consts::TAU * days_after_coldest / DAYS as f64)
    };
    let dates = || first_day().iter_days().take(DAYS);
    let span = YearSpan { water_year: 2007, first: first_day(), start: 0, days: DAYS, follows: false };
    let series = Series {
        years: vec![span],
        mean_c: (0..DAYS).map(temperature).collect(),
        half_range_c: vec![0.0; DAYS],
        precipitation_mm: vec![precipitation_mm; DAYS],
        relative_humidity_pct: Vec::new(),
        month: dates().map(|date| date.month0() as u8).collect(),
        day_of_year: dates().map(|date| date.ordinal() as u16).collect(),
    };
    (snow, series)
}

/// The measures of one year.
pub struct Season {
    measures: Measures,
    values: Vec<f64>,
    width: usize,
    /// Column of the first basin mean.
    pub mixes_at: usize,
}

impl Season {
    /// Runs the year and takes its measures, SWE among them `survey_day` days after the coldest instant.
    pub fn run(lanes: &Lanes, series: &Series, survey_day: usize) -> Self {
        let survey = date_of(first_day(), DAYS_BEFORE_COLDEST + survey_day + 1);
        let month_day =
            |date: NaiveDate| MonthDay::new(date.month(), date.day()).expect("a day of every year");
        let measures = Measures::new(
            SeasonSettings {
                water_year_starts: WaterYearStart(month_day(first_day())),
                survey_dates: vec![month_day(survey)],
                volume_windows: Vec::new(),
                outflow_before: Vec::new(),
                melt_shares_before: Vec::new(),
                arrival_volume_hm3: None,
            },
            1.0,
        );
        let mut engine = Engine::new(lanes, false);
        let block = engine.year(series.view(&series.years[0])).expect("a closed ledger");
        let mut values = vec![0.0; measures.list().len() * block.width];
        measures.take(block, &mut values);
        Self { measures, values, width: block.width, mixes_at: block.mixes_at }
    }

    /// A measure of a column by its name.
    pub fn value(&self, name: &str, column: usize) -> f64 {
        let at = self.measures.list().iter().position(|measure| measure.name == name);
        self.values[at.unwrap_or_else(|| panic!("no measure '{name}'")) * self.width + column]
    }

    /// SWE on the survey date.
    pub fn survey_mm(&self, column: usize) -> f64 {
        self.values[column]
    }

    /// A date as days from the coldest instant to the beginning of the day.
    pub fn days_after_coldest(&self, name: &str, column: usize) -> f64 {
        self.value(name, column) - 1.0 - DAYS_BEFORE_COLDEST as f64
    }
}

/// Percent changes from the first value to each of the others.
pub fn changes_pct(values: &[f64]) -> Vec<f64> {
    values[1..].iter().map(|value| 100.0 * (value / values[0] - 1.0)).collect()
}

/// One place without bands, under several levels: peak, its day, melt-out, and what warming changes.
pub fn closed_season(case: &Case) {
    let (snow, series) = snow_and_weather(case);
    let (basin, levels) = (flat_basin(), case.input::<Vec<f64>>("levels_c"));
    let changes: Vec<MonthlyChange> = levels.iter().map(|level| Warming::default().at(*level)).collect();
    let groups = changes.iter().map(|change| {
        vec![LaneSpec {
            basin: &basin,
            station_m: 0.0,
            elevation_m: 0.0,
            ground: Ground::default(),
            change,
            warming_factor: 1.0,
            snow: &snow,
            share: 1.0,
        }]
    });
    let season = Season::run(&Lanes::new(&groups.collect::<Vec<_>>()), &series, 0);
    let of = |take: &dyn Fn(usize) -> f64| (0..levels.len()).map(take).collect::<Vec<f64>>();
    let peaks = of(&|lane| season.value("peak_swe_mm", lane));
    let peak_days = of(&|lane| season.days_after_coldest("peak_day", lane));
    let melt_outs = of(&|lane| season.days_after_coldest("melt_out_day", lane));
    let earlier = |days: &[f64]| days[1..].iter().map(|day| days[0] - day).collect::<Vec<f64>>();
    case.check("peak_mm", &peaks);
    case.check("peak_change_pct", &changes_pct(&peaks));
    case.check("peak_days_after_coldest", &peak_days);
    case.check("peak_days_earlier", &earlier(&peak_days));
    case.check("melt_out_days_after_coldest", &melt_outs);
    case.check("melt_out_days_earlier", &earlier(&melt_outs));
}
