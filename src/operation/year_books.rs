//! What a year of storage comes to.

use super::entry::Entry;
use super::plan::OperationSettings;
use crate::reservoir::{Day, Outcome, PoolLedger};
use crate::season::{Kind, Measure, NOT_REACHED, name_of};

/// Water that is less is none, hm3: a cubic metre.
pub(super) const LEAST_HM3: f64 = 1e-6;

/// A reservoir's books of one water year, hm3 and days.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct YearBooks {
    pub ledger: PoolLedger,
    pub from_hm3: f64,
    pub storage_hm3: f64,
    pub lowest_hm3: f64,
    pub fill_day: f64,
    pub demanded_hm3: f64,
    pub shortage_hm3: f64,
    pub short_days: f64,
    pub missed_minimum_days: f64,
    pub released_hm3: f64,
    pub flood_hm3: f64,
    pub spill_hm3: f64,
    pub unused_hm3: f64,
    pub encroached_days: f64,
    pub encroached_most_hm3: f64,
    pub evaporated_hm3: f64,
}

const ENTRIES: [Entry<YearBooks>; 13] = [
    Entry::new(Kind::VolumeHm3, "storage_year_end_hm3", "storage as the water year ends", |books| {
        books.storage_hm3
    }),
    Entry::new(Kind::VolumeHm3, "storage_lowest_hm3", "lowest storage", |books| books.lowest_hm3),
    Entry::new(Kind::ArrivalDay, "fill_day", "first day on which the reservoir is full", |books| {
        books.fill_day
    }),
    Entry::new(Kind::VolumeHm3, "shortage_hm3", "shortage", |books| books.shortage_hm3),
    Entry::new(Kind::DayCount, "shortage_days", "days of shortage", |books| books.short_days),
    Entry::new(Kind::VolumeHm3, "spill_hm3", "spill", |books| books.spill_hm3),
    Entry::new(
        Kind::VolumeHm3,
        "unused_hm3",
        "water passed on unused, spill and release that nothing asked for",
        |books| books.unused_hm3,
    ),
    Entry::new(Kind::VolumeHm3, "release_hm3", "release through the outlets", |books| books.released_hm3),
    Entry::new(Kind::VolumeHm3, "release_for_flood_space_hm3", "release for flood space", |books| {
        books.flood_hm3
    }),
    Entry::new(
        Kind::DayCount,
        "flood_space_encroached_days",
        "days above the stated flood-space rule",
        |books| books.encroached_days,
    ),
    Entry::new(
        Kind::VolumeHm3,
        "flood_space_encroached_most_hm3",
        "most storage above the stated flood-space rule",
        |books| books.encroached_most_hm3,
    ),
    Entry::new(Kind::DayCount, "minimum_release_missed_days", "days below the minimum release", |books| {
        books.missed_minimum_days
    }),
    Entry::new(Kind::VolumeHm3, "evaporation_hm3", "evaporation", |books| books.evaporated_hm3),
];

/// The measures: storage on its dates, then the books'.
pub(super) fn list(settings: &OperationSettings) -> Vec<Measure> {
    let on_dates = settings.all_storage_dates().into_iter().map(|day| {
        let name = format!("storage_{}_hm3", name_of(day));
        Measure::new(Kind::VolumeHm3, name, format!("storage on {}", day.words()))
    });
    on_dates.chain(ENTRIES.iter().map(Entry::measure)).collect()
}

impl YearBooks {
    /// Opened on some storage.
    pub fn open(storage_hm3: f64) -> Self {
        Self {
            ledger: PoolLedger::default(),
            from_hm3: storage_hm3,
            storage_hm3,
            lowest_hm3: storage_hm3,
            fill_day: NOT_REACHED,
            demanded_hm3: 0.0,
            shortage_hm3: 0.0,
            short_days: 0.0,
            missed_minimum_days: 0.0,
            released_hm3: 0.0,
            flood_hm3: 0.0,
            spill_hm3: 0.0,
            unused_hm3: 0.0,
            encroached_days: 0.0,
            encroached_most_hm3: 0.0,
            evaporated_hm3: 0.0,
        }
    }

    /// Enters a day, the `number`th of the year; full is what holds at least `full_hm3` as it ends, to a cubic metre: a release
    /// down to the capacity may round below it. Whatever rule is run, encroachment is that of the stated one.
    #[inline(always)]
    pub fn enter(&mut self, number: f64, day: &Day, out: &Outcome, (full_hm3, stated_rule_hm3): (f64, f64)) {
        self.ledger.enter(day.inflow_hm3, out);
        self.storage_hm3 = out.storage_hm3;
        self.lowest_hm3 = self.lowest_hm3.min(out.storage_hm3);
        let is_full = out.storage_hm3 >= full_hm3 - LEAST_HM3;
        self.fill_day = if is_full { self.fill_day.min(number) } else { self.fill_day };
        self.demanded_hm3 += day.demand_hm3;
        self.shortage_hm3 += out.shortage_hm3;
        self.short_days += counted(out.shortage_hm3 > LEAST_HM3);
        self.missed_minimum_days += counted(day.minimum_hm3 - out.minimum_hm3 > LEAST_HM3);
        self.released_hm3 += out.minimum_hm3 + out.flood_hm3 + out.for_demand_hm3;
        self.flood_hm3 += out.flood_hm3;
        self.spill_hm3 += out.spill_hm3;
        self.unused_hm3 += out.spill_hm3 + out.unasked_hm3;
        let above_hm3 = out.storage_hm3 - stated_rule_hm3;
        self.encroached_days += counted(above_hm3 > LEAST_HM3);
        self.encroached_most_hm3 = self.encroached_most_hm3.max(above_hm3);
        self.evaporated_hm3 += out.evaporated_hm3;
    }

    /// The measures behind storage on its dates.
    pub fn measures(&self) -> impl Iterator<Item = f64> + '_ {
        ENTRIES.iter().map(|entry| entry.read(self))
    }
}

#[inline(always)]
fn counted(is_so: bool) -> f64 {
    if is_so { 1.0 } else { 0.0 }
}
