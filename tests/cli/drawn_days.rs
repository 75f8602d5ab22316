//! Days of some water years of one place, drawn beside the daily table.

use super::basin::{Basin, weather};
use serde_json::Value;

const SITE: &str = r#"
[[observed_swe]]
name = "Heron Meadow"
file = "snow.csv"
elevation_m = 2150
swe = { column = "swe_mm", unit = "mm" }
"#;

/// A basin with a site at 2150 m, in the lower of its bands, of which two dates have a reading.
pub fn with_site() -> Basin {
    let basin = Basin::new();
    basin.write("scenario.toml", &(basin.read("scenario.toml") + SITE));
    basin.write("snow.csv", "date,swe_mm\n2001-03-01,80\n2001-04-01,60\n2003-04-01,70\n");
    basin
}

pub fn manifest(basin: &Basin, folder: &str) -> Value {
    serde_json::from_str(&basin.read(&format!("{folder}/run.json"))).unwrap()
}

/// Rows of a place in a daily table: date, rain, snow, melt and SWE as the day ends.
fn rows(table: &str, place: &str) -> Vec<(String, [f64; 4])> {
    let rows = table.lines().skip(1).map(|line| line.split(',').collect::<Vec<&str>>());
    let of_place = rows.filter(|cells| cells[1] == place);
    of_place.map(|cells| (cells[0].to_owned(), [3, 4, 5, 11].map(|at| cells[at].parse().unwrap()))).collect()
}

/// The title of a figure.
fn title(svg: &str) -> String {
    svg.split_once("<title id=\"daily-title\">").unwrap().1.split_once("</title>").unwrap().0.to_owned()
}

/// The figure is there where it is asked for, is listed with the command that draws it again, and leaves the table as it
/// is.
#[test]
fn a_figure_where_it_is_asked_for() {
    let basin = Basin::new();
    assert_eq!(basin.run("daily scenario.toml --into plain").status, 0);
    assert!(!basin.path().join("plain/figures").exists());
    let ended = basin.run("daily scenario.toml --into days --draw-years 2001-2003 --draw-band 2");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    assert!(basin.read("days/figures/daily.svg").starts_with("<svg "));
    assert_eq!(basin.read("days/daily.csv"), basin.read("plain/daily.csv"));
    let manifest = manifest(&basin, "days");
    assert_eq!(manifest["files"], serde_json::json!(["daily.csv", "figures/daily.svg", "run.json"]));
    let command = "thawline daily --draw-years 2001-2003 --draw-band 2 scenario.toml";
    assert_eq!(manifest["command"], command);
    assert_eq!(basin.run(&format!("{} --into again", &command["thawline ".len()..])).status, 0);
    assert_eq!(basin.read("again/figures/daily.svg"), basin.read("days/figures/daily.svg"));
    assert_eq!(basin.run("daily scenario.toml --into days").status, 0, "our own results are replaced");
    assert!(!basin.path().join("days/figures").exists());
}

/// What the figure says of the basin in 2002 is in the daily table: SWE as a day begins is that at the end of the day
/// before it.
#[test]
fn its_numbers_are_those_of_the_table() {
    let basin = Basin::new();
    assert_eq!(basin.run("daily scenario.toml --into days --draw-years 2002").status, 0);
    let figure = basin.read("days/figures/daily.svg");
    let table = basin.read("days/daily.csv");
    let rows = rows(&table, "basin");
    let of_year: Vec<[f64; 4]> = rows
        .iter()
        .filter(|(date, _)| ("2001-10-01".."2002-10-01").contains(&date.as_str()))
        .map(|(_, numbers)| *numbers)
        .collect();
    assert_eq!(of_year.len(), 365);
    let peak_mm = of_year.iter().map(|[.., swe]| *swe).fold(0.0, f64::max);
    let day_before =
        rows.iter().find(|(_, [.., swe])| *swe == peak_mm).map(|(date, _)| date.clone()).unwrap();
    let peak_on = day_before.parse::<chrono::NaiveDate>().unwrap().succ_opt().unwrap().format("%-d %B");
    let title = title(&figure);
    assert_eq!(title, format!("Basin mean, water year 2002: SWE peaks at {peak_mm:.0} mm on {peak_on}"));
    let [rain, snow, melt] = [0, 1, 2].map(|at| of_year.iter().map(|numbers| numbers[at]).sum::<f64>());
    let note = format!("snow {snow:.0} mm \u{b7} rain {rain:.0} mm \u{b7} melt {melt:.0} mm<");
    assert!(figure.contains(&note), "{note} in {figure}");
}

