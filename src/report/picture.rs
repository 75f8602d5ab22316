//! A figure as a PNG picture: an SVG drawn in pixels, lettered with fonts of our own.
//!
//! The machine's fonts are never asked for: a font that is not there would take its text away without a word, and
//! pictures would differ from machine to machine.

use png::{BitDepth, ColorType, Encoder};
use resvg::tiny_skia::{Color, Pixmap, Transform};
use resvg::usvg::fontdb::{Database, ID, Source};
use resvg::usvg::{FontResolver, Group, Node, Options, Tree};
use std::collections::BTreeSet;
use std::io::Write;
use std::sync::Arc;
use thiserror::Error;

/// Letters of the widths that [`text_width`](crate::figures::text_width) takes.
static REGULAR: &[u8] = include_bytes!("fonts/LiberationSans-Regular.ttf");
static BOLD: &[u8] = include_bytes!("fonts/LiberationSans-Bold.ttf");
/// A weight from which on letters are bold, halfway between 400 and 700, rounded up.
const BOLD_FROM: u16 = 600;
/// Pixels drawn at a time, 64 MiB of them: the largest pictures, one on each thread, would not fit into memory, and are
/// drawn in pieces.
const PIXELS_AT_A_TIME: u32 = 1 << 24;

/// A picture.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Picture {
    /// The PNG file.
    pub png: Vec<u8>,
    /// Letters that the fonts lack, each with its accents: a box stands in place of each.
    pub letters_lacking: BTreeSet<String>,
}

/// Why there is no picture.
#[derive(Debug, Error)]
pub enum PictureError {
    /// The fonts in the program cannot be read.
    #[error("the program's own fonts cannot be read")]
    Fonts,
    /// The figure is no SVG, or one without a size.
    #[error("a figure cannot be read: {0}")]
    Svg(#[from] resvg::usvg::Error),
    /// So many pixels cannot be held.
    #[error("a picture of {width_px} by {height_px} pixels cannot be held")]
    Size {
        /// Its width.
        width_px: u32,
        /// Its height.
        height_px: u32,
    },
    /// The pixels cannot be written as PNG.
    #[error("a picture cannot be written: {0}")]
    Encoding(#[from] png::EncodingError),
    /// Nor can some of their rows.
    #[error("a picture cannot be written: {0}")]
    Rows(#[from] std::io::Error),
}

/// Draws an SVG on white, `width_px` wide and as high as its proportions ask for.
///
/// # Errors
/// What is no SVG, or a size that cannot be held.
pub fn picture_of(svg: &[u8], width_px: u32) -> Result<Picture, PictureError> {
    drawn(svg, width_px, PIXELS_AT_A_TIME)
}

fn drawn(svg: &[u8], width_px: u32, pixels_at_a_time: u32) -> Result<Picture, PictureError> {
    let tree = Tree::from_data(svg, &options()?)?;
    let size = tree.size();
    let scale = width_px as f32 / size.width();
    let height_px = (size.height() * scale).round().max(1.0) as u32;
    let rows = (pixels_at_a_time / width_px.max(1)).clamp(1, height_px);
    let mut piece = Pixmap::new(width_px, rows).ok_or(PictureError::Size { width_px, height_px })?;

    let mut png = Vec::new();
    let mut encoder = Encoder::new(&mut png, width_px, height_px);
    encoder.set_color(ColorType::Rgb);
    encoder.set_depth(BitDepth::Eight);
    let mut header = encoder.write_header()?;
    let mut pixels = header.stream_writer()?;
    for top in (0..height_px).step_by(rows as usize) {
        piece.fill(Color::WHITE);
        let place = Transform::from_row(scale, 0.0, 0.0, scale, 0.0, -(top as f32));
        resvg::render(&tree, place, &mut piece.as_mut());
        let count = width_px as usize * rows.min(height_px - top) as usize;
        // On white every pixel is opaque, so that its colour is written as it is held.
        let colours = piece.pixels()[..count].iter();
        let bytes: Vec<u8> = colours.flat_map(|pixel| [pixel.red(), pixel.green(), pixel.blue()]).collect();
        pixels.write_all(&bytes)?;
    }
    pixels.finish()?;
    header.finish()?;
    let mut letters_lacking = BTreeSet::new();
    lacking(tree.root(), &mut letters_lacking);
    Ok(Picture { png, letters_lacking })
}

/// Our two fonts, for whatever family a figure asks for.
fn options() -> Result<Options<'static>, PictureError> {
    let mut fonts = Database::new();
    let mut load = |font: &'static [u8]| -> Result<ID, PictureError> {
        let faces = fonts.load_font_source(Source::Binary(Arc::new(font)));
        faces.first().copied().ok_or(PictureError::Fonts)
    };
    let (regular, bold) = (load(REGULAR)?, load(BOLD)?);
    let font_resolver = FontResolver {
        select_font: Box::new(move |font, _| Some(if font.weight() >= BOLD_FROM { bold } else { regular })),
        select_fallback: Box::new(|_, _, _| None),
    };
    Ok(Options { fontdb: Arc::new(fonts), font_resolver, ..Options::default() })
}

/// Gathers the letters of a group that are drawn as a font's first glyph, which stands for what it lacks.
fn lacking(group: &Group, letters: &mut BTreeSet<String>) {
    for node in group.children() {
        match node {
            Node::Group(group) => lacking(group, letters),
            Node::Text(text) => {
                let glyphs = text.layouted().iter().flat_map(|span| &span.positioned_glyphs);
                letters.extend(glyphs.filter(|glyph| glyph.id.0 == 0).map(|glyph| glyph.text.clone()));
            }
            Node::Path(_) | Node::Image(_) => {}
        }
    }
}

#[cfg(test)]
mod tests;
