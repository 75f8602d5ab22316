//! What single years say: keys, tables and words, held to their numbers.

use super::basin::Basin;
use serde_json::Value;

/// A basin whose years all differ: three years of weather alone are drawn over and over, and none lies below their lowest.
fn with_years_that_differ() -> Basin {
    let basin = Basin::new();
    basin.exchange("years = 5", "years = 5\nmean_change_sd_pct = 10");
    basin
}

fn study(basin: &Basin, scenario: &str) -> Value {
    let ended = basin.run(&format!("study {scenario} --into out --force --quiet"));
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    serde_json::from_str(&basin.read("out/summary.json")).unwrap()
}

fn sentences(summary: &Value) -> Vec<String> {
    let said = summary["answer"]["years"].as_array().unwrap();
    said.iter().map(|sentence| sentence.as_str().unwrap().to_owned()).collect()
}

fn number(of: &Value) -> f64 {
    of.as_f64().unwrap_or_else(|| panic!("{of} is no number"))
}

/// No year is said until the user states a rate of warming. By hand: 0.5 degC a decade from 2001 on are reached at w degC in
/// 2001 + 20 w.
#[test]
fn a_rate_of_warming_makes_a_year_of_a_level() {
    let basin = with_years_that_differ();
    basin.exchange("levels_c = [0, 2]", "levels_c = [0, 2, 8]");
    let without = study(&basin, "scenario.toml");
    let period =
        |summary: &Value| summary["findings"]["by_year"]["measures"][0]["detection"]["periods"][0].clone();
    assert_eq!(period(&without)["calendar_year"], Value::Null);
    assert!(
        sentences(&without)
            .iter()
            .any(|said| said.contains("Without a stated rate of warming none of this has a year"))
    );
    basin.exchange(
        "[realizations]",
        "[findings.warming_rate]\nc_per_decade = 0.5\nfrom_year = 2001\n\n[realizations]",
    );
    let with = period(&study(&basin, "scenario.toml"));
    assert_eq!(with["leaves_spread"]["crossing"], "at", "{with}");
    let year = number(&with["calendar_year"]["value"]);
    assert!((year - 2001.0 - 20.0 * number(&with["leaves_spread"]["level_c"])).abs() < 1e-9, "{with}");
    basin.exchange("from_year = 2001\n", "");
    let ended = basin.run("check scenario.toml");
    assert!(ended.status == 3 && ended.stderr.contains("no 'from_year'"), "{}", ended.stderr);
}

/// The stated quantile is the reference's own chance, to one year of the 60, and the ratio there is 1, an identity; shares of
/// each partition add up to 1; what JSON says, the tables say.
#[test]
fn identities_of_the_reference_and_of_shares() {
    let basin = with_years_that_differ();
    basin.exchange("[realizations]", "[findings.low_snow]\nbelow_quantile = 0.3\n\n[realizations]");
    let summary = study(&basin, "scenario.toml");
    let by_year = &summary["findings"]["by_year"];
    let reference = &by_year["low_snow"]["levels"][0];
    assert!((number(&reference["chance"]["value"]) - 0.3).abs() <= 1.0 / 60.0 + 1e-12, "{reference}");
    assert_eq!(number(&reference["chance_ratio"]["value"]), 1.0);
    for period in by_year["measures"][0]["partitions"][0]["periods"].as_array().unwrap() {
        let parts = ["level", "realization", "level_by_realization", "year", "level_by_year"];
        let sum: f64 = parts.iter().filter_map(|part| period[part]["value"].as_f64()).sum();
        assert!((sum - 1.0).abs() < 1e-12, "{period}");
    }
    for table in [
        "variance-by-averaging-period",
        "low-snow-odds",
        "low-runs",
        "tails",
        "change-against-spread",
        "worst-years",
    ] {
        let text = basin.read(&format!("out/tables/{table}.csv"));
        let columns = text.lines().next().unwrap().split(',').count();
        assert!(
            text.lines().count() > 1 && text.lines().all(|line| line.split(',').count() == columns),
            "{table}"
        );
    }
    let odds = basin.read("out/tables/low-snow-odds.csv");
    let chance = number(&by_year["low_snow"]["levels"][1]["chance"]["value"]);
    assert!(odds.lines().nth(2).unwrap().split(',').any(|cell| cell == chance.to_string()), "{odds}");
    basin.exchange("below_quantile = 0.3", "below_quantile = 0.9");
    assert!(basin.run("check scenario.toml").stderr.contains("a number from 0.01 to 0.5"));
}

