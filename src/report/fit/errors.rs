//! How fits do on years seen and not seen, as tables of the page: skill, and errors of what a season is told by.

use super::super::numbers::{DASH, fixed, signed};
use super::judged::numbers;
use super::{FitReport, judgements};
use crate::fit::{Judged, Split};
use maud::{Markup, html};

/// Who has been fitted on what, and does how on these years.
struct Row<'a> {
    fitted_on: &'static str,
    judged: &'a Judged,
}

/// Two tables a site. A table of all numbers would be wider than a page.
pub(super) fn tables(report: &FitReport<'_>) -> Markup {
    let sites: Vec<&str> = report.result.fitted[0].on_own.iter().map(|judged| judged.site.as_str()).collect();
    html! { @for (at, site) in sites.iter().enumerate() {
        @if sites.len() > 1 { h3 { (site) } }
        (table(report, at, ["Skill", "The higher, the better; 1 is perfect"], &["NSE", "KGE", "skill"], skill))
        (table(
            report,
            at,
            ["Errors", "Modelled less observed: the nearer to 0, the better"],
            &["peak, %", "survey, %", "melt-out, days", "its size, days", "slope, % per °C"],
            errors,
        ))
    } }
}

/// A group of rows a split that fits are judged on.
fn table(
    report: &FitReport<'_>,
    site: usize,
    [name, caption]: [&str; 2],
    heads: &[&str],
    cells: fn(&Judged) -> Vec<String>,
) -> Markup {
    html! { div.scroll { table.narrow.grouped {
        caption { (caption) }
        thead { tr { th.text scope="col" { (name) } @for head in heads { th scope="col" { (head) } } } }
        @for split in Split::EACH { tbody {
            tr { th.text scope="rowgroup" colspan=(heads.len() + 1) { "In " (split.words()) (years(report, split, site)) } }
            @for row in rows(report, split, site) { tr {
                td.text { (row.fitted_on) }
                @for cell in cells(row.judged) { td { (cell) } }
            } }
        } }
    } } }
}

/// Those that have not seen the years, those that have, and the scenario's own parameters.
fn rows<'a>(report: &'a FitReport<'_>, on: Split, site: usize) -> Vec<Row<'a>> {
    let result = report.result;
    let judgements = || {
        result.fitted.iter().flat_map(|fitted| {
            judgements(fitted).into_iter().map(move |(judged_on, sites)| (fitted.split, judged_on, sites))
        })
    };
    let fitted = |is_seen: bool, fitted_on: &'static str| {
        let found = judgements().find(|(split, judged_on, _)| *judged_on == on && (*split == on) == is_seen);
        found.and_then(|(.., sites)| Some(Row { fitted_on, judged: sites.get(site)? }))
    };
    let stated = result.unfitted.iter().find(|(split, _)| *split == on);
    let stated =
        stated.and_then(|(_, sites)| Some(Row { fitted_on: "not fitted", judged: sites.get(site)? }));
    [fitted(false, "fitted on the others"), fitted(true, "fitted on these"), stated]
        .into_iter()
        .flatten()
        .collect()
}

/// `, 12 years`.
fn years(report: &FitReport<'_>, on: Split, site: usize) -> String {
    let rows = rows(report, on, site);
    rows.first().map_or(String::new(), |row| {
        format!(" ({})", super::super::numbers::counted(row.judged.years, "year"))
    })
}

fn skill(judged: &Judged) -> Vec<String> {
    let [nse, kge, skill, ..] = numbers(judged);
    [nse, kge, skill].map(|value| value.map_or(DASH.to_owned(), |value| fixed(value, 2))).to_vec()
}

fn errors(judged: &Judged) -> Vec<String> {
    let [.., peak, of_peak, survey, of_survey, late, size, slope, of_slope, _] = numbers(judged);
    let with_error = |value: Option<f64>, error: Option<f64>| {
        let error = error.map_or(String::new(), |error| format!(" ± {}", fixed(error, 1)));
        value.map_or(DASH.to_owned(), |value| signed(value, 1)) + &error
    };
    let size = size.map_or(DASH.to_owned(), |size| fixed(size, 1));
    vec![
        with_error(peak, of_peak),
        with_error(survey, of_survey),
        with_error(late, None),
        size,
        with_error(slope, of_slope),
    ]
}
