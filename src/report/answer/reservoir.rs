//! What warming means for a reservoir under its stated rules.

use super::super::numbers::fixed;
use super::super::reader::Reader;
use super::telling_level;
use crate::figures::{
    ALL_BROUGHT_BACK, LEAST_BROUGHT_BACK, RELIABILITY, brought_back, change_in_words, cost_in_days_above,
};
use crate::findings::{Findings, Judged, MeasureFindings, judged};
use crate::season::Outcome;

/// Why it is not known whether a measure's shift outweighs its spread.
pub(in super::super) fn why_unknown(of: &MeasureFindings, realizations: usize) -> &'static str {
    if realizations < 2 {
        "one realization tells no spread to hold that against"
    } else if of.precipitation_spread.is_some_and(|spread| spread.q05 < spread.q95) {
        "whether that is more than precipitation's spread cannot be told at every level"
    } else if of.precipitation_spread.is_some() {
        "its spread over realizations is too small to hold anything against"
    } else {
        "in too many realizations it has no value for a spread to hold that against"
    }
}

/// How reliability by volume changes, whether that outweighs precipitation, and what a change of the rules would bring back; nothing
/// without a reservoir, or where nothing is demanded of it.
pub(super) fn reservoir(findings: &Findings, cause: &str, reader: Reader) -> Vec<String> {
    let at = telling_level(findings);
    let sentences = at.and_then(|at| {
        let operations = findings.operations.as_ref()?;
        let measure = operations.measure(RELIABILITY)?;
        let [reference, warmed] = [findings.reference, at].map(|at| measure.levels[at].periods.q50);
        let (Outcome::Value(before), Outcome::Value(after)) = (reference, warmed) else { return None };
        let place = reader.level(findings.levels_c[at]);
        let tenths = |share: f64| fixed(100.0 * share, 1);
        let [said_before, said_after] = [before, after].map(tenths);
        let how = if said_before == said_after {
            format!("stays {said_before} % at {place}")
        } else {
            let direction = if after < before { "falls" } else { "rises" };
            format!("{direction} from {said_before} to {said_after} % at {place}")
        };
        let against = match judged(measure.outweighs, measure.outweighs_range) {
            Judged::Outweighs { level_c, .. } => {
                format!("the {cause} outweighs precipitation in that from about {} on", reader.between_levels(level_c))
            }
            Judged::DoesNot { up_to_c } => {
                format!("up to {}, precipitation outweighs the {cause} in that", reader.level(up_to_c))
            }
            Judged::CannotTell { .. } => {
                format!("whether the {cause} outweighs precipitation in that these realizations cannot tell")
            }
            Judged::Unknown => why_unknown(measure, findings.realizations).to_owned(),
        };
        let supplied = format!(
            "Under the stated rules the reservoir's reliability by volume, the share of demand that is supplied, {how}; {against}."
        );
        let back = brought_back(operations, [findings.reference, at]).filter(|(_, back)| back.value >= LEAST_BROUGHT_BACK).map(|(change, back)| {
            let rule = change_in_words(change);
            let rule = crate::figures::sentence(&rule);
            let how_much = if back.value >= ALL_BROUGHT_BACK {
                "all".to_owned()
            } else {
                format!("{} %", fixed(100.0 * back.value, 0))
            };
            let cost = cost_in_days_above(operations, change, at).unwrap_or_default();
            format!("{rule} would bring back {how_much} of that.{cost}")
        });
        let back = back.filter(|_| said_before != said_after);
        Some([Some(supplied), back].into_iter().flatten().collect())
    });
    sentences.unwrap_or_default()
}
