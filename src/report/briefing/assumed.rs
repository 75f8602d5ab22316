//! What was assumed: parameters, defaults in force, and what is unlikely about them.

use super::super::numbers::fixed;
use super::super::reader::Reader;
use super::super::snow_words::{options, rain_or_snow};
use super::super::study::Study;
use crate::perturb::{GeneratorChoice, PrecipitationChange};
use crate::snow::DegreeRule;
use crate::units::UnitSystem;
use maud::{Markup, html};

/// Where the page says what is worth a second look.
pub(super) const SECOND_LOOK: &str = "second-look";

/// The section.
pub(super) fn section(study: &Study<'_>) -> Markup {
    let (snow, reader) = (study.snow, study.reader);
    html! {
        dl {
            dt { "Rain or snow" } dd { (rain_or_snow(reader, snow)) }
            dt { "Melt" } dd { (reader.degree_day_factors(snow.degree_day_factor_lowest, snow.degree_day_factor_highest)) " through the year"
                @if snow.degree_day_factor_lowest < snow.degree_day_factor_highest { ", highest on " (snow.highest_on.words()) }
                ", for degrees above " (reader.temperature(snow.melt_base_c)) " "
                @match snow.degree_rule { DegreeRule::Mean => "of the daily mean" , DegreeRule::Diurnal => "of a sine between the day's minimum and maximum" } }
            dt { "Pack" } dd { "holds liquid water up to " (fixed(100.0 * snow.liquid_holding_fraction, 0)) " % of its ice; refreezes at "
                (fixed(100.0 * snow.refreeze_fraction, 0)) " % of the melt rate"
                @if snow.options.radiation.is_some() { " without the sun" } }
            @for (name, what) in options(reader, snow) { dt { (name) } dd { (what) } }
            @if study.basin.bands.iter().any(|band| band.ground.canopy_fraction > 0.0) {
                dt { "Trees" } dd { "slow melt and refreezing by 4.6 % for every tenth of a band that they cover (after Kuusisto 1980)" }
            }
            dt { "Gauge" } dd { "what was caught times " (study.gauge_multiplier.snow) " for snow and " (study.gauge_multiplier.rain)
                " for rain, once, at the observed "
                @if snow.options.wet_bulb { "wet-bulb " } "temperature" }
            dt { "Elevation" } dd { "station at " (reader.elevation(study.station_elevation_m)) "; temperature changes with elevation by "
                (reader.temperature_gradient(&study.basin.temperature)) ", precipitation by "
                (reader.precipitation_gradient(&study.basin.precipitation)) "; the basin's mean is "
                (fixed(study.basin.precipitation_ratio(study.station_elevation_m), 2)) " times the station's, so "
                (reader.amount(study.basin.precipitation_ratio(study.station_elevation_m) * study.record.mean_precipitation_mm)) " a year"
                @if let Some(beyond) = study.beyond_stations { "; " (fixed(100.0 * beyond.share_above, 0)) " % of the area lies above the highest station and "
                    (fixed(100.0 * beyond.share_below, 0)) " % below the lowest, where results hang on the gradients alone" } }
            dt { "Warming" } dd { "added to every day's temperatures; "
                @if let Some(mean_m) = study.mean_elevation_of_warming_m() { "a level is the basin's, and changes with elevation by "
                    (reader.level_change(study.warming.level_change_pct_per_1000m, mean_m)) ", as stated; " }
                @match study.warming.wet_day_intensity_pct_per_c {
                    None => { "storms, wet days and their order stay; precipitation changes " (precipitation_in_words(reader, &study.warming.precipitation)) }
                    Some(pct_per_c) => { (wet_days_in_words(reader, study, pct_per_c)) }
                }
                @if let Some(global) = study.warming.global { "; levels of global warming stand as "
                    (fixed(global.local_per_global, 2)) " times what they add to the " (reader.difference(global.already_in_record_c)) " that the record already holds" } }
            dt { "Realizations" } dd { (generator_in_words(study.generator)) "; the same realization under every level"
                @match study.mean_change_sd_pct { Some(sd) => { "; mean precipitation changed at random, standard deviation " (fixed(sd, 1)) " % (an assumption)" } None => {} } }
        }
        h4 { "Defaults in force" }
        @if study.defaults.is_empty() { p { "None: the scenario states everything." } } @else {
            p { @for (at, default) in study.defaults.iter().enumerate() { @if at > 0 { ", " } code { (default.key) " = " (default.value) }
                @if let Some(with) = default.with { " (with " code { (with) } ")" } } }
        }
        @if !study.unlikely.is_empty() {
            h4 id=(SECOND_LOOK) { "Worth a second look" @if reader.units != UnitSystem::Metric { " (in the scenario's metric units)" } }
            ul { @for notice in study.unlikely { li { code { (notice.about) } ": " (notice.why) } } }
        }
    }
}

/// What makes the weather.
fn generator_in_words(generator: GeneratorChoice) -> String {
    match generator {
        GeneratorChoice::YearBlocks { mean_run_years } => {
            format!(
                "whole water years of the record in runs of {} years in the mean",
                fixed(mean_run_years, 1)
            )
        }
        GeneratorChoice::MarkovGamma => {
            "weather drawn day by day: a chain of wet and dry days, amounts and temperatures fitted to the record month by \
             month, and years that vary as the record's"
                .to_owned()
        }
    }
}

/// What becomes of wet days where warming changes them.
fn wet_days_in_words(reader: Reader, study: &Study<'_>, pct_per_c: f64) -> String {
    format!(
        "wet days, those with more than {}, change by {} in what they bring, and come so much more seldom or more often that mean precipitation changes \
         {}: which days go or come is drawn for each realization, the same at every level. The record's own years keep their \
         wet days and take the change of the mean alone",
        reader.limit(study.wet_day_mm),
        reader.percent_per_degree(pct_per_c),
        precipitation_in_words(reader, &study.warming.precipitation)
    )
}

/// `by +2.0 % per °C`; where months or levels differ, `by month and level as the scenario states`.
fn precipitation_in_words(reader: Reader, change: &PrecipitationChange) -> String {
    match change {
        PrecipitationChange::PctPerC(pct) if pct.iter().all(|month| *month == pct[0]) => {
            format!("by {}", reader.percent_per_degree(pct[0]))
        }
        PrecipitationChange::PctPerC(_) => "by so many percent a degree as stated for each month".to_owned(),
        PrecipitationChange::PctByLevel(_) => "as stated for each level".to_owned(),
    }
}
