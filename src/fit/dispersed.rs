//! A few of many points, chosen to lie apart.

/// Places of up to `count` points: the first of them, and then each time the one whose nearest among those taken is the
/// farthest away (Gonzalez 1985); of two equally far the earlier. Fewer where all others coincide with one that is taken.
pub(super) fn dispersed(points: &[Vec<f64>], count: usize) -> Vec<usize> {
    let squared = |a: &[f64], b: &[f64]| a.iter().zip(b).map(|(a, b)| (a - b) * (a - b)).sum::<f64>();
    let mut nearest = vec![f64::INFINITY; points.len()];
    let mut taken = Vec::with_capacity(count);
    let mut next = (!points.is_empty()).then_some(0);
    while let Some(at) = next.filter(|_| taken.len() < count) {
        taken.push(at);
        for (nearest, point) in nearest.iter_mut().zip(points) {
            *nearest = nearest.min(squared(point, &points[at]));
        }
        next = (0..points.len()).filter(|at| nearest[*at] > 0.0).fold(None, |farthest, at| match farthest {
            Some(before) if nearest[before] >= nearest[at] => Some(before),
            _ => Some(at),
        });
    }
    taken
}

#[cfg(test)]
mod tests {
    use super::dispersed;

    /// By hand, on a line: from 0.5 the ends are as far, and the earlier goes first; between 0, 0.5 and 1 lies 0.2 the farther from
    /// its nearest. The second 0.5 is none of its own.
    #[test]
    fn the_farthest_goes_next() {
        let points: Vec<Vec<f64>> = [0.5, 0.9, 0.0, 1.0, 0.2, 0.5].map(|x| vec![x]).to_vec();
        assert_eq!(dispersed(&points, 4), [0, 2, 3, 4]);
        assert_eq!(dispersed(&points, 9), [0, 2, 3, 4, 1]);
        assert_eq!(dispersed(&[], 3), Vec::<usize>::new());
    }
}
