//! What the change means for the volume of the melt season, in a dry year and a usual one.

use super::super::numbers::signed;
use super::super::reader::Reader;
use super::telling_level;
use crate::findings::{Exceeded, Findings};

/// What 9 in 10 and half of the years bring at least in the first window, at the reference and at one level.
pub(super) fn volumes(findings: &Findings, reader: Reader) -> Option<String> {
    let measure = findings.basin.iter().find(|measure| measure.measure.is_volume)?;
    let at = telling_level(findings)?;
    let [reference, warmed] = [findings.reference, at].map(|at| measure.levels[at].exceeded.as_slice());
    let of = |exceeded: &[Exceeded], chance_pct: u32| {
        exceeded.iter().find(|exceeded| exceeded.chance_pct == chance_pct).copied()
    };
    let one = |chance_pct: u32, how_often: &str| {
        let (before, after) = (of(reference, chance_pct)?, of(warmed, chance_pct)?);
        let percent = after.change_pct.map_or(String::new(), |pct| format!(" ({} %)", signed(pct, 0)));
        Some(format!(
            "in {how_often} at least {} at the reference and {} at {}{percent}",
            reader.volume(before.volume_hm3.value),
            reader.volume(after.volume_hm3.value),
            reader.level(findings.levels_c[at]),
        ))
    };
    let (dry, usual) = (one(90, "9 of 10 years")?, one(50, "half of the years")?);
    Some(format!("{}: {dry}; {usual}.", crate::figures::sentence(&measure.measure.title)))
}
