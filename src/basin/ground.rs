//! What lies under a band's snow: its slope, its trees, and how unevenly the snow lies.

use super::{Band, Basin};
use crate::fault::Unlikely;
use serde::Serialize;

/// The ground of a band. The default is level, open, and without a spread of its own.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct Ground {
    /// Slope, degrees from the horizontal, 0 to 90.
    pub slope_deg: f64,
    /// The way the slope faces, degrees clockwise from north, 0 to 360; 0 where it is level.
    pub aspect_deg: f64,
    /// Share of the area under trees, 0 to 1.
    pub canopy_fraction: f64,
    /// Coefficient of variation of the snow that lies within the band; none where the scenario's own holds.
    pub accumulation_variation: Option<f64>,
}

impl Ground {
    /// Whether it is that of a band of which nothing is said.
    pub fn is_plain(&self) -> bool {
        *self == Self::default()
    }
}

/// Which parts of the ground a file of bands says anything about.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub struct GroundStated {
    /// Some band slopes.
    pub slope: bool,
    /// Some band has trees.
    pub canopy: bool,
    /// Some band has a spread of its own.
    pub variation: bool,
}

impl GroundStated {
    /// What any of the bands has.
    pub fn of<'b>(bands: impl IntoIterator<Item = &'b Band>) -> Self {
        bands.into_iter().fold(Self::default(), |stated, Band { ground, .. }| Self {
            slope: stated.slope || ground.slope_deg > 0.0,
            canopy: stated.canopy || ground.canopy_fraction > 0.0,
            variation: stated.variation || ground.accumulation_variation.is_some(),
        })
    }
}

/// Slopes steeper than this hold little snow (common practice), so that the mean of a band is most likely in percent, degrees.
const STEEP_DEG: f64 = 60.0;

impl Basin {
    /// How many ranges of elevation the bands share.
    pub fn ranges(&self) -> usize {
        self.bands.chunk_by(Band::has_edges_of).count()
    }

    /// Ground that can be, and hardly is.
    pub(super) fn odd_ground(&self) -> Vec<Unlikely> {
        const MOST_VARIATION: f64 = 0.9;
        const LEAST_CANOPY: f64 = 0.01;
        let mut found = Vec::new();
        let variations = self.bands.iter().filter_map(|band| band.ground.accumulation_variation);
        let most = variations.fold(0.0, f64::max);
        if most > MOST_VARIATION {
            let why = format!(
                "accumulation_cv is {most} in one of the bands; usual is 0.1 to 0.9 (Liston 2004, from memory)"
            );
            found.push(Unlikely::new("basin.bands", why));
        }
        let most = self.bands.iter().map(|band| band.ground.canopy_fraction).fold(0.0, f64::max);
        if most > 0.0 && most <= LEAST_CANOPY {
            let why = "trees cover at most 1 % of any band: are they fractions in a column of percent?";
            found.push(Unlikely::new("basin.bands", why));
        }
        found
    }

    /// Says so where bands are steeper than snow lies.
    pub(super) fn too_steep(&self) -> Option<Unlikely> {
        let steep = self.bands.iter().filter(|band| band.ground.slope_deg > STEEP_DEG).count();
        let why = format!(
            "{steep} of {} bands are steeper than {STEEP_DEG}°, where little snow stays: is the slope in degrees, not in percent?",
            self.bands.len()
        );
        (steep > 0).then(|| Unlikely::new("basin.bands", why))
    }

    /// Says so where melt is to go with the sun on the slopes and no band slopes.
    pub fn level_under_the_sun(&self) -> Option<Unlikely> {
        let why = "no band slopes, so all ground is taken as level: slope_deg and aspect_deg in the bands' file say otherwise";
        (!GroundStated::of(&self.bands).slope).then(|| Unlikely::new("snow.radiation", why))
    }

    /// What the file of the bands says of their ground and none of the options that are on has a use for; `uses` is what they
    /// have a use for.
    pub fn unused_ground(&self, uses: GroundStated) -> Vec<Unlikely> {
        let stated = GroundStated::of(&self.bands);
        let unused = [
            (stated.slope && !uses.slope, "slopes and aspects are used only with [snow.radiation]"),
            (stated.canopy && !uses.canopy, "the canopy is used by no option that is on"),
            (stated.variation && !uses.variation, "accumulation_cv is used only with [snow.patchiness]"),
        ];
        let notices = unused.into_iter().filter(|(is_unused, _)| *is_unused);
        notices.map(|(_, why)| Unlikely::new("basin.bands", why)).collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::basin::{GradientForm, PrecipitationGradient, TemperatureGradient};

    fn basin(grounds: &[Ground]) -> Basin {
        let band = |ground: &Ground| Band {
            lower_m: 2000.0,
            upper_m: 2200.0,
            area_km2: 1.0,
            elevation_m: 2100.0,
            ground: *ground,
        };
        Basin {
            latitude_deg: 40.0,
            bands: grounds.iter().map(band).collect(),
            temperature: TemperatureGradient::constant(-6.0),
            precipitation: PrecipitationGradient::new(0.0, None, GradientForm::Linear),
        }
    }

    #[test]
    fn ground_that_no_option_uses_is_said() {
        let sloping = Ground { slope_deg: 20.0, ..Ground::default() };
        let spread = Ground { accumulation_variation: Some(0.0), ..Ground::default() };
        let basin = basin(&[sloping, spread]);
        assert_eq!(basin.ranges(), 1);
        let said = |slope, variation| {
            let notices = basin.unused_ground(GroundStated { slope, canopy: true, variation });
            notices.into_iter().map(|notice| notice.why).collect::<Vec<_>>()
        };
        let [radiation, patchiness] = [
            "slopes and aspects are used only with [snow.radiation]",
            "accumulation_cv is used only with [snow.patchiness]",
        ];
        assert_eq!(said(false, false), [radiation, patchiness]);
        assert_eq!(
            (said(true, false), said(false, true)),
            (vec![patchiness.to_owned()], vec![radiation.to_owned()])
        );
        assert!(said(true, true).is_empty());
    }

    #[test]
    fn a_slope_in_percent_is_likely_one() {
        let steep =
            |slope_deg| basin(&[Ground { slope_deg, ..Ground::default() }, Ground::default()]).too_steep();
        assert_eq!(steep(60.0), None);
        assert!(
            steep(61.0).is_some_and(|notice| notice.why.starts_with("1 of 2 bands are steeper than 60°"))
        );
    }
}
