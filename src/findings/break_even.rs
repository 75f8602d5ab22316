//! Break-even precipitation: how much more of it would make up for a warming, and was so much ever there?

use serde::Serialize;

/// The least and the most change of precipitation that is tried, percent.
pub const BREAK_EVEN_BRACKET_PCT: [f64; 2] = [-50.0, 100.0];
/// Steps at which the bracket is scanned for a change of sign, percent.
const SCAN_PCT: f64 = 10.0;
/// A root is known to this, percent.
const PRECISION_PCT: f64 = 0.01;
/// How far a look is moved towards the middle of its bracket, per square of the bracket's width in percent.
const TOWARDS_MIDDLE_PER_PCT: f64 = 0.003;
/// How far at the least, so that the last two looks, one from either side, leave a bracket that is narrow enough, percent.
const LEAST_TOWARDS_MIDDLE_PCT: f64 = 0.3 * PRECISION_PCT;

/// Break-even precipitation of the headline measure.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct BreakEven {
    /// Realizations that were run; no change of mean precipitation is assumed in them.
    pub realizations: usize,
    /// Their median period value at the reference, which is to be regained.
    pub reference_median: f64,
    /// One entry a level but the reference.
    pub levels: Vec<BreakEvenLevel>,
    /// How wet periods have been.
    pub reached: Reached,
}

/// Break-even precipitation at one level.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct BreakEvenLevel {
    /// The level, degC.
    pub level_c: f64,
    /// The change of all precipitation at which the median is back at the reference's, percent; none within the bracket
    /// where nothing stands.
    pub precipitation_change_pct: Option<f64>,
    /// Where there is none: on which side of the reference's median the level's stays, from -50 to +100 %.
    pub stays: Option<Stays>,
    /// Realizations of the study whose mean cool-season precipitation reached it, by chance and by the assumed change of
    /// mean precipitation; 0 where there is no break-even.
    pub realizations_that_reached: usize,
    /// Whether a period of the record reached it; nothing where it has fewer usable years.
    pub record_reached: Option<bool>,
}

/// A side of the reference's median that is never left.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Stays {
    /// No increase of precipitation restores it.
    Below,
    /// No decrease takes it away.
    Above,
}

/// The root of one level.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Root {
    /// The change at which the excess is 0, percent.
    At(f64),
    /// There is none.
    Stays(Stays),
    /// Nothing can be said.
    Unknown,
}

/// Mean cool-season precipitation of periods as long as a realization's, as a percentage above or below the record's mean.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Reached {
    /// Years of a period.
    pub years: usize,
    /// Whether it is of whole years: where the first survey date begins the water year there is no season before it.
    pub is_of_whole_years: bool,
    /// The wettest of the record's periods, each of so many of its usable years in order; nothing where it has fewer.
    pub record_wettest_pct: Option<f64>,
    /// The wettest realization.
    pub realizations_wettest_pct: f64,
    /// Realizations that were looked at: all of the study's.
    pub realizations: usize,
}

/// For each level the root nearest 0 of `excess`: the median at a change of precipitation less the reference's median.
///
/// `excess` takes the levels that are still open, in their order, each with a change, percent, and gives the excess of each;
/// it is called some 10 times, and 30 at most. The bracket of -50 to +100 % is scanned in steps of 10 from 0 outwards, until
/// every level has changed its sign or nothing is left; the sign change nearest 0, by straight lines between the steps, is
/// narrowed to 0.01 %. Of two roots within one step none is found. An excess of exactly 0 is a root; a level without an
/// excess has none.
///
/// # Errors
/// Those of `excess`.
pub fn break_even_pct<E>(
    levels: usize,
    mut excess: impl FnMut(&[(usize, f64)]) -> Result<Vec<f64>, E>,
) -> Result<Vec<Root>, E> {
    let (mut brackets, stays) = scan(levels, &mut excess)?;
    let mut taken = 0;
    loop {
        let is_open = |of: &Bracket| of.width() > PRECISION_PCT;
        let next = |(level, of): (usize, &Option<Bracket>)| {
            of.as_ref().filter(|of| is_open(of)).map(|of| (level, of.next(taken)))
        };
        let tried: Vec<(usize, f64)> = brackets.iter().enumerate().filter_map(next).collect();
        if tried.is_empty() {
            break;
        }
        for ((level, pct), excess) in tried.iter().zip(excess(&tried)?) {
            brackets[*level] = brackets[*level].map(|of| of.narrowed(*pct, excess));
        }
        taken += 1;
    }
    let root = |(bracket, stays): (Option<Bracket>, Root)| bracket.map_or(stays, |of| Root::At(of.middle()));
    Ok(brackets.into_iter().zip(stays).map(root).collect())
}

