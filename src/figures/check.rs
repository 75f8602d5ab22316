//! Tests of whole figures: text inside and apart, numbers that are numbers, titles that turn with the findings.

use super::{FIGURES, Setting, Svg, text_width};
use crate::basin::Band;
use crate::calendar::{MonthDay, WaterYearStart};
use crate::ensemble::Seasons;
use crate::findings::{Findings, Questions, answer};
use crate::season::{Kind, Measure, NONE, NOT_GONE, Place};
use ndarray::{Array3, Array4};

/// A made-up study: reference values spread evenly, each level a constant further.
struct Study<'a> {
    levels_c: &'a [f64],
    reference: usize,
    realizations: usize,
    /// Median and half-width of 1 April SWE at the reference, and its change a degree, mm.
    swe: [f64; 3],
    /// The same for both dates, days.
    dates: [f64; 3],
    /// Realizations whose snow never went, and with nothing to time, at every level.
    undefined: [usize; 2],
}

const PLAIN: Study<'static> = Study {
    levels_c: &[0.0, 1.0, 2.0, 3.0, 4.0],
    reference: 0,
    realizations: 60,
    swe: [430.0, 90.0, -60.0],
    dates: [220.0, 9.0, -6.0],
    undefined: [0, 0],
};

impl Study<'_> {
    fn findings(&self) -> Findings {
        let measure = |name: &str, title: &str, kind| Measure {
            name: name.to_owned(),
            title: title.to_owned(),
            kind,
            place: Place::BandsAndBasin,
        };
        let measures = vec![
            measure("swe_04_01_mm", "1 April SWE", Kind::AmountMm),
            measure(
                "melt_d50_day",
                "day with half of the net melt done",
                Kind::DayOfWaterYear,
            ),
            measure("melt_out_day", "melt-out", Kind::DayOfWaterYear),
        ];
        let (levels, count) = (self.levels_c.len(), self.realizations);
        let value = |level: usize, measure: usize, realization: usize| {
            let warming = self.levels_c[level] - self.levels_c[self.reference];
            let place = (realization as f64 + 0.5) / count as f64 * 2.0 - 1.0;
            let [middle, half, change] = if measure == 0 { self.swe } else { self.dates };
            let change = if measure == 2 { 0.7 * change } else { change };
            let value =
                middle + half * place * (0.6 + 0.4 * place * place) + change * warming * (1.0 + 0.1 * place);
            let [not_gone, none] = self.undefined;
            match measure {
                0 => value.max(0.0),
                _ if realization < none => NONE,
                _ if realization + not_gone >= count => NOT_GONE,
                1 => value.round(),
                _ => value.round() + 25.0,
            }
        };
        let basin_periods = Array3::from_shape_fn((levels, 3, count), |(l, m, r)| value(l, m, r));
        let seasons = Seasons {
            measures,
            basin_years: Array4::from_shape_fn((levels, 3, count, 1), |(l, m, r, _)| value(l, m, r)),
            band_periods: Array4::from_shape_fn((levels, 1, 3, count), |(l, _, m, r)| value(l, m, r)),
            band_undefined: Array3::from_elem((levels, 1, 3), [0, 0]),
            basin_periods,
        };
        let band = Band {
            lower_m: 2000.0,
            upper_m: 3000.0,
            area_km2: 40.0,
            elevation_m: 2500.0,
        };
        let questions = Questions {
            levels_c: self.levels_c,
            reference: self.reference,
            bands: &[band],
            seed: 7,
        };
        Findings {
            years: 30,
            ..answer(&seasons, &questions)
        }
    }

    fn draw(&self, title: &str, month: u32) -> Vec<Svg> {
        let setting = Setting {
            study_title: title,
            water_year_starts: WaterYearStart(MonthDay::new(month, 1).unwrap()),
        };
        let findings = self.findings();
        let draw = |figure: &super::Figure| (figure.draw)(&findings, &setting).unwrap();
        FIGURES.iter().map(draw).collect()
    }
}

