//! One linear reservoir: it yields in proportion to what it holds.

/// A linear reservoir's day: `dS/dt = e - S/K`, S what it holds, e the day's water, coming evenly, K its recession constant.
///
/// Solved exactly over a day: `S(1) = S(0) * exp(-1/K) + e * K * (1 - exp(-1/K))`, and what is missing has run out. Without water
/// its outflow falls by `exp(-1/K)` a day, the recession of Maillet (1905); the store is that of Nash's (1957) cascade, of one
/// (both from memory).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Store {
    /// Share of what it holds that is there a day later.
    remains: f64,
    /// Share of the day's water that is there as the day ends.
    kept: f64,
}

impl Store {
    /// A store whose outflow falls to 1/e in so many days, `recession_days >= 0`; of 0 days it holds nothing.
    pub fn new(recession_days: f64) -> Self {
        if recession_days <= 0.0 {
            return Self { remains: 0.0, kept: 0.0 };
        }
        let falls = -libm::expm1(-1.0 / recession_days);
        Self { remains: 1.0 - falls, kept: recession_days * falls }
    }

    /// What it holds as years like one begin and end alike: `held` is what such a year of so many days leaves in an empty store, to
    /// which every year adds, of which each leaves `exp(-days/K)` to the next.
    pub fn year_after_year(self, held: f64, days: usize) -> f64 {
        held / (1.0 - libm::pow(self.remains, days as f64))
    }

    /// One day: what it holds as the day ends, and what has run out. Any unit of water; the two add up to what there was.
    #[inline(always)]
    pub fn day(self, held: f64, water: f64) -> (f64, f64) {
        let left = held * self.remains + water * self.kept;
        let out = (held + water - left).max(0.0);
        (held + water - out, out)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The closed form: a store that held 100 and gets nothing yields 100 * (1 - exp(-t/K)) in t days.
    #[test]
    fn recession_is_the_closed_form() {
        let (store, mut held, mut all) = (Store::new(12.5), 100.0, 0.0);
        for day in 1..=60 {
            let (left, out) = store.day(held, 0.0);
            (held, all) = (left, all + out);
            let expected = 100.0 * -libm::expm1(-f64::from(day) / 12.5);
            assert!((all - expected).abs() < 1e-10, "day {day}: {all} against {expected}");
        }
    }

    /// A day's water of 1 in an empty store leaves K * (1 - exp(-1/K)): for K = 1 it is 1 - 1/e = 0.632 120 558 828 557 7.
    #[test]
    fn a_day_of_water_leaves_what_the_equation_says() {
        let (held, out) = Store::new(1.0).day(0.0, 1.0);
        assert!((held - 0.632_120_558_828_557_7).abs() < 1e-15 && (held + out - 1.0).abs() < 1e-15);
    }

    /// At the steady state it yields what it gets and holds K days of it.
    #[test]
    fn in_the_long_run_it_yields_what_it_gets() {
        let (store, mut held, mut last) = (Store::new(30.0), 0.0, 0.0);
        for _ in 0..2000 {
            (held, last) = store.day(held, 2.0);
        }
        assert!((last - 2.0).abs() < 1e-9 && (held - 60.0).abs() < 1e-7, "{last} and {held}");
    }

    /// An identity: a year that begins with it ends with it. With a recession of 1000 days one year alone would leave 31 % of it.
    #[test]
    fn years_that_are_alike_begin_as_they_end() {
        let store = Store::new(1000.0);
        let year = |from: f64| (0..365).fold(from, |held, day| store.day(held, f64::from(day % 7)).0);
        let begun = store.year_after_year(year(0.0), 365);
        assert!((year(begun) / begun - 1.0).abs() < 1e-12 && year(0.0) < 0.32 * begun, "{begun}");
        assert_eq!(Store::new(0.0).year_after_year(0.0, 365), 0.0);
    }

    #[test]
    fn a_store_of_no_days_holds_nothing() {
        assert_eq!(Store::new(0.0).day(0.0, 3.0), (0.0, 3.0));
    }
}
