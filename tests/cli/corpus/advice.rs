//! The advice of a message, followed to the letter, mends what it was given for.

use super::super::basin::weather;
use super::{Basin, accepted, refused, rows, small};

/// Adds what a message tells to state in [weather], once it tells it.
fn follow(basin: &Basin, advice: &str, place: [&str; 2]) {
    let said = refused(basin);
    assert!(said.contains(advice), "{said}");
    basin.exchange(place[0], place[1]);
}

const IN_WEATHER: &str = "station_elevation_m = 2000\n";

/// Follows advices that are keys of [weather], one after the other, until the file is taken; gives the notices.
fn follow_all(bytes: impl AsRef<[u8]>, advices: &[&str]) -> String {
    let basin = small();
    basin.write_bytes("weather.csv", bytes);
    for advice in advices {
        follow(&basin, advice, [IN_WEATHER, &format!("{IN_WEATHER}{advice}\n")]);
    }
    accepted(&basin)
}

#[test]
fn keys_that_a_message_names_are_the_right_ones() {
    let semicolons = rows(|_, cells| cells.join(";").replace('.', ",")).replacen(
        "date,tmin_c,tmax_c,",
        "date;tmin_c;tmax_c;",
        1,
    );
    let wide = weather(3).encode_utf16().flat_map(u16::to_le_bytes).collect::<Vec<u8>>();
    let marked = [b"\xff\xfe".to_vec(), wide.clone()].concat();
    let latin = [b"# \xb0C\n".to_vec(), weather(3).into_bytes()].concat();
    let cases: [(Vec<u8>, &[&str]); 7] = [
        (weather(3).replace(',', "\t").into_bytes(), &["separator = \"\\t\""]),
        (semicolons.into_bytes(), &["separator = \";\"", "decimal = \",\""]),
        (marked, &["encoding = \"utf-16\""]),
        (wide, &["encoding = \"utf-16\""]),
        (latin, &["encoding = \"latin-1\""]),
        (format!("Station 7\n\nDaily values\n{}", weather(3)).into_bytes(), &["header_line = 4"]),
        (weather(3).replace(",0.0\n", ",7\n").into_bytes(), &[]),
    ];
    for (bytes, advices) in cases {
        let notices = follow_all(bytes, advices);
        assert_eq!(
            notices.lines().count(),
            1,
            "{advices:?}: nothing but that there are few years: {notices}"
        );
    }
}

#[test]
fn a_form_of_dates_that_a_message_names_reads_them() {
    let basin = small();
    let date = |cell: &str| chrono::NaiveDate::parse_from_str(cell, "%Y-%m-%d").unwrap();
    let text = rows(|_, cells| format!("{},{}", date(cells[0]).format("%d.%m.%Y"), cells[1..].join(",")));
    basin.write_bytes("weather.csv", text);
    let key = format!("{IN_WEATHER}date = {{ format = \"%d.%m.%Y\" }}\n");
    follow(&basin, "format = \"%d.%m.%Y\"", [IN_WEATHER, &key]);
    assert_eq!(accepted(&basin).lines().count(), 1);
}

#[test]
fn a_mark_that_is_added_to_missing_is_one() {
    let basin = small();
    basin.write_bytes("weather.csv", weather(3).replacen(",6.0\n", ",M\n", 2));
    follow(&basin, "add it to 'missing'", [IN_WEATHER, &format!("{IN_WEATHER}missing = [\"\", \"M\"]\n")]);
    assert_eq!(accepted(&basin).lines().count(), 1);
}

#[test]
fn a_decimal_comma_that_is_taken_out_again() {
    let basin = small();
    basin.exchange(IN_WEATHER, &format!("{IN_WEATHER}decimal = \",\"\n"));
    follow(&basin, "take decimal = \",\" out", ["decimal = \",\"\n", ""]);
    assert_eq!(accepted(&basin).lines().count(), 1);
}

#[test]
fn a_unit_that_a_message_names_is_the_right_one() {
    let basin = small();
    let kelvin = rows(|_, cells| {
        let [low, high] = [1, 2].map(|at| cells[at].parse::<f64>().unwrap() + 273.15);
        format!("{},{low:.1},{high:.1},{}", cells[0], cells[3])
    });
    basin.write_bytes("weather.csv", kelvin);
    follow(&basin, "read as K it would be", ["degC", "K"]);
    assert_eq!(accepted(&basin).lines().count(), 1);
}

#[test]
fn a_line_of_names_that_is_added_above() {
    let basin = small();
    let values = weather(3).split_once('\n').unwrap().1.to_owned();
    basin.write_bytes("weather.csv", &values);
    assert!(refused(&basin).contains("add a line of names above it, with ','"));
    basin.write_bytes("weather.csv", format!("date,tmin_c,tmax_c,precip_mm\n{values}"));
    assert_eq!(accepted(&basin).lines().count(), 1);
}
