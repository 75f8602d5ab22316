//! What one degree and one percent do, and that they do not add; what the changes with a name come to.

use super::super::numbers::{fixed, precision, signed};
use super::super::reader::Reader;
use super::telling_level;
use crate::findings::{
    Crossing, Estimate, Findings, INTERACTION_PCT, NamedNode, Offset, ResponseSurface, Slope, Slopes,
    compound_share_pct,
};
use crate::season::MELT_OUT_DAY;

/// `12.2 ± 0.25 %`: the size of a percentage with its error.
pub(in super::super) fn percent(found: Estimate) -> String {
    let error = found.monte_carlo_error.map_or(String::new(), |error| format!(" ± {}", precision(error)));
    format!("{}{error} %", fixed(found.value.abs(), 1 + usize::from(found.value.abs() < 9.95)))
}

/// The same per degree of the reader's.
pub(in super::super) fn per_degree(found: Estimate, reader: Reader) -> Estimate {
    compound_share_pct(found, reader.units.warming().of(1.0))
}

/// Sentences on the slopes at the reference and at a telling level, by band, and on the interaction.
pub(super) fn slopes(findings: &Findings, reader: Reader) -> Vec<String> {
    let Some(surface) = &findings.surface else { return Vec::new() };
    let Some(title) = surface.measures.first().map(|measure| measure.title.as_str()) else {
        return Vec::new();
    };
    let alone =
        if surface.levels_warm_alone { "" } else { " alone, without the stated change of precipitation," };
    let at = |level: usize| surface.slopes.iter().find(|of| of.level_c == findings.levels_c[level]);
    let telling = telling_level(findings).and_then(at);
    let mut words = Vec::new();
    if let Some(reference) = at(findings.reference) {
        words.extend(both(reference, "At the reference", [title, alone], reader));
        words.extend(by_band(findings, reference, reader));
    }
    if let Some(telling) = telling {
        words.extend(both(telling, &format!("At {}", reader.level(telling.level_c)), [title, alone], reader));
        words.extend(interaction(telling, (title, findings.levels_c[findings.reference]), reader));
    }
    words.extend(
        surface
            .offset
            .as_ref()
            .and_then(|of| offset(of, surface, (title, findings.levels_c[findings.reference]), reader)),
    );
    words
}

/// The warming that an increase of precipitation makes up for.
fn offset(
    of: &Offset,
    surface: &ResponseSurface,
    (title, reference_c): (&str, f64),
    reader: Reader,
) -> Option<String> {
    let more = format!("{} % precipitation alone", signed(of.precipitation_change_pct, 0));
    match of.warming {
        Crossing::At { level_c, .. } => {
            let end = |end: Option<f64>| {
                end.map_or_else(
                    || "beyond the grid".to_owned(),
                    |end_c| reader.between_levels_bare(end_c - reference_c),
                )
            };
            let range = of.range.filter(|range| range.q05_c.is_some() || range.q95_c.is_some());
            let range = range.map_or(String::new(), |range| {
                format!(" (Monte Carlo, 5–95 %: {} to {})", end(range.q05_c), end(range.q95_c))
            });
            Some(format!(
                "{more} makes up for about {} of warming{range}: there the median {title} is the reference's.",
                reader.between_levels(level_c - reference_c)
            ))
        }
        Crossing::NotReached { up_to_c } => Some(format!(
            "{more} leaves the median {title} above the reference's up to {}, the warmest of the surface's {} warmings.",
            reader.level(up_to_c),
            surface.warmings_c.len()
        )),
        Crossing::Unknown => None,
    }
}

fn both(at: &Slopes, place: &str, [title, alone]: [&str; 2], reader: Reader) -> Option<String> {
    let Slope { per_degree_pct, per_percent_pct, .. } = at.basin;
    let (degree, percents) = (per_degree(per_degree_pct?, reader), per_percent_pct?);
    let takes = if degree.value <= 0.0 { "takes" } else { "adds" };
    let adds = if percents.value >= 0.0 { "adds" } else { "takes" };
    Some(format!(
        "{place}, one {} more{alone} {takes} {} of the {title} there, and one percent more precipitation {adds} {}.",
        reader.units.warming().word,
        percent(degree),
        percent(percents)
    ))
}

/// The bands that lose most and least a degree.
fn by_band(findings: &Findings, at: &Slopes, reader: Reader) -> Option<String> {
    let found =
        findings.bands.iter().zip(&at.bands).filter_map(|(of, slope)| Some((of.band, slope.per_degree_pct?)));
    let mut found: Vec<_> = found.collect();
    found.sort_by(|a, b| a.1.value.total_cmp(&b.1.value));
    let ([most, least], bands) = ([*found.first()?, *found.last()?], found.len());
    if bands < 2 {
        return None;
    }
    let said = |(band, slope): (crate::basin::Band, Estimate)| {
        let slope = per_degree(slope, reader);
        let error = slope.monte_carlo_error.map_or(String::new(), |error| format!(" ± {}", precision(error)));
        format!(
            "{}{error} % in the band of {} to {}",
            signed(slope.value, 1),
            reader.elevation_bare(band.lower_m),
            reader.elevation(band.upper_m)
        )
    };
    Some(format!(
        "By elevation, one {} more at the reference changes it by {} to {}, over {bands} bands that have snow enough.",
        reader.units.warming().word,
        said(most),
        said(least)
    ))
}

/// Whether warming and precipitation add.
fn interaction(at: &Slopes, (title, reference_c): (&str, f64), reader: Reader) -> Option<String> {
    let (found, pct) = (at.interaction_mm?, at.interaction_pct?);
    let together = format!(
        "Warming by {} and {} % precipitation together",
        reader.level(at.level_c - reference_c),
        signed(INTERACTION_PCT, 0)
    );
    let error = found.monte_carlo_error?;
    if found.value.abs() <= 2.0 * error {
        return Some(format!(
            "{together} do to the {title} what both do alone, within the Monte Carlo error."
        ));
    }
    let word = if found.value < 0.0 { "less" } else { "more" };
    Some(format!(
        "{together} leave {} ± {} {} {word} than the sum of what both do alone ({} of the reference): they do not add.",
        reader.amount_bare(found.value.abs()),
        precision(reader.units.depth().of(error)),
        reader.units.depth().word,
        percent(pct)
    ))
}

/// A sentence a named case; projections stand in their table.
pub(super) fn cases(findings: &Findings, reader: Reader) -> Vec<String> {
    let Some(surface) = &findings.surface else { return Vec::new() };
    let is_case = |named: &&NamedNode| named.origin == crate::findings::ChangeOrigin::Case;
    let one = |named: &NamedNode| {
        let change = named.node.change;
        let swe = named.node.measures.first()?;
        let title = &surface.measures.first()?.title;
        let amount = swe.change?;
        let pct = swe.change_pct.map_or(String::new(), |pct| {
            let error =
                pct.monte_carlo_error.map_or(String::new(), |error| format!(" ± {}", precision(error)));
            format!(" ({}{error} %)", signed(pct.value, 0))
        });
        let melt_out = surface.measures.iter().position(|measure| measure.name == MELT_OUT_DAY);
        let moved = melt_out.and_then(|at| named.node.measures[at].change).map_or(String::new(), |change| {
            format!(", melt-out {}", super::super::numbers::days_moved(change.value))
        });
        Some(format!(
            "{} ({}, precipitation {} %): {title} {}{pct}{moved}.",
            named.name,
            reader.level(change.warming_c),
            signed(change.precipitation_change_pct, 0),
            reader.change(amount.value),
        ))
    };
    surface.named.iter().filter(is_case).filter_map(one).collect()
}
