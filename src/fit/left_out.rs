//! Winters that no fit may see and that none is judged on: the record itself is at fault in them.
//!
//! A few rules, the same for every site and fixed before anything is fitted: they ask the readings and the weather, never the
//! model. Limits without a source are common practice.

use super::failing_sensor::{
    FAR_C, FAR_DEVIATIONS, MONTHS_ASKED, MOST_FAR, RANGE_C, RANGE_DEVIATIONS, far_values, median, odd_ranges,
};
use super::site::{Site, observed_days};
use crate::calendar::date_of;
use crate::observed::{Kind, Observations};
use crate::weather::{Series, YearSpan, YearView};
use serde::Serialize;

/// Days at most this warm at gauge and pillow bring snow alone, and none of it melts, degC.
const COLD_C: f64 = -2.0;
/// A pillow below the gauge is so much warmer (International Standard Atmosphere), degC per m.
const C_PER_M: f64 = 0.0065;
/// So much must have fallen on them before gauge and pillow are compared, mm.
const LEAST_COLD_MM: f64 = 50.0;
/// What the pillow gained over what the gauge caught lies within this factor of the site's median year.
const GAUGE_FACTOR: f64 = 1.4;
/// A usual year is known from so many.
pub(super) const LEAST_YEARS: usize = 5;
/// A pillow under snow reads the same for so many days on end,
const FLAT_DAYS: usize = 10;
/// while so much falls on cold ones: it is stuck, mm.
const FLAT_MM: f64 = 25.0;
/// Bare ground reads the same all summer; snow is above this, mm.
const SNOW_MM: f64 = 10.0;
/// A pillow that rises by so much in a day, and by more than twice what fell around it, was moved or mended, mm.
const JUMP_MM: f64 = 40.0;
/// Days before and after the rise whose precipitation counts, as gauges and pillows keep different hours.
const JUMP_REACH_DAYS: usize = 2;
/// A rule by which a winter is left out.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Rule {
    /// Gauge and pillow tell of different winters.
    GaugeAgainstPillow,
    /// The pillow reads the same while it snows.
    PillowStuck,
    /// The pillow rises without precipitation.
    PillowJumps,
    /// The daily range of temperature is not that of the place.
    TemperatureRange,
    /// Temperatures that the place does not have.
    TemperatureFar,
}

impl Rule {
    /// Every rule, in the order in which they are asked.
    pub const EACH: [Self; 5] = [
        Self::GaugeAgainstPillow,
        Self::PillowStuck,
        Self::PillowJumps,
        Self::TemperatureRange,
        Self::TemperatureFar,
    ];

    /// Its name.
    pub fn name(self) -> &'static str {
        match self {
            Self::GaugeAgainstPillow => "gauge against pillow",
            Self::PillowStuck => "pillow stuck",
            Self::PillowJumps => "pillow jumps",
            Self::TemperatureRange => "temperature range",
            Self::TemperatureFar => "temperatures far off",
        }
    }

    /// The rule in words.
    pub fn words(self) -> String {
        match self {
            Self::GaugeAgainstPillow => format!(
                "On days of {COLD_C} degC and colder at gauge and pillow, what the pillow gained over what the gauge caught differs from the site's \
                 median year by more than a factor of {GAUGE_FACTOR}"
            ),
            Self::PillowStuck => format!(
                "The pillow reads the same for {FLAT_DAYS} days or more, while {FLAT_MM} mm or more fall on days of {COLD_C} degC \
                 and colder"
            ),
            Self::PillowJumps => format!(
                "The pillow rises by {JUMP_MM} mm or more in a day, and by more than twice the precipitation of that day and \
                 {JUMP_REACH_DAYS} days before and after"
            ),
            Self::TemperatureRange => format!(
                "In the first {MONTHS_ASKED} months of the water year, a month's mean daily range of temperature differs from that \
                 month's median year by more than {RANGE_C} degC and {RANGE_DEVIATIONS} scaled median deviations"
            ),
            Self::TemperatureFar => format!(
                "In these months, more than {MOST_FAR} minima and maxima differ from the median of their month by more than \
                 {FAR_C} degC and {FAR_DEVIATIONS} scaled median deviations"
            ),
        }
    }
}

/// A winter of a site that is left out.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LeftOut {
    /// The site.
    pub site: String,
    /// The water year.
    pub water_year: i32,
    /// By which rule.
    pub rule: Rule,
    /// What was found, in words.
    pub found: String,
}

