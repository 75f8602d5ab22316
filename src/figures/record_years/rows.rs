//! Rows below the years: a row a reason for leaving years out, and a row a site with observed snow.

use super::super::sheet::{Drawn, HPos, Sheet, Stroke, VPos};
use super::super::text_width::{at_most, wrap};
use super::super::theme::{EDGE, INK, NOTE};
use crate::findings::{Findings, RecordFindings};
use crate::weather::Why;

/// Height of a row, px.
pub(super) const ROW_PX: f64 = 19.0;
/// More sites have no row.
const MOST_SITES: usize = 4;
/// A site's name is cut to this width, px.
const NAME_PX: f64 = 180.0;

/// What stands in a row.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Mark {
    /// A cross: left out.
    Cross,
    /// A small square: observed.
    Square,
}

/// Years with a mark, and what it means.
pub(super) struct Row {
    pub name: String,
    years: Vec<i32>,
    mark: Mark,
}

/// The reasons that occur, then the sites.
pub(super) fn of(findings: &Findings, record: &RecordFindings) -> Vec<Row> {
    let of_kind = |kind: &'static str| {
        let has = |why: &Why| why.kind() == kind;
        let years = record.left_out.iter().filter(|year| year.why.iter().any(has));
        let years: Vec<i32> = years.map(|year| year.water_year).collect();
        (!years.is_empty()).then(|| Row { name: format!("left out {kind}"), years, mark: Mark::Cross })
    };
    let reasons = Why::KINDS.into_iter().filter_map(of_kind);
    let sites = findings.comparisons.iter().take(MOST_SITES).map(|comparison| Row {
        name: at_most(wrap(&comparison.site, NAME_PX, NOTE.size_px, NOTE.is_bold), 1).concat(),
        years: comparison.by_year.iter().map(|year| year.water_year).collect(),
        mark: Mark::Square,
    });
    reasons.chain(sites).collect()
}

impl Row {
    /// Marks at the height `y`, the name at its right.
    pub fn draw(
        &self,
        sheet: &Sheet,
        y: f64,
        x_of: impl Fn(i32) -> f64,
        [year_px, name_at]: [f64; 2],
    ) -> Drawn {
        let half = (0.34 * year_px).clamp(1.5, 4.0);
        for x in self.years.iter().map(|year| x_of(*year)) {
            match self.mark {
                Mark::Cross => {
                    let stroke = Stroke::solid(INK, if half < 2.5 { 1.0 } else { 1.6 });
                    sheet.line(&[(x - half, y - half), (x + half, y + half)], stroke)?;
                    sheet.line(&[(x - half, y + half), (x + half, y - half)], stroke)?;
                }
                Mark::Square => sheet.block((x - half, y - half), (x + half, y + half), EDGE)?,
            }
        }
        sheet.write(&self.name, (name_at, y), NOTE, HPos::Left, VPos::Center)
    }
}
