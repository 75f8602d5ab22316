//! Quantities as one reader takes them: in the reader's units, rounded to what they can bear, with the unit's word.

use super::numbers::{Decimals, date, fixed, precision, signed, trimmed};
use crate::basin::{GradientForm, PrecipitationGradient, TemperatureGradient};
use crate::calendar::WaterYearStart;
use crate::season::{Kind, Outcome};
use crate::units::UnitSystem;

/// Three figures of a volume in the reader's unit.
pub const VOLUME_DECIMALS: Decimals = Decimals { below: &[(9.995, 2), (99.95, 1)], otherwise: 0 };

/// Who reads.
#[derive(Debug, Clone, Copy)]
pub struct Reader {
    /// The units that the reader asked for.
    pub units: UnitSystem,
    /// The first day of the reader's water years.
    pub starts: WaterYearStart,
}

impl Reader {
    /// `412 mm`, `16.2 in`: a depth of water.
    pub fn amount(self, value_mm: f64) -> String {
        format!("{} {}", self.amount_bare(value_mm), self.units.depth().word)
    }

    /// The same without its unit.
    pub fn amount_bare(self, value_mm: f64) -> String {
        fixed(self.units.depth().of(value_mm), self.amount_decimals(value_mm))
    }

    /// `−112 mm`, `+0.43 in`: a change of a depth of water.
    pub fn change(self, value_mm: f64) -> String {
        let depth = self.units.depth();
        format!("{} {}", signed(depth.of(value_mm), self.amount_decimals(value_mm)), depth.word)
    }

    /// `−130 and −94 mm`: two changes with the decimals of the larger.
    pub fn change_and_change(self, low_mm: f64, high_mm: f64) -> String {
        let depth = self.units.depth();
        let decimals = self.amount_decimals(low_mm.abs().max(high_mm.abs()));
        let [low, high] = [low_mm, high_mm].map(|mm| signed(depth.of(mm), decimals));
        format!("{low} and {high} {}", depth.word)
    }

    /// `10 mm`, `0.39 in`: a stated depth, with the decimals that it needs.
    pub fn limit(self, value_mm: f64) -> String {
        let depth = self.units.depth();
        format!("{} {}", trimmed(&fixed(depth.of(value_mm), 2)), depth.word)
    }

    /// Whole mm and tenths below 10 mm; tenths of an inch and hundredths below 1 in.
    fn amount_decimals(self, value_mm: f64) -> usize {
        self.depth_decimals().of(self.units.depth().of(value_mm))
    }

    /// Of a depth in the reader's unit.
    pub fn depth_decimals(self) -> Decimals {
        match self.units {
            UnitSystem::Metric => Decimals { below: &[(9.95, 1)], otherwise: 0 },
            UnitSystem::Us => Decimals { below: &[(0.995, 2)], otherwise: 1 },
        }
    }

    /// `−1 °C`, `33.8 °F`: a temperature, with the decimals that it has, at most two.
    pub fn temperature(self, temperature_c: f64) -> String {
        let unit = self.units.temperature();
        format!("{} {}", trimmed(&fixed(unit.of(temperature_c), 2)), unit.word)
    }

    /// `+2 °C`, `+3.6 °F`: a warming level, with the decimals that it has, at most two.
    pub fn level(self, level_c: f64) -> String {
        let unit = self.units.warming();
        format!("{} {}", trimmed(&signed(unit.of(level_c), 2)), unit.word)
    }

    /// `0.6 °C`, `1.08 °F`: the size of a difference of temperatures.
    pub fn difference(self, difference_c: f64) -> String {
        let unit = self.units.warming();
        format!("{} {}", trimmed(&fixed(unit.of(difference_c), 2)), unit.word)
    }

    /// `+1.4 °C`: a warming between levels, to a tenth.
    pub fn between_levels(self, warming_c: f64) -> String {
        format!("{} {}", self.between_levels_bare(warming_c), self.units.warming().word)
    }

