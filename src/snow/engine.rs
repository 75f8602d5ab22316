//! The engine: a water year of daily weather over all lanes at once, as passes over rows.
//!
//! A day is a few passes over rows that stay in the first-level cache: temperature and degrees, the split into rain and
//! snow on wet days, the store. The rules are chosen once a row; the equations themselves are the scalar functions of
//! this room, and the compiler turns the row loops into vector code. A dry day on bare ground is skipped.

use super::block::{Detail, YearBlock};
use super::lanes::{Lanes, ROW_MULTIPLE};
use super::ledger::{self, OpenLedger};
use super::params::{DegreeRule, PhaseRule};
use super::{
    LaneConst, LaneDay, Pack, diurnal_degrees, linear_snow_fraction, mean_degrees, step, step_snow_fraction,
};
use crate::weather::YearView;
use multiversion::multiversion;

/// Which compiled form of the row passes is run. All of them give the same bits; the narrower ones are for the tests
/// that show it.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Path {
    /// The widest vectors this CPU has.
    #[default]
    Widest,
    /// At most 256 bits on x86-64.
    Avx2,
    /// What every CPU of the target has.
    Baseline,
}

/// Steps lanes through water years and keeps the snow between them.
#[derive(Debug)]
pub struct Engine<'l> {
    lanes: &'l Lanes,
    path: Path,
    state: State,
    block: YearBlock,
}

/// Rows of the lanes' state, of the day at hand, and of the year's ledger.
#[derive(Debug)]
struct State {
    ice: Vec<f64>,
    liquid: Vec<f64>,
    mean: Vec<f64>,
    melt_degrees: Vec<f64>,
    freeze_degrees: Vec<f64>,
    snow: Vec<f64>,
    rain: Vec<f64>,
    melt: Vec<f64>,
    refreeze: Vec<f64>,
    input: Vec<f64>,
    outflow: Vec<f64>,
    bare_ground_rain: Vec<f64>,
}

impl<'l> Engine<'l> {
    /// An engine on bare ground. `with_detail` keeps every state and flux of a day in the year block.
    pub fn new(lanes: &'l Lanes, with_detail: bool) -> Self {
        Self::on_path(lanes, with_detail, Path::default())
    }

    /// An engine that is held to one compiled form of the row passes.
    pub fn on_path(lanes: &'l Lanes, with_detail: bool, path: Path) -> Self {
        let row = || vec![0.0; lanes.width];
        let state = State {
            ice: row(),
            liquid: row(),
            mean: row(),
            melt_degrees: row(),
            freeze_degrees: row(),
            snow: row(),
            rain: row(),
            melt: row(),
            refreeze: row(),
            input: row(),
            outflow: row(),
            bare_ground_rain: row(),
        };
        let mix_width = lanes.mixes().next_multiple_of(ROW_MULTIPLE);
        Self {
            lanes,
            path,
            state,
            block: YearBlock::new(lanes.width, mix_width, with_detail),
        }
    }

    /// Takes all snow away.
    pub fn restart(&mut self) {
        self.state.ice.fill(0.0);
        self.state.liquid.fill(0.0);
    }

    /// Runs one water year on the snow that is there, and leaves it in the year block.
    ///
    /// # Errors
    /// A lane whose water ledger does not close: a fault of the engine, never of the input.
    pub fn year(&mut self, weather: YearView<'_>) -> Result<&mut YearBlock, OpenLedger> {
        self.block.first = weather.first;
        self.block.days = weather.mean_c.len();
        for ledger in [
            &mut self.state.input,
            &mut self.state.outflow,
            &mut self.state.bare_ground_rain,
        ] {
            ledger.fill(0.0);
        }
        let (lanes, state, block) = (self.lanes, &mut self.state, &mut self.block);
        match self.path {
            Path::Widest => run_widest(lanes, &weather, state, block),
            Path::Avx2 => run_avx2(lanes, &weather, state, block),
            Path::Baseline => run(lanes, &weather, state, block),
        }
        self.close_ledgers()?;
        Ok(&mut self.block)
    }

    fn close_ledgers(&self) -> Result<(), OpenLedger> {
        let (first, last) = (
            self.block.row(&self.block.swe_mm, 0),
            self.block.row(&self.block.swe_mm, self.block.days),
        );
        for lane in 0..self.lanes.count() {
            let change_mm = last[lane] - first[lane];
            let state = &self.state;
            ledger::close(
                lane,
                state.input[lane],
                state.outflow[lane],
                state.bare_ground_rain[lane],
                change_mm,
            )?;
        }
        Ok(())
    }
}

#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
fn run_widest(lanes: &Lanes, weather: &YearView<'_>, state: &mut State, block: &mut YearBlock) {
    run(lanes, weather, state, block);
}