/// A colder level is the record without so much of its warming: the ratio is that of two chances, and no cause is claimed.
#[test]
fn without_the_warming_so_far() {
    let basin = with_years_that_differ();
    basin.exchange("levels_c = [0, 2]", "levels_c = [-0.5, 0, 2]");
    let summary = study(&basin, "scenario.toml");
    let low = &summary["findings"]["by_year"]["low_snow"];
    let [colder, now] = [0, 1].map(|level| number(&low["levels"][level]["chance"]["value"]));
    let said = sentences(&summary).join("\n");
    if colder > 0.0 {
        let ratio = number(&low["without_warming"][0]["chance_ratio"]["value"]);
        assert!((ratio - now / colder).abs() < 1e-12, "{low}");
        // Where a resample has no low year without the warming, the ratio has no range and is not told.
        let has_range = !low["without_warming"][0]["chance_ratio"]["q95"].is_null();
        let told = format!("low-snow years {ratio:.1} times as often");
        let expected =
            if has_range { told.as_str() } else { "so few simulated years are low that it cannot be told" };
        assert!(said.contains(expected), "{said}");
    } else {
        assert_eq!(low["without_warming"][0]["chance_ratio"], Value::Null);
        assert!(said.contains("cannot be told"), "{said}");
    }
    assert!(!said.contains("caused by"), "{said}");
    // Stone & Allen (2005, from memory): 1 - p0/p1; told beside a ratio that is told.
    let fraction = &low["without_warming"][0]["attributable_fraction"];
    if colder > 0.0 && now > colder {
        assert!((number(&fraction["value"]) - (1.0 - colder / now)).abs() < 1e-12, "{low}");
    } else {
        assert_eq!(*fraction, Value::Null);
    }
    assert_eq!(said.contains("come on top"), said.contains("not what caused any year"), "{said}");
    // With more of the warming taken away the odds move beyond chance, and the share is told.
    basin.exchange("levels_c = [-0.5, 0, 2]", "levels_c = [-1, 0, 2]");
    basin.exchange("count = 12", "count = 60");
    let summary = study(&basin, "scenario.toml");
    let colder = &summary["findings"]["by_year"]["low_snow"]["without_warming"][0];
    assert!(number(&colder["chance_ratio"]["q05"]) > 1.0, "else nothing comes on top: {colder}");
    let [value, low, high] = ["value", "q05", "q95"]
        .map(|end| format!("{:.0}", 100.0 * number(&colder["attributable_fraction"][end])));
    let told = format!(
        "so that {value} % ({low} to {high} %) of them come on top (a sensitivity, not a formal attribution)"
    );
    let said = sentences(&summary).join("\n");
    assert!(said.contains(&told), "{told}: {said}");
}

/// What a level does is named in full where it brings a change of precipitation: in the sentences of the variance and of the
/// climate without the warming so far, and in the figure.
#[test]
fn a_stated_change_of_precipitation_is_named_with_the_warming() {
    let basin = with_years_that_differ();
    basin.exchange("levels_c = [0, 2]", "levels_c = [-2, 0, 2]");
    let told = |basin: &Basin| {
        let said = sentences(&study(basin, "scenario.toml"));
        let without = said.iter().find(|said| said.contains("2 °C of warming")).unwrap().clone();
        [said[0].clone(), without, basin.read("out/figures/variance-by-averaging-period.svg")]
    };
    let both = "warming with its stated change of precipitation";
    assert!(told(&basin).iter().all(|words| words.contains("warming") && !words.contains(both)));
    basin.exchange("levels_c = [-2, 0, 2]", "levels_c = [-2, 0, 2]\nprecipitation_change_pct_per_c = 3");
    let told = told(&basin);
    assert!(told[0].contains(&format!("the {both} holds the largest share")), "{}", told[0]);
    assert!(told[1].contains(&format!("2 °C of {both}")), "{}", told[1]);
    // The figure's title breaks into lines; its name for those who do not see it is whole.
    assert!(told[2].contains(&format!("°C of {both}")), "{}", told[2]);
}

