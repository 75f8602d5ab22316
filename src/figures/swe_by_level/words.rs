//! What the figure says beside its title.

use super::super::ensemble;
use super::super::labels::{level, sentence, size, size_and_unit};
use super::super::reading::Reading;
use super::super::theme::{LABEL, Lettering, NAME};
use super::columns::is_to_scale;
use crate::findings::{DOTS, Findings, MeasureFindings, Spread};
use crate::season::Outcome;
use crate::units::UnitSystem;

/// Every text of the figure but its title and the levels' labels.
pub(super) struct Words {
    pub ensemble: String,
    pub axis: String,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
}

impl Words {
    pub fn of(findings: &Findings, measure: &MeasureFindings, units: UnitSystem) -> Self {
        let ensemble = ensemble(findings);
        let name = sentence(&measure.measure.title);
        let years =
            if findings.years == 1 { "1 year".to_owned() } else { format!("{}-year mean", findings.years) };
        let dots = findings.realizations >= DOTS;
        let reading = Reading::of(findings, &[measure], "change", dots);
        let scale = if findings.levels_c.len() < 2 || is_to_scale(&findings.levels_c) {
            ""
        } else {
            " Levels stand evenly, not to scale."
        };
        let caption = format!(
            "{name}, basin mean, {years}, at each warming level over {ensemble}. {}{scale}",
            reading.caption()
        );
        let described = measure.levels.iter().enumerate().map(|(at, found)| {
            let label =
                if at == findings.reference { "reference".to_owned() } else { level(units, found.level_c) };
            let values = [found.periods.q50, found.periods.q05, found.periods.q95].map(Outcome::value);
            match values {
                [Some(median), Some(low), Some(high)] => {
                    let [median, high] = [median, high].map(|amount_mm| size_and_unit(units, amount_mm));
                    format!("{label}: median {median}, 5–95 % {} to {high}", size(units, low))
                }
                _ => format!("{label}: no value"),
            }
        });
        Self {
            axis: format!("{name}, basin mean, {years} ({})", units.depth().word),
            kind_of_drawing: format!(
                "Point-intervals{} of {} levels against the band of the reference.",
                if dots { " and dots" } else { "" },
                measure.levels.len()
            ),
            description: format!(
                "{name}, {ensemble}. {}.",
                sentence(&described.collect::<Vec<_>>().join("; "))
            ),
            ensemble: reading.ensemble(findings),
            key: format!("{}{scale}", reading.key()),
            caption,
        }
    }
}

/// The lines beside the band.
pub(super) fn of_band(spread: &Spread, units: UnitSystem) -> [(String, Lettering); 3] {
    [
        ("9 in 10 realizations".to_owned(), NAME),
        ("at the reference:".to_owned(), LABEL),
        (format!("{}–{}", size(units, spread.q05), size_and_unit(units, spread.q95)), LABEL),
    ]
}
