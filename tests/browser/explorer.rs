//! The sliders: what they show is what `summary.json` holds, and straight lines between it.

use super::{page_of, probed};
use serde_json::Value;

/// Moves the sliders, and types what no slider reaches; reads what is then shown.
const PROBE: &str = r#"
    const at = (id) => document.getElementById(id);
    const rows = (table) => [...table.tBodies[0].rows].map((row) => [...row.cells].map((cell) => cell.textContent));
    const read = () => ({ said: at("explorer-said").textContent, hash: location.hash, basin: rows(at("explorer-basin")), bands: rows(at("explorer-bands")) });
    const move = (id, value) => { at(id).value = value; at(id).dispatchEvent(new Event("input")); };
    const opened = read();
    const moved = PAIRS.map(([warming, change]) => { move("explorer-warming", warming); move("explorer-precipitation", change); return read(); });
    move("explorer-warming-typed", "40");
    const outside = read();
    at("explorer-reference").click();
    return { opened, moved, outside, reset: read() };
"#;

/// The number that a cell begins with.
fn number(cell: &Value) -> f64 {
    let text = cell.as_str().unwrap().replace('\u{2212}', "-").replace('\u{2009}', "");
    text.split(' ').next().unwrap().parse().unwrap_or_else(|_| panic!("{text}"))
}

fn medians(surface: &Value, warming_c: f64, pct: f64) -> Vec<f64> {
    let nodes = surface["nodes"].as_array().unwrap();
    let is_it = |node: &&Value| {
        node["warming_c"].as_f64() == Some(warming_c)
            && node["precipitation_change_pct"].as_f64() == Some(pct)
    };
    let node = nodes.iter().find(is_it).unwrap();
    let of_bands = node["band_swe_mm"].as_array().unwrap().iter().map(|mm| mm.as_f64().unwrap());
    [node["measures"][0]["median"].as_f64().unwrap()].into_iter().chain(of_bands).collect()
}

/// Identities: a node of the grid is shown as it was run; a pair between four nodes as the mean of the four with their weights,
/// worked out here from `summary.json`. To half of the last digit that is shown.
fn holds(scenario: &str, per_degree: f64, per_mm: f64, half_digit: f64) {
    let Some((browser, basin)) = page_of(scenario, |scenario| scenario) else { return };
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    let surface = &summary["findings"]["surface"];
    // Warming in degC and change in percent; on a node, between two, between four.
    let pairs = [(2.0, -10.0), (3.0, 15.0), (2.5, 4.0), (-2.0, 40.0)];
    let typed: Vec<String> = pairs.iter().map(|(c, pct)| format!("[{}, {pct}]", c * per_degree)).collect();
    let probe = PROBE.replace("PAIRS", &format!("[{}]", typed.join(", ")));
    let found = probed(&browser, &basin, (&probe, ""), 1000);
    for ((warming_c, pct), shown) in pairs.iter().zip(found["moved"].as_array().unwrap()) {
        let (cold, dry) = (libm::floor(*warming_c), 10.0 * libm::floor(pct / 10.0));
        let (warm, wet) = ((cold + 1.0).min(6.0), (dry + 10.0).min(40.0));
        let (to_warm, to_wet) = (warming_c - cold, (pct - dry) / 10.0);
        let corners =
            [(cold, dry), (cold, wet), (warm, dry), (warm, wet)].map(|(c, pct)| medians(surface, c, pct));
        let weights = [
            (1.0 - to_warm) * (1.0 - to_wet),
            (1.0 - to_warm) * to_wet,
            to_warm * (1.0 - to_wet),
            to_warm * to_wet,
        ];
        let expected =
            |at: usize| corners.iter().zip(weights).map(|(of, weight)| weight * of[at]).sum::<f64>() * per_mm;
        let near = |cell: &Value, at: usize| {
            let difference = (number(cell) - expected(at)).abs();
            assert!(
                difference <= half_digit + 1e-9,
                "{scenario} at {warming_c}, {pct}: {cell} for {}",
                expected(at)
            );
        };
        near(&shown["basin"][0][1], 0);
        let bands = shown["bands"].as_array().unwrap();
        for (from_top, band) in bands.iter().enumerate() {
            near(&band[2], bands.len() - from_top);
        }
        let is_node = to_warm == 0.0 && to_wet == 0.0;
        let said = shown["said"].as_str().unwrap();
        assert_eq!(said.contains("run at this very pair"), is_node, "{said}");
        assert!(
            shown["hash"].as_str().unwrap().contains(&format!("precipitation_change_pct={pct}")),
            "{shown}"
        );
    }
    // Of the reservoir, at a node: a share to half of a tenth of a percent, its change in points.
    let names = surface["measures"].as_array().unwrap();
    let at = names.iter().position(|measure| measure["name"] == "reliability_volume_share").unwrap();
    let is_it = |node: &&Value| {
        (node["warming_c"].as_f64(), node["precipitation_change_pct"].as_f64()) == (Some(2.0), Some(-10.0))
    };
    let node = surface["nodes"].as_array().unwrap().iter().find(is_it).unwrap();
    let share = node["measures"][at]["median"].as_f64().unwrap();
    let shown = found["moved"][0]["basin"].as_array().unwrap();
    let row = shown.iter().find(|row| row[0] == "Reliability by volume").unwrap();
    assert!((number(&row[1]) - 100.0 * share).abs() <= 0.05 + 1e-9, "{row} for {share}");
    assert!(row[2].as_str().unwrap().ends_with("points"), "{row}");

    let outside = found["outside"]["said"].as_str().unwrap();
    assert!(outside.starts_with("Nothing was run at +40 °"), "{outside}");
    assert!(found["outside"]["basin"].as_array().unwrap().iter().all(|row| row[1] == "–"), "{found}");
    assert_eq!(number(&found["reset"]["basin"][0][2]), 0.0, "nothing changes at the reference");

    // An address leads to its pair; one that is no number leads to the pair that the page opens with.
    let key = if per_degree == 1.0 { "warming_degC" } else { "warming_degF" };
    let at = |address: &str| probed(&browser, &basin, (&probe, address), 1000)["opened"].clone();
    let shared = at(&format!("#{key}={}&precipitation_change_pct=15", 3.0 * per_degree));
    assert_eq!(shared["basin"], found["moved"][1]["basin"]);
    let nonsense = at(&format!("#{key}=<b>&precipitation_change_pct=1"));
    assert_eq!(nonsense["basin"], found["opened"]["basin"]);
}

#[test]
fn sliders_show_what_was_run() {
    holds("alder-fork", 1.0, 1.0, 0.5);
}

/// The same in inches and degF, to half of a tenth of an inch.
#[test]
fn sliders_in_us_units() {
    holds("tamsin-river", 1.8, 1.0 / 25.4, 0.05);
}
