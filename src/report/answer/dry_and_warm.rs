//! Dry and warm years, what they do to the snow, and kinds of snow drought.

use super::super::numbers::{fixed, stated};
use super::super::reader::Reader;
use super::{chance_in_table, chance_in_words as chance};
use crate::findings::{
    Chance, Coincidence, Counted, Depends, Estimate, Findings, PeriodsCompared, RecordCoincidence,
    SnowDroughts,
};

/// Shares of fewer years than this say nothing of a period.
const LEAST_YEARS_OF_A_PERIOD: u64 = 5;

/// How often years are dry and warm, whether the two hang together, the same of the record, and kinds of snow drought; nothing where
/// there is no cool season.
pub(super) fn dry_and_warm(findings: &Findings, reader: Reader) -> Vec<String> {
    let Some(places) = &findings.places else { return Vec::new() };
    let Some(found) = &places.coincidence else { return Vec::new() };
    let first = [coincide(found, findings, reader), depends(found, findings)];
    let record = places.record_coincidence.as_ref().map(of_record);
    let droughts = places.snow_droughts.as_ref().map(|found| kinds_of_drought(found, findings, reader));
    first.into_iter().flatten().chain(record).chain(droughts).collect()
}

/// `about 3 in 10 years`.
fn in_ten(share: f64) -> String {
    match (10.0 * share).round() as u32 {
        0 => "fewer than 1 in 20 years".to_owned(),
        10 => "more than 19 in 20 years".to_owned(),
        tenths => format!("about {tenths} in 10 years"),
    }
}

fn said(found: Chance) -> String {
    let in_words = match (found.bound, found.estimate.value) {
        (Some(_), ..=0.0) => "no simulated years".to_owned(),
        (Some(_), 1.0..) => "all simulated years".to_owned(),
        (_, share) => in_ten(share),
    };
    format!("{in_words} ({})", chance_in_table(found))
}

fn coincide(found: &Coincidence, findings: &Findings, reader: Reader) -> Option<String> {
    let at = |level: usize| found.levels.get(level);
    let level = at(findings.reference)?;
    let now = level.dry_warm?;
    let mut words = format!("At the reference, {} are both dry and warm", said(now));
    let last = found.levels.len() - 1;
    if let Some(then) = at(last).filter(|_| last != findings.reference)
        && let Some(dry_warm) = then.dry_warm
    {
        words += &format!("; at {}, {}", reader.level(then.level_c), said(dry_warm));
    }
    words += ".";
    let given = level.low_snow_given_dry;
    words += &match (given.warm, given.cool) {
            (Some(warm), Some(cool)) => {
                // Without low years of both kinds, or in every resample, a ratio says nothing.
                let is_told = |ratio: &Estimate| ratio.value > 0.0 && ratio.monte_carlo_error.is_some_and(|error| error > 0.0);
                let ratio = given.ratio.filter(is_told).map_or_else(
                    || ": too few to say how many times as often.".to_owned(),
                    |ratio| {
                        let error = ratio
                            .monte_carlo_error
                            .map_or(String::new(), |error| format!(" ± {}", fixed(error, 2)));
                        format!(", {}{error} times as often.", fixed(ratio.value, 2))
                    },
                );
                format!(
                    " A dry year is low in snow, below the {} % quantile of the reference's single years, with a chance of {} where it is warm, and {} where \
                     it is cool{ratio}",
                    stated(100.0 * found.low_snow_below_quantile),
                    chance(warm),
                    chance(cool)
                )
            }
            _ => " The snow of dry years cannot be compared: there are not both warm and cool ones, or too many of the reference's \
                  years are bare."
                .to_owned(),
        };
    Some(words)
}

