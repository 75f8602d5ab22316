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
}

/// Precipitation gradient: linear in elevation, a share of the station's precipitation per 100 m.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct PrecipitationGradient {
    /// Percent of the station's precipitation per 100 m.
    pct_per_100m: f64,
    /// Elevation above which precipitation grows no further, m; infinite where none is stated.
    top_m: f64,
}

impl PrecipitationGradient {
    /// A linear gradient, held constant above `top_m` where that is stated.
    pub fn new(pct_per_100m: f64, top_m: Option<f64>) -> Self {
        Self { pct_per_100m, top_m: top_m.unwrap_or(f64::INFINITY) }
    }

    /// Precipitation at `elevation_m` over precipitation at the station:
    /// `max(0, 1 + g*(min(z, top) - min(z_station, top))/100)`, g a fraction per 100 m.
    ///
    /// ```
    /// use thawline::basin::PrecipitationGradient;
    /// let gradient = PrecipitationGradient::new(5.0, None);
    /// assert!((gradient.factor(1000.0, 2000.0) - 1.5).abs() < 1e-12);
    /// ```
    pub fn factor(&self, station_m: f64, elevation_m: f64) -> f64 {
        let rise_m = elevation_m.min(self.top_m) - station_m.min(self.top_m);
        (1.0 + self.pct_per_100m / 100.0 * rise_m / 100.0).max(0.0)
    }
}
