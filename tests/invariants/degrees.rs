//! The branch-free degrees of a sine day against the closed form.

use crate::naive::sine_degrees;
use thawline::snow::diurnal_degrees;

/// Half ranges up to 20 degC, means up to beyond them on either side, in steps that hit the ends of the range, where
/// the closed form changes its branch, from both sides. 1e-12 degC is the method's own allowance.
#[test]
fn sine_day_is_the_closed_form() {
    let mut worst_c: f64 = 0.0;
    for half_range_c in [0.0, 1e-13, 1e-9, 1e-3, 0.3, 1.0, 2.5, 5.0, 8.0, 12.5, 20.0] {
        for step in -13_000..=13_000 {
            let x = f64::from(step) / 10_000.0;
            for base_c in [0.0, 1.0] {
                let mean_c = base_c + x * f64::max(half_range_c, 1e-3);
                let (tmin_c, tmax_c) = (mean_c - half_range_c, mean_c + half_range_c);
                let expected = sine_degrees(tmin_c, tmax_c, base_c);
                let found = diurnal_degrees(mean_c, half_range_c, base_c);
                let error_c = (found.0 - expected.0).abs().max((found.1 - expected.1).abs());
                worst_c = worst_c.max(error_c);
                assert!(
                    error_c <= 1e-12,
                    "mean {mean_c}, half range {half_range_c}, base {base_c}: {found:?} for {expected:?}"
                );
                assert!(found.0 >= 0.0 && found.1 >= 0.0, "degrees are never negative: {found:?}");
            }
        }
    }
    assert!(worst_c > 0.0, "two different evaluations differ somewhere, or one of them was not run");
}
