//! The same shifts against other spreads: other periods, other assumed changes of mean precipitation, temperatures held.

use super::cells::{Told, crossing_range, estimate, finish, name, optional, outweighs, unit_names, write};
use crate::findings::{Crossing, CrossingRange, Estimate, Findings, MeasureFindings, Spread};
use crate::units::UnitSystem;
use csv::Writer;

/// A spread, whichever it is, and the shifts against it.
struct Against<'a> {
    temperatures: &'static str,
    years: usize,
    periods: usize,
    mean_change_sd_pct: Option<f64>,
    times_assumed: f64,
    spread: Option<&'a Spread>,
    /// Level, over the half of the 5-95 % range, over one standard deviation.
    levels: Vec<(f64, Option<Estimate>, Option<f64>)>,
    outweighs: Crossing,
    /// Of the study's own yardstick alone.
    outweighs_range: Option<CrossingRange>,
    outweighs_standard_deviation: Option<Crossing>,
}

/// One row a basin measure, yardstick and level with a shift; a yardstick without such a level has one row. Measures have
/// units of their own, so these stand in two columns.
pub(super) fn yardsticks(findings: &Findings, units: UnitSystem) -> Vec<u8> {
    let warming = units.warming().suffix;
    let mut writer = Writer::from_writer(Vec::new());
    let mut header: Vec<String> = [
        "measure",
        "unit",
        "unit_of_standard_deviation",
        "temperatures",
        "years",
        "periods",
        "mean_change_sd_pct",
        "times_assumed",
        "spread_q05",
        "spread_q50",
        "spread_q95",
        "spread_standard_deviation",
    ]
    .map(str::to_owned)
    .into();
    header.push(format!("level_{warming}"));
    header.extend(
        [
            "signal_to_half_spread",
            "signal_to_half_spread_monte_carlo_error",
            "signal_to_standard_deviation",
            "outweighs",
        ]
        .map(str::to_owned),
    );
    header.extend(["from", "until"].map(|end| format!("outweighs_{end}_{warming}")));
    header.extend(["q05", "q95"].map(|end| format!("outweighs_from_{end}_{warming}")));
    header.push("outweighs_standard_deviation".to_owned());
    header.extend(["from", "until"].map(|end| format!("outweighs_standard_deviation_{end}_{warming}")));
    write(&mut writer, &header);
    for found in &findings.basin {
        for against in all(findings, found) {
            let row = row(found, &against, units);
            for level in
                against.levels.iter().copied().map(Some).chain(against.levels.is_empty().then_some(None))
            {
                let ratio = level.and_then(|(_, ratio, _)| ratio);
                let mut row = row.clone();
                row.push(optional(level.map(|(level_c, ..)| units.warming().of(level_c))));
                row.extend(estimate(ratio));
                row.push(optional(level.and_then(|(.., deviations)| deviations)));
                row.extend(outweighs(against.outweighs, units));
                row.extend(crossing_range(against.outweighs_range, units));
                row.extend(
                    against
                        .outweighs_standard_deviation
                        .map_or_else(<[String; 3]>::default, |crossing| outweighs(crossing, units)),
                );
                write(&mut writer, &row);
            }
        }
    }
    finish(writer)
}

fn all<'a>(findings: &Findings, found: &'a MeasureFindings) -> Vec<Against<'a>> {
    let own = found.yardsticks.iter().map(|of| Against {
        temperatures: "own_temperatures",
        years: of.years,
        periods: of.periods,
        mean_change_sd_pct: Some(of.mean_change_sd_pct),
        times_assumed: of.times_assumed,
        spread: of.spread.as_ref(),
        levels: of
            .levels
            .iter()
            .map(|at| (at.level_c, at.signal_to_spread, at.signal_to_standard_deviation))
            .collect(),
        outweighs: of.outweighs,
        outweighs_range: (of.years == findings.years && of.times_assumed == 1.0)
            .then_some(found.outweighs_range)
            .flatten(),
        outweighs_standard_deviation: Some(of.outweighs_standard_deviation),
    });
    let studys = found.yardsticks.iter().find(|of| of.times_assumed == 1.0);
    let held = found.temperature_held.iter().map(|held| Against {
        temperatures: "temperature_held",
        years: findings.years,
        periods: findings.realizations,
        mean_change_sd_pct: studys.map(|of| of.mean_change_sd_pct),
        times_assumed: 1.0,
        spread: held.spread.as_ref(),
        levels: held.levels.iter().map(|at| (at.level_c, at.signal_to_spread, None)).collect(),
        outweighs: held.outweighs,
        outweighs_range: None,
        outweighs_standard_deviation: None,
    });
    own.chain(held).collect()
}

/// The cells of a spread, which all its levels have in common.
fn row(found: &MeasureFindings, against: &Against<'_>, units: UnitSystem) -> Vec<String> {
    let kind = found.measure.kind;
    let told = Told { units, kind };
    let spread = against.spread;
    let mut row = vec![name(&found.measure, units)];
    row.extend(unit_names(kind, units).map(str::to_owned));
    row.push(against.temperatures.to_owned());
    row.extend([against.years, against.periods].map(|count| count.to_string()));
    row.push(optional(against.mean_change_sd_pct));
    row.push(against.times_assumed.to_string());
    let quantiles = [spread.map(|s| s.q05), spread.map(|s| s.q50), spread.map(|s| s.q95)];
    row.extend(quantiles.map(|quantile| told.change(quantile)));
    row.push(told.change(spread.map(|spread| spread.standard_deviation)));
    row
}