/// The sign change nearest 0 of each level, between two steps of the scan, and where a level without one stays.
fn scan<E>(
    levels: usize,
    mut excess: impl FnMut(&[(usize, f64)]) -> Result<Vec<f64>, E>,
) -> Result<(Vec<Option<Bracket>>, Vec<Root>), E> {
    let [least, most] = BREAK_EVEN_BRACKET_PCT;
    // Of each level, what has been looked at: changes and excesses.
    let mut scanned: Vec<Vec<(f64, f64)>> = vec![Vec::new(); levels];
    let mut nearest = vec![None; levels];
    let mut distance = 0.0;
    while distance <= most.max(-least) && nearest.iter().any(Option::is_none) {
        let steps: &[f64] = if distance == 0.0 { &[0.0] } else { &[distance, -distance] };
        for pct in steps.iter().copied().filter(|pct| (least..=most).contains(pct)) {
            let open: Vec<(usize, f64)> =
                (0..levels).filter(|level| nearest[*level].is_none()).map(|level| (level, pct)).collect();
            for ((level, pct), excess) in open.iter().zip(excess(&open)?) {
                scanned[*level].push((*pct, excess));
            }
        }
        for (of_level, nearest) in scanned.iter_mut().zip(&mut nearest).filter(|(_, found)| found.is_none()) {
            of_level.sort_by(|a, b| a.0.total_cmp(&b.0));
            let brackets = of_level
                .windows(2)
                .filter_map(|ends| Bracket::new([ends[0].0, ends[1].0], [ends[0].1, ends[1].1]));
            *nearest = brackets.min_by(|a, b| a.on_line().abs().total_cmp(&b.on_line().abs()));
        }
        distance += SCAN_PCT;
    }
    let stays = |of_level: &Vec<(f64, f64)>| {
        let mut excess = of_level.iter().map(|(_, excess)| *excess);
        if excess.clone().all(|excess| excess < 0.0 && excess.is_finite()) {
            Root::Stays(Stays::Below)
        } else if excess.all(|excess| excess > 0.0 && excess.is_finite()) {
            Root::Stays(Stays::Above)
        } else {
            Root::Unknown
        }
    };
    let stays = scanned.iter().map(stays).collect();
    Ok((nearest, stays))
}

/// Two changes between which the excess changes its sign, and the excess there.
#[derive(Debug, Clone, Copy)]
struct Bracket {
    pct: [f64; 2],
    excess: [f64; 2],
}

impl Bracket {
    fn new(pct: [f64; 2], excess: [f64; 2]) -> Option<Self> {
        if let Some(root) = (0..2).find(|end| excess[*end] == 0.0) {
            return Some(Self { pct: [pct[root]; 2], excess });
        }
        let has_root =
            excess.iter().all(|excess| excess.is_finite()) && (excess[0] < 0.0) != (excess[1] < 0.0);
        has_root.then_some(Self { pct, excess })
    }

    fn width(&self) -> f64 {
        self.pct[1] - self.pct[0]
    }

    fn middle(&self) -> f64 {
        f64::midpoint(self.pct[0], self.pct[1])
    }

    /// Where the straight line between its ends is 0.
    fn on_line(&self) -> f64 {
        let on_line = self.pct[0] + self.width() * self.excess[0] / (self.excess[0] - self.excess[1]);
        if on_line.is_finite() { on_line } else { self.middle() }
    }

    /// Where to look next, after so many looks: by the ITP method of Oliveira & Takahashi (2021, ACM TOMS 47:5), where the
    /// line between the ends is 0, moved a little towards the middle so that the bracket closes from both sides, and
    /// never so far from the middle that it takes more than one look more than halving.
    fn next(&self, taken: i32) -> f64 {
        let (middle, width) = (self.middle(), self.width());
        if width <= PRECISION_PCT {
            return middle;
        }
        let off_middle = self.on_line() - middle;
        let towards_middle = TOWARDS_MIDDLE_PER_PCT * width * width + LEAST_TOWARDS_MIDDLE_PCT;
        let moved = (off_middle.abs() - towards_middle).max(0.0);
        let halvings = libm::ceil(libm::log2(SCAN_PCT / PRECISION_PCT)) + 1.0 - f64::from(taken);
        let farthest = (PRECISION_PCT * libm::exp2(halvings) - width).max(0.0) / 2.0;
        middle + moved.min(farthest).copysign(off_middle)
    }

    fn narrowed(self, pct: f64, excess: f64) -> Self {
        let end = usize::from((excess < 0.0) != (self.excess[0] < 0.0));
        let mut narrowed = self;
        (narrowed.pct[end], narrowed.excess[end]) = (pct, excess);
        narrowed
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::convert::Infallible;

    fn roots(excess: impl Fn(usize, f64) -> f64, levels: usize) -> Vec<Root> {
        let all = |asked: &[(usize, f64)]| {
            Ok::<_, Infallible>(asked.iter().map(|(level, pct)| excess(*level, *pct)).collect())
        };
        break_even_pct(levels, all).unwrap()
    }

    /// Functions whose roots are known: a line, one that stays below, one below 0, a root at 0, a parabola with roots at -20
    /// and +35 of which the nearer is taken, one that stays above, and a parabola with roots at -9 and +0.5 in the two steps
    /// beside 0. 0.01 is the precision that the method asks for.
    #[test]
    fn the_root_nearest_zero_is_found_to_a_hundredth() {
        let excess = |level: usize, pct: f64| match level {
            0 => 3.0 * (pct - 23.456),
            1 => -1.0 - pct / 1000.0,
            2 => pct + 7.654,
            3 => pct,
            4 => (pct + 20.0) * (pct - 35.0) - 1e-9,
            5 => 200.0 + pct,
            _ => (pct + 9.0) * (pct - 0.5),
        };
        let found = roots(excess, 7);
        for (level, expected) in [(0, 23.456), (2, -7.654), (3, 0.0), (4, -20.0), (6, 0.5)] {
            let Root::At(pct) = found[level] else { panic!("{level}: {found:?}") };
            assert!((pct - expected).abs() <= 0.01, "{level}: {found:?}");
        }
        assert_eq!([found[1], found[5]], [Root::Stays(Stays::Below), Root::Stays(Stays::Above)]);
        assert_eq!(roots(|_, _| f64::NEG_INFINITY, 1), [Root::Unknown], "no excess, no root");
    }
}
