//! Which rule tells rain from snow, with its numbers and their valid ranges.

use super::{linear_snow_fraction, s_curve_snow_fraction, step_snow_fraction, tanh_snow_fraction};
use crate::fault::{Fault, Unlikely, within};
use serde::Serialize;

/// How precipitation is split into rain and snow.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(tag = "rule", rename_all = "kebab-case")]
pub enum PhaseRule {
    /// Linear between two temperatures.
    Linear {
        /// Snow only at or below, degC.
        snow_only_below_c: f64,
        /// Rain only at or above, degC.
        rain_only_above_c: f64,
    },
    /// All snow at or below one temperature, all rain above it.
    Step {
        /// The threshold, degC.
        half_snow_at_c: f64,
    },
    /// A smooth curve, with the slope and the middle that Dai (2008) gives for land.
    Tanh,
    /// The curve of Kienzle (2008): half snow at one temperature, and the width of the range that mixes both.
    SCurve {
        /// Half snow, degC.
        half_snow_at_c: f64,
        /// Width of the range with both, degC.
        mixed_range_c: f64,
    },
}

/// Slope of the `tanh` rule over land, per degC (Dai 2008, abstract).
const TANH_PER_C: f64 = 0.7;
/// Half snow of the `tanh` rule over land, degC (Dai 2008, abstract).
const TANH_MIDDLE_C: f64 = 1.2;

impl PhaseRule {
    /// The `linear` rule between -1 and 3 degC.
    pub const LINEAR: Self = Self::Linear { snow_only_below_c: -1.0, rain_only_above_c: 3.0 };
    /// The `linear` rule of wet-bulb temperatures, between -0.2 and 1.8 degC: half snow at 0.8 degC and the slope there are
    /// those of a curve fitted to stations (Wang et al. 2019, Geophys. Res. Lett. 46:13825, from memory).
    pub const LINEAR_WET_BULB: Self = Self::Linear { snow_only_below_c: -0.2, rain_only_above_c: 1.8 };
    /// The `step` rule at 1 degC, the mean over land of the Northern Hemisphere (Jennings et al. 2018).
    pub const STEP: Self = Self::Step { half_snow_at_c: 1.0 };
    /// The `s-curve` rule with half snow at 1 degC and a mixed range of 10 degC.
    pub const S_CURVE: Self = Self::SCurve { half_snow_at_c: 1.0, mixed_range_c: 10.0 };

    /// The two numbers that the rule's function takes: a temperature, degC, and a slope, per degC.
    pub(super) fn numbers(self) -> (f64, f64) {
        match self {
            Self::Linear { snow_only_below_c, rain_only_above_c } => {
                (rain_only_above_c, 1.0 / (rain_only_above_c - snow_only_below_c))
            }
            Self::Step { half_snow_at_c } => (half_snow_at_c, 0.0),
            Self::Tanh => (TANH_MIDDLE_C, TANH_PER_C),
            Self::SCurve { half_snow_at_c, mixed_range_c } => (half_snow_at_c, 1.0 / (1.4 * mixed_range_c)),
        }
    }

    /// Share of the precipitation that falls as snow at a temperature of the day: the air's mean, or the wet bulb's.
    pub fn snow_fraction(self, temperature_c: f64) -> f64 {
        let (warm_c, per_c) = self.numbers();
        match self {
            Self::Linear { .. } => linear_snow_fraction(temperature_c, warm_c, per_c),
            Self::Step { .. } => step_snow_fraction(temperature_c, warm_c),
            Self::Tanh => tanh_snow_fraction(temperature_c, warm_c, per_c),
            Self::SCurve { .. } => s_curve_snow_fraction(temperature_c, warm_c, per_c),
        }
    }

    /// Temperature at which half of the precipitation is snow, degC.
    pub fn half_snow_c(self) -> f64 {
        match self {
            Self::Linear { snow_only_below_c, rain_only_above_c } => {
                (snow_only_below_c + rain_only_above_c) / 2.0
            }
            Self::Step { half_snow_at_c } | Self::SCurve { half_snow_at_c, .. } => half_snow_at_c,
            Self::Tanh => TANH_MIDDLE_C,
        }
    }