/// The winters of all sites that are left out, by site, year and rule; `weather` as the gauge, at
/// `station_m`, caught it.
pub fn left_out(sites: &[Site<'_>], weather: &Series, station_m: f64) -> Vec<LeftOut> {
    let (odd_ranges, far_values) = (odd_ranges(weather), far_values(weather));
    let mut left_out = Vec::new();
    for site in sites {
        let years: Vec<SiteYear<'_>> =
            weather.years.iter().filter_map(|span| SiteYear::of(site, weather, span, station_m)).collect();
        let median_ratio = median_ratio(&years);
        for year in &years {
            let found = Rule::EACH.map(|rule| match rule {
                Rule::GaugeAgainstPillow => median_ratio.and_then(|median| year.unlike_gauge(median)),
                Rule::PillowStuck => year.stuck(),
                Rule::PillowJumps => year.jump(),
                Rule::TemperatureRange => year.among(&odd_ranges),
                Rule::TemperatureFar => year.among(&far_values),
            });
            left_out.extend(Rule::EACH.into_iter().zip(found).filter_map(|(rule, found)| {
                let water_year = year.span.water_year;
                found.map(|found| LeftOut { site: site.name.to_owned(), water_year, rule, found })
            }));
        }
    }
    left_out
}

/// What remains of a site's readings; none where no year in use has one.
pub fn without(site: &Site<'_>, left_out: &[LeftOut], weather: &Series) -> Option<Observations> {
    let gone: Vec<&YearSpan> = weather
        .years
        .iter()
        .filter(|span| left_out.iter().any(|out| out.site == site.name && out.water_year == span.water_year))
        .collect();
    let is_gone =
        |date| gone.iter().any(|span| (span.first..date_of(span.first, span.days + 1)).contains(&date));
    let mut remaining = site.observations.clone();
    remaining.states.retain(|state| !is_gone(state.date));
    let is_in_use = weather
        .years
        .iter()
        .any(|span| observed_days(Some(&remaining), span.first, span.days).iter().any(Option::is_some));
    is_in_use.then_some(remaining)
}

/// A water year of a site.
struct SiteYear<'a> {
    span: &'a YearSpan,
    weather: YearView<'a>,
    observed: Vec<Option<f64>>,
    is_daily: bool,
    /// So much warmer the site is than the station, where it lies below it, degC.
    warmer_c: f64,
}

impl<'a> SiteYear<'a> {
    fn of(site: &Site<'_>, weather: &'a Series, span: &'a YearSpan, station_m: f64) -> Option<Self> {
        let observed = observed_days(Some(site.observations), span.first, span.days);
        let is_daily = site.observations.kind == Kind::Pillow;
        observed.iter().any(Option::is_some).then(|| Self {
            span,
            weather: weather.view(span),
            observed,
            is_daily,
            warmer_c: (C_PER_M * (station_m - site.elevation_m)).max(0.0),
        })
    }

    /// What was found in this year.
    fn among(&self, found: &[(i32, String)]) -> Option<String> {
        let of_year = found.iter().find(|(water_year, _)| *water_year == self.span.water_year);
        of_year.map(|(_, found)| found.clone())
    }

    /// Days with a reading as they begin and as they end: the change belongs to the day.
    fn changes(&self) -> impl Iterator<Item = (usize, f64, f64)> + '_ {
        let pairs = self.observed.windows(2).enumerate();
        pairs.filter(|_| self.is_daily).filter_map(|(day, pair)| Some((day, pair[0]?, pair[1]?)))
    }

    /// Whether a day is cold both where the gauge is and where the pillow is.
    fn is_cold(&self, day: usize) -> bool {
        self.weather.mean_c[day] + self.warmer_c <= COLD_C
    }

    /// What the pillow gained on cold days over what the gauge caught on them; none where little fell.
    fn ratio(&self) -> Option<f64> {
        let cold = self.changes().filter(|(day, _, _)| self.is_cold(*day));
        let (gained_mm, fell_mm) = cold.fold((0.0, 0.0), |(gained, fell), (day, before, after)| {
            (gained + (after - before), fell + self.weather.precipitation_mm[day])
        });
        (fell_mm >= LEAST_COLD_MM).then(|| gained_mm / fell_mm)
    }

    fn unlike_gauge(&self, median: f64) -> Option<String> {
        let ratio = self.ratio()?;
        let is_alike = (median / GAUGE_FACTOR..=median * GAUGE_FACTOR).contains(&ratio);
        (!is_alike).then(|| format!("{ratio:.2} where the median year has {median:.2}"))
    }

    fn stuck(&self) -> Option<String> {
        let (mut days, mut fell_mm) = (0, 0.0);
        let mut follows = 0;
        for (day, before, after) in self.changes() {
            if day != follows {
                (days, fell_mm) = (0, 0.0);
            }
            follows = day + 1;
            if before > SNOW_MM && after == before {
                days += 1;
                if self.is_cold(day) {
                    fell_mm += self.weather.precipitation_mm[day];
                }
                if days >= FLAT_DAYS && fell_mm >= FLAT_MM {
                    let date = date_of(self.span.first, day + 1);
                    return Some(format!("{before:.0} mm for {days} days to {date}, {fell_mm:.0} mm fell"));
                }
            } else {
                (days, fell_mm) = (0, 0.0);
            }
        }
        None
    }

    fn jump(&self) -> Option<String> {
        self.changes().find_map(|(day, before, after)| {
            let around = day.saturating_sub(JUMP_REACH_DAYS)..(day + JUMP_REACH_DAYS + 1).min(self.span.days);
            let fell_mm: f64 = self.weather.precipitation_mm[around].iter().sum();
            let rise_mm = after - before;
            (rise_mm >= JUMP_MM && rise_mm > 2.0 * fell_mm).then(|| {
                format!("{rise_mm:.0} mm on {}, {fell_mm:.0} mm fell", date_of(self.span.first, day + 1))
            })
        })
    }
}

fn median_ratio(years: &[SiteYear<'_>]) -> Option<f64> {
    let ratios: Vec<f64> = years.iter().filter_map(SiteYear::ratio).collect();
    (ratios.len() >= LEAST_YEARS).then(|| median(ratios)).filter(|median| *median > 0.0)
}

#[cfg(test)]
mod tests;