/// Three winters come back over and over: years below the middle one are those of the lowest, of which the worst years' own count
/// tells how many there are, and those at the limit are the middle one's. Neither is the stated half, and the words say so; the
/// record's own count, one winter of three, stands beside the simulated return.
#[test]
fn winters_that_come_back_are_told_as_such() {
    let basin = Basin::new();
    basin.exchange("[realizations]", "[findings.low_snow]\nbelow_quantile = 0.5\n\n[realizations]");
    let summary = study(&basin, "scenario.toml");
    let by_year = &summary["findings"]["by_year"];
    let [lowest, middle] = [0, 1].map(|year| &by_year["worst_years"][year]);
    let as_low = |year: &Value| number(&year["levels"][0]["years_as_low"]);
    let low = &by_year["low_snow"];
    assert_eq!(number(&low["levels"][0]["low_years"]), as_low(lowest), "{low}");
    assert_eq!(number(&low["years_at_limit"]), as_low(middle) - as_low(lowest), "{low}");
    assert_eq!([number(&lowest["record_years_as_low"]), number(&middle["record_years_as_low"])], [1.0, 2.0]);
    assert_eq!(number(&lowest["record_years"]), 3.0);
    assert!(as_low(lowest) < 30.0, "else the sample has no difference to tell: {low}");
    let said = sentences(&summary).join("\n");
    let own = format!("At the reference itself {:.1} % (", 100.0 * as_low(lowest) / 60.0);
    assert!(said.contains(&own) && said.contains("are low, not 50 %"), "{said}");
    assert!(
        said.contains("in the record itself it is 1 in 3. The realizations are the record's own winters"),
        "{said}"
    );
    assert!(!said.contains("assumed change of mean precipitation"), "{said}");
    let worst = basin.read("out/tables/worst-years.csv");
    let mut lines = worst.lines().map(|line| line.split(',').collect::<Vec<_>>());
    let header = lines.next().unwrap();
    let at = header.iter().position(|name| *name == "record_years_as_low").unwrap();
    assert_eq!(lines.next().unwrap()[at..at + 2], ["1", "3"], "{worst}");
    let page = basin.read("out/briefing.html");
    assert!(page.contains("<td>1 in 3</td>") && page.contains("<td>2 in 3</td>"), "the plain count");
}

/// In the cold demo basin precipitation rules the years: words on which share is largest and on low-snow odds are those of the
/// ranges in the summary, whichever way these fall.
#[test]
fn the_cold_demo_speaks_for_its_numbers() {
    let basin = Basin::new();
    assert_eq!(basin.run("start demo --quiet").status, 0);
    let path = "demo/scenarios/frostbell-creek.toml";
    basin.write(path, &basin.read(path).replace("[realizations]\n", "[realizations]\ncount = 30\n"));
    let summary = study(&basin, path);
    let by_year = &summary["findings"]["by_year"];
    let said = sentences(&summary);
    // Weather drawn day by day is not the record's own winters.
    assert!(said.iter().any(|said| said.contains("; in the record itself it is 1 in ")), "{said:?}");
    assert!(!said.iter().any(|said| said.contains("record's own winters")), "{said:?}");
    let first = &by_year["measures"][0]["partitions"][0];
    let sides: Vec<Option<bool>> = first["periods"]
        .as_array()
        .unwrap()
        .iter()
        .map(|period| {
            let [low, high] = ["q05", "q95"].map(|end| number(&period["level_less_largest_other"][end]));
            if low > 0.0 {
                Some(true)
            } else if high < 0.0 {
                Some(false)
            } else {
                None
            }
        })
        .collect();
    // The words of +1 °C, from the sides alone: the longest tail of averaging periods in which the warming is the largest.
    let clear = sides.iter().rev().take_while(|side| **side == Some(true)).count();
    let from = first["periods"][sides.len() - clear]["years"].as_u64();
    let words = match (clear, from) {
        (0, _) if sides.iter().all(|side| *side == Some(false)) => {
            "in no averaging period up to 30 years".to_owned()
        }
        (0, _) if sides.iter().is_sorted_by_key(Option::is_none) && !sides.contains(&Some(true)) => {
            let open = sides.iter().position(Option::is_none).unwrap();
            let years = &first["periods"][open]["years"];
            if open == 0 {
                "perhaps (too close to tell)".to_owned()
            } else {
                format!("perhaps from {years}-year means on (too close to tell), in no shorter ones")
            }
        }
        (0, _) => "perhaps (too close to tell)".to_owned(),
        (_, years) => format!("from {}-year means on", years.unwrap()),
    };
    let (_, groups) = said[0].split_once("the warming holds the largest share ").unwrap();
    let of_one = groups.split(';').next().unwrap();
    assert!(of_one.starts_with("at +1 °C") && of_one.contains(&words), "{words}: {said:?}");
    assert_eq!(sides[0], Some(false), "of single years the weather is the largest part: {first}");
    assert!(first["warming_holds_most"]["warming_holds_most"] != "always");
    // A headline: it stands at a glance, too.
    let at_a_glance = summary["answer"]["at_a_glance"].as_array().unwrap().iter();
    let asked = at_a_glance.filter(|asked| asked["question"] == "In single years, or only in long means?");
    assert_eq!(
        asked.map(|asked| asked["answer"][0].as_str().unwrap()).collect::<Vec<_>>(),
        [said[0].as_str()]
    );
    // Two degrees above the reference, or the level next to it, is what the sentence tells.
    let at_two = &by_year["low_snow"]["levels"][2];
    let percent = format!("{:.0} %", 100.0 * number(&at_two["chance"]["value"]));
    assert!(said[1].starts_with("A low-snow year has less than") && said[1].contains(&percent), "{said:?}");
    let [low, high] = ["q05", "q95"].map(|end| number(&at_two["chance_ratio"][end]));
    assert_eq!(said[1].contains("no telling"), low <= 1.0 && high >= 1.0, "{said:?}");
}
