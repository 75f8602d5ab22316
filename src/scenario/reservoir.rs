//! `[reservoir]`: what it holds, what it must give, and what could be changed.

use super::as_typed::{Typed, note_as_typed};
use super::section::Section;
use super::volumes::Stated;
use crate::calendar::MonthDay;
use crate::fault::Fault;
use crate::operation::Change;
use crate::reservoir::{Demand, Reservoir, RulePoint};

/// A reservoir, as typed.
#[derive(Debug, Clone)]
pub struct ReservoirTyped {
    /// The reservoir.
    pub reservoir: Reservoir,
    /// Days whose storage is told beside the first of every month.
    pub storage_dates: Vec<MonthDay>,
    /// What else is tried of its rules.
    pub changes: Vec<Change>,
}

const CAPACITY: [&str; 2] = ["capacity_hm3", "capacity_thousand_acre_feet"];
const DEAD: [&str; 2] = ["dead_storage_hm3", "dead_storage_thousand_acre_feet"];
const STARTING: [&str; 2] = ["starting_storage_hm3", "starting_storage_thousand_acre_feet"];
const NOT_ABOVE: [&str; 2] = ["storage_not_above_hm3", "storage_not_above_thousand_acre_feet"];
const RELEASE_CAPACITY: [&str; 3] =
    ["release_capacity_m3_per_s", "release_capacity_cfs", "release_capacity_hm3_per_day"];
const MINIMUM: [&str; 3] = ["minimum_release_m3_per_s", "minimum_release_cfs", "minimum_release_hm3_per_day"];
const DEMAND: [&str; 4] =
    ["demand_hm3_per_month", "demand_thousand_acre_feet_per_month", "demand_m3_per_s", "demand_cfs"];
const TARGET: [&str; 4] = [
    "release_target_hm3_per_month",
    "release_target_thousand_acre_feet_per_month",
    "release_target_m3_per_s",
    "release_target_cfs",
];
const EVAPORATION: [&str; 2] = ["evaporation_hm3_per_month", "evaporation_thousand_acre_feet_per_month"];

/// A reservoir counts as full from this share of its capacity on, where nothing else is stated.
const FULL_SHARE: f64 = 0.99;
/// Refill dates that are tried, days, where nothing else is stated.
const REFILL_MOVED_DAYS: [i32; 3] = [-30, -20, -10];

pub(super) fn read(mut section: Section<'_>) -> Option<ReservoirTyped> {
    let typed = read_keys(&mut section);
    section.finish();
    typed
}

fn read_keys(section: &mut Section<'_>) -> Option<ReservoirTyped> {
    let name = read_name(section);
    let capacity = required_volume(section, CAPACITY, "what it holds when full");
    let dead = volume_or(section, DEAD, 0.0);
    let starting = required_volume(section, STARTING, "what each realization begins with");
    let release_capacity = required_outlets(section);
    let minimum = flow_or_none(section, &MINIMUM);
    let demand = read_demand(section);
    let evaporation = flow_or_none(section, &EVAPORATION);
    let rule = read_rule(section.sections("flood_space"));
    let full_share = section.number_or("full_share", FULL_SHARE, 0.5..=1.0, "a share of the capacity");
    let storage_dates = read_dates(section);
    // A rule with a fault is a rule.
    let is_no_list = section.has("flood_space") && !section.is_list("flood_space");
    let has_rule = is_no_list || rule.as_ref().is_none_or(|rule| !rule.is_empty());
    let changes = section.has("changes").then(|| read_changes(section.section("changes"), has_rule));
    section.knows("changes");
    let (capacity, dead, starting, release_capacity) = (capacity?, dead?, starting?, release_capacity?);
    let (minimum, evaporation, rule) = (minimum?, evaporation?, rule?);
    let (demand_stated, demand) = demand?;
    let reservoir = Reservoir {
        name: name?,
        capacity_hm3: capacity.value,
        dead_hm3: dead.value,
        starting_hm3: starting.value,
        release_capacity_hm3_per_day: release_capacity.value,
        minimum_release_hm3_per_day: minimum.value,
        demand_hm3_per_day: demand,
        flood_rule: rule
            .iter()
            .map(|(on, stated)| RulePoint { on: *on, not_above_hm3: stated.value })
            .collect(),
        evaporation_hm3_per_day: evaporation.value,
        full_share,
    };
    if let Err(faults) = reservoir.check() {
        let mut all = vec![
            Typed::one("capacity_hm3", &capacity),
            Typed::one("dead_storage_hm3", &dead),
            Typed::one("starting_storage_hm3", &starting),
            Typed::one("release_capacity", &release_capacity),
        ];
        let flows = [
            ("minimum_release", Some(&minimum)),
            ("demand", demand_stated.as_ref()),
            ("evaporation", Some(&evaporation)),
        ];
        for (of, stated) in flows {
            all.extend(stated.into_iter().flat_map(|stated| Typed::monthly(section, of, stated)));
        }
        for (at, (_, stated)) in rule.iter().enumerate() {
            let path = format!("flood_space[{at}].");
            all.push(Typed::one(&format!("{path}storage_not_above_hm3"), stated).below(&path));
        }
        note_as_typed(section, faults, &all);
        return None;
    }
    section.notes.unlikely.borrow_mut().extend(reservoir.unlikely());
    let changes = match changes {
        None => Vec::new(),
        Some(changes) => changes?,
    };
    Some(ReservoirTyped { reservoir, storage_dates: storage_dates?, changes })
}

