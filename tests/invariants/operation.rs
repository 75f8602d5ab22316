//! Routing, storage and their measures against a second, naive writing of them; and levels that do not know of each other.

use super::cases;
use super::operated::{Operating, operating, storing};
use crate::naive_operation::{self as naive, Named};
use proptest::prelude::*;
use thawline::operation::Change;
use thawline::season::Measure;

/// Days, of which rounding makes no other.
fn is_whole(name: &str) -> bool {
    name == "fill_day" || name.ends_with("_days") && name != "flood_space_encroached_days"
}

/// 1e-9 of the value or of 1: some thousand roundings of numbers below 1e4.
fn agree(names: &[String], found: &[f64], expected: &Named) -> Result<(), TestCaseError> {
    prop_assert_eq!(names.len(), expected.len(), "every measure is checked");
    prop_assert_eq!(names.len(), found.len());
    for (name, expected) in expected {
        let at = names.iter().position(|of| of == name);
        let found = found[at.unwrap_or_else(|| panic!("no measure '{name}'"))];
        let allowed = if is_whole(name) { 0.0 } else { 1e-9 * expected.abs().max(1.0) };
        prop_assert!(
            found == *expected || (found - expected).abs() <= allowed,
            "{name}: {found} for {expected}"
        );
    }
    Ok(())
}

fn names(measures: impl IntoIterator<Item = Measure>) -> Vec<String> {
    measures.into_iter().map(|measure| measure.name.clone()).collect()
}

fn all_levels(operating: &Operating) -> Vec<usize> {
    (0..operating.months_mm.len()).collect()
}

proptest! {
    #![proptest_config(cases(96))]

    /// Every measure of every level, year and change is what its definition gives: days to the day, the rest to 1e-9.
    #[test]
    fn operation_is_its_definition(operating in operating()) {
        let operation = &operating.operation;
        if let Some(reservoir) = &operation.reservoir {
            prop_assert_eq!(reservoir.check(), Ok(()));
        }
        let levels = all_levels(&operating);
        let found = operating.run(&levels);
        let (yearly, over_years) = (names(operation.yearly()), names(operation.over_years()));
        let changed = names(thawline::operation::Operation::of_changes().into_iter().map(|(measure, _)| measure));
        let (years, tried) = (operating.months_mm[0].len(), operation.tried().len());
        prop_assert_eq!(found.yearly.len(), levels.len() * years * yearly.len());
        prop_assert_eq!(found.over_years.len(), levels.len() * over_years.len());
        prop_assert_eq!(found.changed.len(), levels.len() * tried * changed.len());
        for level in levels {
            let expected = naive::operate(operation, &operating.years(level));
            for (year, expected) in expected.yearly.iter().enumerate() {
                let at = (level * years + year) * yearly.len();
                agree(&yearly, &found.yearly[at..at + yearly.len()], expected)?;
            }
            let at = level * over_years.len();
            agree(&over_years, &found.over_years[at..at + over_years.len()], &expected.over_years)?;
            prop_assert_eq!(expected.changed.len(), tried);
            for (change, expected) in expected.changed.iter().enumerate() {
                let at = (level * tried + change) * changed.len();
                agree(&changed, &found.changed[at..at + changed.len()], expected)?;
            }
        }
    }

    /// A level comes to the same bits alone, among others, and in any order of them.
    #[test]
    fn levels_do_not_know_of_each_other(operating in operating()) {
        let levels = all_levels(&operating);
        let together = operating.run(&levels);
        let backwards: Vec<usize> = levels.iter().rev().copied().collect();
        let backwards = operating.run(&backwards);
        let of = |all: &[f64], level: usize| -> Vec<u64> {
            let each = all.len() / levels.len();
            all[level * each..(level + 1) * each].iter().map(|value| value.to_bits()).collect()
        };
        for level in &levels {
            let (alone, mirrored) = (operating.run(&[*level]), levels.len() - 1 - level);
            for (alone, together, backwards) in [
                (&alone.yearly, &together.yearly, &backwards.yearly),
                (&alone.over_years, &together.over_years, &backwards.over_years),
                (&alone.changed, &together.changed, &backwards.changed),
            ] {
                prop_assert_eq!(of(together, *level), alone.iter().map(|value| value.to_bits()).collect::<Vec<_>>());
                prop_assert_eq!(of(together, *level), of(backwards, mirrored));
            }
        }
    }

    /// A change by nothing changes nothing: refill moved by 0 days, flood space and demand times 1, to the rounding of
    /// capacity less space, 1e-9.
    #[test]
    fn a_change_by_nothing_changes_nothing(operating in storing()) {
        let mut operating = operating;
        operating.operation.changes =
            vec![Change::RefillMovedDays(0), Change::FloodSpaceTimes(1.0), Change::DemandTimes(1.0)];
        let changed = operating.run(&[0]).changed;
        let stated: Vec<f64> = changed[..changed.len() / 4].to_vec();
        for (at, change) in changed.chunks(stated.len()).enumerate().skip(1) {
            for (found, stated) in change.iter().zip(&stated) {
                let allowed = if at == 2 { 1e-9 * stated.abs().max(1.0) } else { 0.0 };
                prop_assert!(found == stated || (found - stated).abs() <= allowed, "{at}: {found} for {stated}");
            }
        }
    }
}
