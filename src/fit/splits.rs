//! Splits of the winters: which years a fit may see, and which it is judged on.
//!
//! A split-sample test asks of a model fitted on half of the years how well it does on the other half; a differential one
//! (Klemes 1986) takes halves that differ in climate. It is necessary that a model passes it, and not sufficient.

use crate::calendar::MonthDay;
use crate::calendar::day_of_water_year;
use crate::weather::{Series, YearSpan};
use serde::Serialize;

/// Winter is November to March in the north, May to September in the south; January is 0.
const NORTHERN_WINTER: [u8; 5] = [10, 11, 0, 1, 2];
const SOUTHERN_WINTER: [u8; 5] = [4, 5, 6, 7, 8];

/// A set of winters.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Split {
    /// All that have readings.
    All,
    /// Of them, in their order, the first, the third, and so on.
    Odd,
    /// The second, the fourth, and so on.
    Even,
    /// The half with the lowest mean temperature of the winter.
    Coldest,
    /// The half with the highest.
    Warmest,
    /// The half with the least precipitation of the cool season.
    Driest,
    /// The half with the most.
    Wettest,
}

impl Split {
    /// Every split, in the order in which they are told.
    pub const EACH: [Self; 7] =
        [Self::All, Self::Odd, Self::Even, Self::Coldest, Self::Warmest, Self::Driest, Self::Wettest];

    /// The other half; none of all.
    pub fn others(self) -> Option<Self> {
        match self {
            Self::All => None,
            Self::Odd => Some(Self::Even),
            Self::Even => Some(Self::Odd),
            Self::Coldest => Some(Self::Warmest),
            Self::Warmest => Some(Self::Coldest),
            Self::Driest => Some(Self::Wettest),
            Self::Wettest => Some(Self::Driest),
        }
    }

    /// Its years in words.
    pub fn words(self) -> &'static str {
        match self {
            Self::All => "all years",
            Self::Odd => "every other year from the first",
            Self::Even => "every other year from the second",
            Self::Coldest => "the coldest half",
            Self::Warmest => "the warmest half",
            Self::Driest => "the driest half",
            Self::Wettest => "the wettest half",
        }
    }
}

/// The winter of a water year at the station.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Winter {
    /// The water year.
    pub water_year: i32,
    /// Mean temperature from November to March, in the south from May to September, degC.
    pub mean_c: f64,
    /// Precipitation of the days before the first survey date, as the gauge caught it, mm.
    pub cool_season_mm: f64,
    /// Whether snow was observed in it.
    pub is_observed: bool,
}

impl Winter {
    /// The winter of a year.
    pub(super) fn of(
        weather: &Series,
        year: &YearSpan,
        survey: MonthDay,
        is_southern: bool,
        is_observed: bool,
    ) -> Self {
        let view = weather.view(year);
        let months = if is_southern { SOUTHERN_WINTER } else { NORTHERN_WINTER };
        let (mut sum_c, mut days) = (0.0, 0.0);
        for (mean_c, month) in view.mean_c.iter().zip(view.month) {
            if months.contains(month) {
                sum_c += mean_c;
                days += 1.0;
            }
        }
        let cool_season = &view.precipitation_mm[..day_of_water_year(year.first, survey) - 1];
        Self {
            water_year: year.water_year,
            mean_c: sum_c / days,
            cool_season_mm: cool_season.iter().sum(),
            is_observed,
        }
    }
}

/// Which winters are a split's. Halves differ by one winter at most: the coldest, the driest and the odd half have the one in
/// the middle. Of winters that are equal the earlier counts as colder or drier.
pub fn winters_of(split: Split, winters: &[Winter]) -> Vec<bool> {
    let in_use: Vec<usize> = (0..winters.len()).filter(|at| winters[*at].is_observed).collect();
    let ranked = |by: fn(&Winter) -> f64| {
        let mut ranked = in_use.clone();
        ranked.sort_by(|a, b| by(&winters[*a]).total_cmp(&by(&winters[*b])));
        ranked
    };
    let middle = in_use.len().div_ceil(2);
    let chosen: Vec<usize> = match split {
        Split::All => in_use,
        Split::Odd => in_use.into_iter().step_by(2).collect(),
        Split::Even => in_use.into_iter().skip(1).step_by(2).collect(),
        Split::Coldest => ranked(|winter| winter.mean_c)[..middle].to_vec(),
        Split::Warmest => ranked(|winter| winter.mean_c)[middle..].to_vec(),
        Split::Driest => ranked(|winter| winter.cool_season_mm)[..middle].to_vec(),
        Split::Wettest => ranked(|winter| winter.cool_season_mm)[middle..].to_vec(),
    };
    (0..winters.len()).map(|at| chosen.contains(&at)).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn winter(water_year: i32, mean_c: f64, cool_season_mm: f64, is_observed: bool) -> Winter {
        Winter { water_year, mean_c, cool_season_mm, is_observed }
    }

    fn years(split: Split, winters: &[Winter]) -> Vec<i32> {
        let is_in = winters_of(split, winters);
        winters.iter().zip(is_in).filter(|(_, is_in)| *is_in).map(|(winter, _)| winter.water_year).collect()
    }

    /// By hand: five winters with readings and one without.
    #[test]
    fn halves_are_by_temperature_and_precipitation() {
        let winters = [
            winter(2001, -3.0, 500.0, true),
            winter(2002, -9.0, 100.0, false),
            winter(2003, -5.0, 300.0, true),
            winter(2004, -1.0, 400.0, true),
            winter(2005, -4.0, 700.0, true),
            winter(2006, -2.0, 600.0, true),
        ];
        assert_eq!(years(Split::All, &winters), [2001, 2003, 2004, 2005, 2006]);
        assert_eq!(years(Split::Odd, &winters), [2001, 2004, 2006]);
        assert_eq!(years(Split::Even, &winters), [2003, 2005]);
        assert_eq!(years(Split::Coldest, &winters), [2001, 2003, 2005]);
        assert_eq!(years(Split::Warmest, &winters), [2004, 2006]);
        assert_eq!(years(Split::Driest, &winters), [2001, 2003, 2004]);
        assert_eq!(years(Split::Wettest, &winters), [2005, 2006]);
    }

    /// Identity: a half and the others are all, and share no year; of equal winters, too.
    #[test]
    fn a_half_and_the_others_are_all() {
        let winters: Vec<Winter> =
            (0..9).map(|at| winter(2000 + at, f64::from(at % 2), 1.0, at != 4)).collect();
        for split in Split::EACH {
            let Some(others) = split.others() else { continue };
            let (own, others) = (years(split, &winters), years(others, &winters));
            assert!(own.len().abs_diff(others.len()) <= 1, "{split:?}");
            let mut both = [own, others].concat();
            both.sort_unstable();
            assert_eq!(both, years(Split::All, &winters), "{split:?}");
        }
    }
}
