//! Figures of a fit, for sites of every kind and parameters of every number.

use super::super::fits::{DrawnFit, FIT_FIGURES, FIT_SITE_FIGURES, FitPart, of_fit};
use super::super::{Setting, Svg};
use super::comparisons::{self, PLAIN};
use super::{assert_texts_apart, texts};
use crate::basin::{GradientForm, PrecipitationGradient, TemperatureGradient};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::fit::{
    Bounded, Comparison, FitResult, Fitted, Judged, Objective, PARAMETERS, Parameters, Profile, Slope, Split,
    SurveyPair, Uncertainty, Winter,
};
use crate::observed::Kind;
use crate::snow::{DegreeRule, GaugeMultiplier, SnowParams};
use crate::units::UnitSystem;

/// A made-up fit: each winter is a degree warmer than the one before, and each but the last is a tenth too low; the last,
/// in which nothing was there, is `last_mm` too high.
#[derive(Clone, Copy)]
struct Made {
    site: comparisons::Made,
    /// Slope of the error of survey SWE, mm per degC, and its standard error.
    slope: [f64; 2],
    last_mm: f64,
    parameters: usize,
    /// How far the profile of the first parameter falls; the others fall twice as far each as the one before.
    first_falls: f64,
}

const SITE: comparisons::Made = comparisons::Made { years: 8, ..PLAIN };
const MADE: Made = Made { site: SITE, slope: [-6.0, 2.0], last_mm: 400.0, parameters: 5, first_falls: 0.02 };

fn stated() -> Parameters {
    Parameters {
        snow: SnowParams::defaults(DegreeRule::Diurnal, false),
        gauge: GaugeMultiplier { rain: 1.0, snow: 1.1 },
        temperature: TemperatureGradient::constant(-6.0),
        precipitation: PrecipitationGradient::new(4.0, None, GradientForm::Linear),
    }
}

impl Made {
    fn comparison(self) -> Comparison {
        let mut comparison = self.site.comparison();
        let last = comparison.by_year.len() - 1;
        for (at, year) in comparison.by_year.iter_mut().enumerate() {
            let observed_mm =
                if at == last { 0.0 } else { self.site.peak_mm * (at + 1) as f64 / last as f64 };
            let modelled_mm = if at == last { self.last_mm } else { 0.9 * observed_mm };
            year.surveys = vec![Some(SurveyPair { date: year.first, observed_mm, modelled_mm })];
            if self.site.kind == Kind::Pillow {
                (year.observed_peak_mm, year.modelled_peak_mm) = (Some(observed_mm), Some(modelled_mm));
            }
        }
        comparison
    }

    fn result(self) -> FitResult {
        let comparison = self.comparison();
        let winters = (0..).zip(&comparison.by_year).map(|(at, year)| Winter {
            water_year: year.water_year,
            mean_c: f64::from(at) - 5.0,
            cool_season_mm: 300.0,
            is_observed: true,
        });
        let [slope, standard_error] = self.slope;
        let judged = Judged {
            site: comparison.site.clone(),
            years: comparison.by_year.len(),
            nash_sutcliffe: Some(0.9),
            kling_gupta: None,
            skill_above_mean: None,
            peak: comparison.peak,
            peak_standard_error_pct: None,
            survey_standard_error_pct: None,
            survey: comparison.surveys[0].bias,
            melt_out: comparison.melt_out,
            survey_error_by_winter_mm_per_c: Some(Slope { pairs: 8, slope, standard_error }),
        };
        let fitted = Split::EACH.map(|split| Fitted {
            split,
            values: Vec::new(),
            parameters: stated(),
            objective: 0.9,
            by_start: Vec::new(),
            on_own: vec![judged.clone()],
            on_others: Vec::new(),
            compared: vec![comparison.clone()],
        });
        let mut falls = self.first_falls;
        let profiles: Vec<Profile> = PARAMETERS
            .iter()
            .filter(|parameter| parameter.get(&stated()).is_some())
            .take(self.parameters)
            .map(|parameter| {
                let [low, high] = parameter.bounds;
                let fall = falls;
                falls *= 2.0;
                let point = |at: i32| {
                    let share = f64::from(at) / 8.0;
                    (low + share * (high - low), 0.9 - fall * (2.0 * share - 1.0) * (2.0 * share - 1.0))
                };
                Profile {
                    key: parameter.key,
                    points: (0..9).map(point).collect(),
                    fall,
                    is_identified: fall > 0.01,
                }
            })
            .collect();
        let flat = profiles.iter().filter(|profile| !profile.is_identified).map(|profile| profile.key);
        FitResult {
            winters: winters.collect(),
            fitted: fitted.to_vec(),
            unfitted: Vec::new(),
            not_identified: flat.collect(),
            profiles,
            uncertainty: Uncertainty { resamples: 0, ranges: Vec::new(), sets: Vec::new() },
            tried: 1,
        }
    }

    fn draw_in(self, units: UnitSystem, study_title: &str) -> Vec<(FitPart, String, Svg)> {
        let result = self.result();
        draw(&result, &[self.comparison()], units, study_title)
    }

