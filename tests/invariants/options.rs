//! The equations of the snow's options against the naive transcription, and that on days worked by hand.

use super::cases;
use crate::naive::{
    self, Band, Day, Degrees, GradientForm, Options, Pack, Phase, Radiation, Terms, patches, wet_bulb,
};
use proptest::prelude::*;
use thawline::snow::{class_multipliers, s_curve_snow_fraction, standard_pressure_kpa, wet_bulb_c};

proptest! {
    #![proptest_config(cases(512))]

    /// Newton against halving down to 1e-13 degC; 1e-11 leaves room for the last digits of the vapour pressures where thin
    /// cold air makes the equation flat.
    #[test]
    fn wet_bulb_is_the_halved_one(
        mean_c in -60.0..50.0,
        humidity_pct in 0.0..104.0,
        elevation_m in -400.0..6000.0,
    ) {
        let found = wet_bulb_c(mean_c, humidity_pct, standard_pressure_kpa(elevation_m));
        let expected = wet_bulb::wet_bulb_c(mean_c, humidity_pct, elevation_m);
        prop_assert!((found - expected).abs() < 1e-11, "{} for {}", found, expected);
    }

    /// A polynomial between 0 and 1 with and without branches; 1e-12 is rounding.
    #[test]
    fn s_curve_is_the_branched_one(
        mean_c in -30.0..30.0,
        half_snow_c in -3.0..5.0,
        mixed_range_c in 0.1..20.0,
    ) {
        let found = s_curve_snow_fraction(mean_c, half_snow_c, 1.0 / (1.4 * mixed_range_c));
        let expected = naive::snow_fraction(Phase::SCurve { half_snow_c, mixed_range_c }, mean_c);
        prop_assert!((found - expected).abs() < 1e-12, "{} for {}", found, expected);
    }

    /// Differences of a normal's shares against integrals between scores found by halving; the class of the heaviest snow
    /// holds most of the rounding.
    #[test]
    fn classes_are_the_integrated_ones(variation in 0.001..2.0, classes in 1_usize..40) {
        let found = class_multipliers(variation, classes);
        let expected = patches::multipliers(variation, classes);
        prop_assert_eq!(found.len(), expected.len());
        for (found, expected) in found.iter().zip(&expected) {
            prop_assert!((found - expected).abs() < 1e-11, "{} for {}", found, expected);
        }
    }
}

/// A band at the station, all snow at and below 0 degC, a factor of 3.51 the whole year, nothing held and nothing refrozen.
fn plain_band(options: Options) -> Band {
    Band {
        elevation_m: 2000.0,
        station_m: 2000.0,
        tmin_gradient_c_per_km: [0.0; 12],
        tmax_gradient_c_per_km: [0.0; 12],
        precipitation_gradient_per_100m: 0.05,
        precipitation_top_m: 1e9,
        level_c: 0.0,
        tmin_shape: [1.0; 12],
        tmax_shape: [1.0; 12],
        precipitation_change_pct_per_c: [0.0; 12],
        precipitation_change_pct: None,
        phase: Phase::Step { threshold_c: 0.0 },
        degrees: Degrees::Mean,
        factor_highest: 3.51,
        factor_lowest: 3.51,
        highest_on_day: 172.0,
        melt_base_c: 0.0,
        refreeze_fraction: 0.0,
        holding_fraction: 0.0,
        options,
    }
}

fn winter_day(mean_c: f64, precipitation_mm: f64) -> Day {
    Day {
        tmin_c: mean_c,
        tmax_c: mean_c,
        precipitation_mm,
        month: 1,
        day_of_year: 15.0,
        relative_humidity_pct: 80.0,
    }
}

fn near(found: f64, expected: f64, tolerance: f64) {
    assert!((found - expected).abs() <= tolerance, "{found} for {expected}");
}

