//! The page in a real browser: Debian's chromium, started from the command line.

mod chromium;
mod explorer;
mod page;
mod print;

use crate::cli::basin::Basin;
use chromium::Chromium;
use serde_json::Value;

/// A study of the demo with few realizations, in a folder of its own, and a browser to look at it; nothing without a browser.
fn page_of(scenario: &str, edit: impl Fn(String) -> String) -> Option<(Chromium, Basin)> {
    made(scenario, "study", edit)
}

/// The same of another command.
fn made(scenario: &str, command: &str, edit: impl Fn(String) -> String) -> Option<(Chromium, Basin)> {
    let browser = Chromium::find()?;
    let (basin, few) = Basin::of_demo(scenario, [24, 6]);
    basin.write("mine.toml", &edit(few));
    let ended = basin.run(&format!("{command} mine.toml --quiet --into out"));
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    Some((browser, basin))
}

/// The page without its policy, in a frame of so many px, with another script at its end that tells the frame's page what it finds.
/// (A window of its own would be no narrower than 500 px.)
fn probed(browser: &Chromium, basin: &Basin, (probe, address): (&str, &str), width_px: u32) -> Value {
    probed_page(browser, basin, "out/briefing.html", (probe, address), width_px)
}

/// The same of another page.
fn probed_page(
    browser: &Chromium,
    basin: &Basin,
    page: &str,
    (probe, address): (&str, &str),
    width_px: u32,
) -> Value {
    let page = String::from_utf8(basin.read_bytes(page)).unwrap();
    let (before, rest) = page.split_once("<meta http-equiv=\"Content-Security-Policy\"").unwrap();
    let (_, rest) = rest.split_once('>').unwrap();
    let script = format!(
        "<script>addEventListener('load', () => {{ const found = (() => {{ {probe} }})(); \
         parent.postMessage(JSON.stringify(found), '*'); }});</script></body>"
    );
    basin.write("out/probed.html", &format!("{before}{}", rest.replace("</body>", &script)));
    let frame = format!(
        "<!DOCTYPE html><pre id=\"probe\"></pre><script>addEventListener('message', (told) => {{ \
         document.getElementById('probe').textContent = told.data; }});</script>\
         <iframe style=\"width: {width_px}px; height: 900px; border: 0\" src=\"probed.html{address}\"></iframe>"
    );
    basin.write("out/frame.html", &frame);
    let shown = browser.dump(&basin.path().join("out/frame.html"), 1200);
    let (_, found) = shown.dom.split_once("<pre id=\"probe\">").unwrap();
    let (found, _) = found.split_once("</pre>").unwrap();
    let found =
        found.replace("&lt;", "<").replace("&gt;", ">").replace("&nbsp;", "\u{a0}").replace("&amp;", "&");
    serde_json::from_str(&found).unwrap_or_else(|error| panic!("{error}: {found:?}; {:?}", shown.console))
}
