//! The period value: many years of one measure as one number (method, section 10).

use super::{Kind, NONE};

/// The median of the years for a date, the mean for all else; sorts the `years` of a date in passing.
///
/// Of a date, years with none rank before every date, and years whose snow never went, or whose volume never came, after; a
/// median between a date and none is none. Of all else, years with none are left out.
pub fn period_value(kind: Kind, years: &mut [f64]) -> f64 {
    if kind.is_date() { median(years) } else { mean(years) }
}

fn mean(years: &[f64]) -> f64 {
    let (mut sum, mut count) = (0.0, 0.0);
    for value in years.iter().filter(|value| value.is_finite()) {
        sum += value;
        count += 1.0;
    }
    if count > 0.0 { sum / count } else { NONE }
}

fn median(years: &mut [f64]) -> f64 {
    years.sort_unstable_by(f64::total_cmp);
    let n = years.len();
    match n {
        0 => NONE,
        _ if n % 2 == 1 => years[n / 2],
        _ => halfway(years[n / 2 - 1], years[n / 2]),
    }
}

fn halfway(a: f64, b: f64) -> f64 {
    if a == NONE { NONE } else { (a + b) / 2.0 }
}

#[cfg(test)]
mod tests {
    use super::super::{NOT_GONE, NOT_REACHED};
    use super::*;

    #[test]
    fn medians_with_years_that_have_no_date() {
        let date = |mut years: Vec<f64>| period_value(Kind::DayOfWaterYear, &mut years);
        assert_eq!(date(vec![250.0, 230.0, 240.0]), 240.0);
        assert_eq!(date(vec![250.0, NONE, 240.0]), 240.0);
        assert_eq!(date(vec![NONE, 240.0]), NONE, "between a date and none: none");
        assert_eq!(date(vec![NOT_GONE, 240.0]), NOT_GONE);
        assert_eq!(date(vec![NONE, NOT_GONE]), NONE);
        assert_eq!(period_value(Kind::ArrivalDay, &mut [NOT_REACHED, 240.0, NOT_REACHED]), NOT_REACHED);
    }

    #[test]
    fn means_of_all_else() {
        assert_eq!(period_value(Kind::AmountMm, &mut [400.0, 0.0, 200.0]), 200.0);
        assert_eq!(period_value(Kind::Share, &mut [0.25, NONE, 0.75]), 0.5, "years with none are left out");
        assert_eq!(period_value(Kind::DayCount, &mut [0.0, 1.0]), 0.5);
        assert_eq!(period_value(Kind::Share, &mut [NONE]), NONE);
    }
}
