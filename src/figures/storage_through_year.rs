//! What the reservoir holds through the year, level by level, under its capacity and its flood-space rule.

mod words;

use super::axes::{AmountTicks, Calendar};
use super::inflow_by_month::band;
use super::level_lines::{EndName, TO_NAME_PX, line, marked, names_at_ends, widest};
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Px, Sheet, Stroke, VPos};
use super::shown::Shown;
use super::theme::{EDGE, INK, MARGIN_PX, NAME, WIDTH_PX};
use super::thin::{TOLERANCE_PX, thinned};
use super::{Figure, Part, Setting, Svg};
use crate::calendar::{COMMON_DATES, MonthDay, WaterYearStart, day_of_water_year};
use crate::findings::{Findings, MeasureFindings, Operations, PoolShown};
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "storage-through-year",
    table: "storage",
    question: "What does the reservoir hold through the year, as the basin warms?",
    part: Part::Reservoir,
    draw,
};

const PLOT_PX: f64 = 320.0;
const STEPS: usize = 6;
/// What the reservoir can hold, and what lies below its outlets.
const LIMIT: Stroke = Stroke::solid(INK, 1.2);
/// What it may hold.
const RULE: Stroke = Stroke { ink: EDGE, width_px: 2.4, dash_px: Some([9, 3]) };
/// Names of lines that are no level's.
pub(super) const CAPACITY: &str = "capacity";
pub(super) const RULE_NAME: &str = "flood-space rule";
pub(super) const DEAD: &str = "dead storage";

/// Storage as a day begins.
struct OnDay<'a> {
    /// The day of the water year, from 1; that after the last at the year's end.
    day: f64,
    found: &'a MeasureFindings,
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let operations = findings.operations.as_ref()?;
    let pool = operations.pool.as_ref()?;
    let days = days(operations, setting.water_year_starts);
    if days.len() < 2 {
        return None;
    }
    let shown = Shown::of(findings);
    let words = Words::of(findings, pool, &days, &shown, setting)?;
    let text = paint(findings, pool, &days, &shown, setting, &words).ok()?;
    let alt = format!("{}. {}", words.title, words.kind_of_drawing);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

/// All days of which storage was taken, in order.
fn days(operations: &Operations, starts: WaterYearStart) -> Vec<OnDay<'_>> {
    let of = |found| {
        let found: &MeasureFindings = found;
        let date = found.measure.name.strip_prefix("storage_")?.strip_suffix("_hm3")?;
        let day = if date == "year_end" {
            COMMON_DATES as f64 + 1.0
        } else {
            let (month, day) = date.split_once('_')?;
            let date = MonthDay::new(month.parse().ok()?, day.parse().ok()?)?;
            day_of_water_year(starts.first_day(2002), date) as f64
        };
        Some(OnDay { day, found })
    };
    let mut days: Vec<OnDay<'_>> = operations.storage.iter().filter_map(of).collect();
    days.sort_by(|a, b| a.day.total_cmp(&b.day));
    days
}

fn paint(
    findings: &Findings,
    pool: &PoolShown,
    days: &[OnDay<'_>],
    shown: &Shown,
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let unit = setting.units.volume();
    let levels = marked(findings, shown, setting.units);
    let ticks = AmountTicks::up_to(unit.of(pool.capacity_hm3), STEPS);
    let left = MARGIN_PX + scales::width(&ticks) + 14.0;
    let others = [CAPACITY, RULE_NAME, DEAD].map(|name| NAME.width(name));
    let names = WIDTH_PX - MARGIN_PX - others.into_iter().fold(widest(&levels), f64::max);
    let right = names - TO_NAME_PX - 4.0;
    let top = MARGIN_PX + heading.height() + 46.0;
    let bottom = top + PLOT_PX;
    let below = bottom + 46.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let year = 1.0..COMMON_DATES as f64 + 1.0;
    let plot = sheet.plot((left, top), (right, bottom), year.clone(), 0.0..ticks.top())?;
    let place = |day: f64, hm3: f64| plot.at(day, unit.of(hm3));
    let calendar = Calendar::exactly(year, setting.water_year_starts);

    heading.write(&sheet, MARGIN_PX)?;
    let spread = |high: bool| -> Vec<Px> {
        let of = |on: &OnDay<'_>| {
            let spread = on.found.precipitation_spread?;
            Some(place(on.day, if high { spread.q95 } else { spread.q05 }))
        };
        days.iter().filter_map(of).collect()
    };
    sheet.group("spread", || band(&sheet, &spread(false), &spread(true)))?;
    sheet.group("axis", || {
        scales::upwards(&sheet, &plot, &ticks, [left, right])?;
        scales::amounts_upwards(&sheet, &plot, &ticks, left)?;
        sheet.write(&words.axis, (MARGIN_PX, top - 18.0), NAME, HPos::Left, VPos::Bottom)?;
        scales::months(&sheet, &plot, &calendar, bottom)
    })?;
    let mut ends = Vec::new();
    let mut end = |at: Px, name: &str| ends.push(EndName { end: at, name: name.to_owned(), marking: None });
    sheet.group("limits", || {
        for (name, hm3) in [(CAPACITY, pool.capacity_hm3), (DEAD, pool.dead_hm3)] {
            if hm3 > 0.0 {
                let across = [place(1.0, hm3), place(COMMON_DATES as f64 + 1.0, hm3)];
                sheet.line(&across, LIMIT)?;
                end(across[1], name);
            }
        }
        let rule: Vec<Px> =
            pool.not_above_hm3.iter().zip(1..).map(|(hm3, day)| place(f64::from(day), *hm3)).collect();
        if let Some(last) = rule.last() {
            sheet.line(&thinned(&rule, TOLERANCE_PX), RULE)?;
            end(*last, RULE_NAME);
        }
        Ok(())
    })?;
    for level in levels {
        let of = |on: &OnDay<'_>| Some(place(on.day, on.found.levels.get(level.at)?.periods.q50.value()?));
        let places: Vec<Px> = days.iter().filter_map(of).collect();
        sheet.group("level", || line(&sheet, &places, level.marking))?;
        ends.extend(places.last().map(|end| EndName {
            end: *end,
            name: level.name,
            marking: Some(level.marking),
        }));
    }
    sheet.group("levels", || names_at_ends(&sheet, ends, [top, bottom], names))?;
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}
