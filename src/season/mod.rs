//! Season measures: what a water year comes to, for every band and basin mean at once (method, section 9).
//!
//! One list of families, one file a family. A family names its measures and takes them from a year block; a new one is
//! its own file and one line of `FAMILIES`.
//!
//! In rows of numbers a measure that has no value is [`NONE`], and snow that never went is [`NOT_GONE`]: ordered as the
//! statistics want them, before and after every date. [`Outcome`] is the same, said in words.

mod cover;
mod measure;
mod melt;
mod outflow;
mod period;
mod rows;
mod state;

pub use cover::{SEASONAL_COVER_DAYS, is_seasonal, longest_cover_days};
pub use measure::{Kind, Measure, NONE, NOT_GONE, Outcome, Place};
pub use melt::keeps_snow;
pub use period::period_value;

use crate::calendar::{MonthDay, WaterYearStart};
use crate::snow::YearBlock;
use serde::Serialize;

/// Timing is taken of no year whose peak stays below this, mm.
pub const LEAST_PEAK_MM: f64 = 10.0;
/// Dates of net melt are taken of no year that melts less, mm.
const LEAST_MELT_MM: f64 = 1.0;
/// A band with less is bare, mm.
pub const BARE_MM: f64 = 1.0;
/// A basin with this share of its peak left has melted out.
const BASIN_MELT_OUT_SHARE: f64 = 0.05;

/// SWE that differs by less is the same but for rounding, mm.
pub const SAME_SWE_MM: f64 = 1e-9;

/// Dates and windows of a season.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SeasonSettings {
    /// First day of the water year.
    pub water_year_starts: WaterYearStart,
    /// Days whose SWE is taken; the first is the headline's, and ends the cool season.
    pub survey_dates: Vec<MonthDay>,
    /// Windows of outflow and water input, first and last day.
    pub volume_windows: Vec<[MonthDay; 2]>,
}

/// A family of measures: what it has, and how it takes them.
struct Family {
    list: fn(&SeasonSettings) -> Vec<Measure>,
    take: fn(&mut YearBlock, &Peaks, &SeasonSettings, &mut [f64]),
}

/// Every family. Those that only read come before `melt`, which accumulates the block's net melt in place.
const FAMILIES: [Family; 3] = [
    Family { list: state::list, take: state::take },
    Family { list: outflow::list, take: outflow::take },
    Family { list: melt::list, take: melt::take },
];

/// Each column's highest SWE and its day, which most families need.
struct Peaks {
    swe_mm: Vec<f64>,
    day: Vec<f64>,
}

/// The measures of a study.
pub struct Measures {
    settings: SeasonSettings,
    list: Vec<Measure>,
    counts: [usize; FAMILIES.len()],
}

impl Measures {
    /// Every measure that the settings ask for.
    pub fn new(settings: SeasonSettings) -> Self {
        let lists = FAMILIES.map(|family| (family.list)(&settings));
        let counts = [0, 1, 2].map(|family: usize| lists[family].len());
        Self { settings, list: lists.into_iter().flatten().collect(), counts }
    }

    /// The measures, in the order in which they are taken.
    pub fn list(&self) -> &[Measure] {
        &self.list
    }

    /// Dates and windows.
    pub fn settings(&self) -> &SeasonSettings {
        &self.settings
    }

    /// Takes every measure of every column of a year into `[measure][column]`.
    ///
    /// The block's net melt is accumulated in place: take the measures last.
    pub fn take(&self, block: &mut YearBlock, into: &mut [f64]) {
        let width = block.width;
        let mut peaks = Peaks { swe_mm: vec![0.0; width], day: vec![1.0; width] };
        rows::highest(&block.swe_mm[..block.days * width], &mut peaks.swe_mm, &mut peaks.day);
        let mut rest = into;
        for (family, count) in FAMILIES.iter().zip(self.counts) {
            let (part, after) = rest.split_at_mut(count * width);
            (family.take)(block, &peaks, &self.settings, part);
            rest = after;
        }
    }
}
