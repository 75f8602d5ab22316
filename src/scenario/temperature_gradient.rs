//! `temperature_gradient_c_per_km`: one for the day's minimum and maximum, or one for each.

use super::section::Section;
use crate::basin::TemperatureGradient;
use crate::fault::Fault;

const BOTH: &str = "temperature_gradient_c_per_km";
const MINIMA: &str = "tmin_temperature_gradient_c_per_km";
const MAXIMA: &str = "tmax_temperature_gradient_c_per_km";

/// Near-surface gradients outside this range are unusual (Minder, Mote & Lundquist 2010), degC per km.
const USUAL_C_PER_KM: std::ops::RangeInclusive<f64> = -8.0..=-2.0;

/// The gradient; a fault where minima or maxima have none, and where all three keys stand there, so that one says nothing.
pub(super) fn read_temperature_gradient(section: &mut Section<'_>) -> Option<TemperatureGradient> {
    let is_typed = [BOTH, MINIMA, MAXIMA].map(|key| section.has(key));
    match is_typed {
        [true, true, true] => {
            [BOTH, MINIMA, MAXIMA].into_iter().for_each(|key| section.knows(key));
            section.fault(Fault::key(
                section.path_of(BOTH),
                format!("{BOTH} beside {MINIMA} and {MAXIMA}"),
                "one for both, or one for each",
                format!("take {BOTH} out: the other two stand for all"),
            ));
            return None;
        }
        [false, false, false] => {
            let mend = format!(
                "add it: negative, since it is colder higher up; -6 where you know nothing better (the standard \
                 atmosphere has -6.5). Twelve numbers give one a month, January first; {MINIMA} and {MAXIMA} part minima \
                 from maxima"
            );
            section.missing(BOTH, "one number, or twelve", &mend);
        }
        [false, true, false] => complain_of_the_other(section, MINIMA, MAXIMA, "maxima"),
        [false, false, true] => complain_of_the_other(section, MAXIMA, MINIMA, "minima"),
        _ => {}
    }
    let both = gradient(section, BOTH);
    let [tmin_c_per_km, tmax_c_per_km] = [MINIMA, MAXIMA].map(|key| {
        let own = gradient(section, key);
        if section.has(key) { own } else { both }
    });
    Some(TemperatureGradient { tmin_c_per_km: tmin_c_per_km?, tmax_c_per_km: tmax_c_per_km? })
}

/// A gradient for minima alone, or for maxima alone, leaves the others without one.
fn complain_of_the_other(section: &Section<'_>, typed: &str, missing: &str, of_which: &str) {
    let mend = format!("add {missing}, or {BOTH}, which holds for those that have none of their own");
    section.missing(missing, &format!("a gradient of {of_which}, too, beside {typed}"), &mend);
}

/// One negative number, or twelve of any sign (inversions make a month positive).
fn gradient(section: &mut Section<'_>, key: &'static str) -> Option<[f64; 12]> {
    let apart = format!("minima and maxima of their own: {MINIMA} and {MAXIMA}");
    let months = section.one_or_monthly(key, &apart)?;
    let is_one = months.iter().all(|value| *value == months[0]);
    if is_one && months[0] > 0.0 {
        section.fault(Fault::key(
            section.path_of(key),
            months[0],
            "a negative number, since it is colder higher up",
            format!("did you mean {}?", -months[0]),
        ));
        return None;
    }
    if months.iter().any(|value| !(-12.0..=12.0).contains(value)) {
        section.fault(Fault::key(
            section.path_of(key),
            format!("{months:?}"),
            "gradients from -12 to 12 degC per km",
            "it is degC per km, not per 100 m",
        ));
        return None;
    }
    if months.iter().any(|value| !USUAL_C_PER_KM.contains(value)) {
        section.unlikely(
            key,
            "outside -8 to -2 degC per km, the usual range near the ground (Minder, Mote & Lundquist 2010)",
        );
    }
    Some(months)
}
