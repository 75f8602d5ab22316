//! What the figure says.

use super::super::Setting;
use super::super::against::against;
use super::super::labels::{counted, elevation, score, sentence, size_and_unit};
use super::Group;
use crate::fit::{Bias, Comparison};
use crate::units::UnitSystem;

/// Every text of the figure but the squares'.
pub(super) struct Words {
    pub title: String,
    pub sample: String,
    pub key: String,
    pub caption: String,
    pub alt: String,
    pub description: String,
}

/// `24 winters; modelled 3.1 % below the observed`.
pub(super) fn finding(bias: &Bias, units: UnitSystem) -> String {
    format!("{}; mean {}", counted(bias.years, "winter"), against(bias, units))
}

impl Words {
    pub fn of(comparison: &Comparison, groups: &[Group], setting: &Setting<'_>) -> Self {
        let units = setting.units;
        let title = title(comparison, units);
        let nse = comparison.nash_sutcliffe.map_or(String::new(), |nse| format!("; NSE {}", score(nse)));
        let sample = format!(
            "{}, {} {}; each winter as the fit on the other half of the winters makes it{nse}",
            sentence(comparison.kind.words()),
            elevation(units, comparison.elevation_m),
            units.elevation().word,
        );
        let key = "Round: every other winter from the first, by the fit on every other one from the second; diamond: the \
                   reverse. On the dashed line modelled and observed are the same; below it the model has too little snow. \
                   The winter that is farthest off is named by its water year."
            .to_owned();
        let readings = counted(comparison.readings_compared, "reading");
        let caption = format!(
            "{title}. No point here is of a winter that its fit has seen: the winters with observed snow are parted into every other one \
             from the first and every other one from the second, and each half is modelled by the fit on the other{nse} over the \
             {readings} of all of them. {key} Distances from the line hold errors of the model, of the gradients, of the station's \
             gauge and of the measurement itself; no interval is drawn."
        );
        Self {
            alt: format!("{title}. Modelled against observed, a point a winter."),
            description: described(groups, units),
            title,
            sample,
            key,
            caption,
        }
    }
}

/// `In winters that the fit has not seen, modelled peak SWE at Heron Meadow is 3.1 % below the observed and 1 April SWE 0.4 %
/// above the observed`.
fn title(comparison: &Comparison, units: UnitSystem) -> String {
    let survey = comparison.surveys.first();
    let survey = survey.and_then(|survey| Some((survey.survey.words(), survey.bias?)));
    let [peak, survey] = [comparison.peak.map(|bias| ("peak".to_owned(), bias)), survey]
        .map(|found| found.map(|(name, bias)| (name, against(&bias, units))));
    let what = match (peak, survey) {
        (Some((peak, is)), Some((day, of_day))) => {
            format!("{peak} SWE at {} is {is}, {day} SWE {of_day}", comparison.site)
        }
        (Some((name, is)), None) | (None, Some((name, is))) => {
            format!("{name} SWE at {} is {is}", comparison.site)
        }
        (None, None) => format!("SWE at {} is beside the observed", comparison.site),
    };
    format!("In winters that the fit has not seen, modelled {what}")
}

/// `Peak SWE: 2001 observed 612 mm, modelled 560 mm; …`.
fn described(groups: &[Group], units: UnitSystem) -> String {
    let group = |group: &Group| {
        let winters = group.winters.iter().map(|winter| {
            let [observed, modelled] =
                [winter.observed_mm, winter.modelled_mm].map(|mm| size_and_unit(units, mm));
            format!("{} observed {observed}, modelled {modelled}", winter.water_year)
        });
        format!("{}: {}.", group.name, winters.collect::<Vec<_>>().join("; "))
    };
    groups.iter().map(group).collect::<Vec<_>>().join(" ")
}
