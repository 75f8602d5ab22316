//! What stands above and below a figure's drawing: the study, the finding, how much was run, how to read the marks.

use super::sheet::{Drawn, HPos, Sheet, VPos};
use super::text_width::{at_most, wrap};
use super::theme::{Lettering, MARGIN_PX, NOTE, TITLE, WIDTH_PX};

/// Space between two paragraphs, px.
const GAP_PX: f64 = 8.0;
/// Lines that a study's title may fill.
const STUDY_LINES: usize = 2;

/// Paragraphs, already broken into lines.
pub(super) struct Paragraphs {
    lines: Vec<(String, Lettering, f64)>,
    height_px: f64,
}

impl Paragraphs {
    /// Study, finding and ensemble.
    pub fn heading(study: &str, finding: &str, ensemble: &str) -> Self {
        let study = at_most(broken(study, NOTE), STUDY_LINES);
        Self::of([(study, NOTE), (broken(finding, TITLE), TITLE), (broken(ensemble, NOTE), NOTE)])
    }

    /// How to read the marks.
    pub fn key(text: &str) -> Self {
        Self::of([(broken(text, NOTE), NOTE)])
    }

    /// Height of all lines, px.
    pub fn height(&self) -> f64 {
        self.height_px
    }

    /// Writes the lines from `top_px` down.
    pub fn write(&self, sheet: &Sheet, top_px: f64) -> Drawn {
        for (line, lettering, below) in &self.lines {
            let place = (MARGIN_PX, top_px + below);
            sheet.write(line, place, *lettering, HPos::Left, VPos::Bottom)?;
        }
        Ok(())
    }

    fn of(paragraphs: impl IntoIterator<Item = (Vec<String>, Lettering)>) -> Self {
        let (mut lines, mut below) = (Vec::new(), 0.0);
        for (paragraph, lettering) in paragraphs {
            if below > 0.0 && !paragraph.is_empty() {
                below += GAP_PX;
            }
            for line in paragraph {
                below += lettering.leading();
                lines.push((line, lettering, below - 0.3 * lettering.size_px));
            }
        }
        Self { lines, height_px: below }
    }
}

fn broken(text: &str, lettering: Lettering) -> Vec<String> {
    let width = WIDTH_PX - 2.0 * MARGIN_PX;
    wrap(text, width, lettering.size_px, lettering.is_bold)
}
