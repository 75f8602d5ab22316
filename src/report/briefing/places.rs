//! Dry and warm years, kinds of snow drought, and where snow lies, is at risk and is decided: one answer sentence each.

use super::super::answer::{chance_in_table, chance_in_words as chance};
use super::super::numbers::{fixed, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use super::Figures;
use crate::figures::Part;
use crate::findings::{
    AtRiskLevel, BandChangeLevel, Chance, Coincidence, Counted, Crossover, Depends, Dominates, Findings,
    Line, PeriodsCompared, Places, RecordCoincidence, Sign, SnowDroughts, SnowLine,
};
use maud::{Markup, html};

/// The section on kinds of years; nothing where there is no cool season.
pub(super) fn years(study: &Study<'_>, figures: &Figures<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    let places = findings.places.as_ref();
    let coincidence = places.and_then(|places| places.coincidence.as_ref());
    let record = places.and_then(|places| places.record_coincidence.as_ref());
    let droughts = places.and_then(|places| places.snow_droughts.as_ref());
    html! { @if let Some(found) = coincidence {
        h2 { "Dry years and warm ones" }
        p { (dry_and_warm(found, findings, reader)) }
        (figures.of(Part::DryAndWarm))
        p { (depends(found, findings)) }
        @if let Some(record) = record { p { (of_record(record)) } }
        @if let Some(droughts) = droughts { p { (kinds_of_drought(droughts, findings, reader)) } }
    } }
}

/// The paragraphs on elevations; nothing where nothing was found.
pub(super) fn elevations(study: &Study<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    let last =
        |places: &Places| places.band_change.last().map(|change| band_change(change, findings, reader));
    html! { @if let Some(places) = &findings.places {
        @if let Some(words) = last(places) { p { (words) } }
        p { (snow_line(&places.snow_line, findings, reader)) }
        @if let Some(at) = places.at_risk.as_ref().and_then(|found| found.levels.last()) { p { (at_risk(at, reader)) } }
        @for sentence in crossovers(places, findings, reader) { p { (sentence) } }
    } }
}

/// An answer that fewer resampled realizations share is not firm.
const FIRM_SHARE: f64 = 0.9;
/// Shares of fewer years than this say nothing of a period.
const LEAST_YEARS_OF_A_PERIOD: u64 = 5;

/// `about 3 in 10 years`.
fn in_ten(share: f64) -> String {
    match (10.0 * share).round() as u32 {
        0 => "fewer than 1 in 20 years".to_owned(),
        10 => "more than 19 in 20 years".to_owned(),
        tenths => format!("about {tenths} in 10 years"),
    }
}

fn said(found: Chance) -> String {
    format!("{} ({})", in_ten(found.estimate.value), chance_in_table(found))
}

fn dry_and_warm(found: &Coincidence, findings: &Findings, reader: Reader) -> String {
    let at = |level: usize| found.levels.get(level);
    let Some(now) = at(findings.reference).and_then(|level| level.dry_warm) else { return String::new() };
    let mut words = format!("At the reference, {} are both dry and warm", said(now));
    let last = found.levels.len() - 1;
    if let Some(then) = at(last).filter(|_| last != findings.reference)
        && let Some(dry_warm) = then.dry_warm
    {
        words += &format!("; at {}, {}", reader.level(then.level_c), said(dry_warm));
    }
    words += ".";
    let Some(level) = at(findings.reference) else { return words };
    let given = level.low_snow_given_dry;
    words
        + &match (given.warm, given.cool) {
            (Some(warm), Some(cool)) => {
                let ratio = given.ratio.map_or_else(
                    || ": no dry and cool year is low in snow, so that there is no ratio.".to_owned(),
                    |ratio| {
                        let error = ratio
                            .monte_carlo_error
                            .map_or(String::new(), |error| format!(" ± {}", fixed(error, 2)));
                        format!(", {}{error} times as often.", fixed(ratio.value, 2))
                    },
                );
                format!(
                    " A dry year is low in snow, below the {} % quantile of the reference's single years, with a chance of {} where it is warm, and {} where \
                     it is cool{ratio}",
                    fixed(100.0 * found.low_snow_below_quantile, 0),
                    chance(warm),
                    chance(cool)
                )
            }
            _ => " The snow of dry years cannot be compared: there are not both warm and cool ones, or too many of the reference's \
                  years are bare."
                .to_owned(),
        }
}

fn depends(found: &Coincidence, findings: &Findings) -> String {
    let Some(own) = found.levels.get(findings.reference).map(|level| &level.own_medians) else {
        return String::new();
    };
    let Some(factor) = own.dependence else {
        return "Whether dry years tend to be warm cannot be told: one of the two never comes.".to_owned();
    };
    let error = factor.monte_carlo_error.map_or(String::new(), |error| format!(" ± {}", fixed(error, 2)));
    let factor = fixed(factor.value, 2);
    let verdict = match own.depends {
        Depends::MoreOften => "in the weather that was made, dry years tend to be warm",
        Depends::LessOften => "in the weather that was made, dry years tend to be cool",
        Depends::CannotTell => {
            "these realizations cannot tell whether dry years are warm more or less often than by chance"
        }
    };
    format!(
        "About the reference's own medians, dry and warm years come {factor}{error} times as often as if the two knew nothing of each other: {verdict}. It was made from the record, and whether \
         the climate itself has such a tie only the record can say."
    )
}

fn of_record(found: &RecordCoincidence) -> String {
    let counted = |counted: Counted| {
        let range = counted.wilson.map_or(String::new(), |[low, high]| {
            format!(" ({}–{} %)", fixed(100.0 * low, 0), fixed(100.0 * high, 0))
        });
        format!("{} of {}{range}", counted.count, counted.of)
    };
    let test = found.fisher_p.map_or(String::new(), |p| {
        let verdict =
            if p < 0.05 { "that is hardly chance" } else { "so few years cannot tell that from chance" };
        format!(" Fisher's exact test of independence has p = {}: {verdict}.", fixed(p, 2))
    });
    let mut words = format!(
        "In the record itself, {} years are dry and warm; in brackets Wilson's 95 % interval.{test} Low snow, below the {} % quantile of these years, came in {} dry and warm years and in {} dry and cool ones.",
        counted(found.dry_warm),
        fixed(100.0 * found.low_snow_below_quantile, 0),
        counted(found.low_snow_given_dry_warm),
        counted(found.low_snow_given_dry_cool)
    );
    let is_told = |periods: &PeriodsCompared| {
        [periods.earlier, periods.later].iter().all(|period| period.dry_warm.of >= LEAST_YEARS_OF_A_PERIOD)
    };
    if let Some(periods) = found.periods.filter(is_told) {
        let verdict = if periods.are_apart {
            "by the same test that is hardly chance"
        } else {
            "so few years cannot tell the two periods apart"
        };
        let ratio =
            periods.ratio.map_or(String::new(), |ratio| format!(", {} times the share", fixed(ratio, 2)));
        words += &format!(
            " From {} to {} there were {}, from {} to {} {}{ratio}; {verdict}.",
            periods.earlier.first_year,
            periods.earlier.last_year,
            counted(periods.earlier.dry_warm),
            periods.later.first_year,
            periods.later.last_year,
            counted(periods.later.dry_warm)
        );
    }
    words
}

fn kinds_of_drought(found: &SnowDroughts, findings: &Findings, reader: Reader) -> String {
    let of = |level: usize| {
        let level = found.levels.get(level)?;
        Some(format!(
            "at {}, {} bring a dry snow drought and {} a warm one",
            reader.level(level.level_c),
            said(level.dry?),
            said(level.warm?)
        ))
    };
    let last = found.levels.len() - 1;
    let levels = [Some(findings.reference), Some(last).filter(|last| *last != findings.reference)];
    let said: Vec<String> = levels.into_iter().flatten().filter_map(of).collect();
    format!(
        "A snow drought has no more than {} of {}, as 3 in 10 of the reference's years have; it is dry where precipitation before that date is below the \
         reference's median, and warm where it is not: {}.",
        reader.amount(found.low_at_mm),
        findings.basin.first().map_or("snow water", |headline| headline.measure.title.as_str()),
        said.join("; ")
    )
}

fn band_change(change: &BandChangeLevel, findings: &Findings, reader: Reader) -> String {
    let band = |at: usize| {
        let band = &findings.bands[at].band;
        format!("{}–{}", reader.elevation_bare(band.lower_m), reader.elevation(band.upper_m))
    };
    let mut words = format!("At {}, ", reader.level(change.level_c));
    let of = |at: Option<usize>| at.and_then(|at| Some((at, change.bands.get(at).copied().flatten()?)));
    words += &match of(change.loses_most_mm) {
        Some((at, found)) => format!(
            "the band at {} loses most depth, {} (5–95 %: {})",
            band(at),
            reader.change(found.median_mm.value),
            reader.change_and_change(found.range_mm.q05, found.range_mm.q95)
        ),
        None => "no band loses snow water by its median".to_owned(),
    };
    if let Some((at, found)) = of(change.loses_most_pct) {
        let percent = found.percent.map_or(String::new(), |percent| format!(", {} %", signed(percent, 0)));
        words += &format!("; the one at {} most of its own{percent}", band(at));
    }
    if let Some((at, _)) = of(change.loses_most_hm3) {
        words += &format!("; the one at {} most volume", band(at));
    }
    let gain: Vec<String> = change.of_sign(Sign::Gains).into_iter().map(band).collect();
    // Bands that are bare at both are no open question.
    let is_bare = |band: &usize| {
        let range = change.bands[*band].map(|change| change.range_mm);
        range.is_some_and(|range| range.q05 == 0.0 && range.q95 == 0.0)
    };
    let open = change.of_sign(Sign::CannotTell).iter().filter(|band| !is_bare(band)).count();
    words += &match gain.as_slice() {
        [] => ". No band gains beyond its 5–95 % range.".to_owned(),
        bands => format!(". Gains beyond their 5–95 % range: {}.", bands.join(", ")),
    };
    if open > 0 {
        words += &format!(" In {open} of {} bands loss and gain cannot be told apart.", change.bands.len());
    }
    words
}

fn snow_line(found: &SnowLine, findings: &Findings, reader: Reader) -> String {
    let at = |line: Line| match line {
        Line::At { elevation_m } => format!("at {}", reader.elevation(elevation_m)),
        Line::BelowLowestBand => "at or below the lowest band".to_owned(),
        Line::AboveHighestBand => "above the highest band".to_owned(),
    };
    let [Some(now), Some(then)] = [found.levels.get(findings.reference), found.levels.last()] else {
        return String::new();
    };
    let then_c = then.level_c;
    let both = |now: Line, then: Line| match (now, then) {
        (Line::BelowLowestBand, Line::BelowLowestBand) | (Line::AboveHighestBand, Line::AboveHighestBand) => {
            format!("{} at both", at(now))
        }
        _ => format!("{} at the reference and {} at {}", at(now), at(then), reader.level(then_c)),
    };
    let rise = |m_per_c: Option<f64>| {
        m_per_c.map_or(String::new(), |rise| format!(", higher by {}", reader.elevation_per_degree(rise)))
    };
    if then.level_c == now.level_c {
        return format!(
            "The snow line, {}, lies {}; winter's mean is at freezing {}.",
            reader.limit(found.swe_mm),
            at(now.snow_line),
            at(now.freezing)
        );
    }
    format!(
        "From the reference to {}: the snow line, where {} lie, is {}{}; winter's mean is at freezing {}{}.",
        reader.level(then_c),
        reader.limit(found.swe_mm),
        both(now.snow_line, then.snow_line),
        rise(then.snow_line_rise_m_per_c),
        both(now.freezing, then.freezing),
        rise(then.freezing_rise_m_per_c)
    )
}

fn at_risk(found: &AtRiskLevel, reader: Reader) -> String {
    if found.bands.is_empty() {
        return format!(
            "No band's winter mean goes from freezing to thawing by {}: no snow is at risk by that rule.",
            reader.level(found.level_c)
        );
    }
    let share = found
        .volume_share
        .map_or(String::new(), |share| format!(", {} % of the basin's", fixed(100.0 * share, 0)));
    format!(
        "At risk by {}: bands whose winter mean is at or below freezing now and above it then. They hold {} % of the area and {} of snow water{share} (5–95 %: {} to {}).",
        reader.level(found.level_c),
        fixed(100.0 * found.area_share, 0),
        reader.volume(found.volume_hm3),
        reader.volume_bare(found.volume_range_hm3.q05),
        reader.volume_bare(found.volume_range_hm3.q95)
    )
}

/// Of the reference, and of each level from which on the answer is another.
fn crossovers(places: &Places, findings: &Findings, reader: Reader) -> Vec<String> {
    let mut before = None;
    let mut said = Vec::new();
    for at in places.crossover.iter().skip(findings.reference) {
        let kind = std::mem::discriminant(&at.found);
        if before != Some(kind) {
            said.push(format!("At {}: {}", reader.level(at.level_c), crossover(at, reader)));
        }
        before = Some(kind);
    }
    said
}

fn crossover(found: &Crossover, reader: Reader) -> String {
    let resampled = found.range.map_or(String::new(), |range| {
        let firm = if range.share_alike < FIRM_SHARE { ", which is no firm answer" } else { "" };
        format!(" {} % of resampled realizations say the same{firm}.", fixed(100.0 * range.share_alike, 0))
    });
    let words = match found.found {
        Dominates::Crossover { elevation_m } => format!(
            "up to {} a year's snow goes more with the cool season's temperature, above with its precipitation.",
            reader.elevation(elevation_m)
        ),
        Dominates::Reversed { elevation_m } => format!(
            "up to {} a year's snow goes more with the cool season's precipitation, above with its temperature.",
            reader.elevation(elevation_m)
        ),
        Dominates::Temperature => "at every elevation with snow enough, a year's snow goes more with the cool season's temperature than with its precipitation.".to_owned(),
        Dominates::Precipitation => "at every elevation with snow enough, a year's snow goes more with the cool season's precipitation than with its temperature.".to_owned(),
        Dominates::Unknown => return "whether temperature or precipitation decides a year's snow cannot be told at any elevation.".to_owned(),
    };
    words + &resampled
}
