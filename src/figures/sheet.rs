//! The sheet that a figure is drawn on, in pixels: a thin hand over the drawing library and our backend.

use super::backend::{SvgBackend, escape, fine};
use super::theme::{FONTS, Lettering, PAPER, WIDTH_PX};
use plotters::chart::ChartBuilder;
use plotters::coord::Shift;
use plotters::coord::cartesian::Cartesian2d;
use plotters::coord::types::RangedCoordf64;
use plotters::drawing::{DrawingArea, DrawingAreaErrorKind};
use plotters::element::{Circle, PathElement, Polygon, Rectangle, Text};
use plotters::style::text_anchor::Pos;
use plotters::style::{Color, FontDesc, FontFamily, FontStyle, RGBColor, ShapeStyle, TextStyle};
use std::cell::RefCell;
use std::convert::Infallible;
use std::ops::Range;
use std::rc::Rc;

pub(super) use plotters::style::text_anchor::{HPos, VPos};

/// What drawing comes to; our backend itself cannot fail.
pub(super) type Drawn<T = ()> = Result<T, DrawingAreaErrorKind<Infallible>>;

/// A place on the sheet, px from its upper left corner.
pub(super) type Px = (f64, f64);

/// A line's colour, width in px, and dash.
#[derive(Debug, Clone, Copy)]
pub(super) struct Stroke {
    pub ink: RGBColor,
    pub width_px: f64,
    pub dash_px: Option<[u32; 2]>,
}

impl Stroke {
    /// An unbroken line.
    pub const fn solid(ink: RGBColor, width_px: f64) -> Self {
        Self { ink, width_px, dash_px: None }
    }

    fn style(&self) -> ShapeStyle {
        ShapeStyle::from(&self.ink).stroke_width(fine(self.width_px).unsigned_abs())
    }
}

/// A sheet, of the figures' width unless it says otherwise.
pub(super) struct Sheet {
    width_px: f64,
    backend: Rc<RefCell<SvgBackend>>,
    area: DrawingArea<SvgBackend, Shift>,
    height_px: f64,
}

/// Where data stand on the sheet.
pub(super) struct Plot {
    area: DrawingArea<SvgBackend, Cartesian2d<RangedCoordf64, RangedCoordf64>>,
}

impl Sheet {
    /// A white sheet.
    pub fn new(height_px: f64) -> Drawn<Self> {
        Self::of_size(WIDTH_PX, height_px)
    }

    /// A white sheet of another width.
    pub fn of_size(width_px: f64, height_px: f64) -> Drawn<Self> {
        let height_px = height_px.ceil();
        let backend = Rc::new(RefCell::new(SvgBackend::new(width_px, height_px)));
        let sheet = Self { width_px, area: (&backend).into(), backend, height_px };
        sheet.classed("paper", || sheet.block((0.0, 0.0), (width_px, height_px), PAPER))?;
        Ok(sheet)
    }

    /// Coordinates inside a rectangle of the sheet; `y` grows upwards.
    pub fn plot(&self, left_top: Px, right_bottom: Px, x: Range<f64>, y: Range<f64>) -> Drawn<Plot> {
        let chart = ChartBuilder::on(&self.area)
            .margin_left(fine(left_top.0))
            .margin_top(fine(left_top.1))
            .margin_right(fine(self.width_px - right_bottom.0))
            .margin_bottom(fine(self.height_px - right_bottom.1))
            .build_cartesian_2d(x, y)?;
        Ok(Plot { area: chart.plotting_area().clone() })
    }

    /// Draws into a group with a class.
    pub fn group(&self, class: &str, draw: impl FnOnce() -> Drawn) -> Drawn {
        self.backend.borrow_mut().open_group(class);
        let drawn = draw();
        self.backend.borrow_mut().close_group();
        drawn
    }

    /// A line of text; its place is that of the anchor.
    pub fn write(&self, text: &str, place: Px, lettering: Lettering, across: HPos, down: VPos) -> Drawn {
        let weight = if lettering.is_bold { FontStyle::Bold } else { FontStyle::Normal };
        let font = FontDesc::new(FontFamily::Name(FONTS), f64::from(fine(lettering.size_px)), weight);
        let style = TextStyle::from(font).color(&lettering.ink).pos(Pos::new(across, down));
        self.classed(lettering.class, || self.area.draw(&Text::new(text, at(place), style)))
    }

    /// A line through places.
    pub fn line(&self, places: &[Px], stroke: Stroke) -> Drawn {
        self.backend.borrow_mut().set_dash(stroke.dash_px);
        let places: Vec<(i32, i32)> = places.iter().copied().map(at).collect();
        let drawn = self.area.draw(&PathElement::new(places, stroke.style()));
        self.backend.borrow_mut().set_dash(None);
        drawn
    }

    /// A filled rectangle.
    pub fn block(&self, left_top: Px, right_bottom: Px, ink: RGBColor) -> Drawn {
        self.area.draw(&Rectangle::new([at(left_top), at(right_bottom)], ink.filled()))
    }

    /// A filled shape.
    pub fn shape(&self, corners: &[Px], ink: RGBColor) -> Drawn {
        let corners: Vec<(i32, i32)> = corners.iter().copied().map(at).collect();
        self.area.draw(&Polygon::new(corners, ink.filled()))
    }

    /// A filled circle.
    pub fn dot(&self, centre: Px, radius_px: f64, ink: RGBColor) -> Drawn {
        self.area.draw(&Circle::new(at(centre), fine(radius_px), ink.filled()))
    }

    /// A circle's line.
    pub fn ring(&self, centre: Px, radius_px: f64, stroke: Stroke) -> Drawn {
        self.area.draw(&Circle::new(at(centre), fine(radius_px), stroke.style()))
    }

    /// The whole document. `title` and `description` are what a screen reader says.
    pub fn document(&self, slug: &str, title: &str, description: &str) -> String {
        let (width, height) = (fine(self.width_px) / 10, fine(self.height_px) / 10);
        let mut svg = format!(
            "<svg xmlns=\"http://www.w3.org/2000/svg\" class=\"figure {slug}\" width=\"{width}\" height=\"{height}\" \
             viewBox=\"0 0 {width} {height}\" role=\"img\" aria-labelledby=\"{slug}-title {slug}-desc\" \
             font-family=\"{FONTS}\">\n"
        );
        for (element, text) in [("title", title), ("desc", description)] {
            svg.push_str(&format!("<{element} id=\"{slug}-{element}\">"));
            escape(&mut svg, text);
            svg.push_str(&format!("</{element}>\n"));
        }
        svg.push_str(self.backend.borrow().body());
        svg.push_str("</svg>\n");
        svg
    }

    fn classed(&self, class: &'static str, draw: impl FnOnce() -> Drawn) -> Drawn {
        self.backend.borrow_mut().set_class(Some(class));
        let drawn = draw();
        self.backend.borrow_mut().set_class(None);
        drawn
    }
}

impl Plot {
    /// Where a point of the data stands on the sheet, px.
    pub fn at(&self, x: f64, y: f64) -> Px {
        let (x, y) = self.area.map_coordinate(&(x, y));
        (f64::from(x) / 10.0, f64::from(y) / 10.0)
    }
}

fn at((x, y): Px) -> (i32, i32) {
    (fine(x), fine(y))
}
