//! The days of a year, as passes over rows that stay in the first-level cache: temperature and degrees, the split into rain
//! and snow on wet days, the store.
//!
//! The rules are chosen once a row; the equations themselves are the scalar functions of this room, and the compiler turns
//! the row loops into vector code. The lanes at the front of a row that are bare and stay bare are skipped: melt and outflow
//! are 0 there, and all rain falls on bare ground.

use super::block::{Detail, YearBlock};
use super::lanes::{Catch, Lanes, ROW_MULTIPLE};
use super::params::DegreeRule;
use super::passes::{
    StoreRows, catch_row, diurnal_degrees_row, mean_degrees_row, mean_row, patches_row, split_row, store_row,
    wet_bulb_row,
};
use super::phase_rule::PhaseRule;
use super::{linear_snow_fraction, s_curve_snow_fraction, step_snow_fraction, tanh_snow_fraction};
use crate::weather::YearView;
use std::ops::Range;

/// Rows of the lanes' state, of the day at hand, and of the year's ledger.
#[derive(Debug)]
pub(super) struct State {
    pub ice: Vec<f64>,
    pub liquid: Vec<f64>,
    /// No lanes without stores.
    pub cold: Vec<f64>,
    mean: Vec<f64>,
    /// No lanes where the air's temperature tells rain from snow.
    wet_bulb: Vec<f64>,
    /// No lanes where the record is corrected for catch already.
    precipitation_factor: Vec<f64>,
    melt_degrees: Vec<f64>,
    freeze_degrees: Vec<f64>,
    melt: Vec<f64>,
    refreeze: Vec<f64>,
    pub input: Vec<f64>,
    pub outflow: Vec<f64>,
    pub bare_ground_rain: Vec<f64>,
    /// No lanes without stores.
    pub sublimation: Vec<f64>,
}

impl State {
    /// Bare ground.
    pub fn bare(lanes: &Lanes) -> Self {
        let row_if = |is_there: bool| vec![0.0; if is_there { lanes.width } else { 0 }];
        let row = || row_if(true);
        Self {
            ice: row(),
            liquid: row(),
            cold: row_if(lanes.has_stores()),
            mean: row(),
            wet_bulb: row_if(lanes.has_wet_bulb()),
            precipitation_factor: row_if(lanes.catch.is_some()),
            melt_degrees: row(),
            freeze_degrees: row(),
            melt: row(),
            refreeze: row(),
            input: row(),
            outflow: row(),
            bare_ground_rain: row(),
            sublimation: row_if(lanes.has_stores()),
        }
    }

    /// Begins a year's ledger.
    pub fn begin_ledger(&mut self) {
        let ledger = [&mut self.input, &mut self.outflow, &mut self.bare_ground_rain, &mut self.sublimation];
        ledger.into_iter().for_each(|row| row.fill(0.0));
    }
}

/// Runs a year on the snow of `state`, and leaves it in the block.
///
/// A year has two compiled forms: in the plain one there are no options and no detail, and so its days run no slower for what
/// they do not use.
#[inline(always)]
pub(super) fn run(lanes: &Lanes, weather: &YearView<'_>, state: &mut State, block: &mut YearBlock) {
    if lanes.has_options() || block.detail.is_some() {
        run_year::<false>(lanes, weather, state, block);
    } else {
        run_year::<true>(lanes, weather, state, block);
    }
}

