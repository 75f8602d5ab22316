//! `[warming]`: the levels, and how warming is spread over the year.

use super::section::Section;
use crate::fault::Fault;
use crate::perturb::Warming;

/// Warming as typed.
#[derive(Debug, Clone)]
pub struct WarmingTyped {
    /// Levels, ascending, the reference among them, degC.
    pub levels_c: Vec<f64>,
    /// Which of them is the reference.
    pub reference: usize,
    /// Shape and precipitation.
    pub warming: Warming,
}

/// A study of more levels than this is a mistyped list.
const MOST_LEVELS: usize = 40;

pub(super) fn read(mut section: Section<'_>) -> Option<WarmingTyped> {
    let levels = section.numbers("levels_c");
    let levels_c = match levels {
        Some(levels) => check_levels(&section, levels),
        None if section.has("levels_c") => None,
        None => {
            section.default("levels_c", "[0, 1, 2, 3, 4]");
            Some(vec![0.0, 1.0, 2.0, 3.0, 4.0])
        }
    };
    let reference_c =
        section.number_or("reference_c", 0.0, -10.0..=15.0, "the level all others are compared with");
    let both = shape(&mut section, "monthly_shape");
    let tmin = shape(&mut section, "tmin_monthly_shape");
    let tmax = shape(&mut section, "tmax_monthly_shape");
    if both.is_none() && tmin.is_none() && tmax.is_none() && !section.has("monthly_shape") {
        section.default("monthly_shape", "[1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1]");
    }
    let both = both.unwrap_or([1.0; 12]);
    let precipitation_change_pct_per_c = section.number_or(
        "precipitation_change_pct_per_c",
        0.0,
        -50.0..=50.0,
        "percent per degC; the air can hold about 7 more, the global mean rises by 2 to 3",
    );
    section.finish();
    let mut levels_c = levels_c?;
    if !levels_c.contains(&reference_c) {
        levels_c.push(reference_c);
    }
    levels_c.sort_by(f64::total_cmp);
    let reference = levels_c.iter().position(|level| *level == reference_c)?;
    let warming = Warming {
        tmin_monthly_shape: tmin.unwrap_or(both),
        tmax_monthly_shape: tmax.unwrap_or(both),
        precipitation_change_pct_per_c,
    };
    Some(WarmingTyped { levels_c, reference, warming })
}

fn check_levels(section: &Section<'_>, levels: Vec<f64>) -> Option<Vec<f64>> {
    let mut sound = true;
    let mut complain = |at: usize, found: String, expected: &str, mend: &str| {
        section.fault(Fault::key(section.path_of(&format!("levels_c[{at}]")), found, expected, mend));
        sound = false;
    };
    for (at, level) in levels.iter().enumerate() {
        if !(-10.0..=15.0).contains(level) {
            complain(
                at,
                level.to_string(),
                "a warming from -10 to 15 degC",
                "it is degC, not degF or percent",
            );
        } else if levels[..at].contains(level) {
            complain(at, format!("{level} a second time"), "each level once", "take one of them out");
        }
    }
    if levels.is_empty() || levels.len() > MOST_LEVELS {
        let found = format!("{} levels", levels.len());
        section.fault(Fault::key(
            section.path_of("levels_c"),
            found,
            format!("1 to {MOST_LEVELS} levels"),
            "for example levels_c = [0, 1, 2, 3]",
        ));
        sound = false;
    }
    sound.then(|| levels.into_iter().map(|level| level + 0.0).collect())
}

fn shape(section: &mut Section<'_>, key: &'static str) -> Option<[f64; 12]> {
    let shape = section.monthly(key, false)?;
    if shape.iter().any(|value| !(-10.0..=10.0).contains(value)) {
        section.fault(Fault::key(
            section.path_of(key),
            format!("{shape:?}"),
            "twelve numbers near 1",
            "each is degrees of warming in that month for one degree of the level",
        ));
        return None;
    }
    let mean = Warming::yearly_mean(&shape);
    if (mean - 1.0).abs() > 0.005 {
        section.unlikely(
            key,
            format!("averages {mean:.3} over the year's days, so a level of +1 warms the year by that"),
        );
    }
    Some(shape)
}
