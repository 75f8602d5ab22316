//! Years: how variance parts by averaging period, how often snow is low and for how long, and when the change stands out.

use super::super::answer::{Answer, in_years, range, years_of};
use super::super::numbers::{DASH, fixed, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use super::{Figures, levels};
use crate::figures::{Part, cause};
use crate::findings::{
    ByYear, Crossing, Detection, Findings, HoldsMost, LowRuns, LowSnow, MeasureByYear, Partition, Ranged,
    TYPES, Tails,
};
use maud::{Markup, html};

/// The section; nothing where single years say nothing.
pub(super) fn section(study: &Study<'_>, answer: &Answer, figures: &Figures<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    html! { @if let Some(found) = &findings.by_year {
        ul { @for sentence in &answer.years { li { (sentence) } } }
        (figures.of(Part::Years))
        @if let Some(low) = &found.low_snow { (odds(findings, low, reader)) (of_record(findings, low, reader)) }
        (worst_years(findings, found, reader))
        @if let Some(runs) = &found.low_runs { (low_runs(findings, runs, reader)) }
        @for measure in found.measures.iter().take(1) {
            (partitions(measure, cause(found.levels_change_precipitation), reader))
            @if let Some(detection) = &measure.detection { (detected(detection, reader)) }
        }
        details {
            summary { "Low years, high years and variability" }
            @for measure in &found.measures { (tails(findings, measure, reader)) }
        }
        details {
            summary { "Types of years, by fixed limits and by limits that move" }
            @for measure in &found.measures { (types(findings, measure, reader)) }
        }
        p {
            "Ranges are 5–95 % over 400 resamples of whole realizations; of a count of nothing, or of all, they say nothing, and the bound \
             stands in the tables. Where sets of parameters are run, their part of the variance stands with the parameters."
        }
    } }
}

fn heading(findings: &Findings, first: &str, reader: Reader) -> Markup {
    html! { thead { tr {
        th scope="col" { (first) }
        @for name in levels::names(findings, reader) { th scope="col" { (name) } }
    } } }
}

/// `61 %` and below it `59–63 %`.
fn share(of: Ranged) -> Markup {
    let percent = |share: f64| fixed(100.0 * share, 0);
    html! { (percent(of.value)) " %" @if let (Some(low), Some(high)) = (of.q05, of.q95) { br; (percent(low)) "–" (percent(high)) " %" } }
}

/// A bound on a chance of which none, or all, was seen.
fn bound(value: f64, bound: Option<f64>) -> Option<String> {
    let bound = bound?;
    Some(if value > 0.5 {
        format!("more than {} %", fixed(100.0 * bound, 0))
    } else {
        format!("less than {} %", fixed(100.0 * bound, 0))
    })
}

fn odds(findings: &Findings, low: &LowSnow, reader: Reader) -> Markup {
    html! { div.scroll { table {
        caption {
            "Low-snow years: below " (reader.amount(low.below_mm.value)) ", the " (fixed(100.0 * low.below_quantile, 0))
            " % quantile of the reference's single years; of " (fixed(low.years as f64, 0)) " simulated years a level."
        }
        (heading(findings, "Statistic", reader))
        tbody {
            tr { th scope="row" { "Low" } @for level in &low.levels { td { (in_years(level.chance.value)) } } }
            tr { th scope="row" { "Chance" } @for level in &low.levels { td {
                @match bound(level.chance.value, level.bound) { Some(bound) => { (bound) } None => { (share(level.chance)) } }
            } } }
            tr { th scope="row" { "Times the reference's" } @for (at, level) in low.levels.iter().enumerate() { td {
                @if at == findings.reference { "1" } @else { (fixed(level.chance_ratio.value, 2)) (range(level.chance_ratio, 1.0, 2, "")) }
            } } }
        }
    } } }
}

