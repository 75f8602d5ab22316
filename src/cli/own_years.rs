//! The record's own years under every level of a study, and what they say.

use super::failure::Failure;
use super::ready::Ready;
use super::replayed_years::replayed_years;
use crate::ensemble::{RecordRun, RecordYear};
use crate::findings::{RecordFindings, RecordQuestions};
use crate::season::Measures;

/// Runs them, and asks them. Their wet days are the record's own even where warming changes wet days: which of them it would
/// take is chance, and no named year has any. Their precipitation takes the change of the mean alone.
pub(super) fn own_years(
    ready: &Ready,
    measures: &Measures,
) -> Result<(Vec<RecordYear>, Option<RecordFindings>), Failure> {
    let warming = &ready.scenario.warming;
    let changes = ready.changes();
    let run = RecordRun {
        lanes: &ready.lanes(&changes),
        levels: changes.len(),
        reference: warming.reference,
        bands: ready.basin.bands.len(),
        measures,
    };
    let years = run.years(&ready.weather).map_err(|open| Failure::Ours(open.to_string()))?;
    let findings = RecordFindings::of(&RecordQuestions {
        years: &years,
        left_out: &ready.record.skipped,
        weather: &ready.weather,
        baseline: &ready.baseline_years,
        measures: measures.list(),
        season: measures.settings(),
        bands: &ready.basin.bands,
        levels_c: &warming.levels_c,
        reference: warming.reference,
    });
    let replayed = match &findings {
        Some(record) => replayed_years(ready, measures, record)?,
        None => None,
    };
    let findings = findings.map(|record| RecordFindings { replayed_years: replayed, ..record });
    Ok((years, findings))
}
