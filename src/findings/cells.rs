//! Years in the four cells of dry or wet and warm or cool, and whether the two come together more often than by chance.

use super::counts::share;
use serde::Serialize;

/// Two tables that are as likely but for rounding are as likely.
const SAME_PROBABILITY: f64 = 1.0 + 1e-7;

/// Counts of years.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, Serialize)]
pub struct Cells {
    /// Dry and warm.
    pub dry_warm: u64,
    /// Dry and cool.
    pub dry_cool: u64,
    /// Wet and warm.
    pub wet_warm: u64,
    /// Wet and cool.
    pub wet_cool: u64,
}

impl Cells {
    pub(super) fn of([dry_warm, dry_cool, wet_warm, wet_cool]: [u64; 4]) -> Self {
        Self { dry_warm, dry_cool, wet_warm, wet_cool }
    }

    /// The place of a year in `[dry and warm, dry and cool, wet and warm, wet and cool]`.
    pub(super) fn place(is_dry: bool, is_cool: bool) -> usize {
        2 * usize::from(!is_dry) + usize::from(is_cool)
    }

    /// All years.
    pub fn years(self) -> u64 {
        self.dry_warm + self.dry_cool + self.wet_warm + self.wet_cool
    }

    /// `P(dry and warm)/(P(dry)*P(warm))`: 1 where they know nothing of each other; nothing where no year is dry or none is warm.
    ///
    /// ```
    /// use thawline::findings::Cells;
    /// let halves = Cells { dry_warm: 10, dry_cool: 10, wet_warm: 10, wet_cool: 10 };
    /// assert_eq!(halves.dependence(), Some(1.0));
    /// ```
    pub fn dependence(self) -> Option<f64> {
        let (dry, warm) = (self.dry_warm + self.dry_cool, self.dry_warm + self.wet_warm);
        Some(share(self.dry_warm, dry)? / share(warm, self.years()).filter(|share| *share > 0.0)?)
    }

    /// Fisher's exact test, two-sided: the chance of a table as unlikely as this one or more so, with the same numbers of dry and of
    /// warm years, if the two know nothing of each other (Fisher 1935). Nothing of no years.
    pub fn fisher_p(self) -> Option<f64> {
        let (dry, warm, years) = (self.dry_warm + self.dry_cool, self.dry_warm + self.wet_warm, self.years());
        if years == 0 {
            return None;
        }
        let log_factorial = |n: u64| libm::lgamma(n as f64 + 1.0);
        let log_choose = |n: u64, k: u64| log_factorial(n) - log_factorial(k) - log_factorial(n - k);
        let probability = |dry_warm: u64| {
            libm::exp(
                log_choose(dry, dry_warm) + log_choose(years - dry, warm - dry_warm)
                    - log_choose(years, warm),
            )
        };
        let possible = (dry + warm).saturating_sub(years)..=dry.min(warm);
        let own = probability(self.dry_warm) * SAME_PROBABILITY;
        let as_unlikely = possible.map(probability).filter(|other| *other <= own);
        Some(as_unlikely.sum::<f64>().min(1.0))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn cells(dry_warm: u64, dry_cool: u64, wet_warm: u64, wet_cool: u64) -> Cells {
        Cells { dry_warm, dry_cool, wet_warm, wet_cool }
    }

    /// By hand: of 10 years 6 are dry and 5 warm, 4 both: 0.4/(0.6*0.5) = 4/3. No dry years, or no warm ones: no number.
    #[test]
    fn dependence_of_a_table_counted_by_hand() {
        assert!((cells(4, 2, 1, 3).dependence().unwrap() - 4.0 / 3.0).abs() < 1e-12);
        assert_eq!(cells(0, 0, 5, 5).dependence(), None);
        assert_eq!(cells(0, 5, 0, 5).dependence(), None);
        assert_eq!(Cells::default().dependence(), None);
    }

    /// Fisher (1935), the lady who tastes tea, eight cups: 3 of 4 right is 34/70 two-sided, all right 2/70. By hand: hypergeometric
    /// 1, 16, 36, 16, 1 of 70.
    #[test]
    fn exact_test_of_the_tea() {
        assert!((cells(3, 1, 1, 3).fisher_p().unwrap() - 34.0 / 70.0).abs() < 1e-9);
        assert!((cells(4, 0, 0, 4).fisher_p().unwrap() - 2.0 / 70.0).abs() < 1e-9);
        assert!((cells(2, 2, 2, 2).fisher_p().unwrap() - 1.0).abs() < 1e-9);
        assert_eq!(Cells::default().fisher_p(), None);
    }

    #[test]
    fn a_year_finds_its_cell() {
        let mut counts = [0; 4];
        counts[Cells::place(true, false)] = 1;
        counts[Cells::place(true, true)] = 2;
        counts[Cells::place(false, false)] = 3;
        counts[Cells::place(false, true)] = 4;
        assert_eq!(Cells::of(counts), cells(1, 2, 3, 4));
    }
}
