//! Colours, type and strokes of every figure: few inks, each dark enough to read on white.
//!
//! Meaning never hangs on colour alone: levels are named where they stand, and the reference has hollow marks.

use plotters::style::RGBColor;

/// Width of every figure, px.
pub const WIDTH_PX: f64 = 760.0;
/// Space around a figure, px.
pub const MARGIN_PX: f64 = 28.0;
/// Typefaces in order of preference. The first three share one set of widths.
pub const FONTS: &str = "Helvetica, Arial, 'Liberation Sans', 'DejaVu Sans', sans-serif";

/// Paper.
pub const PAPER: RGBColor = RGBColor(0xff, 0xff, 0xff);
/// Text, and the reference.
pub const INK: RGBColor = RGBColor(0x26, 0x36, 0x3d);
/// Text that explains.
pub const QUIET: RGBColor = RGBColor(0x54, 0x63, 0x6b);
/// Axes and edges of the band.
pub const EDGE: RGBColor = RGBColor(0x6f, 0x82, 0x8c);
/// The band of the reference's spread; its edges carry the contrast.
pub const BAND: RGBColor = RGBColor(0xe9, 0xef, 0xf2);

/// What the model makes of the record, beside what was observed in ink.
pub const MODELLED: RGBColor = WARMER[0];

/// What the model makes of winters that its fit has not seen.
pub const NOT_SEEN: RGBColor = WARMER[2];

/// Snow that falls, rain, and melt, day by day; each in a strip that is named.
pub const SNOWFALL: RGBColor = EDGE;
/// Rain.
pub const RAIN: RGBColor = COLDER[1];
/// Melt.
pub const MELT: RGBColor = WARMER[2];

/// The wettest year; lighter than the driest, so that they part in grey.
pub const WET: RGBColor = WARMER[0];
/// The driest year.
pub const DRY: RGBColor = WARMER[3];
/// A year among all.
pub const ONE_OF_MANY: RGBColor = RGBColor(0x9d, 0xab, 0xb3);

/// Warmer levels, from the least warm: lightness falls all the way, so that the order stands in grey.
const WARMER: [RGBColor; 4] = [
    RGBColor(0x42, 0x89, 0xaf),
    RGBColor(0x8e, 0x6a, 0x90),
    RGBColor(0xb8, 0x46, 0x3c),
    RGBColor(0x5f, 0x1c, 0x14),
];
/// Levels colder than the reference, from the nearest.
const COLDER: [RGBColor; 2] = [RGBColor(0x3d, 0x8f, 0x7c), RGBColor(0x14, 0x52, 0x4a)];
/// Share of a level's colour in its tint.
const TINT: f64 = 0.14;
/// Where a lone level stands on its ramp.
const LONE: f64 = 0.7;

/// A kind of lettering.
#[derive(Debug, Clone, Copy)]
pub struct Lettering {
    /// Class in the drawing, for a page that wants to restyle it.
    pub class: &'static str,
    /// Font size, px.
    pub size_px: f64,
    /// Bold or regular.
    pub is_bold: bool,
    /// Colour.
    pub ink: RGBColor,
}

/// The finding.
pub const TITLE: Lettering = Lettering { class: "finding", size_px: 19.0, is_bold: true, ink: INK };
/// What is named.
pub const NAME: Lettering = Lettering { class: "name", size_px: 13.0, is_bold: true, ink: INK };
/// Values and ticks.
pub const LABEL: Lettering = Lettering { class: "label", size_px: 13.0, is_bold: false, ink: INK };
/// Explanations.
pub const NOTE: Lettering = Lettering { class: "note", size_px: 12.5, is_bold: false, ink: QUIET };

/// Width and height of a slide, px: 16 to 9.
pub const SLIDE_PX: [f64; 2] = [1280.0, 720.0];
/// The finding on a slide, read from the last row.
pub const SLIDE_TITLE: Lettering = Lettering { class: "finding", size_px: 34.0, is_bold: true, ink: INK };
/// What is named on a slide.
pub const SLIDE_NAME: Lettering = Lettering { class: "name", size_px: 20.0, is_bold: true, ink: INK };
/// Values and ticks of a slide.
pub const SLIDE_LABEL: Lettering = Lettering { class: "label", size_px: 20.0, is_bold: false, ink: INK };
/// Explanations on a slide.
pub const SLIDE_NOTE: Lettering = Lettering { class: "note", size_px: 18.0, is_bold: false, ink: QUIET };

impl Lettering {
    /// Width of a line in it, px.
    pub fn width(&self, text: &str) -> f64 {
        super::text_width(text, self.size_px, self.is_bold)
    }

    /// Distance between two lines of it, px.
    pub fn leading(&self) -> f64 {
        self.size_px * 1.3
    }
}

/// The colour of a level among others, by its place from the reference.
///
/// `levels` is how many there are and `reference` the place of the reference.
pub fn level_ink(level: usize, reference: usize, levels: usize) -> RGBColor {
    if level > reference {
        along(&WARMER, level - reference - 1, levels - reference - 1)
    } else if level < reference {
        along(&COLDER, reference - level - 1, reference)
    } else {
        INK
    }
}

/// The ground of a change by so many steps, below 0 a loss: red deepens with loss, blue with gain, and no step is so dark
/// that a line in ink or a dot would drown on it.
pub fn change_ground(steps: i32) -> RGBColor {
    let ink = if steps < 0 { WARMER[2] } else { WARMER[0] };
    blend(PAPER, ink, (0.17 * f64::from(steps.unsigned_abs())).min(0.68))
}

/// A light ground of a level's colour, on which the colour itself still stands out.
pub fn tint(ink: RGBColor) -> RGBColor {
    blend(PAPER, ink, TINT)
}

fn along(ramp: &[RGBColor], place: usize, places: usize) -> RGBColor {
    let share = if places <= 1 { LONE } else { place as f64 / (places - 1) as f64 };
    let position = share * (ramp.len() - 1) as f64;
    let below = (position as usize).min(ramp.len() - 2);
    let part = position - below as f64;
    blend(ramp[below], ramp[below + 1], part)
}

fn blend(from: RGBColor, to: RGBColor, part: f64) -> RGBColor {
    let mix = |from: u8, to: u8| (f64::from(from) + part * (f64::from(to) - f64::from(from))).round() as u8;
    RGBColor(mix(from.0, to.0), mix(from.1, to.1), mix(from.2, to.2))
}
