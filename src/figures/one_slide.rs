//! The answer on one slide: the finding, how much at each level, where, and the caution.

use super::axes::AmountTicks;
use super::headline;
use super::labels::{level, sentence, signed, signed_percent};
use super::marks::{Form, Marking, marker, point_interval};
use super::sheet::{Drawn, HPos, Px, Sheet, Stroke, VPos};
use super::shown::{Shown, name};
use super::text_width::{at_most, wrap};
use super::theme::{
    BAND, EDGE, INK, ONE_OF_MANY, SLIDE_LABEL, SLIDE_NAME, SLIDE_NOTE, SLIDE_PX, SLIDE_TITLE, level_ink,
};
use super::value_ticks::ValueTicks;
use super::{Figure, Part, Setting, Svg, ensemble};
use crate::findings::{Distribution, Findings, MeasureFindings};
use crate::season::Outcome;
use crate::units::UnitSystem;

/// What every result is for and what not; on the slide, since a slide travels alone.
pub const PLANNING_AID: &str = "A planning aid. Not for flood forecasting, flood design, the operation or the safety of \
                                dams: local codes, water-control manuals and licensed practice rule.";

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "one-slide",
    table: "basin-amounts",
    question: "What is the answer, on one slide?",
    part: Part::Slide,
    draw,
};

const EDGE_PX: f64 = 56.0;
/// Where the panels begin and end, px from the top.
const PANELS_PX: [f64; 2] = [318.0, 556.0];
/// Left and right of each panel with its axis, px.
const BY_LEVEL_PX: [f64; 2] = [EDGE_PX, 620.0];
const BY_ELEVATION_PX: [f64; 2] = [690.0, SLIDE_PX[0] - EDGE_PX];
const TITLE_LINES: usize = 3;
const NOTE_LINES: usize = 3;
/// So far that an elevation at the axis and the first amount stay apart, px.
const BELOW_AXIS_PX: f64 = 16.0;
const STEPS: usize = 4;
const THIN: Stroke = Stroke::solid(EDGE, 1.2);

/// What is told and drawn.
struct Told<'a> {
    findings: &'a Findings,
    headline: &'a MeasureFindings,
    shown: Shown,
    /// The level that the title tells of; the reference where there is no other.
    told: usize,
    units: UnitSystem,
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let headline = findings.basin.first()?;
    headline.levels.get(findings.reference)?;
    let units = setting.units;
    let title = headline::of_amount(findings, headline, units);
    let told = headline::spoken_of(findings, headline).unwrap_or(findings.reference);
    let told = Told { findings, headline, shown: Shown::of(findings), told, units };
    let text = paint(&told, setting, &title).ok()?;
    let caption = format!(
        "{} Left: {} at each warming level, median and 5–95 % over {}; the grey band is the reference's. Right: medians of the elevation bands. \
         Spread is chance between realizations, not day-to-day variation.",
        FIGURE.question,
        headline.measure.title,
        ensemble(findings)
    );
    let alt =
        format!("{title}. A slide with two panels, by warming level and by elevation, and the caution.");
    Some(Svg { text, title, caption, alt })
}

fn paint(told: &Told<'_>, setting: &Setting<'_>, title: &str) -> Drawn<String> {
    let [width, height] = SLIDE_PX;
    let sheet = Sheet::of_size(width, height)?;
    let across = width - 2.0 * EDGE_PX;
    let lines = |text: &str, lettering: super::theme::Lettering, most: usize| {
        at_most(wrap(text, across, lettering.size_px, lettering.is_bold), most)
    };
    let mut y = EDGE_PX;
    let study = lines(setting.study_title, SLIDE_NOTE, 1).into_iter().map(|line| (line, SLIDE_NOTE));
    let finding = lines(title, SLIDE_TITLE, TITLE_LINES).into_iter().map(|line| (line, SLIDE_TITLE));
    for (at, (line, lettering)) in study.chain(finding).enumerate() {
        y += lettering.leading() + if at == 1 { 6.0 } else { 0.0 };
        sheet.write(&line, (EDGE_PX, y - 0.3 * lettering.size_px), lettering, HPos::Left, VPos::Bottom)?;
    }
    sheet.group("by-level", || by_level(told, &sheet))?;
    sheet.group("by-elevation", || by_elevation(told, &sheet))?;
    let below = format!(
        "Points: medians; lines: 5–95 % of {}, grey: the same at the reference; chance, not day-to-day variation. What if, not \
         forecast. {PLANNING_AID}",
        ensemble(told.findings)
    );
    let below = lines(&below, SLIDE_NOTE, NOTE_LINES);
    for (line, from_last) in below.iter().rev().zip(0..) {
        let y = height - 22.0 - SLIDE_NOTE.leading() * f64::from(from_last);
        sheet.write(line, (EDGE_PX, y), SLIDE_NOTE, HPos::Left, VPos::Bottom)?;
    }
    let described = format!("{} {}.", FIGURE.question, ensemble(told.findings));
    Ok(sheet.document(FIGURE.slug, title, &described))
}

