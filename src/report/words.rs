//! The answer in words. Every word hangs on a number of the findings and turns round when the number does.

use super::numbers::{days_moved, fixed, signed};
use super::reader::Reader;
use crate::findings::{Chance, Crossing, CrossingRange, Findings, LevelFindings, MeasureFindings};
use crate::season::{Kind, LEAST_REFERENCE_MM};

/// A 5-95 % range of fewer pairs is their extremes.
const LEAST_PAIRS_FOR_A_RANGE: usize = 20;

/// The answer to the study's question.
#[derive(Debug, Clone, PartialEq, serde::Serialize)]
pub struct Answer {
    /// One sentence: does warming outweigh the precipitation spread, and from where on?
    pub verdict: String,
    /// How much, level by level.
    pub amounts: Vec<String>,
    /// What the verdict measures with, and whether another measure would change it.
    pub yardstick: Vec<String>,
    /// How much earlier.
    pub timing: Vec<String>,
    /// Where.
    pub elevation: Option<String>,
    /// Could chance hide it?
    pub chances: Vec<String>,
}

/// Puts the findings into a reader's words. `mean_change_sd_pct` is the assumed change of mean precipitation, if any.
pub fn answer_in_words(findings: &Findings, mean_change_sd_pct: Option<f64>, reader: Reader) -> Answer {
    let Some(headline) = findings.basin.first() else {
        return Answer {
            verdict: "Nothing was measured.".to_owned(),
            amounts: Vec::new(),
            yardstick: Vec::new(),
            timing: Vec::new(),
            elevation: None,
            chances: Vec::new(),
        };
    };
    let changed = |level: &&LevelFindings| level.shift.is_some();
    Answer {
        verdict: verdict(findings, headline, reader),
        amounts: headline
            .levels
            .iter()
            .filter(changed)
            .map(|level| how_much(findings, headline, level, reader))
            .collect(),
        yardstick: yardstick(findings, headline, mean_change_sd_pct, reader),
        timing: findings
            .levels_c
            .iter()
            .enumerate()
            .filter_map(|(at, _)| timing(findings, at, reader))
            .collect(),
        elevation: elevation(findings, reader),
        chances: headline
            .levels
            .iter()
            .filter_map(|level| could_be_hidden(findings, level, reader))
            .collect(),
    }
}

/// `30-year mean 1 April SWE` or, of a date, `30-year median melt-out`.
pub fn period_name(findings: &Findings, measure: &MeasureFindings) -> String {
    let statistic = if measure.measure.kind.is_date() { "median" } else { "mean" };
    format!("{}-year {statistic} {}", findings.years, measure.measure.title)
}

fn verdict(findings: &Findings, headline: &MeasureFindings, reader: Reader) -> String {
    let name = period_name(findings, headline);
    if let Some(spread) = headline.precipitation_spread
        && headline.measure.kind == Kind::AmountMm
        && spread.q50 < LEAST_REFERENCE_MM
    {
        return format!(
            "There is hardly any snow to lose: the reference's {name} is {} in the median. Check units, elevations and the \
             hemisphere if you know better.",
            reader.amount(spread.q50)
        );
    }
    match headline.outweighs {
        Crossing::At { level_c, until_c } => {
            let range = crossing_range(findings, headline.outweighs_range, reader);
            let from = reader.between_levels(level_c);
            let (span, elsewhere) = match until_c {
                None => (format!("From about {from} of warming on{range}"), "up to there"),
                Some(until_c) => (
                    format!("From about {from}{range} to {} of warming", reader.between_levels(until_c)),
                    "elsewhere",
                ),
            };
            format!(
                "{span}, the warming outweighs the precipitation spread of the {name}; {elsewhere}, precipitation outweighs \
                 the warming."
            )
        }
        Crossing::NotReached { up_to_c } => {
            let ratio = headline.levels.last().and_then(|level| level.signal_to_spread);
            let ratio = ratio.map_or(String::new(), |ratio| {
                let ratio = fixed(ratio.value, 2);
                format!(": at {} the shift is {ratio} times the half spread", reader.level(up_to_c))
            });
            format!(
                "Up to {}, warming does not outweigh the precipitation spread of the {name}, precipitation outweighs the \
                 warming{ratio}.",
                reader.level(up_to_c)
            )
        }
        Crossing::Unknown => format!(
            "Whether warming outweighs the precipitation spread of the {name} cannot be said from this study: there is \
             no level above the reference, or the reference does not spread."
        ),
    }
}

