//! Where snow is lost, where the snow line lies, what snow is at risk, and what decides it at which elevation.

use super::super::numbers::{fixed, signed};
use super::super::reader::Reader;
use crate::findings::{
    AtRiskLevel, BandChangeLevel, Crossover, Dominates, Findings, Line, LineRange, Places, Range, Sign,
    SnowLine,
};

/// What a range in brackets is, said behind them.
const IN_BRACKETS: &str = "in brackets 5–95 % over resampled realizations";

/// Of the level farthest from the reference: the bands' changes, the snow line and snow at risk; and the crossover wherever it becomes another.
pub(super) fn elevations(findings: &Findings, reader: Reader) -> Vec<String> {
    let Some(places) = &findings.places else { return Vec::new() };
    let reference_c = findings.levels_c[findings.reference];
    let distance = |level_c: f64| (level_c - reference_c).abs();
    let farthest =
        places.band_change.iter().max_by(|a, b| distance(a.level_c).total_cmp(&distance(b.level_c)));
    let changes = farthest.map(|change| band_change(change, findings, reader));
    let line = snow_line(&places.snow_line, findings, reader);
    let risk = places.at_risk.as_ref().and_then(|found| found.levels.last());
    let risk = risk.map(|at| at_risk(at, reader));
    let first = [changes, line, risk].into_iter().flatten();
    first.chain(crossovers(places, findings, reader)).collect()
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

fn snow_line(found: &SnowLine, findings: &Findings, reader: Reader) -> Option<String> {
    let at = |line: Line| match line {
        Line::At { elevation_m } => format!("at {}", reader.elevation(elevation_m)),
        Line::BelowLowestBand => "at or below the lowest band".to_owned(),
        Line::AboveHighestBand => "above the highest band".to_owned(),
    };
    let now = found.levels.get(findings.reference)?;
    let distance = |level_c: f64| (level_c - now.level_c).abs();
    let then = found.levels.iter().max_by(|a, b| distance(a.level_c).total_cmp(&distance(b.level_c)))?;
    let snow = |line: Line, range: Option<LineRange>| {
        let range = range.filter(|_| line.elevation_m().is_some());
        at(line) + &range.map_or(String::new(), |range| format!(" ({})", ends(range, reader)))
    };
    let (snow_now, snow_then) =
        (snow(now.snow_line, now.snow_line_resampled), snow(then.snow_line, then.snow_line_resampled));
    let has_range = [now, then]
        .iter()
        .any(|level| level.snow_line.elevation_m().and(level.snow_line_resampled).is_some());
    let brackets = if has_range { format!("; {IN_BRACKETS}") } else { String::new() };
    let depth = reader.limit(found.swe_mm);
    if then.level_c == now.level_c {
        return Some(format!(
            "The snow line, where {depth} lie, is {snow_now}{brackets}. Winter's mean over the record's years is at freezing {}; that rests on \
             no realization.",
            at(now.freezing)
        ));
    }
    let level = reader.level(then.level_c);
    let both = |[now, then]: [Line; 2], said: [String; 2]| match (now, then) {
        (Line::BelowLowestBand, Line::BelowLowestBand) | (Line::AboveHighestBand, Line::AboveHighestBand) => {
            format!("{} at both", at(now))
        }
        _ => format!("{} at the reference and {} at {level}", said[0], said[1]),
    };
    let freezing = [now.freezing, then.freezing];
    Some(format!(
        "From the reference to {level}: the snow line, where {depth} lie, is {}{}{brackets}. Winter's mean over the record's years is at freezing \
         {}{}; that rests on no realization.",
        both([now.snow_line, then.snow_line], [snow_now, snow_then]),
        rise(then.snow_line_rise_m_per_c, then.snow_line_rise_resampled_m_per_c, reader),
        both(freezing, freezing.map(at)),
        rise(then.freezing_rise_m_per_c, None, reader)
    ))
}

/// `, higher by 150 m for each °C (140 to 161)`.
fn rise(m_per_c: Option<f64>, range: Option<Range>, reader: Reader) -> String {
    let Some(rise) = m_per_c else { return String::new() };
    // Of a fall the ends change places with their signs.
    let (way, [low, high]) = match range {
        Some(range) if rise < 0.0 => ("lower", [Some(-range.q95), Some(-range.q05)]),
        Some(range) => ("higher", [Some(range.q05), Some(range.q95)]),
        None if rise < 0.0 => ("lower", [None; 2]),
        None => ("higher", [None; 2]),
    };
    let range = low.zip(high).map_or(String::new(), |(low, high)| {
        let [low, high] = [low, high].map(|end| reader.elevation_per_degree_bare(end));
        format!(" ({low} to {high})")
    });
    format!(", {way} by {}{range}", reader.elevation_per_degree(rise.abs()))
}

/// `1450 to 1530 m`, or on which side of the bands it ends.
fn ends(range: LineRange, reader: Reader) -> String {
    let bare = |end_m: f64| reader.elevation_bare(end_m);
    match (range.q05_m, range.q95_m) {
        (Some(low_m), Some(high_m)) => format!("{} to {}", bare(low_m), reader.elevation(high_m)),
        (None, Some(high_m)) => format!("the lowest band or below it to {}", reader.elevation(high_m)),
        (Some(low_m), None) => format!("{} to above the highest band", reader.elevation(low_m)),
        (None, None) if range.reaches_below_lowest_band && range.reaches_above_highest_band => {
            "the lowest band or below it to above the highest band".to_owned()
        }
        (None, None) if range.reaches_below_lowest_band => "at the lowest band or below it".to_owned(),
        (None, None) => "above the highest band".to_owned(),
    }
}

fn at_risk(found: &AtRiskLevel, reader: Reader) -> String {
    let level = reader.level(found.level_c);
    if found.bands.is_empty() {
        return format!(
            "No band's winter mean over the record's years goes from freezing to thawing by {level}: no snow is at risk by that rule."
        );
    }
    let percent = |share: f64| fixed(100.0 * share, 0);
    let volumes = found.volume_resampled_hm3.map_or(String::new(), |range| {
        format!(" ({} to {})", reader.volume_bare(range.q05), reader.volume_bare(range.q95))
    });
    let share = found.volume_share.map_or(String::new(), |share| {
        let range = found
            .volume_share_resampled
            .map_or(String::new(), |range| format!(" ({} to {} %)", percent(range.q05), percent(range.q95)));
        format!(", {} % of the basin's{range}", percent(share))
    });
    let brackets = match found.volume_resampled_hm3 {
        Some(_) => format!("; {IN_BRACKETS}"),
        None => String::new(),
    };
    let [low, high] =
        [found.volume_range_hm3.q05, found.volume_range_hm3.q95].map(|end| reader.volume_bare(end));
    // Of realizations that are all alike, or a single one, there is no range to tell.
    let spread = if low == high {
        String::new()
    } else {
        format!(
            " From realization to realization it is {low} to {} (5–95 %).",
            reader.volume(found.volume_range_hm3.q95)
        )
    };
    format!(
        "At risk by {level}: bands whose winter mean over the record's years is at or below freezing at the reference and above it there. They hold {} % of the \
         area, which rests on no realization, and {}{volumes} of snow water{share}{brackets}.{spread}",
        percent(found.area_share),
        reader.volume(found.volume_hm3)
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
        let firm = if !range.is_firm() { ", which is no firm answer" } else { "" };
        format!(" {} % of resampled realizations say the same{firm}.", fixed(100.0 * range.share_alike, 0))
    });
    let at = |elevation_m: f64| {
        let range = found.range.and_then(|range| range.elevation);
        let range = range.map_or(String::new(), |range| {
            format!(" (5–95 % over resampled realizations: {})", ends(range, reader))
        });
        format!("{}{range}", reader.elevation(elevation_m))
    };
    let words = match found.found {
        Dominates::Crossover { elevation_m } => format!(
            "up to {} a year's snow goes more with the cool season's temperature, above with its precipitation.",
            at(elevation_m)
        ),
        Dominates::Reversed { elevation_m } => format!(
            "up to {} a year's snow goes more with the cool season's precipitation, above with its temperature.",
            at(elevation_m)
        ),
        Dominates::Temperature => "at every elevation with snow enough, a year's snow goes more with the cool season's temperature than with its precipitation.".to_owned(),
        Dominates::Precipitation => "at every elevation with snow enough, a year's snow goes more with the cool season's precipitation than with its temperature.".to_owned(),
        Dominates::Unknown => return "whether temperature or precipitation decides a year's snow cannot be told at any elevation.".to_owned(),
    };
    words + &resampled
}