    /// The same rule moved to another temperature of half snow, its range as wide as it was; `tanh` stays where it is.
    pub fn with_half_snow_at(self, half_snow_at_c: f64) -> Self {
        match self {
            Self::Linear { snow_only_below_c, rain_only_above_c } => {
                Self::linear_about(half_snow_at_c, rain_only_above_c - snow_only_below_c)
            }
            Self::Step { .. } => Self::Step { half_snow_at_c },
            Self::Tanh => Self::Tanh,
            Self::SCurve { mixed_range_c, .. } => Self::SCurve { half_snow_at_c, mixed_range_c },
        }
    }

    /// Width of the range with both rain and snow, degC; none of `step` and `tanh`.
    pub fn mixed_range_c(self) -> Option<f64> {
        match self {
            Self::Linear { snow_only_below_c, rain_only_above_c } => {
                Some(rain_only_above_c - snow_only_below_c)
            }
            Self::SCurve { mixed_range_c, .. } => Some(mixed_range_c),
            Self::Step { .. } | Self::Tanh => None,
        }
    }

    /// The same rule with another width of its range about the same temperature of half snow.
    pub fn with_mixed_range(self, mixed_range_c: f64) -> Self {
        match self {
            Self::Linear { .. } => Self::linear_about(self.half_snow_c(), mixed_range_c),
            Self::SCurve { half_snow_at_c, .. } => Self::SCurve { half_snow_at_c, mixed_range_c },
            Self::Step { .. } | Self::Tanh => self,
        }
    }

    fn linear_about(half_snow_at_c: f64, mixed_range_c: f64) -> Self {
        Self::Linear {
            snow_only_below_c: half_snow_at_c - mixed_range_c / 2.0,
            rain_only_above_c: half_snow_at_c + mixed_range_c / 2.0,
        }
    }

    pub(super) fn check(self, faults: &mut Vec<Fault>) {
        let key = |name: &str| format!("snow.rain_snow.{name}");
        let of_stations = "-0.4 to 2.4 degC holds 95 % of stations";
        match self {
            Self::Linear { snow_only_below_c, rain_only_above_c } => {
                let mend = "a few degrees around 1 degC are usual";
                within(faults, &key("snow_only_below_c"), snow_only_below_c, -20.0..=20.0, "degC", mend);
                within(faults, &key("rain_only_above_c"), rain_only_above_c, -20.0..=20.0, "degC", mend);
                if snow_only_below_c >= rain_only_above_c {
                    faults.push(Fault::key(
                        key("rain_only_above_c"),
                        rain_only_above_c,
                        format!("a temperature above snow_only_below_c, {snow_only_below_c}"),
                        "for a single threshold take rule = \"step\"",
                    ));
                }
            }
            Self::Step { half_snow_at_c } => {
                within(faults, &key("half_snow_at_c"), half_snow_at_c, -20.0..=20.0, "degC", of_stations);
            }
            Self::Tanh => {}
            Self::SCurve { half_snow_at_c, mixed_range_c } => {
                within(faults, &key("half_snow_at_c"), half_snow_at_c, -20.0..=20.0, "degC", of_stations);
                let mend = "the whole range of daily means with both rain and snow; 8 to 16 is usual";
                within(faults, &key("mixed_range_c"), mixed_range_c, 0.1..=40.0, "degC", mend);
            }
        }
    }

    /// What of the rule is unlikely, of temperatures of the air or of the wet bulb.
    pub(super) fn unlikely(self, is_wet_bulb: bool) -> Option<Unlikely> {
        const KEY: &str = "snow.rain_snow";
        if let Self::SCurve { mixed_range_c, .. } = self
            && !(4.0..=20.0).contains(&mixed_range_c)
        {
            let why = format!("a mixed range of {mixed_range_c} degC; 8 to 16 is usual (common practice)");
            return Some(Unlikely::new(KEY, why));
        }
        // The middle of 0.4 and 4.4 is a bit above 2.4 in binary; nobody typed that bit.
        let half_snow_c = (self.half_snow_c() * 1e9).round() / 1e9;
        let (usual, why) = if is_wet_bulb {
            (0.0..=1.6, "of the wet bulb; 0 to 1.6 degC is usual there (common practice)")
        } else {
            (-0.4..=2.4, "; 95 % of stations lie between -0.4 and 2.4 degC (Jennings et al. 2018)")
        };
        let space = if is_wet_bulb { " " } else { "" };
        (!usual.contains(&half_snow_c)).then(|| {
            Unlikely::new(KEY, format!("half of the precipitation is snow at {half_snow_c} degC{space}{why}"))
        })
    }
}
