//! Sound files with bytes changed, doubled and taken out: read or refused, never a panic.

use super::super::basin::{SCENARIO, weather};
use proptest::prelude::*;
use proptest::sample::Index;
use thawline::basin::{BandColumns, read_bands};
use thawline::scenario::{Document, Drawing, draw, read};
use thawline::table::{Encoding, decode};

/// One change of some bytes.
#[derive(Debug, Clone)]
enum Change {
    TakeOut(Index, usize),
    Double(Index, usize),
    Set(Index, u8),
}

fn change() -> impl Strategy<Value = Change> {
    let sign = prop_oneof![any::<u8>(), prop::sample::select(b"\",;\n\r\t#=[]{}.-0e'\\\xff\0".to_vec())];
    prop_oneof![
        (any::<Index>(), 1..200_usize).prop_map(|(at, length)| Change::TakeOut(at, length)),
        (any::<Index>(), 1..200_usize).prop_map(|(at, length)| Change::Double(at, length)),
        (any::<Index>(), sign).prop_map(|(at, byte)| Change::Set(at, byte)),
    ]
}

fn changed(text: &str, changes: &[Change]) -> Vec<u8> {
    let mut bytes = text.as_bytes().to_vec();
    for change in changes.iter().filter(|_| !text.is_empty()) {
        let range = |at: &Index, length: usize, bytes: &[u8]| {
            let from = at.index(bytes.len());
            from..(from + length).min(bytes.len())
        };
        match change {
            _ if bytes.is_empty() => break,
            Change::TakeOut(at, length) => drop(bytes.drain(range(at, *length, &bytes))),
            Change::Double(at, length) => {
                let range = range(at, *length, &bytes);
                let piece = bytes[range.clone()].to_vec();
                bytes.splice(range.end..range.end, piece);
            }
            Change::Set(at, byte) => {
                let at = at.index(bytes.len());
                bytes[at] = *byte;
            }
        }
    }
    bytes
}

/// Reads a scenario and the files it would name, and draws every fault there is.
fn read_all(scenario: &[u8], bands: &[u8], record: &[u8]) {
    for encoding in Encoding::NAMES.map(|(_, encoding)| encoding) {
        let text = |bytes: &[u8]| decode(bytes.to_vec(), encoding);
        let Ok(scenario) = text(scenario) else { continue };
        let document = Document::parse(&scenario);
        let draft = read(&document);
        let mut faults = draft.faults;
        if let Ok(bands) = text(bands) {
            faults.extend(read_bands("bands.csv", &bands, &BandColumns::default()).err().unwrap_or_default());
        }
        if let (Some(typed), Some(season), Ok(record)) = (&draft.record_source, &draft.season, text(record)) {
            let (start, survey) = (season.water_year_starts, season.survey_dates[0]);
            match thawline::weather::read(
                "weather.csv",
                &record,
                &typed.columns,
                start,
                survey,
                &typed.limits,
            ) {
                Ok(record) => drop(record.unlikely(false)),
                Err(more) => faults.extend(more),
            }
        }
        let drawing =
            Drawing { file: "scenario.toml", text: &scenario, document: &document, is_coloured: false };
        assert!(!draw(&faults, &drawing).is_empty());
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 64, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn changed_bytes_never_panic(
        scenario in prop::collection::vec(change(), 0..3),
        bands in prop::collection::vec(change(), 0..4),
        record in prop::collection::vec(change(), 1..6),
    ) {
        let sound = "lower_m,upper_m,area_km2\n1900,2200,40\n2200,2500,25\n";
        read_all(&changed(SCENARIO, &scenario), &changed(sound, &bands), &changed(&weather(2), &record));
    }
}
