//! Scenarios with lines taken out and values exchanged: what is not taken is never without a fault.

use thawline::scenario::{Document, read};

/// Every table and key that a study may have, beside what the demo scenarios state.
const EVERYTHING: &str = r#"title = "Everything"
seed = 5

[basin]
latitude_deg = -40
tmin_temperature_gradient_c_per_km = -5.0
tmax_temperature_gradient_c_per_km = [-6, -6, -6, -6, -6, -6, -6, -6, -6, -6, -6, -6]
precipitation_gradient_pct_per_100m = 3
precipitation_gradient_form = "compound"
precipitation_gradient_top_m = 3200
[basin.area_elevation_curve]
file = "curve.csv"
band_thickness_ft = 300
elevation = { column = "Elevation", unit = "ft" }
area_below = { column = "Area", unit = "mi2" }
encoding = "latin-1"

[weather]
file = "weather.csv"
station_elevation_ft = 2000
date = { columns = ["y", "m", "d"], format = "%Y %m %d" }
tmean = { column = "tmean", unit = "degC" }
precipitation = { column = "p", unit = "in", gauge = "accumulating", reading = "start-of-day", reset_tolerance_mm = 50, trace = ["T"] }
dew_point = { column = "td", unit = "degC" }
gauge_multiplier = { rain = 1.0, snow = 1.1 }
separator = ";"
header_line = 12
temperature_gap_days = 5
leave_out_water_years = [1986]
baseline_years = [1991, 2020]
detrend_to = 2005

[[observed_swe]]
name = "Site"
file = "site.csv"
elevation_m = 2290
date = { column = "date" }
swe = { column = "swe_mm", unit = "mm" }
reading = "start-of-day"

[season]
water_year_starts = "04-01"
survey_dates = ["10-01"]
volume_windows = [["10-01", "01-31"]]
outflow_before = ["10-01"]
melt_shares_before = ["10-01"]
arrival_volume_hm3 = 18

[snow]
degree_rule = "mean"
melt_base_c = 1.0
start_bare_each_year = true
degree_day_factor_mm_per_c_day = { lowest = 0.5, highest = 0.5, highest_on = "12-21" }
rain_snow = { rule = "s-curve", half_snow_at_c = 1.0, mixed_range_c = 10.0 }
[snow.radiation]
factor_mm_per_c_day = 2.5
[snow.patchiness]
coefficient_of_variation = 0.4
classes = 10
[snow.cold_content]
daily_share = 0.3
[snow.sublimation]
mm_per_day = 0.3
snowfall_fraction = 0.1
[snow.wet_bulb]

[warming]
reference_c = 0.6
tmin_monthly_shape = [1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1]
level_change_pct_per_1000m = 10
precipitation_change_pct = [0, 2, 4]
wet_day_intensity_pct_per_c = 7
[warming.global]
levels_c = [1.5, 2, 3]
local_per_global = 1.4
already_in_record_global_c = 0.9

[realizations]
generator = "markov-gamma"
wet_day_mm = 0.3
count = 300
years = 30
mean_change_sd_pct = 8.0

[inflow]
runoff_fraction = [0.5, 0.5, 0.6, 0.7, 0.7, 0.7, 0.6, 0.5, 0.5, 0.5, 0.5, 0.5]
recession_days = 4
year_class_limits_thousand_acre_feet = [10, 20]
slow = { share = 0.3, recession_days = 60 }
[inflow.observed]
file = "inflow.csv"
date = { column = "date" }
flow = { column = "inflow", unit = "cfs" }
missing = ["NA"]
fit = true

[reservoir]
name = "Lantern"
capacity_thousand_acre_feet = 40
dead_storage_thousand_acre_feet = 5
starting_storage_thousand_acre_feet = 20
release_capacity_cfs = 700
minimum_release_cfs = 10
release_target_thousand_acre_feet_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]
evaporation_thousand_acre_feet_per_month = 0.1
storage_dates = ["10-01"]
full_share = 0.98
[[reservoir.flood_space]]
on = "05-01"
storage_not_above_thousand_acre_feet = 30
[reservoir.changes]
refill_moved_days = [-20, 10]
flood_space_times = [0.5]
demand_times = [0.9]

[report]
units = "us"
"#;

const VALUES: [&str; 12] =
    ["\"x\"", "\"\"", "-1e9", "1e9", "0", "7.5", "nan", "true", "[]", "[1, 2]", "{}", "{ column = \"c\" }"];

/// Without one of its lines, and with each of its values exchanged for others, a scenario is whole or has a fault.
#[test]
fn what_is_not_taken_has_a_fault() {
    let demo = ["alder-fork", "frostbell-creek", "tamsin-river"].map(|name| {
        let root = std::path::Path::new(env!("CARGO_MANIFEST_DIR"));
        std::fs::read_to_string(root.join(format!("scenarios/{name}.toml"))).unwrap()
    });
    for sound in demo.iter().map(String::as_str).chain([EVERYTHING]) {
        assert!(is_said(sound) && read(&Document::parse(sound)).complete().is_some());
        for (at, line) in sound.lines().enumerate().filter(|(_, line)| !line.starts_with('#')) {
            let with = |line: &str| {
                let lines = sound.lines().enumerate();
                lines.map(|(other, kept)| format!("{}\n", if other == at { line } else { kept })).collect()
            };
            let mut changed: Vec<String> = vec![with("")];
            if let Some((key, _)) = line.split_once('=') {
                changed.extend(VALUES.iter().map(|value| with(&format!("{key}= {value}"))));
            }
            if let (Some(opens), Some(closes)) = (line.find("{ "), line.rfind(" }")) {
                let (inner, around) = (&line[opens + 2..closes], (&line[..opens + 2], &line[closes..]));
                let parts: Vec<&str> = inner.split(", ").collect();
                for left_out in 0..parts.len() {
                    let kept = parts.iter().enumerate().filter(|(at, _)| *at != left_out);
                    let kept = kept.map(|(_, part)| *part).collect::<Vec<_>>().join(", ");
                    changed.push(with(&format!("{}{kept}{}", around.0, around.1)));
                    let key = parts[left_out].split('=').next().unwrap_or_default();
                    changed.extend(VALUES.iter().map(|value| {
                        let part = format!("{key}= {value}");
                        with(&format!("{}{}{}", around.0, inner.replace(parts[left_out], &part), around.1))
                    }));
                }
            }
            for text in changed {
                assert!(is_said(&text), "line {} of:\n{text}", at + 1);
            }
        }
    }
}

fn is_said(text: &str) -> bool {
    let draft = read(&Document::parse(text));
    draft.complete().is_some() || !draft.faults.is_empty()
}