/// A column a level over the band of the reference.
fn by_level(told: &Told<'_>, sheet: &Sheet) -> Drawn {
    let Told { findings, headline, shown, units, .. } = told;
    let depth = units.depth();
    let all = shown.all();
    let periods = |at: usize| &headline.levels[at].periods;
    let highest = all.iter().filter_map(|at| periods(*at).q95.value()).fold(0.0, f64::max);
    let ticks = AmountTicks::up_to(depth.of(highest), STEPS);
    let [top, bottom] = PANELS_PX;
    let [edge, right] = BY_LEVEL_PX;
    let left =
        edge + ticks.ticks.iter().map(|(_, label)| SLIDE_LABEL.width(label)).fold(0.0, f64::max) + 14.0;
    let plot = sheet.plot((left, top), (right, bottom), 0.0..all.len() as f64, 0.0..ticks.top())?;
    let heading =
        format!("{}, {}-year mean ({})", sentence(&headline.measure.title), findings.years, depth.word);
    sheet.write(&heading, (edge, top - 22.0), SLIDE_NAME, HPos::Left, VPos::Bottom)?;
    if let Some(spread) = &headline.precipitation_spread {
        let [low, middle, high] = [spread.q05, spread.q50, spread.q95].map(|mm| plot.at(0.0, depth.of(mm)).1);
        sheet.block((left, high), (right, low), BAND)?;
        for y in [low, high] {
            sheet.line(&[(left, y), (right, y)], THIN)?;
        }
        sheet.line(
            &[(left, middle), (right, middle)],
            Stroke { ink: INK, width_px: 1.6, dash_px: Some([8, 6]) },
        )?;
    }
    sheet.line(&[(left, top), (left, bottom), (right, bottom)], THIN)?;
    for (value, label) in &ticks.ticks {
        let y = plot.at(0.0, *value).1;
        sheet.line(&[(left - 6.0, y), (left, y)], THIN)?;
        sheet.write(label, (left - 10.0, y), SLIDE_LABEL, HPos::Right, VPos::Center)?;
    }
    for (place, at) in all.iter().enumerate() {
        let x = plot.at(place as f64 + 0.5, 0.0).0;
        let where_at = |mm: Option<f64>| mm.map(|mm| (x, plot.at(0.0, depth.of(mm)).1));
        point_interval(sheet, quantiles(periods(*at)).map(where_at), marking(told, *at))?;
        let found = &headline.levels[*at];
        let change = match (found.percent_change, found.shift) {
            _ if *at == findings.reference => {
                periods(*at).q50.value().map(|mm| super::labels::size(*units, mm))
            }
            (Some(percent), _) => Some(signed_percent(percent)),
            (None, shift) => shift.map(|shift| signed(*units, shift.median.value)),
        };
        let at_name = if *at == findings.reference {
            "reference".to_owned()
        } else {
            level(*units, findings.levels_c[*at])
        };
        sheet.write(&at_name, (x, bottom + 10.0), SLIDE_NAME, HPos::Center, VPos::Top)?;
        if let Some(change) = change {
            let below = bottom + 10.0 + SLIDE_NAME.leading();
            sheet.write(&change, (x, below), SLIDE_LABEL, HPos::Center, VPos::Top)?;
        }
    }
    Ok(())
}

