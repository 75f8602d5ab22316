//! Lanes: every band at every level as one column of numbers. The only place where options meet.

use super::catch::GaugeMultiplier;
use super::means::Means;
use super::melt::{canopy_share, degree_day_factor};
use super::params::{DegreeRule, SnowParams};
use super::phase_rule::PhaseRule;
use super::step::COLD_PER_MM_C;
use super::{class_multipliers, highest_radiation, potential_radiation, standard_pressure_kpa, wet_bulb_c};
use crate::basin::{Basin, Ground};
use crate::perturb::MonthlyChange;
use crate::weather::YearView;

/// Rows are padded to a multiple of this many lanes: one AVX-512 register, or a cache line.
pub const ROW_MULTIPLE: usize = 8;

/// What one band is made of, as the engine runs it.
#[derive(Debug, Clone, Copy)]
pub struct LaneSpec<'a> {
    /// The basin, for its gradients and its latitude.
    pub basin: &'a Basin,
    /// Elevation of the station, m.
    pub station_m: f64,
    /// Elevation of the lane, m.
    pub elevation_m: f64,
    /// Slope, trees, and how unevenly its snow lies.
    pub ground: Ground,
    /// Warming and precipitation change.
    pub change: &'a MonthlyChange,
    /// What the warming is multiplied by here; 1 where it is the same at every elevation.
    pub warming_factor: f64,
    /// Parameters.
    pub snow: &'a SnowParams,
    /// Share of its basin mean.
    pub share: f64,
}

/// Columns of numbers for the engine, one a lane, and the shares with which they mix to basin means.
///
/// Lanes stand by their place in the group first and by group second: the lowest band at every level, then the next
/// band at every level. So bare lanes stand together at the front of a row, where the engine skips them, and the basin
/// means of all groups are summed side by side. A band whose snow lies unevenly has a lane for each of its classes.
#[derive(Debug, Clone, PartialEq)]
pub struct Lanes {
    pub(super) width: usize,
    pub(super) means: Means,
    pub(super) phase: PhaseRule,
    pub(super) degrees: DegreeRule,
    /// `[month][lane]`: added to the station's daily mean, degC.
    pub(super) mean_offset_c: Vec<f64>,
    /// `[month][lane]`: added to half the daily range, degC.
    pub(super) half_range_offset_c: Vec<f64>,
    /// `[month][lane]`: times the station's precipitation.
    pub(super) precipitation_factor: Vec<f64>,
    /// Of the band's snowfall: what a class gets.
    pub(super) snowfall_multiplier: Vec<f64>,
    /// `[day of year][lane]`, day 1 first: melt of a degree, mm per degC and day.
    pub(super) melt_factor: Vec<f64>,
    /// `[day of year][lane]`: the part of it that is not the sun's; none without radiation, where it is the whole.
    pub(super) degree_day_factor: Option<Vec<f64>>,
    /// Melt base temperature, degC.
    pub(super) melt_base_c: Vec<f64>,
    /// The rule's temperature, degC.
    pub(super) phase_warm_c: Vec<f64>,
    /// The rule's slope, per degC.
    pub(super) phase_per_c: Vec<f64>,
    pub(super) holding_fraction: Vec<f64>,
    pub(super) refreeze_fraction: Vec<f64>,
    /// Pressure at which the wet bulb is taken, kPa; no lanes where the air's temperature tells rain from snow.
    pub(super) pressure_kpa: Vec<f64>,
    /// The correction of the gauge's catch; none where the record is corrected already.
    pub(super) catch: Option<Catch>,
    /// What the cold store and the loss to the air need; none without them.
    pub(super) stores: Option<Stores>,
    /// Whether every year begins on bare ground.
    pub(super) starts_bare: bool,
    has_ground: bool,
}

/// Columns of the gauge's multipliers, and where the gauge stands.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Catch {
    pub rain: Vec<f64>,
    pub snow: Vec<f64>,
    /// Pressure at the station, kPa, where the wet bulb tells rain from snow.
    pressure_kpa: Option<f64>,
}

