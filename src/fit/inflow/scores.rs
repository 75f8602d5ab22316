//! How near modelled inflow comes to observed inflow, day by day and in the volumes of a window.

use super::super::day_of_year_mean::{JudgedYear, skill_of};
use super::super::scores::{KlingGupta, Pair, kling_gupta, nash_sutcliffe};
use super::days::{InflowRecord, InflowYear};
use crate::calendar::{MonthDay, day_of_water_year};
use crate::inflow::Routing;
use serde::Serialize;

/// Scores over the days with observed inflow of some years.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct InflowScores {
    /// Days that are compared.
    pub days: usize,
    /// Years with such days.
    pub years: usize,
    /// Nash-Sutcliffe efficiency of daily inflow.
    pub nash_sutcliffe: Option<f64>,
    /// Kling-Gupta efficiency (2009) of daily inflow.
    pub kling_gupta: Option<KlingGupta>,
    /// 100 * (modelled - observed)/observed of all that flowed in on these days, percent.
    pub bias_pct: Option<f64>,
    /// `1 - sum((modelled - observed)^2) / sum((mean - observed)^2)` of daily inflow, the mean that of other years on the same day of
    /// the water year; of days with five other years.
    pub skill_above_day_of_year_mean: Option<f64>,
    /// The same questions of the window's volumes; none without a window.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub window: Option<VolumeScores>,
}

/// Scores over the volumes of a window, of the years whose window has observed inflow on every day.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct VolumeScores {
    /// First day.
    pub from: MonthDay,
    /// Last day.
    pub to: MonthDay,
    /// Years that are compared.
    pub years: usize,
    /// Years that are left out, since a day or more of their window lacks observed inflow.
    pub years_left_out: usize,
    /// Mean observed volume, hm3.
    pub observed_mean_hm3: Option<f64>,
    /// Mean modelled volume of the same years, hm3.
    pub modelled_mean_hm3: Option<f64>,
    /// Linear correlation of modelled with observed volumes.
    pub correlation: Option<f64>,
    /// Mean size of the error, percent of the mean observed volume.
    pub mean_absolute_error_pct: Option<f64>,
    /// 100 * (modelled - observed)/observed of the means, percent.
    pub bias_pct: Option<f64>,
    /// Skill above the mean volume of other years, of at least five.
    pub skill_above_other_years_mean: Option<f64>,
}

impl InflowRecord {
    /// How a routing does on some of the years.
    pub fn scores(&self, routing: &Routing, is_judged: &[bool]) -> InflowScores {
        let modelled = self.routed(routing);
        let pairs = self.pairs(&modelled, is_judged);
        let judged = self.years.iter().zip(&modelled).zip(is_judged);
        let by_year = judged.map(|((year, modelled), is_judged)| JudgedYear {
            is_judged: *is_judged,
            days: year.observed_hm3.iter().copied().zip(modelled.iter().copied()).collect(),
        });
        let years = self.observed_years().iter().zip(is_judged).filter(|(has, is)| **has && **is).count();
        InflowScores {
            days: pairs.len(),
            years,
            nash_sutcliffe: nash_sutcliffe(&pairs),
            kling_gupta: kling_gupta(&pairs),
            bias_pct: bias_pct(&pairs),
            skill_above_day_of_year_mean: skill_of(&by_year.collect::<Vec<_>>()),
            window: self.window.map(|window| self.volume_scores(window, &modelled, is_judged)),
        }
    }

    /// Observed and modelled inflow of every day with both, of the years that count.
    pub(super) fn pairs(&self, modelled: &[Vec<f64>], is_judged: &[bool]) -> Vec<Pair> {
        let judged = self.years.iter().zip(modelled).zip(is_judged).filter(|(_, is_judged)| **is_judged);
        let of_year = |((year, modelled), _): ((&InflowYear, &Vec<f64>), _)| {
            let days = year.observed_hm3.iter().zip(modelled);
            let both = days.filter_map(|(observed, modelled)| Some(pair(((*observed)?, *modelled))));
            both.collect::<Vec<_>>()
        };
        judged.flat_map(of_year).collect()
    }

    fn volume_scores(
        &self,
        [from, to]: [MonthDay; 2],
        modelled: &[Vec<f64>],
        is_judged: &[bool],
    ) -> VolumeScores {
        let volumes = self.years.iter().zip(modelled).map(|(year, modelled)| {
            let at = |day| day_of_water_year(year.first, day) - 1;
            let window = at(from)..=at(to);
            let observed: Option<f64> = year.observed_hm3[window.clone()].iter().copied().sum();
            (observed, modelled[window].iter().sum())
        });
        let volumes: Vec<(Option<f64>, f64)> = volumes.collect();
        let judged = || volumes.iter().zip(is_judged).filter(|(_, is_judged)| **is_judged);
        let pairs = judged().filter_map(|((observed, modelled), _)| Some(pair(((*observed)?, *modelled))));
        let pairs: Vec<Pair> = pairs.collect();
        let mean = |of: fn(&Pair) -> f64| {
            (!pairs.is_empty()).then(|| pairs.iter().map(of).sum::<f64>() / pairs.len() as f64)
        };
        let observed_mean_hm3 = mean(|pair| pair.observed);
        let by_year = volumes
            .iter()
            .zip(is_judged)
            .map(|(volume, is_judged)| JudgedYear { is_judged: *is_judged, days: vec![*volume] });
        VolumeScores {
            from,
            to,
            years: pairs.len(),
            years_left_out: judged().count() - pairs.len(),
            observed_mean_hm3,
            modelled_mean_hm3: mean(|pair| pair.modelled),
            correlation: kling_gupta(&pairs).map(|parts| parts.correlation),
            mean_absolute_error_pct: mean(|pair| (pair.modelled - pair.observed).abs())
                .zip(observed_mean_hm3.filter(|observed| *observed > 0.0))
                .map(|(error, observed)| 100.0 * error / observed),
            bias_pct: bias_pct(&pairs),
            skill_above_other_years_mean: skill_of(&by_year.collect::<Vec<_>>()),
        }
    }
}

fn pair((observed, modelled): (f64, f64)) -> Pair {
    Pair { observed, modelled }
}

/// None where no water was observed.
fn bias_pct(pairs: &[Pair]) -> Option<f64> {
    let (observed, modelled) =
        pairs.iter().fold((0.0, 0.0), |sums, pair| (sums.0 + pair.observed, sums.1 + pair.modelled));
    (observed > 0.0).then(|| 100.0 * (modelled / observed - 1.0))
}
