//! What the figure says.

use super::super::labels::grouped;
use crate::findings::{GeneratorSheet, SheetStatistic, Subject, Verdict};

/// Every text of the figure but names of rows and columns.
pub(super) struct Words {
    pub title: String,
    pub sample: String,
    pub key: String,
    pub caption: String,
    pub alt: String,
    pub description: String,
}

impl Words {
    pub fn of(sheet: &GeneratorSheet) -> Self {
        let title = title(sheet);
        let sample = format!(
            "{} of {}, as many as the record has in use; without an assumed change of mean precipitation",
            counted(sheet.realizations, "realization"),
            counted(sheet.years, "year")
        );
        let key = format!(
            "Grey: the realizations' 5–95 % range, every one drawn to the same width, with its median. Dot: where the record lies \
             in it. Triangle: the record lies below the range (pointing left) or above it (right). Dash: no number. Chance \
             would put about {} outside were the record one more realization; made from the record, realizations centre on it, so \
             that fewer is usual.",
            counted(sheet.outside_by_chance.round() as usize, "line")
        );
        let caption = format!(
            "Each cell holds one number of the record against the 5–95 % range of the same number of {sample}. Ranges have units and sizes of their \
             own and are drawn to one width: a mark's place tells how usual the record is among realizations, and not how \
             large a difference is. Months run from the water year's first; cool is its part up to {survey}, warm the rest. \
             {survey} SWE is modelled at the reference, from the record and from realizations alike. 29 February is left \
             out. The range shows chance between realizations, not day-to-day variation. Numbers stand in \
             tables/generator-sheet.csv.",
            survey = sheet.survey.words()
        );
        Self {
            alt: format!("{title}. A table of small ranges with a mark each."),
            description: description(sheet),
            title,
            sample,
            key,
            caption,
        }
    }
}

/// Whether the snow that counts is the record's, and how many lines are outside.
fn title(sheet: &GeneratorSheet) -> String {
    if sheet.lines_judged == 0 {
        return format!(
            "{} cannot tell whether the weather that was made looks like the record",
            counted(sheet.realizations, "realization")
        );
    }
    let survey = sheet.survey.words();
    let outside = match sheet.lines_outside {
        0 => format!("no line of {}", sheet.lines_judged),
        lines => format!("{lines} of {}", counted(sheet.lines_judged, "line")),
    };
    let lie = if sheet.lines_outside > 1 { "lie" } else { "lies" };
    let snow: Vec<String> = sheet
        .about(Subject::SurveySwe)
        .filter_map(|of| {
            let outside = of.lines.iter().find(|line| line.is_outside())?;
            Some(format!("{} {}", of.statistic.words(), outside.verdict.map_or("", Verdict::words)))
        })
        .collect();
    let is_judged =
        sheet.about(Subject::SurveySwe).flat_map(|of| &of.lines).any(|line| line.verdict.is_some());
    if !snow.is_empty() {
        let which = snow.join(", ");
        format!(
            "The record's {survey} SWE is not that of the weather that was made ({which}); {outside} {lie} outside the \
             realizations' 5–95 % range"
        )
    } else if is_judged {
        format!(
            "The weather that was made brings {survey} SWE like the record's; {outside} {lie} outside the realizations' 5–95 % \
             range"
        )
    } else {
        format!("Of the record, {outside} {lie} outside the realizations' 5–95 % range")
    }
}

fn description(sheet: &GeneratorSheet) -> String {
    let outside = sheet.statistics.iter().flat_map(|statistic| {
        statistic.lines.iter().filter(|line| line.is_outside()).map(|line| {
            let way = line.verdict.map_or("", Verdict::words);
            let subject = statistic.subject.words(sheet.survey);
            format!("{subject}, {}, {}: {way}", statistic.statistic.words(), line.period.words())
        })
    });
    let outside: Vec<String> = outside.collect();
    if outside.is_empty() {
        "The record lies outside the realizations' range on no line.".to_owned()
    } else {
        format!("Outside the range: {}.", outside.join("; "))
    }
}

/// `2 below`, `1 above`, `3 outside`: how many of a statistic's lines are outside; nothing where none is.
pub(super) fn outside_in_words(statistic: &SheetStatistic) -> Option<String> {
    let count = |verdict| statistic.lines.iter().filter(|line| line.verdict == Some(verdict)).count();
    match (count(Verdict::Below), count(Verdict::Above)) {
        (0, 0) => None,
        (below, 0) => Some(format!("{below} below")),
        (0, above) => Some(format!("{above} above")),
        (below, above) => Some(format!("{} outside", below + above)),
    }
}

fn counted(count: usize, one: &str) -> String {
    format!("{} {one}{}", grouped(count as f64, 0), if count == 1 { "" } else { "s" })
}
