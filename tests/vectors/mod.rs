//! Values from outside the project, each with its source, its tolerance and the reason for it, run through our code.
//!
//! The cases stand as data in the `.toml` files beside this one. `run` names the function that feeds a case's input to
//! the program; every expected value of a case must be asked for, or the case fails.

mod air;
mod bands;
mod calendar;
mod case;
mod closed_season;
mod days;
mod operations;
mod ranges;
mod scores;
mod seattle;
mod statistics;
mod still_year;
mod sun;
mod trends;
mod units;

use case::Case;

/// What a case is run through.
type Runner = fn(&Case);

const RUNNERS: [(&str, Runner); 40] = [
    ("days", days::days),
    ("melt factors", days::melt_factors),
    ("precipitation factor", days::precipitation_factor),
    ("temperature shift", days::temperature_shift),
    ("melt over bands", bands::melt_over_bands),
    ("season over bands", bands::season_over_bands),
    ("weather over bands", bands::weather_over_bands),
    ("sun", sun::sun),
    ("slopes", sun::slopes),
    ("standard pressure", air::standard_pressure),
    ("wet bulb", air::wet_bulb),
    ("s-curve", air::s_curve),
    ("land curve", air::land_curve),
    ("normal days", days::normal_days),
    ("defaults", ranges::defaults_in_range),
    ("second looks", ranges::second_looks),
    ("closed season", closed_season::closed_season),
    ("water-year days", calendar::water_year_days),
    ("water years", calendar::water_years),
    ("melt dates", still_year::melt_dates),
    ("survey and peak", still_year::survey_and_peak),
    ("snow and rain", still_year::snow_and_rain),
    ("cover", calendar::cover),
    ("quantiles", statistics::quantiles),
    ("two-way variance", statistics::two_way),
    ("signal to noise", statistics::noise),
    ("trend", trends::trend),
    ("proportion", trends::proportion),
    ("temperature differences", units::temperature_differences),
    ("areas", units::areas),
    ("degree-day factors", units::degree_day_factors),
    ("volumes", units::volumes),
    ("water over an area", units::water_over_an_area),
    ("scores", scores::scores),
    ("flows", operations::flows),
    ("depths", operations::depths),
    ("inflow year", operations::inflow_year),
    ("recession", operations::recession),
    ("storage-yield", operations::storage_yield),
    ("shortages", operations::shortages),
];

fn run(text: &str) {
    for case in case::read(text) {
        let (_, runner) = RUNNERS
            .iter()
            .find(|(name, _)| *name == case.run)
            .unwrap_or_else(|| panic!("{}: nothing is called '{}'", case.id, case.run));
        runner(&case);
        case.assert_all_asked();
    }
}

/// Degree-day melt, the sine day, melt by rain, rain or snow, gradients.
#[test]
fn one_day_physics() {
    run(include_str!("physics.toml"));
}

/// Where the sun stands, and what it brings to level ground and to slopes.
#[test]
fn the_sun() {
    run(include_str!("sun.toml"));
}

/// Wet bulb, pressure, and the curves of rain and snow.
#[test]
fn air_and_phase() {
    run(include_str!("air.toml"));
}

/// Published ranges of parameters: the defaults, and what is worth a second look.
#[test]
fn published_ranges() {
    run(include_str!("ranges.toml"));
}

/// Cold packs, slopes and trees, through the engine.
#[test]
fn snow_options() {
    run(include_str!("options.toml"));
}

/// Seasons that can be solved in closed form: one place, and a basin of bands.
#[test]
fn closed_form_seasons() {
    run(include_str!("seasons.toml"));
}

/// Changes of temperature and precipitation, and what they must leave alone.
#[test]
fn changes() {
    run(include_str!("changes.toml"));
}

/// Days of the water year, dates, sums, shares and covers of a year's snow.
#[test]
fn water_year() {
    run(include_str!("calendar.toml"));
}

/// Efficiencies of modelled against observed values.
#[test]
fn scores_of_small_series() {
    run(include_str!("scores.toml"));
}

/// Quantiles, partition of variance, signal to noise.
#[test]
fn statistics_of_small_tables() {
    run(include_str!("statistics.toml"));
}

/// Trend, slope and step of a record; the interval of a count.
#[test]
fn trends_of_a_record() {
    run(include_str!("trends.toml"));
}

/// Units at the door, and volumes of water.
#[test]
fn units_and_volumes() {
    run(include_str!("units.toml"));
}

/// Flows, routed water, storage and yield, and what shortages come to.
#[test]
fn operations() {
    run(include_str!("operations.toml"));
}
