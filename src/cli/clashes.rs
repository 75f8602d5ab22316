//! What two parts of a scenario say that cannot both be: found once all parts and files are read.

use crate::fault::Fault;
use crate::perturb::GeneratorChoice;
use crate::scenario::{REPLAYED_YEARS_KEY, RULE_PANEL_REALIZATIONS_KEY, Scenario};
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
    faults.extend(of_findings(scenario, weather));
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

/// What is asked beside the headline and cannot be had.
fn of_findings(scenario: &Scenario, weather: &Series) -> Vec<Fault> {
    let findings = &scenario.findings;
    let count = scenario.realizations.count;
    let asked = findings.rule_panel.and_then(|panel| panel.realizations);
    let too_many = asked.filter(|asked| *asked > count).map(|asked| {
        Fault::key(
            RULE_PANEL_REALIZATIONS_KEY,
            asked,
            format!("at most the study's own {count}, which the rules share"),
            "take fewer, or raise realizations.count",
        )
    });
    let is_missing = |year: &&i32| !weather.years.iter().any(|span| span.water_year == **year);
    let named = findings.replayed_years.years.iter().flatten();
    let missing: Vec<String> = named.filter(is_missing).map(i32::to_string).collect();
    let missing = (!missing.is_empty()).then(|| {
        Fault::key(
            REPLAYED_YEARS_KEY,
            format!("{}, not in use", missing.join(", ")),
            "water years of the record that are in use",
            "`thawline check` lists those that are left out",
        )
    });
    too_many.into_iter().chain(missing).collect()
}
