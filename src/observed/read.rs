//! Cells to states: a site's file in mm by date, and every cell that cannot be read.

use super::columns::Columns;
use super::observations::{Counts, Observations, State};
use crate::calendar::days_between;
use crate::fault::Fault;
use crate::table::{DateReader, Row, Table, Tally};
use crate::weather::{FirstPlace, Reading, Suspicion};
use chrono::NaiveDate;
use std::collections::BTreeMap;

/// No snowpack at a station has held more: even the deepest on record, not quite 12 m of snow, would have to be water
/// (record from memory), mm.
const MOST_MM: f64 = 12_000.0;
/// A pillow without snow drifts so far below 0, mm; such a reading is 0.
const DRIFT_MM: f64 = 25.0;
/// A reading this far above, or below, both of its neighbours is a spike, mm, where they are within half of that of each other;
const SPIKE_MM: f64 = 25.0;
/// under deep snow, where pillows are less exact, this share of what the neighbours read (both limits are common practice).
const SPIKE_SHARE: f64 = 0.05;
/// A file of more lines is one of something else.
const MOST_LINES: usize = 400 * 366;

/// A line of the file whose date reads.
#[derive(Debug, Clone, Copy)]
struct Line {
    date: NaiveDate,
    /// Its number in the file.
    number: usize,
    swe_mm: Option<f64>,
}

/// Reads a site's file. `file` names it in faults.
///
/// Lines may stand in any order. A start-of-day reading dated d is S(d), an end-of-day one S(d + 1). Readings beyond 12 000 mm
/// and those far below 0 are taken as missing, those a little below 0 as 0, as a pillow without snow drifts; all of it is
/// counted and said.
///
/// # Errors
/// Every fault of the file: columns that are not there, cells that are neither number nor missing mark,
/// dates that cannot be read or stand twice, a file without a reading.
pub fn read(file: &str, text: &str, columns: &Columns) -> Result<Observations, Vec<Fault>> {
    let table = Table::open(file, text, &columns.format).map_err(|fault| vec![fault])?;
    let (mut dates, swe) = find(&table, columns)?;
    let mut tally = Tally::default();
    let mut lines: Vec<Line> = Vec::new();
    for row in table.rows() {
        let Some(row) = tally.keep(row) else { continue };
        let date = dates.read(&table, &row, &mut tally);
        let swe_mm = read_swe(&table, &row, columns, swe, &mut tally);
        lines.extend(date.map(|date| Line { date, number: row.line, swe_mm }));
        if lines.len() > MOST_LINES {
            let found = "more lines than 400 years have days";
            tally.push(table.file_fault(found, "at most one line a day", "check the file"));
            break;
        }
    }
    let are_dates_read = dates.finish(&table, &mut tally);
    lines.sort_by_key(|line| line.date);
    if are_dates_read {
        complain_of_repeats(&table, &dates, &lines, &mut tally);
    }
    if !tally.is_empty() {
        return Err(tally.into_faults());
    }
    let observations = observations(&mut lines, columns.reading);
    if observations.states.is_empty() {
        let mend = "check that the column and its unit are the right ones, and what 'missing' says";
        return Err(vec![table.file_fault("no reading", "at least one reading of SWE", mend)]);
    }
    Ok(observations)
}

fn find<'c>(table: &Table<'_>, columns: &'c Columns) -> Result<(DateReader<'c>, usize), Vec<Fault>> {
    let (dates, swe) = (DateReader::new(table, &columns.date), table.column(&columns.swe.column));
    match (dates, swe) {
        (Ok(dates), Ok(swe)) if dates.columns().contains(&swe) => Err(vec![table.file_fault(
            "one column named for both date and SWE",
            "a column of its own for each",
            "name the columns in [[observed_swe]]",
        )]),
        (Ok(dates), Ok(swe)) => Ok((dates, swe)),
        (dates, swe) => Err(dates.err().into_iter().flatten().chain(swe.err()).collect()),
    }
}

fn read_swe(
    table: &Table<'_>,
    row: &Row<'_>,
    columns: &Columns,
    column: usize,
    tally: &mut Tally,
) -> Option<f64> {
    let number = tally.keep(table.number(row, column)).flatten()?;
    Some(columns.swe.unit.to_millimetres(number) + 0.0)
}