fn of_record(findings: &Findings, low: &LowSnow, reader: Reader) -> Markup {
    html! { @if let Some(record) = &low.record { div.scroll { table {
        caption {
            "The record's own " (record.years) " years, each run at every level, below the same SWE: how many, their share's 95 % interval after \
             Wilson (1927), and the ratio to the reference's with its 95 % interval after Katz et al. (1978), which takes the two counts for \
             independent."
        }
        (heading(findings, "Statistic", reader))
        tbody {
            tr { th scope="row" { "Low years" } @for level in &record.levels { td { (level.low_years) } } }
            tr { th scope="row" { "95 % interval" } @for level in &record.levels {
                @let [low, high] = level.wilson_95;
                td { (fixed(100.0 * low, 0)) "–" (fixed(100.0 * high, 0)) " %" }
            } }
            tr { th scope="row" { "Ratio" } @for level in &record.levels { td {
                @match level.chance_ratio {
                    Some(ratio) => { (fixed(ratio.ratio, 1)) br; (fixed(ratio.low_95, 1)) "–" (fixed(ratio.high_95, 1)) }
                    None => { (DASH) }
                }
            } } }
        }
    } } } }
}

fn worst_years(findings: &Findings, found: &ByYear, reader: Reader) -> Markup {
    html! { @if !found.worst_years.is_empty() { div.scroll { table {
        caption {
            "The record's years with least SWE: one simulated year in so many has as little or less, with its 5–95 % range. No number goes beyond the "
            (fixed(found.simulated_years as f64, 0)) " simulated years of a level. Beside it how many of the record's own years have as little or less."
            @if found.redraws_years {
                " The realizations are the record's own winters in another order, so that at the reference the simulated number says little more."
            }
        }
        thead { tr {
            th scope="col" { "Year of the record" }
            th scope="col" { "In the record" }
            @for name in levels::names(findings, reader) { th scope="col" { (name) } }
        } }
        tbody { @for year in &found.worst_years { tr {
            th scope="row" { (year.water_year) ", " (reader.amount(year.swe_mm)) }
            td { (year.record_years_as_low) " in " (year.record_years) }
            @for level in &year.levels { td { @match level.return_period_years {
                Some(period) => {
                    "1 in " (years_of(period.value))
                    @if let (Some(low), Some(high)) = (period.q05, period.q95) { br; (years_of(low)) "–" (years_of(high)) }
                }
                None => { "rarer than 1 in " (fixed(found.simulated_years as f64, 0)) }
            } } }
        } } }
    } } } }
}

fn low_runs(findings: &Findings, runs: &LowRuns, reader: Reader) -> Markup {
    html! { div.scroll { table {
        caption {
            "Chance that a realization of " (findings.years) " years holds so many low years in a row, or more: each at or below "
            (reader.amount(runs.at_or_below_mm.value)) ", the " (fixed(100.0 * runs.at_or_below_quantile, 0)) " % quantile of the reference's single years."
        }
        (heading(findings, "Low years in a row", reader))
        tbody { @for length in &runs.lengths { tr {
            th scope="row" { (length.years) }
            @for level in &length.levels { td {
                @match bound(level.chance.value, level.bound) { Some(bound) => { (bound) } None => { (share(level.chance)) } }
            } }
        } } }
    } } }
}

fn partitions(measure: &MeasureByYear, cause: &str, reader: Reader) -> Markup {
    let holds = |of: &Partition| match of.warming_holds_most {
        HoldsMost::Always => "always".to_owned(),
        HoldsMost::From { years, .. } => format!("from {years}-year means on"),
        HoldsMost::PerhapsFrom { years } => format!("perhaps from {years}-year means on"),
        HoldsMost::Never => "never".to_owned(),
        HoldsMost::CannotTell => "cannot tell".to_owned(),
    };
    let optional =
        |of: Option<Ranged>| html! { @match of { Some(of) => { (share(of)) } None => { (DASH) } } };
    html! { @if !measure.partitions.is_empty() { div.scroll { table {
        caption {
            "Shares of the variance of the " (measure.measure.title) " at the reference and one level, of single years and of means over more. They add up \
             to 100 %. Where a realization holds a single period, the period's chance counts with the realization's. The " (cause) " is largest \
             where it holds more than chance as a whole (realization and year together), and more than how differently they take it (both \
             columns by level together)."
        }
        thead { tr { @for name in [
            "Level", "Years averaged", "Level's share", "Realization", "Realization by level", "Year", "Year by level", "Level is largest",
        ] { th scope="col" { (name) } } } }
        tbody { @for of in &measure.partitions { @for (row, period) in of.periods.iter().enumerate() { tr {
            th scope="row" { (reader.level(of.level_c)) }
            td { (period.years) }
            td { (share(period.level)) }
            td { (share(period.realization)) }
            td { (share(period.level_by_realization)) }
            td { (optional(period.year)) }
            td { (optional(period.level_by_year)) }
            td { @if row == 0 { (holds(of)) } }
        } } } }
    } } } }
}

