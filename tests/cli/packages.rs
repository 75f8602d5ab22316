//! The tables once more: as a workbook, and told to programs.

use super::basin::Basin;
use serde_json::Value;
use sha2::{Digest, Sha256};
use std::collections::BTreeMap;
use std::io::Read;

/// The demo, small, with all that makes tables.
fn demo() -> Basin {
    let basin = Basin::new();
    assert_eq!(basin.run("start .").status, 0);
    let scenario = basin.read("scenarios/alder-fork.toml").replace("../demo-data", "demo-data");
    let title = "title = \"=1+1 & <Alder>\"";
    let line = scenario.lines().find(|line| line.starts_with("title")).unwrap();
    let scenario = scenario.replacen(line, title, 1);
    let few = scenario.replacen("[realizations]\n", "[realizations]\ncount = 12\nyears = 6\n", 1);
    let more = "\n[findings.surface]\nwarming_c = [0, 2]\nprecipitation_change_pct = [-20, 0, 20]\n\n[findings.rule_panel]\n\n\
                [[findings.cases]]\nname = \"=A1+1\"\nwarming_c = 1\nprecipitation_change_pct = 0\n";
    basin.write("mine.toml", &(few + more));
    let ended = basin.run("study mine.toml --quiet --into out");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    basin
}

/// Header and rows.
type Table = (Vec<String>, Vec<Vec<String>>);

fn tables(basin: &Basin) -> BTreeMap<String, Table> {
    let entries = std::fs::read_dir(basin.path().join("out/tables")).unwrap();
    let read = |entry: std::io::Result<std::fs::DirEntry>| {
        let path = entry.unwrap().path();
        let mut reader = csv::Reader::from_path(&path).unwrap();
        let cells = |record: &csv::StringRecord| record.iter().map(str::to_owned).collect::<Vec<_>>();
        let header = cells(reader.headers().unwrap());
        let rows = reader.records().map(|record| cells(&record.unwrap())).collect();
        (path.file_stem().unwrap().to_str().unwrap().to_owned(), (header, rows))
    };
    entries.map(read).collect()
}

/// Data Package 2: every table and no other, its own digest and size, its columns in order, and cells that are of the type that is told.
#[test]
fn the_package_tells_every_table() {
    let basin = demo();
    let package: Value = serde_json::from_str(&basin.read("out/datapackage.json")).unwrap();
    assert_eq!(package["$schema"], "https://datapackage.org/profiles/2.0/datapackage.json");
    let resources = package["resources"].as_array().unwrap();
    let tables = tables(&basin);
    assert_eq!(resources.len(), tables.len());
    let (mut numbers, mut units) = (0, 0);
    for resource in resources {
        let name = resource["name"].as_str().unwrap();
        let (header, rows) = &tables[name];
        assert!(resource["description"].as_str().unwrap().ends_with('.'), "{name} has no line of its own");
        let bytes = std::fs::read(basin.path().join("out").join(resource["path"].as_str().unwrap())).unwrap();
        let digest: String = Sha256::digest(&bytes).iter().map(|byte| format!("{byte:02x}")).collect();
        assert_eq!(resource["hash"], format!("sha256:{digest}"));
        assert_eq!(resource["bytes"].as_u64(), Some(bytes.len() as u64));
        let fields = resource["schema"]["fields"].as_array().unwrap();
        let names: Vec<&str> = fields.iter().map(|field| field["name"].as_str().unwrap()).collect();
        assert_eq!(&names, header, "{name}");
        for (at, field) in fields.iter().enumerate() {
            let missing = field["missingValues"].as_array().cloned().unwrap_or_else(|| vec!["".into()]);
            let cells =
                rows.iter().map(|row| row[at].as_str()).filter(|cell| !missing.contains(&(*cell).into()));
            for cell in cells {
                let is_it = match field["type"].as_str().unwrap() {
                    "number" => cell.parse::<f64>().is_ok(),
                    "boolean" => field["trueValues"][0] == *cell || field["falseValues"][0] == *cell,
                    "date" => cell.len() == 10,
                    _ => true,
                };
                assert!(is_it, "{name}: {cell:?} in {field}");
            }
            numbers += usize::from(field["type"] == "number");
            units += usize::from(field["unit"].is_string());
        }
    }
    assert!(numbers > 300 && units > 150, "{numbers} columns of numbers, {units} with a unit");
}

/// A workbook has a sheet of its own for every table behind the one that says what they are, its header frozen, its numbers numbers,
/// and nothing that a user named is a formula.
#[test]
fn the_workbook_holds_every_table() {
    let basin = demo();
    let file = std::fs::File::open(basin.path().join("out/tables.xlsx")).unwrap();
    let mut parts = zip::ZipArchive::new(file).unwrap();
    let mut part = |name: &str| {
        let mut text = String::new();
        parts.by_name(name).unwrap_or_else(|_| panic!("{name}")).read_to_string(&mut text).unwrap();
        text
    };
    let book = part("xl/workbook.xml");
    let sheets: Vec<String> =
        book.split("<sheet name=\"").skip(1).map(|rest| rest.split_once('"').unwrap().0.to_owned()).collect();
    let tables = tables(&basin);
    assert_eq!(sheets[0], "About");
    assert_eq!(sheets.len(), 1 + tables.len());
    let strings = part("xl/sharedStrings.xml");
    assert!(
        strings.contains("=A1+1")
            && strings.contains("=1+1 &amp; &lt;Alder&gt;")
            && strings.contains("Not for flood")
    );
    for (at, sheet) in sheets.iter().enumerate().skip(1) {
        let (header, rows) = &tables[sheet];
        let text = part(&format!("xl/worksheets/sheet{}.xml", at + 1));
        assert!(text.contains("<pane ySplit=\"1\"") && text.contains("state=\"frozen\""), "{sheet}");
        assert!(!text.contains("<f>"), "{sheet} has a formula");
        assert_eq!(text.matches("<row ").count(), 1 + rows.len(), "{sheet}");
        // Every number of the table stands in the sheet as a number.
        let is_number =
            |at: usize| rows.iter().all(|row| row[at].is_empty() || row[at].parse::<f64>().is_ok());
        let expected: usize = (0..header.len())
            .filter(|at| is_number(*at))
            .map(|at| rows.iter().filter(|row| !row[at].is_empty()).count())
            .sum();
        let found = text.matches("<c r=").count() - text.matches("t=\"s\"").count();
        assert!(found >= expected, "{sheet}: {found} numbers of {expected}");
    }
    let first = std::fs::read(basin.path().join("out/tables.xlsx")).unwrap();
    assert_eq!(basin.run("study mine.toml --quiet --threads 1 --into out").status, 0);
    assert_eq!(std::fs::read(basin.path().join("out/tables.xlsx")).unwrap(), first, "the same bytes");
}
