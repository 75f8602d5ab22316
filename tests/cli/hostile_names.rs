//! Names in a scenario are anything: nothing that is typed becomes markup, script or formula, and nothing is lost.

use super::basin::Basin;
use serde_json::Value;

/// What a name may hold: markup, quotes, entities, letters from right to left, a formula, 300 characters, and the words that end a script.
pub const NAMES: [&str; 7] = [
    "<script>alert(1)</script>",
    "\"quoted\" & 'quoted' &amp; <b>",
    "\u{5de}\u{5d3}\u{5d5}\u{5df} \u{202e}olleh \u{645}\u{631}\u{62d}\u{628}\u{627}",
    "=HYPERLINK(\"http://example.org\")",
    "@SUM(A1)",
    "--><svg onload=alert(1)>]]>",
    "</script></title></style></svg>{{7*7}}${7*7}%n%s",
];

/// The name of the demo's site.
const SITE: &str = "\"Heron Meadow snow course\"";

/// The demo with all of them as its title, and as the names of a case and of a criterion each.
pub fn scenario(demo: &str) -> String {
    let quoted = |name: &str| serde_json::to_string(name).unwrap().replace('\u{202e}', "\\u202e");
    let long = "Long name ".repeat(30);
    let title = format!("{} {}", NAMES.join(" "), long.trim());
    let (before, rest) = demo.split_once("title = ").unwrap();
    let (_, rest) = rest.split_once('\n').unwrap();
    let mut text = format!("{before}title = {}\n{rest}\n", quoted(&title));
    assert!(text.contains(SITE));
    text = text.replace(SITE, &quoted(&title.chars().take(300).collect::<String>()));
    for (at, name) in NAMES.iter().chain([&long.trim()]).enumerate() {
        text.push_str(&format!(
            "[[findings.cases]]\nname = {0}\nwarming_c = {1}\nprecipitation_change_pct = {1}\n\
             [[findings.criteria]]\nname = {0}\nmedian_swe_at_least_mm = 20{at}\n",
            quoted(name),
            f64::from(at as u32) / 2.0
        ));
    }
    text
}

/// The text of an element of a drawing or page, without its markup.
fn unescaped(text: &str) -> String {
    text.replace("&lt;", "<")
        .replace("&gt;", ">")
        .replace("&quot;", "\"")
        .replace("&#39;", "'")
        .replace("&apos;", "'")
        .replace("&amp;", "&")
}

#[test]
fn names_stay_text() {
    let (basin, demo) = Basin::of_demo("alder-fork", [6, 3]);
    basin.write("mine.toml", &scenario(&demo));
    let ended = basin.run("study mine.toml --quiet --into out");
    assert_eq!(ended.status, 0, "{}", ended.stderr);

    let page = basin.read("out/briefing.html");
    assert_eq!(page.matches("<script").count(), 3, "its own two, and the data of one");
    assert_eq!(page.matches("</script").count(), 3);
    for raw in ["<b>", "onload=alert(1)>]]>", "<svg onload", "</style></svg>{{"] {
        assert!(!page.contains(raw), "{raw}");
    }
    let text = unescaped(&page);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    let changes = basin.read("out/tables/named-changes.csv");
    for name in NAMES {
        assert!(text.contains(name), "{name}");
        assert!(summary["title"].as_str().unwrap().contains(name), "{name}");
        assert!(changes.contains(&name.replace('"', "\"\"")), "{name}");
    }
    // A negative number is a number; a formula stands behind an apostrophe.
    let mut reader = csv::Reader::from_reader(changes.as_bytes());
    for row in reader.records() {
        for cell in &row.unwrap() {
            let starts = cell.starts_with(['=', '+', '-', '@']);
            assert!(!starts || cell.parse::<f64>().is_ok(), "{cell}");
        }
    }
    assert!(changes.contains("'=HYPERLINK") && changes.contains("'@SUM"), "{changes}");
    for figure in std::fs::read_dir(basin.path().join("out/figures")).unwrap() {
        let drawing = std::fs::read_to_string(figure.unwrap().path()).unwrap();
        for raw in ["<script", "<b>", "<svg onload", "]]>"] {
            assert!(!drawing.contains(raw), "{raw}");
        }
    }
}
