//! What shortage costs in spill, or in days above the flood-space rule, under one rule and another.

mod places;
mod words;

use super::axes::AmountTicks;
use super::level_lines::{Marked, line, marked, row};
use super::marks::marker;
use super::page::Paragraphs;
use super::rule_change_words::changed;
use super::scales;
use super::sheet::{Drawn, HPos, Px, Sheet, VPos};
use super::shown::Shown;
use super::theme::{LABEL, MARGIN_PX, NAME, WIDTH_PX};
use super::{Figure, Part, Setting, Svg};
use crate::findings::{Findings, Operations};
use crate::operation::Change;
use crate::units::UnitSystem;
use places::{Obstacles, numbered};
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "shortage-against-spill",
    table: "rule-changes",
    question: "What does less shortage cost in water that spills, or in space kept for floods?",
    part: Part::RuleChanges,
    draw,
};

const PLOT_PX: f64 = 300.0;
const STEPS: usize = 5;
const SHORTAGE: &str = "shortage_hm3";
const SPILL: &str = "spill_hm3";
const ENCROACHED: &str = "flood_space_encroached_days";
/// A median that is less is nothing, hm3.
const LEAST_HM3: f64 = 0.001;

/// What lies to the right.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Across {
    /// Spill, hm3 a year.
    Spill,
    /// Days a year above the flood-space rule.
    Encroached,
}

impl Across {
    /// Spill, unless fewer than half of all rules and levels spill anything.
    fn of(operations: &Operations, levels: &[usize]) -> Self {
        let spills: Vec<bool> = operations
            .rule_changes
            .iter()
            .flat_map(|of| levels.iter().filter_map(|at| changed(of, SPILL, *at)?.periods.q50.value()))
            .map(|hm3| hm3 > LEAST_HM3)
            .collect();
        let count = spills.iter().filter(|spills| **spills).count();
        if 2 * count >= spills.len() { Self::Spill } else { Self::Encroached }
    }

    fn measure(self) -> &'static str {
        match self {
            Self::Spill => SPILL,
            Self::Encroached => ENCROACHED,
        }
    }

    /// Into the reader's unit.
    fn of_reader(self, value: f64, units: UnitSystem) -> f64 {
        match self {
            Self::Spill => units.volume().of(value),
            Self::Encroached => value,
        }
    }
}

