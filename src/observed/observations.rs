//! What was observed at one site: states in order of their dates, and what they are.

use crate::basin::Basin;
use crate::calendar::{date_of, days_between};
use crate::fault::Unlikely;
use crate::weather::{Series, Suspicion};
use chrono::NaiveDate;
use serde::Serialize;

/// A site farther than this above or below all bands tells little about them, m.
const BAND_REACH_M: f64 = 500.0;
/// Gradients are hardly known well enough to carry a station's weather farther than this up or down, m.
const STATION_REACH_M: f64 = 1000.0;

/// How a site is observed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Kind {
    /// Every day, by an instrument: most readings stand a day after another.
    Pillow,
    /// On a few dates a year, by people.
    Course,
}

impl Kind {
    /// `snow pillow`, `snow course`.
    pub fn words(self) -> &'static str {
        match self {
            Self::Pillow => "snow pillow",
            Self::Course => "snow course",
        }
    }
}

/// Snow water equivalent as a day begins.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct State {
    /// The day.
    pub date: NaiveDate,
    /// SWE as it begins, mm.
    pub swe_mm: f64,
}

/// What was counted while a site's file was read.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub struct Counts {
    /// Lines with a reading.
    pub readings: usize,
    /// Date of the first reading, as the file has it.
    pub first: NaiveDate,
    /// Date of the last reading.
    pub last: NaiveDate,
    /// Lines without a reading, the impossible ones included.
    pub lines_without_reading: usize,
    /// Readings beyond what any snowpack has held; they are taken as missing.
    pub impossible_readings: usize,
}

/// What was observed at a site.
#[derive(Debug, Clone, PartialEq)]
pub struct Observations {
    /// S(d), by date; never empty, and no date twice.
    pub states: Vec<State>,
    /// How the site is observed.
    pub kind: Kind,
    /// Counts.
    pub counts: Counts,
    /// Readings that are hardly snow.
    pub suspicions: Vec<Suspicion>,
}

impl Observations {
    /// A pillow where more than half of the readings stand a day after another, else a course.
    pub(super) fn kind_of(states: &[State]) -> Kind {
        let next_day = |pair: &&[State]| days_between(pair[0].date, pair[1].date) == 1;
        let daily = states.windows(2).filter(next_day).count();
        if 2 * daily > states.len() { Kind::Pillow } else { Kind::Course }
    }

    /// What about the site at `elevation_m` and its readings is unlikely. `key` is the scenario's for it,
    /// `observed_swe[0]`.
    pub fn unlikely(&self, key: &str, elevation_m: f64, basin: &Basin, station_m: f64) -> Vec<Unlikely> {
        let of_readings = self
            .suspicions
            .iter()
            .map(|suspicion| Unlikely::new(format!("{key}.{}", suspicion.about), suspicion.to_string()));
        let mut found: Vec<Unlikely> = of_readings.collect();
        let mut far = |why: String| found.push(Unlikely::new(format!("{key}.elevation_m"), why));
        if let (Some(lowest), Some(highest)) = (basin.bands.first(), basin.bands.last())
            && !(lowest.lower_m - BAND_REACH_M..=highest.upper_m + BAND_REACH_M).contains(&elevation_m)
        {
            far(format!(
                "{elevation_m} m lies far outside the bands, {} to {} m: are both in metres?",
                lowest.lower_m, highest.upper_m
            ));
        }
        if (elevation_m - station_m).abs() > STATION_REACH_M {
            far(format!(
                "{elevation_m} m lies more than {STATION_REACH_M} m above or below the weather station, {station_m} m: \
                 the comparison hangs on the gradients"
            ));
        }
        found
    }

    /// What to say where no reading lies in the water years in use.
    pub fn unused(&self, key: &str, weather: &Series) -> Option<Unlikely> {
        let is_in_use = |state: &State| {
            weather
                .years
                .iter()
                .any(|year| (year.first..date_of(year.first, year.days + 1)).contains(&state.date))
        };
        let Counts { first, last, .. } = self.counts;
        let why =
            format!("no reading from {first} to {last} lies in a water year in use: nothing to compare");
        (!self.states.iter().any(is_in_use)).then(|| Unlikely::new(format!("{key}.file"), why))
    }

    /// `snow course, 2290 m, 132 readings from 1984-12-30 to 2024-05-02`, and what of the file is no reading.
    pub fn words(&self, elevation: &str) -> String {
        let Counts { readings, first, last, lines_without_reading, impossible_readings } = self.counts;
        let plural = if readings == 1 { "" } else { "s" };
        let mut words =
            format!("{}, {elevation}, {readings} reading{plural} from {first} to {last}", self.kind.words());
        if lines_without_reading > 0 {
            words += &format!("; {lines_without_reading} lines without one");
        }
        if impossible_readings > 0 {
            words += &format!(", of them {impossible_readings} impossible");
        }
        words
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use chrono::Days;

    fn kind(ages: &[u64]) -> Kind {
        let first = NaiveDate::from_ymd_opt(2001, 1, 1).unwrap();
        let state = |age: &u64| State { date: first + Days::new(*age), swe_mm: 1.0 };
        Observations::kind_of(&ages.iter().map(state).collect::<Vec<_>>())
    }

    #[test]
    fn pillows_are_daily_and_courses_are_not() {
        assert_eq!(kind(&(0..30).collect::<Vec<_>>()), Kind::Pillow);
        assert_eq!(kind(&(0..30).filter(|day| day % 7 != 0).collect::<Vec<_>>()), Kind::Pillow);
        assert_eq!(kind(&[0, 31, 59, 90, 120]), Kind::Course);
        assert_eq!(kind(&[0, 1, 365, 366]), Kind::Course, "surveys that took two days");
        assert_eq!(kind(&[0]), Kind::Course);
    }
}
