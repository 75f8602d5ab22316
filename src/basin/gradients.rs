//! How temperature and precipitation change with elevation (method, section 4).

use serde::Serialize;

/// Temperature gradient by month, degC per km, negative where it is colder higher up; daily minima and maxima may
/// have gradients of their own.
#[derive(Debug, Clone, PartialEq)]
pub struct TemperatureGradient {
    /// For the daily minimum, January first.
    pub tmin_c_per_km: [f64; 12],
    /// For the daily maximum, January first.
    pub tmax_c_per_km: [f64; 12],
}

impl TemperatureGradient {
    /// One gradient for every month, minima and maxima alike.
    pub fn constant(c_per_km: f64) -> Self {
        Self { tmin_c_per_km: [c_per_km; 12], tmax_c_per_km: [c_per_km; 12] }
    }

    /// Whether it is one number.
    pub fn is_constant(&self) -> bool {
        let first = self.tmin_c_per_km[0];
        self.tmin_c_per_km.iter().chain(&self.tmax_c_per_km).all(|c_per_km| *c_per_km == first)
    }
}

/// What the next 100 m add to precipitation.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum GradientForm {
    /// A share of the station's precipitation: the same amount on every 100 m.
    Linear,
    /// A share of the precipitation 100 m lower: the same factor on every 100 m.
    Compound,
}

impl GradientForm {
    /// Both by the name a scenario gives them.
    pub const NAMES: [(&'static str, Self); 2] = [("linear", Self::Linear), ("compound", Self::Compound)];
}

/// Precipitation gradient: percent per 100 m, linear or compounded.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct PrecipitationGradient {
    /// Percent per 100 m.
    pct_per_100m: f64,
    /// Elevation above which precipitation grows no further, m; infinite where none is stated.
    top_m: f64,
    /// What they are a share of.
    form: GradientForm,
}

impl PrecipitationGradient {
    /// A gradient of more than -100 percent, held constant above `top_m` where that is stated.
    pub fn new(pct_per_100m: f64, top_m: Option<f64>, form: GradientForm) -> Self {
        Self { pct_per_100m, top_m: top_m.unwrap_or(f64::INFINITY), form }
    }

    /// Percent per 100 m.
    pub fn pct_per_100m(&self) -> f64 {
        self.pct_per_100m
    }

    /// Elevation above which precipitation grows no further, m, where one is stated.
    pub fn top_m(&self) -> Option<f64> {
        Some(self.top_m).filter(|top_m| top_m.is_finite())
    }

    /// Whether it is linear or compounded.
    pub fn form(&self) -> GradientForm {
        self.form
    }

    /// Precipitation at `elevation_m` over precipitation at the station. With `h = (min(z, top) - min(z_station, top))/100`
    /// and g a fraction per 100 m: linear `max(0, 1 + g*h)`, compounded `(1 + g)^h`.
    ///
    /// ```
    /// use thawline::basin::{GradientForm, PrecipitationGradient};
    /// let gradient = |form| PrecipitationGradient::new(5.0, None, form);
    /// assert!((gradient(GradientForm::Linear).factor(1000.0, 2000.0) - 1.5).abs() < 1e-12);
    /// assert!((gradient(GradientForm::Compound).factor(1000.0, 2000.0) - 1.6289).abs() < 1e-4);
    /// ```
    pub fn factor(&self, station_m: f64, elevation_m: f64) -> f64 {
        let rise_m = elevation_m.min(self.top_m) - station_m.min(self.top_m);
        match self.form {
            GradientForm::Linear => (1.0 + self.pct_per_100m / 100.0 * rise_m / 100.0).max(0.0),
            GradientForm::Compound => libm::pow(1.0 + self.pct_per_100m / 100.0, rise_m / 100.0),
        }
    }
}
