//! Lanes: every band at every level as one column of numbers. The only place where options meet.

use super::melt::degree_day_factor;
use super::params::{DegreeRule, PhaseRule, SnowParams};
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

/// A basin mean: consecutive lanes with their shares.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Mix {
    pub first: usize,
    pub shares: Vec<f64>,
}

/// Columns of numbers for the engine, one a lane, and the mixes of lanes that are basin means.
#[derive(Debug, Clone, PartialEq)]
pub struct Lanes {
    count: usize,
    pub(super) width: usize,
    pub(super) mixes: Vec<Mix>,
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
    /// `linear`: rain only above; `step`: the threshold, degC.
    pub(super) phase_warm_c: Vec<f64>,
    /// `linear`: 1/(R - S), per degC.
    pub(super) phase_per_c: Vec<f64>,
    pub(super) holding_fraction: Vec<f64>,
    pub(super) refreeze_fraction: Vec<f64>,
}

impl Lanes {
    /// Makes the columns. Each group of specs is one basin at one level and gives one basin mean; its shares should
    /// add up to 1. All specs take the kind of rain/snow rule and the degree rule of the first; their numbers are their
    /// own.
    pub fn new(groups: &[Vec<LaneSpec<'_>>]) -> Self {
        let specs: Vec<&LaneSpec<'_>> = groups.iter().flatten().collect();
        let width = specs.len().next_multiple_of(ROW_MULTIPLE);
        let mut lanes = Self {
            count: specs.len(),
            width,
            mixes: Vec::with_capacity(groups.len()),
            phase: specs
                .first()
                .map_or(PhaseRule::LINEAR, |spec| spec.snow.rain_snow),
            degrees: specs
                .first()
                .map_or(DegreeRule::Diurnal, |spec| spec.snow.degree_rule),
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
        let mut first = 0;
        for group in groups {
            lanes.mixes.push(Mix {
                first,
                shares: group.iter().map(|spec| spec.share).collect(),
            });
            first += group.len();
        }
        for (lane, spec) in specs.into_iter().enumerate() {
            lanes.set(lane, spec);
        }
        lanes
    }

    /// Number of lanes, without the padding.
    pub fn count(&self) -> usize {
        self.count
    }

    /// Number of basin means.
    pub fn mixes(&self) -> usize {
        self.mixes.len()
    }

    /// Column of the first basin mean in a year block; the others follow in the order of their groups.
    pub fn first_mix_column(&self) -> usize {
        self.width
    }

    /// A basin mean of a row of lanes: the shares' sum, taken in the order of the lanes.
    pub fn mix(&self, mix: usize, row: &[f64]) -> f64 {
        self.mixes[mix].of(row)
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
            PhaseRule::Linear {
                snow_only_below_c,
                rain_only_above_c,
            } => (rain_only_above_c, 1.0 / (rain_only_above_c - snow_only_below_c)),
            PhaseRule::Step { half_snow_at_c } => (half_snow_at_c, 0.0),
        };
        self.holding_fraction[lane] = spec.snow.liquid_holding_fraction;
        self.refreeze_fraction[lane] = spec.snow.refreeze_fraction;
    }
}

impl Mix {
    #[inline(always)]
    pub fn of(&self, row: &[f64]) -> f64 {
        let mut sum = 0.0;
        for (value, share) in row[self.first..].iter().zip(&self.shares) {
            sum += share * value;
        }
        sum
    }
}
