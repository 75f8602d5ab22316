//! The model where snow was measured: one lane a site, on the record as observed.

use super::comparison::{About, Comparison};
use super::year::{ComparedYear, DayPair};
use crate::basin::{Basin, Ground};
use crate::calendar::days_between;
use crate::observed::Observations;
use crate::perturb::MonthlyChange;
use crate::season::SeasonSettings;
use crate::snow::{Engine, LaneSpec, Lanes, OpenLedger, SnowParams, YearBlock};
use crate::weather::{Series, YearSpan};
use chrono::NaiveDate;

/// A site with observed snow.
#[derive(Debug, Clone, Copy)]
pub struct Site<'a> {
    /// Its name.
    pub name: &'a str,
    /// Its elevation, m.
    pub elevation_m: f64,
    /// What was observed.
    pub observations: &'a Observations,
}

/// The model that is compared.
#[derive(Debug, Clone, Copy)]
pub struct Model<'a> {
    /// The basin, for its gradients.
    pub basin: &'a Basin,
    /// Elevation of the weather station, m.
    pub station_m: f64,
    /// Parameters.
    pub snow: &'a SnowParams,
    /// The years in use, precipitation corrected for catch.
    pub weather: &'a Series,
    /// Dates.
    pub season: &'a SeasonSettings,
}

/// The model without any warming at the elevation of every site, by the basin's gradients: a lane each.
pub fn site_lanes(sites: &[Site<'_>], model: &Model<'_>) -> Lanes {
    let snow = model.snow.at_a_point();
    let specs = sites.iter().map(|site| LaneSpec {
        basin: model.basin,
        station_m: model.station_m,
        elevation_m: site.elevation_m,
        ground: Ground::default(),
        change: &MonthlyChange::NONE,
        warming_factor: 1.0,
        snow: &snow,
        share: 1.0 / sites.len() as f64,
    });
    Lanes::new(&[specs.collect()])
}

/// Runs the model at every site and compares S(d) with what was observed on every day with a reading of the years in use.
/// Years after a gap start bare.
///
/// # Errors
/// A ledger that does not close.
pub fn compare(sites: &[Site<'_>], model: &Model<'_>) -> Result<Vec<Comparison>, OpenLedger> {
    if sites.is_empty() {
        return Ok(Vec::new());
    }
    let lanes = site_lanes(sites, model);
    let mut engine = Engine::new(&lanes, false);
    let mut years: Vec<Vec<ComparedYear>> = vec![Vec::new(); sites.len()];
    engine.years(model.weather, |span, block| {
        for (place, (site, years)) in sites.iter().zip(&mut years).enumerate() {
            years.extend(compare_year(site, span, block, lanes.column(0, place), model.season));
        }
        Ok::<(), OpenLedger>(())
    })?;
    let surveys = &model.season.survey_dates;
    let put_together = |(site, years): (&Site<'_>, Vec<ComparedYear>)| {
        let about = About {
            site: site.name.to_owned(),
            elevation_m: site.elevation_m,
            kind: site.observations.kind,
            file: site.observations.counts,
        };
        Comparison::of(about, years, surveys)
    };
    Ok(sites.iter().zip(years).map(put_together).collect())
}

/// A year of a site; none without a reading.
fn compare_year(
    site: &Site<'_>,
    span: &YearSpan,
    block: &YearBlock,
    column: usize,
    season: &SeasonSettings,
) -> Option<ComparedYear> {
    let observed = observed_days(Some(site.observations), span.first, block.days);
    let days = observed.into_iter().enumerate().map(|(day, observed_mm)| DayPair {
        observed_mm,
        modelled_mm: block.row(&block.swe_mm, day)[column],
    });
    let days: Vec<DayPair> = days.collect();
    let has_any = days.iter().any(|day| day.observed_mm.is_some());
    let kind = site.observations.kind;
    has_any.then(|| ComparedYear::of(span.water_year, span.first, days, kind, &season.survey_dates))
}

/// What was observed as each day of a year begins, mm.
pub(super) fn observed_days(
    observations: Option<&Observations>,
    first: NaiveDate,
    days: usize,
) -> Vec<Option<f64>> {
    let mut observed = vec![None; days];
    let states = observations.map_or(&[][..], |observations| &observations.states);
    let from = states.partition_point(|state| state.date < first);
    for state in &states[from..] {
        match observed.get_mut(days_between(first, state.date)) {
            Some(day) => *day = Some(state.swe_mm),
            None => break,
        }
    }
    observed
}
