//! Years one after another: what their seasons are like, and what they remember of the year before.

use super::super::lag_one::{LagOne, Matrix};
use super::super::scores::{Normal, mean_product};
use super::super::sums::{DrawnPart, RecordPart};
use super::{Nest, SEASONAL, Stage};

/// From fewer pairs of years no memory from year to year can be told.
const LEAST_PAIRS: usize = 10;
/// No year remembers the one before it more than this.
const STRONGEST_MEMORY: f64 = 0.8;
impl Nest {
    /// Fits the seasons, on parts that are already moved.
    pub(super) fn fit_seasons(
        &mut self,
        record: &[Vec<RecordPart>],
        follows: &[bool],
        drawn: &[Vec<DrawnPart>],
    ) {
        let (mut walk, mut changes) = ([[0.0; 2]; 2], Vec::new());
        let mut own = Vec::with_capacity(drawn.len());
        for year in drawn {
            self.move_parts(year, &mut walk, &mut changes);
            own.push(self.season_values(year, &changes));
        }
        let totals: Vec<[f64; SEASONAL]> = record.iter().map(|year| self.record_seasons(year)).collect();
        let mut roots = totals.clone();
        for values in &mut roots {
            for value in values.iter_mut().step_by(2) {
                *value = libm::sqrt(*value);
            }
        }
        let always = vec![true; own.len()];
        let (own_normal, own_m0, own_m1) = years_together(&own, &always);
        let (_, m0, m1) = years_together(&roots, follows);
        let pairs = follows.iter().skip(1).filter(|follows| **follows).count();
        let mut target: [Normal; SEASONAL] = std::array::from_fn(|at| Normal::of(&column(&totals, at)));
        for normal in target.iter_mut().step_by(2) {
            *normal = Normal::root_of(*normal);
        }
        self.seasons = Stage {
            own: own_normal,
            own_memory: LagOne::of(&own_m0, &own_m0, &own_m1),
            target,
            target_memory: LagOne::of(&m0, &m0, &memory_of_years(&m0, &m1, pairs)),
        };
    }
}

fn column(values: &[[f64; SEASONAL]], at: usize) -> Vec<f64> {
    values.iter().map(|values| values[at]).collect()
}

/// Means, standard deviations and correlations of years, and correlations with the year before.
fn years_together(
    values: &[[f64; SEASONAL]],
    follows: &[bool],
) -> ([Normal; SEASONAL], Matrix<SEASONAL>, Matrix<SEASONAL>) {
    let normal: [Normal; SEASONAL] = std::array::from_fn(|at| Normal::of(&column(values, at)));
    let scores: Vec<[f64; SEASONAL]> =
        values.iter().map(|values| std::array::from_fn(|at| normal[at].score(values[at]))).collect();
    let m0 = std::array::from_fn(|row| {
        std::array::from_fn(|column| mean_product(scores.iter().map(|of| (of[row], of[column]))))
    });
    let m1 = std::array::from_fn(|row| {
        std::array::from_fn(|column| {
            let linked = scores.windows(2).zip(&follows[1..]).filter(|(_, follows)| **follows);
            mean_product(linked.map(|(years, _)| (years[1][row], years[0][column])))
        })
    });
    (normal, m0, m1)
}

/// The memory from year to year that is kept: each season's precipitation and temperature remember their own of the year
/// before, and of the others what follows from being correlated with them, `sqrt(r_i r_j) m0_ij`: a year is remembered as
/// a whole. Memories of single pairs, some kept and some not, contradict the strong correlations within a year, and all
/// memory would have to be made smaller until they do not.
///
/// A sample's lag-1 correlation lies below that of what it is drawn from by about `(1 + 4r)/n` (Kendall 1954), which is put
/// back.
fn memory_of_years(m0: &Matrix<SEASONAL>, m1: &Matrix<SEASONAL>, pairs: usize) -> Matrix<SEASONAL> {
    if pairs < LEAST_PAIRS {
        return [[0.0; SEASONAL]; SEASONAL];
    }
    let count = pairs as f64;
    let own: [f64; SEASONAL] = std::array::from_fn(|at| {
        let unbiased = (count * m1[at][at] + 1.0) / (count - 4.0);
        unbiased.clamp(-STRONGEST_MEMORY, STRONGEST_MEMORY)
    });
    std::array::from_fn(|row| {
        std::array::from_fn(|column| {
            let both = libm::sqrt(own[row].max(0.0) * own[column].max(0.0));
            if row == column { own[row] } else { both * m0[row][column] }
        })
    })
}
