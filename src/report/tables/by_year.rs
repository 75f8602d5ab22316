//! What single years say: a table each for variance by averaging period, low-snow odds, worst years, runs, tails, detection.

use super::cells::{Told, finish, name, optional, outweighs, write};
use crate::findings::{ByYear, HoldsMost, Ranged, TYPES, YearTypes};
use crate::units::UnitSystem;
use csv::Writer;

/// The tables, each with its name.
pub(super) fn by_year(found: &ByYear, units: UnitSystem) -> Vec<(&'static str, Vec<u8>)> {
    let mut tables = vec![
        ("variance-by-averaging-period", partitions(found, units)),
        ("tails", tails(found, units)),
        ("change-against-spread", detection(found, units)),
    ];
    if found.measures.iter().any(|measure| !measure.types.is_empty()) {
        tables.push(("year-types", year_types(found, units)));
    }
    if found.low_snow.is_some() {
        tables.push(("low-snow-odds", low_snow(found, units)));
        tables.push(("low-snow-in-the-record", low_snow_in_the_record(found, units)));
    }
    if !found.worst_years.is_empty() {
        tables.push(("worst-years", worst_years(found, units)));
    }
    if found.low_runs.is_some() {
        tables.push(("low-runs", low_runs(found, units)));
    }
    tables
}

/// `x`, `x_q05`, `x_q95`.
fn columns(name: &str) -> [String; 3] {
    ["", "_q05", "_q95"].map(|end| format!("{name}{end}"))
}

fn ranged(found: Option<Ranged>) -> [String; 3] {
    in_units(found, |value| value)
}

fn in_units(found: Option<Ranged>, told: impl Fn(f64) -> f64) -> [String; 3] {
    [found.map(|f| f.value), found.and_then(|f| f.q05), found.and_then(|f| f.q95)]
        .map(|number| optional(number.map(&told)))
}

fn table(header: impl IntoIterator<Item = String>, rows: impl IntoIterator<Item = Vec<String>>) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    write(&mut writer, &header.into_iter().collect::<Vec<_>>());
    rows.into_iter().for_each(|row| write(&mut writer, &row));
    finish(writer)
}

fn texts<const N: usize>(names: [&str; N]) -> Vec<String> {
    names.map(str::to_owned).into()
}

/// One row a measure, level and averaging period; the five parts of one row add up to 1, and so do level, chance (realization
/// and year) and interaction (both by level), which are what the warming is held against.
fn partitions(found: &ByYear, units: UnitSystem) -> Vec<u8> {
    let warming = units.warming();
    let mut header = vec!["measure".to_owned(), format!("level_{}", warming.suffix)];
    header.extend(texts(["averaged_years", "periods_per_realization", "years_left_over"]));
    for share in ["level", "realization", "level_by_realization", "year", "level_by_year"] {
        header.extend(columns(&format!("share_{share}")));
    }
    for share in ["chance", "interaction"] {
        header.extend(columns(&format!("share_{share}")));
    }
    header.extend(columns("level_less_largest_other"));
    header.extend(texts(["warming_holds_most", "warming_holds_most_from_years"]));
    let mut rows = Vec::new();
    for measure in &found.measures {
        for partition in &measure.partitions {
            let (word, from) = match partition.warming_holds_most {
                HoldsMost::Always => ("always", None),
                HoldsMost::From { years, .. } => ("from", Some(years)),
                HoldsMost::PerhapsFrom { years } => ("perhaps from", Some(years)),
                HoldsMost::Never => ("never", None),
                HoldsMost::CannotTell => ("cannot tell", None),
            };
            for period in &partition.periods {
                let mut row = vec![name(&measure.measure, units), warming.of(partition.level_c).to_string()];
                let counts = [period.years, period.periods_per_realization, period.years_left_over];
                row.extend(counts.map(|count| count.to_string()));
                row.extend(ranged(Some(period.level)));
                row.extend(ranged(Some(period.realization)));
                row.extend(ranged(Some(period.level_by_realization)));
                row.extend(ranged(period.year));
                row.extend(ranged(period.level_by_year));
                row.extend(ranged(Some(period.chance)));
                row.extend(ranged(Some(period.interaction)));
                row.extend(ranged(Some(period.level_less_largest_other)));
                row.push(word.to_owned());
                row.push(from.map_or(String::new(), |years| years.to_string()));
                rows.push(row);
            }
        }
    }
    table(header, rows)
}

