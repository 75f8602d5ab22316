//! Error of survey SWE by temperature of the winter: whether the model answers to a warmer winter as the snow did.

mod line;
mod panel;
mod words;

use super::fits::{DrawnFit, FitPart, FitSiteFigure};
use super::page::Paragraphs;
use super::sheet::{Drawn, HPos, Sheet, VPos};
use super::theme::{LABEL, MARGIN_PX, NAME, WIDTH_PX};
use super::value_ticks::ValueTicks;
use super::{Setting, Svg};
use crate::fit::{Comparison, Fitted, Split, Winter, winters_of};
use line::Line;
use panel::{Panel, Scale};
use words::Words;

/// The figure.
pub(super) const FIGURE: FitSiteFigure = FitSiteFigure {
    slug: "survey-error",
    question: "Does the model answer to a warmer winter as the snow did?",
    part: FitPart::Skill,
    draw,
};

const HEIGHT_PX: f64 = 230.0;
const ERROR_STEPS: usize = 5;
const TEMPERATURE_STEPS: usize = 5;
/// Space between both panels, px.
const GAP_PX: f64 = 30.0;
/// Height of what stands above a panel, px.
const ABOVE_PX: f64 = 72.0;
/// Height of the temperatures and their name below a panel, px.
const BELOW_PX: f64 = 46.0;

/// A winter's error.
#[derive(Debug, Clone, Copy)]
struct Point {
    water_year: i32,
    /// Mean temperature of the winter, degC.
    mean_c: f64,
    /// Modelled less observed, mm.
    error_mm: f64,
    /// Whether the fit has seen the winter.
    is_seen: bool,
}

/// A fit's winters.
struct Group {
    points: Vec<Point>,
    name: &'static str,
    finding: String,
    /// The straight line through them, where they are told by one.
    line: Option<Line>,
}

fn draw(fit: &DrawnFit<'_>, site: usize, slug: &str, setting: &Setting<'_>) -> Option<Svg> {
    let (all, cold) = (fit.on(Split::All)?, fit.on(Split::Coldest)?);
    let judged = all.on_own.get(site)?;
    let of = |fitted: &Fitted| -> Option<Vec<Point>> {
        let is_seen = winters_of(fitted.split, &fit.result.winters);
        Some(points(fitted.compared.get(site)?, &fit.result.winters, &is_seen))
    };
    let (of_all, of_cold) = (of(all)?, of(cold)?);
    let line = Line::through(&of_all, judged.survey_error_by_winter_mm_per_c?);
    let groups = [
        Group {
            points: of_all,
            name: "Fitted on all years",
            finding: words::slope(judged, setting.units),
            line: Some(line),
        },
        Group {
            finding: words::means(&of_cold, setting.units),
            points: of_cold,
            name: "Fitted on the coldest half of the winters",
            line: None,
        },
    ];
    let comparison = all.compared.get(site)?;
    let words = Words::of(comparison, judged, &groups, setting);
    let text = paint(&groups, slug, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

/// The winters with a survey.
fn points(comparison: &Comparison, winters: &[Winter], is_seen: &[bool]) -> Vec<Point> {
    let point = |(winter, is_seen): (&Winter, &bool)| {
        let year = comparison.by_year.iter().find(|year| year.water_year == winter.water_year)?;
        let survey = year.surveys.first().copied().flatten()?;
        Some(Point {
            water_year: winter.water_year,
            mean_c: winter.mean_c,
            error_mm: survey.modelled_mm - survey.observed_mm,
            is_seen: *is_seen,
        })
    };
    winters.iter().zip(is_seen).filter(|(winter, _)| winter.is_observed).filter_map(point).collect()
}

fn paint(groups: &[Group; 2], slug: &str, setting: &Setting<'_>, words: &Words) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let (depth, temperature) = (setting.units.depth(), setting.units.temperature());
    let points = || groups.iter().flat_map(|group| &group.points);
    let band = groups.iter().filter_map(|group| group.line).flat_map(|line| line.ends_mm());
    let errors = points().map(|point| point.error_mm).chain(band).chain([0.0]);
    let errors = span(errors.map(|mm| depth.of(mm)));
    let temperatures = span(points().map(|point| temperature.of(point.mean_c)));
    let errors = ValueTicks::around(errors[0], errors[1], ERROR_STEPS);
    let pad = 0.04 * (temperatures[1] - temperatures[0]);
    let temperatures = [temperatures[0] - pad, temperatures[1] + pad];
    let scale = Scale {
        errors: &errors,
        temperatures: &ValueTicks::within(temperatures[0], temperatures[1], TEMPERATURE_STEPS),
        range: temperatures,
        depth,
        temperature,
    };
    let labels = errors.ticks.iter().map(|(_, label)| LABEL.width(label)).fold(0.0, f64::max);
    let left = MARGIN_PX + labels + 12.0;
    let width = (WIDTH_PX - MARGIN_PX - left - GAP_PX) / 2.0;
    let top = MARGIN_PX + heading.height() + ABOVE_PX;
    let below = top + HEIGHT_PX + BELOW_PX + 12.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;

    heading.write(&sheet, MARGIN_PX)?;
    for (at, group) in groups.iter().enumerate() {
        let panel = Panel {
            left_top: (left + at as f64 * (width + GAP_PX), top),
            size: [width, HEIGHT_PX],
            is_first: at == 0,
            scale: &scale,
        };
        sheet.group("fit", || panel.draw(&sheet, group))?;
    }
    sheet.write(&words.axis, (MARGIN_PX, top - 12.0), NAME, HPos::Left, VPos::Bottom)?;
    key.write(&sheet, below)?;
    Ok(sheet.document(slug, &words.title, &words.description))
}

/// Lowest and highest.
fn span(values: impl Iterator<Item = f64>) -> [f64; 2] {
    values.fold([f64::INFINITY, f64::NEG_INFINITY], |[low, high], value| [low.min(value), high.max(value)])
}
