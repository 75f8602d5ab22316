//! Season measures: what a water year comes to, for every band and basin mean at once (method, section 9).
//!
//! One list of families, one file a family. A family names its measures and takes them from a year block; a new one is
//! its own file and one line of `FAMILIES`.
//!
//! In rows of numbers a measure that has no value is [`NONE`], snow that never went is [`NOT_GONE`], and what has not come
//! [`NOT_REACHED`]: ordered as the statistics want them, before and after every date. [`Outcome`] is the same, said in
//! words; [`Kind::outcome`] makes it of a number.

mod arrival;
mod cover;
mod covered;
mod kind;
mod measure;
mod melt;
mod outflow;
mod period;
mod precipitation;
mod rows;
mod state;
mod sublimation;
mod sums;
mod taken_away;

pub use crate::snow::BARE_MM;
pub use cover::{SEASONAL_COVER_DAYS, is_seasonal, longest_cover_days};
pub use kind::{Kind, LEAST_REFERENCE_MM};
pub use measure::{Measure, NONE, NOT_GONE, NOT_REACHED, Outcome, Place};
pub use melt::{MELT_OUT_DAY, keeps_snow};
pub use period::period_value;
pub use precipitation::precipitation_before;

use crate::calendar::{MonthDay, WaterYearStart};
use crate::fault::Unlikely;
use crate::snow::YearBlock;
use serde::Serialize;

/// Timing is taken of no year whose peak stays below this, mm.
pub const LEAST_PEAK_MM: f64 = 10.0;
/// Dates of net melt are taken of no year that melts less, mm.
const LEAST_MELT_MM: f64 = 1.0;
/// A basin with this share of its peak left has melted out.
const BASIN_MELT_OUT_SHARE: f64 = 0.05;
/// A day of rain on snow has as much of both, mm: common practice.
pub const RAIN_ON_SNOW_MM: f64 = 10.0;

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
    /// Days before and from which outflow and water input are summed.
    pub outflow_before: Vec<MonthDay>,
    /// Days before which the share of the year's net melt is taken.
    pub melt_shares_before: Vec<MonthDay>,
    /// A volume whose arrival is dated, hm3.
    pub arrival_volume_hm3: Option<f64>,
}

impl SeasonSettings {
    /// Whether the volume to wait for is more than a whole year's mean precipitation over the basin.
    pub fn unlikely(&self, yearly_precipitation_hm3: f64) -> Option<Unlikely> {
        let volume_hm3 =
            self.arrival_volume_hm3.filter(|volume_hm3| *volume_hm3 > yearly_precipitation_hm3)?;
        Some(Unlikely::new(
            "season.arrival_volume_hm3",
            format!(
                "{volume_hm3} hm3 are more than the rain and snow of a whole mean year over the basin, \
                 {yearly_precipitation_hm3:.0} hm3; a thousand acre-feet are 1.23348 hm3"
            ),
        ))
    }
}

/// A family of measures: what it has, and how it takes them.
struct Family {
    list: fn(&SeasonSettings) -> Vec<Measure>,
    take: fn(&mut YearBlock, &Peaks, &Asked, &mut [f64]),
}

/// Every family, that of the snow that lies first. Those that only read come before `melt`, which accumulates the block's net melt in place.
static FAMILIES: &[Family] = &[
    Family { list: state::list, take: state::take },
    Family { list: outflow::list, take: outflow::take },
    Family { list: arrival::list, take: arrival::take },
    Family { list: precipitation::list, take: precipitation::take },
    Family { list: covered::list, take: covered::take },
    Family { list: melt::list, take: melt::take },
];

/// The families of the snow that lies, of the water that leaves it, and of when it lies and goes.
static OF_SNOW_WATER_AND_TIMING: &[Family] = &[
    Family { list: state::list, take: state::take },
    Family { list: outflow::list, take: outflow::take },
    Family { list: covered::list, take: covered::take },
    Family { list: melt::list, take: melt::take },
];

