//! `warming.levels_c`, or `[warming.global]` with levels of global warming.

use super::degrees::{Degrees, FAHRENHEIT_PER_CELSIUS, typed_degrees};
use super::section::Section;
use crate::fault::Fault;
use crate::perturb::GlobalWarming;

/// A level beyond this is no warming that can be meant, degC.
const POSSIBLE_C: std::ops::RangeInclusive<f64> = -10.0..=15.0;
/// A study of more levels than this is a mistyped list.
const MOST_LEVELS: usize = 40;
/// Land has warmed 1.46 times the globe from 1850-1900 to 2011-2020 (IPCC AR6: 1.59 over 1.09 degC).
const USUAL_LOCAL_PER_GLOBAL: std::ops::RangeInclusive<f64> = 0.8..=2.5;
/// Global warming by the middle of any instrumental record so far, degC.
const USUAL_ALREADY_C: std::ops::RangeInclusive<f64> = 0.0..=1.6;

/// How levels are typed.
struct Typed {
    key: &'static str,
    unit: &'static str,
    range: std::ops::RangeInclusive<f64>,
    /// What a level beyond the range may have been meant to be.
    mend: &'static str,
}

const IN_CELSIUS: Typed = Typed {
    key: "levels_c",
    unit: "degC",
    range: POSSIBLE_C,
    mend: "it is degC, not percent; levels_f = [...] takes degF",
};
/// The same range in degF.
const IN_FAHRENHEIT: Typed = Typed {
    key: "levels_f",
    unit: "degF",
    range: -18.0..=27.0,
    mend: "it is degF that are added, not a temperature or percent",
};

/// The levels in the order in which they were typed, as warming of the basin, degC.
pub(super) struct Levels {
    pub typed_c: Vec<f64>,
    pub global: Option<GlobalWarming>,
}

pub(super) fn read_levels(section: &mut Section<'_>) -> Option<Levels> {
    let own = ["levels_c", "levels_f"].map(|key| section.has(key));
    if section.has("global") {
        if let Some((key, _)) = ["levels_c", "levels_f"].iter().zip(own).find(|(_, is_typed)| *is_typed) {
            section.fault(Fault::key(
                section.path_of(key),
                format!("{key} beside [warming.global]"),
                "one of the two",
                "levels of the basin's own warming, or of global warming: take one out",
            ));
        }
        section.knows("levels_c");
        section.knows("levels_f");
        return read_global(section.section("global"));
    }
    section.knows("global");
    let typed_c = match typed_degrees(section, "levels_c", "levels_f") {
        Degrees::Both => None,
        Degrees::Fahrenheit => {
            let levels = section.numbers("levels_f");
            let typed = levels.and_then(|levels| check(section, &IN_FAHRENHEIT, levels));
            typed.map(|levels| levels.into_iter().map(|level| level / FAHRENHEIT_PER_CELSIUS).collect())
        }
        Degrees::Celsius => {
            section.numbers("levels_c").and_then(|levels| check(section, &IN_CELSIUS, levels))
        }
        Degrees::Neither => {
            section.default("levels_c", "[0, 1, 2, 3, 4]");
            Some(vec![0.0, 1.0, 2.0, 3.0, 4.0])
        }
    };
    Some(Levels { typed_c: typed_c?, global: None })
}

fn read_global(mut section: Section<'_>) -> Option<Levels> {
    let levels = section.numbers("levels_c");
    if levels.is_none() && !section.has("levels_c") {
        section.fault(Fault::key(
            section.path_of("levels_c"),
            "no 'levels_c'",
            "levels of global warming above 1850-1900, degC",
            "for example levels_c = [1.5, 2, 3]",
        ));
    }
    let levels = levels.and_then(|levels| check(&section, &IN_CELSIUS, levels));
    let local_per_global = section.required_number(
        "local_per_global",
        0.1..=5.0,
        "degrees that the basin warms per degree of global warming; land as a whole 1.46 so far (IPCC AR6)",
    );
    let already = section.required_number(
        "already_in_record_global_c",
        -1.0..=5.0,
        "global warming above 1850-1900 that the record already holds, at its mid-year: 1.09 for 2011-2020 (IPCC AR6)",
    );
    if local_per_global.is_some_and(|ratio| !USUAL_LOCAL_PER_GLOBAL.contains(&ratio)) {
        section.unlikely("local_per_global", "outside 0.8 to 2.5; land as a whole has 1.46 (IPCC AR6)");
    }
    if already.is_some_and(|already_c| !USUAL_ALREADY_C.contains(&already_c)) {
        section.unlikely(
            "already_in_record_global_c",
            "outside 0 to 1.6 degC; 2011-2020 was 1.09 above 1850-1900 (IPCC AR6)",
        );
    }
    let global = local_per_global.zip(already).map(|(local_per_global, already_in_record_c)| GlobalWarming {
        local_per_global,
        already_in_record_c,
    });
    let local = levels.zip(global).and_then(|(levels, global)| {
        let typed_c: Vec<f64> = levels.into_iter().map(|level_c| global.local_c(level_c)).collect();
        let Some(beyond_c) = typed_c.iter().find(|level_c| !POSSIBLE_C.contains(level_c)) else {
            return Some(Levels { typed_c, global: Some(global) });
        };
        section.fault(Fault::key(
            section.path_of("levels_c"),
            format!("a level that is {beyond_c:.1} degC of the basin's own"),
            "a warming of the basin from -10 to 15 degC",
            "check local_per_global and already_in_record_global_c",
        ));
        None
    });
    section.finish();
    local
}

/// Every level within its range and once.
fn check(section: &Section<'_>, typed: &Typed, levels: Vec<f64>) -> Option<Vec<f64>> {
    let mut sound = true;
    let mut complain = |at: usize, found: String, expected: &str, mend: &str| {
        section.fault(Fault::key(section.path_of(&format!("{}[{at}]", typed.key)), found, expected, mend));
        sound = false;
    };
    for (at, level) in levels.iter().enumerate() {
        if !typed.range.contains(level) {
            let expected =
                format!("a warming from {} to {} {}", typed.range.start(), typed.range.end(), typed.unit);
            complain(at, level.to_string(), &expected, typed.mend);
        } else if levels[..at].contains(level) {
            complain(at, format!("{level} a second time"), "each level once", "take one of them out");
        }
    }
    if levels.is_empty() || levels.len() > MOST_LEVELS {
        let found = format!("{} levels", levels.len());
        section.fault(Fault::key(
            section.path_of(typed.key),
            found,
            format!("1 to {MOST_LEVELS} levels"),
            format!("for example {} = [0, 1, 2, 3]", typed.key),
        ));
        sound = false;
    }
    sound.then(|| levels.into_iter().map(|level| level + 0.0).collect())
}
