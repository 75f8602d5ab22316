//! The snow model's parameters: what was typed, what may be typed, and the defaults.

use crate::calendar::MonthDay;
use crate::fault::{Fault, Unlikely, within};
use serde::Serialize;

/// How precipitation is split into rain and snow.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(tag = "rule", rename_all = "lowercase")]
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
}

/// Slope of the `tanh` rule over land, per degC (Dai 2008, abstract).
pub(super) const TANH_PER_C: f64 = 0.7;
/// Half snow of the `tanh` rule over land, degC (Dai 2008, abstract).
pub(super) const TANH_MIDDLE_C: f64 = 1.2;

impl PhaseRule {
    /// The `linear` rule between -1 and 3 degC.
    pub const LINEAR: Self = Self::Linear { snow_only_below_c: -1.0, rain_only_above_c: 3.0 };
    /// The `step` rule at 1 degC, the mean over land of the Northern Hemisphere (Jennings et al. 2018).
    pub const STEP: Self = Self::Step { half_snow_at_c: 1.0 };

    /// Share of the precipitation that falls as snow at a daily mean temperature.
    pub fn snow_fraction(self, mean_c: f64) -> f64 {
        match self {
            Self::Linear { snow_only_below_c, rain_only_above_c } => super::linear_snow_fraction(
                mean_c,
                rain_only_above_c,
                1.0 / (rain_only_above_c - snow_only_below_c),
            ),
            Self::Step { half_snow_at_c } => super::step_snow_fraction(mean_c, half_snow_at_c),
            Self::Tanh => super::tanh_snow_fraction(mean_c, TANH_MIDDLE_C, TANH_PER_C),
        }
    }
}

/// How a day's degrees above and below the melt base temperature are counted.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum DegreeRule {
    /// From the daily mean.
    Mean,
    /// From a sine between the daily minimum and maximum.
    Diurnal,
}

/// Parameters as they were typed; none where the default is wanted.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct RawSnow {
    /// Rain and snow.
    pub rain_snow: Option<PhaseRule>,
    /// Degree rule.
    pub degree_rule: Option<DegreeRule>,
    /// Lowest degree-day factor of the year, mm per degC and day.
    pub factor_lowest: Option<f64>,
    /// Highest degree-day factor of the year.
    pub factor_highest: Option<f64>,
    /// The day of the highest factor.
    pub highest_on: Option<MonthDay>,
    /// Melt base temperature, degC.
    pub melt_base_c: Option<f64>,
    /// Liquid held, a fraction of the ice.
    pub liquid_holding_fraction: Option<f64>,
    /// Refreezing, a fraction of the degree-day factor.
    pub refreeze_fraction: Option<f64>,
}

/// Checked parameters.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SnowParams {
    /// Rain and snow.
    pub rain_snow: PhaseRule,
    /// Degree rule; the factors belong to it.
    pub degree_rule: DegreeRule,
    /// Lowest degree-day factor of the year, mm per degC and day.
    pub degree_day_factor_lowest: f64,
    /// Highest degree-day factor of the year, mm per degC and day.
    pub degree_day_factor_highest: f64,
    /// The day of the highest factor.
    pub highest_on: MonthDay,
    /// Melt base temperature, degC.
    pub melt_base_c: f64,
    /// Liquid held, a fraction of the ice.
    pub liquid_holding_fraction: f64,
    /// Refreezing, a fraction of the degree-day factor.
    pub refreeze_fraction: f64,
}

impl SnowParams {
    /// The defaults of a degree rule. They were searched over eight mountain stations and confirmed on eighteen others:
    /// the June factors and the phase lie in published ranges, the winter factor below and refreezing and holding above
    /// theirs, since these stand in for the cold content of the pack.
    pub fn defaults(rule: DegreeRule, is_southern: bool) -> Self {
        let (month, day) = if is_southern { (12, 21) } else { (6, 21) };
        let (lowest, highest, melt_base_c, refreeze_fraction) = match rule {
            DegreeRule::Diurnal => (0.5, 3.5, 1.0, 0.20),
            DegreeRule::Mean => (0.25, 3.0, 0.0, 0.05),
        };
        Self {
            rain_snow: PhaseRule::LINEAR,
            degree_rule: rule,
            degree_day_factor_lowest: lowest,
            degree_day_factor_highest: highest,
            highest_on: MonthDay::new(month, day).unwrap_or_else(|| unreachable!("both dates exist")),
            melt_base_c,
            liquid_holding_fraction: 0.10,
            refreeze_fraction,
        }
    }

