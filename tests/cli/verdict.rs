//! The verdict comes from the numbers and turns round when they do.

use super::basin::Basin;
use serde_json::Value;

fn study(basin: &Basin, scenario: &str) -> (Value, String) {
    let ended = basin.run(&format!("study {scenario} --into out --force --quiet"));
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    (serde_json::from_str(&basin.read("out/summary.json")).unwrap(), basin.read("out/briefing.html"))
}

/// In the cold demo basin +1 degC moves 1 April SWE by less than the half spread, and the briefing says so; in the main
/// demo warming outweighs before +2 degC, and the briefing says that; in the southern one a degree takes more of the
/// snow than in either.
#[test]
fn the_demos_speak_for_their_numbers() {
    let basin = Basin::new();
    assert_eq!(basin.run("start demo --quiet").status, 0);
    // A third of the realizations, a third of the time.
    for name in ["alder-fork", "frostbell-creek", "tamsin-river"] {
        let path = format!("demo/scenarios/{name}.toml");
        basin.write(&path, &basin.read(&path).replace("[realizations]\n", "[realizations]\ncount = 100\n"));
    }
    let (cold, page) = study(&basin, "demo/scenarios/frostbell-creek.toml");
    let headline = &cold["findings"]["basin"][0];
    let at_one = &headline["levels"][1];
    let spread = &headline["precipitation_spread"];
    let half = spread["q50"].as_f64().unwrap() - spread["q05"].as_f64().unwrap();
    assert!(at_one["shift"]["median"]["value"].as_f64().unwrap().abs() < half);
    let sentence = cold["answer"]["amounts"][0].as_str().unwrap();
    assert!(sentence.starts_with("At +1 °C") && sentence.contains("does not outweigh"), "{sentence}");
    assert!(page.contains(sentence));
    let verdict = cold["answer"]["verdict"].as_str().unwrap();
    assert!(verdict.contains("precipitation outweighs the warming."), "{verdict}");
    // A degree there is made up by a few percent, which precipitation's chance brings often; by the wider assumption no level
    // of the study outweighs it.
    assert!(said(&cold, "yardstick").contains("at no level up to +4 °C with twice as much"));
    let break_even = &cold["findings"]["break_even"]["levels"][0];
    assert!((0.0..5.0).contains(&break_even["precipitation_change_pct"].as_f64().unwrap()), "{break_even}");
    assert!(break_even["realizations_that_reached"].as_u64().unwrap() > 100 / 4, "{break_even}");

    let (main, page) = study(&basin, "demo/scenarios/alder-fork.toml");
    let ratio = |level: usize| {
        main["findings"]["basin"][0]["levels"][level]["signal_to_spread"]["value"].as_f64().unwrap()
    };
    assert!(ratio(1) < 1.0 && ratio(2) > 1.0);
    hold_to_definitions(&main);
    hold_to_definitions(&cold);
    let crossing = main["findings"]["basin"][0]["outweighs"]["level_c"].as_f64().unwrap();
    assert!(
        (crossing - (1.0 + (1.0 - ratio(1)) / (ratio(2) - ratio(1)))).abs() < 1e-12,
        "linear between levels"
    );
    let verdict = main["answer"]["verdict"].as_str().unwrap();
    assert!(verdict.starts_with(&format!("From about +{crossing:.1} °C of warming on")), "{verdict}");
    assert!(verdict.contains("the warming outweighs the precipitation spread"), "{verdict}");
    assert!(page.contains(verdict));
    let mean =
        main["record"]["headline_by_year"].as_array().unwrap().iter().map(|y| y["value"].as_f64().unwrap());
    let (count, sum) = mean.fold((0.0, 0.0), |(count, sum), value| (count + 1.0, sum + value));
    assert!((300.0..600.0).contains(&(sum / count)), "mean 1 April SWE {}", sum / count);

    let (south, _) = study(&basin, "demo/scenarios/tamsin-river.toml");
    hold_to_definitions(&south);
    assert_eq!(south["findings"]["basin"][0]["measure"]["name"], "swe_10_01_mm");
    let percent =
        |study: &Value| study["findings"]["basin"][0]["levels"][1]["percent_change"].as_f64().unwrap();
    let [cold, main, south] = [&cold, &main, &south].map(percent);
    assert!(south < 1.5 * main && main < 1.5 * cold && cold < 0.0, "{cold}, {main}, {south} % at +1 degC");
}

