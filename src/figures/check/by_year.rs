//! The figures of what single years say.

use super::studies::{PLAIN, Study};
use crate::figures::Svg;

fn draw(study: &Study<'_>, slug: &str) -> Option<Svg> {
    let drawn = study.draw("Alder Fork", 10);
    drawn.into_iter().find(|svg| svg.text.contains(&format!("id=\"{slug}-title\"")))
}

/// Years of ten at the reference and at the farthest level, as the title says them.
fn odds(study: &Study<'_>) -> [f64; 2] {
    let title = draw(study, "low-snow-odds").unwrap().title;
    let number = |from: &str| {
        let after = title.split(from).last().unwrap();
        after.split(' ').next().unwrap().parse::<f64>().unwrap()
    };
    [number(" mm in "), number(", in ")]
}

/// The limit is the reference's lowest fifth, 2 of 10 years; falling snow makes low years commoner, rising snow more seldom.
#[test]
fn odds_turn_round_with_the_snow() {
    let [reference, far] = odds(&PLAIN);
    assert!((reference - 2.0).abs() < 0.11 && far > 4.0, "{reference} and {far}");
    let [reference, far] = odds(&Study { swe: [430.0, 90.0, 60.0], ..PLAIN });
    assert!((reference - 2.0).abs() < 0.11 && far < 1.0, "{reference} and {far}");
    assert!(draw(&Study { swe: [0.0, 0.0, 0.0], ..PLAIN }, "low-snow-odds").is_none(), "no snow, no odds");
}

/// A change far beyond all spread is the largest part in every averaging period, and leaves the spread at once; one far below it in
/// none, and never.
#[test]
fn titles_of_variance_and_detection_turn_round() {
    let title = |study: &Study<'_>, slug| draw(study, slug).unwrap().title;
    let steep = Study { swe: [3000.0, 90.0, -700.0], levels_c: &[0.0, 4.0], ..PLAIN };
    let flat = Study { swe: [430.0, 90.0, -1.0], levels_c: &[0.0, 4.0], ..PLAIN };
    let said = [&steep, &flat].map(|study| title(study, "variance-by-averaging-period"));
    assert!(said[0].ends_with("in every averaging period, single years included"), "{said:?}");
    assert!(said[1].ends_with("in no averaging period up to 5 years"), "{said:?}");
    let said = [&steep, &flat].map(|study| title(study, "change-against-spread"));
    assert!(said[0].contains("from +") && said[1].contains("at no level up to +4 °C"), "{said:?}");
}

#[test]
fn one_level_has_nothing_to_part_or_detect() {
    let alone = Study { levels_c: &[0.0], ..PLAIN };
    for slug in ["variance-by-averaging-period", "change-against-spread"] {
        assert!(draw(&alone, slug).is_none(), "{slug}");
    }
    assert!(draw(&alone, "low-snow-odds").unwrap().title.ends_with("; no other level was run"));
}