    /// The same without its unit.
    pub fn between_levels_bare(self, warming_c: f64) -> String {
        signed(self.units.warming().of(warming_c), 1)
    }

    /// `1830 m`, `6004 ft`.
    pub fn elevation(self, elevation_m: f64) -> String {
        format!("{} {}", self.elevation_bare(elevation_m), self.units.elevation().word)
    }

    /// `154 m for each °C`: how far a line rises with warming.
    pub fn elevation_per_degree(self, rise_m_per_c: f64) -> String {
        let (elevation, warming) = (self.units.elevation(), self.units.warming());
        let rise = self.elevation_per_degree_bare(rise_m_per_c);
        format!("{rise} {} for each {}", elevation.word, warming.word)
    }

    /// The same without its units.
    pub fn elevation_per_degree_bare(self, rise_m_per_c: f64) -> String {
        fixed(self.units.elevation().of(rise_m_per_c) / self.units.warming().of(1.0), 0)
    }

    /// The same without its unit.
    pub fn elevation_bare(self, elevation_m: f64) -> String {
        fixed(self.units.elevation().of(elevation_m), 0)
    }

    /// `61.4`: an area without its unit.
    pub fn area_bare(self, area_km2: f64) -> String {
        fixed(self.units.area().of(area_km2), 1)
    }

    /// `0.5 to 3.5 mm per °C and day`: two degree-day factors, or one where they are the same.
    pub fn degree_day_factors(self, lowest: f64, highest: f64) -> String {
        let unit = self.units.degree_day_factor();
        let [lowest, highest] =
            [lowest, highest].map(|factor| trimmed(&fixed(unit.of(factor), 3)).to_owned());
        if lowest == highest {
            format!("{highest} {}", unit.word)
        } else {
            format!("{lowest} to {highest} {}", unit.word)
        }
    }

    /// `+3.0 % per °C`: what precipitation does with warming.
    pub fn percent_per_degree(self, pct_per_c: f64) -> String {
        let unit = self.units.percent_per_degree();
        format!("{} {}", signed(unit.of(pct_per_c), 1), unit.word)
    }

    /// `−6 °C per km`; `−5 °C per km for minima, −7 °C per km for maxima`.
    pub fn temperature_gradient(self, gradient: &TemperatureGradient) -> String {
        let TemperatureGradient { tmin_c_per_km, tmax_c_per_km } = gradient;
        if tmin_c_per_km == tmax_c_per_km {
            return self.gradient_of_months(tmin_c_per_km);
        }
        let [minima, maxima] = [tmin_c_per_km, tmax_c_per_km].map(|months| self.gradient_of_months(months));
        format!("{minima} for minima, {maxima} for maxima")
    }

    /// `−6 °C per km`; `−5, −5.5, ... °C per km from January to December`.
    fn gradient_of_months(self, months: &[f64; 12]) -> String {
        let unit = self.units.temperature_gradient();
        let said = |c_per_km: &f64| trimmed(&fixed(unit.of(*c_per_km), 2)).to_owned();
        if months.iter().all(|month| *month == months[0]) {
            return format!("{} {}", said(&months[0]), unit.word);
        }
        let all: Vec<String> = months.iter().map(said).collect();
        format!("{} {} from January to December", all.join(", "), unit.word)
    }

    /// `+4 % per 100 m, linear in the station's precipitation, constant above 3200 m`.
    pub fn precipitation_gradient(self, gradient: &PrecipitationGradient) -> String {
        let (unit, form) = match gradient.form() {
            GradientForm::Linear => {
                (self.units.precipitation_gradient(), "linear in the station's precipitation")
            }
            GradientForm::Compound => (self.units.compound_precipitation_gradient(), "compounded"),
        };
        let pct = signed(unit.of(gradient.pct_per_100m()), 2);
        let top = gradient.top_m().map(|top_m| format!(", constant above {}", self.elevation(top_m)));
        format!("{} {}, {form}{}", trimmed(&pct), unit.word, top.unwrap_or_default())
    }

