//! Links of a page lead somewhere, whatever parts the page has.

use super::basin::Basin;
use std::collections::BTreeSet;

/// Every address that a page names in one attribute.
fn named<'p>(page: &'p str, attribute: &str) -> BTreeSet<&'p str> {
    page.split(attribute).skip(1).map(|rest| rest.split('"').next().unwrap()).collect()
}

/// Studies whose pages lack parts.
#[test]
fn links_lead_somewhere() {
    for (name, from, to) in [
        ("whole", "levels_c", "levels_c"),
        ("one level", "levels_c = [0, 2]", "levels_c = [0]"),
        ("one realization", "count = 12", "count = 1"),
        ("hardly any snow", "levels_c", "levels_c"),
    ] {
        let basin = Basin::new();
        basin.exchange(from, to);
        if name == "hardly any snow" {
            // Every day 30 degC warmer: in July of a warm land.
            let weather = basin.read("weather.csv");
            let mut lines = weather.lines();
            let mut warmer = format!("{}\n", lines.next().unwrap());
            for line in lines {
                let cells: Vec<&str> = line.split(',').collect();
                let day = [1, 2].map(|at| cells[at].parse::<f64>().unwrap() + 30.0);
                warmer.push_str(&format!("{},{},{},{}\n", cells[0], day[0], day[1], cells[3]));
            }
            basin.write("weather.csv", &warmer);
        }
        let ended = basin.run("study scenario.toml --quiet --into out");
        assert_eq!(ended.status, 0, "{name}: {}", ended.stderr);
        let page = basin.read("out/briefing.html");
        let ids = named(&page, " id=\"");
        let links = named(&page, " href=\"");
        assert!(links.len() > 10, "{name}: {links:?}");
        for link in links {
            match link.strip_prefix('#') {
                Some(address) => assert!(ids.contains(address), "{name}: {link}"),
                None => assert!(basin.path().join("out").join(link).is_file(), "{name}: {link}"),
            }
        }
        // The explorer is there with the part that it leads to, or neither is.
        assert_eq!(ids.contains("try-a-change"), ids.contains("together"), "{name}");
        assert_eq!(ids.contains("together"), name != "hardly any snow", "{name}");
    }
}
