//! Our own drawing backend: SVG with tenths of a pixel, true font sizes, classes, dashes and groups.
//!
//! The canvas is ten times as fine as the figure, since drawing coordinates are whole numbers; every length is divided by
//! ten when it is written. Numbers are written from whole tenths, so equal drawings have equal bytes.

use super::text_width::text_width;
use plotters::backend::DrawingBackend;
use plotters_backend::text_anchor::{HPos, VPos};
use plotters_backend::{
    BackendColor, BackendCoord, BackendStyle, BackendTextStyle, DrawingErrorKind, FontStyle, FontTransform,
};
use std::convert::Infallible;

/// Canvas units in a pixel.
pub(super) const FINENESS: f64 = 10.0;

/// A length in pixels as a whole number of canvas units.
pub(super) fn fine(px: f64) -> i32 {
    (px * FINENESS).round() as i32
}

/// SVG elements as they are drawn.
#[derive(Debug)]
pub(super) struct SvgBackend {
    size: (u32, u32),
    body: String,
    class: Option<&'static str>,
    dash_px: Option<[u32; 2]>,
}

type Drawn = Result<(), DrawingErrorKind<Infallible>>;

impl SvgBackend {
    /// An empty canvas of a size in pixels.
    pub fn new(width_px: f64, height_px: f64) -> Self {
        Self {
            size: (fine(width_px).unsigned_abs(), fine(height_px).unsigned_abs()),
            body: String::new(),
            class: None,
            dash_px: None,
        }
    }

    /// The elements drawn so far.
    pub fn body(&self) -> &str {
        &self.body
    }

    /// The class of what is drawn next.
    pub fn set_class(&mut self, class: Option<&'static str>) {
        self.class = class;
    }

    /// The dash and gap of lines drawn next, px.
    pub fn set_dash(&mut self, dash_px: Option<[u32; 2]>) {
        self.dash_px = dash_px;
    }

    /// Begins a group.
    pub fn open_group(&mut self, class: &str) {
        self.body.push_str("<g class=\"");
        escape(&mut self.body, class);
        self.body.push_str("\">\n");
    }

    /// Ends the group begun last.
    pub fn close_group(&mut self) {
        self.body.push_str("</g>\n");
    }

    fn open(&mut self, element: &str) {
        self.body.push('<');
        self.body.push_str(element);
        if let Some(class) = self.class {
            self.word("class", class);
        }
    }

    fn close(&mut self) {
        self.body.push_str("/>\n");
    }

    fn word(&mut self, name: &str, value: &str) {
        self.body.push(' ');
        self.body.push_str(name);
        self.body.push_str("=\"");
        escape(&mut self.body, value);
        self.body.push('"');
    }

    fn length(&mut self, name: &str, canvas_units: i32) {
        let text = in_px(canvas_units);
        self.word(name, &text);
    }

    fn points(&mut self, points: impl IntoIterator<Item = BackendCoord>) {
        let pairs: Vec<String> =
            points.into_iter().map(|(x, y)| format!("{},{}", in_px(x), in_px(y))).collect();
        self.word("points", &pairs.join(" "));
    }

    fn fill(&mut self, colour: BackendColor) {
        self.colour("fill", "fill-opacity", colour);
    }

    /// The inside or the outline, as plotters asks for it.
    fn paint(&mut self, style: &impl BackendStyle, fill: bool) {
        if fill {
            self.fill(style.color());
        } else {
            self.stroke(style);
        }
    }

    fn stroke<S: BackendStyle>(&mut self, style: &S) {
        self.word("fill", "none");
        self.colour("stroke", "stroke-opacity", style.color());
        self.length("stroke-width", whole(style.stroke_width()));
        if let Some([dash, gap]) = self.dash_px {
            self.word("stroke-dasharray", &format!("{dash} {gap}"));
        }
    }

    fn colour(&mut self, name: &str, opacity: &str, colour: BackendColor) {
        let (r, g, b) = colour.rgb;
        self.word(name, &format!("#{r:02x}{g:02x}{b:02x}"));
        if colour.alpha < 1.0 {
            self.word(opacity, &format!("{:.3}", colour.alpha.max(0.0)));
        }
    }
}

impl DrawingBackend for SvgBackend {
    type ErrorType = Infallible;

    fn get_size(&self) -> (u32, u32) {
        self.size
    }

    fn ensure_prepared(&mut self) -> Drawn {
        Ok(())
    }

    fn present(&mut self) -> Drawn {
        Ok(())
    }

    fn draw_pixel(&mut self, (x, y): BackendCoord, colour: BackendColor) -> Drawn {
        self.draw_rect((x, y), (x + 1, y + 1), &colour, true)
    }

    fn draw_line<S: BackendStyle>(&mut self, from: BackendCoord, to: BackendCoord, style: &S) -> Drawn {
        self.open("line");
        for (name, value) in [("x1", from.0), ("y1", from.1), ("x2", to.0), ("y2", to.1)] {
            self.length(name, value);
        }
        self.stroke(style);
        self.close();
        Ok(())
    }

    fn draw_rect<S: BackendStyle>(
        &mut self,
        upper_left: BackendCoord,
        bottom_right: BackendCoord,
        style: &S,
        fill: bool,
    ) -> Drawn {
        self.open("rect");
        self.length("x", upper_left.0);
        self.length("y", upper_left.1);
        self.length("width", (bottom_right.0 - upper_left.0).max(0));
        self.length("height", (bottom_right.1 - upper_left.1).max(0));
        self.paint(style, fill);
        self.close();
        Ok(())
    }

