//! A run of many realizations: the same whatever the threads, paired between levels, and begun as the method says.

use super::cases;
use super::scenario::{Scenario, scenarios};
use ndarray::{Axis, Slice};
use proptest::prelude::*;
use rayon::ThreadPoolBuilder;
use thawline::calendar::MonthDay;
use thawline::ensemble::{
    BasinSeasons, LevelGroup, Plan, Seasons, Silent, SurveySwe, SweBins, run, run_records,
};
use thawline::perturb::{
    Generator, Intensity, MeanChange, MonthlyChange, TemperatureHeld, WetDayChange, YearBlocks,
};
use thawline::season::{Measures, SeasonSettings};
use thawline::snow::{Lanes, Path};
use thawline::weather::Series;

/// Everything that a study of a random scenario needs. The first survey date is the water year's first day.
pub(super) struct Study {
    pub(super) record: Series,
    lanes: Lanes,
    measures: Measures,
    bands: usize,
}

impl Study {
    pub(super) fn of(scenario: &Scenario, changes: &[MonthlyChange]) -> Self {
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
            bands: scenario.basin.bands.len(),
        }
    }

    fn generator<'r>(&self, record: &'r Series) -> YearBlocks<'r> {
        YearBlocks { record, seed: 20, mean_run_years: 2.0 }
    }

    fn group<'a>(&'a self, generator: &'a dyn Generator) -> LevelGroup<'a> {
        LevelGroup { lanes: &self.lanes, generator }
    }

    fn plan<'a>(
        &'a self,
        groups: &'a [LevelGroup<'a>],
        (realizations, years): (u32, usize),
        path: Path,
    ) -> Plan<'a> {
        Plan {
            groups,
            reference: 0,
            bands: self.bands,
            measures: &self.measures,
            operation: None,
            realizations,
            years,
            path,
        }
    }

    fn run(&self, threads: usize, realizations: u32, path: Path) -> Seasons {
        self.run_from(&changed(&self.generator(&self.record)), threads, (realizations, 3), path)
    }

    pub(super) fn run_from(
        &self,
        from: &dyn Generator,
        threads: usize,
        size: (u32, usize),
        path: Path,
    ) -> Seasons {
        self.run_groups(&[self.group(from)], threads, size, path)
    }

    fn run_groups(
        &self,
        groups: &[LevelGroup<'_>],
        threads: usize,
        size: (u32, usize),
        path: Path,
    ) -> Seasons {
        let bins = SweBins::of_record(&self.lanes, &self.record).expect("a closed ledger");
        let pool = ThreadPoolBuilder::new().num_threads(threads).build().expect("threads");
        pool.install(|| run(&self.plan(groups, size, path), bins, &Silent)).expect("a closed ledger")
    }
}

/// The same weather with an assumed change of mean precipitation.
fn changed<'g>(generator: &'g YearBlocks<'_>) -> MeanChange<'g> {
    MeanChange { generator, seed: generator.seed, standard_deviation_pct: 5.0 }
}

/// Another generator's realizations, no two years of one name: nothing of them can be remembered.
struct EveryYearNew<'g>(&'g dyn Generator);

impl Generator for EveryYearNew<'_> {
    fn fill(&self, realization: u32, years: usize, into: &mut Series) {
        self.0.fill(realization, years, into);
        into.years.iter_mut().zip(0..).for_each(|(year, name)| year.water_year = name);
    }
}

fn bits<'a>(values: impl IntoIterator<Item = &'a f64>) -> Vec<u64> {
    values.into_iter().map(|value| value.to_bits()).collect()
}

