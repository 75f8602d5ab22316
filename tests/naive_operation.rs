//! Routing, a reservoir's days and what they come to, written out a second time, for one level, straight from their definitions.
//!
//! Plain loops over dates; a date is found by looking at every one. Only what is stated of an operation is taken from the library,
//! nothing that it makes of it.

use chrono::{Datelike, NaiveDate};
use thawline::calendar::MonthDay;
use thawline::operation::{Change, Operation, OperationSettings};
use thawline::reservoir::{Demand, Reservoir};
use thawline::season::{NONE, NOT_REACHED};

/// A water year of one level: its first day, and water input, mm a day.
pub type Year = (NaiveDate, Vec<f64>);

/// Measures by their names.
pub type Named = Vec<(String, f64)>;

/// A cubic metre in hm3: less is no water.
const CUBIC_METRE: f64 = 1e-6;

/// What one level comes to.
pub struct Operated {
    /// Of every year.
    pub yearly: Vec<Named>,
    /// Over all years.
    pub over_years: Named,
    /// Under the rules as stated and under every change.
    pub changed: Vec<Named>,
}

/// Runs one level.
pub fn operate(operation: &Operation, years: &[Year]) -> Operated {
    let inflow = inflow(operation, years);
    let mut yearly: Vec<Named> = Vec::new();
    for (year, inflow_hm3) in years.iter().zip(&inflow) {
        yearly.push(of_inflow(&operation.settings, &dates(year), inflow_hm3));
    }
    let Some(reservoir) = &operation.reservoir else {
        return Operated { yearly, over_years: Vec::new(), changed: Vec::new() };
    };
    let stated = store(reservoir, Change::AsStated, years, &inflow);
    for (number, measures) in yearly.iter_mut().enumerate() {
        measures.extend(of_storage(&operation.settings, reservoir, &stated[number]));
    }
    let mut changed = vec![of_change(reservoir, &stated)];
    for change in &operation.changes {
        changed.push(of_change(reservoir, &store(reservoir, *change, years, &inflow)));
    }
    Operated { yearly, over_years: over_years(reservoir, &stated), changed }
}

fn dates((first, input_mm): &Year) -> Vec<NaiveDate> {
    first.iter_days().take(input_mm.len()).collect()
}

/// Inflow, hm3 a day: the first year over and over, to no purpose, until it begins as it ends, then every year.
fn inflow(operation: &Operation, years: &[Year]) -> Vec<Vec<f64>> {
    let routing = &operation.routing;
    let mut quick_hm3 = 0.0;
    let mut slow_hm3 = 0.0;
    let mut all = Vec::new();
    let mut is_rehearsed = false;
    let mut next = 0;
    while next < years.len() {
        let year = &years[next];
        let begun_hm3 = [quick_hm3, slow_hm3];
        let mut inflow_hm3 = Vec::new();
        for (date, input_mm) in dates(year).into_iter().zip(&year.1) {
            let runs_off_mm = routing.runoff_fraction[date.month() as usize - 1] * input_mm;
            let runs_off_hm3 = runs_off_mm * operation.area_km2 / 1000.0;
            let (mut to_quick, mut to_slow, mut slow_days) = (runs_off_hm3, 0.0, 0.0);
            if let Some(slow) = routing.slow {
                to_slow = runs_off_hm3 * slow.share;
                to_quick = runs_off_hm3 - to_slow;
                slow_days = slow.recession_days;
            }
            let out = pass(&mut quick_hm3, to_quick, routing.recession_days)
                + pass(&mut slow_hm3, to_slow, slow_days);
            inflow_hm3.push(out);
        }
        let ended_hm3 = [quick_hm3, slow_hm3];
        let is_steady =
            begun_hm3.iter().zip(ended_hm3).all(|(begun, ended)| (begun - ended).abs() <= 1e-15 * ended);
        if all.is_empty() && !is_rehearsed {
            is_rehearsed = is_steady;
            continue;
        }
        all.push(inflow_hm3);
        next += 1;
    }
    all
}

