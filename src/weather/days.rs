//! Cells to numbers: a station's file as consecutive days in degC and mm, and every cell that cannot be read.

use super::columns::{Columns, Gauge, HumidityColumn, TemperatureColumn, TemperatureColumns};
use crate::calendar::days_between;
use crate::fault::Fault;
use crate::table::{DateReader, Row, Table, Tally, joined};
use chrono::NaiveDate;
use std::collections::BTreeMap;

/// No record is longer; a mistyped century would otherwise ask for millions of empty days.
const LONGEST_RECORD_DAYS: usize = 400 * 366;

/// Consecutive days as the file states them, in degC and mm; what is not measured is none.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct RawDays {
    pub first: NaiveDate,
    pub tmin_c: Vec<Option<f64>>,
    pub tmax_c: Vec<Option<f64>>,
    /// Daily amount, or the gauge's reading.
    pub gauge_mm: Vec<Option<f64>>,
    /// Relative humidity, percent, or dew point, degC.
    pub humidity: Vec<Option<f64>>,
    /// Line of the file that each day stands on; 0 where it has none.
    pub line: Vec<usize>,
}

/// A line of the file whose date reads.
struct Line {
    date: NaiveDate,
    /// Its number in the file.
    number: usize,
    measured: Measured,
}

/// What a line holds beside its date.
struct Measured {
    tmin_c: Option<f64>,
    tmax_c: Option<f64>,
    gauge_mm: Option<f64>,
    /// Relative humidity, percent, or dew point, degC.
    humidity: Option<f64>,
}

/// Where the quantities stand; none where a column is not there.
struct Places {
    /// The minimum, or the mean alone.
    tmin: Option<usize>,
    /// None also where the file has the mean alone.
    tmax: Option<usize>,
    gauge: Option<usize>,
    /// None also where the scenario names no such column.
    humidity: Option<usize>,
}

/// The columns that are there, and the faults of those that are not.
struct Found<'c> {
    dates: Option<DateReader<'c>>,
    places: Places,
    faults: Vec<Fault>,
}

/// Reads the cells of `text`. `file` names the file in faults.
///
/// Lines may run from the earliest date to the latest or all the other way round.
///
/// # Errors
/// Every fault of the file: columns that are not there, cells that are neither number nor missing mark, NaN and
/// infinities, daily precipitation below 0, dates that cannot be read, repeat or run to and fro, no rows.
pub(super) fn read_days(file: &str, text: &str, columns: &Columns) -> Result<RawDays, Vec<Fault>> {
    let table = Table::open(file, text, &columns.format).map_err(|fault| vec![fault])?;
    let Found { mut dates, places, faults } = find(&table, columns)?;
    let mut tally = Tally::default();
    let mut lines: Vec<Line> = Vec::new();
    for (number, row) in table.rows().enumerate() {
        if number == LONGEST_RECORD_DAYS {
            tally.push(table.file_fault(
                "more lines than 400 years have days",
                "one line a day",
                "of hourly values make daily ones first",
            ));
            break;
        }
        let Some(row) = tally.keep(row) else { continue };
        let date = dates.as_mut().and_then(|dates| dates.read(&table, &row, &mut tally));
        let measured = read_row(&table, &row, columns, &places, &mut tally);
        lines.extend(date.map(|date| Line { date, number: row.line, measured }));
    }
    let sound_dates = dates.filter(|dates| dates.finish(&table, &mut tally));
    if lines.first().map(|line| line.date) > lines.last().map(|line| line.date) {
        lines.reverse();
    }
    if let Some(dates) = sound_dates {
        complain_of_order(&table, &dates, &out_of_order(&lines), &mut tally);
    }
    if !faults.is_empty() || !tally.is_empty() {
        return Err(faults.into_iter().chain(tally.into_faults()).collect());
    }
    match lines.first() {
        Some(first) => Ok(in_order(first.date, &lines)),
        None => Err(vec![table.file_fault(
            "no rows below the header",
            "one line a day",
            "check that the file was saved or downloaded whole",
        )]),
    }
}

/// Looks for the columns.
///
/// # Errors
/// None of them is there, so that it is most likely another table; or one is named for two quantities.
fn find<'c>(table: &Table<'_>, columns: &'c Columns) -> Result<Found<'c>, Vec<Fault>> {
    let mut faults = Vec::new();
    let dates = DateReader::new(table, &columns.date).map_err(|missing| faults.extend(missing)).ok();
    let mut place = |name: &str| table.column(name).map_err(|missing| faults.push(missing)).ok();
    let temperatures: Vec<Option<usize>> =
        columns.temperature.named().iter().map(|(_, temperature)| place(&temperature.column)).collect();
    let gauge = place(&columns.precipitation.column);
    let humidity = columns.humidity.as_ref().and_then(|humidity| place(humidity.column()));
    let numbers: Vec<usize> = temperatures.iter().copied().flatten().chain(gauge).chain(humidity).collect();
    let faults = joined(faults);
    if dates.is_none() && numbers.is_empty() {
        return Err(faults);
    }
    let mut used = [dates.as_ref().map_or(&[][..], DateReader::columns), &numbers].concat();
    used.sort_unstable();
    if used.windows(2).any(|pair| pair[0] == pair[1]) {
        let twice = table.file_fault(
            "one column named for two quantities",
            "a column of its own for the date, each temperature and precipitation",
            "name the columns in [weather]; a file with the daily mean alone has tmean and no tmin and tmax",
        );
        return Err(faults.into_iter().chain([twice]).collect());
    }
    let [tmin, tmax] = [0, 1].map(|at| temperatures.get(at).copied().flatten());
    Ok(Found { dates, places: Places { tmin, tmax, gauge, humidity }, faults })
}

