//! `[snow.radiation]` and the other tables of options: a table that is there turns its option on.

use super::section::Section;
use crate::fault::Fault;
use crate::snow::{ColdContent, Patchiness, Radiation, SnowOptions, Sublimation};

/// Months of winter in the northern and in the southern hemisphere, 0 for January: one stated loss holds in these.
const WINTER: [[usize; 5]; 2] = [[10, 11, 0, 1, 2], [4, 5, 6, 7, 8]];

/// Numbers whose range the options themselves check.
const ANY: std::ops::RangeInclusive<f64> = f64::MIN..=f64::MAX;

/// Reads the options, after all other keys of `[snow]`, so that one that stands below an option's line is known for what it is.
pub(super) fn read(section: &mut Section<'_>, is_southern: bool) -> SnowOptions {
    let start_bare_each_year = starts_bare(section);
    SnowOptions {
        radiation: table(section, "radiation", |table| {
            let default = Radiation::FACTOR_MM_PER_C_DAY;
            Some(Radiation { factor_mm_per_c_day: table.number_or("factor_mm_per_c_day", default, ANY, "") })
        }),
        patchiness: table(section, "patchiness", |table| {
            let mend =
                "0.1 for even snow, 0.4 for open hills, 0.8 for wind-blown ridges; there is no default";
            let variation = table.required_number("coefficient_of_variation", 0.0..=3.0, mend);
            let classes =
                table.whole_or("classes", Patchiness::CLASSES as u64, 2..=Patchiness::MOST_CLASSES as u64);
            Some(Patchiness { coefficient_of_variation: variation?, classes: classes as usize })
        }),
        cold_content: table(section, "cold_content", |table| {
            let default = ColdContent::DAILY_SHARE;
            Some(ColdContent { daily_share: table.number_or("daily_share", default, ANY, "") })
        }),
        sublimation: table(section, "sublimation", |table| sublimation(table, is_southern)),
        wet_bulb: table(section, "wet_bulb", |_| Some(())).is_some(),
        start_bare_each_year,
    }
}

fn starts_bare(section: &mut Section<'_>) -> bool {
    let key = "start_bare_each_year";
    if !section.has(key) {
        section.knows(key);
        section.default(key, false);
        return false;
    }
    section.flag(key).unwrap_or(false)
}

/// What a table says, if it is there.
fn table<T>(
    section: &mut Section<'_>,
    key: &'static str,
    read: impl FnOnce(&mut Section<'_>) -> Option<T>,
) -> Option<T> {
    let is_there = section.is_table(key);
    let mut table = section.section(key);
    let read = if is_there { read(&mut table) } else { None };
    table.finish_inside(section);
    read
}

/// One number a day holds in the five months of winter, and in no others.
fn sublimation(table: &mut Section<'_>, is_southern: bool) -> Option<Sublimation> {
    let typed = table.one_or_monthly("mm_per_day", "");
    let is_monthly = table.is_list("mm_per_day");
    let share = table.number("snowfall_fraction");
    if !table.has("mm_per_day") && !table.has("snowfall_fraction") {
        table.fault(Fault::key(
            table.path(),
            "no loss",
            "mm_per_day, snowfall_fraction or both",
            "add mm_per_day = 0.3 for 0.3 mm a day in winter, or twelve numbers, January first",
        ));
        return None;
    }
    let mut mm_per_day = typed.unwrap_or([0.0; 12]);
    if !is_monthly {
        let winter = WINTER[usize::from(is_southern)];
        for (month, mm) in mm_per_day.iter_mut().enumerate() {
            *mm = if winter.contains(&month) { *mm } else { 0.0 };
        }
    }
    Some(Sublimation { mm_per_day, snowfall_fraction: share.unwrap_or(0.0) })
}
