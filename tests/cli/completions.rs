//! Completions for shells, on standard output.

use super::basin::Basin;
use super::help::commands;

#[test]
fn every_shell_is_told_every_command_and_flag() {
    let basin = Basin::new();
    for shell in ["bash", "zsh", "fish", "powershell", "elvish"] {
        let ended = basin.run(&format!("completions {shell}"));
        assert_eq!((ended.status, ended.stderr.as_str()), (0, ""), "{shell}");
        let flags = ["open", "draw-years", "realization", "json", "into"].map(str::to_owned);
        for word in commands().into_iter().chain(flags) {
            assert!(ended.stdout.contains(&word), "{shell} is not told of {word}");
        }
    }
}

/// Bash reads its script without a fault, and completes by it what has been begun.
#[test]
#[cfg(unix)]
fn bash_reads_and_completes() {
    let basin = Basin::new();
    basin.write("thawline.bash", &basin.run("completions bash").stdout);
    let bash = |line: &str| {
        std::process::Command::new("bash").args(["-c", line]).current_dir(basin.path()).output().unwrap()
    };
    let read = bash("bash -n thawline.bash");
    assert!(read.status.success() && read.stderr.is_empty(), "{read:?}");
    for (begun, whole) in [("(thawline ch) 1", "check"), ("(thawline study --op) 2", "--open")] {
        let (words, at) = begun.split_once(") ").unwrap();
        let last = words.rsplit(' ').next().unwrap();
        let line = format!(
            "source thawline.bash; COMP_WORDS={words}); COMP_CWORD={at}; _thawline thawline {last} x; echo \"${{COMPREPLY[@]}}\""
        );
        assert_eq!(String::from_utf8(bash(&line).stdout).unwrap().trim(), whole, "{begun}");
    }
}
