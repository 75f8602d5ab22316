//! Warming together with precipitation: nodes, named changes, criteria, and what is refused of their keys and files.

use super::basin::Basin;
use serde_json::Value;

/// The demo with few realizations and nothing asked beside the headline, and more lines at its end.
fn demo(more: &str) -> Basin {
    let (basin, scenario) = Basin::of_demo("alder-fork", [12, 6]);
    let (few, _) = scenario.split_once("# What is asked beside").unwrap();
    basin.write("mine.toml", &format!("{few}{more}"));
    basin
}

fn exchange(basin: &Basin, from: &str, to: &str) {
    let scenario = basin.read("mine.toml");
    assert!(scenario.contains(from), "{from}");
    basin.write("mine.toml", &scenario.replacen(from, to, 1));
}

const SMALL: &str = "\n[findings.surface]\nwarming_c = [0, 2]\nprecipitation_change_pct = [-20, 0, 20]\n";

fn findings(basin: &Basin, flags: &str) -> Value {
    let ended = basin.run(&format!("study mine.toml --quiet {flags}"));
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    summary["findings"].clone()
}

fn at(nodes: &Value, warming_c: f64, pct: f64) -> &Value {
    let is_it = |node: &&Value| {
        node["warming_c"].as_f64() == Some(warming_c)
            && node["precipitation_change_pct"].as_f64() == Some(pct)
    };
    nodes.as_array().unwrap().iter().find(is_it).unwrap_or_else(|| panic!("no node {warming_c}, {pct}"))
}

/// Identities: a node at a study's level without a change of precipitation is that level of the study, where no change of mean
/// precipitation is assumed; a level that states such a change is the node with that change; and so is a named case.
#[test]
fn nodes_are_the_levels_of_a_study_that_states_them() {
    let case = "\n[[findings.cases]]\nname = \"Wet\"\nwarming_f = 3.6\nprecipitation_change_pct = 20\n";
    let basin = demo(&format!("{SMALL}{case}"));
    exchange(&basin, "mean_change_sd_pct = 8.0", "");
    let plain = findings(&basin, "--into out");
    let median = |found: &Value, level: usize| found["basin"][0]["levels"][level]["periods"]["q50"].clone();
    let surface = &plain["surface"];
    let node = |warming_c, pct| at(&surface["nodes"], warming_c, pct)["measures"][0]["median"].clone();
    assert_eq!(node(0.0, 0.0), median(&plain, 0));
    assert_eq!(node(2.0, 0.0), median(&plain, 2));
    assert_eq!(surface["named"][0]["measures"], at(&surface["nodes"], 2.0, 20.0)["measures"]);
    let of_levels = plain["break_even"]["levels"].as_array().unwrap();
    let of_two = of_levels.iter().find(|level| level["level_c"] == 2.0).unwrap();
    let of_curve = surface["break_even"].as_array().unwrap();
    let curve_at_two = of_curve.iter().find(|point| point["warming_c"] == 2.0).unwrap();
    assert_eq!(curve_at_two["precipitation_change_pct"], of_two["precipitation_change_pct"]);

    exchange(&basin, "[warming]\n", "[warming]\nprecipitation_change_pct = [0, 0, 20, 0, 0]\n");
    let stated = findings(&basin, "--into out");
    let [found, expected] = [median(&stated, 2), node(2.0, 20.0)].map(|median| median.as_f64().unwrap());
    assert!((found - expected).abs() < 1e-9, "{found} for {expected}");
    assert_eq!(stated["surface"]["nodes"], surface["nodes"], "the whole change stands on the axis");
}

