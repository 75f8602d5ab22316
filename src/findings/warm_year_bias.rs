//! The model's own error in winters warmer than it was fitted on, beside the warming effect that a study reports: where they are
//! of one size, the effect may be the model's.

use super::measure::MeasureFindings;
use crate::fit::SkillInShort;
use serde::Serialize;

/// A bias of so large a share of the effect is comparable with it (a choice).
const COMPARABLE_SHARE: f64 = 0.5;
/// The bias may be so many of its standard errors larger than was found.
const STANDARD_ERRORS: f64 = 2.0;

/// How the bias compares with the effect.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum BiasVerdict {
    /// At least half of the effect.
    Comparable,
    /// Less, but so few winters, or no level so warm, that it may be comparable.
    CannotTell,
    /// Less than half of the effect, also if it is two standard errors larger.
    Smaller,
}

/// A site's bias beside the effect.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct WarmYearBias {
    /// The site.
    pub site: String,
    /// How much warmer the winters judged were than those fitted on, degC.
    pub halves_apart_c: f64,
    /// Bias of the site's survey SWE in them, percent of the observed.
    pub bias_pct: f64,
    /// Its standard error, percent; none of fewer than three winters.
    pub standard_error_pct: Option<f64>,
    /// What as much warming changes the basin's headline measure by, percent of the reference's median: on the straight line
    /// between the levels on either side. None where no level is as warm, or one has no percentage.
    pub effect_pct: Option<f64>,
    /// Size of the bias over size of the effect; none where there is none of these.
    pub share: Option<f64>,
    /// How the two compare.
    pub verdict: BiasVerdict,
}

/// Of every site that says how it does in warm winters; none where the warmest half was no warmer.
pub fn warm_year_biases(
    skill: &[SkillInShort],
    headline: &MeasureFindings,
    reference_c: f64,
) -> Vec<WarmYearBias> {
    let warmer = headline.levels.iter().filter(|level| level.level_c > reference_c);
    let others = warmer.map(|level| (level.level_c - reference_c, level.percent_change));
    let levels: Vec<(f64, Option<f64>)> = std::iter::once((0.0, Some(0.0))).chain(others).collect();
    skill.iter().filter_map(|skill| of_site(skill, &levels)).collect()
}

/// `levels` are warmings above the reference, ascending from 0, and what they change by.
fn of_site(skill: &SkillInShort, levels: &[(f64, Option<f64>)]) -> Option<WarmYearBias> {
    let bias_pct = skill.survey_bias_colder_to_warmer_pct?;
    let halves_apart_c = Some(skill.halves_apart_c).filter(|apart| *apart > 0.0)?;
    let effect_pct = effect_pct(levels, halves_apart_c);
    let share_of = |pct: f64| effect_pct.filter(|effect| *effect != 0.0).map(|effect| (pct / effect).abs());
    let share = share_of(bias_pct);
    let is_large = |share: f64| share >= COMPARABLE_SHARE;
    let standard_error_pct = skill.survey_bias_standard_error_pct;
    let at_most = standard_error_pct.and_then(|error| share_of(bias_pct.abs() + STANDARD_ERRORS * error));
    let verdict = if effect_pct == Some(0.0) || share.is_some_and(is_large) {
        BiasVerdict::Comparable
    } else if at_most.is_none_or(is_large) {
        BiasVerdict::CannotTell
    } else {
        BiasVerdict::Smaller
    };
    Some(WarmYearBias {
        site: skill.site.clone(),
        halves_apart_c,
        bias_pct,
        standard_error_pct,
        effect_pct,
        share,
        verdict,
    })
}

fn effect_pct(levels: &[(f64, Option<f64>)], warming_c: f64) -> Option<f64> {
    let pair = levels.windows(2).find(|pair| pair[1].0 >= warming_c)?;
    let [(below_c, below), (above_c, above)] = [pair[0], pair[1]];
    let (below, above) = below.zip(above)?;
    Some(below + (above - below) * (warming_c - below_c) / (above_c - below_c))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn skill(bias_pct: Option<f64>, standard_error_pct: Option<f64>, halves_apart_c: f64) -> SkillInShort {
        SkillInShort {
            site: "pillow".to_owned(),
            winters: 20,
            nash_sutcliffe: Some(0.96),
            nash_sutcliffe_not_seen: Some(0.95),
            nash_sutcliffe_colder_to_warmer: Some(0.94),
            survey_bias_colder_to_warmer_pct: bias_pct,
            survey_bias_standard_error_pct: standard_error_pct,
            halves_apart_c,
        }
    }

    const LEVELS: [(f64, Option<f64>); 3] = [(0.0, Some(0.0)), (1.0, Some(-10.0)), (3.0, Some(-34.0))];

    fn found(bias_pct: f64, error_pct: Option<f64>, apart_c: f64) -> WarmYearBias {
        of_site(&skill(Some(bias_pct), error_pct, apart_c), &LEVELS).expect("a bias and warmer winters")
    }

    /// By hand: +0.5 degC lies halfway to the 10 % of +1 degC: 5 %; +2.5 degC three quarters of the way from there to 34 %: 28 %.
    #[test]
    fn the_effect_is_that_of_as_much_warming() {
        assert_eq!(found(1.0, Some(0.5), 0.5).effect_pct, Some(-5.0));
        assert_eq!(found(1.0, Some(0.5), 2.5).effect_pct, Some(-28.0));
        assert_eq!(found(1.0, Some(0.5), 1.0).effect_pct, Some(-10.0));
    }

    /// By hand, of an effect of 28 %: 14 % is half; 6 % and twice 3 % are 12 %, less than half; 6 % and twice 4 % are half. So are 1 %
    /// and twice 23.6 %: a small bias of few winters is no small bias.
    #[test]
    fn few_winters_cannot_tell() {
        let verdict = |bias_pct, error_pct| found(bias_pct, error_pct, 2.5).verdict;
        assert_eq!(verdict(14.0, Some(1.0)), BiasVerdict::Comparable);
        assert_eq!(verdict(-14.0, None), BiasVerdict::Comparable);
        assert_eq!(verdict(-6.0, Some(3.0)), BiasVerdict::Smaller);
        assert_eq!(verdict(-6.0, Some(4.0)), BiasVerdict::CannotTell);
        assert_eq!(verdict(-1.0, Some(23.6)), BiasVerdict::CannotTell);
        assert_eq!(verdict(-1.0, None), BiasVerdict::CannotTell);
    }

    /// Where no level is as warm, or one has no percentage, nobody can tell; a warming that changes nothing is comparable with any
    /// bias; without a bias, or without warmer winters, there is nothing to say.
    #[test]
    fn no_level_no_effect_no_bias() {
        let beyond = found(1.0, Some(0.1), 3.5);
        assert_eq!((beyond.effect_pct, beyond.share, beyond.verdict), (None, None, BiasVerdict::CannotTell));
        let of = |levels: &[(f64, Option<f64>)], skill: &SkillInShort| of_site(skill, levels);
        let one = skill(Some(1.0), Some(0.1), 1.5);
        let no_percent = [(0.0, Some(0.0)), (2.0, None)];
        assert!(of(&no_percent, &one).is_some_and(|found| found.verdict == BiasVerdict::CannotTell));
        let flat = [(0.0, Some(0.0)), (2.0, Some(0.0))];
        assert!(of(&flat, &one).is_some_and(|found| found.verdict == BiasVerdict::Comparable));
        assert_eq!(of(&LEVELS, &skill(None, None, 1.5)), None);
        assert_eq!(of(&LEVELS, &skill(Some(1.0), None, 0.0)), None);
    }
}
