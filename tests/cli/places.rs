//! Where and in which years snow is lost: sentences held to the summary's numbers in a warm and a cold basin, and the keys' faults.

use super::basin::{Basin, SCENARIO};
use serde_json::Value;
use std::fmt::Write;
use std::sync::OnceLock;

/// How much warmer than usual each year of the record is, degC, and how many times its usual precipitation it brings. By hand: five
/// years are dry (0.5 to 0.95), of these the first, the sixth and the eighth are warm and the others cool.
const WARMER_C: [f64; 10] = [0.8, -1.2, 1.6, -0.4, -1.6, 1.2, -0.8, 0.4, 2.0, -2.0];
const WETTER: [f64; 10] = [0.7, 0.6, 1.3, 1.2, 1.4, 0.8, 1.1, 0.5, 1.25, 0.95];
const ALL_DRY_AND_WARM: u64 = 3;

/// Ten water years about a mean and a swing.
fn weather(mean_c: f64, swing_c: f64) -> String {
    let first = chrono::NaiveDate::from_ymd_opt(2000, 10, 1).unwrap();
    let mut text = String::from("date,tmin_c,tmax_c,precip_mm\n");
    for (at, start) in (2000..2010).enumerate() {
        let [start, end] =
            [start, start + 1].map(|year| chrono::NaiveDate::from_ymd_opt(year, 10, 1).unwrap());
        for date in start.iter_days().take_while(|date| *date < end) {
            let day = (date - first).num_days();
            let angle = std::f64::consts::TAU * (day as f64 - 105.0) / 365.25;
            let mean = mean_c - swing_c * libm::cos(angle) + WARMER_C[at];
            let mm = if day % 4 == 0 { 8.0 * WETTER[at] } else { 0.0 };
            writeln!(text, "{date},{:.2},{:.2},{mm:.2}", mean - 5.0, mean + 5.0).unwrap();
        }
    }
    text
}

fn basin(mean_c: f64, swing_c: f64, of_warming: &str) -> Basin {
    let basin = Basin::new();
    let asked = "[findings.low_snow]\nbelow_quantile = 0.3\n\n[findings.periods_compared]\nlast_years = 5\n\n[realizations]";
    let scenario = SCENARIO
        .replace("levels_c = [0, 2]", &format!("levels_c = [0, 2]\n{of_warming}"))
        .replace("[realizations]", asked);
    basin.write("scenario.toml", &scenario);
    basin.write(
        "bands.csv",
        "lower_m,upper_m,area_km2\n1700,2000,30\n2000,2300,40\n2300,2600,25\n2600,3200,20\n",
    );
    basin.write("weather.csv", &weather(mean_c, swing_c));
    basin
}

/// What a study said.
struct Told {
    basin: Basin,
    summary: Value,
    page: String,
}

impl Told {
    fn of(basin: Basin) -> Self {
        let ended = basin.run("study scenario.toml --into out --quiet");
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        let summary = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
        Self { summary, page: basin.read("out/briefing.html"), basin }
    }

    fn places(&self, name: &str) -> &Value {
        &self.summary["findings"]["places"][name]
    }

    /// The one sentence of a part of the answer that holds these words; the page has it as it is.
    fn sentence(&self, part: &str, words: &str) -> &str {
        let said = self.summary["answer"][part].as_array().unwrap();
        let mut with = said.iter().filter_map(Value::as_str).filter(|said| said.contains(words));
        let (Some(sentence), None) = (with.next(), with.next()) else {
            panic!("not one {words:?}: {said:?}")
        };
        let on_page = sentence.replace('<', "&lt;").replace('>', "&gt;");
        assert!(self.page.contains(&on_page), "not on the page: {sentence}");
        sentence
    }

    /// A cell of a table is the summary's number, or empty where there is none; rows are counted from 0. 1e-12 is the rounding of the
    /// reader of JSON.
    fn tells(&self, table: &str, row: usize, column: &str, expected: &Value) {
        let text = self.basin.read(&format!("out/tables/{table}.csv"));
        let mut reader = csv::Reader::from_reader(text.as_bytes());
        let header = reader.headers().unwrap().clone();
        let column = header
            .iter()
            .position(|name| name == column)
            .unwrap_or_else(|| panic!("no {column}: {header:?}"));
        let cell = reader.records().nth(row).unwrap().unwrap()[column].to_owned();
        let found: Option<f64> = cell.parse().ok();
        let is_same = match (found, expected.as_f64()) {
            (Some(found), Some(expected)) => (found - expected).abs() <= 1e-12 * expected.abs(),
            (found, expected) => found == expected && cell.is_empty(),
        };
        assert!(is_same, "{column} of {table}: {cell:?} for {expected}");
    }

