//! From which warming on the change stands out from chance, in means over several lengths.

use super::apart::moved_apart;
use super::axes::AmountTicks;
use super::labels::{between_levels, level, sentence, times};
use super::marks::{Form, Marking, marker};
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Px, Sheet, Stroke, VPos};
use super::theme::{EDGE, INK, LABEL, MARGIN_PX, NAME, QUIET, WIDTH_PX};
use super::{Figure, Part, Setting, Svg, ensemble};
use crate::findings::{Crossing, Detection, DetectionPeriod, Findings};
use crate::units::UnitSystem;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "change-against-spread",
    table: "change-against-spread",
    question: "From which warming on does the change stand out from what chance does?",
    part: Part::Years,
    draw,
};

const PLOT_PX: f64 = 250.0;
const STEPS: usize = 5;
const TO_NAME_PX: f64 = 14.0;

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let measure = findings.by_year.as_ref()?.measures.first()?;
    let detection = measure.detection.as_ref()?;
    let lines = lines(findings, detection);
    if lines.is_empty() {
        return None;
    }
    let title = title(&measure.measure.title, detection, setting.units)?;
    let text = paint(findings, &lines, setting, &title).ok()?;
    let caption = format!(
        "{} Mean change of {} at each warming level over one standard deviation of the reference's means over 1, 10 and 30 years, as far as \
         realizations hold them, by {}. The lines are the 5–95 % range over resampled realizations: chance of the simulation, not \
         day-to-day variation. Above 1 the change is larger than what chance commonly does. {}",
        FIGURE.question,
        measure.measure.title,
        ensemble(findings),
        match detection.warming_rate {
            Some(_) => "By the stated rate of warming the page names calendar years.",
            None => "No level has a year.",
        }
    );
    let alt = format!("{title}. {} rising or falling lines over the levels.", lines.len());
    Some(Svg { text, alt, caption, title })
}

fn means(years: usize) -> String {
    if years == 1 { "single years".to_owned() } else { format!("{years}-year means") }
}

/// Of the longest means and of single years.
fn title(measure: &str, detection: &Detection, units: UnitSystem) -> Option<String> {
    let said = |period: &DetectionPeriod| {
        let place = match period.leaves_spread {
            Crossing::At { level_c, .. } => format!("from {} on", between_levels(units, level_c)),
            Crossing::NotReached { up_to_c } => format!("at no level up to {}", level(units, up_to_c)),
            Crossing::Unknown => return None,
        };
        Some(format!("{place} in {}", means(period.years)))
    };
    let (longest, others) = detection.periods.split_last()?;
    let said: Vec<String> = others.iter().take(1).chain([longest]).filter_map(said).collect();
    Some(if said.is_empty() {
        format!("{measure}: how far the change stands out from chance, level by level")
    } else {
        format!(
            "{}: the change stands out from one standard deviation {}",
            sentence(measure),
            said.join(", ")
        )
    })
}

/// A length of means: places and ranges of its ratios by level.
struct Line {
    name: String,
    marking: Marking,
    dash_px: Option<[u32; 2]>,
    points: Vec<(f64, f64, Option<[f64; 2]>)>,
}

fn lines(findings: &Findings, detection: &Detection) -> Vec<Line> {
    let reference_c = findings.levels_c[findings.reference];
    let kinds =
        [(EDGE, Form::Round, Some([2, 4])), (QUIET, Form::Diamond, Some([6, 4])), (INK, Form::Square, None)];
    let line = |(period, (ink, form, dash_px)): (&DetectionPeriod, _)| {
        let mut points = vec![(reference_c, 0.0, None)];
        points.extend(period.levels.iter().filter_map(|level| {
            let ratio = level.unpaired?;
            Some((level.level_c, ratio.value, ratio.q05.zip(ratio.q95).map(|(low, high)| [low, high])))
        }));
        points.sort_by(|a, b| a.0.total_cmp(&b.0));
        let is_any = points.len() > 1;
        let marking = Marking { ink, form, is_hollow: false };
        is_any.then(|| Line { name: means(period.years), marking, dash_px, points })
    };
    detection.periods.iter().zip(kinds).filter_map(line).collect()
}

