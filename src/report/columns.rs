//! What the columns of a finished table hold, told from its cells: for the workbook and the data package.

use csv::StringRecord;

/// Words that stand in a column of numbers where there is no number.
pub(super) const NO_NUMBER: [&str; 4] = ["", "none", "not gone", "not reached"];

/// What a column holds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Holds {
    /// Numbers, or one of [`NO_NUMBER`].
    Numbers,
    /// `yes` or `no`.
    YesOrNo,
    /// Days as `2011-04-01`.
    Dates,
    /// Words.
    Words,
}

/// A table as it is written: header and rows.
pub(super) struct Cells {
    pub header: StringRecord,
    pub rows: Vec<StringRecord>,
}

impl Cells {
    /// Reads what we have written; nothing where it is no table.
    pub fn of(table: &[u8]) -> Option<Self> {
        let mut reader = csv::Reader::from_reader(table);
        let header = reader.headers().ok()?.clone();
        Some(Self { header, rows: reader.records().collect::<Result<_, _>>().ok()? })
    }

    /// What the column at a place holds; one that is empty throughout by its name, so that the columns of two studies agree.
    pub fn holds(&self, at: usize) -> Holds {
        let told = || self.rows.iter().filter_map(|row| row.get(at)).filter(|cell| !NO_NUMBER.contains(cell));
        let all = |is: fn(&str) -> bool| told().next().is_some() && told().all(is);
        if all(|cell| number(cell).is_some()) {
            Holds::Numbers
        } else if all(|cell| matches!(cell, "yes" | "no")) {
            Holds::YesOrNo
        } else if all(|cell| chrono::NaiveDate::parse_from_str(cell, "%Y-%m-%d").is_ok()) {
            Holds::Dates
        } else if told().next().is_none() && self.header.get(at).is_some_and(is_named_for_numbers) {
            Holds::Numbers
        } else {
            Holds::Words
        }
    }
}

fn is_named_for_numbers(column: &str) -> bool {
    const PARTS: [&str; 12] = [
        "chance",
        "share",
        "error",
        "bound",
        "ratio",
        "q05",
        "q95",
        "years",
        "realizations",
        "correlation",
        "signal",
        "wilson",
    ];
    unit(column).is_some() || PARTS.iter().any(|part| column.contains(part))
}

/// A cell as a number, if it is one.
pub(super) fn number(cell: &str) -> Option<f64> {
    cell.parse::<f64>().ok().filter(|number| number.is_finite())
}

/// The unit that a column's name ends with or holds before an end or an error, in the trade's letters.
pub(super) fn unit(column: &str) -> Option<&'static str> {
    const UNITS: [(&str, &str); 16] = [
        ("thousand_acre_feet", "thousand acre-feet"),
        ("mm_per_degC_day", "mm per degC and day"),
        ("m_per_degC", "m per degC"),
        ("ft_per_degF", "ft per degF"),
        ("pct_per_degC", "% per degC"),
        ("pct_per_degF", "% per degF"),
        ("day_of_water_year", "day of the water year, counted from 1"),
        ("mm_days", "mm days"),
        ("in_days", "in days"),
        ("km2", "km2"),
        ("hm3", "hm3"),
        ("degC", "degC"),
        ("degF", "degF"),
        ("pct", "%"),
        ("mm", "mm"),
        ("days", "days"),
    ];
    // Looked for at the end alone: a letter or two say too little elsewhere.
    let at_end = [("_m", "m"), ("_ft", "ft"), ("_in", "in"), ("_mi2", "mi2"), ("_share", "share, 0 to 1")];
    let is_part = |part: &str| {
        column == part || column.ends_with(&format!("_{part}")) || column.contains(&format!("_{part}_"))
    };
    let of_end = at_end.into_iter().find(|(end, _)| column.ends_with(end)).map(|(_, unit)| unit);
    UNITS.into_iter().find(|(part, _)| is_part(part)).map(|(_, unit)| unit).or(of_end)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand, of columns that our tables have.
    #[test]
    fn columns_say_what_they_hold() {
        let table = "melt_out_day,used,date,why,q05_mm,empty\n210,yes,2011-04-01,,3.5,\nnot gone,no,2012-04-01,gap,,\n";
        let cells = Cells::of(table.as_bytes()).unwrap();
        let holds: Vec<Holds> = (0..6).map(|at| cells.holds(at)).collect();
        let expected =
            [Holds::Numbers, Holds::YesOrNo, Holds::Dates, Holds::Words, Holds::Numbers, Holds::Words];
        assert_eq!(holds, expected);
    }

    /// The same columns, emptied, hold the same kinds.
    #[test]
    fn an_empty_column_of_numbers_stays_one() {
        for rows in ["3.5,0.1,why\n", ",,\n", ""] {
            let cells = Cells::of(format!("q05_mm,chance_bound,note\n{rows}").as_bytes()).unwrap();
            let holds = [0, 1, 2].map(|at| cells.holds(at));
            assert_eq!(holds, [Holds::Numbers, Holds::Numbers, Holds::Words], "{rows:?}");
        }
    }

    #[test]
    fn units_are_read_from_names() {
        for (column, expected) in [
            ("q05_mm", Some("mm")),
            ("swe_04_01_mm_change_monte_carlo_error", Some("mm")),
            ("level_degC", Some("degC")),
            ("volume_thousand_acre_feet", Some("thousand acre-feet")),
            ("snow_line_rise_m_per_degC", Some("m per degC")),
            ("lower_m", Some("m")),
            ("upper_ft", Some("ft")),
            ("change_pct", Some("%")),
            ("swe_area_mm_days", Some("mm days")),
            ("realizations", None),
            ("chance_of_exceedance_pct", Some("%")),
            ("low_years_in_a_row", None),
        ] {
            assert_eq!(unit(column), expected, "{column}");
        }
    }
}
