//! Change of snow water with elevation, with its sign, and where the snow line and the crossover lie.

use super::apart::moved_apart;
use super::labels::{elevation, grouped, sentence};
use super::marks::{Form, Marking, marker};
use super::page::Paragraphs;
use super::sheet::{Drawn, HPos, Sheet, Stroke, VPos};
use super::shown::{Shown, name};
use super::theme::{EDGE, INK, LABEL, MARGIN_PX, NAME, NOTE, QUIET, WIDTH_PX, level_ink};
use super::value_ticks::ValueTicks;
use super::{Figure, Part, Setting, Svg, ensemble};
use crate::findings::{BandChange, Crossover, Dominates, Findings, Places, Sign};
use crate::units::UnitSystem;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "swe-change-by-band",
    table: "swe-change-by-band",
    question: "Which elevations lose snow water, does any gain, and where do the snow line and the crossover lie?",
    part: Part::Elevation,
    draw,
};

const HEIGHT_PX: f64 = 330.0;
const STEPS: usize = 6;
/// Room for the names of lines at the right, px.
const NAMES_PX: f64 = 190.0;

/// An elevation that is marked, m, and its name.
type Line = (f64, String);

/// The elevations that are marked.
struct Marked {
    snow_lines: Vec<Line>,
    crossover: Option<Line>,
}

impl Marked {
    /// From the lowest.
    fn lines(self) -> Vec<Line> {
        let mut lines: Vec<Line> = self.snow_lines.into_iter().chain(self.crossover).collect();
        lines.sort_by(|a, b| a.0.total_cmp(&b.0));
        lines
    }
}

/// What is written and drawn.
struct Told<'a> {
    findings: &'a Findings,
    shown: &'a Shown,
    /// Elevations that are marked, each with its name, from the lowest.
    lines: Vec<Line>,
    title: String,
    ensemble: String,
    axis: String,
    key: String,
}

const KEY: &str = "Markers: median of the paired changes of each band, at its elevation; bars: their 5–95 % over realizations. A bar that holds 0 \
                   cannot tell loss from gain.";
const SNOW_LINE: &str = " Snow line: the lowest elevation with the stated snow water.";
const CROSSOVER: &str = " Crossover: below it warm years, above it wet years decide the snow.";

/// How to read it, with the lines that are drawn alone.
fn key(marked: &Marked) -> String {
    let of = |is_drawn: bool, words: &'static str| if is_drawn { words } else { "" };
    format!(
        "{KEY}{}{}",
        of(!marked.snow_lines.is_empty(), SNOW_LINE),
        of(marked.crossover.is_some(), CROSSOVER)
    )
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let headline = findings.basin.first()?;
    let places = findings.places.as_ref()?;
    let shown = Shown::of(findings);
    let farthest = shown.farthest()?;
    let units = setting.units;
    let marked = marked(findings, places, farthest, units);
    let key = key(&marked);
    let asked = if marked.crossover.is_some() {
        " The crossover is asked of the reference's single years."
    } else {
        ""
    };
    let told = Told {
        lines: marked.lines(),
        title: title(findings, places, farthest, units)?,
        ensemble: format!("{}.{}", ensemble(findings), shown.in_words(findings, units)),
        axis: format!(
            "Change of {}, {}-year mean ({})",
            headline.measure.title,
            findings.years,
            units.depth().word
        ),
        key,
        findings,
        shown: &shown,
    };
    let text = paint(&told, places, setting).ok()?;
    let caption = format!(
        "{} Change of {} at each warming level from the reference, {}. {}{asked} Spread is chance between realizations, not \
         day-to-day variation.",
        FIGURE.question,
        headline.measure.title,
        ensemble(findings),
        told.key
    );
    let alt = format!("{}. Changes of {} bands by elevation.", told.title, findings.bands.len());
    Some(Svg { text, title: told.title, caption, alt })
}

