//! Which water years of a record can be used, and why the others cannot (method, section 1).

use super::gaps::Gap;
use crate::calendar::{MonthDay, WaterYearStart, date_of, day_of_water_year, days_between};
use crate::units::UnitSystem;
use chrono::NaiveDate;
use serde::Serialize;

/// Days of a leap year.
const LONGEST_YEAR_DAYS: usize = 366;

/// Limits of the screening; all of them are settings.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Limits {
    /// A longer run of days without temperatures is not interpolated.
    pub temperature_gap_days: usize,
    /// A water year may miss this many days.
    pub missing_days_allowed: usize,
    /// A season's mean may differ this much from the record's median, degC.
    pub season_mean_departure_c: f64,
    /// A temperature farther from the median of its time of year is taken as missing, degC; none keeps them all.
    pub temperature_departure_c: Option<f64>,
    /// A temperature that stays the same for this many days or more is taken as missing there; none keeps them all.
    pub stuck_temperature_days: Option<usize>,
    /// Water years that the user leaves out.
    pub leave_out_water_years: Vec<i32>,
}

impl Default for Limits {
    fn default() -> Self {
        Self {
            temperature_gap_days: 5,
            missing_days_allowed: 15,
            season_mean_departure_c: 6.0,
            temperature_departure_c: None,
            stuck_temperature_days: None,
            leave_out_water_years: Vec::new(),
        }
    }
}

/// Why a water year was left out.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Why {
    /// The user says so.
    AsStated,
    /// Too many days miss temperature or precipitation.
    MissingDays {
        /// How many.
        days: usize,
    },
    /// The record begins or ends within the year.
    BeyondRecord {
        /// How many of its days the record does not reach.
        days: usize,
    },
    /// A run of days without temperatures that is too long to interpolate, or at the record's edge.
    TemperatureGap {
        /// First day of the gap.
        from: NaiveDate,
        /// Its length.
        days: usize,
    },
    /// A season's mean temperature is far from the record's median: a sensor that fails while each day looks sound.
    SeasonMean {
        /// `cool` or `warm`.
        season: &'static str,
        /// The year's mean, degC.
        mean_c: f64,
        /// The record's median, degC.
        median_c: f64,
    },
}

impl Why {
    /// Every kind of reason for which a year is left out, in the order in which they are looked for.
    pub const KINDS: [&'static str; 5] = [
        "as the scenario asks",
        "at the record's ends",
        "for missing days",
        "for a temperature gap",
        "for a season's odd mean",
    ];

    /// Which of [`KINDS`](Self::KINDS) it is, without its numbers.
    pub fn kind(&self) -> &'static str {
        Self::KINDS[match self {
            Self::AsStated => 0,
            Self::BeyondRecord { .. } => 1,
            Self::MissingDays { .. } => 2,
            Self::TemperatureGap { .. } => 3,
            Self::SeasonMean { .. } => 4,
        }]
    }

    /// The reason in a sentence, temperatures in the reader's unit.
    pub fn words(&self, units: UnitSystem) -> String {
        match self {
            Self::AsStated => "as the scenario asks".to_owned(),
            Self::MissingDays { days } => {
                format!("temperature or precipitation missing on {}", days_in_words(*days))
            }
            Self::BeyondRecord { days } => {
                format!("the record begins or ends within it and lacks {}", days_in_words(*days))
            }
            Self::TemperatureGap { from, days } => {
                format!("no temperatures for {} from {from}", days_in_words(*days))
            }
            Self::SeasonMean { season, mean_c, median_c } => {
                let unit = units.temperature();
                let [mean, median] =
                    [mean_c, median_c].map(|c| format!("{:.1} {}", unit.of(*c), unit.suffix));
                format!("{season}-season mean temperature {mean}, the record's median {median}")
            }
        }
    }
}

fn days_in_words(days: usize) -> String {
    if days == 1 { "1 day".to_owned() } else { format!("{days} days") }
}

/// A water year that is not run.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SkippedYear {
    /// Its name.
    pub water_year: i32,
    /// All that speaks against it.
    pub why: Vec<Why>,
}

/// Water years on end that are left out, with their reasons; years that one gap of more than a year takes out stand
/// together.
pub fn in_groups(skipped: &[SkippedYear]) -> Vec<(std::ops::RangeInclusive<i32>, Vec<&Why>)> {
    let long_gap = |year: &SkippedYear| -> Option<NaiveDate> {
        year.why.iter().find_map(|why| match why {
            Why::TemperatureGap { from, days } if *days > LONGEST_YEAR_DAYS => Some(*from),
            _ => None,
        })
    };
    let belong = |a: &SkippedYear, b: &SkippedYear| {
        a.water_year + 1 == b.water_year && long_gap(a).is_some() && long_gap(a) == long_gap(b)
    };
    let groups = skipped.chunk_by(belong).map(|group| {
        let (first, last) = (&group[0], &group[group.len() - 1]);
        let why: Vec<&Why> = match group {
            [one] => one.why.iter().collect(),
            _ => first.why.iter().filter(|why| matches!(why, Why::TemperatureGap { .. })).collect(),
        };
        (first.water_year..=last.water_year, why)
    });
    groups.collect()
}

