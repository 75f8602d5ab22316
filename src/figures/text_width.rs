//! How wide text is, so that labels neither clip nor collide.
//!
//! Advance widths of the sans serif faces that [`FONTS`](super::theme::FONTS) names first, which share one set of
//! metrics, in thousandths of the font size. Kerning is left out; it only narrows.

/// Widths of the characters from space to tilde, regular weight.
#[rustfmt::skip]
const REGULAR: [u16; 95] = [
    278, 278, 355, 556, 556, 889, 667, 191, 333, 333, 389, 584, 278, 333, 278, 278, // space to /
    556, 556, 556, 556, 556, 556, 556, 556, 556, 556, 278, 278, 584, 584, 584, 556, // 0 to ?
    1015, 667, 667, 722, 722, 667, 611, 778, 722, 278, 500, 667, 556, 833, 722, 778, // @ to O
    667, 778, 722, 667, 611, 722, 667, 944, 667, 667, 611, 278, 278, 278, 469, 556, // P to _
    333, 556, 556, 500, 556, 556, 278, 556, 556, 222, 222, 500, 222, 833, 556, 556, // ` to o
    556, 556, 333, 500, 278, 556, 500, 722, 500, 500, 500, 334, 260, 334, 584, // p to ~
];

/// The same, bold.
#[rustfmt::skip]
const BOLD: [u16; 95] = [
    278, 333, 474, 556, 556, 889, 722, 238, 333, 333, 389, 584, 278, 333, 278, 278, // space to /
    556, 556, 556, 556, 556, 556, 556, 556, 556, 556, 333, 333, 584, 584, 584, 611, // 0 to ?
    975, 722, 722, 722, 722, 667, 611, 778, 722, 278, 556, 722, 611, 833, 722, 778, // @ to O
    667, 778, 722, 667, 611, 722, 667, 944, 667, 667, 611, 333, 278, 333, 584, 556, // P to _
    333, 556, 611, 556, 611, 556, 333, 611, 611, 278, 278, 556, 278, 889, 611, 611, // ` to o
    611, 611, 389, 556, 333, 611, 556, 778, 556, 556, 500, 389, 280, 389, 584, // p to ~
];

/// Width in pixels of a line of text at a font size in pixels.
///
/// ```
/// use thawline::figures::text_width;
/// assert!((text_width("300 mm", 10.0, false) - 36.12).abs() < 1e-9);
/// ```
pub fn text_width(text: &str, size_px: f64, is_bold: bool) -> f64 {
    let thousandths: u32 = text.chars().map(|c| u32::from(advance(c, is_bold))).sum();
    f64::from(thousandths) * size_px / 1000.0
}

fn advance(c: char, is_bold: bool) -> u16 {
    match c {
        ' '..='~' => {
            let at = c as usize - ' ' as usize;
            if is_bold { BOLD[at] } else { REGULAR[at] }
        }
        '\u{2009}' => 200,
        '\u{b0}' => 400,
        '\u{b1}' | '\u{d7}' | '\u{2212}' => 584,
        '\u{b7}' => 333,
        '\u{2013}' => 556,
        '\u{a0}'..='\u{24f}' | '\u{370}'..='\u{58f}' => 722,
        _ => 1000,
    }
}

/// Breaks text into lines no wider than `width_px`, between words; a word that is too long is broken inside. A number
/// is kept together with the word that follows it.
pub(super) fn wrap(text: &str, width_px: f64, size_px: f64, is_bold: bool) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    let mut line = String::new();
    for chunk in chunks(text) {
        let longer = if line.is_empty() { chunk.clone() } else { format!("{line} {chunk}") };
        if text_width(&longer, size_px, is_bold) <= width_px {
            line = longer;
            continue;
        }
        if !line.is_empty() {
            lines.push(std::mem::take(&mut line));
        }
        for c in chunk.chars() {
            line.push(c);
            if text_width(&line, size_px, is_bold) > width_px && line.chars().count() > 1 {
                line.pop();
                lines.push(std::mem::replace(&mut line, c.to_string()));
            }
        }
    }
    if !line.is_empty() {
        lines.push(line);
    }
    lines
}

/// Shortens a paragraph to `most` lines, the last one ending in dots.
pub(super) fn at_most(mut lines: Vec<String>, most: usize) -> Vec<String> {
    if lines.len() > most {
        lines.truncate(most);
        if let Some(last) = lines.last_mut() {
            let kept = last.chars().count().saturating_sub(3);
            *last = last.chars().take(kept).chain("...".chars()).collect();
        }
    }
    lines
}

/// Words, where a number and the word after it are one.
fn chunks(text: &str) -> Vec<String> {
    let mut chunks: Vec<String> = Vec::new();
    // Plain spaces only: thin spaces hold thousands together.
    for word in text.split_ascii_whitespace() {
        match chunks.last_mut() {
            Some(last) if is_number(last) => {
                last.push(' ');
                last.push_str(word);
            }
            _ => chunks.push(word.to_owned()),
        }
    }
    chunks
}

fn is_number(word: &str) -> bool {
    word.chars().any(|c| c.is_ascii_digit()) && !word.chars().any(|c| c.is_alphabetic() || c == ' ')
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_keep_within_the_width_and_lose_no_word() {
        let text =
            "1 April SWE is 12\u{2009}000 mm lower at +2 °C and Donaudampfschifffahrtsgesellschaftskapitän";
        for width in [60.0, 90.0, 140.0, 400.0] {
            let lines = wrap(text, width, 12.0, false);
            for line in &lines {
                assert!(text_width(line, 12.0, false) <= width, "{line:?} at {width}");
            }
            assert_eq!(lines.concat().replace(' ', ""), text.replace(' ', ""));
        }
        let lines = wrap("falls by 12\u{2009}000 mm", 80.0, 12.0, false);
        assert_eq!(lines, ["falls by", "12\u{2009}000 mm"], "number and unit stay together");
    }

    #[test]
    fn bold_is_wider_and_long_paragraphs_end_in_dots() {
        assert!(text_width("snow", 12.0, true) > text_width("snow", 12.0, false));
        let lines = vec!["first line".to_owned(), "second line".to_owned(), "third".to_owned()];
        assert_eq!(at_most(lines, 2), ["first line", "second l..."]);
    }
}
