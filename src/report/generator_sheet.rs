//! The generator sheet in words: what the page and the terminal both say of it.

use super::numbers::{DASH, counted, fixed, trimmed};
use super::reader::Reader;
use crate::findings::{GeneratorSheet, Quantity, SheetLine, SheetStatistic, Subject, Verdict};
use crate::perturb::{AmountLaw, ChainOrder, Fitted, FittedMonth};

/// A number of the sheet in the reader's units, without its unit.
fn bare(reader: Reader, quantity: Quantity, value: f64) -> String {
    let units = reader.units;
    match quantity {
        Quantity::DepthMm => reader.amount_bare(value),
        Quantity::Share => fixed(100.0 * value, 0),
        Quantity::Days => fixed(value, 1),
        Quantity::Years => trimmed(&fixed(value, 1)).to_owned(),
        Quantity::TemperatureC => fixed(units.temperature().of(value), 1),
        Quantity::DifferenceC => fixed(units.warming().of(value), 1),
        Quantity::Correlation => fixed(value, 2),
    }
}

/// The unit behind it, with the blank between them.
fn unit(reader: Reader, quantity: Quantity) -> String {
    match quantity {
        Quantity::DepthMm => format!(" {}", reader.units.depth().word),
        Quantity::Share => " %".to_owned(),
        Quantity::Days => " days".to_owned(),
        Quantity::Years => " years".to_owned(),
        Quantity::TemperatureC => format!(" {}", reader.units.temperature().word),
        Quantity::DifferenceC => format!(" {}", reader.units.warming().word),
        Quantity::Correlation => String::new(),
    }
}

/// One line of the sheet as its cells.
pub(super) struct Cells {
    /// `mean, cool season`.
    pub name: String,
    /// Of the record, with its unit.
    pub record: String,
    /// The realizations' median.
    pub median: String,
    /// `310 to 402`.
    pub range: String,
    /// `within`, `below`, `above`; nothing where the line is not judged.
    pub verdict: &'static str,
}

impl Cells {
    pub fn of(statistic: &SheetStatistic, line: &SheetLine, reader: Reader) -> Self {
        let quantity = statistic.quantity;
        let told = |value: Option<f64>| value.map_or(DASH.to_owned(), |value| bare(reader, quantity, value));
        let words = statistic.statistic.words();
        Self {
            name: if statistic.lines.len() > 1 {
                format!("{words}, {}", line.period.words())
            } else {
                words.to_owned()
            },
            record: line.record.map_or(DASH.to_owned(), |value| {
                format!("{}{}", bare(reader, quantity, value), unit(reader, quantity))
            }),
            median: told(line.range.map(|range| range.q50)),
            range: line.range.map_or(DASH.to_owned(), |range| {
                format!("{} to {}", bare(reader, quantity, range.q05), bare(reader, quantity, range.q95))
            }),
            verdict: line.verdict.map_or("", Verdict::words),
        }
    }
}

