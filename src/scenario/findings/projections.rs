//! `[findings.projections]`: a file of projections that are laid over the response surface, a line each.

use super::super::degrees::FAHRENHEIT_PER_CELSIUS;
use super::super::section::Section;
use super::cases::{LONGEST_NAME, PRECIPITATION_PCT, WARMING_C};
use crate::fault::Fault;
use crate::findings::{Change, ChangeOrigin, NamedChange};
use crate::table::{Format, Table, Tally};

/// The key that names the file.
pub const PROJECTIONS_KEY: &str = "findings.projections.file";
/// A file of more lines is a file of something else.
const MOST: usize = 200;
const NAME: &str = "name";
const CELSIUS: &str = "warming_c";
const FAHRENHEIT: &str = "warming_f";
const PRECIPITATION: &str = "precipitation_change_pct";

/// The file, where one is named.
pub(super) fn read(findings: &mut Section<'_>) -> Option<String> {
    if !findings.has("projections") {
        findings.knows("projections");
        return None;
    }
    let mut section = findings.section("projections");
    let file = section.required_text(
        "file",
        "the path of a CSV file of projections",
        "add file = \"projections.csv\"",
    );
    section.names_file(PROJECTIONS_KEY, file.as_deref());
    section.finish();
    file
}

/// Reads the file: columns `name`, `warming_c` or `warming_f`, and `precipitation_change_pct`.
///
/// # Errors
/// Every fault of the file.
pub fn read_projections(file: &str, text: &str) -> Result<Vec<NamedChange>, Vec<Fault>> {
    let format = Format::default();
    let table = Table::open(file, text, &format).map_err(|fault| vec![fault])?;
    let in_fahrenheit = table.has(FAHRENHEIT) && !table.has(CELSIUS);
    let warming = if in_fahrenheit { FAHRENHEIT } else { CELSIUS };
    let mut tally = Tally::default();
    let columns = [NAME, warming, PRECIPITATION].map(|name| tally.keep(table.column(name)));
    let [Some(name_at), Some(warming_at), Some(precipitation_at)] = columns else {
        return Err(tally.into_faults());
    };
    let per_celsius = if in_fahrenheit { FAHRENHEIT_PER_CELSIUS } else { 1.0 };
    let mut projections: Vec<NamedChange> = Vec::new();
    for row in table.rows().take(MOST + 1) {
        let Some(row) = tally.keep(row) else { continue };
        let name = row.cell(name_at).trim().to_owned();
        if name.is_empty()
            || name.chars().count() > LONGEST_NAME
            || projections.iter().any(|of| of.name == name)
        {
            let expected = format!("a name of at most {LONGEST_NAME} characters that no other line has");
            tally.push(table.cell_fault(&row, name_at, &expected, "write another"));
        }
        let [warming, pct] =
            [warming_at, precipitation_at].map(|at| tally.keep(table.required_number(&row, at)));
        let (Some(warming), Some(pct)) = (warming, pct) else { continue };
        let warming_c = warming / per_celsius;
        for (at, value, range, per_unit) in
            [(warming_at, warming_c, WARMING_C, per_celsius), (precipitation_at, pct, PRECIPITATION_PCT, 1.0)]
        {
            if !range.contains(&value) {
                let [least, most] = [range.start(), range.end()].map(|end| end * per_unit);
                let expected = format!("a number from {least} to {most}");
                tally.push(table.cell_fault(&row, at, &expected, "check it, or take the line out"));
            }
        }
        let change = Change { warming_c, precipitation_change_pct: pct };
        projections.push(NamedChange { name, origin: ChangeOrigin::Projection, change });
    }
    if tally.is_empty() && !(1..=MOST).contains(&projections.len()) {
        let found =
            if projections.is_empty() { "no line".to_owned() } else { format!("more than {MOST} lines") };
        let expected = format!("1 to {MOST} projections, a line each");
        tally.push(table.file_fault(found, &expected, "take another file"));
    }
    if tally.is_empty() { Ok(projections) } else { Err(tally.into_faults()) }
}
