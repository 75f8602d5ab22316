//! One water year of one site: observed and modelled snow measured the same way.

use super::scores::{Pair, nash_sutcliffe};
use crate::calendar::{MonthDay, date_of, day_of_water_year};
use crate::observed::Kind;
use crate::season::{BARE_MM, LEAST_PEAK_MM, Outcome, SAME_SWE_MM};
use chrono::NaiveDate;
use serde::Serialize;

/// Whether a pillow's year is whole is asked from this day of the water year on: 1 December where it starts on
/// 1 October. Snow before it hardly makes a peak.
pub(super) const WHOLE_FROM_DAY: usize = 62;
/// A pillow's year may lack this many days from there to melt-out, as a year of weather may.
pub(super) const MISSING_DAYS_ALLOWED: usize = 15;
/// A course is surveyed so many days before or after the survey date, at most.
const SURVEY_REACH_DAYS: usize = 5;

/// Snow water equivalent as a day begins, observed and modelled.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct DayPair {
    /// Observed, mm; none where there is no reading.
    pub observed_mm: Option<f64>,
    /// Modelled, mm.
    pub modelled_mm: f64,
}

/// A survey of one year, and the model on the survey's own day.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SurveyPair {
    /// The day on which it was measured: for a pillow the survey date itself, for a course at most five days off.
    pub date: NaiveDate,
    /// Observed, mm.
    pub observed_mm: f64,
    /// Modelled, mm.
    pub modelled_mm: f64,
}

/// A water year of a site, observed and modelled. Days are those of the water year, counted from 1.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ComparedYear {
    /// The water year.
    pub water_year: i32,
    /// Its first day.
    pub first: NaiveDate,
    /// Days with a reading.
    pub readings: usize,
    /// Of a pillow: whether at most 15 readings are missing from the 62nd day (1 December where the year starts on
    /// 1 October) to the later of the observed and the modelled melt-out, or to the year's end where one of them has none:
    /// a pillow that fails after an early thaw has not seen the winter. Else the year has no peak and no melt-out.
    pub is_whole: bool,
    /// Observed peak, mm.
    pub observed_peak_mm: Option<f64>,
    /// Modelled peak, mm; where there is an observed one.
    pub modelled_peak_mm: Option<f64>,
    /// First day of the observed peak; none below 10 mm.
    pub observed_peak_day: Outcome,
    /// First day of the modelled peak.
    pub modelled_peak_day: Outcome,
    /// One entry a survey date, in the scenario's order.
    pub surveys: Vec<Option<SurveyPair>>,
    /// First day after the observed peak with less than 1 mm; none below a peak of 10 mm, and where the day before has no
    /// reading.
    pub observed_melt_out_day: Outcome,
    /// The same of the model.
    pub modelled_melt_out_day: Outcome,
    /// Nash-Sutcliffe efficiency over the year's readings.
    pub nash_sutcliffe: Option<f64>,
    /// The days themselves; they stand in a table of their own.
    #[serde(skip)]
    pub days: Vec<DayPair>,
}

impl ComparedYear {
    /// Measures a year; `days` are all its days.
    pub(super) fn of(
        water_year: i32,
        first: NaiveDate,
        days: Vec<DayPair>,
        kind: Kind,
        survey_dates: &[MonthDay],
    ) -> Self {
        let observed: Vec<Option<f64>> = days.iter().map(|day| day.observed_mm).collect();
        let modelled: Vec<Option<f64>> = days.iter().map(|day| Some(day.modelled_mm)).collect();
        let found = Season::of(&observed);
        let made = Season::of(&modelled);
        let is_whole = kind == Kind::Pillow && is_whole(&observed, [found.melt_out, made.melt_out]);
        let [found, made] = if is_whole { [found, made] } else { [Season::NONE; 2] };
        let pairs: Vec<Pair> = days.iter().filter_map(DayPair::pair).collect();
        let survey = |date: &MonthDay| survey(&days, first, *date, kind);
        Self {
            water_year,
            first,
            readings: pairs.len(),
            is_whole,
            observed_peak_mm: found.peak_mm,
            modelled_peak_mm: made.peak_mm,
            observed_peak_day: found.peak_day,
            modelled_peak_day: made.peak_day,
            surveys: survey_dates.iter().map(survey).collect(),
            observed_melt_out_day: found.sharp_melt_out(&observed),
            modelled_melt_out_day: made.melt_out,
            nash_sutcliffe: nash_sutcliffe(&pairs),
            days,
        }
    }
}

