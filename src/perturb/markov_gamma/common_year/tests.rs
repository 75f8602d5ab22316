use super::CommonYear;
use crate::calendar::{MonthDay, WaterYearStart};

fn year(starts: (u32, u32), cool_ends: (u32, u32)) -> CommonYear {
    let day = |(month, day)| MonthDay::new(month, day).unwrap();
    CommonYear::new(WaterYearStart(day(starts)), day(cool_ends))
}

/// Values of months that rise and fall steeply, with one month far off.
const MONTHLY: [f64; 12] = [-8.0, -6.5, -1.0, 4.0, 9.0, 30.0, 17.0, 16.0, 11.0, 5.0, -2.0, -7.0];

/// The mean over each month's days is the month's value, to rounding of some ten (1e-9); and where months meet, in a year
/// that starts anywhere, the value changes no more from one day to the next than it does within months.
#[test]
fn days_without_steps() {
    for starts in [(10, 1), (4, 1), (1, 1), (9, 17)] {
        let year = year(starts, (4, 1));
        let daily = year.without_steps(&MONTHLY);
        let (mut within, mut between) = (0.0, 0.0);
        for at in 0..365 {
            let before = (at + 364) % 365;
            let change = (daily[at] - daily[before]).abs();
            let most = if year.month[at] == year.month[before] { &mut within } else { &mut between };
            *most = f64::max(*most, change);
        }
        assert!(between <= within + 1e-9, "a step of {between} where months meet, {within} within them");
        for (month, expected) in MONTHLY.iter().enumerate() {
            let days = daily.iter().zip(&year.month).filter(|(_, of)| usize::from(**of) == month);
            let (sum, count) = days.fold((0.0, 0.0), |(sum, count), (value, _)| (sum + value, count + 1.0));
            assert!((sum / count - expected).abs() < 1e-9, "month {month}: {} for {expected}", sum / count);
        }
    }
}

/// 365 days cut at months and where the cool season ends, counted by hand: October to March are 182 days. A year that
/// starts mid-month has that month at both ends; a survey on its first day leaves no cool season.
#[test]
fn parts_of_the_year() {
    let plain = year((10, 1), (4, 1));
    assert_eq!(plain.parts.len(), 12);
    assert_eq!(cool_days(&plain), 182);
    let mid_march = year((10, 1), (3, 15));
    assert_eq!((mid_march.parts.len(), cool_days(&mid_march)), (13, 165));
    let southern = year((4, 1), (9, 1));
    assert_eq!((southern.parts.len(), cool_days(&southern), southern.month[0]), (12, 153, 3));
    let mid_month = year((9, 17), (4, 1));
    assert_eq!((mid_month.parts.len(), mid_month.parts[0].0, mid_month.parts[12].0), (13, 14, 16));
    assert_eq!(cool_days(&year((10, 1), (10, 1))), 0);
    for year in [plain, mid_march, southern, mid_month] {
        assert_eq!(year.parts.iter().map(|(days, _)| days).sum::<usize>(), 365);
        assert_eq!(year.day_of_year.iter().map(|day| usize::from(*day)).sum::<usize>(), 365 * 366 / 2);
    }
}

fn cool_days(year: &CommonYear) -> usize {
    year.parts.iter().filter(|(_, is_cool)| *is_cool).map(|(days, _)| days).sum()
}
