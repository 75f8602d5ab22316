//! Elevation bands: the area-elevation table, read, checked and sorted.

use super::columns::{Column, advice, both};
use super::ground::Ground;
use super::ground_columns::GroundColumns;
use crate::fault::Fault;
use crate::table::{Format, Row, Table, Tally, joined};
use crate::units::{AreaUnit, LengthUnit};
use serde::Serialize;

/// A table of more bands is a table of something else.
pub(super) const MOST_BANDS: usize = 1000;

/// One elevation band.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Band {
    /// Lower edge, m.
    pub lower_m: f64,
    /// Upper edge, m.
    pub upper_m: f64,
    /// Area, km2.
    pub area_km2: f64,
    /// Elevation at which the band is run: the stated mean, else the middle, m.
    pub elevation_m: f64,
    /// Slope, trees, and how unevenly its snow lies; not written where nothing is said of them.
    #[serde(skip_serializing_if = "Ground::is_plain")]
    pub ground: Ground,
}

impl Band {
    /// Whether both lie between the same elevations: parts of one range, with ground of their own.
    pub fn has_edges_of(&self, other: &Self) -> bool {
        self.lower_m == other.lower_m && self.upper_m == other.upper_m
    }
}

/// How a table of bands is to be read.
#[derive(Debug, Clone, PartialEq)]
pub struct BandColumns {
    /// Lower edges.
    pub lower: Column<LengthUnit>,
    /// Upper edges.
    pub upper: Column<LengthUnit>,
    /// Areas.
    pub area: Column<AreaUnit>,
    /// Mean elevations, which may be left out.
    pub mean: Column<LengthUnit>,
    /// What lies under the snow, which may be left out.
    pub ground: GroundColumns,
    /// How the table is written.
    pub format: Format,
}

impl Default for BandColumns {
    /// `lower_m`, `upper_m`, `area_km2` and, where it stands there, `mean_m`; or the same in other units.
    fn default() -> Self {
        Self {
            lower: Column::WithUnit("lower"),
            upper: Column::WithUnit("upper"),
            area: Column::WithUnit("area"),
            mean: Column::WithUnit("mean"),
            ground: GroundColumns::default(),
            format: Format::default(),
        }
    }
}