    /// `1700–2000 m`: a band, counted from 0, the lowest.
    fn band(&self, at: &Value) -> String {
        let band = &self.summary["findings"]["bands"][at.as_u64().unwrap() as usize];
        format!("{}–{} m", number(&band["lower_m"]), number(&band["upper_m"]))
    }
}

/// Winters about freezing.
fn warm() -> &'static Told {
    static TOLD: OnceLock<Told> = OnceLock::new();
    TOLD.get_or_init(|| Told::of(basin(8.0, 8.0, "")))
}

/// Frozen through at both levels, and with so much more precipitation that snow gains.
fn cold() -> &'static Told {
    static TOLD: OnceLock<Told> = OnceLock::new();
    TOLD.get_or_init(|| Told::of(basin(-1.0, 12.0, "precipitation_change_pct_per_c = 15")))
}

fn number(of: &Value) -> f64 {
    of.as_f64().unwrap_or_else(|| panic!("{of} is no number"))
}

/// The number that follows some words is the expected one, to half of its last decimal; 1e-9 is rounding.
fn says(sentence: &str, before: &str, expected: f64) {
    let (_, after) = sentence.split_once(before).unwrap_or_else(|| panic!("no {before:?}: {sentence}"));
    let written = after.replace('−', "-").replace('\u{2009}', "");
    let end = written.find(|c: char| !(c.is_ascii_digit() || "+-.".contains(c))).unwrap_or(written.len());
    let written = written[..end].trim_end_matches('.');
    let decimals = written.split_once('.').map_or(0.0, |(_, decimals)| decimals.len() as f64);
    let found: f64 = written.parse().unwrap_or_else(|_| panic!("no number after {before:?}: {sentence}"));
    let allowed = 0.5 * libm::pow(10.0, -decimals) + 1e-9;
    assert!((found - expected).abs() <= allowed, "{found} for {expected} after {before:?}: {sentence}");
}

/// `a to b` after some words.
fn says_range(sentence: &str, before: &str, low: &Value, high: &Value) {
    says(sentence, before, number(low));
    says(sentence.split_once(before).unwrap().1, " to ", number(high));
}

/// A chance in the brackets that follow some words: the chance, or the bound on one that was never or always seen.
fn says_chance(sentence: &str, before: &str, chance: &Value) {
    let (_, after) = sentence.split_once(before).unwrap_or_else(|| panic!("no {before:?}: {sentence}"));
    let (value, bound) = (number(&chance["value"]), chance["bound"].as_f64());
    match bound {
        None => says(after, "(", 100.0 * value),
        Some(bound) if value > 0.5 => says(after, "(> ", 100.0 * (1.0 - bound)),
        Some(bound) => says(after, "(< ", 100.0 * bound),
    }
}

/// The limit of a low-snow year is that of the low-snow odds, the chances and the ratio are the summary's, and the ratio is that of the two
/// chances, or there is none and a reason.
#[test]
fn coincidence_says_its_chances() {
    let mut ratios = 0;
    for told in [warm(), cold()] {
        let found = told.places("coincidence");
        let low = &told.summary["findings"]["by_year"]["low_snow"];
        assert_eq!(found["low_snow_below_quantile"], 0.3);
        let limits = [number(&found["low_snow_below_mm"]), number(&low["below_mm"]["value"])];
        assert!((limits[0] - limits[1]).abs() < 1e-9, "one limit: {limits:?}");
        let said = told.sentence("dry_and_warm", "are both dry and warm");
        says_chance(said, "At the reference, ", &found["levels"][0]["dry_warm"]);
        says_chance(said, "; at +2 °C, ", &found["levels"][1]["dry_warm"]);
        says(said, "A dry year is low in snow, below the ", 30.0);
        told.tells("dry-and-warm", 0, "low_snow_below_quantile", &found["low_snow_below_quantile"]);
        told.tells("dry-and-warm-record", 0, "low_snow_below_quantile", &found["low_snow_below_quantile"]);
        let given = &found["levels"][0]["low_snow_given_dry"];
        let [in_warm, in_cool] = ["warm", "cool"].map(|kind| number(&given[kind]["value"]));
        says(said, "single years, with a chance of ", 100.0 * in_warm);
        says(said, "where it is warm, and ", 100.0 * in_cool);
        match given["ratio"]["value"].as_f64() {
            Some(ratio) => {
                assert!((ratio - in_warm / in_cool).abs() < 1e-12, "{given}");
                says(said, "where it is cool, ", ratio);
                ratios += 1;
            }
            None => {
                assert_eq!(in_cool, 0.0, "{given}");
                assert!(
                    said.contains("no dry and cool year is low in snow, so that there is no ratio."),
                    "{said}"
                );
            }
        }
    }
    assert!(ratios > 0, "a ratio in one of the two");
}