#[multiversion(targets("x86_64+avx2+avx"))]
fn run_avx2(lanes: &Lanes, weather: &YearView<'_>, state: &mut State, block: &mut YearBlock) {
    run(lanes, weather, state, block);
}

#[inline(always)]
fn run(lanes: &Lanes, weather: &YearView<'_>, state: &mut State, block: &mut YearBlock) {
    let (width, row_width) = (lanes.width, block.width);
    for (day, precipitation_mm) in weather.precipitation_mm.iter().copied().enumerate() {
        let row = day * row_width..day * row_width + width;
        let has_snow = swe_row(state, &mut block.swe_mm[row.clone()]);
        let month = usize::from(weather.month[day]) * width;
        let month = month..month + width;
        let is_wet = precipitation_mm > 0.0;
        let net_melt = &mut block.net_melt_mm[row.clone()];
        let outflow = &mut block.outflow_mm[row.clone()];
        let bare_ground_rain = &mut block.bare_ground_rain_mm[row];
        if has_snow || is_wet || block.detail.is_some() {
            mean_row(state, weather.mean_c[day], &lanes.mean_offset_c[month.clone()]);
        }
        if has_snow || is_wet {
            match lanes.degrees {
                DegreeRule::Mean => mean_degrees_row(state, lanes),
                DegreeRule::Diurnal => diurnal_degrees_row(
                    state,
                    lanes,
                    weather.half_range_c[day],
                    &lanes.half_range_offset_c[month.clone()],
                ),
            }
            let factor = (usize::from(weather.day_of_year[day]) - 1) * width;
            let factor = &lanes.degree_day_factor[factor..factor + width];
            if is_wet {
                let share = &lanes.precipitation_factor[month];
                match lanes.phase {
                    PhaseRule::Linear { .. } => {
                        split_row(state, lanes, precipitation_mm, share, linear_snow_fraction)
                    }
                    PhaseRule::Step { .. } => {
                        split_row(state, lanes, precipitation_mm, share, |mean, warm, _| {
                            step_snow_fraction(mean, warm)
                        });
                    }
                }
                store_row::<true>(state, lanes, factor, net_melt, outflow, bare_ground_rain);
            } else {
                store_row::<false>(state, lanes, factor, net_melt, outflow, bare_ground_rain);
            }
        } else {
            net_melt.fill(0.0);
            outflow.fill(0.0);
            bare_ground_rain.fill(0.0);
        }
        if let Some(detail) = &mut block.detail {
            detail.keep(day, state, has_snow || is_wet, is_wet);
        }
        mix_rows(lanes, block, day, has_snow || is_wet);
    }
    let end = weather.mean_c.len() * row_width;
    swe_row(state, &mut block.swe_mm[end..end + width]);
    let (lane_part, mix_part) = block.swe_mm[end..end + row_width].split_at_mut(width);
    for (mix, mean) in lanes.mixes.iter().zip(mix_part) {
        *mean = mix.of(lane_part);
    }
}

/// SWE of every lane as the day begins; tells whether there is any.
#[inline(always)]
fn swe_row(state: &State, swe: &mut [f64]) -> bool {
    let n = swe.len();
    let (ice, liquid) = (&state.ice[..n], &state.liquid[..n]);
    let mut any_bits = 0;
    for lane in 0..n {
        let value = ice[lane] + liquid[lane];
        any_bits |= value.to_bits();
        swe[lane] = value;
    }
    any_bits != 0
}

#[inline(always)]
fn mean_row(state: &mut State, station_c: f64, offset_c: &[f64]) {
    for (mean, offset) in state.mean.iter_mut().zip(offset_c) {
        *mean = station_c + offset;
    }
}

#[inline(always)]
fn mean_degrees_row(state: &mut State, lanes: &Lanes) {
    let n = lanes.width;
    let (mean, base) = (&state.mean[..n], &lanes.melt_base_c[..n]);
    let (above, below) = (&mut state.melt_degrees[..n], &mut state.freeze_degrees[..n]);
    for lane in 0..n {
        (above[lane], below[lane]) = mean_degrees(mean[lane], base[lane]);
    }
}

#[inline(always)]
fn diurnal_degrees_row(state: &mut State, lanes: &Lanes, half_range_c: f64, offset_c: &[f64]) {
    let n = lanes.width;
    let (mean, base, offset) = (&state.mean[..n], &lanes.melt_base_c[..n], &offset_c[..n]);
    let (above, below) = (&mut state.melt_degrees[..n], &mut state.freeze_degrees[..n]);
    for lane in 0..n {
        (above[lane], below[lane]) = diurnal_degrees(mean[lane], half_range_c + offset[lane], base[lane]);
    }
}

