//! Bands split by the way they face and by their trees: read, named, and told apart wherever bands are told.

use super::basin::Basin;
use serde_json::Value;

/// The sound basin's lower range in two parts, the other whole, in an order of their own.
const SPLIT: &str = "lower_m,upper_m,area_km2,slope_deg,aspect_deg\n2200,2500,25,0,\n1900,2200,24,25,180\n1900,2200,16,30,0\n";

fn split() -> Basin {
    let basin = Basin::new();
    basin.write("bands.csv", SPLIT);
    basin
}

fn json(text: &str) -> Value {
    serde_json::from_str(text).unwrap()
}

fn study(basin: &Basin) -> Value {
    let ended = basin.run("study scenario.toml --into out --force --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    json(&basin.read("out/summary.json"))
}

/// The basin's every number of a study but for its Monte Carlo draws, which are the same: parts without an option that uses
/// their ground are what they were as a whole, to rounding.
#[test]
fn a_range_in_parts_is_the_range_as_a_whole() {
    let basin = Basin::new();
    let whole = study(&basin);
    basin.write("bands.csv", SPLIT);
    let parts = study(&basin);
    let medians = |summary: &Value| -> Vec<f64> {
        let measures = summary["findings"]["basin"].as_array().unwrap().iter();
        let levels = measures.flat_map(|measure| measure["levels"].as_array().unwrap());
        levels.filter_map(|level| level["periods"]["q50"].as_f64()).collect()
    };
    let (whole_mm, parts_mm) = (medians(&whole), medians(&parts));
    assert!(whole_mm.len() > 20 && whole_mm.len() == parts_mm.len());
    for (a, b) in whole_mm.iter().zip(&parts_mm) {
        assert!((a - b).abs() <= 1e-9 * b.abs().max(1.0), "{a} and {b}; only rounding may part them");
    }
    let of = |summary: &Value, name: &str| summary["basin"]["area_beyond_stations"][name].as_f64().unwrap();
    for share in ["share_below", "share_above"] {
        assert!((of(&whole, share) - of(&parts, share)).abs() < 1e-12, "{share}");
    }
}

/// Parts of a range stand in the file's order, below what lies higher; what they are made of stands beside them.
#[test]
fn parts_are_named_on_the_page_and_in_tables() {
    let basin = split();
    let summary = study(&basin);
    let bands = summary["findings"]["bands"].as_array().unwrap();
    let of = |key: &str| bands.iter().map(|band| band["ground"][key].as_f64()).collect::<Vec<_>>();
    assert_eq!(of("slope_deg"), [Some(25.0), Some(30.0), None], "nothing is said of a plain band's ground");
    assert_eq!(of("aspect_deg"), [Some(180.0), Some(0.0), None]);
    let page = basin.read("out/briefing.html");
    assert!(page.contains("3 bands in 2 ranges of elevation"));
    for ground in ["facing 180°, slope 25°", "facing 0°, slope 30°"] {
        assert!(page.contains(&format!("1900 – 2200<br>{ground}</th>")), "{ground}");
    }
    assert!(
        page.contains("(1900 to 2200 m, facing"),
        "the sentence about elevations names a part of a range"
    );
    let columns = "band,lower_m,upper_m,area_km2,slope_deg,aspect_deg,";
    let amounts = basin.read("out/tables/bands-amounts.csv");
    assert!(amounts.starts_with(columns), "{amounts}");
    assert!(amounts.contains("\n1,1900,2200,24,25,180,") && amounts.contains("\n3,2200,2500,25,0,,"));
    let medians = basin.read("out/tables/medians.csv");
    assert!(medians.starts_with(&format!("survey,{columns}median_mm")), "{medians}");
    assert!(
        medians.contains(",2,1900,2200,16,30,0,") && medians.contains(",basin,1900,2500,65,,,"),
        "{medians}"
    );
    assert!(!basin.read("out/tables/basin-amounts.csv").contains("slope_deg"));
    let plain = Basin::new();
    let summary = study(&plain);
    assert!(summary["findings"]["bands"][0].get("ground").is_none());
    assert!(plain.read("out/tables/bands-amounts.csv").starts_with("band,lower_m,upper_m,area_km2,measure,"));
}

#[test]
fn check_has_the_ground_of_each_band() {
    let basin = Basin::new();
    let table = |basin: &Basin| -> Vec<String> {
        let ended = basin.run("check scenario.toml");
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        let lines = ended.stdout.lines().skip_while(|line| !line.starts_with("  bands "));
        lines.take_while(|line| !line.starts_with("  winter:")).map(str::to_owned).collect()
    };
    basin.write(
        "bands.csv",
        "lower_m,upper_m,area_km2,slope_deg,aspect_deg,canopy_fraction,accumulation_cv\n\
         1900,2200,40,0,,0.45,\n2200,2500,10,25.4,180,0,0.5\n2200,2500,15,25.4,360,0,\n",
    );
    insta::assert_snapshot!(table(&basin).join("\n"), @r"
  bands                      3 in 2 ranges, 1900 to 2500 m, 65.0 km²
  area beyond the stations   79 % above and 21 % below the station at 2000 m; there results hang on the
                             gradients alone
  band       elevation   area  slope  facing  canopy  snow CV  winter mean   freezing   precip.   as snow          seasonal snow
                     m      %      °       °       %                    °C  % of days        mm         %                  years
     3       2200–2500     23     25       0       0        –         −9.0        100       907        50      3 of 3 (44–100 %)
     2       2200–2500     15     25     180       0     0.50         −9.0        100       907        50      3 of 3 (44–100 %)
     1       1900–2200     62      0       –      45        –         −7.2        100       833        45      3 of 3 (44–100 %)
");
    // The same columns under the file's own names; level ground has no use for an aspect.
    basin.write("bands.csv", "von;bis;km2;Neigung;Exp;Wald\n1900;2200;40;0;90;45\n2200;2500;25;25,5;180;0\n");
    basin.exchange(
        "bands = \"bands.csv\"",
        "bands = { file = \"bands.csv\", separator = \";\", decimal = \",\", lower = { column = \"von\", unit = \"m\" }, upper = \
         { column = \"bis\", unit = \"m\" }, area = { column = \"km2\", unit = \"km2\" }, slope = { column = \"Neigung\", unit = \
         \"deg\" }, aspect = { column = \"Exp\" }, canopy = { column = \"Wald\", unit = \"pct\" } }",
    );
    let bands = json(&basin.run("check scenario.toml --json").stdout)["bands"].clone();
    let ground = |band: usize| bands[band]["ground"].clone();
    assert_eq!(
        ground(0),
        serde_json::json!({
            "slope_deg": 0.0, "aspect_deg": 0.0, "canopy_fraction": 0.45, "accumulation_variation": null
        })
    );
    assert_eq!((&ground(1)["slope_deg"], &ground(1)["aspect_deg"]), (&25.5.into(), &180.0.into()));
}

/// What `check` finds worth a second look in a basin with these columns beside the edges and the area, all of them 0.
fn second_looks(columns: &str, more: &str) -> String {
    let basin = Basin::new();
    let zeros = ",0".repeat(columns.split(',').count());
    basin.write(
        "bands.csv",
        &format!("lower_m,upper_m,area_km2,{columns}\n1900,2200,40{zeros}\n2200,2500,25{zeros}\n"),
    );
    basin.append(more);
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let said = ended.stdout.lines().skip_while(|line| !line.starts_with("Worth a second look"));
    said.collect::<Vec<_>>().join(" ").split_whitespace().collect::<Vec<_>>().join(" ")
}

/// A column that is read under another name only is said, with the name that it may have been meant to have; what is read and
/// what is far from any is not.
#[test]
fn ground_columns_that_are_misspelt_have_a_second_look() {
    let near = [
        ("canopy", "canopy_fraction"),
        ("canopy_frac", "canopy_fraction"),
        ("Canopy Cover", "canopy_fraction"),
        ("snow_cv", "accumulation_cv"),
        ("slope", "slope_deg"),
        ("slop_deg", "slope_deg"),
        ("aspect", "aspect_deg"),
    ];
    for (typed, meant) in near {
        let said = second_looks(typed, "");
        assert!(
            said.contains(&format!("'{typed}' of bands.csv is not used; did you mean {meant}?")),
            "{said}"
        );
    }
    for silent in
        ["canopy_pct", "canopy_fraction,canopy_height", "name", "n", "glacier", "degrees", "mean area"]
    {
        let said = second_looks(silent, "");
        assert!(!said.contains("is not used"), "{silent}: {said}");
    }
}

/// Radiation goes with the slope: without one it is told that there is none.
#[test]
fn radiation_without_slopes_has_a_second_look() {
    let level = "snow.radiation: no band slopes, so all ground is taken as level";
    assert!(second_looks("name", "\n[snow.radiation]\n").contains(level));
    let basin = split();
    basin.append("\n[snow.radiation]\n");
    let said = basin.run("check scenario.toml").stdout;
    assert!(said.contains("Worth a second look: ") && !said.contains("no band slopes"), "{said}");
}
