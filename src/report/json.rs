//! How a JSON document is written: a line for what belongs together, so that a person can read it and a comparison of
//! two of them says where they part.

use serde::Serialize;
use serde_json::ser::Formatter;
use std::io::{Result, Write};

/// Deeper than this, an object or a list stands on one line.
const DEEPEST_INDENTED: usize = 5;

/// The document, indented down to some depth, with a line end.
///
/// # Errors
/// A number or text that JSON cannot hold: a fault of ours.
pub(super) fn lines(document: &impl Serialize) -> serde_json::Result<Vec<u8>> {
    let mut text = Vec::new();
    document.serialize(&mut serde_json::Serializer::with_formatter(&mut text, Lines::default()))?;
    text.push(b'\n');
    Ok(text)
}

/// Writes each entry of the outer objects and lists on a line of its own.
#[derive(Default)]
struct Lines {
    depth: usize,
    has_entries: bool,
}

impl Lines {
    fn new_line(&self, writer: &mut (impl Write + ?Sized), depth: usize) -> Result<()> {
        writer.write_all(b"\n")?;
        (0..depth).try_for_each(|_| writer.write_all(b"  "))
    }

    fn begin(&mut self, writer: &mut (impl Write + ?Sized), bracket: &[u8]) -> Result<()> {
        self.depth += 1;
        self.has_entries = false;
        writer.write_all(bracket)
    }

    fn entry(&self, writer: &mut (impl Write + ?Sized), is_first: bool) -> Result<()> {
        let is_indented = self.depth <= DEEPEST_INDENTED;
        match (is_first, is_indented) {
            (true, true) => {}
            (true, false) => return Ok(()),
            (false, true) => writer.write_all(b",")?,
            (false, false) => return writer.write_all(b", "),
        }
        self.new_line(writer, self.depth)
    }

    fn end(&mut self, writer: &mut (impl Write + ?Sized), bracket: &[u8]) -> Result<()> {
        let is_indented = self.depth <= DEEPEST_INDENTED;
        self.depth -= 1;
        if self.has_entries && is_indented {
            self.new_line(writer, self.depth)?;
        }
        self.has_entries = true;
        writer.write_all(bracket)
    }
}

impl Formatter for Lines {
    fn begin_array<W: ?Sized + Write>(&mut self, writer: &mut W) -> Result<()> {
        self.begin(writer, b"[")
    }

    fn end_array<W: ?Sized + Write>(&mut self, writer: &mut W) -> Result<()> {
        self.end(writer, b"]")
    }

    fn begin_array_value<W: ?Sized + Write>(&mut self, writer: &mut W, is_first: bool) -> Result<()> {
        self.entry(writer, is_first)
    }

    fn end_array_value<W: ?Sized + Write>(&mut self, _: &mut W) -> Result<()> {
        self.has_entries = true;
        Ok(())
    }

    fn begin_object<W: ?Sized + Write>(&mut self, writer: &mut W) -> Result<()> {
        self.begin(writer, b"{")
    }

    fn end_object<W: ?Sized + Write>(&mut self, writer: &mut W) -> Result<()> {
        self.end(writer, b"}")
    }

    fn begin_object_key<W: ?Sized + Write>(&mut self, writer: &mut W, is_first: bool) -> Result<()> {
        self.entry(writer, is_first)
    }

    fn begin_object_value<W: ?Sized + Write>(&mut self, writer: &mut W) -> Result<()> {
        writer.write_all(b": ")
    }

    fn end_object_value<W: ?Sized + Write>(&mut self, _: &mut W) -> Result<()> {
        self.has_entries = true;
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use serde_json::{Value, json};

    /// The outer levels are as the library's own indented form has them, whatever is deeper stands on a line, and nothing
    /// is lost.
    #[test]
    fn outer_entries_have_lines_and_inner_ones_share_one() {
        let shallow = json!({"a": [1, 2.5], "b": {}, "c": [], "d": "x\ny"});
        let text = String::from_utf8(lines(&shallow).unwrap()).unwrap();
        assert_eq!(text, serde_json::to_string_pretty(&shallow).unwrap() + "\n");
        let deep = json!([[[[[[1, [2], {"k": [], "l": null}]]]]]]);
        let text = String::from_utf8(lines(&deep).unwrap()).unwrap();
        assert!(text.contains("\n          [1, [2], {\"k\": [], \"l\": null}]\n"), "{text}");
        assert_eq!(serde_json::from_str::<Value>(&text).unwrap(), deep);
    }
}
