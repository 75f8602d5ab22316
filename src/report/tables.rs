//! Tables as CSV: units in the header, uncertainty beside every estimate, empty where there is no number.
//!
//! One file a table, and one line of `tables`.

mod about;
mod break_even;
mod by_year;
mod cells;
mod criteria;
mod driest_and_wettest;
mod dry_and_warm;
mod elasticities;
mod generator_sheet;
mod ground;
mod inflow_skill;
mod lines;
mod measures;
mod operations;
mod parameter_spread;
mod record_odds;
mod record_range;
mod record_years;
mod replayed_years;
mod response_surface;
mod rule_changes;
mod rule_panel;
mod seasonal_outlook;
mod through_year;
mod volumes;
mod yardsticks;
mod year_classes;

pub(super) use about::about;
pub(super) use cells::{finish, optional, write, yes_or_no};
pub(super) use ground::GroundColumns;

use super::normal::normal_tables;
use super::observed::observed_tables;
use super::study::Study;

/// A file of a report: path within the results and content.
pub type ReportFile = (String, Vec<u8>);

/// Every table of a study.
pub fn tables(study: &Study<'_>) -> Vec<ReportFile> {
    let findings = study.findings;
    let units = study.reader.units;
    let mut tables = measures::measure_tables(findings, units);
    let mut add = |name: &str, table: Vec<u8>| tables.push((format!("tables/{name}.csv"), table));
    add("volumes", volumes::volumes(findings, study.basin.area_km2(), units));
    add("driest-and-wettest", driest_and_wettest::driest_and_wettest(findings, units));
    add("yardsticks", yardsticks::yardsticks(findings, units));
    add("record-range", record_range::record_range(findings, units));
    if let Some(found) = &findings.record_odds {
        add("record-odds", record_odds::record_odds(found, units));
    }
    for (name, table) in findings.by_year.iter().flat_map(|found| by_year::by_year(found, units)) {
        add(name, table);
    }
    if let Some(spread) = &findings.parameter_spread {
        add("parameter-spread", parameter_spread::parameter_spread(spread, units));
        add("variance-with-parameters", parameter_spread::variance_with_parameters(spread, units));
    }
    if let Some(panel) = &findings.rule_panel {
        add("rule-panel", rule_panel::rule_panel(panel, units));
    }
    if let Some(found) = &findings.break_even {
        add("break-even", break_even::break_even(found, units));
    }
    if let Some(surface) = &findings.surface {
        add("response-surface", response_surface::response_surface(surface, units));
        add("response-surface-bands", response_surface::bands(surface, units));
        add("break-even-curve", response_surface::break_even_curve(surface, units));
        add("elasticities", elasticities::elasticities(surface, &study.basin.bands, units));
        if !surface.named.is_empty() {
            add("named-changes", response_surface::named_changes(surface, units));
        }
    }
    if let Some(skill) = findings.operations.as_ref().and_then(|found| found.inflow_skill.as_ref()) {
        add("inflow-skill", inflow_skill::inflow_skill(skill, units));
    }
    if !findings.tipping_levels.is_empty() {
        add("criteria", criteria::criteria(&findings.tipping_levels, units));
    }
    add("swe-through-year", through_year::through_year(&findings.swe_through_year, study.reader));
    if let Some(sheet) = &findings.generator {
        add("generator-sheet", generator_sheet::generator_sheet(sheet, units));
    }
    if let Some(places) = &findings.places {
        if let Some(found) = &places.coincidence {
            add("dry-and-warm", dry_and_warm::dry_and_warm(found, units));
        }
        if let Some(found) = &places.record_coincidence {
            add("dry-and-warm-record", dry_and_warm::dry_and_warm_record(found));
        }
        if let Some(found) = &places.snow_droughts {
            add("snow-droughts", dry_and_warm::snow_droughts(found, units));
        }
        add("swe-change-by-band", lines::swe_change_by_band(places, findings, units));
        add("snow-lines", lines::snow_lines(places, units));
        add("what-decides", lines::what_decides(&places.crossover, units));
        if let Some(found) = &places.at_risk {
            add("at-risk-snow", lines::at_risk_snow(found, units));
        }
    }
    if let Some(found) = &findings.operations {
        for (name, table) in operations::operations(found, units) {
            add(name, table);
        }
        if !found.rule_changes.is_empty() {
            add("rule-changes", rule_changes::rule_changes(&found.rule_changes, units));
        }
        if let Some(classes) = &found.year_classes {
            add("year-classes", year_classes::year_classes(classes, units));
        }
        if let Some(outlook) = &found.outlook {
            add("seasonal-outlook", seasonal_outlook::seasonal_outlook(outlook, units));
        }
    }
    add("record-years", record_years::record_years(study));
    if let Some((record, found)) =
        findings.record.as_ref().and_then(|record| Some((record, record.replayed_years.as_ref()?)))
    {
        add("replayed-years", replayed_years::replayed_years(found, &record.headline, units));
    }
    tables.extend(normal_tables(study));
    tables.extend(observed_tables(&findings.comparisons, units));
    tables
}
