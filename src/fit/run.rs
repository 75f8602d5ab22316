//! A fit: searched for on every split of the winters at once, judged on the years it saw and on those it did not.

use super::comparison::Comparison;
use super::judged::{Held, Judged};
use super::objective::Objective;
use super::parameter::Parameters;
use super::profile::{Profile, profiles};
use super::refine::refine;
use super::resampled_winters::resampled_winters;
use super::search::{Asked, Found, Search, search};
use super::space::{Bounded, Space, Value};
use super::splits::{Split, Winter, winters_of};
use super::trials::{Trial, Trials};
use super::uncertainty::{RESAMPLES, Uncertainty, uncertainty};
use crate::snow::OpenLedger;
use serde::Serialize;
use thiserror::Error;

/// A fit needs so many winters with observed snow: three in each half.
pub const LEAST_WINTERS: usize = 6;

/// What a fit does.
#[derive(Debug, Clone)]
pub struct Plan<'a> {
    /// What is held against what.
    pub held: Held<'a>,
    /// The scenario's parameters: where the first search begins, and what is judged beside the fitted ones.
    pub stated: Parameters,
    /// What is searched for.
    pub searched: Vec<Bounded>,
    /// What is made as large as it can be.
    pub objective: Objective,
    /// Searches of each split.
    pub starts: usize,
    /// Sets of parameters that each search tries.
    pub evaluations: usize,
    /// Sets of parameters that are handed on, the best among them, at most.
    pub sets: usize,
    /// Seed of the searches, and of the winters that are drawn anew.
    pub seed: u64,
}

/// Told of a fit's progress; asked between sets of trials whether to stop. Every event is optional.
pub trait Follow {
    /// A stage begins.
    fn begins(&mut self, _stage: Stage) {}
    /// So many more sets of parameters have been tried.
    fn tried(&mut self, _sets: usize) {}
    /// Whether the fit should stop.
    fn wants_stop(&self) -> bool {
        false
    }
}

/// Follows nothing.
#[derive(Debug, Clone, Copy)]
pub struct Unfollowed;

impl Follow for Unfollowed {}

/// A stage of a fit.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Stage {
    /// Searches, and the refinement of the best of each split.
    Search,
    /// Profiles of all parameters.
    Profiles,
    /// The same as the first without parameters that are not identified.
    Again,
    /// Fits to winters drawn anew.
    OtherWinters,
}

/// Why a fit has no result.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum FitEnd {
    /// It was asked to stop.
    #[error("stopped")]
    Stopped,
    /// Too few winters with observed snow, and how many there are.
    #[error("{0} winters with observed snow")]
    TooFewWinters(usize),
    /// Water was lost or made: a fault of the engine.
    #[error(transparent)]
    Ledger(#[from] OpenLedger),
}

/// A fit on one split.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Fitted {
    /// The split whose years it has seen.
    pub split: Split,
    /// The parameters searched for.
    pub values: Vec<Value>,
    /// All parameters.
    #[serde(skip)]
    pub parameters: Parameters,
    /// The objective on these years.
    pub objective: f64,
    /// Its best by each search, before refinement: how far they agree says how sure the search is.
    pub by_start: Vec<f64>,
    /// Judged on the years it has seen, a site each.
    pub on_own: Vec<Judged>,
    /// Judged on the years of the other half; of all years none.
    pub on_others: Vec<Judged>,
    /// Against what was observed in every year, seen or not, a site each.
    #[serde(skip)]
    pub compared: Vec<Comparison>,
}

/// What a fit found.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct FitResult {
    /// The winters in use.
    pub winters: Vec<Winter>,
    /// A fit a split, in their order: the first is that of all years, whose parameters are the result.
    pub fitted: Vec<Fitted>,
    /// The scenario's parameters judged on the years of each split, a site each.
    pub unfitted: Vec<(Split, Vec<Judged>)>,
    /// The objective over the bounds of each parameter, about a fit on all years: those that are identified, then those that
    /// are not, each as it was when it went back to the scenario's value.
    pub profiles: Vec<Profile>,
    /// Keys that the snow does not identify: they stay at the scenario's values.
    pub not_identified: Vec<&'static str>,
    /// How far other winters might have led the fit on all years.
    pub uncertainty: Uncertainty,
    /// Sets of parameters that were tried.
    pub tried: usize,
}

