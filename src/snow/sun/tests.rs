use super::*;

/// FAO-56, example 8: 20 degrees south on 3 September, day 246: 0.985, 0.120 and 1.527, printed to three places.
#[test]
fn the_handbook_example() {
    assert!((inverse_relative_distance(246) - 0.985).abs() < 5e-4);
    assert!((declination_rad(246) - 0.120).abs() < 5e-4);
    assert!((sunset_hour_angle_rad(-20.0, 246) - 1.527).abs() < 5e-4);
}

/// Identity: a level slope, whichever way it faces, is level ground. 1e-13 MJ is some ten roundings of 40.
#[test]
fn a_level_slope_is_level_ground() {
    for latitude in -90..=90 {
        for day in 1..=366 {
            let latitude_deg = f64::from(latitude);
            let level = extraterrestrial_radiation(latitude_deg, day);
            let slope = potential_radiation(latitude_deg, 0.0, f64::from(day), day);
            assert!((slope - level).abs() < 1e-13, "{latitude} deg, day {day}: {slope} for {level}");
            assert!(level >= 0.0 && slope >= 0.0);
        }
    }
}

/// Beyond the polar circle the sun stays below or above: the day is 0 or 24 hours long, and on the pole itself a wall has
/// the same sun whichever way it faces.
#[test]
fn polar_day_and_night() {
    assert_eq!((day_length_h(70.0, 355), extraterrestrial_radiation(70.0, 355)), (0.0, 0.0));
    assert_eq!(potential_radiation(70.0, 90.0, 180.0, 355), 0.0);
    assert_eq!((day_length_h(70.0, 172), day_length_h(-70.0, 355)), (24.0, 24.0));
    let [north, east, south] =
        [0.0, 90.0, 180.0].map(|aspect_deg| potential_radiation(90.0, 90.0, aspect_deg, 172));
    assert!(north > 10.0 && (north - south).abs() < 1e-12 && (north - east).abs() < 1e-12);
}

/// By symmetry about noon east and west have the same day.
#[test]
fn east_is_west() {
    for day in [1, 91, 172, 266, 355] {
        let [east, west] = [70.0, 290.0].map(|aspect_deg| potential_radiation(47.0, 35.0, aspect_deg, day));
        assert!((east - west).abs() < 1e-12, "day {day}: {east} and {west}");
    }
}

/// The year's best day on level ground at 45 degrees north is about the solstice; there level ground has 1, and a north
/// slope of 30 degrees less than 1.
#[test]
fn relative_to_the_best_day() {
    let level = Ground::default();
    let north = Ground { slope_deg: 30.0, ..level };
    let best = (1..=365).map(|day| relative_radiation(45.0, &level, day)).fold(0.0, f64::max);
    assert!((best - 1.0).abs() < 1e-14, "{best}");
    assert_eq!(
        highest_radiation(45.0),
        (160..185).map(|day| extraterrestrial_radiation(45.0, day)).fold(0.0, f64::max)
    );
    assert!(relative_radiation(45.0, &north, 172) < relative_radiation(45.0, &level, 172));
    assert!(relative_radiation(45.0, &north, 355) < 0.05);
}
