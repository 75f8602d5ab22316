//! `tables.xlsx`: the tables once more, a sheet each, for those who open a spreadsheet.

use super::columns::{Cells, Holds, number, unit};
use super::tables::{ReportFile, about};
use rust_xlsxwriter::{DocProperties, ExcelDateTime, Format, Note, Workbook, Worksheet, XlsxError};

/// A sheet's name is no longer.
const LONGEST_NAME: usize = 31;
/// Width of a column, in characters, at least and at most.
const WIDTHS: [usize; 2] = [8, 32];
const FIRST_SHEET: &str = "About";

/// The workbook of these tables: a first sheet that says what each holds, then a sheet a table, numbers as numbers, the header
/// frozen. Always the same bytes for the same tables: its date of creation is a fixed one.
///
/// # Errors
/// A table that a sheet cannot hold: more than a million rows.
pub fn workbook_xlsx(title: &str, tables: &[ReportFile]) -> Result<Vec<u8>, XlsxError> {
    let mut workbook = Workbook::new();
    let made = ExcelDateTime::from_ymd(2000, 1, 1)?;
    workbook.set_properties(&DocProperties::new().set_title(title).set_creation_datetime(&made));
    let bold = Format::new().set_bold();
    let named: Vec<(&str, Cells)> = tables
        .iter()
        .filter_map(|(path, table)| {
            let name = path.strip_prefix("tables/")?.strip_suffix(".csv")?;
            Some((name, Cells::of(table)?))
        })
        .collect();
    let first = workbook.add_worksheet();
    first.set_name(FIRST_SHEET)?.set_column_width(0, 32)?.set_column_width(1, 110)?;
    first.write_with_format(0, 0, title, &bold)?;
    let says = [
        "A planning aid: what if, not forecast. Not for flood forecasting, flood design, or the operation or safety of dams.",
        "One sheet a table, as in the folder tables. Units stand in the columns' names; an empty cell is a number that there is not.",
        "Errors are one Monte Carlo standard deviation, q05 and q95 the ends of a 5 to 95 % range; summary.json says under methods of what.",
    ];
    let mut row = 1;
    for said in says {
        first.write(row, 0, said)?;
        row += 1;
    }
    row += 1;
    for (at, heading) in ["Sheet", "What it holds", "Rows"].into_iter().enumerate() {
        first.write_with_format(row, at as u16, heading, &bold)?;
    }
    for (name, cells) in &named {
        row += 1;
        first.write(row, 0, sheet_name(name))?;
        first.write(row, 1, about(name))?;
        first.write(row, 2, cells.rows.len() as f64)?;
    }
    for (name, cells) in &named {
        fill(workbook.add_worksheet().set_name(sheet_name(name))?, cells, &bold)?;
    }
    workbook.save_to_buffer()
}

fn sheet_name(name: &str) -> &str {
    name.get(..LONGEST_NAME).unwrap_or(name)
}

fn fill(sheet: &mut Worksheet, cells: &Cells, bold: &Format) -> Result<(), XlsxError> {
    sheet.set_freeze_panes(1, 0)?;
    for (at, heading) in cells.header.iter().enumerate() {
        let column = at as u16;
        let [least, most] = WIDTHS;
        sheet.set_column_width(column, heading.chars().count().clamp(least, most) as f64)?;
        sheet.write_with_format(0, column, heading, bold)?;
        if let Some(unit) = unit(heading) {
            sheet.insert_note(0, column, &Note::new(unit).add_author_prefix(false).set_author("thawline"))?;
        }
        let holds_numbers = cells.holds(at) == Holds::Numbers;
        for (row, cell) in cells.rows.iter().enumerate() {
            let (row, cell) = (row as u32 + 1, cell.get(at).unwrap_or_default());
            match number(cell).filter(|_| holds_numbers) {
                Some(number) => sheet.write_number(row, column, number)?,
                None if cell.is_empty() => continue,
                // As a string, whatever it begins with: a name is no formula.
                None => sheet.write_string(row, column, cell)?,
            };
        }
    }
    Ok(())
}
