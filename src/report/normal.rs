//! Percent of median: the baseline years in words, and tables.

use super::numbers::counted;
use super::study::Study;
use super::tables::{GroundColumns, ReportFile, finish, optional, write, yes_or_no};
use crate::baseline::{BaselineChoice, BaselineYears, ENOUGH_BASELINE_YEARS, USUAL_BASELINE};
use crate::findings::{MedianSwe, RecordFindings};
use csv::Writer;

/// `1991 to 2020, of which 28 are in use`, with where they come from.
pub(super) fn baseline_years_in_words(years: &BaselineYears) -> String {
    let are_in_use = match years.in_use {
        1 => "1 is in use".to_owned(),
        count => format!("{count} are in use"),
    };
    let (first, last) = (years.first, years.last);
    match years.choice {
        BaselineChoice::Stated => format!("{first} to {last} as stated, of which {are_in_use}"),
        BaselineChoice::Usual => format!("{first} to {last}, of which {are_in_use}"),
        BaselineChoice::AllInUse => format!(
            "all {} in use, {first} to {last}, since fewer than {ENOUGH_BASELINE_YEARS} of {} to {} are",
            counted(years.in_use, "year"),
            USUAL_BASELINE[0],
            USUAL_BASELINE[1]
        ),
    }
}

/// `tables/percent-of-median.csv` and `tables/medians.csv`.
pub(super) fn normal_tables(study: &Study<'_>) -> Vec<ReportFile> {
    let Some(record) = &study.findings.record else { return Vec::new() };
    vec![
        ("tables/percent-of-median.csv".to_owned(), percents(study, record)),
        ("tables/medians.csv".to_owned(), medians(study, record)),
    ]
}

/// One row a survey date, level and year.
fn percents(study: &Study<'_>, record: &RecordFindings) -> Vec<u8> {
    let (depth, warming) = (study.reader.units.depth(), study.reader.units.warming());
    let mut writer = Writer::from_writer(Vec::new());
    let header = [
        "water_year".to_owned(),
        "baseline_year".to_owned(),
        "survey".to_owned(),
        format!("level_{}", warming.suffix),
        format!("swe_{}", depth.suffix),
        format!("median_{}", depth.suffix),
        "percent_of_median".to_owned(),
        "percent_of_first_survey_median".to_owned(),
        format!("moved_median_{}", depth.suffix),
        "percent_of_moved_median".to_owned(),
        "flag".to_owned(),
    ];
    write(&mut writer, &header);
    let or_none = |percent: Option<f64>| percent.map_or("none".to_owned(), |percent| percent.to_string());
    for on in &record.percent_of_median {
        for level in &on.levels {
            for (at, year) in record.years.iter().enumerate() {
                let first = level.percent_of_first_survey.as_ref().map(|percents| or_none(percents[at]));
                let row = [
                    year.water_year.to_string(),
                    yes_or_no(year.is_baseline),
                    on.survey.to_string(),
                    warming.of(level.level_c).to_string(),
                    depth.of(level.swe_mm[at]).to_string(),
                    depth.of(on.basin.median_mm).to_string(),
                    or_none(level.percent[at]),
                    first.unwrap_or_default(),
                    depth.of(level.moved_median_mm).to_string(),
                    or_none(level.percent_of_moved[at]),
                    flag(&on.basin),
                ];
                write(&mut writer, &row);
            }
        }
    }
    finish(writer)
}

/// One row a survey date and band, the basin's last.
fn medians(study: &Study<'_>, record: &RecordFindings) -> Vec<u8> {
    let units = study.reader.units;
    let (depth, elevation, area) = (units.depth(), units.elevation(), units.area());
    let mut writer = Writer::from_writer(Vec::new());
    let bands = &study.basin.bands;
    let ground = GroundColumns::of(bands);
    let mut header = vec![
        "survey".to_owned(),
        "band".to_owned(),
        format!("lower_{}", elevation.suffix),
        format!("upper_{}", elevation.suffix),
        format!("area_{}", area.suffix),
    ];
    header.extend(ground.names());
    header.extend([
        format!("median_{}", depth.suffix),
        format!("highest_median_of_year_{}", depth.suffix),
        "percent_of_highest".to_owned(),
        "flag".to_owned(),
    ]);
    write(&mut writer, &header);
    for on in &record.percent_of_median {
        let of_bands = bands.iter().zip(&on.bands).enumerate().map(|(number, (band, median))| {
            (
                [
                    (number + 1).to_string(),
                    elevation.of(band.lower_m).to_string(),
                    elevation.of(band.upper_m).to_string(),
                ],
                band.area_km2,
                Some(band),
                median,
            )
        });
        let edges =
            bands.first().zip(bands.last()).map_or([0.0; 2], |(low, high)| [low.lower_m, high.upper_m]);
        let [low, high] = edges.map(|edge_m| elevation.of(edge_m).to_string());
        let of_basin = (["basin".to_owned(), low, high], study.basin.area_km2(), None, &on.basin);
        for (place, area_km2, band, median) in of_bands.chain([of_basin]) {
            let highest = median.highest_median_mm;
            let mut row = vec![on.survey.to_string()];
            row.extend(place);
            row.push(area.of(area_km2).to_string());
            row.extend(ground.cells(band));
            row.extend([median.median_mm, highest].map(|mm| depth.of(mm).to_string()));
            row.push(optional((highest > 0.0).then(|| 100.0 * median.median_mm / highest)));
            row.push(flag(median));
            write(&mut writer, &row);
        }
    }
    finish(writer)
}

fn flag(median: &MedianSwe) -> String {
    if median.is_unstable { "unstable".to_owned() } else { String::new() }
}