    fn draw(self) -> Vec<(FitPart, String, Svg)> {
        self.draw_in(UnitSystem::Metric, "Alder Fork")
    }

    fn titles(self) -> Vec<String> {
        self.draw().into_iter().map(|(.., svg)| svg.title).collect()
    }
}

fn draw(
    result: &FitResult,
    not_seen: &[Comparison],
    units: UnitSystem,
    study_title: &str,
) -> Vec<(FitPart, String, Svg)> {
    let searched: Vec<Bounded> = PARAMETERS.iter().map(Bounded::usual).collect();
    let stated = stated();
    let objective = Objective::NashSutcliffe;
    let fit = DrawnFit { result, not_seen, objective, searched: &searched, stated: &stated };
    let water_year_starts = WaterYearStart(MonthDay::new(10, 1).unwrap());
    of_fit(&fit, &Setting { study_title, units, water_year_starts, is_fitted: true })
}

#[test]
fn text_lies_inside_and_apart_for_every_fit() {
    let long = "The snow course at the upper end of Heron Meadow below the pass to the other fork";
    let long_title = "Alder Fork above Lantern Reservoir, planning study of the valley, ".repeat(4);
    for made in [
        MADE,
        Made { site: comparisons::Made { years: 6, kind: Kind::Course, ..SITE }, parameters: 1, ..MADE },
        Made { site: comparisons::Made { years: 60, ..SITE }, parameters: PARAMETERS.len(), ..MADE },
        Made {
            site: comparisons::Made { site: long, peak_mm: 11_000.0, bias_pct: Some(1234.5), ..SITE },
            slope: [-1234.5, 99.9],
            ..MADE
        },
        Made {
            site: comparisons::Made { peak_mm: 0.3, bias_pct: None, ..SITE },
            slope: [0.0, 0.0],
            last_mm: 0.0,
            ..MADE
        },
        Made {
            site: comparisons::Made { peak_mm: 0.0, bias_pct: None, ..SITE },
            last_mm: 0.0,
            first_falls: 0.0,
            parameters: 2,
            ..MADE
        },
    ] {
        for units in [UnitSystem::Metric, UnitSystem::Us] {
            for study in ["Alder Fork", &long_title] {
                let drawn = made.draw_in(units, study);
                assert_eq!(drawn.len(), 3, "{}", made.site.site);
                for (_, slug, svg) in &drawn {
                    assert_texts_apart(slug, &svg.text);
                    let marks = svg.text.split("</desc>").nth(1).unwrap();
                    for nonsense in ["NaN", "inf", "\"-0\""] {
                        assert!(!marks.contains(nonsense), "{slug}: {nonsense}");
                    }
                    assert!(svg.text.contains(&format!("<title id=\"{slug}-title\">")), "{slug}");
                    assert!(svg.alt.starts_with(&svg.title) && svg.caption.starts_with(&svg.title), "{slug}");
                }
                assert_eq!(drawn, made.draw_in(units, study));
            }
        }
    }
}

/// By hand: -6 mm per degC of a mean of 500 mm are -1.2 %, which is -0.67 % per degF.
#[test]
fn titles_turn_with_the_numbers() {
    let titles = MADE.titles();
    assert_eq!(
        titles[0],
        "In winters that the fit has not seen, modelled peak SWE at Heron Meadow is 10 % below the observed, 1 April SWE 10 % \
         below the observed"
    );
    assert_eq!(
        titles[1],
        "With each °C of a warmer winter, modelled 1 April SWE at Heron Meadow falls by 1.2 ± 0.4 % of its mean against the \
         observed, more than twice the standard error"
    );
    assert_eq!(
        titles[2],
        "The snow identifies all 5 parameters; least well the highest degree-day factor, whose profile falls by 0.020 of NSE"
    );
    let others = Made {
        site: comparisons::Made { kind: Kind::Course, bias_pct: Some(3.1), ..SITE },
        slope: [2.0, 1.5],
        first_falls: 0.006,
        ..MADE
    };
    let titles = others.titles();
    assert_eq!(
        titles[0],
        "In winters that the fit has not seen, modelled 1 April SWE at Heron Meadow is 3.1 % above the observed"
    );
    assert!(
        titles[1].contains("rises by 0.4 ± 0.3 % of its mean against the observed, less than twice"),
        "{titles:?}"
    );
    assert_eq!(
        titles[2],
        "The snow identifies 4 of 5 parameters; least well the lowest degree-day factor, whose profile falls by 0.012 of NSE"
    );
    let us = &MADE.draw_in(UnitSystem::Us, "Alder Fork")[1].2;
    assert!(
        us.title.contains("each °F of a warmer winter") && us.title.contains("0.7 ± 0.2 %"),
        "{}",
        us.title
    );
    for metric in [" mm", "°C"] {
        assert!([&us.text, &us.caption, &us.alt].iter().all(|text| !text.contains(metric)), "{metric}");
    }
}

