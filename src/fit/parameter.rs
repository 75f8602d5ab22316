//! What a fit may change: one list of parameters, each by its scenario key, with usual bounds.

use crate::basin::{PrecipitationGradient, TemperatureGradient};
use crate::snow::{GaugeMultiplier, PhaseRule, SnowParams};

/// Everything of the model that a fit may change.
#[derive(Debug, Clone, PartialEq)]
pub struct Parameters {
    /// The snow's.
    pub snow: SnowParams,
    /// The gauge's multipliers.
    pub gauge: GaugeMultiplier,
    /// Temperature by elevation.
    pub temperature: TemperatureGradient,
    /// Precipitation by elevation.
    pub precipitation: PrecipitationGradient,
}

/// A number that a fit may change.
#[derive(Debug)]
pub struct Parameter {
    /// Its name: the scenario's key.
    pub key: &'static str,
    /// Its name in a sentence.
    pub title: &'static str,
    /// Its unit; empty where it has none.
    pub unit: &'static str,
    /// Bounds where the scenario states none: published ranges, or common practice.
    pub bounds: [f64; 2],
    /// The widest bounds that may be stated.
    pub widest: [f64; 2],
    /// Whether it is fitted where the scenario names no parameters.
    pub is_usual: bool,
    get: fn(&Parameters) -> Option<f64>,
    set: fn(&mut Parameters, f64),
}

impl Parameter {
    /// Its value; none where the rules and options in use have no such number.
    pub fn get(&self, of: &Parameters) -> Option<f64> {
        (self.get)(of)
    }

    /// Sets it.
    pub fn set(&self, of: &mut Parameters, value: f64) {
        (self.set)(of, value);
    }

    /// The parameter with this key.
    pub fn named(key: &str) -> Option<&'static Self> {
        PARAMETERS.iter().find(|parameter| parameter.key == key)
    }
}

