//! The briefing: one self-contained page. It lays out; the words and numbers come from elsewhere.

use super::numbers::{DASH, amount, fixed, level, outcome, signed};
use super::study::Study;
use super::words::{Answer, period_name};
use super::{cautions, terms};
use crate::figures::Svg;
use crate::findings::{LevelFindings, MeasureFindings};
use crate::season::Kind;
use crate::snow::{DegreeRule, PhaseRule};
use maud::{DOCTYPE, Markup, PreEscaped, html};
use sha2::{Digest, Sha256};

const STYLE: &str = include_str!("briefing.css");

/// The page. Nothing is fetched and no script runs: its own policy forbids both.
pub fn briefing_html(study: &Study<'_>, answer: &Answer, figures: &[Svg]) -> Vec<u8> {
    let findings = study.findings;
    let policy =
        format!("default-src 'none'; style-src 'sha256-{}'", base64(&Sha256::digest(STYLE.as_bytes())));
    let page = html! {
        (DOCTYPE)
        html lang="en" {
            head {
                meta charset="utf-8";
                meta http-equiv="Content-Security-Policy" content=(policy);
                meta name="viewport" content="width=device-width, initial-scale=1";
                title { (study.title) " – briefing" }
                style { (PreEscaped(STYLE)) }
            }
            body {
                main {
                    p.over {
                        (findings.realizations) " realizations of " (findings.years) " water years under "
                        (findings.levels_c.len()) " warming levels, " (study.basin.bands.len()) " elevation bands"
                    }
                    h1 { (study.title) }
                    p.notice {
                        "This model is not fitted to observed snow. Its parameters are "
                        @if study.defaults.iter().any(|(key, _)| key.starts_with("snow.")) { "at least in part the defaults" } @else { "those stated in the scenario" }
                        ", and they decide headlines: hold the record's own years below against snow you know before you rely on any number here."
                    }
                    (answer_section(answer))
                    @for figure in figures {
                        figure { (PreEscaped(&figure.text)) figcaption { (figure.caption) } }
                    }
                    (tables_section(study))
                    (record_section(study))
                    (assumptions_section(study))
                    (list_section("Cautions", &cautions::CAUTIONS))
                    h2 { "Terms" }
                    dl { @for (term, meaning) in terms::TERMS { dt { (term) } dd { (meaning) } } }
                    (repeat_section(study))
                }
            }
        }
    };
    page.into_string().into_bytes()
}

fn answer_section(answer: &Answer) -> Markup {
    html! {
        h2 { "Answer" }
        p.verdict { (answer.verdict) }
        ul {
            @for sentence in answer.amounts.iter().chain(&answer.timing).chain(&answer.elevation) { li { (sentence) } }
        }
        h3 { "Could chance hide it?" }
        ul { @for sentence in &answer.chances { li { (sentence) } } }
        h3 { "How it is measured" }
        @for sentence in &answer.yardstick { p { (sentence) } }
    }
}

fn tables_section(study: &Study<'_>) -> Markup {
    let findings = study.findings;
    html! {
        h2 { "Level by level" }
        div.scroll {
            table {
                caption { "Basin mean, median over " (findings.realizations) " realizations of " (findings.years)
                    "-year values; below it the median paired change from the reference, and how often the change is its half spread." }
                thead { tr {
                    th scope="col" { "Measure" }
                    @for level_c in &findings.levels_c { th scope="col" { (level(*level_c)) } }
                } }
                tbody { @for measure in &findings.basin { tr {
                    th scope="row" { (measure.measure.title) }
                    @for at in &measure.levels { td { (level_cell(study, measure, at)) } }
                } } }
            }
        }
        @if let Some(headline) = findings.basin.first() {
            h3 { "By elevation: " (period_name(findings, headline)) }
            div.scroll {
                table {
                    caption { "Median over realizations; in brackets the change from the reference, where its median is 10 mm or more." }
                    thead { tr {
                        th scope="col" { "Band, m" } th scope="col" { "Area, km²" }
                        @for level_c in &findings.levels_c { th scope="col" { (level(*level_c)) } }
                    } }
                    tbody { @for band in findings.bands.iter().rev() { @if let Some(measure) = band.measures.first() { tr {
                        th scope="row" { (fixed(band.band.lower_m, 0)) " – " (fixed(band.band.upper_m, 0)) }
                        td { (fixed(band.band.area_km2, 1)) }
                        @for at in &measure.levels { td {
                            (outcome(at.periods.q50, Kind::AmountMm, study.starts()))
                            @if let Some(percent) = at.percent_change { " (" (signed(percent, 0)) " %)" }
                        } }
                    } } } }
                }
            }
        }
        p { "All of it, with ranges and Monte Carlo errors, stands in " code { "tables/" } " and " code { "summary.json" } "." }
    }
}

