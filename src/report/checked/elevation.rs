//! Band by band: winter against freezing, snow against rain, whether snow stays.

use super::super::numbers::{counted, fixed};
use super::{Checked, Page};
use crate::baseline::wilson;
use crate::season::SEASONAL_COVER_DAYS;
use std::fmt::Write;

/// Column heads of the table, above their units.
const HEADS: [&str; 7] = ["band", "area", "winter mean", "freezing", "precip.", "as snow", "seasonal snow"];

impl Checked<'_> {
    pub(super) fn write_elevation(&self, page: &mut Page) {
        let units = self.reader.units;
        let bands = &self.basin.bands;
        page.head("By elevation");
        let [elevation, area] = [units.elevation(), units.area()];
        if let (Some(lowest), Some(highest)) = (bands.first(), bands.last()) {
            page.line(
                "bands",
                format!(
                    "{}, {} to {} {}, {} {}",
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
        let units = self.reader.units;
        let (elevation, temperature, depth) = (units.elevation(), units.temperature(), units.depth());
        let unit_row = ["", elevation.word, "%", temperature.word, "% of days", depth.word, "%", "years"];
        let row = |cells: [&str; 8]| {
            let [number, range, area, winter, freezing, precipitation, snow, seasonal] = cells;
            format!(
                "  {number:>4} {range:>15} {area:>6} {winter:>12} {freezing:>10} {precipitation:>9} {snow:>9} {seasonal:>22}"
            )
        };
        let [band, area, winter, freezing, precipitation, snow, seasonal] = HEADS;
        let _ = writeln!(
            page.text,
            "{}",
            row([band, "elevation", area, winter, freezing, precipitation, snow, seasonal]).trim_end()
        );
        let _ = writeln!(page.text, "{}", row(unit_row).trim_end());
        let years = self.record.series.years.len();
        for (at, ((band, share), climate)) in
            self.basin.bands.iter().zip(self.basin.shares()).zip(self.climates).enumerate().rev()
        {
            let range = format!(
                "{}–{}",
                self.reader.elevation_bare(band.lower_m),
                self.reader.elevation_bare(band.upper_m)
            );
            let seasonal = match wilson(climate.seasonal_years, years) {
                Some([low, high]) => format!(
                    "{} of {years} ({}–{} %)",
                    climate.seasonal_years,
                    fixed(100.0 * low, 0),
                    fixed(100.0 * high, 0)
                ),
                None => String::new(),
            };
            let cells = [
                (at + 1).to_string(),
                range,
                fixed(100.0 * share, 0),
                fixed(temperature.of(climate.winter_mean_c), 1),
                fixed(100.0 * climate.winter_freezing_share, 0),
                fixed(depth.of(climate.precipitation_mm), usize::from(depth.word == "in")),
                climate.snow_fraction().map_or(String::new(), |share| fixed(100.0 * share, 0)),
                seasonal,
            ];
            let _ = writeln!(page.text, "{}", row(cells.each_ref().map(String::as_str)));
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
}