fn read_name(section: &mut Section<'_>) -> Option<String> {
    const LONGEST: usize = 300;
    let name =
        section.required_text("name", "a name for the reservoir", "add name = \"Lantern Reservoir\"")?;
    if name.chars().any(char::is_control) || name.chars().count() > LONGEST {
        section.fault(Fault::key(
            section.path_of("name"),
            "a name with line breaks or control signs, or a very long one",
            format!("one line of at most {LONGEST} characters"),
            "shorten it",
        ));
        return None;
    }
    Some(name)
}

fn required_volume(section: &mut Section<'_>, keys: [&'static str; 2], what: &str) -> Option<Stated<f64>> {
    if !keys.iter().any(|key| section.has(key)) {
        keys.iter().for_each(|key| section.knows(key));
        let mend = format!("add {} = ..., {what}; or {}", keys[0], keys[1]);
        section.missing(keys[0], "a volume", &mend);
        return None;
    }
    section.volume(keys)
}

fn volume_or(section: &mut Section<'_>, keys: [&'static str; 2], usual: f64) -> Option<Stated<f64>> {
    if !keys.iter().any(|key| section.has(key)) {
        keys.iter().for_each(|key| section.knows(key));
        section.default(keys[0], usual);
        return Some(Stated { key: keys[0], typed: usual, value: usual });
    }
    section.volume(keys)
}

/// What the outlets pass, as much in every month.
fn required_outlets(section: &mut Section<'_>) -> Option<Stated<f64>> {
    let keys = &RELEASE_CAPACITY;
    if !keys.iter().any(|key| section.has(key)) {
        keys.iter().for_each(|key| section.knows(key));
        let others = keys[1..].join(" or ");
        let mend = format!("add {} = ..., what all outlets and turbines pass together; or {others}", keys[0]);
        section.missing(keys[0], "a flow", &mend);
        return None;
    }
    section.even_flow(keys)
}

fn flow_or_none(section: &mut Section<'_>, keys: &[&'static str]) -> Option<Stated<[f64; 12]>> {
    if !keys.iter().any(|key| section.has(key)) {
        keys.iter().for_each(|key| section.knows(key));
        section.default(keys[0], 0);
        return Some(Stated { key: keys[0], typed: [0.0; 12], value: [0.0; 12] });
    }
    section.flow(keys)
}

