//! What the answer hangs on: parameters, precipitation, or the warming.

use super::super::numbers::{counted, fixed, signed};
use super::super::reader::Reader;
use super::{period_name, telling_level};
use crate::findings::{AveragedShares, Findings, LevelBySet, MeasureFindings, Mover, ThreeWayShares};

/// The sentences; none where no sets of parameters were run.
pub(super) fn parameters(findings: &Findings, headline: &MeasureFindings, reader: Reader) -> Vec<String> {
    let Some(spread) = &findings.parameter_spread else { return Vec::new() };
    let Some(found) = spread.measures.iter().find(|found| found.measure == headline.measure) else {
        return Vec::new();
    };
    let name = period_name(findings, headline);
    let mut words = vec![format!(
        "{} of parameters from the scenario's file were run beside the study's own, {} of each. At the reference their medians of the {name} lie \
         between {} and {}.",
        counted(spread.sets, "set"),
        counted(spread.realizations, "realization"),
        reader.amount_bare(found.reference.lowest),
        reader.amount(found.reference.highest)
    )];
    let told = telling_level(findings).map(|at| findings.levels_c[at]);
    if let Some(level) = found.levels.iter().find(|level| Some(level.level_c) == told) {
        words.push(whichever_set(level, reader));
        words.extend(weighed(level, &headline.measure.title, reader));
        words.extend(level.variance_shares.map(|shares| {
            let [level_pct, realization, set, together] = in_percent(shares);
            format!(
                "Of the variance of all these runs at the reference and at {}, the warming makes {level_pct} %, the realization {realization} %, the set \
                 of parameters {set} %, and what they do only together {together} %.",
                reader.level(level.level_c)
            )
        }));
        words.extend(by_averaging(level));
    }
    words.extend(overturned(&found.levels, reader));
    words
}

/// Level, chance, set, and what they do only together.
fn in_percent(shares: ThreeWayShares) -> [String; 4] {
    [shares.level, shares.realization, shares.set, shares.remainder].map(|share| fixed(100.0 * share, 0))
}

/// How the shares change from single years to the longest means.
fn by_averaging(level: &LevelBySet) -> Option<String> {
    let [first, .., last] = level.averaged_shares.as_slice() else { return None };
    let said = |of: &AveragedShares| {
        let [level_pct, chance, set, _] = in_percent(of.shares);
        let what = match of.years {
            1 => "single years".to_owned(),
            years => format!("{years}-year means"),
        };
        format!("{what} the warming makes {level_pct} %, chance {chance} % and the set {set} %")
    };
    Some(format!("By averaging period: in {}; in {}.", said(first), said(last)))
}

/// The change, whichever set is right.
fn whichever_set(level: &LevelBySet, reader: Reader) -> String {
    let range = level.shift;
    let percent = level.percent_change.map_or(String::new(), |percent| {
        let [low, high] = [percent.lowest, percent.highest].map(|percent| signed(percent, 0));
        if low == high { format!(" ({low} %)") } else { format!(" ({low} to {high} % of each set's own)") }
    });
    format!(
        "Whichever of them is run, {} changes it by between {}{percent}.",
        reader.level(level.level_c),
        reader.change_and_change(range.lowest, range.highest)
    )
}

/// Which of the three moves it the most.
fn weighed(level: &LevelBySet, title: &str, reader: Reader) -> Option<String> {
    let found = level.weighed?;
    let at = reader.level(level.level_c);
    let ratio = found
        .warming_over_parameters
        .map_or(String::new(), |ratio| format!(": the warming is {} times the parameters", fixed(ratio, 1)));
    let largest = match found.largest {
        Mover::Warming => "the warming moves it the most",
        Mover::Precipitation => "precipitation's spread moves it the most",
        Mover::Parameters => "the choice of parameters moves it the most",
    };
    Some(format!(
        "Of what moves {title} at {at}, {largest}: the warming by {}, precipitation's half spread by {}, the sets of parameters at the \
         reference by {}{ratio}.",
        reader.amount(found.warming),
        reader.amount(found.precipitation),
        reader.amount(found.parameters)
    ))
}

/// The levels at which parameters move it more than the warming does.
fn overturned(levels: &[LevelBySet], reader: Reader) -> Option<String> {
    let is_weaker = |level: &&LevelBySet| {
        level.weighed.is_some_and(|found| found.warming_over_parameters.is_some_and(|ratio| ratio < 1.0))
    };
    let at: Vec<String> = levels.iter().filter(is_weaker).map(|level| reader.level(level.level_c)).collect();
    (!at.is_empty()).then(|| {
        format!(
            "At {} the warming moves it less than the choice of parameters does: how much snow is left hangs there more on what observed \
             snow leaves open than on the warming.",
            at.join(", ")
        )
    })
}
