//! Tables as CSV: units in the header, uncertainty beside every estimate, empty where there is no number.

use super::normal::normal_tables;
use super::observed::observed_tables;
use super::study::Study;
use crate::findings::{Chance, Distribution, Estimate, LevelFindings, MeasureFindings};
use crate::season::{Kind, Measure, Outcome};
use crate::units::UnitSystem;
use csv::Writer;

/// A file of a report: path within the results and content.
pub type ReportFile = (String, Vec<u8>);

/// Kinds whose measures share a table, whose numbers have one unit.
const GROUPS: [(&str, &[Kind]); 5] = [
    ("amounts", &[Kind::AmountMm]),
    ("swe-area", &[Kind::AmountMmDays]),
    ("shares", &[Kind::Share]),
    ("day-counts", &[Kind::DayCount]),
    ("dates", &[Kind::DayOfWaterYear, Kind::ArrivalDay]),
];

/// Every table of a study.
pub fn tables(study: &Study<'_>) -> Vec<ReportFile> {
    let findings = study.findings;
    let units = study.reader.units;
    let mut tables = Vec::new();
    for (group, kinds) in GROUPS {
        let basin = findings.basin.iter().map(|measure| (None, measure));
        tables.push((format!("tables/basin-{group}.csv"), table(basin.collect(), units, kinds)));
        let bands = findings.bands.iter().enumerate().flat_map(|(number, band)| {
            band.measures.iter().map(move |measure| (Some((number + 1, &band.band)), measure))
        });
        tables.push((format!("tables/bands-{group}.csv"), table(bands.collect(), units, kinds)));
    }
    tables.push(("tables/record-years.csv".to_owned(), record_years(study)));
    tables.extend(normal_tables(study));
    tables.extend(observed_tables(&findings.comparisons, units));
    tables
}

type Place<'a> = Option<(usize, &'a crate::basin::Band)>;