/// One row a measure, level and type, from the driest; the upper limits of a type are empty for the wettest.
fn year_types(found: &ByYear, units: UnitSystem) -> Vec<u8> {
    let warming = units.warming();
    let depth = units.depth().suffix;
    let mut header =
        vec!["measure".to_owned(), format!("level_{}", warming.suffix), "fifth_of_the_reference".to_owned()];
    header.push(format!("upper_limit_{depth}"));
    header.extend(columns("share"));
    header.push("share_bound".to_owned());
    header.extend(columns(&format!("upper_limit_that_keeps_the_share_{depth}")));
    let rows = found.measures.iter().flat_map(|measure| {
        let told = Told { units, kind: measure.measure.kind };
        let own = measure.types.iter().find(|level| level.is_reference);
        measure.types.iter().flat_map(move |level| {
            (0..TYPES).map(move |at| {
                let limit = |of: Option<&YearTypes>| of.and_then(|of| of.kept_limits.get(at)).copied();
                let mut row = vec![name(&measure.measure, units), warming.of(level.level_c).to_string()];
                row.push((at + 1).to_string());
                row.push(optional(limit(own).map(|limit| told.in_units(limit.value))));
                row.extend(ranged(Some(level.shares[at])));
                row.push(optional(level.bounds[at]));
                row.extend(in_units(limit(Some(level)), |value| told.in_units(value)));
                row
            })
        })
    });
    table(header, rows)
}

/// One row a measure and level.
fn tails(found: &ByYear, units: UnitSystem) -> Vec<u8> {
    let warming = units.warming();
    let depth = units.depth().suffix;
    let mut header = vec!["measure".to_owned(), format!("level_{}", warming.suffix)];
    for number in ["q10", "q90", "standard_deviation"] {
        header.extend(columns(&format!("{number}_{depth}")));
    }
    for number in ["q10", "q90", "standard_deviation"] {
        header.extend(columns(&format!("change_of_{number}_{depth}")));
    }
    let rows = found.measures.iter().flat_map(|measure| {
        let told = Told { units, kind: measure.measure.kind };
        measure.tails.iter().map(move |tails| {
            let mut row = vec![name(&measure.measure, units), warming.of(tails.level_c).to_string()];
            for number in [tails.q10, tails.q90, tails.standard_deviation] {
                row.extend(in_units(Some(number), |value| told.in_units(value)));
            }
            let change = tails.change;
            for number in [change.map(|c| c.q10), change.map(|c| c.q90), change.map(|c| c.standard_deviation)]
            {
                row.extend(in_units(number, |value| told.in_units(value)));
            }
            row
        })
    });
    table(header, rows)
}

/// One row a measure, averaging period and level.
fn detection(found: &ByYear, units: UnitSystem) -> Vec<u8> {
    let warming = units.warming();
    let mut header = texts(["measure", "averaged_years", "means"]);
    header.push(format!("level_{}", warming.suffix));
    header.extend(columns("change_to_standard_deviation"));
    header.extend(columns("change_to_standard_deviation_of_changes"));
    header.push("leaves_spread".to_owned());
    header.extend(
        ["from", "until", "from_q05", "from_q95"]
            .map(|end| format!("leaves_spread_{end}_{}", warming.suffix)),
    );
    header.extend(columns("calendar_year"));
    let mut rows = Vec::new();
    for measure in &found.measures {
        for period in measure.detection.iter().flat_map(|detection| &detection.periods) {
            for level in &period.levels {
                let mut row = vec![name(&measure.measure, units)];
                row.extend([period.years, period.means].map(|count| count.to_string()));
                row.push(warming.of(level.level_c).to_string());
                row.extend(ranged(level.unpaired));
                row.extend(ranged(level.paired));
                row.extend(outweighs(period.leaves_spread, units));
                let range = period.leaves_spread_range;
                row.extend(
                    [range.and_then(|r| r.q05_c), range.and_then(|r| r.q95_c)]
                        .map(|end| optional(end.map(|c| warming.of(c)))),
                );
                row.extend(ranged(period.calendar_year));
                rows.push(row);
            }
        }
    }
    table(header, rows)
}

