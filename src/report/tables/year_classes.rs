//! The user's classes of years, by level.

use super::cells::{finish, name, optional, write};
use crate::findings::YearClasses;
use crate::units::UnitSystem;
use csv::Writer;

/// One row a level and class, from the driest; the upper limits of the wettest are empty.
pub(super) fn year_classes(found: &YearClasses, units: UnitSystem) -> Vec<u8> {
    let (warming, volume) = (units.warming(), units.volume());
    let mut header = vec!["measure".to_owned(), format!("level_{}", warming.suffix), "class".to_owned()];
    header.push(format!("upper_limit_{}", volume.suffix));
    header.extend(["share", "share_q05", "share_q95", "share_bound"].map(str::to_owned));
    let kept =
        ["", "_q05", "_q95"].map(|end| format!("upper_limit_that_keeps_the_share{end}_{}", volume.suffix));
    header.extend(kept);
    let mut writer = Writer::from_writer(Vec::new());
    write(&mut writer, &header);
    for level in &found.levels {
        for (class, share) in level.shares.iter().enumerate() {
            let mut row = vec![name(&found.measure, units), warming.of(level.level_c).to_string()];
            row.push((class + 1).to_string());
            row.push(optional(found.limits_hm3.get(class).map(|hm3| volume.of(*hm3))));
            row.push(share.value.to_string());
            row.extend([share.q05, share.q95, level.bounds[class]].map(optional));
            let kept = level.kept_limits_hm3.get(class).copied().flatten();
            let ends = [kept.map(|k| k.value), kept.and_then(|k| k.q05), kept.and_then(|k| k.q95)];
            row.extend(ends.map(|hm3| optional(hm3.map(|hm3| volume.of(hm3)))));
            write(&mut writer, &row);
        }
    }
    finish(writer)
}
