//! Elevation bands: the area-elevation table, read, checked and sorted.

use crate::fault::Fault;
use crate::table::{Format, Table, Tally};
use serde::Serialize;

/// A table of more bands is a table of something else.
const MOST_BANDS: usize = 1000;

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
}

/// Reads an area-elevation table with the columns `lower_m`, `upper_m`, `area_km2` and, where wanted, `mean_m`.
///
/// Rows may come in any order; the bands are returned from the lowest up.
///
/// # Errors
/// Every fault of the file: missing columns, cells that are no number, an upper edge not above the lower, an area
/// that is not positive, a mean outside its band, bands that overlap, no bands at all.
pub fn read_bands(file: &str, text: &str) -> Result<Vec<Band>, Vec<Fault>> {
    let format = Format::default();
    let table = Table::open(file, text, &format).map_err(|fault| vec![fault])?;
    let columns = ["lower_m", "upper_m", "area_km2"].map(|name| table.column(name));
    let mean = if table.has("mean_m") { table.column("mean_m").map(Some) } else { Ok(None) };
    let ([Ok(lower), Ok(upper), Ok(area)], Ok(mean)) = (&columns, &mean) else {
        return Err(columns.into_iter().filter_map(Result::err).chain(mean.err()).collect());
    };

    let mut tally = Tally::default();
    let mut bands = Vec::new();
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
        let mut number = |column: usize| {
            let value = row.cell(column).parse::<f64>().ok().filter(|value| value.is_finite());
            if value.is_none() {
                tally.push(table.cell_fault(&row, column, "a number", "write it with a decimal point"));
            }
            value
        };
        let (Some(lower_m), Some(upper_m), Some(area_km2)) = (number(*lower), number(*upper), number(*area))
        else {
            continue;
        };
        let stated_m = match mean {
            Some(column) => match number(*column) {
                Some(value) => Some((*column, value)),
                None => continue,
            },
            None => None,
        };
        if lower_m >= upper_m {
            tally.push(table.cell_fault(
                &row,
                *upper,
                "an upper edge above the lower",
                "check the two edges",
            ));
        }
        if area_km2 <= 0.0 {
            tally.push(table.cell_fault(&row, *area, "an area above 0 km2", "leave out bands without area"));
        }
        if let Some((column, mean_m)) = stated_m
            && !(lower_m..=upper_m).contains(&mean_m)
        {
            tally.push(table.cell_fault(
                &row,
                column,
                "a mean within the band",
                "check it against the edges",
            ));
        }
        let elevation_m = stated_m.map_or((lower_m + upper_m) / 2.0, |(_, mean_m)| mean_m);
        bands.push((row.line, Band { lower_m, upper_m, area_km2, elevation_m }));
    }
    bands.sort_by(|(_, a), (_, b)| a.lower_m.total_cmp(&b.lower_m));
    for pair in bands.windows(2) {
        let ((line, below), (above_line, above)) = (&pair[0], &pair[1]);
        if below.upper_m > above.lower_m {
            tally.push(table.file_fault(
                format!("the bands of lines {line} and {above_line} overlap"),
                "bands that meet or leave a hole",
                "let each band start where the one below ends",
            ));
        }
    }
    if bands.is_empty() && tally.is_empty() {
        tally.push(table.file_fault("no bands", "at least one row", "add a row for each band"));
    }
    if tally.is_empty() {
        Ok(bands.into_iter().map(|(_, band)| band).collect())
    } else {
        Err(tally.into_faults())
    }
}
