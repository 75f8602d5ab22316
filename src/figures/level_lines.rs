//! Levels as lines of marks, each with its name at its end, or all of them in a row above.

use super::apart::moved_apart;
use super::marks::{Form, Marking, marker};
use super::sheet::{Drawn, HPos, Px, Sheet, Stroke, VPos};
use super::shown::{Shown, name};
use super::theme::{EDGE, NAME, level_ink};
use crate::findings::Findings;
use crate::units::UnitSystem;
use plotters::style::RGBColor;

/// From a line's end to its name, px.
pub(super) const TO_NAME_PX: f64 = 16.0;
/// Width of the mark before a name, px.
pub(super) const MARK_PX: f64 = 16.0;
/// Between two names in a row, px.
const BETWEEN_PX: f64 = 22.0;

/// A level that is drawn.
pub(super) struct Marked {
    /// Its place among the study's levels.
    pub at: usize,
    pub name: String,
    pub marking: Marking,
}

/// The levels that are shown, ascending, each with its name and mark.
pub(super) fn marked(findings: &Findings, shown: &Shown, units: UnitSystem) -> Vec<Marked> {
    let of = |at: usize| {
        let place = shown.others.iter().position(|other| *other == at);
        Marked {
            at,
            name: name(findings, at, units),
            marking: Marking {
                ink: level_ink(at, findings.reference, findings.levels_c.len()),
                form: place.map_or(Form::Round, Form::of_level),
                is_hollow: place.is_none(),
            },
        }
    };
    shown.all().into_iter().map(of).collect()
}

/// Width of the widest name with its mark, px.
pub(super) fn widest(levels: &[Marked]) -> f64 {
    MARK_PX + levels.iter().map(|level| NAME.width(&level.name)).fold(0.0, f64::max)
}

/// A level's marks, joined; dashed at the reference.
pub(super) fn line(sheet: &Sheet, places: &[Px], marking: Marking) -> Drawn {
    let dash_px = marking.is_hollow.then_some([6, 4]);
    if places.len() > 1 {
        sheet.line(places, Stroke { ink: marking.ink, width_px: 1.6, dash_px })?;
    }
    places.iter().try_for_each(|place| marker(sheet, *place, marking))
}

/// A name at the end of a line.
pub(super) struct EndName {
    pub end: Px,
    pub name: String,
    /// The mark of a level; none of other lines.
    pub marking: Option<Marking>,
}

impl EndName {
    fn ink(&self) -> RGBColor {
        self.marking.map_or(EDGE, |marking| marking.ink)
    }
}

/// Names beside the ends of their lines, moved apart and joined to them.
pub(super) fn names_at_ends(sheet: &Sheet, mut ends: Vec<EndName>, within: [f64; 2], left: f64) -> Drawn {
    ends.sort_by(|a, b| a.end.1.total_cmp(&b.end.1));
    let wanted: Vec<[f64; 2]> = ends.iter().map(|of| [of.end.1, NAME.size_px]).collect();
    for (of, y) in ends.iter().zip(moved_apart(&wanted, 4.0, within)) {
        sheet.line(&[(of.end.0 + 7.0, of.end.1), (left - 4.0, y)], Stroke::solid(of.ink(), 1.0))?;
        let words = match of.marking {
            Some(marking) => {
                marker(sheet, (left + 5.0, y), marking)?;
                left + MARK_PX
            }
            None => left,
        };
        sheet.write(&of.name, (words, y), NAME, HPos::Left, VPos::Center)?;
    }
    Ok(())
}

/// All names with their marks in a row.
pub(super) fn row(sheet: &Sheet, levels: &[Marked], (left, y): Px) -> Drawn {
    let mut x = left;
    for level in levels {
        marker(sheet, (x + 5.0, y), level.marking)?;
        sheet.write(&level.name, (x + MARK_PX, y), NAME, HPos::Left, VPos::Center)?;
        x += MARK_PX + NAME.width(&level.name) + BETWEEN_PX;
    }
    Ok(())
}