/// `lines` stand by date; of two with the same, the one lower in the file is at fault.
fn complain_of_repeats(table: &Table<'_>, dates: &DateReader<'_>, lines: &[Line], tally: &mut Tally) {
    let repeats = lines.windows(2).filter(|pair| pair[0].date == pair[1].date);
    let first_by_line: BTreeMap<usize, usize> =
        repeats.map(|pair| (pair[1].number, pair[0].number)).collect();
    if first_by_line.is_empty() {
        return;
    }
    for row in table.rows().filter_map(Result::ok) {
        if let Some(first) = first_by_line.get(&row.line) {
            let expected = format!("a date that line {first} does not have already");
            tally.push(dates.fault(table, &row, &expected, "keep one reading a day"));
        }
    }
}

fn observations(lines: &mut [Line], reading: Reading) -> Observations {
    let suspicions = sift(lines);
    let impossible_readings =
        suspicions.iter().map(|s| if s.is_taken_as_missing { s.count } else { 0 }).sum();
    let read: Vec<(NaiveDate, f64)> =
        lines.iter().filter_map(|line| line.swe_mm.map(|swe_mm| (line.date, swe_mm))).collect();
    let states: Vec<State> = read
        .iter()
        .map(|(date, swe_mm)| {
            let date = match reading {
                Reading::StartOfDay => *date,
                Reading::EndOfDay => date.succ_opt().unwrap_or(*date),
            };
            State { date, swe_mm: *swe_mm }
        })
        .collect();
    let [first, last] = [read.first(), read.last()].map(|end| end.map_or(NaiveDate::MIN, |(date, _)| *date));
    let counts = Counts {
        readings: read.len(),
        first,
        last,
        lines_without_reading: lines.len() - read.len(),
        impossible_readings,
    };
    Observations { kind: Observations::kind_of(&states), states, counts, suspicions }
}

/// Takes out readings beyond any snowpack's, and says so; says where all readings are the same.
fn sift(lines: &mut [Line]) -> Vec<Suspicion> {
    let suspicion = |what: &str, mend: &str, is_taken_as_missing: bool, among: &[(Line, f64)]| {
        among.first().map(|(first, swe_mm)| Suspicion {
            about: "swe",
            what: what.to_owned(),
            count: among.len(),
            is_taken_as_missing,
            is_as_asked: false,
            first: FirstPlace {
                date: first.date,
                line: Some(first.number),
                value: format!("{swe_mm:.1} mm"),
            },
            mend: mend.to_owned(),
        })
    };
    let read: Vec<(Line, f64)> =
        lines.iter().filter_map(|line| line.swe_mm.map(|swe_mm| (*line, swe_mm))).collect();
    let (impossible, possible): (Vec<_>, Vec<_>) =
        read.into_iter().partition(|(_, swe_mm)| *swe_mm > MOST_MM);
    let (negative, possible): (Vec<_>, Vec<_>) =
        possible.into_iter().partition(|(_, swe_mm)| *swe_mm < -DRIFT_MM);
    let drifted: Vec<_> = possible.iter().copied().filter(|(_, swe_mm)| *swe_mm < 0.0).collect();
    for line in lines.iter_mut() {
        let read = line.swe_mm.filter(|swe_mm| (-DRIFT_MM..=MOST_MM).contains(swe_mm));
        line.swe_mm = read.map(|swe_mm| swe_mm.max(0.0));
    }
    let spikes = spikes(lines);
    let found: Vec<_> = spikes.iter().filter_map(|at| Some((lines[*at], lines[*at].swe_mm?))).collect();
    for at in spikes {
        lines[at].swe_mm = None;
    }
    let mend = "No snow comes or goes for a day";
    let spike =
        suspicion("readings far from those of the day before and after, which agree", mend, true, &found);
    let below = suspicion("readings far below 0", "Do they stand for 'not measured'?", true, &negative);
    let drift = suspicion("readings a little below 0, read as 0", "", false, &drifted);
    let what = "readings above 12 000 mm, which no snowpack has held";
    let beyond = suspicion(what, "Is the unit right?", true, &impossible);
    let is_constant = possible.len() > 2 && possible.iter().all(|(_, swe_mm)| *swe_mm == possible[0].1);
    let same = is_constant
        .then(|| suspicion("readings, all of them the same", "Is it the right column?", false, &possible));
    [beyond, below, drift, spike, same.flatten()].into_iter().flatten().collect()
}

