//! The options of the snow, as a user turns them on: what the daily table shows of each, and what cannot be.

use super::basin::{Basin, weather};
use serde_json::Value;

fn with(snow: &str) -> Basin {
    let basin = Basin::new();
    basin.append(&format!("\n{snow}\n"));
    basin
}

/// A column of the daily table for one band, or the basin.
fn column(basin: &Basin, band: &str, name: &str) -> Vec<f64> {
    let ended = basin.run("daily scenario.toml --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let mut lines = ended.stdout.lines();
    let header: Vec<&str> = lines.next().unwrap().split(',').collect();
    let at = header.iter().position(|column| *column == name);
    let at = at.unwrap_or_else(|| panic!("no column {name} in {header:?}"));
    let rows = lines.map(|line| line.split(',').collect::<Vec<_>>()).filter(|cells| cells[1] == band);
    rows.map(|cells| cells[at].parse().unwrap_or(f64::NAN)).collect()
}

fn header(basin: &Basin) -> String {
    let ended = basin.run("daily scenario.toml --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    ended.stdout.lines().next().unwrap().to_owned()
}

const PLAIN: &str = "date,band,tmean_c,rain_mm,snow_mm,melt_mm,refreeze_mm,outflow_mm,bare_ground_rain_mm,ice_mm,liquid_mm,swe_mm";

/// Without options the daily table has its columns and no other, whatever the snow's other keys are.
#[test]
fn without_options_nothing_is_added() {
    assert_eq!(header(&Basin::new()), PLAIN);
    assert_eq!(header(&with("[snow]\nstart_bare_each_year = false")), PLAIN);
    assert_eq!(header(&with("[snow]\nrain_snow = { rule = \"s-curve\" }")), PLAIN);
}

/// A band of uneven snow is covered in part while it melts, and its snowfall stays what it was.
#[test]
fn patchy_snow_uncovers_the_ground_little_by_little() {
    let patchy = with("[snow.patchiness]\ncoefficient_of_variation = 0.5");
    assert_eq!(header(&patchy), format!("{PLAIN},covered_share"));
    let covered = column(&patchy, "1", "covered_share");
    let partly = covered.iter().filter(|share| **share > 0.0 && **share < 1.0).count();
    assert!(partly > 10, "{partly} days partly covered");
    assert!(covered.iter().all(|share| (share * 10.0 - (share * 10.0).round()).abs() < 1e-12), "tenths");
    for place in ["1", "2", "basin"] {
        let covered = column(&patchy, place, "covered_share");
        let full = covered.iter().copied().fold(0.0, f64::max);
        assert_eq!(full, 1.0, "{place}: full cover is 1 to the bit");
        assert!(covered.iter().all(|share| *share == 1.0 || *share < 0.99), "{place}");
    }
    let sum = |basin: &Basin, name: &str| column(basin, "1", name).iter().sum::<f64>();
    let (plain, uneven) = (sum(&Basin::new(), "snow_mm"), sum(&patchy, "snow_mm"));
    assert!((plain - uneven).abs() < 1e-9 * plain, "{plain} and {uneven} mm of snow");
    let even = with("[snow.patchiness]\ncoefficient_of_variation = 0");
    let table = |basin: &Basin| basin.run("daily scenario.toml --quiet").stdout;
    assert_eq!(table(&even), table(&Basin::new()), "a variation of 0 is none, to the byte");
}

/// A band's own variation, and the notice where no option uses it.
#[test]
fn a_band_states_a_variation_of_its_own() {
    let patchy = with("[snow.patchiness]\ncoefficient_of_variation = 0\nclasses = 4");
    patchy.write("bands.csv", "lower_m,upper_m,area_km2,accumulation_cv\n1900,2200,40,0.6\n2200,2500,25,\n");
    let partly =
        |band: &str| column(&patchy, band, "covered_share").iter().any(|share| *share > 0.0 && *share < 1.0);
    assert!(partly("1") && !partly("2"));
    let unused = Basin::new();
    unused.write("bands.csv", "lower_m,upper_m,area_km2,accumulation_cv\n1900,2200,40,0.6\n2200,2500,25,\n");
    let said = unused.run("check scenario.toml").stdout;
    assert!(said.contains("accumulation_cv is used only with [snow.patchiness]"), "{said}");
}

/// Snow that the air takes stands in the daily table, the tables of a study and its ledger: what fell is what left and stays.
#[test]
fn sublimation_is_told() {
    let basin = with("[snow.sublimation]\nmm_per_day = 0.5\nsnowfall_fraction = 0.1");
    assert_eq!(header(&basin), format!("{PLAIN},sublimation_mm"));
    let lost = column(&basin, "basin", "sublimation_mm");
    let [rain, snow, outflow, bare, swe] =
        ["rain_mm", "snow_mm", "outflow_mm", "bare_ground_rain_mm", "swe_mm"]
            .map(|name| column(&basin, "basin", name));
    let sum = |values: &[f64]| values.iter().sum::<f64>();
    let open = sum(&rain) + sum(&snow) - sum(&outflow) - sum(&bare) - sum(&lost) - swe.last().unwrap();
    assert!(open.abs() < 1e-6 && sum(&lost) > 50.0, "{open} mm open, {} mm lost", sum(&lost));
    let ended = basin.run("study scenario.toml --into out --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    assert!(basin.read("out/tables/basin-amounts.csv").contains("\nsublimation_mm,"));
    assert!(basin.read("out/briefing.html").contains("<dt>Sublimation</dt>"));
    assert!(!basin.read("out/briefing.html").contains("forest interception, sublimation,"));
    // One number holds in the five months of winter alone, here and in the south, and twelve where they say.
    let months = |text: &str| -> Vec<usize> {
        let document: Value = serde_json::from_str(text).unwrap();
        let monthly = document["snow"]["sublimation"]["mm_per_day"].as_array().unwrap().clone();
        let is_lossy = |month: &Value| month.as_f64().unwrap() > 0.0;
        monthly.iter().enumerate().filter(|(_, month)| is_lossy(month)).map(|(month, _)| month + 1).collect()
    };
    assert_eq!(months(&basin.run("check scenario.toml --json").stdout), [1, 2, 3, 11, 12]);
    basin.exchange("latitude_deg = 40", "latitude_deg = -40");
    assert_eq!(months(&basin.run("check scenario.toml --json").stdout), [5, 6, 7, 8, 9]);
    let summer = with("[snow.sublimation]\nmm_per_day = [0,0,0,0,0,0,0,0,0,0,0,9]");
    let daily = summer.run("daily scenario.toml --quiet").stdout;
    let in_december = |line: &str| line.split('-').nth(1) == Some("12");
    let lost = |line: &&str| {
        line.split(',').next_back().and_then(|cell| cell.parse::<f64>().ok()).unwrap_or(0.0) > 0.0
    };
    assert!(daily.lines().skip(1).filter(lost).all(in_december));
    assert!(daily.lines().skip(1).any(|line| lost(&line)));
}

/// A cold pack keeps water that a plain one lets go, and says how cold it is.
#[test]
fn cold_content_is_told() {
    let basin = with("[snow.cold_content]");
    let cold = column(&basin, "2", "cold_content_mm");
    let swe = column(&basin, "2", "swe_mm");
    assert!(cold.iter().copied().fold(0.0, f64::max) > 1.0);
    assert!(cold.iter().zip(&swe).all(|(cold, swe)| *cold == 0.0 || *swe > 0.0), "no cold without snow");
    let said = basin.run("check scenario.toml").stdout;
    assert!(
        said.contains("snow.cold_content.daily_share = 0.3")
            && said.contains("snow.refreeze_fraction = 0.05, with [snow.cold_content]"),
        "{said}"
    );
    assert!(
        said.contains("snow.start_bare_each_year = false\n") && said.contains("snow.melt_base_c = 1\n"),
        "{said}"
    );
    let document = basin.run("check scenario.toml --json").stdout;
    let document: Value = serde_json::from_str(&document).unwrap();
    let defaults = document["defaults_in_force"].as_array().unwrap();
    let of = |key: &str| defaults.iter().find(|default| default["key"] == key).unwrap();
    assert_eq!(of("snow.refreeze_fraction")["with"], "[snow.cold_content]");
    assert!(of("snow.melt_base_c").get("with").is_none());
}

/// A south slope melts more than a north slope; trees melt less; the factor of each day stands in the daily table.
#[test]
fn slopes_and_trees_melt_by_their_factor() {
    let basin = with("[snow.radiation]\nfactor_mm_per_c_day = 3.0");
    basin.write(
        "bands.csv",
        "lower_m,upper_m,area_km2,slope_deg,aspect_deg,canopy_fraction\n\
         1900,2200,20,30,180,0\n1900,2200,10,30,0,0\n1900,2200,10,30,0,1\n2200,2500,25,0,,0\n",
    );
    let [south, north, woods] = ["1", "2", "3"].map(|band| column(&basin, band, "melt_factor_mm_per_c_day"));
    for ((south, north), woods) in south.iter().zip(&north).zip(&woods) {
        assert!(*north >= 0.25 && *south <= 0.25 + 3.0 * 1.1);
        assert!((woods - north * (1.0 - 1.6 / 3.51)).abs() < 1e-12, "{woods} of {north}");
    }
    assert!(south.iter().sum::<f64>() > 1.3 * north.iter().sum::<f64>());
    let unused = Basin::new();
    unused.write(
        "bands.csv",
        "lower_m,upper_m,area_km2,slope_deg,aspect_deg\n1900,2200,20,30,180\n2200,2500,25,0,\n",
    );
    let said = unused.run("check scenario.toml").stdout;
    assert!(said.contains("slopes and aspects are used only with [snow.radiation]"), "{said}");
}

/// Dry air makes snow of what humid air makes rain of; and a wet bulb asks for humidity, and for a generator that keeps it.
#[test]
fn the_wet_bulb_tells_rain_from_snow() {
    let sound = weather(3);
    let (top, rows) = sound.split_once('\n').unwrap();
    let record = |pct: u32| {
        let rows: String = rows.lines().map(|row| format!("{row},{pct}\n")).collect();
        format!("{top},rh\n{rows}")
    };
    let basin = with("[snow.wet_bulb]");
    let ended = basin.run("daily scenario.toml");
    assert_eq!(ended.status, 3);
    assert!(ended.stderr.contains("a wet bulb asked of a record without humidity"), "{}", ended.stderr);
    let precipitation = "precipitation = { column = \"precip_mm\", unit = \"mm\" }\n";
    basin.exchange(precipitation, &format!("{precipitation}relative_humidity = {{ column = \"rh\" }}\n"));
    let snow = |pct: u32| {
        basin.write("weather.csv", &record(pct));
        assert_eq!(header(&basin), format!("{PLAIN},wet_bulb_c"));
        column(&basin, "1", "snow_mm").iter().sum::<f64>()
    };
    let (dry, humid) = (snow(40), snow(100));
    assert!(dry > 1.1 * humid, "{dry} mm of snow in dry air, {humid} in humid");
    let [wet_bulb, mean] = ["wet_bulb_c", "tmean_c"].map(|name| column(&basin, "1", name));
    let rainy = wet_bulb.iter().zip(&mean).filter(|(wet_bulb, _)| !wet_bulb.is_nan());
    assert!(rainy.clone().count() > 50);
    assert!(rainy.into_iter().all(|(wet_bulb, mean)| wet_bulb == mean), "saturated air is its own wet bulb");
    basin.exchange("count = 12", "count = 12\ngenerator = \"markov-gamma\"");
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    assert!(ended.stderr.contains("which makes no humidity, beside [snow.wet_bulb]"), "{}", ended.stderr);
}

/// A basin so cold that its snow never goes: named on the page and in `check`; starting bare ends it.
#[test]
fn snow_that_never_goes_is_named_and_can_be_left_behind() {
    let carried = |more: &str| {
        let basin = with(&format!(
            "[snow]\ndegree_day_factor_mm_per_c_day = {{ lowest = 0, highest = 0.05 }}\n{more}"
        ));
        let swe = column(&basin, "2", "swe_mm");
        let page = {
            let ended = basin.run("study scenario.toml --into out --quiet");
            assert_eq!(ended.status, 0, "{}", ended.stderr);
            basin.read("out/briefing.html")
        };
        let check = basin.run("check scenario.toml").stdout;
        assert!(check.contains("snow that never went"), "{check}");
        let says_so = check
            .split_whitespace()
            .collect::<Vec<_>>()
            .join(" ")
            .contains("it is carried into the next year and piles up");
        assert_eq!(says_so, more.is_empty(), "{check}");
        assert!(page.contains("Snow that lasts through the water year's end at the reference: band "));
        (swe, page)
    };
    let (kept, page) = carried("");
    assert!(page.contains("It is carried into the next year"));
    let piles_up = "the snow never goes from 2 bands with 100 % of the basin's area";
    assert!(page.contains(piles_up) && page.contains("with snow.start_bare_each_year = true"));
    let (bare, page) = carried("start_bare_each_year = true");
    assert!(page.contains("Every water year begins bare all the same"));
    assert!(!page.contains(piles_up), "what is taken away does not pile up");
    assert!(kept[366] > bare[366] && kept[..300] == bare[..300], "the first year alone is the same");
}

/// The snow that is taken away stands in the tables and on the page, and closes the year's water: what fell is what reached the
/// ground and what was taken away. One year, so that a median is the year itself.
#[test]
fn snow_taken_away_closes_the_years_water() {
    let cold = "degree_day_factor_mm_per_c_day = { lowest = 0, highest = 0.05 }";
    let basin = with(&format!("[snow]\n{cold}\nstart_bare_each_year = true"));
    basin.exchange("count = 12\nyears = 5", "count = 1\nyears = 1");
    basin.append("\n[season]\nsurvey_dates = [\"04-01\", \"09-30\"]\n");
    // Nothing falls on the year's last day, so that what fell before it is the year's.
    let dry = |row: &str| match (row.contains("-09-30,"), row.rsplit_once(',')) {
        (true, Some((rest, _))) => format!("{rest},0.0\n"),
        _ => format!("{row}\n"),
    };
    basin.write("weather.csv", &weather(3).lines().map(dry).collect::<String>());
    let ended = basin.run("study scenario.toml --into out --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let table = basin.read("out/tables/basin-amounts.csv");
    let header: Vec<&str> = table.lines().next().unwrap().split(',').collect();
    let median = header.iter().position(|column| *column == "q50_mm").unwrap();
    let mm = |measure: &str, level: &str| -> f64 {
        let of_it = format!("{measure},{level},");
        let row =
            table.lines().find(|row| row.starts_with(&of_it)).unwrap_or_else(|| panic!("{of_it} in {table}"));
        row.split(',').nth(median).unwrap().parse().unwrap()
    };
    for level in ["0", "2"] {
        let [input, taken, fallen] =
            ["water_input_year_mm", "snow_taken_away_mm", "precipitation_before_09_30_mm"]
                .map(|name| mm(name, level));
        assert!(
            taken > 10.0 && (fallen - input - taken).abs() < 1e-9 * fallen,
            "{fallen} mm: {input} and {taken}"
        );
    }
    assert!(mm("snow_taken_away_mm", "0") > mm("snow_taken_away_mm", "2"), "less is left when it is warmer");
    let page = basin.read("out/briefing.html");
    assert!(page.contains("snow taken away at the year's end</th>"), "a row of the table by level");
    assert!(page.contains("is no part of water input, and is counted as snow taken away at the year's end"));
    let plain = Basin::new();
    assert_eq!(plain.run("study scenario.toml --into out --quiet").status, 0);
    assert!(!plain.read("out/tables/basin-amounts.csv").contains("snow_taken_away_mm"));
}

/// All faults of the options in one go.
#[test]
fn faults_of_options() {
    let basin = with(
        "[snow]\ndegree_day_factor_mm_per_c_day = { lowest = 1, highest = 3 }\nrefreeze_fractions = 0.1\n\
         [snow.radiation]\nfactor_mm_per_c_day = -1\n[snow.patchiness]\nclasses = 1\n[snow.cold_content]\ndaily_share = 2\n\
         [snow.sublimation]\n[snow.wet_bulb]\npressure = 80",
    );
    let ended = basin.run("check scenario.toml --color never");
    assert_eq!(ended.status, 3);
    let said = ended.stderr.split_whitespace().collect::<Vec<_>>().join(" ");
    for part in [
        "the same as the highest, 3, since radiation brings the season",
        "snow.radiation.factor_mm_per_c_day",
        "no 'coefficient_of_variation'",
        "snow.patchiness.classes",
        "snow.cold_content.daily_share",
        "mm_per_day, snowfall_fraction or both",
        "pressure",
        "refreeze_fraction",
    ] {
        assert!(said.contains(part), "'{part}' is not in: {}", ended.stderr);
    }
}

/// A rule that is only named takes the numbers of the temperature that tells rain from snow, and so changes nothing.
#[test]
fn a_named_rule_has_the_default_of_the_wet_bulb() {
    let humid = |rule: &str| {
        let basin = with(&format!("[snow]\n{rule}\n[snow.wet_bulb]"));
        let lines: Vec<String> = weather(3).lines().map(|line| format!("{line},70")).collect();
        basin.write("weather.csv", &lines.join("\n").replacen("precip_mm,70", "precip_mm,rh_pct", 1));
        basin.exchange(
            "[warming]",
            "relative_humidity = { column = \"rh_pct\", unit = \"pct\" }\n\n[warming]",
        );
        let ended = basin.run("check scenario.toml");
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        (ended.stdout, basin.run("daily scenario.toml --quiet").stdout)
    };
    let (_, unstated) = humid("");
    let (said, named) = humid("rain_snow = { rule = \"linear\" }");
    assert!(unstated == named, "the same to the byte");
    assert!(said.contains("snow.rain_snow.rain_only_above_c = 1.8"), "{said}");
    let (said, _) = humid("rain_snow = { rule = \"step\", half_snow_at_c = 2.0 }");
    assert!(said.contains("of the wet bulb; 0 to 1.6 degC is usual there"), "{said}");
}

/// What the page says of melt, refreezing and the gauge holds with the sun and the wet bulb on.
#[test]
fn the_page_says_what_the_options_make_of_the_rest() {
    let basin = with("[snow.radiation]");
    let ended = basin.run("study scenario.toml --into out --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let page = basin.read("out/briefing.html");
    assert!(page.contains("<dd>0.25 mm per °C and day through the year, for degrees above"), "one factor");
    assert!(page.contains("refreezes at 50 % of the melt rate without the sun"));
    assert!(page.contains("once, at the observed temperature"));
}

/// Patch classes are lanes: so many that they would not fit are refused before they are made.
#[test]
fn too_many_classes_are_refused() {
    let basin = with("[snow.patchiness]\ncoefficient_of_variation = 0.5\nclasses = 100");
    let bands: String = (0..200).map(|band| format!("{},{},1\n", 1900 + 5 * band, 1905 + 5 * band)).collect();
    basin.write("bands.csv", &format!("lower_m,upper_m,area_km2\n{bands}"));
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    assert!(ended.stderr.contains("100 classes of 200 bands at 2 levels: 40000 lanes"), "{}", ended.stderr);
    assert!(ended.stderr.contains("scenario.toml:"), "{}", ended.stderr);
}

/// Variations and trees that can be, and hardly are.
#[test]
fn odd_ground_has_a_second_look() {
    let second_look = |columns: &str, cells: &str| {
        let basin = with("[snow.patchiness]\ncoefficient_of_variation = 0.4");
        let bands =
            format!("lower_m,upper_m,area_km2,{columns}\n1900,2200,40,{cells}\n2200,2500,25,{cells}\n");
        basin.write("bands.csv", &bands);
        basin.run("check scenario.toml").stdout.split_whitespace().collect::<Vec<_>>().join(" ")
    };
    let uneven = second_look("accumulation_cv", "1.5");
    assert!(uneven.contains("accumulation_cv is 1.5 in one of the bands"), "{uneven}");
    let usual = second_look("accumulation_cv", "0.9");
    assert!(!usual.contains("in one of the bands"), "{usual}");
    let trees = second_look("canopy_pct", "0.45");
    assert!(trees.contains("are they fractions in a column of percent?"), "{trees}");
}
