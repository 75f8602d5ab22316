//! The snow line and the elevation of freezing: where they lie at each level, and how far they rise.

use super::elevations::{Line, LineRange, Row};
use super::ranged::Ranged;
use super::record_range::Range;
use super::resample::{Ranked, Resamples};
use ndarray::{ArrayView3, Axis};
use serde::Serialize;

/// Both lines by level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SnowLine {
    /// The snow line lies where the headline SWE reaches this much, mm.
    pub swe_mm: f64,
    /// One entry a level.
    pub levels: Vec<SnowLineLevel>,
}

/// One level.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SnowLineLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Where the median over realizations of the period value reaches the threshold, the lowest such elevation.
    pub snow_line: Line,
    /// 5-95 % of the same of each realization: how far precipitation spreads it.
    pub snow_line_range: Option<LineRange>,
    /// 5-95 % over resampled realizations: how well the line of the medians is known; none of a single realization.
    pub snow_line_resampled: Option<LineRange>,
    /// Its rise from the reference for each degC; none where one of the two lies outside the bands, and at the reference.
    pub snow_line_rise_m_per_c: Option<f64>,
    /// Its 5-95 % range over resampled realizations; none where the line of a resample lies outside the bands.
    pub snow_line_rise_resampled_m_per_c: Option<Range>,
    /// Where the mean of the three winter months over the record's years is 0 degC; it rests on no realization.
    pub freezing: Line,
    /// Its rise for each degC.
    pub freezing_rise_m_per_c: Option<f64>,
}

/// What the lines are found of.
#[derive(Clone, Copy)]
pub(super) struct Grounds<'a> {
    pub rows: &'a [Row],
    /// Period values of the headline measure, `[level][band][realization]`, mm.
    pub swe_mm: ArrayView3<'a, f64>,
    /// `[level][band]`, degC.
    pub winter_mean_c: &'a [Vec<f64>],
}

impl Grounds<'_> {
    fn of_realization(&self, level: usize, realization: usize, threshold_mm: f64) -> Line {
        let of_level = self.swe_mm.index_axis(Axis(0), level);
        let at = |row: &Row| (row.elevation_m, row.mean(|band| of_level[[band, realization]]));
        Line::reaching(threshold_mm, self.rows.iter().map(at))
    }

    fn ranked(&self, level: usize) -> RankedRows {
        let of_level = self.swe_mm.index_axis(Axis(0), level);
        let realizations = of_level.len_of(Axis(1));
        let at = |row: &Row| {
            let of_one = |realization| (row.mean(|band| of_level[[band, realization]]), realization);
            (row.elevation_m, Ranked::new((0..realizations).map(of_one)))
        };
        RankedRows(self.rows.iter().map(at).collect())
    }

    fn freezing(&self, level: usize) -> Line {
        let Some(winter_mean_c) = self.winter_mean_c.get(level) else { return Line::AboveHighestBand };
        let below = |row: &Row| (row.elevation_m, -row.mean(|band| winter_mean_c[band]));
        Line::reaching(0.0, self.rows.iter().map(below))
    }
}

/// Elevations of a level, each with its realizations' SWE in order.
struct RankedRows(Vec<(f64, Ranked)>);

impl RankedRows {
    /// The line of the medians of a resample.
    fn line(&self, weights: &[u32], threshold_mm: f64) -> Line {
        let medians = self.0.iter().map_while(|(elevation_m, swe_mm)| {
            let [median_mm] = swe_mm.quantiles(weights, [0.5])?;
            Some((*elevation_m, median_mm))
        });
        Line::reaching(threshold_mm, medians)
    }
}

