//! The figure of the generator sheet, for sheets of every kind.

use super::super::{Setting, Svg, generator_sheet};
use super::{assert_texts_apart, texts};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::findings::{Findings, GeneratorSheet, SheetLine, SheetQuestions, Subject, Verdict};
use crate::units::UnitSystem;
use crate::weather::{Series, YearSpan};
use std::sync::LazyLock;

/// A made-up sheet: every line of it, from five years of made-up weather, as `line` changes it.
#[derive(Clone, Copy)]
pub struct Made {
    /// The month with which its water years start.
    pub month: u32,
    pub survey: [u32; 2],
    pub realizations: usize,
    /// What becomes of the line with a number.
    pub line: fn(usize, SheetLine) -> SheetLine,
}

/// Every ninth line outside, to either side.
const PLAIN: Made = Made {
    month: 10,
    survey: [4, 1],
    realizations: 20,
    line: |at, line| match at % 18 {
        7 => moved(line, Verdict::Below),
        16 => moved(line, Verdict::Above),
        _ => moved(line, Verdict::Within),
    },
};

/// The line with the record's number moved to where it gets a verdict; of a line without a range nothing.
fn moved(line: SheetLine, verdict: Verdict) -> SheetLine {
    let Some(range) = line.range else { return line };
    let record = match verdict {
        Verdict::Within => 0.3 * range.q05 + 0.7 * range.q95,
        Verdict::Below => range.q05 - 1.0,
        Verdict::Above => range.q95 + 1.0,
    };
    SheetLine { record: Some(record), verdict: Some(verdict), ..line }
}

/// The plain sheet, made once.
pub static PLAIN_SHEET: LazyLock<GeneratorSheet> = LazyLock::new(|| PLAIN.sheet());

impl Made {
    fn sheet(&self) -> GeneratorSheet {
        let day = |month, day| MonthDay::new(month, day).unwrap();
        let (starts, survey) = (WaterYearStart(day(self.month, 1)), day(self.survey[0], self.survey[1]));
        let questions = SheetQuestions::new(0.3, starts, survey);
        let sample = |salt: usize| {
            let mut weather = Series::default();
            for at in 0..5 {
                let first = starts.first_day(2002);
                let start = weather.mean_c.len();
                weather.years.push(YearSpan { water_year: 2002, first, start, days: 365, follows: at > 0 });
                for day in 0..365 {
                    let number = ((salt * 7 + at * 365 + day) * 7919 % 401) as f64 / 401.0;
                    weather.mean_c.push(20.0 * number - 10.0);
                    weather.half_range_c.push(4.0 + number);
                    weather.precipitation_mm.push((30.0 * number - 20.0).max(0.0));
                    weather.month.push(0);
                    weather.day_of_year.push(1);
                }
            }
            let swe_mm: Vec<f64> = (0..5).map(|year| ((salt + year) * 7919 % 401) as f64).collect();
            questions.sample(&weather, &swe_mm)
        };
        let realizations: Vec<_> = (1..=self.realizations).map(sample).collect();
        let mut sheet = GeneratorSheet::of(&questions, &sample(0), &realizations);
        let lines = sheet.statistics.iter_mut().flat_map(|of| &mut of.lines);
        lines.enumerate().for_each(|(at, line)| *line = (self.line)(at, *line));
        let lines = || sheet.statistics.iter().flat_map(|of| &of.lines);
        let judged = lines().filter(|line| line.verdict.is_some()).count();
        let outside = lines().filter(|line| line.is_outside()).count();
        GeneratorSheet { lines_judged: judged, lines_outside: outside, ..sheet }
    }

    fn draw(&self, units: UnitSystem) -> Svg {
        self.draw_of(self.sheet(), units)
    }

    fn draw_of(&self, sheet: GeneratorSheet, units: UnitSystem) -> Svg {
        let findings = Findings { generator: Some(sheet), ..super::studies::PLAIN.findings() };
        let water_year_starts = WaterYearStart(MonthDay::new(self.month, 1).unwrap());
        let setting = Setting { study_title: "Alder Fork", units, water_year_starts, is_fitted: false };
        (generator_sheet::FIGURE.draw)(&findings, &setting).unwrap()
    }
}

fn within(_: usize, line: SheetLine) -> SheetLine {
    moved(line, Verdict::Within)
}

fn sheets() -> [(&'static str, Made); 7] {
    let none = |_, line| SheetLine { record: None, verdict: None, ..line };
    let no_width = |_, line: SheetLine| {
        let middle = line.range.map(|range| crate::findings::RealizationRange {
            q05: range.q50,
            q95: range.q50,
            ..range
        });
        SheetLine { range: middle, record: middle.map(|range| range.q50), ..line }
    };
    [
        ("plain", PLAIN),
        ("all within", Made { line: within, ..PLAIN }),
        ("all below", Made { line: |_, line| moved(line, Verdict::Below), ..PLAIN }),
        ("no numbers", Made { line: none, ..PLAIN }),
        ("ranges without width", Made { line: no_width, ..PLAIN }),
        ("too few realizations", Made { realizations: 3, line: |_, line| line, ..PLAIN }),
        ("southern, without a cool season", Made { month: 4, survey: [4, 1], ..PLAIN }),
    ]
}

#[test]
fn text_lies_inside_and_apart() {
    for (name, made) in sheets() {
        let sheet = made.sheet();
        for units in [UnitSystem::Metric, UnitSystem::Us] {
            let svg = made.draw_of(sheet.clone(), units);
            assert_texts_apart(name, &svg.text);
            assert!(!svg.text.contains("NaN") && !svg.text.contains("inf"), "{name}");
        }
    }
}

/// A triangle a line outside, a dot a line within, a dash a line without a number; and the row says how many are outside.
#[test]
fn every_line_has_its_mark() {
    for (name, made) in sheets() {
        let sheet = made.sheet();
        let svg = made.draw_of(sheet.clone(), UnitSystem::Metric);
        let drawn = |element: &str| svg.text.matches(element).count();
        assert_eq!(drawn("<polygon"), sheet.lines_outside, "{name}");
        assert_eq!(drawn("<circle"), sheet.lines_judged - sheet.lines_outside, "{name}");
        let said = texts(&svg.text);
        let counts = said.iter().filter_map(|(_, words)| {
            let (count, way) = words.split_once(' ')?;
            ["below", "above", "outside"].contains(&way).then(|| count.parse::<usize>().unwrap())
        });
        assert_eq!(counts.sum::<usize>(), sheet.lines_outside, "{name}");
    }
}

#[test]
fn the_title_turns_with_the_snow() {
    let title = |line| Made { line, ..PLAIN }.draw(UnitSystem::Metric).title;
    let like = title(within);
    assert!(
        like.starts_with("The weather that was made brings 1 April SWE like the record's; no line of "),
        "{like}"
    );
    // The first line is the mean of the survey's snow, the second its standard deviation.
    let unlike = title(|at, line| {
        moved(line, [Verdict::Below, Verdict::Above].get(at).copied().unwrap_or(Verdict::Within))
    });
    assert!(
        unlike.starts_with(
            "The record's 1 April SWE is not that of the weather that was made (mean below, standard deviation above); 2 of "
        ),
        "{unlike}"
    );
    let few = Made { realizations: 3, line: |_, line| line, ..PLAIN }.draw(UnitSystem::Metric).title;
    assert!(few.starts_with("3 realizations cannot tell"), "{few}");
    assert_eq!(PLAIN_SHEET.about(Subject::SurveySwe).count(), 5);
}
