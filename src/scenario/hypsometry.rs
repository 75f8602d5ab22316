//! `basin.bands` or `basin.area_elevation_curve`: the basin's area by elevation, and how its file is to be read.

use super::elevation::Height;
use super::format::read_layout;
use super::nearest::nearest;
use super::section::Section;
use crate::basin::{
    ANGLE_NAMES, Band, BandColumns, Column, CurveColumns, GroundColumns, Unread, VARIATION_NAMES, read_bands,
    read_curve,
};
use crate::fault::{Fault, Unlikely};
use crate::table::Encoding;
use crate::units::{AreaUnit, LengthUnit, ShareUnit};

/// A file of bands or of a curve.
#[derive(Debug, Clone)]
pub struct HypsometryTyped {
    /// The file, relative to the scenario.
    pub file: String,
    /// The key that names it.
    pub key: &'static str,
    form: Form,
}

#[derive(Debug, Clone)]
enum Form {
    Bands(BandColumns),
    Curve(CurveColumns),
}

impl HypsometryTyped {
    /// Letters of the file.
    pub fn encoding(&self) -> Encoding {
        match &self.form {
            Form::Bands(columns) => columns.format.encoding,
            Form::Curve(columns) => columns.format.encoding,
        }
    }

    /// Columns of the file that are not read although their names come near to one that says what lies under the snow.
    pub fn unlikely(&self, file: &str, text: &str) -> Vec<Unlikely> {
        let Form::Bands(columns) = &self.form else { return Vec::new() };
        let Some(Unread { columns, ground_without_column }) = columns.unread(file, text) else {
            return Vec::new();
        };
        let meant = |name: &str| {
            let word = ground_without_column.iter().find(|words| shares_a_word(name, words));
            let usual: Vec<String> = ground_without_column.iter().map(|words| words.join("_")).collect();
            let near =
                nearest(name, usual.iter().map(String::as_str)).filter(|_| name.len() >= LEAST_LETTERS);
            word.map(|words| words.join("_")).or(near.map(str::to_owned))
        };
        let unread = columns.iter().filter_map(|name| Some((name, meant(name)?)));
        let why = |(name, meant): (&String, String)| {
            let why = format!("the column '{name}' of {file} is not used; did you mean {meant}?");
            Unlikely::new(self.key, why)
        };
        unread.map(why).collect()
    }

    /// The bands that the file's text holds.
    ///
    /// # Errors
    /// Every fault of the file, which is called `file` in them.
    pub fn bands(&self, file: &str, text: &str) -> Result<Vec<Band>, Vec<Fault>> {
        match &self.form {
            Form::Bands(columns) => read_bands(file, text, columns),
            Form::Curve(columns) => read_curve(file, text, columns),
        }
    }
}

/// A name of fewer letters comes near to anything.
const LEAST_LETTERS: usize = 4;

/// Whether one of a name's words, capitals or not, is that of a ground column; a unit is none, but for a variation's.
fn shares_a_word(name: &str, [word, unit]: &[&str; 2]) -> bool {
    let name = name.to_lowercase();
    let mut words = name.split(|sign: char| !sign.is_alphanumeric());
    words.any(|of_name| of_name == *word || of_name == *unit && *unit == "cv")
}

/// The height of the bands to cut from a curve.
const BAND_THICKNESS: Height = Height {
    metres: "band_thickness_m",
    feet: "band_thickness_ft",
    range_m: 1.0..=2000.0,
    from: " from edge to edge",
    hint: "; 100 m is usual",
};

const EXPECTED: &str =
    "the path of a CSV file with lower_m, upper_m, area_km2 (or lower_ft, upper_ft, area_mi2)";

pub(super) fn read_hypsometry(section: &mut Section<'_>) -> Option<HypsometryTyped> {
    let has_curve = section.has("area_elevation_curve");
    if has_curve && section.has("bands") {
        section.fault(Fault::key(
            section.path_of("area_elevation_curve"),
            "area_elevation_curve beside bands",
            "one of the two",
            "take one of them out",
        ));
    }
    if has_curve {
        section.knows("bands");
        return read_curve_table(section.section("area_elevation_curve"));
    }
    section.knows("area_elevation_curve");
    if section.is_table("bands") {
        return read_bands_table(section.section("bands"));
    }
    let file = section.required_text(
        "bands",
        EXPECTED,
        "add bands = \"bands.csv\", or area_elevation_curve = { ... }",
    );
    let key = "basin.bands";
    section.names_file(key, file.as_deref());
    Some(HypsometryTyped { file: file?, key, form: Form::Bands(BandColumns::default()) })
}

fn read_bands_table(mut section: Section<'_>) -> Option<HypsometryTyped> {
    let key = "basin.bands.file";
    let file = section.required_text("file", "the path of a CSV file", "add file = \"bands.csv\"");
    section.names_file(key, file.as_deref());
    let lower = column(&mut section, "lower", &LengthUnit::NAMES);
    let upper = column(&mut section, "upper", &LengthUnit::NAMES);
    let area = column(&mut section, "area", &AreaUnit::NAMES);
    let mean = column(&mut section, "mean", &LengthUnit::NAMES);
    let ground = read_ground(&mut section);
    let format = read_layout(&mut section);
    section.finish();
    let columns = BandColumns {
        lower: lower?,
        upper: upper?,
        area: area?,
        mean: mean?,
        ground: ground?,
        format: format?,
    };
    Some(HypsometryTyped { file: file?, key, form: Form::Bands(columns) })
}

fn read_ground(section: &mut Section<'_>) -> Option<GroundColumns> {
    let slope = column(section, "slope", &ANGLE_NAMES);
    let aspect = column(section, "aspect", &ANGLE_NAMES);
    let canopy = column(section, "canopy", &ShareUnit::NAMES);
    let accumulation = column(section, "accumulation", &VARIATION_NAMES);
    Some(GroundColumns { slope: slope?, aspect: aspect?, canopy: canopy?, accumulation: accumulation? })
}

fn read_curve_table(mut section: Section<'_>) -> Option<HypsometryTyped> {
    let key = "basin.area_elevation_curve.file";
    let file = section.required_text("file", "the path of a CSV file", "add file = \"curve.csv\"");
    section.names_file(key, file.as_deref());
    let band_thickness_m = section.required_height(&BAND_THICKNESS);
    let elevation = column(&mut section, "elevation", &LengthUnit::NAMES);
    let area_below = column(&mut section, "area_below", &AreaUnit::NAMES);
    let format = read_layout(&mut section);
    section.finish();
    let columns = CurveColumns {
        elevation: elevation?,
        area_below: area_below?,
        band_thickness_m: band_thickness_m?,
        format: format?,
    };
    Some(HypsometryTyped { file: file?, key, form: Form::Curve(columns) })
}

/// `{ column, unit }`, of which a unit that is the only one may be left out; or where that is not typed a column called by
/// the key and its unit.
fn column<U: Copy>(
    section: &mut Section<'_>,
    key: &'static str,
    units: &[(&'static str, U)],
) -> Option<Column<U>> {
    if !section.has(key) {
        section.knows(key);
        return Some(Column::WithUnit(key));
    }
    let mut inner = section.section(key);
    let column = inner.required_text("column", "the column's name in the header", "add column = \"...\"");
    let unit = match units {
        [(_, only)] if !inner.has("unit") => {
            inner.knows("unit");
            Some(*only)
        }
        _ => inner.required_choice("unit", units),
    };
    inner.finish();
    Some(Column::Stated { column: column?, unit: unit? })
}
