//! Every measure at every level: a table for each group of kinds, of the basin and of the bands.

use super::GroundColumns;
use super::ReportFile;
use super::cells::{Told, chance, estimate, finish, name, optional, unit_names, write};
use crate::basin::Band;
use crate::findings::{Findings, LevelFindings, MeasureFindings};
use crate::season::{Kind, Measure};
use crate::units::UnitSystem;
use csv::Writer;

/// Kinds whose measures share a table, whose numbers have one unit.
const GROUPS: [(&str, &[Kind]); 5] = [
    ("amounts", &[Kind::AmountMm]),
    ("swe-area", &[Kind::AmountMmDays]),
    ("shares", &[Kind::Share]),
    ("day-counts", &[Kind::DayCount]),
    ("dates", &[Kind::DayOfWaterYear, Kind::ArrivalDay]),
];

/// A table of the basin and one of the bands for every group.
pub(super) fn measure_tables(findings: &Findings, units: UnitSystem) -> Vec<ReportFile> {
    let mut tables = Vec::new();
    for (group, kinds) in GROUPS {
        let basin = findings.basin.iter().map(|measure| (None, measure));
        tables.push((format!("tables/basin-{group}.csv"), table(basin.collect(), units, kinds)));
        let bands = findings.bands.iter().enumerate().flat_map(|(number, band)| {
            band.measures.iter().map(move |measure| (Some((number + 1, &band.band)), measure))
        });
        tables.push((format!("tables/bands-{group}.csv"), table(bands.collect(), units, kinds)));
    }
    tables
}

/// A band with its number, or the basin.
type Place<'a> = Option<(usize, &'a Band)>;

/// One row a place, measure and level, of the measures of the kinds of a group.
fn table(rows: Vec<(Place<'_>, &MeasureFindings)>, units: UnitSystem, kinds: &[Kind]) -> Vec<u8> {
    let [unit, change_unit] = unit_names(kinds[0], units);
    let has_bands = rows.iter().any(|(place, _)| place.is_some());
    let ground = GroundColumns::of(rows.iter().filter_map(|(place, _)| place.map(|(_, band)| band)));
    let mut writer = Writer::from_writer(Vec::new());
    let mut header: Vec<String> = Vec::new();
    if has_bands {
        let (length, area) = (units.elevation().suffix, units.area().suffix);
        header.extend([
            "band".to_owned(),
            format!("lower_{length}"),
            format!("upper_{length}"),
            format!("area_{area}"),
        ]);
        header.extend(ground.names());
    }
    header.extend(["measure".to_owned(), format!("level_{}", units.warming().suffix)]);
    header.extend(["realizations", "realizations_none", "realizations_not_gone"].map(str::to_owned));
    header.push("realizations_not_reached".to_owned());
    header.extend(["q05", "q25", "q50", "q75", "q95"].map(|q| format!("{q}_{unit}")));
    header.push(format!("shift_{change_unit}"));
    header.push(format!("shift_monte_carlo_error_{change_unit}"));
    header.extend(["shift_q05", "shift_q95"].map(|q| format!("{q}_{change_unit}")));
    header.extend(["shift_pairs", "shift_pairs_without_value"].map(str::to_owned));
    if kinds[0].least_reference().is_some() {
        header.push("change_pct".to_owned());
    }
    header.extend(
        [
            "signal_to_half_spread",
            "signal_to_half_spread_monte_carlo_error",
            "signal_to_standard_deviation",
            "signal_to_standard_deviation_paired",
            "years_none",
            "years_not_gone",
            "years_not_reached",
        ]
        .map(str::to_owned),
    );
    if !has_bands {
        header.extend(["q05", "q25", "q50", "q75", "q95"].map(|q| format!("single_year_{q}_{unit}")));
        for chance in ["period_below_reference", "year_below_reference", "reaches_reference_median"] {
            header.extend(
                ["", "_monte_carlo_error", "_bound_95pct"].map(|end| format!("chance_{chance}{end}")),
            );
        }
    }
    write(&mut writer, &header);
    for (place, measure) in rows.into_iter().filter(|(_, measure)| kinds.contains(&measure.measure.kind)) {
        for level in &measure.levels {
            write(&mut writer, &row(place, ground, &measure.measure, level, units));
        }
    }
    finish(writer)
}

fn row(
    place: Place<'_>,
    ground: GroundColumns,
    measure: &Measure,
    level: &LevelFindings,
    units: UnitSystem,
) -> Vec<String> {
    let told = Told { units, kind: measure.kind };
    let mut row = Vec::new();
    if let Some((number, band)) = place {
        row.push(number.to_string());
        row.extend([band.lower_m, band.upper_m].map(|edge_m| units.elevation().of(edge_m).to_string()));
        row.push(units.area().of(band.area_km2).to_string());
        row.extend(ground.cells(Some(band)));
    }
    row.extend([name(measure, units), units.warming().of(level.level_c).to_string()]);
    let periods = &level.periods;
    row.extend(
        [periods.count, periods.none, periods.not_gone, periods.not_reached].map(|count| count.to_string()),
    );
    row.extend(told.quantiles(periods));
    let shift = level.shift;
    let median = shift.map(|shift| shift.median);
    let error = median.and_then(|median| median.monte_carlo_error);
    let range = [shift.map(|shift| shift.q05), shift.map(|shift| shift.q95)];
    row.extend([median.map(|median| median.value), error].map(|number| told.change(number)));
    row.extend(range.map(|number| told.change(number)));
    row.extend(
        [shift.map(|shift| shift.pairs), shift.map(|shift| shift.pairs_without_value)]
            .map(|count| count.map_or(String::new(), |count| count.to_string())),
    );
    if measure.kind.least_reference().is_some() {
        row.push(optional(level.percent_change));
    }
    row.extend(estimate(level.signal_to_spread));
    row.push(optional(level.signal_to_noise.and_then(|ratio| ratio.against_reference)));
    row.push(optional(level.signal_to_noise.and_then(|ratio| ratio.paired)));
    let [none, never] = level.years_undefined;
    let [not_gone, not_reached] = if measure.kind == Kind::ArrivalDay { [0, never] } else { [never, 0] };
    row.extend([none, not_gone, not_reached].map(|count| count.to_string()));
    if let Some(single_years) = &level.single_years {
        row.extend(told.quantiles(single_years));
        let chances = level.chances;
        row.extend(chance(chances.and_then(|chances| chances.period_below_reference)));
        row.extend(chance(chances.and_then(|chances| chances.year_below_reference)));
        row.extend(chance(chances.and_then(|chances| chances.reaches_reference_median)));
    }
    row
}