/// Fits.
///
/// # Errors
/// Too few winters with observed snow, a wish to stop, or a ledger that does not close.
pub fn fit(plan: &Plan<'_>, follow: &mut dyn Follow) -> Result<FitResult, FitEnd> {
    let winters = winters(plan)?;
    let splits = Split::EACH.map(|split| winters_of(split, &winters)).to_vec();
    let of_splits = splits.iter().map(|is_in| is_in.iter().copied().map(u32::from).collect());
    let choices = of_splits.chain(resampled_winters(&winters, RESAMPLES, plan.seed)).collect();
    let held = plan.held;
    let trials = Trials::new(
        held.sites,
        held.weather,
        (held.basin.latitude_deg, held.station_m),
        held.season.survey_dates[0],
        plan.objective,
        choices,
    );
    let mut run = Run { plan, trials, follow, tried: 0 };
    let mut space = Space::new(&plan.stated, &plan.searched);
    run.follow.begins(Stage::Search);
    let mut found = run.search(&space)?;
    run.follow.begins(Stage::Profiles);
    let told = run.told(space.clone(), found[0].best.clone())?;
    if !told.not_identified.is_empty() {
        space = told.space.clone();
        run.follow.begins(Stage::Again);
        found = run.search(&space)?;
    }
    run.follow.begins(Stage::OtherWinters);
    let observed = winters.iter().filter(|winter| winter.is_observed).count();
    let uncertainty = uncertainty(&space, &found[0].best, observed, plan.sets, |asked| {
        // Behind the splits, of which all winters are the first, stand the resamples.
        let choice = |place: usize| if place == 0 { 0 } else { Split::EACH.len() + place - 1 };
        run.values(&space, asked.iter().map(|asked| (choice(asked.searcher), asked.point.as_slice())))
    })?;
    let tried = run.tried;
    let mut fitted = Vec::with_capacity(found.len());
    for (split, found) in Split::EACH.into_iter().zip(found) {
        let parameters = space.at(&found.best.point);
        let compared = held.compared(&parameters)?;
        let on = |split: Split| -> Vec<Judged> {
            let is_judged = winters_of(split, &winters);
            compared.iter().map(|comparison| Judged::of(comparison, &winters, &is_judged)).collect()
        };
        fitted.push(Fitted {
            split,
            values: space.values(&parameters),
            objective: found.best.value,
            by_start: found.by_start,
            on_own: on(split),
            on_others: split.others().map(on).unwrap_or_default(),
            parameters,
            compared,
        });
    }
    let as_stated = held.compared(&plan.stated)?;
    let unfitted = Split::EACH.into_iter().zip(&splits).map(|(split, is_judged)| {
        (split, as_stated.iter().map(|comparison| Judged::of(comparison, &winters, is_judged)).collect())
    });
    let unfitted = unfitted.collect();
    let Told { profiles, not_identified, .. } = told;
    Ok(FitResult { winters, fitted, unfitted, profiles, not_identified, uncertainty, tried })
}

/// The winters of all years in use.
fn winters(plan: &Plan<'_>) -> Result<Vec<Winter>, FitEnd> {
    let Held { weather, basin, sites, season, .. } = plan.held;
    let winters: Vec<Winter> = weather
        .years
        .iter()
        .map(|year| {
            let end = year.first + chrono::Days::new(year.days as u64);
            let is_observed = sites.iter().any(|site| {
                site.observations.states.iter().any(|state| (year.first..end).contains(&state.date))
            });
            Winter::of(weather, year, season.survey_dates[0], basin.is_southern(), is_observed)
        })
        .collect();
    let observed = winters.iter().filter(|winter| winter.is_observed).count();
    if observed < LEAST_WINTERS { Err(FitEnd::TooFewWinters(observed)) } else { Ok(winters) }
}