fn studies() -> Vec<(&'static str, Study<'static>)> {
    vec![
        ("plain", PLAIN),
        (
            "cold",
            Study {
                swe: [610.0, 140.0, -9.0],
                dates: [250.0, 12.0, -1.0],
                ..PLAIN
            },
        ),
        (
            "rising",
            Study {
                swe: [430.0, 20.0, 30.0],
                dates: [220.0, 4.0, 3.0],
                ..PLAIN
            },
        ),
        (
            "two levels",
            Study {
                levels_c: &[0.0, 2.0],
                ..PLAIN
            },
        ),
        (
            "one level",
            Study {
                levels_c: &[0.0],
                ..PLAIN
            },
        ),
        (
            "colder only",
            Study {
                levels_c: &[-2.0, 0.0],
                reference: 1,
                ..PLAIN
            },
        ),
        (
            "nine levels",
            Study {
                levels_c: &[-2.0, -1.0, 0.0, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0],
                reference: 2,
                ..PLAIN
            },
        ),
        (
            "uneven levels",
            Study {
                levels_c: &[0.0, 0.1, 0.25, 4.0],
                ..PLAIN
            },
        ),
        (
            "tiny",
            Study {
                swe: [0.3, 0.2, -0.06],
                ..PLAIN
            },
        ),
        (
            "huge",
            Study {
                swe: [12_000.0, 2_000.0, -1_600.0],
                ..PLAIN
            },
        ),
        (
            "nothing",
            Study {
                swe: [0.0, 0.0, 0.0],
                undefined: [0, 60],
                ..PLAIN
            },
        ),
        (
            "no spread",
            Study {
                swe: [430.0, 0.0, -50.0],
                dates: [220.0, 0.0, -4.0],
                ..PLAIN
            },
        ),
        (
            "one realization",
            Study {
                realizations: 1,
                ..PLAIN
            },
        ),
        (
            "few realizations",
            Study {
                realizations: 6,
                ..PLAIN
            },
        ),
        (
            "few not gone",
            Study {
                undefined: [2, 1],
                ..PLAIN
            },
        ),
        (
            "not gone",
            Study {
                undefined: [5, 0],
                ..PLAIN
            },
        ),
        (
            "hardly gone",
            Study {
                undefined: [40, 4],
                ..PLAIN
            },
        ),
        (
            "shifted reference",
            Study {
                levels_c: &[0.5, 1.0, 1.5, 2.0],
                ..PLAIN
            },
        ),
    ]
}

/// Left, top, right, bottom and words of a text.
type Lettered = ([f64; 4], String);

fn texts(svg: &str) -> Vec<Lettered> {
    svg.split("<text ").skip(1).map(lettered).collect()
}

fn lettered(element: &str) -> Lettered {
    let (attributes, rest) = element.split_once('>').unwrap();
    let words = rest.split_once("</text>").unwrap().0;
    let words = words
        .replace("&lt;", "<")
        .replace("&gt;", ">")
        .replace("&quot;", "\"")
        .replace("&amp;", "&");
    let attribute = |name: &str| {
        let (_, after) = attributes.split_once(&format!(" {name}=\""))?;
        after.split_once('"').map(|(value, _)| value)
    };
    let number = |name: &str| attribute(name).unwrap().parse::<f64>().unwrap();
    let size = number("font-size");
    let width = text_width(&words, size, attribute("font-weight").is_some());
    let left = number("x")
        - match attribute("text-anchor") {
            Some("middle") => width / 2.0,
            Some("end") => width,
            _ => 0.0,
        };
    (
        [
            left,
            number("y") - 0.72 * size,
            left + width,
            number("y") + 0.22 * size,
        ],
        words,
    )
}

fn view_box(svg: &str) -> [f64; 2] {
    let (_, after) = svg.split_once("viewBox=\"0 0 ").unwrap();
    let (size, _) = after.split_once('"').unwrap();
    let (width, height) = size.split_once(' ').unwrap();
    [width.parse().unwrap(), height.parse().unwrap()]
}

#[test]
fn text_lies_inside_and_apart_and_is_large_enough() {
    let long =
        "Alder Fork above Lantern Reservoir, planning study for the water users of the valley, ".repeat(4);
    for (name, study) in studies() {
        for title in ["Alder Fork", long.as_str()] {
            for svg in study.draw(title, 10) {
                let [width, height] = view_box(&svg.text);
                let texts = texts(&svg.text);
                for (at, ([left, top, right, bottom], words)) in texts.iter().enumerate() {
                    let inside = *left >= 0.0 && *top >= 0.0 && *right <= width && *bottom <= height;
                    assert!(inside, "{name}: {words:?} leaves the figure");
                    for ([l, t, r, b], other) in &texts[..at] {
                        let apart = right <= l || r <= left || bottom <= t || b <= top;
                        assert!(apart, "{name}: {words:?} on {other:?}");
                    }
                }
            }
        }
    }
}

