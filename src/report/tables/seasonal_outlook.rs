//! How well the survey date's snow foretells the window's inflow, by level.

use super::cells::{finish, name, optional, write};
use crate::findings::{Outlook, Ranged};
use crate::units::UnitSystem;
use csv::Writer;

/// One row a level.
pub(super) fn seasonal_outlook(found: &Outlook, units: UnitSystem) -> Vec<u8> {
    let (warming, volume) = (units.warming(), units.volume());
    let mut header = ["snow", "foretold"].map(str::to_owned).to_vec();
    header.push(format!("level_{}", warming.suffix));
    for number in ["correlation", "rank_correlation"] {
        header.extend(["", "_q05", "_q95"].map(|end| format!("{number}{end}")));
    }
    for number in ["interval_of_nine_in_ten", "old_line_off"] {
        header.extend(["", "_q05", "_q95"].map(|end| format!("{number}{end}_{}", volume.suffix)));
        header.extend(["", "_q05", "_q95"].map(|end| format!("{number}{end}_pct")));
    }
    let mut writer = Writer::from_writer(Vec::new());
    write(&mut writer, &header);
    for level in &found.levels {
        let mut row = vec![name(&found.snow, units), name(&found.inflow, units)];
        row.push(warming.of(level.level_c).to_string());
        let told = |found: Option<Ranged>, of: &dyn Fn(f64) -> f64| {
            let ends = [found.map(|f| f.value), found.and_then(|f| f.q05), found.and_then(|f| f.q95)];
            ends.map(|end| optional(end.map(of)))
        };
        let (plain, as_volume) = (|number: f64| number, |hm3: f64| volume.of(hm3));
        row.extend(told(level.correlation, &plain));
        row.extend(told(level.rank_correlation, &plain));
        row.extend(told(level.interval_hm3, &as_volume));
        row.extend(told(level.interval_pct, &plain));
        row.extend(told(level.old_line_off_hm3, &as_volume));
        row.extend(told(level.old_line_off_pct, &plain));
        write(&mut writer, &row);
    }
    finish(writer)
}