/// By hand: dry and warm are the years of 2001, 2006 and 2008: one in the first half and two in the second, twice the share.
#[test]
fn periods_of_the_record_are_counted() {
    let found = warm().places("record_coincidence");
    assert_eq!(found["dry_warm"]["count"], ALL_DRY_AND_WARM);
    let periods = &found["periods"];
    let said = warm().sentence("dry_and_warm", "In the record itself");
    let share =
        |name: &str| (periods[name]["dry_warm"]["count"].clone(), periods[name]["dry_warm"]["of"].clone());
    assert_eq!(share("earlier"), (1.into(), 5.into()));
    assert_eq!(share("later"), (2.into(), 5.into()));
    assert!(said.contains(" From 2001 to 2005 there were 1 of 5 ("), "{said}");
    assert!(said.contains(", from 2006 to 2010 2 of 5 ("), "{said}");
    assert!(
        said.ends_with("2.00 times the share; so few years cannot tell the two periods apart."),
        "{said}"
    );
    says(said, "Low snow, below the ", 30.0);
    assert_eq!(found["low_snow_below_quantile"], 0.3);
    let given = ["low_snow_given_dry_warm", "low_snow_given_dry_cool"].map(|name| &found[name]);
    let counts = given.map(|of| format!("{} of {} (", of["count"], of["of"]));
    assert!(said.contains(&format!("came in {}", counts[0])), "{said}");
    assert!(said.contains(&format!("dry and warm years and in {}", counts[1])), "{said}");
}

/// What is said of each level are its chances, and these are years over years.
#[test]
fn snow_droughts_say_their_chances() {
    for told in [warm(), cold()] {
        let found = told.places("snow_droughts");
        let said = told.sentence("dry_and_warm", "A snow drought has no more than");
        says(said, "no more than ", number(&found["low_at_mm"]));
        for (level, begin) in [": at 0 °C, ", "; at +2 °C, "].into_iter().enumerate() {
            let found = &found["levels"][level];
            says_chance(said, begin, &found["dry"]);
            let of_level = said.split_once(begin).unwrap().1;
            says_chance(of_level, "bring a dry snow drought and ", &found["warm"]);
            for kind in ["dry", "warm"] {
                let share = number(&found[&format!("{kind}_years")]) / number(&found["years"]);
                assert!((number(&found[kind]["value"]) - share).abs() < 1e-12, "{found}");
            }
        }
    }
    let warmed = &warm().places("snow_droughts")["levels"];
    assert!(number(&warmed[1]["warm_years"]) > number(&warmed[0]["warm_years"]), "{warmed}");
}

#[test]
fn the_crossover_says_where_it_is_found_and_that_it_is_none() {
    let at = &warm().places("crossover")[0];
    assert_eq!(at["found"]["dominates"], "crossover", "{at}");
    let said = warm().sentence("elevations", "At 0 °C: up to ");
    says(said, "At 0 °C: up to ", number(&at["found"]["elevation_m"]));
    let range = &at["range"]["elevation"];
    says_range(said, "(5–95 % over resampled realizations: ", &range["q05_m"], &range["q95_m"]);
    says(said, "above with its precipitation. ", 100.0 * number(&at["range"]["share_alike"]));

    let at = &cold().places("crossover")[0];
    assert_eq!(at["found"]["dominates"], "precipitation", "{at}");
    let said = cold().sentence("elevations", "At 0 °C: at every elevation");
    assert!(
        said.contains("goes more with the cool season's precipitation than with its temperature."),
        "{said}"
    );
}

