//! The sun on a slope against two other ways of adding it up.

use super::cases;
use crate::naive::sun::{highest_radiation, radiation, summed_radiation};
use proptest::prelude::*;
use thawline::basin::Ground;
use thawline::snow::{potential_radiation, relative_radiation};

proptest! {
    #![proptest_config(cases(256))]

    /// Any slope, any way it faces, any latitude and day. Ends of light from a quadratic and a quadrature that is good to
    /// 1e-13 of a radian's 19.4 MJ: 1e-10.
    #[test]
    fn slope_is_its_quadrature(
        latitude_deg in -90.0..=90.0,
        slope_deg in 0.0..=90.0,
        aspect_deg in 0.0..=360.0,
        day in 1_u16..=366,
    ) {
        let found = potential_radiation(latitude_deg, slope_deg, aspect_deg, day);
        let expected = radiation(latitude_deg, slope_deg, aspect_deg, f64::from(day));
        prop_assert!((found - expected).abs() < 1e-10, "{} for {}", found, expected);
    }

    /// The same over the year's best day on level ground.
    #[test]
    fn relative_to_the_best_day(
        latitude_deg in -75.0..=75.0,
        slope_deg in 0.0..=60.0,
        aspect_deg in 0.0..=360.0,
        day in 1_u16..=366,
    ) {
        let ground = Ground { slope_deg, aspect_deg, ..Ground::default() };
        let found = relative_radiation(latitude_deg, &ground, day);
        let slope = radiation(latitude_deg, slope_deg, aspect_deg, f64::from(day));
        prop_assert!((found - slope / highest_radiation(latitude_deg)).abs() < 1e-11, "{}", found);
    }
}

proptest! {
    #![proptest_config(cases(64))]

    /// Added up over 10,000 moments, without any knowledge of when the light begins. Sunrise and sunset are then seen up to
    /// half a step late, which is at most 0.0061 of a radian's 19.4 MJ at either end of the day.
    #[test]
    fn slope_is_the_sum_over_its_day(
        latitude_deg in -90.0..=90.0,
        slope_deg in 0.0..=90.0,
        aspect_deg in 0.0..=360.0,
        day in 1_u16..=366,
    ) {
        let found = potential_radiation(latitude_deg, slope_deg, aspect_deg, day);
        let summed = summed_radiation(latitude_deg, slope_deg, aspect_deg, f64::from(day), 10_000);
        prop_assert!((found - summed).abs() < 0.013, "{} for {}", found, summed);
    }
}
