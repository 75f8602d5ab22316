//! The headline and melt-out under other rules.

use super::cells::{Told, estimate, finish, name, optional, outweighs, unit_names, write};
use crate::figures::rule_in_words;
use crate::findings::{Estimate, PanelRule, RulePanel, Weight};
use crate::season::Kind;
use crate::units::UnitSystem;
use csv::Writer;

/// One row a rule, measure and level but the reference; numbers in the measure's own unit, which stands in a column.
pub(super) fn rule_panel(panel: &RulePanel, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let (depth, factor, warming) = (units.depth(), units.degree_day_factor(), units.warming());
    let header = [
        "rule".to_owned(),
        "tuned".to_owned(),
        "catch_factor".to_owned(),
        "melt_factor".to_owned(),
        "gauge_multiplier_snow".to_owned(),
        format!("degree_day_factor_lowest_{}", factor.suffix),
        format!("degree_day_factor_highest_{}", factor.suffix),
        format!("radiation_factor_{}", factor.suffix),
        format!("mean_peak_swe_{}", depth.suffix),
        format!("target_mean_peak_swe_{}", depth.suffix),
        "median_melt_out_day".to_owned(),
        "target_median_melt_out_day".to_owned(),
        "realizations".to_owned(),
        "realizations_of_study".to_owned(),
        "measure".to_owned(),
        "unit".to_owned(),
        "unit_of_change".to_owned(),
        "reference_q05".to_owned(),
        "reference_median".to_owned(),
        "reference_q95".to_owned(),
        format!("level_{}", warming.suffix),
        "shift".to_owned(),
        "shift_monte_carlo_error".to_owned(),
        "shift_q05".to_owned(),
        "shift_q95".to_owned(),
        "shift_pairs".to_owned(),
        "shift_pairs_without_value".to_owned(),
        "change_pct".to_owned(),
        "signal_to_half_spread".to_owned(),
        "signal_to_half_spread_monte_carlo_error".to_owned(),
        "verdict".to_owned(),
        "outweighs".to_owned(),
        format!("outweighs_from_{}", warming.suffix),
        format!("outweighs_until_{}", warming.suffix),
        format!("outweighs_from_q05_{}", warming.suffix),
        format!("outweighs_from_q95_{}", warming.suffix),
    ];
    write(&mut writer, &header);
    let day = Told { units, kind: Kind::DayOfWaterYear };
    for (at, rule) in panel.rules.iter().enumerate() {
        let of_rule = |fit: crate::findings::Fit| {
            [depth.of(fit.mean_peak_swe_mm).to_string(), day.outcome(fit.median_melt_out_day)]
        };
        let ([peak, melt_out], [target_peak, target_melt_out]) =
            (of_rule(rule.tuned.fit), of_rule(panel.target));
        for found in &panel.measures {
            let Some(of_rule) = found.rules.get(at) else { continue };
            let told = Told { units, kind: found.measure.kind };
            let [unit, unit_of_change] = unit_names(found.measure.kind, units);
            let spread = of_rule.precipitation_spread;
            for level in &of_rule.levels {
                let mut row = vec![
                    rule_in_words(rule.rule, units),
                    tuned(panel, rule).to_owned(),
                    rule.tuned.catch_factor.to_string(),
                    rule.tuned.melt_factor.to_string(),
                    rule.gauge_multiplier_snow.to_string(),
                    factor.of(rule.degree_day_factors[0]).to_string(),
                    factor.of(rule.degree_day_factors[1]).to_string(),
                    optional(rule.radiation_factor.map(|radiation| factor.of(radiation))),
                    peak.clone(),
                    target_peak.clone(),
                    melt_out.clone(),
                    target_melt_out.clone(),
                    panel.realizations.to_string(),
                    panel.realizations_of_study.to_string(),
                    name(&found.measure, units),
                    unit.to_owned(),
                    unit_of_change.to_owned(),
                ];
                let quantiles = spread.map(|spread| [spread.q05, spread.q50, spread.q95]);
                row.extend([0, 1, 2].map(|at| told.change(quantiles.map(|quantiles| quantiles[at]))));
                row.push(warming.of(level.level_c).to_string());
                let shift = level.shift;
                let median = shift.map(|shift| Estimate {
                    value: told.in_units(shift.median.value),
                    monte_carlo_error: shift.median.monte_carlo_error.map(|error| told.in_units(error)),
                });
                row.extend(estimate(median));
                row.extend(
                    [shift.map(|shift| shift.q05), shift.map(|shift| shift.q95)].map(|end| told.change(end)),
                );
                let pairs = shift.map(|shift| [shift.pairs, shift.pairs_without_value]);
                row.extend([0, 1].map(|at| pairs.map_or(String::new(), |pairs| pairs[at].to_string())));
                row.push(optional(level.percent_change));
                row.extend(estimate(level.signal_to_spread));
                row.push(verdict(level.weight).to_owned());
                row.extend(outweighs(of_rule.outweighs, units));
                let range = of_rule.outweighs_range.map(|range| [range.q05_c, range.q95_c]);
                let end = |at: usize| range.and_then(|range| range[at]).map(|at_c| warming.of(at_c));
                row.extend([0, 1].map(|at| optional(end(at))));
                write(&mut writer, &row);
            }
        }
    }
    finish(writer)
}

fn tuned(panel: &RulePanel, rule: &PanelRule) -> &'static str {
    match (rule.tuned.is_tuned, panel.is_tuned_to_peak_alone) {
        (true, false) => "yes",
        (true, true) => "to the peak alone",
        (false, _) => "no",
    }
}

/// As the table says it.
fn verdict(weight: Weight) -> &'static str {
    match weight {
        Weight::Outweighs => "outweighs",
        Weight::DoesNotOutweigh => "does not outweigh",
        Weight::CannotTell => "cannot tell",
        Weight::NoRatio => "no ratio or no error of it",
    }
}