impl SnowLine {
    pub(super) fn of(
        grounds: &Grounds<'_>,
        threshold_mm: f64,
        levels_c: &[f64],
        reference: usize,
        resamples: &Resamples,
    ) -> Self {
        let rise = |from: Line, to: Line, warming_c: f64| {
            let rise_m = to.elevation_m()? - from.elevation_m()?;
            (warming_c != 0.0).then_some(rise_m / warming_c)
        };
        let realizations = grounds.swe_mm.len_of(Axis(2));
        let lines = |level: usize| {
            let rows = grounds.ranked(level);
            let of = |weights: &[u32]| rows.line(weights, threshold_mm);
            (of(&vec![1; realizations]), resamples.each(of))
        };
        let ((snow, snow_resampled), freezing) = (lines(reference), grounds.freezing(reference));
        let levels = levels_c.iter().enumerate().map(|(level, level_c)| {
            let warming_c = level_c - levels_c[reference];
            let ((snow_here, resampled), freezing_here) = (lines(level), grounds.freezing(level));
            let snow_rise = rise(snow, snow_here, warming_c);
            let rises = snow_resampled.iter().zip(&resampled).map(|(from, to)| rise(*from, *to, warming_c));
            let realizations = 0..realizations;
            let each =
                realizations.map(|realization| grounds.of_realization(level, realization, threshold_mm));
            SnowLineLevel {
                level_c: *level_c,
                snow_line: snow_here,
                snow_line_range: LineRange::of(each),
                snow_line_rise_m_per_c: snow_rise,
                snow_line_rise_resampled_m_per_c: snow_rise.and_then(|rise| Ranged::new(rise, rises).range()),
                snow_line_resampled: LineRange::of(resampled),
                freezing: freezing_here,
                freezing_rise_m_per_c: rise(freezing, freezing_here, warming_c),
            }
        });
        Self { swe_mm: threshold_mm, levels: levels.collect() }
    }
}

#[cfg(test)]
mod tests {
    use super::super::places::tests::bands_at;
    use super::*;
    use crate::perturb::stream;
    use ndarray::Array3;
    use rand_distr::{Distribution, StandardNormal};

    /// Geometry: under a constant gradient of -6.5 degC/km the line of 0 degC rises 1000/6.5 = 153.85 m for each degC, under -5.0
    /// 200 m, under -8.13 123 m, all within the published 120 to 200 m (123 m per degC: Hantel & Maurer 2011, Meteorol. Z. 20:267);
    /// exactly, as the winter mean is linear between bands. From 2 degC at 1000 m it starts 2/6.5 km higher, 1307.69 m.
    #[test]
    fn the_line_of_freezing_rises_by_the_gradient() {
        for (c_per_km, expected_m) in [(6.5, 153.846_153_846), (5.0, 200.0), (8.13, 123.001_230_012)] {
            let bands = bands_at(&[1000.0, 1300.0, 1900.0, 2200.0, 2600.0]);
            let levels_c = [0.0, 1.0, 3.0];
            let winter_mean_c: Vec<Vec<f64>> = levels_c
                .iter()
                .map(|level_c| {
                    let of = |elevation_m: f64| 2.0 + level_c - c_per_km * (elevation_m - 1000.0) / 1000.0;
                    bands.iter().map(|band| of(band.elevation_m)).collect()
                })
                .collect();
            let swe_mm = Array3::zeros((3, 5, 2));
            let rows = Row::all(&bands);
            let grounds = Grounds { rows: &rows, swe_mm: swe_mm.view(), winter_mean_c: &winter_mean_c };
            let found = SnowLine::of(&grounds, 100.0, &levels_c, 0, &Resamples::new(1, 2));
            let start_m = found.levels[0].freezing.elevation_m().expect("among the bands");
            assert!((start_m - 1000.0 - 2000.0 / c_per_km).abs() < 1e-9, "{start_m}");
            for level in &found.levels[1..] {
                assert!((level.freezing_rise_m_per_c.expect("both") - expected_m).abs() < 1e-9, "{level:?}");
            }
            assert_eq!(found.levels[0].freezing_rise_m_per_c, None);
            assert_eq!(found.levels[0].snow_line, Line::AboveHighestBand);
        }
    }