    /// Checks what was typed and fills in the defaults of the degree rule.
    ///
    /// Without a stated rule it is `diurnal`, or `mean` where the record has no daily range.
    ///
    /// # Errors
    /// Every value outside its range; a rain/snow range that is empty; a lowest factor above the highest; the
    /// `diurnal` rule without daily minima and maxima.
    pub fn check(
        raw: &RawSnow,
        has_daily_range: bool,
        is_southern: bool,
    ) -> Result<(Self, Vec<Unlikely>), Vec<Fault>> {
        let mut faults = Vec::new();
        let rule =
            raw.degree_rule.unwrap_or(if has_daily_range { DegreeRule::Diurnal } else { DegreeRule::Mean });
        if rule == DegreeRule::Diurnal && !has_daily_range {
            faults.push(Fault::key(
                "snow.degree_rule",
                "\"diurnal\"",
                "\"mean\", since the weather has no daily minimum and maximum",
                "name tmin and tmax in [weather], or take the mean rule",
            ));
        }
        let default = Self::defaults(rule, is_southern);
        let snow = Self {
            rain_snow: raw.rain_snow.unwrap_or(default.rain_snow),
            degree_rule: rule,
            degree_day_factor_lowest: raw.factor_lowest.unwrap_or(default.degree_day_factor_lowest),
            degree_day_factor_highest: raw.factor_highest.unwrap_or(default.degree_day_factor_highest),
            highest_on: raw.highest_on.unwrap_or(default.highest_on),
            melt_base_c: raw.melt_base_c.unwrap_or(default.melt_base_c),
            liquid_holding_fraction: raw.liquid_holding_fraction.unwrap_or(default.liquid_holding_fraction),
            refreeze_fraction: raw.refreeze_fraction.unwrap_or(default.refreeze_fraction),
        };
        snow.check_ranges(&mut faults);
        if faults.is_empty() { Ok((snow, snow.unlikely())) } else { Err(faults) }
    }

    fn check_ranges(&self, faults: &mut Vec<Fault>) {
        const FACTOR: &str = "mm per degC and day";
        let key = |name: &str| format!("snow.degree_day_factor_mm_per_c_day.{name}");
        let (lowest, highest) = (self.degree_day_factor_lowest, self.degree_day_factor_highest);
        within(faults, &key("lowest"), lowest, 0.0..=50.0, FACTOR, "snow melts 1 to 8 mm per degC and day");
        within(faults, &key("highest"), highest, 0.0..=50.0, FACTOR, "snow melts 1 to 8 mm per degC and day");
        if lowest > highest {
            faults.push(Fault::key(
                key("lowest"),
                lowest,
                format!("a number not above the highest factor, {highest}"),
                "exchange the two",
            ));
        }
        within(faults, "snow.melt_base_c", self.melt_base_c, -20.0..=20.0, "degC", "0 to 1 is usual");
        let fraction = "give a fraction, 0.1 for 10 %";
        within(faults, "snow.liquid_holding_fraction", self.liquid_holding_fraction, 0.0..=1.0, "", fraction);
        within(faults, "snow.refreeze_fraction", self.refreeze_fraction, 0.0..=1.0, "", fraction);
        match self.rain_snow {
            PhaseRule::Linear { snow_only_below_c, rain_only_above_c } => {
                let mend = "a few degrees around 1 degC are usual";
                let key = |name: &str| format!("snow.rain_snow.{name}");
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
            PhaseRule::Step { half_snow_at_c } => {
                let mend = "-0.4 to 2.4 degC holds 95 % of stations";
                within(faults, "snow.rain_snow.half_snow_at_c", half_snow_at_c, -20.0..=20.0, "degC", mend);
            }
            PhaseRule::Tanh => {}
        }
    }

    fn unlikely(&self) -> Vec<Unlikely> {
        let mut found = Vec::new();
        if !(1.6..=6.0).contains(&self.degree_day_factor_highest) {
            found.push(Unlikely::new(
                "snow.degree_day_factor_mm_per_c_day.highest",
                format!(
                    "{} mm per degC and day; the usual range is 1.6 to 6.0 (National Engineering Handbook 630, \
                     chapter 11)",
                    self.degree_day_factor_highest
                ),
            ));
        }
        let half_snow_c = match self.rain_snow {
            PhaseRule::Linear { snow_only_below_c, rain_only_above_c } => {
                (snow_only_below_c + rain_only_above_c) / 2.0
            }
            PhaseRule::Step { half_snow_at_c } => half_snow_at_c,
            PhaseRule::Tanh => TANH_MIDDLE_C,
        };
        if !(-0.4..=2.4).contains(&half_snow_c) {
            found.push(Unlikely::new(
                "snow.rain_snow",
                format!(
                    "half of the precipitation is snow at {half_snow_c} degC; 95 % of stations lie between -0.4 and \
                     2.4 degC (Jennings et al. 2018)"
                ),
            ));
        }
        let usual = [
            ("snow.melt_base_c", self.melt_base_c, -1.0..=2.0, "-1 to 2 degC (common practice)"),
            (
                "snow.liquid_holding_fraction",
                self.liquid_holding_fraction,
                0.0..=0.10,
                "up to 0.10: ripe snow holds 0.02 to 0.05 (Singh & Singh 2001, from memory), the defaults 0.10",
            ),
            (
                "snow.refreeze_fraction",
                self.refreeze_fraction,
                0.0..=0.30,
                "up to 0.30: 0.05 is common practice, the defaults reach 0.20 in place of cold content",
            ),
        ];
        for (key, value, range, why) in usual {
            if !range.contains(&value) {
                found.push(Unlikely::new(key, format!("{value}; usual is {why}")));
            }
        }
        found
    }
}