fn change_at(places: &Places, findings: &Findings, level: usize) -> Option<Vec<Option<BandChange>>> {
    let level_c = findings.levels_c.get(level)?;
    places.band_change.iter().find(|change| change.level_c == *level_c).map(|change| change.bands.clone())
}

fn title(findings: &Findings, places: &Places, at: usize, units: UnitSystem) -> Option<String> {
    let changes = change_at(places, findings, at)?;
    let count = |sign: Sign| changes.iter().flatten().filter(|change| change.sign == sign).count();
    let (lose, gain, all) = (count(Sign::Loses), count(Sign::Gains), changes.len());
    let level = name(findings, at, units);
    let of_bands = |count: usize| format!("{count} of {all} elevation bands");
    let gains = if gain == 1 { "gains" } else { "gain" };
    Some(match (lose, gain) {
        (0, 0) => format!("At {level}, no elevation band can be told to lose or gain snow water"),
        (lose, 0) if lose == all => format!("At {level}, every elevation band loses snow water"),
        (0, gain) if gain == all => format!("At {level}, every elevation band gains snow water"),
        (lose, 0) => format!("At {level}, {} lose snow water and none gains", of_bands(lose)),
        (0, gain) => format!("At {level}, {} gain snow water and none loses", of_bands(gain)),
        (lose, gain) => format!("At {level}, {} lose snow water and {gain} {gains}", of_bands(lose)),
    })
}

fn marked(findings: &Findings, places: &Places, farthest: usize, units: UnitSystem) -> Marked {
    let word = units.elevation().word;
    let mut snow_lines = Vec::new();
    for at in [findings.reference, farthest] {
        let level = places.snow_line.levels.get(at).and_then(|level| level.snow_line.elevation_m());
        snow_lines.extend(level.map(|m| {
            (m, format!("Snow line, {} {word}, {}", elevation(units, m), name(findings, at, units)))
        }));
    }
    // A crossover that other realizations would not have is told on the page, and not drawn as if it stood.
    let is_firm = |crossover: &&Crossover| crossover.range.is_none_or(|range| range.is_firm());
    let crossover = places.crossover.get(findings.reference).filter(is_firm).and_then(|crossover| {
        match crossover.found {
            Dominates::Crossover { elevation_m } => {
                Some((elevation_m, format!("Crossover, {} {word}", elevation(units, elevation_m))))
            }
            _ => None,
        }
    });
    Marked { snow_lines, crossover }
}

