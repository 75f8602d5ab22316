//! What two parts of a scenario say that cannot both be: found once all parts and files are read.

use crate::fault::Fault;
use crate::perturb::GeneratorChoice;
use crate::scenario::Scenario;
use crate::weather::Series;

/// Faults between the snow model, the record and the generator.
pub(super) fn clashes(scenario: &Scenario, weather: &Series) -> Vec<Fault> {
    let mut faults = Vec::new();
    if !scenario.snow.options.wet_bulb {
        return faults;
    }
    if weather.relative_humidity_pct.is_empty() {
        faults.push(Fault::key(
            "snow.wet_bulb",
            "a wet bulb asked of a record without humidity",
            "relative_humidity or dew_point in [weather]",
            "name the column that holds it, or take [snow.wet_bulb] out",
        ));
    }
    if scenario.realizations.generator == GeneratorChoice::MarkovGamma {
        faults.push(Fault::key(
            "realizations.generator",
            "\"markov-gamma\", which makes no humidity, beside [snow.wet_bulb]",
            "\"year-blocks\", which keeps each day's humidity with its weather",
            "take generator = \"year-blocks\", or take [snow.wet_bulb] out",
        ));
    }
    faults
}
