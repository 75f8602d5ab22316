//! The generator sheet: the record against the weather that was made.

use super::cells::{finish, optional, write};
use crate::findings::{GeneratorSheet, Quantity, Verdict};
use crate::units::UnitSystem;
use csv::Writer;

/// One row a line, each in its own unit; a line that is not judged has no verdict.
pub(super) fn generator_sheet(sheet: &GeneratorSheet, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let header = [
        "subject",
        "statistic",
        "part_of_year",
        "unit",
        "record",
        "realizations_q05",
        "realizations_q50",
        "realizations_q95",
        "realizations_with_number",
        "years_of_each",
        "record_lies",
    ];
    write(&mut writer, &header.map(str::to_owned));
    for statistic in &sheet.statistics {
        let told = Told { units, quantity: statistic.quantity };
        for line in &statistic.lines {
            let range =
                [line.range.map(|of| of.q05), line.range.map(|of| of.q50), line.range.map(|of| of.q95)];
            let mut row = vec![
                statistic.subject.name().to_owned(),
                statistic.statistic.name().to_owned(),
                line.period.name(),
                told.unit().to_owned(),
                told.cell(line.record),
            ];
            row.extend(range.map(|number| told.cell(number)));
            row.extend([line.realizations.to_string(), sheet.years.to_string()]);
            row.push(line.verdict.map_or("", Verdict::words).to_owned());
            write(&mut writer, &row);
        }
    }
    finish(writer)
}

/// How a statistic's numbers are told.
#[derive(Clone, Copy)]
struct Told {
    units: UnitSystem,
    quantity: Quantity,
}

impl Told {
    fn unit(self) -> &'static str {
        match self.quantity {
            Quantity::DepthMm => self.units.depth().suffix,
            Quantity::TemperatureC => self.units.temperature().suffix,
            Quantity::DifferenceC => self.units.warming().suffix,
            Quantity::Share => "share",
            Quantity::Days => "days",
            Quantity::Years => "years",
            Quantity::Correlation => "correlation",
        }
    }

    fn cell(self, number: Option<f64>) -> String {
        let in_units = |number: f64| match self.quantity {
            Quantity::DepthMm => self.units.depth().of(number),
            Quantity::TemperatureC => self.units.temperature().of(number),
            Quantity::DifferenceC => self.units.warming().of(number),
            Quantity::Share | Quantity::Days | Quantity::Years | Quantity::Correlation => number,
        };
        optional(number.map(in_units))
    }
}
