//! What the figure says.

use super::super::ensemble;
use super::super::labels::{grouped, level, sentence, size_and_unit, volume};
use super::super::shown::{Shown, name};
use super::columns::in_years;
use crate::findings::{Exceeded, Findings, LevelFindings, MeasureFindings};
use crate::units::UnitSystem;

/// Every text of the figure but names and numbers beside marks.
pub(super) struct Words {
    pub title: String,
    pub ensemble: String,
    pub axis: String,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
}

impl Words {
    /// Nothing where the reference, or the level farthest from it, has no volumes.
    pub fn of(
        findings: &Findings,
        measure: &MeasureFindings,
        shown: &Shown,
        units: UnitSystem,
    ) -> Option<Self> {
        let window = sentence(&measure.measure.title);
        let unit = units.volume().word;
        let reference = measure.levels.get(findings.reference)?;
        let driest = |found: &LevelFindings| found.exceeded.first().copied();
        let at_reference = driest(reference)?;
        let farthest = shown.farthest().and_then(|at| measure.levels.get(at));
        let elsewhere = match farthest {
            Some(found) => Some((level(units, found.level_c), driest(found)?)),
            None => None,
        };
        let [volumes, depths] = [
            |found: &Exceeded, units| {
                format!("{} {}", volume(units, found.volume_hm3.value), units.volume().word)
            },
            |found: &Exceeded, units| size_and_unit(units, found.amount_mm.value),
        ];
        let at_both = |said: fn(&Exceeded, UnitSystem) -> String| {
            let there = elsewhere.as_ref().map_or_else(
                || "; no other level was run".to_owned(),
                |(place, found)| format!(", {} at {place}", said(found, units)),
            );
            format!("{} at the reference{there}", said(&at_reference, units))
        };
        let of_ten = at_reference.chance_pct / 10;
        let which = shown.in_words(findings, units);
        let years = reference.single_years.as_ref().map_or(0, |years| years.count);
        let counted = format!("{} single years a level", grouped(years as f64, 0));
        let drawn: Vec<(usize, &LevelFindings)> =
            shown.all().into_iter().filter_map(|at| Some((at, measure.levels.get(at)?))).collect();
        let described = drawn.iter().map(|(at, found)| {
            let volumes = found.exceeded.iter().map(|found| {
                format!("{} in {}", volume(units, found.volume_hm3.value), in_years(found.chance_pct))
            });
            format!("{}: {}", name(findings, *at, units), volumes.collect::<Vec<_>>().join(", "))
        });
        Some(Self {
            title: format!("{window}: in {of_ten} of 10 years at least {}", at_both(volumes)),
            ensemble: format!("{}: {counted}.{which}", ensemble(findings)),
            axis: format!("{window} ({unit})"),
            key: format!(
                "Mark: what that share of single years brings at least, at each level; numbers below in {unit}. Water leaving \
                 the snowpack, not streamflow."
            ),
            caption: format!(
                "{window}: the volume that 90, 70, 50, 30 and 10 % of years bring at least, at each warming level, over \
                 {counted}, those of {}.{which} It is water leaving the snowpack, summed over the basin's area, not \
                 streamflow, and no forecast of any year. As a depth over the basin, in {of_ten} of 10 years: at \
                 least {}. {}",
                ensemble(findings),
                at_both(depths),
                error(findings, &drawn, units),
            ),
            kind_of_drawing: format!(
                "Marks of {} levels, joined, by chance of at least as much.",
                drawn.len()
            ),
            description: format!(
                "{window}, {unit}, at least. {}.",
                sentence(&described.collect::<Vec<_>>().join("; "))
            ),
        })
    }
}

/// How far other realizations would move the volumes.
fn error(findings: &Findings, drawn: &[(usize, &LevelFindings)], units: UnitSystem) -> String {
    let errors: Option<Vec<f64>> = drawn
        .iter()
        .flat_map(|(_, found)| &found.exceeded)
        .map(|found| found.volume_hm3.monte_carlo_error)
        .collect();
    match errors {
        Some(errors) if findings.realizations > 1 => format!(
            "The Monte Carlo error, one standard deviation, is {} {} at most.",
            volume(units, errors.into_iter().fold(0.0, f64::max)),
            units.volume().word
        ),
        _ => "How far other realizations would move these numbers is not known.".to_owned(),
    }
}
