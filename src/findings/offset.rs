//! How many degrees of warming an increase of precipitation makes up for: the break-even curve read the other way round.
//!
//! Published for a cold basin as 2.7 to 3.5 degC for 20 % more precipitation, and less where winters are warmer (Rasouli et al.,
//! preprint).

use super::crossing::{Crossing, CrossingRange};
use super::surface::CurvePoint;
use serde::Serialize;

/// The increase that is asked about, percent.
const INCREASE_PCT: f64 = 20.0;

/// The warming at which so much more precipitation just holds the headline measure at its reference.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Offset {
    /// The increase, percent.
    pub precipitation_change_pct: f64,
    /// The warming, as the study's levels count it; linear between the warmings of the surface's grid.
    pub warming: Crossing,
    /// Where the curve's own 5 and 95 % ends meet the increase; an end that the grid does not reach is none.
    pub range: Option<CrossingRange>,
}

impl Offset {
    /// Reads the curve, ascending, upwards from the reference; nothing where it has no warmer point.
    pub(super) fn of(curve: &[CurvePoint], reference_c: f64) -> Option<Self> {
        let warmer: Vec<&CurvePoint> = curve.iter().filter(|point| point.warming_c > reference_c).collect();
        let warmest = warmer.last()?.warming_c;
        let needed = |number: &dyn Fn(&CurvePoint) -> Option<f64>| {
            let of_warmer = warmer.iter().map(|point| (point.warming_c, number(point)));
            first_reached(std::iter::once((reference_c, Some(0.0))).chain(of_warmer))
        };
        let warming = needed(&|point| point.precipitation_change_pct);
        let end = |end: usize| needed(&|point| point.range_pct?[end]).flatten();
        Some(Self {
            precipitation_change_pct: INCREASE_PCT,
            // The more precipitation a warming needs, the less warming the increase makes up for.
            range: matches!(warming, Some(Some(_))).then(|| CrossingRange { q05_c: end(1), q95_c: end(0) }),
            warming: match warming {
                Some(Some(level_c)) => Crossing::At { level_c, until_c: None },
                Some(None) => Crossing::NotReached { up_to_c: warmest },
                None => Crossing::Unknown,
            },
        })
    }
}

/// The first warming at which the need reaches the increase, by straight lines; `Some(None)` where none does, nothing where one on
/// the way has no need that was found.
fn first_reached(points: impl Iterator<Item = (f64, Option<f64>)>) -> Option<Option<f64>> {
    let mut before: Option<(f64, f64)> = None;
    for (warming_c, needed_pct) in points {
        let here = (warming_c, needed_pct?);
        if let Some(below) = before.filter(|below| below.1 < INCREASE_PCT && here.1 >= INCREASE_PCT) {
            return Some(Some(below.0 + (here.0 - below.0) * (INCREASE_PCT - below.1) / (here.1 - below.1)));
        }
        before = Some(here);
    }
    Some(None)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn point(warming_c: f64, pct: f64, range_pct: Option<[Option<f64>; 2]>) -> CurvePoint {
        CurvePoint { warming_c, precipitation_change_pct: Some(pct), stays: None, range_pct }
    }

    /// By hand: 8 % at 1 degC and 32 % at 2 degC are 20 % half-way; an upper end of 12 and 28 half-way too, a lower one of 6 and 26
    /// 0.7 of the way.
    #[test]
    fn an_increase_makes_up_for_the_warming_that_needs_it() {
        let curve = [
            point(-1.0, -9.0, None),
            point(0.0, 0.0, None),
            point(1.0, 8.0, Some([Some(6.0), Some(12.0)])),
            point(2.0, 32.0, Some([Some(26.0), Some(28.0)])),
        ];
        let found = Offset::of(&curve, 0.0).unwrap();
        assert_eq!(found.warming, Crossing::At { level_c: 1.5, until_c: None });
        assert_eq!(found.range, Some(CrossingRange { q05_c: Some(1.5), q95_c: Some(1.7) }));
        let cold = Offset::of(&curve[..3], 0.0).unwrap();
        assert_eq!((cold.warming, cold.range), (Crossing::NotReached { up_to_c: 1.0 }, None));
        assert_eq!(Offset::of(&curve[..2], 0.0), None, "nothing is warmer");
        let lost = [curve[2], CurvePoint { precipitation_change_pct: None, ..curve[3] }];
        assert_eq!(Offset::of(&lost, 0.0).unwrap().warming, Crossing::Unknown);
        let beyond = [curve[2], CurvePoint { range_pct: Some([Some(30.0), None]), ..curve[3] }];
        let open = Offset::of(&beyond, 0.0).unwrap().range.unwrap();
        assert_eq!(open.q05_c, None);
        assert!((open.q95_c.unwrap() - (1.0 + 14.0 / 24.0)).abs() < 1e-12);
    }
}
