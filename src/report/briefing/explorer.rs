//! Any warming with any change of precipitation, read between the response surface's runs by the page's own script.

use super::super::answer::{is_scarce, telling_level};
use super::super::numbers::{Decimals, counted, days_moved};
use super::super::reader::{Reader, VOLUME_DECIMALS};
use super::super::study::Study;
use crate::basin::told_apart;
use crate::calendar::MONTHS;
use crate::findings::{Findings, NodeMeasure, ResponseSurface};
use crate::season::{Kind, LEAST_REFERENCE_MM, Measure, Outcome};
use maud::{Markup, PreEscaped, html};
use serde::Serialize;

/// Where it stands.
pub(super) const ADDRESS: &str = "try-a-change";

/// Whole days.
const TENTHS: Decimals = Decimals { below: &[], otherwise: 1 };
const WHOLE: Decimals = Decimals { below: &[], otherwise: 0 };

/// What the script reads: the nodes in the reader's units, and the words that it needs.
#[derive(Serialize)]
struct Runs {
    warming_key: String,
    warmings: Vec<f64>,
    changes_pct: Vec<f64>,
    reference: f64,
    /// The pair that it opens with.
    start: f64,
    water_year_starts: [u32; 2],
    months: [&'static str; 12],
    measures: Vec<Row>,
    bands: Vec<Row>,
    words: Said,
}

/// What the script says, with names in braces where it puts numbers.
#[derive(Serialize)]
struct Said {
    pair: String,
    at_node: String,
    between: String,
    without: String,
    outside: String,
    missing: &'static str,
    unchanged: String,
    /// By one day, and by several.
    earlier: [String; 2],
    later: [String; 2],
}

impl Said {
    fn of(reader: Reader, title: &str) -> Self {
        let unit = reader.units.warming().word;
        let found =
            |how: &str| format!("{{pair}}: {title} {{value}}, {{change}} against the reference; {how}.");
        // As the rest of the page says it.
        let by =
            |direction: f64| [days_moved(direction), days_moved(2.0 * direction).replacen('2', "{days}", 1)];
        Self {
            pair: format!("{{warming}} {unit} and {{change}} % precipitation"),
            at_node: found("run at this very pair"),
            between: found("read between runs"),
            without: format!("At {{pair}} there is no {title}."),
            outside: format!(
                "Nothing was run at {{pair}}: runs reach from {{coldest}} to {{warmest}} {unit} and from {{driest}} to {{wettest}} % \
                 precipitation."
            ),
            missing: "A number is missing.",
            unchanged: days_moved(0.0),
            earlier: by(-1.0),
            later: by(1.0),
        }
    }
}

/// A number that the explorer tells, at every node; all changes of the first warming before those of the second.
#[derive(Serialize)]
struct Row {
    title: String,
    kind: &'static str,
    unit: &'static str,
    /// A share's change is told in points.
    unit_of_change: &'static str,
    decimals: Decimals,
    /// A change of less than so much of the reference has no percentage; none of what is not an amount.
    least_for_percent: Option<f64>,
    nodes: Vec<Option<f64>>,
    /// Monte Carlo error of the change from the reference.
    errors: Vec<Option<f64>>,
}

/// The section and what its script reads; nothing where no surface was run or there is hardly any snow.
pub(super) fn section(study: &Study<'_>) -> Markup {
    let has_snow = study.findings.basin.first().is_some_and(|headline| !is_scarce(headline));
    let Some(surface) = study.findings.surface.as_ref().filter(|_| has_snow) else {
        return html! {};
    };
    let reader = study.reader;
    let runs = runs(study, surface);
    let [from, to] = ends(&runs.warmings);
    let [driest, wettest] = ends(&surface.precipitation_changes_pct);
    // A `<` in the data could end their element.
    let data = serde_json::to_string(&runs).unwrap_or_default().replace('<', "\\u003c");
    let unit = reader.units.warming().word;
    html! {
        section.explorer #(ADDRESS) aria-labelledby="explorer-title" {
            h2 #explorer-title { "Try a warming and a change of precipitation" }
            p {
                "Medians of " (counted(surface.realizations, "realization")) ", run at " (surface.nodes.len()) " pairs of warming and precipitation change and read \
                 between them by straight lines. All precipitation is changed by the same percentage. A pair is a what-if: it has no date and no \
                 likelihood. The figure and table of " a href="#together" { "warming and precipitation together" } " hold the same runs."
            }
            p.unscripted { "The sliders need the page's own small script, which is off or unknown here; nothing else does." }
            div #explorer-tool hidden {
                (slider("warming", &format!("Warming, {unit}"), [from, to], "0.1"))
                (slider("precipitation", "Change of precipitation, %", [driest, wettest], "1"))
                p { button #explorer-reference type="button" { "Back to the reference" } }
                p #explorer-said role="status" {}
                div.scroll { table #explorer-basin {
                    caption { "At this pair, and its change from the reference; ± the largest Monte Carlo error of the runs around it." }
                    thead { tr { th scope="col" { "Basin" } th scope="col" { "At this pair" } th scope="col" { "Change" } th scope="col" { "Monte Carlo ±" } } }
                    tbody {}
                } }
                div.scroll { table #explorer-bands {
                    caption { "The same by elevation: " (surface.measures.first().map_or("", |headline| headline.title.as_str())) ", the highest band first." }
                    thead { tr {
                        th scope="col" { "Band, " (reader.units.elevation().word) }
                        th scope="col" { "Reference" }
                        th scope="col" { "At this pair" }
                        th scope="col" { "Change" }
                        th.text scope="col" { "Of the reference" }
                    } }
                    tbody {}
                } }
            }
            script #explorer-runs type="application/json" { (PreEscaped(data)) }
        }
    }
}

