//! What a whole realization of storage comes to: reliability, resilience, vulnerability.
//!
//! After Hashimoto, Stedinger & Loucks (1982), a day being satisfactory where demand is met: reliability is the share of
//! satisfactory days, resilience the chance that a day of shortage is followed by a day without, vulnerability how deep a shortage
//! goes, here the mean over shortages, each an unbroken run of days, of the largest share of a day's demand that is missing.

use super::entry::Entry;
use super::year_books::{LEAST_HM3, YearBooks};
use crate::reservoir::{Day, Outcome};
use crate::season::{Kind, Measure, NONE};

/// A reservoir's books of a whole realization.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(super) struct AllBooks {
    days: f64,
    short_days: f64,
    /// Days of shortage that another day follows, and of these, those that one without follows.
    followed: f64,
    recovered: f64,
    is_short: bool,
    events: f64,
    event_days: f64,
    event_deepest: f64,
    /// Sum over shortages of each one's deepest.
    deepest: f64,
    longest_days: f64,
    demanded_hm3: f64,
    shortage_hm3: f64,
    spill_hm3: f64,
    unused_hm3: f64,
    encroached_days: f64,
    years: f64,
    short_years: f64,
    unfilled_years: f64,
}

const RELIABILITY_OF_TIME: Entry<AllBooks> =
    Entry::new(Kind::Share, "reliability_time_share", "reliability by time", |books| {
        1.0 - books.short_days / books.days
    });

const RELIABILITY_OF_VOLUME: Entry<AllBooks> =
    Entry::new(Kind::Share, "reliability_volume_share", "reliability by volume", |books| {
        if books.demanded_hm3 > 0.0 { 1.0 - books.shortage_hm3 / books.demanded_hm3 } else { NONE }
    });

const NOT_FILLED: Entry<AllBooks> =
    Entry::new(Kind::Share, "years_not_filled_share", "share of years in which it does not fill", |books| {
        books.unfilled_years / books.years
    });

const ENTRIES: [Entry<AllBooks>; 8] = [
    RELIABILITY_OF_TIME,
    RELIABILITY_OF_VOLUME,
    Entry::new(Kind::Share, "years_without_shortage_share", "share of years without shortage", |books| {
        1.0 - books.short_years / books.years
    }),
    Entry::new(Kind::Share, "resilience_share", "resilience", |books| {
        if books.followed > 0.0 { books.recovered / books.followed } else { NONE }
    }),
    Entry::new(Kind::Share, "vulnerability_share", "vulnerability", |books| {
        if books.events > 0.0 { (books.deepest + books.event_deepest) / books.events } else { NONE }
    }),
    Entry::new(
        Kind::VolumeHm3,
        "shortage_of_an_event_hm3",
        "mean shortage of an unbroken run of short days",
        |books| if books.events > 0.0 { books.shortage_hm3 / books.events } else { NONE },
    ),
    Entry::new(Kind::DayCount, "longest_shortage_days", "longest unbroken run of short days", |books| {
        books.longest_days
    }),
    NOT_FILLED,
];

/// Which way a measure is better.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Better {
    /// More of it.
    More,
    /// Less of it.
    Less,
}

/// What is told of every change of the rules, with the rules as stated among them, and which way it is better.
const OF_CHANGES: [(Entry<AllBooks>, Better); CHANGED] = [
    (RELIABILITY_OF_TIME, Better::More),
    (RELIABILITY_OF_VOLUME, Better::More),
    (
        Entry::new(Kind::VolumeHm3, "shortage_hm3", "shortage a year", |books| {
            books.shortage_hm3 / books.years
        }),
        Better::Less,
    ),
    (
        Entry::new(Kind::VolumeHm3, "spill_hm3", "spill a year", |books| books.spill_hm3 / books.years),
        Better::Less,
    ),
    (
        Entry::new(
            Kind::VolumeHm3,
            "unused_hm3",
            "water passed on unused a year, spill and release that nothing asked for",
            |books| books.unused_hm3 / books.years,
        ),
        Better::Less,
    ),
    (
        Entry::new(
            Kind::DayCount,
            "flood_space_encroached_days",
            "days a year above the stated flood-space rule",
            |books| books.encroached_days / books.years,
        ),
        Better::Less,
    ),
    (NOT_FILLED, Better::Less),
];

/// How many measures are told of every change of the rules.
pub const CHANGED: usize = 7;

