//! A column a month, from the water year's first, and one each for seasons and the year.

use super::super::sheet::{Drawn, HPos, Sheet, VPos};
use super::super::theme::LABEL;
use crate::findings::{GeneratorSheet, Period};

/// Width of a month's column, and of a season's or the year's, px.
const WIDTHS_PX: [f64; 2] = [28.0, 36.0];
/// Space between the months and the rest, px.
const GAP_PX: f64 = 6.0;

/// The columns and their middles.
pub(super) struct Columns {
    middles: Vec<(Period, f64)>,
    right: f64,
}

impl Columns {
    /// Of the parts of the year that the sheet has, from `left` on.
    pub fn new(sheet: &GeneratorSheet, left: f64) -> Self {
        let periods =
            || sheet.statistics.iter().flat_map(|statistic| &statistic.lines).map(|line| line.period);
        let mut columns: Vec<Period> = Vec::new();
        for period in periods().filter(|period| matches!(period, Period::Month(_))) {
            if !columns.contains(&period) {
                columns.push(period);
            }
        }
        let others = [Period::CoolSeason, Period::WarmSeason, Period::WaterYear];
        columns.extend(others.into_iter().filter(|other| periods().any(|period| period == *other)));
        let mut right = left;
        let mut are_months = true;
        let mut middles = Vec::with_capacity(columns.len());
        for period in columns {
            let is_month = matches!(period, Period::Month(_));
            if are_months && !is_month {
                right += GAP_PX;
            }
            are_months = is_month;
            let width = WIDTHS_PX[usize::from(!is_month)];
            middles.push((period, right + width / 2.0));
            right += width;
        }
        Self { middles, right }
    }

    /// The middle of a column.
    pub fn middle(&self, period: Period) -> Option<f64> {
        self.middles.iter().find(|(of, _)| *of == period).map(|(_, middle)| *middle)
    }

    /// Where they end.
    pub fn right(&self) -> f64 {
        self.right
    }

    /// The columns' names above `bottom`.
    pub fn write(&self, sheet: &Sheet, bottom: f64) -> Drawn {
        self.middles.iter().try_for_each(|(period, middle)| {
            sheet.write(short(*period), (*middle, bottom - 3.0), LABEL, HPos::Center, VPos::Bottom)
        })
    }
}

/// `J`, `cool`, `year`.
fn short(period: Period) -> &'static str {
    match period {
        Period::Month(_) => period.words().get(..1).unwrap_or(""),
        Period::CoolSeason => "cool",
        Period::WarmSeason => "warm",
        Period::WaterYear => "year",
    }
}
