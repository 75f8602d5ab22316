//! The verdict in one sentence, and how much each level changes.

use super::super::numbers::{counted, fixed, signed};
use super::super::reader::Reader;
use super::{is_scarce, period_name};
use crate::findings::{CrossingRange, Findings, Judged, LevelFindings, MeasureFindings, Weight, judged};

/// Does warming outweigh the precipitation spread, and from where on?
pub(super) fn verdict(
    findings: &Findings,
    headline: &MeasureFindings,
    cause: &str,
    reader: Reader,
) -> String {
    let name = period_name(findings, headline);
    if let Some(spread) = headline.precipitation_spread.filter(|_| is_scarce(headline)) {
        return format!(
            "There is hardly any snow to lose: the reference's {name} is {} in the median. Check units, elevations and the \
             hemisphere if you know better.",
            reader.amount(spread.q50)
        );
    }
    match judged(headline.outweighs, headline.outweighs_range) {
        Judged::Outweighs { level_c, until_c, is_open_above } => {
            let range = crossing_range(findings, headline.outweighs_range, reader);
            let from = reader.between_levels(level_c);
            let (span, elsewhere) = match until_c {
                None => (format!("From about {from} of warming on{range}"), "up to there"),
                Some(until_c) => (
                    format!("From about {from}{range} to {} of warming", reader.between_levels(until_c)),
                    "elsewhere",
                ),
            };
            let open = if is_open_above {
                " Whether it still does at the highest levels, these realizations cannot tell."
            } else {
                ""
            };
            format!(
                "{span}, the {cause} outweighs the precipitation spread of the {name}; {elsewhere}, precipitation outweighs \
                 the {cause}.{open}"
            )
        }
        Judged::DoesNot { up_to_c } => format!(
            "Up to {}, {cause} does not outweigh the precipitation spread of the {name}; precipitation outweighs the \
             {cause}{}.",
            reader.level(up_to_c),
            highest_ratio(headline, reader)
        ),
        Judged::CannotTell { crosses_at_c, may_cross_at_c } => {
            let up_to = findings.levels_c.last().map_or_else(String::new, |level_c| reader.level(*level_c));
            let at = |at_c: f64| reader.between_levels(at_c);
            let below = may_cross_at_c.map_or(String::new(), |from_c| {
                format!("Below about {} of warming, precipitation outweighs the {cause}. ", at(from_c))
            });
            let from = if below.is_empty() { "Up" } else { "From there up" };
            let others = match (crosses_at_c, may_cross_at_c) {
                (_, None) => "they are too few to say what others of the same kind would tell".to_owned(),
                (None, Some(_)) => {
                    "in these it does not, others of the same kind might have it outweigh".to_owned()
                }
                (Some(at_c), Some(_)) => format!(
                    "they have it outweigh from about {} on, others of the same kind might at no level",
                    at(at_c)
                ),
            };
            format!(
                "{below}{from} to {up_to} these realizations cannot tell whether {cause} outweighs the precipitation spread of the {name}{}; {others}.",
                highest_ratio(headline, reader)
            )
        }
        Judged::Unknown => {
            let why = if findings.reference + 1 == findings.levels_c.len() {
                "there is no level above the reference"
            } else if findings.realizations < 2 {
                "a single realization has no spread"
            } else {
                "the reference does not spread"
            };
            format!(
                "Whether {cause} outweighs the precipitation spread of the {name} cannot be said from this study: {why}."
            )
        }
    }
}

/// `: at +4 °C the shift is 0.92 times the half spread`.
fn highest_ratio(headline: &MeasureFindings, reader: Reader) -> String {
    let highest = headline.levels.last().and_then(|level| Some((level.level_c, level.signal_to_spread?)));
    highest.map_or(String::new(), |(level_c, ratio)| {
        let ratio = fixed(ratio.value, 2);
        format!(": at {} the shift is {ratio} times the half spread", reader.level(level_c))
    })
}

/// ` (Monte Carlo range +1.3 to +1.5)`, where the realizations at hand leave that open.
pub(super) fn crossing_range(findings: &Findings, range: Option<CrossingRange>, reader: Reader) -> String {
    let highest = findings.levels_c.last().copied().unwrap_or_default();
    let words = |end: Option<f64>| match end {
        Some(level_c) => reader.between_levels_bare(level_c),
        None => format!("above {}", reader.between_levels_bare(highest)),
    };
    match range {
        Some(CrossingRange { q05_c, q95_c, .. }) if words(q05_c) != words(q95_c) => {
            format!(" (Monte Carlo range {} to {})", words(q05_c), words(q95_c))
        }
        _ => String::new(),
    }
}

/// How much the headline measure changes at a level, and whether that outweighs.
pub(super) fn how_much(
    findings: &Findings,
    headline: &MeasureFindings,
    at: &LevelFindings,
    reader: Reader,
) -> String {
    let Some(shift) = at.shift else {
        return String::new();
    };
    let change_mm = shift.median.value;
    let change = if change_mm == 0.0 {
        "does not change".to_owned()
    } else {
        format!("{} by {}", if change_mm < 0.0 { "falls" } else { "rises" }, reader.amount(change_mm.abs()))
    };
    let percent = at.percent_change.map_or(String::new(), |percent| format!(" ({} %)", signed(percent, 0)));
    let ratio = at.signal_to_spread.map_or(String::new(), |ratio| {
        let error = ratio.monte_carlo_error.map_or(String::new(), |error| format!(" ± {}", fixed(error, 2)));
        let so = match Weight::of(Some(ratio), at.signal_to_spread_range) {
            Weight::NoRatio => "of realizations too few to tell whether it outweighs it",
            Weight::CannotTell => "so near 1 that these realizations cannot tell whether it outweighs it",
            Weight::Outweighs => "so it outweighs it",
            Weight::DoesNotOutweigh => "so it does not outweigh it",
        };
        format!("; that is {}{error} times the half spread, {so}", fixed(ratio.value, 2))
    });
    let range = if shift.has_range() {
        format!(", 90 % of them between {}", reader.change_and_change(shift.q05, shift.q95))
    } else {
        String::new()
    };
    let over = match shift.pairs {
        1 => "the one realization against itself".to_owned(),
        pairs => format!("the median over {}, each against itself", counted(pairs, "realization")),
    };
    format!(
        "At {}, the {} {change}{percent}: {over}{range}{ratio}.",
        reader.level(at.level_c),
        period_name(findings, headline),
    )
}
