//! A water year of one column, written down day by day and not run: what its measures come to.

use super::case::Case;
use chrono::NaiveDate;
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::season::{Measures, SeasonSettings};
use thawline::snow::YearBlock;

const DAYS: usize = 365;

/// A year in which the stated amounts melt and leave the pack on the first days, and nothing on the others.
pub fn melt_dates(case: &Case) {
    let amounts: Vec<f64> = case.input("amounts_mm");
    let mut flux_mm = amounts.clone();
    flux_mm.resize(DAYS, 0.0);
    let mut left_mm: f64 = amounts.iter().sum();
    let mut swe_mm = vec![left_mm];
    for flux in &flux_mm {
        left_mm -= flux;
        swe_mm.push(left_mm);
    }
    let block = YearBlock { net_melt_mm: flux_mm.clone(), outflow_mm: flux_mm, ..still_year(swe_mm) };
    let before: Vec<MonthDay> =
        case.input_or_none::<String>("before").iter().map(|day| day_of(day)).collect();
    let settings = SeasonSettings {
        outflow_before: before.clone(),
        melt_shares_before: before,
        // Over 1 km2, 1 hm3 is 1000 mm.
        arrival_volume_hm3: case.input_or_none::<f64>("arrival_mm").map(|arrival_mm| arrival_mm / 1000.0),
        ..settings()
    };
    check(case, block, settings);
}

/// A year whose SWE runs straight between stated days, and is 0 after the last: 1 April, the peak, and how far apart.
pub fn survey_and_peak(case: &Case) {
    let days: Vec<usize> = case.input("days");
    let stated_mm: Vec<f64> = case.input("swe_mm");
    let mut swe_mm = vec![stated_mm[0]];
    for (days, swe) in days.windows(2).zip(stated_mm.windows(2)) {
        let count = days[1] - days[0];
        swe_mm.extend((1..=count).map(|day| swe[0] + (swe[1] - swe[0]) * day as f64 / count as f64));
    }
    swe_mm.resize(DAYS + 1, 0.0);
    let values =
        check(case, still_year(swe_mm), SeasonSettings { survey_dates: vec![day_of("04-01")], ..settings() });
    let of = |name| values.iter().find(|(found, _)| found == name).expect("a measure").1;
    case.check("short_of_peak_pct", &[100.0 * (1.0 - of("swe_04_01_mm") / of("peak_swe_mm"))]);
}

/// A year with the same SWE on every day, and rain and snow on stated days.
pub fn snow_and_rain(case: &Case) {
    let table = |name: &str| {
        let mut table = vec![0.0; DAYS];
        for (day, amount_mm) in case.input::<Vec<(usize, f64)>>(name) {
            table[day - 1] = amount_mm;
        }
        table
    };
    let still = still_year(vec![case.input("swe_mm"); DAYS + 1]);
    let block = YearBlock { rain_mm: table("days_and_rain_mm"), snow_mm: table("days_and_snow_mm"), ..still };
    check(case, block, SeasonSettings { survey_dates: vec![day_of("04-01")], ..settings() });
}

/// A common year of one column with the stated SWE as each day begins and as the year ends, and no fluxes.
pub fn still_year(swe_mm: Vec<f64>) -> YearBlock {
    let days = swe_mm.len() - 1;
    let nothing = || vec![0.0; days];
    YearBlock {
        first: NaiveDate::from_ymd_opt(2006, 10, 1).expect("a date"),
        days,
        width: 1,
        means_at: 1,
        mixes_at: 0,
        swe_mm,
        net_melt_mm: nothing(),
        outflow_mm: nothing(),
        bare_ground_rain_mm: nothing(),
        rain_mm: nothing(),
        snow_mm: nothing(),
        sublimation_mm: Vec::new(),
        covered: Vec::new(),
        detail: None,
    }
}

fn day_of(text: &str) -> MonthDay {
    MonthDay::parse(text).expect("a day of every year")
}

fn settings() -> SeasonSettings {
    SeasonSettings {
        water_year_starts: WaterYearStart(day_of("10-01")),
        survey_dates: Vec::new(),
        volume_windows: Vec::new(),
        outflow_before: Vec::new(),
        melt_shares_before: Vec::new(),
        arrival_volume_hm3: None,
    }
}

/// Takes the measures of a year of one column, the basin mean, and compares those of which a value is expected.
fn check(case: &Case, mut block: YearBlock, settings: SeasonSettings) -> Vec<(String, f64)> {
    let measures = Measures::new(settings, 1.0);
    let mut values = vec![0.0; measures.list().len()];
    measures.take(&mut block, &mut values);
    let named: Vec<(String, f64)> =
        measures.list().iter().map(|measure| measure.name.clone()).zip(values).collect();
    for (name, value) in &named {
        case.check(name, &[*value]);
    }
    named
}
