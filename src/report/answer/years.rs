//! What single years say, in words: a sentence each for its questions.

use super::super::numbers::{fixed, trimmed};
use super::super::reader::Reader;
use super::telling_level;
use crate::findings::{
    ByYear, Crossing, Findings, HoldsMost, LowRuns, LowSnow, MeasureByYear, Partition, Ranged, WorstYear,
};

/// The sentences; none where single years say nothing.
pub(super) fn years(findings: &Findings, cause: &str, reader: Reader) -> Vec<String> {
    let Some(by_year) = &findings.by_year else {
        return Vec::new();
    };
    let headline = by_year.measures.first();
    let mut said: Vec<String> = Vec::new();
    said.extend(by_averaging_period(findings, cause, reader));
    said.extend(by_year.low_snow.as_ref().and_then(|low| low_snow(low, findings, reader)));
    said.extend(by_year.low_snow.as_ref().and_then(|low| own_share(low, by_year, findings)));
    said.extend(by_year.low_snow.as_ref().and_then(|low| without_warming(low, cause, reader)));
    said.extend(by_year.worst_years.first().and_then(|worst| worst_year(worst, by_year, findings, reader)));
    said.extend(by_year.low_runs.as_ref().and_then(|runs| low_runs(runs, findings, reader)));
    said.extend(headline.and_then(|of| tails(of, findings, reader)));
    said.extend(by_year.measures.last().and_then(|of| types(of, findings, reader)));
    said.extend(headline.and_then(|of| detection(of, reader)));
    said
}

/// Whether the headline's warming holds more than chance in single years, or only in means over many.
pub(super) fn by_averaging_period(findings: &Findings, cause: &str, reader: Reader) -> Option<String> {
    let headline = findings.by_year.as_ref()?.measures.first()?;
    holds_most(&headline.partitions, findings, cause, reader)
}

/// From which averaging period on the warming holds the largest share of the three that are named, levels of one answer together.
fn holds_most(partitions: &[Partition], findings: &Findings, cause: &str, reader: Reader) -> Option<String> {
    let reference_c = findings.levels_c[findings.reference];
    let mut groups: Vec<(HoldsMost, Vec<String>)> = Vec::new();
    for of in partitions.iter().filter(|of| of.level_c > reference_c) {
        let level = reader.level(of.level_c);
        match groups.last_mut() {
            Some((answer, levels)) if *answer == of.warming_holds_most => levels.push(level),
            _ => groups.push((of.warming_holds_most, vec![level])),
        }
    }
    let longest = partitions.first()?.periods.last()?.years;
    let said = |(answer, levels): &(HoldsMost, Vec<String>)| {
        let when = match answer {
            HoldsMost::Always => "in every averaging period, single years included".to_owned(),
            HoldsMost::From { years, is_blurred: false } => format!("from {years}-year means on"),
            HoldsMost::From { years, is_blurred: true } => {
                format!("from {years}-year means on (a shorter period comes too close to tell)")
            }
            HoldsMost::Never => format!("in no averaging period up to {longest} years"),
            HoldsMost::PerhapsFrom { years } => {
                format!("perhaps from {years}-year means on (too close to tell), in no shorter ones")
            }
            HoldsMost::CannotTell => "perhaps (too close to tell)".to_owned(),
        };
        format!("at {} {when}", listed(levels))
    };
    let groups: Vec<String> = groups.iter().map(said).collect();
    (!groups.is_empty()).then(|| {
        format!(
            "Years, and means over several, differ by the {cause}, by chance, and by how differently years and realizations take the {cause}: of these three \
             the {cause} holds the largest share {}.",
            groups.join("; ")
        )
    })
}

