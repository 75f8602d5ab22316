//! Expected values are worked by hand; 1e-9 is rounding.

use super::*;
use crate::baseline::BaselineChoice;
use crate::basin::Ground;
use ndarray::{Array2, Array3, array};

/// Bands of 30 and 10 km2.
fn bands() -> [Band; 2] {
    let band = |lower_m, area_km2| Band {
        lower_m,
        upper_m: lower_m + 500.0,
        area_km2,
        elevation_m: lower_m + 250.0,
        ground: Ground::default(),
    };
    [band(1500.0, 30.0), band(2000.0, 10.0)]
}

/// A water year with the SWE of both bands on the survey date at the reference; half of it at the second level; on one
/// date of the year the bands hold `high_mm`.
fn year(water_year: i32, swe_mm: [f64; 2], high_mm: [f64; 2]) -> RecordYear {
    RecordYear {
        water_year,
        values: Vec::new(),
        survey_swe_mm: Array3::from_shape_fn((1, 2, 2), |(_, level, band)| swe_mm[band] / (level + 1) as f64),
        reference_swe_mm: array![swe_mm, high_mm],
    }
}

/// The baseline years 2001 to 2003 and the year after them.
fn four_years() -> Vec<RecordYear> {
    let peak = [300.0, 700.0];
    vec![
        year(2001, [100.0, 600.0], peak),
        year(2002, [200.0, 500.0], peak),
        year(2003, [300.0, 400.0], peak),
        year(2004, [40.0, 100.0], peak),
    ]
}

fn found(years: &[RecordYear], bands: &[Band]) -> PercentOfMedian {
    let baseline = BaselineYears { first: 2001, last: 2003, in_use: 3, choice: BaselineChoice::Stated };
    let surveys = [MonthDay::new(4, 1).unwrap()];
    let levels_c = [0.0, 2.0];
    let questions = NormalQuestions {
        years,
        baseline: &baseline,
        bands,
        levels_c: &levels_c,
        reference: 0,
        surveys: &surveys,
    };
    percent_of_median(&questions).remove(0)
}

fn near(found: &[Option<f64>], expected: &[f64]) {
    assert_eq!(found.len(), expected.len());
    for (found, expected) in found.iter().zip(expected) {
        assert!((found.unwrap() - expected).abs() < 1e-9, "{found:?} for {expected}");
    }
}

/// The bands' medians are 200 and 500 mm, so the basin's normal is (30*200 + 10*500)/40 = 275 mm. 2001 has
/// (30*100 + 10*600)/40 = 225 mm, 81.8 % of it, whereas the mean of its bands' percentages, 50 and 120, is 85, and 67.5
/// weighted by area. 2004 is held against the normal and is no part of it.
#[test]
fn a_basins_percentage_is_a_ratio_of_sums() {
    let found = found(&four_years(), &bands());
    assert_eq!(
        (found.basin.median_mm, found.bands[0].median_mm, found.bands[1].median_mm),
        (275.0, 200.0, 500.0)
    );
    let [reference, warmer] = [&found.levels[0], &found.levels[1]];
    near(&reference.percent, &[9000.0 / 110.0, 100.0, 13_000.0 / 110.0, 20.0]);
    assert_eq!(reference.percent, reference.percent_of_moved, "the reference's own normal is the fixed one");
    near(&warmer.percent, &[4500.0 / 110.0, 50.0, 6500.0 / 110.0, 10.0]);
    assert_eq!(warmer.moved_median_mm, 137.5);
    near(&warmer.percent_of_moved, &[9000.0 / 110.0, 100.0, 13_000.0 / 110.0, 20.0]);
    near(&[warmer.median_percent, warmer.median_percent_of_moved], &[50.0, 100.0]);
    assert_eq!(reference.baseline_years_by_class, [0, 0, 3, 0, 0]);
    assert_eq!(warmer.baseline_years_by_class, [3, 0, 0, 0, 0]);
    assert!(warmer.percent_of_first_survey.is_none(), "there is one survey date");
}

