//! The generator sheet on the terminal: every line of it, a table a subject.

use super::super::generator_sheet::{Cells, sentences};
use super::super::reader::Reader;
use super::Page;
use crate::figures::sentence;
use crate::findings::{GeneratorSheet, Subject};
use std::fmt::Write;

pub(super) fn write(page: &mut Page, sheet: &GeneratorSheet, reader: Reader) {
    page.head("Does the weather that was made look like the record?");
    for said in sentences(sheet, reader) {
        page.paragraph(&said);
    }
    for subject in Subject::ALL {
        page.head(&sentence(&subject.words(sheet.survey)));
        row(page, ["", "record", "median", "5 to 95 %", "record is"]);
        for statistic in sheet.about(subject) {
            for line in &statistic.lines {
                let Cells { name, record, median, range, verdict } = Cells::of(statistic, line, reader);
                row(page, [&name, &record, &median, &range, verdict]);
            }
        }
    }
}

fn row(page: &mut Page, [name, record, median, range, verdict]: [&str; 5]) {
    let line = format!("  {name:<49}{record:>14}{median:>12}{range:>20}  {verdict}");
    let _ = writeln!(page.text, "{}", line.trim_end());
}
