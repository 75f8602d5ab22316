//! The page as it is laid out: nothing fetched, nothing wider than a telephone, every letter dark enough.

use super::chromium::Chromium;
use super::{made, page_of, probed, probed_page};
use crate::cli::basin::{Basin, SMALL_FIT};
use crate::cli::hostile_names;
use serde_json::Value;

/// Opens every part, then measures.
const PROBE: &str = r##"
    for (const details of document.querySelectorAll("details")) details.open = true;
    const rgb = (colour) => colour.match(/[\d.]+/g).map(Number);
    // Of a drawing's text, the last shape drawn before it that holds its middle.
    const shapes = new Map();
    const drawn = (svg) => {
        if (!shapes.has(svg)) shapes.set(svg, [...svg.querySelectorAll("rect, circle, polygon, path")].map((shape) => ({ shape, fill: getComputedStyle(shape).fill, box: shape.getBBox() })).filter(({ fill }) => fill !== "none"));
        return shapes.get(svg);
    };
    const under = (text) => {
        const box = text.getBBox();
        const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];
        const holds = ({ shape, box }) => x >= box.x && x <= box.x + box.width && y >= box.y && y <= box.y + box.height
            && shape.compareDocumentPosition(text) & Node.DOCUMENT_POSITION_FOLLOWING;
        return drawn(text.ownerSVGElement).findLast(holds);
    };
    const ground = (element) => {
        if (element.ownerSVGElement) return rgb(under(element).fill);
        for (let e = element; e; e = e.parentElement) {
            const colour = rgb(getComputedStyle(e).backgroundColor);
            if (colour.length < 4 || colour[3] === 1) return colour;
            if (colour[3] > 0) throw new Error("a ground that is not opaque");
        }
        return [255, 255, 255];
    };
    const light = (colour) => colour.slice(0, 3).map((c) => c / 255).map((c) => (c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4))
        .reduce((sum, c, at) => sum + [0.2126, 0.7152, 0.0722][at] * c, 0);
    const contrast = (a, b) => { const [low, high] = [light(a), light(b)].sort((x, y) => x - y); return (high + 0.05) / (low + 0.05); };
    const texts = [...document.body.querySelectorAll("*")].filter((e) => !["SCRIPT", "STYLE", "title", "desc"].includes(e.tagName)
        && [...e.childNodes].some((node) => node.nodeType === 3 && node.data.trim()));
    const ratio = (e) => { const style = getComputedStyle(e); return contrast(rgb(e.ownerSVGElement ? style.fill : style.color), ground(e)); };
    const least = texts.map((e) => [ratio(e), e.textContent.slice(0, 60)]).sort((a, b) => a[0] - b[0])[0];
    const small = [...document.querySelectorAll("button, input, summary, nav a")].filter((e) => { const box = e.getBoundingClientRect(); return box.width < 24 || box.height < 24; });
    const ids = [...document.querySelectorAll("[id]")].map((e) => e.id);
    return {
        wide: document.documentElement.scrollWidth - innerWidth,
        width: innerWidth,
        texts: texts.length,
        least,
        small: small.map((e) => e.outerHTML.slice(0, 80)),
        headings: [...document.querySelectorAll("h1, h2, h3, h4")].map((e) => Number(e.tagName[1])),
        twice: ids.filter((id, at) => ids.indexOf(id) !== at),
        astray: [...document.querySelectorAll('a[href^="#"]')].map((a) => a.hash.slice(1)).filter((id) => !document.getElementById(id)),
        files: [...document.querySelectorAll("a[href]")].map((a) => a.getAttribute("href")).filter((href) => !href.startsWith("#")),
        bare_tables: [...document.querySelectorAll("table")].filter((table) => !table.caption || [...table.querySelectorAll("th")].some((th) => !th.scope)).length,
        unnamed_figures: [...document.querySelectorAll("figure svg")].filter((svg) => svg.getAttribute("role") !== "img"
            || svg.getAttribute("aria-labelledby").split(" ").some((id) => !document.getElementById(id)?.textContent)).length,
        unnamed_inputs: [...document.querySelectorAll("input")].filter((input) => !input.labels.length && !input.ariaLabel).length,
        landmarks: ["main", "nav", "footer"].map((name) => document.querySelectorAll(name).length),
        language: document.documentElement.lang,
    };
"##;

fn empty(list: &Value) -> bool {
    list.as_array().unwrap().is_empty()
}

