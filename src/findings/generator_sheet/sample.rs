//! Every statistic of the sheet, taken of one series of weather and of the snow that it brings: of the record or of a
//! realization alike.

use super::calendar::{Calendar, Days, Part};
use super::line::{Period, Statistic};
use super::moments::{correlation, lag1_correlation, mean, standard_deviation};
use super::spells::{longest_dry_years, mean_lengths, mean_longest_dry};
use crate::calendar::{COMMON_DATES, MonthDay, WaterYearStart};
use crate::findings::{quantile, sorted};
use crate::weather::Series;

/// What the sheet needs to know to take its statistics.
#[derive(Debug, Clone, PartialEq)]
pub struct SheetQuestions {
    /// A day with more is wet, mm.
    pub wet_day_mm: f64,
    /// First survey date: its SWE is asked for, and it ends the cool season.
    pub survey: MonthDay,
    calendar: Calendar,
}

/// A statistic of one series, for each part of the year that it is taken of; none where there is nothing to take it of.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Taken {
    pub statistic: Statistic,
    pub values: Vec<(Period, Option<f64>)>,
}

/// All statistics of one series.
#[derive(Debug, Clone, PartialEq)]
pub struct SheetSample {
    /// In the order of the sheet.
    pub(super) taken: Vec<Taken>,
    /// The largest day of all, mm.
    pub(super) largest_day_mm: Option<f64>,
    pub(super) years: usize,
}

impl SheetQuestions {
    /// Of water years that start on a day, up to the first survey date.
    pub fn new(wet_day_mm: f64, starts: WaterYearStart, survey: MonthDay) -> Self {
        Self { wet_day_mm, survey, calendar: Calendar::new(starts, survey) }
    }

    /// Takes every statistic. `survey_swe_mm` is the basin's SWE on the first survey date of each year.
    ///
    /// Precipitation in mm, temperatures in degC, 29 February left out. Totals and means are of a part of each year, and
    /// their mean, sample standard deviation and correlations are over years; daily amounts and temperatures are pooled over
    /// all days of the part in all years. Quantiles are of type 8.
    pub fn sample(&self, weather: &Series, survey_swe_mm: &[f64]) -> SheetSample {
        let days = Days::of(weather);
        let taken = [
            snow(survey_swe_mm),
            self.months(&days),
            self.wet_days(&days),
            self.totals(&days),
            self.temperatures(&days),
            self.together(&days),
        ];
        SheetSample {
            taken: taken.into_iter().flatten().collect(),
            largest_day_mm: days.precipitation_mm.iter().copied().reduce(f64::max),
            years: weather.years.len(),
        }
    }

    fn months(&self, days: &Days) -> Vec<Taken> {
        let of = |statistic, of_totals: fn(&[f64]) -> Option<f64>| {
            each(statistic, &self.calendar.months, |part| of_totals(&days.totals_mm(part)))
        };
        vec![of(Statistic::MonthMean, mean), of(Statistic::MonthDeviation, standard_deviation)]
    }

    fn wet_days(&self, days: &Days) -> Vec<Taken> {
        let Calendar { months, seasons, year } = &self.calendar;
        let is_wet = |amount_mm: &f64| *amount_mm > self.wet_day_mm;
        let pooled = |part: &Part| days.by_year(&days.precipitation_mm, part).flatten().collect::<Vec<f64>>();
        let wet = |part: &Part| pooled(part).into_iter().filter(is_wet).collect::<Vec<f64>>();
        let share = |part: &Part| {
            let days = pooled(part);
            (!days.is_empty()).then(|| days.iter().filter(|mm| is_wet(mm)).count() as f64 / days.len() as f64)
        };
        let high = |part: &Part| {
            let wet = sorted(wet(part));
            (!wet.is_empty()).then(|| quantile(&wet, 0.95))
        };
        let largest: Vec<f64> = days
            .precipitation_mm
            .chunks_exact(COMMON_DATES)
            .map(|year| year.iter().copied().fold(0.0, f64::max))
            .collect();
        let [wet_spell, dry_spell] = mean_lengths(days, self.wet_day_mm);
        let of_year = |statistic, value| each(statistic, [year], |_| value);
        vec![
            each(Statistic::WetShare, months, share),
            of_year(Statistic::WetSpell, wet_spell),
            of_year(Statistic::DrySpell, dry_spell),
            of_year(Statistic::LongestDrySpell, mean_longest_dry(days, self.wet_day_mm)),
            each(Statistic::WetMean, seasons, |part| mean(&wet(part))),
            each(Statistic::WetHigh, seasons, high),
            of_year(Statistic::LargestDay, mean(&largest)),
        ]
    }