/// What one set of rules comes to at one level, in the reader's units: to the right, and upwards.
struct Point {
    /// The rules' number in the list, from 1.
    number: usize,
    change: Change,
    at: [f64; 2],
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let operations = findings.operations.as_ref()?;
    if operations.rule_changes.len() < 2 {
        return None;
    }
    let shown = Shown::of(findings);
    let across = Across::of(operations, &shown.all());
    let words = Words::of(findings, operations, across, &shown, setting.units)?;
    let text = paint(findings, operations, across, &shown, setting, &words).ok()?;
    let alt = format!("{}. {}", words.title, words.kind_of_drawing);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

/// All sets of rules at a level.
fn points(operations: &Operations, across: Across, at: usize, units: UnitSystem) -> Vec<Point> {
    let of = |(number, of): (usize, &crate::findings::RuleChange)| {
        let median = |name: &str| changed(of, name, at)?.periods.q50.value();
        let right = across.of_reader(median(across.measure())?, units);
        let up = units.volume().of(median(SHORTAGE)?);
        Some(Point { number, change: of.change, at: [right, up] })
    };
    (1..).zip(&operations.rule_changes).filter_map(of).collect()
}

/// The rules as stated and those that move the refill, from the latest to the earliest: they are joined.
fn joined(points: &[Point]) -> Vec<&Point> {
    let days = |point: &Point| match point.change {
        Change::AsStated => Some(0),
        Change::RefillMovedDays(days) => Some(days),
        _ => None,
    };
    let mut joined: Vec<(i32, &Point)> =
        points.iter().filter_map(|point| Some((days(point)?, point))).collect();
    joined.sort_by_key(|(days, _)| -days);
    joined.into_iter().map(|(_, point)| point).collect()
}

fn paint(
    findings: &Findings,
    operations: &Operations,
    across: Across,
    shown: &Shown,
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let levels = marked(findings, shown, setting.units);
    let of_levels: Vec<Vec<Point>> =
        levels.iter().map(|level| points(operations, across, level.at, setting.units)).collect();
    let highest = |axis: usize| of_levels.iter().flatten().map(|point| point.at[axis]).fold(0.0, f64::max);
    let [right_ticks, up_ticks] = [0, 1].map(|axis| AmountTicks::up_to(highest(axis), STEPS));
    let left = MARGIN_PX + scales::width(&up_ticks) + 14.0;
    let right = WIDTH_PX - MARGIN_PX;
    let names = MARGIN_PX + heading.height() + 26.0;
    let top = names + 46.0;
    let bottom = top + PLOT_PX;
    let below = bottom + 58.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    // Marks at 0 keep clear of the axis.
    let inner = [left + 12.0, right - 12.0];
    let plot =
        sheet.plot((inner[0], top), (inner[1], bottom), 0.0..right_ticks.top(), 0.0..up_ticks.top())?;
    let place = |point: &Point| -> Px { plot.at(point.at[0], point.at[1]) };

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("axis", || {
        scales::upwards(&sheet, &plot, &up_ticks, [left, right])?;
        scales::amounts_upwards(&sheet, &plot, &up_ticks, left)?;
        scales::rightwards(&sheet, &plot, &right_ticks, bottom)?;
        sheet.write(&words.up, (MARGIN_PX, top - 18.0), NAME, HPos::Left, VPos::Bottom)?;
        let across = (inner[1], bottom + 10.0 + 1.4 * LABEL.leading());
        sheet.write(&words.right, across, NAME, HPos::Right, VPos::Top)
    })?;
    let mut obstacles = Obstacles::new([left + 2.0, top - 10.0, right, bottom - 2.0]);
    let lines: Vec<Vec<Px>> =
        of_levels.iter().map(|points| joined(points).into_iter().map(place).collect()).collect();
    of_levels.iter().flatten().for_each(|point| obstacles.add_mark(place(point)));
    lines.iter().for_each(|line| obstacles.add_line(line));
    for ((level, points), joined) in levels.iter().zip(&of_levels).zip(&lines) {
        sheet.group("level", || {
            line(&sheet, joined, level.marking)?;
            points.iter().try_for_each(|point| marker(&sheet, place(point), level.marking))
        })?;
    }
    // A level is named where its line ends; where one of them has no room there, all are named above.
    let mut place_name = |(level, line): (&Marked, &Vec<Px>)| {
        let ends = [line.last(), line.first()].into_iter().flatten();
        ends.copied().find_map(|end| obstacles.beside(&level.name, NAME, end))
    };
    let beside: Option<Vec<Px>> = levels.iter().zip(&lines).map(&mut place_name).collect();
    sheet.group("levels", || match &beside {
        Some(places) => levels
            .iter()
            .zip(places)
            .try_for_each(|(level, at)| sheet.write(&level.name, *at, NAME, HPos::Center, VPos::Center)),
        None => row(&sheet, &levels, (MARGIN_PX, names)),
    })?;
    let numbered_levels =
        levels.iter().zip(&of_levels).filter(|(level, _)| words.numbered.contains(&level.at));
    for (_, points) in numbered_levels {
        let own: Vec<(usize, Px)> = points.iter().map(|point| (point.number, place(point))).collect();
        for (text, at) in numbered(&own) {
            if let Some(at) = obstacles.beside(&text, LABEL, at) {
                sheet.group("rule", || sheet.write(&text, at, LABEL, HPos::Center, VPos::Center))?;
            }
        }
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}