fn level_cell(study: &Study<'_>, measure: &MeasureFindings, at: &LevelFindings) -> Markup {
    let kind = measure.measure.kind;
    let undefined = at.periods.none + at.periods.not_gone;
    html! {
        (outcome(at.periods.q50, kind, study.starts()))
        @if let Some(shift) = at.shift {
            br;
            @match kind {
                Kind::AmountMm => {
                    (signed(shift.median.value, super::numbers::amount_decimals(shift.median.value))) " mm"
                    @if let Some(percent) = at.percent_change { ", " (signed(percent, 0)) " %" }
                }
                Kind::DayOfWaterYear => { (signed(shift.median.value, 0)) " d" }
            }
            br;
            @match at.signal_to_spread { Some(ratio) => { (fixed(ratio.value, 2)) " ×" } None => { (DASH) } }
        }
        @if undefined > 0 {
            br;
            @if at.periods.none > 0 { (at.periods.none) " none" }
            @if at.periods.none > 0 && at.periods.not_gone > 0 { ", " }
            @if at.periods.not_gone > 0 { (at.periods.not_gone) " not gone" }
        }
    }
}

fn record_section(study: &Study<'_>) -> Markup {
    let record = &study.record;
    let counts = record.counts;
    let headline = record.measures.first();
    html! {
        h2 { "The record" }
        p {
            (counts.first) " to " (counts.last) ", " (counts.days) " days: " (record.years.len()) " water years in use, "
            (record.skipped.len()) " left out. Mean yearly precipitation at the station, after the catch correction, "
            (amount(record.mean_precipitation_mm)) "; in the years in use, " (counts.interpolated_days)
            " days have interpolated temperatures and " (counts.dry_for_want_of_data_days)
            " run without precipitation because it is missing."
            @if counts.crossed_temperature_days > 0 {
                " On " (counts.crossed_temperature_days) " days the minimum stood above the maximum; both were taken as missing."
            }
            @if let Some(gauge) = counts.gauge {
                " The accumulating gauge was set back " (gauge.resets) " times and fell a little " (gauge.small_falls)
                " times (" (amount(gauge.small_falls_mm)) " in all, taken for noise)."
            }
        }
        @if !record.skipped.is_empty() {
            div.scroll { table {
                caption { "Water years left out; the year after each starts bare." }
                thead { tr { th scope="col" { "Water year" } th.text scope="col" { "Why" } } }
                tbody { @for year in record.skipped { tr {
                    th scope="row" { (year.water_year) }
                    td.text { @for (at, why) in year.why.iter().enumerate() { @if at > 0 { "; " } (why) } }
                } } }
            } }
        }
        @if let Some(headline) = headline {
            h3 { "The record's own years, as the model runs them at the reference" }
            p { (headline.title) " of the basin mean by water year: "
                @for (at, year) in record.years.iter().enumerate() {
                    @if at > 0 { ", " }
                    (year.water_year) " " (outcome(year.values[0].into(), headline.kind, study.starts()))
                } "." }
        }
    }
}

