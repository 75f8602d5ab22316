//! `--png`: a picture in pixels beside every figure, with every letter that the figure has.

use super::basin::Basin;
use super::drawn_days::{manifest, with_site};
use skrifa::{FontRef, MetadataProvider};
use std::collections::BTreeSet;
use std::fs;
use thawline::report::picture_of;

const REGULAR: &[u8] = include_bytes!("../../src/report/fonts/LiberationSans-Regular.ttf");
const BOLD: &[u8] = include_bytes!("../../src/report/fonts/LiberationSans-Bold.ttf");

/// Names in the folder of figures, without their endings, of those that end so.
fn slugs(basin: &Basin, folder: &str, ending: &str) -> BTreeSet<String> {
    let files = fs::read_dir(basin.path().join(folder).join("figures")).unwrap();
    let names = files.map(|file| file.unwrap().file_name().into_string().unwrap());
    names.filter_map(|name| name.strip_suffix(ending).map(str::to_owned)).collect()
}

/// Every figure of the folder has a picture of this width whose height is the figure's, in proportion, and both stand in
/// `run.json`. Width and height are the two words from byte 16 of a PNG file on (its specification, 11.2.2).
pub fn each_has_its_picture(basin: &Basin, folder: &str, width_px: u32) -> BTreeSet<String> {
    let figures = slugs(basin, folder, ".svg");
    assert_eq!(slugs(basin, folder, ".png"), figures);
    let files = manifest(basin, folder)["files"].clone();
    let files: Vec<&str> = files.as_array().unwrap().iter().map(|file| file.as_str().unwrap()).collect();
    for slug in &figures {
        let svg = basin.read(&format!("{folder}/figures/{slug}.svg"));
        let [width, height] = ["width=\"", "height=\""]
            .map(|name| svg.split_once(name).unwrap().1.split_once('"').unwrap().0.parse::<f64>().unwrap());
        let height_px = height / width * f64::from(width_px);
        let png = fs::read(basin.path().join(format!("{folder}/figures/{slug}.png"))).unwrap();
        assert!(png.starts_with(b"\x89PNG\r\n\x1a\n"), "{slug}");
        let word = |at: usize| u32::from_be_bytes(png[at..at + 4].try_into().unwrap());
        assert_eq!(word(16), width_px, "{slug}");
        assert!((f64::from(word(20)) - height_px).abs() <= 0.51, "{slug}: {} and {height_px}", word(20));
        for ending in ["svg", "png"] {
            assert!(files.contains(&format!("figures/{slug}.{ending}").as_str()), "{slug}.{ending}");
        }
    }
    figures
}

/// What a figure writes: the attributes of each text, and the text.
fn texts(svg: &str) -> Vec<(String, String)> {
    let parts = svg.split("<text ").skip(1).map(|text| text.split_once("</text>").unwrap().0);
    let texts = parts.map(|text| text.split_once('>').unwrap());
    let plain = |text: &str| {
        ["&amp;", "&lt;", "&gt;", "&quot;"].iter().fold(text.to_owned(), |t, e| t.replace(e, "&"))
    };
    texts.map(|(attributes, text)| (attributes.to_owned(), plain(text))).collect()
}

/// Every character of every text has a glyph in the font that it is written with.
fn no_letter_is_lacking(svg: &str) -> usize {
    let [regular, bold] = [REGULAR, BOLD].map(|font| FontRef::new(font).unwrap().charmap());
    let mut held = 0;
    for (attributes, text) in texts(svg) {
        let font = if attributes.contains("font-weight=\"bold\"") { &bold } else { &regular };
        for letter in text.chars() {
            assert!(font.map(letter).is_some(), "{letter:?} of {text:?}");
            held += 1;
        }
    }
    held
}

/// A study leaves a picture beside every figure, the same on one thread and on three, and nothing else of it changes; the
/// command that repeats it asks for them, too. No text is lost: its letters are in the fonts, and a picture changes with
/// every text that is taken away.
#[test]
fn a_study_with_pictures() {
    let basin = with_site();
    let ended = basin.run("study scenario.toml --png 640 --into out --threads 1 --quiet");
    assert_eq!((ended.status, ended.stderr.as_str()), (0, ""));
    let figures = each_has_its_picture(&basin, "out", 640);
    assert!(figures.len() >= 10 && figures.contains("observed-swe-1"), "{figures:?}");
    let command = manifest(&basin, "out")["command"].as_str().unwrap().to_owned();
    assert_eq!(command, "thawline study --png 640 scenario.toml");

    let again = format!("{} --into again --threads 3 --quiet", &command["thawline ".len()..]);
    assert_eq!(basin.run(&again).status, 0);
    assert_eq!(basin.run("study scenario.toml --into plain --quiet").status, 0);
    assert_eq!(slugs(&basin, "plain", ".png"), BTreeSet::new());
    let read = |file: &str| fs::read(basin.path().join(file)).unwrap();
    for slug in &figures {
        assert!(
            read(&format!("out/figures/{slug}.png")) == read(&format!("again/figures/{slug}.png")),
            "{slug}"
        );
    }
    assert!(basin.read("out/briefing.html").contains(&command));
    for file in ["summary.json", "tables.xlsx", "figures/swe-by-level.svg"] {
        assert!(read(&format!("out/{file}")) == read(&format!("plain/{file}")), "{file}");
    }

    for slug in &figures {
        let svg = basin.read(&format!("out/figures/{slug}.svg"));
        assert!(no_letter_is_lacking(&svg) > 100, "{slug}");
    }
    let svg = basin.read("out/figures/swe-by-level.svg");
    let whole = read("out/figures/swe-by-level.png");
    let begins: Vec<usize> = svg.match_indices("<text ").map(|(at, _)| at).collect();
    assert!(begins.len() > 10);
    for begin in begins {
        let end = begin + svg[begin..].find("</text>").unwrap() + "</text>".len();
        let without = format!("{}{}", &svg[..begin], &svg[end..]);
        let picture = picture_of(without.as_bytes(), 640).unwrap();
        assert!(picture.png != whole, "lost: {}", &svg[begin..end]);
    }
}