/// One row a place, measure and level, of the measures of the kinds of a group.
fn table(rows: Vec<(Place<'_>, &MeasureFindings)>, units: UnitSystem, kinds: &[Kind]) -> Vec<u8> {
    let [unit, change_unit] = match kinds[0] {
        Kind::AmountMm => [units.depth().suffix; 2],
        Kind::AmountMmDays => [units.depth_days().suffix; 2],
        Kind::Share => ["share"; 2],
        Kind::DayCount => ["days"; 2],
        Kind::DayOfWaterYear | Kind::ArrivalDay => ["day_of_water_year", "days"],
    };
    let has_bands = rows.iter().any(|(place, _)| place.is_some());
    let mut writer = Writer::from_writer(Vec::new());
    let mut header: Vec<String> = Vec::new();
    if has_bands {
        let (length, area) = (units.elevation().suffix, units.area().suffix);
        header.extend([
            "band".to_owned(),
            format!("lower_{length}"),
            format!("upper_{length}"),
            format!("area_{area}"),
        ]);
    }
    header.extend(["measure".to_owned(), format!("level_{}", units.warming().suffix)]);
    header.extend(["realizations", "realizations_none", "realizations_not_gone"].map(str::to_owned));
    header.push("realizations_not_reached".to_owned());
    header.extend(["q05", "q25", "q50", "q75", "q95"].map(|q| format!("{q}_{unit}")));
    header.push(format!("shift_{change_unit}"));
    header.push(format!("shift_monte_carlo_error_{change_unit}"));
    header.extend(["shift_q05", "shift_q95"].map(|q| format!("{q}_{change_unit}")));
    header.extend(["shift_pairs", "shift_pairs_without_value"].map(str::to_owned));
    if kinds[0].least_reference().is_some() {
        header.push("change_pct".to_owned());
    }
    header.extend(
        [
            "signal_to_half_spread",
            "signal_to_half_spread_monte_carlo_error",
            "signal_to_standard_deviation",
            "signal_to_standard_deviation_paired",
            "years_none",
            "years_not_gone",
            "years_not_reached",
        ]
        .map(str::to_owned),
    );
    if !has_bands {
        header.extend(["q05", "q25", "q50", "q75", "q95"].map(|q| format!("single_year_{q}_{unit}")));
        for chance in ["period_below_reference", "year_below_reference", "reaches_reference_median"] {
            header.extend(
                ["", "_monte_carlo_error", "_bound_95pct"].map(|end| format!("chance_{chance}{end}")),
            );
        }
    }
    write(&mut writer, &header);
    for (place, measure) in rows.into_iter().filter(|(_, measure)| kinds.contains(&measure.measure.kind)) {
        for level in &measure.levels {
            write(&mut writer, &row(place, &measure.measure, level, units));
        }
    }
    finish(writer)
}

fn row(place: Place<'_>, measure: &Measure, level: &LevelFindings, units: UnitSystem) -> Vec<String> {
    let told = Told { units, kind: measure.kind };
    let mut row = Vec::new();
    if let Some((number, band)) = place {
        row.push(number.to_string());
        row.extend([band.lower_m, band.upper_m].map(|edge_m| units.elevation().of(edge_m).to_string()));
        row.push(units.area().of(band.area_km2).to_string());
    }
    row.extend([name(measure, units), units.warming().of(level.level_c).to_string()]);
    let periods = &level.periods;
    row.extend(
        [periods.count, periods.none, periods.not_gone, periods.not_reached].map(|count| count.to_string()),
    );
    row.extend(told.quantiles(periods));
    let shift = level.shift;
    let median = shift.map(|shift| shift.median);
    let error = median.and_then(|median| median.monte_carlo_error);
    let range = [shift.map(|shift| shift.q05), shift.map(|shift| shift.q95)];
    row.extend([median.map(|median| median.value), error].map(|number| told.change(number)));
    row.extend(range.map(|number| told.change(number)));
    row.extend(
        [shift.map(|shift| shift.pairs), shift.map(|shift| shift.pairs_without_value)]
            .map(|count| count.map_or(String::new(), |count| count.to_string())),
    );
    if measure.kind.least_reference().is_some() {
        row.push(optional(level.percent_change));
    }
    row.extend(estimate(level.signal_to_spread));
    row.push(optional(level.signal_to_noise.and_then(|ratio| ratio.against_reference)));
    row.push(optional(level.signal_to_noise.and_then(|ratio| ratio.paired)));
    let [none, never] = level.years_undefined;
    let [not_gone, not_reached] = if measure.kind == Kind::ArrivalDay { [0, never] } else { [never, 0] };
    row.extend([none, not_gone, not_reached].map(|count| count.to_string()));
    if let Some(single_years) = &level.single_years {
        row.extend(told.quantiles(single_years));
        let chances = level.chances;
        row.extend(chance(chances.and_then(|chances| chances.period_below_reference)));
        row.extend(chance(chances.and_then(|chances| chances.year_below_reference)));
        row.extend(chance(chances.and_then(|chances| chances.reaches_reference_median)));
    }
    row
}

/// The record's years: used or left out, why, and what they measure at the reference.
fn record_years(study: &Study<'_>) -> Vec<u8> {
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

/// The name of a measure with the unit in which it is told: `swe_04_01_in`.
fn name(measure: &Measure, units: UnitSystem) -> String {
    let (metric, suffix) = match measure.kind {
        Kind::AmountMm => (UnitSystem::Metric.depth().suffix, units.depth().suffix),
        Kind::AmountMmDays => (UnitSystem::Metric.depth_days().suffix, units.depth_days().suffix),
        Kind::Share | Kind::DayCount | Kind::DayOfWaterYear | Kind::ArrivalDay => {
            return measure.name.clone();
        }
    };
    let name = measure.name.strip_suffix(metric);
    name.map_or_else(|| measure.name.clone(), |name| format!("{name}{suffix}"))
}

/// How a measure's values are told.
#[derive(Clone, Copy)]
struct Told {
    units: UnitSystem,
    kind: Kind,
}

impl Told {
    fn number(self, value: f64) -> String {
        match self.kind {
            Kind::AmountMm => self.units.depth().of(value).to_string(),
            Kind::AmountMmDays => self.units.depth_days().of(value).to_string(),
            Kind::Share | Kind::DayCount | Kind::DayOfWaterYear | Kind::ArrivalDay => value.to_string(),
        }
    }

    /// A number, or the words `none`, `not gone` and `not reached`.
    fn outcome(self, outcome: Outcome) -> String {
        match outcome {
            Outcome::Value(value) => self.number(value),
            Outcome::None => "none".to_owned(),
            Outcome::NotGone => "not gone".to_owned(),
            Outcome::NotReached => "not reached".to_owned(),
        }
    }

    fn change(self, change: Option<f64>) -> String {
        change.map_or(String::new(), |change| self.number(change))
    }

    fn quantiles(self, distribution: &Distribution) -> [String; 5] {
        [distribution.q05, distribution.q25, distribution.q50, distribution.q75, distribution.q95]
            .map(|outcome| self.outcome(outcome))
    }
}

pub(super) fn optional(value: Option<f64>) -> String {
    value.map_or(String::new(), |value| value.to_string())
}

fn estimate(estimate: Option<Estimate>) -> [String; 2] {
    [optional(estimate.map(|e| e.value)), optional(estimate.and_then(|e| e.monte_carlo_error))]
}

fn chance(chance: Option<Chance>) -> [String; 3] {
    let [value, error] = estimate(chance.map(|chance| chance.estimate));
    [value, error, optional(chance.and_then(|chance| chance.bound))]
}

/// Writing to memory cannot fail.
pub(super) fn write(writer: &mut Writer<Vec<u8>>, row: &[String]) {
    let _ = writer.write_record(row);
}

pub(super) fn finish(writer: Writer<Vec<u8>>) -> Vec<u8> {
    writer.into_inner().unwrap_or_default()
}
