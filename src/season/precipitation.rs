//! Snow and rain against each other and against what lies: snowfall fraction, survey SWE over precipitation, rain on snow,
//! and all that fell before a survey.

use super::sums::Sums;
use super::{Asked, Kind, Measure, NONE, Peaks, RAIN_ON_SNOW_MM, SeasonSettings, name_of, rows};
use crate::calendar::{MonthDay, day_of_water_year};
use crate::snow::YearBlock;

pub(super) fn list(settings: &SeasonSettings) -> Vec<Measure> {
    let since = settings.water_year_starts.0.words();
    let over_precipitation = settings.survey_dates.iter().map(|day| {
        let title = format!("{} SWE over precipitation since {since}", day.words());
        Measure::new(Kind::Share, format!("swe_{}_over_precipitation", name_of(*day)), title)
    });
    let has_season = |(_, day): &(usize, &MonthDay)| **day != settings.water_year_starts.0;
    let before = settings.survey_dates.iter().enumerate().filter(has_season).map(|(number, day)| {
        let title = format!("precipitation before {}", day.words());
        let measure = Measure::new(Kind::AmountMm, precipitation_before(*day), title).of_basin();
        if number == 0 { measure.told_with_extremes() } else { measure }
    });
    [
        Measure::new(Kind::Share, "snowfall_fraction", "snowfall fraction"),
        Measure::new(Kind::DayCount, "rain_on_snow_days", "days of rain on snow"),
    ]
    .into_iter()
    .chain(over_precipitation)
    .chain(before)
    .collect()
}

/// The name of the measure of all that fell before a survey date.
pub fn precipitation_before(survey: MonthDay) -> String {
    format!("precipitation_before_{}_mm", name_of(survey))
}

/// Takes the family's measures. SWE that lay as the water year began counts in the survey's, so that its share of the
/// year's precipitation may stand above 1.
pub(super) fn take(block: &mut YearBlock, _: &Peaks, asked: &Asked, into: &mut [f64]) {
    let (width, days) = (block.width, block.days);
    let day_of = |survey| day_of_water_year(block.first, survey) - 1;
    let surveys: Vec<usize> = asked.settings.survey_dates.iter().map(|survey| day_of(*survey)).collect();
    let [rain, snow] = [&block.rain_mm[..days * width], &block.snow_mm[..days * width]];
    let of_rain = Sums::of(rain, width, surveys.iter().copied());
    let of_snow = Sums::of(snow, width, surveys.iter().copied());

    let (fraction, rest) = into.split_at_mut(width);
    let mut fallen = vec![0.0; width];
    fraction.fill(0.0);
    of_snow.add(0, days, fraction);
    of_rain.add(0, days, &mut fallen);
    for (fraction, rain) in fraction.iter_mut().zip(&fallen) {
        *fraction = over(*fraction, *fraction + rain);
    }

    let (rain_on_snow, over_precipitation) = rest.split_at_mut(width);
    rain_on_snow.fill(0.0);
    rows::count_both(rain, &block.swe_mm[..days * width], RAIN_ON_SNOW_MM, rain_on_snow);

    let (over_precipitation, before) = over_precipitation.split_at_mut(surveys.len() * width);
    let mut before = before.chunks_exact_mut(width);
    for (shares, day) in over_precipitation.chunks_exact_mut(width).zip(surveys) {
        fallen.fill(0.0);
        of_snow.add(0, day, &mut fallen);
        of_rain.add(0, day, &mut fallen);
        for ((share, fallen), swe) in shares.iter_mut().zip(&fallen).zip(block.row(&block.swe_mm, day)) {
            *share = over(*swe, *fallen);
        }
        // A survey on the water year's first day has no season before it.
        if day > 0
            && let Some(before) = before.next()
        {
            before.copy_from_slice(&fallen);
        }
    }
}

/// A part over a whole; none of nothing.
fn over(part: f64, whole: f64) -> f64 {
    if whole > 0.0 { part / whole } else { NONE }
}
