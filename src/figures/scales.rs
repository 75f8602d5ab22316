//! Axes as they are drawn: amounts upwards, amounts to the right, the months of a year.

use super::axes::{AmountTicks, Calendar, Month};
use super::sheet::{Drawn, HPos, Plot, Sheet, Stroke, VPos};
use super::theme::{EDGE, LABEL};

const LINE: Stroke = Stroke::solid(EDGE, 1.0);
const TICK_PX: f64 = 5.0;
/// From an axis to its labels, px.
pub(super) const TO_LABEL_PX: f64 = 9.0;
/// Least space between the names of two months, px.
const BETWEEN_MONTHS_PX: f64 = 4.0;
/// Months that are named are at most so many apart.
const MOST_APART: usize = 4;

/// Width of the widest tick label, px.
pub(super) fn width(ticks: &AmountTicks) -> f64 {
    ticks.ticks.iter().map(|(_, label)| LABEL.width(label)).fold(0.0, f64::max)
}

/// Left and bottom line of a plot that counts amounts upwards, and its ticks.
pub(super) fn upwards(sheet: &Sheet, plot: &Plot, ticks: &AmountTicks, [left, right]: [f64; 2]) -> Drawn {
    let height = |amount: f64| plot.at(0.0, amount).1;
    sheet.line(&[(left, height(0.0)), (right, height(0.0))], LINE)?;
    sheet.line(&[(left, height(0.0)), (left, height(ticks.top()))], LINE)?;
    ticks.ticks.iter().try_for_each(|(amount, _)| {
        sheet.line(&[(left - TICK_PX, height(*amount)), (left, height(*amount))], LINE)
    })
}

/// The amounts at the ticks of [`upwards`].
pub(super) fn amounts_upwards(sheet: &Sheet, plot: &Plot, ticks: &AmountTicks, left: f64) -> Drawn {
    ticks.ticks.iter().try_for_each(|(amount, label)| {
        let place = (left - TO_LABEL_PX, plot.at(0.0, *amount).1);
        sheet.write(label, place, LABEL, HPos::Right, VPos::Center)
    })
}

/// Bottom line of a plot that counts amounts to the right, its ticks and their amounts.
pub(super) fn rightwards(sheet: &Sheet, plot: &Plot, ticks: &AmountTicks, bottom: f64) -> Drawn {
    let across = |amount: f64| plot.at(amount, 0.0).0;
    sheet.line(&[(across(0.0), bottom), (across(ticks.top()), bottom)], LINE)?;
    ticks.ticks.iter().try_for_each(|(amount, label)| {
        let x = across(*amount);
        sheet.line(&[(x, bottom), (x, bottom + TICK_PX)], LINE)?;
        sheet.write(label, (x, bottom + TO_LABEL_PX), LABEL, HPos::Center, VPos::Top)
    })
}

/// A tick where each month begins, and as many of the months' names as there is room for, evenly.
pub(super) fn months(sheet: &Sheet, plot: &Plot, calendar: &Calendar, bottom: f64) -> Drawn {
    let across = |day: f64| plot.at(day, 0.0).0;
    let months = calendar.months();
    let name = |month: &Month| month.name.get(..3).unwrap_or(month.name);
    let fits = |apart: &usize| {
        let whole = months.iter().filter(|month| month.is_whole());
        let needs = |month: &Month| LABEL.width(name(month)) + BETWEEN_MONTHS_PX;
        whole
            .into_iter()
            .all(|month| needs(month) <= *apart as f64 * (across(month.days.end) - across(month.days.start)))
    };
    let apart = (1..MOST_APART).find(fits).unwrap_or(MOST_APART);
    for month in months.iter().filter(|month| month.begins) {
        let x = across(month.days.start);
        sheet.line(&[(x, bottom), (x, bottom + TICK_PX)], LINE)?;
    }
    for month in months.iter().filter(|month| month.is_whole()).step_by(apart) {
        let middle = (across(month.days.start) + across(month.days.end)) / 2.0;
        sheet.write(name(month), (middle, bottom + TO_LABEL_PX), LABEL, HPos::Center, VPos::Top)?;
    }
    Ok(())
}
