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
    let [tmin_monthly_shape, tmax_monthly_shape] = read_shapes(&mut section);
    let level_change_pct_per_1000m = read_level_change(&mut section);
    let typed_c = levels.as_ref().map(|levels| levels.typed_c.as_slice());
    let precipitation = read_precipitation_change(&mut section, typed_c, reference_c);
    let wet_day_intensity_pct_per_c = read_intensity(&mut section);
    section.finish();
    let Levels { typed_c: mut levels_c, global } = levels?;
    if !levels_c.contains(&reference_c) {
        levels_c.push(reference_c);
    }
    levels_c.sort_by(f64::total_cmp);
    let reference = levels_c.iter().position(|level| *level == reference_c)?;
    let warming = Warming {
        tmin_monthly_shape,
        tmax_monthly_shape,
        level_change_pct_per_1000m,
        precipitation: precipitation?,
        wet_day_intensity_pct_per_c,
        global,
    };
    Some(WarmingTyped { levels_c, reference, warming })
}

/// Whether mountains warm more than what lies below them is an open question (Pepin et al. 2015, Nature Climate Change 5:424,
/// from memory); the limits are ours.
const USUAL_LEVEL_CHANGE_PCT: std::ops::RangeInclusive<f64> = -30.0..=30.0;

fn read_level_change(section: &mut Section<'_>) -> f64 {
    let key = "level_change_pct_per_1000m";
    let pct = section.number_or(
        key,
        0.0,
        -100.0..=100.0,
        "percent of the level that 1000 m more of elevation add to it; 0 warms every elevation alike",
    );
    if !USUAL_LEVEL_CHANGE_PCT.contains(&pct) {
        section.unlikely(
            key,
            "outside -30 to 30 percent per 1000 m; evidence for warming that changes with elevation is mixed",
        );
    }
    pct
}

/// Extremes of daily precipitation follow the water that air can hold, about 7 % a degree, or somewhat more (IPCC AR6 WGI
/// chapter 11, from memory); a mean wet day less.
const USUAL_INTENSITY_PCT_PER_C: std::ops::RangeInclusive<f64> = 0.0..=10.0;

fn read_intensity(section: &mut Section<'_>) -> Option<f64> {
    let key = "wet_day_intensity_pct_per_c";
    let pct_per_c = section.number_in(
        key,
        -20.0..=20.0,
        "percent per degC; the air can hold about 7 more; leave it out for wet days as they were",
    )?;
    if !USUAL_INTENSITY_PCT_PER_C.contains(&pct_per_c) {
        section.unlikely(
            key,
            "outside 0 to 10 percent per degC; the air can hold about 7 more (Clausius-Clapeyron)",
        );
    }
    Some(pct_per_c)
}

/// Shapes of minima and maxima: one for both, or of their own.
fn read_shapes(section: &mut Section<'_>) -> [[f64; 12]; 2] {
    const EVEN: [f64; 12] = [1.0; 12];
    const TYPED: &str = "[1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1]";
    let both = shape(section, "monthly_shape");
    let own = ["tmin_monthly_shape", "tmax_monthly_shape"].map(|key| shape(section, key));
    if both.is_some() && own.iter().all(Option::is_some) {
        section.fault(Fault::key(
            section.path_of("monthly_shape"),
            "monthly_shape beside those of minima and maxima",
            "one for both, or one for each",
            "take monthly_shape out: the other two stand for all",
        ));
    }
    if both.is_none() && !section.has("monthly_shape") {
        match own {
            [None, None] => section.default("monthly_shape", TYPED),
            [None, Some(_)] => section.default("tmin_monthly_shape", TYPED),
            [Some(_), None] => section.default("tmax_monthly_shape", TYPED),
            [Some(_), Some(_)] => {}
        }
    }
    let shapes = own.map(|own| own.or(both).unwrap_or(EVEN));
    let mean = shapes.iter().map(Warming::yearly_mean).sum::<f64>() / 2.0;
    if (mean - 1.0).abs() > 0.005 {
        let why = format!("averages {mean:.3} over the year's days, so a level of +1 warms the year by that");
        section.unlikely("monthly_shape", why);
    }
    shapes
}

fn shape(section: &mut Section<'_>, key: &'static str) -> Option<[f64; 12]> {
    let shape = section.monthly(key)?;
    if shape.iter().any(|value| !(-10.0..=10.0).contains(value)) {
        section.fault(Fault::key(
            section.path_of(key),
            format!("{shape:?}"),
            "twelve numbers near 1",
            "each is degrees of warming in that month for one degree of the level",
        ));
        return None;
    }
    Some(shape)
}