/// A site is drawn at its own elevation, and its days join the table; they are those that the comparison has. All other
/// rows stay.
#[test]
fn a_site_is_drawn_at_its_own_elevation() {
    let basin = with_site();
    let words =
        ["daily", "scenario.toml", "--into", "days", "--draw-years", "2001", "--draw-band", "Heron Meadow"];
    let ended = super::basin::ended(basin.command("").args(words));
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let figure = basin.read("days/figures/daily.svg");
    assert!(title(&figure).starts_with("Heron Meadow (2\u{2009}150 m), water year 2001: SWE peaks at "));
    assert!(title(&figure).ends_with("; the highest reading is 80 mm"), "{}", title(&figure));
    assert_eq!(figure.matches("<circle").count(), 2 + 1, "two surveys, and one dot in the key");
    let table = basin.read("days/daily.csv");
    let of_site = rows(&table, "Heron Meadow");
    assert_eq!(of_site.len(), 3 * 365);
    let compared = basin.read("days/tables/observed-daily.csv");
    let mut held = 0;
    for line in compared.lines().skip(1) {
        let cells: Vec<&str> = line.split(',').collect();
        let day_before = cells[1].parse::<chrono::NaiveDate>().unwrap().pred_opt().unwrap().to_string();
        if let Some((_, [.., swe_mm])) = of_site.iter().find(|(date, _)| *date == day_before) {
            assert_eq!(cells[3].parse::<f64>().unwrap(), *swe_mm, "{line}");
            held += 1;
        }
    }
    assert_eq!(held, 365 + 365 - 1, "the days of 2001 and 2003 but the record's first");
    assert_eq!(basin.run("daily scenario.toml --into plain").status, 0);
    let others = table.lines().filter(|line| !line.contains(",Heron Meadow,"));
    assert!(others.eq(basin.read("plain/daily.csv").lines()));
    assert_eq!(
        manifest(&basin, "days")["command"],
        "thawline daily --draw-years 2001 --draw-band 'Heron Meadow' scenario.toml"
    );
}

/// A site's snow is drawn in the band that it lies in, and in no other.
#[test]
fn observed_snow_belongs_to_its_band() {
    let basin = with_site();
    for (band, said, dots) in [
        ("1", "observed at Heron Meadow (snow course, 2\u{2009}150 m), which lies within the band", 3),
        ("2", "No site with observed snow lies within the band", 0),
        ("basin", "weighted by area; snow is observed at sites, never of a whole basin", 0),
    ] {
        let ended =
            basin.run(&format!("daily scenario.toml --into days --draw-years 2001 --draw-band {band}"));
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        let figure = basin.read("days/figures/daily.svg");
        let words: String = figure
            .split("<text ")
            .skip(1)
            .map(|text| {
                let text = text.split_once('>').unwrap().1.split_once("</text>").unwrap().0;
                format!("{text} ")
            })
            .collect();
        assert!(words.contains(said), "{band}: {words}");
        assert_eq!(figure.matches("<circle").count(), dots, "{band}");
    }
}

