//! Faults in their place: file, line, column, the line itself with a caret, what was expected, how to mend it.

use super::document::Document;
use crate::fault::{Fault, Place, Unlikely};
use annotate_snippets::{AnnotationKind, Level, Renderer, Snippet};
use serde::Serialize;
use std::ops::Range;

/// What faults are drawn against.
#[derive(Clone, Copy)]
pub struct Drawing<'a> {
    /// The scenario's file as the user named it.
    pub file: &'a str,
    /// Its text.
    pub text: &'a str,
    /// The text, parsed.
    pub document: &'a Document<'a>,
    /// Whether to colour.
    pub is_coloured: bool,
}

/// So many faults are drawn; the rest are counted.
const MOST_DRAWN: usize = 50;
/// A name or a found text is cut to so many characters.
const LONGEST_SHOWN: usize = 300;

/// A fault with its place written out, for a program to read.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Located {
    /// The file.
    pub file: String,
    /// Line, from 1; 0 for a file as a whole.
    pub line: usize,
    /// Column in characters, from 1; 0 for a file as a whole.
    pub column: usize,
    /// Scenario key or column name, where there is one.
    pub name: String,
    /// What stands there.
    pub found: String,
    /// What should stand there.
    pub expected: String,
    /// How to mend it.
    pub mend: String,
}

/// One line of a text with the bytes at fault in it.
struct Spot<'a> {
    file: &'a str,
    name: &'a str,
    text: &'a str,
    line: usize,
    bytes: Range<usize>,
}

fn spot<'a>(fault: &'a Fault, drawing: &Drawing<'a>) -> Option<Spot<'a>> {
    let in_scenario = |name: &'a str, bytes: Range<usize>| {
        let (line, start) = drawing.document.line_at(bytes.start);
        let text = drawing.text.get(start..).unwrap_or("").lines().next().unwrap_or("");
        let within = |at: usize| at.saturating_sub(start).min(text.len());
        Spot { file: drawing.file, name, text, line, bytes: within(bytes.start)..within(bytes.end) }
    };
    match &fault.place {
        Place::Key(key) => drawing.document.value_span(key).map(|bytes| in_scenario(key, bytes)),
        Place::Span(bytes) => Some(in_scenario("", bytes.clone())),
        Place::Cell { file, line, column, text, bytes } => {
            Some(Spot { file, name: column, text, line: *line, bytes: bytes.clone() })
        }
        Place::File(_) => None,
    }
}

/// The fault with its place written out.
pub fn located(fault: &Fault, drawing: &Drawing<'_>) -> Located {
    let (file, line, column, name) = match spot(fault, drawing) {
        Some(spot) => {
            let before = spot.text.get(..spot.bytes.start).unwrap_or("");
            (spot.file, spot.line, before.chars().count() + 1, spot.name)
        }
        None => match &fault.place {
            Place::File(file) => (file.as_str(), 0, 0, ""),
            Place::Key(key) => (drawing.file, 0, 0, key.as_str()),
            _ => (drawing.file, 0, 0, ""),
        },
    };
    Located {
        file: file.to_owned(),
        line,
        column,
        name: shortened(name),
        found: shortened(&fault.found),
        expected: plain(&fault.expected),
        mend: fault.mend.split('\n').map(plain).collect::<Vec<_>>().join("\n"),
    }
}

/// A text that holds words of the user's files, without what a terminal would obey.
fn plain(text: &str) -> String {
    let mut plain = String::with_capacity(text.len());
    for sign in text.chars() {
        match sign {
            '\t' | '\n' | '\r' => plain.extend(sign.escape_default()),
            _ if sign.is_control() => plain.push(char::REPLACEMENT_CHARACTER),
            _ => plain.push(sign),
        }
    }
    plain
}

fn shortened(text: &str) -> String {
    let text = &plain(text);
    match text.char_indices().nth(LONGEST_SHOWN) {
        Some((end, _)) => format!("{}...", &text[..end]),
        None => text.to_owned(),
    }
}

/// Draws the faults, in the order of the files they lie in and of their lines; of very many the rest are counted.
pub fn draw(faults: &[Fault], drawing: &Drawing<'_>) -> String {
    let mut placed: Vec<(Located, &Fault)> =
        faults.iter().map(|fault| (located(fault, drawing), fault)).collect();
    placed
        .sort_by_key(|(place, _)| (place.file != drawing.file, place.file.clone(), place.line, place.column));
    let renderer = if drawing.is_coloured { Renderer::styled() } else { Renderer::plain() };
    let mut drawn = String::new();
    for (place, fault) in placed.iter().take(MOST_DRAWN) {
        let title = match (place.line, place.name.as_str()) {
            (0, _) => format!("{}: {}", place.file, place.found),
            (_, "") => place.found.clone(),
            (_, name) => format!("{name}: {}", place.found),
        };
        let title = Level::ERROR.primary_title(title);
        let expected = format!("expected {}", place.expected);
        let group = match spot(fault, drawing) {
            Some(spot) => title.element(
                Snippet::source(spot.text)
                    .path(spot.file)
                    .line_start(spot.line)
                    .annotation(AnnotationKind::Primary.span(spot.bytes).label(expected)),
            ),
            None => title.element(Level::NOTE.message(expected)),
        };
        let group = group.element(Level::HELP.message(place.mend.as_str()));
        drawn += &renderer.render(&[group]);
        drawn += "\n\n";
    }
    if placed.len() > MOST_DRAWN {
        drawn += &format!("and {} more\n", placed.len() - MOST_DRAWN);
    }
    let count = if placed.len() == 1 { "1 fault".to_owned() } else { format!("{} faults", placed.len()) };
    drawn + &format!("{count}; nothing was run\n")
}

/// Writes out what is unlikely, a line each.
pub fn unlikely_lines(unlikely: &[Unlikely]) -> String {
    unlikely.iter().map(|notice| format!("second look: {}: {}\n", notice.about, notice.why)).collect()
}
