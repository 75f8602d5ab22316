//! The answer in words. Every word hangs on a number of the findings and turns round when the number does.

mod break_even;
mod chance;
mod dry_and_warm;
mod elevations;
mod how_sure;
mod parameters;
mod place;
mod record_odds;
mod reservoir;
mod slopes;
mod tipping;
mod verdict;
mod volumes;
mod yardstick;
mod years;

pub(in super::super) use chance::chance as chance_in_words;
pub use chance::{chance_in_table, towards_shift};
pub(super) use reservoir::why_unknown;
pub(super) use slopes::{per_degree, percent};
pub use years::{in_years, range, years_of};

use super::reader::Reader;
use crate::figures::cause;
use crate::findings::{Findings, LevelFindings, MeasureFindings, Spread};
use crate::perturb::Warming;
use crate::season::{Kind, LEAST_REFERENCE_MM};

/// The answer to the study's question.
#[derive(Debug, Clone, Default, PartialEq, serde::Serialize)]
pub struct Answer {
    /// One sentence: does warming outweigh the precipitation spread, and from where on?
    pub verdict: String,
    /// The questions that a reader asks next.
    pub at_a_glance: Vec<Asked>,
    /// How much, level by level.
    pub amounts: Vec<String>,
    /// What the verdict measures with, and whether another measure would change it.
    pub yardstick: Vec<String>,
    /// How sure it is: Monte Carlo error, the record's own uncertainty, and whether chance could hide it.
    pub how_sure: Vec<String>,
    /// How far it hangs on the parameters, where sets of them were run.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub parameters: Vec<String>,
    /// How much earlier.
    pub timing: Vec<String>,
    /// Where.
    pub elevation: Option<String>,
    /// What each band loses or gains, where the snow line lies, what snow is at risk, and what decides it at which elevation.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub elevations: Vec<String>,
    /// What it means for the volume of the melt season.
    pub volumes: Option<String>,
    /// What it means for a reservoir.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub reservoir: Vec<String>,
    /// How much more precipitation would make up for it.
    pub break_even: Vec<String>,
    /// What one degree and one percent of precipitation do.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub slopes: Vec<String>,
    /// What the scenario's named cases come to.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub cases: Vec<String>,
    /// From which warming on something fails that is to hold.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub tipping: Vec<String>,
    /// What single years say: variance, low-snow odds, worst years, runs, tails, detection.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub years: Vec<String>,
    /// How often years are dry and warm, what that does to the snow, and kinds of snow drought.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub dry_and_warm: Vec<String>,
    /// Could chance hide it?
    pub chances: Vec<String>,
}

/// A question and what is answered to it.
#[derive(Debug, Clone, PartialEq, serde::Serialize)]
pub struct Asked {
    /// The question.
    pub question: &'static str,
    /// One sentence or more.
    pub answer: Vec<String>,
}

/// Puts the findings into a reader's words.
pub fn answer_in_words(findings: &Findings, warming: &Warming, reader: Reader) -> Answer {
    let Some(headline) = findings.basin.first() else {
        return Answer { verdict: "Nothing was measured.".to_owned(), ..Answer::default() };
    };
    let changes_precipitation = warming.changes_precipitation(&findings.levels_c);
    let cause = cause(changes_precipitation);
    let on_top = if changes_precipitation { " on top of its stated change" } else { "" };
    let verdict = verdict::verdict(findings, headline, cause, reader);
    let dry_and_warm = dry_and_warm::dry_and_warm(findings, reader);
    let elevations = elevations::elevations(findings, reader);
    if is_scarce(headline) {
        let tipping = tipping::tipping(findings, cause, reader);
        return Answer { verdict, dry_and_warm, elevations, tipping, ..Answer::default() };
    }
    let levels = || headline.levels.iter();
    let changed = |level: &&LevelFindings| level.shift.is_some();
    let mut answer = Answer {
        at_a_glance: Vec::new(),
        verdict,
        amounts: levels()
            .filter(changed)
            .map(|level| verdict::how_much(findings, headline, level, reader))
            .collect(),
        yardstick: yardstick::yardstick(findings, headline, cause, reader),
        how_sure: how_sure::how_sure(findings, headline, reader),
        parameters: parameters::parameters(findings, headline, reader),
        timing: (0..findings.levels_c.len()).filter_map(|at| place::timing(findings, at, reader)).collect(),
        elevation: place::elevation(findings, reader),
        elevations,
        volumes: volumes::volumes(findings, reader),
        reservoir: reservoir::reservoir(findings, cause, reader),
        break_even: break_even::break_even(findings, headline, on_top, reader),
        slopes: slopes::slopes(findings, reader),
        cases: slopes::cases(findings, reader),
        tipping: tipping::tipping(findings, cause, reader),
        years: years::years(findings, cause, reader)
            .into_iter()
            .chain(record_odds::record_odds(findings, reader))
            .collect(),
        dry_and_warm,
        chances: levels().filter_map(|level| chance::could_be_hidden(findings, level, reader)).collect(),
    };
    let by_averaging_period = years::by_averaging_period(findings, cause, reader);
    answer.at_a_glance = at_a_glance(findings, headline, (&answer, by_averaging_period), on_top, reader);
    answer
}