/// WCAG 2.2: 1.4.3 (4.5 to 1), 1.4.10 (no sideways scroll at 320 px), 2.5.8 (24 px), 1.3.1, 2.4.1 and 3.1.1.
fn is_sound(scenario: &str) {
    let Some((browser, basin)) = page_of(scenario, |scenario| scenario) else { return };
    is_sound_page(&browser, &basin, "out/briefing.html", [1, 1, 1]);
}

/// A page with so many mains, navigations and footers.
fn is_sound_page(browser: &Chromium, basin: &Basin, page: &str, landmarks: [u32; 3]) {
    let shown = browser.dump(&basin.path().join(page), 1000);
    assert!(shown.console.is_empty(), "{:?}", shown.console);
    for width_px in [320, 360, 1000] {
        let found = probed_page(browser, basin, page, (PROBE, ""), width_px);
        assert_eq!(found["width"], width_px);
        assert!(found["wide"].as_f64().unwrap() <= 0.0, "{width_px} px: {}", found["wide"]);
        assert!(found["texts"].as_u64().unwrap() > 200, "{}", found["texts"]);
        assert!(found["least"][0].as_f64().unwrap() >= 4.5, "{}", found["least"]);
        for of in ["small", "twice", "astray"] {
            assert!(empty(&found[of]), "{of}: {}", found[of]);
        }
        for of in ["bare_tables", "unnamed_figures", "unnamed_inputs"] {
            assert_eq!(found[of], 0, "{of}");
        }
        let headings: Vec<i64> =
            found["headings"].as_array().unwrap().iter().map(|of| of.as_i64().unwrap()).collect();
        assert_eq!(headings[0], 1);
        assert!(headings.windows(2).all(|pair| pair[1] <= pair[0] + 1), "{headings:?}");
        assert_eq!(found["landmarks"], serde_json::json!(landmarks));
        assert_eq!(found["language"], "en");
        for file in found["files"].as_array().unwrap() {
            assert!(basin.path().join("out").join(file.as_str().unwrap()).is_file(), "{file}");
        }
    }
    // The same on a dark page, whose colours another rule sets.
    let text = String::from_utf8(basin.read_bytes(page)).unwrap();
    let rule = "screen and (prefers-color-scheme: dark)";
    assert!(text.contains(rule));
    basin.write(page, &text.replace(rule, "all"));
    let found = probed_page(browser, basin, page, (PROBE, ""), 1000);
    assert!(found["least"][0].as_f64().unwrap() >= 4.5, "dark: {}", found["least"]);
}

#[test]
fn the_demo_is_sound() {
    is_sound("alder-fork");
}

#[test]
fn the_cold_basin_is_sound() {
    is_sound("frostbell-creek");
}

#[test]
fn the_basin_in_us_units_is_sound() {
    is_sound("tamsin-river");
}

/// A page of another command, without parts to fold.
#[test]
fn the_page_of_a_fit_is_sound() {
    let Some((browser, basin)) = made("alder-fork", "fit", |demo| demo + SMALL_FIT) else { return };
    is_sound_page(&browser, &basin, "out/fit.html", [1, 0, 1]);
}

/// Names that would be markup: the browser shows them as they were typed, and neither runs nor loads anything.
#[test]
fn a_page_of_hostile_names_is_sound() {
    let Some((browser, basin)) = page_of("alder-fork", |demo| hostile_names::scenario(&demo)) else { return };
    let shown = browser.dump(&basin.path().join("out/briefing.html"), 1000);
    assert!(shown.console.is_empty(), "{:?}", shown.console);
    let probe = "return { title: document.querySelector('h1').textContent, scripts: document.scripts.length, \
                 rows: [...document.querySelectorAll('th')].map((th) => th.textContent), \
                 wide: document.documentElement.scrollWidth - innerWidth };";
    let found = probed(&browser, &basin, (probe, ""), 360);
    let rows: Vec<&str> = found["rows"].as_array().unwrap().iter().filter_map(Value::as_str).collect();
    for name in hostile_names::NAMES {
        assert!(found["title"].as_str().unwrap().contains(name), "{name}");
        assert!(rows.contains(&name), "{name}");
    }
    assert_eq!(found["scripts"], 4, "its own two, the data of one, and this probe");
    assert!(found["wide"].as_f64().unwrap() <= 0.0, "{}", found["wide"]);
}
