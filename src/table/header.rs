//! What is wrong with a header, and where the names that were meant may stand.

use super::{Format, Table, place, reader};
use crate::fault::Fault;
use csv::StringRecord;

/// How the fault of a column that is not there begins.
const NO_COLUMN: &str = "no column called ";
/// What is expected where it is not there, and where several are not.
const ONE_COLUMN: &str = "a column of this name";
const SEVERAL_COLUMNS: &str = "columns of these names";
/// So many column names are listed; the rest are counted.
const MOST_NAMES: usize = 30;
/// A header that was not recognised is looked for in so many lines.
const LINES_SEARCHED: usize = 500;
/// Separators that are tried where the declared one does not part the header.
const SEPARATORS: [(u8, &str); 4] = [(b',', ","), (b';', ";"), (b'\t', "\\t"), (b'|', "|")];

impl Table<'_> {
    /// Whether values stand where the names should: a number or a date first, and so on for most of the line.
    pub(super) fn starts_with_values(&self) -> bool {
        let cells: Vec<&str> = self.header.iter().filter(|cell| !cell.is_empty()).collect();
        let is_value = |cell: &&str| {
            self.format.number(cell).is_some()
                || cell.starts_with(|first: char| first.is_ascii_digit())
                    && cell.chars().all(|sign| sign.is_ascii_digit() || "-/.:TZ ".contains(sign))
        };
        cells.len() > 1
            && cells.first().is_some_and(is_value)
            && cells.iter().filter(|cell| is_value(cell)).count() * 2 > cells.len()
    }

    pub(super) fn no_names(&self) -> Fault {
        let sign = char::from(self.format.separator);
        Fault {
            place: self.place(self.header_line, self.header_text, "", 0..self.header_text.len()),
            found: "values where the column names should stand".to_owned(),
            expected: format!("{} names", self.header.len()),
            mend: format!(
                "add a line of names above it, with '{sign}' between them, and name them where the scenario names the file; if \
                 the names stand on a line of their own, state header_line"
            ),
        }
    }

    pub(super) fn no_column(&self, name: &str) -> Fault {
        let hint = self.elsewhere(&[name]).or_else(|| self.nearly(name));
        let mend = hint.or_else(|| self.no_names_here()).unwrap_or_else(|| {
            format!("name one of the columns that stand there, letter for letter:\n{}", self.listed_names())
        });
        self.lacking(format!("{NO_COLUMN}'{name}'"), mend)
    }

    /// The fault of a column that is called by none of the names it goes by unless the scenario names it; `advice` says how.
    pub fn no_usual_column(&self, names: &[&str], advice: &str) -> Fault {
        let hint = self.elsewhere(names).or_else(|| self.no_names_here());
        let mend =
            hint.unwrap_or_else(|| format!("{advice}\nThe file's columns are:\n{}", self.listed_names()));
        self.lacking(format!("{NO_COLUMN}'{}'", names.join("' or '")), mend)
    }

    fn lacking(&self, found: String, mend: String) -> Fault {
        let place = self.place(self.header_line, self.header_text, "", 0..0);
        Fault { place, found, expected: ONE_COLUMN.to_owned(), mend }
    }

    /// Where one of the names stands instead: between other separators, or on a line below.
    fn elsewhere(&self, names: &[&str]) -> Option<String> {
        let is_named = |have: &str| names.contains(&have.trim());
        self.with_another_separator(is_named).or_else(|| self.farther_down(is_named))
    }

    /// What a line of one cell is, if it is no header as declared.
    fn no_names_here(&self) -> Option<String> {
        if self.header.len() > 1 {
            return None;
        }
        let is_of_scenario = self.header_text.contains(" = ") || self.header_text.starts_with('[');
        Some(if is_of_scenario {
            "that looks like a line of a scenario: name the data file here".to_owned()
        } else if let Some(sign) = self.parting_sign() {
            another_separator(sign)
        } else {
            "this line is taken for the header: if it is a remark, set 'comment' to the sign that remarks start with, or \
             header_line to the header's line; if it holds all the names, set 'separator'"
                .to_owned()
        })
    }

    /// The separator that parts the header and the line below it into equally many cells, if one does.
    fn parting_sign(&self) -> Option<&'static str> {
        let lines_down = self.header_line - self.lines_before;
        let below = self.text.lines().skip(lines_down).find(|line| !line.trim().is_empty());
        let count = |line: &str, byte: u8| parts(line, byte, self.format).map_or(0, |cells| cells.len());
        let fits = |(byte, _): &&(u8, &'static str)| {
            let names = count(self.header_text, *byte);
            names > 1 && below.is_none_or(|line| count(line, *byte) == names)
        };
        SEPARATORS.iter().find(fits).map(|(_, sign)| *sign)
    }

    /// The columns' names, one a line.
    fn listed_names(&self) -> String {
        let shown = self.header.iter().take(MOST_NAMES).map(|name| format!("  {}", one_line(name)));
        let more = self.header.len().saturating_sub(MOST_NAMES);
        let rest = (more > 0).then(|| format!("  and {more} more"));
        shown.chain(rest).collect::<Vec<_>>().join("\n")
    }

    /// The fault of columns that hold the same quantity in several units.
    pub fn beside_each_other(&self, names: &[&str]) -> Fault {
        Fault {
            place: self.place(self.header_line, self.header_text, "", 0..self.header_text.len()),
            found: format!("the columns '{}' beside each other", names.join("' and '")),
            expected: "each quantity in one unit".to_owned(),
            mend: "take all but one of them out".to_owned(),
        }
    }

    /// The fault of a column that nothing is called.
    pub fn name_fault(&self, column: usize, expected: &str, mend: &str) -> Fault {
        let name = self.header.get(column).unwrap_or("");
        let bytes = place::cell_bytes(self.header_text, column, self.format.separator);
        Fault {
            place: self.place(self.header_line, self.header_text, name, bytes),
            found: format!("a column called '{}'", one_line(name)),
            expected: expected.to_owned(),
            mend: mend.to_owned(),
        }
    }

    pub(super) fn repeated_column(&self, name: &str, [_, second]: [usize; 2]) -> Fault {
        let bytes = place::cell_bytes(self.header_text, second, self.format.separator);
        Fault {
            place: self.place(self.header_line, self.header_text, "", bytes),
            found: format!("more than one column called '{name}'"),
            expected: "each name once".to_owned(),
            mend: "rename all but one of them".to_owned(),
        }
    }

    fn with_another_separator(&self, is_named: impl Fn(&str) -> bool) -> Option<String> {
        let mut others = SEPARATORS.iter().filter(|(byte, _)| *byte != self.format.separator);
        let (_, sign) = others.find(|(byte, _)| {
            parts(self.header_text, *byte, self.format).is_some_and(|names| names.iter().any(&is_named))
        })?;
        Some(another_separator(sign))
    }

    /// A column whose name differs in capitals or blanks alone, or the only one that ends with the name or holds it.
    fn nearly(&self, name: &str) -> Option<String> {
        let plain = |name: &str| name.split_whitespace().collect::<String>().to_lowercase();
        let typed = plain(name);
        if typed.is_empty() {
            return None;
        }
        let the_only = |fits: &dyn Fn(&str) -> bool| {
            let mut fitting = self.header.iter().filter(|have| fits(&plain(have)));
            fitting.next().filter(|_| fitting.next().is_none())
        };
        let same = self.header.iter().find(|have| plain(have) == typed);
        let near = same
            .or_else(|| the_only(&|have| have.ends_with(&typed)))
            .or_else(|| the_only(&|have| have.contains(&typed)))?;
        Some(format!("did you mean '{}'? Names are compared letter for letter", one_line(near)))
    }

    fn farther_down(&self, is_named: impl Fn(&str) -> bool) -> Option<String> {
        let mut lines = self.text.lines().enumerate().take(LINES_SEARCHED);
        let (line, _) = lines.find(|(_, line)| {
            parts(line, self.format.separator, self.format)
                .is_some_and(|names| names.len() > 1 && names.iter().any(&is_named))
        })?;
        let line = line + 1 + self.lines_before;
        Some(format!(
            "that name stands on line {line}: state header_line = {line} where the scenario names the file, or the sign that \
             the remarks above it start with as comment"
        ))
    }
}

fn another_separator(sign: &str) -> String {
    format!(
        "the names stand apart by another sign: state separator = \"{sign}\" where the scenario names the file"
    )
}

/// A name without its line breaks, which a cell in quotes may hold.
fn one_line(name: &str) -> String {
    name.replace(['\n', '\r'], " ")
}

/// A line's cells under a separator.
fn parts(line: &str, separator: u8, format: &Format) -> Option<StringRecord> {
    let format = Format { separator, ..format.clone() };
    reader(line, &format).into_records().next()?.ok()
}

/// Joins faults of one place with one mend, as the columns of a header that is not read as it was meant leave them.
pub fn joined(faults: Vec<Fault>) -> Vec<Fault> {
    let mut joined: Vec<Fault> = Vec::new();
    for fault in faults {
        let like = joined.iter_mut().find(|have| have.place == fault.place && have.mend == fault.mend);
        match like {
            Some(have) => {
                have.found += ", ";
                have.found += fault.found.strip_prefix(NO_COLUMN).unwrap_or(&fault.found);
                if have.expected == ONE_COLUMN {
                    SEVERAL_COLUMNS.clone_into(&mut have.expected);
                }
            }
            None => joined.push(fault),
        }
    }
    joined
}
