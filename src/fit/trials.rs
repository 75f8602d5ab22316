//! Trials: many sets of parameters run side by side where snow was observed, each held against the years of its choice.

use super::held_against::{ObservedYear, observed_years};
use super::objective::Objective;
use super::parameter::Parameters;
use super::site::Site;
use super::sums::{Sums, sums_of_year};
use crate::basin::{Basin, Ground};
use crate::calendar::MonthDay;
use crate::perturb::MonthlyChange;
use crate::snow::{Engine, LaneSpec, Lanes, OpenLedger};
use crate::weather::Series;
use rayon::prelude::*;

/// Trials that run side by side; more of them would leave the second-level cache, fewer would leave vectors empty.
const SIDE_BY_SIDE: usize = 32;

/// A set of parameters, and the choice of years that it is held against.
#[derive(Debug, Clone)]
pub struct Trial {
    /// The parameters.
    pub parameters: Parameters,
    /// The choice, by its place in the list.
    pub choice: usize,
}

/// What trials are run on.
pub struct Trials<'a> {
    sites: &'a [Site<'a>],
    observed: Vec<Vec<ObservedYear>>,
    weather: &'a Series,
    latitude_deg: f64,
    station_m: f64,
    objective: Objective,
    /// `[choice][year]`: how many times the year counts.
    choices: Vec<Vec<u32>>,
}

impl<'a> Trials<'a> {
    /// Trials at some sites, on the record as the gauge caught it, held against choices of its years, `[choice][year]`: how many
    /// times each year counts.
    pub fn new(
        sites: &'a [Site<'a>],
        weather: &'a Series,
        (latitude_deg, station_m): (f64, f64),
        survey: MonthDay,
        objective: Objective,
        choices: Vec<Vec<u32>>,
    ) -> Self {
        let observed = sites.iter().map(|site| observed_years(site, weather, survey)).collect();
        Self { sites, observed, weather, latitude_deg, station_m, objective, choices }
    }

    /// The objective of every trial, in their order; the mean over the sites that have one, and minus infinity where none has.
    ///
    /// # Errors
    /// A ledger that does not close.
    pub fn values(&self, trials: &[Trial]) -> Result<Vec<f64>, OpenLedger> {
        let chunks: Result<Vec<Vec<f64>>, OpenLedger> =
            trials.par_chunks(SIDE_BY_SIDE).map(|chunk| self.side_by_side(chunk)).collect();
        Ok(chunks?.concat())
    }

    fn side_by_side(&self, trials: &[Trial]) -> Result<Vec<f64>, OpenLedger> {
        let lanes = self.lanes(trials);
        let mut sums = vec![vec![Sums::default(); trials.len()]; self.sites.len()];
        let mut engine = Engine::new(&lanes, false);
        let mut year = 0;
        engine.years(self.weather, |_, block| {
            for (place, (sums, observed)) in sums.iter_mut().zip(&self.observed).enumerate() {
                let of_year = sums_of_year(block, lanes.column(0, place), trials.len(), &observed[year]);
                for ((sums, of_year), trial) in sums.iter_mut().zip(of_year).zip(trials) {
                    for _ in 0..self.choices[trial.choice][year] {
                        *sums += of_year;
                    }
                }
            }
            year += 1;
            Ok::<(), OpenLedger>(())
        })?;
        let value = |trial: usize| {
            let of_sites = sums.iter().filter_map(|sums| self.objective.value(&sums[trial]));
            let (sum, count) = of_sites.fold((0.0, 0.0), |(sum, count), value| (sum + value, count + 1.0));
            if count > 0.0 { sum / count } else { f64::NEG_INFINITY }
        };
        Ok((0..trials.len()).map(value).collect())
    }

    /// A group of lanes a trial, a place a site.
    fn lanes(&self, trials: &[Trial]) -> Lanes {
        let places = trials.iter().map(|trial| {
            let Parameters { temperature, precipitation, snow, .. } = trial.parameters.clone();
            let basin =
                Basin { latitude_deg: self.latitude_deg, bands: Vec::new(), temperature, precipitation };
            (basin, snow.at_a_point())
        });
        let places: Vec<_> = places.collect();
        let share = 1.0 / self.sites.len() as f64;
        let groups: Vec<Vec<LaneSpec<'_>>> = places
            .iter()
            .map(|(basin, snow)| {
                let of_site = |site: &Site<'_>| LaneSpec {
                    basin,
                    station_m: self.station_m,
                    elevation_m: site.elevation_m,
                    ground: Ground::default(),
                    change: &MonthlyChange::NONE,
                    warming_factor: 1.0,
                    snow,
                    share,
                };
                self.sites.iter().map(of_site).collect()
            })
            .collect();
        let gauges: Vec<_> = trials.iter().map(|trial| trial.parameters.gauge).collect();
        Lanes::new(&groups).on_the_gauge(&gauges, self.station_m)
    }
}

#[cfg(test)]
mod tests;
