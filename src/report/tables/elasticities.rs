//! What a degree and a percent do, at every level, in the basin and in every band.

use super::cells::{estimate, finish, write};
use crate::basin::Band;
use crate::findings::{Estimate, ResponseSurface, Slope, compound_share_pct};
use crate::units::UnitSystem;
use csv::Writer;

/// One row a level and place; the interaction is the basin's.
pub(super) fn elasticities(surface: &ResponseSurface, bands: &[Band], units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let (degree, depth) = (units.warming().suffix, units.depth().suffix);
    let elevation = units.elevation();
    let header = [
        format!("level_{degree}"),
        "place".to_owned(),
        format!("lower_{}", elevation.suffix),
        format!("upper_{}", elevation.suffix),
        format!("median_{depth}"),
        format!("pct_per_{degree}"),
        format!("pct_per_{degree}_error"),
        "pct_per_pct".to_owned(),
        "pct_per_pct_error".to_owned(),
        format!("interaction_{depth}"),
        format!("interaction_{depth}_error"),
        "interaction_pct".to_owned(),
        "interaction_pct_error".to_owned(),
    ];
    write(&mut writer, &header);
    let per_degree =
        |found: Option<Estimate>| found.map(|found| compound_share_pct(found, units.warming().of(1.0)));
    for at in &surface.slopes {
        let mut row = |place: [String; 3], slope: &Slope, interaction: [Option<Estimate>; 2]| {
            let mut row = vec![units.warming().of(at.level_c).to_string()];
            row.extend(place);
            row.push(units.depth().of(slope.median_mm).to_string());
            row.extend(estimate(per_degree(slope.per_degree_pct)));
            row.extend(estimate(slope.per_percent_pct));
            let [amount, pct] = interaction;
            row.extend(estimate(amount.map(|amount| scaled(amount, units.depth().of(1.0)))));
            row.extend(estimate(pct));
            write(&mut writer, &row);
        };
        let basin = ["basin".to_owned(), String::new(), String::new()];
        row(basin, &at.basin, [at.interaction_mm, at.interaction_pct]);
        for (band, slope) in bands.iter().zip(&at.bands) {
            let edges = [band.lower_m, band.upper_m].map(|edge_m| elevation.of(edge_m).to_string());
            let [lower, upper] = edges;
            row(["band".to_owned(), lower, upper], slope, [None; 2]);
        }
    }
    finish(writer)
}

fn scaled(found: Estimate, factor: f64) -> Estimate {
    Estimate {
        value: found.value * factor,
        monte_carlo_error: found.monte_carlo_error.map(|error| error * factor),
    }
}
