//! How well the snow of the survey date foretells what comes.

use super::super::super::answer::telling_level;
use super::super::super::numbers::{fixed, signed};
use super::super::super::reader::Reader;
use super::super::super::study::Study;
use super::super::{Figures, levels};
use super::ranged;
use crate::figures::Part;
use crate::findings::{Operations, Outlook, OutlookLevel};
use maud::{Markup, html};

/// A row of the table: its name, and what it says of a level.
type Row = (String, Box<dyn Fn(&OutlookLevel) -> String>);

pub(super) fn section(study: &Study<'_>, found: &Operations, figures: &Figures<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    html! { @if let Some(outlook) = &found.outlook {
        p {
            "How closely the " (outlook.inflow.title) " follows the " (outlook.snow.title) " over single years, and how wide the interval about a straight line is that \
             holds 9 of 10 of them. The model knows its own snow without error: what is observed foretells less."
        }
        @if !found.inflow_is_observed { p { "Nothing here was held against a river: it is water input, routed." } }
        @if let Some(at) = telling_level(findings) { @if let Some(said) = told(outlook, findings.reference, at, reader) { p { (said) } } }
        (figures.of(Part::Outlook))
        (table(study, outlook, reader))
        p { "The old line is the straight line through the reference's years, used at another level. Where it tells too much, that water does not come." }
    } }
}

/// `The correlation is 0.89 at +2 °C, 0.91 at the reference; the line that holds at the reference foretells 5 % too little at +2 °C.`
fn told(outlook: &Outlook, reference: usize, at: usize, reader: Reader) -> Option<String> {
    let (reference, warmed) = (outlook.levels.get(reference)?, outlook.levels.get(at)?);
    let (before, after) = (reference.correlation?.value, warmed.correlation?.value);
    let place = reader.level(warmed.level_c);
    let old = warmed.old_line_off_pct.map_or(String::new(), |error| {
        let much = if error.value < 0.0 { "too little" } else { "too much" };
        format!(
            "; the reference's line foretells {} % of the mean volume {much} at {place}",
            fixed(error.value.abs(), 1)
        )
    });
    Some(format!(
        "The correlation is {} at {place}, {} at the reference{old}.",
        fixed(after, 2),
        fixed(before, 2)
    ))
}

fn table(study: &Study<'_>, outlook: &Outlook, reader: Reader) -> Markup {
    let two = |value: f64| fixed(value, 2);
    let rows: [Row; 5] = [
        ("Correlation".to_owned(), Box::new(move |at| ranged(at.correlation, two))),
        ("Correlation of ranks".to_owned(), Box::new(move |at| ranged(at.rank_correlation, two))),
        (
            format!("Width of 9 in 10 years, {}", reader.units.volume().word),
            Box::new(move |at| ranged(at.interval_hm3, |hm3| reader.volume_bare(hm3))),
        ),
        (
            "The same, % of the mean volume".to_owned(),
            Box::new(|at| ranged(at.interval_pct, |pct| fixed(pct, 0))),
        ),
        (
            "Old line too high, % of the mean volume".to_owned(),
            Box::new(|at| ranged(at.old_line_off_pct, |pct| signed(pct, 1))),
        ),
    ];
    html! {
        div.scroll { table {
            caption { "What the snow foretells, with 5–95 % over resampled realizations." }
            thead { tr {
                th scope="col" { "Measure" }
                @for name in levels::names(study.findings, reader) { th scope="col" { (name) } }
            } }
            tbody { @for (name, said) in &rows { tr {
                th scope="row" { (name) }
                @for at in &outlook.levels { td { (said(at)) } }
            } } }
        } }
    }
}
