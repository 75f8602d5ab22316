//! `[[observed_swe]]`: sites with observed snow, and how to read their files.

use super::elevation::Height;
use super::format::{read_date, read_format};
use super::section::Section;
use crate::fault::Fault;
use crate::observed::{Columns, SweColumn};
use crate::units::DepthUnit;
use crate::weather::Reading;
use std::path::Path;

/// A site as typed.
#[derive(Debug, Clone)]
pub struct ObservedTyped {
    /// The scenario's key for it: `observed_swe[0]`.
    pub key: String,
    /// Its name: as typed, else the file's without the ending.
    pub name: String,
    /// Its file, relative to the scenario.
    pub file: String,
    /// Its elevation, m.
    pub elevation_m: f64,
    /// Columns, unit, marks.
    pub columns: Columns,
}

/// A site's name stands in titles and tables.
const LONGEST_NAME: usize = 300;

/// Reads every site; one with a fault is none.
pub(super) fn read(sections: Vec<Section<'_>>) -> Vec<Option<ObservedTyped>> {
    let mut names: Vec<String> = Vec::new();
    let mut sites = Vec::with_capacity(sections.len());
    for section in sections {
        sites.push(read_site(section, &mut names));
    }
    sites
}

/// `names` are those of the sites before this one.
fn read_site(mut section: Section<'_>, names: &mut Vec<String>) -> Option<ObservedTyped> {
    let file = section.required_text(
        "file",
        "the path of a CSV file with observed SWE",
        "add file = \"snow-course.csv\"",
    );
    section.names_file(&section.path_of("file"), file.as_deref());
    let name = read_name(&mut section, file.as_deref(), names);
    let elevation_m = section.required_height(&Height::above_the_sea("elevation_m", "elevation_ft"));
    let date = read_date(section.section("date"));
    let swe = read_swe(section.required_section("swe"));
    let reading = if section.has("reading") {
        section.choice("reading", &Reading::NAMES)
    } else {
        section.text_or("reading", "start-of-day");
        Some(Reading::StartOfDay)
    };
    let format = read_format(&mut section);
    let key = section.path().to_owned();
    section.finish();
    Some(ObservedTyped {
        key,
        name: name?,
        file: file?,
        elevation_m: elevation_m?,
        columns: Columns { date: date?, swe: swe?, reading: reading?, format: format? },
    })
}

/// Each site needs a name of its own, since tables tell sites apart by it.
fn read_name(section: &mut Section<'_>, file: Option<&str>, names: &mut Vec<String>) -> Option<String> {
    let stem = file.and_then(|file| Path::new(file).file_stem()).map(|stem| stem.to_string_lossy());
    let name = if section.has("name") {
        section.required_text("name", "a name for the site", "add name = \"...\"")?
    } else {
        section.text_or("name", &stem?)
    };
    let mend = "name = \"Heron Meadow snow course\", for example";
    if name.chars().any(char::is_control) || name.chars().count() > LONGEST_NAME {
        section.fault(Fault::key(
            section.path_of("name"),
            "a name with line breaks or control signs, or a very long one",
            format!("one line of at most {LONGEST_NAME} characters"),
            mend,
        ));
        return None;
    }
    if names.contains(&name) {
        section.fault(Fault::key(
            section.path_of("name"),
            format!("{name:?} a second time"),
            "a name of its own for each site",
            mend,
        ));
        return None;
    }
    names.push(name.clone());
    Some(name)
}

fn read_swe(mut section: Section<'_>) -> Option<SweColumn> {
    let column = section.required_text("column", "the column's name in the header", "add column = \"...\"");
    let unit = section.choice("unit", &DepthUnit::NAMES);
    if unit.is_none() && !section.has("unit") {
        section.required_text("unit", "\"mm\", \"cm\" or \"in\"", "add unit = \"mm\"");
    }
    section.finish();
    Some(SweColumn { column: column?, unit: unit? })
}