/// `A low-snow year has less than 214 mm: 2 in 10 years at the reference. At +2 °C it is 6 in 10 years, 61 % (59 to 63 %): 3.1
/// times as often (2.9 to 3.2).`
fn low_snow(low: &LowSnow, findings: &Findings, reader: Reader) -> Option<String> {
    let reference = low.levels.get(findings.reference)?;
    let at = low.levels.get(telling_level(findings)?)?;
    let how_often = match at.chance_ratio.side_of(1.0) {
        Some(true) => format!(
            "{} times as often{}",
            fixed(at.chance_ratio.value, 1),
            range(at.chance_ratio, 1.0, 1, "")
        ),
        Some(false) if at.low_years == 0 => "more seldom".to_owned(),
        Some(false) => format!(
            "more seldom, {} times as often{}",
            fixed(at.chance_ratio.value, 2),
            range(at.chance_ratio, 1.0, 2, "")
        ),
        // A resample without a low year at the reference has no ratio, and so the ratio no range.
        None if at.chance_ratio.q05.is_none() => "how many times as often cannot be told".to_owned(),
        None => "no telling whether more or less often".to_owned(),
    };
    Some(format!(
        "A low-snow year has less than {}: {} at the reference. At {} it is {}, {} %{}: {how_often}.",
        reader.amount(low.below_mm.value),
        in_years(reference.chance.value),
        reader.level(at.level_c),
        in_years(at.chance.value),
        fixed(100.0 * at.chance.value, 0),
        range(at.chance, 100.0, 0, " %"),
    ))
}

/// The reference's own share of low years, where it is not the quantile, and why.
fn own_share(low: &LowSnow, by_year: &ByYear, findings: &Findings) -> Option<String> {
    let own = low.levels.get(findings.reference).filter(|_| low.share_differs_from_quantile)?.chance;
    let why = if by_year.redraws_years { ", since the record's winters come again and again" } else { "" };
    Some(format!(
        "At the reference itself {} %{} of the years are low, not {} %: {} % of them have just the limit's SWE{why}, and only years \
         below it count.",
        fixed(100.0 * own.value, 1),
        range(own, 100.0, 1, " %"),
        trimmed(&fixed(100.0 * low.below_quantile, 1)),
        fixed(100.0 * low.years_at_limit as f64 / low.years as f64, 1)
    ))
}

/// The record's climate against one without so much warming: a sensitivity of the model.
fn without_warming(low: &LowSnow, cause: &str, reader: Reader) -> Option<String> {
    let of = low.without_warming.first()?;
    let warming = format!("{} of {cause}", reader.difference(of.level_c.abs()));
    Some(match of.chance_ratio {
        Some(ratio) if ratio.q05.is_none() || ratio.q95.is_none() => format!(
            "Without {warming} so few simulated years are low that it cannot be told how much more often the record's \
             own climate has them."
        ),
        Some(ratio) if ratio.side_of(1.0).is_none() => format!(
            "In this model, the record's own climate has low-snow years {} times as often{} as the same weather without \
             {warming}: too near to tell.",
            fixed(ratio.value, 1),
            range(ratio, 1.0, 1, "")
        ),
        Some(ratio) => format!(
            "In this model, the record's own climate has low-snow years {} times as often{} as the same weather without \
             {warming}{}: how much the odds move, not what caused any year.",
            fixed(ratio.value, 1),
            range(ratio, 1.0, 1, ""),
            of.attributable_fraction.map_or_else(String::new, on_top)
        ),
        None => format!(
            "Without {warming} no simulated year is low: how much more often the record's own climate \
             has them cannot be told."
        ),
    })
}

/// The low years that come on top, of all low ones.
fn on_top(fraction: Ranged) -> String {
    format!(
        ", so that {} %{} of them come on top (a sensitivity, not a formal attribution)",
        fixed(100.0 * fraction.value, 0),
        range(fraction, 100.0, 0, " %")
    )
}

