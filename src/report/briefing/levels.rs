//! Tables level by level: some measures of the basin, a row each.

use super::super::numbers::{DASH, counted, fixed, precision, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::findings::{
    Distribution, DriestAndWettest, Findings, LevelFindings, MeasureFindings, OverRealizations,
};
use crate::season::{Kind, Outcome};
use maud::{Markup, html};

/// `reference`, `+1 °C`, ...: the columns of a table by level.
pub(super) fn names(findings: &Findings, reader: Reader) -> Vec<String> {
    let levels = findings.levels_c.iter().enumerate();
    levels
        .map(
            |(at, level_c)| {
                if at == findings.reference { "reference".to_owned() } else { reader.level(*level_c) }
            },
        )
        .collect()
}

/// A row for each of the basin's measures that are asked for.
pub(super) fn table(study: &Study<'_>, is_asked: impl Fn(&MeasureFindings) -> bool) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    html! {
        div.scroll { table {
            caption {
                "Basin mean, median over the " (findings.years) "-year values of " (counted(findings.realizations, "realization"))
                "; below it the median paired change from the reference ± its Monte Carlo error, in the same unit (points are \
                 percentage points), its percentage, and how many times the half spread it is."
            }
            thead { tr {
                th scope="col" { "Measure" }
                @for name in names(findings, reader) { th scope="col" { (name) } }
            } }
            tbody { @for measure in findings.basin.iter().filter(|measure| is_asked(measure)) { tr {
                th scope="row" { (measure.measure.title) }
                @for at in &measure.levels { td { (cell(reader, measure, at)) } }
            } } }
        } }
    }
}

/// The driest and the wettest year of a realization beside the mean, for each of the measures of which they are told.
pub(super) fn driest_and_wettest(study: &Study<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    let told = findings.basin.iter().filter(|of| of.levels.iter().any(|at| at.driest_and_wettest.is_some()));
    html! {
        div.scroll { table {
            caption {
                "The driest and the wettest of the " (counted(findings.years, "year")) " of a realization beside their mean, each ranked by the measure \
                 itself: median over realizations ± its Monte Carlo error, and below it the 5–95 % range. They can move while \
                 the mean stands still."
            }
            thead { tr {
                th scope="col" { "Measure" }
                @for name in names(findings, reader) { th scope="col" { (name) } }
            } }
            tbody { @for measure in told { @for (year, of) in YEARS { tr {
                th scope="row" { (measure.measure.title) ", " (year) }
                @for at in &measure.levels {
                    td { @match at.driest_and_wettest { None => { (DASH) } Some(years) => { (over_realizations(reader, of(&years))) } } }
                }
            } } } }
        } }
    }
}

type OfYears = fn(&DriestAndWettest) -> OverRealizations;

/// The years of a realization that are told beside each other.
const YEARS: [(&str, OfYears); 3] =
    [("driest year", |of| of.driest), ("mean", |of| of.mean), ("wettest year", |of| of.wettest)];

/// An amount over realizations; a single one has neither error nor range.
fn over_realizations(reader: Reader, over: OverRealizations) -> Markup {
    html! {
        (reader.amount(over.median.value))
        @if let Some(error) = over.median.monte_carlo_error {
            " ± " (precision(reader.units.depth().of(error)))
            br;
            (reader.amount_bare(over.q05)) "–" (reader.amount_bare(over.q95))
        }
    }
}

fn cell(reader: Reader, measure: &MeasureFindings, at: &LevelFindings) -> Markup {
    let kind = measure.measure.kind;
    let undefined = undefined(reader, kind, &at.periods);
    html! {
        (reader.outcome(at.periods.q50, kind))
        @if let Some(shift) = at.shift {
            br;
            (reader.change_of(kind, shift.median.value, shift.median.monte_carlo_error))
            br;
            @if let Some(percent) = at.percent_change { (signed(percent, 0)) " %, " }
            @match at.signal_to_spread { Some(ratio) => { (fixed(ratio.value, 2)) " ×" } None => { (DASH) } }
        }
        @if !undefined.is_empty() { br; (undefined) }
    }
}

/// `12 none, 3 not reached`: realizations without a number; nothing where there is none.
pub(super) fn undefined(reader: Reader, kind: Kind, of: &Distribution) -> String {
    let counts =
        [(of.none, Outcome::None), (of.not_gone, Outcome::NotGone), (of.not_reached, Outcome::NotReached)];
    let said = counts.into_iter().filter(|(count, _)| *count > 0);
    said.map(|(count, outcome)| format!("{count} {}", reader.outcome(outcome, kind)))
        .collect::<Vec<_>>()
        .join(", ")
}
