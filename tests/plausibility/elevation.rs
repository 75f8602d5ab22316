//! Where in a range the warmth is felt.

use super::published::Published;
use super::ranges::{ALPS, PYRENEES};
use super::seasons::{PLAIN_LEVELS_C, Seasons, change_pct, levels};

/// SC-12, for a snow line at any of several depths: the elevation at which SWE of a median year falls below it on 1
/// April.
#[test]
fn the_snow_line_rises_by_120_to_200_m_per_degree() {
    let rise = Published {
        row: "SC-12, rise of the snow line, m per degC",
        band: [120.0, 200.0],
        source: "Hantel & Maurer 2011, Meteorol. Z. 20:267: 123 m; common rule 150 m",
    };
    let seasons = Seasons::plain(&ALPS);
    for depth_mm in [1.0, 10.0, 100.0] {
        let lines: Vec<f64> =
            (0..PLAIN_LEVELS_C.len()).map(|level| snow_line_m(&seasons, level, depth_mm)).collect();
        for pair in lines.windows(2) {
            rise.assert_holds(pair[1] - pair[0]);
        }
    }
}

/// Median over the years of the elevation above which every band has more than a depth on 1 April, linear between bands.
fn snow_line_m(seasons: &Seasons, level: usize, depth_mm: f64) -> f64 {
    let bands = &seasons.basin.bands;
    let swe: Vec<Vec<f64>> =
        (0..bands.len()).map(|band| seasons.band_years("swe_04_01_mm", level, band)).collect();
    let line = |year: usize| {
        let Some(below) = (0..bands.len()).rev().find(|band| swe[*band][year] < depth_mm) else {
            return bands[0].lower_m; // fresh snow down to the foot
        };
        let [low, high] = [swe[below][year], swe[below + 1][year]];
        let [from_m, to_m] = [bands[below].elevation_m, bands[below + 1].elevation_m];
        from_m + (to_m - from_m) * (depth_mm - low) / (high - low)
    };
    let mut lines: Vec<f64> = (0..swe[0].len()).map(line).collect();
    lines.sort_by(f64::total_cmp);
    let middle = lines.len() / 2;
    (lines[middle - 1] + lines[middle]) / 2.0
}

/// SC-13 (Le Roux et al. 2023, The Cryosphere 17:4691, abstract: largest snowfalls rise above 3600 m with warming): in
/// air that holds 7 % more water per degree, the largest snowfall of a year and all its snowfall rise in every band
/// above 3600 m; at the foot all snowfall falls; and without more precipitation it falls everywhere.
#[test]
fn more_snow_falls_high_up_where_warmth_brings_moisture() {
    let moist = Seasons::of(&ALPS, &levels(&PLAIN_LEVELS_C, 7.0));
    let dry = Seasons::plain(&ALPS);
    for (at, band) in moist.basin.bands.iter().enumerate() {
        for level in 1..PLAIN_LEVELS_C.len() {
            let change =
                |of: &Seasons, name: &str| change_pct(of.band(name, 0, at), of.band(name, level, at));
            let (largest, all) = (change(&moist, "largest_snowfall_mm"), change(&moist, "snowfall_mm"));
            let where_and_when = format!("{} m, level {level}: {largest} and {all} %", band.elevation_m);
            assert!(band.elevation_m < 3600.0 || (largest > 0.0 && all > 0.0), "{where_and_when}");
            assert!(band.elevation_m > 2400.0 || all < 0.0, "{where_and_when}");
            assert!(change(&dry, "snowfall_mm") < 0.0 && change(&dry, "largest_snowfall_mm") <= 0.0);
        }
    }
}

/// SC-14 (Bonsoms et al. 2023, The Cryosphere 17:1307, abstract): in the Pyrenees sensitivity falls with elevation,
/// whichever number of the pack it is taken of; from band to band 200 m higher.
#[test]
fn sensitivity_falls_with_elevation() {
    let seasons = Seasons::plain(&PYRENEES);
    for name in ["swe_04_01_mm", "peak_swe_mm", "swe_area_mm_days"] {
        let change = |band: usize| change_pct(seasons.band(name, 0, band), seasons.band(name, 1, band));
        let changes: Vec<f64> = (0..seasons.basin.bands.len()).step_by(4).map(change).collect();
        assert!(changes.is_sorted_by(|low, high| low < high), "{name}: {changes:?}");
    }
}
