//! Modelled against observed inflow: a row a routing and the years that it is judged on.

use super::cells::{finish, optional, write, yes_or_no};
use crate::calendar::MONTHS;
use crate::fit::{InflowScores, InflowSkill, VolumeScores};
use crate::inflow::Routing;
use crate::units::UnitSystem;
use csv::Writer;

/// The routing in force, and of a fit the routing as stated and what was fitted on half of the years.
pub(super) fn inflow_skill(skill: &InflowSkill, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let mut header = ["routing", "fitted_on", "judged_on", "had_seen_these_years", "years", "days"]
        .map(str::to_owned)
        .to_vec();
    header.extend(
        ["nash_sutcliffe", "kling_gupta", "correlation", "variability_ratio", "mean_ratio", "bias_pct"]
            .map(str::to_owned),
    );
    header.push("skill_above_day_of_year_mean".to_owned());
    header.extend(["window", "window_years", "window_years_left_out"].map(str::to_owned));
    let volume = units.volume().suffix;
    header.extend(["observed", "modelled"].map(|which| format!("window_{which}_mean_{volume}")));
    header.extend(
        [
            "window_correlation",
            "window_mean_absolute_error_pct",
            "window_bias_pct",
            "window_skill_above_other_years_mean",
        ]
        .map(str::to_owned),
    );
    header.extend(MONTHS.map(|month| format!("runoff_fraction_{}_share", month.to_lowercase())));
    header.extend(["recession_days", "slow_share", "slow_recession_days"].map(str::to_owned));
    write(&mut writer, &header);
    const ALL: &str = "all years with readings";
    let mut add = |about: [String; 4], scores: &InflowScores, routing: &Routing| {
        write(&mut writer, &[about.to_vec(), row(scores, units), parameters(routing)].concat());
    };
    let about = |routing: &str, fitted_on: &str, judged_on: &str, seen: Option<bool>| {
        let seen = seen.map_or(String::new(), yes_or_no);
        [routing.to_owned(), fitted_on.to_owned(), judged_on.to_owned(), seen]
    };
    match &skill.fit {
        None => add(about("stated", "", ALL, None), &skill.scores, &skill.routing),
        Some(fit) => {
            add(about("stated", "", ALL, None), &fit.of_stated, &fit.stated);
            add(about("fitted", ALL, ALL, Some(true)), &skill.scores, &skill.routing);
            for half in &fit.halves {
                let own = half.fitted_on.words();
                let others = half.fitted_on.others().map_or("", |others| others.words());
                add(about("fitted", own, own, Some(true)), &half.seen, &half.routing);
                add(about("fitted", own, others, Some(false)), &half.not_seen, &half.routing);
                add(about("stated", "", others, None), &half.of_stated, &fit.stated);
            }
        }
    }
    finish(writer)
}

fn row(scores: &InflowScores, units: UnitSystem) -> Vec<String> {
    let parts = scores.kling_gupta;
    let mut row = vec![
        scores.years.to_string(),
        scores.days.to_string(),
        optional(scores.nash_sutcliffe),
        optional(parts.map(|parts| parts.efficiency)),
        optional(parts.map(|parts| parts.correlation)),
        optional(parts.map(|parts| parts.variability_ratio)),
        optional(parts.map(|parts| parts.mean_ratio)),
        optional(scores.bias_pct),
        optional(scores.skill_above_day_of_year_mean),
    ];
    match &scores.window {
        Some(window) => row.extend(of_window(window, units)),
        None => row.extend(std::iter::repeat_n(String::new(), 9)),
    }
    row
}

fn of_window(window: &VolumeScores, units: UnitSystem) -> [String; 9] {
    let volume = |hm3: Option<f64>| optional(hm3.map(|hm3| units.volume().of(hm3)));
    [
        format!("{} to {}", window.from, window.to),
        window.years.to_string(),
        window.years_left_out.to_string(),
        volume(window.observed_mean_hm3),
        volume(window.modelled_mean_hm3),
        optional(window.correlation),
        optional(window.mean_absolute_error_pct),
        optional(window.bias_pct),
        optional(window.skill_above_other_years_mean),
    ]
}

fn parameters(routing: &Routing) -> Vec<String> {
    let mut row: Vec<String> = routing.runoff_fraction.iter().map(f64::to_string).collect();
    row.push(routing.recession_days.to_string());
    row.push(optional(routing.slow.map(|slow| slow.share)));
    row.push(optional(routing.slow.map(|slow| slow.recession_days)));
    row
}
