//! A quote that is never closed makes one endless cell of all that follows; it is found before it fills the memory.

use super::Format;

/// No row is longer, bytes, whatever line breaks its cells hold.
pub(super) const LONGEST_RECORD: usize = 1 << 16;

/// The line, from 1, on which a row starts that is longer than any table's because a quoted cell does not end.
pub(super) fn overlong_record(text: &str, format: &Format) -> Option<usize> {
    let (mut line, mut start, mut start_line) = (1, 0, 1);
    let mut is_quoted = false;
    let mut is_remark = false;
    let (mut before, mut closed_at) = (b'\n', None);
    for (at, byte) in text.bytes().enumerate() {
        if at == start {
            is_remark = format.comment == Some(byte);
        }
        if is_remark {
            // Quotes open nothing in a remark.
        } else if byte == b'"' && is_quoted {
            // A doubled quote within a cell closes it and opens it again.
            (is_quoted, closed_at) = (false, Some(at + 1));
        } else if byte == b'"' && (at == start || before == format.separator || closed_at == Some(at)) {
            is_quoted = true;
        } else if is_quoted && at - start > LONGEST_RECORD {
            return Some(start_line);
        }
        if byte == b'\n' {
            line += 1;
            if !is_quoted {
                (start, start_line) = (at + 1, line);
            }
        }
        before = byte;
    }
    None
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn only_a_quote_that_is_never_closed_runs_away() {
        let format = Format::default();
        let rows = "2000-10-01,1,2,3\n".repeat(10_000);
        let run_away = |text: &str| overlong_record(&format!("{text}{rows}"), &format);
        assert_eq!(run_away("date,\"two\nlines\",\"a \"\"name\"\"\"\n"), None);
        assert_eq!(run_away("# a remark with one \"\ndate,5\"\" pipe\n"), None);
        assert_eq!(run_away("date,a\n\n1,\"2\n"), Some(3));
        assert_eq!(run_away("date,a\n1,\"2 \"\"so\n"), Some(2));
    }
}
