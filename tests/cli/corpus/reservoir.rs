//! Slips in `[reservoir]`, and the same reservoir in other units.

use super::inflow::{OPERATIONS, slips};
use super::small;
use serde_json::Value;

#[test]
fn slips_in_what_a_reservoir_holds() {
    let said = slips(&[
        ("name = \"Lantern Reservoir\"\n", ""),
        ("\"Lantern Reservoir\"", "7"),
        ("\"Lantern Reservoir\"", "\"a\\nb\""),
        ("[reservoir]\n", "[[reservoir]]\n"),
        ("capacity_hm3 = 40\n", ""),
        ("capacity_hm3 = 40", "capacity_hm3 = \"40\""),
        ("capacity_hm3 = 40", "capacity_hm3 = 0"),
        ("capacity_hm3 = 40", "capacity_thousand_acre_feet = 1e9"),
        ("capacity_hm3 = 40", "capacity_hm3 = 40\ncapacity_thousand_acre_feet = 4"),
        ("capacity_hm3 = 40", "capacity_hm4 = 40"),
        ("dead_storage_hm3 = 5", "dead_storage_hm3 = [5]"),
        ("dead_storage_hm3 = 5", "dead_storage_hm3 = -5"),
        ("dead_storage_hm3 = 5", "dead_storage_hm3 = 40"),
        ("dead_storage_hm3 = 5", "dead_storage_thousand_acre_feet = 50"),
        ("dead_storage_hm3 = 5", "dead_storage_hm3 = 5\ndead_storage_thousand_acre_feet = 4"),
        ("starting_storage_hm3 = 20\n", ""),
        ("starting_storage_hm3 = 20", "starting_storage_hm3 = true"),
        ("starting_storage_hm3 = 20", "starting_storage_hm3 = 41"),
        ("starting_storage_hm3 = 20", "starting_storage_thousand_acre_feet = 33"),
        ("starting_storage_hm3 = 20", "starting_storage_hm3 = 20\nstarting_storage_thousand_acre_feet = 4"),
        ("[\"04-01\"]", "\"04-01\""),
        ("[\"04-01\"]", "[\"02-29\"]"),
        ("[\"04-01\"]", "[\"04-01\", \"04-01\"]"),
        ("full_share = 0.98", "full_share = 98"),
        ("full_share = 0.98", "full_share = 0.98\nspillway = 3"),
    ]);
    insta::assert_snapshot!(said, @r##"
reservoir.name: no 'name'
  at reservoir: expected a name for the reservoir; add name = "Lantern Reservoir"

reservoir.name: 7
  at 7: expected a text in quotes; write name = "..."

reservoir.name: a name with line breaks or control signs, or a very long one
  at "a\nb": expected one line of at most 300 characters; shorten it

reservoir: a list
  at [[reservoir]]: expected a table; write [reservoir] once, with single brackets

reservoir.capacity_hm3: no 'capacity_hm3'
  at reservoir: expected a volume; add capacity_hm3 = ..., what it holds when full; or capacity_thousand_acre_feet

reservoir.capacity_hm3: the text "40"
  at "40": expected a number; take the quotes away: capacity_hm3 = 40

reservoir.capacity_hm3: 0
  at 0: expected a volume above 0, at most 1000000 hm3; million cubic metres; a thousand acre-feet are 1.23348 hm3

reservoir.capacity_thousand_acre_feet: 1000000000, which is 1233481837.54752 hm3
  at 1e9: expected a volume above 0, at most 1000000 hm3; million cubic metres; a thousand acre-feet are 1.23348 hm3

reservoir.capacity_thousand_acre_feet: capacity_thousand_acre_feet beside capacity_hm3
  at 4: expected one of the two; take one of them out

reservoir.capacity_hm3: no 'capacity_hm3'
  at reservoir: expected a volume; add capacity_hm3 = ..., what it holds when full; or capacity_thousand_acre_feet
'reservoir.capacity_hm4', which is not a key of a scenario
  at capacity_hm4: expected 'capacity_hm3'?; write 'capacity_hm3', or take the key out

reservoir.dead_storage_hm3: a list
  at [5]: expected a number; write a number alone, without quotes and unit: dead_storage_hm3 = ...

reservoir.dead_storage_hm3: -5
  at -5: expected a number from 0 to 40 hm3, the capacity; what lies below the outlets

reservoir.dead_storage_hm3: 40
  at 40: expected less than the capacity; a reservoir without water above its outlets can release none

reservoir.dead_storage_thousand_acre_feet: 50, which is 61.67409 hm3
  at 50: expected a number from 0 to 40 hm3, the capacity; what lies below the outlets

reservoir.dead_storage_thousand_acre_feet: dead_storage_thousand_acre_feet beside dead_storage_hm3
  at 4: expected one of the two; take one of them out

reservoir.starting_storage_hm3: no 'starting_storage_hm3'
  at reservoir: expected a volume; add starting_storage_hm3 = ..., what each realization begins with; or starting_storage_thousand_acre_feet

reservoir.starting_storage_hm3: true
  at true: expected a number; write a number alone, without quotes and unit: starting_storage_hm3 = ...

reservoir.starting_storage_hm3: 41
  at 41: expected a number from 0 to 40 hm3, the capacity; what a realization begins with

reservoir.starting_storage_thousand_acre_feet: 33, which is 40.70490 hm3
  at 33: expected a number from 0 to 40 hm3, the capacity; what a realization begins with

reservoir.starting_storage_thousand_acre_feet: starting_storage_thousand_acre_feet beside starting_storage_hm3
  at 4: expected one of the two; take one of them out

reservoir.storage_dates: the text "04-01"
  at "04-01": expected a list of texts in quotes; write storage_dates = ["..."]

reservoir.storage_dates[0]: "02-29"
  at "02-29": expected a day that every year has, as "MM-DD"; write 1 April as "04-01"

reservoir.storage_dates[1]: 04-01 twice
  at "04-01": expected each day once; take one of the two out

reservoir.full_share: 98
  at 98: expected a number from 0.5 to 1; a share of the capacity

'reservoir.spillway', which is not a key of a scenario
  at spillway: expected one of: name, capacity_hm3, capacity_thousand_acre_feet, dead_storage_hm3, dead_storage_thousand_acre_feet, starting_storage_hm3, starting_storage_thousand_acre_feet, release_capacity_m3_per_s, release_capacity_cfs, release_capacity_hm3_per_day, minimum_release_m3_per_s, minimum_release_cfs, minimum_release_hm3_per_day, release_target_hm3_per_month, release_target_thousand_acre_feet_per_month, release_target_m3_per_s, release_target_cfs, demand_hm3_per_month, demand_thousand_acre_feet_per_month, demand_m3_per_s, demand_cfs, evaporation_hm3_per_month, evaporation_thousand_acre_feet_per_month, flood_space, full_share, storage_dates, changes; take it out, or check its table
"##);
}

#[test]
fn slips_in_what_it_must_give() {
    let said = slips(&[
        ("release_capacity_m3_per_s = 20\n", ""),
        ("release_capacity_m3_per_s = 20", "release_capacity_m3_per_s = 0"),
        ("release_capacity_m3_per_s = 20", "release_capacity_cfs = -5"),
        ("release_capacity_m3_per_s = 20", "release_capacity_m3_per_s = [1, 2]"),
        ("release_capacity_m3_per_s = 20", "release_capacity_m3_per_s = 20\nrelease_capacity_cfs = 700"),
        ("release_capacity_m3_per_s = 20", "release_capacity_m3_per_s = \"20 m3/s\""),
        ("release_capacity_m3_per_s = 20", "release_capacity_hm3_per_day = 0.001"),
        ("minimum_release_m3_per_s = 0.2", "minimum_release_m3_per_s = -1"),
        ("minimum_release_m3_per_s = 0.2", "minimum_release_cfs = [0, 0, 0, 0, 0, -3, 0, 0, 0, 0, 0, 0]"),
        ("minimum_release_m3_per_s = 0.2", "minimum_release_cfs = 1000"),
        (
            "minimum_release_m3_per_s = 0.2",
            "minimum_release_m3_per_s = [1, 1, 1, 1, 30, 1, 1, 1, 1, 1, 1, 1]",
        ),
        (
            "minimum_release_m3_per_s = 0.2",
            "minimum_release_m3_per_s = 0.2\nminimum_release_hm3_per_day = 0.1",
        ),
        ("minimum_release_m3_per_s = 0.2", "minimum_release_m3_per_s = false"),
        ("minimum_release_m3_per_s = 0.2", "minimum_relase_m3_per_s = 0.2"),
        (
            "demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]",
            "demand_hm3_per_month = [1, 1, 1, 2, 5, -7, 8, 7, 4, 2, 1, 1]",
        ),
        ("demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]", "demand_cfs = -1"),
        ("demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]", "demand_m3_per_s = \"a lot\""),
        ("demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]", "demand_hm3_per_month = [1, 2, 3]"),
        (
            "demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]",
            "demand_m3_per_s = 1\ndemand_cfs = 100",
        ),
        (
            "demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]",
            "demand_cfs = 100\nrelease_target_cfs = 100",
        ),
        ("demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]", "demand_hm3 = 12"),
        (
            "demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]",
            "release_target_thousand_acre_feet_per_month = -2",
        ),
        (
            "demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]",
            "release_target_m3_per_s = 1\nrelease_target_cfs = 35",
        ),
        ("evaporation_hm3_per_month = 0.1", "evaporation_hm3_per_month = -0.1"),
        ("evaporation_hm3_per_month = 0.1", "evaporation_thousand_acre_feet_per_month = [0.1]"),
        ("evaporation_hm3_per_month = 0.1", "evaporation_mm_per_month = 90"),
        (
            "evaporation_hm3_per_month = 0.1",
            "evaporation_hm3_per_month = 0.1\nevaporation_thousand_acre_feet_per_month = 0.1",
        ),
    ]);
    insta::assert_snapshot!(said, @r##"
reservoir.release_capacity_m3_per_s: no 'release_capacity_m3_per_s'
  at reservoir: expected a flow; add release_capacity_m3_per_s = ..., what all outlets and turbines pass together; or release_capacity_cfs or release_capacity_hm3_per_day

reservoir.release_capacity_m3_per_s: 0
  at 0: expected more than 0; what all outlets and turbines pass together

reservoir.release_capacity_cfs: -5
  at -5: expected more than 0; what all outlets and turbines pass together

reservoir.release_capacity_m3_per_s: a list
  at [1, 2]: expected a number; write a number alone, without quotes and unit: release_capacity_m3_per_s = ...

reservoir.release_capacity_cfs: release_capacity_cfs beside release_capacity_m3_per_s
  at 700: expected one of the two; take one of them out

reservoir.release_capacity_m3_per_s: the text "20 m3/s"
  at "20 m3/s": expected a number; write a number alone, without quotes and unit: release_capacity_m3_per_s = ...

reservoir.minimum_release_m3_per_s: 0.2, which is 0.01728 hm3 a day
  at 0.2: expected at most what the outlets pass, 0.00100 hm3 a day; correct one of the two; mind their units

reservoir.minimum_release_m3_per_s: -1
  at -1: expected 0 or more in every month; 0 where there is none

reservoir.minimum_release_cfs[5]: -3
  at -3: expected 0 or more in every month; 0 where there is none

reservoir.minimum_release_cfs: 1000, which is 2.44658 hm3 a day
  at 1000: expected at most what the outlets pass, 1.72800 hm3 a day; correct one of the two; mind their units

reservoir.minimum_release_m3_per_s[4]: 30, which is 2.59200 hm3 a day
  at 30: expected at most what the outlets pass, 1.72800 hm3 a day; correct one of the two; mind their units

reservoir.minimum_release_hm3_per_day: minimum_release_hm3_per_day beside minimum_release_m3_per_s
  at 0.1: expected one of the two; take one of them out

reservoir.minimum_release_m3_per_s: false
  at false: expected one number, or twelve, January first; write minimum_release_m3_per_s = ..., or twelve numbers in [ ]

'reservoir.minimum_relase_m3_per_s', which is not a key of a scenario
  at minimum_relase_m3_per_s: expected 'minimum_release_m3_per_s'?; write 'minimum_release_m3_per_s', or take the key out

reservoir.demand_hm3_per_month[5]: -7
  at -7: expected 0 or more in every month; 0 where there is none

reservoir.demand_cfs: -1
  at -1: expected 0 or more in every month; 0 where there is none

reservoir.demand_m3_per_s: the text "a lot"
  at "a lot": expected one number, or twelve, January first; write demand_m3_per_s = ..., or twelve numbers in [ ]

reservoir.demand_hm3_per_month: 3 numbers
  at [1, 2, 3]: expected one number, or twelve, January first; give one a month, or one alone

reservoir.demand_cfs: demand_cfs beside demand_m3_per_s
  at 100: expected one of the two; take one of them out

reservoir.release_target_cfs: release_target_cfs beside demand_cfs
  at 100: expected one of the two; a demand comes on top of the minimum release, a release target holds it

'reservoir.demand_hm3', which is not a key of a scenario
  at demand_hm3: expected 'demand_hm3_per_month'?; write 'demand_hm3_per_month', or take the key out

reservoir.release_target_thousand_acre_feet_per_month: -2
  at -2: expected 0 or more in every month; 0 where there is none

reservoir.release_target_cfs: release_target_cfs beside release_target_m3_per_s
  at 35: expected one of the two; take one of them out

reservoir.evaporation_hm3_per_month: -0.1
  at -0.1: expected 0 or more in every month; 0 where there is none

reservoir.evaporation_thousand_acre_feet_per_month: 1 numbers
  at [0.1]: expected one number, or twelve, January first; give one a month, or one alone

'reservoir.evaporation_mm_per_month', which is not a key of a scenario
  at evaporation_mm_per_month: expected 'evaporation_hm3_per_month'?; write 'evaporation_hm3_per_month', or take the key out

reservoir.evaporation_thousand_acre_feet_per_month: evaporation_thousand_acre_feet_per_month beside evaporation_hm3_per_month
  at 0.1: expected one of the two; take one of them out
"##);
}

#[test]
fn slips_in_its_flood_rule() {
    let said = slips(&[
        ("on = \"11-01\"\n", ""),
        ("on = \"11-01\"", "on = \"06-01\""),
        ("on = \"11-01\"", "on = \"11-31\""),
        ("on = \"11-01\"", "on = 11"),
        ("on = \"11-01\"", "day = \"11-01\""),
        ("storage_not_above_hm3 = 30\n", ""),
        ("storage_not_above_hm3 = 30", "storage_not_above_hm3 = 50"),
        ("storage_not_above_hm3 = 30", "storage_not_above_hm3 = 2"),
        ("storage_not_above_hm3 = 30", "storage_not_above_thousand_acre_feet = 50"),
        ("storage_not_above_hm3 = 30", "storage_not_above_hm3 = \"full\""),
        (
            "storage_not_above_hm3 = 30",
            "storage_not_above_hm3 = 30\nstorage_not_above_thousand_acre_feet = 24",
        ),
        ("storage_not_above_hm3 = 30", "storage_not_over_hm3 = 30"),
        (
            "[[reservoir.flood_space]]\non = \"11-01\"\nstorage_not_above_hm3 = 30\n[[reservoir.flood_space]]\non = \"06-01\"\nstorage_not_above_hm3 = 40\n",
            "[reservoir.flood_space]\non = \"11-01\"\nstorage_not_above_hm3 = 30\n",
        ),
    ]);
    insta::assert_snapshot!(said, @r##"
reservoir.flood_space[0].on: no 'on'
  at [[reservoir.flood_space]]: expected a day; add on = "11-15"

reservoir.flood_space[1].on: 1 June a second time
  at "06-01": expected each day once; take one of the two out, or give it another day

reservoir.flood_space[0].on: "11-31"
  at "11-31": expected a day that every year has, as "MM-DD"; write 1 April as "04-01"

reservoir.flood_space[0].on: 11
  at 11: expected a text in quotes; write on = "..."

reservoir.flood_space[0].on: no 'on'
  at [[reservoir.flood_space]]: expected a day; add on = "11-15"
'reservoir.flood_space[0].day', which is not a key of a scenario
  at day: expected one of: on, storage_not_above_hm3, storage_not_above_thousand_acre_feet; take it out, or check its table

reservoir.flood_space[0].storage_not_above_hm3: no 'storage_not_above_hm3'
  at [[reservoir.flood_space]]: expected a volume; add storage_not_above_hm3 = ..., what storage is not to exceed on that day; or storage_not_above_thousand_acre_feet

reservoir.flood_space[0].storage_not_above_hm3: 50
  at 50: expected a number from 5 to 40 hm3, the capacity; a volume between dead storage and capacity

reservoir.flood_space[0].storage_not_above_hm3: 2
  at 2: expected a number from 5 to 40 hm3, the capacity; a volume between dead storage and capacity

reservoir.flood_space[0].storage_not_above_thousand_acre_feet: 50, which is 61.67409 hm3
  at 50: expected a number from 5 to 40 hm3, the capacity; a volume between dead storage and capacity

reservoir.flood_space[0].storage_not_above_hm3: the text "full"
  at "full": expected a number; write a number alone, without quotes and unit: storage_not_above_hm3 = ...

reservoir.flood_space[0].storage_not_above_thousand_acre_feet: storage_not_above_thousand_acre_feet beside storage_not_above_hm3
  at 24: expected one of the two; take one of them out

reservoir.flood_space[0].storage_not_above_hm3: no 'storage_not_above_hm3'
  at [[reservoir.flood_space]]: expected a volume; add storage_not_above_hm3 = ..., what storage is not to exceed on that day; or storage_not_above_thousand_acre_feet
'reservoir.flood_space[0].storage_not_over_hm3', which is not a key of a scenario
  at storage_not_over_hm3: expected 'storage_not_above_hm3'?; write 'storage_not_above_hm3', or take the key out

reservoir.flood_space: a table
  at [reservoir.flood_space]: expected a list of tables 'flood_space'; begin each with a line [[reservoir.flood_space]]
"##);
}

#[test]
fn slips_in_what_is_changed_of_it() {
    let said = slips(&[
        (
            "[[reservoir.flood_space]]\non = \"11-01\"\nstorage_not_above_hm3 = 30\n[[reservoir.flood_space]]\non = \"06-01\"\nstorage_not_above_hm3 = 40\n",
            "",
        ),
        ("[-20, 10]", "-20"),
        ("[-20, 10]", "[-20, -20]"),
        ("[-20, 10]", "[0]"),
        ("[-20, 10]", "[-20.5]"),
        ("[-20, 10]", "[200]"),
        ("[0.5]", "[1]"),
        ("[0.5]", "[-1]"),
        ("[0.5]", "[4]"),
        ("[0.9]", "0.9"),
        ("[0.9]", "[0.9, 0.9]"),
        ("[0.9]", "[true]"),
        ("refill_moved_days", "refil_moved_days"),
        ("demand_times", "demand_factor"),
    ]);
    insta::assert_snapshot!(said, @r##"
reservoir.changes.refill_moved_days: a change of a flood-space rule that is not stated
  at [-20, 10]: expected a rule to change, in [[reservoir.flood_space]]; state the rule, or leave refill_moved_days out
reservoir.changes.flood_space_times: a change of a flood-space rule that is not stated
  at [0.5]: expected a rule to change, in [[reservoir.flood_space]]; state the rule, or leave flood_space_times out

reservoir.changes.refill_moved_days: -20
  at -20: expected a list of numbers; write refill_moved_days = [0, 1, 2]

reservoir.changes.refill_moved_days[1]: -20
  at -20: expected whole days from -180 to 180, each once, and not what the rules are without it; take it out, or write another

reservoir.changes.refill_moved_days[0]: 0
  at 0: expected whole days from -180 to 180, each once, and not what the rules are without it; take it out, or write another

reservoir.changes.refill_moved_days[0]: -20.5
  at -20.5: expected whole days from -180 to 180, each once, and not what the rules are without it; take it out, or write another

reservoir.changes.refill_moved_days[0]: 200
  at 200: expected whole days from -180 to 180, each once, and not what the rules are without it; take it out, or write another

reservoir.changes.flood_space_times[0]: 1
  at 1: expected factors from 0 to 3, each once, and not what the rules are without it; take it out, or write another

reservoir.changes.flood_space_times[0]: -1
  at -1: expected factors from 0 to 3, each once, and not what the rules are without it; take it out, or write another

reservoir.changes.flood_space_times[0]: 4
  at 4: expected factors from 0 to 3, each once, and not what the rules are without it; take it out, or write another

reservoir.changes.demand_times: 0.9
  at 0.9: expected a list of numbers; write demand_times = [0, 1, 2]

reservoir.changes.demand_times[1]: 0.9
  at 0.9: expected factors from 0 to 3, each once, and not what the rules are without it; take it out, or write another

reservoir.changes.demand_times[0]: true
  at true: expected a number; write demand_times as a list of such values, as in the demo scenarios

'reservoir.changes.refil_moved_days', which is not a key of a scenario
  at refil_moved_days: expected 'refill_moved_days'?; write 'refill_moved_days', or take the key out

'reservoir.changes.demand_factor', which is not a key of a scenario
  at demand_factor: expected one of: refill_moved_days, flood_space_times, demand_times; take it out, or check its table
"##);
}

#[test]
fn a_reservoir_needs_inflow() {
    let said = slips(&[
        (
            "[inflow]\nrunoff_fraction = 0.6\nrecession_days = 4\nyear_class_limits_hm3 = [10, 20]\n[inflow.slow]\nshare = 0.3\nrecession_days = 60\n",
            "",
        ),
        ("[inflow]", "[inflows]"),
        ("[reservoir]\n", "[reservoirs]\n"),
    ]);
    insta::assert_snapshot!(said, @r##"
reservoir: a reservoir without [inflow]
  at [reservoir]: expected an [inflow] that says how water input becomes inflow; add a line [inflow], runoff_fraction and recession_days below it

'inflows', which is not a key of a scenario
  at inflows: expected 'inflow'?; write 'inflow', or take the key out
inflow.runoff_fraction: no 'runoff_fraction'
  at inflow: expected a share from 0 to 1, or twelve, January first; add runoff_fraction = 0.7 where seven tenths of the water that reaches the ground run off
inflow.recession_days: no 'recession_days'
  at inflow: expected a number of days; add recession_days = 5: without rain or melt the inflow falls to 1/e in so many

'reservoirs', which is not a key of a scenario
  at reservoirs: expected 'reservoir'?; write 'reservoir', or take the key out
reservoir.name: no 'name'
  at reservoir: expected a name for the reservoir; add name = "Lantern Reservoir"
reservoir.capacity_hm3: no 'capacity_hm3'
  at reservoir: expected a volume; add capacity_hm3 = ..., what it holds when full; or capacity_thousand_acre_feet
reservoir.starting_storage_hm3: no 'starting_storage_hm3'
  at reservoir: expected a volume; add starting_storage_hm3 = ..., what each realization begins with; or starting_storage_thousand_acre_feet
reservoir.release_capacity_m3_per_s: no 'release_capacity_m3_per_s'
  at reservoir: expected a flow; add release_capacity_m3_per_s = ..., what all outlets and turbines pass together; or release_capacity_cfs or release_capacity_hm3_per_day
"##);
}

/// Every number of a document by the path to it.
fn numbers(value: &Value, path: &str, into: &mut Vec<(String, f64)>) {
    match value {
        Value::Number(number) => into.push((path.to_owned(), number.as_f64().unwrap())),
        Value::Array(array) => {
            for (at, value) in array.iter().enumerate() {
                numbers(value, &format!("{path}[{at}]"), into);
            }
        }
        Value::Object(object) => {
            for (key, value) in object {
                numbers(value, &format!("{path}.{key}"), into);
            }
        }
        _ => {}
    }
}

fn findings(operations: &str) -> Vec<(String, f64)> {
    let basin = small();
    basin.append(operations);
    let ended = basin.run("study scenario.toml --quiet --into out");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    let mut all = Vec::new();
    numbers(&summary["findings"]["operations"], "", &mut all);
    all
}

/// By definition a thousand acre-feet are 1.23348183754752 hm3 and a cfs is 0.028316846592 m3/s: typed in either, a reservoir comes to the
/// same numbers, to 1e-9 of each or of 1; ratios of what has hardly changed to its spread may be rounding over rounding, and are left out.
#[test]
fn a_reservoir_in_acre_feet_is_the_same_in_hm3() {
    let in_feet: String = OPERATIONS
        .lines()
        .map(|line| {
            let (unit, other, one) = if line.contains("hm3") {
                ("hm3", "thousand_acre_feet", 1.233_481_837_547_52)
            } else if line.contains("m3_per_s") {
                ("m3_per_s", "cfs", 0.028_316_846_592)
            } else {
                return format!("{line}\n");
            };
            let (key, typed) = line.split_once(" = ").unwrap();
            let convert = |number: &str| (number.parse::<f64>().unwrap() / one).to_string();
            let typed = match typed.strip_prefix('[') {
                Some(list) => {
                    let list = list.trim_end_matches(']').split(", ").map(convert);
                    format!("[{}]", list.collect::<Vec<_>>().join(", "))
                }
                None => convert(typed),
            };
            format!("{} = {typed}\n", key.replace(unit, other))
        })
        .collect();
    assert!(!in_feet.contains("hm3") && !in_feet.contains("m3_per_s") && in_feet.contains("capacity_cfs"));
    let (metric, feet) = (findings(OPERATIONS), findings(&in_feet));
    assert!(metric.len() > 1000 && metric.len() == feet.len());
    for ((path, metric), (other, feet)) in metric.iter().zip(&feet) {
        assert_eq!(path, other);
        let is_ratio = path.contains("signal_to_spread");
        assert!(
            is_ratio || (metric - feet).abs() <= 1e-9 * metric.abs().max(1.0),
            "{path}: {metric} and {feet}"
        );
    }
}
