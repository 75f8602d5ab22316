//! Tests of the palette: contrast (WCAG 2.2) and how colours differ, also to the colour-blind (Machado and others 2009;
//! difference CIEDE2000, Sharma and others 2005).

use super::theme::{self, level_ink};
use plotters::style::RGBColor;

type Triple = [f64; 3];

const SIGHTS: [(&str, f64, [Triple; 3]); 4] = [
    ("normal", 20.0, [[1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0]]),
    (
        "protan",
        11.0,
        [[0.152286, 1.052583, -0.204868], [0.114503, 0.786281, 0.099216], [-0.003882, -0.048116, 1.051998]],
    ),
    (
        "deutan",
        11.0,
        [[0.367322, 0.860646, -0.227968], [0.280085, 0.672501, 0.047413], [-0.011820, 0.042940, 0.968881]],
    ),
    (
        "tritan",
        11.0,
        [[1.255528, -0.076749, -0.178779], [-0.078411, 0.930809, 0.147602], [0.004733, 0.691367, 0.303900]],
    ),
];

fn linear(colour: RGBColor) -> Triple {
    [colour.0, colour.1, colour.2].map(|channel| {
        let c = f64::from(channel) / 255.0;
        if c <= 0.04045 { c / 12.92 } else { libm::pow((c + 0.055) / 1.055, 2.4) }
    })
}

fn contrast(a: RGBColor, b: RGBColor) -> f64 {
    let light = |colour| {
        let [r, g, b] = linear(colour);
        0.2126 * r + 0.7152 * g + 0.0722 * b + 0.05
    };
    let (a, b) = (light(a), light(b));
    a.max(b) / a.min(b)
}

fn dot(row: Triple, v: Triple) -> f64 {
    row[0] * v[0] + row[1] * v[1] + row[2] * v[2]
}

fn lab(colour: RGBColor, sight: &[Triple; 3]) -> Triple {
    let seen = sight.map(|row| dot(row, linear(colour)).clamp(0.0, 1.0));
    let x = dot([0.4124564, 0.3575761, 0.1804375], seen) / 0.95047;
    let y = dot([0.2126729, 0.7151522, 0.0721750], seen);
    let z = dot([0.0193339, 0.1191920, 0.9503041], seen) / 1.08883;
    let [x, y, z] = [x, y, z]
        .map(|t| if t > 216.0 / 24389.0 { libm::cbrt(t) } else { (24389.0 / 27.0 * t + 16.0) / 116.0 });
    [116.0 * y - 16.0, 500.0 * (x - y), 200.0 * (y - z)]
}

fn difference(p: Triple, q: Triple) -> f64 {
    let chroma = |a: f64, b: f64| libm::hypot(a, b);
    let stretch = |c: f64| (libm::pow(c, 7.0) / (libm::pow(c, 7.0) + libm::pow(25.0, 7.0))).sqrt();
    let g = 0.5 * (1.0 - stretch((chroma(p[1], p[2]) + chroma(q[1], q[2])) / 2.0));
    let (a1, a2) = ((1.0 + g) * p[1], (1.0 + g) * q[1]);
    let (c1, c2) = (chroma(a1, p[2]), chroma(a2, q[2]));
    let hue = |a: f64, b: f64| libm::atan2(b, a).to_degrees().rem_euclid(360.0);
    let (h1, h2) = (hue(a1, p[2]), hue(a2, q[2]));
    let turn = (h2 - h1 + 180.0).rem_euclid(360.0) - 180.0;
    let (light, chroma_mean, hue_mean) = ((p[0] + q[0]) / 2.0, (c1 + c2) / 2.0, h1 + turn / 2.0);
    let cos = |degrees: f64| libm::cos(degrees.to_radians());
    let t = 1.0 - 0.17 * cos(hue_mean - 30.0) + 0.24 * cos(2.0 * hue_mean) + 0.32 * cos(3.0 * hue_mean + 6.0)
        - 0.20 * cos(4.0 * hue_mean - 63.0);
    let hump = (hue_mean.rem_euclid(360.0) - 275.0) / 25.0;
    let rotation = 30.0 * libm::exp(-hump * hump);
    let off = (light - 50.0) * (light - 50.0);
    let dl = (q[0] - p[0]) / (1.0 + 0.015 * off / (20.0 + off).sqrt());
    let dc = (c2 - c1) / (1.0 + 0.045 * chroma_mean);
    let dh = 2.0 * (c1 * c2).sqrt() * libm::sin((turn / 2.0).to_radians()) / (1.0 + 0.015 * chroma_mean * t);
    let cross = -libm::sin((2.0 * rotation).to_radians()) * 2.0 * stretch(chroma_mean);
    (dl * dl + dc * dc + dh * dh + cross * dc * dh).sqrt()
}

