//! Water from the pack: volumes in windows, and the centroid of snowpack outflow.

use super::rows;
use super::{LEAST_PEAK_MM, Measure, NONE, Peaks, SeasonSettings};
use crate::calendar::day_of_water_year;
use crate::snow::YearBlock;

pub(super) fn list(settings: &SeasonSettings) -> Vec<Measure> {
    let windows = settings.volume_windows.iter().flat_map(|[from, to]| {
        let name = format!("{from}_to_{to}").replace('-', "_");
        let title = format!("{} to {}", from.words(), to.words());
        [
            Measure::amount(format!("outflow_{name}_mm"), format!("snowpack outflow, {title}")),
            Measure::amount(format!("water_input_{name}_mm"), format!("water input, {title}")),
        ]
        .map(|measure| Measure { is_volume: true, ..measure })
    });
    windows.chain([Measure::date("outflow_centroid_day", "centroid of snowpack outflow")]).collect()
}

pub(super) fn take(block: &mut YearBlock, peaks: &Peaks, settings: &SeasonSettings, into: &mut [f64]) {
    let width = block.width;
    let (windows, centroid) = into.split_at_mut(settings.volume_windows.len() * 2 * width);
    for (pair, [from, to]) in windows.chunks_exact_mut(2 * width).zip(&settings.volume_windows) {
        let from = day_of_water_year(block.first, *from) - 1;
        let to = day_of_water_year(block.first, *to);
        let rows = from * width..to * width;
        let (outflow, water_input) = pair.split_at_mut(width);
        outflow.fill(0.0);
        rows::add(&block.outflow_mm[rows.clone()], outflow);
        water_input.copy_from_slice(outflow);
        rows::add(&block.bare_ground_rain_mm[rows], water_input);
    }
    let mut sum = vec![0.0; width];
    centroid.fill(0.0);
    rows::add_with_moment(&block.outflow_mm[..block.days * width], &mut sum, centroid);
    for ((centroid, sum), peak) in centroid.iter_mut().zip(&sum).zip(&peaks.swe_mm) {
        *centroid = if *sum > 0.0 && *peak >= LEAST_PEAK_MM { *centroid / sum } else { NONE };
    }
}
