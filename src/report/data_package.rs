//! `datapackage.json`: what the tables are, for programs, by Data Package version 2, an open standard of the Frictionless project.

use super::columns::{Cells, Holds, NO_NUMBER, unit};
use super::json::lines;
use super::tables::{ReportFile, about};
use serde::Serialize;
use sha2::{Digest, Sha256};
use std::fmt::Write;

#[derive(Serialize)]
struct Package<'a> {
    #[serde(rename = "$schema")]
    schema: &'static str,
    title: &'a str,
    description: &'static str,
    resources: Vec<Resource<'a>>,
}

#[derive(Serialize)]
struct Resource<'a> {
    name: &'a str,
    path: &'a str,
    description: &'static str,
    format: &'static str,
    mediatype: &'static str,
    encoding: &'static str,
    bytes: usize,
    hash: String,
    schema: Schema,
}

#[derive(Serialize)]
struct Schema {
    #[serde(rename = "$schema")]
    schema: &'static str,
    fields: Vec<Field>,
    #[serde(rename = "missingValues")]
    missing_values: [&'static str; 1],
}

#[derive(Serialize)]
struct Field {
    name: String,
    #[serde(rename = "type")]
    holds: &'static str,
    #[serde(skip_serializing_if = "Option::is_none")]
    unit: Option<&'static str>,
    #[serde(rename = "missingValues", skip_serializing_if = "Option::is_none")]
    missing_values: Option<[&'static str; 4]>,
    #[serde(rename = "trueValues", skip_serializing_if = "Option::is_none")]
    true_values: Option<[&'static str; 1]>,
    #[serde(rename = "falseValues", skip_serializing_if = "Option::is_none")]
    false_values: Option<[&'static str; 1]>,
}

/// The description of these tables: names, types, units, marks of what is missing, sizes and digests.
///
/// # Errors
/// A number that JSON cannot hold: a fault of ours.
pub fn data_package_json(title: &str, tables: &[ReportFile]) -> serde_json::Result<Vec<u8>> {
    let resources = tables.iter().filter_map(|(path, table)| {
        let name = path.strip_prefix("tables/")?.strip_suffix(".csv")?;
        let cells = Cells::of(table)?;
        Some(Resource {
            name,
            path,
            description: about(name),
            format: "csv",
            mediatype: "text/csv",
            encoding: "utf-8",
            bytes: table.len(),
            hash: format!("sha256:{}", digest(table)),
            schema: Schema {
                schema: "https://datapackage.org/profiles/2.0/tableschema.json",
                fields: cells
                    .header
                    .iter()
                    .enumerate()
                    .map(|(at, name)| Field::of(name, cells.holds(at)))
                    .collect(),
                missing_values: [""],
            },
        })
    });
    lines(&Package {
        schema: "https://datapackage.org/profiles/2.0/datapackage.json",
        title,
        description: "Tables of a study by thawline. A planning aid: what if, not forecast; not for flood forecasting, flood design, or \
                      the operation or safety of dams.",
        resources: resources.collect(),
    })
}

impl Field {
    fn of(name: &str, holds: Holds) -> Self {
        let is = |kind| holds == kind;
        Self {
            name: name.to_owned(),
            holds: match holds {
                Holds::Numbers => "number",
                Holds::YesOrNo => "boolean",
                Holds::Dates => "date",
                Holds::Words => "string",
            },
            unit: unit(name).filter(|_| is(Holds::Numbers)),
            missing_values: is(Holds::Numbers).then_some(NO_NUMBER),
            true_values: is(Holds::YesOrNo).then_some(["yes"]),
            false_values: is(Holds::YesOrNo).then_some(["no"]),
        }
    }
}

fn digest(bytes: &[u8]) -> String {
    Sha256::digest(bytes).iter().fold(String::new(), |mut text, byte| {
        let _ = write!(text, "{byte:02x}");
        text
    })
}