/// The measures of a whole realization.
pub(super) fn list() -> Vec<Measure> {
    ENTRIES.iter().map(Entry::measure).collect()
}

/// The measures of every change of the rules, each with the way in which it is better.
pub(super) fn list_of_changes() -> Vec<(Measure, Better)> {
    OF_CHANGES.iter().map(|(entry, better)| (entry.measure(), *better)).collect()
}

impl AllBooks {
    /// Enters a day.
    #[inline(always)]
    pub fn enter(&mut self, day: &Day, out: &Outcome) {
        let is_short = out.shortage_hm3 > LEAST_HM3;
        self.days += 1.0;
        if self.is_short {
            self.followed += 1.0;
            if !is_short {
                self.recovered += 1.0;
                self.deepest += self.event_deepest;
                (self.event_days, self.event_deepest) = (0.0, 0.0);
            }
        }
        if is_short {
            self.events += if self.is_short { 0.0 } else { 1.0 };
            self.short_days += 1.0;
            self.event_days += 1.0;
            self.longest_days = self.longest_days.max(self.event_days);
            self.event_deepest = self.event_deepest.max(out.shortage_hm3 / day.demand_hm3);
        }
        self.is_short = is_short;
    }

    /// Enters a year that is over.
    pub fn enter_year(&mut self, year: &YearBooks) {
        self.years += 1.0;
        self.demanded_hm3 += year.demanded_hm3;
        self.shortage_hm3 += year.shortage_hm3;
        self.spill_hm3 += year.spill_hm3;
        self.unused_hm3 += year.unused_hm3;
        self.encroached_days += year.encroached_days;
        self.short_years += if year.short_days > 0.0 { 1.0 } else { 0.0 };
        self.unfilled_years += if year.fill_day.is_finite() { 0.0 } else { 1.0 };
    }

    /// The measures of a whole realization.
    pub fn measures(&self) -> impl Iterator<Item = f64> + '_ {
        ENTRIES.iter().map(|entry| entry.read(self))
    }

    /// The measures of every change of the rules.
    pub fn measures_of_changes(&self) -> [f64; CHANGED] {
        OF_CHANGES.map(|(entry, _)| entry.read(self))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The definitions on a series by hand. Demand 10 a day; missing on ten days 0 0 4 8 0 0 2 0 0 5: 6 of 10 days are
    /// satisfactory; of the short days another follows 4, 8 and 2, a satisfactory one 8 and 2; three shortages are at most 0.8, 0.2 and 0.5
    /// deep, 12, 2 and 5 large.
    #[test]
    fn the_definitions_by_hand() {
        let mut books = AllBooks::default();
        let mut year = YearBooks::open(0.0);
        for missing in [0.0, 0.0, 4.0, 8.0, 0.0, 0.0, 2.0, 0.0, 0.0, 5.0] {
            let day = Day {
                inflow_hm3: 0.0,
                evaporation_hm3: 0.0,
                minimum_hm3: 0.0,
                not_above_hm3: 100.0,
                demand_hm3: 10.0,
            };
            let out = Outcome {
                storage_hm3: 50.0,
                evaporated_hm3: 0.0,
                minimum_hm3: 0.0,
                flood_hm3: 0.0,
                unasked_hm3: 0.0,
                for_demand_hm3: 10.0 - missing,
                spill_hm3: 0.0,
                shortage_hm3: missing,
            };
            books.enter(&day, &out);
            year.enter(1.0, &day, &out, (100.0, 100.0));
        }
        books.enter_year(&year);
        let of: Vec<(String, f64)> =
            list().into_iter().map(|measure| measure.name).zip(books.measures()).collect();
        let is = |name: &str, expected: f64| {
            let found = of.iter().find(|(of, _)| of == name).unwrap().1;
            assert!((found - expected).abs() < 1e-12, "{name}: {found} and not {expected}");
        };
        is("reliability_time_share", 0.6);
        is("reliability_volume_share", 1.0 - 19.0 / 100.0);
        is("years_without_shortage_share", 0.0);
        is("resilience_share", 2.0 / 3.0);
        is("vulnerability_share", (0.8 + 0.2 + 0.5) / 3.0);
        is("shortage_of_an_event_hm3", 19.0 / 3.0);
        is("longest_shortage_days", 2.0);
        is("years_not_filled_share", 1.0);
    }
}
