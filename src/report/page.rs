//! A self-contained page: its style, its figures, and a policy by which nothing is fetched and no script but its own runs.

use super::cautions::PLANNING_AID;
use super::study::Origin;
use crate::figures::Svg;
use maud::{DOCTYPE, Markup, PreEscaped, html};
use sha2::{Digest, Sha256};

const STYLE: &str = include_str!("briefing/style.css");

/// The page with this title and content.
/// `scripts` stand at its end, in this order.
pub(super) fn page(title: &str, content: &Markup, scripts: &[&str]) -> Vec<u8> {
    let digest = |text: &str| format!(" 'sha256-{}'", base64(&Sha256::digest(text.as_bytes())));
    let of_scripts = scripts.iter().map(|script| digest(script)).collect::<String>();
    let allowed = if scripts.is_empty() { String::new() } else { format!("; script-src{of_scripts}") };
    let policy = format!("default-src 'none'; style-src{}{allowed}", digest(STYLE));
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
            body {
                main { (content) }
                footer { "Written by thawline " (env!("CARGO_PKG_VERSION")) ". " (PLANNING_AID) }
                @for script in scripts { script { (PreEscaped(script)) } }
            }
        }
    };
    unbroken(&page.into_string()).into_bytes()
}

/// Elements whose text is not prose: drawings set theirs line by line, and code stays as it is.
const VERBATIM: [&str; 4] = ["svg", "script", "style", "code"];

/// No line of prose ends between a number and its percent or degree sign, or before an error.
fn unbroken(page: &str) -> String {
    let bind = |prose: &str| {
        let signs = ["%", "°", "±"].iter().fold(prose.to_owned(), |prose, sign| {
            prose.replace(&format!(" {sign}"), &format!("\u{a0}{sign}"))
        });
        signs.replace("± ", "±\u{a0}")
    };
    let mut bound = String::with_capacity(page.len());
    let mut rest = page;
    let opening = |rest: &str| {
        let of = |name: &str| Some((rest.find(&format!("<{name}"))?, format!("</{name}>")));
        VERBATIM.iter().filter_map(|name| of(name)).min()
    };
    while let Some((from, closing)) = opening(rest) {
        let to = rest[from..].find(&closing).map_or(rest.len(), |end| from + end);
        bound.push_str(&bind(&rest[..from]));
        bound.push_str(&rest[from..to]);
        rest = &rest[to..];
    }
    bound.push_str(&bind(rest));
    bound
}

/// What repeats the run, and from which files.
pub(super) fn repeat(origin: &Origin) -> Markup {
    html! {
        p { code { (origin.command) } " with seed " (origin.seed) " and thawline " (env!("CARGO_PKG_VERSION")) ". Input files and their SHA-256:" }
        ul { @for input in &origin.inputs { li { (input.role) ": " code { (input.path) } " " code { (input.sha256) } } } }
    }
}

/// A figure, how to read it, and where it and its numbers stand as files beside the page.
pub(super) fn figure(figure: &Svg, slug: &str, table: Option<&str>) -> Markup {
    let file = |folder: &str, name: &str, ending: &str| format!("{folder}/{name}.{ending}");
    html! { figure {
        div.scroll { (PreEscaped(&figure.text)) }
        details {
            summary { "How to read this figure" }
            p { (figure.caption) }
            p {
                @let drawing = file("figures", slug, "svg");
                "The drawing: " a href=(drawing) { (drawing) } "."
                @if let Some(table) = table {
                    @let table = file("tables", table, "csv");
                    " Its numbers: " a href=(table) { (table) } "."
                }
            }
        }
    } }
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
    #[test]
    fn numbers_keep_their_signs() {
        let page = "<p>2.0 ± 0.3 % at +2 °C</p><svg><text>5 %</text></svg><code>a % b</code> 7 %";
        let bound = "<p>2.0\u{a0}±\u{a0}0.3\u{a0}% at +2\u{a0}°C</p><svg><text>5 %</text></svg><code>a % b</code> 7\u{a0}%";
        assert_eq!(super::unbroken(page), bound);
    }

    /// RFC 4648, section 10.
    #[test]
    fn base64_test_vectors() {
        assert_eq!(super::base64(b"foobar"), "Zm9vYmFy");
        assert_eq!(super::base64(b"fooba"), "Zm9vYmE=");
        assert_eq!(super::base64(b"foob"), "Zm9vYg==");
    }
}
