//! Where the numbers of the rules stand: beside their marks, on no other mark and no other number.

use super::super::sheet::Px;
use super::super::theme::LABEL;

/// Marks nearer than this are one, px.
const SAME_PX: f64 = 4.0;
/// Half of a mark, px.
const MARK_PX: f64 = 6.0;
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

/// The middle of each text; one that finds no free place is left out. `taken` are the boxes of those before.
pub(super) fn number_places(
    texts: &[(String, Px)],
    marks: &[Px],
    taken: &mut Vec<[f64; 4]>,
    [left, top, right, bottom]: [f64; 4],
) -> Vec<(String, Px)> {
    let mut placed = Vec::new();
    for (text, (x, y)) in texts {
        let (half_width, half_height) = (LABEL.width(text) / 2.0 + 1.0, LABEL.size_px / 2.0);
        let ways = AWAY_PX.iter().flat_map(|away| WAYS.iter().map(move |way| (*away, *way)));
        let free = ways
            .map(|(away, (across, down))| (x + across * (away + half_width - 5.0), y + down * away))
            .map(|(x, y)| ((x, y), [x - half_width, y - half_height, x + half_width, y + half_height]))
            .find(|(_, [l, t, r, b])| {
                let is_inside = *l >= left && *t >= top && *r <= right && *b <= bottom;
                let on_mark = marks.iter().any(|(x, y)| {
                    *l < x + MARK_PX && x - MARK_PX < *r && *t < y + MARK_PX && y - MARK_PX < *b
                });
                let on_text = taken.iter().any(|[l2, t2, r2, b2]| l < r2 && l2 < r && t < b2 && t2 < b);
                is_inside && !on_mark && !on_text
            });
        if let Some((at, bounds)) = free {
            taken.push(bounds);
            placed.push((text.clone(), at));
        }
    }
    placed
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: two marks on each other are told as one, above; one beside them goes below, since its number would lie on theirs.
    #[test]
    fn numbers_stand_beside_their_marks_and_apart() {
        let texts = numbered(&[(1, (50.0, 50.0)), (2, (51.0, 50.0)), (3, (58.0, 50.0))]);
        assert_eq!(texts.iter().map(|(text, _)| text.as_str()).collect::<Vec<_>>(), ["1, 2", "3"]);
        let marks = [(50.0, 50.0), (51.0, 50.0), (58.0, 50.0)];
        let mut taken = Vec::new();
        let placed = number_places(&texts, &marks, &mut taken, [0.0, 0.0, 100.0, 100.0]);
        assert_eq!(placed[0].1, (50.0, 37.0));
        assert_eq!(placed[1].1, (58.0, 63.0));
        let nowhere = number_places(&texts, &marks, &mut Vec::new(), [49.0, 49.0, 51.0, 51.0]);
        assert!(nowhere.is_empty(), "{nowhere:?}");
    }
}
