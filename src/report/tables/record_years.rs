//! The record's own years.

use super::super::study::Study;
use super::cells::{Told, finish, name, write};
use csv::Writer;

/// The record's years: used or left out, why, and what they measure at the reference.
pub(super) fn record_years(study: &Study<'_>) -> Vec<u8> {
    let (record, units) = (&study.record, study.reader.units);
    let mut writer = Writer::from_writer(Vec::new());
    let mut header = vec!["water_year".to_owned(), "used".to_owned(), "why_left_out".to_owned()];
    header.extend(record.measures.iter().map(|measure| name(measure, units)));
    write(&mut writer, &header);
    let mut rows: Vec<(i32, Vec<String>)> = record
        .years
        .iter()
        .map(|year| {
            let mut row = vec![year.water_year.to_string(), "yes".to_owned(), String::new()];
            row.extend(record.measures.iter().zip(&year.values).map(|(measure, value)| {
                Told { units, kind: measure.kind }.outcome(measure.kind.outcome(*value))
            }));
            (year.water_year, row)
        })
        .collect();
    rows.extend(record.skipped.iter().map(|year| {
        let why: Vec<String> = year.why.iter().map(|why| why.words(units)).collect();
        let mut row = vec![year.water_year.to_string(), "no".to_owned(), why.join("; ")];
        row.resize(3 + record.measures.len(), String::new());
        (year.water_year, row)
    }));
    rows.sort_by_key(|(year, _)| *year);
    for (_, row) in rows {
        write(&mut writer, &row);
    }
    finish(writer)
}
