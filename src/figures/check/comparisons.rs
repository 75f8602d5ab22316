//! The figure of a site with observed snow, for sites of every kind.

use super::super::{Setting, Svg, of_sites};
use super::{assert_texts_apart, texts};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::fit::{Bias, ComparedYear, Comparison, DateError, DayPair, SurveyBias, SurveyPair};
use crate::observed::{Counts, Kind};
use crate::season::Outcome;
use crate::units::UnitSystem;

/// A made-up site: SWE rises to `peak_mm` in the year's middle and is gone after it; the model has a tenth less.
#[derive(Clone, Copy)]
pub(super) struct Made {
    pub site: &'static str,
    pub kind: Kind,
    pub years: i32,
    pub peak_mm: f64,
    pub bias_pct: Option<f64>,
}

pub(super) const PLAIN: Made =
    Made { site: "Heron Meadow", kind: Kind::Pillow, years: 24, peak_mm: 500.0, bias_pct: Some(-10.0) };

impl Made {
    pub(super) fn comparison(self) -> Comparison {
        let starts = WaterYearStart(MonthDay::new(10, 1).unwrap());
        let is_read = |day: usize| match self.kind {
            Kind::Pillow => day != 40 && !(100..110).contains(&day),
            Kind::Course => [93, 124, 152, 182].contains(&day),
        };
        let swe_mm = |day: usize| self.peak_mm * (1.0 - (day as f64 / 120.0 - 1.4).abs()).max(0.0);
        let pair = |day: usize| DayPair {
            observed_mm: is_read(day).then(|| swe_mm(day)),
            modelled_mm: 0.9 * swe_mm(day),
        };
        let by_year = (2001..2001 + self.years).map(|water_year| {
            let first = starts.first_day(water_year);
            let survey = SurveyPair { date: first, observed_mm: self.peak_mm, modelled_mm: self.peak_mm };
            ComparedYear {
                water_year,
                first,
                readings: 300,
                is_whole: self.kind == Kind::Pillow,
                observed_peak_mm: None,
                modelled_peak_mm: None,
                observed_peak_day: Outcome::None,
                modelled_peak_day: Outcome::None,
                surveys: vec![Some(survey)],
                observed_melt_out_day: Outcome::None,
                modelled_melt_out_day: Outcome::None,
                nash_sutcliffe: Some(f64::from(2003 - water_year)),
                days: (0..starts.days_in(water_year)).map(pair).collect(),
            }
        });
        let bias =
            Bias { years: 3, observed_mm: self.peak_mm, modelled_mm: self.peak_mm, bias_pct: self.bias_pct };
        let is_pillow = self.kind == Kind::Pillow;
        Comparison {
            site: self.site.to_owned(),
            elevation_m: 2290.0,
            kind: self.kind,
            file: Counts {
                readings: 1,
                first: starts.first_day(2001),
                last: starts.first_day(2002),
                lines_without_reading: 0,
                impossible_readings: 0,
            },
            readings_compared: 8706,
            nash_sutcliffe: Some(0.876),
            readings_with_snow: 4000,
            kling_gupta: None,
            peak: is_pillow.then_some(bias),
            surveys: vec![SurveyBias { survey: MonthDay::new(4, 1).unwrap(), bias: Some(bias) }],
            melt_out: is_pillow.then_some(DateError { years: 3, mean_days: -11.2, mean_size_days: 12.0 }),
            by_year: by_year.collect(),
        }
    }

    fn draw(self) -> Svg {
        self.draw_in(UnitSystem::Metric)
    }

    fn draw_in(self, units: UnitSystem) -> Svg {
        draw(&[self.comparison()], units).remove(0).1
    }
}

fn draw(comparisons: &[Comparison], units: UnitSystem) -> Vec<(String, Svg)> {
    let water_year_starts = WaterYearStart(MonthDay::new(10, 1).unwrap());
    of_sites(comparisons, &Setting { study_title: "Alder Fork", units, water_year_starts, is_fitted: false })
}

#[test]
fn text_lies_inside_and_apart_for_every_site() {
    let long = "The snow course at the upper end of Heron Meadow below the pass to the other fork";
    for made in [
        PLAIN,
        Made { years: 1, ..PLAIN },
        Made { years: 2, ..PLAIN },
        Made { years: 3, ..PLAIN },
        Made { years: 7, ..PLAIN },
        Made { years: 60, ..PLAIN },
        Made { kind: Kind::Course, ..PLAIN },
        Made { site: long, peak_mm: 11_000.0, bias_pct: Some(1234.5), ..PLAIN },
        Made { peak_mm: 0.3, bias_pct: None, ..PLAIN },
        Made { peak_mm: 0.0, bias_pct: None, ..PLAIN },
    ] {
        let svg = made.draw();
        assert_texts_apart(made.site, &svg.text);
        assert_texts_apart(made.site, &made.draw_in(UnitSystem::Us).text);
        let drawn = svg.text.split("</desc>").nth(1).unwrap();
        assert!(["NaN", "inf", "\"-0\""].iter().all(|nonsense| !drawn.contains(nonsense)));
        assert_eq!(svg, made.draw());
    }
}

#[test]
fn titles_turn_with_the_bias() {
    let title = |made: Made| made.draw().title;
    assert_eq!(
        title(PLAIN),
        "At Heron Meadow, modelled peak SWE is 10 % below the observed and melt-out comes 11 days earlier in the mean; NSE 0.88"
    );
    let high = Made { bias_pct: Some(4.2), kind: Kind::Course, ..PLAIN };
    assert_eq!(title(high), "At Heron Meadow, modelled 1 April SWE is 4.2 % above the observed; NSE 0.88");
    let same = Made { bias_pct: Some(0.01), kind: Kind::Course, ..PLAIN };
    let nothing = Made { bias_pct: None, peak_mm: 5.08, kind: Kind::Course, ..PLAIN };
    assert_eq!(
        nothing.draw_in(UnitSystem::Us).title,
        "At Heron Meadow, modelled 1 April SWE is 0.20 in where 0.20 in were observed; NSE 0.88"
    );
    assert_eq!(title(same), "At Heron Meadow, modelled 1 April SWE is as high as the observed; NSE 0.88");
}

#[test]
fn a_panel_a_year_and_of_very_many_the_last() {
    let years = |made: Made| {
        let said = texts(&made.draw().text).into_iter().map(|(_, words)| words);
        said.filter(|words| words.len() == 4 && words.starts_with("20")).collect::<Vec<_>>()
    };
    assert_eq!(years(Made { years: 3, ..PLAIN }), ["2001", "2002", "2003"]);
    let many = Made { years: 45, ..PLAIN };
    assert_eq!((years(many).len(), years(many)[0].as_str()), (40, "2006"));
    assert!(many.draw().caption.contains("the last 40 of 45 water years"));
}

#[test]
fn sites_have_figures_of_their_own_and_none_without_a_reading() {
    let bare = Comparison { by_year: Vec::new(), ..PLAIN.comparison() };
    let course = Made { kind: Kind::Course, years: 4, ..PLAIN };
    let drawn = draw(&[PLAIN.comparison(), bare, course.comparison()], UnitSystem::Metric);
    let slugs: Vec<&str> = drawn.iter().map(|(slug, _)| slug.as_str()).collect();
    assert_eq!(slugs, ["observed-swe-1", "observed-swe-3"]);
    let surveys = drawn[1].1.text.matches("<circle").count();
    assert_eq!(surveys, 4 * 4 + 1, "a dot a survey, and one in the key");
}
