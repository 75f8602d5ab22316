//! The sun on a slope against adding it up, minute by minute.

use super::cases;
use crate::naive_sun::summed_radiation;
use proptest::prelude::*;
use thawline::snow::potential_radiation;

proptest! {
    #![proptest_config(cases(128))]

    /// Any slope, any way it faces, any latitude and day. 10,000 steps a day see sunrise and sunset half a step late, which
    /// is at most 0.006 of the 18.8 MJ that a radian of the hour angle brings at most; twice that at the day's two ends.
    #[test]
    fn slope_is_the_sum_over_its_day(
        latitude_deg in -90.0..=90.0,
        slope_deg in 0.0..=90.0,
        aspect_deg in 0.0..=360.0,
        day in 1_u16..=366,
    ) {
        let found = potential_radiation(latitude_deg, slope_deg, aspect_deg, day);
        let summed = summed_radiation(latitude_deg, slope_deg, aspect_deg, day, 10_000);
        prop_assert!((found - summed).abs() < 0.013, "{} for {}", found, summed);
    }
}