/// The bits of all that a run keeps.
fn all_bits(seasons: &Seasons) -> (Vec<u64>, Vec<u32>) {
    let values = seasons.basin.years.iter().chain(&seasons.basin.periods).chain(&seasons.band_periods);
    (bits(values), seasons.band_undefined.iter().flatten().chain(&seasons.swe_days.counts).copied().collect())
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

    /// Resampled records give what each gives when it is run by itself: nothing that is remembered differs from what would
    /// have been computed, perennial snow and snow over the year's end included.
    #[test]
    fn remembered_years_are_the_same_years(mut scenario in scenarios(), mean_c in -25.0..15.0) {
        scenario.climate.mean_c = mean_c;
        let study = Study::of(&scenario, &scenario.changes());
        let own = study.generator(&study.record);
        let records: Vec<Series> = (0..3).map(|number| own.resampled_record(number)).collect();
        let generators: Vec<YearBlocks<'_>> = records.iter().map(|record| study.generator(record)).collect();
        let changed: Vec<MeanChange<'_>> = generators.iter().map(|generator| changed(generator)).collect();
        let each: Vec<Vec<&dyn Generator>> = changed.iter().map(|generator| vec![generator as _]).collect();
        let groups = [study.group(&own)];
        let plan = study.plan(&groups, (5, 3), Path::Widest);
        let found = run_records(&plan, &each, &Silent).expect("a closed ledger");
        for (generator, found) in each.iter().zip(found) {
            let alone: BasinSeasons = study.run_from(&EveryYearNew(generator[0]), 2, (5, 3), Path::Widest).basin;
            prop_assert_eq!(bits(&alone.years), bits(&found.years));
            prop_assert_eq!(bits(&alone.periods), bits(&found.periods));
        }
    }

    /// A realization that draws years twice, with or without a change of mean precipitation or with temperatures held,
    /// gives what it gives when every year is run: bands, basin and counted days.
    #[test]
    fn years_that_are_drawn_twice_are_the_same_years(mut scenario in scenarios(), mean_c in -25.0..15.0) {
        scenario.climate.mean_c = mean_c;
        let study = Study::of(&scenario, &scenario.changes());
        let unchanged = study.generator(&study.record);
        let changed = changed(&unchanged);
        let held = TemperatureHeld::new(&changed, &study.record);
        for generator in [&changed as &dyn Generator, &unchanged, &held] {
            let found = study.run_from(generator, 2, (5, 9), Path::Widest);
            let every_year = study.run_from(&EveryYearNew(generator), 2, (5, 9), Path::Widest);
            prop_assert!(all_bits(&found) == all_bits(&every_year), "what is remembered differs");
        }
    }

    /// The survey's SWE of the generator sheet is the study's own, to the bit, of realizations in order.
    /// The first survey date is the water year's first day, the second is asked for.
    #[test]
    fn the_sheets_snow_is_the_studys(mut scenario in scenarios(), mean_c in -25.0..15.0) {
        scenario.climate.mean_c = mean_c;
        let study = Study::of(&scenario, &scenario.changes()[..1]);
        let generator = study.generator(&study.record);
        let snow = SurveySwe { lanes: &study.lanes, bands: study.bands, survey: study.measures.settings().survey_dates[1] };
        let found = snow.each_realization(&generator, 4, 5, &Silent, |weather, swe_mm| {
            (weather.years.len(), swe_mm.to_vec())
        });
        let studys = study.run_from(&generator, 2, (4, 5), Path::Widest).basin;
        let second = studys.years.index_axis(Axis(0), 0).index_axis_move(Axis(0), 1);
        for ((years, swe_mm), studys) in found.expect("a closed ledger").iter().zip(second.rows()) {
            prop_assert_eq!((*years, bits(swe_mm)), (5, bits(studys)));
        }
    }

    /// Held temperatures have the record's mean in every month, and nothing else of the weather changes. 1e-9 is the
    /// rounding of a mean over some hundred days.
    #[test]
    fn held_temperatures_are_the_records_month_by_month(scenario in scenarios(), realization in 0_u32..50) {
        let study = Study::of(&scenario, &scenario.changes());
        let own = study.generator(&study.record);
        let (mut held, mut free) = (Series::default(), Series::default());
        TemperatureHeld::new(&own, &study.record).fill(realization, 3, &mut held);
        own.fill(realization, 3, &mut free);
        let mean_c = |series: &Series, month: u8| {
            let days = series.mean_c.iter().zip(&series.month).filter(|(_, of)| **of == month);
            days.clone().map(|(mean_c, _)| mean_c).sum::<f64>() / days.count() as f64
        };
        for month in 0..12 {
            prop_assert!((mean_c(&held, month) - mean_c(&study.record, month)).abs() < 1e-9, "month {month}");
            let days = held.mean_c.iter().zip(&free.mean_c).zip(&held.month).filter(|(_, of)| **of == month);
            let shifts: Vec<f64> = days.map(|((held, free), _)| held - free).collect();
            prop_assert!(shifts.iter().all(|shift| (shift - shifts[0]).abs() < 1e-9), "one shift for month {month}");
        }
        prop_assert_eq!(bits(&held.precipitation_mm), bits(&free.precipitation_mm));
        prop_assert_eq!(bits(&held.half_range_c), bits(&free.half_range_c));
        prop_assert_eq!(&held.years, &free.years);
    }

    /// SWE is counted once a day, year and level, and a count's bin is the SWE to within half a bin.
    #[test]
    fn swe_is_counted_on_every_day(scenario in scenarios()) {
        let seasons = Study::of(&scenario, &scenario.changes()).run(2, 4, Path::Widest);
        let (days, width_mm) = (&seasons.swe_days, seasons.swe_days.bins.width_mm);
        for level in 0..seasons.basin.years.len_of(Axis(0)) {
            for day in [0, 100, 364] {
                prop_assert_eq!(days.day(level, day).sum(), 12);
            }
            // The first survey date is the first day.
            let counted = days.day(level, 0);
            let is_within = counted[days.bins.count - 1] == 0;
            let in_bins = counted.iter().enumerate().map(|(bin, count)| bin as f64 * f64::from(*count)).sum::<f64>();
            let surveyed_mm = seasons.basin.years.index_axis(Axis(0), level).index_axis(Axis(0), 0).sum();
            prop_assert!(!is_within || (in_bins * width_mm - surveyed_mm).abs() <= 6.0 * width_mm + 1e-9);
        }
    }

    /// A realization does not depend on how many others are run.
    #[test]
    fn other_realizations_do_not_show(scenario in scenarios()) {
        let study = Study::of(&scenario, &scenario.changes());
        let (few, many) = (study.run(2, 3, Path::Widest), study.run(2, 8, Path::Widest));
        let first = many.basin.years.slice_axis(Axis(2), Slice::from(..3));
        prop_assert_eq!(bits(&few.basin.years), bits(first));
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
        let level = |level: usize| seasons.basin.years.index_axis(Axis(0), level);
        prop_assert_eq!(bits(level(0)), bits(level(changes.len() - 1)));
        let bands = |level: usize| seasons.band_periods.index_axis(Axis(0), level);
        prop_assert_eq!(bits(bands(0)), bits(bands(changes.len() - 1)));
    }

    /// Levels in groups of their own that share one weather give what one group gives, to the bit: bands, basin and counted
    /// days, the reference in any of the groups, and a first year run twice for all levels where the reference keeps snow
    /// through it, however warm the others.
    #[test]
    fn groups_of_one_weather_are_one_group(mut scenario in scenarios(), mean_c in -25.0..15.0) {
        scenario.climate.mean_c = mean_c;
        let changes = scenario.changes();
        let study = Study::of(&scenario, &changes);
        let (unchanged, size) = (study.generator(&study.record), (5, 3));
        let changed = changed(&unchanged);
        let lanes: Vec<Lanes> = changes.iter().map(|change| scenario.lanes(std::slice::from_ref(change))).collect();
        let apart: Vec<LevelGroup<'_>> =
            lanes.iter().map(|lanes| LevelGroup { lanes, generator: &changed }).collect();
        let together = [study.group(&changed)];
        let bins = SweBins::of_record(&study.lanes, &study.record).expect("a closed ledger");
        for reference in 0..changes.len() {
            let [one, several] = [together.as_slice(), &apart].map(|groups| {
                let plan = Plan { reference, ..study.plan(groups, size, Path::Widest) };
                let records: Vec<Vec<&dyn Generator>> = [&changed as &dyn Generator, &unchanged]
                    .map(|generator| vec![generator; groups.len()])
                    .to_vec();
                let of_records: Vec<Vec<u64>> = run_records(&plan, &records, &Silent)
                    .expect("a closed ledger")
                    .map(|found| bits(&found.years))
                    .collect();
                (all_bits(&run(&plan, bins, &Silent).expect("a closed ledger")), of_records)
            });
            prop_assert!(one == several, "groups show, reference {reference}");
        }
    }

    /// Groups with weather of their own give what each gives when it is run by itself, where no snow is perennial; and what
    /// is remembered of a year, in one group or from one record, is not taken for another.
    #[test]
    fn groups_of_several_weathers_are_runs_by_themselves(mut scenario in scenarios(), amount_factor in 0.7..1.6) {
        scenario.climate.mean_c = 25.0;
        let changes = scenario.changes();
        let study = Study::of(&scenario, &changes);
        let (unchanged, size) = (study.generator(&study.record), (4, 5));
        let wet_days = WetDayChange { amount_factor, ..WetDayChange::NONE };
        let weather = [WetDayChange::NONE, wet_days].map(|change| Intensity {
            generator: &unchanged,
            change,
            wet_day_mm: 1.0,
            seed: 20,
        });
        let lanes: Vec<Lanes> = changes.iter().map(|change| scenario.lanes(std::slice::from_ref(change))).collect();
        let groups: Vec<LevelGroup<'_>> = lanes
            .iter()
            .enumerate()
            .map(|(level, lanes)| LevelGroup { lanes, generator: &weather[level % 2] })
            .collect();
        let together = study.run_groups(&groups, 2, size, Path::Widest);
        // High bands under a steep gradient can keep their snow all the same; the first measure is SWE as a water year begins.
        prop_assume!(together.basin.years.index_axis(Axis(1), 0).iter().all(|swe_mm| *swe_mm == 0.0));
        let records: Vec<Vec<&dyn Generator>> = vec![groups.iter().map(|group| group.generator).collect(); 2];
        let plan = study.plan(&groups, size, Path::Widest);
        for of_record in run_records(&plan, &records, &Silent).expect("a closed ledger") {
            prop_assert_eq!(bits(&of_record.years), bits(&together.basin.years));
        }
        for (level, group) in groups.iter().enumerate() {
            let every_year = EveryYearNew(group.generator);
            let alone = [LevelGroup { generator: &every_year, ..*group }];
            let alone = study.run_groups(&alone, 1, size, Path::Widest);
            let of_level = |seasons: &Seasons, level: usize| {
                let basin = bits(seasons.basin.years.index_axis(Axis(0), level));
                let bands = bits(seasons.band_periods.index_axis(Axis(0), level));
                let days = seasons.swe_days.counts.index_axis(Axis(0), level).to_owned();
                (basin, bands, days)
            };
            prop_assert!(of_level(&together, level) == of_level(&alone, 0), "level {}", level);
        }
    }

    /// A realization starts on bare ground; where the reference keeps snow through its first year, that year has been
    /// run once before, and starts on the snow it left.
    #[test]
    fn perennial_snow_is_there_from_the_start(mut scenario in scenarios(), is_cold in any::<bool>()) {
        scenario.climate.mean_c = if is_cold { -60.0 } else { 40.0 };
        scenario.climate.wet_chance = 0.5;
        let seasons = Study::of(&scenario, &scenario.changes()[..1]).run(2, 3, Path::Widest);
        let as_it_begins = (0..3).map(|realization| seasons.basin.years[[0, 0, realization, 0]]);
        let has_rained = scenario.basin.bands.iter().any(|band| {
            scenario.basin.precipitation.factor(scenario.station_m, band.elevation_m) > 0.0
        });
        for swe_mm in as_it_begins {
            prop_assert_eq!(swe_mm > 0.0, is_cold && has_rained, "SWE as the first year begins: {} mm", swe_mm);
        }
    }
}
