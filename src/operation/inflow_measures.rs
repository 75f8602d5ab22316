//! What a year's inflow comes to: volumes, shares before days and by month, its centroid and its largest days.

use super::plan::OperationSettings;
use crate::calendar::{MONTHS, MonthDay, day_of_water_year, days_between};
use crate::season::{Kind, Measure, NONE, name_of};
use chrono::{Datelike, NaiveDate};

/// Lengths of the largest inflow, days.
const LARGEST_OF_DAYS: [usize; 3] = [1, 3, 7];

/// The measures, in the order in which [`take`] gives them.
pub(super) fn list(settings: &OperationSettings) -> Vec<Measure> {
    let word = settings.word();
    let mut list = Vec::new();
    for [from, to] in &settings.volume_windows {
        let name = format!("inflow_{}_to_{}_hm3", name_of(*from), name_of(*to));
        let title = format!("{word}, {} to {}", from.words(), to.words());
        list.push(Measure::new(Kind::VolumeHm3, name, title).told_as_volume());
    }
    list.push(
        Measure::new(Kind::VolumeHm3, "inflow_year_hm3", format!("{word} of the water year"))
            .told_as_volume(),
    );
    for day in &settings.shares_before {
        let name = format!("inflow_before_{}_share", name_of(*day));
        list.push(Measure::new(
            Kind::Share,
            name,
            format!("share of the year's {word} before {}", day.words()),
        ));
    }
    for month in settings.months() {
        let name = format!("inflow_in_{}_share", MONTHS[month].to_lowercase());
        list.push(Measure::new(
            Kind::Share,
            name,
            format!("share of the year's {word} in {}", MONTHS[month]),
        ));
    }
    list.push(Measure::new(Kind::DayOfWaterYear, "inflow_centroid_day", format!("centroid of {word}")));
    for days in LARGEST_OF_DAYS {
        let of = if days == 1 { "a day".to_owned() } else { format!("{days} days in succession") };
        let name = format!("inflow_largest_{days}_day{}_hm3", if days == 1 { "" } else { "s" });
        list.push(Measure::new(Kind::VolumeHm3, name, format!("largest {word} of {of}")));
    }
    list
}

/// Every measure of one year's inflow, hm3 a day.
pub(super) fn take(settings: &OperationSettings, first: NaiveDate, inflow_hm3: &[f64], into: &mut Vec<f64>) {
    let at = |day: MonthDay| day_of_water_year(first, day) - 1;
    let sum = |days: &[f64]| days.iter().fold(0.0, |sum, hm3| sum + hm3);
    let year_hm3 = sum(inflow_hm3);
    let share = |hm3: f64| if year_hm3 > 0.0 { hm3 / year_hm3 } else { NONE };
    into.extend(settings.volume_windows.iter().map(|[from, to]| sum(&inflow_hm3[at(*from)..=at(*to)])));
    into.push(year_hm3);
    into.extend(settings.shares_before.iter().map(|day| share(sum(&inflow_hm3[..at(*day)]))));
    let mut months_hm3 = [0.0; 12];
    let mut moment = 0.0;
    for ((date, hm3), day) in first.iter_days().zip(inflow_hm3).zip(1..) {
        months_hm3[date.month0() as usize] += hm3;
        moment += f64::from(day) * hm3;
    }
    into.extend(settings.months().map(|month| share(months_hm3[month])));
    into.push(if year_hm3 > 0.0 { moment / year_hm3 } else { NONE });
    into.extend(LARGEST_OF_DAYS.map(|days| inflow_hm3.windows(days).map(sum).fold(0.0, f64::max)));
}

/// The place of a date among those of a common year, 1 January at 0; 29 February is its 28th.
pub(super) fn common_date(date: NaiveDate) -> usize {
    let new_year = NaiveDate::from_ymd_opt(date.year(), 1, 1).unwrap_or(NaiveDate::MIN);
    let is_after_leap_day = date.leap_year() && (date.month(), date.day()) >= (2, 29);
    days_between(new_year, date) - usize::from(is_after_leap_day)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn taken(inflow_hm3: &[f64]) -> Vec<(String, f64)> {
        let settings = OperationSettings::of_tests();
        let first = NaiveDate::from_ymd_opt(2000, 10, 1).unwrap();
        let mut into = Vec::new();
        take(&settings, first, inflow_hm3, &mut into);
        let names = list(&settings).into_iter().map(|measure| measure.name);
        assert_eq!(names.len(), into.len());
        names.zip(into).collect()
    }

    fn of(taken: &[(String, f64)], name: &str) -> f64 {
        taken.iter().find(|(of, _)| of == name).unwrap().1
    }

    /// MT-01 of the published values: 0, 10, 30, 40, 20 on days 1 to 5 have their centroid at 3.7.
    #[test]
    fn centroid_of_five_days() {
        let mut inflow = vec![0.0; 365];
        inflow[..5].copy_from_slice(&[0.0, 10.0, 30.0, 40.0, 20.0]);
        let found = taken(&inflow);
        assert!((of(&found, "inflow_centroid_day") - 3.7).abs() < 1e-12);
        assert_eq!(of(&found, "inflow_largest_1_day_hm3"), 40.0);
        assert_eq!(of(&found, "inflow_largest_3_days_hm3"), 90.0);
        assert_eq!(of(&found, "inflow_largest_7_days_hm3"), 100.0);
        assert_eq!(of(&found, "inflow_in_october_share"), 1.0);
        assert_eq!(of(&found, "inflow_before_04_01_share"), 1.0);
    }

    /// By hand: 1 hm3 a day for 365 days; October has 31 of them, 182 lie before 1 April, 122 from 1 April to 31 July.
    #[test]
    fn an_even_year() {
        let found = taken(&[1.0; 365]);
        assert_eq!(of(&found, "inflow_04_01_to_07_31_hm3"), 122.0);
        assert_eq!(of(&found, "inflow_year_hm3"), 365.0);
        assert_eq!(of(&found, "inflow_before_04_01_share"), 182.0 / 365.0);
        assert_eq!(of(&found, "inflow_in_october_share"), 31.0 / 365.0);
        assert_eq!(of(&found, "inflow_centroid_day"), 183.0);
        let months: f64 =
            found.iter().filter(|(name, _)| name.starts_with("inflow_in_")).map(|(_, x)| x).sum();
        assert!((months - 1.0).abs() < 1e-12);
    }

    #[test]
    fn a_year_without_inflow_has_no_shares() {
        let found = taken(&[0.0; 365]);
        assert_eq!(of(&found, "inflow_year_hm3"), 0.0);
        assert_eq!(of(&found, "inflow_centroid_day"), NONE);
        assert_eq!(of(&found, "inflow_before_04_01_share"), NONE);
    }

    #[test]
    fn common_dates_leave_the_leap_day_out() {
        let date = |year, month, day| common_date(NaiveDate::from_ymd_opt(year, month, day).unwrap());
        assert_eq!([date(2001, 1, 1), date(2001, 12, 31)], [0, 364]);
        assert_eq!(
            [date(2000, 2, 28), date(2000, 2, 29), date(2000, 3, 1), date(2001, 3, 1)],
            [58, 58, 59, 59]
        );
        assert_eq!(date(2000, 12, 31), 364);
    }
}
