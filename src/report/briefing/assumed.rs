//! What was assumed: parameters, defaults in force, and what is unlikely about them.

use super::super::numbers::{amount, degrees, fixed, signed};
use super::super::study::Study;
use crate::perturb::PrecipitationChange;
use crate::snow::{DegreeRule, PhaseRule};
use maud::{Markup, html};

/// The section.
pub(super) fn section(study: &Study<'_>) -> Markup {
    let snow = study.snow;
    html! {
        h2 { "What was assumed" }
        dl {
            dt { "Rain or snow" } dd { @match snow.rain_snow {
                PhaseRule::Linear { snow_only_below_c, rain_only_above_c } => {
                    "by the band's daily mean temperature: snow only below " (degrees(snow_only_below_c)) ", rain only above " (degrees(rain_only_above_c)) ", linear between" }
                PhaseRule::Tanh => { "by the band's daily mean temperature, a smooth curve with half snow at " (degrees(1.2)) " (after Dai 2008)" }
                PhaseRule::Step { half_snow_at_c } => { "snow up to a daily mean of " (degrees(half_snow_at_c)) ", rain above" }
            } }
            dt { "Melt" } dd { (snow.degree_day_factor_lowest) " to " (snow.degree_day_factor_highest) " mm per °C and day through the year, highest on "
                (snow.highest_on.words()) ", for degrees above " (degrees(snow.melt_base_c)) " "
                @match snow.degree_rule { DegreeRule::Mean => "of the daily mean" , DegreeRule::Diurnal => "of a sine between the day's minimum and maximum" } }
            dt { "Pack" } dd { "holds liquid water up to " (fixed(100.0 * snow.liquid_holding_fraction, 0)) " % of its ice; refreezes at "
                (fixed(100.0 * snow.refreeze_fraction, 0)) " % of the melt rate" }
            dt { "Gauge" } dd { "what was caught times " (study.gauge_multiplier.snow) " for snow and " (study.gauge_multiplier.rain)
                " for rain, once, at the observed temperature" }
            dt { "Elevation" } dd { "station at " (fixed(study.station_elevation_m, 0)) " m; basin-mean precipitation is "
                (fixed(study.basin.precipitation_ratio(study.station_elevation_m), 2)) " times the station's, so "
                (amount(study.basin.precipitation_ratio(study.station_elevation_m) * study.record.mean_precipitation_mm)) " a year" }
            dt { "Warming" } dd { "added to every day's temperatures; storms, wet days and their order stay; precipitation changes "
                (precipitation_in_words(&study.warming.precipitation))
                @if let Some(global) = study.warming.global { "; levels of global warming stand as "
                    (fixed(global.local_per_global, 2)) " times what they add to the " (degrees(global.already_in_record_c)) " that the record already holds" } }
            dt { "Realizations" } dd { "whole water years of the record in runs of " (fixed(study.mean_run_years, 1)) " years in the mean; the same realization under every level"
                @match study.mean_change_sd_pct { Some(sd) => { "; mean precipitation changed at random, standard deviation " (fixed(sd, 1)) " % (an assumption)" } None => {} } }
        }
        h3 { "Defaults in force" }
        @if study.defaults.is_empty() { p { "None: the scenario states everything." } } @else {
            p { @for (at, (key, value)) in study.defaults.iter().enumerate() { @if at > 0 { ", " } code { (key) " = " (value) } } }
        }
        @if !study.unlikely.is_empty() {
            h3 { "Unlikely, but allowed" }
            ul { @for notice in study.unlikely { li { code { (notice.about) } ": " (notice.why) } } }
        }
    }
}

/// `by +2.0 % per °C`; where months or levels differ, `by month and level as the scenario states`.
fn precipitation_in_words(change: &PrecipitationChange) -> String {
    match change {
        PrecipitationChange::PctPerC(pct) if pct.iter().all(|month| *month == pct[0]) => {
            format!("by {} % per °C", signed(pct[0], 1))
        }
        PrecipitationChange::PctPerC(_) => "by so many percent per °C as stated for each month".to_owned(),
        PrecipitationChange::PctByLevel(_) => "as stated for each level".to_owned(),
    }
}
