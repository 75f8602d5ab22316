use super::{standard_pressure_kpa, wet_bulb_c};
use crate::weather::saturation_vapour_pressure_kpa;

const SEA_LEVEL_KPA: f64 = 101.325;

/// The same equation solved by `scipy.optimize.brentq(xtol=1e-13)`, scipy 1.17.1, at sea level and at the standard
/// pressure of 2500 m. 1e-10 leaves room for the pressure's exponent, there rounded to 5.25588.
#[test]
fn psychrometer_equation() {
    let cases = [
        (20.0, 50.0, 13.852_492_908_559_931, 13.128_491_577_158_908),
        (30.0, 50.0, 22.072_758_018_766_745, 21.399_374_166_457_523),
        (10.0, 60.0, 6.534_535_609_798_619, 6.002_829_003_724_249),
        (2.0, 60.0, -0.473_659_871_094_571_03, -0.949_403_931_007_482_7),
        (0.0, 80.0, -1.107_715_114_479_368_7, -1.323_967_639_881_973_7),
        (-5.0, 80.0, -5.855_522_340_611_149, -6.045_804_514_022_367),
    ];
    for (mean_c, humidity_pct, at_sea_c, at_2500_m_c) in cases {
        let at_sea = wet_bulb_c(mean_c, humidity_pct, SEA_LEVEL_KPA);
        assert!((at_sea - at_sea_c).abs() < 1e-12, "({mean_c}, {humidity_pct}): {at_sea} for {at_sea_c}");
        let high = wet_bulb_c(mean_c, humidity_pct, standard_pressure_kpa(2500.0));
        assert!((high - at_2500_m_c).abs() < 1e-6, "({mean_c}, {humidity_pct}): {high} for {at_2500_m_c}");
    }
}

/// From dry to saturated, from the coldest to the hottest air that a record could have, at any pressure: what comes out
/// solves the equation, is never above the air's own temperature, rises with temperature and humidity, and is a number
/// even where humidity is none. 1e-12 degC is the docstring's.
#[test]
fn every_air_has_its_wet_bulb() {
    for pressure_kpa in [20.0, 61.64, SEA_LEVEL_KPA, 110.0] {
        for half_degrees in -180..=120 {
            let mean_c = f64::from(half_degrees) / 2.0;
            let mut drier_c = f64::NEG_INFINITY;
            for humidity_pct in [0.0, 1.0, 5.0, 20.0, 50.0, 80.0, 95.0, 99.9, 100.0, 104.0] {
                let wet_c = wet_bulb_c(mean_c, humidity_pct, pressure_kpa);
                let clamped = humidity_pct.clamp(1.0, 100.0) / 100.0;
                let missing_kpa = saturation_vapour_pressure_kpa(wet_c)
                    - clamped * saturation_vapour_pressure_kpa(mean_c)
                    - 0.000_665 * pressure_kpa * (mean_c - wet_c);
                // The equation's own slope is at least the psychrometer's term.
                let error_c = missing_kpa / (0.000_665 * pressure_kpa);
                assert!(
                    error_c.abs() < 1e-12 * saturation_vapour_pressure_kpa(mean_c).max(1.0),
                    "{mean_c} {humidity_pct} {pressure_kpa}: {error_c}"
                );
                assert!(wet_c <= mean_c && wet_c >= drier_c);
                drier_c = wet_c;
            }
            assert_eq!(wet_bulb_c(mean_c, 100.0, pressure_kpa), mean_c, "saturated");
        }
    }
}

/// The tropopause and above are no place for a basin, but no number goes astray there.
#[test]
fn pressure_stays_a_number() {
    assert_eq!(standard_pressure_kpa(0.0), SEA_LEVEL_KPA);
    assert_eq!(standard_pressure_kpa(60_000.0), 0.0);
}
