//! An idealised range through the engine at several levels, and its seasons measured.

use super::climate::water_year_starts;
use super::ranges::Range;
use thawline::basin::Basin;
use thawline::calendar::MonthDay;
use thawline::perturb::{MonthlyChange, PrecipitationChange, Warming};
use thawline::season::{Measures, NONE, SeasonSettings, longest_cover_days};
use thawline::snow::{DegreeRule, Engine, LaneSpec, Lanes, SnowParams, YearBlock};

/// Melt of so many mm a day is fast.
pub const FAST_MELT_MM: f64 = 15.0;

/// The levels of most tests, degC.
pub const PLAIN_LEVELS_C: [f64; 5] = [0.0, 1.0, 2.0, 3.0, 4.0];

/// What is measured beside the program's own measures, in every column; see [`take_extras`].
const EXTRAS: [&str; 5] =
    ["cover_days", "largest_snowfall_mm", "snowfall_mm", "precipitation_mm", "fast_melt_days"];

/// The measured seasons of a range.
pub struct Seasons {
    pub basin: Basin,
    lanes: Lanes,
    measures: Measures,
    width: usize,
    mixes_at: usize,
    /// `[year]`, each `[measure][column]`.
    years: Vec<Vec<f64>>,
    /// `[year]`: mean temperature from December to February at the station, degC.
    pub winters_c: Vec<f64>,
    /// `[year]`: precipitation from October to March at the station, mm.
    pub cool_seasons_mm: Vec<f64>,
}

/// The same degrees in every month at each level, precipitation changed by so many percent per degree.
pub fn levels(levels_c: &[f64], precipitation_pct_per_c: f64) -> Vec<MonthlyChange> {
    let precipitation = PrecipitationChange::PctPerC([precipitation_pct_per_c; 12]);
    let warming = Warming { precipitation, ..Warming::default() };
    levels_c.iter().map(|level_c| warming.at(*level_c)).collect()
}

impl Seasons {
    /// The range's 30 years from 0 to +4 degC, precipitation as it is.
    pub fn plain(range: &Range) -> Self {
        Self::of(range, &levels(&PLAIN_LEVELS_C, 0.0))
    }

    /// Runs the range's 30 years with the default parameters.
    pub fn of(range: &Range, changes: &[MonthlyChange]) -> Self {
        Self::with(range, changes, &SnowParams::defaults(DegreeRule::Diurnal, false))
    }

    /// Runs them with stated parameters.
    pub fn with(range: &Range, changes: &[MonthlyChange], snow: &SnowParams) -> Self {
        let (basin, series) = (range.basin(), range.climate.series());
        let lanes = lanes(&basin, range.station_m, changes, snow);
        let measures = Measures::new(settings(), basin.area_km2());
        let mut seasons = Self {
            lanes,
            measures,
            width: 0,
            mixes_at: 0,
            years: Vec::new(),
            winters_c: Vec::new(),
            cool_seasons_mm: Vec::new(),
            basin,
        };
        let mut engine = Engine::new(&seasons.lanes, false);
        let mut years = Vec::new();
        for span in &series.years {
            engine.restart();
            let view = series.view(span);
            let block = engine.year(view).expect("a closed ledger");
            let count = seasons.measures.list().len();
            let mut values = vec![NONE; (count + EXTRAS.len()) * block.width];
            let (measured, extra) = values.split_at_mut(count * block.width);
            take_extras(block, extra);
            seasons.measures.take(block, measured);
            (seasons.width, seasons.mixes_at) = (block.width, block.mixes_at);
            years.push(values);
            let of_months = |months: &[u8], column: &[f64]| -> Vec<f64> {
                let days = view.month.iter().zip(column).filter(|(month, _)| months.contains(month));
                days.map(|(_, value)| *value).collect()
            };
            seasons.winters_c.push(mean(&of_months(&[11, 0, 1], view.mean_c)));
            let cool = of_months(&[9, 10, 11, 0, 1, 2], view.precipitation_mm);
            seasons.cool_seasons_mm.push(cool.iter().sum());
        }
        drop(engine);
        seasons.years = years;
        seasons
    }

    /// A measure of the basin mean at a level, year by year.
    pub fn basin_years(&self, name: &str, level: usize) -> Vec<f64> {
        self.column(name, self.mixes_at + level)
    }