#[test]
fn the_difference_formula_agrees_with_its_published_pairs() {
    let pairs = [
        ([50.0, 2.6772, -79.7751], [50.0, 0.0, -82.7485], 2.0425),
        ([50.0, 2.5, 0.0], [73.0, 25.0, -18.0], 27.1492),
    ];
    for (p, q, expected) in pairs {
        assert!((difference(p, q) - expected).abs() < 1e-4, "{p:?} {q:?}");
    }
}

#[test]
fn text_and_lines_stand_out_from_paper_and_band() {
    for ground in [theme::PAPER, theme::BAND] {
        for text in [theme::INK, theme::QUIET] {
            assert!(contrast(text, ground) >= 4.5, "text {text:?} on {ground:?}");
        }
        assert!(contrast(theme::EDGE, ground) >= 3.0, "edge on {ground:?}");
    }
    for levels in 2..=9 {
        for level in 0..levels {
            for reference in 0..levels {
                let ink = level_ink(level, reference, levels);
                for ground in [theme::PAPER, theme::BAND, theme::tint(ink)] {
                    assert!(contrast(ink, ground) >= 3.0, "{ink:?} on {ground:?}");
                }
                assert!(contrast(theme::EDGE, theme::tint(ink)) >= 3.0, "edge on the tint of {ink:?}");
            }
        }
    }
    for bar in [theme::SNOWFALL, theme::RAIN, theme::MELT, theme::MODELLED, theme::NOT_SEEN] {
        assert!(contrast(bar, theme::PAPER) >= 3.0, "{bar:?}");
    }
    for lettering in [theme::TITLE, theme::NAME, theme::LABEL, theme::NOTE] {
        assert!(lettering.size_px >= 12.0, "{lettering:?}");
    }
}

#[test]
fn levels_are_told_apart_by_every_sight() {
    for levels in 2..=5 {
        for (name, least, sight) in &SIGHTS {
            let seen: Vec<Triple> =
                (0..levels).map(|level| lab(level_ink(level, 0, levels), sight)).collect();
            for (at, one) in seen.iter().enumerate() {
                for other in &seen[..at] {
                    let apart = difference(*one, *other);
                    let least = if levels == 5 { 8.0 } else { *least };
                    assert!(apart >= least, "{name}, {levels} levels: {apart:.1}");
                }
            }
        }
    }
}

#[test]
fn warmer_is_darker_so_that_grey_keeps_the_order() {
    for levels in 3..=9 {
        let light: Vec<f64> =
            (1..levels).map(|level| lab(level_ink(level, 0, levels), &SIGHTS[0].2)[0]).collect();
        assert!(light.is_sorted_by(|a, b| a > b), "{light:?}");
    }
}

/// A field that is read as a map needs equal steps: L* falls all the way from none on, to loss and to gain, and no step is more than
/// twice another (Crameri, Shephard & Heron 2020 ask for even gradients; the bound is ours).
#[test]
fn grounds_of_change_darken_evenly() {
    let (_, _, normal) = SIGHTS[0];
    for direction in [-1, 1] {
        let light: Vec<f64> =
            (0..=4).map(|steps| lab(theme::change_ground(direction * steps), &normal)[0]).collect();
        let falls: Vec<f64> = light.windows(2).map(|pair| pair[0] - pair[1]).collect();
        let (least, most) = falls
            .iter()
            .fold((f64::INFINITY, 0.0_f64), |(low, high), fall| (low.min(*fall), high.max(*fall)));
        assert!(least > 2.0 && most <= 2.0 * least, "{light:?}");
    }
}
