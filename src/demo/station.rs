//! The invented station's file, as an agency would hand it out: remarks, a header, a line a day, and holes.

use super::layout::Gauge;
use super::place::{Hole, Place};
use super::weather::draw;
use chrono::Datelike;
use std::fmt::Write;

/// Decimals of temperatures.
const TEMPERATURE_DECIMALS: u32 = 1;

/// The daily weather of a place's station as a text table.
pub fn table(place: &Place) -> String {
    let layout = &place.layout;
    let mut text = format!(
        "{remark} {station} station, {elevation}, in the basin of {basin}: INVENTED for a demo by a random weather \
         generator\n\
         {remark} no such station exists and nothing here was measured; do not use these numbers for anything \
         real\n\
         {remark} {columns}\n\
         {header}\n",
        remark = layout.remark,
        station = place.station,
        elevation = layout.elevation(place.station_m),
        basin = place.basin,
        columns = layout.weather_remark,
        header = layout.weather_header,
    );
    let mut in_gauge_mm = 0.0;
    for day in draw(place) {
        let is_emptied = match layout.gauge {
            Gauge::Daily => true,
            Gauge::SinceWaterYearBegan => day.date == place.start_in(day.date.year()),
        };
        in_gauge_mm = day.precipitation_mm + if is_emptied { 0.0 } else { in_gauge_mm };
        let temperature = |value_c: f64, hole: Hole| {
            let is_lost = place.is_lost(day.date, &[hole, Hole::Temperatures, Hole::All]);
            layout.cell(layout.temperature(value_c), TEMPERATURE_DECIMALS, is_lost)
        };
        let is_gauge_lost = place.is_lost(day.date, &[Hole::Precipitation, Hole::All]);
        let _ = writeln!(
            text,
            "{},{},{},{}",
            layout.date(day.date),
            temperature(day.tmin_c, Hole::Minimum),
            temperature(day.tmax_c, Hole::Maximum),
            layout.cell(layout.depth(in_gauge_mm), layout.precipitation_decimals, is_gauge_lost),
        );
    }
    text
}
