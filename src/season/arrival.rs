//! By which day a stated volume of water has come from the basin.

use super::{Asked, Kind, Measure, NONE, NOT_REACHED, Peaks, SeasonSettings};
use crate::snow::YearBlock;

pub(super) fn list(settings: &SeasonSettings) -> Vec<Measure> {
    let arrival = |name: &str, words: &str| {
        let title = format!("day by which the stated volume of {words} has come");
        Measure::new(Kind::ArrivalDay, format!("{name}_arrival_day"), title).of_basin()
    };
    match settings.arrival_volume_hm3 {
        Some(_) => vec![arrival("outflow", "snowpack outflow"), arrival("water_input", "water input")],
        None => Vec::new(),
    }
}

/// Takes the family's measures of the basin means: the first day of the water year by which what has come since its first
/// day reaches the volume, whatever snow the year had. Lanes have none.
pub(super) fn take(block: &mut YearBlock, _: &Peaks, asked: &Asked, into: &mut [f64]) {
    let Some(volume_mm) = asked.arrival_mm else { return };
    let (width, basins) = (block.width, block.mixes_at..block.width);
    into.fill(NONE);
    let (of_outflow, of_input) = into.split_at_mut(width);
    let (of_outflow, of_input) = (&mut of_outflow[basins.clone()], &mut of_input[basins.clone()]);
    of_outflow.fill(NOT_REACHED);
    of_input.fill(NOT_REACHED);
    let mut come = vec![[0.0; 2]; basins.len()];
    for day in 0..block.days {
        let this_day = (day + 1) as f64;
        let outflow = &block.row(&block.outflow_mm, day)[basins.clone()];
        let bare_ground_rain = &block.row(&block.bare_ground_rain_mm, day)[basins.clone()];
        for (basin, come) in come.iter_mut().enumerate() {
            come[0] += outflow[basin];
            come[1] += outflow[basin] + bare_ground_rain[basin];
            for (come, arrival) in come.iter().zip([&mut of_outflow[basin], &mut of_input[basin]]) {
                if *come >= volume_mm && *arrival == NOT_REACHED {
                    *arrival = this_day;
                }
            }
        }
    }
}