    /// By hand: storage of 0.2 mm for each metre above 1000 m passes 100 mm at 1500 m, and 150 m higher for each degC; realizations of
    /// 0.8, 1 and 1.25 times as much pass it at 1625, 1500 and 1400 m.
    #[test]
    fn a_wedge_of_snow_passes_its_threshold() {
        let bands = bands_at(&[1000.0, 1700.0, 2400.0]);
        let swe_mm = Array3::from_shape_fn((2, 3, 3), |(level, band, realization)| {
            let above_m = bands[band].elevation_m - 1000.0 - 150.0 * level as f64;
            0.2 * above_m * [0.8, 1.0, 1.25][realization]
        });
        let rows = Row::all(&bands);
        let grounds = Grounds { rows: &rows, swe_mm: swe_mm.view(), winter_mean_c: &[] };
        let found = SnowLine::of(&grounds, 100.0, &[0.0, 1.0], 0, &Resamples::new(1, 3));
        assert!((found.levels[0].snow_line.elevation_m().expect("among them") - 1500.0).abs() < 1e-9);
        assert!((found.levels[1].snow_line_rise_m_per_c.expect("both") - 150.0).abs() < 1e-9);
        let range = found.levels[0].snow_line_range.expect("realizations");
        assert!(
            (range.q05_m.expect("low") - 1400.0).abs() < 1e-9
                && (range.q95_m.expect("high") - 1625.0).abs() < 1e-9
        );
        // All three rise by the same, and so does every resample: rounding apart, the rise has no error.
        let rise = found.levels[1].snow_line_rise_resampled_m_per_c.expect("resamples");
        assert!((rise.q05 - 150.0).abs() < 1e-9 && (rise.q95 - 150.0).abs() < 1e-9, "{rise:?}");
        // A resample of three holds one of them at least twice with 7 chances in 27 each, so that its median lies at every one of
        // the three often enough for both ends: a resample of three has the middle one as its median in 13 of 27.
        let resampled = found.levels[0].snow_line_resampled.expect("resamples");
        assert!((resampled.q05_m.expect("low") - 1400.0).abs() < 1e-9, "{resampled:?}");
        assert!((resampled.q95_m.expect("high") - 1625.0).abs() < 1e-9, "{resampled:?}");
        let alone = SnowLine::of(&grounds, 100.0, &[0.0, 1.0], 0, &Resamples::new(1, 1)).levels[1];
        assert_eq!((alone.snow_line_resampled, alone.snow_line_rise_resampled_m_per_c), (None, None));
    }

    /// The wedge above with normal noise of 15 mm in every band and realization of its own: the medians of the distribution stay the
    /// wedge's, 1500 m and 150 m more for a degree. Of 200 studies of 31 realizations a 5-95 % range is to hold each truth in 180; the
    /// binomial standard error is 2.1 %, and the percentile bootstrap of a median is off by a few percent, so 82 to 97 %.
    #[test]
    fn ranges_hold_the_true_line_nine_times_in_ten() {
        let bands = bands_at(&[1300.0, 1700.0, 2100.0]);
        let rows = Row::all(&bands);
        let mut holds = [0; 2];
        for study in 0..200 {
            let mut random = stream(5000 + study, 0);
            let swe_mm = Array3::from_shape_fn((2, 3, 31), |(level, band, _)| {
                let noise: f64 = StandardNormal.sample(&mut random);
                0.2 * (bands[band].elevation_m - 1000.0 - 150.0 * level as f64) + 15.0 * noise
            });
            let grounds = Grounds { rows: &rows, swe_mm: swe_mm.view(), winter_mean_c: &[] };
            let found = SnowLine::of(&grounds, 100.0, &[0.0, 1.0], 0, &Resamples::new(study, 31));
            let line = found.levels[0].snow_line_resampled.expect("resamples");
            let [low_m, high_m] = [line.q05_m, line.q95_m].map(|end| end.expect("among the bands"));
            let rise = found.levels[1].snow_line_rise_resampled_m_per_c.expect("among the bands");
            holds[0] += u32::from((low_m..=high_m).contains(&1500.0));
            holds[1] += u32::from((rise.q05..=rise.q95).contains(&150.0));
        }
        for holds in holds {
            let share = f64::from(holds) / 200.0;
            assert!((0.82..=0.97).contains(&share), "{share}");
        }
    }
}