impl DayPair {
    /// Both values, where there is a reading.
    pub fn pair(&self) -> Option<Pair> {
        self.observed_mm.map(|observed| Pair { observed, modelled: self.modelled_mm })
    }
}

/// Peak and melt-out of a year's days, some of them perhaps without a value.
struct Season {
    peak_mm: Option<f64>,
    peak_day: Outcome,
    melt_out: Outcome,
}

impl Season {
    const NONE: Self = Self { peak_mm: None, peak_day: Outcome::None, melt_out: Outcome::None };

    /// The rules of the season measures of a band.
    fn of(days: &[Option<f64>]) -> Self {
        let mut peak: Option<(usize, f64)> = None;
        for (day, swe_mm) in (1..).zip(days) {
            if let Some(swe_mm) = swe_mm
                && peak.is_none_or(|(_, highest)| *swe_mm > highest + SAME_SWE_MM)
            {
                peak = Some((day, *swe_mm));
            }
        }
        match peak {
            None => Self::NONE,
            Some((_, peak_mm)) if peak_mm < LEAST_PEAK_MM => Self { peak_mm: Some(peak_mm), ..Self::NONE },
            Some((peak_day, peak_mm)) => {
                let mut after = (1..).zip(days).skip(peak_day);
                let bare = after.find(|(_, swe_mm)| swe_mm.is_some_and(|swe_mm| swe_mm < BARE_MM));
                Self {
                    peak_mm: Some(peak_mm),
                    peak_day: Outcome::Value(peak_day as f64),
                    melt_out: bare.map_or(Outcome::NotGone, |(day, _)| Outcome::Value(f64::from(day))),
                }
            }
        }
    }

    /// Melt-out, or none where it may have come on any of some days without a reading.
    fn sharp_melt_out(&self, days: &[Option<f64>]) -> Outcome {
        let day_before = match self.melt_out {
            Outcome::Value(day) => Some(day as usize - 1),
            Outcome::None | Outcome::NotReached => None,
            Outcome::NotGone => Some(days.len()),
        };
        let is_sharp = day_before.is_some_and(|day| days[day - 1].is_some());
        if is_sharp { self.melt_out } else { Outcome::None }
    }
}

/// The rule of [`ComparedYear::is_whole`].
fn is_whole(observed: &[Option<f64>], melt_outs: [Outcome; 2]) -> bool {
    let last_day = |melt_out: Outcome| melt_out.value().map_or(observed.len(), |day| day as usize);
    let end = last_day(melt_outs[0]).max(last_day(melt_outs[1]));
    let asked = observed[..end].iter().skip(WHOLE_FROM_DAY - 1);
    let has_any = observed.iter().any(Option::is_some);
    has_any && asked.filter(|swe_mm| swe_mm.is_none()).count() <= MISSING_DAYS_ALLOWED
}

/// The reading of the survey day, for a course the one nearest to it; of two equally near the earlier.
fn survey(days: &[DayPair], first: NaiveDate, survey: MonthDay, kind: Kind) -> Option<SurveyPair> {
    let observed: Vec<Option<f64>> = days.iter().map(|day| day.observed_mm).collect();
    let day = survey_day(&observed, first, survey, kind)?;
    let pair = days[day].pair()?;
    Some(SurveyPair { date: date_of(first, day + 1), observed_mm: pair.observed, modelled_mm: pair.modelled })
}

/// The day of the year, from 0, whose reading is the survey's.
pub(super) fn survey_day(
    observed: &[Option<f64>],
    first: NaiveDate,
    survey: MonthDay,
    kind: Kind,
) -> Option<usize> {
    let reach = match kind {
        Kind::Pillow => 0,
        Kind::Course => SURVEY_REACH_DAYS,
    };
    let asked = day_of_water_year(first, survey) - 1;
    let read = observed.iter().enumerate().filter(|(_, swe_mm)| swe_mm.is_some());
    let near = read.map(|(day, _)| day).filter(|day| asked.abs_diff(*day) <= reach);
    near.min_by_key(|day| asked.abs_diff(*day))
}

#[cfg(test)]
mod tests;