/// ` (Monte Carlo range +1.3 to +1.5)`, where the realizations at hand leave that open.
fn crossing_range(findings: &Findings, range: Option<CrossingRange>, reader: Reader) -> String {
    let highest = findings.levels_c.last().copied().unwrap_or_default();
    let words = |end: Option<f64>| match end {
        Some(level_c) => reader.between_levels_bare(level_c),
        None => format!("above {}", reader.between_levels_bare(highest)),
    };
    match range {
        Some(CrossingRange { q05_c, q95_c }) if words(q05_c) != words(q95_c) => {
            format!(" (Monte Carlo range {} to {})", words(q05_c), words(q95_c))
        }
        _ => String::new(),
    }
}

fn how_much(findings: &Findings, headline: &MeasureFindings, at: &LevelFindings, reader: Reader) -> String {
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
        let word = if ratio.value > 1.0 { "outweighs" } else { "does not outweigh" };
        format!("; that is {}{error} times the half spread, so it {word} it", fixed(ratio.value, 2))
    });
    let range = if shift.pairs >= LEAST_PAIRS_FOR_A_RANGE {
        format!(", 90 % of them between {}", reader.change_and_change(shift.q05, shift.q95))
    } else {
        String::new()
    };
    let realizations = if shift.pairs == 1 { "realization" } else { "realizations" };
    format!(
        "At {}, the {} {change}{percent}: the median over {} {realizations}, each against itself{range}{ratio}.",
        reader.level(at.level_c),
        period_name(findings, headline),
        shift.pairs,
    )
}

fn yardstick(
    findings: &Findings,
    headline: &MeasureFindings,
    mean_change_sd_pct: Option<f64>,
    reader: Reader,
) -> Vec<String> {
    let mut words = Vec::new();
    if let Some(spread) = headline.precipitation_spread {
        words.push(format!(
            "Yardstick: the reference's {}, over {} realizations of {} years, with its own temperatures: median {}, 5–95 % \
             from {} to {}. The half spread is the part of that range between the median and the end that a shift points to; \
             'outweighs' means that the median shift is larger.",
            period_name(findings, headline),
            findings.realizations,
            findings.years,
            reader.amount(spread.q50),
            reader.amount(spread.q05),
            reader.amount(spread.q95)
        ));
    }
    if headline.precipitation_spread.is_none() {
        return words;
    }
    words.push(match mean_change_sd_pct {
        Some(sd) if sd > 0.0 => format!(
            "The spread holds an assumed change of mean precipitation, normal with a standard deviation of {} %: an \
             assumption about the future that the verdict may hang on.",
            fixed(sd, 1)
        ),
        _ => "No change of mean precipitation is assumed: the spread holds only the order and choice of the record's \
              own years."
            .to_owned(),
    });
    let hangs: Vec<String> = headline
        .levels
        .iter()
        .filter_map(|at| {
            let (half_spread, one_sd) = (at.signal_to_spread?.value, at.signal_to_noise?.against_reference?);
            ((half_spread > 1.0) != (one_sd > 1.0)).then(|| {
                format!(
                    "{} ({} half spreads, {} standard deviations)",
                    reader.level(at.level_c),
                    fixed(half_spread, 2),
                    fixed(one_sd, 2)
                )
            })
        })
        .collect();
    let both = |at: &LevelFindings| {
        at.signal_to_spread.is_some()
            && at.signal_to_noise.is_some_and(|ratio| ratio.against_reference.is_some())
    };
    if !headline.levels.iter().any(both) {
        return words;
    }
    if hangs.is_empty() {
        words.push(
            "Measured against one standard deviation instead, as studies of emergence do, the verdict is the same at \
             every level."
                .to_owned(),
        );
    } else {
        words.push(format!(
            "The verdict hangs on the yardstick at {}: one standard deviation is the shorter measure that studies of \
             emergence use.",
            hangs.join(", ")
        ));
    }
    words
}