fn slider(name: &str, label: &str, [from, to]: [f64; 2], step: &str) -> Markup {
    let typed = format!("explorer-{name}-typed");
    html! { div.slider {
        label for=(typed) { (label) }
        input id=(typed) type="number" step="any" value="0" autocomplete="off";
        input id=(format!("explorer-{name}")) type="range" min=(from) max=(to) step=(step) value="0" aria-label=(label) autocomplete="off";
    } }
}

/// The level that the answer tells of, where the grid reaches so far; else the reference.
fn start_c(findings: &Findings, surface: &ResponseSurface) -> f64 {
    let [coldest_c, warmest_c] = ends(&surface.warmings_c);
    let told_c = telling_level(findings).map(|at| findings.levels_c[at]);
    let told_c = told_c.filter(|level_c| (coldest_c..=warmest_c).contains(level_c));
    told_c.unwrap_or(findings.levels_c[findings.reference])
}

fn ends(values: &[f64]) -> [f64; 2] {
    [values.first(), values.last()].map(|end| end.copied().unwrap_or(0.0))
}

fn runs(study: &Study<'_>, surface: &ResponseSurface) -> Runs {
    let (findings, reader) = (study.findings, study.reader);
    let area_km2 = study.basin.area_km2();
    let row = |(at, measure): (usize, &Measure)| measure_row(surface, at, (measure, area_km2), reader);
    let warming = reader.units.warming();
    let starts = reader.starts.0;
    Runs {
        warming_key: format!("warming_{}", warming.suffix),
        warmings: surface.warmings_c.iter().map(|warming_c| warming.of(*warming_c)).collect(),
        changes_pct: surface.precipitation_changes_pct.clone(),
        reference: warming.of(findings.levels_c[findings.reference]),
        start: warming.of(start_c(findings, surface)),
        water_year_starts: [starts.month(), starts.day()],
        months: MONTHS,
        measures: surface.measures.iter().enumerate().filter_map(row).collect(),
        bands: bands(study, surface),
        words: Said::of(reader, surface.measures.first().map_or("", |headline| headline.title.as_str())),
    }
}

/// A volume where the measure is one; nothing of a kind that the surface does not have.
fn measure_row(
    surface: &ResponseSurface,
    at: usize,
    (measure, area_km2): (&Measure, f64),
    reader: Reader,
) -> Option<Row> {
    let (depth, volume) = (reader.units.depth(), reader.units.volume());
    let to_hm3 = area_km2 / 1000.0;
    let (kind, unit, decimals, factor) = match measure.kind {
        // 1 mm over 1 km2 is 0.001 hm3.
        Kind::AmountMm if measure.is_volume => ("amount", volume.word, VOLUME_DECIMALS, volume.of(to_hm3)),
        Kind::VolumeHm3 => ("amount", volume.word, VOLUME_DECIMALS, volume.of(1.0)),
        Kind::AmountMm => ("amount", depth.word, reader.depth_decimals(), depth.of(1.0)),
        Kind::DayOfWaterYear | Kind::ArrivalDay => ("date", "days", WHOLE, 1.0),
        Kind::DayCount => ("days", "days", WHOLE, 1.0),
        Kind::Share => ("amount", "%", TENTHS, 100.0),
        Kind::AmountMmDays => return None,
    };
    let of = |node: &NodeMeasure| match node.median {
        Outcome::Value(value) => Some(factor * value),
        _ => None,
    };
    let error = |node: &NodeMeasure| Some(factor * node.change?.monte_carlo_error?);
    let nodes = || surface.nodes.iter().map(|node| &node.measures[at]);
    Some(Row {
        title: crate::figures::sentence(&measure.title),
        kind,
        unit,
        unit_of_change: if measure.kind == Kind::Share { "points" } else { unit },
        decimals,
        least_for_percent: measure.kind.least_reference().map(|least| factor * least),
        nodes: nodes().map(of).collect(),
        errors: nodes().map(error).collect(),
    })
}

/// The bands from the highest.
fn bands(study: &Study<'_>, surface: &ResponseSurface) -> Vec<Row> {
    let reader = study.reader;
    let depth = reader.units.depth();
    let bands = &study.basin.bands;
    let apart = told_apart(bands.iter());
    let row = |(at, band): (usize, &crate::basin::Band)| Row {
        title: format!(
            "{} – {}{}",
            reader.elevation_bare(band.lower_m),
            reader.elevation_bare(band.upper_m),
            apart[at].as_ref().map_or_else(String::new, |ground| format!(", {ground}"))
        ),
        kind: "amount",
        unit: depth.word,
        unit_of_change: depth.word,
        decimals: reader.depth_decimals(),
        least_for_percent: Some(depth.of(LEAST_REFERENCE_MM)),
        nodes: surface.nodes.iter().map(|node| node.band_swe_mm.get(at).map(|mm| depth.of(*mm))).collect(),
        errors: Vec::new(),
    };
    bands.iter().enumerate().rev().map(row).collect()
}
