//! The columns of a table of bands that say what lies under the snow; each may be left out.

use super::columns::Column;
use super::ground::Ground;
use crate::fault::Fault;
use crate::table::{Row, Table, Tally};
use crate::units::ShareUnit;
use std::ops::RangeInclusive;

/// The unit of slopes and aspects.
pub const ANGLE_NAMES: [(&str, ()); 1] = [("deg", ())];
/// A coefficient of variation has no unit; this ends its column's usual name.
pub const VARIATION_NAMES: [(&str, ()); 1] = [("cv", ())];

const SLOPES_DEG: RangeInclusive<f64> = 0.0..=90.0;
const ASPECTS_DEG: RangeInclusive<f64> = 0.0..=360.0;
const VARIATIONS: RangeInclusive<f64> = 0.0..=3.0;

/// Where a band's ground stands.
#[derive(Debug, Clone, PartialEq)]
pub struct GroundColumns {
    /// Slopes.
    pub slope: Column<()>,
    /// Aspects.
    pub aspect: Column<()>,
    /// Shares under trees.
    pub canopy: Column<ShareUnit>,
    /// Coefficients of variation of the snow within a band.
    pub accumulation: Column<()>,
}

impl Default for GroundColumns {
    /// `slope_deg`, `aspect_deg`, `canopy_fraction` or `canopy_pct`, and `accumulation_cv`, where they stand there.
    fn default() -> Self {
        Self {
            slope: Column::WithUnit("slope"),
            aspect: Column::WithUnit("aspect"),
            canopy: Column::WithUnit("canopy"),
            accumulation: Column::WithUnit("accumulation"),
        }
    }
}

/// The columns that are there.
pub(super) struct GroundPlaces {
    slope: Option<usize>,
    aspect: Option<usize>,
    canopy: Option<(usize, ShareUnit)>,
    accumulation: Option<usize>,
}

impl GroundColumns {
    /// Looks for the columns.
    ///
    /// # Errors
    /// A column that was stated and is not there, one that is there twice, aspects without slopes.
    pub(super) fn find(&self, table: &Table<'_>) -> Result<GroundPlaces, Vec<Fault>> {
        let has_aspect = self.aspect.is_there(table, &ANGLE_NAMES);
        let slope = if has_aspect {
            self.slope.find(table, &ANGLE_NAMES, "an aspect says nothing without a slope: add it").map(Some)
        } else {
            self.slope.find_if_there(table, &ANGLE_NAMES)
        };
        let aspect = self.aspect.find_if_there(table, &ANGLE_NAMES);
        let canopy = self.canopy.find_if_there(table, &ShareUnit::NAMES);
        let accumulation = self.accumulation.find_if_there(table, &VARIATION_NAMES);
        match (slope, aspect, canopy, accumulation) {
            (Ok(slope), Ok(aspect), Ok(canopy), Ok(accumulation)) => {
                let [slope, aspect, accumulation] =
                    [slope, aspect, accumulation].map(|found| found.map(|(at, ())| at));
                Ok(GroundPlaces { slope, aspect, canopy, accumulation })
            }
            (slope, aspect, canopy, accumulation) => {
                let faults = [slope.err(), aspect.err(), canopy.err(), accumulation.err()];
                Err(faults.into_iter().flatten().collect())
            }
        }
    }
}

impl GroundPlaces {
    /// Whether the table says anything about the ground.
    pub fn are_some(&self) -> bool {
        self.slope.is_some() || self.canopy.is_some() || self.accumulation.is_some()
    }

    /// A row's ground; what cannot be is a fault in the tally.
    pub fn read(&self, table: &Table<'_>, row: &Row<'_>, tally: &mut Tally) -> Ground {
        let slope_deg = self.slope.and_then(|at| {
            let mend = "a slope is degrees from the horizontal, 45 degrees are 100 percent; flat ground is slope 0 with an \
                        empty aspect";
            let slope_deg = tally.keep(table.number_or_mend(row, at, mend))?;
            within(table, row, at, slope_deg, SLOPES_DEG, mend, tally)
        });
        let slope_deg = slope_deg.unwrap_or(0.0);
        let aspect_deg = self.aspect_deg(table, row, slope_deg, tally);
        let open = "the share of the band's area that lies under trees; open ground has 0";
        let canopy = self
            .canopy
            .and_then(|(at, unit)| Some((at, tally.keep(table.number_or_mend(row, at, open))?, unit)));
        let canopy_fraction = canopy.and_then(|(at, value, unit)| {
            let mend = match unit {
                ShareUnit::Fraction if (1.0..=100.0).contains(&value) => {
                    "write a fraction, 0.45 for 45 percent, or call the column canopy_pct"
                }
                _ => open,
            };
            within(table, row, at, value, 0.0..=unit.of_all(), mend, tally)
                .map(|value| unit.to_fraction(value))
        });
        let accumulation_variation = self.accumulation.and_then(|at| {
            let mend = "standard deviation over mean of the snow within the band: 0.5 for 50 percent";
            let variation = tally.keep(filled(table, row, at, mend)).flatten()?;
            within(table, row, at, variation, VARIATIONS, mend, tally)
        });
        Ground {
            slope_deg,
            aspect_deg,
            canopy_fraction: canopy_fraction.unwrap_or(0.0),
            accumulation_variation,
        }
    }

    /// The way that a slope faces; level ground faces nowhere, and its cell may be empty.
    fn aspect_deg(&self, table: &Table<'_>, row: &Row<'_>, slope_deg: f64, tally: &mut Tally) -> f64 {
        let mend = "degrees clockwise from north, the way that water runs down: 90 faces east, 180 south; flat ground is slope \
                    0 with an empty aspect";
        let typed = self.aspect.and_then(|at| Some((at, tally.keep(filled(table, row, at, mend))?)));
        match typed {
            Some((at, Some(aspect_deg))) => {
                let sound = within(table, row, at, aspect_deg, ASPECTS_DEG, mend, tally);
                sound.filter(|aspect_deg| slope_deg > 0.0 && *aspect_deg < 360.0).unwrap_or(0.0)
            }
            Some((at, None)) if slope_deg > 0.0 => {
                tally.push(table.cell_fault(row, at, "the way that the slope faces", mend));
                0.0
            }
            None if slope_deg > 0.0 && self.aspect.is_none() => {
                let at = self.slope.unwrap_or(0);
                let mend = "add a column aspect_deg, degrees clockwise from north";
                tally.push(table.cell_fault(row, at, "a slope whose aspect is known", mend));
                0.0
            }
            _ => 0.0,
        }
    }
}

/// The number in a cell that may be empty.
fn filled(table: &Table<'_>, row: &Row<'_>, at: usize, mend: &str) -> Result<Option<f64>, Fault> {
    if row.cell(at).is_empty() { Ok(None) } else { table.number_or_mend(row, at, mend).map(Some) }
}

/// A cell's number, if it lies within a range; else a fault in the tally.
fn within(
    table: &Table<'_>,
    row: &Row<'_>,
    at: usize,
    value: f64,
    range: RangeInclusive<f64>,
    mend: &str,
    tally: &mut Tally,
) -> Option<f64> {
    if range.contains(&value) {
        return Some(value + 0.0);
    }
    let expected = format!("a number from {} to {}", range.start(), range.end());
    tally.push(table.cell_fault(row, at, &expected, mend));
    None
}
