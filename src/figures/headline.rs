//! The finding of a measure as a sentence, which turns round when the numbers do.

use super::Setting;
use super::labels::{
    between_levels, day_of_month, days_in_words, is_nothing, level, percent_size, sentence, size_and_unit,
};
use crate::findings::{Crossing, Findings, Judged, MeasureFindings, Spread, judged};
use crate::season::{Kind, LEAST_REFERENCE_MM};
use crate::units::UnitSystem;

/// The level that a headline speaks of: the first at which the shift outweighs the spread, else the warmest; where none
/// is warmer than the reference, the coldest.
pub(super) fn spoken_of(findings: &Findings, measure: &MeasureFindings) -> Option<usize> {
    let warmer = findings.reference + 1..measure.levels.len();
    let past_crossing = |level: &usize| match measure.outweighs {
        Crossing::At { level_c, .. } => findings.levels_c.get(*level).is_some_and(|at| *at >= level_c),
        Crossing::NotReached { .. } | Crossing::Unknown => false,
    };
    let others = warmer.clone().find(past_crossing).or(warmer.last());
    others.or((findings.reference > 0).then_some(0))
}

/// `1 April SWE is 112 mm (27 %) lower at +2 °C; only from +1.4 °C on does the shift outweigh the
/// precipitation spread`.
pub(super) fn of_amount(findings: &Findings, measure: &MeasureFindings, units: UnitSystem) -> String {
    let title = sentence(&measure.measure.title);
    // Ratios of hardly any snow would be of rounding and single storms.
    let is_scarce = |spread: &Spread| spread.q50 < LEAST_REFERENCE_MM;
    if let Some(spread) = measure.precipitation_spread.as_ref().filter(|spread| is_scarce(spread))
        && measure.measure.kind == Kind::AmountMm
    {
        return format!(
            "There is hardly any snow to lose: {} is {} at the reference",
            measure.measure.title,
            size_and_unit(units, spread.q50)
        );
    }
    let spoken = spoken_of(findings, measure).and_then(|at| measure.levels.get(at));
    let Some(spoken) = spoken else {
        let median =
            measure.levels.get(findings.reference).and_then(|reference| reference.periods.q50.value());
        return match median {
            Some(median) => {
                format!(
                    "{title} is {} at the reference; no other level was run",
                    size_and_unit(units, median)
                )
            }
            None => format!("{title} has no value at the reference; no other level was run"),
        };
    };
    let place = level(units, spoken.level_c);
    let what = match (&spoken.shift, spoken.percent_change) {
        (None, _) => format!("{title} has no value to compare at {place}"),
        (Some(shift), _) if is_nothing(units, shift.median.value) => {
            format!("{title} is unchanged at {place}")
        }
        (Some(shift), percent) => {
            let direction = if shift.median.value < 0.0 { "lower" } else { "higher" };
            let percent =
                percent.map_or_else(String::new, |percent| format!(" ({} %)", percent_size(percent)));
            format!("{title} is {}{percent} {direction} at {place}", size_and_unit(units, shift.median.value))
        }
    };
    format!("{what}; {}", against_spread(findings, measure, "the shift", units))
}

/// `Half of the melt comes 12 days and melt-out 15 days earlier at +2 °C; ...`.
pub(super) fn of_dates(
    findings: &Findings,
    half: Option<&MeasureFindings>,
    out: Option<&MeasureFindings>,
    setting: &Setting<'_>,
) -> Option<String> {
    let leading = half.or(out)?;
    let Some(at) = spoken_of(findings, leading) else {
        let date = |measure: &MeasureFindings| {
            let day = measure.levels.get(findings.reference)?.periods.q50.value()?;
            Some(day_of_month(setting.water_year_starts, day))
        };
        return Some(match date(leading) {
            Some(date) => {
                let subject = if half.is_some() { "Half of the melt comes" } else { "Melt-out comes" };
                format!("{subject} on {date} at the reference; no other level was run")
            }
            None => "Melt has no date at the reference; no other level was run".to_owned(),
        });
    };
    let place = level(setting.units, leading.levels.get(at)?.level_c);
    let days = |measure: Option<&MeasureFindings>| {
        let measure = measure?;
        let level = measure.levels.get(at)?;
        // Where most realizations have no date, the pairs that have one speak for few.
        let reference = measure.levels.get(findings.reference)?;
        reference.periods.q50.value().and(level.periods.q50.value())?;
        Some(level.shift?.median.value)
    };
    let what = match (days(half), days(out)) {
        (Some(half), Some(out)) => both_in_words(half, out),
        (Some(half), None) => format!("Half of the melt comes {}", days_in_words(half)),
        (None, Some(out)) => format!("Melt-out comes {}", days_in_words(out)),
        (None, None) => "The median realization has no melt dates to compare".to_owned(),
    };
    let subject = if half.is_some() { "the shift of half the melt" } else { "the shift" };
    Some(format!("{what} at {place}; {}", against_spread(findings, leading, subject, setting.units)))
}

/// Both shifts, the direction once where it is the same.
fn both_in_words(half: f64, out: f64) -> String {
    let [half_words, out_words] = [half, out].map(days_in_words);
    if half_words == out_words {
        return format!("Half of the melt and melt-out come {half_words}");
    }
    match (half_words.rsplit_once(' '), out_words.rsplit_once(' ')) {
        (Some((days, one)), Some((_, other))) if one == other => {
            format!("Half of the melt comes {days} and melt-out {out_words}")
        }
        _ => format!("Half of the melt comes {half_words} and melt-out {out_words}"),
    }
}

fn against_spread(
    findings: &Findings,
    measure: &MeasureFindings,
    subject: &str,
    units: UnitSystem,
) -> String {
    match judged(measure.outweighs, measure.outweighs_range) {
        Judged::Outweighs { level_c, until_c, .. } => {
            let until = until_c
                .map_or_else(|| "on".to_owned(), |until_c| format!("to {}", between_levels(units, until_c)));
            let from = between_levels(units, level_c);
            let first_warmer_c = findings.levels_c.get(findings.reference + 1);
            if first_warmer_c.is_some_and(|warmer_c| *warmer_c < level_c) {
                format!("only from {from} {until} does {subject} outweigh the precipitation spread")
            } else {
                format!("from {from} {until}, {subject} outweighs the precipitation spread")
            }
        }
        Judged::CannotTell { may_cross_at_c, .. } => {
            let up_to = findings.levels_c.last().map_or_else(String::new, |up_to_c| level(units, *up_to_c));
            match may_cross_at_c {
                Some(from_c) => format!(
                    "below {} {subject} does not outweigh the precipitation spread, from there up to {up_to} these realizations \
                     cannot tell",
                    between_levels(units, from_c)
                ),
                None => format!(
                    "up to {up_to} these realizations cannot tell whether {subject} outweighs the precipitation spread"
                ),
            }
        }
        Judged::DoesNot { up_to_c } => {
            format!("up to {}, {subject} does not outweigh the precipitation spread", level(units, up_to_c))
        }
        Judged::Unknown if findings.reference + 1 == measure.levels.len() => {
            "no warmer level was run".to_owned()
        }
        Judged::Unknown => "there is no precipitation spread to weigh it against".to_owned(),
    }
}
