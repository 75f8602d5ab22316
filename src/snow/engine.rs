//! The engine: a water year of daily weather over all lanes at once, as passes over rows.
//!
//! A day is a few passes over rows that stay in the first-level cache: temperature and degrees, the split into rain and
//! snow on wet days, the store. The rules are chosen once a row; the equations themselves are the scalar functions of
//! this room, and the compiler turns the row loops into vector code. The lanes at the front of a row that are bare and
//! stay bare are skipped: melt and outflow are 0 there, and all rain falls on bare ground.

use super::block::{Detail, YearBlock};
use super::lanes::{Lanes, ROW_MULTIPLE};
use super::ledger::{self, OpenLedger};
use super::params::{DegreeRule, PhaseRule};
use super::passes::{diurnal_degrees_row, mean_degrees_row, mean_row, split_row, store_row};
use super::{linear_snow_fraction, step_snow_fraction, tanh_snow_fraction};
use crate::weather::{Series, YearSpan, YearView};
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

/// Ice and liquid of every lane, to the bit.
#[derive(Debug, Clone, PartialEq, Eq, Hash)]
pub struct Snow(Box<[u64]>);

/// Rows of the lanes' state, of the day at hand, and of the year's ledger.
#[derive(Debug)]
struct State {
    ice: Vec<f64>,
    liquid: Vec<f64>,
    mean: Vec<f64>,
    melt_degrees: Vec<f64>,
    freeze_degrees: Vec<f64>,
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
            melt: row(),
            refreeze: row(),
            input: row(),
            outflow: row(),
            bare_ground_rain: row(),
        };
        Self { lanes, path, state, block: YearBlock::new(lanes.width, lanes.mix_width, with_detail) }
    }

    /// The snow that is there.
    pub fn snow(&self) -> Snow {
        Snow(self.state.ice.iter().chain(&self.state.liquid).map(|depth_mm| depth_mm.to_bits()).collect())
    }

    /// Puts down snow that [`Self::snow`] of an engine with the same lanes gave.
    pub fn put_snow(&mut self, snow: &Snow) {
        for (depth_mm, bits) in self.state.ice.iter_mut().chain(&mut self.state.liquid).zip(&snow.0) {
            *depth_mm = f64::from_bits(*bits);
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
        for ledger in [&mut self.state.input, &mut self.state.outflow, &mut self.state.bare_ground_rain] {
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

    /// Runs all years of a series, each on the snow that the one before it left, or on bare ground where it does not follow
    /// on it, and hands each to `look`.
    ///
    /// # Errors
    /// A lane whose water ledger does not close, or what `look` says.
    pub fn years<E: From<OpenLedger>>(
        &mut self,
        weather: &Series,
        mut look: impl FnMut(&YearSpan, &mut YearBlock) -> Result<(), E>,
    ) -> Result<(), E> {
        for span in &weather.years {
            if !span.follows {
                self.restart();
            }
            look(span, self.year(weather.view(span))?)?;
        }
        Ok(())
    }

    fn close_ledgers(&self) -> Result<(), OpenLedger> {
        let (first, last) =
            (self.block.row(&self.block.swe_mm, 0), self.block.row(&self.block.swe_mm, self.block.days));
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
        let (snow, mean_snow) = block.snow_mm[row].split_at_mut(width);
        let mut fallen = Fallen { rain, snow };
        let with_snow = first_with_any(swe);
        let month = usize::from(weather.month[day]) * width;
        let month = month..month + width;
        let is_wet = precipitation_mm > 0.0;

        let mean_from = if is_wet || block.detail.is_some() { 0 } else { with_snow };
        let offset = &lanes.mean_offset_c[month.clone()];
        mean_row(&mut state.mean[mean_from..], weather.mean_c[day], &offset[mean_from..]);
        let mut from = with_snow;
        if is_wet {
            let share = &lanes.precipitation_factor[month.clone()];
            match lanes.phase {
                PhaseRule::Linear { .. } => {
                    split(state, lanes, precipitation_mm, share, &mut fallen, linear_snow_fraction);
                }
                PhaseRule::Step { .. } => {
                    split(state, lanes, precipitation_mm, share, &mut fallen, |mean, warm, _| {
                        step_snow_fraction(mean, warm)
                    });
                }
                PhaseRule::Tanh => {
                    split(state, lanes, precipitation_mm, share, &mut fallen, tanh_snow_fraction);
                }
            }
            from = first_with_any(&fallen.snow[..with_snow]);
            bare_rain_row(&mut state.bare_ground_rain, &fallen.rain[..from], bare_ground_rain);
            lanes.mix_row(fallen.rain, 0, mean_rain);
            lanes.mix_row(fallen.snow, from, mean_snow);
        } else {
            for row in [&mut *bare_ground_rain, &mut *fallen.rain, mean_rain, &mut *fallen.snow, mean_snow] {
                row.fill(0.0);
            }
        }
        let half_range_offset = &lanes.half_range_offset_c[month];
        degrees_row(state, lanes, from, weather.half_range_c[day], half_range_offset);
        let factor = (usize::from(weather.day_of_year[day]) - 1) * width;
        let factor = &lanes.degree_day_factor[factor..factor + width];
        let next_swe = &mut after[..width];
        for table in [&mut *next_swe, &mut *net_melt, &mut *outflow] {
            table[..from].fill(0.0);
        }
        let out = Out { swe: next_swe, net_melt, outflow, bare_ground_rain };
        match (&mut block.detail, is_wet) {
            (Some(detail), _) => {
                state.melt[..from].fill(0.0);
                state.refreeze[..from].fill(0.0);
                if is_wet {
                    store::<true, true>(state, lanes, from, factor, &fallen, out);
                } else {
                    store::<false, true>(state, lanes, from, factor, &fallen, out);
                }
                detail.keep(day, state);
            }
            (None, true) => store::<true, false>(state, lanes, from, factor, &fallen, out),
            (None, false) => store::<false, false>(state, lanes, from, factor, &fallen, out),
        }
        lanes.mix_row(swe, with_snow, mean_swe);
        lanes.mix_row(net_melt, from, mean_net_melt);
        lanes.mix_row(outflow, from, mean_outflow);
        lanes.mix_row(bare_ground_rain, if is_wet { 0 } else { width }, mean_bare_ground_rain);
    }
    let end = weather.mean_c.len() * row_width;
    let (swe, mean_swe) = block.swe_mm[end..end + row_width].split_at_mut(width);
    lanes.mix_row(swe, 0, mean_swe);
}

/// What falls on a day.
struct Fallen<'b> {
    rain: &'b mut [f64],
    snow: &'b mut [f64],
}

/// Where the store puts a day: SWE as the next day begins, and the day's fluxes.
struct Out<'b> {
    swe: &'b mut [f64],
    net_melt: &'b mut [f64],
    outflow: &'b mut [f64],
    bare_ground_rain: &'b mut [f64],
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
    state: &mut State,
    lanes: &Lanes,
    precipitation_mm: f64,
    factor: &[f64],
    fallen: &mut Fallen<'_>,
    snow_fraction: impl Fn(f64, f64, f64) -> f64,
) {
    let (State { input, mean, .. }, Fallen { rain, snow }) = (state, fallen);
    let (warm, per_c) = (&lanes.phase_warm_c, &lanes.phase_per_c);
    split_row(snow, rain, input, mean, warm, per_c, factor, precipitation_mm, snow_fraction);
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
fn store<const IS_WET: bool, const WITH_DETAIL: bool>(
    state: &mut State,
    lanes: &Lanes,
    from: usize,
    degree_day_factor: &[f64],
    fallen: &Fallen<'_>,
    out: Out<'_>,
) {
    let Out { swe, net_melt, outflow, bare_ground_rain } = out;
    store_row::<IS_WET, WITH_DETAIL>(
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
        &fallen.snow[from..],
        &fallen.rain[from..],
        &state.mean[from..],
        &state.melt_degrees[from..],
        &state.freeze_degrees[from..],
        &degree_day_factor[from..],
        &lanes.holding_fraction[from..],
        &lanes.refreeze_fraction[from..],
    );
}

impl Detail {
    /// Copies the day's rows.
    fn keep(&mut self, day: usize, state: &State) {
        let row = day * self.width..(day + 1) * self.width;
        for (table, day) in [
            (&mut self.mean_c, &state.mean),
            (&mut self.melt_mm, &state.melt),
            (&mut self.refreeze_mm, &state.refreeze),
            (&mut self.ice_mm, &state.ice),
            (&mut self.liquid_mm, &state.liquid),
        ] {
            table[row.clone()].copy_from_slice(day);
        }
    }
}