/// Where the assumed change of mean precipitation is wide enough, precipitation outweighs the same warming in the same
/// basin, and every word that said otherwise turns round.
#[test]
fn a_wide_assumption_turns_the_verdict() {
    let basin = Basin::new();
    basin.exchange("count = 12", "count = 60");
    let (narrow, _) = study(&basin, "scenario.toml");
    assert_eq!(narrow["findings"]["basin"][0]["outweighs"]["crossing"], "at");
    assert!(said(&narrow, "yardstick").contains("Against one standard deviation, the shorter measure that studies of emergence use, it outweighs from +"));
    assert!(said(&narrow, "yardstick").contains("warming outweighs at +2 °C"));
    basin.exchange("years = 5", "years = 5\nmean_change_sd_pct = 60");
    let (wide, page) = study(&basin, "scenario.toml");
    assert_eq!(wide["findings"]["basin"][0]["outweighs"]["crossing"], "not_reached");
    let verdict = wide["answer"]["verdict"].as_str().unwrap();
    assert!(verdict.contains("does not outweigh") && page.contains(verdict), "{verdict}");
    let yardstick = said(&wide, "yardstick");
    for words in [
        "at no level up to +2 °C with half of it, at no level up to +2 °C with twice as much",
        "the spread of single years at no level up to +2 °C",
        "Against one standard deviation, the shorter measure that studies of emergence use, it outweighs at no level up to",
        "no realization is warm or cool by chance, it outweighs at no level up to +2 °C",
        "from +1.4 °C on without it",
        "the verdict hangs on the yardstick at +2 °C",
    ] {
        assert!(yardstick.contains(words), "{words}: {yardstick}");
    }
    let how_sure = said(&wide, "how_sure");
    assert!(
        how_sure.contains("would put the warming from which it outweighs above +2.0 °C (Monte Carlo"),
        "{how_sure}"
    );
    let level = &wide["findings"]["break_even"]["levels"][0];
    let [pct, reached] =
        ["precipitation_change_pct", "realizations_that_reached"].map(|name| level[name].as_f64().unwrap());
    assert!(0.0 < pct && pct < 60.0 / 4.0 && reached > 60.0 / 4.0, "{level}");
    let before = &narrow["findings"]["break_even"]["levels"][0];
    assert_eq!(
        before["precipitation_change_pct"], level["precipitation_change_pct"],
        "no change is assumed in it"
    );
    assert!(before["realizations_that_reached"].as_f64().unwrap() < reached / 2.0, "{before}");
    let sentence = said(&wide, "break_even");
    assert!(
        sentence.contains(&format!("At +2 °C, {pct:.1} % more precipitation"))
            && sentence.contains(&format!("{reached:.0} of 60 realizations came to so much")),
        "{sentence}"
    );
}

/// A part of the answer as one text.
fn said(summary: &Value, part: &str) -> String {
    let words = summary["answer"][part].as_array().unwrap().iter().map(|words| words.as_str().unwrap());
    words.collect::<Vec<_>>().join("\n")
}

/// Where no snow lies there is no timing and no percentage: none, counted, and never a zero or a date.
#[test]
fn a_basin_without_snow() {
    let basin = Basin::new();
    basin.exchange("station_elevation_m = 2000", "station_elevation_m = 5000");
    let (summary, page) = study(&basin, "scenario.toml");
    let measures = summary["findings"]["basin"].as_array().unwrap();
    let of = |name: &str| measures.iter().find(|m| m["measure"]["name"] == name).unwrap();
    assert_eq!(of("swe_04_01_mm")["levels"][1]["percent_change"], Value::Null);
    let melt_out = &of("melt_out_day")["levels"][0];
    assert_eq!(
        (melt_out["periods"]["q50"].as_str(), melt_out["periods"]["none"].as_u64()),
        (Some("none"), Some(12))
    );
    assert_eq!(melt_out["years_undefined"][0], 60);
    assert!(page.contains("12 none"));
    // Nothing that was never there can be made up or outweighed.
    for part in ["break_even", "how_sure", "chances", "timing"] {
        assert_eq!(said(&summary, part), "", "{part}");
    }
    assert!(summary["answer"]["verdict"].as_str().unwrap().starts_with("There is hardly any snow to lose"));
    assert!(!said(&summary, "yardstick").contains("cannot be told"));
}

