//! The figures of the record, for records of every kind.

use super::super::{Setting, Svg, record_precipitation, record_years};
use super::{assert_texts_apart, texts};
use crate::baseline::BaselineYears;
use crate::basin::{Band, Ground};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::ensemble::RecordYear;
use crate::findings::{Findings, RecordFindings, RecordQuestions};
use crate::season::{Measures, SeasonSettings};
use crate::units::UnitSystem;
use crate::weather::{Series, SkippedYear, Why, YearSpan};
use ndarray::{Array2, Array3};
use std::ops::RangeInclusive;

/// A made-up record of one band.
#[derive(Clone)]
pub struct Made {
    pub years: RangeInclusive<i32>,
    /// The month with which its water years start.
    pub month: u32,
    pub survey: [u32; 2],
    /// Why a year is left out; it is used where there is no reason.
    pub left_out: fn(i32) -> Vec<Why>,
    /// SWE on the survey date, mm.
    pub swe_mm: fn(i32) -> f64,
    /// Precipitation of each day, mm.
    pub rain_mm: fn(i32) -> f64,
}

/// Forty northern years, two of them left out.
pub const PLAIN: Made = Made {
    years: 1985..=2024,
    month: 10,
    survey: [4, 1],
    left_out: |year| if year % 20 == 1 { vec![Why::MissingDays { days: 47 }] } else { Vec::new() },
    swe_mm: |year| 200.0 + f64::from(year * 7919 % 401),
    rain_mm: |year| 1.0 + f64::from(year * 7919 % 17) / 8.0,
};

impl Made {
    pub fn findings(&self, levels_c: &[f64], reference: usize) -> RecordFindings {
        let starts = WaterYearStart(MonthDay::new(self.month, 1).unwrap());
        let mut weather = Series::default();
        let (mut years, mut left_out) = (Vec::new(), Vec::new());
        for water_year in self.years.clone() {
            let why = (self.left_out)(water_year);
            if !why.is_empty() {
                left_out.push(SkippedYear { water_year, why });
                continue;
            }
            let (first, days) = (starts.first_day(water_year), starts.days_in(water_year));
            let start = weather.mean_c.len();
            weather.years.push(YearSpan { water_year, first, start, days, follows: false });
            weather.mean_c.resize(start + days, 0.0);
            weather.half_range_c.resize(start + days, 0.0);
            weather.precipitation_mm.resize(start + days, (self.rain_mm)(water_year));
            weather.month.resize(start + days, 0);
            weather.day_of_year.resize(start + days, 1);
            let swe_mm = (self.swe_mm)(water_year);
            years.push(RecordYear {
                water_year,
                values: vec![swe_mm],
                survey_swe_mm: Array3::from_elem((1, levels_c.len(), 1), swe_mm),
                reference_swe_mm: Array2::from_elem((365, 1), swe_mm),
            });
        }
        let survey = MonthDay::new(self.survey[0], self.survey[1]).unwrap();
        let season = SeasonSettings {
            water_year_starts: starts,
            survey_dates: vec![survey],
            volume_windows: Vec::new(),
            outflow_before: Vec::new(),
            melt_shares_before: Vec::new(),
            arrival_volume_hm3: None,
        };
        let measures = Measures::new(season.clone(), 1.0);
        let band = Band {
            lower_m: 2000.0,
            upper_m: 3000.0,
            area_km2: 40.0,
            elevation_m: 2500.0,
            ground: Ground::default(),
        };
        let questions = RecordQuestions {
            years: &years,
            left_out: &left_out,
            weather: &weather,
            baseline: &BaselineYears::of(None, &weather.years).unwrap(),
            measures: measures.list(),
            season: &season,
            bands: &[band],
            levels_c,
            reference,
        };
        RecordFindings::of(&questions).unwrap()
    }

    /// The years, and their precipitation.
    fn draw(&self, units: UnitSystem) -> [Svg; 2] {
        let findings =
            Findings { record: Some(self.findings(&[0.0, 1.0], 0)), ..super::studies::PLAIN.findings() };
        let water_year_starts = WaterYearStart(MonthDay::new(self.month, 1).unwrap());
        let setting = Setting { study_title: "Alder Fork", units, water_year_starts, is_fitted: false };
        [record_years::FIGURE, record_precipitation::FIGURE]
            .map(|figure| (figure.draw)(&findings, &setting).unwrap())
    }

    fn titles(&self) -> [String; 2] {
        self.draw(UnitSystem::Metric).map(|svg| svg.title)
    }
}

fn every_reason(year: i32) -> Vec<Why> {
    let from = chrono::NaiveDate::from_ymd_opt(year, 1, 11).unwrap();
    match year % 6 {
        0 => Vec::new(),
        1 => vec![Why::AsStated],
        2 => vec![Why::BeyondRecord { days: 92 }],
        3 => vec![Why::MissingDays { days: 47 }, Why::TemperatureGap { from, days: 47 }],
        4 => vec![Why::TemperatureGap { from, days: 31 }],
        _ => vec![Why::SeasonMean { season: "cool", mean_c: -20.0, median_c: -4.0 }],
    }
}