fn read_row(
    table: &Table<'_>,
    row: &Row<'_>,
    columns: &Columns,
    places: &Places,
    tally: &mut Tally,
) -> Measured {
    let precipitation = &columns.precipitation;
    let mut cell = |at: usize| tally.keep(table.number(row, at)).flatten();
    let mut celsius = |at: Option<usize>, column: &TemperatureColumn| {
        at.and_then(&mut cell).map(|value| column.unit.to_celsius(value))
    };
    let [tmin_c, tmax_c] = match &columns.temperature {
        TemperatureColumns::Extremes { tmin, tmax } => {
            [celsius(places.tmin, tmin), celsius(places.tmax, tmax)]
        }
        TemperatureColumns::MeanAlone(mean) => [celsius(places.tmin, mean); 2],
    };
    let humidity = places.humidity.zip(columns.humidity.as_ref()).and_then(|(at, column)| {
        cell(at).map(|value| match column {
            HumidityColumn::Relative { unit, .. } => unit.to_percent(value),
            HumidityColumn::DewPoint(dew_point) => dew_point.unit.to_celsius(value),
        })
    });
    let gauge = places.gauge.and_then(|at| {
        let is_trace = precipitation.trace.iter().any(|mark| mark == row.cell(at));
        if is_trace { Some(0.0) } else { cell(at) }
    });
    let gauge_mm = gauge.map(|value| precipitation.unit.to_millimetres(value));
    if let Some(at) = places.gauge
        && precipitation.gauge == Gauge::Daily
        && gauge_mm.is_some_and(|amount| amount < 0.0)
    {
        tally.push(table.cell_fault(
            row,
            at,
            "a daily amount of 0 or more",
            "if the gauge accumulates, say so with gauge = \"accumulating\"; else add the mark to 'missing'",
        ));
    }
    Measured { tmin_c, tmax_c, gauge_mm, humidity }
}

/// What is wrong with the order of dates, by number of the line at fault: what was expected, and how to mend it.
type OutOfOrder = BTreeMap<usize, (String, &'static str)>;

/// Every date must come after the one before it, and within the longest record.
fn out_of_order(lines: &[Line]) -> OutOfOrder {
    let mut faults = OutOfOrder::new();
    let Some(first) = lines.first() else { return faults };
    let mut last: Option<&Line> = None;
    for line in lines {
        let fault = match last {
            Some(before) if before.date == line.date => (
                format!("a date that line {} does not have already", before.number),
                "keep one line a day; of hourly values make daily ones first",
            ),
            Some(before) if before.date > line.date => (
                format!("a date after {}, which stands on line {}", before.date, before.number),
                "sort the lines by date and keep one line a day",
            ),
            _ if days_between(first.date, line.date) >= LONGEST_RECORD_DAYS => {
                (format!("a date within 400 years of the first, {}", first.date), "check the year")
            }
            _ => {
                last = Some(line);
                continue;
            }
        };
        faults.insert(line.number, fault);
    }
    faults
}

fn complain_of_order(table: &Table<'_>, dates: &DateReader<'_>, faults: &OutOfOrder, tally: &mut Tally) {
    if faults.is_empty() {
        return;
    }
    for row in table.rows().filter_map(Result::ok) {
        if let Some((expected, mend)) = faults.get(&row.line) {
            tally.push(dates.fault(table, &row, expected, mend));
        }
    }
}

/// The lines as consecutive days.
fn in_order(first: NaiveDate, lines: &[Line]) -> RawDays {
    let mut days = RawDays {
        first,
        tmin_c: Vec::new(),
        tmax_c: Vec::new(),
        gauge_mm: Vec::new(),
        humidity: Vec::new(),
        line: Vec::new(),
    };
    for line in lines {
        let index = days_between(first, line.date);
        for column in [&mut days.tmin_c, &mut days.tmax_c, &mut days.gauge_mm, &mut days.humidity] {
            column.resize(index, None);
        }
        days.line.resize(index, 0);
        days.tmin_c.push(line.measured.tmin_c);
        days.tmax_c.push(line.measured.tmax_c);
        days.gauge_mm.push(line.measured.gauge_mm);
        days.humidity.push(line.measured.humidity);
        days.line.push(line.number);
    }
    days
}
