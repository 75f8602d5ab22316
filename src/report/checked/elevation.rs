//! Band by band: winter against freezing, snow against rain, whether snow stays.

use super::super::numbers::{DASH, counted, fixed};
use super::{Checked, Page};
use crate::baseline::wilson;
use crate::basin::{Band, GroundStated};
use crate::ensemble::BandClimate;
use crate::season::SEASONAL_COVER_DAYS;
use std::fmt::Write;

impl Checked<'_> {
    pub(super) fn write_elevation(&self, page: &mut Page) {
        let units = self.reader.units;
        let bands = &self.basin.bands;
        page.head("By elevation");
        let [elevation, area] = [units.elevation(), units.area()];
        let in_ranges = match self.basin.ranges() {
            ranges if ranges < bands.len() => format!(" in {}", counted(ranges, "range")),
            _ => String::new(),
        };
        if let (Some(lowest), Some(highest)) = (bands.first(), bands.last()) {
            page.line(
                "bands",
                format!(
                    "{}{in_ranges}, {} to {} {}, {} {}",
                    bands.len(),
                    self.reader.elevation_bare(lowest.lower_m),
                    self.reader.elevation_bare(highest.upper_m),
                    elevation.word,
                    self.reader.area_bare(self.basin.area_km2()),
                    area.word
                ),
            );
        }
        if let Some(beyond) = self.beyond_stations {
            let stations = if beyond.lowest_m == beyond.highest_m {
                format!("the station at {}", self.reader.elevation(beyond.highest_m))
            } else {
                let [lowest, highest] = [beyond.lowest_m, beyond.highest_m];
                let highest = self.reader.elevation(highest);
                format!("the stations, from {} to {highest}", self.reader.elevation_bare(lowest))
            };
            page.line(
                "area beyond the stations",
                format!(
                    "{} above and {} below {stations}; there results hang on the gradients alone",
                    Self::percent(beyond.share_above),
                    Self::percent(beyond.share_below)
                ),
            );
        }
        self.write_bands(page);
    }

    fn write_bands(&self, page: &mut Page) {
        for row in in_columns(&self.columns_of_bands()) {
            let _ = writeln!(page.text, "{}", row.trim_end());
        }
        let winter = if self.basin.is_southern() { "June to August" } else { "December to February" };
        page.paragraph(&format!(
            "winter: {winter}; freezing: days with a mean below {}; seasonal snow: years with {SEASONAL_COVER_DAYS} days of \
             cover on end, and the Wilson 95 % interval of their share",
            self.reader.temperature(0.0)
        ));
        let perennial: Vec<String> = self
            .climates
            .iter()
            .enumerate()
            .filter(|(_, climate)| climate.years_not_gone > 0)
            .map(|(at, climate)| format!("band {} in {}", at + 1, counted(climate.years_not_gone, "year")))
            .collect();
        if !perennial.is_empty() {
            page.line("snow that never went", perennial.join(", "));
        }
    }

    /// What is told of each band, a column each, from the highest band down; of its ground what the bands differ in.
    fn columns_of_bands(&self) -> Vec<Column> {
        let units = self.reader.units;
        let (elevation, temperature, depth) = (units.elevation(), units.temperature(), units.depth());
        let years = self.record.series.years.len();
        let bands: Vec<(&Band, f64, &BandClimate)> = self
            .basin
            .bands
            .iter()
            .zip(self.basin.shares())
            .zip(self.climates)
            .map(|((band, share), climate)| (band, share, climate))
            .collect();
        let column = |width, head, unit, cell: &dyn Fn(&Band, f64, &BandClimate) -> String| Column {
            width,
            head,
            unit,
            cells: bands.iter().rev().map(|(band, share, climate)| cell(band, *share, climate)).collect(),
        };
        let edges = |band: &Band| {
            let [lower, upper] =
                [band.lower_m, band.upper_m].map(|edge_m| self.reader.elevation_bare(edge_m));
            format!("{lower}–{upper}")
        };
        let numbers = Column {
            width: 4,
            head: "band",
            unit: "",
            cells: (1..=bands.len()).rev().map(|number| number.to_string()).collect(),
        };
        let mut columns = vec![
            numbers,
            column(15, "elevation", elevation.word, &|band, _, _| edges(band)),
            column(6, "area", "%", &|_, share, _| fixed(100.0 * share, 0)),
        ];
        let stated = GroundStated::of(&self.basin.bands);
        if stated.slope {
            columns.push(column(6, "slope", "°", &|band, _, _| fixed(band.ground.slope_deg, 0)));
            columns.push(column(7, "facing", "°", &|band, _, _| match band.ground.slope_deg {
                0.0 => DASH.to_owned(),
                _ => fixed(band.ground.aspect_deg, 0),
            }));
        }
        if stated.canopy {
            columns
                .push(column(7, "canopy", "%", &|band, _, _| fixed(100.0 * band.ground.canopy_fraction, 0)));
        }
        if stated.variation {
            columns.push(column(8, "snow CV", "", &|band, _, _| {
                band.ground.accumulation_variation.map_or(DASH.to_owned(), |variation| fixed(variation, 2))
            }));
        }
        columns.extend([
            column(12, "winter mean", temperature.word, &|_, _, of| {
                fixed(temperature.of(of.winter_mean_c), 1)
            }),
            column(10, "freezing", "% of days", &|_, _, of| fixed(100.0 * of.winter_freezing_share, 0)),
            column(9, "precip.", depth.word, &|_, _, of| {
                fixed(depth.of(of.precipitation_mm), usize::from(depth.word == "in"))
            }),
            column(9, "as snow", "%", &|_, _, of| {
                of.snow_fraction().map_or(String::new(), |share| fixed(100.0 * share, 0))
            }),
            column(22, "seasonal snow", "years", &|_, _, of| seasonal_years(of, years)),
        ]);
        columns
    }
}

/// A column of the table.
struct Column {
    width: usize,
    head: &'static str,
    unit: &'static str,
    cells: Vec<String>,
}

/// The columns beside each other: a line of heads, one of units, and one a cell.
fn in_columns(columns: &[Column]) -> Vec<String> {
    let line = |cell: &dyn Fn(&Column) -> String| {
        columns
            .iter()
            .fold(" ".to_owned(), |line, column| format!("{line} {:>1$}", cell(column), column.width))
    };
    let count = columns.first().map_or(0, |column| column.cells.len());
    let heads = [line(&|column| column.head.to_owned()), line(&|column| column.unit.to_owned())];
    let cells = (0..count).map(|at| line(&|column| column.cells[at].clone()));
    heads.into_iter().chain(cells).collect()
}

/// `20 of 40 (35–65 %)`.
fn seasonal_years(climate: &BandClimate, years: usize) -> String {
    let Some([low, high]) = wilson(climate.seasonal_years, years) else { return String::new() };
    let [low, high] = [low, high].map(|share| fixed(100.0 * share, 0));
    format!("{} of {years} ({low}–{high} %)", climate.seasonal_years)
}
