//! SWE on the survey dates, its peak and the peak's day.

use super::{LEAST_PEAK_MM, Measure, NONE, Peaks, SeasonSettings};
use crate::calendar::day_of_water_year;
use crate::snow::YearBlock;

pub(super) fn list(settings: &SeasonSettings) -> Vec<Measure> {
    let surveys = settings.survey_dates.iter().map(|day| {
        let name = day.to_string().replace('-', "_");
        Measure::amount(format!("swe_{name}_mm"), format!("{} SWE", day.words()))
    });
    surveys
        .chain([
            Measure::amount("peak_swe_mm".to_owned(), "peak SWE".to_owned()),
            Measure::date("peak_day", "day of peak SWE"),
        ])
        .collect()
}

pub(super) fn take(block: &mut YearBlock, peaks: &Peaks, settings: &SeasonSettings, into: &mut [f64]) {
    let (surveys, rest) = into.split_at_mut(settings.survey_dates.len() * block.width);
    for (row, survey) in surveys.chunks_exact_mut(block.width).zip(&settings.survey_dates) {
        let day = day_of_water_year(block.first, *survey) - 1;
        row.copy_from_slice(block.row(&block.swe_mm, day));
    }
    let (peak, day) = rest.split_at_mut(block.width);
    peak.copy_from_slice(&peaks.swe_mm);
    for ((day, peak_day), peak) in day.iter_mut().zip(&peaks.day).zip(&peaks.swe_mm) {
        *day = if *peak >= LEAST_PEAK_MM { *peak_day } else { NONE };
    }
}
