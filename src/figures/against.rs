//! How far modelled snow is from observed, in words.

use super::labels::{percent_size, size_and_unit};
use crate::fit::Bias;
use crate::units::UnitSystem;

/// `10 % below the observed`.
pub(super) fn against(bias: &Bias, units: UnitSystem) -> String {
    match bias.bias_pct {
        None => format!(
            "{} where {} were observed",
            size_and_unit(units, bias.modelled_mm),
            size_and_unit(units, bias.observed_mm)
        ),
        Some(percent) if percent_size(percent) == "0" => "as high as the observed".to_owned(),
        Some(percent) => {
            let direction = if percent < 0.0 { "below" } else { "above" };
            format!("{} % {direction} the observed", percent_size(percent))
        }
    }
}
