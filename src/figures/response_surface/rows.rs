//! What stands below the surface: the named changes with their marks, the criteria with their lines.

use super::super::labels::{level, signed_percent};
use super::super::marks::{Form, Marking, marker};
use super::super::sheet::{Drawn, HPos, Px, Sheet, Stroke, VPos};
use super::super::theme::{DRY, INK, LABEL, Lettering, MARGIN_PX, PAPER, QUIET, WIDTH_PX};
use super::super::{Setting, labels::counted};
use super::is_case;
use crate::findings::{NamedNode, ResponseSurface};

const ROW_PX: f64 = 20.0;
const MARK_PX: f64 = 34.0;
/// More cases than this are not named below the drawing.
const MOST_CASES: usize = 12;
/// Letters of a name.
const LONGEST_NAME: usize = 40;
const NUMBER_RADIUS_PX: f64 = 9.0;
/// A case's number on its mark.
const NUMBER: Lettering = Lettering { class: "number", size_px: 12.0, is_bold: true, ink: PAPER };

/// Rows of text, each with its mark.
pub(super) struct Rows {
    rows: Vec<(Mark, String)>,
}

enum Mark {
    Named(NamedMark),
    Line(Stroke),
}

/// How the line of each criterion is drawn.
pub(super) fn failure_strokes() -> impl Iterator<Item = Stroke> {
    [[7, 4], [2, 3], [10, 3], [4, 6]].into_iter().cycle().map(|dash_px| Stroke {
        ink: DRY,
        width_px: 2.0,
        dash_px: Some(dash_px),
    })
}

/// How a named change is marked: cases all in one ink, told apart by their numbers, since a level's colour would say which
/// warming it is; projections all alike.
#[derive(Clone, Copy)]
pub(super) enum NamedMark {
    /// A case by its place in the scenario's list, from 1.
    Case(usize),
    Projection,
}

impl NamedMark {
    pub fn draw(self, sheet: &Sheet, place: Px) -> Drawn {
        match self {
            Self::Case(number) => {
                sheet.dot(place, NUMBER_RADIUS_PX, INK)?;
                sheet.write(&number.to_string(), place, NUMBER, HPos::Center, VPos::Center)
            }
            Self::Projection => {
                marker(sheet, place, Marking { ink: QUIET, form: Form::Triangle, is_hollow: true })
            }
        }
    }
}

/// The mark of every named change; the scenario's cases come first.
pub(super) fn marks(surface: &ResponseSurface) -> Vec<NamedMark> {
    let of = |(place, named): (usize, &NamedNode)| {
        if is_case(named.origin) { NamedMark::Case(place + 1) } else { NamedMark::Projection }
    };
    surface.named.iter().enumerate().map(of).collect()
}

/// A name with room left for what is said of it; the tables have it in full.
fn shortened(name: &str) -> String {
    if name.chars().count() <= LONGEST_NAME {
        return name.to_owned();
    }
    name.chars().take(LONGEST_NAME - 3).chain("...".chars()).collect()
}

impl Rows {
    pub fn of(surface: &ResponseSurface, setting: &Setting<'_>) -> Self {
        let mut rows = Vec::new();
        let mut projections = 0;
        for (named, mark) in surface.named.iter().zip(marks(surface)) {
            if !is_case(named.origin) {
                projections += 1;
            } else if rows.len() < MOST_CASES {
                let change = named.node.change;
                let found = named.node.measures.first().and_then(|found| found.change_pct);
                let found = found.map_or(String::new(), |found| format!(": {}", signed_percent(found.value)));
                let text = format!(
                    "{} ({}, {} precipitation){found}",
                    shortened(&named.name),
                    level(setting.units, change.warming_c),
                    signed_percent(change.precipitation_change_pct)
                );
                rows.push((Mark::Named(mark), text));
            }
        }
        if projections > 0 {
            let said = format!("{} of the stated file", counted(projections, "projection"));
            rows.push((Mark::Named(NamedMark::Projection), said));
        }
        let alone = if surface.levels_warm_alone { "" } else { " (without the levels' stated change)" };
        let lines = surface.failure_lines.iter().zip(failure_strokes());
        rows.extend(lines.map(|(line, stroke)| {
            let says = if line.margins.iter().all(|margin| *margin >= 0.0) {
                "holds everywhere on the grid"
            } else if line.margins.iter().all(|margin| *margin < 0.0) {
                "fails everywhere on the grid"
            } else {
                "holds above the line, fails below it"
            };
            (Mark::Line(stroke), format!("{}: {says}{alone}", shortened(&line.name)))
        }));
        rows.push((
            Mark::Line(Stroke::solid(INK, 2.4)),
            "Break-even: as much as at the reference".to_owned(),
        ));
        let room = WIDTH_PX - 2.0 * MARGIN_PX - MARK_PX;
        for (_, text) in &mut rows {
            while LABEL.width(text) > room && text.chars().count() > 1 {
                text.pop();
            }
        }
        Self { rows }
    }

    pub fn height(&self) -> f64 {
        self.rows.len() as f64 * ROW_PX + 12.0
    }

    pub fn write(&self, sheet: &Sheet, top: f64) -> Drawn {
        sheet.group("rows", || {
            for (at, (mark, text)) in self.rows.iter().enumerate() {
                let y = top + ROW_PX * (at as f64 + 0.5);
                match mark {
                    Mark::Named(mark) => mark.draw(sheet, (MARGIN_PX + 12.0, y))?,
                    Mark::Line(stroke) => sheet.line(&[(MARGIN_PX, y), (MARGIN_PX + 24.0, y)], *stroke)?,
                }
                sheet.write(text, (MARGIN_PX + MARK_PX, y), LABEL, HPos::Left, VPos::Center)?;
            }
            Ok(())
        })
    }
}
