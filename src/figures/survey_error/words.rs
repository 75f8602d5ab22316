//! What the figure says.

use super::super::Setting;
use super::super::labels::{counted, signed, size_and_unit};
use super::{Group, Point};
use crate::fit::{Comparison, Judged};
use crate::units::UnitSystem;

/// Every text of the figure but the panels'.
pub(super) struct Words {
    pub title: String,
    pub sample: String,
    pub axis: String,
    pub key: String,
    pub caption: String,
    pub alt: String,
    pub description: String,
}

impl Words {
    pub fn of(comparison: &Comparison, judged: &Judged, groups: &[Group; 2], setting: &Setting<'_>) -> Self {
        let units = setting.units;
        let day = comparison.surveys.first().map_or(String::new(), |survey| survey.survey.words());
        let title = title(comparison, judged, &day, units);
        let sample = format!(
            "{} with an observed {day} SWE, a point each; errors are modelled less observed",
            counted(groups[0].points.len(), "winter")
        );
        let axis = format!("Error of {day} SWE, {}", units.depth().word);
        let key = "Left: line of least squares, its band one standard error up and down; without a slope the model answers to a warmer \
                   winter as the snow did. Right: hollow, winters that the fit has seen; filled, those that it has not, all of them \
                   warmer; lines, their mean errors."
            .to_owned();
        let means = means(&groups[1].points, units);
        let caption = format!(
            "{title}. Fitted on the coldest half of the winters, errors of winters are, {means}. {key} The winters' mean temperature \
             is that of the station, and a sensor that has drifted or was changed makes a slope, too. Errors hold those of the \
             measurement itself."
        );
        Self {
            alt: format!("{title}. Errors by the winter's temperature, a point a winter, of two fits."),
            description: groups.iter().map(|group| described(group, units)).collect::<Vec<_>>().join(" "),
            title,
            sample,
            axis,
            key,
            caption,
        }
    }
}

/// `With each °C of a warmer winter, modelled 1 April SWE at Heron Meadow falls by 1.2 ± 0.6 % of its mean against the observed, less
/// than twice the standard error`.
fn title(comparison: &Comparison, judged: &Judged, day: &str, units: UnitSystem) -> String {
    let Some((change, is_more)) = change(judged, units) else {
        return format!("{day} SWE at {}: errors by the temperature of the winter", comparison.site);
    };
    let told = if is_more { "more" } else { "less" };
    let direction = if judged.survey_error_by_winter_mm_per_c.is_some_and(|slope| slope.slope < 0.0) {
        "falls"
    } else {
        "rises"
    };
    format!(
        "With each {} of a warmer winter, modelled {day} SWE at {} {direction} by {change} against the observed, {told} than \
         twice the standard error",
        units.warming().word,
        comparison.site,
    )
}

/// `1.2 ± 0.6 % of its mean`, and whether it is more than twice its standard error; mm where the mean is next to nothing.
fn change(judged: &Judged, units: UnitSystem) -> Option<(String, bool)> {
    let slope = judged.survey_error_by_winter_mm_per_c?;
    let degree = units.warming().of(1.0);
    let is_more = slope.slope.abs() > 2.0 * slope.standard_error;
    let text = match judged.survey_error_by_winter_pct_per_c() {
        Some([percent, error]) => {
            format!("{:.1} ± {:.1} % of its mean", percent.abs() / degree, error / degree)
        }
        None => {
            let [size, error] =
                [slope.slope.abs(), slope.standard_error].map(|mm| size_and_unit(units, mm / degree));
            format!("{size} ± {error}")
        }
    };
    Some((text, is_more))
}

/// `slope −1.2 ± 0.6 % of mean SWE per °C`.
pub(super) fn slope(judged: &Judged, units: UnitSystem) -> String {
    let Some((change, _)) = change(judged, units) else { return String::new() };
    let is_below = judged.survey_error_by_winter_mm_per_c.is_some_and(|slope| slope.slope < 0.0);
    let sign = if is_below { "\u{2212}" } else { "+" };
    format!("slope {sign}{} per {}", change.replace("its mean", "mean SWE"), units.warming().word)
}

/// `seen: mean −4 mm; not seen: mean −31 mm`.
pub(super) fn means(points: &[Point], units: UnitSystem) -> String {
    let mean =
        |is_seen| mean_mm(points, is_seen).map(|mm| format!("{} {}", signed(units, mm), units.depth().word));
    match (mean(true), mean(false)) {
        (Some(seen), Some(not_seen)) => format!("seen: mean {seen}; not seen: mean {not_seen}"),
        (Some(seen), None) => format!("seen: mean {seen}"),
        (None, Some(not_seen)) => format!("not seen: mean {not_seen}"),
        (None, None) => String::new(),
    }
}

/// The mean error of winters seen or not seen, mm.
pub(super) fn mean_mm(points: &[Point], is_seen: bool) -> Option<f64> {
    let of = || points.iter().filter(|point| point.is_seen == is_seen);
    let count = of().count();
    (count > 0).then(|| of().map(|point| point.error_mm).sum::<f64>() / count as f64)
}

/// `Fitted on all years: 2001 −20 mm at −5.2 °C; …`.
fn described(group: &Group, units: UnitSystem) -> String {
    let (depth, temperature) = (units.depth().word, units.temperature());
    let point = |point: &Point| {
        let mean = temperature.of(point.mean_c);
        let sign = if mean < -0.05 { "\u{2212}" } else { "" };
        let error = signed(units, point.error_mm);
        format!("{} {error} {depth} at {sign}{:.1} {}", point.water_year, mean.abs(), temperature.word)
    };
    format!("{}: {}.", group.name, group.points.iter().map(point).collect::<Vec<_>>().join("; "))
}
