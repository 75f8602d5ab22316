//! Weather that was made from a record corrected for catch one way, as another way would have it.

use super::catch::{GaugeMultiplier, StationPhase};
use crate::perturb::{Fitted, Generator};
use crate::weather::Series;

/// How what fell is told from what a gauge caught.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Catch {
    /// Rain and snow at the gauge.
    pub phase: StationPhase,
    /// What fell over what was caught.
    pub multiplier: GaugeMultiplier,
}

/// Another generator's realizations, each day's precipitation times what `after` makes of the gauge's catch over what `before` makes of it,
/// at the temperature of that day as it was drawn: the same weather at the gauge, caught anew.
///
/// A generator that is fitted to amounts and made anew from others draws other weather, by which two corrections would differ, too.
pub struct CaughtAnew<'g> {
    /// Made from weather that is corrected by `before`.
    pub generator: &'g dyn Generator,
    /// How its precipitation was corrected.
    pub before: Catch,
    /// How it is to be.
    pub after: Catch,
}

impl Generator for CaughtAnew<'_> {
    fn fill(&self, realization: u32, years: usize, into: &mut Series) {
        self.generator.fill(realization, years, into);
        for day in 0..into.precipitation_mm.len() {
            let [before, after] =
                [self.before, self.after].map(|of| of.phase.catch(into, day, of.multiplier));
            into.precipitation_mm[day] *= after / before;
        }
    }

    fn fitted(&self) -> Option<Fitted> {
        self.generator.fitted()
    }

    fn keeps_names(&self) -> bool {
        self.generator.keeps_names()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::snow::{DegreeRule, PhaseRule, SnowParams};

    /// Three days of 6 mm, at -4, 1 and 6 degC.
    struct ThreeDays;

    impl Generator for ThreeDays {
        fn fill(&self, _: u32, _: usize, into: &mut Series) {
            into.clear();
            into.mean_c.extend([-4.0, 1.0, 6.0]);
            into.precipitation_mm.extend([6.0; 3]);
        }
    }

    fn caught(before: Catch, after: Catch) -> Vec<f64> {
        let mut made = Series::default();
        CaughtAnew { generator: &ThreeDays, before, after }.fill(0, 1, &mut made);
        made.precipitation_mm
    }

    fn catch(half_snow_at_c: f64, of_rain: f64, of_snow: f64) -> Catch {
        let rain_snow = PhaseRule::LINEAR.with_half_snow_at(half_snow_at_c);
        let snow = SnowParams { rain_snow, ..SnowParams::defaults(DegreeRule::Mean, false) };
        Catch {
            phase: StationPhase::of(&snow, 1000.0),
            multiplier: GaugeMultiplier { rain: of_rain, snow: of_snow },
        }
    }

    /// By hand: snow, half snow and rain were corrected by 1.5, 1.2 and 0.9 (the mean of 1.5 and 0.9 at half snow, 1 degC). With snow by 3 and
    /// half snow at 2 degC, 1 degC is snow by three quarters: 0.75*3 + 0.25*0.9 = 2.475. So 6 mm become 6*3/1.5, 6*2.475/1.2 and 6 mm.
    /// Eight figures: a quotient and a product of numbers that are no powers of two.
    #[test]
    fn each_day_is_caught_by_its_own_phase() {
        let found = caught(catch(1.0, 0.9, 1.5), catch(2.0, 0.9, 3.0));
        for (found, expected) in found.iter().zip([12.0, 12.375, 6.0]) {
            assert!((found - expected).abs() < 1e-8, "{found} for {expected}");
        }
    }

    /// Identity: caught as it was, weather stays what it is, to the bit.
    #[test]
    fn the_same_catch_changes_nothing() {
        assert_eq!(caught(catch(1.0, 0.93, 1.37), catch(1.0, 0.93, 1.37)), [6.0; 3]);
    }
}