/// Identity: a criterion that asks for the reference's own median of single years tips at the reference; half of it later; a
/// volume over the basin's area is the same criterion; and nothing hangs on threads.
#[test]
fn criteria_tip_where_the_medians_say() {
    let basin = demo(SMALL);
    let plain = findings(&basin, "--into out");
    let reference = &plain["basin"][0]["levels"][0]["single_years"]["q50"];
    let median_mm = reference.as_f64().unwrap();
    let area_km2 = {
        let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
        summary["basin"]["area_km2"].as_f64().unwrap()
    };
    let criterion =
        |name: &str, asks: String| format!("\n[[findings.criteria]]\nname = \"{name}\"\n{asks}\n");
    let more = criterion("all", format!("median_swe_at_least_mm = {median_mm}"))
        + &criterion("more", format!("median_swe_at_least_mm = {}", 1.5 * median_mm))
        + &criterion("most", format!("median_swe_at_least_mm = {}", 0.8 * median_mm))
        + &criterion(
            "volume",
            format!("median_volume_at_least_hm3 = {}", 0.8 * median_mm * area_km2 / 1000.0),
        )
        + &criterion("none", "median_swe_at_least_mm = 0".to_owned())
        + &criterion("odds", "low_snow_years_at_most = 0.4".to_owned());
    basin.write("mine.toml", &(basin.read("mine.toml") + &more));
    let found = findings(&basin, "--threads 2 --into out");
    let tips = found["tipping_levels"].as_array().unwrap();
    let from = |at: usize| tips[at]["fails"]["level_c"].as_f64().unwrap();
    assert_eq!((from(0), &tips[0]["holds_at_reference"]), (0.0, &Value::from(true)));
    assert_eq!((from(1), &tips[1]["holds_at_reference"]), (0.0, &Value::from(false)));
    assert!(from(2) > 0.3 && from(2) < 4.0, "{}", from(2));
    assert!((from(2) - from(3)).abs() < 1e-9);
    assert_eq!(tips[4]["fails"]["crossing"], "not_reached");
    assert!(from(5) > 0.0);
    // By hand: linear between the two levels around it, from the values that are told.
    let levels = tips[2]["levels"].as_array().unwrap();
    let fails = levels.iter().position(|level| level["holds"] == false).unwrap();
    let value = |at: usize| levels[at]["value"]["value"].as_f64().unwrap();
    let (before, after, asked) = (value(fails - 1), value(fails), 0.8 * median_mm);
    let expected = (fails - 1) as f64 + (before - asked) / (before - after);
    assert!((from(2) - expected).abs() < 1e-9, "{} for {expected}", from(2));
    let words = basin.read("out/summary.json");
    assert!(
        words.contains("does not hold even at the reference") && words.contains("begins to fail at about")
    );
    let table = basin.read("out/tables/criteria.csv");
    assert_eq!(table.lines().count(), 1 + 6 * levels.len());
    let one = findings(&basin, "--threads 1 --into out --force");
    assert_eq!(one["surface"], found["surface"]);
    assert_eq!(one["tipping_levels"], found["tipping_levels"]);
}

/// Every fault of the keys in one go, each at its key.
#[test]
fn keys_that_cannot_be_are_refused() {
    let more = "\n[findings.surface]\nwarming_c = [2, 1]\nwarming_f = [0, 1]\nprecipitation_change_pct = [0]\n\
                realizations = 1\ngrid = 2\n\n[[findings.cases]]\nname = \"A\"\nwarming_c = 40\n\n[[findings.cases]]\n\
                name = \"A\"\nwarming_c = 1\nprecipitation_change_pct = 0\n\n[[findings.criteria]]\nname = \"B\"\n\n\
                [[findings.criteria]]\nname = \"C\"\nmedian_swe_at_least_mm = 1\nlow_snow_years_at_most = 0.1\n\n\
                [[findings.criteria]]\nname = \"D\"\nlow_snow_years_at_most = 20\n\n[findings.projections]\nfile = \"none.csv\"\n";
    let ended = demo(more).run("check mine.toml");
    assert_eq!(ended.status, 3, "{}", ended.stderr);
    for said in [
        "warming_f beside warming_c",
        "2 to 41 rising numbers",
        "findings.surface.grid",
        "from -10 to 15",
        "no 'precipitation_change_pct'",
        "no other of the list has",
        "nothing that is to hold",
        "median_swe_at_least_mm beside low_snow_years_at_most",
        "0.2 is 1 in 5",
        "none.csv",
    ] {
        assert!(ended.stderr.contains(said), "{said}: {}", ended.stderr);
    }
}

/// A file of projections: laid over, in a table, among the inputs; its faults with line and column.
#[test]
fn projections_are_read_and_laid_over() {
    let more = format!("{SMALL}\n[findings.projections]\nfile = \"projections.csv\"\n");
    let basin = demo(&more);
    basin.write(
        "projections.csv",
        "name,warming_f,precipitation_change_pct\nModel one,3.6,20\n\"Two, <later>\",4.5,-5.5\n",
    );
    let found = findings(&basin, "--into out");
    let named = found["surface"]["named"].as_array().unwrap();
    assert_eq!(named.len(), 2);
    assert_eq!(named[0]["measures"], at(&found["surface"]["nodes"], 2.0, 20.0)["measures"]);
    assert_eq!((&named[1]["name"], &named[1]["warming_c"]), (&"Two, <later>".into(), &2.5.into()));
    let table = basin.read("out/tables/named-changes.csv");
    assert!(
        table.contains("Model one,projection,2,20,")
            && table.contains("\"Two, <later>\",projection,2.5,-5.5,")
    );
    assert!(basin.read("out/run.json").contains("projections.csv"));
    assert!(basin.read("out/briefing.html").contains("Two, &lt;later&gt;"));

    basin.write("projections.csv", "name,warming_c,precipitation_change_pct\nA,x,0\nA,1,900\n,99,1\n");
    let ended = basin.run("check mine.toml");
    assert_eq!(ended.status, 3, "{}", ended.stderr);
    for said in [
        "projections.csv:2:",
        "projections.csv:3:",
        "projections.csv:4:",
        "from -90 to 200",
        "from -10 to 15",
    ] {
        assert!(ended.stderr.contains(said), "{said}: {}", ended.stderr);
    }
    for (text, said) in
        [("name,warming_c,precipitation_change_pct\n", "1 to 200 projections"), ("name\nA\n", "warming_c")]
    {
        basin.write("projections.csv", text);
        let ended = basin.run("check mine.toml");
        assert!(ended.status == 3 && ended.stderr.contains(said), "{said}: {}", ended.stderr);
    }
}

