//! What a year's inflow comes to: volumes, shares before days and by month, its centroid and its largest days.

use super::dates::Dates;
use super::plan::OperationSettings;
use crate::calendar::MONTHS;
use crate::season::{Kind, Measure, NONE, name_of};

/// Lengths of the largest inflow, days.
const LARGEST_OF_DAYS: [usize; 3] = [1, 3, 7];

/// The measures, in the order in which [`take`] gives them.
pub(super) fn list(settings: &OperationSettings) -> Vec<Measure> {
    let (word, within) = (settings.word(), settings.word_within());
    let mut list = Vec::new();
    for [from, to] in &settings.volume_windows {
        let name = format!("inflow_{}_to_{}_hm3", name_of(*from), name_of(*to));
        let title = format!("{word}, {} to {}", from.words(), to.words());
        list.push(Measure::new(Kind::VolumeHm3, name, title).told_as_volume());
    }
    list.push(
        Measure::new(Kind::VolumeHm3, "inflow_year_hm3", format!("{within} of the water year"))
            .told_as_volume(),
    );
    for day in &settings.shares_before {
        let name = format!("inflow_before_{}_share", name_of(*day));
        list.push(Measure::new(
            Kind::Share,
            name,
            format!("share of the year's {within} before {}", day.words()),
        ));
    }
    for month in settings.months() {
        let name = format!("inflow_in_{}_share", MONTHS[month].to_lowercase());
        list.push(Measure::new(
            Kind::Share,
            name,
            format!("share of the year's {within} in {}", MONTHS[month]),
        ));
    }
    list.push(Measure::new(Kind::DayOfWaterYear, "inflow_centroid_day", format!("centroid of {word}")));
    for days in LARGEST_OF_DAYS {
        let of = if days == 1 { "a day".to_owned() } else { format!("{days} days in succession") };
        let name = format!("inflow_largest_{days}_day{}_hm3", if days == 1 { "" } else { "s" });
        list.push(Measure::new(Kind::VolumeHm3, name, format!("largest {within} of {of}")));
    }
    list
}

/// Every measure of one year's inflow, hm3 a day.
pub(super) fn take(dates: &Dates, inflow_hm3: &[f64], into: &mut Vec<f64>) {
    let sum = |days: &[f64]| days.iter().fold(0.0, |sum, hm3| sum + hm3);
    let year_hm3 = sum(inflow_hm3);
    let share = |hm3: f64| if year_hm3 > 0.0 { hm3 / year_hm3 } else { NONE };
    into.extend(dates.windows.iter().map(|[from, to]| sum(&inflow_hm3[*from..=*to])));
    into.push(year_hm3);
    into.extend(dates.shares_before.iter().map(|day| share(sum(&inflow_hm3[..*day]))));
    let mut months_hm3 = [0.0; 12];
    let (mut moment, mut number) = (0.0, 0.0);
    for (month, hm3) in dates.month.iter().zip(inflow_hm3) {
        number += 1.0;
        months_hm3[*month] += hm3;
        moment += number * hm3;
    }
    let first = dates.month.first().copied().unwrap_or_default();
    into.extend((0..12).map(|month| share(months_hm3[(first + month) % 12])));
    into.push(if year_hm3 > 0.0 { moment / year_hm3 } else { NONE });
    into.extend(largest(inflow_hm3));
}

/// The largest inflow of 1, 3 and 7 days in succession, hm3.
fn largest(inflow_hm3: &[f64]) -> [f64; LARGEST_OF_DAYS.len()] {
    let three = |from: usize| inflow_hm3[from] + inflow_hm3[from + 1] + inflow_hm3[from + 2];
    let most = |days: usize, sum: &dyn Fn(usize) -> f64| {
        (0..(inflow_hm3.len() + 1).saturating_sub(days)).map(sum).fold(0.0, f64::max)
    };
    let seven = |from: usize| three(from) + three(from + 3) + inflow_hm3[from + 6];
    [most(1, &|from| inflow_hm3[from]), most(3, &three), most(7, &seven)]
}

#[cfg(test)]
mod tests {
    use super::*;
    use chrono::NaiveDate;

    fn taken(inflow_hm3: &[f64]) -> Vec<(String, f64)> {
        let settings = OperationSettings::of_tests();
        let first = NaiveDate::from_ymd_opt(2000, 10, 1).unwrap();
        let mut into = Vec::new();
        take(&Dates::of(&settings, first, inflow_hm3.len()), inflow_hm3, &mut into);
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
}
