//! Observed and modelled SWE as a pair of lines: how both are drawn, and which is which.

use super::sheet::{Drawn, HPos, Plot, Px, Sheet, Stroke, VPos};
use super::theme::{INK, LABEL, MARGIN_PX, MODELLED, WIDTH_PX};
use super::thin::{TOLERANCE_PX, thinned};
use crate::fit::DayPair;
use crate::observed::Kind;
use crate::units::Unit;

/// Width of the modelled line, px.
const MODELLED_PX: f64 = 1.6;
/// Width of the observed line, px; it shows on both sides of the modelled one where they meet.
const OBSERVED_PX: f64 = 2.6;
/// Radius of a survey's dot, px.
const DOT_PX: f64 = 2.8;
/// Length of a line in the key, px.
const SAMPLE_PX: f64 = 22.0;

/// Draws a year's days into a plot whose x counts them from 1. Observed, where `kind` says how it is: a dot a survey of
/// a course; a line through the days of a pillow, broken where there is no reading.
pub(super) fn draw(sheet: &Sheet, plot: &Plot, days: &[DayPair], kind: Option<Kind>, depth: Unit) -> Drawn {
    let place = |day: usize, swe_mm: f64| plot.at((day + 1) as f64, depth.of(swe_mm));
    let days = || days.iter().enumerate();
    let observed: Vec<Option<Px>> =
        days().map(|(day, pair)| pair.observed_mm.map(|swe_mm| place(day, swe_mm))).collect();
    match kind {
        None => {}
        Some(Kind::Course) => {
            observed.into_iter().flatten().try_for_each(|place| sheet.dot(place, DOT_PX, INK))?;
        }
        Some(Kind::Pillow) => {
            for run in observed.split(Option::is_none) {
                match run.iter().copied().flatten().collect::<Vec<Px>>().as_slice() {
                    [] => {}
                    [alone] => sheet.dot(*alone, OBSERVED_PX / 2.0, INK)?,
                    line => sheet.line(&thinned(line, TOLERANCE_PX), Stroke::solid(INK, OBSERVED_PX))?,
                }
            }
        }
    }
    let modelled: Vec<Px> = days().map(|(day, pair)| place(day, pair.modelled_mm)).collect();
    sheet.line(&thinned(&modelled, TOLERANCE_PX), Stroke::solid(MODELLED, MODELLED_PX))
}

/// Names the lines once, from the right margin leftwards.
pub(super) fn name(sheet: &Sheet, kind: Option<Kind>, baseline: f64) -> Drawn {
    let mut right = WIDTH_PX - MARGIN_PX;
    let middle = baseline - 4.5;
    let observed = kind.map(|kind| ("observed", Some(kind)));
    for (name, observed) in [("modelled", None)].into_iter().chain(observed) {
        sheet.write(name, (right, baseline), LABEL, HPos::Right, VPos::Bottom)?;
        let to = right - LABEL.width(name) - 7.0;
        let line = [(to - SAMPLE_PX, middle), (to, middle)];
        match observed {
            None => sheet.line(&line, Stroke::solid(MODELLED, MODELLED_PX))?,
            Some(Kind::Pillow) => sheet.line(&line, Stroke::solid(INK, OBSERVED_PX))?,
            Some(Kind::Course) => sheet.dot((to - 6.0, middle), DOT_PX, INK)?,
        }
        right = to - SAMPLE_PX - 18.0;
    }
    Ok(())
}
