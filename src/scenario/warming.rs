//! `[warming]`: the levels, and how warming is spread over the year.

use super::levels::{Levels, read_levels};
use super::precipitation_change::read_precipitation_change;
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

pub(super) fn read(mut section: Section<'_>) -> Option<WarmingTyped> {
    let levels = read_levels(&mut section);
    let reference_c =
        section.number_or("reference_c", 0.0, -10.0..=15.0, "the level all others are compared with");
    let both = shape(&mut section, "monthly_shape");
    let tmin = shape(&mut section, "tmin_monthly_shape");
    let tmax = shape(&mut section, "tmax_monthly_shape");
    if both.is_none() && tmin.is_none() && tmax.is_none() && !section.has("monthly_shape") {
        section.default("monthly_shape", "[1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1]");
    }
    let both = both.unwrap_or([1.0; 12]);
    let typed_c = levels.as_ref().map(|levels| levels.typed_c.as_slice());
    let precipitation = read_precipitation_change(&mut section, typed_c, reference_c);
    section.finish();
    let Levels { typed_c: mut levels_c, global } = levels?;
    if !levels_c.contains(&reference_c) {
        levels_c.push(reference_c);
    }
    levels_c.sort_by(f64::total_cmp);
    let reference = levels_c.iter().position(|level| *level == reference_c)?;
    let warming = Warming {
        tmin_monthly_shape: tmin.unwrap_or(both),
        tmax_monthly_shape: tmax.unwrap_or(both),
        precipitation: precipitation?,
        global,
    };
    Some(WarmingTyped { levels_c, reference, warming })
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