/// Cooler levels are not called warmer, a rise is a rise, and a study that compares nothing claims nothing.
#[test]
fn other_levels_than_warmer_ones() {
    let basin = Basin::new();
    basin.exchange("count = 12", "count = 40");
    basin.exchange("levels_c = [0, 2]", "levels_c = [-2]");
    let (cooler, _) = study(&basin, "scenario.toml");
    assert!(cooler["answer"]["amounts"][0].as_str().unwrap().contains("rises by"));
    let chance = cooler["answer"]["chances"][0].as_str().unwrap();
    assert!(chance.contains("lies above a reference one") && !chance.contains("warmed"), "{chance}");
    assert!(cooler["answer"]["verdict"].as_str().unwrap().contains("cannot be said"));

    basin.exchange("levels_c = [-2]", "levels_c = [0]");
    let (alone, page) = study(&basin, "scenario.toml");
    for part in ["amounts", "how_sure", "timing", "break_even", "chances"] {
        assert_eq!(said(&alone, part), "", "{part}");
    }
    assert!(alone["answer"]["volumes"].is_null() && alone["answer"]["elevation"].is_null());
    let yardstick = said(&alone, "yardstick");
    assert!(
        yardstick.contains("median") && !yardstick.contains("it outweighs") && !yardstick.contains("be told")
    );
    assert!(!page.contains("the verdict is the same at every level"));
}

/// Where rising precipitation lifts the shift and lets it fall again, the verdict ends where the ratio does.
#[test]
fn a_verdict_that_does_not_last() {
    let basin = Basin::new();
    basin.exchange("count = 12", "count = 60");
    basin.exchange(
        "levels_c = [0, 2]",
        "levels_c = [0, 2, 4, 6, 8, 10, 12, 13, 14]\nprecipitation_change_pct_per_c = 9.0",
    );
    basin.exchange("station_elevation_m = 2000", "station_elevation_m = 900");
    let (summary, _) = study(&basin, "scenario.toml");
    let headline = &summary["findings"]["basin"][0];
    let ratios: Vec<f64> = (1..9)
        .map(|level| headline["levels"][level]["signal_to_spread"]["value"].as_f64().unwrap())
        .collect();
    let first = ratios.iter().position(|ratio| *ratio > 1.0).unwrap();
    let falls_back = ratios[first..].iter().any(|ratio| *ratio <= 1.0);
    assert!(falls_back, "the case no longer shows what it is for: {ratios:?}");
    let until = headline["outweighs"]["until_c"].as_f64().unwrap();
    let verdict = summary["answer"]["verdict"].as_str().unwrap();
    assert!(
        verdict.contains(&format!("to +{until:.1} °C of warming")) && verdict.contains("elsewhere"),
        "{verdict}"
    );
}

/// The headline's numbers follow from each other as the method defines them; 1e-9 is rounding.
fn hold_to_definitions(summary: &Value) {
    let headline = &summary["findings"]["basin"][0];
    let number = |value: &Value| value.as_f64().unwrap();
    let spread = &headline["precipitation_spread"];
    let [low, median, high] = ["q05", "q50", "q95"].map(|quantile| number(&spread[quantile]));
    let levels = headline["levels"].as_array().unwrap();
    assert_eq!(number(&levels[0]["periods"]["q50"]), median, "the first level is the reference");
    for level in &levels[1..] {
        let shift = number(&level["shift"]["median"]["value"]);
        let half = if shift < 0.0 { median - low } else { high - median };
        assert!((number(&level["signal_to_spread"]["value"]) - shift.abs() / half).abs() < 1e-9);
        assert!((number(&level["percent_change"]) - 100.0 * shift / median).abs() < 1e-9);
        let shares = &level["period_variance_shares"];
        let sum: f64 = ["level", "realization", "residual"].map(|share| number(&shares[share])).iter().sum();
        assert!((sum - 1.0).abs() < 1e-9);
        for chance in ["period_below_reference", "year_below_reference", "reaches_reference_median"] {
            let chance = &level["chances"][chance];
            let is_certain = [0.0, 1.0].contains(&number(&chance["value"]));
            assert_eq!(
                chance["bound"].is_null(),
                !is_certain,
                "a bound stands where no realization counts: {chance}"
            );
            if is_certain {
                // 1 - 0.05^(1/100), by hand: e^(-2.995732/100) is 0.970487.
                assert!((number(&chance["bound"]) - 0.029513).abs() < 1e-6);
            }
        }
    }
}

/// Where the levels bring a stated change of precipitation, the verdict does not lay all of it on warming.
#[test]
fn a_stated_change_of_precipitation_is_named_with_the_warming() {
    let basin = Basin::new();
    let (plain, _) = study(&basin, "scenario.toml");
    basin.exchange("levels_c = [0, 2]", "levels_c = [0, 2]\nprecipitation_change_pct_per_c = 5");
    let (stated, _) = study(&basin, "scenario.toml");
    let [plain, stated] = [plain, stated].map(|summary| summary["answer"]["verdict"].to_string());
    let words = "warming with its stated change of precipitation";
    assert!(stated.contains(words) && !plain.contains(words), "{plain} {stated}");
}