/// A row a band: the reference's median, and that of the level that the title tells of.
fn by_elevation(told: &Told<'_>, sheet: &Sheet) -> Drawn {
    let Told { findings, told: at_level, units, .. } = told;
    let (depth, height) = (units.depth(), units.elevation());
    let median = |band: &crate::findings::BandFindings, at: usize| {
        band.measures.first().and_then(|measure| measure.levels.get(at)?.periods.q50.value())
    };
    let drawn = [findings.reference, *at_level];
    let medians = findings.bands.iter().flat_map(|band| drawn.map(|at| median(band, at)));
    let highest = medians.flatten().fold(0.0, f64::max);
    let across = AmountTicks::up_to(depth.of(highest), STEPS);
    let edges = findings.bands.iter().flat_map(|of| [of.band.lower_m, of.band.upper_m]);
    let (lowest, top_m) =
        edges.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), m| (low.min(m), high.max(m)));
    let upwards = ValueTicks::within(height.of(lowest), height.of(top_m), STEPS);
    let [top, bottom] = PANELS_PX;
    let [edge, right] = BY_ELEVATION_PX;
    let left =
        edge + upwards.ticks.iter().map(|(_, label)| SLIDE_LABEL.width(label)).fold(0.0, f64::max) + 14.0;
    let plot =
        sheet.plot((left, top), (right, bottom), 0.0..across.top(), height.of(lowest)..height.of(top_m))?;
    let at = |mm: f64, m: f64| plot.at(depth.of(mm), height.of(m));
    sheet.write(
        &format!("By elevation ({})", height.word),
        (edge, top - 22.0),
        SLIDE_NAME,
        HPos::Left,
        VPos::Bottom,
    )?;
    key(told, sheet, right, top - 22.0)?;
    sheet.line(&[(left, top), (left, bottom), (right, bottom)], THIN)?;
    for (value, label) in &across.ticks {
        let x = plot.at(*value, height.of(lowest)).0;
        sheet.line(&[(x, bottom), (x, bottom + 6.0)], THIN)?;
        sheet.write(label, (x, bottom + BELOW_AXIS_PX), SLIDE_LABEL, HPos::Center, VPos::Top)?;
    }
    let axis = format!("{} ({})", sentence(&told.headline.measure.title), depth.word);
    let below_ticks = bottom + BELOW_AXIS_PX + SLIDE_NAME.leading();
    sheet.write(&axis, (f64::midpoint(left, right), below_ticks), SLIDE_LABEL, HPos::Center, VPos::Top)?;
    for (value, label) in &upwards.ticks {
        let y = plot.at(0.0, *value).1;
        sheet.line(&[(left - 6.0, y), (left, y)], THIN)?;
        sheet.write(label, (left - 10.0, y), SLIDE_LABEL, HPos::Right, VPos::Center)?;
    }
    for of in &findings.bands {
        let places: Vec<(usize, Px)> = drawn
            .iter()
            .filter_map(|level| Some((*level, at(median(of, *level)?, of.band.elevation_m))))
            .collect();
        if let [(_, from), (_, to)] = places[..] {
            sheet.line(&[from, to], Stroke::solid(ONE_OF_MANY, 2.0))?;
        }
        for (level, place) in places {
            marker(sheet, place, marking(told, level))?;
        }
    }
    Ok(())
}

/// Names of the two marks, from the right edge inwards.
fn key(told: &Told<'_>, sheet: &Sheet, right: f64, below: f64) -> Drawn {
    let mut x = right;
    let mut levels = vec![told.told, told.findings.reference];
    levels.dedup();
    for at in levels {
        let words = name(told.findings, at, told.units);
        x -= SLIDE_LABEL.width(&words);
        sheet.write(&words, (x, below), SLIDE_LABEL, HPos::Left, VPos::Bottom)?;
        marker(sheet, (x - 12.0, below - 0.37 * SLIDE_LABEL.size_px), marking(told, at))?;
        x -= 40.0;
    }
    Ok(())
}

fn quantiles(of: &Distribution) -> [Option<f64>; 5] {
    [of.q05, of.q25, of.q50, of.q75, of.q95].map(Outcome::value)
}

fn marking(told: &Told<'_>, at: usize) -> Marking {
    let reference = told.findings.reference;
    Marking {
        ink: level_ink(at, reference, told.findings.levels_c.len()),
        form: Form::Round,
        is_hollow: at == reference,
    }
}
