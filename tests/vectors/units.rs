//! Units at the door, and volumes of water.

use super::case::Case;
use thawline::units::{
    AreaUnit, DepthUnit, LengthUnit, TemperatureUnit, UnitSystem, acre_feet, cubic_hectometres,
};

/// The unit that a case names, as a scenario would.
fn named<U: Copy, const N: usize>(names: [(&'static str, U); N], wanted: &str) -> U {
    let found = names.iter().find(|(name, _)| *name == wanted);
    found.unwrap_or_else(|| panic!("no unit '{wanted}'")).1
}

/// Differences of temperature, each of a pair.
pub fn temperature_differences(case: &Case) {
    let unit = named(TemperatureUnit::NAMES, &case.input::<String>("unit"));
    let pairs: Vec<[f64; 2]> = case.input("pairs");
    let found = pairs.into_iter().map(|[from, to]| unit.to_celsius(to) - unit.to_celsius(from));
    case.check("differences_c", &found.collect::<Vec<_>>());
}

/// One of each unit of area.
pub fn areas(case: &Case) {
    let units: Vec<String> = case.input("units");
    let found = units.iter().map(|unit| named(AreaUnit::NAMES, unit).to_square_kilometres(1.0));
    case.check("areas_km2", &found.collect::<Vec<_>>());
}

/// Volumes as hm3 in acre-feet.
pub fn volumes(case: &Case) {
    let volumes_hm3: Vec<f64> = case.input("volumes_hm3");
    case.check("acre_feet", &volumes_hm3.into_iter().map(acre_feet).collect::<Vec<_>>());
}

/// A depth of water, in a unit of depth or of length, over an area.
pub fn water_over_an_area(case: &Case) {
    let (depth, unit): (f64, String) = (case.input("depth"), case.input("depth_unit"));
    let depth_mm = if LengthUnit::NAMES.iter().any(|(name, _)| *name == unit) {
        named(LengthUnit::NAMES, &unit).to_metres(depth) * 1000.0
    } else {
        named(DepthUnit::NAMES, &unit).to_millimetres(depth)
    };
    let area_km2 = named(AreaUnit::NAMES, &case.input::<String>("area_unit"))
        .to_square_kilometres(case.input::<f64>("area"));
    let volume_hm3 = cubic_hectometres(depth_mm, area_km2);
    case.check("volume_hm3", &[volume_hm3]);
    case.check("acre_feet", &[acre_feet(volume_hm3)]);
}

/// Degree-day factors as a reader of inches and degF is told them.
pub fn degree_day_factors(case: &Case) {
    let mm_per_c: Vec<f64> = case.input("mm_per_c");
    let told = mm_per_c.into_iter().map(|factor| UnitSystem::Us.degree_day_factor().of(factor));
    case.check("in_per_f", &told.collect::<Vec<_>>());
}
