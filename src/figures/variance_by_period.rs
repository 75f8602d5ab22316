//! How much of what differs is the warming, in means over more and more years.

use super::labels::{cause, grouped, level};
use super::page::Paragraphs;
use super::sheet::{Drawn, HPos, Sheet, Stroke, VPos};
use super::shown::Shown;
use super::theme::{BAND, EDGE, INK, LABEL, MARGIN_PX, NAME, NOTE, ONE_OF_MANY, WIDTH_PX, level_ink};
use super::{Figure, Part, Setting, Svg, ensemble};
use crate::findings::{Findings, HoldsMost, Partition, PartitionedPeriod};
use crate::units::UnitSystem;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "variance-by-averaging-period",
    table: "variance-by-averaging-period",
    question: "Over how many years must one average before the warming holds the largest share of what differs?",
    part: Part::Years,
    draw,
};

const BAR_PX: f64 = 15.0;
const ROW_PX: f64 = 21.0;
/// Between the rows of two levels, px.
const GAP_PX: f64 = 16.0;
/// Left of the bars, px: a level's name, and the averaging period.
const LEVEL_PX: f64 = 86.0;
const PERIOD_PX: f64 = 104.0;
/// Right of the bars, px.
const SHARE_PX: f64 = 110.0;

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let by_year = findings.by_year.as_ref()?;
    let measure = by_year.measures.first()?;
    let cause = cause(by_year.levels_change_precipitation);
    let shown = Shown::of(findings);
    let partitions: Vec<(usize, &Partition)> = shown
        .others
        .iter()
        .filter_map(|at| {
            let level_c = findings.levels_c.get(*at)?;
            Some((*at, measure.partitions.iter().find(|of| of.level_c == *level_c)?))
        })
        .collect();
    let reference_c = findings.levels_c[findings.reference];
    let distance = |of: &Partition| (of.level_c - reference_c).abs();
    let (_, farthest) = partitions.iter().max_by(|(_, a), (_, b)| distance(a).total_cmp(&distance(b)))?;
    let title = title(&measure.measure.title, farthest, cause, setting.units);
    let which = shown.in_words(findings, setting.units);
    let said = Said {
        ensemble: format!("{}, the reference and one level at a time.{which}", ensemble(findings)),
        key: format!(
            "Bars, from the left: the {cause} (in the level's colour, its share at the right, with a line below along its 5–95 % range); how \
              differently realizations and years take it (light grey); the realization (dark grey); the year within it (pale). \
              Where a realization holds a single period the two cannot be told apart, and stand as one."
        ),
        cause,
    };
    let text = paint(findings, &partitions, setting, &title, &said).ok()?;
    let caption = format!(
        "{} Shares of the variance of the {} at the reference and at each warming level, of single years and of means over more of \
         them, by {}.{which} The 5–95 % ranges are over resampled realizations: chance of the simulation, not day-to-day variation. \
         The {cause} is largest where it holds more than chance as a whole (realization and year together) and more than how differently \
         they take it. A share depends on the two levels that are held against each other.",
        FIGURE.question,
        measure.measure.title,
        ensemble(findings)
    );
    let alt = format!("{title}. Bars in {} groups, one a level.", partitions.len());
    Some(Svg { text, alt, caption, title })
}

struct Said {
    ensemble: String,
    key: String,
    cause: &'static str,
}

fn title(measure: &str, partition: &Partition, cause: &str, units: UnitSystem) -> String {
    let place = level(units, partition.level_c);
    let longest = partition.periods.last().map_or(1, |period| period.years);
    let when = match partition.warming_holds_most {
        HoldsMost::Always => "in every averaging period, single years included".to_owned(),
        HoldsMost::From { years, .. } => format!("in means over {years} years and more"),
        HoldsMost::Never => format!("in no averaging period up to {longest} years"),
        HoldsMost::PerhapsFrom { years } => format!("at most in means over {years} years and more"),
        HoldsMost::CannotTell => {
            return format!(
                "{measure}: whether {place} of {cause} holds the largest share of the variance cannot be told"
            );
        }
    };
    format!("{measure}: {place} of {cause} holds the largest share of the variance {when}")
}

