//! Snow water by elevation at each level, with the area of each band beside it.

mod ground;
mod level_names;
mod profile;
mod rows;
mod title;
mod words;

use super::axes::AmountTicks;
use super::labels;
use super::marks::{Form, Marking};
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Plot, Sheet, VPos};
use super::shown::{Shown, name};
use super::theme::{EDGE, MARGIN_PX, NAME, NOTE, WIDTH_PX, level_ink};
use super::{Figure, Part, Setting, Svg};
use crate::basin::{Band, told_apart};
use crate::findings::{Findings, LevelFindings, MeasureFindings};
use crate::units::UnitSystem;
use ground::GroundColumns;
use level_names::LevelNames;
use profile::Profile;
use rows::Rows;
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "swe-by-band",
    table: "bands-amounts",
    question: "At which elevations is the snow water lost, and how much of the basin lies there?",
    part: Part::Answer,
    draw,
};

const STEPS: usize = 6;
/// A narrower plot has room for fewer steps.
const NARROW_PX: f64 = 280.0;
const STEPS_OF_NARROW: usize = 4;
const AREA_STEPS: usize = 3;
/// Width of the bars' panel, px.
const AREA_PX: f64 = 124.0;
const GAP_PX: f64 = 22.0;
/// Space above the plot for the levels' names, px.
const LEVELS_PX: f64 = 42.0;
/// Space below it for ticks and the axis' name, px.
const AXIS_PX: f64 = 64.0;

/// A band and what was found of the headline's measure there.
#[derive(Debug, Clone, Copy)]
struct Found<'a> {
    band: &'a Band,
    /// What tells it from other bands of the same range.
    apart: Option<&'a str>,
    measure: &'a MeasureFindings,
}

impl<'a> Found<'a> {
    /// Of every band, from the lowest; nothing where one lacks the measure.
    fn all(
        findings: &'a Findings,
        headline: &MeasureFindings,
        apart: &'a [Option<String>],
    ) -> Option<Vec<Self>> {
        let bands = findings.bands.iter().zip(apart).map(|(of_band, apart)| {
            let same = |found: &&MeasureFindings| found.measure.name == headline.measure.name;
            let measure = of_band.measures.iter().find(same)?;
            Some(Self { band: &of_band.band, apart: apart.as_deref(), measure })
        });
        bands.collect::<Option<Vec<Self>>>().filter(|bands| !bands.is_empty())
    }

    /// `2 400–2 600 m, facing 180°, slope 25°`.
    fn name(&self, units: UnitSystem) -> String {
        let apart = self.apart.map_or_else(String::new, |ground| format!(", {ground}"));
        format!("{}{apart}", labels::band(units, self.band))
    }

    fn at(&self, level: usize) -> Option<&'a LevelFindings> {
        self.measure.levels.get(level)
    }

    /// Low end, median and high end of 5-95 % at a level, mm; nothing where one has no value.
    fn range_mm(&self, level: usize) -> Option<[f64; 3]> {
        let periods = &self.at(level)?.periods;
        Some([periods.q05.value()?, periods.q50.value()?, periods.q95.value()?])
    }
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let headline = findings.basin.first()?;
    let apart = told_apart(findings.bands.iter().map(|of_band| &of_band.band));
    let bands = Found::all(findings, headline, &apart)?;
    let shown = Shown::of(findings);
    let words = Words::of(findings, headline, &bands, &shown, setting.units);
    let text = paint(findings, &bands, &shown, setting, &words).ok()?;
    let alt = format!("{}. {}", words.title, words.kind_of_drawing);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