#[inline(always)]
fn split_row(
    state: &mut State,
    lanes: &Lanes,
    precipitation_mm: f64,
    factor: &[f64],
    snow_fraction: impl Fn(f64, f64, f64) -> f64,
) {
    let n = lanes.width;
    let (mean, factor) = (&state.mean[..n], &factor[..n]);
    let (warm, per_c) = (&lanes.phase_warm_c[..n], &lanes.phase_per_c[..n]);
    let (snow, rain, input) = (&mut state.snow[..n], &mut state.rain[..n], &mut state.input[..n]);
    for lane in 0..n {
        let fallen = precipitation_mm * factor[lane];
        let frozen = snow_fraction(mean[lane], warm[lane], per_c[lane]) * fallen;
        snow[lane] = frozen;
        rain[lane] = fallen - frozen;
        input[lane] += fallen;
    }
}

#[inline(always)]
fn store_row<const IS_WET: bool>(
    state: &mut State,
    lanes: &Lanes,
    degree_day_factor: &[f64],
    net_melt: &mut [f64],
    outflow: &mut [f64],
    bare_ground_rain: &mut [f64],
) {
    let n = lanes.width;
    let (ice, liquid) = (&mut state.ice[..n], &mut state.liquid[..n]);
    let (snow, rain, mean) = (&state.snow[..n], &state.rain[..n], &state.mean[..n]);
    let (above, below) = (&state.melt_degrees[..n], &state.freeze_degrees[..n]);
    let (holding, refreezing) = (&lanes.holding_fraction[..n], &lanes.refreeze_fraction[..n]);
    let (melt, refreeze) = (&mut state.melt[..n], &mut state.refreeze[..n]);
    let (year_outflow, year_bare) = (&mut state.outflow[..n], &mut state.bare_ground_rain[..n]);
    let factor = &degree_day_factor[..n];
    let (net_melt, outflow, bare_ground_rain) =
        (&mut net_melt[..n], &mut outflow[..n], &mut bare_ground_rain[..n]);
    for lane in 0..n {
        let pack = Pack {
            ice_mm: ice[lane],
            liquid_mm: liquid[lane],
        };
        let day = LaneDay {
            snow_mm: if IS_WET { snow[lane] } else { 0.0 },
            rain_mm: if IS_WET { rain[lane] } else { 0.0 },
            mean_c: mean[lane],
            melt_degrees_c: above[lane],
            freeze_degrees_c: below[lane],
            degree_day_factor: factor[lane],
        };
        let lane_const = LaneConst {
            holding_fraction: holding[lane],
            refreeze_fraction: refreezing[lane],
        };
        let (pack, fluxes) = step(pack, day, lane_const);
        ice[lane] = pack.ice_mm;
        liquid[lane] = pack.liquid_mm;
        melt[lane] = fluxes.melt_mm;
        refreeze[lane] = fluxes.refreeze_mm;
        net_melt[lane] = fluxes.melt_mm - fluxes.refreeze_mm;
        outflow[lane] = fluxes.outflow_mm;
        bare_ground_rain[lane] = fluxes.bare_ground_rain_mm;
        year_outflow[lane] += fluxes.outflow_mm;
        year_bare[lane] += fluxes.bare_ground_rain_mm;
    }
}

/// Basin means of the day's rows.
#[inline(always)]
fn mix_rows(lanes: &Lanes, block: &mut YearBlock, day: usize, has_water: bool) {
    let row = day * block.width..(day + 1) * block.width;
    for table in [
        &mut block.swe_mm,
        &mut block.net_melt_mm,
        &mut block.outflow_mm,
        &mut block.bare_ground_rain_mm,
    ] {
        let (lane_part, mix_part) = table[row.clone()].split_at_mut(lanes.width);
        for (mix, mean) in lanes.mixes.iter().zip(mix_part) {
            *mean = if has_water { mix.of(lane_part) } else { 0.0 };
        }
    }
}

impl Detail {
    /// Copies the day's rows; a day that was skipped has zeros, and a dry one no rain and snow.
    fn keep(&mut self, day: usize, state: &State, has_water: bool, is_wet: bool) {
        let row = day * self.width..(day + 1) * self.width;
        let keep = |into: &mut Vec<f64>, from: &[f64], is_valid: bool| {
            if is_valid {
                into[row.clone()].copy_from_slice(from);
            } else {
                into[row.clone()].fill(0.0);
            }
        };
        keep(&mut self.mean_c, &state.mean, true);
        keep(&mut self.rain_mm, &state.rain, is_wet);
        keep(&mut self.snow_mm, &state.snow, is_wet);
        keep(&mut self.melt_mm, &state.melt, has_water);
        keep(&mut self.refreeze_mm, &state.refreeze, has_water);
        keep(&mut self.ice_mm, &state.ice, true);
        keep(&mut self.liquid_mm, &state.liquid, true);
    }
}