fn period_name(years: usize) -> String {
    if years == 1 { "single years".to_owned() } else { format!("{years}-year means") }
}

fn paint(
    findings: &Findings,
    partitions: &[(usize, &Partition)],
    setting: &Setting<'_>,
    title: &str,
    said: &Said,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, title, &said.ensemble);
    let key = Paragraphs::key(&said.key);
    let edges = [MARGIN_PX + LEVEL_PX + PERIOD_PX, WIDTH_PX - MARGIN_PX - SHARE_PX];
    let top = MARGIN_PX + heading.height() + 40.0;
    let of_group = |partition: &Partition| ROW_PX * partition.periods.len() as f64 + GAP_PX;
    let below = top + partitions.iter().map(|(_, of)| of_group(of)).sum::<f64>() + 6.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("axis", || {
        sheet.write("Share of the variance", (edges[0], top - 10.0), NAME, HPos::Left, VPos::Bottom)?;
        sheet.write("Level's share", (edges[1] + 12.0, top - 10.0), NAME, HPos::Left, VPos::Bottom)
    })?;
    let mut y = top;
    for (at, partition) in partitions {
        let ink = level_ink(*at, findings.reference, findings.levels_c.len());
        sheet.group("level", || {
            let name = level(setting.units, partition.level_c);
            sheet.write(&name, (MARGIN_PX, y + ROW_PX / 2.0), NAME, HPos::Left, VPos::Center)?;
            partition.periods.iter().enumerate().try_for_each(|(row, period)| {
                bar(&sheet, period, ink, edges, y + ROW_PX * (row as f64 + 0.5))
            })
        })?;
        y += of_group(partition);
    }
    key.write(&sheet, below)?;
    let described: Vec<String> = partitions
        .iter()
        .flat_map(|(_, partition)| {
            let place = level(setting.units, partition.level_c);
            partition.periods.iter().map(move |period| {
                format!(
                    "{place}, {}: {} % {}",
                    period_name(period.years),
                    percent(period.level.value),
                    said.cause
                )
            })
        })
        .collect();
    Ok(sheet.document(FIGURE.slug, title, &format!("Shares of the variance. {}.", described.join("; "))))
}

fn percent(share: f64) -> String {
    grouped(100.0 * share, 0)
}

fn bar(
    sheet: &Sheet,
    period: &PartitionedPeriod,
    ink: plotters::style::RGBColor,
    [left, right]: [f64; 2],
    middle: f64,
) -> Drawn {
    let across = |share: f64| left + (right - left) * share;
    let [top, bottom] = [middle - BAR_PX / 2.0, middle + BAR_PX / 2.0];
    let year = period.year.map_or(0.0, |share| share.value);
    let by_year = period.level_by_year.map_or(0.0, |share| share.value);
    let parts = [
        (period.level.value, ink),
        (period.level_by_realization.value + by_year, ONE_OF_MANY),
        (period.realization.value, EDGE),
        (year, BAND),
    ];
    let mut from = 0.0;
    for (share, ink) in parts {
        sheet.block((across(from), top), (across(from + share), bottom), ink)?;
        from += share;
    }
    let frame = [(left, top), (right, top), (right, bottom), (left, bottom), (left, top)];
    sheet.line(&frame, Stroke::solid(EDGE, 1.0))?;
    if let (Some(low), Some(high)) = (period.level.q05, period.level.q95) {
        sheet.line(&[(across(low), bottom + 2.0), (across(high), bottom + 2.0)], Stroke::solid(INK, 2.0))?;
    }
    let name = period_name(period.years);
    sheet.write(&name, (left - 10.0, middle), LABEL, HPos::Right, VPos::Center)?;
    let ranged = match (period.level.q05, period.level.q95) {
        (Some(low), Some(high)) => {
            format!("{} % ({}–{})", percent(period.level.value), percent(low), percent(high))
        }
        _ => format!("{} %", percent(period.level.value)),
    };
    sheet.write(&ranged, (right + 12.0, middle), NOTE, HPos::Left, VPos::Center)
}