#[inline(always)]
fn run_year<const IS_PLAIN: bool>(
    lanes: &Lanes,
    weather: &YearView<'_>,
    state: &mut State,
    block: &mut YearBlock,
) {
    let keeps_detail = !IS_PLAIN && block.detail.is_some();
    let has_patches = !IS_PLAIN && lanes.has_patches();
    let has_stores = !IS_PLAIN && lanes.has_stores();
    let has_wet_bulb = !IS_PLAIN && lanes.has_wet_bulb();
    let degree_day_factor = match &lanes.degree_day_factor {
        Some(without_sun) if !IS_PLAIN => without_sun,
        _ => &lanes.melt_factor,
    };
    let (width, row_width) = (lanes.width, block.width);
    begin_swe(state, &mut block.swe_mm[..width]);
    for (day, precipitation_mm) in weather.precipitation_mm.iter().copied().enumerate() {
        let row = day * row_width..(day + 1) * row_width;
        let (before, after) = block.swe_mm.split_at_mut(row.end);
        let (swe, mean_swe) = before[row.start..].split_at_mut(width);
        let (net_melt, mean_net_melt) = block.net_melt_mm[row.clone()].split_at_mut(width);
        let (outflow, mean_outflow) = block.outflow_mm[row.clone()].split_at_mut(width);
        let (bare_ground_rain, mean_bare_ground_rain) =
            block.bare_ground_rain_mm[row.clone()].split_at_mut(width);
        let (rain, mean_rain) = block.rain_mm[row.clone()].split_at_mut(width);
        let (snow, mean_snow) = block.snow_mm[row.clone()].split_at_mut(width);
        let sublimation = block.sublimation_mm.get_mut(row).unwrap_or_default();
        let (sublimation, mean_sublimation) = sublimation.split_at_mut(width.min(sublimation.len()));
        let means = row_width - width;
        let covered = block.covered.get_mut(day * means..(day + 1) * means);
        let mut fallen = Fallen { rain, snow };
        let with_snow = first_with_any(swe);
        let month = month_of(weather, day, width);
        let is_wet = precipitation_mm > 0.0;

        let mean_from = if is_wet || keeps_detail { 0 } else { with_snow };
        let offset = &lanes.mean_offset_c[month.clone()];
        mean_row(&mut state.mean[mean_from..], weather.mean_c[day], &offset[mean_from..]);
        let mut from = with_snow;
        if is_wet {
            let factor = &lanes.precipitation_factor[month.clone()];
            if has_wet_bulb {
                let humidity_pct = weather.relative_humidity_pct[day];
                wet_bulb_row(&mut state.wet_bulb, &state.mean, &lanes.pressure_kpa, humidity_pct);
            }
            let State { input, mean, wet_bulb, precipitation_factor, .. } = &mut *state;
            let today = WetDay {
                precipitation_mm,
                factor,
                told_by: if has_wet_bulb { &*wet_bulb } else { &*mean },
                catch: lanes.catch.as_ref().filter(|_| !IS_PLAIN).map(|catch| CatchRow {
                    catch,
                    told_by_c: catch.told_by_c(weather, day),
                    into: precipitation_factor,
                }),
            };
            let fallen = &mut fallen;
            match lanes.phase {
                PhaseRule::Linear { .. } => split(fallen, input, lanes, today, linear_snow_fraction),
                PhaseRule::Step { .. } => {
                    split(fallen, input, lanes, today, |mean, warm, _| step_snow_fraction(mean, warm));
                }
                PhaseRule::Tanh => split(fallen, input, lanes, today, tanh_snow_fraction),
                PhaseRule::SCurve { .. } => split(fallen, input, lanes, today, s_curve_snow_fraction),
            }
            if has_patches {
                patches_row(fallen.snow, &mut state.input, &lanes.snowfall_multiplier);
            }
            from = first_with_any(&fallen.snow[..with_snow]);
            bare_rain_row(&mut state.bare_ground_rain, &fallen.rain[..from], bare_ground_rain);
            lanes.means.row(fallen.rain, 0, mean_rain);
            lanes.means.row(fallen.snow, from, mean_snow);
        } else {
            for row in [&mut *bare_ground_rain, &mut *fallen.rain, mean_rain, &mut *fallen.snow, mean_snow] {
                row.fill(0.0);
            }
        }
        let half_range_offset = &lanes.half_range_offset_c[month];
        degrees_row(state, lanes, from, weather.half_range_c[day], half_range_offset);
        let calendar_day = (usize::from(weather.day_of_year[day]) - 1) * width;
        let calendar_day = calendar_day..calendar_day + width;
        let today = Today {
            fallen,
            melt_factor: &lanes.melt_factor[calendar_day.clone()],
            degree_day_factor: &degree_day_factor[calendar_day],
            month: month_of(weather, day, width),
        };
        let next_swe = &mut after[..width];
        for table in [&mut *next_swe, &mut *net_melt, &mut *outflow] {
            table[..from].fill(0.0);
        }
        let bare_losses = from.min(sublimation.len());
        sublimation[..bare_losses].fill(0.0);
        let out = Out { swe: next_swe, net_melt, outflow, bare_ground_rain, sublimation };
        match (has_stores, keeps_detail, is_wet) {
            (false, false, true) => store::<true, false, false>(state, lanes, from, &today, out),
            (false, false, false) => store::<false, false, false>(state, lanes, from, &today, out),
            (false, true, true) => store::<true, true, false>(state, lanes, from, &today, out),
            (false, true, false) => store::<false, true, false>(state, lanes, from, &today, out),
            (true, false, true) => store::<true, false, true>(state, lanes, from, &today, out),
            (true, false, false) => store::<false, false, true>(state, lanes, from, &today, out),
            (true, true, true) => store::<true, true, true>(state, lanes, from, &today, out),
            (true, true, false) => store::<false, true, true>(state, lanes, from, &today, out),
        }
        if let (true, Some(detail)) = (keeps_detail, &mut block.detail) {
            state.melt[..from].fill(0.0);
            state.refreeze[..from].fill(0.0);
            detail.keep(day, state);
        }
        lanes.means.row(swe, with_snow, mean_swe);
        if let Some(covered) = covered {
            lanes.means.covered_row(swe, with_snow, covered);
        }
        lanes.means.row(net_melt, from, mean_net_melt);
        lanes.means.row(outflow, from, mean_outflow);
        lanes.means.row(bare_ground_rain, if is_wet { 0 } else { width }, mean_bare_ground_rain);
        if has_stores {
            lanes.means.row(sublimation, from, mean_sublimation);
        }
    }
    let end = weather.mean_c.len() * row_width;
    let (swe, mean_swe) = block.swe_mm[end..end + row_width].split_at_mut(width);
    lanes.means.row(swe, 0, mean_swe);
}

