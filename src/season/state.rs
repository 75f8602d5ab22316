//! SWE on the survey dates, its peak and the peak's day, and what both say together; the year's SWE area.

use super::{Asked, Kind, LEAST_PEAK_MM, Measure, NONE, Peaks, SeasonSettings, name_of, rows};
use crate::calendar::day_of_water_year;
use crate::snow::YearBlock;

pub(super) fn list(settings: &SeasonSettings) -> Vec<Measure> {
    let surveys = || settings.survey_dates.iter();
    let on_dates = surveys().enumerate().map(|(number, day)| {
        let name = format!("swe_{}_mm", name_of(*day));
        let measure = Measure::new(Kind::AmountMm, name, format!("{} SWE", day.words()));
        if number == 0 { measure.told_with_extremes() } else { measure }
    });
    let over_peak = surveys().map(|day| {
        let title = format!("{} SWE over the peak", day.words());
        Measure::new(Kind::Share, format!("swe_{}_over_peak", name_of(*day)), title)
    });
    on_dates
        .chain([
            Measure::new(Kind::AmountMm, "peak_swe_mm", "peak SWE"),
            Measure::new(Kind::DayOfWaterYear, "peak_day", "day of peak SWE"),
            Measure::new(Kind::AmountMmDays, "swe_area_mm_days", "SWE area"),
        ])
        .chain(over_peak)
        .collect()
}

/// Takes the family's measures. The SWE area is the sum of SWE over the year's days, the storage-time integral of Aragon
/// & Hill (2024, HESS 28:781).
pub(super) fn take(block: &mut YearBlock, peaks: &Peaks, asked: &Asked, into: &mut [f64]) {
    let width = block.width;
    let dates = asked.settings.survey_dates.len();
    let (surveys, rest) = into.split_at_mut(dates * width);
    for (row, survey) in surveys.chunks_exact_mut(width).zip(&asked.settings.survey_dates) {
        let day = day_of_water_year(block.first, *survey) - 1;
        row.copy_from_slice(block.row(&block.swe_mm, day));
    }
    let (peak, rest) = rest.split_at_mut(width);
    peak.copy_from_slice(&peaks.swe_mm);
    let (day, rest) = rest.split_at_mut(width);
    for ((day, peak_day), peak) in day.iter_mut().zip(&peaks.day).zip(&peaks.swe_mm) {
        *day = if *peak >= LEAST_PEAK_MM { *peak_day } else { NONE };
    }
    let (area, over_peak) = rest.split_at_mut(width);
    area.fill(0.0);
    rows::add(&block.swe_mm[..block.days * width], area);
    for (shares, survey) in over_peak.chunks_exact_mut(width).zip(surveys.chunks_exact(width)) {
        for ((share, survey), peak) in shares.iter_mut().zip(survey).zip(&peaks.swe_mm) {
            *share = if *peak >= LEAST_PEAK_MM { survey / peak } else { NONE };
        }
    }
}
