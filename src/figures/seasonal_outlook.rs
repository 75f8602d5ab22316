//! How well the snow of the survey date foretells what comes, level by level.

use super::axes::AmountTicks;
use super::labels::{grouped, level, percent_size, score, sentence};
use super::level_lines::{Marked, marked};
use super::marks::marker;
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Sheet, Stroke, VPos};
use super::shown::{Shown, name};
use super::theme::{EDGE, LABEL, MARGIN_PX, NAME, WIDTH_PX};
use super::{Figure, Part, Setting, Svg, ensemble};
use crate::findings::{Findings, Operations, Outlook, OutlookLevel, Ranged};
use crate::units::UnitSystem;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "seasonal-outlook",
    table: "seasonal-outlook",
    question: "How well does the snow of the survey date foretell what comes, as the basin warms?",
    part: Part::Outlook,
    draw,
};

const PLOT_PX: f64 = 210.0;
const STEPS: usize = 5;
/// Between the two panels, px.
const GAP_PX: f64 = 30.0;
/// Height of a level's name and number below a panel, px.
const BELOW_PX: f64 = 12.0 + 2.0 * 17.0;

/// One of the two questions: its axis, and what is asked of a level.
struct Panel {
    axis: &'static str,
    of: fn(&OutlookLevel) -> Option<Ranged>,
    said: fn(f64) -> String,
}

const PANELS: [Panel; 2] = [
    Panel { axis: "Correlation", of: |level| level.correlation, said: score },
    Panel {
        axis: "Width of 9 in 10 (% of the mean)",
        of: |level| level.interval_pct,
        said: |pct| format!("{} %", percent_size(pct)),
    },
];