/// A demand on top of the minimum release, or a target that it serves, with what was typed; no demand where neither was.
fn read_demand(section: &mut Section<'_>) -> Option<(Option<Stated<[f64; 12]>>, Demand)> {
    let typed = |keys: [&'static str; 4]| keys.into_iter().find(|key| section.has(key));
    match (typed(DEMAND), typed(TARGET)) {
        (Some(demand), Some(target)) => {
            DEMAND.iter().chain(&TARGET).for_each(|key| section.knows(key));
            section.fault(Fault::key(
                section.path_of(target),
                format!("{target} beside {demand}"),
                "one of the two",
                "a demand comes on top of the minimum release, a release target holds it",
            ));
            None
        }
        (None, Some(_)) => {
            DEMAND.iter().for_each(|key| section.knows(key));
            let stated = section.flow(&TARGET)?;
            let demand = Demand::InAll(stated.value);
            Some((Some(stated), demand))
        }
        (Some(_), None) => {
            TARGET.iter().for_each(|key| section.knows(key));
            let stated = section.flow(&DEMAND)?;
            let demand = Demand::OnTop(stated.value);
            Some((Some(stated), demand))
        }
        (None, None) => {
            DEMAND.iter().chain(&TARGET).for_each(|key| section.knows(key));
            section.default(DEMAND[0], 0);
            Some((None, Demand::OnTop([0.0; 12])))
        }
    }
}

fn read_rule(sections: Vec<Section<'_>>) -> Option<Vec<(MonthDay, Stated<f64>)>> {
    let points: Vec<Option<(MonthDay, Stated<f64>)>> = sections.into_iter().map(read_point).collect();
    points.into_iter().collect()
}

fn read_point(mut section: Section<'_>) -> Option<(MonthDay, Stated<f64>)> {
    let on = section.day("on");
    if on.is_none() && !section.has("on") {
        section.missing("on", "a day", "add on = \"11-15\"");
    }
    let not_above = required_volume(&mut section, NOT_ABOVE, "what storage is not to exceed on that day");
    section.finish();
    Some((on?, not_above?))
}

fn read_dates(section: &mut Section<'_>) -> Option<Vec<MonthDay>> {
    const KEY: &str = "storage_dates";
    let Some(texts) = section.texts(KEY) else {
        if section.has(KEY) {
            return None;
        }
        section.default(KEY, "[]");
        return Some(Vec::new());
    };
    let days: Vec<Option<MonthDay>> =
        texts.iter().enumerate().map(|(at, text)| section.parse_day(&format!("{KEY}[{at}]"), text)).collect();
    let days: Vec<MonthDay> = days.into_iter().collect::<Option<_>>()?;
    let repeated = days.iter().enumerate().find(|(at, day)| days[..*at].contains(day));
    if let Some((at, day)) = repeated {
        section.fault(Fault::key(
            section.path_of(&format!("{KEY}[{at}]")),
            format!("{day} twice"),
            "each day once",
            "take one of the two out",
        ));
        return None;
    }
    Some(days)
}

fn read_changes(mut section: Section<'_>, has_rule: bool) -> Option<Vec<Change>> {
    let changes = read_lists(&mut section, has_rule);
    section.finish();
    changes
}

fn read_lists(section: &mut Section<'_>, has_rule: bool) -> Option<Vec<Change>> {
    let moved = if section.has("refill_moved_days") {
        section.numbers("refill_moved_days")
    } else {
        section.knows("refill_moved_days");
        let usual: &[i32] = if has_rule { &REFILL_MOVED_DAYS } else { &[] };
        section.default("refill_moved_days", format!("{usual:?}"));
        Some(usual.iter().map(|days| f64::from(*days)).collect())
    };
    let mut factors = |key: &'static str| {
        if section.has(key) {
            section.numbers(key)
        } else {
            section.knows(key);
            section.default(key, "[]");
            Some(Vec::new())
        }
    };
    let (space, demand) = (factors("flood_space_times"), factors("demand_times"));
    let (moved, space, demand) = (moved?, space?, demand?);
    let is_sound = |key: &str, values: &[f64], is_in: &dyn Fn(f64) -> bool, expected: &str| {
        let wrong =
            values.iter().enumerate().find(|(at, value)| !is_in(**value) || values[..*at].contains(value));
        if let Some((at, value)) = wrong {
            section.fault(Fault::key(
                section.path_of(&format!("{key}[{at}]")),
                value,
                format!("{expected}, each once, and not what the rules are without it"),
                "take it out, or write another",
            ));
        }
        wrong.is_none()
    };
    let days_are = is_sound(
        "refill_moved_days",
        &moved,
        &|days| days != 0.0 && days.fract() == 0.0 && days.abs() <= 180.0,
        "whole days from -180 to 180",
    );
    let times = |factor: f64| factor != 1.0 && (0.0..=3.0).contains(&factor);
    let space_is = is_sound("flood_space_times", &space, &times, "factors from 0 to 3");
    let demand_is = is_sound("demand_times", &demand, &times, "factors from 0 to 3");
    let mut needs_rule = false;
    for (key, values) in [("refill_moved_days", &moved), ("flood_space_times", &space)] {
        if !has_rule && !values.is_empty() {
            needs_rule = true;
            section.fault(Fault::key(
                section.path_of(key),
                "a change of a flood-space rule that is not stated",
                "a rule to change, in [[reservoir.flood_space]]",
                format!("state the rule, or leave {key} out"),
            ));
        }
    }
    let all_are = days_are && space_is && demand_is && !needs_rule;
    let moved = moved.into_iter().map(|days| Change::RefillMovedDays(days as i32));
    let space = space.into_iter().map(Change::FloodSpaceTimes);
    let demand = demand.into_iter().map(Change::DemandTimes);
    all_are.then(|| moved.chain(space).chain(demand).collect())
}
