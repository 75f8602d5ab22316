//! Random scenarios with any of the snow model's options on, in any combination.

use super::scenario::{Scenario, scenarios};
use crate::naive;
use proptest::array::uniform12;
use proptest::collection::vec;
use proptest::prelude::*;
use thawline::basin::{GradientForm, Ground, PrecipitationGradient};
use thawline::snow::{ColdContent, Patchiness, PhaseRule, Radiation, SnowOptions, Sublimation};

fn grounds() -> impl Strategy<Value = Ground> {
    let flat_or = |fraction: f64| prop_oneof![Just(0.0), 0.0..fraction];
    (flat_or(70.0), 0.0..360.0, flat_or(1.0), prop::option::of(flat_or(1.5))).prop_map(
        |(slope_deg, aspect_deg, canopy_fraction, accumulation_variation)| Ground {
            slope_deg,
            aspect_deg,
            canopy_fraction,
            accumulation_variation,
        },
    )
}

prop_compose! {
    fn options()(
        radiation in prop::option::of(0.0..5.0),
        patchiness in prop::option::of((prop_oneof![Just(0.0), 0.05..1.2], 2..6_usize)),
        cold_share in prop::option::of(0.0..1.0),
        sublimation in prop::option::of((uniform12(0.0..3.0), 0.0..0.5)),
        wet_bulb in any::<bool>(),
        start_bare_each_year in prop::bool::weighted(0.3),
    ) -> SnowOptions {
        SnowOptions {
            radiation: radiation.map(|factor_mm_per_c_day| Radiation { factor_mm_per_c_day }),
            patchiness: patchiness
                .map(|(coefficient_of_variation, classes)| Patchiness { coefficient_of_variation, classes }),
            cold_content: cold_share.map(|daily_share| ColdContent { daily_share }),
            sublimation: sublimation
                .map(|(mm_per_day, snowfall_fraction)| Sublimation { mm_per_day, snowfall_fraction }),
            wet_bulb,
            start_bare_each_year,
        }
    }
}

prop_compose! {
    /// A scenario with options: ground of its own for every band, a compounded gradient, warming that changes with elevation.
    pub fn scenarios_with_options()(
        scenario in scenarios(),
        options in options(),
        grounds in vec(grounds(), 6),
        latitude_deg in 25.0..75.0,
        s_curve in prop::option::of((-1.0..3.0, 2.0..16.0)),
        compound_pct in prop::option::of(-4.0..3.0),
        level_change_pct_per_1000m in prop_oneof![Just(0.0), -60.0..60.0],
    ) -> Scenario {
        let mut scenario = scenario;
        scenario.snow.options = options;
        if let Some((half_snow_at_c, mixed_range_c)) = s_curve {
            scenario.snow.rain_snow = PhaseRule::SCurve { half_snow_at_c, mixed_range_c };
        }
        for (band, ground) in scenario.basin.bands.iter_mut().zip(grounds) {
            band.ground = ground;
        }
        scenario.basin.latitude_deg = latitude_deg * scenario.basin.latitude_deg.signum();
        if let Some(pct) = compound_pct {
            scenario.precipitation_pct_per_100m = pct;
            scenario.gradient_form = naive::GradientForm::Compound;
            scenario.basin.precipitation =
                PrecipitationGradient::new(pct, scenario.precipitation_top_m, GradientForm::Compound);
        }
        scenario.warming.level_change_pct_per_1000m = level_change_pct_per_1000m;
        scenario
    }
}

/// The options of one band, as the naive loop wants them.
pub fn naive_options(scenario: &Scenario, band: usize) -> naive::Options {
    let (options, ground) = (scenario.snow.options, scenario.basin.bands[band].ground);
    let areas: Vec<f64> = scenario.basin.bands.iter().map(|band| band.area_km2).collect();
    let elevations: Vec<f64> = scenario.basin.bands.iter().map(|band| band.elevation_m).collect();
    naive::Options {
        canopy_fraction: ground.canopy_fraction,
        radiation: options.radiation.map(|radiation| naive::Radiation {
            factor_mm_per_c_day: radiation.factor_mm_per_c_day,
            latitude_deg: scenario.basin.latitude_deg,
            slope_deg: ground.slope_deg,
            aspect_deg: ground.aspect_deg,
        }),
        patches: options.patchiness.map(|patchiness| naive::Patches {
            coefficient_of_variation: ground
                .accumulation_variation
                .unwrap_or(patchiness.coefficient_of_variation),
            classes: patchiness.classes,
        }),
        cold_content_daily_share: options.cold_content.map(|cold| cold.daily_share),
        sublimation_mm_per_day: options.sublimation.map_or([0.0; 12], |loss| loss.mm_per_day),
        sublimation_of_snowfall: options.sublimation.map_or(0.0, |loss| loss.snowfall_fraction),
        is_wet_bulb: options.wet_bulb,
        level_change_pct_per_1000m: scenario.warming.level_change_pct_per_1000m,
        basin_mean_m: naive::basin_mean(&elevations, &areas),
        gradient_form: scenario.gradient_form,
    }
}
