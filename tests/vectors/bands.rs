//! Melt of one warm day, and a whole season, over an area of uniform hypsometry cut into bands.

use super::case::Case;
use super::closed_season::{self, Season};
use super::days::{flat_basin, one_year, plain_snow};
use thawline::basin::{Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};
use thawline::perturb::{MonthlyChange, Warming};
use thawline::snow::{Engine, LaneSpec, Lanes, SnowParams};

/// An area that is uniform in elevation.
struct UniformArea {
    basin: Basin,
    lowest_m: f64,
    highest_m: f64,
}

impl UniformArea {
    fn of(case: &Case) -> Self {
        let mut basin = flat_basin();
        basin.temperature = TemperatureGradient::constant(-case.input::<f64>("lapse_c_per_km"));
        Self { basin, lowest_m: case.input("lowest_m"), highest_m: case.input("highest_m") }
    }

    /// Lanes of `bands` bands of equal area, the station at the foot, a group for each change.
    fn lanes(&self, bands: usize, changes: &[MonthlyChange], snow: &SnowParams) -> Lanes {
        let width_m = (self.highest_m - self.lowest_m) / bands as f64;
        let group = |change| {
            let specs = (0..bands).map(|band| LaneSpec {
                basin: &self.basin,
                station_m: self.lowest_m,
                elevation_m: self.lowest_m + width_m * (band as f64 + 0.5),
                ground: Ground::default(),
                change,
                warming_factor: 1.0,
                snow,
                share: 1.0 / bands as f64,
            });
            specs.collect::<Vec<_>>()
        };
        let groups: Vec<_> = changes.iter().map(group).collect();
        Lanes::new(&groups)
    }
}

/// Temperature, precipitation and snowfall of one day at several elevations, carried there from a station at 0 m, at a
/// warming level where one is stated.
pub fn weather_over_bands(case: &Case) {
    let elevations_m: Vec<f64> = case.input("elevations_m");
    let mut basin = flat_basin();
    basin.temperature = TemperatureGradient::constant(-case.input::<f64>("lapse_c_per_km"));
    let gradient: Option<f64> = case.input_or_none("gradient_pct_per_100m");
    let form = match case.input_or_none::<bool>("is_compound") {
        Some(true) => GradientForm::Compound,
        _ => GradientForm::Linear,
    };
    basin.precipitation = PrecipitationGradient::new(gradient.unwrap_or(0.0), None, form);
    let precipitation_mm: f64 = case.input_or_none("precipitation_mm").unwrap_or(0.0);
    let change = Warming::default().at(case.input_or_none("level_c").unwrap_or(0.0));
    let snow = plain_snow(case);
    let spec = |elevation_m: &f64| LaneSpec {
        basin: &basin,
        station_m: 0.0,
        elevation_m: *elevation_m,
        ground: Ground::default(),
        change: &change,
        warming_factor: 1.0,
        snow: &snow,
        share: 1.0 / elevations_m.len() as f64,
    };
    let lanes = Lanes::new(&[elevations_m.iter().map(spec).collect::<Vec<_>>()]);
    let series = one_year(0.0, &[case.input("mean_at_foot_c")], &[0.0], &[precipitation_mm]);
    let mut engine = Engine::new(&lanes, true);
    let block = engine.year(series.view(&series.years[0])).expect("a closed ledger");
    let detail = block.detail.as_ref().expect("detail was asked for");
    let bands = 0..elevations_m.len();
    let means = bands.clone().map(|band| detail.mean_c[detail.width + lanes.column(0, band)]);
    case.check("mean_c", &means.collect::<Vec<_>>());
    let [rain, snow] = [block.row(&block.rain_mm, 1), block.row(&block.snow_mm, 1)];
    let snowfall = bands.clone().map(|band| snow[lanes.column(0, band)]);
    case.check("snow_mm", &snowfall.collect::<Vec<_>>());
    let fallen = bands.map(|band| rain[lanes.column(0, band)] + snow[lanes.column(0, band)]);
    case.check("precipitation_mm", &fallen.collect::<Vec<_>>());
}

/// The basin's mean melt on one warm day, for several numbers of bands.
pub fn melt_over_bands(case: &Case) {
    let area = UniformArea::of(case);
    let snow = plain_snow(case);
    let series = one_year(case.input("pack_mm"), &[case.input("mean_at_foot_c")], &[0.0], &[0.0]);
    let melts = case.input::<Vec<usize>>("bands").into_iter().map(|bands| {
        let lanes = area.lanes(bands, &[MonthlyChange::NONE], &snow);
        let mut engine = Engine::new(&lanes, false);
        let block = engine.year(series.view(&series.years[0])).expect("a closed ledger");
        block.net_melt_mm[block.width + block.mixes_at]
    });
    case.check("basin_melt_mm", &melts.collect::<Vec<_>>());
}

/// A closed-form season over the bands: band peaks, storage on a date and the basin's peak, at several levels.
pub fn season_over_bands(case: &Case) {
    let area = UniformArea::of(case);
    let (snow, series) = closed_season::snow_and_weather(case);
    let levels: Vec<f64> = case.input("levels_c");
    let changes: Vec<MonthlyChange> = levels.iter().map(|level| Warming::default().at(*level)).collect();
    let bands: usize = case.input("bands");
    let lanes = area.lanes(bands, &changes, &snow);
    let season = Season::run(&lanes, &series, case.input("survey_days_after_coldest"));
    let mixes = || (0..levels.len()).map(|mix| season.mixes_at + mix);
    let column = |name: &str, column: usize| season.value(name, column);
    let band_peaks: Vec<f64> = (0..levels.len())
        .map(|level| {
            let peaks = (0..bands).map(|band| column("peak_swe_mm", lanes.column(level, band)));
            peaks.sum::<f64>() / bands as f64
        })
        .collect();
    let peaks: Vec<f64> = mixes().map(|mix| column("peak_swe_mm", mix)).collect();
    let storage: Vec<f64> = mixes().map(|mix| season.survey_mm(mix)).collect();
    case.check("mean_of_band_peaks_mm", &band_peaks);
    case.check("mean_of_band_peaks_change_pct", &closed_season::changes_pct(&band_peaks));
    case.check("storage_mm", &storage);
    case.check("storage_change_pct", &closed_season::changes_pct(&storage));
    case.check("basin_peak_mm", &peaks);
    let days: Vec<f64> = mixes().map(|mix| season.days_after_coldest("peak_day", mix)).collect();
    case.check("basin_peak_days_after_coldest", &days);
}
