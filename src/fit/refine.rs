//! Refinement of what a search has found: a climb by the shape of the hill around it, many searchers in lock-step.
//!
//! Where parameters make up for each other the best lies on a long, narrow ridge that runs askew to all of them. A step up or
//! down in one parameter alone leaves the ridge; its own axes follow it.

use super::hill::{Surroundings, hill};
use super::search::{Asked, Found};

/// The surroundings begin at this share of the range,
const FIRST_REACH: f64 = 0.05;
/// and the climb ends as they are smaller than this.
const LAST_REACH: f64 = 0.001;
/// A gain that is no more than this is none.
const LEAST_GAIN: f64 = 1e-9;

/// Refines what was found. Each searcher looks at the points around its best, takes the hill through them for a parabola, and
/// tries its top and points on the way there; it moves to the best of all. Where it comes to rest within its surroundings, or
/// nothing is gained, they are halved.
///
/// A point's value must hang on the point and its searcher alone.
///
/// # Errors
/// What `values` says.
pub fn refine<E>(
    found: &mut [Found],
    mut values: impl FnMut(&[Asked]) -> Result<Vec<f64>, E>,
) -> Result<(), E> {
    let mut reaches = vec![FIRST_REACH; found.len()];
    loop {
        let climbing: Vec<usize> =
            (0..found.len()).filter(|searcher| reaches[*searcher] >= LAST_REACH).collect();
        if climbing.is_empty() {
            return Ok(());
        }
        let before: Vec<Found> = climbing.iter().map(|searcher| found[*searcher].clone()).collect();
        let around: Vec<Surroundings> = climbing
            .iter()
            .map(|searcher| Surroundings::of(&found[*searcher].point, reaches[*searcher]))
            .collect();
        let looked_at = of_each(&climbing, around.iter().map(|around| around.points.clone()));
        let seen = values(&looked_at)?;
        take_better(found, &looked_at, &seen);
        let mut from = 0;
        let tops = around.iter().map(|around| {
            let seen = &seen[from..from + around.points.len()];
            from += around.points.len();
            hill(around, seen)
        });
        let tried = of_each(&climbing, tops);
        let of_tops = values(&tried)?;
        take_better(found, &tried, &of_tops);
        for (searcher, before) in climbing.into_iter().zip(before) {
            let now = &found[searcher];
            let moved = now.point.iter().zip(&before.point).map(|(a, b)| (a - b).abs()).fold(0.0, f64::max);
            if moved < reaches[searcher] || now.value <= before.value + LEAST_GAIN {
                reaches[searcher] /= 2.0;
            }
        }
    }
}

fn of_each(searchers: &[usize], points: impl Iterator<Item = Vec<Vec<f64>>>) -> Vec<Asked> {
    let of_one = |(searcher, points): (&usize, Vec<Vec<f64>>)| {
        let searcher = *searcher;
        points.into_iter().map(move |point| Asked { searcher, point })
    };
    searchers.iter().zip(points).flat_map(of_one).collect()
}

fn take_better(found: &mut [Found], asked: &[Asked], values: &[f64]) {
    for (asked, value) in asked.iter().zip(values) {
        let found = &mut found[asked.searcher];
        if *value > found.value {
            *found = Found { point: asked.point.clone(), value: *value };
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::convert::Infallible;

    type Function = fn(f64, f64) -> f64;

    /// The top of a hill away from the starts, found to the last reach in each coordinate; a searcher hangs on itself alone.
    #[test]
    fn refinement_goes_to_the_top() {
        let value = |asked: &Asked| {
            let target = [0.2, 0.8][asked.searcher];
            -asked.point.iter().map(|x| (x - target) * (x - target)).sum::<f64>()
        };
        let start =
            |searcher| Found { point: vec![0.5; 3], value: value(&Asked { searcher, point: vec![0.5; 3] }) };
        let mut found = [start(0), start(1)];
        let result = refine(&mut found, |asked| Ok::<_, Infallible>(asked.iter().map(value).collect()));
        assert_eq!(result, Ok(()));
        for (found, target) in found.iter().zip([0.2, 0.8]) {
            assert!(found.point.iter().all(|x| (x - target).abs() < LAST_REACH), "{:?}", found.point);
        }
    }

    /// A ridge askew to both coordinates, a thousand times as steep across as along, and a curved one (Rosenbrock's function, its
    /// top at 1, 1): steps in one coordinate at a time stop on either. A top beyond a bound is found on the bound: by hand,
    /// `-(x - 1.2)^2 - (x - y)^2` is highest at 1, 1 within 0 to 1.
    #[test]
    fn ridges_are_followed_to_the_top() {
        fn askew(x: f64, y: f64) -> f64 {
            -1000.0 * (x + y - 1.0) * (x + y - 1.0) - (x - y - 0.6) * (x - y - 0.6)
        }
        fn curved(x: f64, y: f64) -> f64 {
            let (x, y) = (4.0 * x - 2.0, 4.0 * y - 2.0);
            -100.0 * (y - x * x) * (y - x * x) - (1.0 - x) * (1.0 - x)
        }
        fn beyond(x: f64, y: f64) -> f64 {
            -(x - 1.2) * (x - 1.2) - (x - y) * (x - y)
        }
        let cases: [(Function, [f64; 2]); 3] =
            [(askew, [0.8, 0.2]), (curved, [0.75, 0.75]), (beyond, [1.0, 1.0])];
        for (function, top) in cases {
            let start = [0.2, 0.8];
            let mut found = [Found { point: start.to_vec(), value: function(start[0], start[1]) }];
            let mut tried = 0;
            let result = refine(&mut found, |asked| {
                tried += asked.len();
                Ok::<_, Infallible>(
                    asked.iter().map(|asked| function(asked.point[0], asked.point[1])).collect(),
                )
            });
            assert_eq!(result, Ok(()));
            for (x, expected) in found[0].point.iter().zip(top) {
                assert!((x - expected).abs() < 0.005, "{:?} and {top:?} after {tried}", found[0].point);
            }
            assert!(tried < 1000, "{tried}");
        }
    }
}
