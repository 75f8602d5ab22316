//! `[findings.surface]`: the grid of the response surface.

use super::super::degrees::{Degrees, FAHRENHEIT_PER_CELSIUS, typed_degrees};
use super::super::section::Section;
use crate::fault::Fault;

/// The grid, as typed.
#[derive(Debug, Clone, PartialEq)]
pub struct SurfaceTyped {
    /// Warmings, ascending, degC.
    pub warmings_c: Vec<f64>,
    /// Precipitation changes, ascending, percent.
    pub precipitation_changes_pct: Vec<f64>,
    /// Realizations that are run at most, the study's first.
    pub realizations: u32,
}

/// Nodes in a row or a column.
const MOST: usize = 41;

pub(super) fn read(mut section: Section<'_>) -> Option<SurfaceTyped> {
    let warmings_c = read_warmings(&mut section);
    let precipitation_changes_pct = if section.has("precipitation_change_pct") {
        let typed = section.numbers("precipitation_change_pct");
        typed.and_then(|typed| check(&section, "precipitation_change_pct", typed, [-90.0, 200.0], "percent"))
    } else {
        section.knows("precipitation_change_pct");
        section.default("precipitation_change_pct", "-40 to 40 in steps of 10");
        Some((-4..=4).map(|step| 10.0 * f64::from(step)).collect())
    };
    let realizations = section.whole_or("realizations", 100, 2..=100_000) as u32;
    section.finish();
    Some(SurfaceTyped {
        warmings_c: warmings_c?,
        precipitation_changes_pct: precipitation_changes_pct?,
        realizations,
    })
}

fn read_warmings(section: &mut Section<'_>) -> Option<Vec<f64>> {
    match typed_degrees(section, "warming_c", "warming_f") {
        Degrees::Neither => {
            section.default("warming_c", "-2 to 6 in steps of 1");
            Some((-2..=6).map(f64::from).collect())
        }
        Degrees::Celsius => {
            let typed = section.numbers("warming_c")?;
            check(section, "warming_c", typed, [-10.0, 15.0], "degC")
        }
        Degrees::Fahrenheit => {
            let typed = section.numbers("warming_f")?;
            let typed = check(section, "warming_f", typed, [-18.0, 27.0], "degF")?;
            Some(typed.into_iter().map(|typed| typed / FAHRENHEIT_PER_CELSIUS).collect())
        }
        Degrees::Both => None,
    }
}

/// A row of nodes: at least two, ascending, within what can be meant.
fn check(
    section: &Section<'_>,
    key: &'static str,
    typed: Vec<f64>,
    [least, most]: [f64; 2],
    unit: &str,
) -> Option<Vec<f64>> {
    let rises = typed.windows(2).all(|pair| pair[0] < pair[1]);
    let is_meant = typed.iter().all(|value| (least..=most).contains(value));
    if rises && is_meant && (2..=MOST).contains(&typed.len()) {
        return Some(typed);
    }
    section.fault(Fault::key(
        section.path_of(key),
        format!("{typed:?}"),
        format!("2 to {MOST} rising numbers from {least} to {most}, {unit}"),
        format!("write {key} = [{}, 0, {}], or more steps", least / 5.0, most / 5.0),
    ));
    None
}
