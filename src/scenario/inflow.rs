//! `[inflow]`: how water input becomes inflow, and what was observed of it.

use super::format::{read_date, read_format};
use super::section::Section;
use super::volumes::Stated;
use crate::fault::Fault;
use crate::inflow::{FlowColumn, FlowColumns, Routing, SlowStore};
use crate::units::FlowUnit;

/// Observed inflow, as typed.
#[derive(Debug, Clone)]
pub struct ObservedInflowTyped {
    /// The file, relative to the scenario.
    pub file: String,
    /// Columns, unit, marks.
    pub columns: FlowColumns,
    /// Whether the routing is fitted to it.
    pub fits: bool,
}

/// Inflow, as typed.
#[derive(Debug, Clone)]
pub struct InflowTyped {
    /// How water input becomes inflow.
    pub routing: Routing,
    /// Volumes of the first window at which one class of years ends and the next begins, ascending, hm3.
    pub year_class_limits_hm3: Vec<f64>,
    /// Observed inflow, if there is any.
    pub observed: Option<ObservedInflowTyped>,
}

/// The key of the file of observed inflow.
pub const OBSERVED_INFLOW_KEY: &str = "inflow.observed.file";

const LIMITS: [&str; 2] = ["year_class_limits_hm3", "year_class_limits_thousand_acre_feet"];

/// Observed inflow stands alone too: its file can be looked into although another key has a fault.
pub(super) fn read(mut section: Section<'_>) -> (Option<ObservedInflowTyped>, Option<InflowTyped>) {
    let is_observed = section.has("observed");
    let observed = if is_observed { read_observed(section.section("observed")) } else { None };
    section.knows("observed");
    let routing = read_routing(&mut section);
    let limits = read_limits(&mut section);
    section.finish();
    let typed = || {
        if is_observed && observed.is_none() {
            return None;
        }
        Some(InflowTyped { routing: routing?, year_class_limits_hm3: limits?, observed: observed.clone() })
    };
    let typed = typed();
    (observed, typed)
}

fn read_routing(section: &mut Section<'_>) -> Option<Routing> {
    let runoff_fraction =
        section.one_or_monthly("runoff_fraction", "a share of the water that reaches the ground");
    if runoff_fraction.is_none() && !section.has("runoff_fraction") {
        section.missing(
            "runoff_fraction",
            "a share from 0 to 1, or twelve, January first",
            "add runoff_fraction = 0.7 where seven tenths of the water that reaches the ground run off",
        );
    }
    let recession_days = if section.has("recession_days") {
        section.number("recession_days")
    } else {
        section.knows("recession_days");
        section.missing(
            "recession_days",
            "a number of days",
            "add recession_days = 5: without rain or melt the inflow falls to 1/e in so many",
        );
        None
    };
    let slow = section.has("slow").then(|| read_slow(section.section("slow")));
    section.knows("slow");
    let slow = match slow {
        None => None,
        Some(slow) => Some(slow?),
    };
    let routing = Routing { runoff_fraction: runoff_fraction?, recession_days: recession_days?, slow };
    match routing.check() {
        Ok(unlikely) => {
            section.notes.unlikely.borrow_mut().extend(unlikely);
            Some(routing)
        }
        Err(faults) => {
            section.notes.faults.borrow_mut().extend(faults);
            None
        }
    }
}

fn read_slow(mut section: Section<'_>) -> Option<SlowStore> {
    let share = section.required_number("share", 0.0..=1.0, "a share of what runs off: share = 0.3");
    let recession_days =
        section.required_number("recession_days", 0.0..=2000.0, "days, more than the quick store's: 60");
    section.finish();
    Some(SlowStore { share: share?, recession_days: recession_days? })
}

fn read_limits(section: &mut Section<'_>) -> Option<Vec<f64>> {
    let has_any = LIMITS.iter().any(|key| section.has(key));
    let Some(Stated { key, typed, value }) = section.volumes(LIMITS) else {
        return (!has_any).then(Vec::new);
    };
    let before = std::iter::once(&0.0).chain(&typed);
    let not_above = before.zip(&typed).position(|(before, limit)| limit <= before);
    let (place, found) = match not_above {
        _ if typed.is_empty() || typed.len() > MOST_LIMITS => {
            (section.path_of(key), format!("{} volumes", typed.len()))
        }
        Some(at) => (section.path_of(&format!("{key}[{at}]")), typed[at].to_string()),
        None => return Some(value),
    };
    section.fault(Fault::key(
        place,
        found,
        format!("one to {MOST_LIMITS} volumes above 0, each larger than the one before"),
        "the volumes of the first window at which one class of years ends and the next begins",
    ));
    None
}

/// More classes than these are none.
const MOST_LIMITS: usize = 9;

fn read_observed(mut section: Section<'_>) -> Option<ObservedInflowTyped> {
    let file = section.required_text(
        "file",
        "the path of a CSV file with observed inflow",
        "add file = \"inflow.csv\"",
    );
    section.names_file(OBSERVED_INFLOW_KEY, file.as_deref());
    let date = read_date(section.section("date"));
    let flow = read_flow(section.required_section("flow"));
    let fits = section.flag("fit").unwrap_or_else(|| {
        if !section.has("fit") {
            section.default("fit", false);
        }
        false
    });
    let format = read_format(&mut section);
    section.finish();
    Some(ObservedInflowTyped {
        file: file?,
        columns: FlowColumns { date: date?, flow: flow?, format: format? },
        fits,
    })
}

fn read_flow(mut section: Section<'_>) -> Option<FlowColumn> {
    let column = section.required_text("column", "the column's name in the header", "add column = \"...\"");
    let unit = section.choice("unit", &FlowUnit::NAMES);
    if unit.is_none() && !section.has("unit") {
        section.required_text(
            "unit",
            "\"m3/s\", \"cfs\", \"hm3/day\" or \"acre-feet/day\"",
            "add unit = \"m3/s\"",
        );
    }
    section.finish();
    Some(FlowColumn { column: column?, unit: unit? })
}