/// A level just below the one from which on warming outweighs is one of which so few realizations cannot tell: words and range
/// say so together, of the verdict and of the level itself.
#[test]
fn a_level_too_near_to_call_is_not_called() {
    let basin = Basin::new();
    assert_eq!(basin.run("start demo --quiet").status, 0);
    let path = "demo/scenarios/alder-fork.toml";
    let few = "[realizations]\ncount = 40\nyears = 10\n";
    let scenario = basin.read(path).replace("[realizations]\n", few);
    basin.write(path, &scenario);
    let (found, _) = study(&basin, path);
    let headline = &found["findings"]["basin"][0];
    let from_c = headline["outweighs"]["level_c"].as_f64().unwrap();
    assert!(headline["outweighs_range"]["q05_c"].as_f64().unwrap() < 0.99 * from_c, "{headline}");
    basin.write(
        path,
        &scenario.replace("levels_c = [0, 1, 2, 3, 4]", &format!("levels_c = [0, {}]", 0.99 * from_c)),
    );
    let (near, _) = study(&basin, path);
    let headline = &near["findings"]["basin"][0];
    assert_eq!(headline["outweighs"]["crossing"], "not_reached");
    let verdict = near["answer"]["verdict"].as_str().unwrap();
    assert!(verdict.contains("these realizations cannot tell whether warming outweighs"), "{verdict}");
    assert!(
        verdict.starts_with("Below about +")
            && verdict.contains("others of the same kind might have it outweigh."),
        "{verdict}"
    );
    let ratio = &headline["levels"][1]["signal_to_spread"];
    let [value, error] = ["value", "monte_carlo_error"].map(|name| ratio[name].as_f64().unwrap());
    assert!((value - 1.0).abs() < 2.0 * error, "{ratio}");
    let range = &headline["levels"][1]["signal_to_spread_range"];
    assert!(range["q05"].as_f64().unwrap() < 1.0 && range["q95"].as_f64().unwrap() > 1.0, "{range}");
    // Just above it these realizations have it outweigh, but others might not.
    basin.write(
        path,
        &scenario.replace("levels_c = [0, 1, 2, 3, 4]", &format!("levels_c = [0, {}]", 1.01 * from_c)),
    );
    let (above, _) = study(&basin, path);
    assert_eq!(above["findings"]["basin"][0]["outweighs"]["crossing"], "at");
    let verdict = above["answer"]["verdict"].as_str().unwrap();
    assert!(
        verdict.starts_with("Below about +") && verdict.contains("these realizations cannot tell"),
        "{verdict}"
    );
    assert!(verdict.contains("others of the same kind might at no level"), "{verdict}");
    let title = basin.read("out/figures/swe-by-level.svg");
    assert!(title.contains("the shift does not outweigh"), "the figure says no more than the page");
    let amount = near["answer"]["amounts"][0].as_str().unwrap();
    assert!(
        amount.contains("so near 1 that these realizations cannot tell whether it outweighs it"),
        "{amount}"
    );
}

/// Of one realization nothing is known of how far others would move a number, and of two hardly anything: no error is told as 0, and no
/// verdict.
#[test]
fn realizations_too_few_for_an_error_have_none_and_no_verdict() {
    let basin = Basin::new();
    assert_eq!(basin.run("start demo --quiet").status, 0);
    let path = "demo/scenarios/alder-fork.toml";
    let scenario = basin.read(path);
    for count in [1, 2] {
        let few = format!("[realizations]\ncount = {count}\nyears = 10\n");
        basin.write(path, &scenario.replace("[realizations]\n", &few));
        let (found, page) = study(&basin, path);
        let level = &found["findings"]["basin"][0]["levels"][2];
        assert!(count > 1 || level["shift"]["median"]["monte_carlo_error"].is_null(), "{level}");
        let answer = &found["answer"];
        for (sentence, so) in
            [(&answer["verdict"], "outweighs the precipitation spread of"), (&answer["amounts"][1], "so it")]
        {
            let sentence = sentence.as_str().unwrap();
            let is_told = sentence.contains(so)
                && !["cannot tell", "too few", "cannot be said"].iter().any(|open| sentence.contains(open));
            assert!(!is_told, "{count}: {sentence}");
        }
        assert!(!page.contains("± 0.000"), "{count}");
    }
}
