use super::*;
use crate::figures::text_width;
use std::io::Cursor;

/// A drawing of 200 by 100 with something in it.
fn svg(body: &str) -> Vec<u8> {
    let head =
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"200\" height=\"100\" viewBox=\"0 0 200 100\"";
    format!("{head} font-family=\"Helvetica, Arial, sans-serif\">{body}</svg>").into_bytes()
}

fn text(attributes: &str, text: &str) -> Vec<u8> {
    svg(&format!("<text x=\"10\" y=\"60\" font-size=\"20\" {attributes}>{text}</text>"))
}

fn picture(svg: &[u8]) -> Picture {
    picture_of(svg, 800).unwrap()
}

/// Width, height and colours of a PNG file, row by row.
fn pixels(png: &[u8]) -> (u32, u32, Vec<[u8; 3]>) {
    let mut reader = png::Decoder::new(Cursor::new(png)).read_info().unwrap();
    let mut bytes = vec![0; reader.output_buffer_size().unwrap()];
    let info = reader.next_frame(&mut bytes).unwrap();
    assert_eq!((info.color_type, info.bit_depth), (ColorType::Rgb, BitDepth::Eight));
    (info.width, info.height, bytes.chunks(3).map(|pixel| [pixel[0], pixel[1], pixel[2]]).collect())
}

/// A drawing of 200 by 100 is 801 by 401 px: half a row is rounded up. Where nothing is drawn is white; a square is where it
/// belongs, in its colour.
#[test]
fn on_white_in_proportion() {
    let square = svg("<rect x=\"100\" y=\"50\" width=\"50\" height=\"25\" fill=\"#b8463c\"/>");
    let (width, height, colours) = pixels(&picture_of(&square, 801).unwrap().png);
    assert_eq!((width, height), (801, 401));
    let (width, height, squared) = pixels(&picture(&square).png);
    assert_eq!((width, height), (800, 400));
    assert_eq!(colours[0], [255; 3]);
    for (at, colour) in squared.iter().enumerate() {
        let (x, y) = (at % 800, at / 800);
        let is_within = (400..600).contains(&x) && (200..300).contains(&y);
        assert_eq!(*colour, if is_within { [0xb8, 0x46, 0x3c] } else { [255; 3] }, "{x}, {y}");
    }
}

/// In how many pieces a picture is drawn cannot be seen. A curve that a piece cuts is smoothed a little differently along the
/// cut (by up to a quarter of black on white was seen); a row out of place would turn edges from black to white.
#[test]
fn pieces_do_not_show() {
    let lines = "<circle cx=\"90\" cy=\"50\" r=\"41.3\" fill=\"none\" stroke=\"#26363d\"/>\
                 <text x=\"20\" y=\"50\" font-size=\"30\" transform=\"rotate(270 20 50)\">SWE</text>\
                 <polyline points=\"3,97 120,11.1 197,60\" fill=\"none\" stroke=\"#8e6a90\" stroke-dasharray=\"6 4\"/>";
    let whole = pixels(&picture(&svg(lines)).png).2;
    for rows in [37, 256, 400] {
        let pieces = pixels(&drawn(&svg(lines), 800, 800 * rows).unwrap().png).2;
        let apart = pieces.iter().zip(&whole).map(|(a, b)| a[0].abs_diff(b[0]));
        let most = apart.max().unwrap();
        assert!(most < 90, "{rows} rows at a time: {most}");
        assert_eq!(most == 0, rows == 400, "{rows} rows at a time are {most} apart");
    }
}

/// First and last column that is not white.
fn inked(picture: &Picture) -> Option<[usize; 2]> {
    let (width, _, colours) = pixels(&picture.png);
    let columns = colours.iter().enumerate().filter(|(_, colour)| **colour != [255; 3]);
    let columns = columns.map(|(at, _)| at % width as usize);
    columns.fold(None, |ends: Option<[usize; 2]>, x| {
        Some(ends.map_or([x; 2], |[first, last]| [first.min(x), last.max(x)]))
    })
}

/// Letters are as wide as figures make room for: by the published widths of Helvetica and Arial (`text_width`), at four pixels
/// a unit. Where the ink of a line of text begins moves by its width as it is set from its left to its right end; half a
/// pixel on either side is smoothing.
#[test]
fn letters_have_the_widths_that_figures_count_on() {
    for (attributes, is_bold) in [("", false), ("font-weight=\"bold\"", true)] {
        for words in ["Hamburg", "+1.4 °C", "01589"] {
            let begins = |anchor: &str| {
                let attributes = format!("{attributes} text-anchor=\"{anchor}\" dx=\"90\"");
                inked(&picture(&text(&attributes, words))).unwrap()[0] as f64
            };
            let (moved, width) = (begins("start") - begins("end"), 4.0 * text_width(words, 20.0, is_bold));
            // Kerning, which the widths leave out, narrows by less than a hundredth.
            assert!((moved - width).abs() < 1.5 + 0.01 * width, "{words}: {moved} px, not {width}");
        }
    }
}

/// Whatever family is asked for, letters are drawn, and always the same; bold ones differ.
#[test]
fn every_family_is_ours() {
    let plain = picture(&text("", "Snow"));
    for family in ["Helvetica", "'DejaVu Sans'", "serif", "monospace", "'No Such Family'"] {
        assert!(picture(&text(&format!("font-family=\"{family}\""), "Snow")) == plain, "{family}");
    }
    assert!(picture(&text("font-weight=\"bold\"", "Snow")).png != plain.png);
    assert_ne!(inked(&plain), None);
}

/// Greek, Cyrillic and the signs of our own words are drawn; what the fonts lack is named, and a box stands for it.
#[test]
fn letters_are_drawn_or_named() {
    for words in ["Ρέμα", "Снег", "Łódź Åre", "1\u{2009}500\u{a0}m\u{b3} ± 2 °C − × ≥ ≤ · – — “a” ’"]
    {
        let picture = picture(&text("", words));
        assert_eq!(picture.letters_lacking, BTreeSet::new(), "{words}");
        assert_ne!(inked(&picture), None, "{words}");
    }
    for (words, lacking) in [("雪山雪", "山雪"), ("A雪", "雪"), ("ثلج", "ثلج"), ("\u{1f3d4}", "\u{1f3d4}")]
    {
        let picture = picture(&text("font-weight=\"bold\"", words));
        let letters: BTreeSet<String> = lacking.chars().map(String::from).collect();
        assert_eq!(picture.letters_lacking, letters, "{words}");
        assert_ne!(inked(&picture), None, "{words}");
    }
}

#[test]
fn what_is_no_svg_is_a_fault() {
    assert!(matches!(picture_of(b"<p>no picture</p>", 800), Err(PictureError::Svg(_))));
    assert!(matches!(picture_of(&svg(""), 0), Err(PictureError::Size { width_px: 0, .. })));
}
