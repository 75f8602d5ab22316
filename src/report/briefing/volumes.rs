//! Water: volumes of single years by chance of exceedance, and around stated dates.

use super::super::numbers::{DASH, counted, fixed, precision, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use super::{Figures, levels};
use crate::figures::{Part, sentence};
use crate::findings::{Estimate, Exceeded, Findings, MeasureFindings};
use maud::{Markup, html};

/// Measures that have a table of their own: outflow and water input of the first window.
const IN_FULL: usize = 2;

/// The section; nothing where no volume was measured.
pub(super) fn section(study: &Study<'_>, figures: &Figures<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    let volumes: Vec<&MeasureFindings> = findings.basin.iter().filter(|of| of.measure.is_volume).collect();
    html! { @if !volumes.is_empty() {
        p {
            "Volumes of single years over the basin, in " (reader.units.volume().word) ". A chance of exceedance reads from the dry side: 90 % means \
             that 9 of 10 years bring at least so much, 10 % that 1 of 10 does. Snowpack outflow is water that leaves the snow, water input \
             the same with rain on bare ground; neither is streamflow, and neither knows soil, groundwater or evaporation."
        }
        (figures.of(Part::Volumes))
        @for measure in volumes.iter().take(IN_FULL) { (by_chance(findings, measure, reader)) }
        (half_of_the_years(findings, &volumes, reader))
        details {
            summary { "The same as depths over the basin, over periods of " (counted(findings.years, "year")) }
            (levels::table(study, |of| of.measure.is_volume))
        }
    } }
}

/// A row a chance, a column a level: volume ± Monte Carlo error, the range over resampled records, the change.
pub(super) fn by_chance(findings: &Findings, measure: &MeasureFindings, reader: Reader) -> Markup {
    let record = measure.record_range.as_ref().filter(|record| record.is_telling());
    let range = |level: usize, at: usize| {
        let range = record?.levels.get(level)?.exceeded_hm3.get(at)?;
        Some([range.q05, range.q95].map(|volume_hm3| reader.volume_bare(volume_hm3)).join("–"))
    };
    html! {
        div.scroll { table {
            caption {
                (sentence(&measure.measure.title)) ", " (reader.units.volume().word) ": what so many of all " (fixed((findings.realizations * findings.years) as f64, 0))
                " simulated years bring at least, ± Monte Carlo error"
                @if let Some(record) = record { "; below it 5–95 % over " (record.records) " resampled records" }
                ", and the change from the reference."
            }
            thead { tr {
                th scope="col" { "Years" }
                @for name in levels::names(findings, reader) { th scope="col" { (name) } }
            } }
            @let rows = measure.levels.first().map_or(&[][..], |level| &level.exceeded);
            tbody { @for (at, row) in rows.iter().enumerate() { tr {
                th scope="row" { (row.chance_pct) " %" }
                @for (level, found) in measure.levels.iter().enumerate() { td {
                    @match found.exceeded.get(at) {
                        None => { (DASH) }
                        Some(exceeded) => {
                            (volume(exceeded.volume_hm3, reader))
                            @if let Some(range) = range(level, at) { br; (range) }
                            @if let Some(percent) = exceeded.change_pct { br; (signed(percent, 0)) " %" }
                        }
                    }
                } }
            } } }
        } }
    }
}

/// A row a volume: what half of the years bring at least.
fn half_of_the_years(findings: &Findings, volumes: &[&MeasureFindings], reader: Reader) -> Markup {
    let half = |exceeded: &[Exceeded]| {
        exceeded.iter().find(|at| at.chance_pct == 50).map(|at| volume(at.volume_hm3, reader))
    };
    html! {
        div.scroll { table {
            caption {
                "Half of the years bring at least so much, " (reader.units.volume().word) " ± Monte Carlo error. Before a date: from the water \
                 year's first day to the day before it."
            }
            thead { tr {
                th scope="col" { "Volume" }
                @for name in levels::names(findings, reader) { th scope="col" { (name) } }
            } }
            tbody { @for measure in volumes { tr {
                th scope="row" { (measure.measure.title) }
                @for level in &measure.levels { td { (half(&level.exceeded).unwrap_or_else(|| DASH.to_owned())) } }
            } } }
        } }
    }
}

fn volume(volume_hm3: Estimate, reader: Reader) -> String {
    let error = volume_hm3
        .monte_carlo_error
        .map_or(String::new(), |error| format!(" ± {}", precision(reader.units.volume().of(error))));
    format!("{}{error}", reader.volume_bare(volume_hm3.value))
}
