//! Other rules and numbers beside a study's own, published ones where there are such: what each changes, and what is tuned afterwards.

use crate::basin::TemperatureGradient;
use crate::fit::Parameters;
use crate::snow::{PhaseRule, SnowParams};
use serde::Serialize;

/// Temperatures of half snow, degC: the lowest and highest of 95 % of stations, and the mean over land (Jennings et al. 2018, Nat.
/// Commun. 9:1148, abstract).
const HALF_SNOW_C: [f64; 3] = [-0.4, 1.0, 2.4];
/// The same of the wet bulb, degC: half snow at 0.8 (Wang et al. 2019, Geophys. Res. Lett. 46:13825, from memory), and as much on either
/// side as is usual (common practice).
const HALF_SNOW_WET_BULB_C: [f64; 3] = [0.0, 0.8, 1.6];
/// Temperature gradients, degC per km: that of the standard atmosphere, and a mountain one not as steep (Minder et al. 2010, J. Geophys.
/// Res. 115:D14122, from memory: 4 to 5 in the mean of a range's slope).
const GRADIENTS_C_PER_KM: [f64; 2] = [-5.0, -6.5];
/// Numbers that differ by less are the same.
const SAME: f64 = 1e-9;

/// A rule in place of the study's own.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(tag = "rule", rename_all = "snake_case")]
pub enum Rule {
    /// What the study itself runs with.
    StudysOwn,
    /// Rain and snow told apart about another temperature.
    HalfSnowAt {
        /// Half snow, degC.
        temperature_c: f64,
        /// Whether it is the wet bulb's.
        is_wet_bulb: bool,
        /// Whether it is of the linear rule in place of `tanh`, which cannot be moved.
        replaces_tanh: bool,
    },
    /// A degree-day factor that is the same all year.
    ConstantFactor,
    /// A degree-day factor that has a season.
    SeasonalFactor,
    /// Another temperature gradient, the same all year.
    TemperatureGradient {
        /// The gradient, degC per km.
        c_per_km: f64,
    },
}

impl Rule {
    /// Every rule that is not the study's own, with the study's parameters changed by it alone. With radiation the season is the sun's,
    /// and the factor is left as it is.
    pub fn alternatives(own: &Parameters) -> Vec<(Self, Parameters)> {
        let mut all = half_snow(own);
        all.extend(factor(own));
        let constant = own.temperature.is_constant().then(|| own.temperature.tmin_c_per_km[0]);
        let is_other = |c_per_km: &f64| constant.is_none_or(|constant| (constant - c_per_km).abs() > SAME);
        all.extend(GRADIENTS_C_PER_KM.into_iter().filter(is_other).map(|c_per_km| {
            let temperature = TemperatureGradient::constant(c_per_km);
            (Self::TemperatureGradient { c_per_km }, Parameters { temperature, ..own.clone() })
        }));
        all
    }
}

/// A curve that cannot be moved is replaced by the linear rule.
fn half_snow(own: &Parameters) -> Vec<(Rule, Parameters)> {
    let is_wet_bulb = own.snow.options.wet_bulb;
    let published = if is_wet_bulb { HALF_SNOW_WET_BULB_C } else { HALF_SNOW_C };
    let rule = own.snow.rain_snow;
    let others = published.into_iter().filter(|published| (rule.half_snow_c() - published).abs() > SAME);
    others
        .map(|temperature_c| {
            let replaces_tanh = rule == PhaseRule::Tanh;
            let linear = if is_wet_bulb { PhaseRule::LINEAR_WET_BULB } else { PhaseRule::LINEAR };
            let moved = if replaces_tanh { linear } else { rule };
            let snow = SnowParams { rain_snow: moved.with_half_snow_at(temperature_c), ..own.snow };
            (
                Rule::HalfSnowAt { temperature_c, is_wet_bulb, replaces_tanh },
                Parameters { snow, ..own.clone() },
            )
        })
        .collect()
}

/// The mean of the year's lowest and highest factor all year, or about it the season of the defaults.
fn factor(own: &Parameters) -> Option<(Rule, Parameters)> {
    if own.snow.options.radiation.is_some() {
        return None;
    }
    let [lowest, highest] = [own.snow.degree_day_factor_lowest, own.snow.degree_day_factor_highest];
    let mean = (lowest + highest) / 2.0;
    let (rule, lowest, highest) = if highest - lowest > SAME {
        (Rule::ConstantFactor, mean, mean)
    } else {
        // The hemisphere moves the day alone, which stays the study's.
        let usual = SnowParams::defaults(own.snow.degree_rule, false);
        let share = usual.degree_day_factor_lowest / usual.degree_day_factor_highest;
        let highest = 2.0 * mean / (1.0 + share);
        (Rule::SeasonalFactor, share * highest, highest)
    };
    let snow =
        SnowParams { degree_day_factor_lowest: lowest, degree_day_factor_highest: highest, ..own.snow };
    Some((rule, Parameters { snow, ..own.clone() }))
}

/// The parameters with the snow's catch and every melt factor multiplied: by `[1, 1]` they stay what they are.
pub fn retuned(of: &Parameters, [catch, melt]: [f64; 2]) -> Parameters {
    let mut tuned = of.clone();
    tuned.gauge.snow *= catch;
    tuned.snow.degree_day_factor_lowest *= melt;
    tuned.snow.degree_day_factor_highest *= melt;
    if let Some(radiation) = &mut tuned.snow.options.radiation {
        radiation.factor_mm_per_c_day *= melt;
    }
    tuned
}