/// By hand: of eight winters four are round, four on their corners; the last is the farthest off, in both squares.
#[test]
fn every_winter_not_seen_is_a_mark_and_the_farthest_is_named() {
    let (_, _, svg) = &MADE.draw()[0];
    assert_eq!(svg.text.matches("<circle").count(), 2 * 4);
    assert_eq!(svg.text.matches("<polygon").count(), 2 * 4);
    let years = texts(&svg.text).into_iter().filter(|(_, words)| words.starts_with("20") && words.len() == 4);
    assert_eq!(years.map(|(_, words)| words).collect::<Vec<_>>(), ["2008", "2008"]);
    assert!(svg.caption.contains("No point here is of a winter that its fit has seen"));
    assert!(svg.caption.contains("NSE 0.88"));
}

/// By hand: on all years all eight winters are seen, hollow by two circles each; on the coldest half the first four are, and the
/// four others, and the band, are shapes. Errors are 10 % of 500 mm times (1 + ... + 7)/7, and -400.
#[test]
fn winters_warmer_than_those_seen_stand_apart() {
    let (_, _, svg) = &MADE.draw()[1];
    assert_eq!(svg.text.matches("<circle").count(), 2 * (8 + 4));
    assert_eq!(svg.text.matches("<polygon").count(), 1 + 4);
    let said: Vec<String> = texts(&svg.text).into_iter().map(|(_, words)| words).collect();
    // 50 * (1 + 2 + 3 + 4)/7/4 = 17.9; (400 - 50 * (5 + 6 + 7)/7)/4 = 67.9.
    assert!(said.iter().any(|words| words == "seen: mean −18 mm; not seen: mean +68 mm"), "{said:?}");
    assert!(said.iter().any(|words| words == "slope −1.2 ± 0.4 % of mean SWE per °C"), "{said:?}");
}

/// By hand: profiles fall by 0.006, 0.012, and so on to 0.096, no farther than the panels reach; the first is below 0.01 and has no
/// fitted value, neither on all years nor on halves.
#[test]
fn parameters_that_the_snow_does_not_tell_say_so() {
    let said = |made: Made| {
        let (_, _, svg) = made.draw().remove(2);
        (texts(&svg.text).into_iter().map(|(_, words)| words).collect::<Vec<_>>(), svg)
    };
    let (words, svg) = said(Made { first_falls: 0.006, ..MADE });
    let told = |words: &[String]| {
        words
            .iter()
            .filter(|words| words.contains("falls by 0") && !words.contains("profile"))
            .cloned()
            .collect::<Vec<_>>()
    };
    assert_eq!(
        told(&words),
        [
            "not identified: falls by 0.006",
            "falls by 0.012",
            "falls by 0.024",
            "falls by 0.048",
            "falls by 0.096"
        ]
    );
    assert!(
        svg.text.contains("highest degree-day factor (mm per °C and day): scenario 3.500, not identified")
    );
    assert!(svg.text.contains("melt base temperature (°C): fitted 1.000, scenario 1.000, falls by 0.024"));
    let dots = |svg: &Svg| svg.text.matches("<circle").count();
    assert_eq!(dots(&svg), 5 * 9);
    // Deeper than 0.1, a profile's ends leave its panel: of 0.16 the first and last value, of 0.32 the first two and last two.
    let (_, deep) = said(Made { first_falls: 0.02, ..MADE });
    assert_eq!(dots(&deep), 3 * 9 + 7 + 5);
}

#[test]
fn figures_of_a_fit_without_their_numbers_are_not_drawn() {
    let bare = Comparison { by_year: Vec::new(), peak: None, ..MADE.comparison() };
    let mut result = MADE.result();
    result.profiles.clear();
    for fitted in &mut result.fitted {
        fitted.on_own[0].survey_error_by_winter_mm_per_c = None;
    }
    assert!(draw(&result, &[bare], UnitSystem::Metric, "Alder Fork").is_empty());
}

#[test]
fn each_site_has_figures_of_its_own() {
    let mut result = MADE.result();
    for fitted in &mut result.fitted {
        fitted.on_own.push(fitted.on_own[0].clone());
        fitted.compared.push(fitted.compared[0].clone());
    }
    let both = [MADE.comparison(), MADE.comparison()];
    let drawn = draw(&result, &both, UnitSystem::Metric, "Alder Fork");
    let slugs: Vec<&str> = drawn.iter().map(|(_, slug, _)| slug.as_str()).collect();
    assert_eq!(
        slugs,
        [
            "winters-not-seen-1",
            "winters-not-seen-2",
            "survey-error-1",
            "survey-error-2",
            "parameter-profiles"
        ]
    );
    let questions = FIT_SITE_FIGURES
        .map(|figure| figure.question)
        .into_iter()
        .chain(FIT_FIGURES.map(|figure| figure.question));
    assert!(questions.into_iter().all(|question| question.ends_with('?')));
    let of = |part| drawn.iter().filter(|(of, ..)| *of == part).count();
    assert_eq!((of(FitPart::Skill), of(FitPart::Parameters)), (4, 1));
}
