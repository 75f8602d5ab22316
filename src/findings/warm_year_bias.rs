//! The model's own error in winters warmer than it was fitted on, beside the warming effect that a study reports: where they are
//! of one size, the effect may be the model's.

use super::measure::MeasureFindings;
use crate::fit::SkillInShort;
use serde::Serialize;

/// A bias of so large a share of the effect is comparable with it (a choice).
pub const COMPARABLE_SHARE: f64 = 0.5;

/// A site's bias beside the effect.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct WarmYearBias {
    /// The site.
    pub site: String,
    /// How much warmer the winters judged were than those fitted on, degC.
    pub halves_apart_c: f64,
    /// Bias of survey SWE in them, percent of the observed.
    pub bias_pct: f64,
    /// Its standard error, percent.
    pub standard_error_pct: Option<f64>,
    /// The level above the reference nearest to as much warming, degC; of two as near the lower.
    pub level_c: f64,
    /// What it changes the headline measure by, percent of the reference's median.
    pub effect_pct: f64,
    /// Size of the bias over size of the effect; none where there is no effect.
    pub share: Option<f64>,
    /// Whether the bias is at least half of the effect, or there is none.
    pub is_comparable: bool,
}

/// Of every site that says how it does in warm winters; none where no level above the reference changes the measure by a
/// percentage.
pub fn warm_year_biases(
    skill: &[SkillInShort],
    headline: &MeasureFindings,
    reference_c: f64,
) -> Vec<WarmYearBias> {
    let levels: Vec<(f64, f64)> = headline
        .levels
        .iter()
        .filter(|level| level.level_c > reference_c)
        .filter_map(|level| Some((level.level_c, level.percent_change?)))
        .collect();
    skill.iter().filter_map(|skill| of_site(skill, &levels, reference_c)).collect()
}

fn of_site(skill: &SkillInShort, levels: &[(f64, f64)], reference_c: f64) -> Option<WarmYearBias> {
    let bias_pct = skill.survey_bias_colder_to_warmer_pct?;
    let off = |level_c: f64| (level_c - reference_c - skill.halves_apart_c).abs();
    let (level_c, effect_pct) =
        levels.iter().copied().min_by(|(a, _), (b, _)| off(*a).total_cmp(&off(*b)))?;
    let share = (effect_pct != 0.0).then(|| (bias_pct / effect_pct).abs());
    Some(WarmYearBias {
        site: skill.site.clone(),
        halves_apart_c: skill.halves_apart_c,
        bias_pct,
        standard_error_pct: skill.survey_bias_standard_error_pct,
        level_c,
        effect_pct,
        share,
        is_comparable: share.is_none_or(|share| share >= COMPARABLE_SHARE),
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn skill(bias_pct: Option<f64>) -> SkillInShort {
        SkillInShort {
            site: "pillow".to_owned(),
            winters: 20,
            nash_sutcliffe: Some(0.96),
            nash_sutcliffe_not_seen: Some(0.95),
            nash_sutcliffe_colder_to_warmer: Some(0.94),
            survey_bias_colder_to_warmer_pct: bias_pct,
            survey_bias_standard_error_pct: Some(3.0),
            halves_apart_c: 1.9,
        }
    }

    /// By hand: halves 1.9 degC apart are nearest to +2 degC, which takes 20 %: a bias of -6 % is 0.3 of it, one of 11 % is 0.55.
    #[test]
    fn the_bias_stands_beside_the_level_nearest_to_the_halves() {
        let levels = [(1.0, -9.0), (2.0, -20.0), (3.0, -31.0)];
        let small = of_site(&skill(Some(-6.0)), &levels, 0.0).expect("a bias and levels");
        assert_eq!((small.level_c, small.effect_pct, small.is_comparable), (2.0, -20.0, false));
        assert!((small.share.expect("an effect") - 0.3).abs() < 1e-12);
        assert!(of_site(&skill(Some(11.0)), &levels, 0.0).is_some_and(|large| large.is_comparable));
        let above_one = of_site(&skill(Some(-6.0)), &levels, 1.0).expect("a bias and levels");
        assert_eq!(above_one.level_c, 3.0, "1.9 degC above a reference of 1 degC");
    }

    /// A warming that changes nothing is comparable with any bias; without a bias, or without levels, there is nothing to say.
    #[test]
    fn no_effect_no_bias_no_levels() {
        let flat = of_site(&skill(Some(0.5)), &[(2.0, 0.0)], 0.0).expect("a bias and a level");
        assert_eq!((flat.share, flat.is_comparable), (None, true));
        assert_eq!(of_site(&skill(None), &[(2.0, -20.0)], 0.0), None);
        assert_eq!(of_site(&skill(Some(1.0)), &[], 0.0), None);
    }
}
