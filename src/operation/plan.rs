//! What is operated, and what is asked of it.

use super::change::Change;
use super::{all_books, inflow_measures, year_books};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::inflow::Routing;
use crate::reservoir::Reservoir;
use crate::season::{Kind, Measure};
use serde::Serialize;

/// Dates and windows.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct OperationSettings {
    /// First day of the water year.
    pub water_year_starts: WaterYearStart,
    /// Windows of inflow, first and last day.
    pub volume_windows: Vec<[MonthDay; 2]>,
    /// Days before which the share of the year's inflow is taken.
    pub shares_before: Vec<MonthDay>,
    /// Days whose storage is taken, as they begin, beside the first of every month.
    pub storage_dates: Vec<MonthDay>,
    /// Whether inflow was observed, so that it may be called so.
    pub is_observed: bool,
}

impl OperationSettings {
    /// What inflow is called: nothing shows that routed water input is inflow where none was observed.
    pub fn word(&self) -> &'static str {
        if self.is_observed { "inflow" } else { "water input, routed" }
    }

    /// The same where the sentence goes on.
    pub fn word_within(&self) -> &'static str {
        if self.is_observed { "inflow" } else { "water input, routed," }
    }

    /// The first window that does not begin before a day of the water year; the windows' volumes come first among the measures.
    pub fn window_from(&self, day: MonthDay) -> Option<usize> {
        let first = self.water_year_starts.first_day(2001);
        let at = |day: MonthDay| crate::calendar::day_of_water_year(first, day);
        self.volume_windows.iter().position(|[from, _]| at(*from) >= at(day))
    }

    /// The months, 0 for January, from the water year's first day on.
    pub(super) fn months(&self) -> impl Iterator<Item = usize> + Clone {
        let first = self.water_year_starts.0.month() as usize - 1;
        (0..12).map(move |month| (first + month) % 12)
    }

    /// Days whose storage is taken, in the order of the water year.
    pub(super) fn all_storage_dates(&self) -> Vec<MonthDay> {
        let firsts = (1..=12).filter_map(|month| MonthDay::new(month, 1));
        let mut all: Vec<MonthDay> = firsts.chain(self.storage_dates.iter().copied()).collect();
        let first = self.water_year_starts.first_day(2001);
        all.sort_by_key(|day| crate::calendar::day_of_water_year(first, *day));
        all.dedup();
        all
    }

    #[cfg(test)]
    pub(super) fn of_tests() -> Self {
        let day = |month, day| MonthDay::new(month, day).unwrap();
        Self {
            water_year_starts: WaterYearStart(day(10, 1)),
            volume_windows: vec![[day(4, 1), day(7, 31)]],
            shares_before: vec![day(4, 1)],
            storage_dates: vec![day(4, 1), day(7, 1)],
            is_observed: true,
        }
    }
}

/// A basin whose water input is routed and, where there is a reservoir, stored and released.
#[derive(Debug, Clone, PartialEq)]
pub struct Operation {
    /// Dates and windows.
    pub settings: OperationSettings,
    /// Area of the basin, km2.
    pub area_km2: f64,
    /// How water input becomes inflow.
    pub routing: Routing,
    /// The reservoir, if there is one.
    pub reservoir: Option<Reservoir>,
    /// What else is tried of its rules.
    pub changes: Vec<Change>,
}

impl Operation {
    /// What is measured of every year: of its inflow, and of its storage.
    pub fn yearly(&self) -> Vec<Measure> {
        let mut list = inflow_measures::list(&self.settings);
        if self.reservoir.is_some() {
            list.extend(year_books::list(&self.settings));
        }
        list
    }

    /// What is measured over a whole realization.
    pub fn over_years(&self) -> Vec<Measure> {
        if self.reservoir.is_some() { all_books::list() } else { Vec::new() }
    }

    /// Both, in that order.
    pub fn measures(&self) -> Vec<Measure> {
        let mut all = self.yearly();
        all.extend(self.over_years());
        all
    }

    /// The same with its rules as stated alone.
    #[must_use]
    pub fn as_stated(&self) -> Self {
        Self { changes: Vec::new(), ..self.clone() }
    }

    /// What the numbers of [`Self::yearly`] count.
    pub fn yearly_kinds(&self) -> Vec<Kind> {
        self.yearly().iter().map(|measure| measure.kind).collect()
    }

    /// The rules as stated, and what else is tried; none without a reservoir.
    pub fn tried(&self) -> Vec<Change> {
        let changes = self.changes.iter().copied();
        if self.reservoir.is_some() {
            [Change::AsStated].into_iter().chain(changes).collect()
        } else {
            Vec::new()
        }
    }
}