impl Catch {
    /// The temperature that tells rain from snow at the station on a day, degC.
    pub fn told_by_c(&self, weather: &YearView<'_>, day: usize) -> f64 {
        let mean_c = weather.mean_c[day];
        let wet_bulb = |kpa| wet_bulb_c(mean_c, weather.relative_humidity_pct[day], kpa);
        self.pressure_kpa.map_or(mean_c, wet_bulb)
    }
}

/// Columns of the cold store and of the loss to the air.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Stores {
    /// `[month][lane]`: loss of a day, mm.
    pub loss_mm: Vec<f64>,
    /// Loss as a share of the day's snowfall.
    pub loss_of_snow: Vec<f64>,
    /// Cold of 1 mm of ice for each degree below 0, mm; 0 without a cold store.
    pub cold_per_mm_c: Vec<f64>,
    /// Share of the difference to the air that a day closes.
    pub cold_share: Vec<f64>,
    /// Whether there is a cold store.
    has_cold_content: bool,
    /// Whether the air takes snow.
    has_sublimation: bool,
}

impl Lanes {
    /// Makes the columns. Each group of specs is one basin at one level and gives one basin mean; its shares should
    /// add up to 1. All specs take the kind of rain/snow rule, the degree rule and the kinds of options of the first; their
    /// numbers are their own. A group that is shorter than the longest is filled up with lanes on which nothing falls.
    pub fn new(groups: &[Vec<LaneSpec<'_>>]) -> Self {
        let specs = || groups.iter().flatten();
        let snow = specs().next().map(|spec| *spec.snow);
        let options = snow.map(|snow| snow.options).unwrap_or_default();
        let places = groups.iter().map(Vec::len).max().unwrap_or(0);
        let classes = specs().map(|spec| spec.classes().len()).max().unwrap_or(1);
        let means = Means::new(groups.len(), places, classes);
        let width = means.least_width();
        let row = || vec![0.0; width];
        let mut lanes = Self {
            width,
            means,
            phase: snow.map_or(PhaseRule::LINEAR, |snow| snow.rain_snow),
            degrees: snow.map_or(DegreeRule::Diurnal, |snow| snow.degree_rule),
            mean_offset_c: vec![0.0; 12 * width],
            half_range_offset_c: vec![0.0; 12 * width],
            precipitation_factor: vec![0.0; 12 * width],
            snowfall_multiplier: row(),
            melt_factor: vec![0.0; 366 * width],
            degree_day_factor: options.radiation.map(|_| vec![0.0; 366 * width]),
            melt_base_c: row(),
            phase_warm_c: row(),
            phase_per_c: row(),
            holding_fraction: row(),
            refreeze_fraction: row(),
            pressure_kpa: if options.wet_bulb { vec![standard_pressure_kpa(0.0); width] } else { Vec::new() },
            catch: None,
            stores: (options.cold_content.is_some() || options.sublimation.is_some()).then(|| Stores {
                loss_mm: vec![0.0; 12 * width],
                loss_of_snow: row(),
                cold_per_mm_c: row(),
                cold_share: row(),
                has_cold_content: options.cold_content.is_some(),
                has_sublimation: options.sublimation.is_some(),
            }),
            starts_bare: options.start_bare_each_year,
            has_ground: options.radiation.is_some() || specs().any(|spec| spec.ground.canopy_fraction > 0.0),
        };
        for (group, specs) in groups.iter().enumerate() {
            for (place, spec) in specs.iter().enumerate() {
                let (of_classes, factors) = (spec.classes(), spec.factors());
                let of_class = 1.0 / of_classes.len() as f64;
                for (class, multiplier) in of_classes.into_iter().enumerate() {
                    let lane = lanes.means.lane(group, place, class);
                    lanes.means.set_shares(group, place, class, spec.share, of_class);
                    lanes.snowfall_multiplier[lane] = multiplier;
                    lanes.set(lane, spec);
                    lanes.set_factors(lane, &factors);
                    lanes.set_options(lane, spec);
                }
            }
        }
        lanes
    }

    /// The same on a record that is as the gauge caught it: each group corrects it by multipliers of its own, at the station's
    /// temperature, as [`correct_catch`](super::correct_catch) does for all. Only lanes whose parameters are searched for need
    /// this; the precipitation of the ledger is what fell.
    pub fn on_the_gauge(mut self, multipliers: &[GaugeMultiplier], station_m: f64) -> Self {
        let mut catch = Catch {
            rain: vec![1.0; self.width],
            snow: vec![1.0; self.width],
            pressure_kpa: self.has_wet_bulb().then(|| standard_pressure_kpa(station_m)),
        };
        let lanes_of_a_group = self.means.places * self.means.classes;
        for (group, multiplier) in multipliers.iter().enumerate().take(self.means.groups) {
            for place in 0..lanes_of_a_group {
                let lane = place * self.means.groups + group;
                (catch.rain[lane], catch.snow[lane]) = (multiplier.rain, multiplier.snow);
            }
        }
        self.catch = Some(catch);
        self
    }

    /// Column of a place of a group, both counted from 0 in the order in which they were given: its lane, or the mean of its
    /// classes.
    pub fn column(&self, group: usize, place: usize) -> usize {
        let of_classes = if self.means.classes > 1 { self.width } else { 0 };
        of_classes + place * self.means.groups + group
    }

    /// The lane of a place of a group, that of its first class: all have the same temperature.
    pub fn lane(&self, group: usize, place: usize) -> usize {
        self.means.lane(group, place, 0)
    }

    /// Number of lanes, without the padding.
    pub fn count(&self) -> usize {
        self.means.groups * self.means.places * self.means.classes
    }

    /// Bands of a group.
    pub fn places(&self) -> usize {
        self.means.places
    }

    /// Number of basin means.
    pub fn mixes(&self) -> usize {
        self.means.groups
    }

    /// Column of the first basin mean in a year block; the others follow in the order of their groups.
    pub fn first_mix_column(&self) -> usize {
        self.width + self.means.band_width
    }

    /// A basin mean of a row of lanes: the shares' sum, taken in the order of the group.
    pub fn mix(&self, mix: usize, row: &[f64]) -> f64 {
        self.means.of_group(mix, row)
    }

    /// A band's value of a row of lanes: its lane's, or the mean of its classes.
    pub fn of_place(&self, group: usize, place: usize, row: &[f64]) -> f64 {
        self.means.of_place(group, place, row)
    }

    /// Whether snow lies unevenly within a band.
    pub fn has_patches(&self) -> bool {
        self.means.classes > 1
    }

    /// Whether the wet bulb tells rain from snow.
    pub fn has_wet_bulb(&self) -> bool {
        !self.pressure_kpa.is_empty()
    }

    /// Whether there is a cold store or a loss to the air.
    pub(super) fn has_stores(&self) -> bool {
        self.stores.is_some()
    }

    /// Whether there is a cold store.
    pub fn has_cold_content(&self) -> bool {
        self.stores.as_ref().is_some_and(|stores| stores.has_cold_content)
    }

    /// Whether the air takes snow.
    pub fn has_sublimation(&self) -> bool {
        self.stores.as_ref().is_some_and(|stores| stores.has_sublimation)
    }

    /// Whether a day needs more than the plain model's row passes on a record that is corrected for catch.
    pub(super) fn has_options(&self) -> bool {
        let has_radiation = self.degree_day_factor.is_some();
        let has_option = has_radiation || self.has_patches() || self.has_wet_bulb() || self.has_stores();
        has_option || self.catch.is_some()
    }

    /// Whether radiation or trees make the melt factor differ from the degree-day factor.
    pub fn has_ground(&self) -> bool {
        self.has_ground
    }

    /// What a degree melts on a calendar day of the year, 1 to 366, a row of lanes, mm per degC and day.
    pub fn melt_factors(&self, day_of_year: u16) -> &[f64] {
        let at = (usize::from(day_of_year) - 1) * self.width;
        &self.melt_factor[at..at + self.width]
    }

    fn set(&mut self, lane: usize, spec: &LaneSpec<'_>) {
        let rise_km = (spec.elevation_m - spec.station_m) / 1000.0;
        let gradient = &spec.basin.temperature;
        let by_elevation = spec.basin.precipitation.factor(spec.station_m, spec.elevation_m);
        for month in 0..12 {
            let at = month * self.width + lane;
            let tmin_c =
                spec.warming_factor * spec.change.tmin_c[month] + gradient.tmin_c_per_km[month] * rise_km;
            let tmax_c =
                spec.warming_factor * spec.change.tmax_c[month] + gradient.tmax_c_per_km[month] * rise_km;
            self.mean_offset_c[at] = (tmin_c + tmax_c) / 2.0;
            self.half_range_offset_c[at] = (tmax_c - tmin_c) / 2.0;
            self.precipitation_factor[at] = spec.change.precipitation_factor[month] * by_elevation;
        }
        self.melt_base_c[lane] = spec.snow.melt_base_c;
        (self.phase_warm_c[lane], self.phase_per_c[lane]) = spec.snow.rain_snow.numbers();
        self.holding_fraction[lane] = spec.snow.liquid_holding_fraction;
        self.refreeze_fraction[lane] = spec.snow.refreeze_fraction;
    }

    fn set_factors(&mut self, lane: usize, factors: &[Factors]) {
        for (day, factors) in factors.iter().enumerate() {
            let at = day * self.width + lane;
            self.melt_factor[at] = factors.degree_day + factors.of_sun;
            if let Some(degree_day) = &mut self.degree_day_factor {
                degree_day[at] = factors.degree_day;
            }
        }
    }

    fn set_options(&mut self, lane: usize, spec: &LaneSpec<'_>) {
        if let Some(pressure_kpa) = self.pressure_kpa.get_mut(lane) {
            *pressure_kpa = standard_pressure_kpa(spec.elevation_m);
        }
        let Some(stores) = &mut self.stores else { return };
        if let Some(cold) = spec.snow.options.cold_content {
            stores.cold_per_mm_c[lane] = COLD_PER_MM_C;
            stores.cold_share[lane] = cold.daily_share;
        }
        if let Some(loss) = spec.snow.options.sublimation {
            stores.loss_of_snow[lane] = loss.snowfall_fraction;
            for (month, mm_per_day) in loss.mm_per_day.iter().enumerate() {
                stores.loss_mm[month * self.width + lane] = *mm_per_day;
            }
        }
    }
}

impl LaneSpec<'_> {
    /// What each class of the band gets of its snowfall; a band of even snow is one class.
    fn classes(&self) -> Vec<f64> {
        let Some(patchiness) = self.snow.options.patchiness else { return vec![1.0] };
        let stated = self.ground.accumulation_variation;
        let variation = stated.unwrap_or(patchiness.coefficient_of_variation);
        if variation > 0.0 { class_multipliers(variation, patchiness.classes) } else { vec![1.0] }
    }

    /// What a degree melts on each calendar day of the year.
    fn factors(&self) -> Vec<Factors> {
        let (latitude_deg, ground) = (self.basin.latitude_deg, self.ground);
        let canopy = canopy_share(ground.canopy_fraction);
        let of_sun = self.snow.options.radiation.map(|radiation| {
            let highest = highest_radiation(latitude_deg);
            move |day| {
                let potential = potential_radiation(latitude_deg, ground.slope_deg, ground.aspect_deg, day);
                radiation.factor_mm_per_c_day * (potential / highest)
            }
        });
        let of_day = |day: u16| Factors {
            degree_day: canopy * degree_day_factor(self.snow, day),
            of_sun: of_sun.map_or(0.0, |of_sun| canopy * of_sun(day)),
        };
        (1..=366).map(of_day).collect()
    }
}

/// The two parts of a day's melt factor under the band's trees, mm per degC and day.
struct Factors {
    degree_day: f64,
    of_sun: f64,
}
