//! How much of the ground the snow covers: covered days, and the covered share on the survey dates.

use super::{Asked, BARE_MM, Kind, Measure, NONE, Peaks, SeasonSettings, name_of, rows};
use crate::calendar::day_of_water_year;
use crate::snow::YearBlock;

pub(super) fn list(settings: &SeasonSettings) -> Vec<Measure> {
    let on_dates = settings.survey_dates.iter().map(|day| {
        let title = format!("area under snow on {}", day.words());
        Measure::new(Kind::Share, format!("covered_{}_share", name_of(*day)), title)
    });
    [Measure::new(Kind::DayCount, "snow_covered_days", "days under snow")]
        .into_iter()
        .chain(on_dates)
        .collect()
}

/// Takes the family's measures: a place is covered where a day begins with at least 1 mm. Of an area it is the share that is
/// covered, and its covered days are those shares' sum over the year: the mean over the area of every place's days. None of
/// an area where the engine was not asked for its cover.
pub(super) fn take(block: &mut YearBlock, _: &Peaks, asked: &Asked, into: &mut [f64]) {
    let (width, means_at) = (block.width, block.means_at);
    let (days, on_dates) = into.split_at_mut(width);
    days.fill(0.0);
    let swe = &block.swe_mm[..block.days * width];
    rows::count_both(swe, swe, BARE_MM, days);
    let of_means = &mut days[means_at..];
    match block.covered.get(..block.days * (width - means_at)) {
        Some(covered) => {
            of_means.fill(0.0);
            rows::add(covered, of_means);
        }
        None => of_means.fill(NONE),
    }
    for (shares, survey) in on_dates.chunks_exact_mut(block.width).zip(&asked.settings.survey_dates) {
        let day = day_of_water_year(block.first, *survey) - 1;
        for (column, share) in shares.iter_mut().enumerate() {
            *share = block.covered_share(day, column).unwrap_or(NONE);
        }
    }
}
