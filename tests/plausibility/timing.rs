//! When snow comes and goes in a warmer climate, and how fast.

use super::published::{Published, factor_two};
use super::ranges::{CASCADES, PYRENEES, ROCKIES, Range, YUKON};
use super::seasons::{PLAIN_LEVELS_C, Seasons, deviation, levels};

/// Change per degree of a measure over all four degrees; a single degree moves a date of 30 years by little more than
/// chance.
fn per_degree(seasons: &Seasons, measure: impl Fn(&Seasons, usize) -> f64) -> f64 {
    let last = PLAIN_LEVELS_C.len() - 1;
    (measure(seasons, last) - measure(seasons, 0)) / PLAIN_LEVELS_C[last]
}

/// SC-05: an alpine and a subalpine site of Niwot Ridge, half to twice the published numbers. Melt begins with the
/// peak's day; the day with a tenth of the melt done and the melt rates are another matter, see the head of this
/// folder.
#[test]
fn an_alpine_and_a_subalpine_site() {
    for (place, elevation_m, peak_mm, onset_days, season_days) in
        [("alpine (Saddle)", 3528.0, -43.9, -6.2, -10.7), ("subalpine (C1)", 3022.0, -54.3, -8.8, -16.4)]
    {
        let seasons = Seasons::plain(&ROCKIES.at(elevation_m));
        let of = |name: &'static str| per_degree(&seasons, |of, level| of.basin(name, level));
        let cover = per_degree(&seasons, |of, level| of.over_bands("cover_days", level));
        let holds = |what: &str, published, found| {
            let published = Published {
                row: &format!("SC-05, {place}: {what} per degC"),
                band: factor_two(published),
                source: "Jennings & Molotch 2020, Front. Earth Sci. 8:186",
            };
            published.assert_holds(found);
        };
        holds("peak SWE, mm", peak_mm, of("peak_swe_mm"));
        holds("melt onset, days", onset_days, of("peak_day"));
        holds("season, days", season_days, cover);
    }
}

/// SC-11 (Brown & Mote 2009, J. Climate 22:2124, abstract): with warming and the precipitation that comes with it, 3 %
/// per degree, the duration of snow cover leaves what years differ by before peak SWE does; most in a maritime range,
/// least in a cold and dry interior.
#[test]
fn duration_reacts_before_the_peak_and_most_by_the_sea() {
    let changes = levels(&[0.0, 1.0], 3.0);
    let all = [CASCADES, ROCKIES, YUKON].map(|range| Seasons::of(&range, &changes));
    let days = all.each_ref().map(|of| of.over_bands("cover_days", 0) - of.over_bands("cover_days", 1));
    let in_deviations = all.each_ref().map(|of| {
        let [cover, peak] = [of.over_bands_years("cover_days", 0), of.basin_years("peak_swe_mm", 0)];
        let peak_mm = of.basin("peak_swe_mm", 0) - of.basin("peak_swe_mm", 1);
        [
            (of.over_bands("cover_days", 0) - of.over_bands("cover_days", 1)) / deviation(&cover),
            peak_mm / deviation(&peak),
        ]
    });
    for [duration, peak] in in_deviations {
        assert!(duration > peak, "duration and peak, in standard deviations of years: {in_deviations:?}");
    }
    assert!(days.is_sorted_by(|sea, inland| sea > inland), "days of cover lost: {days:?}");
    let durations = in_deviations.map(|[duration, _]| duration);
    assert!(durations.is_sorted_by(|sea, inland| sea > inland), "the same in deviations: {durations:?}");
}

/// SC-16 (Musselman et al. 2017, Nature Clim. Change 7:214, quoted by others: up to 64 % less area with moderate and
/// fast melt) and SC-04: melt is slower in a warmer climate. Days and places with at least 15 mm of melt grow fewer
/// with every degree, and the pack goes down more slowly from its peak.
#[test]
fn melt_is_slower_where_it_is_warmer() {
    for range in [CASCADES, ROCKIES, YUKON, PYRENEES.between(2050.0, 2300.0)] {
        let seasons = Seasons::plain(&range);
        let fast: Vec<f64> =
            (0..PLAIN_LEVELS_C.len()).map(|level| seasons.over_bands("fast_melt_days", level)).collect();
        assert!(fast.is_sorted_by(|cool, warm| cool > warm), "days of fast melt: {fast:?}");
        let rate = per_degree(&seasons, melt_rate);
        assert!(rate < 0.0, "melt rate changes by {rate} mm a day per degC");
    }
}

/// Mean over the years of peak SWE over the days from it to melt-out, mm a day.
fn melt_rate(seasons: &Seasons, level: usize) -> f64 {
    let of = |name| seasons.basin_years(name, level);
    let days = of("melt_out_day").into_iter().zip(of("peak_day")).map(|(out, peak)| out - peak);
    let rates = of("peak_swe_mm").into_iter().zip(days).map(|(peak_mm, days)| peak_mm / days);
    let rates: Vec<f64> = rates.filter(|rate| rate.is_finite()).collect();
    rates.iter().sum::<f64>() / rates.len() as f64
}

/// SC-07 (Frontiers in Water 2021, doi 10.3389/frwa.2021.604275, abstract: melt onset 1 to 4 weeks, its end 3 weeks
/// earlier) and SC-18 (Stewart et al. 2005, J. Climate 18:1136, abstract: 1 to 4 weeks): everything comes earlier with
/// each degree.
#[test]
fn melt_comes_earlier_with_every_degree() {
    let early = Published {
        row: "SC-07, half of the melt done, days earlier at +2 degC",
        band: [7.0, 28.0],
        source: "Frontiers in Water 2021, doi 10.3389/frwa.2021.604275: 1 to 4 weeks",
    };
    let dates = |range: &Range| {
        let seasons = Seasons::plain(range);
        ["peak_day", "melt_d50_day", "melt_out_day"].map(|name| {
            (0..PLAIN_LEVELS_C.len()).map(|level| seasons.basin(name, level)).collect::<Vec<f64>>()
        })
    };
    for range in [CASCADES, ROCKIES, YUKON, PYRENEES.between(2050.0, 2300.0)] {
        let dates = dates(&range);
        for days in &dates {
            assert!(days.is_sorted_by(|cool, warm| cool > warm), "{days:?}");
        }
        early.assert_holds(dates[1][0] - dates[1][2]);
    }
}
