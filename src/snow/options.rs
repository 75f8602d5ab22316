//! Parts of the snow model that are off unless asked for, each with its numbers and their valid ranges.

use crate::fault::{Fault, Unlikely, within};
use serde::Serialize;

/// Which options are on. The default is none, and leaves the plain model's numbers untouched, to the bit.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct SnowOptions {
    /// Melt that also goes with the potential clear-sky radiation on the slope.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub radiation: Option<Radiation>,
    /// Snow that lies unevenly within a band.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub patchiness: Option<Patchiness>,
    /// A cold store that must be paid off before water leaves the pack.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub cold_content: Option<ColdContent>,
    /// Snow that goes into the air.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub sublimation: Option<Sublimation>,
    /// Whether rain and snow are told apart by the wet-bulb temperature.
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    pub wet_bulb: bool,
    /// Whether every water year begins on bare ground.
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    pub start_bare_each_year: bool,
}

/// Melt by radiation (after Hock 1999): potential melt is `(D + a*I)*E+`, I the day's potential clear-sky radiation on the
/// band's slope over the year's highest on level ground.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Radiation {
    /// a, mm per degC and day at the year's highest radiation.
    pub factor_mm_per_c_day: f64,
}

/// Snow that lies unevenly: snowfall within a band is lognormal, in classes of equal area.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Patchiness {
    /// Standard deviation of the snowfall within a band over its mean.
    pub coefficient_of_variation: f64,
    /// Classes of equal area in a band.
    pub classes: usize,
}

/// A store of cold: how much water would have to freeze before the pack is at 0 degC.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ColdContent {
    /// Share of the difference between the pack's temperature and the air's that a day closes.
    pub daily_share: f64,
}

/// Snow that goes into the air.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Sublimation {
    /// Loss of a day with snow on the ground, mm, January first.
    pub mm_per_day: [f64; 12],
    /// Loss as a share of the day's snowfall.
    pub snowfall_fraction: f64,
}

impl Radiation {
    /// What holds where none is stated.
    pub const FACTOR_MM_PER_C_DAY: f64 = 2.5;
}

impl Patchiness {
    /// As many classes as the scenario does not have to state.
    pub const CLASSES: usize = 10;
    /// More classes than this change nothing but the time a run takes.
    pub const MOST_CLASSES: usize = 100;
}

impl ColdContent {
    /// The share that holds where none is stated.
    pub const DAILY_SHARE: f64 = 0.3;
}

impl SnowOptions {
    /// The same at a point, as a snow pillow measures it: without what describes an area.
    pub fn at_a_point(self) -> Self {
        Self { patchiness: None, ..self }
    }

    pub(super) fn check(&self, faults: &mut Vec<Fault>) {
        if let Some(Radiation { factor_mm_per_c_day }) = self.radiation {
            let mend = "what full summer sun adds to the degree-day factor; 2 to 4 is usual";
            let key = "snow.radiation.factor_mm_per_c_day";
            within(faults, key, factor_mm_per_c_day, 0.0..=50.0, "mm per degC and day", mend);
        }
        if let Some(Patchiness { coefficient_of_variation, .. }) = self.patchiness {
            let mend = "0.1 for even snow, 0.4 for open hills, 0.8 for wind-blown ridges";
            let key = "snow.patchiness.coefficient_of_variation";
            within(faults, key, coefficient_of_variation, 0.0..=3.0, "", mend);
        }
        if let Some(ColdContent { daily_share }) = self.cold_content {
            let mend = "0.3 lets the pack follow the air within some three days";
            within(faults, "snow.cold_content.daily_share", daily_share, 0.0..=1.0, "", mend);
        }
        if let Some(Sublimation { mm_per_day, snowfall_fraction }) = self.sublimation {
            // One number that is typed stands in several months: it is one fault.
            let mut told: Vec<u64> = Vec::new();
            for mm in mm_per_day {
                if told.contains(&mm.to_bits()) {
                    continue;
                }
                told.push(mm.to_bits());
                let mend = "winter losses of 0.2 to 1 mm a day are usual";
                within(faults, "snow.sublimation.mm_per_day", mm, 0.0..=10.0, "mm a day", mend);
            }
            let mend = "give a fraction, 0.1 for 10 %";
            within(faults, "snow.sublimation.snowfall_fraction", snowfall_fraction, 0.0..=1.0, "", mend);
        }
    }

    pub(super) fn unlikely(&self) -> Vec<Unlikely> {
        let mut found = Vec::new();
        let mut usual = |key: &str, value: f64, range: std::ops::RangeInclusive<f64>, why: &str| {
            if !range.contains(&value) {
                found.push(Unlikely::new(key, format!("{value}; usual is {why}")));
            }
        };
        if let Some(Patchiness { coefficient_of_variation, .. }) = self.patchiness {
            let why = "0.1 to 0.9 (Liston 2004, from memory)";
            usual("snow.patchiness.coefficient_of_variation", coefficient_of_variation, 0.0..=0.9, why);
        }
        if let Some(ColdContent { daily_share }) = self.cold_content {
            let why = "0.05 to 0.5: with 1 the pack is as cold as the air of each day";
            usual("snow.cold_content.daily_share", daily_share, 0.05..=0.5, why);
        }
        if let Some(Sublimation { mm_per_day, snowfall_fraction }) = self.sublimation {
            let most = mm_per_day.iter().copied().fold(0.0, f64::max);
            usual("snow.sublimation.mm_per_day", most, 0.0..=1.5, "up to 1.5 mm a day (common practice)");
            let why = "up to 0.35: a third of the snowfall at most goes back to the air from trees (common practice)";
            usual("snow.sublimation.snowfall_fraction", snowfall_fraction, 0.0..=0.35, why);
        }
        found
    }
}
