//! One spelling of each term, on every page, in every figure and in help: what is called two things is taken for two things.

use super::basin::Basin;
use std::collections::BTreeSet;

/// Spellings that we do not use, and the one that we do.
const OTHERWISE: [(&str, &str); 22] = [
    ("melt out", "melt-out"),
    ("meltout", "melt-out"),
    ("snow pack", "snowpack"),
    ("snow-pack", "snowpack"),
    ("snow melt", "snowmelt"),
    ("runoff", "snowpack outflow"),
    ("april 1", "1 April"),
    ("1st april", "1 April"),
    ("ensemble member", "realization"),
    ("realisation", "realization"),
    ("simulation run", "realization"),
    ("baseline climate", "reference"),
    ("control run", "reference"),
    ("year event", "how often in 10 years"),
    ("acre feet", "acre-feet"),
    ("monte-carlo", "Monte Carlo"),
    ("deg c", "°C"),
    ("degree celsius", "°C"),
    ("per cent", "%"),
    ("percentile", "quantile"),
    ("will happen", "a what-if says 'would'"),
    ("forecasts that", "what if, not forecast"),
];

/// Words of likelihood mean a probability (IPCC: likely is 66 % and more) and are never said of a share of realizations.
const LIKELIHOOD: [&str; 6] = [
    "very likely",
    "virtually certain",
    "exceptionally unlikely",
    "as likely as not",
    "is likely",
    "unlikely that",
];

/// The text between the tags of a page or a drawing, in lower case.
fn text_of(markup: &str) -> String {
    let mut text = String::new();
    let mut rest = markup;
    while let Some((before, after)) = rest.split_once('<') {
        text.push_str(before);
        text.push(' ');
        let skipped = ["style", "script"].iter().find(|name| after.starts_with(**name));
        let after =
            skipped.and_then(|name| after.split_once(&format!("</{name}"))).map_or(after, |(_, after)| after);
        rest = after.split_once('>').map_or("", |(_, after)| after);
    }
    text.push_str(rest);
    text.to_lowercase()
}

/// Whether these words stand in a text, and not as a part of longer ones.
fn has_words(text: &str, words: &str) -> bool {
    text.match_indices(words).any(|(at, _)| {
        let before = text[..at].chars().next_back();
        let after = text[at + words.len()..].chars().next();
        ![before, after].into_iter().flatten().any(char::is_alphabetic)
    })
}

#[test]
fn one_spelling_of_each_term() {
    let mut said = Vec::new();
    for name in ["alder-fork", "frostbell-creek", "tamsin-river"] {
        let (basin, scenario) = Basin::of_demo(name, [24, 6]);
        basin.write("mine.toml", &scenario);
        let ended = basin.run(&format!("study mine.toml --into {name}"));
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        said.push((format!("{name}, last lines"), ended.stderr.to_lowercase()));
        said.push((format!("{name}, page"), text_of(&basin.read(&format!("{name}/briefing.html")))));
        for figure in std::fs::read_dir(basin.path().join(name).join("figures")).unwrap() {
            let path = figure.unwrap().path();
            said.push((path.display().to_string(), text_of(&std::fs::read_to_string(&path).unwrap())));
        }
    }
    let basin = Basin::new();
    for command in ["", "study", "daily", "check", "fit", "weather", "start"] {
        said.push((
            format!("help of {command}"),
            basin.run(&format!("{command} --help")).stdout.to_lowercase(),
        ));
    }
    let mut found = BTreeSet::new();
    for (place, text) in &said {
        assert!(text.len() > 100, "{place}: {text}");
        for (other, ours) in OTHERWISE {
            if has_words(text, other) {
                found.insert(format!("{place}: {other:?} for {ours:?}"));
            }
        }
        found.extend(
            LIKELIHOOD.iter().filter(|word| has_words(text, word)).map(|word| format!("{place}: {word:?}")),
        );
    }
    assert!(found.is_empty(), "{found:#?}");
}

/// By hand.
#[test]
fn words_are_whole() {
    assert!(has_words("of melt out, and", "melt out") && has_words("runoff", "runoff"));
    assert!(!has_words("the melt outweighs", "melt out") && !has_words("snowmelt out", "melt out"));
}

/// By hand: tags, styles and scripts are no text.
#[test]
fn text_between_tags() {
    assert_eq!(text_of("<style>Runoff</style><p>Melt <b>Out</b></p>"), "  melt  out  ");
}
