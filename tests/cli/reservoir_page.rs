//! What the page says of water and of the reservoir: which parts there are, and what it calls them.

use super::basin::Basin;

/// The heading of the group.
const GROUP: &str = "<h2>From snow to the reservoir</h2>";
/// Headings of its parts: of the water, and of the reservoir.
const OF_WATER: [&str; 3] = ["Water input, routed", "Classes of years", "What the snow foretells"];
const OF_RESERVOIR: [&str; 2] = ["The reservoir", "If its rules were changed"];
const FIGURES_OF_WATER: [&str; 2] = ["inflow-by-month", "seasonal-outlook"];
const FIGURES_OF_RESERVOIR: [&str; 3] =
    ["storage-through-year", "refill-rule-changes", "shortage-against-spill"];

/// The scenario without a table and its sub-tables: what stands between two headings.
fn without(scenario: &str, from: &str, to: &str) -> String {
    let (from, to) = (scenario.find(from).unwrap(), scenario.find(to).unwrap());
    format!("{}{}", &scenario[..from], &scenario[to..])
}

fn page(basin: &Basin, scenario: &str) -> String {
    basin.write("mine.toml", scenario);
    let ended = basin.run("study mine.toml --into out --force");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    basin.read("out/briefing.html")
}

fn has_part(page: &str, title: &str) -> bool {
    page.contains(&format!("<h3>{title}</h3>"))
}

#[test]
fn parts_stand_where_there_is_something_to_say() {
    let (basin, scenario) = Basin::of_demo("alder-fork", [10, 4]);
    let whole = page(&basin, &scenario);
    assert!(whole.contains(GROUP));
    assert!(OF_WATER.iter().chain(&OF_RESERVOIR).all(|title| has_part(&whole, title)));
    let figures = FIGURES_OF_WATER.iter().chain(&FIGURES_OF_RESERVOIR);
    for slug in figures {
        assert!(whole.contains(&format!("id=\"{slug}-title\"")), "{slug}");
    }
    // No inflow was observed in the demo, so that no part is called so, and the routing is not called skilled.
    assert!(!has_part(&whole, "Inflow"));
    let group = whole.split(GROUP).nth(1).unwrap().split("</section>").next().unwrap();
    assert!(!group.to_lowercase().contains("skill"));
    // The caution comes before any number of a part.
    for part in
        group.split("<details class=\"part\"").skip(1).filter(|part| part.contains("id=\"reservoir\""))
    {
        let caution = part.find("Not for flood forecasting").unwrap();
        assert!(caution < part.find("hm³").unwrap());
    }
    assert!(whole.contains("What does it mean for the reservoir?"));

    let water = page(&basin, &without(&scenario, "\n[reservoir]", "\n[report]"));
    assert!(OF_WATER.iter().all(|title| has_part(&water, title)));
    assert!(!OF_RESERVOIR.iter().any(|title| has_part(&water, title)));
    assert!(!water.contains("What does it mean for the reservoir?"));
    for slug in FIGURES_OF_RESERVOIR {
        assert!(!water.contains(&format!("id=\"{slug}-title\"")), "{slug}");
    }

    let snow = page(&basin, &without(&scenario, "\n[inflow]", "\n[report]"));
    assert!(!snow.contains(GROUP));
    assert!(!OF_WATER.iter().chain(&OF_RESERVOIR).any(|title| has_part(&snow, title)));
}

/// Numbers of water are told in the reader's unit: no hm3 is left where acre-feet were asked for.
#[test]
fn the_reservoir_in_us_units() {
    let (basin, scenario) = Basin::of_demo("alder-fork", [10, 4]);
    let us = page(&basin, &scenario.replacen("[report]\n", "[report]\nunits = \"us\"\n", 1));
    let group = us.split(GROUP).nth(1).unwrap().split("</section>").next().unwrap();
    assert!(group.contains("thousand acre-feet") && group.contains("°F"));
    for metric in ["hm³", "°C"] {
        assert!(!group.contains(metric), "{metric}");
    }
}
