//! A line through many points with as few as look the same.

use super::sheet::Px;

/// A line may be this far from where its days put it, px.
pub(super) const TOLERANCE_PX: f64 = 0.15;

/// The points of a line without those that lie within `tolerance_px` of the line through the ones that are kept (Douglas &
/// Peucker 1973). Both ends are kept.
pub(super) fn thinned(points: &[Px], tolerance_px: f64) -> Vec<Px> {
    let mut is_kept = vec![false; points.len()];
    let mut spans = vec![(0, points.len().saturating_sub(1))];
    while let Some((from, to)) = spans.pop() {
        for end in [from, to] {
            if let Some(kept) = is_kept.get_mut(end) {
                *kept = true;
            }
        }
        let mut farthest = (tolerance_px, None);
        for at in from + 1..to {
            let distance = distance(points[at], points[from], points[to]);
            if distance > farthest.0 {
                farthest = (distance, Some(at));
            }
        }
        if let (_, Some(at)) = farthest {
            spans.extend([(from, at), (at, to)]);
        }
    }
    points.iter().zip(is_kept).filter_map(|(point, is_kept)| is_kept.then_some(*point)).collect()
}

/// Distance of a point from the line through two others, which differ in x.
fn distance(point: Px, from: Px, to: Px) -> f64 {
    let (dx, dy) = (to.0 - from.0, to.1 - from.1);
    let across = dx * (point.1 - from.1) - dy * (point.0 - from.0);
    across.abs() / (dx * dx + dy * dy).sqrt()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn corners_are_kept_and_points_between_them_are_not() {
        let line: Vec<Px> = (0..=10).map(|x| (f64::from(x), f64::from((x - 4).max(0)))).collect();
        assert_eq!(thinned(&line, 0.1), [(0.0, 0.0), (4.0, 0.0), (10.0, 6.0)]);
        assert_eq!(thinned(&line[..1], 0.1), line[..1]);
        assert!(thinned(&[], 0.1).is_empty());
    }

    #[test]
    fn no_point_is_far_from_the_thinned_line() {
        let wave: Vec<Px> = (0..366).map(|x| (f64::from(x), 40.0 * libm::sin(f64::from(x) / 20.0))).collect();
        let thin = thinned(&wave, 0.2);
        assert!(thin.len() < 120, "{}", thin.len());
        for point in &wave {
            let after = thin.iter().position(|kept| kept.0 >= point.0).unwrap();
            let [from, to] = [thin[after.max(1) - 1], thin[after.max(1)]];
            assert!(distance(*point, from, to) <= 0.2 + 1e-12, "{point:?}");
        }
    }
}