/// What a study says of levels that state a change of precipitation: their break-even comes on top of it, and so does what they
/// tip at; the surface's lines are of warming alone, and say so.
#[test]
fn levels_with_a_stated_change_are_told_apart_from_the_surface() {
    let criterion = "\n[[findings.criteria]]\nname = \"Refill\"\nmedian_swe_at_least_mm = 400\n";
    let basin = demo(&format!("{SMALL}{criterion}"));
    let said = |flags: &str| {
        findings(&basin, &format!("--into out {flags}"));
        let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
        let answer = &summary["answer"];
        let joined = |key: &str| {
            let sentences = answer[key].as_array().unwrap().iter();
            sentences.map(|sentence| sentence.as_str().unwrap()).collect::<Vec<_>>().join(" ")
        };
        let drawing = basin.read("out/figures/response-surface.svg");
        (joined("break_even"), joined("tipping"), drawing)
    };
    let (break_even, tipping, drawing) = said("");
    assert!(
        !break_even.contains("on top of") && !tipping.contains("stated change"),
        "{break_even} {tipping}"
    );
    assert!(!drawing.contains("without the"), "warming is all that the levels do");
    exchange(&basin, "[warming]\n", "[warming]\nprecipitation_change_pct = [0, 5, 5, 5, 5]\n");
    let (break_even, tipping, drawing) = said("--force");
    let summary = basin.read("out/summary.json");
    assert!(
        summary.contains(
            "At the reference, one °C more alone, without the stated change of precipitation, takes"
        )
    );
    assert!(break_even.contains("more precipitation on every wet day on top of its stated change would"));
    assert!(tipping.contains("of warming with its stated change of precipitation"), "{tipping}");
    assert!(drawing.contains("alone, without the stated changes, it takes"));
    assert!(drawing.contains("fails below it (without the levels"));
}

/// By hand: where the reference is not 0 degC, what 20 % more precipitation makes up for is counted from it.
#[test]
fn what_is_made_up_for_is_counted_from_the_reference() {
    let basin =
        demo("\n[findings.surface]\nwarming_c = [0, 1, 2, 3]\nprecipitation_change_pct = [-20, 0, 20, 40]\n");
    let scenario = basin.read("mine.toml");
    let line = scenario.lines().find(|line| line.starts_with("levels_c")).unwrap().to_owned();
    exchange(&basin, &line, "levels_c = [0, 1, 2, 3]\nreference_c = 1");
    let found = findings(&basin, "--into out");
    let level_c = found["surface"]["offset"]["warming"]["level_c"].as_f64().unwrap();
    assert!(level_c > 1.0);
    let page = basin.read("out/briefing.html");
    assert!(page.contains(&format!("makes up for about +{:.1} °C of warming", level_c - 1.0)), "{level_c}");
}

/// What is asked of the surface is answered also where no level of the study is warmer than the reference.
#[test]
fn a_surface_needs_no_warmer_level() {
    let case = "\n[[findings.cases]]\nname = \"Hot\"\nwarming_c = 2\nprecipitation_change_pct = 0\n";
    let basin = demo(&format!("{SMALL}{case}"));
    let warm = findings(&basin, "--into out");
    let scenario = basin.read("mine.toml");
    let line = scenario.lines().find(|line| line.starts_with("levels_c")).unwrap().to_owned();
    exchange(&basin, &line, "levels_c = [0]");
    let alone = findings(&basin, "--into out --force");
    assert_eq!(alone["surface"]["nodes"], warm["surface"]["nodes"]);
    assert_eq!(alone["surface"]["named"], warm["surface"]["named"]);
    assert!(basin.read("out/briefing.html").contains("Changes with a name"));
}

