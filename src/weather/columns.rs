//! Cells to numbers: which column holds what, in which unit, and every cell that cannot be read.

use crate::fault::Fault;
use crate::table::{Format, Row, Table, Tally};
use crate::units::{DepthUnit, TemperatureUnit};
use chrono::NaiveDate;
use std::ops::RangeInclusive;

/// No record is longer; a mistyped century would otherwise ask for millions of empty days.
const LONGEST_RECORD_DAYS: usize = 400 * 366;

/// No station has measured beyond these (records: -89.2 and 56.7 degC, World Meteorological Organization), degC.
const POSSIBLE_C: RangeInclusive<f64> = -90.0..=60.0;
/// Nor more in a day (record: 1825 mm, World Meteorological Organization), mm.
const MOST_IN_A_DAY_MM: f64 = 2000.0;
/// Nor more in a year (record: 26 470 mm in twelve months), mm.
const MOST_IN_A_GAUGE_MM: f64 = 30_000.0;

/// Forms of dates that are tried where the stated one does not fit, to suggest one that does.
const DATE_FORMATS: [&str; 7] =
    ["%Y-%m-%d", "%m/%d/%Y", "%d/%m/%Y", "%d.%m.%Y", "%Y/%m/%d", "%Y%m%d", "%Y-%m-%d %H:%M"];

/// A temperature column and its unit.
#[derive(Debug, Clone, PartialEq)]
pub struct TemperatureColumn {
    /// The header's name.
    pub column: String,
    /// The unit in the file.
    pub unit: TemperatureUnit,
}

/// Which temperatures the file holds.
#[derive(Debug, Clone, PartialEq)]
pub enum TemperatureColumns {
    /// Daily minimum and maximum.
    Extremes {
        /// Daily minimum.
        tmin: TemperatureColumn,
        /// Daily maximum.
        tmax: TemperatureColumn,
    },
    /// The daily mean alone; then only the `mean` degree rule is possible.
    MeanAlone(TemperatureColumn),
}

/// When an accumulating gauge was read.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Reading {
    /// As the dated day begins.
    StartOfDay,
    /// As the dated day ends.
    EndOfDay,
}

/// What the precipitation column holds.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Gauge {
    /// Each day's amount.
    Daily,
    /// What has come since the gauge was last set back.
    Accumulating {
        /// When it was read.
        reading: Reading,
        /// A fall larger than this sets the gauge back, mm; a smaller one is noise.
        reset_tolerance_mm: f64,
    },
}

/// The precipitation column.
#[derive(Debug, Clone, PartialEq)]
pub struct PrecipitationColumn {
    /// The header's name.
    pub column: String,
    /// The unit in the file.
    pub unit: DepthUnit,
    /// Daily amounts or an accumulating gauge.
    pub gauge: Gauge,
}

/// How a station's file is to be read.
#[derive(Debug, Clone, PartialEq)]
pub struct Columns {
    /// The date column's name.
    pub date: String,
    /// The date's format, in the signs of `strftime`.
    pub date_format: String,
    /// Temperatures.
    pub temperature: TemperatureColumns,
    /// Precipitation.
    pub precipitation: PrecipitationColumn,
    /// Separator and remark sign.
    pub format: Format,
    /// Cells that stand for 'not measured', beside an empty one.
    pub missing: Vec<String>,
}

/// Consecutive days as the file states them, in degC and mm; what is not measured is none.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct RawDays {
    pub first: NaiveDate,
    pub tmin_c: Vec<Option<f64>>,
    pub tmax_c: Vec<Option<f64>>,
    /// Daily amount, or the gauge's reading.
    pub gauge_mm: Vec<Option<f64>>,
    /// Dates between the first and the last without a line of their own.
    pub absent_days: usize,
    /// Cells with a value that no station has ever measured; they are taken as missing.
    pub impossible_cells: usize,
}

