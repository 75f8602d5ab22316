//! The figure of snow water by elevation.

use super::studies::{PLAIN, Study};
use super::texts;
use crate::figures::Svg;
use crate::units::UnitSystem;

fn draw(study: &Study<'_>, units: UnitSystem) -> Svg {
    let drawn = study.draw_in(units, "Alder Fork", 10);
    drawn.into_iter().find(|svg| svg.text.contains("id=\"swe-by-band-title\"")).unwrap()
}

fn title(study: &Study<'_>) -> String {
    draw(study, UnitSystem::Metric).title
}

/// By hand: 60 mm a degree are 240 mm at +4 degC of 430 mm in the middle band, and 0.4 and 1.6 times as much below and above
/// it, 56 % everywhere. Where the highest band gains 150 mm a degree it gains 600 - 384 mm of 688 mm.
#[test]
fn titles_hold_where_all_lose_where_some_gain_and_where_none_loses() {
    assert_eq!(
        title(&PLAIN),
        "At +4 °C, 1 April SWE falls furthest at 2\u{2009}600–2\u{2009}900 m: 384 mm (56 %)"
    );
    assert_eq!(
        title(&Study { highest_gains_mm: 150.0, ..PLAIN }),
        "At +4 °C, 1 April SWE falls furthest at 2\u{2009}300–2\u{2009}600 m: 240 mm (56 %); 1 of 3 bands gains, at most 216 mm \
         (31 %) at 2\u{2009}600–2\u{2009}900 m"
    );
    assert_eq!(
        title(&Study { highest_gains_mm: 48.0, ..PLAIN }),
        "At +4 °C, 1 April SWE falls furthest at 2\u{2009}300–2\u{2009}600 m: 240 mm (56 %)"
    );
    assert_eq!(
        title(&Study { highest_gains_mm: 24.0, ..PLAIN }),
        "At +4 °C, 1 April SWE falls furthest at 2\u{2009}600–2\u{2009}900 m: 288 mm (42 %); the largest share, 56 %, in 2 bands"
    );
    assert_eq!(
        title(&Study { swe: [430.0, 90.0, 30.0], ..PLAIN }),
        "No elevation loses 1 April SWE at +4 °C; it rises furthest at 2\u{2009}600–2\u{2009}900 m: 192 mm (28 %)"
    );
    assert_eq!(
        title(&Study { swe: [430.0, 90.0, 0.0], ..PLAIN }),
        "1 April SWE is unchanged at every elevation at +4 °C"
    );
    assert_eq!(
        title(&Study { levels_c: &[0.0], ..PLAIN }),
        "1 April SWE is highest at 2\u{2009}600–2\u{2009}900 m, 688 mm at the reference; no other level was run"
    );
    assert_eq!(
        title(&Study { edges_m: &[900.0, 3300.0], ..PLAIN }),
        "1 April SWE of the one band, 900–3\u{2009}300 m, is 240 mm (56 %) lower at +4 °C"
    );
}

/// By hand: changes spread by 10 % about their median. Where the highest band gains 100 mm a degree it changes by 400 - 384 mm, and
/// the realizations by 400 - 384*(0.9 to 1.1) mm, which holds 0: neither figure counts it, though its median gains. One band that
/// changes by 244 - 240*(0.9 to 1.1) mm cannot be told in either.
#[test]
fn both_figures_count_bands_by_the_same_rule() {
    let titles = |study: &Study<'_>| {
        let drawn = study.draw_in(UnitSystem::Metric, "Alder Fork", 10);
        ["swe-by-band", "swe-change-by-band"].map(|slug| {
            let id = format!("id=\"{slug}-title\"");
            drawn.iter().find(|svg| svg.text.contains(&id)).unwrap().title.clone()
        })
    };
    assert_eq!(
        titles(&Study { highest_gains_mm: 100.0, ..PLAIN }),
        [
            "At +4 °C, 1 April SWE falls furthest at 2\u{2009}300–2\u{2009}600 m: 240 mm (56 %)",
            "At +4 °C, 2 of 3 elevation bands lose snow water and none gains"
        ]
    );
    assert_eq!(
        titles(&Study { highest_gains_mm: 150.0, ..PLAIN })[1],
        "At +4 °C, 2 of 3 elevation bands lose snow water and 1 gains"
    );
    assert_eq!(
        titles(&Study { edges_m: &[900.0, 3300.0], highest_gains_mm: 61.0, ..PLAIN }),
        [
            "At +4 °C, 1 April SWE cannot be told to fall or to rise at any elevation",
            "At +4 °C, no elevation band can be told to lose or gain snow water"
        ]
    );
}