    fn draw_path<S: BackendStyle, I: IntoIterator<Item = BackendCoord>>(
        &mut self,
        path: I,
        style: &S,
    ) -> Drawn {
        self.open("polyline");
        self.points(path);
        self.stroke(style);
        self.close();
        Ok(())
    }

    fn draw_circle<S: BackendStyle>(
        &mut self,
        center: BackendCoord,
        radius: u32,
        style: &S,
        fill: bool,
    ) -> Drawn {
        self.open("circle");
        self.length("cx", center.0);
        self.length("cy", center.1);
        self.length("r", whole(radius));
        self.paint(style, fill);
        self.close();
        Ok(())
    }

    fn fill_polygon<S: BackendStyle, I: IntoIterator<Item = BackendCoord>>(
        &mut self,
        vert: I,
        style: &S,
    ) -> Drawn {
        self.open("polygon");
        self.points(vert);
        self.fill(style.color());
        self.close();
        Ok(())
    }

    fn draw_text<T: BackendTextStyle>(&mut self, text: &str, style: &T, (x, y): BackendCoord) -> Drawn {
        let anchor = style.anchor();
        // Capitals are 0.72 of the font size high; text is placed by them and its baseline.
        let drop = style.size()
            * match anchor.v_pos {
                VPos::Top => 0.72,
                VPos::Center => 0.36,
                VPos::Bottom => 0.0,
            };
        self.open("text");
        self.length("x", x);
        self.length("y", y + drop.round() as i32);
        self.length("font-size", style.size().round() as i32);
        if matches!(style.style(), FontStyle::Bold) {
            self.word("font-weight", "bold");
        }
        match anchor.h_pos {
            HPos::Left => {}
            HPos::Center => self.word("text-anchor", "middle"),
            HPos::Right => self.word("text-anchor", "end"),
        }
        if let Some(degrees) = turned(&style.transform()) {
            let turn = format!("rotate({degrees} {} {})", in_px(x), in_px(y));
            self.word("transform", &turn);
        }
        self.fill(style.color());
        self.body.push('>');
        escape(&mut self.body, text);
        self.body.push_str("</text>\n");
        Ok(())
    }

    fn estimate_text_size<T: BackendTextStyle>(
        &self,
        text: &str,
        style: &T,
    ) -> Result<(u32, u32), DrawingErrorKind<Infallible>> {
        let width = text_width(text, style.size(), matches!(style.style(), FontStyle::Bold));
        Ok((width.ceil() as u32, style.size().ceil() as u32))
    }
}

fn whole(canvas_units: u32) -> i32 {
    i32::try_from(canvas_units).unwrap_or(i32::MAX)
}

fn turned(transform: &FontTransform) -> Option<u32> {
    match transform {
        FontTransform::None => None,
        FontTransform::Rotate90 => Some(90),
        FontTransform::Rotate180 => Some(180),
        FontTransform::Rotate270 => Some(270),
    }
}

/// `12`, `12.5`, `-0.3`: pixels from whole canvas units.
fn in_px(canvas_units: i32) -> String {
    let sign = if canvas_units < 0 { "-" } else { "" };
    let (pixels, tenths) = (canvas_units.unsigned_abs() / 10, canvas_units.unsigned_abs() % 10);
    if tenths == 0 { format!("{sign}{pixels}") } else { format!("{sign}{pixels}.{tenths}") }
}

/// Appends text with the characters that XML keeps for itself written as entities, and those it forbids left out.
pub(super) fn escape(into: &mut String, text: &str) {
    for c in text.chars() {
        match c {
            '&' => into.push_str("&amp;"),
            '<' => into.push_str("&lt;"),
            '>' => into.push_str("&gt;"),
            '"' => into.push_str("&quot;"),
            '\t' | '\n' | '\r' => into.push(' '),
            c if c.is_control() || matches!(c, '\u{fffe}' | '\u{ffff}') => {}
            c => into.push(c),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lengths_have_fixed_digits_and_no_negative_zero() {
        let written = [0, 5, -3, 120, 125, -1250].map(in_px);
        assert_eq!(written, ["0", "0.5", "-0.3", "12", "12.5", "-125"]);
        assert_eq!(fine(-0.04), 0);
        assert_eq!(fine(f64::NAN), 0);
    }

    #[test]
    fn xml_keeps_its_own_characters() {
        let mut text = String::new();
        escape(&mut text, "A & B <c> \"d\"\u{0}\n");
        assert_eq!(text, "A &amp; B &lt;c&gt; &quot;d&quot; ");
    }

    #[test]
    fn a_dashed_line_is_one_element() {
        let mut svg = SvgBackend::new(10.0, 10.0);
        svg.set_dash(Some([4, 3]));
        svg.set_class(Some("edge"));
        svg.draw_line((0, 5), (100, 5), &BackendColor { alpha: 1.0, rgb: (1, 2, 255) }).unwrap();
        assert_eq!(
            svg.body(),
            "<line class=\"edge\" x1=\"0\" y1=\"0.5\" x2=\"10\" y2=\"0.5\" fill=\"none\" stroke=\"#0102ff\" \
             stroke-width=\"0.1\" stroke-dasharray=\"4 3\"/>\n"
        );
    }
}