/// Years in a gap, too many years, places that are none, and a figure without a folder: each is a fault of the command
/// line, and says what there is.
#[test]
fn what_cannot_be_drawn_is_said() {
    let basin = with_site();
    for (words, said) in [
        ("--draw-years 2001", "a figure needs a folder: add --into DIR"),
        (
            "--into days --draw-years 1999-2000",
            "none of water years 1999-2000 is in use; in use are 2001-2003",
        ),
        ("--into days --draw-years 2004", "water year 2004 is not in use; in use are 2001-2003"),
        ("--into days --draw-years 2003-2001", "2003 comes after 2001; write 2001-2003"),
        ("--into days --draw-years 03", "'03' is not a water year of four digits"),
        ("--into days --draw-band 1", "--draw-years <YEARS>"),
        (
            "--into days --draw-years 2001 --draw-band 3",
            "expected basin, a band from 1, the lowest, to 2; or a site with observed snow: 'Heron Meadow'",
        ),
    ] {
        let ended = basin.run(&format!("daily scenario.toml {words}"));
        assert_eq!((ended.status, ended.stdout.as_str()), (2, ""), "{words}: {}", ended.stderr);
        assert!(ended.stderr.contains(said), "{words}: {}", ended.stderr);
        assert!(!basin.path().join("days").exists(), "{words}");
    }
    let without = Basin::new().run("daily scenario.toml --into days --draw-years 2001 --draw-band top");
    assert!(without.stderr.contains("the scenario has no site with observed snow"), "{}", without.stderr);
}

/// Years that are not in use are left out of the figure and said; the table and the other years are there, and so is where
/// the figure lies.
#[test]
fn the_years_in_use_are_drawn_and_the_others_said() {
    let basin = Basin::new();
    for (years, said) in [
        ("2000-2002", "not drawn, since it is not in use: water year 2000\n"),
        ("1999-2002", "not drawn, since they are not in use: water years 1999-2000\n"),
    ] {
        let ended = basin.run(&format!("daily scenario.toml --into days --draw-years {years}"));
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        assert!(ended.stderr.contains(said), "{}", ended.stderr);
        assert!(ended.stderr.ends_with("figure: days/figures/daily.svg\n"), "{}", ended.stderr);
        assert!(
            title(&basin.read("days/figures/daily.svg"))
                .starts_with("Basin mean, water years 2001 to 2002: ")
        );
        let command = format!("thawline daily --draw-years {years} scenario.toml");
        assert_eq!(manifest(&basin, "days")["command"], command, "as it was asked for");
    }
    let all = basin.run("daily scenario.toml --into days --draw-years 2001-2003");
    assert!(!all.stderr.contains("not drawn"), "{}", all.stderr);
}

/// At most five years fit into one figure, and `--help` says so.
#[test]
fn five_years_are_the_most() {
    let basin = Basin::new();
    basin.write("weather.csv", &weather(6));
    let ended = basin.run("daily scenario.toml --into days --draw-years 2001-2006");
    assert_eq!(ended.status, 2);
    assert!(ended.stderr.contains("6 water years; at most 5 fit into one figure"), "{}", ended.stderr);
    assert_eq!(basin.run("daily scenario.toml --into days --draw-years 2000-2005").status, 0);
    assert!(basin.run("daily --help").stdout.contains("at most 5"));
}

/// Bands of one range are told apart in the title.
#[test]
fn the_title_names_the_ground_of_bands_of_one_range() {
    let basin = Basin::new();
    basin.write(
        "bands.csv",
        "lower_m,upper_m,area_km2,slope_deg,aspect_deg\n1900,2200,20,25,180\n1900,2200,20,25,0\n2200,2500,25,25,0\n",
    );
    for (band, named) in [
        ("2", "Band 2 (1\u{2009}900–2\u{2009}200 m, facing 0°, slope 25°), water year 2001: "),
        ("3", "Band 3 (2\u{2009}200–2\u{2009}500 m), water year 2001: "),
    ] {
        let ended =
            basin.run(&format!("daily scenario.toml --into days --draw-years 2001 --draw-band {band}"));
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        let title = title(&basin.read("days/figures/daily.svg"));
        assert!(title.starts_with(named), "{title}");
    }
}

/// A reader of inches gets inches; the table stays metric.
#[test]
fn us_readers_see_inches() {
    let basin = Basin::new();
    basin.write("scenario.toml", &(basin.read("scenario.toml") + "\n[report]\nunits = \"us\"\n"));
    assert_eq!(basin.run("daily scenario.toml --into days --draw-years 2001-2002").status, 0);
    let figure = basin.read("days/figures/daily.svg");
    assert!(
        figure.contains(">SWE as the day begins, in; bars: in a day<") && !figure.contains(" mm"),
        "{figure}"
    );
    assert!(basin.read("days/daily.csv").starts_with("date,band,tmean_c,rain_mm,"));
}
