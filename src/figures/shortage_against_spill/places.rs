//! Where names and numbers stand: beside their marks, on no other mark, no line and no other text.

use super::super::sheet::Px;
use super::super::theme::Lettering;

/// Marks nearer than this are one, px.
const SAME_PX: f64 = 4.0;
/// Half of a mark and of a line, and how densely a line is looked at, px.
const MARK_PX: f64 = 6.0;
const LINE_PX: f64 = 1.5;
const STEP_PX: f64 = 3.0;
/// How far from its mark a number may stand, px.
const AWAY_PX: [f64; 3] = [13.0, 20.0, 28.0];
/// Which ways, the first that is free.
const WAYS: [Px; 8] =
    [(0.0, -1.0), (0.0, 1.0), (1.0, 0.0), (-1.0, 0.0), (0.8, -0.8), (-0.8, -0.8), (0.8, 0.8), (-0.8, 0.8)];

/// `2` or, of marks that lie on each other, `2, 5`, each with its place.
pub(super) fn numbered(points: &[(usize, Px)]) -> Vec<(String, Px)> {
    let mut groups: Vec<(Vec<usize>, Px)> = Vec::new();
    for (number, (x, y)) in points {
        let near = |(_, at): &&mut (Vec<usize>, Px)| (at.0 - x).abs() < SAME_PX && (at.1 - y).abs() < SAME_PX;
        match groups.iter_mut().find(near) {
            Some((numbers, _)) => numbers.push(*number),
            None => groups.push((vec![*number], (*x, *y))),
        }
    }
    let said = |numbers: Vec<usize>| numbers.iter().map(ToString::to_string).collect::<Vec<_>>().join(", ");
    groups.into_iter().map(|(numbers, at)| (said(numbers), at)).collect()
}

/// What a text must not lie on: marks, lines, and texts before it.
pub(super) struct Obstacles {
    /// Places, and how far around each no text may come, px.
    spots: Vec<(Px, f64)>,
    texts: Vec<[f64; 4]>,
    /// Left, top, right, bottom of what texts may fill.
    within: [f64; 4],
}

impl Obstacles {
    pub fn new(within: [f64; 4]) -> Self {
        Self { spots: Vec::new(), texts: Vec::new(), within }
    }

    /// A mark stands there.
    pub fn add_mark(&mut self, at: Px) {
        self.spots.push((at, MARK_PX));
    }

    /// A line runs through these places.
    pub fn add_line(&mut self, places: &[Px]) {
        for pair in places.windows(2) {
            let [(x, y), (to_x, to_y)] = [pair[0], pair[1]];
            let steps = (libm::hypot(to_x - x, to_y - y) / STEP_PX).ceil().max(1.0);
            for step in 0..=steps as usize {
                let part = step as f64 / steps;
                self.spots.push(((x + part * (to_x - x), y + part * (to_y - y)), LINE_PX));
            }
        }
    }

    /// The middle of a text beside a place, which it takes; nothing where there is no room.
    pub fn beside(&mut self, text: &str, lettering: Lettering, (x, y): Px) -> Option<Px> {
        let (half_width, half_height) = (lettering.width(text) / 2.0 + 1.0, lettering.size_px / 2.0);
        let [left, top, right, bottom] = self.within;
        let ways = AWAY_PX.iter().flat_map(|away| WAYS.iter().map(move |way| (*away, *way)));
        let places = ways.map(|(away, (across, down))| {
            let (x, y) = (x + across * (away + half_width - 5.0), y + down * away);
            ((x, y), [x - half_width, y - half_height, x + half_width, y + half_height])
        });
        let is_free = |(_, [l, t, r, b]): &(Px, [f64; 4])| {
            let is_inside = *l >= left && *t >= top && *r <= right && *b <= bottom;
            let on_spot = self.spots.iter().any(|((x, y), around)| {
                *l < x + around && x - around < *r && *t < y + around && y - around < *b
            });
            let on_text = self.texts.iter().any(|[l2, t2, r2, b2]| l < r2 && l2 < r && t < b2 && t2 < b);
            is_inside && !on_spot && !on_text
        };
        let (at, bounds) = { places }.find(is_free)?;
        self.texts.push(bounds);
        Some(at)
    }
}

#[cfg(test)]
mod tests {
    use super::super::super::theme::LABEL;
    use super::*;

    /// By hand: two marks on each other are told as one, above; one beside them goes below, since above its number would lie on theirs;
    /// where a line runs above, the number goes below.
    #[test]
    fn numbers_stand_beside_their_marks_and_apart() {
        let marks = [(1, (50.0, 50.0)), (2, (51.0, 50.0)), (3, (58.0, 50.0))];
        let texts = numbered(&marks);
        assert_eq!(texts.iter().map(|(text, _)| text.as_str()).collect::<Vec<_>>(), ["1, 2", "3"]);
        let mut obstacles = Obstacles::new([0.0, 0.0, 100.0, 100.0]);
        marks.iter().for_each(|(_, at)| obstacles.add_mark(*at));
        assert_eq!(obstacles.beside("1, 2", LABEL, texts[0].1), Some((50.0, 37.0)));
        assert_eq!(obstacles.beside("3", LABEL, texts[1].1), Some((58.0, 63.0)));
        let mut below_line = Obstacles::new([0.0, 0.0, 100.0, 100.0]);
        below_line.add_line(&[(0.0, 40.0), (100.0, 40.0)]);
        assert_eq!(below_line.beside("1", LABEL, (50.0, 50.0)), Some((50.0, 63.0)));
        assert_eq!(Obstacles::new([49.0, 49.0, 51.0, 51.0]).beside("1", LABEL, (50.0, 50.0)), None);
    }
}
