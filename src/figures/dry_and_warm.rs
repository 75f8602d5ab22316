//! Dry and warm years at each level: the four kinds of years as bars, and low snow in dry years beside them.

use super::labels::{grouped, sentence};
use super::page::Paragraphs;
use super::sheet::{Drawn, HPos, Sheet, Stroke, VPos};
use super::shown::{Shown, name};
use super::theme::{EDGE, LABEL, MARGIN_PX, NAME, NOTE, WIDTH_PX, level_ink};
use super::{Figure, Part, Setting, Svg, ensemble};
use crate::findings::{Chance, Coincidence, CoincidenceLevel, Findings};
use crate::units::UnitSystem;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "dry-and-warm",
    table: "dry-and-warm",
    question: "How often are dry years warm as well, and what does that do to the snow?",
    part: Part::DryAndWarm,
    draw,
};

const HEADS: [&str; 4] = ["Dry and warm", "Dry and cool", "Wet and warm", "Wet and cool"];
const ROW_PX: f64 = 46.0;
const BAR_PX: f64 = 20.0;
/// Room for a bar's number beside it, px.
const NUMBER_PX: f64 = 62.0;
/// Where halves that know nothing of each other would stand.
const QUARTER: f64 = 0.25;

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let headline = findings.basin.first()?;
    let found = findings.places.as_ref()?.coincidence.as_ref()?;
    let shown = Shown::of(findings);
    let title = title(findings, found, &shown, setting.units)?;
    let said = Said {
        ensemble: format!("{}.{}", ensemble(findings), shown.in_words(findings, setting.units)),
        key: format!(
            "Bars: share of single years, in 10 years, with a line of two Monte Carlo errors; dashed: a quarter of years. Low snow: below the {} % \
             quantile of the reference's single years of {}; none where there are no such years.",
            grouped(100.0 * found.low_snow_below_quantile, 0),
            headline.measure.title
        ),
    };
    let text = paint(findings, found, &shown, setting, &title, &said).ok()?;
    let caption = format!(
        "{} Single years of {}, at each warming level: dry at or below the reference's median precipitation before the date of {}, cool at or below \
         its median temperature of that season; both medians, and what low snow is, stay the reference's. {} Spread is chance between years and \
         realizations, Monte Carlo errors in the tables, not day-to-day variation.",
        FIGURE.question,
        ensemble(findings),
        headline.measure.title,
        said.key
    );
    let alt = format!("{title}. Bars of four kinds of years at {} levels.", shown.others.len() + 1);
    Some(Svg { text, title, caption, alt })
}

struct Said {
    ensemble: String,
    key: String,
}

fn title(findings: &Findings, found: &Coincidence, shown: &Shown, units: UnitSystem) -> Option<String> {
    let of = |at: usize| Some(in_ten(found.levels.get(at)?.dry_warm?.estimate.value));
    let reference = of(findings.reference)?;
    Some(match shown.farthest().and_then(|at| Some((at, of(at)?))) {
        None => format!("{reference} in 10 years are dry and warm"),
        Some((at, then)) if then == reference => {
            format!(
                "{then} in 10 years are dry and warm at {}, as at the reference",
                name(findings, at, units)
            )
        }
        Some((at, then)) => format!(
            "{then} in 10 years are dry and warm at {}, against {reference} at the reference",
            name(findings, at, units)
        ),
    })
}

/// `2.9`: of ten years.
fn in_ten(share: f64) -> String {
    grouped(10.0 * share, 1)
}

fn cells(level: &CoincidenceLevel) -> [Option<Chance>; 4] {
    [level.dry_warm, level.dry_cool, level.wet_warm, level.wet_cool]
}

fn paint(
    findings: &Findings,
    found: &Coincidence,
    shown: &Shown,
    setting: &Setting<'_>,
    title: &str,
    said: &Said,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, title, &said.ensemble);
    let key = Paragraphs::key(&said.key);
    let heads = MARGIN_PX + heading.height() + 30.0;
    let levels = shown.all();
    let bottom = heads + 14.0 + ROW_PX * levels.len() as f64;
    let names = levels.iter().map(|at| NAME.width(&sentence(&name(findings, *at, setting.units))));
    let left = MARGIN_PX + names.fold(0.0, f64::max) + 16.0;
    let column = (WIDTH_PX - MARGIN_PX - left) / HEADS.len() as f64;
    let full = column - NUMBER_PX;
    let sheet = Sheet::new(bottom + 12.0 + key.height() + MARGIN_PX)?;
    heading.write(&sheet, MARGIN_PX)?;
    for (cell, head) in HEADS.iter().enumerate() {
        let start = left + column * cell as f64;
        sheet.write(head, (start, heads), NAME, HPos::Left, VPos::Bottom)?;
        sheet.line(&[(start, heads + 8.0), (start, bottom)], Stroke::solid(EDGE, 1.0))?;
    }
    for (row, at) in levels.iter().enumerate() {
        let Some(level) = found.levels.get(*at) else { continue };
        let top = heads + 14.0 + ROW_PX * row as f64;
        let middle = top + BAR_PX / 2.0;
        let ink = level_ink(*at, findings.reference, findings.levels_c.len());
        let of_level = sentence(&name(findings, *at, setting.units));
        sheet.write(&of_level, (MARGIN_PX, middle), NAME, HPos::Left, VPos::Center)?;
        for (cell, chance) in cells(level).into_iter().enumerate() {
            let Some(chance) = chance else { continue };
            let start = left + column * cell as f64;
            let share = chance.estimate.value;
            let error = 2.0 * chance.estimate.monte_carlo_error.unwrap_or(0.0);
            let across = |share: f64| start + full * share.clamp(0.0, 1.0);
            sheet.block((start, top), (across(share), top + BAR_PX), ink)?;
            let dashed = Stroke { ink: EDGE, width_px: 1.0, dash_px: Some([3, 3]) };
            sheet.line(&[(across(QUARTER), top - 3.0), (across(QUARTER), top + BAR_PX)], dashed)?;
            sheet.line(
                &[(across(share - error), top + BAR_PX + 3.0), (across(share + error), top + BAR_PX + 3.0)],
                Stroke::solid(EDGE, 2.0),
            )?;
            let number = (across(QUARTER.max(share + error)) + 6.0, middle);
            sheet.write(&format!("{} in 10", in_ten(share)), number, LABEL, HPos::Left, VPos::Center)?;
            let given = match cell {
                0 => level.low_snow_given_dry.warm,
                1 => level.low_snow_given_dry.cool,
                _ => None,
            };
            if let Some(given) = given {
                let words = format!("low snow in {} of 10", in_ten(given.estimate.value));
                sheet.write(&words, (start + 4.0, top + BAR_PX + 14.0), NOTE, HPos::Left, VPos::Center)?;
            }
        }
    }
    key.write(&sheet, bottom + 12.0)?;
    Ok(sheet.document(FIGURE.slug, title, &said.ensemble))
}