/// What falls on a day.
struct Fallen<'b> {
    rain: &'b mut [f64],
    snow: &'b mut [f64],
}

/// What a wet day brings to the split, and the lanes' rows of it.
struct WetDay<'d> {
    precipitation_mm: f64,
    /// Times the station's precipitation.
    factor: &'d [f64],
    /// The temperature that tells rain from snow.
    told_by: &'d [f64],
    /// Where lanes correct the gauge's catch.
    catch: Option<CatchRow<'d>>,
}

/// The correction for catch of a day.
struct CatchRow<'d> {
    catch: &'d Catch,
    /// The temperature that tells rain from snow at the station.
    told_by_c: f64,
    into: &'d mut [f64],
}

/// Where the store puts a day: SWE as the next day begins, and the day's fluxes.
struct Out<'b> {
    swe: &'b mut [f64],
    net_melt: &'b mut [f64],
    outflow: &'b mut [f64],
    bare_ground_rain: &'b mut [f64],
    /// No lanes where the air takes none.
    sublimation: &'b mut [f64],
}

/// What a day brings to the store, and the lanes' rows of it.
struct Today<'d> {
    fallen: Fallen<'d>,
    melt_factor: &'d [f64],
    degree_day_factor: &'d [f64],
    /// Where the month's rows stand in tables by month.
    month: Range<usize>,
}

fn month_of(weather: &YearView<'_>, day: usize, width: usize) -> Range<usize> {
    let month = usize::from(weather.month[day]) * width;
    month..month + width
}

/// SWE of every lane as the year begins.
fn begin_swe(state: &State, swe: &mut [f64]) {
    for ((swe, ice), liquid) in swe.iter_mut().zip(&state.ice).zip(&state.liquid) {
        *swe = ice + liquid;
    }
}

/// The first lane, in whole vectors, of those that are not all 0; the row's length if all are.
#[inline(always)]
fn first_with_any(row: &[f64]) -> usize {
    let is_any = |lanes: &[f64]| lanes.iter().fold(0, |bits, value| bits | value.to_bits()) != 0;
    let vectors = row.chunks_exact(ROW_MULTIPLE);
    vectors.take_while(|lanes| !is_any(lanes)).count() * ROW_MULTIPLE
}

/// Rain of the lanes at the front, which have no snow and get none, falls on bare ground.
#[inline(always)]
fn bare_rain_row(year_bare: &mut [f64], rain: &[f64], bare_ground_rain: &mut [f64]) {
    bare_ground_rain[..rain.len()].copy_from_slice(rain);
    for (year_bare, rain) in year_bare.iter_mut().zip(rain) {
        *year_bare += rain;
    }
}

