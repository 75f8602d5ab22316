//! A real record, and weather drawn like it: the only check against a climate that nobody made up.

use std::collections::BTreeMap;
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::perturb::{Generator, GeneratorChoice, MarkovGamma, Recipe};
use thawline::table::{DateColumn, Format};
use thawline::units::{DepthUnit, TemperatureUnit};
use thawline::weather::{
    Columns, Gauge, Limits, PrecipitationColumn, Series, TemperatureColumn, TemperatureColumns,
};

const WET_ABOVE_MM: f64 = 0.25;
const REALIZATIONS: u32 = 200;

fn day(month: u32, day: u32) -> MonthDay {
    MonthDay::new(month, day).unwrap()
}

/// The four calendar years of the record, 2012 to 2015.
fn record() -> Series {
    let temperature =
        |column: &str| TemperatureColumn { column: column.to_owned(), unit: TemperatureUnit::Celsius };
    let columns = Columns {
        date: DateColumn { columns: vec!["date".to_owned()], format: "%Y-%m-%d".to_owned() },
        temperature: TemperatureColumns::Extremes {
            tmin: temperature("temp_min"),
            tmax: temperature("temp_max"),
        },
        precipitation: PrecipitationColumn {
            column: "precipitation".to_owned(),
            unit: DepthUnit::Millimetre,
            gauge: Gauge::Daily,
            trace: Vec::new(),
        },
        humidity: None,
        format: Format::default(),
    };
    let text = include_str!("../fixtures/seattle-2012-2015.csv");
    let january = WaterYearStart(day(1, 1));
    let read = thawline::weather::read("seattle.csv", text, &columns, january, day(4, 1), &Limits::default());
    read.unwrap().series
}

/// What each month is like: mean precipitation a year in mm, share of days that are wet, means of the daily minimum and
/// maximum in degC, and the amount that 95 % of wet days stay below. By name and month.
fn months(series: &Series) -> BTreeMap<(&'static str, u8), f64> {
    let mut found = BTreeMap::new();
    for month in 0..12 {
        let days: Vec<usize> = (0..series.month.len()).filter(|day| series.month[*day] == month).collect();
        let mean =
            |of: &dyn Fn(usize) -> f64| days.iter().map(|day| of(*day)).sum::<f64>() / days.len() as f64;
        let mm = |day: usize| series.precipitation_mm[day];
        let mut wet: Vec<f64> = days.iter().map(|day| mm(*day)).filter(|mm| *mm > WET_ABOVE_MM).collect();
        wet.sort_by(f64::total_cmp);
        found.insert(("precipitation", month), mean(&mm));
        found.insert(("wet days", month), wet.len() as f64 / days.len() as f64);
        found.insert(("minimum", month), mean(&|day| series.mean_c[day] - series.half_range_c[day]));
        found.insert(("maximum", month), mean(&|day| series.mean_c[day] + series.half_range_c[day]));
        let place = (0.95 * wet.len() as f64) as usize;
        found.insert(("large days", month), wet.get(place).copied().unwrap_or(0.0));
    }
    found
}

/// Of the 60 lines that five measures of twelve months are, at most 15 % (nine) of the record's values lie outside the
/// range of 5 to 95 % of realizations as long as the record. A generator that is right would leave a tenth outside at most,
/// and fewer, since it is fitted to these values; the rest is what a test on one record of four years must allow.
#[test]
fn seattle() {
    let record = record();
    assert_eq!((record.years.len(), record.mean_c.len()), (4, 1461), "four whole years");
    let recipe = Recipe {
        choice: GeneratorChoice::MarkovGamma,
        seed: 1,
        wet_day_mm: WET_ABOVE_MM,
        water_year_starts: WaterYearStart(day(1, 1)),
        cool_season_ends: day(4, 1),
    };
    let generator = MarkovGamma::fit(&record, &recipe);
    let mut series = Series::default();
    let realizations: Vec<BTreeMap<_, f64>> = (0..REALIZATIONS)
        .map(|number| {
            generator.fill(number, record.years.len(), &mut series);
            months(&series)
        })
        .collect();
    let mut outside = Vec::new();
    let lines = months(&record);
    for (line, expected) in &lines {
        let mut values: Vec<f64> = realizations.iter().map(|of| of[line]).collect();
        values.sort_by(f64::total_cmp);
        let [low, high] = [0.05, 0.95].map(|share| values[(share * f64::from(REALIZATIONS)) as usize]);
        if !(low..=high).contains(expected) {
            outside.push(format!("{line:?}: {expected:.2} outside {low:.2} to {high:.2}"));
        }
    }
    assert_eq!(lines.len(), 60);
    assert!(outside.len() * 100 <= 15 * lines.len(), "{} lines: {outside:#?}", outside.len());
}
