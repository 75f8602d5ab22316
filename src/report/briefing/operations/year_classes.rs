//! How years sort into the user's classes, and where limits would have to be drawn anew.

use super::super::super::numbers::{DASH, precision};
use super::super::super::reader::Reader;
use super::super::super::study::Study;
use super::super::levels;
use super::{ranged, tenths};
use crate::findings::{Operations, YearClasses, YearClassesLevel};
use maud::{Markup, html};

pub(super) fn section(study: &Study<'_>, found: &Operations) -> Markup {
    let reader = study.reader;
    html! { @if let Some(classes) = &found.year_classes {
        p {
            "Single years by their " (classes.measure.title) ", in the classes whose limits the scenario states. With limits that stay, warming \
             sorts years into other classes; limits that keep each class as frequent as at the reference mean other water under the same name."
        }
        (shares(study, classes, reader))
        (limits(study, classes, reader))
        p { "No class has an official meaning here: what a class of years entitles to is for those who set it." }
    } }
}

/// `below 190 hm³`, `190 to 260 hm³`, `330 hm³ and more`: the classes, from the driest.
fn names(limits_hm3: &[f64], reader: Reader) -> Vec<String> {
    let mut names = Vec::new();
    for at in 0..=limits_hm3.len() {
        let [from, to] = [at.checked_sub(1), Some(at)].map(|at| at.and_then(|at| limits_hm3.get(at)));
        names.push(match (from, to) {
            (None, Some(to)) => format!("below {}", reader.volume(*to)),
            (Some(from), Some(to)) => format!("{} to {}", reader.volume_bare(*from), reader.volume(*to)),
            (Some(from), None) => format!("{} and more", reader.volume(*from)),
            (None, None) => "all".to_owned(),
        });
    }
    names
}

fn shares(study: &Study<'_>, classes: &YearClasses, reader: Reader) -> Markup {
    let share = |at: &YearClassesLevel, class: usize| match (at.shares.get(class), at.bounds.get(class)) {
        // Of none or of all, the bound says more than a range of no width.
        (Some(share), Some(Some(bound))) => {
            let sign = if share.value > 0.5 { ">" } else { "<" };
            format!("{} ({sign} {})", tenths(share.value), precision(100.0 * bound))
        }
        (share, _) => ranged(share.copied(), tenths),
    };
    html! {
        div.scroll { table {
            caption {
                "Years in each class, % of all simulated years, and 5–95 % over resampled realizations; > and < are 95 % bounds where all or no \
                 years are in a class."
            }
            thead { tr {
                th scope="col" { "Class" }
                @for name in levels::names(study.findings, reader) { th scope="col" { (name) } }
            } }
            tbody { @for (class, name) in names(&classes.limits_hm3, reader).iter().enumerate() { tr {
                th scope="row" { (name) }
                @for at in &classes.levels { td { (share(at, class)) } }
            } } }
        } }
    }
}

fn limits(study: &Study<'_>, classes: &YearClasses, reader: Reader) -> Markup {
    html! {
        div.scroll { table {
            caption {
                "Where each limit would have to lie to keep the classes as frequent as at the reference, " (reader.units.volume().word)
                ", and 5–95 % over resampled realizations; " (DASH) " where no year of the reference, or every one, lies below it."
            }
            thead { tr {
                th scope="col" { "Limit" }
                @for name in levels::names(study.findings, reader) { th scope="col" { (name) } }
            } }
            tbody { @for (limit, hm3) in classes.limits_hm3.iter().enumerate() { tr {
                th scope="row" { (reader.volume(*hm3)) }
                @for at in &classes.levels { td {
                    (ranged(at.kept_limits_hm3.get(limit).copied().flatten(), |hm3| reader.volume_bare(hm3)))
                } }
            } } }
        } }
    }
}