/// How the sheet was made, and how much of it is as it should be.
pub(super) fn sentences(sheet: &GeneratorSheet, reader: Reader) -> Vec<String> {
    let survey = sheet.survey.words();
    let mut said = vec![format!(
        "The record is held against {} of {}, as many as it has in use, made for this sheet: without an assumed change of \
         mean precipitation, snow modelled at the reference, {survey} SWE of the basin mean. A day with more than {} is a wet \
         one; 29 February is left out.",
        counted(sheet.realizations, "realization"),
        counted(sheet.years, "year"),
        reader.limit(sheet.wet_day_mm),
    )];
    if sheet.lines_judged == 0 {
        said.push("So few realizations have no 5\u{2013}95 % range: no line is judged.".to_owned());
    } else {
        said.push(format!(
            "Of {} that {} judged, {} outside the realizations' 5\u{2013}95 % range; were the record one more realization, \
             chance would put about {} there. Realizations are made from this record and centre on it, so that fewer is usual \
             and more speaks against what makes them. Lines hang together, as the months of one statistic do: a whole row \
             outside tells more than a count.",
            counted(sheet.lines_judged, "line"),
            if sheet.lines_judged == 1 { "is" } else { "are" },
            match sheet.lines_outside {
                0 => "none lies".to_owned(),
                1 => "1 lies".to_owned(),
                many => format!("{} lie", fixed(many as f64, 0)),
            },
            fixed(sheet.outside_by_chance, 0),
        ));
        said.push(snow_mismatch(sheet, reader).unwrap_or_else(|| {
            format!(
                "{survey} SWE modelled from the weather that was made is like that modelled from the record."
            )
        }));
    }
    if let (Some(record), Some(realizations)) =
        (sheet.largest_day_mm.record, sheet.largest_day_mm.realizations)
    {
        said.push(format!(
            "The largest day of the record has {}, that of all realizations {}, out of {} times as many years.",
            reader.amount(record),
            reader.amount(realizations),
            fixed(sheet.realizations as f64, 0),
        ));
    }
    said.extend(sheet.fitted.as_ref().map(|fitted| fitted_in_words(fitted, reader)));
    said
}

/// What was fitted, month by month.
fn fitted_in_words(fitted: &Fitted, reader: Reader) -> String {
    let months = |what: &str, is_one: &dyn Fn(&FittedMonth) -> bool| {
        let count = fitted.months.iter().filter(|month| is_one(month)).count();
        (count > 0).then(|| format!("{what} in {}", counted(count, "month")))
    };
    let both = |parts: [Option<String>; 2]| parts.into_iter().flatten().collect::<Vec<_>>().join(" and ");
    format!(
        "Fitted to the record: whether a day is wet, that is above {}, hangs {}; amounts are {}, each by the Bayesian \
         information criterion.",
        reader.limit(fitted.wet_above_mm),
        both([
            months("on the day before", &|month| month.chain_order == ChainOrder::First),
            months("on the two days before", &|month| month.chain_order == ChainOrder::Second),
        ]),
        both([
            months("gamma", &|month| matches!(month.amounts, AmountLaw::Gamma { .. })),
            months("mixed exponential", &|month| matches!(month.amounts, AmountLaw::MixedExponential { .. })),
        ]),
    )
}

