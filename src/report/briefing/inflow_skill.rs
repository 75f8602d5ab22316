//! Modelled inflow of the record's own years against observed inflow, and what was fitted for it.

use super::super::numbers::{DASH, counted, fixed, signed, stated};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::fit::{InflowFit, InflowScores, InflowSkill};
use crate::inflow::Routing;
use maud::{Markup, html};

/// The section's address on the page.
pub(super) const ADDRESS: &str = "inflow-skill";

/// The section; nothing where no inflow was observed.
pub(super) fn skill(study: &Study<'_>) -> Markup {
    let found = study.findings.operations.as_ref().and_then(|found| found.inflow_skill.as_ref());
    html! { @if let Some(found) = found {
        p { (compared(found)) " " (verdict(found)) }
        p { (not_seen(found)) }
        (scores(found, study.reader))
        @if let Some(fit) = &found.fit { (parameters(found, fit)) }
        p {
            "NSE is the Nash-Sutcliffe efficiency of daily inflow: 1 is perfect, 0 no better than the observed mean. KGE is the Kling-Gupta \
             efficiency of 2009: 1 is perfect, −0.41 what the observed mean would score. Much of a high value of either is the season itself, which \
             any model has; the skill above the day-of-year mean takes it out: it holds the model's squared error against that of the mean of \
             all other years on the same day, and is 1 where the model is perfect, 0 where it is no better. Errors are modelled less observed. \
             Every score stands in " code { "tables/inflow-skill.csv" } "."
        }
    } }
}

/// How much was compared.
fn compared(found: &InflowSkill) -> String {
    let InflowScores { days, years, .. } = found.scores;
    format!(
        "Inflow was modelled for the record's own years, from the weather as observed and without any warming, and held against observed inflow on \
         {} of {} of the {} in use.",
        counted(days, "day"),
        counted(years, "year"),
        counted(found.years_in_use, "year")
    )
}

/// Whether it has any skill, in words.
fn verdict(found: &InflowSkill) -> String {
    let is_not_seen = found.fit.as_ref().is_some_and(|fit| !fit.halves.is_empty());
    let on = if is_not_seen { "On years that a fit had not seen, the" } else { "The" };
    match found.lowest_above_mean() {
        None => "Too few years have observed inflow on the same day to say whether the model knows more than the season: it takes six.".to_owned(),
        Some(above) if above <= 0.0 => format!(
            "{on} model has no skill above the season: the mean of other years on the same day is as near to observed inflow, or nearer ({}). \
             Do not rely on what is said of inflow and storage.",
            fixed(above, 2)
        ),
        Some(above) if above < HARDLY => format!(
            "{on} model knows hardly more than the season: its skill above the mean of other years on the same day is {}.",
            fixed(above, 2)
        ),
        Some(above) => format!(
            "{on} model's squared error is {} % smaller than that of the mean of other years on the same day: its skill above that is {}.",
            fixed(100.0 * above, 0),
            fixed(above, 2)
        ),
    }
}

/// A skill below this is hardly one.
const HARDLY: f64 = 0.1;

/// What of it is a test, in words.
fn not_seen(found: &InflowSkill) -> &'static str {
    match &found.fit {
        None => "Nothing was fitted to observed inflow: the routing is the one that the scenario states.",
        Some(fit) if fit.halves.is_empty() => {
            "The routing was fitted to these same days, so that its scores flatter it; too few years have observed inflow to judge it on years that it had not \
             seen."
        }
        Some(_) => {
            "The routing in use was fitted to all of these years, so that its scores on them flatter it. Beside it stands what fits to half of the years \
             came to, on those years and on the others, which they had not seen: rely on the latter."
        }
    }
}

