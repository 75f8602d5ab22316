//! Figures of a fit: what they are drawn from, and their lists.

use super::{Setting, Svg, parameter_profiles, survey_error, winters_not_seen};
use crate::fit::{Bounded, Comparison, FitResult, Fitted, Objective, Parameters, Split};

/// A fit as its figures take it.
#[derive(Debug, Clone, Copy)]
pub struct DrawnFit<'a> {
    /// What was found.
    pub result: &'a FitResult,
    /// Every winter as a fit makes it that has not seen it, a site each.
    pub not_seen: &'a [Comparison],
    /// What was made as large as it can be.
    pub objective: Objective,
    /// What was searched for.
    pub searched: &'a [Bounded],
    /// The scenario's parameters.
    pub stated: &'a Parameters,
}

impl DrawnFit<'_> {
    /// The fit on a split.
    pub(super) fn on(&self, split: Split) -> Option<&Fitted> {
        self.result.fitted.iter().find(|fitted| fitted.split == split)
    }
}

/// The parts of a fit's page that have figures.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum FitPart {
    /// How does it do in winters seen and not seen?
    Skill,
    /// What was fitted, and how well does the snow tell it?
    Parameters,
}

/// A figure of a fit.
#[derive(Debug, Clone, Copy)]
pub struct FitFigure {
    /// Its name in files and addresses.
    pub slug: &'static str,
    /// The question that it answers.
    pub question: &'static str,
    /// Which part of the page it belongs to.
    pub part: FitPart,
    /// Draws it; nothing where the fit has not what it shows.
    pub draw: fn(&DrawnFit<'_>, &Setting<'_>) -> Option<Svg>,
}

/// A figure of a fit of which there is one a site.
#[derive(Debug, Clone, Copy)]
pub struct FitSiteFigure {
    /// Its name in files and addresses; the site's number follows.
    pub slug: &'static str,
    /// The question that it answers.
    pub question: &'static str,
    /// Which part of the page it belongs to.
    pub part: FitPart,
    /// Draws it of a site, counted from 0, under a name; nothing where the fit has not what it shows.
    pub draw: fn(&DrawnFit<'_>, usize, &str, &Setting<'_>) -> Option<Svg>,
}

/// Every figure of a fit's sites.
pub const FIT_SITE_FIGURES: [FitSiteFigure; 2] = [winters_not_seen::FIGURE, survey_error::FIGURE];

/// Every figure of a fit as a whole.
pub const FIT_FIGURES: [FitFigure; 1] = [parameter_profiles::FIGURE];

/// Draws every figure of a fit, each with its name: `winters-not-seen-1` is the first site's.
pub fn of_fit(fit: &DrawnFit<'_>, setting: &Setting<'_>) -> Vec<(FitPart, String, Svg)> {
    let mut drawn = Vec::new();
    for figure in &FIT_SITE_FIGURES {
        for site in 0..fit.not_seen.len() {
            let slug = format!("{}-{}", figure.slug, site + 1);
            drawn.extend((figure.draw)(fit, site, &slug, setting).map(|svg| (figure.part, slug, svg)));
        }
    }
    for figure in &FIT_FIGURES {
        let svg = (figure.draw)(fit, setting);
        drawn.extend(svg.map(|svg| (figure.part, figure.slug.to_owned(), svg)));
    }
    drawn
}