/// Reads the cells of `text`. `file` names the file in faults.
///
/// # Errors
/// Every fault of the file: columns that are not there, cells that are neither number nor missing mark, NaN and
/// infinities, daily precipitation below 0, dates that cannot be read, repeat or run backwards, no rows.
pub(super) fn read_days(file: &str, text: &str, columns: &Columns) -> Result<RawDays, Vec<Fault>> {
    let table = Table::open(file, text, columns.format).map_err(|fault| vec![fault])?;
    let (tmin, tmax) = match &columns.temperature {
        TemperatureColumns::Extremes { tmin, tmax } => (tmin, tmax),
        TemperatureColumns::MeanAlone(mean) => (mean, mean),
    };
    let date = table.column(&columns.date);
    let tmin_at = table.column(&tmin.column);
    let tmax_at = match &columns.temperature {
        TemperatureColumns::Extremes { tmax, .. } => table.column(&tmax.column).map(Some),
        TemperatureColumns::MeanAlone(_) => Ok(None),
    };
    let gauge_at = table.column(&columns.precipitation.column);
    let (Ok(date), Ok(tmin_at), Ok(tmax_at), Ok(gauge_at)) = (&date, &tmin_at, &tmax_at, &gauge_at) else {
        return Err([date.err(), tmin_at.err(), tmax_at.err(), gauge_at.err()]
            .into_iter()
            .flatten()
            .collect());
    };
    let (date, tmin_at, tmax_at, gauge_at) = (*date, *tmin_at, *tmax_at, *gauge_at);
    let mut used = vec![date, tmin_at, gauge_at];
    used.extend(tmax_at);
    used.sort_unstable();
    if used.windows(2).any(|pair| pair[0] == pair[1]) {
        return Err(vec![table.file_fault(
            "one column named for two quantities",
            "a column of its own for the date, each temperature and precipitation",
            "name the columns in [weather]; a file with the daily mean alone has tmean and no tmin and tmax",
        )]);
    }

    let most_mm = match columns.precipitation.gauge {
        Gauge::Daily => MOST_IN_A_DAY_MM,
        Gauge::Accumulating { .. } => MOST_IN_A_GAUGE_MM,
    };
    let mut tally = Tally::default();
    let mut days: Option<RawDays> = None;
    for row in table.rows() {
        let Some(row) = tally.keep(row) else { continue };
        let Some(day) = read_date(&table, &row, date, &columns.date_format, &mut tally) else {
            continue;
        };
        let mut cell = |at: usize| number(&table, &row, at, &columns.missing, &mut tally);
        let tmin_c = cell(tmin_at).map(|value| tmin.unit.to_celsius(value));
        let tmax_c = tmax_at.map_or(tmin_c, |at| cell(at).map(|value| tmax.unit.to_celsius(value)));
        let gauge_mm = cell(gauge_at).map(|value| columns.precipitation.unit.to_millimetres(value));
        let mut impossible_cells = 0;
        let mut possible = |value: Option<f64>, range: RangeInclusive<f64>| {
            impossible_cells += usize::from(value.is_some_and(|value| !range.contains(&value)));
            value.filter(|value| range.contains(value))
        };
        let (tmin_c, tmax_c) = (possible(tmin_c, POSSIBLE_C), possible(tmax_c, POSSIBLE_C));
        let gauge_mm = possible(gauge_mm, f64::MIN..=most_mm);
        if columns.precipitation.gauge == Gauge::Daily && gauge_mm.is_some_and(|amount| amount < 0.0) {
            tally.push(table.cell_fault(
                &row,
                gauge_at,
                "a daily amount of 0 or more",
                "if the gauge accumulates, say so with gauge = \"accumulating\"; else add the mark to 'missing'",
            ));
        }
        let days = days.get_or_insert_with(|| RawDays {
            first: day,
            tmin_c: Vec::new(),
            tmax_c: Vec::new(),
            gauge_mm: Vec::new(),
            absent_days: 0,
            impossible_cells: 0,
        });
        days.impossible_cells += impossible_cells;
        let index = (day - days.first).num_days();
        let due = days.tmin_c.len();
        let index = usize::try_from(index).ok().filter(|index| *index >= due && *index < LONGEST_RECORD_DAYS);
        let Some(index) = index else {
            tally.push(table.cell_fault(
                &row,
                date,
                "a date after that of the line above, within 400 years of the first",
                "sort the lines by date and keep one line a day",
            ));
            continue;
        };
        days.absent_days += index - due;
        for column in [&mut days.tmin_c, &mut days.tmax_c, &mut days.gauge_mm] {
            column.resize(index, None);
        }
        days.tmin_c.push(tmin_c);
        days.tmax_c.push(tmax_c);
        days.gauge_mm.push(gauge_mm);
    }
    match days {
        Some(days) if tally.is_empty() => Ok(days),
        None if tally.is_empty() => {
            Err(vec![table.file_fault("no rows below the header", "one line a day", "check the file")])
        }
        _ => Err(tally.into_faults()),
    }
}

fn read_date(
    table: &Table<'_>,
    row: &Row<'_>,
    at: usize,
    format: &str,
    tally: &mut Tally,
) -> Option<NaiveDate> {
    let date = NaiveDate::parse_from_str(row.cell(at), format).ok();
    if date.is_none() {
        let reads = |other: &&&str| NaiveDate::parse_from_str(row.cell(at), other).is_ok();
        let fitting: Vec<String> =
            DATE_FORMATS.iter().filter(reads).map(|other| format!("{other:?}")).collect();
        let mend = if fitting.is_empty() {
            "state the file's own form in date = { column, format }, in the signs of strftime".to_owned()
        } else {
            format!("if the file writes dates so, state format = {} in date", fitting.join(" or "))
        };
        tally.push(table.cell_fault(row, at, &format!("a date written as {format}"), &mend));
    }
    date
}

fn number(table: &Table<'_>, row: &Row<'_>, at: usize, missing: &[String], tally: &mut Tally) -> Option<f64> {
    let cell = row.cell(at);
    if cell.is_empty() || missing.iter().any(|mark| mark == cell) {
        return None;
    }
    let value = cell.parse::<f64>().ok().filter(|value| value.is_finite());
    if value.is_none() {
        tally.push(table.cell_fault(
            row,
            at,
            "a number or a mark for 'not measured'",
            "if it is such a mark, add it to 'missing' in [weather]",
        ));
    }
    value
}
