//! What two parts of a scenario say that cannot both be: found once all parts and files are read.

use crate::fault::Fault;
use crate::perturb::GeneratorChoice;
use crate::scenario::Scenario;
use crate::weather::Series;

/// Lanes take some 25 kB each on every thread: these, half a gigabyte.
const MOST_LANES: usize = 20_000;

/// Faults between the snow model, the bands, the record and the generator.
pub(super) fn clashes(scenario: &Scenario, bands: usize, weather: &Series) -> Vec<Fault> {
    let mut faults = Vec::new();
    let classes = scenario.snow.options.patchiness.map_or(1, |patchiness| patchiness.classes);
    let levels = scenario.warming.levels_c.len();
    if classes > 1 && bands * classes * levels > MOST_LANES {
        faults.push(Fault::key(
            "snow.patchiness.classes",
            format!(
                "{classes} classes of {bands} bands at {levels} levels: {} lanes",
                bands * classes * levels
            ),
            format!("at most {MOST_LANES} lanes"),
            "take fewer classes: 10 are off by a few percent of a snowfall while it melts",
        ));
    }
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
