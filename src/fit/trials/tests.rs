//! Trials against the comparison that a daily run tells.

use super::super::invented::{STATION_M, basin, day, pillow, season, stated, usual, weather};
use super::super::{Held, Space};
use super::*;
use chrono::Datelike;

/// The efficiency by sums of a trial that corrects the gauge by itself, and the one by passes over the pairs of a run on a
/// corrected record: the same to 1e-9, what sums of some thousand squares lose. So is their Kling-Gupta efficiency, less
/// the errors of the season.
#[test]
fn a_trial_is_scored_as_a_comparison() {
    let weather = weather(6);
    let seen = pillow(&weather, &stated(), |date, mm| if date.year() < 2003 { mm } else { 0.8 * mm });
    let sites = [Site { name: "pillow", elevation_m: STATION_M, observations: &seen }];
    let (basin, season) = (basin(), season());
    let held =
        Held { sites: &sites, weather: &weather, basin: &basin, station_m: STATION_M, season: &season };
    let keys = ["snow.melt_base_c", "snow.rain_snow.half_snow_at_c", "weather.gauge_multiplier.snow"];
    let space = Space::new(&stated(), &usual(&keys));
    let points = [[0.1, 0.2, 0.3], [0.9, 0.5, 0.8], [0.4, 0.9, 0.1]];
    let trials = points.map(|point| Trial { parameters: space.at(&point), choice: 0 });
    let in_split = [true, false, true, true, false, true];
    let value = |objective| {
        let splits = vec![in_split.map(u32::from).to_vec()];
        let at = (basin.latitude_deg, STATION_M);
        let run = Trials::new(&sites, &weather, at, day(4, 1), objective, splits);
        run.values(&trials).expect("the ledger closes")
    };
    let [daily, seasonal] = [Objective::NashSutcliffe, Objective::Season].map(value);
    for ((trial, daily), seasonal) in trials.iter().zip(daily).zip(seasonal) {
        let compared = held.compared(&trial.parameters).expect("the ledger closes");
        let compared = compared[0].of_years(|water_year| in_split[(water_year - 2001) as usize]);
        let expected = compared.nash_sutcliffe.expect("there is snow");
        assert!((daily - expected).abs() < 1e-9, "{daily} and {expected}");
        let bias =
            |bias: Option<super::super::Bias>| bias.and_then(|bias| bias.bias_pct).expect("a bias") / 100.0;
        let melt_out = compared.melt_out.expect("melt-outs").mean_size_days;
        let expected = compared.kling_gupta.expect("there is snow").efficiency
            - bias(compared.peak).abs()
            - bias(compared.surveys[0].bias).abs()
            - melt_out / 60.0;
        assert!((seasonal - expected).abs() < 1e-9, "{seasonal} and {expected}");
    }
}

/// Bit for bit the same on one thread and on two, and beside other trials or alone.
#[test]
fn threads_and_neighbours_do_not_show() {
    let weather = weather(3);
    let seen = pillow(&weather, &stated(), |_, mm| 1.1 * mm);
    let sites = [Site { name: "pillow", elevation_m: STATION_M, observations: &seen }];
    let space = Space::new(&stated(), &usual(&["snow.melt_base_c", "weather.gauge_multiplier.snow"]));
    let trials: Vec<Trial> =
        (0..70).map(|at| Trial { parameters: space.at(&[f64::from(at) / 70.0, 0.5]), choice: 0 }).collect();
    let run =
        Trials::new(&sites, &weather, (40.0, STATION_M), day(4, 1), Objective::Season, vec![vec![1; 3]]);
    let on = |threads| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().expect("a pool");
        pool.install(|| run.values(&trials)).expect("the ledger closes")
    };
    let one = on(1);
    assert_eq!(one, on(2));
    assert_eq!(one[40], run.values(&trials[40..41]).expect("the ledger closes")[0]);
}
