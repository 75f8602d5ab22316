//! The snow model's rules and options in words.

use super::numbers::stated;
use super::reader::Reader;
use crate::calendar::MONTHS;
use crate::snow::{PhaseRule, SnowParams};

/// How rain is told from snow.
pub(super) fn rain_or_snow(reader: Reader, snow: &SnowParams) -> String {
    let by = if snow.options.wet_bulb {
        "by the band's wet-bulb temperature at its pressure, the station's relative humidity holding everywhere and at \
         every level"
    } else {
        "by the band's daily mean temperature"
    };
    let degrees = |c: f64| reader.temperature(c);
    match snow.rain_snow {
        PhaseRule::Linear { snow_only_below_c, rain_only_above_c } => format!(
            "{by}: snow only below {}, rain only above {}, linear between",
            degrees(snow_only_below_c),
            degrees(rain_only_above_c)
        ),
        PhaseRule::Step { half_snow_at_c } => {
            format!("{by}: snow up to {}, rain above", degrees(half_snow_at_c))
        }
        PhaseRule::Tanh => {
            format!(
                "{by}, a smooth curve with half snow at {} (after Dai 2008)",
                degrees(snow.rain_snow.half_snow_c())
            )
        }
        PhaseRule::SCurve { half_snow_at_c, mixed_range_c } => format!(
            "{by}, a curve with half snow at {} and both over {} (after Kienzle 2008)",
            degrees(half_snow_at_c),
            reader.difference(mixed_range_c)
        ),
    }
}

/// The options that are on: what each is called, and what it does.
pub(super) fn options(reader: Reader, snow: &SnowParams) -> Vec<(&'static str, String)> {
    let options = &snow.options;
    let mut words = Vec::new();
    if let Some(radiation) = options.radiation {
        let full = snow.degree_day_factor_highest + radiation.factor_mm_per_c_day;
        words.push((
            "Radiation",
            format!(
                "melt goes with the day's potential clear-sky radiation on each band's slope (after Hock 1999): {} in the dark \
                 and under the year's highest sun on level ground; ground around throws no shadow",
                reader.degree_day_factors(snow.degree_day_factor_lowest, full)
            ),
        ));
    }
    if let Some(patchiness) = options.patchiness {
        words.push((
            "Patchy snow",
            format!(
                "snowfall within a band is lognormal with a coefficient of variation of {} where the band states none of its \
                 own, in {} classes of equal area",
                patchiness.coefficient_of_variation, patchiness.classes
            ),
        ));
    }
    if let Some(cold) = options.cold_content {
        words.push((
            "Cold content",
            format!(
                "a cold pack freezes what melts in it until it is at {}; its temperature closes {} % of its difference to the \
                 air each day",
                reader.temperature(0.0),
                stated(100.0 * cold.daily_share)
            ),
        ));
    }
    if let Some(loss) = options.sublimation {
        let by_day = by_month(reader, &loss.mm_per_day);
        let share = stated(100.0 * loss.snowfall_fraction);
        words.push(("Sublimation", format!("the air takes {by_day}, and {share} % of each day's snowfall")));
    }
    if options.start_bare_each_year {
        let words_of_it = "every water year begins without snow, whatever the year before left: that is taken \
                           away, is no part of water input, and is counted as snow taken away at the year's end"
            .to_owned();
        words.push(("Each year bare", words_of_it));
    }
    words
}

/// `0.3 mm a day from November to March`; `0.1 mm a day in January, 0.4 mm a day in July`.
fn by_month(reader: Reader, mm_per_day: &[f64; 12]) -> String {
    let lossy = |month: usize| mm_per_day[month % 12] > 0.0;
    let count = (0..12).filter(|month| lossy(*month)).count();
    let most_mm = mm_per_day.iter().copied().fold(0.0, f64::max);
    let is_one = (0..12).filter(|month| lossy(*month)).all(|month| mm_per_day[month] == most_mm);
    let starts: Vec<usize> = (0..12).filter(|month| lossy(*month) && !lossy(month + 11)).collect();
    let depth = reader.units.depth();
    let a_day = |mm: f64| format!("{} {} a day", stated(depth.of(mm)), depth.word);
    match starts.as_slice() {
        _ if count == 0 => "nothing by the day".to_owned(),
        [] if is_one => format!("{} in every month", a_day(most_mm)),
        [first] if is_one && count > 1 => {
            let last = (first + count - 1) % 12;
            format!("{} from {} to {}", a_day(most_mm), MONTHS[*first], MONTHS[last])
        }
        _ => {
            let months = (0..12).filter(|month| lossy(*month));
            let said = months.map(|month| format!("{} in {}", a_day(mm_per_day[month]), MONTHS[month]));
            said.collect::<Vec<_>>().join(", ")
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::calendar::{MonthDay, WaterYearStart};
    use crate::units::UnitSystem;

    #[test]
    fn losses_name_their_months() {
        let starts = WaterYearStart(MonthDay::new(10, 1).unwrap());
        let said = |losses: &[(usize, f64)]| {
            let mut months = [0.0; 12];
            losses.iter().for_each(|(month, mm)| months[*month] = *mm);
            by_month(Reader { units: UnitSystem::Metric, starts }, &months)
        };
        assert_eq!(said(&[]), "nothing by the day");
        let winter = [10, 11, 0, 1, 2].map(|month| (month, 0.3));
        assert_eq!(said(&winter), "0.3 mm a day from November to March");
        assert_eq!(said(&[4, 5, 6, 7, 8].map(|month| (month, 0.5))), "0.5 mm a day from May to September");
        assert_eq!(said(&[(0, 0.3)]), "0.3 mm a day in January");
        assert_eq!(said(&[(0, 0.04)]), "0.04 mm a day in January", "a small number is not 0");
        assert_eq!(said(&[(0, 0.3), (6, 0.3)]), "0.3 mm a day in January, 0.3 mm a day in July");
        assert_eq!(said(&[(0, 0.1), (1, 0.4)]), "0.1 mm a day in January, 0.4 mm a day in February");
        let every: Vec<(usize, f64)> = (0..12).map(|month| (month, 1.0)).collect();
        assert_eq!(said(&every), "1 mm a day in every month");
    }
}
