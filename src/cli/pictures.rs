//! `--png`: a picture in pixels beside every figure.

use super::arguments::Shared;
use super::failure::Failure;
use super::output;
use super::pool::in_pool;
use super::progress::is_interrupted;
use crate::report::{Picture, ReportFile, picture_of};
use clap::Args;
use rayon::prelude::*;
use std::collections::BTreeSet;

/// What was typed.
#[derive(Debug, Clone, Copy, Args)]
pub(super) struct Pictures {
    /// Leave every figure as a PNG picture, too, WIDTH pixels wide (400 to 8000); figures are drawn 760 wide, so that
    /// 1520 is twice as fine
    #[arg(long = "png", value_name = "WIDTH", value_parser = clap::value_parser!(u32).range(400..=8000))]
    pub width_px: Option<u32>,
}

impl Pictures {
    /// The flags that ask for them again.
    pub fn flags(self) -> String {
        self.width_px.map_or(String::new(), |width_px| format!(" --png {width_px}"))
    }

    /// Puts a picture behind every figure among the files, if pictures were asked for, and says which letters they lack.
    ///
    /// # Errors
    /// A figure that cannot be drawn in pixels, or an interrupt.
    pub fn beside(self, files: Vec<ReportFile>, shared: &Shared) -> Result<Vec<ReportFile>, Failure> {
        let Some(width_px) = self.width_px else {
            return Ok(files);
        };
        let draw = |(name, content): &ReportFile| -> Result<Option<(String, Picture)>, Failure> {
            let Some(slug) = name.strip_suffix(".svg") else {
                return Ok(None);
            };
            if is_interrupted() {
                return Err(Failure::Interrupted);
            }
            let picture = picture_of(content, width_px);
            let picture = picture.map_err(|error| Failure::Ours(format!("{name}: {error}")))?;
            Ok(Some((format!("{slug}.png"), picture)))
        };
        let pictures: Vec<_> = in_pool(shared, || files.par_iter().map(draw).collect())?;
        let (mut with_pictures, mut lacking) = (Vec::new(), BTreeSet::new());
        for (file, picture) in files.into_iter().zip(pictures) {
            with_pictures.push(file);
            if let Some((name, picture)) = picture? {
                with_pictures.push((name, picture.png));
                lacking.extend(picture.letters_lacking);
            }
        }
        if !shared.quiet {
            output::complain(&lacking_in_words(&lacking));
        }
        Ok(with_pictures)
    }
}

/// What is not in the pictures as it was typed; nothing where all is.
fn lacking_in_words(letters: &BTreeSet<String>) -> String {
    if letters.is_empty() {
        return String::new();
    }
    let letters: Vec<&str> = letters.iter().map(String::as_str).collect();
    format!(
        "PNG pictures have a box in place of each of these letters, which their font lacks; the SVG figures have them: {}\n",
        letters.join(" ")
    )
}
