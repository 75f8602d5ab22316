//! `[season]`: where the water year begins, when snow is surveyed, which windows count.

use super::section::Section;
use crate::calendar::{MonthDay, WaterYearStart, day_of_water_year};
use crate::fault::Fault;
use crate::season::SeasonSettings;

pub(super) fn read(mut section: Section<'_>, is_southern: bool) -> Option<SeasonSettings> {
    let (start, survey, window) = if is_southern {
        ("04-01", "10-01", ["10-01", "01-31"])
    } else {
        ("10-01", "04-01", ["04-01", "07-31"])
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
    section.finish();
    Some(SeasonSettings {
        water_year_starts: WaterYearStart(starts?),
        survey_dates: surveys?,
        volume_windows: windows?,
    })
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