/// A surface that no machine would hold is refused before anything runs: 41 x 41 nodes of 100 000 realizations of 6 years.
#[test]
fn a_surface_that_is_too_large_is_refused() {
    let steps = |from: i32, step: i32| {
        (0..41).map(|at| (from + step * at).to_string()).collect::<Vec<_>>().join(", ")
    };
    let more = format!(
        "\n[findings.surface]\nwarming_f = [{}]\nprecipitation_change_pct = [{}]\nrealizations = 100000\n",
        steps(-14, 1),
        steps(-40, 2)
    );
    let basin = demo(&more);
    exchange(&basin, "count = 12\n", "count = 100000\n");
    exchange(&basin, "years = 6\n", "years = 1\n");
    let ended = basin.run("study mine.toml --quiet --into out");
    assert_eq!(ended.status, 3, "{}", ended.stderr);
    for said in ["findings.surface.realizations", "at most 4 GB", "run fewer realizations of it"] {
        assert!(ended.stderr.contains(said), "{said}: {}", ended.stderr);
    }
}

/// A limit of low-snow years below what the reference has by definition cannot hold: said before anything runs, and counted against the
/// user's own quantile.
#[test]
fn a_criterion_on_low_snow_years_goes_by_the_stated_quantile() {
    let more = "\n[findings.low_snow]\nbelow_quantile = 0.4\n\n[[findings.criteria]]\nname = \"Odds\"\nlow_snow_years_at_most = 0.3\n";
    let basin = demo(&format!("{SMALL}{more}"));
    let ended = basin.run("check mine.toml");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let told = ended.stdout.clone() + &ended.stderr;
    assert!(told.contains("it does not hold even there"), "{told}");
    let found = findings(&basin, "--into out");
    let tips = &found["tipping_levels"][0];
    assert_eq!(tips["holds_at_reference"], false);
    // An identity: the odds' own share at the reference.
    let odds = &found["by_year"]["low_snow"]["levels"][0]["chance"]["value"];
    assert_eq!(&tips["levels"][0]["value"]["value"], odds);
    assert!((odds.as_f64().unwrap() - 0.4).abs() < 0.02, "{odds}");
}

/// Twenty percent more precipitation made up for 2.7 to 3.5 degC of peak storage in a cold basin, and for less farther south (Rasouli
/// et al., preprint): of ours, of another basin and of 1 April, no more than the order of it and the direction are asked.
#[test]
fn precipitation_makes_up_for_more_warming_where_winters_are_cold() {
    let offset = |name: &str| {
        let (basin, few) = Basin::of_demo(name, [24, 10]);
        let grid = "\n[findings.surface]\nwarming_c = [0, 1, 2, 3, 4, 5, 6, 8, 10]\nprecipitation_change_pct = [-20, 0, 20, 40]\n";
        basin.write("mine.toml", &(few + grid));
        findings(&basin, "--into out")["surface"]["offset"]["warming"]["level_c"].as_f64().unwrap()
    };
    let (cold, warm) = (offset("frostbell-creek"), offset("alder-fork"));
    assert!((1.0..10.0).contains(&cold), "{cold}");
    assert!(warm < cold, "{warm} against {cold}");
}

/// A grid too coarse for its straight lines still has every break-even inside its own range, and the warming that an increase makes up
/// for where finer warmings put it: to a twentieth of a degree, a hundredth of what the chord over 4 degC misses.
#[test]
fn a_coarse_grid_tells_the_same() {
    let surface = |grid: &str| {
        let basin = demo(&format!("\n[findings.surface]\n{grid}\n"));
        exchange(&basin, "count = 12\n", "count = 60\n");
        findings(&basin, "--into out")["surface"].clone()
    };
    let coarse = surface("warming_c = [0, 4]\nprecipitation_change_pct = [-50, 0, 100]");
    let fine = surface("warming_c = [0, 0.5, 1, 1.5, 2, 4]\nprecipitation_change_pct = [-20, 0, 100]");
    let curve = coarse["break_even"].as_array().unwrap();
    let point = curve.last().unwrap();
    let value = point["precipitation_change_pct"].as_f64().unwrap();
    let [low, high] = [0, 1].map(|end| point["range_pct"][end].as_f64().unwrap());
    assert!(low < value && value < high, "{point}");
    let [coarse_c, fine_c] = [&coarse, &fine].map(|of| of["offset"]["warming"]["level_c"].as_f64().unwrap());
    assert!((coarse_c - fine_c).abs() < 0.05, "{coarse_c} and {fine_c}");
    let range = &coarse["offset"]["range"];
    assert!(range["q05_c"].as_f64().unwrap() < coarse_c && range["q95_c"].as_f64().unwrap() > coarse_c);
}
