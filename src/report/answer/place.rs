//! Where, and how much earlier.

use super::super::numbers::{days_moved, signed};
use super::super::reader::Reader;
use super::telling_level;
use crate::basin::{Band, told_apart};
use crate::findings::Findings;

/// How much earlier half of the melt is done, and melt-out comes, at a level.
pub(super) fn timing(findings: &Findings, at: usize, reader: Reader) -> Option<String> {
    let of = |name: &str| {
        let measure = findings.basin.iter().find(|measure| measure.measure.name == name)?;
        Some(days_moved(measure.levels[at].shift?.median.value))
    };
    let (half_melted, melt_out) = (of("melt_d50_day")?, of("melt_out_day"));
    let melt_out = melt_out.map_or(String::new(), |moved| format!(", melt-out comes {moved}"));
    Some(format!(
        "At {}, half of the net melt is done {half_melted}{melt_out}.",
        reader.level(findings.levels_c[at])
    ))
}

/// The bands that lose most and least of the headline measure, at the level nearest to 2 degC above the reference; bands
/// whose reference median is below 10 mm have no percentage and are left out.
pub(super) fn elevation(findings: &Findings, reader: Reader) -> Option<String> {
    let at = telling_level(findings)?;
    let apart = told_apart(findings.bands.iter().map(|of_band| &of_band.band));
    let changes: Vec<(&Band, Option<&String>, f64)> = findings
        .bands
        .iter()
        .zip(&apart)
        .filter_map(|(band, apart)| {
            let percent = band.measures.first()?.levels[at].percent_change?;
            Some((&band.band, apart.as_ref(), percent))
        })
        .collect();
    if changes.len() < 2 {
        return None;
    }
    let most = changes.iter().min_by(|a, b| a.2.total_cmp(&b.2))?;
    let least = changes.iter().max_by(|a, b| a.2.total_cmp(&b.2))?;
    let title = &findings.basin.first()?.measure.title;
    let where_and_how_much = |(band, apart, percent): (&Band, Option<&String>, f64)| {
        let (percent, lower) = (signed(percent, 0), reader.elevation_bare(band.lower_m));
        let apart = apart.map_or(String::new(), |ground| format!(", {ground}"));
        format!("{percent} % ({lower} to {}{apart})", reader.elevation(band.upper_m))
    };
    Some(format!(
        "By elevation, {title} at {} changes between {} and {}.",
        reader.level(findings.levels_c[at]),
        where_and_how_much(*most),
        where_and_how_much(*least),
    ))
}
