//! Dry and warm years: of the realizations by level, and of the record by period; and kinds of snow drought.

use super::cells::{chance, estimate, finish, optional, write, yes_or_no};
use crate::findings::{Coincidence, Counted, Depends, PeriodCoincidence, RecordCoincidence, SnowDroughts};
use crate::units::UnitSystem;
use csv::Writer;

/// One row a level.
pub(super) fn dry_and_warm(found: &Coincidence, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let mut header = vec![format!("level_{}", units.warming().suffix)];
    for cell in ["dry_warm", "dry_cool", "wet_warm", "wet_cool"] {
        header.push(format!("years_{cell}"));
        header.extend(of_chance(&format!("chance_{cell}")));
    }
    header.extend(of_estimate("dependence"));
    header.extend(of_estimate("own_medians_dependence"));
    header.push("own_medians_depends".to_owned());
    header.push("low_snow_below_quantile".to_owned());
    header.extend(of_chance("low_snow_given_dry_warm"));
    header.extend(of_chance("low_snow_given_dry_cool"));
    header.extend(of_estimate("low_snow_ratio"));
    write(&mut writer, &header);
    for level in &found.levels {
        let cells = [
            (level.years.dry_warm, level.dry_warm),
            (level.years.dry_cool, level.dry_cool),
            (level.years.wet_warm, level.wet_warm),
            (level.years.wet_cool, level.wet_cool),
        ];
        let mut row = vec![units.warming().of(level.level_c).to_string()];
        for (years, of_cell) in cells {
            row.push(years.to_string());
            row.extend(chance(of_cell));
        }
        row.extend(estimate(level.dependence));
        row.extend(estimate(level.own_medians.dependence));
        let depends = match level.own_medians.depends {
            Depends::MoreOften => "more often",
            Depends::LessOften => "less often",
            Depends::CannotTell => "cannot tell",
        };
        row.push(depends.to_owned());
        row.push(found.low_snow_below_quantile.to_string());
        row.extend(chance(level.low_snow_given_dry.warm));
        row.extend(chance(level.low_snow_given_dry.cool));
        row.extend(estimate(level.low_snow_given_dry.ratio));
        write(&mut writer, &row);
    }
    finish(writer)
}

fn of_estimate(name: &str) -> [String; 2] {
    [name.to_owned(), format!("{name}_monte_carlo_error")]
}

fn of_chance(name: &str) -> [String; 3] {
    [name.to_owned(), format!("{name}_monte_carlo_error"), format!("{name}_bound")]
}

/// The whole record, and where two periods are compared one row each.
pub(super) fn dry_and_warm_record(found: &RecordCoincidence) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let header = [
        "period",
        "first_year",
        "last_year",
        "years_dry_warm",
        "years_dry_cool",
        "years_wet_warm",
        "years_wet_cool",
        "share_dry_warm",
        "share_dry_warm_wilson_low",
        "share_dry_warm_wilson_high",
        "dependence",
        "fisher_p",
        "low_snow_below_quantile",
        "low_snow_given_dry_warm",
        "low_snow_given_dry_warm_wilson_low",
        "low_snow_given_dry_warm_wilson_high",
        "low_snow_given_dry_cool",
        "low_snow_given_dry_cool_wilson_low",
        "low_snow_given_dry_cool_wilson_high",
        "low_snow_ratio",
        "ratio_to_earlier",
        "apart_from_earlier",
    ];
    write(&mut writer, &header.map(str::to_owned));
    let blank = |count| std::iter::repeat_n(String::new(), count);
    let years = found.years;
    let mut row: Vec<String> = ["record", "", ""].map(str::to_owned).to_vec();
    row.extend(
        [years.dry_warm, years.dry_cool, years.wet_warm, years.wet_cool].map(|count| count.to_string()),
    );
    row.extend(counted(found.dry_warm));
    row.extend([found.dependence, found.fisher_p].map(optional));
    row.push(found.low_snow_below_quantile.to_string());
    row.extend(counted(found.low_snow_given_dry_warm));
    row.extend(counted(found.low_snow_given_dry_cool));
    row.push(optional(found.low_snow_ratio));
    row.extend(blank(2));
    write(&mut writer, &row);
    if let Some(periods) = found.periods {
        let of = |name: &str, period: PeriodCoincidence| {
            let years = period.years;
            let mut row = vec![name.to_owned(), period.first_year.to_string(), period.last_year.to_string()];
            let counts = [years.dry_warm, years.dry_cool, years.wet_warm, years.wet_cool];
            row.extend(counts.map(|count| count.to_string()));
            row.extend(counted(period.dry_warm));
            row.extend(blank(10));
            row
        };
        let mut earlier = of("earlier", periods.earlier);
        earlier.extend(blank(2));
        write(&mut writer, &earlier);
        let mut later = of("later", periods.later);
        later.extend([optional(periods.ratio), yes_or_no(periods.are_apart)]);
        write(&mut writer, &later);
    }
    finish(writer)
}

fn counted(counted: Counted) -> [String; 3] {
    let end = |at: usize| optional(counted.wilson.map(|ends| ends[at]));
    [optional(counted.share), end(0), end(1)]
}

/// One row a level.
pub(super) fn snow_droughts(found: &SnowDroughts, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let mut header: Vec<String> = vec![format!("level_{}", units.warming().suffix)];
    header.extend(["years", "dry_drought_years", "warm_drought_years"].map(str::to_owned));
    header.extend(of_chance("chance_dry_drought"));
    header.extend(of_chance("chance_warm_drought"));
    header.extend(of_chance("warm_share"));
    write(&mut writer, &header);
    for level in &found.levels {
        let mut row = vec![units.warming().of(level.level_c).to_string()];
        row.extend([level.years, level.dry_years, level.warm_years].map(|years| years.to_string()));
        for of_kind in [level.dry, level.warm, level.warm_share] {
            row.extend(chance(of_kind));
        }
        write(&mut writer, &row);
    }
    finish(writer)
}
