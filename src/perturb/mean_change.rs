//! An assumed change of mean precipitation, one draw a realization (method, section 8).

/// The factor on all precipitation of a realization: `max(0, 1 + s*z)`, with s the assumed standard deviation as a
/// percentage and z a standard normal draw.
pub fn mean_change_factor(standard_deviation_pct: f64, draw: f64) -> f64 {
    (1.0 + standard_deviation_pct / 100.0 * draw).max(0.0)
}
