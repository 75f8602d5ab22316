//! What the figure says.

use super::super::labels::{sentence, size, size_and_unit};
use crate::findings::RecordFindings;
use crate::units::UnitSystem;
use crate::weather::Why;

/// Every text of the figure but its ticks and rows.
pub(super) struct Words {
    pub title: String,
    pub sample: String,
    pub axis: String,
    pub baseline: String,
    pub normal: [String; 2],
    pub key: String,
    pub caption: String,
    pub alt: String,
    pub description: String,
}

impl Words {
    pub fn of(record: &RecordFindings, has_sites: bool, units: UnitSystem) -> Self {
        let title = title(record);
        let headline = &record.headline.title;
        let name = sentence(headline);
        let baseline = &record.baseline_years;
        let normal = record.percent_of_median.first().map_or(0.0, |on| on.basin.median_mm);
        let used =
            record.years.iter().map(|year| format!("{} {}", year.water_year, size(units, year.headline_mm)));
        let used = used.collect::<Vec<_>>().join(", ");
        let left_out = record.left_out.iter().map(|year| {
            let why: Vec<String> = year.why.iter().map(|why| why.words(units)).collect();
            format!("{}: {}", year.water_year, why.join(", "))
        });
        let left_out = left_out.collect::<Vec<_>>().join("; ");
        let left_out = if left_out.is_empty() { String::new() } else { format!(" Left out: {left_out}.") };
        Self {
            alt: format!("{title}. One stem a water year."),
            sample: format!("{name} of the record's own years as the model runs them at the reference"),
            axis: format!("{name}, basin mean ({})", units.depth().word),
            baseline: format!(
                "baseline years {}\u{2013}{}: {} in use",
                baseline.first, baseline.last, baseline.in_use
            ),
            normal: ["normal".to_owned(), size_and_unit(units, normal)],
            key: key(record, has_sites),
            caption: format!(
                "{name} of the basin mean in each water year of the record, run as observed at the reference, and the water \
                 years left out, with the kinds of reason in the rows below; one year can have several. Realizations are drawn \
                 from the years in use. The normal is what percentages of the median are taken of. This is the model's snow, \
                 not observed snow."
            ),
            description: format!("{headline} in {}: {used}.{left_out}", units.depth().word),
            title,
        }
    }
}

/// What the marks mean, of those that occur.
fn key(record: &RecordFindings, has_sites: bool) -> String {
    let mut key = "Each stem: a water year, named for the calendar year in which it ends; filled: a baseline year, hollow: \
                   another."
        .to_owned();
    if !record.left_out.is_empty() {
        key += " Grey with a cross below: left out.";
    }
    key += " Dashed: the normal, the baseline years' medians of the bands, weighted by area.";
    if has_sites {
        key += " A square: the site has readings in that year.";
    }
    key
}

/// `38 of 40 water years are in use; 2 are left out, both for missing days`.
fn title(record: &RecordFindings) -> String {
    let (used, left_out) = (record.years.len(), record.left_out.len());
    let all = used + left_out;
    let are = |count: usize| if count == 1 { "is" } else { "are" };
    if left_out == 0 {
        return if all == 1 {
            "The record's one water year is in use".to_owned()
        } else {
            format!("All {all} water years of the record are in use")
        };
    }
    let counts = Why::KINDS.map(|kind| {
        let years = record.left_out.iter().filter(|year| year.why.iter().any(|why| why.kind() == kind));
        (years.count(), kind)
    });
    let (count, kind) = counts.into_iter().rev().max_by_key(|(count, _)| *count).unwrap_or((0, ""));
    let why = if count == left_out {
        format!(
            ", {}{kind}",
            if count > 2 {
                "all of them "
            } else if count == 2 {
                "both "
            } else {
                ""
            }
        )
    } else {
        format!(", {count} of them {kind}")
    };
    format!("{used} of {all} water years {} in use; {left_out} {} left out{why}", are(used), are(left_out))
}