/// A day of a linear reservoir: S(1) = S(0) exp(-1/K) + e K (1 - exp(-1/K)); what is missing has run out.
fn pass(held: &mut f64, water: f64, recession_days: f64) -> f64 {
    let before = *held;
    if recession_days == 0.0 {
        *held = 0.0;
    } else {
        let remains = libm::exp(-1.0 / recession_days);
        *held = before * remains + water * recession_days * (1.0 - remains);
    }
    before + water - *held
}

fn is_on(date: NaiveDate, day: MonthDay) -> bool {
    date.month() == day.month() && date.day() == day.day()
}

/// Days counted from 0.
fn place(dates: &[NaiveDate], day: MonthDay) -> usize {
    let mut at = 0;
    while !is_on(dates[at], day) {
        at += 1;
    }
    at
}

fn name(day: MonthDay) -> String {
    format!("{:02}_{:02}", day.month(), day.day())
}

const MONTHS: [&str; 12] = [
    "january",
    "february",
    "march",
    "april",
    "may",
    "june",
    "july",
    "august",
    "september",
    "october",
    "november",
    "december",
];

fn of_inflow(settings: &OperationSettings, dates: &[NaiveDate], inflow_hm3: &[f64]) -> Named {
    let mut all = Vec::new();
    let between = |from: usize, to: usize| {
        let mut sum = 0.0;
        for hm3 in &inflow_hm3[from..to] {
            sum += hm3;
        }
        sum
    };
    let year_hm3 = between(0, dates.len());
    let share = |hm3: f64| if year_hm3 > 0.0 { hm3 / year_hm3 } else { NONE };
    for [from, to] in &settings.volume_windows {
        let volume = between(place(dates, *from), place(dates, *to) + 1);
        all.push((format!("inflow_{}_to_{}_hm3", name(*from), name(*to)), volume));
    }
    all.push(("inflow_year_hm3".to_owned(), year_hm3));
    for day in &settings.shares_before {
        all.push((format!("inflow_before_{}_share", name(*day)), share(between(0, place(dates, *day)))));
    }
    for (month, of_month) in (1..).zip(MONTHS) {
        let mut in_month = 0.0;
        for (date, hm3) in dates.iter().zip(inflow_hm3) {
            if date.month() == month {
                in_month += hm3;
            }
        }
        all.push((format!("inflow_in_{of_month}_share"), share(in_month)));
    }
    let mut moments = 0.0;
    for day in 1..=dates.len() {
        moments += day as f64 * inflow_hm3[day - 1];
    }
    all.push(("inflow_centroid_day".to_owned(), share(moments)));
    for (days, words) in [(1, "1_day"), (3, "3_days"), (7, "7_days")] {
        let mut largest = 0.0;
        for from in 0..=dates.len() - days {
            if between(from, from + days) > largest {
                largest = between(from, from + days);
            }
        }
        all.push((format!("inflow_largest_{words}_hm3"), largest));
    }
    all
}

/// A day of a reservoir, hm3.
struct Kept {
    date: NaiveDate,
    before: f64,
    after: f64,
    evaporated: f64,
    minimum: f64,
    minimum_asked: f64,
    for_flood_space: f64,
    for_demand: f64,
    demand: f64,
    shortage: f64,
    spilled: f64,
    unused: f64,
    /// By the rule as stated, whichever is run.
    not_above: f64,
}

/// Every day of every year under the rules changed in one way.
fn store(reservoir: &Reservoir, change: Change, years: &[Year], inflow: &[Vec<f64>]) -> Vec<Vec<Kept>> {
    let mut storage = reservoir.starting_hm3;
    let mut all = Vec::new();
    for (year, inflow_hm3) in years.iter().zip(inflow) {
        let mut days = Vec::new();
        for (date, inflow_hm3) in dates(year).into_iter().zip(inflow_hm3) {
            let day = day(reservoir, change, date, storage, *inflow_hm3);
            storage = day.after;
            days.push(day);
        }
        all.push(days);
    }
    all
}

