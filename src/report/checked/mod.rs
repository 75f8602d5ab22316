//! What `check` found: a page of words for the terminal, or one JSON document.

mod baseline;
mod document;
mod elevation;
mod generator_sheet;
mod inflow;
mod observed;
mod record;

pub use inflow::InflowFile;

use super::numbers::{counted, fixed, signed};
use super::reader::Reader;
use super::snow_words;
use super::study::{FittedFrom, SetsFrom};
use crate::baseline::{Baseline, BaselineYears, Detrended, Seasons};
use crate::basin::{Basin, BeyondStations};
use crate::defaults::DefaultInForce;
use crate::ensemble::BandClimate;
use crate::fault::Unlikely;
use crate::findings::GeneratorSheet;
use crate::fit::Site;
use crate::perturb::Warming;
use crate::season::SeasonSettings;
use crate::snow::{GaugeMultiplier, SnowParams};
use crate::weather::Record;
use std::fmt::Write;

/// Everything a check has read and found.
pub struct Checked<'a> {
    /// The study's title.
    pub title: &'a str,
    /// Seed in force.
    pub seed: u64,
    /// Who reads it.
    pub reader: Reader,
    /// The basin.
    pub basin: &'a Basin,
    /// Elevation of the station, m.
    pub station_elevation_m: f64,
    /// Area beyond the stations.
    pub beyond_stations: Option<BeyondStations>,
    /// The record as caught.
    pub record: &'a Record,
    /// Gauge catch.
    pub gauge_multiplier: GaugeMultiplier,
    /// Precipitation of a year at the station, corrected for catch, mm.
    pub station_precipitation_mm: f64,
    /// Share of it that falls as snow at the station, 0 to 1.
    pub station_snow_fraction: f64,
    /// The record's seasons, precipitation corrected for catch.
    pub seasons: &'a Seasons,
    /// The record band by band, from the lowest.
    pub climates: &'a [BandClimate],
    /// Trends and steps, precipitation corrected for catch.
    pub baseline: Option<&'a Baseline>,
    /// The years whose median is the normal.
    pub baseline_years: &'a BaselineYears,
    /// The trend that was taken out for the realizations.
    pub detrended: Option<&'a Detrended>,
    /// Sites with observed snow.
    pub sites: Vec<Site<'a>>,
    /// The file of observed inflow.
    pub inflow: Option<InflowFile<'a>>,
    /// What is in force from a file of fitted parameters.
    pub fitted: Option<FittedFrom<'a>>,
    /// Sets of parameters that a study would run beside its own.
    pub parameter_sets: Option<SetsFrom<'a>>,
    /// Dates and windows.
    pub season: &'a SeasonSettings,
    /// Snow parameters.
    pub snow: &'a SnowParams,
    /// Levels, ascending, degC.
    pub levels_c: &'a [f64],
    /// Which of them is the reference.
    pub reference: usize,
    /// Shape and precipitation.
    pub warming: &'a Warming,
    /// Defaults in force.
    pub defaults: &'a [DefaultInForce],
    /// What is unlikely.
    pub unlikely: &'a [Unlikely],
    /// The weather that was made against the record, if that was asked for.
    pub generator: Option<&'a GeneratorSheet>,
}

/// Names stand in a column of this width.
const NAME_WIDTH: usize = 27;
/// Lines are broken before they reach this width, where a blank allows it.
const PAGE_WIDTH: usize = 110;

/// A page of headed lines.
#[derive(Default)]
struct Page {
    text: String,
}

impl Page {
    fn head(&mut self, title: &str) {
        let gap = if self.text.is_empty() { "" } else { "\n" };
        let _ = writeln!(self.text, "{gap}{title}");
    }

    /// A name and what there is to say of it, on as many lines as that takes.
    fn line(&mut self, name: &str, what: impl AsRef<str>) {
        let mut name = name;
        let mut rest = what.as_ref();
        loop {
            let (line, after) = broken(rest, PAGE_WIDTH - NAME_WIDTH - 2);
            let _ = writeln!(self.text, "{}", format!("  {name:<NAME_WIDTH$}{line}").trim_end());
            if after.is_empty() {
                return;
            }
            (name, rest) = ("", after);
        }
    }

    /// A paragraph, its further lines set in.
    fn paragraph(&mut self, text: &str) {
        let (mut indent, mut rest) = ("  ", text);
        while !rest.is_empty() {
            let (line, after) = broken(rest, PAGE_WIDTH - indent.len());
            let _ = writeln!(self.text, "{indent}{line}");
            (indent, rest) = ("    ", after);
        }
    }
}