    /// `+10 % per 1000 m above the basin's mean elevation of 2417 m`: how a level changes with elevation.
    pub fn level_change(self, pct_per_1000m: f64, mean_elevation_m: f64) -> String {
        let unit = self.units.level_change();
        let pct = signed(unit.of(pct_per_1000m), 2);
        format!(
            "{} {} above the basin's mean elevation of {}",
            trimmed(&pct),
            unit.word,
            self.elevation(mean_elevation_m)
        )
    }

    /// `232 hm³`, `48.1 thousand acre-feet`: a volume of water, to three figures.
    pub fn volume(self, volume_hm3: f64) -> String {
        format!("{} {}", self.volume_bare(volume_hm3), self.units.volume().word)
    }

    /// The same without its unit.
    pub fn volume_bare(self, volume_hm3: f64) -> String {
        let volume = self.units.volume().of(volume_hm3);
        fixed(volume, VOLUME_DECIMALS.of(volume))
    }

    /// A measure's value in words.
    pub fn outcome(self, outcome: Outcome, kind: Kind) -> String {
        match (outcome, kind) {
            (Outcome::Value(value), Kind::AmountMm) => self.amount(value),
            (Outcome::Value(value), Kind::AmountMmDays) => {
                let unit = self.units.depth_days();
                format!("{} {}", fixed(unit.of(value), 0), unit.word)
            }
            (Outcome::Value(value), Kind::VolumeHm3) => self.volume(value),
            (Outcome::Value(value), Kind::Share) => {
                format!("{} %", fixed(100.0 * value, share_decimals(value)))
            }
            (Outcome::Value(value), Kind::DayCount) => format!("{} days", fixed(value, 1)),
            (Outcome::Value(value), Kind::DayOfWaterYear | Kind::ArrivalDay) => date(value, self.starts),
            (Outcome::None, _) => "none".to_owned(),
            (Outcome::NotGone, _) => "not gone".to_owned(),
            (Outcome::NotReached, _) => "not reached".to_owned(),
        }
    }

    /// A change of a measure of that kind, with its error where there is one: `−112 ± 2.7`, in the unit of the measure's
    /// value beside which it stands; `−6.5 points`, `+1.2 days`, `−12 ± 0.44 d`.
    pub fn change_of(self, kind: Kind, change: f64, error: Option<f64>) -> String {
        let unit = |number: f64| match kind {
            Kind::AmountMm => self.units.depth().of(number),
            Kind::AmountMmDays => self.units.depth_days().of(number),
            Kind::VolumeHm3 => self.units.volume().of(number),
            Kind::Share => 100.0 * number,
            Kind::DayCount | Kind::DayOfWaterYear | Kind::ArrivalDay => number,
        };
        let (decimals, word) = match kind {
            Kind::AmountMm => (self.amount_decimals(change), ""),
            Kind::AmountMmDays => (0, ""),
            Kind::VolumeHm3 => (VOLUME_DECIMALS.of(self.units.volume().of(change)), ""),
            Kind::Share => (share_decimals(change), " points"),
            Kind::DayCount => (1, " days"),
            Kind::DayOfWaterYear | Kind::ArrivalDay => (0, " d"),
        };
        let error = error.map_or(String::new(), |error| format!(" ± {}", precision(unit(error))));
        format!("{}{error}{word}", signed(unit(change), decimals))
    }
}

