//! Where things lie: the snow line, the elevation of freezing and the crossover, what decides each elevation, and snow at risk.

use super::cells::{finish, optional, range, write};
use crate::findings::{AtRisk, Crossover, Dominates, Findings, Line, LineRange, Places};
use crate::units::UnitSystem;
use csv::Writer;

/// One row a level.
pub(super) fn snow_lines(places: &Places, units: UnitSystem) -> Vec<u8> {
    let (elevation, warming) = (units.elevation(), units.warming());
    let [m, c] = [elevation.suffix, warming.suffix];
    let mut writer = Writer::from_writer(Vec::new());
    let header = [
        format!("level_{c}"),
        "snow_line".to_owned(),
        format!("snow_line_{m}"),
        format!("snow_line_q05_{m}"),
        format!("snow_line_q95_{m}"),
        format!("snow_line_resampled_q05_{m}"),
        format!("snow_line_resampled_q95_{m}"),
        format!("snow_line_rise_{m}_per_{c}"),
        format!("snow_line_rise_resampled_q05_{m}_per_{c}"),
        format!("snow_line_rise_resampled_q95_{m}_per_{c}"),
        "freezing".to_owned(),
        format!("freezing_{m}"),
        format!("freezing_rise_{m}_per_{c}"),
        "decides".to_owned(),
        format!("crossover_{m}"),
        format!("crossover_resampled_q05_{m}"),
        format!("crossover_resampled_q95_{m}"),
        "share_of_resamples_with_crossover".to_owned(),
    ];
    write(&mut writer, &header);
    let line = |line: Line| match line {
        Line::At { elevation_m } => ["at".to_owned(), elevation.of(elevation_m).to_string()],
        Line::BelowLowestBand => ["below the lowest band".to_owned(), String::new()],
        Line::AboveHighestBand => ["above the highest band".to_owned(), String::new()],
    };
    let range = |range: Option<LineRange>| {
        let ends = range.map_or([None; 2], |range| [range.q05_m, range.q95_m]);
        ends.map(|end| optional(end.map(|m| elevation.of(m))))
    };
    let rise = |m_per_c: Option<f64>| optional(m_per_c.map(|rise| elevation.of(rise) / warming.of(1.0)));
    for (at, level) in places.snow_line.levels.iter().enumerate() {
        let mut row = vec![warming.of(level.level_c).to_string()];
        row.extend(line(level.snow_line));
        row.extend(range(level.snow_line_range));
        row.extend(range(level.snow_line_resampled));
        row.push(rise(level.snow_line_rise_m_per_c));
        let rises = level.snow_line_rise_resampled_m_per_c;
        row.extend([rises.map(|range| range.q05), rises.map(|range| range.q95)].map(rise));
        row.extend(line(level.freezing));
        row.push(rise(level.freezing_rise_m_per_c));
        let crossover = places.crossover.get(at);
        row.extend(decides(crossover.map(|crossover| crossover.found), units));
        let resampled = crossover.and_then(|crossover| crossover.range);
        row.extend(range(resampled.and_then(|resampled| resampled.elevation)));
        row.push(optional(resampled.map(|resampled| resampled.share_found)));
        write(&mut writer, &row);
    }
    finish(writer)
}

fn decides(found: Option<Dominates>, units: UnitSystem) -> [String; 2] {
    let (words, at_m) = match found {
        Some(Dominates::Crossover { elevation_m }) => {
            ("temperature below, precipitation above", Some(elevation_m))
        }
        Some(Dominates::Reversed { elevation_m }) => {
            ("precipitation below, temperature above", Some(elevation_m))
        }
        Some(Dominates::Temperature) => ("temperature", None),
        Some(Dominates::Precipitation) => ("precipitation", None),
        Some(Dominates::Unknown) | None => ("unknown", None),
    };
    [words.to_owned(), optional(at_m.map(|m| units.elevation().of(m)))]
}

/// One row a level and elevation.
pub(super) fn what_decides(levels: &[Crossover], units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let header = [
        format!("level_{}", units.warming().suffix),
        format!("elevation_{}", units.elevation().suffix),
        "correlation_with_temperature".to_owned(),
        "correlation_with_precipitation".to_owned(),
    ];
    write(&mut writer, &header);
    for level in levels {
        for at in &level.elevations {
            let row = [
                units.warming().of(level.level_c).to_string(),
                units.elevation().of(at.elevation_m).to_string(),
                optional(at.temperature),
                optional(at.precipitation),
            ];
            write(&mut writer, &row);
        }
    }
    finish(writer)
}