#[inline(always)]
fn split(
    fallen: &mut Fallen<'_>,
    input: &mut [f64],
    lanes: &Lanes,
    today: WetDay<'_>,
    snow_fraction: impl Fn(f64, f64, f64) -> f64,
) {
    let Fallen { rain, snow } = fallen;
    let (warm, per_c) = (&lanes.phase_warm_c, &lanes.phase_per_c);
    let WetDay { precipitation_mm, factor, told_by, catch } = today;
    let factor = match catch {
        None => factor,
        Some(CatchRow { catch, told_by_c, into }) => {
            catch_row(into, factor, &catch.rain, &catch.snow, warm, per_c, told_by_c, &snow_fraction);
            into
        }
    };
    split_row(snow, rain, input, told_by, warm, per_c, factor, precipitation_mm, snow_fraction);
}

#[inline(always)]
fn degrees_row(state: &mut State, lanes: &Lanes, from: usize, half_range_c: f64, offset_c: &[f64]) {
    let (above, below) = (&mut state.melt_degrees[from..], &mut state.freeze_degrees[from..]);
    let (mean, base) = (&state.mean[from..], &lanes.melt_base_c[from..]);
    match lanes.degrees {
        DegreeRule::Mean => mean_degrees_row(above, below, mean, base),
        DegreeRule::Diurnal => diurnal_degrees_row(above, below, mean, base, &offset_c[from..], half_range_c),
    }
}

#[inline(always)]
fn store<const IS_WET: bool, const WITH_DETAIL: bool, const WITH_STORES: bool>(
    state: &mut State,
    lanes: &Lanes,
    from: usize,
    today: &Today<'_>,
    out: Out<'_>,
) {
    let Out { swe, net_melt, outflow, bare_ground_rain, sublimation } = out;
    let stores = match (&lanes.stores, WITH_STORES) {
        (Some(stores), true) => StoreRows {
            loss_mm: &stores.loss_mm[today.month.clone()][from..],
            loss_of_snow: &stores.loss_of_snow[from..],
            cold_per_mm_c: &stores.cold_per_mm_c[from..],
            cold_share: &stores.cold_share[from..],
        },
        _ => StoreRows { loss_mm: &[], loss_of_snow: &[], cold_per_mm_c: &[], cold_share: &[] },
    };
    let of_stores = if WITH_STORES { from } else { 0 };
    store_row::<IS_WET, WITH_DETAIL, WITH_STORES>(
        &mut state.ice[from..],
        &mut state.liquid[from..],
        &mut state.melt[from..],
        &mut state.refreeze[from..],
        &mut state.outflow[from..],
        &mut state.bare_ground_rain[from..],
        &mut swe[from..],
        &mut net_melt[from..],
        &mut outflow[from..],
        &mut bare_ground_rain[from..],
        &mut state.cold[of_stores..],
        &mut state.sublimation[of_stores..],
        &mut sublimation[of_stores..],
        &today.fallen.snow[from..],
        &today.fallen.rain[from..],
        &state.mean[from..],
        &state.melt_degrees[from..],
        &state.freeze_degrees[from..],
        &today.melt_factor[from..],
        &today.degree_day_factor[from..],
        &lanes.holding_fraction[from..],
        &lanes.refreeze_fraction[from..],
        stores,
    );
}

impl Detail {
    /// Copies the day's rows; those that are not kept have no rows.
    fn keep(&mut self, day: usize, state: &State) {
        let row = day * self.width..(day + 1) * self.width;
        for (table, day) in [
            (&mut self.mean_c, &state.mean),
            (&mut self.wet_bulb_c, &state.wet_bulb),
            (&mut self.melt_mm, &state.melt),
            (&mut self.refreeze_mm, &state.refreeze),
            (&mut self.ice_mm, &state.ice),
            (&mut self.liquid_mm, &state.liquid),
            (&mut self.cold_mm, &state.cold),
        ] {
            if let Some(row) = table.get_mut(row.clone()) {
                row.copy_from_slice(day);
            }
        }
    }
}