fn paint(
    findings: &Findings,
    bands: &[Found<'_>],
    shown: &Shown,
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let units = setting.units;
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let names = MARGIN_PX + heading.height() + 26.0;
    let rows = Rows::of(bands, names + LEVELS_PX);
    let (top, bottom) = (rows.top, rows.bottom);
    let ground = GroundColumns::of(bands);
    let edges_left = MARGIN_PX + ground.width();
    let left = edges_left + rows.edges_width(units) + 14.0;
    let area_left = WIDTH_PX - MARGIN_PX - AREA_PX;
    let changes_right = area_left - GAP_PX;
    let right = match words.changes_width() {
        0.0 => changes_right,
        width => changes_right - width - GAP_PX,
    };
    let drawn = shown.others.iter().copied().chain([findings.reference]);
    let values = drawn.clone().flat_map(|at| bands.iter().filter_map(move |found| found.range_mm(at)));
    let highest = values.map(|[_, median, _]| median);
    let highest =
        highest.chain(bands.iter().filter_map(|found| Some(found.range_mm(findings.reference)?[2])));
    let depth = units.depth();
    let steps = if right - left < NARROW_PX { STEPS_OF_NARROW } else { STEPS };
    let ticks = AmountTicks::up_to(depth.of(highest.fold(0.0, f64::max)), steps);
    let sheet = Sheet::new(bottom + AXIS_PX + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), 0.0..ticks.top(), 0.0..1.0)?;

    heading.write(&sheet, MARGIN_PX)?;
    sheet.write(&words.elevation, (edges_left, names), NAME, HPos::Left, VPos::Bottom)?;
    let profile = Profile { plot: &plot, rows: &rows, bands, depth };
    if findings.realizations > 1 {
        sheet.group("reference-band", || profile.range(&sheet, findings.reference))?;
    }
    sheet.group("axis", || {
        rows.axis(&sheet, left, units)?;
        ground.write(&sheet, MARGIN_PX, names, &rows)?;
        scales::rightwards(&sheet, &plot, &ticks, bottom)?;
        sheet.write(&words.axis, (left, bottom + 44.0), NAME, HPos::Left, VPos::Bottom)
    })?;
    let mut level_names = LevelNames::new([MARGIN_PX, changes_right]);
    for at in drawn {
        let place = shown.others.iter().position(|other| *other == at);
        let marking = Marking {
            ink: level_ink(at, findings.reference, findings.levels_c.len()),
            form: place.map_or(Form::Round, Form::of_level),
            is_hollow: place.is_none(),
        };
        sheet.group("level", || profile.line(&sheet, at, marking))?;
        level_names.add(profile.upper_end(at), name(findings, at, units), marking.ink);
    }
    sheet.group("levels", || level_names.write(&sheet, top))?;
    sheet.group("changes", || {
        sheet.write(&words.changes_name, (changes_right, names), NAME, HPos::Right, VPos::Bottom)?;
        let labelled = rows.labelled().into_iter();
        let mut labelled = labelled.filter_map(|at| Some((rows.middle(at), words.changes.get(at)?)));
        labelled.try_for_each(|(middle, change)| {
            sheet.write(change, (changes_right, middle), NOTE, HPos::Right, VPos::Center)
        })
    })?;
    sheet.group("areas", || areas(&sheet, bands, &rows, area_left, setting))?;
    sheet.write(&words.area, (area_left, names), NAME, HPos::Left, VPos::Bottom)?;
    key.write(&sheet, bottom + AXIS_PX)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// A bar a band, from 0.
fn areas(sheet: &Sheet, bands: &[Found<'_>], rows: &Rows, left: f64, setting: &Setting<'_>) -> Drawn {
    let area = setting.units.area();
    let largest = bands.iter().map(|found| area.of(found.band.area_km2)).fold(0.0, f64::max);
    let ticks = AmountTicks::up_to(largest, AREA_STEPS);
    let right = WIDTH_PX - MARGIN_PX;
    let plot: Plot = sheet.plot((left, rows.top), (right, rows.bottom), 0.0..ticks.top(), 0.0..1.0)?;
    for (at, found) in bands.iter().enumerate() {
        let [low, high] = rows.edges_of(at);
        let end = plot.at(area.of(found.band.area_km2), 0.0).0;
        sheet.block((left, high + rows.gap()), (end, low - rows.gap()), EDGE)?;
    }
    scales::rightwards(sheet, &plot, &ticks, rows.bottom)
}
