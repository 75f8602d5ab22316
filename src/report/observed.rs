//! The model against observed snow: tables, a document, and words for a terminal.

mod tables;
mod words;

pub use tables::observed_tables;
pub use words::comparison_words;

use super::SCHEMA_VERSION;
use super::json::lines;
use crate::fit::Comparison;
use serde::Serialize;

#[derive(Serialize)]
struct Document<'a> {
    schema_version: u32,
    program: &'static str,
    title: &'a str,
    conventions: &'static str,
    comparisons: &'a [Comparison],
}

/// `comparison.json`: every score and every year of every site.
///
/// # Errors
/// A number that JSON cannot hold: a fault of ours.
pub fn comparison_json(title: &str, comparisons: &[Comparison]) -> serde_json::Result<Vec<u8>> {
    lines(&Document {
        schema_version: SCHEMA_VERSION,
        program: "thawline",
        title,
        conventions: "SWE in mm as the day begins; errors are modelled less observed; dates as day of the water year \
                      counted from 1; NSE over all readings, KGE (2009) over those with observed or modelled SWE above 0",
        comparisons,
    })
}