    /// A measure of a band at a level, year by year.
    pub fn band_years(&self, name: &str, level: usize, band: usize) -> Vec<f64> {
        self.column(name, self.lanes.column(level, band))
    }

    /// Mean over the years of a measure of the basin.
    pub fn basin(&self, name: &str, level: usize) -> f64 {
        mean(&self.basin_years(name, level))
    }

    /// Mean over the years of a measure of a band.
    pub fn band(&self, name: &str, level: usize, band: usize) -> f64 {
        mean(&self.band_years(name, level, band))
    }

    /// Mean over the bands, by area, of a measure, year by year.
    pub fn over_bands_years(&self, name: &str, level: usize) -> Vec<f64> {
        let shares = self.basin.shares();
        let bands: Vec<Vec<f64>> = (0..shares.len()).map(|band| self.band_years(name, level, band)).collect();
        let of_year =
            |year: usize| bands.iter().zip(&shares).map(|(band, share)| share * band[year]).sum::<f64>();
        (0..self.years.len()).map(of_year).collect()
    }

    /// Mean of that over the years.
    pub fn over_bands(&self, name: &str, level: usize) -> f64 {
        mean(&self.over_bands_years(name, level))
    }

    fn column(&self, name: &str, column: usize) -> Vec<f64> {
        let own = self.measures.list().iter().position(|measure| measure.name == name);
        let extra = || EXTRAS.iter().position(|extra| *extra == name);
        let at = own.or_else(|| extra().map(|at| self.measures.list().len() + at));
        let at = at.unwrap_or_else(|| panic!("no measure '{name}'"));
        self.years.iter().map(|values| values[at * self.width + column]).collect()
    }
}

/// Percent from the first to the second.
pub fn change_pct(from: f64, to: f64) -> f64 {
    100.0 * (to / from - 1.0)
}

pub fn mean(values: &[f64]) -> f64 {
    values.iter().sum::<f64>() / values.len() as f64
}

/// Standard deviation over n - 1.
pub fn deviation(values: &[f64]) -> f64 {
    let mean = mean(values);
    let squares: f64 = values.iter().map(|value| (value - mean) * (value - mean)).sum();
    (squares / (values.len() - 1) as f64).sqrt()
}

/// A group of lanes for each change, bands from the lowest up.
pub fn lanes(basin: &Basin, station_m: f64, changes: &[MonthlyChange], snow: &SnowParams) -> Lanes {
    let shares = basin.shares();
    let group = |change| {
        let bands = basin.bands.iter().zip(&shares);
        let specs = bands.map(|(band, share)| LaneSpec {
            basin,
            station_m,
            elevation_m: band.elevation_m,
            ground: band.ground,
            change,
            warming_factor: 1.0,
            snow,
            share: *share,
        });
        specs.collect::<Vec<_>>()
    };
    Lanes::new(&changes.iter().map(group).collect::<Vec<_>>())
}

/// One survey, on 1 April.
pub fn settings() -> SeasonSettings {
    SeasonSettings {
        water_year_starts: water_year_starts(),
        survey_dates: vec![MonthDay::new(4, 1).expect("a day of every year")],
        volume_windows: Vec::new(),
        outflow_before: Vec::new(),
        melt_shares_before: Vec::new(),
        arrival_volume_hm3: None,
    }
}

/// Longest cover, days; the largest snowfall of a day, all snowfall, and all precipitation, mm; days of fast melt.
fn take_extras(block: &YearBlock, into: &mut [f64]) {
    let width = block.width;
    for column in 0..width {
        let of =
            |table: &[f64]| -> Vec<f64> { (0..block.days).map(|day| table[day * width + column]).collect() };
        let (snow, rain, melt) = (of(&block.snow_mm), of(&block.rain_mm), of(&block.net_melt_mm));
        into[column] = longest_cover_days(block, column) as f64;
        into[width + column] = snow.iter().copied().fold(0.0, f64::max);
        into[2 * width + column] = snow.iter().sum();
        into[3 * width + column] = snow.iter().chain(&rain).sum();
        into[4 * width + column] = melt.iter().filter(|melt| **melt >= FAST_MELT_MM).count() as f64;
    }
}
