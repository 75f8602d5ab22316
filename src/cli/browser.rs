//! Opens a page in the user's browser and goes on without it.

use super::arguments::Shared;
use super::failure::Failure;
use super::output;
use std::ffi::{OsStr, OsString};
use std::path::Path;
use std::process::{Command, Stdio};

/// Refuses `--open` where a program reads along: there is nobody to look at a page.
pub(super) fn may_open(is_asked: bool, shared: &Shared) -> Result<(), Failure> {
    if is_asked && shared.json {
        return Err(Failure::CommandLine(
            "--open is for people and --json for programs: leave one of them out".to_owned(),
        ));
    }
    Ok(())
}

/// Opens the page. Where nothing can be started the run has not failed: the page's path is said, quiet or not, since what was
/// asked for was not done.
pub(super) fn open(page: &Path) {
    // Absolute, a path is never taken for a flag, whatever the folder is called.
    let whole = std::path::absolute(page).unwrap_or_else(|_| page.to_owned());
    if !openers(whole.as_os_str()).into_iter().any(starts) {
        output::complain(&format!("warning: no browser could be started; the page is {}\n", page.display()));
    }
}

/// Starts a program that outlives this one, does not hear its Ctrl-C and does not write into its output.
fn starts(mut opener: Command) -> bool {
    #[cfg(unix)]
    std::os::unix::process::CommandExt::process_group(&mut opener, 0);
    opener.stdin(Stdio::null()).stdout(Stdio::null()).stderr(Stdio::null()).spawn().is_ok()
}

#[cfg(windows)]
fn openers(page: &OsStr) -> Vec<Command> {
    // Unlike `start`, which the command interpreter reads, it takes any path as it is.
    vec![with("explorer", [page.to_owned()])]
}

#[cfg(not(windows))]
fn openers(page: &OsStr) -> Vec<Command> {
    let named = std::env::var("BROWSER").unwrap_or_default();
    let system = if cfg!(target_os = "macos") { "open" } else { "xdg-open" };
    let mut openers: Vec<Command> = named.split(':').filter_map(|line| named_by(line, page)).collect();
    openers.push(with(system, [page.to_owned()]));
    openers
}

/// A browser as `BROWSER` names it: a program and its words, the page in place of `%s`, or last.
#[cfg(not(windows))]
fn named_by(line: &str, page: &OsStr) -> Option<Command> {
    let mut words = line.split_whitespace();
    let program = words.next()?;
    let mut words: Vec<OsString> = words.map(OsString::from).collect();
    match words.iter_mut().find(|word| *word == "%s") {
        Some(place) => page.clone_into(place),
        None => words.push(page.to_owned()),
    }
    Some(with(program, words))
}

fn with(program: &str, words: impl IntoIterator<Item = OsString>) -> Command {
    let mut command = Command::new(program);
    command.args(words);
    command
}