/// One row a level; bands are counted from 1, the lowest.
pub(super) fn at_risk_snow(found: &AtRisk, units: UnitSystem) -> Vec<u8> {
    let (area, volume) = (units.area(), units.volume());
    let mut writer = Writer::from_writer(Vec::new());
    let header = [
        format!("level_{}", units.warming().suffix),
        "bands".to_owned(),
        format!("area_{}", area.suffix),
        "area_share".to_owned(),
        format!("volume_{}", volume.suffix),
        format!("volume_q05_{}", volume.suffix),
        format!("volume_q95_{}", volume.suffix),
        format!("volume_resampled_q05_{}", volume.suffix),
        format!("volume_resampled_q95_{}", volume.suffix),
        "volume_share".to_owned(),
        "volume_share_resampled_q05".to_owned(),
        "volume_share_resampled_q95".to_owned(),
    ];
    write(&mut writer, &header);
    for level in &found.levels {
        let bands: Vec<String> = level.bands.iter().map(|band| (band + 1).to_string()).collect();
        let mut row = vec![
            units.warming().of(level.level_c).to_string(),
            bands.join(" "),
            area.of(level.area_km2).to_string(),
            level.area_share.to_string(),
            volume.of(level.volume_hm3).to_string(),
            volume.of(level.volume_range_hm3.q05).to_string(),
            volume.of(level.volume_range_hm3.q95).to_string(),
        ];
        row.extend(range(level.volume_resampled_hm3, |hm3| volume.of(hm3)));
        row.push(optional(level.volume_share));
        row.extend(range(level.volume_share_resampled, |share| share));
        write(&mut writer, &row);
    }
    finish(writer)
}

/// One row a level and band, from the lowest.
pub(super) fn swe_change_by_band(places: &Places, findings: &Findings, units: UnitSystem) -> Vec<u8> {
    let (elevation, depth, volume) = (units.elevation(), units.depth(), units.volume());
    let [m, d, v] = [elevation.suffix, depth.suffix, volume.suffix];
    let mut writer = Writer::from_writer(Vec::new());
    let header = [
        format!("level_{}", units.warming().suffix),
        "band".to_owned(),
        format!("lower_{m}"),
        format!("upper_{m}"),
        format!("area_{}", units.area().suffix),
        format!("change_{d}"),
        format!("change_monte_carlo_error_{d}"),
        format!("change_q05_{d}"),
        format!("change_q95_{d}"),
        "change_pct".to_owned(),
        "change_q05_pct".to_owned(),
        "change_q95_pct".to_owned(),
        format!("change_{v}"),
        format!("change_q05_{v}"),
        format!("change_q95_{v}"),
        "sign".to_owned(),
    ];
    write(&mut writer, &header);
    for level in &places.band_change {
        for (at, (of_band, change)) in findings.bands.iter().zip(&level.bands).enumerate() {
            let band = &of_band.band;
            let mut row = vec![
                units.warming().of(level.level_c).to_string(),
                (at + 1).to_string(),
                elevation.of(band.lower_m).to_string(),
                elevation.of(band.upper_m).to_string(),
                units.area().of(band.area_km2).to_string(),
            ];
            let of = |value: Option<f64>| optional(value);
            let depths = [
                change.map(|change| change.median_mm.value),
                change.and_then(|change| change.median_mm.monte_carlo_error),
                change.map(|change| change.range_mm.q05),
                change.map(|change| change.range_mm.q95),
            ];
            row.extend(depths.map(|mm| of(mm.map(|mm| depth.of(mm)))));
            let percents = [
                change.and_then(|change| change.percent),
                change.and_then(|change| Some(change.range_pct?.q05)),
                change.and_then(|change| Some(change.range_pct?.q95)),
            ];
            row.extend(percents.map(of));
            let volumes = [
                change.map(|change| change.median_hm3),
                change.map(|change| change.range_hm3.q05),
                change.map(|change| change.range_hm3.q95),
            ];
            row.extend(volumes.map(|hm3| of(hm3.map(|hm3| volume.of(hm3)))));
            row.push(change.map_or("none", |change| change.sign.word()).to_owned());
            write(&mut writer, &row);
        }
    }
    finish(writer)
}
