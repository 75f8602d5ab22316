//! Baseline years: those whose median is the normal that single years are held against.

use crate::fault::{Fault, Unlikely};
use crate::weather::YearSpan;
use serde::Serialize;

/// The scenario's key for them.
pub const BASELINE_YEARS_KEY: &str = "weather.baseline_years";
/// The normal period in use where none is stated (WMO climatological standard normals, 1991-2020).
pub const USUAL_BASELINE: [i32; 2] = [1991, 2020];
/// The usual period serves where at least this many of its years are in use.
pub const ENOUGH_BASELINE_YEARS: usize = 20;

/// Where baseline years come from.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum BaselineChoice {
    /// The scenario states them.
    Stated,
    /// 1991 to 2020.
    Usual,
    /// All years in use, since too few of 1991 to 2020 are.
    AllInUse,
}

/// The baseline years of a record.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct BaselineYears {
    /// First water year of the period.
    pub first: i32,
    /// Its last.
    pub last: i32,
    /// Years of the period that are in use; never 0.
    pub in_use: usize,
    /// Where the period comes from.
    pub choice: BaselineChoice,
}

impl BaselineYears {
    /// The period as stated, else 1991 to 2020 where at least 20 of its years are in use, else all years in use. `years`
    /// are those in use, in order, at least one.
    ///
    /// # Errors
    /// A stated period none of whose years is in use.
    pub fn of(stated: Option<[i32; 2]>, years: &[YearSpan]) -> Result<Self, Fault> {
        let within = |[first, last]: [i32; 2]| {
            years.iter().filter(|year| (first..=last).contains(&year.water_year)).count()
        };
        let whole = years
            .first()
            .zip(years.last())
            .map_or(USUAL_BASELINE, |(first, last)| [first.water_year, last.water_year]);
        let (choice, [first, last]) = match stated {
            Some(stated) if within(stated) == 0 => {
                return Err(Fault::key(
                    BASELINE_YEARS_KEY,
                    format!("{} to {}, of which no water year is in use", stated[0], stated[1]),
                    "the first and the last water year of a period with years in use",
                    format!(
                        "the years in use lie from {} to {}: baseline_years = {whole:?}",
                        whole[0], whole[1]
                    ),
                ));
            }
            Some(stated) => (BaselineChoice::Stated, stated),
            None if within(USUAL_BASELINE) >= ENOUGH_BASELINE_YEARS => {
                (BaselineChoice::Usual, USUAL_BASELINE)
            }
            None => (BaselineChoice::AllInUse, whole),
        };
        Ok(Self { first, last, in_use: within([first, last]), choice })
    }

    /// Whether a water year lies in the period.
    pub fn holds(&self, water_year: i32) -> bool {
        (self.first..=self.last).contains(&water_year)
    }

    /// A stated period with few years in use. A short record is no choice of anybody's.
    pub fn unlikely(&self) -> Option<Unlikely> {
        (self.choice == BaselineChoice::Stated && self.in_use < ENOUGH_BASELINE_YEARS).then(|| {
            Unlikely::new(
                BASELINE_YEARS_KEY,
                format!(
                    "of the water years {} to {}, {} in use: a median of fewer than {ENOUGH_BASELINE_YEARS} years is itself \
                     uncertain",
                    self.first,
                    self.last,
                    if self.in_use == 1 { "1 is".to_owned() } else { format!("{} are", self.in_use) }
                ),
            )
        })
    }
}
