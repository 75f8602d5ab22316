//! The figures of a fit, drawn once for its page and for files of their own.

use super::super::tables::ReportFile;
use super::FitReport;
use crate::figures::{DrawnFit, FitPart, Setting, Svg, of_fit, of_sites};
use crate::fit::Comparison;

/// Every figure of a fit.
pub(super) struct Drawn {
    /// Those of the fit, each with its part of the page and its name.
    of_fit: Vec<(FitPart, String, Svg)>,
    /// Those of observed and modelled snow, each with its name.
    pub of_sites: Vec<(String, Svg)>,
}

/// Draws them.
pub(super) fn drawn(report: &FitReport<'_>, not_seen: &[Comparison]) -> Drawn {
    let setting = Setting {
        study_title: report.title,
        units: report.reader.units,
        water_year_starts: report.reader.starts,
        is_fitted: true,
    };
    let fit = DrawnFit {
        result: report.result,
        not_seen,
        objective: report.objective,
        searched: report.searched,
        stated: report.stated,
    };
    Drawn { of_fit: of_fit(&fit, &setting), of_sites: of_sites(&report.result.fitted[0].compared, &setting) }
}

impl Drawn {
    /// The figures of a part of the page.
    pub fn of(&self, part: FitPart) -> impl Iterator<Item = (&String, &Svg)> {
        self.of_fit.iter().filter(move |(of, ..)| *of == part).map(|(_, slug, svg)| (slug, svg))
    }

    /// Each as a file.
    pub fn files(&self) -> Vec<ReportFile> {
        let of_fit = self.of_fit.iter().map(|(_, slug, svg)| (slug, svg));
        let of_sites = self.of_sites.iter().map(|(slug, svg)| (slug, svg));
        let file =
            |(slug, svg): (&String, &Svg)| (format!("figures/{slug}.svg"), svg.text.clone().into_bytes());
        of_fit.chain(of_sites).map(file).collect()
    }
}
