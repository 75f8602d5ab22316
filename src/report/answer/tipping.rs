//! From which warming on something fails that the user wants to hold.

use super::super::numbers::{fixed, trimmed};
use super::super::reader::Reader;
use super::verdict::crossing_range;
use crate::findings::{Asks, Crossing, Findings, TippingLevel};

/// A sentence a criterion; `cause` is what the levels do.
pub(super) fn tipping(findings: &Findings, cause: &str, reader: Reader) -> Vec<String> {
    findings.tipping_levels.iter().map(|of| one(findings, of, cause, reader)).collect()
}

fn one(findings: &Findings, of: &TippingLevel, cause: &str, reader: Reader) -> String {
    let title = findings.basin.first().map_or("survey-date SWE", |headline| headline.measure.title.as_str());
    let asked = match of.criterion.asks {
        Asks::MedianAtLeast { volume_hm3: Some(volume_hm3), .. } => {
            format!("{title} of at least {} over the basin in half of the years", reader.volume(volume_hm3))
        }
        Asks::MedianAtLeast { swe_mm, .. } => {
            format!("{title} of at least {} in half of the years", reader.amount(swe_mm))
        }
        Asks::LowSnowYearsAtMost { share, below_quantile } => format!(
            "low-snow years, which have less than the reference's {} % quantile, at most {} % of all",
            trimmed(&fixed(100.0 * below_quantile, 1)),
            trimmed(&fixed(100.0 * share, 1))
        ),
    };
    let name = &of.criterion.name;
    if of.too_near_at_reference {
        return format!(
            "{name} ({asked}) lies so near its limit at the reference that these realizations cannot tell whether it holds even there."
        );
    }
    match of.holds_at_reference {
        Some(true) => {}
        Some(false) => return format!("{name} ({asked}) does not hold even at the reference."),
        None => {
            return format!(
                "{name} ({asked}) cannot be asked: that quantile is bare ground, and no year has less."
            );
        }
    }
    match of.fails {
        Crossing::At { level_c, until_c } => {
            let back = until_c.map_or(String::new(), |until_c| {
                format!(
                    "; at a higher level, from about {} on, it holds again",
                    reader.between_levels(until_c)
                )
            });
            let range = match of.fails_range {
                None => " in these realizations, too few to say what others would have".to_owned(),
                range => crossing_range(findings, range, reader),
            };
            format!(
                "{name} ({asked}) begins to fail at about {} of {cause}{range}{back}.",
                reader.between_levels(level_c)
            )
        }
        Crossing::NotReached { up_to_c } if of.fails_range.is_none() => format!(
            "{name} ({asked}) holds up to {} of {cause} in these realizations, too few to say what others would have.",
            reader.level(up_to_c)
        ),
        Crossing::NotReached { up_to_c } => {
            let may_fail = of.fails_range.and_then(|range| range.q05_c).map_or(String::new(), |level_c| {
                format!(
                    "; with other realizations it might fail from about {} on",
                    reader.between_levels(level_c)
                )
            });
            format!("{name} ({asked}) holds up to {} of {cause}{may_fail}.", reader.level(up_to_c))
        }
        Crossing::Unknown => {
            format!("At which warming {name} ({asked}) fails cannot be said: no warmer level was run.")
        }
    }
}
