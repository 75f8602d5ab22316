//! The figure of volumes by chance of exceedance.

use super::studies::{PLAIN, Study};
use super::texts;
use crate::figures::{FIGURES, Svg};
use crate::units::UnitSystem;

fn draw(study: &Study<'_>, units: UnitSystem) -> Option<Svg> {
    let drawn = study.draw_in(units, "Alder Fork", 10);
    drawn.into_iter().find(|svg| svg.text.contains("id=\"window-volume-title\""))
}

/// By hand, the 10 % quantile of type 8 of 60 values lies at 6.37: 367.8 mm at the reference and 147.1 mm at +4 degC, which on
/// 112.5 km2 are 41.4 and 16.5 hm3, or 33.5 and 13.4 thousand acre-feet (0.810713 a hm3).
#[test]
fn titles_say_what_nine_in_ten_years_bring() {
    assert_eq!(
        draw(&PLAIN, UnitSystem::Metric).unwrap().title,
        "Snowpack outflow, 1 April to 31 July: in 9 of 10 years at least 41.4 hm³ at the reference, 16.5 hm³ at +4 °C"
    );
    assert_eq!(
        draw(&PLAIN, UnitSystem::Us).unwrap().title,
        "Snowpack outflow, 1 April to 31 July: in 9 of 10 years at least 33.5 thousand acre-feet at the reference, 13.4 thousand \
         acre-feet at +7.2 °F"
    );
    let alone = draw(&Study { levels_c: &[0.0], ..PLAIN }, UnitSystem::Metric).unwrap();
    assert!(
        alone.title.ends_with("at least 41.4 hm³ at the reference; no other level was run"),
        "{}",
        alone.title
    );
    assert!(alone.caption.contains("at least 368 mm at the reference"), "{}", alone.caption);
}

/// Dry years stand at the left: the volumes written below the columns rise to the right, and fall with warming.
#[test]
fn volumes_rise_from_dry_years_to_wet_ones() {
    let svg = draw(&PLAIN, UnitSystem::Metric).unwrap();
    let rows = svg.text.split("<g class=\"volumes\">").nth(1).unwrap();
    let numbers =
        texts(rows).into_iter().filter_map(|(place, words)| Some((place[0], words.parse::<f64>().ok()?)));
    let numbers: Vec<(f64, f64)> = numbers.collect();
    assert_eq!(numbers.len(), 5 * PLAIN.levels_c.len());
    for row in numbers.chunks(5) {
        assert!(row.is_sorted_by(|a, b| a.0 < b.0 && a.1 < b.1), "{row:?}");
    }
    assert!(numbers.iter().step_by(5).is_sorted_by(|a, b| a.1 > b.1), "{numbers:?}");
}

#[test]
fn without_a_window_there_is_no_figure() {
    let bare = Study { has_window: false, ..PLAIN };
    assert!(draw(&bare, UnitSystem::Metric).is_none());
    assert_eq!(bare.draw("Alder Fork", 10).len(), FIGURES.len() - 1);
}
