//! Volumes by chance of exceedance, as depths over the basin and as volumes.

use super::cells::{finish, name, optional, range, write};
use crate::findings::{Exceeded, Findings, LevelFindings, MeasureFindings, Range};
use crate::units::{UnitSystem, cubic_hectometres};
use csv::Writer;

/// One row a measure of the basin or of inflow, level and chance; nothing of measures that are told as no volume, and of levels at which a year
/// has no value.
pub(super) fn volumes(findings: &Findings, area_km2: f64, units: UnitSystem) -> Vec<u8> {
    let (depth, volume) = (units.depth().suffix, units.volume().suffix);
    let mut writer = Writer::from_writer(Vec::new());
    let header = [
        "measure".to_owned(),
        format!("level_{}", units.warming().suffix),
        "chance_of_exceedance_pct".to_owned(),
        format!("depth_{depth}"),
        format!("depth_monte_carlo_error_{depth}"),
        format!("volume_{volume}"),
        format!("volume_monte_carlo_error_{volume}"),
        "change_pct".to_owned(),
        format!("depth_record_q05_{depth}"),
        format!("depth_record_q95_{depth}"),
        format!("volume_record_q05_{volume}"),
        format!("volume_record_q95_{volume}"),
    ];
    write(&mut writer, &header);
    let of_inflow = findings.operations.iter().flat_map(|operations| &operations.inflow);
    for found in findings.basin.iter().chain(of_inflow) {
        for (at, level) in found.levels.iter().enumerate() {
            let record = found.record_range.as_ref().map(|range| range.levels[at].exceeded_mm.as_slice());
            for (chance, exceeded) in level.exceeded.iter().enumerate() {
                let record = record.and_then(|ranges| ranges.get(chance)).copied();
                write(&mut writer, &row(found, level, exceeded, record, area_km2, units));
            }
        }
    }
    finish(writer)
}

fn row(
    found: &MeasureFindings,
    level: &LevelFindings,
    exceeded: &Exceeded,
    record: Option<Range>,
    area_km2: f64,
    units: UnitSystem,
) -> Vec<String> {
    let (depth, volume) = (units.depth(), units.volume());
    let mut row = vec![
        name(&found.measure, units),
        units.warming().of(level.level_c).to_string(),
        exceeded.chance_pct.to_string(),
    ];
    for (estimate, unit) in [(exceeded.amount_mm, depth), (exceeded.volume_hm3, volume)] {
        row.push(unit.of(estimate.value).to_string());
        row.push(optional(estimate.monte_carlo_error.map(|error| unit.of(error))));
    }
    row.push(optional(exceeded.change_pct));
    row.extend(range(record, |mm| depth.of(mm)));
    row.extend(range(record, |mm| volume.of(cubic_hectometres(mm, area_km2))));
    row
}
