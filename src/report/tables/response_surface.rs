//! The response surface: its nodes, the changes that have a name, and the curve along which nothing changes.

use super::cells::{Told, estimate, finish, name, optional, write};
use crate::findings::{CurvePoint, ResponseSurface, Stays, SurfaceNode};
use crate::season::Kind;
use crate::units::UnitSystem;
use csv::Writer;

fn header(surface: &ResponseSurface, first: &[&str], units: UnitSystem) -> Vec<String> {
    let mut header: Vec<String> = first.iter().map(|of| (*of).to_owned()).collect();
    header.push(format!("warming_{}", units.warming().suffix));
    header.push("precipitation_change_pct".to_owned());
    for measure in &surface.measures {
        let name = name(measure, units);
        header.push(name.clone());
        let change = if measure.kind.is_date() { "change_days" } else { "change" };
        let pct = measure.kind.least_reference().map(|_| "change_pct");
        for of in std::iter::once(change).chain(pct) {
            header.push(format!("{name}_{of}"));
            header.push(format!("{name}_{of}_monte_carlo_error"));
        }
    }
    header.push("realizations".to_owned());
    header
}

fn cells(surface: &ResponseSurface, node: &SurfaceNode, units: UnitSystem) -> Vec<String> {
    let change = node.change;
    let mut cells =
        vec![units.warming().of(change.warming_c).to_string(), change.precipitation_change_pct.to_string()];
    for (measure, found) in surface.measures.iter().zip(&node.measures) {
        let told = Told { units, kind: measure.kind };
        cells.push(told.outcome(found.median));
        cells.push(told.change(found.change.map(|change| change.value)));
        cells.push(told.change(found.change.and_then(|change| change.monte_carlo_error)));
        if measure.kind.least_reference().is_some() {
            cells.extend(estimate(found.change_pct));
        }
    }
    cells.push(surface.realizations.to_string());
    cells
}

/// One row a node of the grid.
pub(super) fn response_surface(surface: &ResponseSurface, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    write(&mut writer, &header(surface, &[], units));
    for node in &surface.nodes {
        write(&mut writer, &cells(surface, node, units));
    }
    finish(writer)
}

/// One row a node of the grid and band.
pub(super) fn bands(surface: &ResponseSurface, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let swe = surface.measures.first().map_or_else(String::new, |headline| name(headline, units));
    let warming = format!("warming_{}", units.warming().suffix);
    write(
        &mut writer,
        &[&warming, "precipitation_change_pct", "band", &swe, "realizations"].map(str::to_owned),
    );
    let told = Told { units, kind: Kind::AmountMm };
    for node in &surface.nodes {
        let SurfaceNode { change, band_swe_mm, .. } = node;
        for (band, mm) in (1..).zip(band_swe_mm) {
            let row = [
                units.warming().of(change.warming_c).to_string(),
                change.precipitation_change_pct.to_string(),
                format!("{band}"),
                told.outcome(Kind::AmountMm.outcome(*mm)),
                surface.realizations.to_string(),
            ];
            write(&mut writer, &row);
        }
    }
    finish(writer)
}

/// One row a named change.
pub(super) fn named_changes(surface: &ResponseSurface, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    write(&mut writer, &header(surface, &["name", "origin"], units));
    for named in &surface.named {
        let origin = if named.origin == crate::findings::ChangeOrigin::Case { "case" } else { "projection" };
        let mut row = vec![named.name.clone(), origin.to_owned()];
        row.extend(cells(surface, &named.node, units));
        write(&mut writer, &row);
    }
    finish(writer)
}

/// One row a warming of the grid.
pub(super) fn break_even_curve(surface: &ResponseSurface, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let header = ["precipitation_change_pct", "range_q05_pct", "range_q95_pct", "stays", "realizations"];
    let warming = format!("warming_{}", units.warming().suffix);
    write(&mut writer, &[&[warming], header.map(str::to_owned).as_slice()].concat());
    for point in &surface.break_even {
        let CurvePoint { warming_c, precipitation_change_pct, stays, range_pct } = point;
        let [q05, q95] = [0, 1].map(|end| optional(range_pct.and_then(|range| range[end])));
        let stays = stays.map_or("", |stays| if stays == Stays::Below { "below" } else { "above" });
        write(
            &mut writer,
            &[
                units.warming().of(*warming_c).to_string(),
                optional(*precipitation_change_pct),
                q05,
                q95,
                stays.to_owned(),
                surface.realizations.to_string(),
            ],
        );
    }
    finish(writer)
}