/// One day, in the order of priority: air, minimum release, flood space, demand, spill.
fn day(reservoir: &Reservoir, change: Change, date: NaiveDate, before: f64, inflow_hm3: f64) -> Kept {
    let month = date.month() as usize - 1;
    let (mut demand, is_target) = match reservoir.demand_hm3_per_day {
        Demand::OnTop(daily) => (daily[month], false),
        Demand::InAll(daily) => (daily[month], true),
    };
    if let Change::DemandTimes(factor) = change {
        demand *= factor;
    }
    let run_by = not_above(reservoir, change, date);
    let mut storage = before + inflow_hm3;
    let mut evaporated = reservoir.evaporation_hm3_per_day[month];
    if evaporated > storage {
        evaporated = storage;
    }
    storage -= evaporated;
    let mut outlets = reservoir.release_capacity_hm3_per_day;
    // Takes what is wanted out of the storage, as far as outlets and dead storage let it.
    let mut release = |wanted: f64, storage: &mut f64| {
        let mut taken = wanted;
        if taken > outlets {
            taken = outlets;
        }
        if taken > *storage - reservoir.dead_hm3 {
            taken = *storage - reservoir.dead_hm3;
        }
        if taken < 0.0 {
            taken = 0.0;
        }
        *storage -= taken;
        outlets -= taken;
        taken
    };
    let minimum_asked = reservoir.minimum_release_hm3_per_day[month];
    let minimum = release(minimum_asked, &mut storage);
    let for_flood_space = if storage > run_by { release(storage - run_by, &mut storage) } else { 0.0 };
    let mut wanted = demand;
    if is_target {
        wanted -= minimum;
    }
    if wanted < 0.0 {
        wanted = 0.0;
    }
    let mut unused = 0.0;
    if for_flood_space > wanted {
        unused = for_flood_space - wanted;
    }
    let mut unserved = wanted - for_flood_space;
    if unserved < 0.0 {
        unserved = 0.0;
    }
    let for_demand = release(unserved, &mut storage);
    let mut spilled = 0.0;
    if storage > reservoir.capacity_hm3 {
        spilled = storage - reservoir.capacity_hm3;
        storage = reservoir.capacity_hm3;
    }
    Kept {
        date,
        before,
        after: storage,
        evaporated,
        minimum,
        minimum_asked,
        for_flood_space,
        for_demand,
        demand,
        shortage: unserved - for_demand,
        spilled,
        unused: unused + spilled,
        not_above: not_above(reservoir, Change::AsStated, date),
    }
}

/// What the rule lets be held on a date, under a change.
fn not_above(reservoir: &Reservoir, change: Change, date: NaiveDate) -> f64 {
    let mut common = date.with_year(2001);
    if common.is_none() {
        common = NaiveDate::from_ymd_opt(2001, 2, 28);
    }
    let date = common.unwrap();
    let own = line(reservoir, date);
    match change {
        Change::AsStated | Change::DemandTimes(_) => own,
        Change::RefillMovedDays(days) => {
            let mut other = date;
            for _ in 0..days.abs() {
                other = if days < 0 { next(other) } else { last(other) };
            }
            let other = line(reservoir, other);
            // Earlier: as much as it would hold days later; later: no more than it held days before.
            if (days < 0) == (other > own) { other } else { own }
        }
        Change::FloodSpaceTimes(factor) => {
            let kept = reservoir.capacity_hm3 - factor * (reservoir.capacity_hm3 - own);
            if kept < reservoir.dead_hm3 { reservoir.dead_hm3 } else { kept }
        }
    }
}

