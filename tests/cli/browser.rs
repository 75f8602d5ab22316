//! `--open`: the page in the user's browser, and never a run that waits for it or fails by it.
#![cfg(all(unix, not(target_os = "macos")))]

use super::basin::{Basin, ended};
use assert_cmd::Command;
use std::fs;
use std::os::unix::fs::PermissionsExt;
use std::thread::sleep;
use std::time::Duration;

/// Stays until it is let go, a minute at most, and then writes down what it was given. Were it waited for, it would never be let go.
const OPENER: &str = r#"#!/bin/sh
turns=0
while [ ! -e go ] && [ $turns -lt 600 ]; do sleep 0.1; turns=$((turns + 1)); done
[ -e go ] && printf '%s\n' "$(basename "$0")" "$@" > part && mv part opened
"#;

/// The basin with an opener of this name in `bin/`, which stands first on the path.
fn with_opener(name: &str) -> Basin {
    let basin = Basin::new();
    fs::create_dir(basin.path().join("bin")).unwrap();
    basin.write(&format!("bin/{name}"), OPENER);
    fs::set_permissions(basin.path().join("bin").join(name), fs::Permissions::from_mode(0o755)).unwrap();
    basin
}

fn studied(basin: &Basin, browser: &str, words: &str) -> Command {
    let path = format!("{}:{}", basin.path().join("bin").display(), std::env::var("PATH").unwrap());
    let mut command = basin.command(words);
    command.envs([("PATH", path.as_str()), ("BROWSER", browser)]);
    command
}

/// What the opener was given, once it is let go.
fn opened(basin: &Basin) -> Vec<String> {
    basin.write("go", "");
    for _ in 0..600 {
        if basin.path().join("opened").exists() {
            return basin.read("opened").lines().map(str::to_owned).collect();
        }
        sleep(Duration::from_millis(100));
    }
    panic!("nothing was opened");
}

#[test]
fn the_briefing_opens_and_the_run_goes_on() {
    for (opener, browser, given) in [
        ("xdg-open", "", vec!["xdg-open", "PAGE"]),
        ("fake", "fake", vec!["fake", "PAGE"]),
        ("fake", "not-there:fake --new %s last", vec!["fake", "--new", "PAGE", "last"]),
        ("xdg-open", "not-there", vec!["xdg-open", "PAGE"]),
    ] {
        let basin = with_opener(opener);
        let ended = ended(&mut studied(&basin, browser, "study scenario.toml --open --into a-folder"));
        assert_eq!((ended.status, ended.stdout.as_str()), (0, ""), "{}", ended.stderr);
        assert!(!ended.stderr.contains("warning: "), "{}", ended.stderr);
        assert!(!basin.path().join("opened").exists(), "the run waited");
        let page = basin.path().canonicalize().unwrap().join("a-folder/briefing.html");
        let given: Vec<String> =
            given.iter().map(|word| word.replace("PAGE", page.to_str().unwrap())).collect();
        assert_eq!(opened(&basin), given, "BROWSER={browser}");
    }
}

/// Nothing is opened that was not asked for, nor a page that was not written.
#[test]
fn nothing_else_opens() {
    let basin = with_opener("xdg-open");
    basin.write("go", "");
    basin.write("bin/xdg-open", "#!/bin/sh\n: > opened\n");
    assert_eq!(ended(&mut studied(&basin, "", "study scenario.toml")).status, 0);
    basin.exchange("seed = 5", "sead = 5");
    assert_eq!(ended(&mut studied(&basin, "", "study scenario.toml --open --into other")).status, 3);
    sleep(Duration::from_millis(300));
    assert!(!basin.path().join("opened").exists());
}

/// Where nothing can be started the results stand, and the page's path is said, even when quiet.
#[test]
fn without_a_browser_the_path_is_said() {
    let basin = Basin::new();
    for (words, lines) in [("study scenario.toml --open", 5), ("study scenario.toml --open --quiet", 0)] {
        let mut command = basin.command(words);
        let ended = ended(command.envs([("PATH", "nowhere"), ("BROWSER", "not-there:nor-this %s")]));
        assert_eq!((ended.status, ended.stdout.as_str()), (0, ""), "{}", ended.stderr);
        let said: Vec<&str> =
            ended.stderr.lines().skip_while(|line| !line.starts_with("warning: ")).collect();
        assert_eq!(
            said[0], "warning: no browser could be started; the page is output/scenario/briefing.html",
            "{}",
            ended.stderr
        );
        assert_eq!(said.len(), 1 + lines, "{said:?}");
        assert!(basin.path().join("output/scenario/briefing.html").is_file());
    }
}
