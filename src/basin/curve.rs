//! A hypsometric curve, the area below each elevation, cut into bands of a stated thickness.

use super::bands::{Band, MOST_BANDS};
use super::columns::{Column, advice, both};
use super::ground::Ground;
use crate::fault::Fault;
use crate::table::{Format, Row, Table, Tally, joined};
use crate::units::{AreaUnit, LengthUnit};

/// A curve of more points is a table of something else.
const MOST_POINTS: usize = 20_000;

/// How a curve is to be read and cut.
#[derive(Debug, Clone, PartialEq)]
pub struct CurveColumns {
    /// Elevations.
    pub elevation: Column<LengthUnit>,
    /// Area of the basin that lies below each elevation.
    pub area_below: Column<AreaUnit>,
    /// Height of the bands to cut, m.
    pub band_thickness_m: f64,
    /// How the table is written.
    pub format: Format,
}

/// A point of the curve.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Point {
    elevation_m: f64,
    below_km2: f64,
}

/// Reads a curve and cuts it into bands. Their edges are the whole multiples of the thickness, and the curve's own ends at
/// the bottom and the top. Between its points the curve is a straight line; a band is run at the mean elevation of the
/// area that the curve has within it. Bands without area are left out.
///
/// # Errors
/// Every fault of the file: missing columns, cells that are no number, fewer than two points, an elevation given twice, an
/// area that shrinks upward or is not 0 at the lowest point, more bands than can be meant.
pub fn read_curve(file: &str, text: &str, columns: &CurveColumns) -> Result<Vec<Band>, Vec<Fault>> {
    let table = Table::open(file, text, &columns.format).map_err(|fault| vec![fault])?;
    let (lengths, areas) = (&LengthUnit::NAMES, &AreaUnit::NAMES);
    let namings = [columns.elevation.naming(&table, lengths), columns.area_below.naming(&table, areas)];
    let advice = advice("area_elevation_curve", namings);
    let elevation = columns.elevation.find(&table, lengths, &advice);
    let area = columns.area_below.find(&table, areas, &advice);
    let (elevation, area) = match (elevation, area) {
        (Ok(elevation), Ok(area)) => (elevation, area),
        (elevation, area) => {
            return Err(joined([elevation.err(), area.err()].into_iter().flatten().collect()));
        }
    };
    let mut tally = Tally::default();
    let mut points: Vec<(Row<'_>, Point)> = Vec::new();
    for (number, row) in table.rows().enumerate() {
        if number == MOST_POINTS {
            tally.push(table.file_fault(
                format!("more than {MOST_POINTS} points"),
                "a curve of some 10 to 1000 points",
                "leave points out: between them the curve is a straight line",
            ));
            break;
        }
        let Some(row) = tally.keep(row) else { continue };
        let read = both(table.required_number(&row, elevation.0), table.required_number(&row, area.0));
        match read {
            Ok([height, below]) => {
                let point = Point {
                    elevation_m: elevation.1.to_metres(height),
                    below_km2: area.1.to_square_kilometres(below),
                };
                points.push((row, point));
            }
            Err(faults) => faults.into_iter().for_each(|fault| tally.push(fault)),
        }
    }
    points.sort_by(|(_, a), (_, b)| a.elevation_m.total_cmp(&b.elevation_m));
    if tally.is_empty() {
        check(&table, &points, [elevation.0, area.0], &mut tally);
    }
    let points: Vec<Point> = points.into_iter().map(|(_, point)| point).collect();
    if let [first, .., last] = points.as_slice() {
        let count = (last.elevation_m - first.elevation_m) / columns.band_thickness_m;
        if count > MOST_BANDS as f64 {
            tally.push(table.file_fault(
                format!("{count:.0} bands of {} m", columns.band_thickness_m),
                "bands some 50 to 300 m high",
                "state a larger band_thickness_m, and check the unit of the elevations",
            ));
        }
    }
    if tally.is_empty() { Ok(cut(&points, columns.band_thickness_m)) } else { Err(tally.into_faults()) }
}

fn check(table: &Table<'_>, points: &[(Row<'_>, Point)], [elevation, area]: [usize; 2], tally: &mut Tally) {
    if points.len() < 2 {
        tally.push(table.file_fault(
            if points.len() == 1 { "1 point" } else { "no points" },
            "a curve of at least two points",
            "give the lowest elevation with area 0, the highest with the basin's whole area, and some between",
        ));
    }
    if let Some((row, point)) = points.first()
        && point.below_km2 != 0.0
    {
        let mend = "give the basin's lowest elevation a line of its own, with area 0";
        tally.push(table.cell_fault(row, area, "0 below the lowest elevation", mend));
    }
    for pair in points.windows(2) {
        let ((below_row, below), (row, above)) = (&pair[0], &pair[1]);
        if below.elevation_m == above.elevation_m {
            let expected = format!("an elevation that line {} does not have already", below_row.line);
            tally.push(table.cell_fault(row, elevation, &expected, "keep one line an elevation"));
        } else if below.below_km2 > above.below_km2 {
            let expected = format!("an area not smaller than on line {}, which lies lower", below_row.line);
            tally.push(table.cell_fault(
                row,
                area,
                &expected,
                "the column holds the area BELOW each elevation",
            ));
        }
    }
    if let (Some((_, first)), Some((row, last))) = (points.first(), points.last())
        && points.len() > 1
        && last.below_km2 <= first.below_km2
    {
        tally.push(table.cell_fault(
            row,
            area,
            "the basin's whole area at its highest elevation",
            "check the areas",
        ));
    }
}