    fn totals(&self, days: &Days) -> Vec<Taken> {
        let parts = || self.calendar.cool_and_year();
        let of_year = days.totals_mm(&self.calendar.year);
        let median_mm = quantile(&sorted(of_year.iter().copied()), 0.5);
        vec![
            each(Statistic::TotalMean, parts(), |part| mean(&days.totals_mm(part))),
            each(Statistic::TotalDeviation, parts(), |part| standard_deviation(&days.totals_mm(part))),
            each(Statistic::TotalLowest, parts(), |part| days.totals_mm(part).into_iter().reduce(f64::min)),
            each(Statistic::TotalHighest, parts(), |part| days.totals_mm(part).into_iter().reduce(f64::max)),
            each(Statistic::TotalLag1, parts(), |part| {
                lag1_correlation(&days.totals_mm(part), &days.follows)
            }),
            each(Statistic::DryRun, [&self.calendar.year], |_| {
                longest_dry_years(&of_year, &days.follows, median_mm)
            }),
        ]
    }

    fn temperatures(&self, days: &Days) -> Vec<Taken> {
        let of = |statistic, numbers: &[f64], of_days: fn(&[f64]) -> Option<f64>| {
            each(statistic, &self.calendar.months, |part| {
                of_days(&days.by_year(numbers, part).flatten().collect::<Vec<f64>>())
            })
        };
        vec![
            of(Statistic::MinimumMean, &days.tmin_c, mean),
            of(Statistic::MinimumDeviation, &days.tmin_c, standard_deviation),
            of(Statistic::MaximumMean, &days.tmax_c, mean),
            of(Statistic::MaximumDeviation, &days.tmax_c, standard_deviation),
        ]
    }

    fn together(&self, days: &Days) -> Vec<Taken> {
        let Calendar { months, seasons, .. } = &self.calendar;
        let wet_less_dry = |part: &Part| {
            let amounts_mm = days.by_year(&days.precipitation_mm, part).flatten();
            let temperatures_c = days.by_year(&days.mean_c, part).flatten();
            let (wet, dry): (Vec<_>, Vec<_>) =
                amounts_mm.zip(temperatures_c).partition(|(amount_mm, _)| *amount_mm > self.wet_day_mm);
            let [wet, dry] =
                [wet, dry].map(|days| mean(&days.into_iter().map(|(_, c)| c).collect::<Vec<f64>>()));
            Some(wet? - dry?)
        };
        let over_years = |part: &Part| {
            let means_c: Option<Vec<f64>> =
                days.by_year(&days.mean_c, part).map(|year| mean(&year)).collect();
            correlation(&days.totals_mm(part), &means_c?)
        };
        vec![
            each(Statistic::WetLessDry, seasons, wet_less_dry),
            each(Statistic::Correlation, months.iter().chain(seasons), over_years),
        ]
    }
}

fn snow(survey_swe_mm: &[f64]) -> Vec<Taken> {
    let ranked = sorted(survey_swe_mm.iter().copied());
    let of_quantile = |share| (!ranked.is_empty()).then(|| quantile(&ranked, share));
    let of = |statistic, value| Taken { statistic, values: vec![(Period::WaterYear, value)] };
    vec![
        of(Statistic::SweMean, mean(survey_swe_mm)),
        of(Statistic::SweDeviation, standard_deviation(survey_swe_mm)),
        of(Statistic::SweLow, of_quantile(0.1)),
        of(Statistic::SweMedian, of_quantile(0.5)),
        of(Statistic::SweHigh, of_quantile(0.9)),
    ]
}

/// A statistic of some parts of the year.
fn each<'p>(
    statistic: Statistic,
    parts: impl IntoIterator<Item = &'p Part>,
    value: impl Fn(&Part) -> Option<f64>,
) -> Taken {
    Taken { statistic, values: parts.into_iter().map(|part| (part.period, value(part))).collect() }
}