/// Readings that are far above, or far below, those of both the day before and the day after, while these agree.
fn spikes(lines: &[Line]) -> Vec<usize> {
    let is_spike = |trio: &[Line]| {
        let [before, line, after] = trio else { return false };
        let days = [(before, line), (line, after)].map(|(day, next)| days_between(day.date, next.date));
        let (Some(before), Some(mm), Some(after)) = (before.swe_mm, line.swe_mm, after.swe_mm) else {
            return false;
        };
        let [rise, fall] = [mm - before, mm - after];
        let far_mm = SPIKE_MM.max(SPIKE_SHARE * (before + after) / 2.0);
        days == [1, 1]
            && rise.abs().min(fall.abs()) > far_mm
            && (rise > 0.0) == (fall > 0.0)
            && (before - after).abs() < far_mm / 2.0
    };
    lines.windows(3).enumerate().filter(|(_, trio)| is_spike(trio)).map(|(at, _)| at + 1).collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::observed::SweColumn;
    use crate::table::{DateColumn, Format};
    use crate::units::DepthUnit;

    /// A pillow without snow drifts a little; a mark that nobody declared is no reading.
    #[test]
    fn below_nothing_there_is_nothing() {
        let columns = Columns {
            date: DateColumn { columns: vec!["date".to_owned()], format: "%Y-%m-%d".to_owned() },
            swe: SweColumn { column: "swe".to_owned(), unit: DepthUnit::Inch },
            reading: Reading::StartOfDay,
            format: Format::default(),
        };
        let text = "date,swe\n2001-10-01,-0.2\n2001-10-02,-888\n2001-10-03,1.0\n";
        let read = read("snow.csv", text, &columns).unwrap();
        let states: Vec<f64> = read.states.iter().map(|state| state.swe_mm).collect();
        assert_eq!((states, read.counts.impossible_readings), (vec![0.0, 25.4], 1));
        let said: Vec<(usize, bool)> =
            read.suspicions.iter().map(|it| (it.count, it.is_taken_as_missing)).collect();
        assert_eq!(said, [(1, true), (1, false)]);
    }

    /// A reading of one day far from both its neighbours is none; a storm, a slow thaw and a gap are left alone.
    #[test]
    fn spikes_are_no_snow() {
        let first = NaiveDate::from_ymd_opt(2001, 1, 1).expect("a date");
        let found = |readings: &[(u64, f64)]| {
            let line = |(number, (day, swe_mm)): (usize, &(u64, f64))| Line {
                date: first + chrono::Days::new(*day),
                number,
                swe_mm: Some(*swe_mm),
            };
            spikes(&readings.iter().enumerate().map(line).collect::<Vec<_>>())
        };
        assert_eq!(found(&[(0, 300.0), (1, 340.0), (2, 302.0)]), [1]);
        assert_eq!(found(&[(0, 300.0), (1, 260.0), (2, 302.0)]), [1], "downwards");
        assert_eq!(found(&[(0, 300.0), (1, 340.0), (2, 338.0)]), [0; 0], "a storm");
        assert_eq!(found(&[(0, 300.0), (1, 340.0), (2, 314.0)]), [0; 0], "neighbours that do not agree");
        assert_eq!(found(&[(0, 300.0), (1, 324.0), (2, 300.0)]), [0; 0], "not far");
        assert_eq!(found(&[(0, 900.0), (1, 940.0), (2, 900.0)]), [0; 0], "not far for deep snow");
        assert_eq!(found(&[(0, 900.0), (1, 950.0), (2, 900.0)]), [1], "far for deep snow");
        assert_eq!(found(&[(0, 300.0), (31, 340.0), (32, 300.0)]), [0; 0], "a course");
    }
}
