//! Levels in groups that share their weather: all of them, unless warming changes the wet days. Then each is its own.

use super::ready::Ready;
use crate::perturb::{Generator, Intensity, MeanChange, MonthlyChange, WetDayChange};
use crate::snow::Lanes;

/// How a study's levels are grouped.
pub(super) struct LevelGroups<'r> {
    ready: &'r Ready,
    /// What each level does to its lanes: where its wet days change, precipitation's mean is changed with them.
    pub changes: Vec<MonthlyChange>,
    /// What each group does to wet days.
    wet_days: Vec<WetDayChange>,
    /// Which group has the reference.
    pub of_reference: usize,
}

impl<'r> LevelGroups<'r> {
    /// The groups of a study.
    pub fn of(ready: &'r Ready) -> Self {
        let typed = &ready.scenario.warming;
        let levels = typed.levels_c.iter();
        let wet_days: Option<Vec<WetDayChange>> =
            levels.map(|level_c| typed.warming.wet_days_at(*level_c)).collect();
        match wet_days {
            Some(wet_days) => Self {
                ready,
                changes: ready.changes().iter().map(MonthlyChange::of_temperatures).collect(),
                wet_days,
                of_reference: typed.reference,
            },
            None => {
                Self { ready, changes: ready.changes(), wet_days: vec![WetDayChange::NONE], of_reference: 0 }
            }
        }
    }

    /// One group of changes that leave wet days as they are, in the place of levels.
    pub fn of_changes(ready: &'r Ready, changes: Vec<MonthlyChange>) -> Self {
        Self { ready, changes, wet_days: vec![WetDayChange::NONE], of_reference: 0 }
    }

    /// Lanes of the groups that have any of these levels, ascending and each with its change; and which groups they are.
    pub fn lanes_of(&self, levels: &[(usize, MonthlyChange)]) -> Vec<(usize, Lanes)> {
        let levels_of_each = self.changes.len() / self.wet_days.len();
        let group = |(level, _): &(usize, MonthlyChange)| level / levels_of_each;
        let of_groups = levels.chunk_by(|a, b| group(a) == group(b));
        let lanes = |levels: &[(usize, MonthlyChange)]| {
            let changes: Vec<MonthlyChange> = levels.iter().map(|(_, change)| change.clone()).collect();
            (group(&levels[0]), self.ready.lanes(&changes))
        };
        of_groups.map(lanes).collect()
    }

    /// Lanes of each group under the changes of all levels.
    pub fn lanes(&self, changes: &[MonthlyChange]) -> Vec<Lanes> {
        let levels_of_each = changes.len() / self.wet_days.len();
        changes.chunks(levels_of_each).map(|changes| self.ready.lanes(changes)).collect()
    }

    /// The weather of each group, as one generator's.
    pub fn weather<'g>(&self, generator: &'g dyn Generator) -> Vec<Intensity<'g>> {
        let (wet_day_mm, seed) = (self.ready.scenario.realizations.wet_day_mm, self.ready.scenario.seed);
        self.wet_days
            .iter()
            .map(|change| Intensity { generator, change: *change, wet_day_mm, seed })
            .collect()
    }

    /// The same with the study's assumed change of mean precipitation.
    pub fn changed<'g>(&self, weather: &'g [Intensity<'_>]) -> Vec<MeanChange<'g>> {
        let standard_deviation_pct = self.ready.scenario.realizations.mean_change_sd_pct.unwrap_or(0.0);
        let changed = |of_group: &'g Intensity<'_>| MeanChange {
            generator: of_group,
            seed: self.ready.scenario.seed,
            standard_deviation_pct,
        };
        weather.iter().map(changed).collect()
    }
}
