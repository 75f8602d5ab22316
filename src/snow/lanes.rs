//! Lanes: every band at every level as one column of numbers. The only place where options meet.

use super::melt::degree_day_factor;
use super::params::{DegreeRule, PhaseRule, SnowParams, TANH_MIDDLE_C, TANH_PER_C};
use crate::basin::Basin;
use crate::perturb::MonthlyChange;

/// Rows are padded to a multiple of this many lanes: one AVX-512 register, or a cache line.
pub const ROW_MULTIPLE: usize = 8;

/// What one lane is made of.
#[derive(Debug, Clone, Copy)]
pub struct LaneSpec<'a> {
    /// The basin, for its gradients.
    pub basin: &'a Basin,
    /// Elevation of the station, m.
    pub station_m: f64,
    /// Elevation of the lane, m.
    pub elevation_m: f64,
    /// Warming and precipitation change.
    pub change: &'a MonthlyChange,
    /// Parameters.
    pub snow: &'a SnowParams,
    /// Share of its basin mean.
    pub share: f64,
}

/// Columns of numbers for the engine, one a lane, and the shares with which they mix to basin means.
///
/// Lanes stand by their place in the group first and by group second: the lowest band at every level, then the next
/// band at every level. So bare lanes stand together at the front of a row, where the engine skips them, and the basin
/// means of all groups are summed side by side.
#[derive(Debug, Clone, PartialEq)]
pub struct Lanes {
    count: usize,
    pub(super) width: usize,
    pub(super) mixes: usize,
    pub(super) mix_width: usize,
    places: usize,
    /// `[vector of mixes][place]`: share of the lane at a place of a group in the group's basin mean.
    shares: Vec<[f64; ROW_MULTIPLE]>,
    pub(super) phase: PhaseRule,
    pub(super) degrees: DegreeRule,
    /// `[month][lane]`: added to the station's daily mean, degC.
    pub(super) mean_offset_c: Vec<f64>,
    /// `[month][lane]`: added to half the daily range, degC.
    pub(super) half_range_offset_c: Vec<f64>,
    /// `[month][lane]`: times the station's precipitation.
    pub(super) precipitation_factor: Vec<f64>,
    /// `[day of year][lane]`, day 1 first, mm per degC and day.
    pub(super) degree_day_factor: Vec<f64>,
    /// Melt base temperature, degC.
    pub(super) melt_base_c: Vec<f64>,
    /// `linear`: rain only above; `step`: the threshold; `tanh`: the middle, degC.
    pub(super) phase_warm_c: Vec<f64>,
    /// `linear`: 1/(R - S); `tanh`: the slope, per degC.
    pub(super) phase_per_c: Vec<f64>,
    pub(super) holding_fraction: Vec<f64>,
    pub(super) refreeze_fraction: Vec<f64>,
}