/// Whole percent, and tenths near none and near all, below 10 and above 90 %.
fn share_decimals(share: f64) -> usize {
    let percent = 100.0 * share.abs();
    usize::from(percent < 9.95 || (90.05..99.95).contains(&percent))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::calendar::MonthDay;

    fn reader(units: UnitSystem) -> Reader {
        Reader { units, starts: WaterYearStart(MonthDay::new(10, 1).unwrap()) }
    }

    #[test]
    fn amounts_have_the_decimals_of_their_unit() {
        let [metric, us] = [UnitSystem::Metric, UnitSystem::Us].map(reader);
        assert_eq!(
            [412.4, 9.96, 9.9, 0.0].map(|mm| metric.amount(mm)),
            ["412 mm", "10 mm", "9.9 mm", "0.0 mm"]
        );
        // 25.4 mm are an inch, by hand.
        assert_eq!([254.0, 25.4, 12.7].map(|mm| us.amount(mm)), ["10.0 in", "1.0 in", "0.50 in"]);
        assert_eq!(us.change(-127.0), "−5.0 in");
        assert_eq!(us.change_and_change(-127.0, 12.7), "−5.0 and +0.5 in");
        assert_eq!([metric.limit(10.0), us.limit(10.0), us.limit(1.0)], ["10 mm", "0.39 in", "0.04 in"]);
    }

    #[test]
    fn temperatures_have_a_zero_to_move_and_warmings_have_none() {
        let [metric, us] = [UnitSystem::Metric, UnitSystem::Us].map(reader);
        assert_eq!([2.0, -1.5, 0.0].map(|c| metric.level(c)), ["+2 °C", "−1.5 °C", "0 °C"]);
        assert_eq!([2.0, -1.5, 0.0].map(|c| us.level(c)), ["+3.6 °F", "−2.7 °F", "0 °F"]);
        assert_eq!([2.0, -1.0, 0.5].map(|c| us.temperature(c)), ["35.6 °F", "30.2 °F", "32.9 °F"]);
        assert_eq!([metric.difference(0.6), us.difference(0.6)], ["0.6 °C", "1.08 °F"]);
        assert_eq!([10.0, -1.0].map(|c| metric.temperature(c)), ["10 °C", "−1 °C"]);
        assert_eq!([metric.between_levels(1.44), us.between_levels(1.5)], ["+1.4 °C", "+2.7 °F"]);
    }

    #[test]
    fn levels_that_are_no_short_decimals_read_well() {
        let metric = reader(UnitSystem::Metric);
        assert_eq!(
            [0.59819, 3.600_000_000_000_000_5, 1.25].map(|c| metric.level(c)),
            ["+0.6 °C", "+3.6 °C", "+1.25 °C"]
        );
        assert_eq!(reader(UnitSystem::Us).level(0.59819), "+1.08 °F");
    }

    /// By hand: 60 000 mm days / 25.4 are 2362.2 in days.
    #[test]
    fn every_kind_of_measure_has_its_words() {
        let [metric, us] = [UnitSystem::Metric, UnitSystem::Us].map(reader);
        let said = |kind, value| metric.outcome(Outcome::Value(value), kind);
        assert_eq!(
            [0.724, 0.0996, 0.0994, 1.2].map(|v| said(Kind::Share, v)),
            ["72 %", "10 %", "9.9 %", "120 %"]
        );
        assert_eq!(said(Kind::AmountMmDays, 60_000.0), "60\u{2009}000 mm days");
        assert_eq!(us.outcome(Outcome::Value(60_000.0), Kind::AmountMmDays), "2362 in days");
        assert_eq!(said(Kind::DayCount, 1.25), "1.3 days");
        assert_eq!([Kind::DayOfWaterYear, Kind::ArrivalDay].map(|kind| said(kind, 183.0)), ["1 April"; 2]);
        assert_eq!(metric.outcome(Outcome::NotReached, Kind::ArrivalDay), "not reached");
        assert_eq!(metric.change_of(Kind::Share, -0.12, None), "−12 points");
        assert_eq!(us.change_of(Kind::AmountMmDays, -254.0, None), "−10");
        assert_eq!(metric.change_of(Kind::DayCount, 0.5, None), "+0.5 days");
        assert_eq!([-112.0, 12.0].map(|mm| metric.change_of(Kind::AmountMm, mm, None)), ["−112", "+12"]);
        assert_eq!(metric.change_of(Kind::ArrivalDay, -11.6, None), "−12 d");
        assert_eq!(metric.change_of(Kind::ArrivalDay, -11.6, Some(0.44)), "−12 ± 0.44 d");
        assert_eq!(metric.change_of(Kind::AmountMm, -112.0, Some(2.7)), "−112 ± 2.7");
    }

    /// By hand: 1830 m / 0.3048; 0.5 and 3.5 mm per degC are 0.5 / 25.4 / 1.8 and 3.5 / 25.4 / 1.8 in per degF; 7 %
    /// compounded over 5/9 degC are 100 * (1.07^(5/9) - 1) = 3.83.
    #[test]
    fn other_quantities() {
        let [metric, us] = [UnitSystem::Metric, UnitSystem::Us].map(reader);
        assert_eq!([metric.elevation(1830.0), us.elevation(1830.0)], ["1830 m", "6004 ft"]);
        assert_eq!(metric.degree_day_factors(0.25, 3.0), "0.25 to 3 mm per °C and day");
        assert_eq!(us.degree_day_factors(0.5, 3.5), "0.011 to 0.077 in per °F and day");
        assert_eq!(
            [metric.percent_per_degree(7.0), us.percent_per_degree(7.0)],
            ["+7.0 % per °C", "+3.8 % per °F"]
        );
    }

    /// By hand: 4 % per 100 m are 4 * 3.048 % per 304.8 m, 1000 ft; compounded 1.04^3.048 - 1 = 12.70 %. 3200 m are 10 499 ft.
    #[test]
    fn gradients_name_their_form() {
        let [metric, us] = [UnitSystem::Metric, UnitSystem::Us].map(reader);
        let linear = PrecipitationGradient::new(4.0, Some(3200.0), GradientForm::Linear);
        let compound = PrecipitationGradient::new(4.0, None, GradientForm::Compound);
        let constant = "linear in the station's precipitation, constant above";
        assert_eq!(metric.precipitation_gradient(&linear), format!("+4 % per 100 m, {constant} 3200 m"));
        assert_eq!(
            us.precipitation_gradient(&linear),
            format!("+12.19 % per 1000 ft, {constant} 10\u{2009}499 ft")
        );
        assert_eq!(metric.precipitation_gradient(&compound), "+4 % per 100 m, compounded");
        assert_eq!(us.precipitation_gradient(&compound), "+12.7 % per 1000 ft, compounded");
    }

    /// By hand: -6 degC per km are -10.8 degF per 3280.84 ft, -3.29 per 1000 ft; -5 are -2.74, and -2.5 are -1.37.
    #[test]
    fn temperature_gradients_are_one_by_month_or_two() {
        let [metric, us] = [UnitSystem::Metric, UnitSystem::Us].map(reader);
        let constant = TemperatureGradient::constant(-6.0);
        assert_eq!(
            [metric, us].map(|reader| reader.temperature_gradient(&constant)),
            ["−6 °C per km", "−3.29 °F per 1000 ft"]
        );
        let apart = TemperatureGradient { tmin_c_per_km: [-5.0; 12], ..TemperatureGradient::constant(-6.0) };
        assert_eq!(
            [metric, us].map(|reader| reader.temperature_gradient(&apart)),
            [
                "−5 °C per km for minima, −6 °C per km for maxima",
                "−2.74 °F per 1000 ft for minima, −3.29 °F per 1000 ft for maxima"
            ]
        );
        let mut months = [-6.0; 12];
        months[11] = -2.5;
        let by_month = TemperatureGradient { tmin_c_per_km: months, tmax_c_per_km: months };
        let sixes = "−6, ".repeat(11);
        assert_eq!(
            metric.temperature_gradient(&by_month),
            format!("{sixes}−2.5 °C per km from January to December")
        );
        assert!(
            us.temperature_gradient(&by_month).ends_with(", −1.37 °F per 1000 ft from January to December")
        );
    }
}
