//! The figure of SWE through the water year.

use super::studies::{PLAIN, Study, studies};
use super::texts;
use crate::figures::Svg;

fn draw(study: &Study<'_>, month: u32) -> Svg {
    let drawn = study.draw("Alder Fork", month);
    drawn.into_iter().find(|svg| svg.text.contains("id=\"swe-through-year-title\"")).unwrap()
}

/// By hand: the middle year has 430 mm on the day with 180 before it, 30 March of a northern water year and 28 September of a
/// southern one, and 240 mm less at +4 degC.
#[test]
fn titles_name_the_highest_medians_and_their_days() {
    assert_eq!(
        draw(&PLAIN, 10).title,
        "Median basin SWE is highest at 430 mm on 30 March at the reference, at 190 mm on 30 March at +4 °C"
    );
    assert!(draw(&PLAIN, 4).title.contains("190 mm on 28 September at +4 °C"));
    assert_eq!(
        draw(&Study { swe: [0.0, 0.0, 0.0], ..PLAIN }, 10).title,
        "Median basin SWE is 0 mm all year at the reference, 0 mm all year at +4 °C"
    );
    assert_eq!(
        draw(&Study { levels_c: &[0.0], ..PLAIN }, 10).title,
        "Median basin SWE is highest at 430 mm on 30 March at the reference; no other level was run"
    );
}

#[test]
fn of_many_levels_four_are_shown_and_named() {
    let many = Study {
        levels_c: &[-2.0, -1.0, 0.0, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0],
        reference: 2,
        swe: [430.0, 90.0, -30.0],
        ..PLAIN
    };
    let svg = draw(&many, 10);
    let panels = texts(&svg.text).into_iter().filter(|(_, words)| words.starts_with("median up to")).count();
    assert_eq!(panels, 4);
    let said = "Of 9 levels, the reference, +1 °C, +3 °C, +4 °C and +6 °C are shown.";
    assert!(svg.caption.contains(said), "{}", svg.caption);
    assert!(!draw(&PLAIN, 10).caption.contains("are shown"));
}

/// No curve runs through a word, wherever in the year the snow lies.
#[test]
fn curves_keep_clear_of_words() {
    for (name, study) in studies() {
        let svg = draw(&study, 10);
        let words = texts(&svg.text);
        for line in svg.text.split("<polyline points=\"").skip(1) {
            let points: Vec<[f64; 2]> = line
                .split('"')
                .next()
                .unwrap()
                .split(' ')
                .map(|pair| pair.split_once(',').unwrap())
                .map(|(x, y)| [x.parse().unwrap(), y.parse().unwrap()])
                .collect();
            for pair in points.windows(2) {
                for part in 0..=20 {
                    let [x, y] = [0, 1]
                        .map(|axis| pair[0][axis] + (pair[1][axis] - pair[0][axis]) * f64::from(part) / 20.0);
                    let struck = words.iter().find(|([l, t, r, b], _)| *l < x && x < *r && *t < y && y < *b);
                    assert!(struck.is_none(), "{name}: {struck:?}");
                }
            }
        }
    }
}