/// Reads an area-elevation table.
///
/// Rows may come in any order; the bands are returned from the lowest up, those with the same edges in the file's order.
///
/// # Errors
/// Every fault of the file: missing columns, cells that are no number, an upper edge not above the lower, an area
/// that is not positive, a mean outside its band, ground that cannot be, bands that overlap or have the same edges and the
/// same ground, no bands at all.
pub fn read_bands(file: &str, text: &str, columns: &BandColumns) -> Result<Vec<Band>, Vec<Fault>> {
    let table = Table::open(file, text, &columns.format).map_err(|fault| vec![fault])?;
    let lengths = &LengthUnit::NAMES;
    let BandColumns { lower, upper, area, mean, .. } = columns;
    let namings =
        [lower.naming(&table, lengths), upper.naming(&table, lengths), area.naming(&table, &AreaUnit::NAMES)];
    let advice = advice("bands", namings);
    let edges = both(lower.find(&table, lengths, &advice), upper.find(&table, lengths, &advice));
    let area = area.find(&table, &AreaUnit::NAMES, &advice).map_err(|fault| vec![fault]);
    let mean = mean.find_if_there(&table, lengths).map_err(|fault| vec![fault]);
    let ground = columns.ground.find(&table);
    let ([lower, upper], area, mean, ground) = match (edges, area, mean, ground) {
        (Ok(edges), Ok(area), Ok(mean), Ok(ground)) => (edges, area, mean, ground),
        (edges, area, mean, ground) => {
            let faults = [edges.err(), area.err(), mean.err(), ground.err()];
            return Err(joined(faults.into_iter().flatten().flatten().collect()));
        }
    };

    let mut tally = Tally::default();
    let mut bands: Vec<(Row<'_>, Band)> = Vec::new();
    for (number, row) in table.rows().enumerate() {
        if number == MOST_BANDS {
            tally.push(table.file_fault(
                format!("more than {MOST_BANDS} bands"),
                "bands some 50 to 300 m high",
                "join bands: the result changes little once they are 100 m high",
            ));
            break;
        }
        let Some(row) = tally.keep(row) else { continue };
        let lower_m = tally.keep(table.required_number(&row, lower.0)).map(|value| lower.1.to_metres(value));
        let upper_m = tally.keep(table.required_number(&row, upper.0)).map(|value| upper.1.to_metres(value));
        let area_km2 =
            tally.keep(table.required_number(&row, area.0)).map(|value| area.1.to_square_kilometres(value));
        let mean_m = mean
            .map(|(at, unit)| tally.keep(table.required_number(&row, at)).map(|value| unit.to_metres(value)));
        let ground = ground.read(&table, &row, &mut tally);
        let (Some(lower_m), Some(upper_m), Some(area_km2)) = (lower_m, upper_m, area_km2) else { continue };
        let middle_m = (lower_m + upper_m) / 2.0;
        let band =
            Band { lower_m, upper_m, area_km2, elevation_m: mean_m.flatten().unwrap_or(middle_m), ground };
        let mut complain =
            |at: usize, expected: &str, mend: &str| tally.push(table.cell_fault(&row, at, expected, mend));
        if lower_m >= upper_m {
            complain(upper.0, "an upper edge above the lower", "check the two edges");
        }
        if area_km2 <= 0.0 {
            complain(area.0, "an area above 0", "leave out bands without area");
        }
        if let Some((at, _)) = mean
            && !(lower_m.min(upper_m)..=upper_m.max(lower_m)).contains(&band.elevation_m)
        {
            complain(at, "a mean within the band", "check it against the edges");
        }
        bands.push((row, band));
    }
    bands.sort_by(|(_, a), (_, b)| a.lower_m.total_cmp(&b.lower_m));
    complain_of_overlaps(&table, &bands, lower.0, ground.are_some(), &mut tally);
    if bands.is_empty() && tally.is_empty() {
        tally.push(table.file_fault("no bands", "at least one row", "add a row for each band"));
    }
    if tally.is_empty() {
        Ok(bands.into_iter().map(|(_, band)| band).collect())
    } else {
        Err(tally.into_faults())
    }
}

/// Of two bands that overlap, the one that begins higher or stands lower in the file is at fault; `bands` stand from the lowest.
/// Those with the same edges may share them where their ground differs.
fn complain_of_overlaps(
    table: &Table<'_>,
    bands: &[(Row<'_>, Band)],
    lower: usize,
    has_ground: bool,
    tally: &mut Tally,
) {
    for (at, (row, band)) in bands.iter().enumerate().skip(1) {
        let range = bands[..at].iter().rev().take_while(|(_, other)| other.has_edges_of(band));
        let same = range.into_iter().find(|(_, other)| other.ground == band.ground);
        let (below_row, below) = &bands[at - 1];
        if let Some((first, _)) = same.filter(|_| has_ground) {
            let expected =
                format!("ground that tells it from the band on line {}, with the same edges", first.line);
            let mend = "let them differ in slope, aspect, canopy or accumulation_cv, or join them";
            tally.push(table.cell_fault(row, lower, &expected, mend));
        } else if same.is_some() || below.upper_m > band.lower_m && !below.has_edges_of(band) {
            let expected =
                format!("a lower edge not below the upper edge of the band on line {}", below_row.line);
            let mend = match same {
                None => "let each band start where the one below ends",
                Some(_) => {
                    "let each band start where the one below ends; edges may repeat where slope, aspect, canopy or variation \
                     (slope_deg, aspect_deg, canopy_fraction, accumulation_cv) differ"
                }
            };
            tally.push(table.cell_fault(row, lower, &expected, mend));
        }
    }
}