/// TH-08 to TH-10: 500 mm at -5 degC lack 15.74 mm of freezing water with handbook constants (1 %), and 1 mm that freezes
/// warms 100 mm by 1.588 degC (0.5 %, linear in mass: Jennings, Kittel & Molotch 2018, The Cryosphere 12:1595). The pack takes
/// the day's temperature whole, by a share of 1; then rain at 0 degC freezes.
#[test]
fn cold_content_by_hand() {
    let mut band = plain_band(Options { cold_content_daily_share: Some(1.0), ..Options::default() });
    band.phase = Phase::Step { threshold_c: -5.0 };
    let terms = Terms { factor: 0.0, radiation: 0.0, snowfall: 1.0 };
    let cold = naive::day(&band, terms, Pack::default(), winter_day(-5.0, 500.0));
    near(cold.cold_mm, 15.74, 0.1574);
    let pack = Pack { ice_mm: 100.0, liquid_mm: 0.0, cold_mm: cold.cold_mm / 5.0 };
    // The same mean temperature for 100 mm: a fifth. The store forgets nothing by a share of 0.
    band.options.cold_content_daily_share = Some(0.0);
    let rained = naive::day(&band, terms, pack, winter_day(0.0, 1.0));
    near(rained.refreeze_mm, 1.0, 0.0);
    near((pack.cold_mm - rained.cold_mm) / pack.cold_mm * 5.0, 1.588, 0.005 * 1.588);
    // 5 mm of rain are more than what can freeze; the rest runs off.
    let poured = naive::day(&band, terms, pack, winter_day(0.0, 5.0));
    near(poured.refreeze_mm, pack.cold_mm, 0.0);
    near(poured.outflow_mm, 5.0 - pack.cold_mm, 1e-12);
    near(poured.cold_mm, 0.0, 0.0);
}

/// DD-05: Kuusisto (1980, Nordic Hydrology 11(5):235, abstract): 3.51 mm per degC and day in the open, 0.16 less for every
/// tenth of canopy; radiation is weakened as the factor is.
#[test]
fn canopy_by_hand() {
    let mut band = plain_band(Options { canopy_fraction: 0.5, ..Options::default() });
    near(naive::degree_day_factor(&band, 15.0), 3.51 - 5.0 * 0.16, 1e-12);
    band.options.radiation =
        Some(Radiation { factor_mm_per_c_day: 3.51, latitude_deg: 40.0, slope_deg: 0.0, aspect_deg: 0.0 });
    let factors = naive::radiation_factors(&band);
    near(factors.into_iter().fold(0.0, f64::max), 3.51 - 5.0 * 0.16, 1e-9);
}

/// LR-04: 5 % per 100 m over 1000 m is a factor of 1.5 linear and 1.6289 compounded; up to a top at 2400 m, 1.05^4.
#[test]
fn gradient_forms_by_hand() {
    let mut band = plain_band(Options::default());
    band.elevation_m = 3000.0;
    near(naive::precipitation(10.0, 1, &band), 15.0, 1e-12);
    band.options.gradient_form = GradientForm::Compound;
    near(naive::precipitation(10.0, 1, &band), 16.289, 1e-3);
    band.precipitation_top_m = 2400.0;
    near(naive::precipitation(10.0, 1, &band), 12.155_062_5, 1e-9);
}

/// 20 % more per 1000 m: at +2 degC a band 500 m above the mean has 2.2 degC, one 500 m below it 1.8.
#[test]
fn warming_with_elevation_by_hand() {
    let options = Options { level_change_pct_per_1000m: 20.0, basin_mean_m: 1500.0, ..Options::default() };
    let mut band = plain_band(options);
    band.level_c = 2.0;
    near(naive::temperature(-3.0, 1.0, -6.0, &band), -0.8, 1e-12);
    band.elevation_m = 1000.0;
    band.station_m = 1000.0;
    near(naive::temperature(-3.0, 1.0, -6.0, &band), -1.2, 1e-12);
}

/// 0.5 mm and a tenth of 10 mm of snow sublime; of half a millimetre no more than that.
#[test]
fn sublimation_by_hand() {
    let band = plain_band(Options {
        sublimation_mm_per_day: [0.5; 12],
        sublimation_of_snowfall: 0.1,
        ..Options::default()
    });
    let terms = Terms { factor: 3.0, radiation: 0.0, snowfall: 1.0 };
    let snowed = naive::day(&band, terms, Pack::default(), winter_day(-4.0, 10.0));
    near(snowed.sublimation_mm, 1.5, 1e-12);
    near(snowed.ice_mm, 8.5, 1e-12);
    let little = Pack { ice_mm: 0.25, ..Pack::default() };
    let gone = naive::day(&band, terms, little, winter_day(-4.0, 0.0));
    near(gone.sublimation_mm, 0.25, 0.0);
    near(gone.ice_mm, 0.0, 0.0);
    let bare = naive::day(&band, terms, Pack::default(), winter_day(4.0, 0.0));
    near(bare.sublimation_mm, 0.0, 0.0);
}