/// Of one band, the median percentage of a normal of the same years is 100 whatever the level: a quantile of type 8 scales
/// with its sample. Of several bands it need not be, since the median years of the bands differ.
#[test]
fn a_moved_normal_makes_the_median_year_normal() {
    let swe_mm = [37.0, 911.0, 0.0, 444.4, 290.1, 13.7];
    let years: Vec<RecordYear> =
        (2001..).zip(swe_mm).map(|(name, swe_mm)| year(name, [swe_mm, 0.0], [swe_mm; 2])).collect();
    let baseline = BaselineYears { first: 2001, last: 2006, in_use: 6, choice: BaselineChoice::AllInUse };
    let questions = NormalQuestions {
        years: &years,
        baseline: &baseline,
        bands: &bands()[..1],
        levels_c: &[0.0, 2.0],
        reference: 0,
        surveys: &[MonthDay::new(4, 1).unwrap()],
    };
    let found = percent_of_median(&questions).remove(0);
    near(&[found.levels[1].median_percent_of_moved, found.levels[1].median_percent], &[100.0, 50.0]);
    let uneven = four_years().into_iter().take(2).collect::<Vec<_>>();
    // With 300 and 700 mm as the third year the bands' medians are 200 and 600 mm, together 12 000/40; the years have 9000,
    // 11 000 and 16 000/40, of which the middle one is 91.7 %.
    let three = [uneven, vec![year(2003, [300.0, 700.0], [0.0; 2])]].concat();
    near(&[self::found(&three, &bands()).levels[0].median_percent_of_moved], &[11_000.0 / 120.0]);
}

/// A median of 200 mm is under 10 % of 2001 mm and not of 2000 mm; the basin's 275 mm is not under 10 % of
/// (30*2001 + 10*700)/40 = 1675.75 mm.
#[test]
fn percentages_of_a_small_median_are_flagged() {
    let with_peak = |low_mm: f64| -> Vec<RecordYear> {
        let years = four_years().into_iter();
        years.map(|year| RecordYear { reference_swe_mm: array![[low_mm, 700.0]], ..year }).collect()
    };
    let flagged = found(&with_peak(2001.0), &bands());
    assert_eq!(
        [flagged.bands[0], flagged.bands[1], flagged.basin].map(|median| median.is_unstable),
        [true, false, false]
    );
    assert!((flagged.basin.highest_median_mm - 1675.75).abs() < 1e-9);
    assert!(!found(&with_peak(2000.0), &bands()).bands[0].is_unstable);
    // 275 mm are under 10 % of (30*3500 + 10*700)/40 = 2800 mm.
    assert!(found(&with_peak(3500.0), &bands()).basin.is_unstable);
}

#[test]
fn there_is_no_percentage_of_nothing() {
    let bare = (2001..2004).map(|name| year(name, [0.0, 0.0], [0.0, 0.0])).collect::<Vec<_>>();
    let found = found(&bare, &bands());
    let level = &found.levels[1];
    assert_eq!(level.percent, [None, None, None]);
    assert_eq!((level.median_percent, level.median_percent_of_moved), (None, None));
    assert_eq!(level.baseline_years_by_class, [0; 5]);
    assert!(!found.basin.is_unstable);
}

/// Years of 60, 80, 120 and 140 % of a median of 100 mm: a limit belongs to the class above it.
#[test]
fn classes_begin_at_their_limits() {
    let swe_mm = [59.0, 60.0, 80.0, 100.0, 120.0, 140.0, 139.0];
    let years: Vec<RecordYear> =
        (2001..).zip(swe_mm).map(|(name, swe_mm)| year(name, [swe_mm, 0.0], [0.0; 2])).collect();
    let questions = NormalQuestions {
        years: &years,
        baseline: &BaselineYears { first: 2001, last: 2007, in_use: 7, choice: BaselineChoice::Stated },
        bands: &bands()[..1],
        levels_c: &[0.0, 2.0],
        reference: 0,
        surveys: &[MonthDay::new(4, 1).unwrap()],
    };
    assert_eq!(percent_of_median(&questions)[0].levels[0].baseline_years_by_class, [1, 1, 2, 2, 1]);
}

/// A second survey date with half the snow of the first: 100 % of its own median and 50 % of the first date's.
#[test]
fn later_dates_are_held_against_the_first_too() {
    let years: Vec<RecordYear> = four_years()
        .into_iter()
        .map(|year| RecordYear {
            survey_swe_mm: Array3::from_shape_fn((2, 2, 2), |(survey, level, band)| {
                year.survey_swe_mm[[0, level, band]] / (survey + 1) as f64
            }),
            reference_swe_mm: Array2::zeros((1, 2)),
            ..year
        })
        .collect();
    let questions = NormalQuestions {
        years: &years,
        baseline: &BaselineYears { first: 2001, last: 2003, in_use: 3, choice: BaselineChoice::Stated },
        bands: &bands(),
        levels_c: &[0.0, 2.0],
        reference: 0,
        surveys: &[MonthDay::new(4, 1).unwrap(), MonthDay::new(5, 1).unwrap()],
    };
    let found = percent_of_median(&questions);
    assert!(found[0].levels[0].percent_of_first_survey.is_none());
    let may = &found[1].levels[0];
    near(&may.percent[1..2], &[100.0]);
    near(&may.percent_of_first_survey.as_ref().unwrap()[1..2], &[50.0]);
}
