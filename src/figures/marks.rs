//! Marks of a distribution: the point with its intervals, and twenty dots.

use super::sheet::{Drawn, Px, Sheet, Stroke};
use super::theme::PAPER;
use plotters::style::RGBColor;

/// Width of the line over the middle half, px.
const HALF_PX: f64 = 5.0;
/// Width of the line from 5 to 95 %, px.
const WHOLE_PX: f64 = 1.5;
/// Half the size of a marker, px.
const MARKER_PX: f64 = 5.0;
/// Largest and smallest radius of a dot, px.
const DOT_PX: [f64; 2] = [2.7, 1.6];

/// Form of a marker.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Form {
    /// A circle.
    Round,
    /// A square on its corner.
    Diamond,
    /// A square on its side.
    Square,
    /// A triangle, upright.
    Triangle,
}

impl Form {
    /// The form of a level among those that are drawn beside the reference; the reference is round, and hollow.
    pub fn of_level(place: usize) -> Self {
        [Self::Round, Self::Diamond, Self::Square, Self::Triangle][place % 4]
    }
}

/// How a distribution is marked.
#[derive(Debug, Clone, Copy)]
pub(super) struct Marking {
    pub ink: RGBColor,
    pub form: Form,
    /// Hollow marks are the reference's.
    pub is_hollow: bool,
}

/// Draws median, middle half and 5-95 % interval: the five quantiles' places, from the lowest; a part without a place is
/// left out.
pub(super) fn point_interval(sheet: &Sheet, places: [Option<Px>; 5], marking: Marking) -> Drawn {
    let [q05, q25, q50, q75, q95] = places;
    if let (Some(low), Some(high)) = (q05, q95) {
        sheet.line(&[low, high], Stroke::solid(marking.ink, WHOLE_PX))?;
    }
    if let (Some(low), Some(high)) = (q25, q75) {
        sheet.line(&[low, high], Stroke::solid(marking.ink, HALF_PX))?;
    }
    q50.map_or(Ok(()), |median| marker(sheet, median, marking))
}

/// Draws a marker alone.
pub(super) fn marker(sheet: &Sheet, (x, y): Px, marking: Marking) -> Drawn {
    let draw = |half: f64, ink: RGBColor| match marking.form {
        Form::Round => sheet.dot((x, y), half, ink),
        Form::Diamond => {
            let half = half * 1.2;
            sheet.shape(&[(x, y - half), (x + half, y), (x, y + half), (x - half, y)], ink)
        }
        Form::Square => {
            let half = half * 0.9;
            sheet.block((x - half, y - half), (x + half, y + half), ink)
        }
        Form::Triangle => {
            let half = half * 1.15;
            sheet.shape(&[(x, y - half), (x + half, y + 0.8 * half), (x - half, y + 0.8 * half)], ink)
        }
    };
    draw(MARKER_PX, marking.ink)?;
    if marking.is_hollow {
        draw(MARKER_PX - 1.7, PAPER)?;
    }
    Ok(())
}

/// An arrow head at a place: the interval goes on beyond the axis.
pub(super) fn arrow(sheet: &Sheet, (x, y): Px, forwards: bool, ink: RGBColor) -> Drawn {
    let back = if forwards { -9.0 } else { 9.0 };
    sheet.shape(&[(x, y), (x + back, y - 5.5), (x + back, y + 5.5)], ink)
}

/// How large dots are and how far apart, px.
#[derive(Debug, Clone, Copy)]
pub(super) struct DotSize {
    radius: f64,
    apart: f64,
}

impl DotSize {
    /// The largest dots of which every set keeps within `room_px`. Sets that even the smallest do not fit are drawn with
    /// dots that overlap.
    pub fn for_all(sets: &[Vec<f64>], room_px: f64) -> Self {
        let [largest, smallest] = DOT_PX;
        let mut radius = largest;
        loop {
            let size = Self { radius, apart: 2.0 * radius + 0.6 };
            if radius <= smallest || sets.iter().all(|heights| size.width(heights) <= room_px) {
                return size;
            }
            radius = (radius - 0.1).max(smallest);
        }
    }

    /// Width of the widest set, px.
    pub fn widest(&self, sets: &[Vec<f64>], room_px: f64) -> f64 {
        sets.iter().map(|heights| self.width(heights)).fold(0.0, f64::max).min(room_px)
    }

    fn width(&self, heights: &[f64]) -> f64 {
        if heights.is_empty() {
            return 0.0;
        }
        last_column(&columns(heights, self.apart)) * self.apart + 2.0 * self.radius
    }

    /// Each dot's distance from the left.
    fn arrange(&self, heights: &[f64], room_px: f64) -> Vec<f64> {
        let columns = columns(heights, self.apart);
        let step = if self.width(heights) <= room_px {
            self.apart
        } else {
            (room_px - 2.0 * self.radius).max(0.0) / last_column(&columns)
        };
        columns.into_iter().map(|column| self.radius + column as f64 * step).collect()
    }
}

/// Draws dots at exactly their heights, moved to the right of `left_px` as far as they would overlap; they keep within
/// `room_px`.
pub(super) fn dots(
    sheet: &Sheet,
    heights: &[f64],
    size: DotSize,
    [left_px, room_px]: [f64; 2],
    marking: Marking,
) -> Drawn {
    for (height, across) in heights.iter().zip(size.arrange(heights, room_px)) {
        let place = (left_px + across, *height);
        if marking.is_hollow {
            sheet.ring(place, size.radius - 0.4, Stroke::solid(marking.ink, 1.2))?;
        } else {
            sheet.dot(place, size.radius, marking.ink)?;
        }
    }
    Ok(())
}

fn last_column(columns: &[usize]) -> f64 {
    columns.iter().copied().max().unwrap_or(0) as f64
}

/// The first column in which a dot keeps `apart` from the one placed there before.
fn columns(heights: &[f64], apart: f64) -> Vec<usize> {
    let mut last: Vec<f64> = Vec::new();
    heights
        .iter()
        .map(|height| {
            let free = last.iter().position(|before| (before - height).abs() >= apart);
            if let Some(column) = free {
                last[column] = *height;
                column
            } else {
                last.push(*height);
                last.len() - 1
            }
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn dots_neither_overlap_nor_leave_their_room() {
        let heights: Vec<f64> = (0..20).map(|n| 300.0 - f64::from(n * n) / 6.0).collect();
        let size = DotSize::for_all(&[heights.clone(), vec![7.0; 5]], 40.0);
        let across = size.arrange(&heights, 40.0);
        for (at, (x, y)) in across.iter().zip(&heights).enumerate() {
            assert!(x + size.radius <= 40.0);
            for (other_x, other_y) in across[..at].iter().zip(&heights) {
                assert!(libm::hypot(x - other_x, y - other_y) >= 2.0 * size.radius, "dot {at}");
            }
        }
    }

    #[test]
    fn twenty_equal_dots_stay_in_their_room() {
        let heights = vec![10.0; 20];
        let size = DotSize::for_all(std::slice::from_ref(&heights), 40.0);
        let across = size.arrange(&heights, 40.0);
        assert!(across.is_sorted_by(|a, b| a < b), "{across:?}");
        assert!(across[19] + size.radius <= 40.0 + 1e-9);
    }
}