#[test]
fn numbers_are_numbers_and_bytes_are_the_same_again() {
    for (name, study) in studies() {
        let first = study.draw("Alder Fork", 4);
        for svg in &first {
            for nonsense in ["NaN", "inf", "\"-0\"", "-0 "] {
                let drawn = svg.text.split("</desc>").nth(1).unwrap();
                assert!(!drawn.contains(nonsense), "{name}: {nonsense}");
            }
        }
        assert_eq!(first, study.draw("Alder Fork", 4), "{name}");
    }
}

#[test]
fn a_title_with_the_characters_of_xml_stays_text() {
    for svg in PLAIN.draw("A & B <c>", 10) {
        assert!(svg.text.contains(">A &amp; B &lt;c&gt;</text>"));
        assert!(!svg.text.contains("<c>"));
    }
}

#[test]
fn titles_turn_round_when_the_numbers_do() {
    let titles = |study: &Study<'_>| {
        study
            .draw("Alder Fork", 10)
            .into_iter()
            .map(|svg| svg.title)
            .collect::<Vec<_>>()
    };
    let falling = titles(&PLAIN);
    assert!(
        falling[0].starts_with("1 April SWE is 120 mm (28 %) lower at +2 °C; from +1."),
        "{falling:?}"
    );
    assert!(
        falling[0].ends_with("on, the shift outweighs the precipitation spread"),
        "{falling:?}"
    );
    assert!(
        falling[1].starts_with("Half of the melt comes 12 days and melt-out 8 days earlier at +2 °C"),
        "{falling:?}"
    );
    let rising = titles(&Study {
        swe: [430.0, 90.0, 60.0],
        dates: [220.0, 9.0, 6.0],
        ..PLAIN
    });
    assert!(
        rising[0].starts_with("1 April SWE is 120 mm (28 %) higher at +2 °C"),
        "{rising:?}"
    );
    assert!(
        rising[1].starts_with("Half of the melt comes 12 days and melt-out 8 days later at +2 °C"),
        "{rising:?}"
    );
    let cold = titles(&Study {
        swe: [610.0, 140.0, -9.0],
        dates: [250.0, 12.0, -1.0],
        ..PLAIN
    });
    assert_eq!(
        cold[0],
        "1 April SWE is 36 mm (5.9 %) lower at +4 °C; up to +4 °C, the shift does not outweigh the precipitation spread"
    );
    assert!(cold[1].contains("does not outweigh"), "{cold:?}");
}

#[test]
fn each_figure_is_named_for_readers_who_do_not_see_it() {
    for (figure, svg) in FIGURES.iter().zip(PLAIN.draw("Alder Fork", 10)) {
        let slug = figure.slug;
        assert!(svg.text.contains(&format!(
            "role=\"img\" aria-labelledby=\"{slug}-title {slug}-desc\""
        )));
        assert!(
            svg.text
                .contains(&format!("<title id=\"{slug}-title\">{}</title>", svg.title))
        );
        for said in [
            "60 realizations of 30 years",
            "5–95 %",
            "not day-to-day variation",
        ] {
            assert!(svg.caption.contains(said), "{slug}: {said}");
        }
        assert!(svg.alt.starts_with(&svg.title));
    }
}

#[test]
fn figures_without_their_measures_are_not_drawn() {
    let setting = Setting {
        study_title: "Alder Fork",
        water_year_starts: WaterYearStart(MonthDay::new(10, 1).unwrap()),
    };
    let findings = Findings {
        basin: Vec::new(),
        ..PLAIN.findings()
    };
    assert!(
        FIGURES
            .iter()
            .all(|figure| (figure.draw)(&findings, &setting).is_none())
    );
}

#[test]
fn snow_that_never_goes_is_counted_in_its_row() {
    let figures = Study {
        undefined: [5, 0],
        ..PLAIN
    }
    .draw("Alder Fork", 10);
    let said = texts(&figures[1].text);
    let count = said
        .iter()
        .filter(|(_, words)| words == "snow not gone in 5 of 60 realizations")
        .count();
    assert_eq!(count, 2 * PLAIN.levels_c.len());
}
