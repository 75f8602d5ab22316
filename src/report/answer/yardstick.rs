//! What the verdict measures with, and what it would be with another measure.

use super::super::numbers::{counted, fixed, trimmed};
use super::super::reader::Reader;
use super::period_name;
use crate::findings::{Crossing, Findings, MeasureFindings, Yardstick};

/// The yardstick and the verdict by others: the assumed change of mean precipitation taken away, halved and doubled, other
/// periods, one standard deviation, temperatures held; and at which levels the verdict hangs on the choice.
pub(super) fn yardstick(
    findings: &Findings,
    headline: &MeasureFindings,
    cause: &str,
    reader: Reader,
) -> Vec<String> {
    let Some(spread) = headline.precipitation_spread else {
        return Vec::new();
    };
    let own = |of: &&Yardstick| of.years == findings.years;
    let mut words = vec![format!(
        "The yardstick is the reference's {}, over {} of {}, with its own temperatures: median {}, 5–95 % \
         from {} to {}. The half spread is the part of that range between the median and the end that a shift points to; \
         'outweighs' means that the median shift is larger.",
        period_name(findings, headline),
        counted(findings.realizations, "realization"),
        counted(findings.years, "year"),
        reader.amount(spread.q50),
        reader.amount(spread.q05),
        reader.amount(spread.q95)
    )];
    let Some(study) = headline.yardsticks.iter().filter(own).find(|of| of.times_assumed == 1.0) else {
        return words;
    };
    words.push(if study.mean_change_sd_pct > 0.0 {
        let others: Vec<String> = headline
            .yardsticks
            .iter()
            .filter(own)
            .filter(|of| of.times_assumed != 1.0 && can_be_told(of.outweighs))
            .filter(|_| headline.outweighs_range.is_some())
            .map(|of| format!("{} {}", from_where_on(of.outweighs, reader), of_assumption(of)))
            .collect();
        let others = match others.as_slice() {
            [] => String::new(),
            others => format!(" The {cause} outweighs {}.", others.join(", ")),
        };
        format!(
            "It holds an assumed change of mean precipitation, normal with a standard deviation of {} %: an assumption \
             about the future.{others}",
            trimmed(&fixed(study.mean_change_sd_pct, 1))
        )
    } else {
        "No change of mean precipitation is assumed: the spread holds only the order and choice of the record's own years."
            .to_owned()
    });
    // Realizations too few for a verdict have none by another yardstick either.
    if headline.outweighs_range.is_none() {
        return words;
    }
    let periods = headline.yardsticks.iter().filter(|of| of.times_assumed == 1.0 && !own(of));
    let periods = periods.filter(|of| can_be_told(of.outweighs));
    let periods: Vec<String> = periods
        .map(|of| {
            let what = match of.years {
                1 => "single years".to_owned(),
                years => format!("{years}-year values"),
            };
            format!("the spread of {what} {}", from_where_on(of.outweighs, reader))
        })
        .collect();
    if !periods.is_empty() {
        words.push(format!("The same shift outweighs {}.", periods.join(", ")));
    }
    if can_be_told(study.outweighs_standard_deviation) {
        words.push(format!(
            "Against one standard deviation, the shorter measure that studies of emergence use, it outweighs {}.",
            from_where_on(study.outweighs_standard_deviation, reader)
        ));
    }
    if let Some(held) = headline.temperature_held.as_ref().filter(|held| can_be_told(held.outweighs)) {
        words.push(format!(
            "With every month's mean temperature held at the record's, so that no realization is warm or cool by chance, it \
             outweighs {}.",
            from_where_on(held.outweighs, reader)
        ));
    }
    words.extend(hangs(findings, headline, cause, reader));
    words
}

/// Whether there is anything to say: not without a level above the reference, nor of a reference that does not spread.
fn can_be_told(crossing: Crossing) -> bool {
    crossing != Crossing::Unknown
}

fn of_assumption(of: &Yardstick) -> &'static str {
    match of.times_assumed {
        0.0 => "without it",
        times if times < 1.0 => "with half of it",
        _ => "with twice as much",
    }
}

/// `from +1.4 °C on`, `from +1.2 °C to +3.0 °C`, `at no level up to +4 °C`: goes on from 'outweighs'.
fn from_where_on(crossing: Crossing, reader: Reader) -> String {
    match crossing {
        Crossing::At { level_c, until_c: None } => format!("from {} on", reader.between_levels(level_c)),
        Crossing::At { level_c, until_c: Some(until_c) } => {
            format!("from {} to {}", reader.between_levels(level_c), reader.between_levels(until_c))
        }
        Crossing::NotReached { up_to_c } => format!("at no level up to {}", reader.level(up_to_c)),
        Crossing::Unknown => "at a level that cannot be told".to_owned(),
    }
}

/// At which warmer levels every yardstick of the study's own periods agrees, and at which the verdict hangs on the choice.
fn hangs(findings: &Findings, headline: &MeasureFindings, cause: &str, reader: Reader) -> Option<String> {
    let warmer = &findings.levels_c[findings.reference + 1..];
    let verdicts = |level_c: f64| -> Vec<bool> {
        let own = headline.yardsticks.iter().filter(|of| of.years == findings.years);
        let of_yardsticks = own
            .flat_map(|of| of.levels.iter())
            .filter(|at| at.level_c == level_c)
            .flat_map(|at| [at.signal_to_spread.map(|ratio| ratio.value), at.signal_to_standard_deviation]);
        let held = headline.temperature_held.iter().flat_map(|held| &held.levels);
        let held =
            held.filter(|at| at.level_c == level_c).map(|at| at.signal_to_spread.map(|ratio| ratio.value));
        of_yardsticks.chain(held).flatten().map(|ratio| ratio > 1.0).collect()
    };
    let [mut all, mut none, mut some] = [Vec::new(), Vec::new(), Vec::new()];
    for level_c in warmer {
        let verdicts = verdicts(*level_c);
        let group = match verdicts.iter().filter(|outweighs| **outweighs).count() {
            _ if verdicts.is_empty() => continue,
            0 => &mut none,
            count if count == verdicts.len() => &mut all,
            _ => &mut some,
        };
        group.push(reader.level(*level_c));
    }
    let listed = |levels: &[String]| match levels {
        [] => String::new(),
        [one] => one.clone(),
        [rest @ .., last] => format!("{} and {last}", rest.join(", ")),
    };
    let outweighs = format!("{cause} outweighs at");
    let parts = [
        (&all, outweighs.as_str()),
        (&none, "precipitation outweighs at"),
        (&some, "the verdict hangs on the yardstick at"),
    ];
    let parts: Vec<String> = parts
        .iter()
        .filter(|(levels, _)| !levels.is_empty())
        .map(|(levels, what)| format!("{what} {}", listed(levels)))
        .collect();
    (!parts.is_empty()).then(|| {
        format!("By all yardsticks of {}-year values on this page: {}.", findings.years, parts.join("; "))
    })
}