/// Cuts a sound curve.
fn cut(points: &[Point], thickness_m: f64) -> Vec<Band> {
    let [first, .., last] = points else { return Vec::new() };
    let mut bands = Vec::new();
    let mut lower_m = first.elevation_m;
    while lower_m < last.elevation_m {
        let mut next = (lower_m / thickness_m).floor() + 1.0;
        if next * thickness_m <= lower_m {
            next += 1.0;
        }
        let upper_m = (next * thickness_m).min(last.elevation_m);
        bands.extend(band_between(points, lower_m, upper_m));
        lower_m = upper_m;
    }
    bands
}

/// The band between two elevations: its area, and the mean elevation of that area, piece by straight piece of the curve.
fn band_between(points: &[Point], lower_m: f64, upper_m: f64) -> Option<Band> {
    let (mut area_km2, mut moment) = (0.0, 0.0);
    for pair in points.windows(2) {
        let (a, b) = (pair[0], pair[1]);
        let (from, to) = (a.elevation_m.max(lower_m), b.elevation_m.min(upper_m));
        if to > from {
            let piece_km2 = (b.below_km2 - a.below_km2) * ((to - from) / (b.elevation_m - a.elevation_m));
            area_km2 += piece_km2;
            moment += piece_km2 * ((from + to) / 2.0);
        }
    }
    (area_km2 > 0.0).then(|| Band {
        lower_m,
        upper_m,
        area_km2,
        elevation_m: (moment / area_km2).clamp(lower_m, upper_m),
        ground: Ground::default(),
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn columns(band_thickness_m: f64) -> CurveColumns {
        CurveColumns {
            elevation: Column::WithUnit("elevation"),
            area_below: Column::WithUnit("area_below"),
            band_thickness_m,
            format: Format::default(),
        }
    }

    /// Worked by hand: 10 km2 from 1000 to 1200 m and 30 km2 from there to 1500 m.
    #[test]
    fn a_curve_is_cut_at_whole_multiples_and_keeps_its_area_and_its_means() {
        let text = "elevation_m,area_below_km2\n1500,40\n1000,0\n1200,10\n";
        let bands = read_curve("curve.csv", text, &columns(150.0)).unwrap();
        let plain: Vec<[f64; 4]> =
            bands.iter().map(|band| [band.lower_m, band.upper_m, band.area_km2, band.elevation_m]).collect();
        let by_hand = [
            [1000.0, 1050.0, 2.5, 1025.0],
            [1050.0, 1200.0, 7.5, 1125.0],
            [1200.0, 1350.0, 15.0, 1275.0],
            [1350.0, 1500.0, 15.0, 1425.0],
        ];
        assert_eq!(plain, by_hand, "exact: every number is a short binary fraction");
        let whole = read_curve("curve.csv", text, &columns(1500.0)).unwrap();
        // 10 km2 about 1100 m and 30 km2 about 1350 m.
        assert_eq!((whole.len(), whole[0].area_km2, whole[0].elevation_m), (1, 40.0, 1287.5));
    }

    #[test]
    fn feet_and_square_miles_are_told_by_the_header() {
        let text = "elevation_ft,area_below_mi2\n5000,0\n6000,10\n";
        let bands = read_curve("curve.csv", text, &columns(2000.0)).unwrap();
        // 5000 ft is 1524 m; 10 square miles are 25.8998811 km2 (UN-09), to 7 decimals.
        assert!((bands[0].lower_m - 1524.0).abs() < 1e-9 && (bands[0].area_km2 - 25.899_881_1).abs() < 1e-6);
    }
}
