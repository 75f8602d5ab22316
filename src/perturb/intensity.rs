//! Wet days that bring more with warming, and come so much more seldom that a stated change of the mean holds (method,
//! section 3).

use super::Generator;
use super::stream::wet_day_stream;
use crate::weather::{Series, YearSpan};
use rand::RngExt;

/// What a level does to wet days.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct WetDayChange {
    /// Times what a wet day brings; above 0.
    pub amount_factor: f64,
    /// Times the mean precipitation of each month, January first.
    pub mean_factor: [f64; 12],
}

impl WetDayChange {
    /// No change.
    pub const NONE: Self = Self { amount_factor: 1.0, mean_factor: [1.0; 12] };
}

/// Another generator's realizations as one level has them: `i` times as much on a wet day, and `c/i` times as many wet days,
/// so that a month's mean is `c` times what it was.
///
/// Where wet days become fewer, each stays with the chance `c/i`; where they become more, dry days become wet, each with the
/// chance `(c/i - 1) * wet days/dry days`, and bring what a wet day of the same month of the realization brings, in air as humid as its. Which days
/// is decided by lots that are the same at every level: a level that loses more wet days loses those of the others, too.
/// Then one factor a calendar month, over all years of the realization, makes the month's mean `c` times the unchanged one,
/// to rounding; `i` so holds in the mean over realizations, but for the chance of which days went.
///
/// Days that are not wet keep what little they have, times `c`. Temperatures stay as they were drawn: a day that has lost
/// its rain is as cool as it was. A month without wet days has nothing to intensify and is changed by `c` alone; one wet day
/// of a month always stays, or its mean could not hold; and where more days would have to be wet than there are, all are, and
/// the amounts make up for the rest.
#[derive(Clone, Copy)]
pub struct Intensity<'g> {
    /// Makes the weather whose wet days change.
    pub generator: &'g dyn Generator,
    /// What the level does to them.
    pub change: WetDayChange,
    /// A day is wet whose precipitation lies above this, mm.
    pub wet_day_mm: f64,
    /// Seed of the study.
    pub seed: u64,
}

impl Generator for Intensity<'_> {
    fn fill(&self, realization: u32, years: usize, into: &mut Series) {
        self.generator.fill(realization, years, into);
        if self.change == WetDayChange::NONE {
            return;
        }
        let lots = Lot::of_days(self.seed, realization, &into.years);
        let mut days: [Vec<usize>; 12] = Default::default();
        for (day, month) in into.month.iter().enumerate() {
            days[usize::from(*month)].push(day);
        }
        for (days, mean_factor) in days.iter().zip(self.change.mean_factor) {
            self.change_month(days, mean_factor, &lots, into);
        }
    }

    fn drawn(&self, realization: u32, years: usize) -> Option<(&Series, Vec<YearSpan>)> {
        if self.change == WetDayChange::NONE { self.generator.drawn(realization, years) } else { None }
    }

    /// The factor of a month hangs on all years of the realization, which differ from generator to generator.
    fn keeps_names(&self) -> bool {
        self.change == WetDayChange::NONE && self.generator.keeps_names()
    }
}

impl Intensity<'_> {
    /// Changes the days of one calendar month, in all years of a realization.
    fn change_month(&self, days: &[usize], mean_factor: f64, lots: &[Lot], into: &mut Series) {
        let (precipitation_mm, humidity_pct) = (&mut into.precipitation_mm, &mut into.relative_humidity_pct);
        let (wet, dry): (Vec<usize>, Vec<usize>) =
            days.iter().copied().partition(|day| precipitation_mm[*day] > self.wet_day_mm);
        let unchanged_mm: f64 = days.iter().map(|day| precipitation_mm[*day]).sum();
        let wet_mm: Vec<f64> = wet.iter().map(|day| precipitation_mm[*day]).collect();
        let frequency_factor = mean_factor / self.change.amount_factor;
        // The lowest lot always stays; a year that was drawn twice has it twice.
        let lowest = wet.iter().map(|day| lots[*day].which).fold(f64::INFINITY, f64::min);
        let stays = |day: usize| lots[day].which < frequency_factor.max(lowest.next_up());
        let wet_chance = (frequency_factor - 1.0) * wet.len() as f64 / dry.len() as f64;
        let becomes_wet = |day: usize| lots[day].which < wet_chance;

        let mut changed_wet = Vec::with_capacity(days.len());
        let (mut changed_wet_mm, mut still_dry_mm) = (0.0, 0.0);
        for (day, amount_mm) in wet.iter().zip(&wet_mm) {
            precipitation_mm[*day] = 0.0;
            if stays(*day) {
                changed_wet.push((*day, *amount_mm));
                changed_wet_mm += amount_mm;
            }
        }
        for day in dry {
            if !wet.is_empty() && becomes_wet(day) {
                let whose = lots[day].whose_of(wet.len());
                let amount_mm = wet_mm[whose];
                if let Some(pct) = humidity_pct.get(wet[whose]).copied() {
                    humidity_pct[day] = pct;
                }
                changed_wet.push((day, amount_mm));
                changed_wet_mm += amount_mm;
            } else {
                still_dry_mm += precipitation_mm[day];
                precipitation_mm[day] *= mean_factor;
            }
        }
        // On wet days has to fall what the dry ones do not bring.
        let amount_factor = mean_factor * (unchanged_mm - still_dry_mm) / changed_wet_mm;
        for (day, amount_mm) in changed_wet {
            precipitation_mm[day] = amount_factor * amount_mm;
        }
    }
}

/// What decides about a day, the same at every level.
#[derive(Debug, Clone, Copy)]
struct Lot {
    /// Whether a wet day stays wet, or a dry one becomes so.
    which: f64,
    /// Of which of the month's wet days it takes the amount.
    whose: f64,
}

impl Lot {
    /// One for each day of a realization. Years of one name have the same, as they have the same weather.
    fn of_days(seed: u64, realization: u32, years: &[YearSpan]) -> Vec<Self> {
        let mut random = wet_day_stream(seed, realization);
        let mut lots = Vec::with_capacity(years.iter().map(|year| year.days).sum());
        for (at, year) in years.iter().enumerate() {
            match years[..at].iter().find(|before| before.water_year == year.water_year) {
                Some(same) => lots.extend_from_within(same.start..same.start + same.days),
                None => lots
                    .extend((0..year.days).map(|_| Self { which: random.random(), whose: random.random() })),
            }
        }
        lots
    }

    /// A place among so many.
    fn whose_of(self, count: usize) -> usize {
        ((self.whose * count as f64) as usize).min(count - 1)
    }
}
