//! Years of the record, as they were, under every level.

use super::failure::Failure;
use super::ready::Ready;
use crate::ensemble::{RecordRun, RecordYear};
use crate::findings::{RecordFindings, ReplayedYears};
use crate::season::Measures;

/// Runs the whole record at each level, from which the years are taken: what lies from the year before lies there, too.
///
/// # Errors
/// A ledger that does not close.
pub(super) fn replayed_years(
    ready: &Ready,
    measures: &Measures,
    record: &RecordFindings,
) -> Result<Option<ReplayedYears>, Failure> {
    let bands = ready.basin.bands.len();
    let of_level = |change| -> Result<Vec<RecordYear>, Failure> {
        let lanes = ready.lanes(std::slice::from_ref(change));
        let run = RecordRun { lanes: &lanes, levels: 1, reference: 0, bands, measures };
        run.years(&ready.weather).map_err(|open| Failure::Ours(open.to_string()))
    };
    let at_levels: Vec<Vec<RecordYear>> = ready.changes().iter().map(of_level).collect::<Result<_, _>>()?;
    let Some(normal) = record.percent_of_median.first() else { return Ok(None) };
    let named = ready.scenario.findings.replayed_years.years.as_deref();
    let reference = ready.scenario.warming.reference;
    Ok(ReplayedYears::of(named, &at_levels, normal, measures.list(), reference))
}
