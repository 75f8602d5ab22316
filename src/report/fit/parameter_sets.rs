//! `parameter-sets.csv`: sets of parameters for a study to run, the best the first.

use super::super::tables::{finish, write};
use super::{FitReport, rounded};
use csv::Writer;

/// The column behind the keys.
const OBJECTIVE: &str = "objective";

/// The file: a column a key of a scenario, a row a set, and its objective on all winters. The first row is `parameters.toml`.
pub(super) fn parameter_sets_csv(report: &FitReport<'_>) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let sets = &report.result.uncertainty.sets;
    let keys = sets.iter().take(1).flat_map(|set| &set.values).map(|value| value.key);
    write(&mut writer, &keys.chain([OBJECTIVE]).map(str::to_owned).collect::<Vec<_>>());
    for set in sets {
        let values = set.values.iter().map(|value| value.value).chain([set.objective]);
        write(&mut writer, &values.map(|value| rounded(value).to_string()).collect::<Vec<_>>());
    }
    finish(writer)
}
