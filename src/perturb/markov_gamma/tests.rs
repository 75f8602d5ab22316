//! The whole generator, fitted to records that were made by known laws.

mod edges;
mod made;
mod variance;

use super::MarkovGamma;
use crate::calendar::{MonthDay, WaterYearStart};
use crate::perturb::{Generator, GeneratorChoice, Recipe};
use crate::weather::Series;

fn day(month: u32, day: u32) -> MonthDay {
    MonthDay::new(month, day).unwrap()
}

/// Of water years from 1 October, surveyed on 1 April.
fn recipe() -> Recipe {
    Recipe {
        choice: GeneratorChoice::MarkovGamma,
        seed: 20_260_401,
        wet_day_mm: 0.25,
        water_year_starts: WaterYearStart(day(10, 1)),
        cool_season_ends: day(4, 1),
    }
}

fn drawn(generator: &MarkovGamma, realization: u32, years: usize) -> Series {
    let mut series = Series::default();
    generator.fill(realization, years, &mut series);
    series
}