/// The demo's kept figures, too, are written in letters that the fonts have.
#[test]
fn the_fonts_have_every_letter_of_the_demo() {
    let folder = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("output/alder-fork/figures");
    let held = fs::read_dir(folder).unwrap().map(|file| {
        let svg = fs::read_to_string(file.unwrap().path()).unwrap();
        no_letter_is_lacking(&svg)
    });
    assert!(held.sum::<usize>() > 5000);
}

/// So do the days that are drawn and the comparison with observed snow, where there is a folder to write into and something
/// to draw.
#[test]
fn days_with_pictures() {
    let basin = with_site();
    let ended = basin.run("daily scenario.toml --into days --draw-years 2001-2002 --png 400");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let figures = each_has_its_picture(&basin, "days", 400);
    assert_eq!(figures, ["daily", "observed-swe-1"].map(String::from).into());
    let command = "thawline daily --draw-years 2001-2002 --png 400 scenario.toml";
    assert_eq!(manifest(&basin, "days")["command"], command);
    no_letter_is_lacking(&basin.read("days/figures/daily.svg"));
    assert_eq!(basin.run("daily scenario.toml --into alone --png 400").status, 0);
    assert_eq!(slugs(&basin, "alone", ".png"), ["observed-swe-1"].map(String::from).into());

    for (words, said) in [
        ("daily scenario.toml --png 400", "a picture needs a folder: add --into DIR"),
        ("daily plain.toml --into none --png 400", "nothing is drawn here without observed snow"),
    ] {
        basin.write("plain.toml", super::basin::SCENARIO);
        let ended = basin.run(words);
        assert_eq!((ended.status, ended.stdout.as_str()), (2, ""), "{}", ended.stderr);
        assert!(ended.stderr.contains(said), "{}", ended.stderr);
    }
}

/// A title in letters that the fonts have is drawn without a word; of one in others it is said which are boxes in the
/// pictures. The figure holds them as they were typed.
#[test]
fn letters_that_pictures_lack_are_said() {
    let basin = Basin::new();
    let said_of = |title: &str, flags: &str| {
        let scenario = super::basin::SCENARIO.replace("Test fork", title);
        basin.write("scenario.toml", &scenario);
        let words = "daily scenario.toml --into days --draw-years 2001 --png 400";
        let ended = basin.run(&format!("{words} {flags}"));
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        assert!(basin.read("days/figures/daily.svg").contains(title));
        (ended.stderr, fs::read(basin.path().join("days/figures/daily.png")).unwrap())
    };
    let (greek, _) = said_of("Ρέμα Снежная", "");
    assert!(!greek.contains("box"), "{greek}");
    let (mixed, with_boxes) = said_of("雪山 Fork", "");
    let said = "PNG pictures have a box in place of each of these letters, which their font lacks; the SVG figures have them: 山 雪\n";
    assert!(mixed.contains(said), "{mixed}");
    let (quiet, again) = said_of("雪山 Fork", "--quiet");
    assert_eq!(quiet, "");
    assert!(with_boxes == again);
    let (_, without) = said_of("Fork", "");
    assert!(with_boxes != without);
}

/// Widths that are too small to read or too large to hold, and what is no width, are faults of the command line.
#[test]
fn widths_have_a_range() {
    let basin = Basin::new();
    for command in ["study", "fit", "daily"] {
        for width in ["399", "8001", "-1", "wide", "760.5"] {
            let ended = basin.run(&format!("{command} scenario.toml --into out --png {width}"));
            assert_eq!(ended.status, 2, "{command} {width}: {}", ended.stderr);
            assert!(ended.stderr.contains(width), "{}", ended.stderr);
        }
        let help = basin.run(&format!("{command} --help")).stdout;
        assert!(help.contains("760 wide") && help.contains("1520"), "{help}");
    }
    assert!(!basin.path().join("out").exists());
    assert_eq!(basin.run("check scenario.toml --png 760").status, 2);
}
