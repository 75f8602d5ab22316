//! Means over lanes: of the patch classes of a band, and of the bands of a basin.
//!
//! Every sum is taken in a fixed order, whatever the width of the vectors.

use super::block::cover;
use super::lanes::ROW_MULTIPLE;

/// How lanes are put together to means, and where they stand in a row.
///
/// Groups are basins at a level ("mixes"), places their bands; every band has the same number of classes. A lane stands by
/// place first, class second and group third. Where bands have more than one class, their means stand behind the lanes,
/// by place and group; the basin means follow behind, by group.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Means {
    pub groups: usize,
    pub places: usize,
    pub classes: usize,
    /// Columns of the band means, padded; 0 where a band is one lane.
    pub band_width: usize,
    /// Columns of the basin means, padded.
    pub mix_width: usize,
    /// `[vector of groups][lane of a group]`: share of a lane in its group's basin mean.
    shares: Vec<[f64; ROW_MULTIPLE]>,
    /// `[lane]`: share of a class in its band's mean.
    class_shares: Vec<f64>,
}

impl Means {
    pub fn new(groups: usize, places: usize, classes: usize) -> Self {
        let mix_width = groups.next_multiple_of(ROW_MULTIPLE);
        let band_width = if classes > 1 { (groups * places).next_multiple_of(ROW_MULTIPLE) } else { 0 };
        Self {
            groups,
            places,
            classes,
            band_width,
            mix_width,
            shares: vec![[0.0; ROW_MULTIPLE]; places * classes * mix_width / ROW_MULTIPLE],
            class_shares: vec![0.0; groups * places * classes],
        }
    }

    /// Lanes of a group.
    fn in_group(&self) -> usize {
        self.places * self.classes
    }

    /// Lanes that a row must hold at least: the last lane of a group, too, is read as a padded row of groups; but a lone
    /// basin mean is summed by itself.
    pub fn least_width(&self) -> usize {
        let last = if self.groups == 1 { 1 } else { self.mix_width };
        (self.groups * self.in_group().saturating_sub(1) + last).next_multiple_of(ROW_MULTIPLE)
    }

    /// The lane of a class of a place of a group.
    pub fn lane(&self, group: usize, place: usize, class: usize) -> usize {
        (place * self.classes + class) * self.groups + group
    }

    /// Sets the share of a place in the basin mean, and of a class in the place.
    pub fn set_shares(&mut self, group: usize, place: usize, class: usize, of_place: f64, of_class: f64) {
        let at = group / ROW_MULTIPLE * self.in_group() + place * self.classes + class;
        self.shares[at][group % ROW_MULTIPLE] = of_place * of_class;
        let lane = self.lane(group, place, class);
        self.class_shares[lane] = of_class;
    }

    /// The mean of a place's classes, of a row of lanes.
    pub fn of_place(&self, group: usize, place: usize, row: &[f64]) -> f64 {
        if self.classes == 1 {
            return row[self.lane(group, place, 0)];
        }
        let lanes = (0..self.classes).map(|class| self.lane(group, place, class));
        lanes.fold(0.0, |sum, lane| sum + self.class_shares[lane] * row[lane])
    }

    /// A basin mean of a row of lanes.
    pub fn of_group(&self, group: usize, row: &[f64]) -> f64 {
        self.of_group_from(0, group, row, |value| value)
    }

    /// The same, a group's first lanes left out, each value read through `read`.
    #[inline(always)]
    fn of_group_from(&self, first: usize, group: usize, row: &[f64], read: impl Fn(f64) -> f64) -> f64 {
        let shares = &self.shares[group / ROW_MULTIPLE * self.in_group()..][..self.in_group()];
        let mut sum = 0.0;
        for (lane, shares) in shares.iter().enumerate().skip(first) {
            sum += shares[group % ROW_MULTIPLE] * read(row[lane * self.groups + group]);
        }
        sum
    }

    /// All means of a row of lanes in which those before `from` are 0: of the bands where they have classes, then of the
    /// basins, side by side.
    #[inline(always)]
    pub fn row(&self, row: &[f64], from: usize, means: &mut [f64]) {
        self.row_of(row, from, means, |value| value);
    }

    /// The same of each lane's snow cover, from its SWE. Like the means of classes it stands apart, since code that the plain
    /// day does not run slows it where the compiler puts it in between.
    #[inline(never)]
    pub fn covered_row(&self, swe: &[f64], from: usize, means: &mut [f64]) {
        self.row_of(swe, from, means, cover);
    }

    #[inline(always)]
    fn row_of(&self, row: &[f64], from: usize, means: &mut [f64], read: impl Fn(f64) -> f64 + Copy) {
        let (bands, basins) = means.split_at_mut(self.band_width);
        if self.classes > 1 {
            self.band_row(row, bands, read);
        }
        let first = from.checked_div(self.groups).unwrap_or(0);
        if self.groups == 1 {
            basins.fill(0.0);
            basins[0] = self.of_group_from(first, 0, row, read);
            return;
        }
        let (basins, _) = basins.as_chunks_mut::<ROW_MULTIPLE>();
        for (vector, basins) in basins.iter_mut().enumerate() {
            let shares = &self.shares[vector * self.in_group()..][..self.in_group()];
            let mut sums = [0.0; ROW_MULTIPLE];
            for (lane, shares) in shares.iter().enumerate().skip(first) {
                let lanes = &row[lane * self.groups + vector * ROW_MULTIPLE..][..ROW_MULTIPLE];
                for group in 0..ROW_MULTIPLE {
                    sums[group] += shares[group] * read(lanes[group]);
                }
            }
            *basins = sums;
        }
    }

    #[inline(never)]
    fn band_row(&self, row: &[f64], bands: &mut [f64], read: impl Fn(f64) -> f64) {
        bands.fill(0.0);
        let classes = row.chunks_exact(self.groups).zip(self.class_shares.chunks_exact(self.groups));
        for (class, (lanes, shares)) in classes.enumerate() {
            let at = class / self.classes * self.groups;
            for ((band, lane), share) in bands[at..at + self.groups].iter_mut().zip(lanes).zip(shares) {
                *band += share * read(*lane);
            }
        }
    }
}
