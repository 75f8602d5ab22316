//! Studies that would keep more than a machine holds are refused before they start.

use super::arguments::Shared;
use super::failure::Failure;
use super::ready::Ready;
use crate::fault::Fault;
use crate::findings::{REALIZATIONS_OF_A_RECORD, RESAMPLED_RECORDS};

/// A study that would keep more than this is refused, bytes.
const MOST_KEPT_BYTES: f64 = 4e9;
const BYTES_OF_A_NUMBER: f64 = 8.0;
/// Nodes of the response surface that are run for the slopes at one level.
const NODES_OF_A_LEVEL: usize = 7;
/// A node's runs are gathered into tables while they are still there.
const TIMES_HELD: f64 = 2.0;

/// Refuses a study whose results would not fit: single years and bands of every level, and the response surface's nodes.
///
/// # Errors
/// A fault of the scenario for each that would not fit.
pub(super) fn check_size(ready: &Ready, measures: usize, shared: &Shared) -> Result<(), Failure> {
    let too_large = |bytes: f64| bytes > MOST_KEPT_BYTES;
    let most = MOST_KEPT_BYTES / 1e9;
    let mut faults = Vec::new();
    let of_study = study_bytes(ready, measures);
    if too_large(of_study) {
        faults.push(Fault::key(
            "realizations.count",
            ready.scenario.realizations.count,
            format!("a study whose single years and bands take at most {most} GB"),
            format!(
                "these would take {:.0} GB: run fewer realizations, years, levels or bands",
                of_study / 1e9
            ),
        ));
    }
    let of_surface = surface_bytes(ready, measures);
    if too_large(of_surface) {
        faults.push(Fault::key(
            "findings.surface.realizations",
            ready.scenario.findings.surface.realizations,
            format!("a response surface whose nodes take at most {most} GB"),
            format!("these would take {:.0} GB: run fewer realizations of it, or nodes", of_surface / 1e9),
        ));
    }
    if faults.is_empty() {
        return Ok(());
    }
    let file = &ready.files[0];
    Err(Failure::input(&faults, &file.name, &file.text, shared.is_coloured()))
}

/// Single years of the basin, period values of the bands and single years of their headline measure, single years of the
/// resampled records.
fn study_bytes(ready: &Ready, measures: usize) -> f64 {
    let realizations = &ready.scenario.realizations;
    let kept_of_each = realizations.years + ready.basin.bands.len();
    let levels = ready.scenario.warming.levels_c.len();
    let of_records = realizations.count.min(REALIZATIONS_OF_A_RECORD) * RESAMPLED_RECORDS;
    let of_records = f64::from(of_records) * realizations.years as f64;
    let kept = f64::from(realizations.count) * kept_of_each as f64 + of_records;
    let of_bands = f64::from(realizations.count) * (realizations.years * ready.basin.bands.len()) as f64;
    (kept * measures as f64 + of_bands) * levels as f64 * BYTES_OF_A_NUMBER
}

/// Period values of every measure, single years of the headline and period values of every band, of every node.
fn surface_bytes(ready: &Ready, measures: usize) -> f64 {
    let scenario = &ready.scenario;
    let asked = &scenario.findings.surface;
    // One more of each where the reference is not among them.
    let grid = (asked.warmings_c.len() + 1) * (asked.precipitation_changes_pct.len() + 1);
    let nodes = grid + ready.named_changes.len() + NODES_OF_A_LEVEL * scenario.warming.levels_c.len();
    let realizations = scenario.realizations.count.min(asked.realizations);
    let kept_of_each = measures + scenario.realizations.years + ready.basin.bands.len();
    f64::from(realizations) * (nodes * kept_of_each) as f64 * BYTES_OF_A_NUMBER * TIMES_HELD
}
