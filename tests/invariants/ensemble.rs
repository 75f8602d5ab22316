//! A run of many realizations: the same whatever the threads, paired between levels, and begun as the method says.

use super::cases;
use super::scenario::{Scenario, scenarios};
use ndarray::{Axis, Slice};
use proptest::prelude::*;
use rayon::ThreadPoolBuilder;
use thawline::calendar::MonthDay;
use thawline::ensemble::{Plan, Seasons, Silent, run};
use thawline::perturb::{MonthlyChange, YearBlocks};
use thawline::season::{Measures, SeasonSettings};
use thawline::snow::{Lanes, Path};
use thawline::weather::Series;

/// Everything that a study of a random scenario needs. The first survey date is the water year's first day.
struct Study {
    record: Series,
    lanes: Lanes,
    measures: Measures,
    levels: usize,
    bands: usize,
}

impl Study {
    fn of(scenario: &Scenario, changes: &[MonthlyChange]) -> Self {
        let start = scenario.climate.start();
        let survey = MonthDay::new(if scenario.climate.is_southern { 10 } else { 4 }, 1).expect("a day");
        Self {
            record: scenario.climate.series(),
            lanes: scenario.lanes(changes),
            measures: Measures::new(
                SeasonSettings {
                    water_year_starts: start,
                    survey_dates: vec![start.0, survey],
                    volume_windows: Vec::new(),
                    outflow_before: vec![survey],
                    melt_shares_before: vec![survey],
                    arrival_volume_hm3: Some(0.3),
                },
                1.0,
            ),
            levels: changes.len(),
            bands: scenario.basin.bands.len(),
        }
    }

    fn run(&self, threads: usize, realizations: u32, path: Path) -> Seasons {
        let generator = YearBlocks {
            record: &self.record,
            seed: 20,
            years: 3,
            mean_run_years: 2.0,
            mean_change_sd_pct: 5.0,
        };
        let plan = Plan {
            lanes: &self.lanes,
            levels: self.levels,
            reference: 0,
            bands: self.bands,
            measures: &self.measures,
            generator: &generator,
            realizations,
            path,
        };
        let pool = ThreadPoolBuilder::new().num_threads(threads).build().expect("threads");
        pool.install(|| run(&plan, &Silent)).expect("a closed ledger")
    }
}

fn bits<'a>(values: impl IntoIterator<Item = &'a f64>) -> Vec<u64> {
    values.into_iter().map(|value| value.to_bits()).collect()
}

/// The bits of all that a run keeps.
fn all_bits(seasons: &Seasons) -> (Vec<u64>, Vec<u32>) {
    let values = seasons.basin_years.iter().chain(&seasons.basin_periods).chain(&seasons.band_periods);
    (bits(values), seasons.band_undefined.iter().flatten().copied().collect())
}

proptest! {
    #![proptest_config(cases(6))]

    /// 1, 2 and 7 threads give the same bits, and so do all widths of vectors.
    #[test]
    fn threads_do_not_show(scenario in scenarios()) {
        let study = Study::of(&scenario, &scenario.changes());
        let one = all_bits(&study.run(1, 9, Path::Widest));
        for threads in [2, 7] {
            prop_assert!(all_bits(&study.run(threads, 9, Path::Widest)) == one, "{threads} threads differ from one");
        }
        prop_assert!(all_bits(&study.run(2, 9, Path::Baseline)) == one, "narrow vectors differ from wide ones");
    }

    /// A realization does not depend on how many others are run.
    #[test]
    fn other_realizations_do_not_show(scenario in scenarios()) {
        let study = Study::of(&scenario, &scenario.changes());
        let (few, many) = (study.run(2, 3, Path::Widest), study.run(2, 8, Path::Widest));
        let first = many.basin_years.slice_axis(Axis(2), Slice::from(..3));
        prop_assert_eq!(bits(&few.basin_years), bits(first));
        let first = many.band_periods.slice_axis(Axis(3), Slice::from(..3));
        prop_assert_eq!(bits(&few.band_periods), bits(first));
    }

    /// The same realization runs under every level: two equal levels give equal seasons, in whatever company.
    #[test]
    fn levels_are_paired(scenario in scenarios()) {
        let mut changes = scenario.changes();
        let reference = changes[0].clone();
        changes.push(reference);
        let seasons = Study::of(&scenario, &changes).run(2, 5, Path::Widest);
        let level = |level: usize| seasons.basin_years.index_axis(Axis(0), level);
        prop_assert_eq!(bits(level(0)), bits(level(changes.len() - 1)));
        let bands = |level: usize| seasons.band_periods.index_axis(Axis(0), level);
        prop_assert_eq!(bits(bands(0)), bits(bands(changes.len() - 1)));
    }

    /// A realization starts on bare ground; where the reference keeps snow through its first year, that year has been
    /// run once before, and starts on the snow it left.
    #[test]
    fn perennial_snow_is_there_from_the_start(mut scenario in scenarios(), is_cold in any::<bool>()) {
        scenario.climate.mean_c = if is_cold { -60.0 } else { 40.0 };
        scenario.climate.wet_chance = 0.5;
        let seasons = Study::of(&scenario, &scenario.changes()[..1]).run(2, 3, Path::Widest);
        let as_it_begins = (0..3).map(|realization| seasons.basin_years[[0, 0, realization, 0]]);
        let has_rained = scenario.basin.bands.iter().any(|band| {
            scenario.basin.precipitation.factor(scenario.station_m, band.elevation_m) > 0.0
        });
        for swe_mm in as_it_begins {
            prop_assert_eq!(swe_mm > 0.0, is_cold && has_rained, "SWE as the first year begins: {} mm", swe_mm);
        }
    }
}
