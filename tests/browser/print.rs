//! Printed, and with scripts forbidden: everything stands on paper and in the text.

use super::page_of;

fn pages(pdf: &[u8]) -> usize {
    let text = String::from_utf8_lossy(pdf);
    text.lines().filter(|line| line.ends_with("/Type /Page")).count()
}

/// Folded parts open for the printer: as many pages come out as of a page on which no script may run, which stands open, but for the
/// explorer's two tables. Tagged, so that the order and the headings are read aloud.
#[test]
fn print_holds_all_parts() {
    let Some((browser, basin)) = page_of("alder-fork", |scenario| scenario) else { return };
    let page = basin.path().join("out/briefing.html");
    let printed = browser.print(&page);
    let text = String::from_utf8(basin.read_bytes("out/briefing.html")).unwrap();
    let (before, rest) = text.split_once("; script-src").unwrap();
    let (_, rest) = rest.split_once("\">").unwrap();
    basin.write("out/unscripted.html", &format!("{before}; script-src 'none'\">{rest}"));
    let unscripted_page = basin.path().join("out/unscripted.html");
    let unscripted = browser.print(&unscripted_page);
    let [printed_pages, unscripted_pages] = [&printed, &unscripted].map(|pdf| pages(pdf));
    assert!(unscripted_pages >= 15, "{unscripted_pages}");
    assert!(
        (unscripted_pages..=unscripted_pages + 2).contains(&printed_pages),
        "{printed_pages} {unscripted_pages}"
    );
    assert!(String::from_utf8_lossy(&printed).contains("/StructTreeRoot"));

    let shown = browser.dump(&unscripted_page, 900);
    assert_eq!(shown.console.len(), 2, "both scripts are refused: {:?}", shown.console);
    assert!(!shown.dom.contains("<details class=\"part\">"), "all parts stand open");
    assert!(shown.dom.contains("<div id=\"explorer-tool\" hidden"));
}
