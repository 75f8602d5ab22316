//! What a fit says of itself to whoever takes its parameters: skill in winters seen and not seen, and the bias in warm ones.

use super::not_seen::not_seen;
use super::run::FitResult;
use super::splits::{Split, Winter, winters_of};
use serde::de::Error;
use serde::{Deserialize, Deserializer, Serialize};

/// A site's skill in short. Errors are modelled less observed.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct SkillInShort {
    /// The site.
    pub site: String,
    /// Winters with observed snow.
    pub winters: usize,
    /// Nash-Sutcliffe efficiency of the fit on all winters, which has seen them.
    #[serde(default, deserialize_with = "some_finite")]
    pub nash_sutcliffe: Option<f64>,
    /// Of the fits on every other winter, each in those that it has not seen.
    #[serde(default, deserialize_with = "some_finite")]
    pub nash_sutcliffe_not_seen: Option<f64>,
    /// Of the fit on the coldest half of the winters, in the warmest.
    #[serde(default, deserialize_with = "some_finite")]
    pub nash_sutcliffe_colder_to_warmer: Option<f64>,
    /// Bias of its SWE on the first survey date there, percent.
    #[serde(default, deserialize_with = "some_finite")]
    pub survey_bias_colder_to_warmer_pct: Option<f64>,
    /// Standard error of that, percent.
    #[serde(default, deserialize_with = "some_finite")]
    pub survey_bias_standard_error_pct: Option<f64>,
    /// How much warmer the winters of the warmest half are than those of the coldest, degC.
    #[serde(deserialize_with = "finite")]
    pub halves_apart_c: f64,
}

fn finite<'de, D: Deserializer<'de>>(from: D) -> Result<f64, D::Error> {
    let number = f64::deserialize(from)?;
    if number.is_finite() { Ok(number) } else { Err(D::Error::custom("a number that is not finite")) }
}

fn some_finite<'de, D: Deserializer<'de>>(from: D) -> Result<Option<f64>, D::Error> {
    finite(from).map(Some)
}

/// Of every site.
pub fn skill_in_short(result: &FitResult) -> Vec<SkillInShort> {
    let mean_c = |split: Split| {
        let is_in = winters_of(split, &result.winters);
        let of_split = || result.winters.iter().zip(&is_in).filter(|(_, is_in)| **is_in);
        of_split().map(|(winter, _): (&Winter, _)| winter.mean_c).sum::<f64>() / of_split().count() as f64
    };
    let halves_apart_c = mean_c(Split::Warmest) - mean_c(Split::Coldest);
    let cold = result.fitted.iter().find(|fitted| fitted.split == Split::Coldest);
    let not_seen = not_seen(result);
    let of_site = |(at, seen): (usize, &super::judged::Judged)| {
        let in_warm = cold.and_then(|cold| cold.on_others.get(at));
        SkillInShort {
            site: seen.site.clone(),
            winters: seen.years,
            nash_sutcliffe: seen.nash_sutcliffe,
            nash_sutcliffe_not_seen: not_seen.get(at).and_then(|comparison| comparison.nash_sutcliffe),
            nash_sutcliffe_colder_to_warmer: in_warm.and_then(|judged| judged.nash_sutcliffe),
            survey_bias_colder_to_warmer_pct: in_warm.and_then(|judged| judged.survey?.bias_pct),
            survey_bias_standard_error_pct: in_warm.and_then(|judged| judged.survey_standard_error_pct),
            halves_apart_c,
        }
    };
    result.fitted[0].on_own.iter().enumerate().map(of_site).collect()
}