/// The questions that have an answer, told for one level where one must do.
fn at_a_glance(
    findings: &Findings,
    headline: &MeasureFindings,
    (answer, by_averaging_period): (&Answer, Option<String>),
    on_top: &str,
    reader: Reader,
) -> Vec<Asked> {
    let at = telling_level(findings);
    let told = |at: usize| {
        let level = &headline.levels[at];
        level.shift.is_some().then(|| verdict::how_much(findings, headline, level, reader))
    };
    let how_much = at.and_then(told).into_iter().chain(at.and_then(|at| place::timing(findings, at, reader)));
    let yardsticks =
        [answer.yardstick.first(), answer.yardstick.last().filter(|_| answer.yardstick.len() > 1)];
    let asked = [
        ("How much?", how_much.chain(answer.elevation.clone()).collect()),
        ("Against which yardstick?", yardsticks.into_iter().flatten().cloned().collect()),
        ("In single years, or only in long means?", by_averaging_period.into_iter().collect()),
        ("How sure is it?", answer.how_sure.clone()),
        ("Does it hang on the parameters?", answer.parameters.iter().skip(1).take(2).cloned().collect()),
        ("How much water is that?", answer.volumes.iter().cloned().collect()),
        ("What does it mean for the reservoir?", answer.reservoir.clone()),
        (
            "What would make up for it?",
            at.and_then(|at| break_even::at(findings, headline, at, on_top, reader))
                .into_iter()
                .collect::<Vec<_>>(),
        ),
    ];
    let holds = ("When does what must hold begin to fail?", answer.tipping.clone());
    let asked = asked.into_iter().chain([holds]).filter(|(_, answer)| !answer.is_empty());
    asked.map(|(question, answer)| Asked { question, answer }).collect()
}

/// `30-year mean 1 April SWE` or, of a date, `30-year median melt-out`.
pub fn period_name(findings: &Findings, measure: &MeasureFindings) -> String {
    let statistic = if measure.measure.kind.is_date() { "median" } else { "mean" };
    format!("{}-year {statistic} {}", findings.years, measure.measure.title)
}

/// Whether the reference has hardly any snow to lose: ratios and ranges of it would be of rounding and single storms.
pub fn is_scarce(headline: &MeasureFindings) -> bool {
    let is_small = |spread: &Spread| spread.q50 < LEAST_REFERENCE_MM;
    headline.measure.kind == Kind::AmountMm && headline.precipitation_spread.as_ref().is_some_and(is_small)
}

/// The warmer level nearest to 2 degC above the reference: what a sentence takes where one level must do.
pub fn telling_level(findings: &Findings) -> Option<usize> {
    let reference_c = findings.levels_c[findings.reference];
    let distance = |at: &usize| (findings.levels_c[*at] - reference_c - 2.0).abs();
    let warmer = findings.reference + 1..findings.levels_c.len();
    warmer.min_by(|a, b| distance(a).total_cmp(&distance(b)))
}
