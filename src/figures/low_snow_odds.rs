//! How often a year has little snow, level by level.

use super::axes::AmountTicks;
use super::labels::{grouped, level, size_and_unit, times};
use super::marks::{Form, Marking, marker};
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Sheet, Stroke, VPos};
use super::shown::{Shown, name};
use super::theme::{EDGE, LABEL, MARGIN_PX, NAME, NOTE, WIDTH_PX, level_ink};
use super::{Figure, Part, Setting, Svg, ensemble};
use crate::findings::{Findings, LowSnow, LowSnowLevel};

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "low-snow-odds",
    table: "low-snow-odds",
    question: "How often will a year have as little snow as few have now?",
    part: Part::Years,
    draw,
};

const PLOT_PX: f64 = 230.0;
/// The axis counts years of ten, and always to the end.
const OF_YEARS: f64 = 10.0;
const STEPS: usize = 5;
/// Lines below a column.
const LINES: f64 = 4.0;

struct Words {
    title: String,
    ensemble: String,
    key: String,
    caption: String,
    description: String,
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let low = findings.by_year.as_ref()?.low_snow.as_ref()?;
    let shown = Shown::of(findings);
    let words = words(findings, low, &shown, setting)?;
    let text = paint(findings, low, &shown, setting, &words).ok()?;
    let alt = format!("{}. A mark a level, with its range.", words.title);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

/// `2`, `6.1`: years of ten.
fn of_ten(chance: f64) -> String {
    let years = OF_YEARS * chance;
    grouped(years, usize::from((years - years.round()).abs() >= 0.05))
}

fn words(findings: &Findings, low: &LowSnow, shown: &Shown, setting: &Setting<'_>) -> Option<Words> {
    let units = setting.units;
    let headline = &findings.basin.first()?.measure.title;
    let reference = low.levels.get(findings.reference)?;
    let limit = size_and_unit(units, low.below_mm.value);
    let there = match shown.farthest().and_then(|at| low.levels.get(at)) {
        Some(far) => format!(", in {} at {}", of_ten(far.chance.value), level(units, far.level_c)),
        None => "; no other level was run".to_owned(),
    };
    let which = shown.in_words(findings, units);
    let counted = format!("{} single years a level", grouped(low.years as f64, 0));
    let described = shown.all().into_iter().filter_map(|at| {
        let of = low.levels.get(at)?;
        Some(format!("{}: {} of 10 years", name(findings, at, units), of_ten(of.chance.value)))
    });
    let described = described.collect::<Vec<_>>().join("; ");
    Some(Words {
        title: format!(
            "{headline} is below {limit} in {} of 10 years at the reference{there}",
            of_ten(reference.chance.value)
        ),
        ensemble: format!("{}: {counted}.{which}", ensemble(findings)),
        key: format!(
            "Mark: years of ten below {limit}, the {} % quantile of the reference's years. Line: 5–95 % over \
             resampled realizations. Below: percent of years, and times the reference's.",
            grouped(100.0 * low.below_quantile, 0)
        ),
        caption: format!(
            "{} Share of years with {headline} below {limit}, the {} % quantile of the reference's single years, over {counted}, \
             those of {}.{which} The lines are the 5–95 % range over resampled realizations: chance of the simulation, not \
             day-to-day variation. It is a what-if at each warming level, not a forecast.",
            FIGURE.question,
            grouped(100.0 * low.below_quantile, 0),
            ensemble(findings)
        ),
        description: format!("Low-snow years. {described}."),
    })
}

fn paint(
    findings: &Findings,
    low: &LowSnow,
    shown: &Shown,
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let ticks = AmountTicks::up_to(OF_YEARS, STEPS);
    let left = MARGIN_PX + scales::width(&ticks) + 14.0;
    let right = WIDTH_PX - MARGIN_PX;
    let top = MARGIN_PX + heading.height() + 46.0;
    let bottom = top + PLOT_PX;
    let below = bottom + 12.0 + LINES * LABEL.leading() + 16.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), 0.0..right - left, 0.0..ticks.top())?;
    let height = |chance: f64| plot.at(0.0, OF_YEARS * chance).1;
    let all = shown.all();
    let column = (right - left) / all.len() as f64;

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("axis", || {
        scales::upwards(&sheet, &plot, &ticks, [left, right])?;
        scales::amounts_upwards(&sheet, &plot, &ticks, left)?;
        sheet.write("Years of 10", (MARGIN_PX, top - 18.0), NAME, HPos::Left, VPos::Bottom)
    })?;
    if let Some(reference) = low.levels.get(findings.reference) {
        let y = height(reference.chance.value);
        let dashed = Stroke { ink: EDGE, width_px: 1.0, dash_px: Some([6, 4]) };
        sheet.group("reference", || sheet.line(&[(left, y), (right, y)], dashed))?;
    }
    for (place, at) in all.into_iter().enumerate() {
        let Some(found) = low.levels.get(at) else { continue };
        let x = left + column * (place as f64 + 0.5);
        let ink = level_ink(at, findings.reference, findings.levels_c.len());
        let is_hollow = at == findings.reference;
        sheet.group("level", || {
            if let (Some(q05), Some(q95)) = (found.chance.q05, found.chance.q95) {
                sheet.line(&[(x, height(q05)), (x, height(q95))], Stroke::solid(ink, 2.0))?;
            }
            let marking = Marking { ink, form: Form::Round, is_hollow };
            marker(&sheet, (x, height(found.chance.value)), marking)?;
            let lines = below_column(found, name(findings, at, setting.units), is_hollow);
            lines.iter().enumerate().try_for_each(|(line, text)| {
                let y = bottom + 12.0 + LABEL.leading() * (line as f64 + 0.5);
                let lettering = [NAME, LABEL, LABEL, NOTE][line];
                sheet.write(text, (x, y), lettering, HPos::Center, VPos::Center)
            })
        })?;
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

fn below_column(found: &LowSnowLevel, name: String, is_reference: bool) -> Vec<String> {
    let chance = found.chance;
    let mut lines = vec![name, format!("{} of 10", of_ten(chance.value))];
    let percent = |share: f64| grouped(100.0 * share, 0);
    let ranged = match (chance.q05, chance.q95) {
        (Some(low), Some(high)) if !is_reference => format!(" ({}–{})", percent(low), percent(high)),
        _ => String::new(),
    };
    lines.push(format!("{} %{ranged}", percent(chance.value)));
    if !is_reference {
        lines.push(times(found.chance_ratio.value));
    }
    lines
}