/// The family that is taken only of snow that the air can take.
static OF_SUBLIMATION: Family = Family { list: sublimation::list, take: sublimation::take };

/// The family that is taken only where every year begins on bare ground.
static OF_SNOW_TAKEN_AWAY: Family = Family { list: taken_away::list, take: taken_away::take };

/// What is asked of every year.
struct Asked {
    settings: SeasonSettings,
    /// The volume whose arrival is dated, as water over the whole basin, mm.
    arrival_mm: Option<f64>,
}

/// Each column's highest SWE and its day, which most families need.
struct Peaks {
    swe_mm: Vec<f64>,
    day: Vec<f64>,
}

/// The measures of a study.
pub struct Measures {
    asked: Asked,
    list: Vec<Measure>,
    /// The families that are taken, each with how many measures it has.
    families: Vec<(&'static Family, usize)>,
}

impl Measures {
    /// Every measure that the settings ask for, of a basin of so many km2.
    pub fn new(settings: SeasonSettings, basin_area_km2: f64) -> Self {
        Self::of_families(FAMILIES, settings, basin_area_km2)
    }

    /// The snow that lies alone, whose first measure is the headline's: for runs that are asked for nothing else.
    pub fn of_snow(settings: SeasonSettings, basin_area_km2: f64) -> Self {
        Self::of_families(&FAMILIES[..1], settings, basin_area_km2)
    }

    /// The same, the water that leaves it, and when it lies and goes.
    pub fn of_snow_water_and_timing(settings: SeasonSettings, basin_area_km2: f64) -> Self {
        Self::of_families(OF_SNOW_WATER_AND_TIMING, settings, basin_area_km2)
    }

    /// The same, and what the air takes of the snow.
    pub fn with_sublimation(self) -> Self {
        self.with(&OF_SUBLIMATION)
    }

    /// The same, and the snow that is taken away as a year ends.
    pub fn with_snow_taken_away(self) -> Self {
        self.with(&OF_SNOW_TAKEN_AWAY)
    }

    fn with(mut self, family: &'static Family) -> Self {
        let more = (family.list)(&self.asked.settings);
        self.families.push((family, more.len()));
        self.list.extend(more);
        self
    }

    fn of_families(families: &'static [Family], settings: SeasonSettings, basin_area_km2: f64) -> Self {
        let lists: Vec<Vec<Measure>> = families.iter().map(|family| (family.list)(&settings)).collect();
        let families = families.iter().zip(lists.iter().map(Vec::len)).collect();
        // 1 hm3 over 1 km2 is 1 m of water.
        let arrival_mm = settings.arrival_volume_hm3.map(|volume_hm3| 1000.0 * volume_hm3 / basin_area_km2);
        Self { asked: Asked { settings, arrival_mm }, list: lists.into_iter().flatten().collect(), families }
    }

    /// The measures, in the order in which they are taken.
    pub fn list(&self) -> &[Measure] {
        &self.list
    }

    /// Dates and windows.
    pub fn settings(&self) -> &SeasonSettings {
        &self.asked.settings
    }

    /// Takes every measure of every column of a year into `[measure][column]`.
    ///
    /// The block's net melt is accumulated in place: take the measures last.
    pub fn take(&self, block: &mut YearBlock, into: &mut [f64]) {
        let width = block.width;
        let mut peaks = Peaks { swe_mm: vec![0.0; width], day: vec![1.0; width] };
        rows::highest(&block.swe_mm[..block.days * width], &mut peaks.swe_mm, &mut peaks.day);
        let mut rest = into;
        for (family, count) in &self.families {
            let (part, after) = rest.split_at_mut(count * width);
            (family.take)(block, &peaks, &self.asked, part);
            rest = after;
        }
    }
}

/// A day of the year within a measure's name: `04_01`.
pub(crate) fn name_of(day: MonthDay) -> String {
    day.to_string().replace('-', "_")
}