/// The band that loses most has the lowest of the summary's changes; bands that gain are those whose range lies above 0.
#[test]
fn bands_that_lose_most_and_that_gain_are_named() {
    let change = &warm().places("band_change")[0];
    let bands = change["bands"].as_array().unwrap();
    let lowest = |of: &dyn Fn(&Value) -> f64| {
        (0..bands.len()).min_by(|a, b| of(&bands[*a]).total_cmp(&of(&bands[*b]))).unwrap()
    };
    let most = lowest(&|band| number(&band["median_mm"]["value"]));
    assert_eq!(change["loses_most_mm"], most);
    let said = warm().sentence("elevations", "loses most depth");
    let words = format!("At +2 °C, the band at {} loses most depth, ", warm().band(&change["loses_most_mm"]));
    says(said, &words, number(&bands[most]["median_mm"]["value"]));
    says(said, "(5–95 %: ", number(&bands[most]["range_mm"]["q05"]));
    let of_its_own = warm().band(&change["loses_most_pct"]);
    assert!(said.contains(&format!("; the one at {of_its_own} most of its own, ")), "{said}");
    let volume = lowest(&|band| number(&band["median_hm3"]));
    assert!(said.contains(&format!("; the one at {} most volume. ", warm().band(&volume.into()))), "{said}");
    assert!(said.contains("No band gains beyond its 5–95 % range."), "{said}");

    let change = &cold().places("band_change")[0];
    let bands = change["bands"].as_array().unwrap();
    let gains = (0..bands.len()).filter(|band| number(&bands[*band]["range_mm"]["q05"]) > 0.0);
    let names: Vec<String> = gains.map(|band| cold().band(&band.into())).collect();
    assert!(!names.is_empty(), "{change}");
    let said = cold().sentence("elevations", "no band loses snow water by its median");
    assert!(said.ends_with(&format!(". Gains beyond their 5–95 % range: {}.", names.join(", "))), "{said}");
}

/// By geometry, a gradient of -6 degC per km lifts the line of freezing by 1000/6 = 166.67 m for each degC.
#[test]
fn the_snow_line_says_where_it_lies_and_how_far_it_rises() {
    let levels = &warm().places("snow_line")["levels"];
    let said = warm().sentence("elevations", "the snow line, where 100 mm lie, is ");
    let at = [0, 1].map(|level| number(&levels[level]["snow_line"]["elevation_m"]));
    let resampled = [0, 1].map(|level| &levels[level]["snow_line_resampled"]);
    says(said, "100 mm lie, is at ", at[0]);
    says_range(said, " m (", &resampled[0]["q05_m"], &resampled[0]["q95_m"]);
    let (_, then) = said.split_once("at the reference and ").unwrap();
    says(then, "at ", at[1]);
    says_range(then, " m (", &resampled[1]["q05_m"], &resampled[1]["q95_m"]);
    let rise = number(&levels[1]["snow_line_rise_m_per_c"]);
    assert!((rise - (at[1] - at[0]) / 2.0).abs() < 1e-9, "{levels}");
    says(said, "higher by ", rise);
    let range = &levels[1]["snow_line_rise_resampled_m_per_c"];
    says_range(said, " m for each °C (", &range["q05"], &range["q95"]);
    assert!(said.contains("; in brackets 5–95 % over resampled realizations."), "{said}");
    let (_, freezing) = said.split_once("Winter's mean over the record's years is at freezing ").unwrap();
    says(freezing, "at ", number(&levels[0]["freezing"]["elevation_m"]));
    let rise = number(&levels[1]["freezing_rise_m_per_c"]);
    assert!((rise - 1000.0 / 6.0).abs() < 1e-9, "{rise}");
    says(freezing, "higher by ", rise);
    assert!(freezing.ends_with("; that rests on no realization."), "{freezing}");
    for level in 0..2 {
        let found = &levels[level];
        for end in ["q05", "q95"] {
            let in_m = &format!("{end}_m");
            let tells = |column: &str, expected: &Value| warm().tells("snow-lines", level, column, expected);
            tells(&format!("snow_line_{in_m}"), &found["snow_line_range"][in_m]);
            tells(&format!("snow_line_resampled_{in_m}"), &found["snow_line_resampled"][in_m]);
            let rise = &found["snow_line_rise_resampled_m_per_c"][end];
            tells(&format!("snow_line_rise_resampled_{end}_m_per_degC"), rise);
            let crossover = &warm().places("crossover")[level]["range"]["elevation"][in_m];
            tells(&format!("crossover_resampled_{in_m}"), crossover);
        }
    }

    let said = cold().sentence("elevations", "the snow line");
    assert!(said.contains("where 100 mm lie, is at or below the lowest band at both. "), "{said}");
}

