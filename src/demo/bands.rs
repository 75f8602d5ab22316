//! The invented area-elevation tables.

use super::place::Place;
use std::fmt::Write;

/// The area-elevation table of a place as a text table, lowest band first.
pub fn table(place: &Place) -> String {
    let mut text = format!(
        "# {}: INVENTED area-elevation table of a demo; no such basin exists\n\
         # {}\n\
         {}\n",
        place.basin, place.layout.bands_remark, place.layout.bands_header
    );
    for (band, area) in place.band_areas.iter().enumerate() {
        let lower = place.lowest + band as u32 * place.band_height;
        let upper = lower + place.band_height;
        let _ = writeln!(text, "{lower},{upper},{area:.1}");
    }
    text
}