/// Days `first_index..first_index + days` of the record that make up a water year.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct UsableYear {
    pub water_year: i32,
    pub first_index: usize,
    pub days: usize,
}

/// The record as the screening sees it.
pub(super) struct Screening<'a> {
    pub first: NaiveDate,
    /// Daily mean temperature after interpolation; NaN where open.
    pub mean_c: &'a [f64],
    /// Whether a day lacks temperature or precipitation as measured.
    pub is_missing: &'a [bool],
    pub open_gaps: &'a [Gap],
    pub start: WaterYearStart,
    /// Ends the cool season, which began with the water year.
    pub survey: MonthDay,
    pub limits: &'a Limits,
}

impl Screening<'_> {
    /// Every water year that the record touches, usable or not, in order.
    pub fn sort_years(&self) -> (Vec<UsableYear>, Vec<SkippedYear>) {
        let last = date_of(self.first, self.mean_c.len());
        let years = self.start.water_year_of(self.first)..=self.start.water_year_of(last);
        let mut whole = Vec::new();
        let mut skipped = Vec::new();
        for water_year in years {
            let why = self.against(water_year);
            if why.is_empty() {
                let first_day = self.start.first_day(water_year);
                whole.push(UsableYear {
                    water_year,
                    first_index: days_between(self.first, first_day),
                    days: self.start.days_in(water_year),
                });
            } else {
                skipped.push(SkippedYear { water_year, why });
            }
        }
        let usable = self.screen_season_means(whole, &mut skipped);
        skipped.sort_by_key(|year| year.water_year);
        (usable, skipped)
    }

    fn against(&self, water_year: i32) -> Vec<Why> {
        let first_day = self.start.first_day(water_year);
        let end_day = self.start.first_day(water_year + 1);
        let record_end = date_of(self.first, self.mean_c.len() + 1);
        let outside = days_between(first_day, self.first) + days_between(record_end, end_day);
        let from = days_between(self.first, first_day);
        let to = days_between(self.first, end_day).min(self.is_missing.len());
        let inside = self.is_missing[from..to].iter().filter(|missing| **missing).count();
        let mut why = Vec::new();
        if self.limits.leave_out_water_years.contains(&water_year) {
            why.push(Why::AsStated);
        }
        if outside > 0 {
            why.push(Why::BeyondRecord { days: outside });
        }
        if inside > self.limits.missing_days_allowed {
            why.push(Why::MissingDays { days: inside });
        }
        why.extend(
            self.open_gaps
                .iter()
                .filter(|gap| gap.first < to && gap.first + gap.days > from)
                .map(|gap| Why::TemperatureGap { from: date_of(self.first, gap.first + 1), days: gap.days }),
        );
        why
    }

    fn screen_season_means(&self, years: Vec<UsableYear>, skipped: &mut Vec<SkippedYear>) -> Vec<UsableYear> {
        let seasons = years.iter().map(|year| self.season_means(year)).collect::<Vec<_>>();
        let medians = [0, 1].map(|season| median(seasons.iter().map(|means| means[season]).collect()));
        let mut usable = Vec::new();
        for (year, means) in years.into_iter().zip(seasons) {
            let why: Vec<Why> = ["cool", "warm"]
                .into_iter()
                .zip(means.into_iter().zip(medians))
                .filter(|(_, (mean, median))| (mean - median).abs() > self.limits.season_mean_departure_c)
                .map(|(season, (mean_c, median_c))| Why::SeasonMean { season, mean_c, median_c })
                .collect();
            if why.is_empty() {
                usable.push(year);
            } else {
                skipped.push(SkippedYear { water_year: year.water_year, why });
            }
        }
        usable
    }

    /// Mean temperature of the cool season (up to the survey day) and of the rest of the year.
    fn season_means(&self, year: &UsableYear) -> [f64; 2] {
        let cool_days = day_of_water_year(self.start.first_day(year.water_year), self.survey) - 1;
        let days = &self.mean_c[year.first_index..year.first_index + year.days];
        let (cool, warm) = days.split_at(cool_days);
        [cool, warm].map(
            |part| {
                if part.is_empty() { 0.0 } else { part.iter().sum::<f64>() / part.len() as f64 }
            },
        )
    }
}

fn median(mut values: Vec<f64>) -> f64 {
    values.sort_by(f64::total_cmp);
    match values.len() {
        0 => f64::NAN,
        n if n % 2 == 1 => values[n / 2],
        n => (values[n / 2 - 1] + values[n / 2]) / 2.0,
    }
}
