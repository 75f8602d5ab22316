//! A self-contained page: its style, its figures, and a policy by which nothing is fetched and no script runs.

use crate::figures::Svg;
use maud::{DOCTYPE, Markup, PreEscaped, html};
use sha2::{Digest, Sha256};

const STYLE: &str = include_str!("briefing/style.css");

/// The page with this title and content.
pub(super) fn page(title: &str, content: &Markup) -> Vec<u8> {
    let policy =
        format!("default-src 'none'; style-src 'sha256-{}'", base64(&Sha256::digest(STYLE.as_bytes())));
    let page = html! {
        (DOCTYPE)
        html lang="en" {
            head {
                meta charset="utf-8";
                meta http-equiv="Content-Security-Policy" content=(policy);
                meta name="viewport" content="width=device-width, initial-scale=1";
                title { (title) }
                style { (PreEscaped(STYLE)) }
            }
            body { main { (content) } }
        }
    };
    page.into_string().into_bytes()
}

/// A figure, and how to read it.
pub(super) fn figure(figure: &Svg) -> Markup {
    html! { figure { div.scroll { (PreEscaped(&figure.text)) } details { summary { "How to read this figure" } p { (figure.caption) } } } }
}

/// RFC 4648, for the digest in the page's policy.
fn base64(bytes: &[u8]) -> String {
    const ALPHABET: &[u8; 64] = b"ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
    let mut text = String::new();
    for chunk in bytes.chunks(3) {
        let mut group = [0; 3];
        group[..chunk.len()].copy_from_slice(chunk);
        let bits = u32::from_be_bytes([0, group[0], group[1], group[2]]);
        for place in 0..4 {
            let digit = (bits >> (18 - 6 * place)) & 63;
            text.push(if place <= chunk.len() { char::from(ALPHABET[digit as usize]) } else { '=' });
        }
    }
    text
}

#[cfg(test)]
mod tests {
    /// RFC 4648, section 10.
    #[test]
    fn base64_test_vectors() {
        assert_eq!(super::base64(b"foobar"), "Zm9vYmFy");
        assert_eq!(super::base64(b"fooba"), "Zm9vYmE=");
        assert_eq!(super::base64(b"foob"), "Zm9vYg==");
    }
}