fn timing(findings: &Findings, at: usize, reader: Reader) -> Option<String> {
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
fn elevation(findings: &Findings, reader: Reader) -> Option<String> {
    let warmer = findings.reference + 1..findings.levels_c.len();
    let at = warmer.min_by(|a, b| {
        let distance =
            |at: usize| (findings.levels_c[at] - findings.levels_c[findings.reference] - 2.0).abs();
        distance(*a).total_cmp(&distance(*b))
    })?;
    let changes: Vec<(f64, f64, f64)> = findings
        .bands
        .iter()
        .filter_map(|band| {
            let percent = band.measures.first()?.levels[at].percent_change?;
            Some((band.band.lower_m, band.band.upper_m, percent))
        })
        .collect();
    if changes.len() < 2 {
        return None;
    }
    let most = changes.iter().min_by(|a, b| a.2.total_cmp(&b.2))?;
    let least = changes.iter().max_by(|a, b| a.2.total_cmp(&b.2))?;
    let title = &findings.basin.first()?.measure.title;
    let where_and_how_much = |(lower_m, upper_m, percent): (f64, f64, f64)| {
        let (percent, lower) = (signed(percent, 0), reader.elevation_bare(lower_m));
        format!("{percent} % ({lower} to {})", reader.elevation(upper_m))
    };
    Some(format!(
        "By elevation, {title} at {} changes between {} and {}.",
        reader.level(findings.levels_c[at]),
        where_and_how_much(*most),
        where_and_how_much(*least),
    ))
}

fn could_be_hidden(findings: &Findings, at: &LevelFindings, reader: Reader) -> Option<String> {
    let [beyond, year_beyond, back] = towards_shift(at)?;
    let side = if at.shift?.median.value < 0.0 { "below" } else { "above" };
    Some(format!(
        "At {}, an independent {}-year mean lies {side} a reference one with a chance of {}, a single year {side} a single \
         reference year with {}; {} of these realizations come back to the reference's median all the same.",
        reader.level(at.level_c),
        findings.years,
        chance(beyond),
        chance(year_beyond),
        chance(back)
    ))
}

/// The chances in the direction of the shift: that an independent period value, and a single year, lie on that side of a
/// reference one, and that a realization comes back to the reference's median all the same. Nothing where there is no
/// percentage to speak of, or no shift.
pub fn towards_shift(at: &LevelFindings) -> Option<[Chance; 3]> {
    at.percent_change?;
    let is_fall = at.shift?.median.value < 0.0;
    let chances = at.chances?;
    let found =
        [chances.period_below_reference?, chances.year_below_reference?, chances.reaches_reference_median?];
    Some(if is_fall { found } else { found.map(Chance::opposite) })
}

/// The same for a table: `97 ± 1 %`, `> 99 %`, `< 1 %`.
pub fn chance_in_table(found: Chance) -> String {
    match found.bound {
        Some(bound) if found.estimate.value > 0.5 => format!("> {} %", fixed(100.0 * (1.0 - bound), 0)),
        Some(bound) => format!("< {} %", fixed(100.0 * bound, 0)),
        None => chance(found),
    }
}

/// `97 ± 1 %`, or `above 99 %` and `below 1 %` where no realization counts for the other side.
pub fn chance(chance: Chance) -> String {
    let percent = 100.0 * chance.estimate.value;
    match chance.bound {
        Some(bound) if percent > 50.0 => {
            format!("100 % (95 % sure of more than {} %)", fixed(100.0 * (1.0 - bound), 0))
        }
        Some(bound) => format!("0 % (95 % sure of less than {} %)", fixed(100.0 * bound, 0)),
        None => {
            let error = chance.estimate.monte_carlo_error.map(|error| 100.0 * error);
            let decimals = match error {
                Some(error) if error < 0.05 => 2,
                Some(error) if error < 0.95 => 1,
                _ => 0,
            };
            let error = error.map_or(String::new(), |error| format!(" ± {}", fixed(error, decimals)));
            format!("{}{error} %", fixed(percent, decimals))
        }
    }
}
