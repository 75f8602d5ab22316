//! A step in the record's temperatures, beside the halves that they are split by: a changed sensor may look like another climate.

use super::super::reader::Reader;
use super::super::trends::step_in_words;
use crate::baseline::YearlyTests;
use crate::fit::{Split, Winter, winters_of};

/// `The station's cool-season temperature has a step: …`, and how many winters of either half lie before it; nothing where the
/// record has no step.
pub(super) fn temperature_step(
    reader: Reader,
    cool_temperature: Option<&YearlyTests>,
    winters: &[Winter],
) -> Option<String> {
    let tests = cool_temperature.filter(|tests| tests.pettitt.is_significant())?;
    let before = |split: Split| {
        let is_in = winters_of(split, winters);
        let of_half = || winters.iter().zip(&is_in).filter(|(_, is_in)| **is_in).map(|(winter, _)| winter);
        let early = of_half().filter(|winter| winter.water_year <= tests.pettitt.last_year_before).count();
        (early, of_half().count())
    };
    let ((cold_early, cold), (warm_early, warm)) = (before(Split::Coldest), before(Split::Warmest));
    Some(format!(
        "The station's cool-season temperature: {}. Before it lie {cold_early} of the {cold} coldest winters and {warm_early} of the \
         {warm} warmest. If a sensor or its place changed then, what is lost from one half to the other is in part the sensor's, and \
         fitted temperatures belong to both sensors at once.",
        step_in_words(reader, tests)
    ))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::calendar::{MonthDay, WaterYearStart};
    use crate::units::UnitSystem;
    use std::collections::BTreeMap;

    fn of(step_c: f64) -> Option<String> {
        // No two years alike, so that ranks have no ties: 0.01 degC apart, up and down.
        let mean_c =
            |year: i32| f64::from((year - 1990) * 7 % 20) * 0.01 + if year > 1999 { step_c } else { 0.0 };
        let yearly: BTreeMap<i32, f64> = (1990..2010).map(|year| (year, mean_c(year))).collect();
        let winters: Vec<Winter> = yearly
            .iter()
            .map(|(year, mean_c)| Winter {
                water_year: *year,
                mean_c: *mean_c,
                cool_season_mm: 300.0,
                is_observed: *year != 1990,
            })
            .collect();
        let yearly: Vec<(i32, f64)> = yearly.into_iter().collect();
        let starts = WaterYearStart(MonthDay::new(10, 1).unwrap());
        let reader = Reader { units: UnitSystem::Metric, starts };
        temperature_step(reader, YearlyTests::of(&yearly).as_ref(), &winters)
    }

    /// By hand: the ups and downs are 0.115 degC after the step and 0.075 before it, on average; 19 winters with snow, of which 9 lie before the step and are the coldest; the tenth of the coldest half lies after it.
    #[test]
    fn a_step_parts_the_halves() {
        let text = of(2.0).unwrap();
        assert!(text.contains("a step after 1999, by +2.04 °C"), "{text}");
        assert!(text.contains("9 of the 10 coldest winters and 0 of the 9 warmest"), "{text}");
    }

    #[test]
    fn without_a_step_nothing_is_said() {
        assert_eq!(of(0.0), None);
    }
}
