//! `[snow]`: parameters of the snow model.

use super::section::Section;
use super::snow_options;
use crate::snow::{DegreeRule, PhaseRule, RawSnow, SnowParams};

#[derive(Clone, Copy)]
enum PhaseWord {
    Linear,
    Step,
    Tanh,
    SCurve,
}

pub(super) fn read(mut section: Section<'_>, has_daily_range: bool, is_southern: bool) -> Option<SnowParams> {
    let is_wet_bulb = section.is_table("wet_bulb");
    let rain_snow = read_phase(section.section("rain_snow"), is_wet_bulb);
    let degree_rule =
        section.choice("degree_rule", &[("diurnal", DegreeRule::Diurnal), ("mean", DegreeRule::Mean)]);
    let mut factor = section.section("degree_day_factor_mm_per_c_day");
    let raw = RawSnow {
        rain_snow,
        degree_rule,
        factor_lowest: factor.number("lowest"),
        factor_highest: factor.number("highest"),
        highest_on: factor.day("highest_on"),
        melt_base_c: section.number("melt_base_c"),
        liquid_holding_fraction: section.number("liquid_holding_fraction"),
        refreeze_fraction: section.number("refreeze_fraction"),
        options: snow_options::read(&mut section, is_southern),
    };
    factor.finish();
    let checked = SnowParams::check(&raw, has_daily_range, is_southern);
    let snow = match checked {
        Ok((snow, unlikely)) => {
            section.notes.unlikely.borrow_mut().extend(unlikely);
            note_defaults(&section, &raw, &snow);
            Some(snow)
        }
        Err(faults) => {
            faults.into_iter().for_each(|fault| section.fault(fault));
            None
        }
    };
    section.finish();
    snow
}

/// The rule as it was typed; what it leaves out is the default of its kind, of the wet bulb where that tells rain from snow.
fn read_phase(mut section: Section<'_>, is_wet_bulb: bool) -> Option<PhaseRule> {
    let words = [
        ("linear", PhaseWord::Linear),
        ("step", PhaseWord::Step),
        ("tanh", PhaseWord::Tanh),
        ("s-curve", PhaseWord::SCurve),
    ];
    let Some(word) = section.choice("rule", &words) else {
        let has_numbers = ["snow_only_below_c", "rain_only_above_c", "half_snow_at_c", "mixed_range_c"]
            .into_iter()
            .any(|key| section.has(key));
        if has_numbers && !section.has("rule") {
            let expected = "\"linear\", \"step\", \"tanh\" or \"s-curve\"";
            section.required_text("rule", expected, "add rule = \"linear\"");
        }
        return None;
    };
    let default = match word {
        PhaseWord::Linear if is_wet_bulb => PhaseRule::LINEAR_WET_BULB,
        PhaseWord::Linear => PhaseRule::LINEAR,
        PhaseWord::Step => PhaseRule::STEP,
        PhaseWord::Tanh => PhaseRule::Tanh,
        PhaseWord::SCurve => PhaseRule::S_CURVE,
    };
    let mut number = |key: &'static str, default: f64| {
        section.number_or(key, default, f64::MIN..=f64::MAX, "degC of the daily mean")
    };
    let typed = match default {
        PhaseRule::Linear { snow_only_below_c, rain_only_above_c } => PhaseRule::Linear {
            snow_only_below_c: number("snow_only_below_c", snow_only_below_c),
            rain_only_above_c: number("rain_only_above_c", rain_only_above_c),
        },
        PhaseRule::Step { half_snow_at_c } => {
            PhaseRule::Step { half_snow_at_c: number("half_snow_at_c", half_snow_at_c) }
        }
        PhaseRule::Tanh => PhaseRule::Tanh,
        PhaseRule::SCurve { half_snow_at_c, mixed_range_c } => PhaseRule::SCurve {
            half_snow_at_c: number("half_snow_at_c", half_snow_at_c),
            mixed_range_c: number("mixed_range_c", mixed_range_c),
        },
    };
    section.finish();
    Some(typed)
}

fn note_defaults(section: &Section<'_>, raw: &RawSnow, snow: &SnowParams) {
    let rule = match snow.degree_rule {
        DegreeRule::Diurnal => "diurnal",
        DegreeRule::Mean => "mean",
    };
    let phase = match snow.rain_snow {
        PhaseRule::Linear { snow_only_below_c, rain_only_above_c } => format!(
            "{{ rule = \"linear\", snow_only_below_c = {snow_only_below_c}, rain_only_above_c = {rain_only_above_c} }}"
        ),
        PhaseRule::Step { half_snow_at_c } => {
            format!("{{ rule = \"step\", half_snow_at_c = {half_snow_at_c} }}")
        }
        PhaseRule::Tanh => "{ rule = \"tanh\" }".to_owned(),
        PhaseRule::SCurve { half_snow_at_c, mixed_range_c } => format!(
            "{{ rule = \"s-curve\", half_snow_at_c = {half_snow_at_c}, mixed_range_c = {mixed_range_c} }}"
        ),
    };
    let factor = "degree_day_factor_mm_per_c_day";
    let defaults = [
        (raw.rain_snow.is_none(), "rain_snow".to_owned(), phase),
        (raw.degree_rule.is_none(), "degree_rule".to_owned(), format!("{rule:?}")),
        (raw.factor_lowest.is_none(), format!("{factor}.lowest"), snow.degree_day_factor_lowest.to_string()),
        (
            raw.factor_highest.is_none(),
            format!("{factor}.highest"),
            snow.degree_day_factor_highest.to_string(),
        ),
        (raw.highest_on.is_none(), format!("{factor}.highest_on"), format!("\"{}\"", snow.highest_on)),
        (raw.melt_base_c.is_none(), "melt_base_c".to_owned(), snow.melt_base_c.to_string()),
        (
            raw.liquid_holding_fraction.is_none(),
            "liquid_holding_fraction".to_owned(),
            snow.liquid_holding_fraction.to_string(),
        ),
        (raw.refreeze_fraction.is_none(), "refreeze_fraction".to_owned(), snow.refreeze_fraction.to_string()),
    ];
    for (is_default, key, value) in defaults {
        if is_default {
            section.default_with(&key, value, snow.brings_default_of(&key));
        }
    }
}