/// Every parameter that can be fitted. Where the lowest degree-day factor would lie above the highest it is the highest.
pub static PARAMETERS: [Parameter; 15] = [
    Parameter {
        key: "snow.degree_day_factor_mm_per_c_day.highest",
        title: "highest degree-day factor",
        unit: "mm per degC and day",
        // National Engineering Handbook 630, chapter 11, and somewhat above.
        bounds: [1.6, 8.0],
        widest: [0.0, 50.0],
        is_usual: true,
        get: |of| Some(of.snow.degree_day_factor_highest),
        set: |of, value| {
            let snow = &mut of.snow;
            snow.degree_day_factor_highest = value;
            let is_even = snow.options.radiation.is_some();
            let lowest = if is_even { value } else { snow.degree_day_factor_lowest.min(value) };
            snow.degree_day_factor_lowest = lowest;
        },
    },
    Parameter {
        key: "snow.degree_day_factor_mm_per_c_day.lowest",
        title: "lowest degree-day factor",
        unit: "mm per degC and day",
        // It stands in for the cold of winter snow (method): far below any factor of ripe snow. Cold winters hardly tell it, and
        // wider bounds let a fit on them melt the snow of warm ones in February.
        bounds: [0.0, 1.0],
        widest: [0.0, 50.0],
        is_usual: true,
        get: |of| of.snow.options.radiation.is_none().then_some(of.snow.degree_day_factor_lowest),
        set: |of, value| {
            of.snow.degree_day_factor_lowest = value.min(of.snow.degree_day_factor_highest);
        },
    },
    Parameter {
        key: "snow.radiation.factor_mm_per_c_day",
        title: "factor of radiation",
        unit: "mm per degC and day",
        bounds: [0.5, 7.0],
        widest: [0.0, 50.0],
        is_usual: true,
        get: |of| of.snow.options.radiation.map(|radiation| radiation.factor_mm_per_c_day),
        set: |of, value| {
            if let Some(radiation) = &mut of.snow.options.radiation {
                radiation.factor_mm_per_c_day = value;
            }
        },
    },
    Parameter {
        key: "snow.melt_base_c",
        title: "melt base temperature",
        unit: "degC",
        bounds: [-2.0, 4.0],
        widest: [-20.0, 20.0],
        // It makes up for the factor, and the other way round.
        is_usual: false,
        get: |of| Some(of.snow.melt_base_c),
        set: |of, value| of.snow.melt_base_c = value,
    },
    Parameter {
        key: "snow.rain_snow.half_snow_at_c",
        title: "temperature of half snow",
        unit: "degC",
        // 95 % of stations (Jennings et al. 2018), and as much on either side as a sensor may be off.
        bounds: [-1.5, 3.5],
        widest: [-19.0, 19.0],
        is_usual: true,
        get: |of| (of.snow.rain_snow != PhaseRule::Tanh).then(|| of.snow.rain_snow.half_snow_c()),
        set: |of, value| of.snow.rain_snow = of.snow.rain_snow.with_half_snow_at(value),
    },
    Parameter {
        key: "snow.rain_snow.mixed_range_c",
        title: "range with both rain and snow",
        unit: "degC",
        bounds: [0.5, 8.0],
        widest: [0.1, 20.0],
        is_usual: false,
        get: |of| of.snow.rain_snow.mixed_range_c(),
        set: |of, value| of.snow.rain_snow = of.snow.rain_snow.with_mixed_range(value),
    },
    Parameter {
        key: "snow.liquid_holding_fraction",
        title: "liquid that the snow holds",
        unit: "of the ice",
        bounds: [0.0, 0.15],
        widest: [0.0, 1.0],
        is_usual: false,
        get: |of| Some(of.snow.liquid_holding_fraction),
        set: |of, value| of.snow.liquid_holding_fraction = value,
    },
    Parameter {
        key: "snow.refreeze_fraction",
        title: "refreezing",
        unit: "of the degree-day factor",
        bounds: [0.0, 0.6],
        widest: [0.0, 1.0],
        is_usual: false,
        get: |of| Some(of.snow.refreeze_fraction),
        set: |of, value| of.snow.refreeze_fraction = value,
    },
    Parameter {
        key: "snow.cold_content.daily_share",
        title: "daily share of the cold content",
        unit: "",
        bounds: [0.05, 0.8],
        widest: [0.0, 1.0],
        is_usual: true,
        get: |of| of.snow.options.cold_content.map(|cold| cold.daily_share),
        set: |of, value| {
            if let Some(cold) = &mut of.snow.options.cold_content {
                cold.daily_share = value;
            }
        },
    },
    Parameter {
        key: "snow.sublimation.snowfall_fraction",
        title: "sublimation of snowfall",
        unit: "of the snowfall",
        bounds: [0.0, 0.35],
        widest: [0.0, 1.0],
        is_usual: true,
        get: |of| of.snow.options.sublimation.map(|loss| loss.snowfall_fraction),
        set: |of, value| {
            if let Some(loss) = &mut of.snow.options.sublimation {
                loss.snowfall_fraction = value;
            }
        },
    },
    Parameter {
        key: "weather.gauge_multiplier.snow",
        title: "gauge multiplier of snow",
        unit: "",
        // Gauges miss 20 to 70 % of the snow (Pierre et al. 2019, abstract); a pillow may lose some to wind.
        bounds: [0.8, 2.0],
        widest: [0.1, 5.0],
        is_usual: true,
        get: |of| Some(of.gauge.snow),
        set: |of, value| of.gauge.snow = value,
    },
    Parameter {
        key: "weather.gauge_multiplier.rain",
        title: "gauge multiplier of rain",
        unit: "",
        bounds: [1.0, 1.2],
        widest: [0.1, 5.0],
        is_usual: false,
        get: |of| Some(of.gauge.rain),
        set: |of, value| of.gauge.rain = value,
    },
    Parameter {
        key: "basin.temperature_gradient_c_per_km",
        title: "temperature gradient",
        unit: "degC per km",
        bounds: [-9.0, -3.0],
        widest: [-20.0, 5.0],
        is_usual: false,
        get: |of| of.temperature.is_constant().then(|| of.temperature.tmin_c_per_km[0]),
        set: |of, value| of.temperature = TemperatureGradient::constant(value),
    },
    Parameter {
        key: "basin.precipitation_gradient_pct_per_100m",
        title: "precipitation gradient",
        unit: "percent per 100 m",
        bounds: [0.0, 12.0],
        widest: [-50.0, 50.0],
        is_usual: false,
        get: |of| Some(of.precipitation.pct_per_100m()),
        set: |of, value| {
            let old = of.precipitation;
            of.precipitation = PrecipitationGradient::new(value, old.top_m(), old.form());
        },
    },
    Parameter {
        key: "snow.sublimation.mm_per_day",
        title: "sublimation of a day",
        unit: "mm a day",
        bounds: [0.0, 1.5],
        widest: [0.0, 10.0],
        is_usual: false,
        get: |of| of.snow.options.sublimation.map(|loss| loss.mm_per_day.iter().copied().fold(0.0, f64::max)),
        set: |of, value| {
            if let Some(loss) = &mut of.snow.options.sublimation {
                let highest = loss.mm_per_day.iter().copied().fold(0.0, f64::max);
                let month = |mm: f64| if highest > 0.0 { mm / highest * value } else { value };
                loss.mm_per_day = loss.mm_per_day.map(month);
            }
        },
    },
];
