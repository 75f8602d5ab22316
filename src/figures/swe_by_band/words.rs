//! What the figure says beside its title and the levels' names.

use super::super::ensemble;
use super::super::labels::{grouped, level, sentence, signed, signed_percent, size_and_unit};
use super::super::shown::{Shown, name};
use super::super::theme::{NAME, NOTE};
use super::Found;
use super::title::title;
use crate::findings::{Findings, MeasureFindings};
use crate::units::UnitSystem;

/// What is said where bands share a range of elevation, in the key and in the caption.
const PARTS: [&str; 2] = [
    " Bands that share a range of elevation stand above one another within it; their ground stands at the left.",
    " Bands that share a range of elevation stand above one another within it, each as high as the next, marked in its middle: \
     none of them lies higher than another.",
];

/// Every text of the figure but the levels' names.
pub(super) struct Words {
    pub title: String,
    pub ensemble: String,
    pub elevation: String,
    pub axis: String,
    pub area: String,
    pub changes_name: String,
    /// A band's change each, from the lowest; none where there is no level to compare with.
    pub changes: Vec<String>,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
}

impl Words {
    pub fn of(
        findings: &Findings,
        headline: &MeasureFindings,
        bands: &[Found<'_>],
        shown: &Shown,
        units: UnitSystem,
    ) -> Self {
        let measure = sentence(&headline.measure.title);
        let years =
            if findings.years == 1 { "1 year".to_owned() } else { format!("{}-year mean", findings.years) };
        let which = shown.in_words(findings, units);
        let farthest = shown.farthest().and_then(|at| Some((at, findings.levels_c.get(at)?)));
        let range = if findings.realizations > 1 {
            "Grey band: 5–95 % of the realizations at the reference, chance between realizations, not day-to-day variation \
             and not single years."
        } else {
            "One realization cannot show how far chance would move it: no interval level such as 5–95 %, and not day-to-day \
             variation."
        };
        let least = headline.measure.kind.least_reference();
        let percent = least.map_or_else(String::new, |least_mm| {
            format!(
                ", as a percentage where the reference's median is {} or more",
                size_and_unit(units, least_mm)
            )
        });
        let changes_of = farthest.map_or_else(String::new, |(_, level_c)| {
            format!(
                " Change at {}: the median of paired changes{percent}. A band falls or gains where their 5–95 % over realizations lies on one side of 0.",
                level(units, *level_c)
            )
        });
        let have_parts = bands.iter().any(|found| found.apart.is_some());
        let [of_key, of_caption] = if have_parts { PARTS } else { [""; 2] };
        Self {
            title: title(findings, headline, bands, shown, units),
            ensemble: format!("{}.{which}", ensemble(findings)),
            elevation: format!("Elevation ({})", units.elevation().word),
            axis: format!("{measure}, {years} ({})", units.depth().word),
            area: format!("Area ({})", units.area().word),
            changes_name: farthest
                .map_or_else(String::new, |(_, level_c)| format!("Change at {}", level(units, *level_c))),
            changes: farthest.map_or_else(Vec::new, |(at, _)| {
                bands.iter().map(|found| change(found, at, units)).collect()
            }),
            key: format!(
                "Line: median of each band, reference dashed. {range} Bars: each band's area.{of_key}"
            ),
            caption: format!(
                "{measure} of each elevation band, {years}, at each warming level: the median over {}, the same over the whole \
                 height of a band, marked at the elevation at which the band is run. {range}{of_caption}{which}{changes_of} Bars: the area \
                 of each band; snow water times area is volume. Where bands are too thin, some are drawn without marker and \
                 label.",
                ensemble(findings)
            ),
            kind_of_drawing: format!(
                "Profiles of {} levels over {}, with bars of their areas.",
                shown.others.len() + 1,
                if bands.len() == 1 { "one band".to_owned() } else { format!("{} bands", bands.len()) }
            ),
            description: described(findings, bands, shown, units),
        }
    }

    /// Width of the column of changes, px; 0 where there is none.
    pub fn changes_width(&self) -> f64 {
        let widths = self.changes.iter().map(|change| NOTE.width(change));
        widths.fold(NAME.width(&self.changes_name), f64::max)
    }
}

/// `−180 mm (−45 %)`.
fn change(found: &Found<'_>, at: usize, units: UnitSystem) -> String {
    let Some((level, shift)) = found.at(at).and_then(|level| Some((level, level.shift?))) else {
        return "no value".to_owned();
    };
    let change_mm = shift.median.value;
    let percent =
        level.percent_change.map_or_else(String::new, |percent| format!(" ({})", signed_percent(percent)));
    format!("{} {}{percent}", signed(units, change_mm), units.depth().word)
}

fn described(findings: &Findings, bands: &[Found<'_>], shown: &Shown, units: UnitSystem) -> String {
    let levels = shown.all();
    let of_band = bands.iter().map(|found| {
        let values: Vec<String> = levels
            .iter()
            .map(|at| {
                let median = found.range_mm(*at).map(|[_, median_mm, _]| size_and_unit(units, median_mm));
                format!("{} {}", name(findings, *at, units), median.unwrap_or_else(|| "no value".to_owned()))
            })
            .collect();
        let area = units.area();
        let area = format!("{} {}", grouped(area.of(found.band.area_km2), 1), area.word);
        format!("{}, {area}: {}.", found.name(units), values.join(", "))
    });
    of_band.collect::<Vec<_>>().join(" ")
}