/// The rule as stated on a date of 2001, whose end is followed by its beginning.
fn line(reservoir: &Reservoir, date: NaiveDate) -> f64 {
    if reservoir.flood_rule.is_empty() {
        return reservoir.capacity_hm3;
    }
    let stated = |date: NaiveDate| reservoir.flood_rule.iter().find(|point| is_on(date, point.on));
    let (mut before, mut since) = (date, 0);
    while stated(before).is_none() {
        before = last(before);
        since += 1;
    }
    let (mut after, mut until) = (next(date), 1);
    while stated(after).is_none() {
        after = next(after);
        until += 1;
    }
    let [from, to] = [before, after].map(|date| stated(date).unwrap().not_above_hm3);
    from + (to - from) * f64::from(since) / f64::from(since + until)
}

fn next(date: NaiveDate) -> NaiveDate {
    let next = date.succ_opt().unwrap();
    if next.year() == 2001 { next } else { NaiveDate::from_ymd_opt(2001, 1, 1).unwrap() }
}

fn last(date: NaiveDate) -> NaiveDate {
    let last = date.pred_opt().unwrap();
    if last.year() == 2001 { last } else { NaiveDate::from_ymd_opt(2001, 12, 31).unwrap() }
}

fn sum(days: &[Kept], of: impl Fn(&Kept) -> f64) -> f64 {
    let mut sum = 0.0;
    for day in days {
        sum += of(day);
    }
    sum
}

fn count(days: &[Kept], is_so: impl Fn(&Kept) -> bool) -> f64 {
    days.iter().filter(|day| is_so(day)).count() as f64
}

fn is_short(day: &Kept) -> bool {
    day.shortage > CUBIC_METRE
}

/// The first day that ends with at least the full share of the capacity, to a cubic metre.
fn fill_day(reservoir: &Reservoir, days: &[Kept]) -> Option<usize> {
    let full = reservoir.full_share * reservoir.capacity_hm3;
    days.iter().position(|day| day.after >= full - CUBIC_METRE).map(|at| at + 1)
}

fn of_storage(settings: &OperationSettings, reservoir: &Reservoir, days: &[Kept]) -> Named {
    let mut all = Vec::new();
    for day in days {
        let is_asked = settings.storage_dates.iter().any(|asked| is_on(day.date, *asked));
        if day.date.day() == 1 || is_asked {
            all.push((format!("storage_{:02}_{:02}_hm3", day.date.month(), day.date.day()), day.before));
        }
    }
    let mut lowest = days[0].before;
    let mut most_above: f64 = 0.0;
    for day in days {
        lowest = lowest.min(day.after);
        most_above = most_above.max(day.after - day.not_above);
    }
    let released = |day: &Kept| day.minimum + day.for_flood_space + day.for_demand;
    all.extend(
        [
            ("storage_year_end_hm3", days[days.len() - 1].after),
            ("storage_lowest_hm3", lowest),
            ("fill_day", fill_day(reservoir, days).map_or(NOT_REACHED, |day| day as f64)),
            ("shortage_hm3", sum(days, |day| day.shortage)),
            ("shortage_days", count(days, is_short)),
            ("spill_hm3", sum(days, |day| day.spilled)),
            ("unused_hm3", sum(days, |day| day.unused)),
            ("release_hm3", sum(days, released)),
            ("release_for_flood_space_hm3", sum(days, |day| day.for_flood_space)),
            ("flood_space_encroached_days", count(days, |day| day.after - day.not_above > CUBIC_METRE)),
            ("flood_space_encroached_most_hm3", most_above),
            ("minimum_release_missed_days", count(days, |day| day.minimum_asked - day.minimum > CUBIC_METRE)),
            ("evaporation_hm3", sum(days, |day| day.evaporated)),
        ]
        .map(|(name, value)| (name.to_owned(), value)),
    );
    all
}

