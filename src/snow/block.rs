//! The year block: one water year of every lane and basin mean, as the engine leaves it.

use super::lanes::Lanes;
use chrono::NaiveDate;

/// One water year, `[day][column]`: first the lanes, padded, then the basin means ("mixes"), padded.
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
    /// Everything else a day has, where it was asked for.
    pub detail: Option<Detail>,
}

/// The rest of a lane's day, `[day][lane]`, lanes padded, without the basin means.
#[derive(Debug, Clone, PartialEq)]
pub struct Detail {
    /// Lanes in a row.
    pub width: usize,
    /// Daily mean temperature, degC.
    pub mean_c: Vec<f64>,
    /// Melt, mm.
    pub melt_mm: Vec<f64>,
    /// Refreezing, mm.
    pub refreeze_mm: Vec<f64>,
    /// Ice as the day ends, mm.
    pub ice_mm: Vec<f64>,
    /// Liquid as the day ends, mm.
    pub liquid_mm: Vec<f64>,
}

/// A water year is at most this long.
pub(super) const LONGEST_YEAR: usize = 366;

impl YearBlock {
    pub(super) fn new(lane_width: usize, mix_width: usize, with_detail: bool) -> Self {
        let width = lane_width + mix_width;
        let rows = |days: usize, width: usize| vec![0.0; days * width];
        let lane_rows = || rows(LONGEST_YEAR, lane_width);
        Self {
            first: NaiveDate::MIN,
            days: 0,
            width,
            mixes_at: lane_width,
            swe_mm: rows(LONGEST_YEAR + 1, width),
            net_melt_mm: rows(LONGEST_YEAR, width),
            outflow_mm: rows(LONGEST_YEAR, width),
            bare_ground_rain_mm: rows(LONGEST_YEAR, width),
            rain_mm: rows(LONGEST_YEAR, width),
            snow_mm: rows(LONGEST_YEAR, width),
            detail: with_detail.then(|| Detail {
                width: lane_width,
                mean_c: lane_rows(),
                melt_mm: lane_rows(),
                refreeze_mm: lane_rows(),
                ice_mm: lane_rows(),
                liquid_mm: lane_rows(),
            }),
        }
    }

    /// A narrow block that holds the basin means of some lanes and nothing else.
    pub fn of_means(lanes: &Lanes) -> Self {
        Self::new(0, lanes.mix_width, false)
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
        ];
        for (from, narrow) in tables {
            let rows = from.chunks_exact(self.width).zip(narrow.chunks_exact_mut(into.width));
            for (row, means) in rows.take(self.days + 1) {
                means.copy_from_slice(&row[self.mixes_at..]);
            }
        }
    }

    /// One day's row of a table of this block, days counted from 0.
    pub fn row<'a>(&self, table: &'a [f64], day: usize) -> &'a [f64] {
        &table[day * self.width..(day + 1) * self.width]
    }
}