#[test]
fn snow_at_risk_says_how_much_and_that_there_is_none() {
    let found = &warm().places("at_risk")["levels"][0];
    let said = warm().sentence("elevations", "At risk by +2 °C: ");
    says(said, "They hold ", 100.0 * number(&found["area_share"]));
    says(said, "rests on no realization, and ", number(&found["volume_hm3"]));
    let volumes = &found["volume_resampled_hm3"];
    says_range(said, " hm³ (", &volumes["q05"], &volumes["q95"]);
    says(said, "of snow water, ", 100.0 * number(&found["volume_share"]));
    let shares = &found["volume_share_resampled"];
    says(said, "of the basin's (", 100.0 * number(&shares["q05"]));
    says(said.split_once("of the basin's (").unwrap().1, " to ", 100.0 * number(&shares["q95"]));
    let spread = &found["volume_range_hm3"];
    says_range(said, "From realization to realization it is ", &spread["q05"], &spread["q95"]);

    for (column, range) in [("volume_resampled", volumes), ("volume_share_resampled", shares)] {
        let unit = if range == volumes { "_hm3" } else { "" };
        for end in ["q05", "q95"] {
            warm().tells("at-risk-snow", 0, &format!("{column}_{end}{unit}"), &range[end]);
        }
    }

    assert_eq!(cold().places("at_risk")["levels"][0]["bands"], Value::Array(Vec::new()));
    cold().sentence("elevations", "goes from freezing to thawing by +2 °C: no snow is at risk by that rule.");
}

/// The faults of a scenario with these tables at its end.
fn refused(tables: &str) -> String {
    let basin = Basin::new();
    basin.append(tables);
    let ended = basin.run("check scenario.toml");
    assert_eq!((ended.status, ended.stdout.as_str()), (3, ""));
    ended.stderr
}

#[test]
fn keys_that_cannot_be() {
    insta::assert_snapshot!(refused("\n[findings.snow_line]\nswe_mm = \"much\"\n\n[findings.periods_compared]\nlast_years = \"ten\"\n"), @r#"
error: findings.snow_line.swe_mm: the text "much"
  --> scenario.toml:25:10
   |
25 | swe_mm = "much"
   |          ^^^^^^ expected a number
   |
   = help: write a number alone, without quotes and unit: swe_mm = ...

error: findings.periods_compared.last_years: the text "ten"
  --> scenario.toml:28:14
   |
28 | last_years = "ten"
   |              ^^^^^ expected a whole number from 1 to 1000
   |
   = help: for example 20

2 faults; nothing was run
"#);
    insta::assert_snapshot!(refused("\n[findings.snow_line]\nswe_mm = 0.5\n\n[findings.periods_compared]\nlast_years = 0\n"), @r"
error: findings.snow_line.swe_mm: 0.5
  --> scenario.toml:25:10
   |
25 | swe_mm = 0.5
   |          ^^^ expected a number from 1 to 5000
   |
   = help: for example 100

error: findings.periods_compared.last_years: 0
  --> scenario.toml:28:14
   |
28 | last_years = 0
   |              ^ expected a whole number from 1 to 1000
   |
   = help: for example 20

2 faults; nothing was run
");
    insta::assert_snapshot!(refused("\n[findings.snow_line]\nswe = 100\n\n[findings.periods_compared]\nlast_years = 2.5\nlast = 5\n"), @r"
error: 'findings.snow_line.swe', which is not a key of a scenario
  --> scenario.toml:25:1
   |
25 | swe = 100
   | ^^^ expected 'swe_mm'?
   |
   = help: write 'swe_mm', or take the key out

error: findings.periods_compared.last_years: 2.5
  --> scenario.toml:28:14
   |
28 | last_years = 2.5
   |              ^^^ expected a whole number from 1 to 1000
   |
   = help: for example 20

error: 'findings.periods_compared.last', which is not a key of a scenario
  --> scenario.toml:29:1
   |
29 | last = 5
   | ^^^^ expected 'last_years'?
   |
   = help: write 'last_years', or take the key out

3 faults; nothing was run
");
}