/// Unbroken runs of short days.
fn shortages<'a>(days: &[&'a Kept]) -> Vec<Vec<&'a Kept>> {
    let mut all = Vec::new();
    let mut run = Vec::new();
    for day in days {
        if is_short(day) {
            run.push(*day);
        } else if !run.is_empty() {
            all.push(std::mem::take(&mut run));
        }
    }
    if !run.is_empty() {
        all.push(run);
    }
    all
}

fn reliability_by_time(days: &[&Kept]) -> f64 {
    1.0 - days.iter().filter(|day| is_short(day)).count() as f64 / days.len() as f64
}

fn reliability_by_volume(years: &[Vec<Kept>]) -> f64 {
    let demanded: f64 = years.iter().map(|days| sum(days, |day| day.demand)).sum();
    let missing: f64 = years.iter().map(|days| sum(days, |day| day.shortage)).sum();
    if demanded > 0.0 { 1.0 - missing / demanded } else { NONE }
}

fn share_of_years(years: &[Vec<Kept>], is_so: impl Fn(&[Kept]) -> bool) -> f64 {
    years.iter().filter(|days| is_so(days)).count() as f64 / years.len() as f64
}

fn over_years(reservoir: &Reservoir, years: &[Vec<Kept>]) -> Named {
    let days: Vec<&Kept> = years.iter().flatten().collect();
    let shortages = shortages(&days);
    let mut followed = 0.0;
    let mut recovered = 0.0;
    for pair in days.windows(2) {
        if is_short(pair[0]) {
            followed += 1.0;
            if !is_short(pair[1]) {
                recovered += 1.0;
            }
        }
    }
    let mut depths = 0.0;
    for shortage in &shortages {
        let mut deepest: f64 = 0.0;
        for day in shortage {
            deepest = deepest.max(day.shortage / day.demand);
        }
        depths += deepest;
    }
    let missing: f64 = years.iter().map(|days| sum(days, |day| day.shortage)).sum();
    let of_an_event = |sum: f64| if shortages.is_empty() { NONE } else { sum / shortages.len() as f64 };
    let longest = shortages.iter().map(Vec::len).max().unwrap_or(0);
    [
        ("reliability_time_share", reliability_by_time(&days)),
        ("reliability_volume_share", reliability_by_volume(years)),
        ("years_without_shortage_share", share_of_years(years, |days| !days.iter().any(is_short))),
        ("resilience_share", if followed > 0.0 { recovered / followed } else { NONE }),
        ("vulnerability_share", of_an_event(depths)),
        ("shortage_of_an_event_hm3", of_an_event(missing)),
        ("longest_shortage_days", longest as f64),
        ("years_not_filled_share", share_of_years(years, |days| fill_day(reservoir, days).is_none())),
    ]
    .map(|(name, value)| (name.to_owned(), value))
    .to_vec()
}

fn of_change(reservoir: &Reservoir, years: &[Vec<Kept>]) -> Named {
    let days: Vec<&Kept> = years.iter().flatten().collect();
    let a_year = |of: &dyn Fn(&[Kept]) -> f64| {
        let all: f64 = years.iter().map(|days| of(days)).sum();
        all / years.len() as f64
    };
    let above = |days: &[Kept]| count(days, |day| day.after - day.not_above > CUBIC_METRE);
    [
        ("reliability_time_share", reliability_by_time(&days)),
        ("reliability_volume_share", reliability_by_volume(years)),
        ("shortage_hm3", a_year(&|days| sum(days, |day| day.shortage))),
        ("spill_hm3", a_year(&|days| sum(days, |day| day.spilled))),
        ("unused_hm3", a_year(&|days| sum(days, |day| day.unused))),
        ("flood_space_encroached_days", a_year(&above)),
        ("years_not_filled_share", share_of_years(years, |days| fill_day(reservoir, days).is_none())),
    ]
    .map(|(name, value)| (name.to_owned(), value))
    .to_vec()
}