fn detected(detection: &Detection, reader: Reader) -> Markup {
    let ratio = |of: Option<Ranged>| of.map_or_else(|| DASH.to_owned(), |of| fixed(of.value, 1));
    let place = |crossing: Crossing| match crossing {
        Crossing::At { level_c, .. } => reader.between_levels(level_c),
        Crossing::NotReached { up_to_c } => format!("not by {}", reader.level(up_to_c)),
        Crossing::Unknown => DASH.to_owned(),
    };
    html! { @if let Some(first) = detection.periods.first() { div.scroll { table {
        caption {
            "Mean change over one standard deviation of the reference's means, and, behind the stroke, over that of the paired changes: the first is \
             what an observer sees, the second why the same weather under two levels shows small warming. Below the warming at which the first \
             passes 1, its 5–95 % range."
        }
        thead { tr {
            th scope="col" { "Means over" }
            @for level in &first.levels { th scope="col" { (reader.level(level.level_c)) } }
            th scope="col" { "Stands out from" }
        } }
        tbody { @for period in &detection.periods { tr {
            th scope="row" { (period.years) @if period.years == 1 { " year" } @else { " years" } }
            @for level in &period.levels { td { (ratio(level.unpaired)) " / " (ratio(level.paired)) } }
            td {
                (place(period.leaves_spread))
                @if let Some(range) = period.leaves_spread_range { @if let (Some(low), Some(high)) = (range.q05_c, range.q95_c) {
                    br; (reader.between_levels_bare(low)) " to " (reader.between_levels_bare(high))
                } }
            }
        } } }
    } } } }
}

/// Names of the fifths, from the driest.
const FIFTHS: [&str; TYPES] = ["Driest fifth", "Second", "Middle", "Fourth", "Wettest fifth"];

fn types(findings: &Findings, measure: &MeasureByYear, reader: Reader) -> Markup {
    let depth = reader.units.depth().word;
    html! { @if !measure.types.is_empty() { div.scroll { table {
        caption {
            (crate::figures::sentence(&measure.measure.title)) ", single years: share in each fifth of the reference with its 5–95 % range, and below it \
             the upper limit (" (depth) ") that would keep the type a fifth of the level's own years. A type that keeps its name by a \
             lower limit holds less water."
        }
        (heading(findings, "Type at the reference", reader))
        tbody { @for (at, name) in FIFTHS.iter().enumerate() { tr {
            th scope="row" { (name) }
            @for level in &measure.types { td {
                @match bound(level.shares[at].value, level.bounds[at]) {
                    Some(words) => { (words) }
                    None => { (share(level.shares[at])) }
                }
                @if let Some(limit) = level.kept_limits.get(at) { br; "up to " (reader.amount_bare(limit.value)) }
            } }
        } } }
    } } } }
}

fn tails(findings: &Findings, measure: &MeasureByYear, reader: Reader) -> Markup {
    type Told = fn(&Tails) -> (Ranged, Option<Ranged>);
    let rows: [(&str, Told); 3] = [
        ("1 in 10 years has less than", |of| (of.q10, of.change.map(|change| change.q10))),
        ("1 in 10 years has more than", |of| (of.q90, of.change.map(|change| change.q90))),
        ("Standard deviation", |of| {
            (of.standard_deviation, of.change.map(|change| change.standard_deviation))
        }),
    ];
    let depth = reader.units.depth();
    let decimals = usize::from(reader.units == crate::units::UnitSystem::Us);
    html! { div.scroll { table {
        caption {
            (crate::figures::sentence(&measure.measure.title)) ", single years, " (depth.word) "; below it the change from the reference and its 5–95 % range."
        }
        (heading(findings, "Statistic", reader))
        tbody { @for (name, of) in rows { tr {
            th scope="row" { (name) }
            @for level in &measure.tails { td {
                @let (value, change) = of(level);
                (reader.amount_bare(value.value))
                @if let Some(change) = change {
                    br; (signed(depth.of(change.value), decimals))
                    @if let (Some(low), Some(high)) = (change.q05, change.q95) {
                        " (" (signed(depth.of(low), decimals)) " to " (signed(depth.of(high), decimals)) ")"
                    }
                }
            } }
        } } }
    } } }
}
