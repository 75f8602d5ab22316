//! How bands of one range are told apart: by what of their ground differs.

use super::{Band, Ground};

impl Ground {
    /// `facing 180°, slope 25°`; `level`.
    fn slope_in_words(&self) -> String {
        match self.slope_deg {
            0.0 => "level".to_owned(),
            slope_deg => format!("facing {}°, slope {slope_deg}°", self.aspect_deg),
        }
    }

    /// `45 % canopy`; `open`.
    fn canopy_in_words(&self) -> String {
        match self.canopy_fraction {
            0.0 => "open".to_owned(),
            fraction => format!("{} % canopy", (fraction * 1e4).round() / 100.0),
        }
    }

    fn variation_in_words(&self) -> String {
        self.accumulation_variation.map_or_else(
            || "no accumulation CV of its own".to_owned(),
            |variation| format!("accumulation CV {variation}"),
        )
    }
}

/// What tells each band from the others with the same edges, from the lowest: `facing 180°, slope 25°, 40 % canopy`, of
/// which it says what is not the same in all of them; nothing for a band alone in its range.
pub fn told_apart<'b>(bands: impl IntoIterator<Item = &'b Band>) -> Vec<Option<String>> {
    let bands: Vec<&Band> = bands.into_iter().collect();
    let ranges = bands.chunk_by(|below, above| below.has_edges_of(above));
    ranges.flat_map(|range| range.iter().map(|band| words_within(range, &band.ground))).collect()
}

fn words_within(range: &[&Band], ground: &Ground) -> Option<String> {
    let parts = [Ground::slope_in_words, Ground::canopy_in_words, Ground::variation_in_words];
    let said = parts.into_iter().filter_map(|words| {
        let words_of_band = words(ground);
        range.iter().any(|other| words(&other.ground) != words_of_band).then_some(words_of_band)
    });
    (range.len() > 1).then(|| said.collect::<Vec<_>>().join(", "))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn band(lower_m: f64, ground: Ground) -> Band {
        Band { lower_m, upper_m: lower_m + 200.0, area_km2: 1.0, elevation_m: lower_m + 100.0, ground }
    }

    #[test]
    fn bands_of_one_range_are_told_apart_by_what_differs() {
        let sloping = |aspect_deg, canopy_fraction| Ground {
            slope_deg: 25.0,
            aspect_deg,
            canopy_fraction,
            accumulation_variation: None,
        };
        let spread = Ground { accumulation_variation: Some(0.4), ..Ground::default() };
        let bands = [
            band(2000.0, sloping(180.0, 0.3)),
            band(2200.0, sloping(180.0, 0.455)),
            band(2200.0, sloping(0.0, 0.455)),
            band(2400.0, Ground::default()),
            band(2400.0, sloping(90.0, 0.455)),
            band(2600.0, spread),
            band(2600.0, Ground::default()),
        ];
        let said = told_apart(&bands);
        let said: Vec<&str> = said.iter().map(|words| words.as_deref().unwrap_or("-")).collect();
        assert_eq!(
            said,
            [
                "-",
                "facing 180°, slope 25°",
                "facing 0°, slope 25°",
                "level, open",
                "facing 90°, slope 25°, 45.5 % canopy",
                "accumulation CV 0.4",
                "no accumulation CV of its own"
            ]
        );
    }
}
