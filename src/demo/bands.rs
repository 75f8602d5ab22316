//! The invented area-elevation tables.

use super::place::Place;
use std::fmt::Write;

/// The area-elevation table of a place as a text table, lowest band first.
pub fn table(place: &Place) -> String {
    let mut text = format!(
        "# {}: INVENTED area-elevation table of a demo; no such basin exists\n\
         # elevations in m, areas in km2\n\
         lower_m,upper_m,area_km2\n",
        place.basin
    );
    for (band, area_km2) in place.band_areas_km2.iter().enumerate() {
        let lower_m = place.lowest_m + band as u32 * place.band_height_m;
        let upper_m = lower_m + place.band_height_m;
        let _ = writeln!(text, "{lower_m},{upper_m},{area_km2:.1}");
    }
    text
}
