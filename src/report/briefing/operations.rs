//! From snow to the reservoir: what becomes of the water, and what a reservoir makes of it.

mod inflow;
mod outlook;
mod reservoir;
mod rule_changes;
mod year_classes;

use super::super::answer::why_unknown;
use super::super::cautions::PLANNING_AID;
use super::super::numbers::{DASH, counted, fixed};
use super::super::reader::Reader;
use super::super::study::Study;
use super::Figures;
use super::levels::{names, undefined};
use super::parts::{Group, part};
use crate::findings::{Findings, Judged, LevelFindings, MeasureFindings, Operations, Ranged, judged};
use crate::season::{Kind, Outcome};
use maud::{Markup, html};

/// The parts that there is something to say in; none where the scenario routes no water.
pub(super) fn group(study: &Study<'_>, figures: &Figures<'_>) -> Group {
    let title = "From snow to the reservoir";
    let Some(found) = &study.findings.operations else {
        return Group::new(title, []);
    };
    let inflow = if found.inflow_is_observed { "Inflow" } else { "Water input, routed" };
    Group::new(
        title,
        [
            part("inflow", inflow, inflow::section(study, found, figures)),
            part("reservoir", "The reservoir", reservoir::section(study, found, figures)),
            part("rule-changes", "If its rules were changed", rule_changes::section(study, found, figures)),
            part("year-classes", "Classes of years", year_classes::section(study, found)),
            part("outlook", "What the snow foretells", outlook::section(study, found, figures)),
        ],
    )
}

/// What stands above numbers that someone might run a dam by.
fn caution() -> Markup {
    html! { p.notice { (PLANNING_AID) } }
}

/// A row a measure: its medians, shifts and ratios by level, and whether warming outweighs.
fn table(study: &Study<'_>, caption: &str, measures: &[&MeasureFindings]) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    html! {
        div.scroll { table {
            caption {
                (caption) ": median over " (counted(findings.realizations, "realization")) " of " (counted(findings.years, "year"))
                "; below it the median paired change from the reference with its 5–95 % range, in the same unit, and how many times the half \
                 spread of the reference it is (signal to spread). Last: the warming from which on it outweighs precipitation."
            }
            thead { tr {
                th scope="col" { "Measure" }
                @for name in names(findings, reader) { th scope="col" { (name) } }
                th scope="col" { "Warming" br; "outweighs" }
            } }
            tbody { @for of in measures { tr {
                th scope="row" { (of.measure.title) }
                @for at in &of.levels { td { (cell(reader, of.measure.kind, at)) } }
                td { (outweighs(of, reader)) }
            } } }
        } }
    }
}

fn cell(reader: Reader, kind: Kind, at: &LevelFindings) -> Markup {
    let undefined = undefined(reader, kind, &at.periods);
    let bare = |change: f64| {
        let said = reader.change_of(kind, change, None);
        said.split(' ').next().unwrap_or_default().to_owned()
    };
    html! {
        (value(reader, kind, at.periods.q50))
        @if let Some(shift) = at.shift {
            br;
            (reader.change_of(kind, shift.median.value, None))
            @if shift.has_range() { br; (bare(shift.q05)) " to " (bare(shift.q95)) }
            br;
            @match at.signal_to_spread { Some(ratio) => { (fixed(ratio.value, 2)) " ×" } None => { (DASH) } }
        }
        @if !undefined.is_empty() { br; (undefined) }
    }
}

/// `from +1.9 °C`, `not up to +4 °C`.
fn outweighs(of: &MeasureFindings, reader: Reader) -> String {
    match judged(of.outweighs, of.outweighs_range) {
        Judged::Outweighs { level_c, until_c: None, .. } => {
            format!("from {}", reader.between_levels(level_c))
        }
        Judged::Outweighs { level_c, until_c: Some(until_c), .. } => {
            format!("from {} to {}", reader.between_levels_bare(level_c), reader.between_levels(until_c))
        }
        Judged::DoesNot { up_to_c } => format!("not up to {}", reader.level(up_to_c)),
        Judged::CannotTell { .. } => "these realizations cannot tell".to_owned(),
        Judged::Unknown => DASH.to_owned(),
    }
}

/// `Reliability by volume: 98.6 % at the reference, 98.0 % at +2 °C (median change −0.6 points); up to +4 °C, precipitation outweighs
/// warming in it.`
fn sentence(findings: &Findings, of: &MeasureFindings, at: usize, reader: Reader) -> Option<String> {
    let [reference, warmed] = [findings.reference, at].map(|at| of.levels.get(at));
    let (reference, warmed) = (reference?, warmed?);
    let kind = of.measure.kind;
    let shift = warmed.shift?.median.value;
    let changes = findings.by_year.as_ref().is_some_and(|found| found.levels_change_precipitation);
    let cause = crate::figures::cause(changes);
    let unit =
        if kind == Kind::VolumeHm3 { format!(" {}", reader.units.volume().word) } else { String::new() };
    let against = match judged(of.outweighs, of.outweighs_range) {
        Judged::Outweighs { level_c, .. } => {
            format!("{cause} outweighs precipitation in it from about {} on", reader.between_levels(level_c))
        }
        Judged::DoesNot { up_to_c } => {
            format!("up to {}, precipitation outweighs {cause} in it", reader.level(up_to_c))
        }
        Judged::CannotTell { .. } => {
            format!("whether {cause} outweighs precipitation in it these realizations cannot tell")
        }
        Judged::Unknown => why_unknown(of, findings.realizations).to_owned(),
    };
    Some(format!(
        "{}: {} at the reference, {} at {} (median change {}{unit}); {against}.",
        crate::figures::sentence(&of.measure.title),
        value(reader, kind, reference.periods.q50),
        value(reader, kind, warmed.periods.q50),
        reader.level(warmed.level_c),
        reader.change_of(kind, shift, None),
    ))
}

/// The measures of that name, as far as they were taken.
fn named<'a>(found: &'a Operations, names: &[&str]) -> Vec<&'a MeasureFindings> {
    names.iter().filter_map(|name| found.measure(name)).collect()
}

/// `0.91 (0.90–0.92)`: a number with its range over resampled realizations.
fn ranged(of: Option<Ranged>, said: impl Fn(f64) -> String) -> String {
    match of {
        None => DASH.to_owned(),
        Some(Ranged { value, q05: Some(low), q95: Some(high) }) => {
            format!("{} ({} to {})", said(value), said(low), said(high))
        }
        Some(of) => said(of.value),
    }
}

/// A measure's value in words; shares near all of something, as of reliability, to a tenth of a percent.
fn value(reader: Reader, kind: Kind, of: Outcome) -> String {
    match of {
        Outcome::Value(share) if kind == Kind::Share && share > 0.9 => format!("{} %", tenths(share)),
        _ => reader.outcome(of, kind),
    }
}

/// `98.6`: a share as percent, to a tenth.
fn tenths(share: f64) -> String {
    fixed(100.0 * share, 1)
}
