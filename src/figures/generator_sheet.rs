//! The record against the weather that was made, every line of the generator sheet on one page.

mod columns;
mod words;

use super::page::Paragraphs;
use super::sheet::{Drawn, HPos, Px, Sheet, Stroke, VPos};
use super::theme::{BAND, DRY, EDGE, INK, Lettering, MARGIN_PX, NAME, NOTE, ONE_OF_MANY, WIDTH_PX};
use super::{Figure, Part, Setting, Svg, sentence};
use crate::findings::{Findings, GeneratorSheet, SheetLine, SheetStatistic, Subject, Verdict};
use columns::Columns;
use words::{Words, outside_in_words};

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "generator-sheet",
    table: "generator-sheet",
    question: "Does the weather that was made look like the record?",
    part: Part::Weather,
    draw,
};

/// Height of a statistic's row, px.
const ROW_PX: f64 = 19.0;
/// Height of a subject's name above its rows, px.
const SUBJECT_PX: f64 = 28.0;
/// Height of the columns' names, px.
const HEAD_PX: f64 = 30.0;
/// Half of the width that every range is drawn to, and of its height, px.
const HALF_RANGE_PX: Px = (8.5, 5.5);
/// Between a range and the mark beyond it, and the length of that mark, px.
const BEYOND_PX: [f64; 2] = [1.0, 6.0];
/// Radius of the record's mark within the range, px.
const DOT_PX: f64 = 2.6;
/// Lines on which the record lies outside.
const OUTSIDE: Lettering = Lettering { ink: DRY, ..NAME };

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let sheet = findings.generator.as_ref()?;
    let words = Words::of(sheet);
    let text = paint(sheet, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

fn paint(found: &GeneratorSheet, setting: &Setting<'_>, words: &Words) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let names = found.statistics.iter().map(|of| NOTE.width(of.statistic.words())).fold(0.0, f64::max);
    let columns = Columns::new(found, MARGIN_PX + names + 10.0);
    let subjects: Vec<(Subject, Vec<&SheetStatistic>)> =
        Subject::ALL.into_iter().map(|subject| (subject, found.about(subject).collect())).collect();
    let top = MARGIN_PX + heading.height() + HEAD_PX;
    let rows: f64 = subjects.iter().map(|(_, of)| SUBJECT_PX + ROW_PX * of.len() as f64).sum();
    let below = top + rows + 20.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("axis", || columns.write(&sheet, top))?;
    let mut y = top;
    for (subject, statistics) in &subjects {
        let line = Stroke::solid(BAND, 1.0);
        sheet.line(&[(MARGIN_PX, y + 5.0), (WIDTH_PX - MARGIN_PX, y + 5.0)], line)?;
        let name = sentence(&subject.words(found.survey));
        sheet.write(&name, (MARGIN_PX, y + SUBJECT_PX - 7.0), NAME, HPos::Left, VPos::Bottom)?;
        y += SUBJECT_PX;
        for statistic in statistics {
            sheet.group("row", || row(&sheet, statistic, &columns, y + ROW_PX / 2.0))?;
            y += ROW_PX;
        }
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// A statistic: a cell a part of the year, and how many of them are outside.
fn row(sheet: &Sheet, statistic: &SheetStatistic, columns: &Columns, y: f64) -> Drawn {
    let words = statistic.statistic.words();
    sheet.write(words, (MARGIN_PX, y), NOTE, HPos::Left, VPos::Center)?;
    for line in &statistic.lines {
        if let Some(x) = columns.middle(line.period) {
            cell(sheet, line, (x, y))?;
        }
    }
    match outside_in_words(statistic) {
        Some(outside) => {
            sheet.write(&outside, (columns.right() + 10.0, y), OUTSIDE, HPos::Left, VPos::Center)
        }
        None => Ok(()),
    }
}

/// The realizations' range at one width, its median, and the record: a dot within the range, a triangle that points out of it.
fn cell(sheet: &Sheet, line: &SheetLine, (x, y): Px) -> Drawn {
    let (half, high) = HALF_RANGE_PX;
    let (Some(range), Some(record), Some(verdict)) = (line.range, line.record, line.verdict) else {
        return sheet.line(&[(x - 3.0, y), (x + 3.0, y)], Stroke::solid(ONE_OF_MANY, 1.0));
    };
    let across = |number: f64| {
        let span = range.q95 - range.q05;
        let share = if span > 0.0 { (number - range.q05) / span } else { 0.5 };
        x + half * (2.0 * share.clamp(0.0, 1.0) - 1.0)
    };
    sheet.block((x - half, y - high), (x + half, y + high), BAND)?;
    for end in [x - half, x + half] {
        sheet.line(&[(end, y - high), (end, y + high)], Stroke::solid(EDGE, 1.0))?;
    }
    let median = across(range.q50);
    sheet.line(&[(median, y - high), (median, y + high)], Stroke::solid(ONE_OF_MANY, 1.0))?;
    let way = match verdict {
        Verdict::Within => return sheet.dot((across(record), y), DOT_PX, INK),
        Verdict::Below => -1.0,
        Verdict::Above => 1.0,
    };
    let [apart, length] = BEYOND_PX;
    let foot = x + way * (half + apart);
    sheet.shape(&[(foot + way * length, y), (foot, y - high), (foot, y + high)], DRY)
}
