//! Bytes to text, or what the bytes are instead of a text table.

use super::Encoding;
use encoding_rs::{UTF_16BE, UTF_16LE, WINDOWS_1252};

/// No line of a table is longer, bytes; a longer one is no table and would only fill the memory.
const LONGEST_LINE: usize = 1 << 16;

/// Why bytes are no text table.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct NoText {
    /// What they are.
    pub found: String,
    /// What to do about it.
    pub mend: String,
}

impl NoText {
    fn new(found: impl Into<String>, mend: impl Into<String>) -> Self {
        Self { found: found.into(), mend: mend.into() }
    }
}

/// First bytes of files that come in place of a table, what they are, and what to do.
const STRANGERS: [(&[u8], &str, &str); 4] = [
    (b"PK\x03\x04", "a workbook or another packed file", "open it and save the sheet as CSV"),
    (b"\xd0\xcf\x11\xe0", "an old workbook", "open it and save the sheet as CSV"),
    (b"\x1f\x8b", "a packed file (gzip)", "unpack it"),
    (b"%PDF", "a PDF document", "ask for the table as CSV"),
];

/// The text of a file, without its byte-order mark.
///
/// # Errors
/// What the bytes are instead: a web page, a workbook, another encoding than the declared one, plain binary; a line longer
/// than any table's.
pub fn decode(bytes: Vec<u8>, encoding: Encoding) -> Result<String, NoText> {
    if let Some((_, what, mend)) = STRANGERS.iter().find(|(start, ..)| bytes.starts_with(start)) {
        return Err(NoText::new(format!("{what}, not a text table"), *mend));
    }
    let text = match encoding {
        Encoding::Utf8 => utf8(bytes)?,
        Encoding::Latin1 => WINDOWS_1252.decode_without_bom_handling(&bytes).0.into_owned(),
        Encoding::Utf16 => utf16(&bytes)?,
    };
    let start: String = text.trim_start().chars().take(9).collect::<String>().to_ascii_lowercase();
    if start.starts_with('{')
        || start.strip_prefix('[').is_some_and(|rest| rest.trim_start().starts_with('{'))
    {
        return Err(NoText::new("a JSON document, not a text table", "ask for the table as CSV"));
    }
    if ["<!doctype", "<html", "<?xml"].iter().any(|page| start.starts_with(page)) {
        return Err(NoText::new(
            "a web page, not a text table",
            "the download failed or needs a login: open the file in a browser to see what it says, and download the \
             data again",
        ));
    }
    if let Some(at) = text.find('\0') {
        let line = line_of(text.as_bytes(), at);
        return Err(NoText::new(
            format!("a NUL byte on line {line}, so it is no plain text"),
            "if it is UTF-16, two bytes a letter, state encoding = \"utf-16\" where the scenario names the file; else export \
             the table again as CSV",
        ));
    }
    let long = text.lines().position(|line| line.len() > LONGEST_LINE);
    match long {
        Some(line) => Err(NoText::new(
            format!("line {} is longer than {LONGEST_LINE} bytes", line + 1),
            "check that it is a table of one line a row",
        )),
        None => Ok(text),
    }
}

fn utf8(bytes: Vec<u8>) -> Result<String, NoText> {
    if bytes.starts_with(b"\xff\xfe") || bytes.starts_with(b"\xfe\xff") {
        return Err(NoText::new(
            "UTF-16, two bytes a letter",
            "state encoding = \"utf-16\" where the scenario names the file, or save it as UTF-8",
        ));
    }
    let bytes = match bytes.strip_prefix(b"\xef\xbb\xbf") {
        Some(rest) => rest.to_vec(),
        None => bytes,
    };
    String::from_utf8(bytes).map_err(|error| {
        let at = error.utf8_error().valid_up_to();
        let line = line_of(error.as_bytes(), at);
        let byte = error.as_bytes().get(at).copied().unwrap_or_default();
        let letter = WINDOWS_1252.decode_without_bom_handling(&[byte]).0.into_owned();
        NoText::new(
            format!("line {line} is not UTF-8: it holds the byte {byte:#04x}"),
            format!(
                "if '{letter}' is meant, as western Windows programs write it, state encoding = \"latin-1\" where the \
                 scenario names the file; else save it as UTF-8"
            ),
        )
    })
}

fn utf16(bytes: &[u8]) -> Result<String, NoText> {
    let (encoding, rest) = match bytes {
        [0xff, 0xfe, rest @ ..] => (UTF_16LE, rest),
        [0xfe, 0xff, rest @ ..] => (UTF_16BE, rest),
        // A table's signs are ASCII, and one of the two bytes of each is 0.
        [first, 0, ..] if *first != 0 => (UTF_16LE, bytes),
        [0, second, ..] if *second != 0 => (UTF_16BE, bytes),
        _ => {
            return Err(NoText::new(
                "one byte a letter, so it is no UTF-16",
                "take encoding out where the scenario names the file: it is most likely UTF-8",
            ));
        }
    };
    let (text, is_broken) = encoding.decode_without_bom_handling(rest);
    if is_broken {
        return Err(NoText::new("broken UTF-16", "save the file as UTF-8"));
    }
    Ok(text.into_owned())
}

fn line_of(bytes: &[u8], at: usize) -> usize {
    bytes[..at].iter().filter(|byte| **byte == b'\n').count() + 1
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn declared_encodings_give_the_same_text() {
        let wide = |text: &str, swap: bool| -> Vec<u8> {
            let units = "\u{feff}".encode_utf16().chain(text.encode_utf16());
            units.flat_map(|unit| if swap { unit.to_be_bytes() } else { unit.to_le_bytes() }).collect()
        };
        let text = "Temp (°C)\n1.5\n";
        assert_eq!(decode(text.as_bytes().to_vec(), Encoding::Utf8).as_deref(), Ok(text));
        assert_eq!(decode(format!("\u{feff}{text}").into_bytes(), Encoding::Utf8).as_deref(), Ok(text));
        assert_eq!(decode(b"Temp (\xb0C)\n1.5\n".to_vec(), Encoding::Latin1).as_deref(), Ok(text));
        for swap in [false, true] {
            assert_eq!(decode(wide(text, swap), Encoding::Utf16).as_deref(), Ok(text));
            assert_eq!(decode(wide(text, swap)[2..].to_vec(), Encoding::Utf16).as_deref(), Ok(text));
        }
    }
}
