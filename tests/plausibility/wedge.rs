//! The geometry of a pack that is lifted: storage that grows linearly above the snow line, over an area uniform in
//! elevation.

use super::published::Published;
use super::seasons::{lanes, levels, settings};
use chrono::{Datelike, NaiveDate};
use thawline::basin::{Band, Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};
use thawline::season::Measures;
use thawline::snow::{DegreeRule, Engine, PhaseRule, SnowParams};
use thawline::weather::{Series, YearSpan};

const SNOW_LINE_M: f64 = 1000.0;
const TOP_M: f64 = 2500.0;
const LAPSE_C_PER_KM: f64 = 6.5;
const BAND_M: f64 = 5.0;
const DAYS: usize = 365;

/// One storm over a range whose bands are that much colder above the snow line: with the linear rule from 0 degC down,
/// the share that is snow grows linearly with elevation. Nothing melts below 0 degC, and rain runs off at once.
fn storm() -> (Basin, SnowParams, Series) {
    let count = ((TOP_M - SNOW_LINE_M) / BAND_M) as usize;
    let band = |number: usize| {
        let lower_m = SNOW_LINE_M + BAND_M * number as f64;
        let (upper_m, elevation_m) = (lower_m + BAND_M, lower_m + BAND_M / 2.0);
        Band { lower_m, upper_m, area_km2: 1.0, elevation_m, ground: Ground::default() }
    };
    let basin = Basin {
        latitude_deg: 45.0,
        bands: (0..count).map(band).collect(),
        temperature: TemperatureGradient::constant(-LAPSE_C_PER_KM),
        precipitation: PrecipitationGradient::new(0.0, None, GradientForm::Linear),
    };
    let snow = SnowParams {
        rain_snow: PhaseRule::Linear { snow_only_below_c: -20.0, rain_only_above_c: 0.0 },
        liquid_holding_fraction: 0.0,
        refreeze_fraction: 0.0,
        ..SnowParams::defaults(DegreeRule::Mean, false)
    };
    let first = NaiveDate::from_ymd_opt(2006, 10, 1).expect("a date");
    let mut precipitation_mm = vec![0.0; DAYS];
    precipitation_mm[30] = 1000.0;
    // Dry days are so cold that nothing melts.
    let mean_c = precipitation_mm.iter().map(|mm| if *mm > 0.0 { 0.0 } else { -20.0 }).collect();
    let series = Series {
        years: vec![YearSpan { water_year: 2007, first, start: 0, days: DAYS, follows: false }],
        mean_c,
        half_range_c: vec![0.0; DAYS],
        precipitation_mm,
        relative_humidity_pct: Vec::new(),
        month: first.iter_days().take(DAYS).map(|date| date.month0() as u8).collect(),
        day_of_year: first.iter_days().take(DAYS).map(|date| date.ordinal() as u16).collect(),
    };
    (basin, snow, series)
}

/// A wedge 1500 m high, lifted by 1/6.5 km per degree: what is left is `(1 - w/6.5/1.5)^2`. The method is that of
/// Casola et al. 2009, the wedge ours. 0.01 percent points: bands of 5 m miss the wedge's tip by 0.0003.
#[test]
fn a_wedge_is_lifted_by_the_lapse_rate() {
    let (basin, snow, series) = storm();
    let lanes = lanes(&basin, SNOW_LINE_M, &levels(&[0.0, 1.0, 2.0, 3.0], 0.0), &snow);
    let measures = Measures::new(settings(), basin.area_km2());
    let mut engine = Engine::new(&lanes, false);
    let block = engine.year(series.view(&series.years[0])).expect("a closed ledger");
    let mut values = vec![0.0; measures.list().len() * block.width];
    measures.take(block, &mut values);
    assert_eq!(measures.list()[0].name, "swe_04_01_mm");
    let swe_mm = &values[block.mixes_at..];
    for (level, expected_pct) in [(1, -19.46), (2, -36.82), (3, -52.07)] {
        let geometry = Published {
            row: "SC-02, 1 April storage of a wedge, percent",
            band: [expected_pct - 0.01, expected_pct + 0.01],
            source: "closed form, after Casola et al. 2009, J. Climate 22:2758",
        };
        geometry.assert_holds(100.0 * (swe_mm[level] / swe_mm[0] - 1.0));
    }
}
