//! `[[findings.criteria]]`: what the user wants to hold, and to know the warming at which it does not.

use super::super::section::Section;
use super::cases::read_name;
use crate::fault::Fault;
use crate::findings::{Asks, Criterion};
use crate::units::{DepthUnit, acre_feet};

/// A criterion as typed: a volume needs the basin's area before it is SWE.
#[derive(Debug, Clone, PartialEq)]
pub struct CriterionTyped {
    name: String,
    asks: AsksTyped,
}

#[derive(Debug, Clone, Copy, PartialEq)]
enum AsksTyped {
    SweMm(f64),
    VolumeHm3(f64),
    LowSnowShare(f64),
}

const MM: &str = "median_swe_at_least_mm";
const INCHES: &str = "median_swe_at_least_in";
const HM3: &str = "median_volume_at_least_hm3";
const ACRE_FEET: &str = "median_volume_at_least_thousand_acre_feet";
const LOW_SNOW: &str = "low_snow_years_at_most";
const KEYS: [&str; 5] = [MM, INCHES, HM3, ACRE_FEET, LOW_SNOW];

impl CriterionTyped {
    /// The criterion in a basin of so many km2, where a low-snow year lies below that quantile: 1 hm3 over 1 km2 is 1 m of water.
    pub(super) fn of(&self, area_km2: f64, low_snow_below_quantile: f64) -> Criterion {
        let asks = match self.asks {
            AsksTyped::SweMm(swe_mm) => Asks::MedianAtLeast { swe_mm, volume_hm3: None },
            AsksTyped::VolumeHm3(hm3) => {
                Asks::MedianAtLeast { swe_mm: 1000.0 * hm3 / area_km2, volume_hm3: Some(hm3) }
            }
            AsksTyped::LowSnowShare(share) => {
                Asks::LowSnowYearsAtMost { share, below_quantile: low_snow_below_quantile }
            }
        };
        Criterion { name: self.name.clone(), asks }
    }
}

/// Reads all criteria; nothing where one has a fault. A low-snow year lies below that quantile of the reference.
pub(super) fn read(sections: Vec<Section<'_>>, low_snow_below_quantile: f64) -> Option<Vec<CriterionTyped>> {
    let mut names = Vec::new();
    let criteria: Vec<Option<CriterionTyped>> = sections
        .into_iter()
        .map(|section| read_criterion(section, &mut names, low_snow_below_quantile))
        .collect();
    criteria.into_iter().collect()
}

fn read_criterion(
    mut section: Section<'_>,
    names: &mut Vec<String>,
    low_snow_below_quantile: f64,
) -> Option<CriterionTyped> {
    let name = read_name(&mut section, names);
    let typed: Vec<&'static str> = KEYS.into_iter().filter(|key| section.has(key)).collect();
    KEYS.into_iter().for_each(|key| section.knows(key));
    let asks = match typed.as_slice() {
        [key] => read_asks(&mut section, key, low_snow_below_quantile),
        _ => {
            let found =
                if typed.is_empty() { "nothing that is to hold".to_owned() } else { typed.join(" beside ") };
            section.fault(Fault::key(
                section.path_of("name"),
                found,
                format!("one of {}", KEYS.join(", ")),
                "state one, and another in a table of its own",
            ));
            None
        }
    };
    section.finish();
    Some(CriterionTyped { name: name?, asks: asks? })
}

fn read_asks(
    section: &mut Section<'_>,
    key: &'static str,
    low_snow_below_quantile: f64,
) -> Option<AsksTyped> {
    let amount = |section: &mut Section<'_>, most: f64, mend: &str| section.number_in(key, 0.0..=most, mend);
    match key {
        MM => amount(section, 1e5, "mm of water over the basin").map(AsksTyped::SweMm),
        INCHES => {
            let inches = amount(section, 4000.0, "inches of water over the basin")?;
            Some(AsksTyped::SweMm(DepthUnit::Inch.to_millimetres(inches)))
        }
        HM3 => amount(section, 1e7, "hm3, a million m3").map(AsksTyped::VolumeHm3),
        ACRE_FEET => {
            let volume = amount(section, 1e7, "thousand acre-feet")?;
            Some(AsksTyped::VolumeHm3(1000.0 * volume / acre_feet(1.0)))
        }
        _ => {
            let share = section.number_in(key, 0.0..=1.0, "a share of years: 0.2 is 1 in 5")?;
            if share < low_snow_below_quantile {
                section.unlikely(
                    key,
                    format!(
                        "{share} is less than the share of low-snow years at the reference, {low_snow_below_quantile} by \
                         findings.low_snow.below_quantile: it does not hold even there"
                    ),
                );
            }
            Some(AsksTyped::LowSnowShare(share))
        }
    }
}
