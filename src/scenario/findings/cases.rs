//! `[[findings.cases]]`: changes of climate with a name, such as the bounding cases of a plan.

use super::super::degrees::{Degrees, FAHRENHEIT_PER_CELSIUS, typed_degrees};
use super::super::section::Section;
use crate::fault::Fault;
use crate::findings::{Change, ChangeOrigin, NamedChange};
use std::ops::RangeInclusive;

/// A name stands beside a mark.
pub(super) const LONGEST_NAME: usize = 300;
/// What can be meant, degC.
pub(super) const WARMING_C: RangeInclusive<f64> = -10.0..=15.0;
/// What can be meant, percent.
pub(super) const PRECIPITATION_PCT: RangeInclusive<f64> = -90.0..=200.0;

/// Reads all cases; nothing where one has a fault.
pub(super) fn read(sections: Vec<Section<'_>>) -> Option<Vec<NamedChange>> {
    let mut names = Vec::new();
    let cases: Vec<Option<NamedChange>> =
        sections.into_iter().map(|section| read_case(section, &mut names)).collect();
    cases.into_iter().collect()
}

fn read_case(mut section: Section<'_>, names: &mut Vec<String>) -> Option<NamedChange> {
    let name = read_name(&mut section, names);
    let warming_c = match typed_degrees(&mut section, "warming_c", "warming_f") {
        Degrees::Both => None,
        Degrees::Fahrenheit => {
            let range = WARMING_C.start() * FAHRENHEIT_PER_CELSIUS..=WARMING_C.end() * FAHRENHEIT_PER_CELSIUS;
            let typed = section.number_in("warming_f", range, "degF above the record");
            typed.map(|typed| typed / FAHRENHEIT_PER_CELSIUS)
        }
        Degrees::Neither | Degrees::Celsius => {
            section.required_number("warming_c", WARMING_C, "degC above the record, or warming_f")
        }
    };
    let precipitation_change_pct =
        section.required_number("precipitation_change_pct", PRECIPITATION_PCT, "percent, 0 for none");
    section.finish();
    Some(NamedChange {
        name: name?,
        origin: ChangeOrigin::Case,
        change: Change { warming_c: warming_c?, precipitation_change_pct: precipitation_change_pct? },
    })
}

/// A name that no other of the list has; `names` are those before it.
pub(super) fn read_name(section: &mut Section<'_>, names: &mut Vec<String>) -> Option<String> {
    let name = section.required_text("name", "a name", "add name = \"Hot and dry\"")?;
    let is_told = !name.trim().is_empty()
        && !name.chars().any(char::is_control)
        && name.chars().count() <= LONGEST_NAME;
    if !is_told || names.contains(&name) {
        section.fault(Fault::key(
            section.path_of("name"),
            format!("{name:?}"),
            format!("one line of at most {LONGEST_NAME} characters that no other of the list has"),
            "write another",
        ));
        return None;
    }
    names.push(name.clone());
    Some(name)
}
