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

/// A place in a text: what it is called, the text, the line its first byte stands on, the bytes.
struct Spot<'a> {
    file: &'a str,
    name: &'a str,
    text: &'a str,
    first_line: usize,
    bytes: Range<usize>,
}

fn spot<'a>(fault: &'a Fault, drawing: &Drawing<'a>) -> Option<Spot<'a>> {
    let in_scenario = |name: &'a str, bytes: Range<usize>| Spot {
        file: drawing.file,
        name,
        text: drawing.text,
        first_line: 1,
        bytes,
    };
    match &fault.place {
        Place::Key(key) => drawing.document.value_span(key).map(|bytes| in_scenario(key, bytes)),
        Place::Span(bytes) => Some(in_scenario("", bytes.clone())),
        Place::Cell { file, line, column, text, bytes } => {
            Some(Spot { file, name: column, text, first_line: *line, bytes: bytes.clone() })
        }
        Place::File(_) => None,
    }
}

/// The fault with its place written out.
pub fn located(fault: &Fault, drawing: &Drawing<'_>) -> Located {
    let (file, line, column, name) = match spot(fault, drawing) {
        Some(spot) => {
            let before = spot.text.get(..spot.bytes.start).unwrap_or("");
            let line = spot.first_line + before.matches('\n').count();
            let column = before.rsplit('\n').next().unwrap_or("").chars().count() + 1;
            (spot.file, line, column, spot.name)
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
        name: name.to_owned(),
        found: fault.found.clone(),
        expected: fault.expected.clone(),
        mend: fault.mend.clone(),
    }
}

/// Draws all faults, in the order of the files they lie in and of their lines.
pub fn draw(faults: &[Fault], drawing: &Drawing<'_>) -> String {
    let mut placed: Vec<(Located, &Fault)> =
        faults.iter().map(|fault| (located(fault, drawing), fault)).collect();
    placed
        .sort_by_key(|(place, _)| (place.file != drawing.file, place.file.clone(), place.line, place.column));
    let renderer = if drawing.is_coloured { Renderer::styled() } else { Renderer::plain() };
    let mut drawn = String::new();
    for (place, fault) in &placed {
        let title = match (place.line, place.name.as_str()) {
            (0, _) => format!("{}: {}", place.file, place.found),
            (_, "") => place.found.clone(),
            (_, name) => format!("{name}: {}", place.found),
        };
        let title = Level::ERROR.primary_title(title);
        let expected = format!("expected {}", fault.expected);
        let group = match spot(fault, drawing) {
            Some(spot) => title.element(
                Snippet::source(spot.text)
                    .path(spot.file)
                    .line_start(spot.first_line)
                    .annotation(AnnotationKind::Primary.span(spot.bytes).label(expected)),
            ),
            None => title.element(Level::NOTE.message(expected)),
        };
        let group = group.element(Level::HELP.message(fault.mend.as_str()));
        drawn += &renderer.render(&[group]);
        drawn += "\n\n";
    }
    let count = if placed.len() == 1 { "1 fault".to_owned() } else { format!("{} faults", placed.len()) };
    drawn + &format!("{count}; nothing was run\n")
}

/// Writes out what is unlikely, a line each.
pub fn unlikely_lines(unlikely: &[Unlikely]) -> String {
    unlikely.iter().map(|notice| format!("unlikely: {}: {}\n", notice.about, notice.why)).collect()
}