fn depends(found: &Coincidence, findings: &Findings) -> Option<String> {
    let own = &found.levels.get(findings.reference)?.own_medians;
    let Some(factor) = own.dependence else {
        return Some(
            "Whether dry years tend to be warm cannot be told: one of the two never comes.".to_owned(),
        );
    };
    let error = factor.monte_carlo_error.map_or(String::new(), |error| format!(" ± {}", fixed(error, 2)));
    let factor = fixed(factor.value, 2);
    let verdict = match own.depends {
        Depends::MoreOften => "in the weather that was made, dry years tend to be warm",
        Depends::LessOften => "in the weather that was made, dry years tend to be cool",
        Depends::CannotTell => {
            "these realizations cannot tell whether dry years are warm more or less often than by chance"
        }
    };
    Some(format!(
        "About the reference's own medians, dry and warm years come {factor}{error} times as often as if the two knew nothing of each other: {verdict}. That weather was made from the record, and whether \
         the climate itself has such a tie only the record can say."
    ))
}

fn of_record(found: &RecordCoincidence) -> String {
    let counted = |counted: Counted| {
        let range = counted.wilson.map_or(String::new(), |[low, high]| {
            format!(" ({}–{} %)", fixed(100.0 * low, 0), fixed(100.0 * high, 0))
        });
        format!("{} of {}{range}", counted.count, counted.of)
    };
    let test = found.fisher_p.map_or(String::new(), |p| {
        let verdict =
            if p < 0.05 { "that is hardly chance" } else { "so few years cannot tell that from chance" };
        format!(" Fisher's exact test of independence has p = {}: {verdict}.", fixed(p, 2))
    });
    let quantile = stated(100.0 * found.low_snow_below_quantile);
    let (warm, cool) = (found.low_snow_given_dry_warm, found.low_snow_given_dry_cool);
    let low_snow = if warm.of + cool.of == 0 {
        format!(
            "No year of it lies below their {quantile} % quantile of snow, so that nothing is said of low snow in dry ones."
        )
    } else {
        format!(
            "Low snow, below the {quantile} % quantile of these years, came in {} dry and warm years and in {} dry and cool ones.",
            counted(warm),
            counted(cool)
        )
    };
    let mut words = format!(
        "In the record itself, {} years are dry and warm; in brackets Wilson's 95 % interval.{test} {low_snow}",
        counted(found.dry_warm)
    );
    let is_told = |periods: &PeriodsCompared| {
        [periods.earlier, periods.later].iter().all(|period| period.dry_warm.of >= LEAST_YEARS_OF_A_PERIOD)
    };
    if let Some(periods) = found.periods.filter(is_told) {
        let verdict = if periods.are_apart {
            "by the same test that is hardly chance"
        } else {
            "so few years cannot tell the two periods apart"
        };
        let ratio =
            periods.ratio.map_or(String::new(), |ratio| format!(", {} times the share", fixed(ratio, 2)));
        words += &format!(
            " From {} to {} there were {}, from {} to {} {}{ratio}; {verdict}.",
            periods.earlier.first_year,
            periods.earlier.last_year,
            counted(periods.earlier.dry_warm),
            periods.later.first_year,
            periods.later.last_year,
            counted(periods.later.dry_warm)
        );
    }
    words
}

fn kinds_of_drought(found: &SnowDroughts, findings: &Findings, reader: Reader) -> String {
    let of = |level: usize| {
        let level = found.levels.get(level)?;
        Some(format!(
            "at {}, {} bring a dry snow drought and {} a warm one",
            reader.level(level.level_c),
            said(level.dry?),
            said(level.warm?)
        ))
    };
    let last = found.levels.len() - 1;
    let levels = [Some(findings.reference), Some(last).filter(|last| *last != findings.reference)];
    let said: Vec<String> = levels.into_iter().flatten().filter_map(of).collect();
    format!(
        "A snow drought has no more than {} of {}, as 3 in 10 of the reference's years have; it is dry where precipitation before that date is below the \
         reference's median, and warm where it is not: {}.",
        reader.amount(found.low_at_mm),
        findings.basin.first().map_or("snow water", |headline| headline.measure.title.as_str()),
        said.join("; ")
    )
}