/// What the snow tells of the parameters.
struct Told {
    /// Those that are identified.
    space: Space,
    profiles: Vec<Profile>,
    not_identified: Vec<&'static str>,
}

/// What the searches of one split found.
struct OfSplit {
    best: Found,
    by_start: Vec<f64>,
}

/// A fit under way.
struct Run<'a, 'f> {
    plan: &'a Plan<'a>,
    trials: Trials<'a>,
    follow: &'f mut dyn Follow,
    tried: usize,
}

impl Run<'_, '_> {
    /// Searches every split from all starts side by side, and refines the best of each.
    fn search(&mut self, space: &Space) -> Result<Vec<OfSplit>, FitEnd> {
        let starts = self.plan.starts;
        let begins = |searcher: usize| (searcher.is_multiple_of(starts)).then(|| space.start());
        let search_plan = Search {
            seed: self.plan.seed,
            starts: (0..Split::EACH.len() * starts).map(begins).collect(),
            dimensions: space.searched().len(),
            evaluations: self.plan.evaluations,
        };
        let of_all = search(&search_plan, |asked: &[Asked]| {
            self.values(space, asked.iter().map(|asked| (asked.searcher / starts, asked.point.as_slice())))
        })?;
        let best = |found: &[Found]| {
            found.iter().skip(1).fold(found[0].clone(), |best, found| {
                if found.value > best.value { found.clone() } else { best }
            })
        };
        let mut refined: Vec<Found> = of_all.chunks(starts).map(best).collect();
        refine(&mut refined, |asked: &[Asked]| {
            self.values(space, asked.iter().map(|asked| (asked.searcher, asked.point.as_slice())))
        })?;
        let by_start = of_all.chunks(starts).map(|found| found.iter().map(|found| found.value).collect());
        Ok(refined.into_iter().zip(by_start).map(|(best, by_start)| OfSplit { best, by_start }).collect())
    }

    /// Profiles about the best of all years. Parameters that make up for each other are flat each by itself, though not
    /// together: so the flattest alone goes back to the scenario's value, the others are refined, and all are asked again.
    fn told(&mut self, mut space: Space, mut best: Found) -> Result<Told, FitEnd> {
        let (mut gone, mut not_identified) = (Vec::new(), Vec::new());
        loop {
            let mut profiles = profiles(&space, &best, |points| {
                self.values(&space, points.iter().map(|point| (0, point.as_slice())))
            })?;
            let falls = profiles.iter().enumerate().filter(|(_, profile)| !profile.is_identified);
            let flattest = falls.min_by(|(_, a), (_, b)| a.fall.total_cmp(&b.fall)).map(|(at, _)| at);
            let Some(at) = flattest.filter(|_| profiles.len() > 1) else {
                profiles.extend(gone);
                return Ok(Told { space, profiles, not_identified });
            };
            not_identified.push(profiles[at].key);
            gone.push(profiles.swap_remove(at));
            space = space.without(at);
            best.point.remove(at);
            best.value = self.values(&space, std::iter::once((0, best.point.as_slice())))?[0];
            let mut refined = [best];
            refine(&mut refined, |asked: &[Asked]| {
                self.values(&space, asked.iter().map(|asked| (0, asked.point.as_slice())))
            })?;
            [best] = refined;
        }
    }

    /// The objective of points, each with its choice of years.
    fn values<'p>(
        &mut self,
        space: &Space,
        points: impl Iterator<Item = (usize, &'p [f64])>,
    ) -> Result<Vec<f64>, FitEnd> {
        if self.follow.wants_stop() {
            return Err(FitEnd::Stopped);
        }
        let trials: Vec<Trial> =
            points.map(|(choice, point)| Trial { parameters: space.at(point), choice }).collect();
        let values = self.trials.values(&trials)?;
        self.tried += trials.len();
        self.follow.tried(trials.len());
        Ok(values)
    }
}

#[cfg(test)]
mod tests;
