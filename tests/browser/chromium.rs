//! The browser as a command.

use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use tempfile::TempDir;

/// Where it must be there, as in continuous integration, this is set to `required`.
const WISH: &str = "THAWLINE_BROWSER";
const NAMES: [&str; 3] = ["chromium", "chromium-browser", "google-chrome"];

/// A browser with a profile of its own.
pub struct Chromium {
    program: PathBuf,
    profile: TempDir,
}

/// What it made of a page.
pub struct Shown {
    pub dom: String,
    /// What was written to its console: faults of scripts, and what the page's policy forbade.
    pub console: Vec<String>,
}

impl Chromium {
    /// Nothing, said on standard error, where this machine has none.
    pub fn find() -> Option<Self> {
        let folders = std::env::var_os("PATH").unwrap_or_default();
        let found = std::env::split_paths(&folders)
            .flat_map(|folder| NAMES.map(|name| folder.join(name)))
            .find(|program| program.is_file());
        if found.is_none() {
            assert_ne!(std::env::var(WISH).as_deref(), Ok("required"), "no {} on this machine", NAMES[0]);
            // Past the test harness, which keeps what a passing test prints.
            let _ =
                writeln!(std::io::stderr(), "skipped: no {} on this machine to open the page with", NAMES[0]);
        }
        Some(Self { program: found?, profile: TempDir::new().unwrap() })
    }

    /// The document after its scripts have run.
    pub fn dump(&self, page: &Path, width_px: u32) -> Shown {
        let size = format!("--window-size={width_px},1000");
        let ended = self.run(page, &["--virtual-time-budget=3000", &size, "--dump-dom"]);
        let said = String::from_utf8_lossy(&ended.stderr);
        let console = said.lines().filter(|line| line.contains("CONSOLE")).map(str::to_owned).collect();
        Shown { dom: String::from_utf8(ended.stdout).unwrap(), console }
    }

    /// The page as a PDF.
    pub fn print(&self, page: &Path) -> Vec<u8> {
        let file = self.profile.path().join("printed.pdf");
        self.run(page, &[&format!("--print-to-pdf={}", file.display())]);
        std::fs::read(file).unwrap()
    }

    fn run(&self, page: &Path, flags: &[&str]) -> std::process::Output {
        let profile = format!("--user-data-dir={}", self.profile.path().join("profile").display());
        let url = format!("file://{}", page.display());
        Command::new(&self.program)
            .args([
                "--headless=new",
                "--no-sandbox",
                "--disable-gpu",
                "--hide-scrollbars",
                "--enable-logging=stderr",
            ])
            .arg(profile)
            .args(flags)
            .arg(url)
            .stdin(Stdio::null())
            .output()
            .unwrap()
    }
}

/// What the other tests rest on: a fault of a script, and what a policy forbids, are seen.
#[test]
fn faults_of_a_page_are_seen() {
    let Some(browser) = Chromium::find() else { return };
    let folder = TempDir::new().unwrap();
    let page = folder.path().join("page.html");
    for fault in [
        "<script>unknown()</script>",
        "<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'\"><script>let fine = 1;</script>",
        "<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'\"><img src=\"http://example.org/a.png\">",
    ] {
        std::fs::write(&page, format!("<!DOCTYPE html>{fault}<p>text</p>")).unwrap();
        assert_eq!(browser.dump(&page, 800).console.len(), 1, "{fault}");
    }
    std::fs::write(&page, "<!DOCTYPE html><p>text</p>").unwrap();
    assert!(browser.dump(&page, 800).console.is_empty());
}