/// The longest beginning of a text that ends at a blank and fits into `width` characters, and the rest.
fn broken(text: &str, width: usize) -> (&str, &str) {
    let Some((limit, _)) = text.char_indices().nth(width) else { return (text, "") };
    match text[..limit].rfind(' ').or_else(|| text.find(' ')) {
        Some(blank) => (&text[..blank], &text[blank + 1..]),
        None => (text, ""),
    }
}

impl Checked<'_> {
    /// The page of words, for the terminal.
    pub fn words(&self) -> String {
        let mut page = Page::default();
        page.head(self.title);
        self.write_record(&mut page);
        self.write_precipitation(&mut page);
        self.write_elevation(&mut page);
        self.write_baseline(&mut page);
        self.write_observed(&mut page);
        self.write_inflow(&mut page);
        self.write_levels(&mut page);
        page.head("Snow model");
        match self.fitted {
            Some(fitted) => page.line("fitted", fitted.words()),
            None => page.line("fitted", "no: its parameters are not fitted to observed snow"),
        }
        if let Some(sets) = self.parameter_sets {
            page.line("sets", sets.words());
        }
        page.line("rain or snow", snow_words::rain_or_snow(self.reader, self.snow));
        for (name, what) in snow_words::options(self.reader, self.snow) {
            page.line(&name.to_lowercase(), what);
        }
        page.head(&format!("Defaults in force: {}", self.defaults.len()));
        for default in self.defaults {
            page.paragraph(&default.to_string());
        }
        page.head(&match self.unlikely.len() {
            0 => "Worth a second look: nothing".to_owned(),
            count => format!("Worth a second look: {}", counted(count, "thing")),
        });
        for notice in self.unlikely {
            page.paragraph(&format!("{}: {}", notice.about, notice.why));
        }
        if let Some(sheet) = self.generator {
            generator_sheet::write(&mut page, sheet, self.reader);
        }
        page.text
    }

    fn write_levels(&self, page: &mut Page) {
        page.head("Warming");
        let names: Vec<String> = self.levels_c.iter().map(|level_c| self.reader.level(*level_c)).collect();
        page.line("levels", names.join(", "));
        page.line("reference", &names[self.reference]);
        if let Some(global) = self.warming.global {
            let of_each = self.levels_c.iter().zip(&names).map(|(level_c, name)| {
                format!("{name} here is {} of global warming", self.reader.level(global.global_c(*level_c)))
            });
            page.line("  as global warming", of_each.collect::<Vec<_>>().join("; "));
        }
        if let Some([lowest, highest]) = self.warming.factors_at_ends(self.basin) {
            let (pct, mean_m) = (self.warming.level_change_pct_per_1000m, self.basin.mean_elevation_m());
            let [lowest, highest] = [lowest, highest].map(|factor| fixed(factor, 2));
            page.line(
                "change with elevation",
                format!(
                    "{}: times {lowest} in the lowest band, {highest} in the highest",
                    self.reader.level_change(pct, mean_m)
                ),
            );
        }
        let changes: Vec<[f64; 12]> = self
            .levels_c
            .iter()
            .map(|level_c| self.warming.precipitation.factor(*level_c).map(|factor| 100.0 * (factor - 1.0)))
            .collect();
        if changes.iter().flatten().all(|change| *change == 0.0) {
            page.line("precipitation", "the same at every level");
        } else {
            let of_each = names.iter().zip(&changes).map(|(name, months)| {
                let [low, high] = [f64::min, f64::max].map(|end| months.iter().copied().fold(months[0], end));
                let range = if low == high {
                    signed(low, 1)
                } else {
                    format!("{} to {}", signed(low, 1), signed(high, 1))
                };
                format!("{range} % at {name}")
            });
            page.line("precipitation", of_each.collect::<Vec<_>>().join(", "));
        }
        if let Some(pct_per_c) = self.warming.wet_day_intensity_pct_per_c {
            let more = self.reader.percent_per_degree(pct_per_c);
            page.line("wet days", format!("{more} on each, and so many that the mean is as said"));
        }
        let [low, high] = [self.warming.tmin_monthly_shape, self.warming.tmax_monthly_shape];
        if low.iter().chain(&high).any(|month| *month != 1.0) {
            page.line("shape for minima", format!("{low:?} from January on"));
            page.line("shape for maxima", format!("{high:?}"));
        }
    }

    fn percent(share: f64) -> String {
        format!("{} %", fixed(100.0 * share, 0))
    }
}
