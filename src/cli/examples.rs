//! Examples that run as they are written in a folder made by `thawline start`, said by help and manual alike.

/// What to type, and what it does.
pub(super) struct Example {
    pub typed: &'static str,
    pub does: &'static str,
}

const fn example(typed: &'static str, does: &'static str) -> Example {
    Example { typed, does }
}

/// Of the program as a whole.
pub(super) const OF_THE_PROGRAM: [Example; 3] = [
    example("thawline start my-basin", "the demo scenarios and their data, into my-basin/"),
    example(
        "thawline check scenarios/alder-fork.toml",
        "what would be used, and what was found in the record",
    ),
    example(
        "thawline study scenarios/alder-fork.toml",
        "figures, tables and a briefing, into output/alder-fork/",
    ),
];

const STUDY: [Example; 3] = [
    example(
        "thawline study scenarios/alder-fork.toml",
        "figures, tables and a briefing, into output/alder-fork/",
    ),
    example(
        "thawline study scenarios/frostbell-creek.toml --into frostbell --open",
        "another basin, into frostbell/, its briefing opened in your browser",
    ),
    example(
        "thawline study scenarios/alder-fork.toml --json > done.json",
        "what was written and the answer, for a program",
    ),
];

const DAILY: [Example; 2] = [
    example(
        "thawline daily scenarios/alder-fork.toml > alder-fork-daily.csv",
        "every day of every band of the record, without any warming",
    ),
    example(
        "thawline daily scenarios/alder-fork.toml --draw-years 2010-2012 --into days",
        "the same table and a figure of three water years, into days/",
    ),
];

const FIT: [Example; 1] = [example(
    "thawline fit scenarios/alder-fork.toml",
    "a page and files of parameters, into output/alder-fork-fit/; takes minutes",
)];

const WEATHER: [Example; 2] = [
    example(
        "thawline weather scenarios/alder-fork.toml > record.csv",
        "the record, corrected for catch and without gaps",
    ),
    example(
        "thawline weather scenarios/alder-fork.toml --realization 3 --into third",
        "the third realization, into third/weather.csv",
    ),
];

const CHECK: [Example; 2] = [
    example(
        "thawline check scenarios/alder-fork.toml",
        "what would be used, and what was found in the record",
    ),
    example(
        "thawline check scenarios/alder-fork.toml --weather",
        "also whether the weather that a study makes looks like the record",
    ),
];

const START: [Example; 1] =
    [example("thawline start my-basin", "the demo scenarios and their data, into my-basin/")];

const COMPLETIONS: [Example; 2] = [
    example("thawline completions bash > thawline.bash", "for bash: `source thawline.bash` takes them up"),
    example("thawline completions zsh > _thawline", "for zsh: into a folder of your $fpath"),
];

const MANUAL: [Example; 1] =
    [example("thawline manual > thawline.1", "a page for man: `man ./thawline.1` shows it")];

/// Of a command; none of one that is not known.
pub(super) fn of_command(name: &str) -> &'static [Example] {
    match name {
        "study" => &STUDY,
        "daily" => &DAILY,
        "fit" => &FIT,
        "weather" => &WEATHER,
        "check" => &CHECK,
        "start" => &START,
        "completions" => &COMPLETIONS,
        "manual" => &MANUAL,
        _ => &[],
    }
}
