//! The snow model's parameters: what was typed, what may be typed, and the defaults.

use super::options::SnowOptions;
use super::phase_rule::PhaseRule;
use crate::calendar::MonthDay;
use crate::fault::{Fault, Unlikely, within};
use serde::Serialize;

/// Degree-day factor of the whole year where radiation brings the season, mm per degC and day. This, the factor of radiation,
/// the melt bases and the refreezing beside them were searched over eight mountain stations, on level ground.
const FACTOR_WITH_RADIATION: f64 = 0.25;
/// Refreezing of so small a factor.
const REFREEZE_WITH_RADIATION: f64 = 0.5;
/// Refreezing where a cold store freezes what it must: common practice.
const REFREEZE_WITH_COLD_CONTENT: f64 = 0.05;

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
    /// Options.
    pub options: SnowOptions,
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
    /// Options.
    #[serde(flatten)]
    pub options: SnowOptions,
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
            options: SnowOptions::default(),
        }
    }

    /// The defaults of a degree rule with options that bring defaults of their own: with radiation the factor does not
    /// change through the year; the wet bulb has a range of its own; with a cold store refreezing need not stand in for it.
    fn defaults_with(rule: DegreeRule, is_southern: bool, options: SnowOptions) -> Self {
        let mut snow = Self { options, ..Self::defaults(rule, is_southern) };
        if options.radiation.is_some() {
            snow.degree_day_factor_lowest = FACTOR_WITH_RADIATION;
            snow.degree_day_factor_highest = FACTOR_WITH_RADIATION;
            snow.refreeze_fraction = REFREEZE_WITH_RADIATION;
            snow.melt_base_c = match rule {
                DegreeRule::Diurnal => 2.0,
                DegreeRule::Mean => 0.5,
            };
        }
        if options.wet_bulb {
            snow.rain_snow = PhaseRule::LINEAR_WET_BULB;
        }
        if options.cold_content.is_some() {
            snow.refreeze_fraction = REFREEZE_WITH_COLD_CONTENT;
        }
        snow
    }

    /// What brings a default that is not the usual one, as a scenario would type it: an option, or the mean rule. `key` is a
    /// key of `[snow]`.
    pub fn brings_default_of(&self, key: &str) -> Option<&'static str> {
        let options = &self.options;
        let (of_factor, of_lowest) = (key.starts_with("degree_day_factor"), !key.ends_with(".highest_on"));
        let with_radiation = key == "refreeze_fraction" || key == "melt_base_c" || of_factor && of_lowest;
        match key {
            "rain_snow" if options.wet_bulb => Some("[snow.wet_bulb]"),
            "refreeze_fraction" if options.cold_content.is_some() => Some("[snow.cold_content]"),
            _ if !with_radiation => None,
            _ if options.radiation.is_some() => Some("[snow.radiation]"),
            _ if self.degree_rule == DegreeRule::Mean => Some("degree_rule = \"mean\""),
            _ => None,
        }
    }

    /// The same at a point, as a snow pillow measures it: without the options that describe an area.
    pub fn at_a_point(self) -> Self {
        Self { options: self.options.at_a_point(), ..self }
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
        let default = Self::defaults_with(rule, is_southern, raw.options);
        // With radiation the factor has no season: one number that is stated is both.
        let is_even = raw.options.radiation.is_some();
        let [lowest, highest] = match (raw.factor_lowest, raw.factor_highest) {
            (Some(only), None) | (None, Some(only)) if is_even => [Some(only); 2],
            stated => stated.into(),
        };
        let snow = Self {
            rain_snow: raw.rain_snow.unwrap_or(default.rain_snow),
            degree_rule: rule,
            degree_day_factor_lowest: lowest.unwrap_or(default.degree_day_factor_lowest),
            degree_day_factor_highest: highest.unwrap_or(default.degree_day_factor_highest),
            highest_on: raw.highest_on.unwrap_or(default.highest_on),
            melt_base_c: raw.melt_base_c.unwrap_or(default.melt_base_c),
            liquid_holding_fraction: raw.liquid_holding_fraction.unwrap_or(default.liquid_holding_fraction),
            refreeze_fraction: raw.refreeze_fraction.unwrap_or(default.refreeze_fraction),
            options: raw.options,
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
        let is_even = self.options.radiation.is_some();
        if lowest > highest && !is_even {
            faults.push(Fault::key(
                key("lowest"),
                lowest,
                format!("a number not above the highest factor, {highest}"),
                "exchange the two",
            ));
        }
        if is_even && lowest != highest {
            faults.push(Fault::key(
                key("lowest"),
                lowest,
                format!("the same as the highest, {highest}, since radiation brings the season"),
                "make both the same, or take [snow.radiation] out: the season must not count twice",
            ));
        }
        within(faults, "snow.melt_base_c", self.melt_base_c, -20.0..=20.0, "degC", "0 to 1 is usual");
        let fraction = "give a fraction, 0.1 for 10 %";
        within(faults, "snow.liquid_holding_fraction", self.liquid_holding_fraction, 0.0..=1.0, "", fraction);
        within(faults, "snow.refreeze_fraction", self.refreeze_fraction, 0.0..=1.0, "", fraction);
        self.rain_snow.check(faults);
        self.options.check(faults);
    }

    fn unlikely(&self) -> Vec<Unlikely> {
        let mut found = Vec::new();
        let factor = self.degree_day_factor_highest;
        let (key, highest, together) = match self.options.radiation {
            None => ("snow.degree_day_factor_mm_per_c_day.highest", factor, ""),
            Some(radiation) => (
                "snow.radiation.factor_mm_per_c_day",
                factor + radiation.factor_mm_per_c_day,
                ", the degree-day factor included,",
            ),
        };
        if !(1.6..=6.0).contains(&highest) {
            found.push(Unlikely::new(
                key,
                format!(
                    "{highest} mm per degC and day{together} at the highest; the usual range is 1.6 to 6.0 (National \
                     Engineering Handbook 630, chapter 11)"
                ),
            ));
        }
        found.extend(self.rain_snow.unlikely(self.options.wet_bulb));
        let (most_refreezing, why_refreezing) = if self.options.radiation.is_some() {
            (0.60, "up to 0.60 of the small factor beside radiation: the default is 0.50")
        } else if self.options.cold_content.is_some() {
            (
                0.15,
                "up to 0.15 beside the cold store, which freezes what it must: the default is 0.05, common practice",
            )
        } else {
            (0.30, "up to 0.30: 0.05 is common practice, the defaults reach 0.20 in place of cold content")
        };
        let usual = [
            ("snow.melt_base_c", self.melt_base_c, -1.0..=2.0, "-1 to 2 degC (common practice)"),
            (
                "snow.liquid_holding_fraction",
                self.liquid_holding_fraction,
                0.0..=0.10,
                "up to 0.10: ripe snow holds 0.02 to 0.05 (Singh & Singh 2001, from memory), the defaults 0.10",
            ),
            ("snow.refreeze_fraction", self.refreeze_fraction, 0.0..=most_refreezing, why_refreezing),
        ];
        for (key, value, range, why) in usual {
            if !range.contains(&value) {
                found.push(Unlikely::new(key, format!("{value}; usual is {why}")));
            }
        }
        found.extend(self.options.unlikely());
        found
    }
}
