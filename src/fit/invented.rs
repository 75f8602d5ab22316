//! Weather and snow that tests of the fit invent.

use super::{Bounded, Held, Parameter, Parameters, Site};
use crate::basin::{Band, Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::observed::{Counts, Kind, Observations, State};
use crate::season::SeasonSettings;
use crate::snow::{DegreeRule, GaugeMultiplier, SnowParams};
use crate::weather::{Series, YearSpan};
use chrono::{Datelike, Days, NaiveDate};
use rand::RngExt;

pub(super) const STATION_M: f64 = 2500.0;

pub(super) fn day(month: u32, day: u32) -> MonthDay {
    MonthDay::new(month, day).expect("a day of every year")
}

/// Years of a cold station: a wave with noise, a storm every few days, each year warmer or colder than the last.
pub(super) fn weather(years: i32) -> Series {
    weather_by(77, years)
}

/// Other years of that station.
pub(super) fn weather_by(seed: u64, years: i32) -> Series {
    let mut random = crate::perturb::search_stream(seed, 0);
    let starts = WaterYearStart(day(10, 1));
    let mut series = Series::default();
    for water_year in 2001..2001 + years {
        let (first, days) = (starts.first_day(water_year), starts.days_in(water_year));
        let start = series.mean_c.len();
        series.years.push(YearSpan { water_year, first, start, days, follows: water_year > 2001 });
        let of_year_c = 4.0 * random.random::<f64>() - 2.0;
        let wetness = 0.6 + 0.8 * random.random::<f64>();
        for date in first.iter_days().take(days) {
            let angle = std::f64::consts::TAU * (f64::from(date.ordinal()) - 20.0) / 365.25;
            let noise_c = 8.0 * (random.random::<f64>() + random.random::<f64>() - 1.0);
            series.mean_c.push(3.0 + of_year_c - 10.0 * libm::cos(angle) + noise_c);
            series.half_range_c.push(3.0 + 4.0 * random.random::<f64>());
            let is_wet = random.random::<f64>() < 0.35;
            let amount_mm = -9.0 * wetness * libm::log(1.0 - random.random::<f64>());
            series.precipitation_mm.push(if is_wet { amount_mm } else { 0.0 });
            series.month.push(date.month0() as u8);
            series.day_of_year.push(date.ordinal() as u16);
        }
    }
    series
}

pub(super) fn basin() -> Basin {
    Basin {
        latitude_deg: 40.0,
        bands: vec![Band {
            lower_m: 2400.0,
            upper_m: 2600.0,
            area_km2: 1.0,
            elevation_m: STATION_M,
            ground: Ground::default(),
        }],
        temperature: TemperatureGradient::constant(-6.0),
        precipitation: PrecipitationGradient::new(0.0, None, GradientForm::Linear),
    }
}

pub(super) fn season() -> SeasonSettings {
    SeasonSettings {
        water_year_starts: WaterYearStart(day(10, 1)),
        survey_dates: vec![day(4, 1)],
        volume_windows: Vec::new(),
        outflow_before: vec![day(4, 1)],
        melt_shares_before: vec![day(4, 1)],
        arrival_volume_hm3: None,
    }
}

pub(super) fn stated() -> Parameters {
    let Basin { temperature, precipitation, .. } = basin();
    let snow = SnowParams::defaults(DegreeRule::Diurnal, false);
    Parameters { snow, gauge: GaugeMultiplier { rain: 1.05, snow: 1.2 }, temperature, precipitation }
}

pub(super) fn usual(keys: &[&str]) -> Vec<Bounded> {
    keys.iter().filter_map(|key| Parameter::named(key)).map(Bounded::usual).collect()
}

/// A pillow that saw what the model makes of some parameters, changed day by day.
pub(super) fn pillow(
    weather: &Series,
    parameters: &Parameters,
    mut seen: impl FnMut(NaiveDate, f64) -> f64,
) -> Observations {
    let first = weather.years[0].first;
    let states = first.iter_days().take(weather.mean_c.len()).map(|date| State { date, swe_mm: 0.0 });
    let mut observations = observations(states.collect());
    let (basin, season) = (basin(), season());
    let site = Site { name: "pillow", elevation_m: STATION_M, observations: &observations };
    let sites = [site];
    let held = Held { sites: &sites, weather, basin: &basin, station_m: STATION_M, season: &season };
    let compared = held.compared(parameters).expect("the ledger closes");
    let mut states = Vec::new();
    for year in &compared[0].by_year {
        for (at, day) in (0..).zip(&year.days) {
            let date = year.first + Days::new(at);
            states.push(State { date, swe_mm: seen(date, day.modelled_mm) });
        }
    }
    observations.states = states;
    observations
}

fn observations(states: Vec<State>) -> Observations {
    let counts = Counts {
        readings: states.len(),
        first: states[0].date,
        last: states[states.len() - 1].date,
        lines_without_reading: 0,
        impossible_readings: 0,
    };
    Observations { kind: Kind::Pillow, counts, suspicions: Vec::new(), states }
}