fn worst_year(worst: &WorstYear, by_year: &ByYear, findings: &Findings, reader: Reader) -> Option<String> {
    let simulated = by_year.simulated_years;
    let [reference, at] = [findings.reference, telling_level(findings)?].map(|level| worst.levels.get(level));
    let said = |of: Option<&crate::findings::ReturnOfYear>| -> Option<String> {
        Some(match of?.return_period_years {
            Some(period) => format!(
                "one year in {}{}",
                years_of(period.value),
                range(period, 1.0, usize::from(period.value < 9.95), "")
            ),
            None => format!("rarer than one in {simulated} simulated years"),
        })
    };
    let rests_on = match (by_year.redraws_years, by_year.changes_mean) {
        (true, false) => {
            " The realizations are the record's own winters in another order: at the reference this rests on those very winters, and says \
             little more than that count."
        }
        (true, true) => {
            " The realizations are the record's own winters in another order, wetter or drier by the assumed change of mean precipitation: only \
             those that it makes drier, half of them, can have as little, so that at the reference it comes about half as often as in the \
             record, by that assumption alone."
        }
        (false, _) => "",
    };
    Some(format!(
        "As little as in {}, the record's lowest year in this model ({}), comes {} at the reference, {} at {}; in the record itself it \
         is {} in {}.{rests_on}",
        worst.water_year,
        reader.amount(worst.swe_mm),
        said(reference)?,
        said(at)?,
        reader.level(at?.level_c),
        worst.record_years_as_low,
        worst.record_years
    ))
}

fn low_runs(runs: &LowRuns, findings: &Findings, reader: Reader) -> Option<String> {
    let reference_c = findings.levels_c[findings.reference];
    let firsts: Vec<String> = runs
        .lengths
        .iter()
        .map(|length| {
            let first = match length.first_at_level_c {
                Some(first_c) if first_c <= reference_c => "already at the reference".to_owned(),
                Some(first_c) => format!("first at {}", reader.level(first_c)),
                None => "at no level of the study".to_owned(),
            };
            format!("{} in a row {first}", length.years)
        })
        .collect();
    (!firsts.is_empty()).then(|| {
        format!(
            "Low years in a row (at or below {}, the {} % quantile of the reference's years): half of the {}-year realizations hold {}.",
            reader.amount(runs.at_or_below_mm.value),
            fixed(100.0 * runs.at_or_below_quantile, 0),
            findings.years,
            listed(&firsts)
        )
    })
}

/// How many years are of the driest and of the wettest fifth, and what a limit that kept the driest a fifth would mean.
fn types(of: &MeasureByYear, findings: &Findings, reader: Reader) -> Option<String> {
    let reference = of.types.get(findings.reference)?;
    let at = of.types.get(telling_level(findings)?)?;
    let (own, kept) = (reference.kept_limits.first()?, at.kept_limits.first()?);
    let [driest, wettest] = [at.shares.first()?, at.shares.last()?];
    Some(format!(
        "By {}: at {} what is the driest fifth at the reference takes in {}, and the wettest {}; to keep a fifth of the years in the \
         driest type its limit would go from {} to {}.",
        of.measure.title,
        reader.level(at.level_c),
        in_years(driest.value),
        in_years(wettest.value),
        reader.amount(own.value),
        reader.amount(kept.value)
    ))
}

fn tails(of: &MeasureByYear, findings: &Findings, reader: Reader) -> Option<String> {
    let at = of.tails.get(telling_level(findings)?)?;
    let change = at.change?;
    let varies = match change.standard_deviation.side_of(0.0) {
        Some(true) => format!(
            "years vary more ({} of standard deviation)",
            reader.change(change.standard_deviation.value)
        ),
        Some(false) => format!(
            "years vary less ({} of standard deviation)",
            reader.change(change.standard_deviation.value)
        ),
        None => "whether years vary more or less cannot be told".to_owned(),
    };
    Some(format!(
        "At {}, low years (1 in 10 has less) move by {} and high ones (1 in 10 has more) by {}; {varies}.",
        reader.level(at.level_c),
        reader.change(change.q10.value),
        reader.change(change.q90.value)
    ))
}

