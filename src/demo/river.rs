//! What an invented river is made of: plain numbers, and the water that would have come down it.

use super::errors::{Errors, Factors};
use super::layout::Layout;
use super::place::{Hole, Place};
use super::snow_site::whole_years;
use super::weather::{Day, draw};
use crate::basin::{Band, Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};
use crate::inflow::{Router, Routing, WaterYear};
use crate::perturb::MonthlyChange;
use crate::snow::{
    DegreeRule, Engine, GaugeMultiplier, LaneSpec, Lanes, OpenLedger, SnowParams, StationPhase, correct_catch,
};
use crate::units::FlowUnit;
use std::fmt::Write;

/// A river whose flow into a lake is measured by day. Its basin differs from the scenario's model, as real ones do.
#[derive(Debug)]
pub struct River {
    /// What is measured.
    pub name: &'static str,
    /// What the columns of its file hold, in a remark.
    pub remark: &'static str,
    /// Names of the columns.
    pub header: &'static str,
    /// Unit of the flows.
    pub unit: FlowUnit,
    /// Change of temperature with elevation, degC per km.
    pub temperature_gradient_c_per_km: f64,
    /// Change of precipitation with elevation, percent of the station's per 100 m.
    pub precipitation_gradient_pct_per_100m: f64,
    /// Above this it stays as it is, m.
    pub precipitation_gradient_top_m: f64,
    /// Snow that fell over snow that the station's gauge caught.
    pub snow_catch: f64,
    /// Lowest degree-day factor of the year, mm per degC and day.
    pub degree_day_factor_lowest: f64,
    /// Highest degree-day factor of the year, mm per degC and day.
    pub degree_day_factor_highest: f64,
    /// How water becomes flow.
    pub routing: Routing,
    /// How far what is read lies from what flowed.
    pub errors: Errors,
}

/// The flows of a place's river as a text table, a line a day.
///
/// # Errors
/// A ledger that does not close in the run that the flows are made of.
pub fn table(place: &Place, river: &River) -> Result<String, OpenLedger> {
    let layout = &place.layout;
    let mut text = format!(
        "{remark} {river}, in the basin of {basin}: INVENTED for a demo; no such river exists\n\
         {remark} a snow model's run on invented weather, routed, with random errors put on; do not use these numbers for \
         anything real\n\
         {remark} {columns}\n\
         {header}\n",
        remark = layout.remark,
        river = river.name,
        basin = place.basin,
        columns = river.remark,
        header = river.header,
    );
    let days = draw(place);
    let mut factors = Factors::new(place, &river.errors);
    for (day, flow_hm3) in days.iter().zip(river.flow_hm3(place, &days)?) {
        let read_hm3 = (flow_hm3 * factors.next(day.date)).max(0.0);
        let is_lost = place.is_lost(day.date, &[Hole::Flow]);
        let cell = layout.cell(read_hm3 / river.unit.to_hm3_a_day(1.0), 0, is_lost);
        let _ = writeln!(text, "{},{cell}", layout.date(day.date));
    }
    Ok(text)
}

impl River {
    /// What flows in on each day, hm3: this program's own engine and routing, run on the weather before any hole was cut into it.
    ///
    /// # Errors
    /// A ledger that does not close.
    pub fn flow_hm3(&self, place: &Place, days: &[Day]) -> Result<Vec<f64>, OpenLedger> {
        let basin = Basin {
            latitude_deg: place.latitude_deg,
            bands: bands(place),
            temperature: TemperatureGradient::constant(self.temperature_gradient_c_per_km),
            precipitation: PrecipitationGradient::new(
                self.precipitation_gradient_pct_per_100m,
                Some(self.precipitation_gradient_top_m),
                GradientForm::Linear,
            ),
        };
        let snow = SnowParams {
            degree_day_factor_lowest: self.degree_day_factor_lowest,
            degree_day_factor_highest: self.degree_day_factor_highest,
            ..SnowParams::defaults(DegreeRule::Diurnal, basin.is_southern())
        };
        let mut weather = whole_years(place, days);
        let multiplier = GaugeMultiplier { rain: 1.0, snow: self.snow_catch };
        correct_catch(&mut weather, multiplier, StationPhase::of(&snow, place.station_m));
        let of_bands = basin.bands.iter().zip(basin.shares()).map(|(band, share)| LaneSpec {
            basin: &basin,
            station_m: place.station_m,
            elevation_m: band.elevation_m,
            ground: Ground::default(),
            change: &MonthlyChange::NONE,
            warming_factor: 1.0,
            snow: &snow,
            share,
        });
        let lanes = Lanes::new(&[of_bands.collect()]);
        let column = lanes.first_mix_column();
        let mut engine = Engine::new(&lanes, false);
        let mut router = Router::new(&self.routing, basin.area_km2(), 1);
        let (mut flow_hm3, mut of_year) = (Vec::with_capacity(days.len()), Vec::new());
        for (at, year) in weather.years.iter().enumerate() {
            let block = engine.year(weather.view(year))?;
            let of = |table: &[f64], day: usize| block.row(table, day)[column];
            let input = |day| of(&block.outflow_mm, day) + of(&block.bare_ground_rain_mm, day);
            let water_input_mm: Vec<f64> = (0..year.days).map(input).collect();
            let water = WaterYear { first: year.first, water_input_mm: &water_input_mm };
            if at == 0 {
                router.begin(&water, &mut of_year);
            }
            router.year(&water, &mut of_year);
            flow_hm3.extend_from_slice(&of_year);
        }
        Ok(flow_hm3)
    }
}

/// The bands of a place, as its table has them.
fn bands(place: &Place) -> Vec<Band> {
    let Layout { elevation_unit, area_unit, .. } = &place.layout;
    let edge =
        |band: usize| elevation_unit.to_metres(f64::from(place.lowest + band as u32 * place.band_height));
    let bands = place.band_areas.iter().enumerate().map(|(band, area)| {
        let (lower_m, upper_m) = (edge(band), edge(band + 1));
        Band {
            lower_m,
            upper_m,
            elevation_m: (lower_m + upper_m) / 2.0,
            area_km2: area_unit.to_square_kilometres(*area),
            ground: Ground::default(),
        }
    });
    bands.collect()
}
