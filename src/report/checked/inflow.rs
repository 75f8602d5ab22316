//! Observed inflow: what its file holds.

use super::super::numbers::{counted, fixed};
use super::{Checked, Page};
use crate::units::FlowUnit;
use chrono::NaiveDate;
use serde::Serialize;

/// The file of observed inflow.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct InflowFile<'a> {
    /// Its name, as the scenario has it.
    pub file: &'a str,
    /// The unit of its flows.
    pub unit: FlowUnit,
    /// Days with a reading.
    pub days: usize,
    /// The first of them.
    pub first: NaiveDate,
    /// The last of them.
    pub last: NaiveDate,
    /// Of them, those in the water years in use.
    pub days_in_use: usize,
    /// Of them, those whose flow lies below 0.
    pub days_below_0: usize,
    /// Whether a study fits the routing to it.
    pub is_fitted_to: bool,
}

impl InflowFile<'_> {
    fn words(&self) -> String {
        let unit = FlowUnit::NAMES.iter().find(|(_, unit)| *unit == self.unit).map_or("", |(name, _)| name);
        let days = |days: usize| fixed(days as f64, 0);
        let below = if self.days_below_0 > 0 {
            format!(", {} of them below 0", days(self.days_below_0))
        } else {
            String::new()
        };
        format!(
            "{} with a reading in {unit}, from {} to {}{below}; {} in the water years in use",
            counted(self.days, "day"),
            self.first,
            self.last,
            days(self.days_in_use)
        )
    }
}

impl Checked<'_> {
    pub(super) fn write_inflow(&self, page: &mut Page) {
        let Some(inflow) = &self.inflow else { return };
        page.head("Observed inflow");
        page.line("days", inflow.words());
        let use_of_it = if inflow.is_fitted_to {
            "a study fits [inflow] to it, on half of the years and judged on the other half, then on all of them"
        } else {
            "a study holds modelled inflow against it; nothing is fitted to it"
        };
        page.line("used", use_of_it);
    }
}
