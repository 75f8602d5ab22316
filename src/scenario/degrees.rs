//! A difference of temperature that may be typed in degC or, under a key of its own, in degF.

use super::section::Section;
use crate::fault::Fault;

/// A difference of 1 degC is one of so many degF.
pub(super) const FAHRENHEIT_PER_CELSIUS: f64 = 1.8;

/// Which of the two keys was typed.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Degrees {
    /// Neither.
    Neither,
    /// The one in degC.
    Celsius,
    /// The one in degF.
    Fahrenheit,
    /// Both, which is a fault and has been noted.
    Both,
}

/// Looks which of a key and its twin in degF was typed; both are known from then on.
pub(super) fn typed_degrees(
    section: &mut Section<'_>,
    in_celsius: &'static str,
    in_fahrenheit: &'static str,
) -> Degrees {
    section.knows(in_celsius);
    section.knows(in_fahrenheit);
    match [section.has(in_celsius), section.has(in_fahrenheit)] {
        [false, false] => Degrees::Neither,
        [true, false] => Degrees::Celsius,
        [false, true] => Degrees::Fahrenheit,
        [true, true] => {
            section.fault(Fault::key(
                section.path_of(in_fahrenheit),
                format!("{in_fahrenheit} beside {in_celsius}"),
                "one of the two",
                "take one of them out",
            ));
            Degrees::Both
        }
    }
}