fn assumptions_section(study: &Study<'_>) -> Markup {
    let snow = study.snow;
    html! {
        h2 { "What was assumed" }
        dl {
            dt { "Rain or snow" } dd { @match snow.rain_snow {
                PhaseRule::Linear { snow_only_below_c, rain_only_above_c } => {
                    "by the band's daily mean temperature: snow only below " (snow_only_below_c) " °C, rain only above " (rain_only_above_c) " °C, linear between" }
                PhaseRule::Step { half_snow_at_c } => { "snow up to a daily mean of " (half_snow_at_c) " °C, rain above" }
            } }
            dt { "Melt" } dd { (snow.degree_day_factor_lowest) " to " (snow.degree_day_factor_highest) " mm per °C and day through the year, highest on "
                (snow.highest_on.words()) ", for degrees above " (snow.melt_base_c) " °C "
                @match snow.degree_rule { DegreeRule::Mean => "of the daily mean" , DegreeRule::Diurnal => "of a sine between the day's minimum and maximum" } }
            dt { "Pack" } dd { "holds liquid water up to " (fixed(100.0 * snow.liquid_holding_fraction, 0)) " % of its ice; refreezes at "
                (fixed(100.0 * snow.refreeze_fraction, 0)) " % of the melt rate" }
            dt { "Gauge" } dd { "what was caught times " (study.gauge_multiplier.snow) " for snow and " (study.gauge_multiplier.rain)
                " for rain, once, at the observed temperature" }
            dt { "Elevation" } dd { "station at " (fixed(study.station_elevation_m, 0)) " m; basin-mean precipitation is "
                (fixed(study.basin.precipitation_ratio(study.station_elevation_m), 2)) " times the station's, so "
                (amount(study.basin.precipitation_ratio(study.station_elevation_m) * study.record.mean_precipitation_mm)) " a year" }
            dt { "Warming" } dd { "added to every day's temperatures; storms, wet days and their order stay; precipitation changes by "
                (signed(study.warming.precipitation_change_pct_per_c, 1)) " % per °C" }
            dt { "Realizations" } dd { "whole water years of the record in runs of " (fixed(study.mean_run_years, 1)) " years in the mean; the same realization under every level"
                @match study.mean_change_sd_pct { Some(sd) => { "; mean precipitation changed at random, standard deviation " (fixed(sd, 1)) " % (an assumption)" } None => {} } }
        }
        h3 { "Defaults in force" }
        @if study.defaults.is_empty() { p { "None: the scenario states everything." } } @else {
            p { @for (at, (key, value)) in study.defaults.iter().enumerate() { @if at > 0 { ", " } code { (key) " = " (value) } } }
        }
        @if !study.unlikely.is_empty() {
            h3 { "Unlikely, but allowed" }
            ul { @for notice in study.unlikely { li { code { (notice.about) } ": " (notice.why) } } }
        }
    }
}

fn list_section(title: &str, sentences: &[&str]) -> Markup {
    html! { h2 { (title) } ul { @for sentence in sentences { li { (sentence) } } } }
}

fn repeat_section(study: &Study<'_>) -> Markup {
    html! {
        h2 { "How to repeat it" }
        p { code { (study.origin.command) } " with seed " (study.origin.seed) " and thawline " (env!("CARGO_PKG_VERSION")) ". Input files and their SHA-256:" }
        ul { @for input in &study.origin.inputs { li { (input.role) ": " code { (input.path) } " " code { (input.sha256) } } } }
        footer { "Written by thawline " (env!("CARGO_PKG_VERSION")) ". A planning aid: not for flood forecasting or the operation of dams." }
    }
}

/// RFC 4648, for the digest in the page's policy.
fn base64(bytes: &[u8]) -> String {
    const ALPHABET: &[u8; 64] = b"ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
    let mut text = String::new();
    for chunk in bytes.chunks(3) {
        let mut group = [0; 3];
        group[..chunk.len()].copy_from_slice(chunk);
        let bits = u32::from_be_bytes([0, group[0], group[1], group[2]]);
        for place in 0..4 {
            let digit = (bits >> (18 - 6 * place)) & 63;
            text.push(if place <= chunk.len() { char::from(ALPHABET[digit as usize]) } else { '=' });
        }
    }
    text
}

#[cfg(test)]
mod tests {
    /// RFC 4648, section 10.
    #[test]
    fn base64_test_vectors() {
        assert_eq!(super::base64(b"foobar"), "Zm9vYmFy");
        assert_eq!(super::base64(b"fooba"), "Zm9vYmE=");
        assert_eq!(super::base64(b"foob"), "Zm9vYg==");
    }
}
