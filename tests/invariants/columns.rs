//! Where lanes and means stand, and the engine's ways of being run: what the rooms above it read.

use super::cases;
use super::scenario::{Scenario, scenarios};
use super::with_options::scenarios_with_options;
use proptest::collection::vec;
use proptest::prelude::*;
use thawline::basin::Ground;
use thawline::fault::Unlikely;
use thawline::perturb::MonthlyChange;
use thawline::snow::{
    ColdContent, DegreeRule, Engine, LaneSpec, Lanes, OpenLedger, Patchiness, Path, Radiation, RawSnow,
    SnowOptions, SnowParams, Sublimation, YearBlock,
};

/// Any scenario under eleven levels: more than one row of basin means.
fn many_levels() -> impl Strategy<Value = Scenario> {
    prop_oneof![scenarios(), scenarios_with_options()].prop_map(|scenario| {
        let levels_c = (0..11).map(|level| 0.5 * f64::from(level)).collect();
        Scenario { levels_c, ..scenario }
    })
}

proptest! {
    #![proptest_config(cases(24))]

    /// A basin mean is the sum of its bands' columns, each times its share of the area; the same of a row that is asked for by
    /// itself. A band is its lane, or the mean of its classes. 1e-12 of the sum: only rounding may part them.
    #[test]
    fn means_are_of_their_columns(scenario in many_levels()) {
        let lanes = scenario.lanes(&scenario.changes());
        let (bands, shares) = (scenario.basin.bands.len(), scenario.basin.shares());
        prop_assert_eq!((lanes.places(), lanes.mixes()), (bands, 11));
        let variation = |band: usize| {
            let stated = scenario.basin.bands[band].ground.accumulation_variation;
            scenario.snow.options.patchiness.map_or(0.0, |it| stated.unwrap_or(it.coefficient_of_variation))
        };
        let is_patchy = (0..bands).any(|band| variation(band) > 0.0);
        let classes = scenario.snow.options.patchiness.filter(|_| is_patchy).map_or(1, |it| it.classes);
        prop_assert_eq!(lanes.has_patches(), is_patchy && classes > 1);
        prop_assert_eq!(lanes.count(), 11 * bands * classes);
        for block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
            prop_assert_eq!(lanes.first_mix_column(), block.mixes_at);
            for table in [&block.swe_mm, &block.snow_mm, &block.outflow_mm] {
                for row in (0..block.days).map(|day| block.row(table, day)) {
                    for level in 0..11 {
                        let of_bands = (0..bands).map(|band| shares[band] * row[lanes.column(level, band)]);
                        let sum = of_bands.sum::<f64>();
                        let near = |mean: f64| (mean - sum).abs() <= 1e-12 * sum.abs().max(1e-9);
                        prop_assert!(near(row[block.mixes_at + level]));
                        prop_assert!(near(lanes.mix(level, row)));
                    }
                    for band in 0..bands {
                        let (of_place, column) = (lanes.of_place(10, band, row), row[lanes.column(10, band)]);
                        prop_assert!((of_place - column).abs() <= 1e-12 * column.abs().max(1e-9));
                    }
                }
            }
            // A lane has the temperature of its band at its level: minima and maxima by hand.
            let Some(detail) = &block.detail else { continue };
            let series = scenario.climate.series();
            let first = series.years.iter().find(|year| year.first == block.first).expect("a year of it").start;
            let (level, band, month) = (10, bands - 1, usize::from(series.month[first]));
            let (gradient, change) = (&scenario.basin.temperature, &scenario.changes()[level]);
            let band_m = scenario.basin.bands[band].elevation_m;
            let rise_km = (band_m - scenario.station_m) / 1000.0;
            let factor = scenario.warming.factor_at(band_m, &scenario.basin);
            let tmin = factor * change.tmin_c[month] + gradient.tmin_c_per_km[month] * rise_km;
            let tmax = factor * change.tmax_c[month] + gradient.tmax_c_per_km[month] * rise_km;
            let expected = series.mean_c[first] + (tmin + tmax) / 2.0;
            prop_assert!((detail.mean_c[lanes.lane(level, band)] - expected).abs() < 1e-9);
        }
    }

    /// Groups that are no levels of one basin mix by shares of their own, beyond the first row of means, too. 1e-12 of the sum.
    #[test]
    fn groups_mix_by_their_own_shares(scenario in scenarios(), shares in vec(vec(0.0..1.0, 2..4), 9..20)) {
        let change = MonthlyChange::NONE;
        let spec = |share: &f64| LaneSpec {
            basin: &scenario.basin,
            station_m: scenario.station_m,
            elevation_m: scenario.station_m + 1000.0 * share,
            ground: Ground::default(),
            change: &change,
            warming_factor: 1.0,
            snow: &scenario.snow,
            share: *share,
        };
        let groups: Vec<Vec<LaneSpec<'_>>> =
            shares.iter().map(|of_group| of_group.iter().map(spec).collect()).collect();
        let lanes = Lanes::new(&groups);
        for block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
            for row in (0..block.days).map(|day| block.row(&block.swe_mm, day)) {
                for (group, of_group) in shares.iter().enumerate() {
                    let places = of_group.iter().enumerate();
                    let sum: f64 = places.map(|(place, share)| share * row[lanes.column(group, place)]).sum();
                    let near = |mean: f64| (mean - sum).abs() <= 1e-12 * sum.abs().max(1e-9);
                    prop_assert!(near(row[block.mixes_at + group]) && near(lanes.mix(group, row)));
                }
            }
        }
    }

    /// A run over all years is one year after the other, bare after a gap; snow that was put back runs on as it did.
    #[test]
    fn years_follow_one_another(scenario in prop_oneof![scenarios(), scenarios_with_options()]) {
        let lanes = scenario.lanes(&scenario.changes());
        let series = scenario.climate.series();
        let expected = Scenario::run(&lanes, &series, Path::Widest);
        let mut engine = Engine::new(&lanes, true).with_cover();
        let mut blocks: Vec<YearBlock> = Vec::new();
        let done: Result<(), OpenLedger> = engine.years(&series, |span, block| {
            assert_eq!(span.first, block.first);
            blocks.push(block.clone());
            Ok(())
        });
        prop_assert_eq!(done, Ok(()));
        prop_assert_eq!(blocks.len(), expected.len());
        let same = |a: &YearBlock, b: &YearBlock| {
            let end = (a.days + 1) * a.width;
            a.swe_mm[..end].iter().map(|mm| mm.to_bits()).eq(b.swe_mm[..end].iter().map(|mm| mm.to_bits()))
        };
        prop_assert!(blocks.iter().zip(&expected).all(|(a, b)| same(a, b)));
        let years = &series.years;
        engine.restart();
        engine.year(series.view(&years[0])).expect("the ledger is closed");
        let kept = engine.snow();
        let once = engine.year(series.view(&years[1])).expect("the ledger is closed").clone();
        engine.restart();
        engine.put_snow(&kept);
        prop_assert!(engine.snow() == kept);
        let again = engine.year(series.view(&years[1])).expect("the ledger is closed");
        prop_assert!(same(again, &once));
    }

    /// Water without end opens the ledger: it is an error, and no result.
    #[test]
    fn an_open_ledger_is_an_error(scenario in scenarios()) {
        let lanes = scenario.lanes(&scenario.changes());
        let mut series = scenario.climate.series();
        series.precipitation_mm[40] = f64::INFINITY;
        let mut engine = Engine::new(&lanes, false);
        prop_assert!(engine.year(series.view(&series.years[0])).is_err());
    }

    /// What the lanes say of themselves is what was turned on.
    #[test]
    fn lanes_know_their_options(scenario in scenarios()) {
        let says = |options: SnowOptions, canopy_fraction: f64| {
            let mut scenario = scenario.clone();
            scenario.snow.options = options;
            scenario.basin.bands[0].ground.canopy_fraction = canopy_fraction;
            let lanes = scenario.lanes(&scenario.changes());
            [
                lanes.has_patches(),
                lanes.has_wet_bulb(),
                lanes.has_cold_content(),
                lanes.has_sublimation(),
                lanes.has_ground(),
            ]
        };
        let none = SnowOptions::default();
        let radiation = Some(Radiation { factor_mm_per_c_day: 2.5 });
        let patchiness = Some(Patchiness { coefficient_of_variation: 0.4, classes: 5 });
        let cold_content = Some(ColdContent { daily_share: 0.3 });
        let sublimation = Some(Sublimation { mm_per_day: [0.2; 12], snowfall_fraction: 0.0 });
        prop_assert_eq!(says(none, 0.0), [false; 5]);
        prop_assert_eq!(says(SnowOptions { patchiness, ..none }, 0.0), [true, false, false, false, false]);
        prop_assert_eq!(says(SnowOptions { wet_bulb: true, ..none }, 0.0), [false, true, false, false, false]);
        prop_assert_eq!(says(SnowOptions { cold_content, ..none }, 0.0), [false, false, true, false, false]);
        prop_assert_eq!(says(SnowOptions { sublimation, ..none }, 0.0), [false, false, false, true, false]);
        prop_assert_eq!(says(SnowOptions { radiation, ..none }, 0.0), [false, false, false, false, true]);
        prop_assert_eq!(says(none, 0.3), [false, false, false, false, true]);
        prop_assert_eq!(says(SnowOptions { start_bare_each_year: true, ..none }, 0.0), [false; 5]);
    }
}

/// A pillow measures a point: patches are of an area, everything else holds there, too.
#[test]
fn at_a_point_there_are_no_patches() {
    let options = SnowOptions {
        radiation: Some(Radiation { factor_mm_per_c_day: 2.5 }),
        patchiness: Some(Patchiness { coefficient_of_variation: 0.4, classes: 5 }),
        cold_content: Some(ColdContent { daily_share: 0.3 }),
        sublimation: Some(Sublimation { mm_per_day: [0.2; 12], snowfall_fraction: 0.1 }),
        wet_bulb: true,
        start_bare_each_year: true,
    };
    let raw = RawSnow { options, ..RawSnow::default() };
    let checked: Result<(SnowParams, Vec<Unlikely>), _> = SnowParams::check(&raw, true, false);
    let (snow, _) = checked.expect("nothing that is refused");
    assert_eq!(snow.options, options);
    let at_a_point = snow.at_a_point();
    assert_eq!(at_a_point.options, SnowOptions { patchiness: None, ..options });
    assert_eq!(SnowParams { options, ..at_a_point }, snow);
    assert_eq!(SnowParams::defaults(DegreeRule::Mean, false).at_a_point().options, SnowOptions::default());
}
