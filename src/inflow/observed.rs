//! Observed inflow: a file of daily flows becomes hm3 a day, by date, with every cell that cannot be read.

use crate::calendar::date_of;
use crate::calendar::days_between;
use crate::fault::{Fault, Unlikely};
use crate::table::{DateColumn, DateReader, Format, Row, Table, Tally};
use crate::units::FlowUnit;
use crate::weather::{Series, YearSpan};
use chrono::NaiveDate;
use std::collections::BTreeMap;

/// The column of flow.
#[derive(Debug, Clone, PartialEq)]
pub struct FlowColumn {
    /// The header's name.
    pub column: String,
    /// The unit in the file.
    pub unit: FlowUnit,
}

/// How a file of observed inflow is to be read.
#[derive(Debug, Clone, PartialEq)]
pub struct FlowColumns {
    /// Dates.
    pub date: DateColumn,
    /// The day's mean flow.
    pub flow: FlowColumn,
    /// How the table is written.
    pub format: Format,
}

/// Observed inflow.
#[derive(Debug, Clone, PartialEq)]
pub struct ObservedInflow {
    /// hm3 a day, by date; days without a reading are not there.
    pub hm3_a_day: BTreeMap<NaiveDate, f64>,
    /// Readings below 0, which are taken as they are: inflow that is computed from storage has such days.
    pub negative: usize,
}

/// A file of more lines is one of something else.
const MOST_LINES: usize = 400 * 366;
/// More than this is no daily inflow of a reservoir, hm3: the largest river on Earth brings 20 000 (from memory).
const MOST_HM3: f64 = 30_000.0;

/// Reads a file. `file` names it in faults. Lines may stand in any order.
///
/// # Errors
/// Every fault of the file: columns that are not there, cells that are neither number nor missing mark, flows beyond any river's,
/// dates that cannot be read or stand twice, a file without a reading.
pub fn read(file: &str, text: &str, columns: &FlowColumns) -> Result<ObservedInflow, Vec<Fault>> {
    let table = Table::open(file, text, &columns.format).map_err(|fault| vec![fault])?;
    let (mut dates, flow) = find(&table, columns)?;
    let mut tally = Tally::default();
    let mut lines: BTreeMap<NaiveDate, (usize, Option<f64>)> = BTreeMap::new();
    let mut count = 0_usize;
    for row in table.rows() {
        let Some(row) = tally.keep(row) else { continue };
        let date = dates.read(&table, &row, &mut tally);
        let hm3 = read_flow(&table, &row, columns, flow, &mut tally);
        count += 1;
        if let Some(date) = date {
            match lines.get(&date) {
                Some((first, _)) => {
                    let expected = format!("a date that line {first} does not have already");
                    tally.push(dates.fault(&table, &row, &expected, "keep one flow a day"));
                }
                None => {
                    lines.insert(date, (row.line, hm3));
                }
            }
        }
        if count > MOST_LINES {
            let found = "more lines than 400 years have days";
            tally.push(table.file_fault(found, "at most one line a day", "check the file"));
            break;
        }
    }
    dates.finish(&table, &mut tally);
    if !tally.is_empty() {
        return Err(tally.into_faults());
    }
    let hm3_a_day: BTreeMap<NaiveDate, f64> =
        lines.into_iter().filter_map(|(date, (_, hm3))| Some((date, hm3?))).collect();
    if hm3_a_day.is_empty() {
        let mend = "check that the column and its unit are the right ones, and what 'missing' says";
        return Err(vec![table.file_fault("no reading", "at least one day of inflow", mend)]);
    }
    let negative = hm3_a_day.values().filter(|hm3| **hm3 < 0.0).count();
    Ok(ObservedInflow { hm3_a_day, negative })
}

fn find<'c>(table: &Table<'_>, columns: &'c FlowColumns) -> Result<(DateReader<'c>, usize), Vec<Fault>> {
    match (DateReader::new(table, &columns.date), table.column(&columns.flow.column)) {
        (Ok(dates), Ok(flow)) if dates.columns().contains(&flow) => Err(vec![table.file_fault(
            "one column named for both date and flow",
            "a column of its own for each",
            "name the columns in [inflow.observed]",
        )]),
        (Ok(dates), Ok(flow)) => Ok((dates, flow)),
        (dates, flow) => Err(dates.err().into_iter().flatten().chain(flow.err()).collect()),
    }
}

fn read_flow(
    table: &Table<'_>,
    row: &Row<'_>,
    columns: &FlowColumns,
    column: usize,
    tally: &mut Tally,
) -> Option<f64> {
    let number = tally.keep(table.number(row, column)).flatten()?;
    let hm3 = columns.flow.unit.to_hm3_a_day(number) + 0.0;
    if hm3.abs() > MOST_HM3 {
        let expected = format!("at most {MOST_HM3} hm3 a day, more than any river brings");
        let mend = "check the unit, and what 'missing' says";
        tally.push(table.cell_fault(row, column, &expected, mend));
        return None;
    }
    Some(hm3)
}

impl ObservedInflow {
    /// First and last day with a reading.
    pub fn first_and_last(&self) -> Option<[NaiveDate; 2]> {
        let [first, last] = [self.hm3_a_day.first_key_value(), self.hm3_a_day.last_key_value()];
        Some([*first?.0, *last?.0])
    }

    /// Days with a reading in the water years in use.
    pub fn days_in(&self, weather: &Series) -> usize {
        let of_year =
            |year: &YearSpan| self.hm3_a_day.range(year.first..date_of(year.first, year.days + 1)).count();
        weather.years.iter().map(of_year).sum()
    }

    /// What to say where no reading lies in the water years in use.
    pub fn unused(&self, weather: &Series) -> Option<Unlikely> {
        let [first, last] = self.first_and_last()?;
        (self.days_in(weather) == 0).then(|| {
            Unlikely::new(
                "inflow.observed.file",
                format!(
                    "no reading from {first} to {last} lies in a water year in use: nothing to hold modelled inflow against"
                ),
            )
        })
    }

    /// What is unlikely about it, of a basin that gets so much precipitation in a mean year, hm3.
    pub fn unlikely(&self, yearly_precipitation_hm3: f64) -> Vec<Unlikely> {
        const KEY: &str = "inflow.observed";
        let mut unlikely = Vec::new();
        let days = self.hm3_a_day.len();
        if self.negative > 0 {
            unlikely.push(Unlikely::new(
                KEY,
                format!(
                    "{} of {days} flows lie below 0, as computed inflow may; they are taken as they are",
                    self.negative
                ),
            ));
        }
        let yearly_hm3 = 365.25 * self.hm3_a_day.values().sum::<f64>() / days as f64;
        let span = self.hm3_a_day.keys().next().zip(self.hm3_a_day.keys().next_back());
        // A gauge that is read in the melt season alone has no yearly mean.
        let is_whole = span.is_some_and(|(from, to)| 10 * days >= 9 * (days_between(*from, *to) + 1));
        if days >= 365 && is_whole && yearly_hm3 > 1.2 * yearly_precipitation_hm3 {
            unlikely.push(Unlikely::new(
                KEY,
                format!(
                    "in a mean year {yearly_hm3:.0} hm3 flow in, more than the {yearly_precipitation_hm3:.0} hm3 of rain and snow over \
                     the basin: check the unit, the basin's area and the precipitation gradient"
                ),
            ));
        }
        unlikely
    }
}
