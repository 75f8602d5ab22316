//! What a reader must know before using a number. The first ones matter most.

use super::numbers::fixed;
use super::reader::Reader;
use crate::perturb::Warming;
use crate::snow::SnowOptions;

pub(super) use crate::figures::PLANNING_AID;

/// Cautions in a reader's units, in order of weight.
pub(super) fn cautions(reader: Reader, warming: &Warming, options: &SnowOptions) -> [String; 9] {
    let unit = reader.units.temperature();
    let [low, high] = [1.0, 3.0].map(|c| fixed(unit.of(c), 0));
    let humidity = if options.wet_bulb {
        "Rain and snow are told apart by the wet bulb at the station's relative humidity, the same in every band and at every \
         level; how humidity changes with elevation and warming is left out."
            .to_owned()
    } else {
        format!(
            "Rain and snow are told apart by air temperature; humidity matters between about {low} and {high} {}.",
            unit.word
        )
    };
    let sublimation = if options.sublimation.is_some() { "" } else { "sublimation, " };
    let not_represented = format!(
        "Not represented: wind drift, forest interception, {sublimation}fire, dust, glaciers, soil, groundwater, evaporation. \
         Snowpack outflow and water input are water leaving the snow and reaching the ground, not streamflow."
    );
    let claim = format!(
        "'In this model, {} makes' is what these numbers say; never that warming caused what a year brought.",
        reader.level(2.0)
    );
    let (spread, left_out) = match warming.level_change_pct_per_1000m {
        0.0 => (
            "Warming is added evenly to every day and band",
            "inversions and warming that grows with elevation are left out",
        ),
        _ => (
            "Warming is added evenly to every day and changes with elevation as stated (the evidence for such a change is mixed)",
            "inversions are left out",
        ),
    };
    let added = match warming.wet_day_intensity_pct_per_c {
        None => format!(
            "{spread}: storms, wet days, and the link of temperature and precipitation stay those of the record, {left_out}."
        ),
        Some(_) => format!(
            "{spread}, and wet days change in number and amount alone: all by one factor, the largest as the smallest. A day \
             that has lost its rain stays as cool as it was; {left_out}."
        ),
    };
    [
    PLANNING_AID,
    "What if, not forecast: no warming level has a date or a likelihood here.",
    "The spread holds precipitation's chance and the stated assumptions only. True uncertainty is wider.",
    "Degree-day factors describe melt in the climate they come from. Melt may slow as it moves earlier into the year, \
     and factors change with cloud, albedo and season; no direction of the error is claimed.",
    &added,
    &humidity,
    &not_represented,
    "Resampled years cannot hold a drought longer, or a storm larger, than the record's years can be put together to.",
    &claim,
]
.map(str::to_owned)
}
