//! The engine: steps lanes through water years and keeps the snow between them, and holds each year to account.

use super::block::YearBlock;
use super::days::{State, run};
use super::lanes::Lanes;
use super::ledger::{Ledger, OpenLedger};
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

/// Ice, liquid and cold content of every lane, to the bit.
#[derive(Debug, Clone, PartialEq, Eq, Hash)]
pub struct Snow(Box<[u64]>);

impl<'l> Engine<'l> {
    /// An engine on bare ground. `with_detail` keeps every state and flux of a day in the year block.
    pub fn new(lanes: &'l Lanes, with_detail: bool) -> Self {
        Self::on_path(lanes, with_detail, Path::default())
    }

    /// An engine that is held to one compiled form of the row passes.
    pub fn on_path(lanes: &'l Lanes, with_detail: bool, path: Path) -> Self {
        Self { lanes, path, state: State::bare(lanes), block: YearBlock::new(lanes, with_detail) }
    }

    /// The same engine, asked for the covered share of bands and basins, too.
    pub fn with_cover(self) -> Self {
        Self { block: self.block.with_cover(), ..self }
    }

    /// The snow that is there.
    pub fn snow(&self) -> Snow {
        let State { ice, liquid, cold, .. } = &self.state;
        Snow(ice.iter().chain(liquid).chain(cold).map(|depth_mm| depth_mm.to_bits()).collect())
    }

    /// Puts down snow that [`Self::snow`] of an engine with the same lanes gave.
    pub fn put_snow(&mut self, snow: &Snow) {
        let State { ice, liquid, cold, .. } = &mut self.state;
        for (depth_mm, bits) in ice.iter_mut().chain(liquid).chain(cold).zip(&snow.0) {
            *depth_mm = f64::from_bits(*bits);
        }
    }

    /// Takes all snow away.
    pub fn restart(&mut self) {
        let State { ice, liquid, cold, .. } = &mut self.state;
        for row in [ice, liquid, cold] {
            row.fill(0.0);
        }
    }

    /// Runs one water year on the snow that is there, and leaves it in the year block. Where every year begins bare, the snow
    /// that is left as the year ends is taken away; the block still has it.
    ///
    /// # Errors
    /// A lane whose water ledger does not close: a fault of the engine, never of the input.
    pub fn year(&mut self, weather: YearView<'_>) -> Result<&mut YearBlock, OpenLedger> {
        self.block.first = weather.first;
        self.block.days = weather.mean_c.len();
        self.state.begin_ledger();
        let (lanes, state, block) = (self.lanes, &mut self.state, &mut self.block);
        match self.path {
            Path::Widest => run_widest(lanes, &weather, state, block),
            Path::Avx2 => run_avx2(lanes, &weather, state, block),
            Path::Baseline => run(lanes, &weather, state, block),
        }
        self.close_ledgers()?;
        if self.lanes.starts_bare {
            self.restart();
        }
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
        let state = &self.state;
        for lane in 0..self.lanes.count() {
            let ledger = Ledger {
                input_mm: state.input[lane],
                outflow_mm: state.outflow[lane],
                bare_ground_rain_mm: state.bare_ground_rain[lane],
                sublimation_mm: state.sublimation.get(lane).copied().unwrap_or(0.0),
                change_mm: last[lane] - first[lane],
            };
            ledger.close(lane)?;
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
