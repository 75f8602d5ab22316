//! `precipitation_change_pct_per_c`, or `precipitation_change_pct` as stated for levels and months.

use super::numbers::Nested;
use super::section::Section;
use crate::fault::Fault;
use crate::perturb::{PrecipitationChange, StatedChange};

/// A change beyond this range cannot be meant, percent.
const POSSIBLE_PCT: std::ops::RangeInclusive<f64> = -100.0..=300.0;
/// Percent per degC that can be meant.
const POSSIBLE_PCT_PER_C: std::ops::RangeInclusive<f64> = -50.0..=50.0;
/// The air can hold about 7 % more water a degree (Clausius-Clapeyron); basins have been projected within this.
const USUAL_PCT_PER_C: std::ops::RangeInclusive<f64> = -10.0..=10.0;

/// `typed_c` are the levels in the order in which they were typed, or the reason why there are none.
pub(super) fn read_precipitation_change(
    section: &mut Section<'_>,
    typed_c: Option<&[f64]>,
    reference_c: f64,
) -> Option<PrecipitationChange> {
    if section.has("precipitation_change_pct") {
        if section.has("precipitation_change_pct_per_c") {
            section.fault(Fault::key(
                section.path_of("precipitation_change_pct"),
                "precipitation_change_pct beside precipitation_change_pct_per_c",
                "one of the two",
                "state the change of each level, or percent per degC",
            ));
        }
        section.knows("precipitation_change_pct_per_c");
        let months_by_level = section.nested_numbers("precipitation_change_pct")?;
        return stated(section, &months_by_level, typed_c?, reference_c);
    }
    section.knows("precipitation_change_pct");
    per_degree(section)
}

fn per_degree(section: &mut Section<'_>) -> Option<PrecipitationChange> {
    let key = "precipitation_change_pct_per_c";
    if !section.has(key) {
        section.knows(key);
        section.default(key, "0");
        return Some(PrecipitationChange::PctPerC([0.0; 12]));
    }
    let pct = section.one_or_monthly(key, "")?;
    if let Some(beyond) = pct.iter().find(|pct| !POSSIBLE_PCT_PER_C.contains(pct)) {
        section.fault(Fault::key(
            section.path_of(key),
            beyond,
            "a number from -50 to 50, or twelve of them",
            "percent per degC; the air can hold about 7 more, the global mean rises by 2 to 3",
        ));
        return None;
    }
    if pct.iter().any(|pct| !USUAL_PCT_PER_C.contains(pct)) {
        section.unlikely(
            key,
            "outside -10 to 10 percent per degC; the air can hold about 7 more (Clausius-Clapeyron)",
        );
    }
    Some(PrecipitationChange::PctPerC(pct))
}

/// One number: every level but the reference. As many numbers as levels: one a level. Twelve otherwise: one a month, at
/// every level but the reference. As many lists as levels: a list of one or twelve numbers each.
fn stated(
    section: &Section<'_>,
    typed: &Nested,
    levels_c: &[f64],
    reference_c: f64,
) -> Option<PrecipitationChange> {
    let warmed = |pct: [f64; 12]| -> Vec<StatedChange> {
        let others = levels_c.iter().filter(|level_c| **level_c != reference_c);
        others.map(|level_c| StatedChange { level_c: *level_c, pct }).collect()
    };
    let changes = match typed {
        Nested::One(pct) => Some(warmed([*pct; 12])),
        Nested::List(list) if list.len() == levels_c.len() => {
            let pairs = levels_c.iter().zip(list);
            Some(pairs.map(|(level_c, pct)| StatedChange { level_c: *level_c, pct: [*pct; 12] }).collect())
        }
        Nested::List(list) => <[f64; 12]>::try_from(list.as_slice()).ok().map(warmed),
        Nested::Lists(lists) if lists.len() == levels_c.len() => {
            let pairs = levels_c.iter().zip(lists);
            pairs
                .map(|(level_c, list)| {
                    let pct = match list.as_slice() {
                        [one] => Some([*one; 12]),
                        several => <[f64; 12]>::try_from(several).ok(),
                    };
                    pct.map(|pct| StatedChange { level_c: *level_c, pct })
                })
                .collect()
        }
        Nested::Lists(_) => None,
    };
    let key = section.path_of("precipitation_change_pct");
    let Some(changes) = changes else {
        section.fault(Fault::key(
            key,
            "a list of another length",
            format!(
                "one number, {} (one a level), 12 (one a month), or a list of 12 for each level",
                levels_c.len()
            ),
            "give them in the order of the levels, months from January on",
        ));
        return None;
    };
    if let Some(beyond) = changes.iter().flat_map(|change| change.pct).find(|pct| !POSSIBLE_PCT.contains(pct))
    {
        section.fault(Fault::key(
            key,
            beyond,
            "percent from -100 to 300",
            "10 is a tenth more, -10 a tenth less",
        ));
        return None;
    }
    Some(PrecipitationChange::PctByLevel(changes))
}
