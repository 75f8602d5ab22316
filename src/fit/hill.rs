//! The hill around a point of the unit cube: taken for a parabola through the points around it, and where its top is.

use super::principal_axes::PrincipalAxes;

/// Shares of the steepest curvature that are added to every axis: without any, the way leads to the top of the parabola; the
/// more, the shorter it is and the nearer to the steepest climb.
const DAMPED_BY: [f64; 5] = [0.0, 1e-4, 1e-3, 1e-2, 1e-1];
/// An axis is taken to be curved by this share of the steepest at least: what is flatter is lost in the values' rounding.
const FLATTEST: f64 = 1e-8;

/// Points around one, all within the unit cube.
pub(super) struct Surroundings {
    /// The middle: the point itself, or as near to it as the bounds let it be.
    middle: Vec<f64>,
    reach: f64,
    /// The middle; then up and down in each parameter; then up in each two.
    pub points: Vec<Vec<f64>>,
}

impl Surroundings {
    /// About a point, so far in each parameter.
    pub fn of(point: &[f64], reach: f64) -> Self {
        let middle: Vec<f64> = point.iter().map(|x| x.clamp(reach, 1.0 - reach)).collect();
        let moved = |moves: &[(usize, f64)]| {
            let mut point = middle.clone();
            for (at, by) in moves {
                point[*at] += by;
            }
            point
        };
        let n = point.len();
        let mut points = vec![middle.clone()];
        points.extend((0..n).flat_map(|i| [moved(&[(i, reach)]), moved(&[(i, -reach)])]));
        points.extend(pairs(n).map(|(i, j)| moved(&[(i, reach), (j, reach)])));
        Self { middle, reach, points }
    }
}

fn pairs(n: usize) -> impl Iterator<Item = (usize, usize)> {
    (0..n).flat_map(move |i| (i + 1..n).map(move |j| (i, j)))
}

/// The top of the parabola through the points around, within the unit cube, and points on the way there; `values` are those
/// of the points. None where one of them is not finite.
///
/// A parabola that opens upwards along one of its axes is turned down there: the way then leads away from the trough.
pub(super) fn hill(around: &Surroundings, values: &[f64]) -> Vec<Vec<f64>> {
    let n = around.middle.len();
    if values.iter().any(|value| !value.is_finite()) {
        return Vec::new();
    }
    let up = |i: usize| values[1 + 2 * i];
    let down = |i: usize| values[2 + 2 * i];
    let h = around.reach;
    let gradient: Vec<f64> = (0..n).map(|i| (up(i) - down(i)) / (2.0 * h)).collect();
    let mut bent = vec![vec![0.0; n]; n];
    for (i, row) in bent.iter_mut().enumerate() {
        row[i] = -(up(i) + down(i) - 2.0 * values[0]) / (h * h);
    }
    for ((i, j), both) in pairs(n).zip(&values[1 + 2 * n..]) {
        bent[i][j] = -(both - up(i) - up(j) + values[0]) / (h * h);
    }
    let PrincipalAxes { values: curvatures, axes } = PrincipalAxes::of(&bent);
    let steepest = curvatures.iter().map(|curvature| curvature.abs()).fold(0.0, f64::max);
    if steepest == 0.0 {
        return Vec::new();
    }
    let damped = |damped_by: &f64| {
        let along = |curvature: &f64| curvature.abs().max(FLATTEST * steepest) + damped_by * steepest;
        let mut turned_down = vec![vec![0.0; n]; n];
        for (curvature, axis) in curvatures.iter().map(along).zip(&axes) {
            for (row, a) in turned_down.iter_mut().zip(axis) {
                for (entry, b) in row.iter_mut().zip(axis) {
                    *entry += curvature * a * b;
                }
            }
        }
        top(&around.middle, &gradient, &turned_down)
    };
    DAMPED_BY.iter().map(damped).collect()
}

/// The top within the unit cube of the parabola with this gradient in the middle and this curvature: what would pass a bound is
/// held at it, and the rest is sought again.
fn top(middle: &[f64], gradient: &[f64], curvature: &[Vec<f64>]) -> Vec<f64> {
    let n = middle.len();
    let mut held: Vec<Option<f64>> = vec![None; n];
    loop {
        let free: Vec<usize> = (0..n).filter(|at| held[*at].is_none()).collect();
        let row = |i: &usize| -> Vec<f64> { free.iter().map(|j| curvature[*i][*j]).collect() };
        let pulled = |i: &usize| {
            let by_held = held.iter().zip(&curvature[*i]).filter_map(|(held, bent)| held.map(|by| by * bent));
            gradient[*i] - by_held.sum::<f64>()
        };
        let moves = solve(free.iter().map(row).collect(), free.iter().map(pulled).collect());
        let mut is_within = true;
        for (at, by) in free.iter().zip(&moves) {
            let to = middle[*at] + by;
            if !(0.0..=1.0).contains(&to) {
                held[*at] = Some(to.clamp(0.0, 1.0) - middle[*at]);
                is_within = false;
            }
        }
        if is_within {
            let mut top: Vec<f64> =
                middle.iter().zip(&held).map(|(middle, held)| middle + held.unwrap_or(0.0)).collect();
            for (at, by) in free.iter().zip(moves) {
                top[*at] += by;
            }
            // Rounding may have passed a bound.
            return top.into_iter().map(|x| x.clamp(0.0, 1.0)).collect();
        }
    }
}

/// Solves a positive definite system by elimination.
fn solve(mut matrix: Vec<Vec<f64>>, mut right: Vec<f64>) -> Vec<f64> {
    let n = right.len();
    for pivot in 0..n {
        let (above, below) = matrix.split_at_mut(pivot + 1);
        let of_pivot = &above[pivot];
        for (at, row) in (pivot + 1..).zip(below) {
            let times = row[pivot] / of_pivot[pivot];
            row.iter_mut().zip(of_pivot).for_each(|(entry, of_pivot)| *entry -= times * of_pivot);
            right[at] -= times * right[pivot];
        }
    }
    for at in (0..n).rev() {
        let known: f64 = (at + 1..n).map(|later| matrix[at][later] * right[later]).sum();
        right[at] = (right[at] - known) / matrix[at][at];
    }
    right
}