impl Lanes {
    /// Makes the columns. Each group of specs is one basin at one level and gives one basin mean; its shares should
    /// add up to 1. All specs take the kind of rain/snow rule and the degree rule of the first; their numbers are their
    /// own. A group that is shorter than the longest is filled up with lanes on which nothing falls.
    pub fn new(groups: &[Vec<LaneSpec<'_>>]) -> Self {
        let first = groups.iter().flatten().next();
        let mixes = groups.len();
        let places = groups.iter().map(Vec::len).max().unwrap_or(0);
        let mix_width = mixes.next_multiple_of(ROW_MULTIPLE);
        // The lanes of the last place, too, are read as a padded row of mixes; but a lone mean is summed by itself.
        let last = if mixes == 1 { 1 } else { mix_width };
        let width = (mixes * places.saturating_sub(1) + last).next_multiple_of(ROW_MULTIPLE);
        let mut lanes = Self {
            count: mixes * places,
            width,
            mixes,
            mix_width,
            places,
            shares: vec![[0.0; ROW_MULTIPLE]; places * mix_width / ROW_MULTIPLE],
            phase: first.map_or(PhaseRule::LINEAR, |spec| spec.snow.rain_snow),
            degrees: first.map_or(DegreeRule::Diurnal, |spec| spec.snow.degree_rule),
            mean_offset_c: vec![0.0; 12 * width],
            half_range_offset_c: vec![0.0; 12 * width],
            precipitation_factor: vec![0.0; 12 * width],
            degree_day_factor: vec![0.0; 366 * width],
            melt_base_c: vec![0.0; width],
            phase_warm_c: vec![0.0; width],
            phase_per_c: vec![0.0; width],
            holding_fraction: vec![0.0; width],
            refreeze_fraction: vec![0.0; width],
        };
        for (mix, group) in groups.iter().enumerate() {
            for (place, spec) in group.iter().enumerate() {
                lanes.set(lanes.column(mix, place), spec);
                lanes.shares[mix / ROW_MULTIPLE * places + place][mix % ROW_MULTIPLE] = spec.share;
            }
        }
        lanes
    }

    /// Column of the lane at a place of a group, both counted from 0 in the order in which they were given.
    pub fn column(&self, group: usize, place: usize) -> usize {
        place * self.mixes + group
    }

    /// Number of lanes, without the padding.
    pub fn count(&self) -> usize {
        self.count
    }

    /// Number of basin means.
    pub fn mixes(&self) -> usize {
        self.mixes
    }

    /// Column of the first basin mean in a year block; the others follow in the order of their groups.
    pub fn first_mix_column(&self) -> usize {
        self.width
    }

    /// A basin mean of a row of lanes: the shares' sum, taken in the order of the group.
    pub fn mix(&self, mix: usize, row: &[f64]) -> f64 {
        self.mix_from(0, mix, row)
    }

    /// The same, the places before `first_place` left out.
    #[inline(always)]
    fn mix_from(&self, first_place: usize, mix: usize, row: &[f64]) -> f64 {
        let shares = &self.shares[mix / ROW_MULTIPLE * self.places..][..self.places];
        let mut sum = 0.0;
        for (place, shares) in shares.iter().enumerate().skip(first_place) {
            sum += shares[mix % ROW_MULTIPLE] * row[self.column(mix, place)];
        }
        sum
    }

    /// All basin means of a row of lanes, in which the lanes before `from` are 0; the same sums as [`Self::mix`] takes,
    /// side by side.
    #[inline(always)]
    pub(super) fn mix_row(&self, row: &[f64], from: usize, means: &mut [f64]) {
        let first_place = from.checked_div(self.mixes).unwrap_or(0);
        if self.mixes == 1 {
            means.fill(0.0);
            means[0] = self.mix_from(first_place, 0, row);
            return;
        }
        let (means, _) = means.as_chunks_mut::<ROW_MULTIPLE>();
        for (vector, means) in means.iter_mut().enumerate() {
            let shares = &self.shares[vector * self.places..][..self.places];
            let mut sums = [0.0; ROW_MULTIPLE];
            for (place, shares) in shares.iter().enumerate().skip(first_place) {
                let lanes = &row[place * self.mixes + vector * ROW_MULTIPLE..][..ROW_MULTIPLE];
                for mix in 0..ROW_MULTIPLE {
                    sums[mix] += shares[mix] * lanes[mix];
                }
            }
            *means = sums;
        }
    }

    fn set(&mut self, lane: usize, spec: &LaneSpec<'_>) {
        let rise_km = (spec.elevation_m - spec.station_m) / 1000.0;
        let gradient = &spec.basin.temperature;
        let by_elevation = spec.basin.precipitation.factor(spec.station_m, spec.elevation_m);
        for month in 0..12 {
            let at = month * self.width + lane;
            let tmin_c = spec.change.tmin_c[month] + gradient.tmin_c_per_km[month] * rise_km;
            let tmax_c = spec.change.tmax_c[month] + gradient.tmax_c_per_km[month] * rise_km;
            self.mean_offset_c[at] = (tmin_c + tmax_c) / 2.0;
            self.half_range_offset_c[at] = (tmax_c - tmin_c) / 2.0;
            self.precipitation_factor[at] = spec.change.precipitation_factor[month] * by_elevation;
        }
        for day in 0..366_u16 {
            self.degree_day_factor[usize::from(day) * self.width + lane] =
                degree_day_factor(spec.snow, day + 1);
        }
        self.melt_base_c[lane] = spec.snow.melt_base_c;
        (self.phase_warm_c[lane], self.phase_per_c[lane]) = match spec.snow.rain_snow {
            PhaseRule::Linear { snow_only_below_c, rain_only_above_c } => {
                (rain_only_above_c, 1.0 / (rain_only_above_c - snow_only_below_c))
            }
            PhaseRule::Step { half_snow_at_c } => (half_snow_at_c, 0.0),
            PhaseRule::Tanh => (TANH_MIDDLE_C, TANH_PER_C),
        };
        self.holding_fraction[lane] = spec.snow.liquid_holding_fraction;
        self.refreeze_fraction[lane] = spec.snow.refreeze_fraction;
    }
}