fn paint(findings: &Findings, lines: &[Line], setting: &Setting<'_>, title: &str) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, title, &format!("{}.", ensemble(findings)));
    let key = Paragraphs::key(
        "Mark: mean change over one standard deviation of the reference's means of that length; above the line at 1 it stands out. Upright \
         line: 5–95 % over resampled realizations. Longer means vary less, so that a smaller change stands out.",
    );
    let highest = lines
        .iter()
        .flat_map(|line| &line.points)
        .map(|(_, ratio, range)| range.map_or(*ratio, |[_, high]| high));
    let ticks = AmountTicks::up_to(highest.fold(1.0, f64::max), STEPS);
    let names = lines.iter().map(|line| NAME.width(&line.name)).fold(0.0, f64::max);
    let left = MARGIN_PX + scales::width(&ticks) + 14.0;
    let right = WIDTH_PX - MARGIN_PX - names - TO_NAME_PX - 16.0;
    let top = MARGIN_PX + heading.height() + 46.0;
    let bottom = top + PLOT_PX;
    let below = bottom + 12.0 + 2.0 * LABEL.leading() + 20.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let (first, last) = (findings.levels_c[0], findings.levels_c[findings.levels_c.len() - 1]);
    let pad = 0.06 * (last - first);
    let plot = sheet.plot((left, top), (right, bottom), first - pad..last + pad, 0.0..ticks.top())?;

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("axis", || {
        scales::upwards(&sheet, &plot, &ticks, [left, right])?;
        scales::amounts_upwards(&sheet, &plot, &ticks, left)?;
        let axis = "Change, in standard deviations";
        sheet.write(axis, (MARGIN_PX, top - 18.0), NAME, HPos::Left, VPos::Bottom)?;
        let at_one = plot.at(first, 1.0).1;
        sheet.line(
            &[(left, at_one), (right, at_one)],
            Stroke { ink: EDGE, width_px: 1.2, dash_px: Some([8, 5]) },
        )?;
        below_levels(&sheet, findings, setting.units, &|level_c| plot.at(level_c, 0.0).0, bottom)
    })?;
    let mut ends: Vec<(f64, f64, &Line)> = Vec::new();
    for line in lines {
        let places: Vec<Px> =
            line.points.iter().map(|(level_c, ratio, _)| plot.at(*level_c, *ratio)).collect();
        sheet.group("means", || {
            let stroke = Stroke { ink: line.marking.ink, width_px: 1.5, dash_px: line.dash_px };
            sheet.line(&places, stroke)?;
            for ((level_c, ratio, range), place) in line.points.iter().zip(&places) {
                if let Some([low, high]) = range {
                    let ends = [plot.at(*level_c, *low), plot.at(*level_c, *high)];
                    sheet.line(&ends, Stroke::solid(line.marking.ink, 1.5))?;
                }
                if *ratio > 0.0 {
                    marker(&sheet, *place, line.marking)?;
                }
            }
            Ok(())
        })?;
        ends.extend(places.last().map(|(x, y)| (*y, *x, line)));
    }
    ends.sort_by(|a, b| a.0.total_cmp(&b.0));
    let wanted: Vec<[f64; 2]> = ends.iter().map(|(y, ..)| [*y, NAME.size_px]).collect();
    sheet.group("names", || {
        let left = right + TO_NAME_PX;
        ends.iter().zip(moved_apart(&wanted, 4.0, [top, bottom])).try_for_each(|((end, x, line), y)| {
            sheet.line(&[(x + 8.0, *end), (left - 4.0, y)], Stroke::solid(line.marking.ink, 1.0))?;
            sheet.write(&line.name, (left, y), NAME, HPos::Left, VPos::Center)
        })
    })?;
    key.write(&sheet, below)?;
    let described: Vec<String> = lines.iter().map(|line| describe(line, setting.units)).collect();
    Ok(sheet.document(FIGURE.slug, title, &format!("{}.", described.join("; "))))
}

/// The levels below the plot, as many as there is room for.
fn below_levels(
    sheet: &Sheet,
    findings: &Findings,
    units: UnitSystem,
    across: &dyn Fn(f64) -> f64,
    bottom: f64,
) -> Drawn {
    let mut free_from = f64::NEG_INFINITY;
    for level_c in &findings.levels_c {
        let (name, x) = (level(units, *level_c), across(*level_c));
        sheet.line(&[(x, bottom), (x, bottom + 5.0)], Stroke::solid(EDGE, 1.0))?;
        let half = LABEL.width(&name) / 2.0;
        if x - half >= free_from {
            let y = bottom + 12.0 + LABEL.leading() / 2.0;
            sheet.write(&name, (x, y), LABEL, HPos::Center, VPos::Center)?;
            free_from = x + half + 8.0;
        }
    }
    Ok(())
}

fn describe(line: &Line, units: UnitSystem) -> String {
    let ratios: Vec<String> = line
        .points
        .iter()
        .filter(|(_, ratio, _)| *ratio > 0.0)
        .map(|(level_c, ratio, _)| format!("{} at {}", times(*ratio), level(units, *level_c)))
        .collect();
    format!("{}: {}", line.name, ratios.join(", "))
}