/// A row a routing and the years that it is judged on.
fn scores(found: &InflowSkill, reader: Reader) -> Markup {
    html! { div.scroll { table {
        caption {
            "Modelled inflow against observed inflow, day by day"
            @if let Some(window) = &found.scores.window {
                ", and as the volume from " (window.from.words()) " to " (window.to.words()) " of years whose window lacks no day"
            } "."
        }
        thead { tr {
            th scope="col" { "Routing, and the years" }
            th scope="col" { "Days" }
            th scope="col" { "NSE" }
            th scope="col" { "KGE" }
            th scope="col" { "Bias" }
            th scope="col" { "Skill above the" br; "day-of-year mean" }
            @if found.scores.window.is_some() {
                th scope="col" { "Volume" }
                th scope="col" { "Its correlation" }
                th scope="col" { "Its mean error" }
            }
        } }
        tbody { @match &found.fit {
            None => { (row("as stated", &found.scores, reader)) }
            Some(fit) => {
                (row("as stated, all years", &fit.of_stated, reader))
                (row("fitted to all years, the same years", &found.scores, reader))
                @for half in &fit.halves {
                    (row(&format!("fitted to {}, the same years", half.fitted_on.words()), &half.seen, reader))
                    (row(&format!("fitted to {}, the others", half.fitted_on.words()), &half.not_seen, reader))
                    (row("as stated, the same others", &half.of_stated, reader))
                }
            }
        } }
    } } }
}

fn row(name: &str, scores: &InflowScores, reader: Reader) -> Markup {
    let score = |score: Option<f64>| score.map_or(DASH.to_owned(), |score| fixed(score, 2));
    let percent =
        |percent: Option<f64>| percent.map_or(DASH.to_owned(), |pct| format!("{} %", signed(pct, 0)));
    html! { tr {
        th scope="row" { (name) }
        td { (fixed(scores.days as f64, 0)) br; "of " (counted(scores.years, "year")) }
        td { (score(scores.nash_sutcliffe)) }
        td { (score(scores.kling_gupta.map(|parts| parts.efficiency))) }
        td { (percent(scores.bias_pct)) }
        td { (score(scores.skill_above_day_of_year_mean)) }
        @if let Some(window) = &scores.window {
            td {
                @if let (Some(observed), Some(modelled)) = (window.observed_mean_hm3, window.modelled_mean_hm3) {
                    (reader.volume(observed)) " → " (reader.volume(modelled)) br;
                    (percent(window.bias_pct)) ", " (counted(window.years, "year"))
                } @else { (DASH) }
                @if window.years_left_out > 0 { ", " (window.years_left_out) " left out" }
            }
            td { (score(window.correlation)) }
            td {
                @match window.mean_absolute_error_pct {
                    None => { (DASH) }
                    Some(error) => { (fixed(error, 0)) " %" }
                }
            }
        }
    } }
}

/// A parameter of a routing in words.
type Told = fn(&Routing) -> String;

/// What was searched for: as stated, and what was found on all years and on each half.
fn parameters(found: &InflowSkill, fit: &InflowFit) -> Markup {
    let halves = fit.halves.iter().map(|half| (half.fitted_on.words(), &half.routing));
    let columns =
        [("as stated", &fit.stated), ("all years, in use", &found.routing)].into_iter().chain(halves);
    let columns: Vec<(&str, &Routing)> = columns.collect();
    let rows: [(&str, Told); 4] = [
        ("share of the water that runs off", share_of_months),
        ("days in which inflow falls to 1/e", |routing| fixed(routing.recession_days, 1)),
        ("share of it that passes the slow store", |routing| of_slow(routing, |slow| fixed(slow.share, 2))),
        ("days in which the slow store's falls to 1/e", |routing| {
            of_slow(routing, |slow| fixed(slow.recession_days, 0))
        }),
    ];
    let rows = rows.into_iter().filter(|(name, _)| fit.stated.slow.is_some() || !name.contains("slow"));
    html! { div.scroll { table {
        caption {
            "What was fitted, by the highest KGE of daily inflow, and to which years. Months keep the ratios that the scenario states. Where the halves differ much, the \
             inflow hardly tells the parameter."
        }
        thead { tr {
            th scope="col" { "Parameter" }
            @for (name, _) in &columns { th scope="col" { (name) } }
        } }
        tbody { @for (name, of) in rows { tr {
            th scope="row" { (name) }
            @for (_, routing) in &columns { td { (of(routing)) } }
        } } }
    } } }
}

/// `0.62`; of months that differ, `0.4–0.8`.
fn share_of_months(routing: &Routing) -> String {
    let [low, high] =
        [f64::min, f64::max].map(|of| routing.runoff_fraction.into_iter().reduce(of).unwrap_or_default());
    let [low, high] = [low, high].map(|share| stated((share * 100.0).round() / 100.0));
    if low == high { low } else { format!("{low}–{high}") }
}

fn of_slow(routing: &Routing, of: impl Fn(crate::inflow::SlowStore) -> String) -> String {
    routing.slow.map_or(DASH.to_owned(), of)
}
