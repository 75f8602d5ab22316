//! What the figure says.

use super::super::fits::DrawnFit;
use super::super::labels::counted;
use super::Row;
use crate::fit::{FLAT_PROFILE, Objective};

/// Every text of the figure but the panels'.
pub(super) struct Words {
    pub title: String,
    pub sample: String,
    pub axis: &'static str,
    pub key: String,
    pub caption: String,
    pub alt: String,
    pub description: String,
}

impl Words {
    pub fn of(fit: &DrawnFit<'_>, rows: &[Row<'_>]) -> Self {
        let objective = match fit.objective {
            Objective::NashSutcliffe => "NSE",
            Objective::Season => "the objective",
        };
        let title = title(rows, objective);
        let winters = fit.result.winters.iter().filter(|winter| winter.is_observed).count();
        let sample = format!(
            "Fit on all {} with observed snow; each parameter held at nine values over its bounds, the others refined",
            counted(winters, "winter")
        );
        let key = format!(
            "Line: how far {objective} falls below its best; what falls out of a panel goes on. Blue line: fitted on all years; blue \
             ticks below: fitted on each half of them. Dashed: the scenario's value. Dotted: {FLAT_PROFILE} below the best; a parameter \
             whose line never falls below it is not identified by the snow, and stays at the scenario's value. Values have the \
             units of the scenario's keys."
        );
        let caption = format!(
            "{title}. {sample}. {key} A flat line says that the snow does not tell this parameter, a steep one that it does; where \
             halves of the winters lead far apart, the value is less sure than its line looks."
        );
        Self {
            alt: format!("{title}. Small panels of {}.", counted(rows.len(), "parameter")),
            description: rows.iter().map(described).collect::<Vec<_>>().join("; ") + ".",
            axis: match fit.objective {
                Objective::NashSutcliffe => "NSE less its best",
                Objective::Season => "Objective less its best",
            },
            title,
            sample,
            key,
            caption,
        }
    }
}

/// `The snow identifies 4 of 5 parameters; least well the temperature of half snow, whose profile falls by 0.011 of NSE`.
fn title(rows: &[Row<'_>], objective: &str) -> String {
    let identified = || rows.iter().filter(|row| row.profile.is_identified);
    let (count, all) = (identified().count(), rows.len());
    let of = match (count, all) {
        (1, 1) => "the parameter".to_owned(),
        (0, _) => return format!("The snow identifies none of {}", counted(all, "parameter")),
        (count, all) if count == all => format!("all {all} parameters"),
        (count, all) => format!("{count} of {all} parameters"),
    };
    let least = identified().min_by(|a, b| a.profile.fall.total_cmp(&b.profile.fall));
    let least = least.map_or(String::new(), |row| {
        let name = if count > 1 { format!("least well the {}, whose", row.title) } else { "its".to_owned() };
        format!("; {name} profile falls by {} of {objective}", fall(row))
    });
    format!("The snow identifies {of}{least}")
}

/// `falls by 0.076`, `falls by 0.191; fitted at its bound`, `not identified: falls by 0.004`.
pub(super) fn told(row: &Row<'_>) -> String {
    let falls = format!("falls by {}", fall(row));
    match (row.profile.is_identified, row.is_at_bound()) {
        (false, _) => format!("not identified: {falls}"),
        (true, true) => format!("{falls}; fitted at its bound"),
        (true, false) => falls,
    }
}

fn fall(row: &Row<'_>) -> String {
    format!("{:.3}", row.profile.fall)
}

/// `melt base temperature: fitted 3.15 °C, scenario 1, falls by 0.025`.
fn described(row: &Row<'_>) -> String {
    let value = |name: &str, value: Option<f64>| {
        value.map_or(String::new(), |value| {
            let sign = if value < -0.0005 { "\u{2212}" } else { "" };
            format!("{name} {sign}{:.3}, ", value.abs())
        })
    };
    let (fitted, stated) = (value("fitted", row.fitted), value("scenario", row.stated));
    let unit = if row.unit.is_empty() { String::new() } else { format!(" ({})", row.unit) };
    format!("{}{unit}: {fitted}{stated}{}", row.title, told(row))
}