fn paint(told: &Told<'_>, places: &Places, setting: &Setting<'_>) -> Drawn<String> {
    let (findings, units) = (told.findings, setting.units);
    let (depth, height) = (units.depth(), units.elevation());
    let heading = Paragraphs::heading(setting.study_title, &told.title, &told.ensemble);
    let key = Paragraphs::key(&told.key);
    let top = MARGIN_PX + heading.height() + 58.0;
    let bottom = top + HEIGHT_PX;
    let levels: Vec<(usize, Vec<Option<BandChange>>)> =
        told.shown.others.iter().filter_map(|at| Some((*at, change_at(places, findings, *at)?))).collect();
    let ends = levels.iter().flat_map(|(_, changes)| changes.iter().flatten());
    let ends = ends.flat_map(|change| [change.range_mm.q05, change.range_mm.q95, change.median_mm.value]);
    let (low, high) = ends.fold((0.0_f64, 0.0_f64), |(low, high), mm| (low.min(mm), high.max(mm)));
    let across = ValueTicks::around(depth.of(low), depth.of(high), STEPS);
    let edges = findings.bands.iter().flat_map(|of_band| [of_band.band.lower_m, of_band.band.upper_m]);
    let (lowest, highest) =
        edges.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), m| (low.min(m), high.max(m)));
    let upwards = ValueTicks::within(height.of(lowest), height.of(highest), STEPS);
    let labels = upwards.ticks.iter().map(|(_, label)| LABEL.width(label)).fold(0.0, f64::max);
    let left = MARGIN_PX + labels + 24.0;
    let right = WIDTH_PX - MARGIN_PX - NAMES_PX;
    let [from, to] = across.ends();
    let sheet = Sheet::new(bottom + 60.0 + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), from..to, height.of(lowest)..height.of(highest))?;
    heading.write(&sheet, MARGIN_PX)?;
    let thin = Stroke::solid(EDGE, 1.0);
    sheet.write(
        &format!("Elevation ({})", height.word),
        (MARGIN_PX, top - 32.0),
        NAME,
        HPos::Left,
        VPos::Bottom,
    )?;
    sheet.group("axis", || {
        sheet.line(&[(left, bottom), (right, bottom)], thin)?;
        for (value, label) in &across.ticks {
            let x = plot.at(*value, height.of(lowest)).0;
            sheet.line(&[(x, bottom), (x, bottom + 5.0)], thin)?;
            sheet.write(label, (x, bottom + 9.0), LABEL, HPos::Center, VPos::Top)?;
        }
        for (value, label) in &upwards.ticks {
            let y = plot.at(0.0, *value).1;
            sheet.line(&[(left - 5.0, y), (left, y)], thin)?;
            sheet.write(label, (left - 9.0, y), LABEL, HPos::Right, VPos::Center)?;
        }
        let zero = plot.at(0.0, height.of(lowest)).0;
        sheet.line(&[(left, top), (left, bottom)], thin)?;
        sheet.line(&[(zero, top), (zero, bottom)], Stroke::solid(INK, 1.4))?;
        sheet.write(&told.axis, (left, bottom + 48.0), NAME, HPos::Left, VPos::Bottom)
    })?;
    sheet.group("lines", || {
        let wanted: Vec<[f64; 2]> =
            told.lines.iter().rev().map(|(m, _)| [plot.at(0.0, height.of(*m)).1, 15.0]).collect();
        let middles = moved_apart(&wanted, 3.0, [top, bottom]);
        for ((m, words), middle) in told.lines.iter().rev().zip(middles) {
            let y = plot.at(0.0, height.of(*m)).1;
            sheet.line(
                &[(left, y), (right, y)],
                Stroke { ink: QUIET, width_px: 1.0, dash_px: Some([2, 4]) },
            )?;
            sheet.line(&[(right, y), (right + 10.0, middle)], Stroke::solid(QUIET, 0.8))?;
            sheet.write(words, (right + 14.0, middle), NOTE, HPos::Left, VPos::Center)?;
        }
        Ok(())
    })?;
    let mut names = Vec::new();
    for (place, (at, changes)) in levels.iter().enumerate() {
        let ink = level_ink(*at, findings.reference, findings.levels_c.len());
        let marking = Marking { ink, form: Form::of_level(place), is_hollow: false };
        let is_farthest = Some(*at) == told.shown.farthest();
        sheet.group("level", || {
            for (of_band, change) in findings.bands.iter().zip(changes) {
                let Some(change) = change else { continue };
                let at = |mm: f64| plot.at(depth.of(mm), height.of(of_band.band.elevation_m));
                if is_farthest {
                    sheet
                        .line(&[at(change.range_mm.q05), at(change.range_mm.q95)], Stroke::solid(ink, 1.4))?;
                }
                marker(&sheet, at(change.median_mm.value), marking)?;
            }
            Ok(())
        })?;
        names.push((sentence(&name(findings, *at, units)), marking));
    }
    let mut x = left + 8.0;
    for (words, marking) in names {
        marker(&sheet, (x, top - 14.0), marking)?;
        sheet.write(&words, (x + 9.0, top - 14.0), NAME, HPos::Left, VPos::Center)?;
        x += NAME.width(&words) + 30.0;
    }
    key.write(&sheet, bottom + 60.0)?;
    let described = told.lines.iter().map(|(_, words)| format!("{words}.")).collect::<Vec<_>>().join(" ");
    Ok(sheet.document(
        FIGURE.slug,
        &told.title,
        &format!("{} {} lines are marked. {described}", told.ensemble, grouped(told.lines.len() as f64, 0)),
    ))
}
