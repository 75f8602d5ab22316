//! Which generator makes a study's weather, and how it is made from a record.

use super::{Generator, MarkovGamma, YearBlocks};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::fault::{Fault, Unlikely};
use crate::weather::Series;

/// A kind of generator.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum GeneratorChoice {
    /// Whole water years of the record in a new order.
    YearBlocks {
        /// Mean length of a run of consecutive years, at least 1.
        mean_run_years: f64,
    },
    /// Weather drawn day by day.
    MarkovGamma,
}

impl GeneratorChoice {
    /// Its name in a scenario.
    pub fn name(&self) -> &'static str {
        match self {
            Self::YearBlocks { .. } => "year-blocks",
            Self::MarkovGamma => "markov-gamma",
        }
    }

    /// Whether realizations are the record's own years in another order, so that its weather comes again and none other.
    pub fn redraws_years(&self) -> bool {
        match self {
            Self::YearBlocks { .. } => true,
            Self::MarkovGamma => false,
        }
    }

    /// Mean length of a run of the record's years, where it takes such runs.
    pub fn mean_run_years(&self) -> Option<f64> {
        match self {
            Self::YearBlocks { mean_run_years } => Some(*mean_run_years),
            Self::MarkovGamma => None,
        }
    }
}

/// All that a generator is made by, but for the record.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Recipe {
    /// The kind.
    pub choice: GeneratorChoice,
    /// Seed of the study.
    pub seed: u64,
    /// A day is wet whose precipitation lies above this, mm.
    pub wet_day_mm: f64,
    /// The first day of the water year.
    pub water_year_starts: WaterYearStart,
    /// The day before which the cool season ends; it begins with the water year.
    pub cool_season_ends: MonthDay,
}

/// Mean length of the runs in which a record is resampled where the generator states none.
const MEAN_RUN_YEARS: f64 = 2.0;
/// From fewer years the correlation of two seasons' weather cannot be told at all.
const LEAST_YEARS: usize = 4;
/// With fewer, what is fitted month by month is a matter of chance: half a normal of thirty years.
const FEW_YEARS: usize = 15;
/// Fewer wet days do not tell how much falls on one.
const LEAST_WET_DAYS: usize = 30;

impl Recipe {
    /// Makes the generator from a record that is corrected for catch.
    pub fn of<'r>(&self, record: &'r Series) -> Box<dyn Generator + Send + 'r> {
        match self.choice {
            GeneratorChoice::YearBlocks { mean_run_years } => {
                Box::new(YearBlocks { record, seed: self.seed, mean_run_years })
            }
            GeneratorChoice::MarkovGamma => Box::new(MarkovGamma::fit(record, self)),
        }
    }

    /// A record that could have been: the record's years drawn anew in runs, for the uncertainty that comes from having
    /// only this one.
    pub fn resampled_record(&self, record: &Series, number: u32) -> Series {
        let mean_run_years = self.choice.mean_run_years().unwrap_or(MEAN_RUN_YEARS);
        YearBlocks { record, seed: self.seed, mean_run_years }.resampled_record(number)
    }

    /// Whether the generator can be made from a record, and what is unlikely about it.
    ///
    /// # Errors
    /// A record from which it cannot be made.
    pub fn check(&self, record: &Series) -> Result<Option<Unlikely>, Fault> {
        if self.choice != GeneratorChoice::MarkovGamma {
            return Ok(None);
        }
        let years = record.years.len();
        let wet_days = record.precipitation_mm.iter().filter(|mm| **mm > self.wet_day_mm).count();
        let refused = |found: String, expected: String| {
            Err(Fault::key(
                "realizations.generator",
                found,
                expected,
                "take generator = \"year-blocks\", which draws the record's own years",
            ))
        };
        if years < LEAST_YEARS {
            return refused(
                format!("\"markov-gamma\" asked of {years} usable water years"),
                format!("at least {LEAST_YEARS} years, and better {FEW_YEARS} and more"),
            );
        }
        if wet_days < LEAST_WET_DAYS {
            return refused(
                format!("\"markov-gamma\" asked of {wet_days} days with more than {} mm", self.wet_day_mm),
                format!("at least {LEAST_WET_DAYS} wet days"),
            );
        }
        Ok((years < FEW_YEARS).then(|| {
            Unlikely::new(
                "realizations.generator",
                format!(
                    "\"markov-gamma\" is fitted month by month to {years} water years, and from so few much of what it \
                     takes for the climate is chance; \"year-blocks\" fits nothing"
                ),
            )
        }))
    }
}