/// Where survey-date SWE from the weather that was made is not like that from the record, with its numbers; nothing where it
/// is, or where it is not judged.
pub(super) fn snow_mismatch(sheet: &GeneratorSheet, reader: Reader) -> Option<String> {
    let of = |statistic: &SheetStatistic| {
        let outside = statistic.lines.iter().find(|line| line.is_outside())?;
        let cells = Cells::of(statistic, outside, reader);
        Some(format!(
            "{} {} from the record, {} in 9 of 10 realizations",
            cells.name, cells.record, cells.range
        ))
    };
    let outside: Vec<String> = sheet.about(Subject::SurveySwe).filter_map(of).collect();
    (!outside.is_empty()).then(|| {
        format!(
            "{} SWE modelled from the weather that was made is not like that modelled from the record: {}.",
            sheet.survey.words(),
            outside.join("; ")
        )
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::calendar::{MonthDay, WaterYearStart};
    use crate::findings::{LargestDay, Period, RealizationRange, Statistic};
    use crate::units::UnitSystem;

    fn day(month: u32, day: u32) -> MonthDay {
        MonthDay::new(month, day).unwrap()
    }

    fn reader(units: UnitSystem) -> Reader {
        Reader { units, starts: WaterYearStart(day(10, 1)) }
    }

    /// A sheet of the survey's mean and standard deviation.
    fn sheet(mean_mm: f64, mean: Verdict, deviation: Verdict) -> GeneratorSheet {
        let of = |statistic: Statistic, record: f64, verdict: Verdict| SheetStatistic {
            subject: statistic.subject(),
            statistic,
            quantity: statistic.quantity(),
            lines: vec![SheetLine {
                period: Period::WaterYear,
                record: Some(record),
                realizations: 300,
                range: Some(RealizationRange { q05: 254.0, q50: 300.0, q95: 381.0 }),
                verdict: Some(verdict),
            }],
        };
        let statistics =
            vec![of(Statistic::SweMean, mean_mm, mean), of(Statistic::SweDeviation, 300.0, deviation)];
        let outside = statistics.iter().flat_map(|of| &of.lines).filter(|line| line.is_outside()).count();
        GeneratorSheet {
            realizations: 300,
            years: 44,
            wet_day_mm: 0.3,
            survey: day(4, 1),
            lines_judged: 2,
            lines_outside: outside,
            outside_by_chance: 0.2,
            largest_day_mm: LargestDay { record: Some(101.6), realizations: Some(101.6) },
            fitted: None,
            statistics,
        }
    }

    #[test]
    fn a_mismatch_of_snow_is_said_with_its_numbers() {
        let [metric, us] = [UnitSystem::Metric, UnitSystem::Us].map(reader);
        use Verdict::{Above, Below, Within};
        assert_eq!(snow_mismatch(&sheet(300.0, Within, Within), metric), None);
        assert_eq!(
            snow_mismatch(&sheet(127.0, Below, Within), metric).unwrap(),
            "1 April SWE modelled from the weather that was made is not like that modelled from the record: mean 127 mm from the \
             record, 254 to 381 in 9 of 10 realizations."
        );
        let both = snow_mismatch(&sheet(127.0, Below, Above), us).unwrap();
        assert!(both.contains("mean 5.0 in from the record, 10.0 to 15.0 in 9 of 10"), "{both}");
        assert!(both.contains("; standard deviation 11.8 in"), "{both}");
    }

    #[test]
    fn what_was_fitted_is_said() {
        let month = |at: usize| FittedMonth {
            chain_order: if at == 3 { ChainOrder::Second } else { ChainOrder::First },
            amounts: if at < 4 {
                AmountLaw::Gamma { shape: 0.7, scale_mm: 9.0 }
            } else {
                AmountLaw::MixedExponential { smaller_share: 0.4, smaller_mean_mm: 3.0, larger_mean_mm: 12.0 }
            },
        };
        let fitted = Fitted { wet_above_mm: 1.27, months: std::array::from_fn(month), wet_month_spread: 0.2 };
        assert_eq!(
            fitted_in_words(&fitted, reader(UnitSystem::Metric)),
            "Fitted to the record: whether a day is wet, that is above 1.27 mm, hangs on the day before in 11 months and on the \
             two days before in 1 month; amounts are gamma in 4 months and mixed exponential in 8 months, each by the Bayesian \
             information criterion."
        );
        let alike = Fitted { months: [month(0); 12], ..fitted };
        let said = fitted_in_words(&alike, reader(UnitSystem::Metric));
        assert!(
            said.contains("hangs on the day before in 12 months; amounts are gamma in 12 months, each"),
            "{said}"
        );
    }

    #[test]
    fn the_count_is_said_beside_what_chance_would_bring() {
        let said = |sheet: &GeneratorSheet| sentences(sheet, reader(UnitSystem::Metric));
        let within = said(&sheet(300.0, Verdict::Within, Verdict::Within));
        assert!(within[1].starts_with("Of 2 lines that are judged, none lies outside"), "{}", within[1]);
        assert!(within[1].contains("chance would put about 0 there"), "{}", within[1]);
        assert!(within[2].contains("is like that modelled from the record"), "{}", within[2]);
        let below = said(&sheet(100.0, Verdict::Below, Verdict::Within));
        assert!(below[1].contains("1 lies outside"), "{}", below[1]);
        assert!(below[2].contains("mean 100 mm from the record"), "{}", below[2]);
        assert!(
            below[3]
                .ends_with("has 102 mm, that of all realizations 102 mm, out of 300 times as many years.")
        );
        let unjudged = GeneratorSheet { lines_judged: 0, ..sheet(300.0, Verdict::Within, Verdict::Within) };
        assert!(said(&unjudged)[1].contains("no line is judged"));
    }
}
