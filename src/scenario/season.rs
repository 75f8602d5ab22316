//! `[season]`: where the water year begins, when snow is surveyed, which windows and days count.

use super::section::Section;
use crate::calendar::{MonthDay, WaterYearStart, day_of_water_year};
use crate::fault::Fault;
use crate::season::SeasonSettings;

pub(super) fn read(mut section: Section<'_>, is_southern: bool) -> Option<SeasonSettings> {
    let (start, survey, window, before) = if is_southern {
        ("04-01", "10-01", ["10-01", "01-31"], ["10-01", "11-01"])
    } else {
        ("10-01", "04-01", ["04-01", "07-31"], ["04-01", "05-01"])
    };
    let starts = if section.has("water_year_starts") {
        section.day("water_year_starts")
    } else {
        section.text_or("water_year_starts", start);
        MonthDay::parse(start)
    };
    let surveys = match section.texts("survey_dates") {
        Some(texts) => read_surveys(&section, &texts),
        None if section.has("survey_dates") => None,
        None => {
            section.default("survey_dates", format!("[{survey:?}]"));
            MonthDay::parse(survey).map(|day| vec![day])
        }
    };
    let windows = if section.has("volume_windows") {
        section.day_pairs("volume_windows")
    } else {
        section.day_pairs("volume_windows");
        let usual = MonthDay::parse(window[0]).zip(MonthDay::parse(window[1])).map(|(from, to)| [from, to]);
        let windows: Vec<[MonthDay; 2]> = usual
            .into_iter()
            .filter(|usual| starts.is_some_and(|starts| fits(WaterYearStart(starts), *usual)))
            .collect();
        let words = windows.iter().map(|[from, to]| format!("[\"{from}\", \"{to}\"]"));
        section.default("volume_windows", format!("[{}]", words.collect::<Vec<_>>().join(", ")));
        Some(windows)
    };
    if let (Some(starts), Some(windows)) = (starts, &windows) {
        check_windows(&section, WaterYearStart(starts), windows);
    }
    let outflow_before = read_befores(&mut section, "outflow_before", starts, before);
    let melt_shares_before = read_befores(&mut section, "melt_shares_before", starts, before);
    let arrival_volume_hm3 = read_arrival(&mut section);
    section.finish();
    Some(SeasonSettings {
        water_year_starts: WaterYearStart(starts?),
        survey_dates: surveys?,
        volume_windows: windows?,
        outflow_before: outflow_before?,
        melt_shares_before: melt_shares_before?,
        arrival_volume_hm3,
    })
}

/// A list of days before which something is summed, perhaps an empty one, or the usual days but the water year's first.
fn read_befores(
    section: &mut Section<'_>,
    key: &'static str,
    starts: Option<MonthDay>,
    usual: [&str; 2],
) -> Option<Vec<MonthDay>> {
    let usual = usual.into_iter().filter_map(MonthDay::parse).filter(|day| Some(*day) != starts);
    let usual: Vec<MonthDay> = usual.collect();
    let words: Vec<String> = usual.iter().map(|day| format!("\"{day}\"")).collect();
    let usual_words = format!("[{}]", words.join(", "));
    let Some(texts) = section.texts(key) else {
        if section.has(key) {
            return None;
        }
        section.default(key, usual_words);
        return Some(usual);
    };
    let mut days = Vec::with_capacity(texts.len());
    for (at, text) in texts.iter().enumerate() {
        let place = format!("{key}[{at}]");
        let Some(day) = section.parse_day(&place, text) else { continue };
        let found = if Some(day) == starts {
            format!("{day}, on which the water year starts")
        } else if days.contains(&day) {
            format!("{day} twice")
        } else {
            days.push(day);
            continue;
        };
        section.fault(Fault::key(
            section.path_of(&place),
            found,
            "a day after the water year's first, each once",
            format!("take it out, or write another day: usual is {key} = {usual_words}"),
        ));
    }
    (days.len() == texts.len()).then_some(days)
}

fn read_arrival(section: &mut Section<'_>) -> Option<f64> {
    const KEY: &str = "arrival_volume_hm3";
    let volume_hm3 = section.number(KEY)?;
    if volume_hm3 <= 0.0 {
        section.fault(Fault::key(
            section.path_of(KEY),
            volume_hm3,
            "a volume above 0 hm3",
            "state the water to wait for, in million cubic metres: a thousand acre-feet are 1.23348 hm3",
        ));
        return None;
    }
    Some(volume_hm3)
}

fn read_surveys(section: &Section<'_>, texts: &[String]) -> Option<Vec<MonthDay>> {
    let days: Vec<Option<MonthDay>> = texts
        .iter()
        .enumerate()
        .map(|(at, text)| section.parse_day(&format!("survey_dates[{at}]"), text))
        .collect();
    let days: Vec<MonthDay> = days.into_iter().collect::<Option<_>>()?;
    let repeated = days.iter().enumerate().find(|(at, day)| days[..*at].contains(day));
    if days.is_empty() || repeated.is_some() {
        section.fault(Fault::key(
            section.path_of("survey_dates"),
            repeated.map_or("an empty list".to_owned(), |(_, day)| format!("{day} twice")),
            "at least one day, each once",
            "the first is the headline's: survey_dates = [\"04-01\"]",
        ));
        return None;
    }
    Some(days)
}

/// Whether a window ends in the water year in which it begins.
fn fits(starts: WaterYearStart, [from, to]: [MonthDay; 2]) -> bool {
    let first = starts.first_day(2002);
    day_of_water_year(first, from) <= day_of_water_year(first, to)
}

fn check_windows(section: &Section<'_>, starts: WaterYearStart, windows: &[[MonthDay; 2]]) {
    for (at, [from, to]) in windows.iter().enumerate() {
        if !fits(starts, [*from, *to]) || windows[..at].contains(&[*from, *to]) {
            section.fault(Fault::key(
                section.path_of(&format!("volume_windows[{at}]")),
                format!("{from} to {to}"),
                format!("a window inside one water year, which starts on {}, each once", starts.0.words()),
                "put the earlier day first, and let the window end before the next water year",
            ));
        }
    }
}
