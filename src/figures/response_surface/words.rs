//! What the figure says.

use super::super::labels::{counted, level, sentence, signed_percent, size_and_unit};
use super::LIMITS_PCT;
use crate::findings::{BREAK_EVEN_BRACKET_PCT, CurvePoint, Findings, ResponseSurface, Stays};
use crate::units::UnitSystem;

/// A change that a tenth of a percent cannot tell from none.
const ROUNDED_AWAY_PCT: f64 = 0.05;

/// Every text of the figure but ticks and rows.
pub(super) struct Words {
    pub title: String,
    pub ensemble: String,
    pub upwards: String,
    pub across: String,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
}

impl Words {
    /// Nothing where nothing was measured.
    pub fn of(findings: &Findings, surface: &ResponseSurface, units: UnitSystem) -> Option<Self> {
        let measure = &surface.measures.first()?.title;
        let reference_c = findings.levels_c[findings.reference];
        let warmer = surface.break_even.iter().filter(|point| point.warming_c > reference_c);
        let distance = |point: &&CurvePoint| (point.warming_c - reference_c - 2.0).abs();
        let telling = warmer.min_by(|a, b| distance(a).total_cmp(&distance(b)));
        let told = |point: &CurvePoint| {
            let alone = if surface.levels_warm_alone { "" } else { " alone, without the stated changes," };
            let at = format!("{}{alone}", level(units, point.warming_c));
            let [_, most] = BREAK_EVEN_BRACKET_PCT;
            match (point.precipitation_change_pct, point.stays) {
                (Some(pct), _) if pct.abs() < ROUNDED_AWAY_PCT => {
                    format!("At {at} the {measure} holds with as much precipitation as before")
                }
                (Some(pct), _) if pct > 0.0 => {
                    format!("At {at} it takes {} precipitation to hold the {measure}", signed_percent(pct))
                }
                (Some(pct), _) => {
                    format!("At {at} the {measure} would hold with {} precipitation", signed_percent(pct))
                }
                (None, Some(Stays::Below)) => format!(
                    "At {at} no more precipitation, up to {}, holds the {measure}",
                    signed_percent(most)
                ),
                (None, Some(Stays::Above)) => {
                    format!(
                        "At {at} the {measure} stays above the reference even with half the precipitation"
                    )
                }
                (None, None) => format!("{} over warming and precipitation", sentence(measure)),
            }
        };
        let title =
            telling.map_or_else(|| format!("{} over warming and precipitation", sentence(measure)), told);
        let ensemble = format!(
            "{} of {} at each of {} nodes; linear between them.",
            counted(surface.realizations, "realization"),
            counted(findings.years, "year"),
            surface.nodes.len()
        );
        let limits = LIMITS_PCT.map(signed_percent).join(", ");
        let described = surface.break_even.iter().map(told).collect::<Vec<_>>().join(". ");
        Some(Self {
            upwards: "Change of all precipitation (%)".to_owned(),
            across: format!("Warming ({})", units.warming().word),
            key: format!(
                "Ground and thin lines: change of the median {measure} from the reference ({}), which is the ring; red is less \
                 snow. Small dots: realizations by their own cool-season weather at the reference, a different quantity from \
                 the axes' change of every day{}.",
                size_and_unit(units, surface.reference_median_mm),
                beyond_the_axes(surface, reference_c)
            ),
            caption: format!(
                "How much {measure} would be left under any warming together with any change of precipitation? Change of the \
                 median {}-year mean from the reference; lines at {limits}. All precipitation is changed by the same percentage, \
                 also where the study states a change with its levels, and wet days come as often as in the record. {} of the \
                 study, without an assumed change of mean precipitation; Monte Carlo errors in the table. Lines of criteria ask the same realizations. Spread \
                 between realizations is chance and is not drawn but for the dots.",
                findings.years,
                counted(surface.realizations, "realization")
            ),
            kind_of_drawing: "A field of colour over warming, to the right, and precipitation change, upwards, with lines of equal \
                 change and a heavy line along which nothing changes"
                .to_owned(),
            description: format!("{described}."),
            title,
            ensemble,
        })
    }
}

/// How many realizations lie outside what is drawn; nothing where none does.
fn beyond_the_axes(surface: &ResponseSurface, reference_c: f64) -> String {
    let within = |ends: &[f64], value: f64| {
        ends.first().zip(ends.last()).is_some_and(|(low, high)| (*low..=*high).contains(&value))
    };
    let is_beyond = |warmer_c: f64, wetter_pct: f64| {
        !within(&surface.warmings_c, reference_c + warmer_c)
            || !within(&surface.precipitation_changes_pct, wetter_pct)
    };
    match surface.realized.iter().filter(|of| is_beyond(of.warmer_c, of.wetter_pct)).count() {
        0 => String::new(),
        beyond => format!(
            "; {} outside the axes",
            if beyond == 1 { "1 lies".to_owned() } else { format!("{beyond} lie") }
        ),
    }
}