/// A band whose reference has 3.6 mm says how much it loses, and no percentage; that of 14.4 mm says both.
#[test]
fn bands_with_hardly_any_snow_have_no_percentage() {
    let svg = draw(&Study { swe: [9.0, 1.0, -1.0], ..PLAIN }, UnitSystem::Metric);
    let said: Vec<String> = texts(&svg.text).into_iter().map(|(_, words)| words).collect();
    for change in ["−1.6 mm", "−4.0 mm", "−6.4 mm (−44 %)"] {
        assert!(said.iter().any(|words| words == change), "{change}: {said:?}");
    }
}

/// A bar a band, the axes' paper and the ticks apart; each as long as its area.
#[test]
fn bars_are_as_long_as_areas() {
    let svg = draw(&PLAIN, UnitSystem::Us);
    let bars = svg.text.split("<g class=\"areas\">").nth(1).unwrap().split("</g>").next().unwrap();
    let widths: Vec<f64> = bars
        .split("<rect ")
        .skip(1)
        .map(|rect| rect.split("width=\"").nth(1).unwrap().split('"').next().unwrap().parse().unwrap())
        .collect();
    // 52.5, 37.5 and 22.5 km2; a tenth of a pixel is rounding.
    assert_eq!(widths.len(), 3);
    assert!((widths[1] / widths[0] - 37.5 / 52.5).abs() < 0.003, "{widths:?}");
    assert!((widths[2] / widths[0] - 22.5 / 52.5).abs() < 0.003, "{widths:?}");
}

/// The dashed reference has 688 mm, 27.09 in, in the highest band. By the axis' own ticks its marker stands there in both
/// units; a tenth of a pixel is rounding.
#[test]
fn marks_stand_where_the_ticks_say() {
    for (units, expected) in [(UnitSystem::Metric, 688.0), (UnitSystem::Us, 688.0 / 25.4)] {
        let svg = draw(&PLAIN, units);
        let group = |class: &str| {
            let opening = format!("<g class=\"{class}\">");
            let groups = svg.text.split(&opening).skip(1);
            groups.map(|rest| rest.split("</g>").next().unwrap().to_owned()).collect::<Vec<String>>()
        };
        let ticks = texts(&group("axis")[0]).into_iter();
        let mut ticks =
            ticks.filter_map(|([l, _, r, _], words)| Some(((l + r) / 2.0, words.parse::<f64>().ok()?)));
        let (first, last) = (ticks.next().unwrap(), ticks.next_back().unwrap());
        let reference = group("level").pop().unwrap();
        let marker = reference.split("<circle cx=\"").nth(1).unwrap().split('"').next().unwrap();
        let share = (marker.parse::<f64>().unwrap() - first.0) / (last.0 - first.0);
        let found = first.1 + share * (last.1 - first.1);
        assert!((found - expected).abs() < 0.1 / (last.0 - first.0) * last.1, "{found} for {expected}");
    }
}

/// By hand: the level part below loses 55 % of the basin's 240 mm, the part that faces south 145 %. It is named by what tells
/// it from the other. Parts share their range's height: the edges at the left are the range's own.
#[test]
fn bands_of_one_range_are_named_and_stand_apart() {
    let study = Study { edges_m: &[2000.0, 2300.0], parts: 2, ..PLAIN };
    let svg = draw(&study, UnitSystem::Metric);
    assert_eq!(
        svg.title,
        "At +4 °C, 1 April SWE falls furthest at 2\u{2009}000–2\u{2009}300 m, facing 180°, slope 22.5°, 50 % canopy, \
         accumulation CV 0.5: 348 mm (56 %)"
    );
    let said = texts(&svg.text);
    let place = |words: &str| said.iter().find(|(_, other)| other == words).map(|([_, top, ..], _)| *top);
    let [upper, lower] = ["50 %", "0 %"].map(|canopy| place(canopy).unwrap());
    let [highest, lowest] = ["2\u{2009}300", "2\u{2009}000"].map(|edge| place(edge).unwrap());
    let quarters = (lowest - highest) / 4.0;
    assert!(
        (upper - highest - quarters).abs() < 1.0 && (lower - highest - 3.0 * quarters).abs() < 1.0,
        "{said:?}"
    );
    assert!(said.iter().all(|(_, words)| words != "2\u{2009}150"), "no edge between the parts");
    assert!(svg.caption.contains("none of them lies higher than another"));
}