/// From which warming on the change leaves one standard deviation, and in which year where the user states a rate.
fn detection(of: &MeasureByYear, reader: Reader) -> Option<String> {
    let detection = of.detection.as_ref()?;
    let said: Vec<String> = detection
        .periods
        .iter()
        .filter_map(|period| {
            let means = if period.years == 1 {
                "single years".to_owned()
            } else {
                format!("{}-year means", period.years)
            };
            let place = match period.leaves_spread {
                Crossing::At { level_c, .. } => format!("from {} on", reader.between_levels(level_c)),
                Crossing::NotReached { up_to_c } => format!("at no level up to {}", reader.level(up_to_c)),
                Crossing::Unknown => return None,
            };
            let year = period
                .calendar_year
                .map_or(String::new(), |year| format!(" (about {})", fixed_year(year.value)));
            Some(format!("{place}{year} in {means}"))
        })
        .collect();
    if said.is_empty() {
        return None;
    }
    let rate = detection.warming_rate.map_or_else(
        || " Without a stated rate of warming none of this has a year.".to_owned(),
        |rate| {
            format!(
                " Years are those of the stated rate, {} a decade from {} on.",
                reader.difference(rate.c_per_decade),
                fixed_year(rate.from_year)
            )
        },
    );
    Some(format!("The change leaves what chance does, one standard deviation, {}.{rate}", listed(&said)))
}

/// A calendar year has no thousands to set apart.
fn fixed_year(year: f64) -> String {
    format!("{year:.0}")
}

/// `12`, `1.6`: years of a return period, to a tenth below ten.
pub fn years_of(years: f64) -> String {
    trimmed(&fixed(years, usize::from(years < 9.95))).to_owned()
}

/// `3 in 10 years`, `4 in 100 years`, `fewer than 1 in 100 years`: a chance as people count it.
pub fn in_years(chance: f64) -> String {
    let [tenths, hundredths] = [10.0, 100.0].map(|of| (of * chance).round());
    match chance {
        ..=0.0 => "no simulated year".to_owned(),
        1.0.. => "every simulated year".to_owned(),
        _ if hundredths < 1.0 => "fewer than 1 in 100 years".to_owned(),
        ..0.095 => format!("{hundredths} in 100 years"),
        _ if tenths > 9.0 => "more than 9 in 10 years".to_owned(),
        _ => format!("{tenths} in 10 years"),
    }
}

/// ` (59 to 63 %)`: the range of a number, nothing where it is not known.
pub fn range(of: Ranged, times: f64, decimals: usize, unit: &str) -> String {
    match (of.q05, of.q95) {
        (Some(low), Some(high)) => {
            let [value, low, high] = [of.value, low, high].map(|number| fixed(times * number, decimals));
            // All the same once rounded: a range would say no more than the number.
            if low == value && high == value { String::new() } else { format!(" ({low} to {high}{unit})") }
        }
        _ => String::new(),
    }
}

fn listed(said: &[String]) -> String {
    match said {
        [] => String::new(),
        [one] => one.clone(),
        [rest @ .., last] => format!("{} and {last}", rest.join(", ")),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand, with the words of each case.
    #[test]
    fn chances_are_told_in_years() {
        let said = [0.0, 0.004, 0.04, 0.2, 0.349, 0.96, 1.0].map(in_years);
        assert_eq!(
            said,
            [
                "no simulated year",
                "fewer than 1 in 100 years",
                "4 in 100 years",
                "2 in 10 years",
                "3 in 10 years",
                "more than 9 in 10 years",
                "every simulated year"
            ]
        );
        assert_eq!([1.62, 12.4].map(years_of), ["1.6", "12"]);
        let some = Ranged { value: 0.61, q05: Some(0.59), q95: Some(0.63) };
        assert_eq!(range(some, 100.0, 0, " %"), " (59 to 63 %)");
        assert_eq!(range(Ranged { q05: None, ..some }, 100.0, 0, " %"), "");
    }
}
