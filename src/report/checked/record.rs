//! The record: what there is, what is left out, what it measured.

use super::super::normal::baseline_years_in_words;
use super::super::numbers::{counted, fixed};
use super::{Checked, Page};
use crate::baseline::SeasonYears;
use crate::weather::{HumidityCount, in_groups};

impl Checked<'_> {
    pub(super) fn write_record(&self, page: &mut Page) {
        let counts = &self.record.counts;
        let years = &self.record.series.years;
        page.head("The record");
        let days = fixed(counts.days as f64, 0);
        page.line("period", format!("{} to {}, {days} days", counts.first, counts.last));
        let span = years.first().zip(years.last()).map_or(String::new(), |(first, last)| {
            format!(", from {} to {}", first.water_year, last.water_year)
        });
        page.line(
            "water years in use",
            format!("{} of {}{span}", years.len(), years.len() + self.record.skipped.len()),
        );
        for (years, why) in in_groups(&self.record.skipped) {
            let why: Vec<String> = why.into_iter().map(|why| why.words(self.reader.units)).collect();
            let (first, last) = (years.start(), years.end());
            let years = if first == last { first.to_string() } else { format!("{first} to {last}") };
            page.line("  left out", format!("{years}: {}", why.join("; ")));
        }
        page.line("baseline years", baseline_years_in_words(self.baseline_years));
        page.line("dates without a line", fixed(counts.absent_days as f64, 0));
        page.line(
            "temperature missing",
            format!(
                "{}; {} interpolated in the years in use",
                counted(counts.temperature_missing_days, "day"),
                fixed(counts.interpolated_days as f64, 0)
            ),
        );
        page.line(
            "precipitation missing",
            format!(
                "{}; {} run dry in the years in use",
                counted(counts.precipitation_missing_days, "day"),
                fixed(counts.dry_for_want_of_data_days as f64, 0)
            ),
        );
        self.write_humidity(page);
        page.line(
            "taken as missing",
            format!(
                "{} that cannot be, {} far from their time of year, {} that stood still; {} with the minimum above the \
                 maximum",
                counted(counts.impossible_cells, "cell"),
                fixed(counts.far_temperature_cells as f64, 0),
                fixed(counts.stuck_temperature_cells as f64, 0),
                counted(counts.crossed_temperature_days, "day")
            ),
        );
        if let Some(gauge) = counts.gauge {
            page.line(
                "accumulating gauge",
                format!(
                    "set back {}; {} (in all {}) taken for noise; {} between missing readings, not run",
                    times(gauge.resets),
                    counted(gauge.small_falls, "small fall"),
                    self.reader.amount(gauge.small_falls_mm),
                    self.reader.amount(gauge.between_readings_mm)
                ),
            );
        }
    }

    fn write_humidity(&self, page: &mut Page) {
        let Some(humidity) = self.record.counts.humidity else { return };
        let HumidityCount { missing_days, lowered_to_100_days, wet_days, filled_wet_days } = humidity;
        let [of_wet, wet_days] = [filled_wet_days, wet_days].map(|days| fixed(days as f64, 0));
        page.line(
            "humidity missing",
            format!(
                "{}; {of_wet} of {wet_days} wet days in use have the mean of the wet days of their month; {} above 100 % \
                 read as 100 %",
                counted(missing_days, "day"),
                counted(lowered_to_100_days, "day")
            ),
        );
    }

    pub(super) fn write_precipitation(&self, page: &mut Page) {
        let reader = self.reader;
        let means = self.record.means();
        let degrees = |value_c: f64| {
            let unit = reader.units.temperature();
            format!("{} {}", fixed(unit.of(value_c), 1), unit.word)
        };
        page.head("Temperature and precipitation");
        page.line(
            "station temperature",
            format!(
                "{} over the year, {} in January, {} in July",
                degrees(means.year_c),
                degrees(means.month_c[0]),
                degrees(means.month_c[6])
            ),
        );
        page.line("temperature gradient", reader.temperature_gradient(&self.basin.temperature));
        let survey = self.season.survey_dates.first().map_or(String::new(), |day| day.words());
        let start = self.season.water_year_starts.0.words();
        let mean =
            |values: &[(i32, f64)]| values.iter().map(|(_, value)| value).sum::<f64>() / values.len() as f64;
        let season = |years: &SeasonYears| {
            if years.mean_c.is_empty() {
                return "it has no days".to_owned();
            }
            format!(
                "mean {}, {} of precipitation at the station",
                degrees(mean(&years.mean_c)),
                reader.amount(mean(&years.precipitation_mm))
            )
        };
        page.line("cool season", format!("{start} up to {survey}: {}", season(&self.seasons.cool)));
        page.line("warm season", format!("{survey} up to {start}: {}", season(&self.seasons.warm)));
        let (caught_mm, station_mm) = (means.precipitation_mm, self.station_precipitation_mm);
        page.line(
            "station precipitation",
            format!(
                "{} a year as caught; {} corrected for catch, times {} for snow and {} for rain",
                reader.amount(caught_mm),
                reader.amount(station_mm),
                self.gauge_multiplier.snow,
                self.gauge_multiplier.rain
            ),
        );
        let ratio = self.precipitation_ratio();
        page.line(
            "basin precipitation",
            format!(
                "{} a year, {} times the station's: hold it against a value you know",
                reader.amount(station_mm * ratio),
                fixed(ratio, 2)
            ),
        );
        page.line("precipitation gradient", reader.precipitation_gradient(&self.basin.precipitation));
        let basin = self.basin_snow_fraction().map_or("none".to_owned(), Self::percent);
        page.line(
            "snow fraction",
            format!(
                "{basin} of the basin's precipitation falls as snow, {} of the station's",
                Self::percent(self.station_snow_fraction)
            ),
        );
    }

    /// Basin-mean over station precipitation.
    pub(super) fn precipitation_ratio(&self) -> f64 {
        self.basin.precipitation_ratio(self.station_elevation_m)
    }

    /// Share of the basin's precipitation that falls as snow.
    pub(super) fn basin_snow_fraction(&self) -> Option<f64> {
        let (mut snow, mut all) = (0.0, 0.0);
        for (climate, share) in self.climates.iter().zip(self.basin.shares()) {
            snow += share * climate.snowfall_mm;
            all += share * climate.precipitation_mm;
        }
        (all > 0.0).then(|| snow / all)
    }
}

fn times(count: usize) -> String {
    match count {
        1 => "once".to_owned(),
        count => format!("{} times", fixed(count as f64, 0)),
    }
}
