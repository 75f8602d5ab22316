//! The year block: one water year of every lane and of the means over lanes, as the engine leaves it.

use super::lanes::Lanes;
use chrono::NaiveDate;

/// A place with less is bare, mm.
pub const BARE_MM: f64 = 1.0;

/// One water year, `[day][column]`: first the lanes, padded, then the means: of the bands, where they have patch classes, and
/// of the basins ("mixes"), padded.
///
/// Fluxes belong to their day. `swe_mm` has one row more: row d is S(d), SWE as day d begins (rows counted from 0
/// here), and the last row is SWE as the year ends.
#[derive(Debug, Clone, PartialEq)]
pub struct YearBlock {
    /// First day of the year.
    pub first: NaiveDate,
    /// Days in the year.
    pub days: usize,
    /// Columns in a row.
    pub width: usize,
    /// Column of the first mean.
    pub means_at: usize,
    /// Column of the first basin mean.
    pub mixes_at: usize,
    /// SWE as each day begins, mm; `days + 1` rows.
    pub swe_mm: Vec<f64>,
    /// Melt less refreezing, mm.
    pub net_melt_mm: Vec<f64>,
    /// Snowpack outflow, mm.
    pub outflow_mm: Vec<f64>,
    /// Rain on bare ground, mm.
    pub bare_ground_rain_mm: Vec<f64>,
    /// Rain, mm.
    pub rain_mm: Vec<f64>,
    /// Snowfall, mm.
    pub snow_mm: Vec<f64>,
    /// Snow that went into the air, mm; no rows where none can.
    pub sublimation_mm: Vec<f64>,
    /// Share of the area of each mean, its columns alone, that holds at least 1 mm as a day begins; no rows where it was not
    /// asked for.
    pub covered: Vec<f64>,
    /// Everything else a day has, where it was asked for.
    pub detail: Option<Detail>,
}

/// The rest of a lane's day, `[day][lane]`, lanes padded, without the means.
#[derive(Debug, Clone, PartialEq)]
pub struct Detail {
    /// Lanes in a row.
    pub width: usize,
    /// Daily mean temperature, degC.
    pub mean_c: Vec<f64>,
    /// The temperature that tells rain from snow, degC: the wet bulb's; no rows where it is the mean. Only on wet days.
    pub wet_bulb_c: Vec<f64>,
    /// Melt, mm.
    pub melt_mm: Vec<f64>,
    /// Refreezing, mm.
    pub refreeze_mm: Vec<f64>,
    /// Ice as the day ends, mm.
    pub ice_mm: Vec<f64>,
    /// Liquid as the day ends, mm.
    pub liquid_mm: Vec<f64>,
    /// Cold content as the day ends, mm; no rows without a cold store.
    pub cold_mm: Vec<f64>,
}

/// A water year is at most this long.
pub(super) const LONGEST_YEAR: usize = 366;

impl YearBlock {
    /// A block for all columns of some lanes.
    pub(super) fn new(lanes: &Lanes, with_detail: bool) -> Self {
        let rows = |of_it: bool| vec![0.0; if of_it { LONGEST_YEAR * lanes.width } else { 0 }];
        Self {
            detail: with_detail.then(|| Detail {
                width: lanes.width,
                mean_c: rows(true),
                wet_bulb_c: rows(lanes.has_wet_bulb()),
                melt_mm: rows(true),
                refreeze_mm: rows(true),
                ice_mm: rows(true),
                liquid_mm: rows(true),
                cold_mm: rows(lanes.has_stores()),
            }),
            ..Self::wide(lanes.width, lanes.means.band_width, lanes)
        }
    }

    /// A narrow block that holds the basin means of some lanes and nothing else.
    pub fn of_means(lanes: &Lanes) -> Self {
        Self::wide(0, 0, lanes).with_cover()
    }

    fn wide(lane_width: usize, band_width: usize, lanes: &Lanes) -> Self {
        let mixes_at = lane_width + band_width;
        let width = mixes_at + lanes.means.mix_width;
        let rows = |days: usize| vec![0.0; days * width];
        Self {
            first: NaiveDate::MIN,
            days: 0,
            width,
            means_at: lane_width,
            mixes_at,
            swe_mm: rows(LONGEST_YEAR + 1),
            net_melt_mm: rows(LONGEST_YEAR),
            outflow_mm: rows(LONGEST_YEAR),
            bare_ground_rain_mm: rows(LONGEST_YEAR),
            rain_mm: rows(LONGEST_YEAR),
            snow_mm: rows(LONGEST_YEAR),
            sublimation_mm: rows(if lanes.has_stores() { LONGEST_YEAR } else { 0 }),
            covered: Vec::new(),
            detail: None,
        }
    }

    /// Makes room for the covered shares.
    pub(super) fn with_cover(mut self) -> Self {
        self.covered = vec![0.0; LONGEST_YEAR * (self.width - self.means_at)];
        self
    }

    /// Copies the basin means into a narrow block, whose columns they are.
    pub fn copy_means(&self, into: &mut Self) {
        (into.first, into.days) = (self.first, self.days);
        let tables = [
            (&self.rain_mm, &mut into.rain_mm),
            (&self.snow_mm, &mut into.snow_mm),
            (&self.swe_mm, &mut into.swe_mm),
            (&self.net_melt_mm, &mut into.net_melt_mm),
            (&self.outflow_mm, &mut into.outflow_mm),
            (&self.bare_ground_rain_mm, &mut into.bare_ground_rain_mm),
            (&self.sublimation_mm, &mut into.sublimation_mm),
        ];
        let copy = |from: &[f64], wide: usize, at: usize, narrow: &mut [f64]| {
            let rows = from.chunks_exact(wide).zip(narrow.chunks_exact_mut(into.width));
            for (row, means) in rows.take(self.days + 1) {
                means.copy_from_slice(&row[at..]);
            }
        };
        for (from, narrow) in tables {
            copy(from, self.width, self.mixes_at, narrow);
        }
        let means = self.width - self.means_at;
        copy(&self.covered, means, self.mixes_at - self.means_at, &mut into.covered);
    }

    /// One day's row of a table of this block, days counted from 0.
    pub fn row<'a>(&self, table: &'a [f64], day: usize) -> &'a [f64] {
        &table[day * self.width..(day + 1) * self.width]
    }

    /// The covered share of a column as a day begins, days counted from 0: a lane is covered or not. None of a mean where it
    /// was not asked for.
    pub fn covered_share(&self, day: usize, column: usize) -> Option<f64> {
        match column.checked_sub(self.means_at) {
            Some(mean) => self.covered.get(day * (self.width - self.means_at) + mean).copied(),
            None => Some(cover(self.swe_mm[day * self.width + column])),
        }
    }
}

/// Whether a place that holds so much is covered: 1 or 0.
#[inline(always)]
pub fn cover(swe_mm: f64) -> f64 {
    if swe_mm >= BARE_MM { 1.0 } else { 0.0 }
}