/// One row a level.
fn low_snow(found: &ByYear, units: UnitSystem) -> Vec<u8> {
    let (warming, depth) = (units.warming(), units.depth());
    let mut header = vec![format!("level_{}", warming.suffix), "below_quantile".to_owned()];
    header.extend(columns(&format!("below_{}", depth.suffix)));
    header.extend(texts(["low_years", "years"]));
    header.extend(columns("chance"));
    header.push("chance_bound".to_owned());
    header.extend(columns("chance_ratio_to_reference"));
    header.extend(columns("chance_ratio_of_record_climate_to_level"));
    header.extend(columns("attributable_fraction_of_record_climate"));
    header.push("reference_years_at_limit".to_owned());
    let rows = found.low_snow.iter().flat_map(|low| {
        low.levels.iter().map(move |level| {
            let colder = low.without_warming.iter().find(|of| of.level_c == level.level_c);
            let mut row = vec![warming.of(level.level_c).to_string(), low.below_quantile.to_string()];
            row.extend(in_units(Some(low.below_mm), |mm| depth.of(mm)));
            row.extend([level.low_years, low.years].map(|count| count.to_string()));
            row.extend(ranged(Some(level.chance)));
            row.push(optional(level.bound));
            row.extend(ranged(Some(level.chance_ratio)));
            row.extend(ranged(colder.and_then(|of| of.chance_ratio)));
            row.extend(ranged(colder.and_then(|of| of.attributable_fraction)));
            row.push(low.years_at_limit.to_string());
            row
        })
    });
    table(header, rows)
}

/// One row a level: the record's own years.
fn low_snow_in_the_record(found: &ByYear, units: UnitSystem) -> Vec<u8> {
    let warming = units.warming();
    let mut header = vec![format!("level_{}", warming.suffix)];
    header.extend(texts([
        "low_years",
        "years",
        "share",
        "share_wilson_95_low",
        "share_wilson_95_high",
        "chance_ratio_to_reference",
        "chance_ratio_katz_95_low",
        "chance_ratio_katz_95_high",
    ]));
    let record = found.low_snow.iter().filter_map(|low| low.record.as_ref());
    let rows = record.flat_map(|record| {
        record.levels.iter().map(move |level| {
            let mut row = vec![warming.of(level.level_c).to_string()];
            row.extend([level.low_years, record.years].map(|count| count.to_string()));
            row.push((level.low_years as f64 / record.years as f64).to_string());
            row.extend(level.wilson_95.map(|end| end.to_string()));
            let ratio = level.chance_ratio;
            row.extend(
                [ratio.map(|r| r.ratio), ratio.map(|r| r.low_95), ratio.map(|r| r.high_95)].map(optional),
            );
            row
        })
    });
    table(header, rows)
}

/// One row a year of the record and level; no return period is rarer than one in all simulated years.
fn worst_years(found: &ByYear, units: UnitSystem) -> Vec<u8> {
    let (warming, depth) = (units.warming(), units.depth());
    let mut header = vec!["water_year".to_owned(), format!("swe_{}", depth.suffix)];
    header.push(format!("level_{}", warming.suffix));
    header.extend(texts(["record_years_as_low", "record_years", "years_as_low", "simulated_years"]));
    header.extend(columns("chance"));
    header.push("chance_bound".to_owned());
    header.extend(columns("return_period_years"));
    let rows = found.worst_years.iter().flat_map(|year| {
        year.levels.iter().map(move |level| {
            let mut row = vec![year.water_year.to_string(), depth.of(year.swe_mm).to_string()];
            row.push(warming.of(level.level_c).to_string());
            let counts =
                [year.record_years_as_low, year.record_years, level.years_as_low, found.simulated_years];
            row.extend(counts.map(|count| count.to_string()));
            row.extend(ranged(Some(level.chance)));
            row.push(optional(level.bound));
            row.extend(ranged(level.return_period_years));
            row
        })
    });
    table(header, rows)
}

/// One row a length of run and level.
fn low_runs(found: &ByYear, units: UnitSystem) -> Vec<u8> {
    let (warming, depth) = (units.warming(), units.depth());
    let mut header = texts(["low_years_in_a_row", "at_or_below_quantile"]);
    header.extend(columns(&format!("at_or_below_{}", depth.suffix)));
    header.push(format!("level_{}", warming.suffix));
    header.push("realizations".to_owned());
    header.extend(columns("chance"));
    header.push("chance_bound".to_owned());
    header.push(format!("first_at_level_{}", warming.suffix));
    let rows = found.low_runs.iter().flat_map(|runs| {
        runs.lengths.iter().flat_map(move |length| {
            length.levels.iter().map(move |level| {
                let mut row = vec![length.years.to_string(), runs.at_or_below_quantile.to_string()];
                row.extend(in_units(Some(runs.at_or_below_mm), |mm| depth.of(mm)));
                row.push(warming.of(level.level_c).to_string());
                row.push(level.realizations.to_string());
                row.extend(ranged(Some(level.chance)));
                row.push(optional(level.bound));
                row.push(optional(length.first_at_level_c.map(|c| warming.of(c))));
                row
            })
        })
    });
    table(header, rows)
}
