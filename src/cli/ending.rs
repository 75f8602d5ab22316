//! The five lines that a study or a fit ends with on standard error.

use super::output;
use crate::report::numbers::counted;
use std::path::Path;
use std::time::{Duration, Instant};

/// What there is to say at the end.
pub(super) struct Ending<'a> {
    pub answer: &'a str,
    pub folder: &'a Path,
    /// The file of the folder that is to be looked at first.
    pub first: &'a str,
    pub second_looks: usize,
    /// Where it is said what is worth a second look.
    pub said_where: &'a str,
    pub began: Instant,
}

impl Ending<'_> {
    /// Says it; the last of the run.
    pub fn say(&self) {
        output::complain(&self.lines(self.began.elapsed()));
    }

    fn lines(&self, took: Duration) -> String {
        let answer: Vec<&str> = self.answer.split_whitespace().collect();
        let warnings = match self.second_looks {
            0 => "none".to_owned(),
            1 => format!("1 thing is worth a second look, {}", self.said_where),
            some => format!("{} are worth a second look, {}", counted(some, "thing"), self.said_where),
        };
        format!(
            "answer: {}\nresults: {}\nlook first at: {}\nwarnings: {warnings}\ntime taken: {}\n",
            answer.join(" "),
            self.folder.display(),
            self.folder.join(self.first).display(),
            in_words(took)
        )
    }
}

/// `12.3 s`; from two minutes on `2 min 5 s`.
fn in_words(took: Duration) -> String {
    let seconds = took.as_secs();
    if seconds < 120 {
        return format!("{:.1} s", took.as_secs_f64());
    }
    format!("{} min {} s", seconds / 60, seconds % 60)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ending(answer: &str, second_looks: usize) -> Ending<'_> {
        let folder = Path::new("output/fork");
        Ending { answer, folder, first: "a.html", second_looks, said_where: "above", began: Instant::now() }
    }

    /// By hand: 125.9 s are two minutes and five seconds that have passed.
    #[test]
    fn five_lines_whatever_is_said() {
        let lines = ending("It melts.\n  Much\nearlier.", 0).lines(Duration::from_millis(12_340));
        assert_eq!(
            lines,
            "answer: It melts. Much earlier.\nresults: output/fork\nlook first at: output/fork/a.html\nwarnings: none\n\
             time taken: 12.3 s\n"
        );
        let lines = ending(&"long ".repeat(500), 1).lines(Duration::from_millis(125_900));
        assert_eq!(lines.lines().count(), 5);
        assert!(lines.ends_with("warnings: 1 thing is worth a second look, above\ntime taken: 2 min 5 s\n"));
        assert!(ending("", 12).lines(Duration::ZERO).contains("warnings: 12 things are worth a second look"));
    }
}
