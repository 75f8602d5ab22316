//! Cells: a number in the reader's units, empty where there is none, and the names of columns' units.

use crate::findings::{Chance, Crossing, CrossingRange, Distribution, Estimate, Range};
use crate::season::{Kind, Measure, Outcome};
use crate::units::UnitSystem;
use csv::Writer;
use std::borrow::Cow;

/// The name of a measure with the unit in which it is told: `swe_04_01_in`.
pub(super) fn name(measure: &Measure, units: UnitSystem) -> String {
    let (metric, suffix) = match measure.kind {
        Kind::AmountMm => (UnitSystem::Metric.depth().suffix, units.depth().suffix),
        Kind::AmountMmDays => (UnitSystem::Metric.depth_days().suffix, units.depth_days().suffix),
        Kind::VolumeHm3 => (UnitSystem::Metric.volume().suffix, units.volume().suffix),
        Kind::Share | Kind::DayCount | Kind::DayOfWaterYear | Kind::ArrivalDay => {
            return measure.name.clone();
        }
    };
    let name = measure.name.strip_suffix(metric);
    name.map_or_else(|| measure.name.clone(), |name| format!("{name}{suffix}"))
}

/// The units in which measures of a kind are told, for values and for changes: in a header or, where a table holds several
/// kinds, in columns of their own.
pub(super) fn unit_names(kind: Kind, units: UnitSystem) -> [&'static str; 2] {
    match kind {
        Kind::AmountMm => [units.depth().suffix; 2],
        Kind::AmountMmDays => [units.depth_days().suffix; 2],
        Kind::VolumeHm3 => [units.volume().suffix; 2],
        Kind::Share => ["share"; 2],
        Kind::DayCount => ["days"; 2],
        Kind::DayOfWaterYear | Kind::ArrivalDay => ["day_of_water_year", "days"],
    }
}

/// How a measure's values are told.
#[derive(Clone, Copy)]
pub(super) struct Told {
    pub units: UnitSystem,
    pub kind: Kind,
}

impl Told {
    /// A value or a change in the reader's units.
    pub fn in_units(self, value: f64) -> f64 {
        match self.kind {
            Kind::AmountMm => self.units.depth().of(value),
            Kind::AmountMmDays => self.units.depth_days().of(value),
            Kind::VolumeHm3 => self.units.volume().of(value),
            Kind::Share | Kind::DayCount | Kind::DayOfWaterYear | Kind::ArrivalDay => value,
        }
    }

    fn number(self, value: f64) -> String {
        self.in_units(value).to_string()
    }

    /// A number, or the words `none`, `not gone` and `not reached`.
    pub fn outcome(self, outcome: Outcome) -> String {
        match outcome {
            Outcome::Value(value) => self.number(value),
            Outcome::None => "none".to_owned(),
            Outcome::NotGone => "not gone".to_owned(),
            Outcome::NotReached => "not reached".to_owned(),
        }
    }

    pub fn change(self, change: Option<f64>) -> String {
        change.map_or(String::new(), |change| self.number(change))
    }

    pub fn quantiles(self, distribution: &Distribution) -> [String; 5] {
        [distribution.q05, distribution.q25, distribution.q50, distribution.q75, distribution.q95]
            .map(|outcome| self.outcome(outcome))
    }
}

pub(in super::super) fn optional(value: Option<f64>) -> String {
    value.map_or(String::new(), |value| value.to_string())
}

pub(in super::super) fn yes_or_no(is: bool) -> String {
    if is { "yes" } else { "no" }.to_owned()
}

pub(super) fn estimate(estimate: Option<Estimate>) -> [String; 2] {
    [optional(estimate.map(|e| e.value)), optional(estimate.and_then(|e| e.monte_carlo_error))]
}

pub(super) fn chance(chance: Option<Chance>) -> [String; 3] {
    let [value, error] = estimate(chance.map(|chance| chance.estimate));
    [value, error, optional(chance.and_then(|chance| chance.bound))]
}

/// The ends of a range over resampled records, told as changes are.
pub(super) fn range(range: Option<Range>, told: impl Fn(f64) -> f64) -> [String; 2] {
    [range.map(|range| range.q05), range.map(|range| range.q95)].map(|end| optional(end.map(&told)))
}

/// Whether a shift comes to outweigh a spread, `at`, `not reached` or `unknown`, from which warming on, and until which.
pub(super) fn outweighs(crossing: Crossing, units: UnitSystem) -> [String; 3] {
    let (word, from_c, until_c) = match crossing {
        Crossing::At { level_c, until_c } => ("at", Some(level_c), until_c),
        Crossing::NotReached { .. } => ("not reached", None, None),
        Crossing::Unknown => ("unknown", None, None),
    };
    let [from, until] = [from_c, until_c].map(|at_c| optional(at_c.map(|at_c| units.warming().of(at_c))));
    [word.to_owned(), from, until]
}

/// The ends of a crossing's range; empty where it is not known, or not reached.
pub(super) fn crossing_range(range: Option<CrossingRange>, units: UnitSystem) -> [String; 2] {
    [range.and_then(|range| range.q05_c), range.and_then(|range| range.q95_c)]
        .map(|end_c| optional(end_c.map(|end_c| units.warming().of(end_c))))
}

/// Writing to memory cannot fail.
pub(in super::super) fn write(writer: &mut Writer<Vec<u8>>, row: &[String]) {
    for cell in row {
        let _ = writer.write_field(no_formula(cell).as_bytes());
    }
    let _ = writer.write_record(None::<&[u8]>);
}

/// Cells that a spreadsheet would take for the start of a formula begin so (OWASP ASVS 5.0, 1.2.10).
const STARTS_OF_FORMULAS: [char; 7] = ['=', '+', '-', '@', '\t', '\r', '\0'];

/// A name that a spreadsheet would run stands behind an apostrophe; numbers stay as they are.
fn no_formula(cell: &str) -> Cow<'_, str> {
    if cell.starts_with(STARTS_OF_FORMULAS) && cell.parse::<f64>().is_err() {
        Cow::Owned(format!("'{cell}"))
    } else {
        Cow::Borrowed(cell)
    }
}

pub(in super::super) fn finish(writer: Writer<Vec<u8>>) -> Vec<u8> {
    writer.into_inner().unwrap_or_default()
}
