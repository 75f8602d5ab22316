//! The finding: which elevations lose most, or that none does.

use super::super::labels::{is_nothing, level, percent_size, sentence, size_and_unit};
use super::super::shown::Shown;
use super::Found;
use crate::findings::{Findings, MeasureFindings, Range, Sign};
use crate::units::UnitSystem;

/// A band's change at the level that is spoken of.
#[derive(Debug, Clone, Copy)]
struct Change<'a> {
    found: Found<'a>,
    change_mm: f64,
    percent: Option<f64>,
    /// Whether it loses or gains, as wherever bands are counted: by the range of its changes.
    sign: Sign,
}

/// `At +4 °C, 1 April SWE falls furthest at 2 600–2 900 m: 180 mm (45 %); the largest share, 97 %, at 1 800–2 000 m`.
pub(super) fn title(
    findings: &Findings,
    headline: &MeasureFindings,
    bands: &[Found<'_>],
    shown: &Shown,
    units: UnitSystem,
) -> String {
    let name = &headline.measure.title;
    let Some(at) = shown.farthest() else {
        return of_reference(findings, name, bands, units);
    };
    let place = findings.levels_c.get(at).map_or_else(String::new, |level_c| level(units, *level_c));
    let changes: Vec<Change<'_>> = bands
        .iter()
        .filter_map(|found| {
            let level = found.at(at)?;
            let shift = level.shift?;
            Some(Change {
                found: *found,
                change_mm: shift.median.value,
                percent: level.percent_change,
                sign: Sign::of(Range { q05: shift.q05, q95: shift.q95 }),
            })
        })
        .collect();
    let of = |sign: Sign| changes.iter().filter(move |change| change.sign == sign);
    let by_amount = |a: &&Change<'_>, b: &&Change<'_>| a.change_mm.total_cmp(&b.change_mm);
    let (lowest, highest) = (of(Sign::Loses).min_by(by_amount), of(Sign::Gains).max_by(by_amount));
    let where_ = |change: &Change<'_>| change.found.name(units);
    let how_much = |change: &Change<'_>| {
        let percent =
            change.percent.map_or_else(String::new, |percent| format!(" ({} %)", percent_size(percent)));
        format!("{}{percent}", size_and_unit(units, change.change_mm))
    };
    match (lowest, highest) {
        _ if changes.is_empty() => format!("{} has no value to compare at {place}", sentence(name)),
        (None, None) if changes.iter().all(|change| is_nothing(units, change.change_mm)) => {
            format!("{} is unchanged at every elevation at {place}", sentence(name))
        }
        (None, None) => {
            format!("At {place}, {name} cannot be told to fall or to rise at any elevation")
        }
        (Some(change), None) | (None, Some(change)) if bands.len() == 1 => {
            let direction = if change.change_mm < 0.0 { "lower" } else { "higher" };
            format!(
                "{} of the one band, {}, is {} {direction} at {place}",
                sentence(name),
                where_(change),
                how_much(change)
            )
        }
        (None, Some(most)) => format!(
            "No elevation loses {name} at {place}; it rises furthest at {}: {}",
            where_(most),
            how_much(most)
        ),
        (Some(most), Some(gains)) => {
            let gaining = of(Sign::Gains).count();
            let gain = if gaining == 1 { "gains" } else { "gain" };
            format!(
                "At {place}, {name} falls furthest at {}: {}; {gaining} of {} bands {gain}, at most {} at {}",
                where_(most),
                how_much(most),
                bands.len(),
                how_much(gains),
                where_(gains)
            )
        }
        (Some(most), None) => {
            let shares = of(Sign::Loses).filter_map(|change| Some((change, change.percent?)));
            let share = shares.min_by(|a, b| a.1.total_cmp(&b.1));
            // Shares that are written the same are the same to a reader.
            let most_share = most.percent.map(percent_size);
            let share = share.filter(|(_, percent)| Some(percent_size(*percent)) != most_share);
            let share = share.map_or_else(String::new, |(change, percent)| {
                let written = percent_size(percent);
                let is_tie =
                    |change: &&Change<'_>| change.percent.map(percent_size).as_ref() == Some(&written);
                match of(Sign::Loses).filter(is_tie).count() {
                    0 | 1 => format!("; the largest share, {written} %, at {}", where_(change)),
                    bands => format!("; the largest share, {written} %, in {bands} bands"),
                }
            });
            format!("At {place}, {name} falls furthest at {}: {}{share}", where_(most), how_much(most))
        }
    }
}

/// Where there is no level to compare with.
fn of_reference(findings: &Findings, name: &str, bands: &[Found<'_>], units: UnitSystem) -> String {
    let medians = bands.iter().filter_map(|found| Some((found, found.range_mm(findings.reference)?[1])));
    let highest = medians.max_by(|a, b| a.1.total_cmp(&b.1));
    let name = sentence(name);
    match highest {
        None => format!("{name} has no value at the reference; no other level was run"),
        Some((_, median_mm)) if is_nothing(units, median_mm) => {
            format!("{name} is {} at every elevation; no other level was run", size_and_unit(units, 0.0))
        }
        Some((found, median_mm)) => format!(
            "{name} is highest at {}, {} at the reference; no other level was run",
            found.name(units),
            size_and_unit(units, median_mm)
        ),
    }
}
