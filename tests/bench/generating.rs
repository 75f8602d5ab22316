//! What part of a study's time making the weather takes, for weather that is drawn day by day.

use super::{Bench, seconds};
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::ensemble::{LevelGroup, Plan, Silent, SweBins, run};
use thawline::perturb::{Generator, GeneratorChoice, MarkovGamma, Recipe};
use thawline::season::{Measures, SeasonSettings};
use thawline::snow::Path;
use thawline::weather::Series;

const BANDS: usize = 10;
const LEVELS: usize = 6;
const YEARS: usize = 30;
const REALIZATIONS: u32 = 4;

/// Prints the share that generating has in running realizations, the best of several alternating runs on one thread, and
/// what one fit costs.
pub fn print_share() {
    let case = Bench::new(BANDS, LEVELS);
    let day = |month, day| MonthDay::new(month, day).expect("a day");
    let water_year_starts = WaterYearStart(day(10, 1));
    let recipe = Recipe {
        choice: GeneratorChoice::MarkovGamma,
        seed: 1,
        wet_day_mm: 0.25,
        water_year_starts,
        cool_season_ends: day(4, 1),
    };
    let generator = MarkovGamma::fit(&case.series, &recipe);
    let measures = Measures::new(
        SeasonSettings {
            water_year_starts,
            survey_dates: vec![day(4, 1)],
            volume_windows: Vec::new(),
            outflow_before: vec![day(4, 1)],
            melt_shares_before: vec![day(4, 1)],
            arrival_volume_hm3: None,
        },
        1.0,
    );
    let lanes = case.lanes();
    let plan = Plan {
        groups: &[LevelGroup { lanes: &lanes, generator: &generator }],
        reference: 0,
        bands: BANDS,
        measures: &measures,
        operation: None,
        realizations: REALIZATIONS,
        years: YEARS,
        path: Path::default(),
    };
    let bins = SweBins::of_record(&lanes, &case.series).expect("a closed ledger");
    let pool = rayon::ThreadPoolBuilder::new().num_threads(1).build().expect("a thread");
    let mut weather = Series::default();
    let [mut whole, mut making, mut fitting] = [f64::INFINITY; 3];
    for _ in 0..10 {
        whole = whole.min(seconds(|| {
            pool.install(|| run(&plan, bins, &Silent)).expect("a closed ledger").basin.years.len() as f64
        }));
        making = making.min(seconds(|| {
            let fill = |number| {
                generator.fill(number, YEARS, &mut weather);
                weather.mean_c[0]
            };
            (0..REALIZATIONS).map(fill).sum()
        }));
        fitting = fitting
            .min(seconds(|| f64::from(u8::from(MarkovGamma::fit(&case.series, &recipe) == generator))));
    }
    println!(
        "{} lanes: generating markov-gamma weather takes {:.0} % of a run (at most 25 is wanted); one fit costs as much as \
         {:.1} realizations",
        BANDS * LEVELS,
        100.0 * making / whole,
        fitting / (whole / f64::from(REALIZATIONS)),
    );
}
