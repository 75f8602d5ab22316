//! Winters that a fit leaves out: why, for the page, a table and a terminal.

use super::super::tables::{finish, write};
use crate::fit::{LeftOut, Rule};
use csv::Writer;
use maud::{Markup, html};
use std::fmt::Write;

/// The rules, and the winters that each left out.
pub(super) fn section(left_out: &[LeftOut]) -> Markup {
    html! {
        p {
            "Rules that ask the record alone, never the model, say before anything is fitted in which winters the record itself is at \
             fault; no fit sees these, and none is judged on them. "
            @if left_out.is_empty() { "Here they found none." }
        }
        @if !left_out.is_empty() { div.scroll { table.narrow {
            caption { "Winters in which the record itself is at fault" }
            thead { tr {
                th.text scope="col" { "Site" } th scope="col" { "Water year" } th.text scope="col" { "Found" }
                th.text scope="col" { "Left out because" }
            } }
            tbody { @for out in left_out { tr {
                td.text { (out.site) } td { (out.water_year) } td.text { (typeset(&out.found)) } td.text { (out.rule.name()) }
            } } }
        } } }
        dl { @for rule in Rule::EACH { dt { (rule.name()) } dd { (typeset(&rule.words())) "." } } }
    }
}

/// Plain words as a page has them.
fn typeset(words: &str) -> String {
    words.replace("degC", "°C").replace(" -", " −")
}

/// One row a site, water year and rule.
pub(super) fn table(left_out: &[LeftOut]) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    write(&mut writer, &["site", "water_year", "left_out_because", "found"].map(str::to_owned));
    for LeftOut { site, water_year, rule, found } in left_out {
        write(&mut writer, &[site.clone(), water_year.to_string(), rule.name().to_owned(), found.clone()]);
    }
    finish(writer)
}

/// A line a winter that is left out.
pub fn left_out_lines(left_out: &[LeftOut]) -> String {
    let mut text = String::new();
    for LeftOut { site, water_year, rule, found } in left_out {
        let _ = writeln!(text, "left out: {water_year} at {site}, {}: {found}", rule.name());
    }
    text
}
