//! What the method is given, and what a day comes to.

/// Rain or snow.
#[derive(Debug, Clone, Copy)]
pub enum Phase {
    /// Snow only below `snow_c`, rain only above `rain_c`, degC.
    Linear { snow_c: f64, rain_c: f64 },
    /// Snow at and below the threshold, degC.
    Step { threshold_c: f64 },
    /// The smooth curve for land.
    Tanh,
    /// The curve of third degree.
    SCurve { half_snow_c: f64, mixed_range_c: f64 },
}

/// Degrees from the day's mean, or from a sine between minimum and maximum.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Degrees {
    /// The mean alone.
    Mean,
    /// A sine through the day.
    Diurnal,
}

/// How precipitation grows with elevation.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub enum GradientForm {
    /// By a share of the station's.
    #[default]
    Linear,
    /// By a share of what has come so far.
    Compound,
}

/// What the plain model does without.
#[derive(Debug, Clone, Default)]
pub struct Options {
    /// Share of the band under trees.
    pub canopy_fraction: f64,
    /// Melt by radiation.
    pub radiation: Option<Radiation>,
    /// Patchy snow.
    pub patches: Option<Patches>,
    /// Weight of a day's temperature in that of the pack.
    pub cold_content_daily_share: Option<f64>,
    /// Sublimation by month, mm per day.
    pub sublimation_mm_per_day: [f64; 12],
    /// Sublimation of the day's snowfall, a fraction.
    pub sublimation_of_snowfall: f64,
    /// Whether rain and snow are told apart by the wet bulb.
    pub is_wet_bulb: bool,
    /// How much more a level warms per 1000 m above the basin's mean elevation, percent.
    pub level_change_pct_per_1000m: f64,
    /// The basin's mean elevation, m.
    pub basin_mean_m: f64,
    /// How precipitation grows with elevation.
    pub gradient_form: GradientForm,
}

/// Melt by radiation, and the slope it comes down on.
#[derive(Debug, Clone, Copy)]
pub struct Radiation {
    pub factor_mm_per_c_day: f64,
    pub latitude_deg: f64,
    pub slope_deg: f64,
    pub aspect_deg: f64,
}

/// How unevenly snow lies, and in how many classes of equal area.
#[derive(Debug, Clone, Copy)]
pub struct Patches {
    pub coefficient_of_variation: f64,
    pub classes: usize,
}

/// Everything that does not change from day to day in one band at one warming level.
#[derive(Debug, Clone)]
pub struct Band {
    /// Elevation of the band, m.
    pub elevation_m: f64,
    /// Elevation of the station, m.
    pub station_m: f64,
    /// Temperature gradients of the daily minimum, degC per km, January first.
    pub tmin_gradient_c_per_km: [f64; 12],
    /// The same of the daily maximum.
    pub tmax_gradient_c_per_km: [f64; 12],
    /// Precipitation gradient, a fraction per 100 m.
    pub precipitation_gradient_per_100m: f64,
    /// Elevation above which precipitation grows no further, m.
    pub precipitation_top_m: f64,
    /// Warming level, degC.
    pub level_c: f64,
    /// Monthly shape of the warming of minima.
    pub tmin_shape: [f64; 12],
    /// Monthly shape of the warming of maxima.
    pub tmax_shape: [f64; 12],
    /// Change of precipitation by month, percent per degC, compounded.
    pub precipitation_change_pct_per_c: [f64; 12],
    /// Change of precipitation by month as stated for this level, percent; in place of that per degC.
    pub precipitation_change_pct: Option<[f64; 12]>,
    /// Rain or snow.
    pub phase: Phase,
    /// Degree rule.
    pub degrees: Degrees,
    /// Highest degree-day factor, mm per degC and day.
    pub factor_highest: f64,
    /// Lowest degree-day factor.
    pub factor_lowest: f64,
    /// Day of the highest factor in a year of 365 days.
    pub highest_on_day: f64,
    /// Melt base temperature, degC.
    pub melt_base_c: f64,
    /// Refreezing, a fraction of the degree-day factor.
    pub refreeze_fraction: f64,
    /// Liquid held, a fraction of the ice.
    pub holding_fraction: f64,
    /// What the plain model does without.
    pub options: Options,
}

/// One day at the station.
#[derive(Debug, Clone, Copy)]
pub struct Day {
    /// Minimum, degC.
    pub tmin_c: f64,
    /// Maximum, degC.
    pub tmax_c: f64,
    /// Precipitation, mm.
    pub precipitation_mm: f64,
    /// Month, 1 to 12.
    pub month: usize,
    /// Calendar day of the year, 1 to 366.
    pub day_of_year: f64,
    /// Relative humidity, percent; read by the wet bulb alone.
    pub relative_humidity_pct: f64,
}

/// What the pack holds, mm, the last the water that would freeze before it is at 0 degC.
#[derive(Debug, Clone, Copy, Default)]
pub struct Pack {
    pub ice_mm: f64,
    pub liquid_mm: f64,
    pub cold_mm: f64,
}

/// What a day of the year and a class of the snow bring to the step.
#[derive(Debug, Clone, Copy)]
pub struct Terms {
    /// Degree-day factor, mm per degC and day.
    pub factor: f64,
    /// What radiation adds to it for melt.
    pub radiation: f64,
    /// Of the band's snowfall, how much the class gets.
    pub snowfall: f64,
}

/// What one day of one band came to; SWE and the share of the area under snow stand at the day's beginning, ice, liquid and
/// cold at its end.
#[derive(Debug, Clone, Copy, Default)]
pub struct DayResult {
    pub mean_c: f64,
    pub rain_mm: f64,
    pub snow_mm: f64,
    pub melt_mm: f64,
    pub refreeze_mm: f64,
    pub outflow_mm: f64,
    pub bare_ground_rain_mm: f64,
    pub swe_mm: f64,
    pub ice_mm: f64,
    pub liquid_mm: f64,
    pub sublimation_mm: f64,
    pub cold_mm: f64,
    pub covered_share: f64,
}