fn records() -> Vec<(&'static str, Made)> {
    vec![
        ("plain", PLAIN),
        ("one year", Made { years: 2001..=2001, left_out: |_| Vec::new(), ..PLAIN }),
        (
            "one of two years",
            Made {
                years: 2000..=2001,
                left_out: |year| if year == 2000 { every_reason(3) } else { vec![] },
                ..PLAIN
            },
        ),
        ("two years", Made { years: 2002..=2003, ..PLAIN }),
        ("seven years", Made { years: 2002..=2008, ..PLAIN }),
        ("a hundred years", Made { years: 1920..=2024, ..PLAIN }),
        ("all equal", Made { swe_mm: |_| 300.0, rain_mm: |_| 2.0, ..PLAIN }),
        ("nearly equal", Made { rain_mm: |year| 2.0 + f64::from(year) * 1e-6, ..PLAIN }),
        ("no snow", Made { swe_mm: |_| 0.0, ..PLAIN }),
        ("no rain", Made { rain_mm: |_| 0.0, swe_mm: |_| 0.0, ..PLAIN }),
        ("one dry year", Made { rain_mm: |year| if year == 1999 { 0.0 } else { 1.0 }, ..PLAIN }),
        (
            "huge",
            Made { swe_mm: |year| 9_000.0 + f64::from(year), rain_mm: |year| f64::from(year % 50), ..PLAIN },
        ),
        (
            "tiny",
            Made {
                swe_mm: |year| f64::from(year % 7) / 100.0,
                rain_mm: |year| f64::from(year % 7) / 1e4,
                ..PLAIN
            },
        ),
        ("southern", Made { month: 4, survey: [10, 1], ..PLAIN }),
        ("calendar years", Made { month: 1, survey: [4, 1], ..PLAIN }),
        ("no cool season", Made { survey: [10, 1], ..PLAIN }),
        ("a short season", Made { survey: [10, 3], ..PLAIN }),
        ("no years left out", Made { left_out: |_| Vec::new(), ..PLAIN }),
        ("many left out", Made { left_out: every_reason, ..PLAIN }),
        ("many of a hundred left out", Made { years: 1920..=2024, left_out: every_reason, ..PLAIN }),
    ]
}

#[test]
fn text_lies_inside_and_apart_for_every_record() {
    for (name, made) in records() {
        for units in [UnitSystem::Metric, UnitSystem::Us] {
            for svg in made.draw(units) {
                assert_texts_apart(name, &svg.text);
                let drawn = svg.text.split("</desc>").nth(1).unwrap();
                assert!(["NaN", "inf", "\"-0\""].iter().all(|nonsense| !drawn.contains(nonsense)), "{name}");
                assert!(units == UnitSystem::Metric || !svg.text.contains(" mm"), "{name}");
            }
            assert_eq!(made.draw(units), made.draw(units));
        }
    }
}

/// Sums by hand: 182 days from 1 October to 31 March, 183 with 29 February.
#[test]
fn titles_say_how_many_years_and_how_far_apart() {
    let [years, precipitation] = PLAIN.titles();
    assert_eq!(years, "38 of 40 water years are in use; 2 are left out, both for missing days");
    assert!(
        precipitation.starts_with("From 1 October to 1 April, precipitation lay between "),
        "{precipitation}"
    );
    let step = Made { rain_mm: |year| if year == 2003 { 3.0 } else { f64::from(1 + year % 2) }, ..PLAIN };
    assert!(
        step.titles()[1]
            .ends_with("182 mm (1986, the driest year) and 546 mm (2003, the wettest): 3.0 times as much"),
        "{}",
        step.titles()[1]
    );
    let [years, precipitation] =
        Made { years: 2001..=2001, left_out: |_| Vec::new(), rain_mm: |_| 2.0, ..PLAIN }.titles();
    assert_eq!(years, "The record's one water year is in use");
    assert_eq!(
        precipitation,
        "From 1 October to 1 April, 364 mm of precipitation came in the record's one year, 2001"
    );
    assert_eq!(
        Made { left_out: |_| Vec::new(), ..PLAIN }.titles()[0],
        "All 40 water years of the record are in use"
    );
    // Divided by six, 1985 to 2024 leave each remainder six times, and 5, 0, 1 and 2 once more; 0 is used, 3 and 4 have gaps.
    let many = Made { left_out: every_reason, ..PLAIN }.titles();
    assert_eq!(many[0], "7 of 40 water years are in use; 33 are left out, 12 of them for a temperature gap");
}

/// Every used year has a stem and a head, every year left out a cross a reason: two lines.
#[test]
fn every_year_has_its_mark() {
    let [svg, _] = PLAIN.draw(UnitSystem::Metric);
    let (_, years) = svg.text.split_once("class=\"years\"").unwrap();
    let (years, rows) = years.split_once("</g>").unwrap();
    // 30 baseline years less 2001: filled heads; the other nine hollow, of two circles.
    assert_eq!(years.matches("<circle").count(), 29 + 2 * 9);
    assert_eq!(rows.matches("left out for missing days").count(), 1);
    let said: Vec<String> = texts(&svg.text).into_iter().map(|(_, words)| words).collect();
    assert!(said.iter().any(|words| words == "baseline years 1991–2020: 29 in use"), "{said:?}");
}
