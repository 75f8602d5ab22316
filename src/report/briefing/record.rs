//! The record: what there is, what was left out and why, and what the model makes of its own years.

use super::super::numbers::fixed;
use super::super::study::Study;
use super::super::trends::{detrended_in_words, trends_in_words, years_stand_for};
use super::Figures;
use crate::figures::Part;
use crate::weather::in_groups;
use maud::{Markup, html};

/// The section.
pub(super) fn section(study: &Study<'_>, figures: &Figures<'_>) -> Markup {
    let (record, reader) = (&study.record, study.reader);
    let counts = record.counts;
    let headline = record.measures.first();
    html! {
        (figures.of(Part::Record))
        p {
            (counts.first) " to " (counts.last) ", " (fixed(counts.days as f64, 0)) " days: " (record.years.len()) " water years in use, "
            (record.skipped.len()) " left out. Mean yearly precipitation at the station, after the catch correction, "
            (reader.amount(record.mean_precipitation_mm)) "; in the years in use, " (counts.interpolated_days)
            " days have interpolated temperatures and " (counts.dry_for_want_of_data_days)
            " run without precipitation because it is missing."
            @if let Some(humidity) = counts.humidity {
                " Of " (fixed(humidity.wet_days as f64, 0)) " wet days in use, " (humidity.filled_wet_days)
                " have no humidity of their own and take the mean of the wet days of their month."
            }
            @if counts.crossed_temperature_days > 0 {
                " On " (counts.crossed_temperature_days) " days the minimum stood above the maximum; both were taken as missing."
            }
            @if let Some(gauge) = counts.gauge {
                " The accumulating gauge was set back " (gauge.resets) " times and fell a little " (gauge.small_falls)
                " times (in all " (reader.amount(gauge.small_falls_mm)) ", taken for noise)."
            }
        }
        @if let Some(baseline) = record.baseline {
            p { "Its years stand for " (years_stand_for(baseline)) ". "
                @match record.detrended {
                    Some(detrended) => { "Detrended: " (detrended_in_words(reader, detrended)) "." }
                    None => { "Trends and steps of its seasons are left in:" }
                }
            }
            dl { @for trend in trends_in_words(reader, baseline) { dt { (trend.name) } dd { (trend.sentences.join("; ")) "." } } }
        }
        @if !record.skipped.is_empty() {
            div.scroll { table {
                caption { "Water years left out; the year after each starts bare." }
                thead { tr { th scope="col" { "Water year" } th.text scope="col" { "Why" } } }
                tbody { @for (years, why) in in_groups(record.skipped) { tr {
                    th scope="row" { (years.start()) @if years.end() > years.start() { " to " (years.end()) } }
                    td.text { @for (at, why) in why.into_iter().enumerate() { @if at > 0 { "; " } (why.words(reader.units)) } }
                } } }
            } }
        }
        @if let Some(headline) = headline {
            h4 { "The record's own years, as the model runs them at the reference" }
            p {
                (headline.title) " of the basin mean by water year"
                @if let Some([mean, variation]) = record.headline_mean_and_variation() {
                    ": mean " (reader.amount(mean)) ", coefficient of variation " (fixed(variation, 2))
                } ". A figure on this page draws each year, and all that was measured of it stands in "
                code { "tables/record-years.csv" } "."
            }
        }
    }
}