struct Words {
    title: String,
    ensemble: String,
    key: String,
    caption: String,
    description: String,
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let operations = findings.operations.as_ref()?;
    let outlook = operations.outlook.as_ref()?;
    let shown = Shown::of(findings);
    let words = words(findings, operations, outlook, &shown, setting.units)?;
    let text = paint(findings, outlook, &shown, setting, &words).ok()?;
    let alt = format!("{}. Two panels with a mark a level.", words.title);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

/// Share of the variance that the snow explains, percent.
fn explained_pct(found: &OutlookLevel) -> Option<f64> {
    found.correlation.map(|r| 100.0 * r.value * r.value)
}

/// `At +2 °C, 1 April SWE explains less of the inflow, 1 April to 31 July: 79 % of its variance, 83 % at the reference`.
fn title(findings: &Findings, outlook: &Outlook, shown: &Shown, units: UnitSystem) -> Option<String> {
    let (snow, inflow) = (&outlook.snow.title, &outlook.inflow.title);
    let reference = outlook.levels.get(findings.reference)?;
    let whole = |pct: f64| grouped(pct, 0);
    let Some(before) = explained_pct(reference) else {
        return Some(format!("At the reference, {snow} or {inflow} does not vary: nothing to foretell"));
    };
    let Some(found) = shown.told(findings).and_then(|at| outlook.levels.get(at)) else {
        return Some(format!(
            "{} explains {} % of the variance of {inflow}; no other level was run",
            sentence(snow),
            whole(before)
        ));
    };
    let place = level(units, found.level_c);
    let Some(after) = explained_pct(found) else {
        return Some(format!("At {place}, {snow} or {inflow} does not vary: nothing to foretell"));
    };
    // Less or more is told where the ranges of both lie apart, and by half a percent.
    let lie_apart = |low: &OutlookLevel, high: &OutlookLevel| {
        let ends = low.correlation.and_then(|r| r.q95).zip(high.correlation.and_then(|r| r.q05));
        ends.is_some_and(|(low, high)| low < high)
    };
    let how = match after - before {
        ..=-0.5 if lie_apart(found, reference) => "explains less of",
        0.5.. if lie_apart(reference, found) => "explains more of",
        -0.5..=0.5 => "explains as much of",
        _ => "may explain another share of",
    };
    Some(format!(
        "At {place}, {snow} {how} {inflow}: {} % of its variance, {} % at the reference",
        whole(after),
        whole(before)
    ))
}

fn words(
    findings: &Findings,
    operations: &Operations,
    outlook: &Outlook,
    shown: &Shown,
    units: UnitSystem,
) -> Option<Words> {
    let which = shown.in_words(findings, units);
    let (snow, inflow) = (&outlook.snow.title, &outlook.inflow.title);
    let years = grouped((findings.realizations * findings.years) as f64, 0);
    let described = shown.all().into_iter().filter_map(|at| {
        let found = outlook.levels.get(at)?;
        let numbers = PANELS.iter().filter_map(|panel| Some((panel.said)((panel.of)(found)?.value)));
        let numbers = numbers.collect::<Vec<_>>().join(", ");
        let numbers = if numbers.is_empty() { "none".to_owned() } else { numbers };
        Some(format!("{}: {numbers}", name(findings, at, units)))
    });
    let observed = if operations.inflow_is_observed {
        ""
    } else {
        " No inflow was observed: this is what the snow tells of the model's own water, not of a river's."
    };
    Some(Words {
        title: title(findings, outlook, shown, units)?,
        ensemble: format!("{}: {years} single years a level.{which}", ensemble(findings)),
        key: "Left: higher is better foretold. Right: the interval about a straight line through all years that holds 9 of 10 of them; lower is \
              better foretold. Line through a mark: 5–95 % over resampled realizations, not day-to-day variation. Years of all realizations are \
              taken together, and so is the assumed change of mean precipitation where there is one."
            .to_owned(),
        caption: format!(
            "How closely {inflow} follows {snow} over {years} single years at each warming level, those of {}.{which} Left: Pearson's \
             correlation; its square is the share of the variance that a straight line explains. Right: the width of the interval about \
             that line which holds 9 of 10 years, as if normal, over the level's own mean volume. Lines are the 5–95 % range over \
             resampled realizations: chance of the simulation, not day-to-day variation. The model knows the snow and its own future \
             weather alone: what is observed of snow, soil and streams is less certain.{observed}",
            ensemble(findings),
        ),
        description: format!(
            "Correlation, and width of the interval of 9 in 10 years. {}.",
            sentence(&described.collect::<Vec<_>>().join("; "))
        ),
    })
}

fn paint(
    findings: &Findings,
    outlook: &Outlook,
    shown: &Shown,
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let levels = marked(findings, shown, setting.units);
    let highest = |panel: &Panel| {
        let found = levels.iter().filter_map(|level| (panel.of)(outlook.levels.get(level.at)?));
        found.map(|of| of.q95.unwrap_or(of.value).max(of.value)).fold(0.0, f64::max)
    };
    let ticks = [AmountTicks::up_to(1.0, STEPS), AmountTicks::up_to(highest(&PANELS[1]), STEPS)];
    let half = (WIDTH_PX - 2.0 * MARGIN_PX - GAP_PX) / 2.0;
    let top = MARGIN_PX + heading.height() + 46.0;
    let bottom = top + PLOT_PX;
    let below = bottom + BELOW_PX + 16.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    heading.write(&sheet, MARGIN_PX)?;
    for ((at, panel), ticks) in PANELS.iter().enumerate().zip(&ticks) {
        let from = MARGIN_PX + at as f64 * (half + GAP_PX);
        let (left, right) = (from + scales::width(ticks) + 14.0, from + half);
        let plot = sheet.plot((left, top), (right, bottom), 0.0..levels.len() as f64, 0.0..ticks.top())?;
        sheet.group("axis", || {
            scales::upwards(&sheet, &plot, ticks, [left, right])?;
            scales::amounts_upwards(&sheet, &plot, ticks, left)?;
            sheet.write(panel.axis, (from, top - 18.0), NAME, HPos::Left, VPos::Bottom)
        })?;
        let reference = outlook.levels.get(findings.reference).and_then(|found| (panel.of)(found));
        if let Some(reference) = reference {
            let y = plot.at(0.0, reference.value.max(0.0)).1;
            let dashed = Stroke { ink: EDGE, width_px: 1.0, dash_px: Some([6, 4]) };
            sheet.group("reference", || sheet.line(&[(left, y), (right, y)], dashed))?;
        }
        for (column, level) in levels.iter().enumerate() {
            let found = outlook.levels.get(level.at).and_then(|found| (panel.of)(found));
            let height = |value: f64| plot.at(column as f64 + 0.5, value.max(0.0));
            sheet.group("level", || {
                if let Some(found) = found {
                    if let (Some(low), Some(high)) = (found.q05, found.q95) {
                        sheet.line(&[height(low), height(high)], Stroke::solid(level.marking.ink, 2.0))?;
                    }
                    marker(&sheet, height(found.value), level.marking)?;
                }
                let said = found.map_or_else(|| "none".to_owned(), |found| (panel.said)(found.value));
                let x = height(0.0).0;
                below_column(&sheet, level, &said, (x, bottom + 12.0))
            })?;
        }
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// A level's name, as far as there is room for it, and its number.
fn below_column(sheet: &Sheet, level: &Marked, said: &str, (x, top): (f64, f64)) -> Drawn {
    // The reference's level in brackets has no room below a column.
    let name = level.name.split(" (").next().unwrap_or(&level.name);
    sheet.write(name, (x, top + 8.0), NAME, HPos::Center, VPos::Center)?;
    sheet.write(said, (x, top + 25.0), LABEL, HPos::Center, VPos::Center)
}
