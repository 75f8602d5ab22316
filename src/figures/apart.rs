//! Labels in a row or a column that would lie on each other, moved apart.

/// Middles of ascending labels, each a middle and a size, px, moved from where they are wanted as little as keeps
/// `between_px` between them: labels that meet stand together about the mean of their places (least squares, by pooling
/// neighbours). All stand between two edges where there is room.
pub(super) fn moved_apart(wanted: &[[f64; 2]], between_px: f64, [from, to]: [f64; 2]) -> Vec<f64> {
    // How far each stands from the first where all touch.
    let mut touching = Vec::new();
    let mut end = from;
    for [_, size] in wanted {
        touching.push(end + size / 2.0 - from);
        end += size + between_px;
    }
    // Runs of labels that touch: where a run begins, and how many it has.
    let mut runs: Vec<(f64, usize)> = Vec::new();
    for ([middle, _], touching) in wanted.iter().zip(&touching) {
        let mut run = (middle - touching, 1);
        while let Some((before, count)) = runs.pop_if(|(before, _)| *before >= run.0) {
            let labels = count + run.1;
            run = ((before * count as f64 + run.0 * run.1 as f64) / labels as f64, labels);
        }
        runs.push(run);
    }
    let last = (to - (end - between_px - from)).max(from);
    let begins =
        runs.into_iter().flat_map(|(begin, count)| std::iter::repeat_n(begin.clamp(from, last), count));
    begins.zip(touching).map(|(begin, touching)| begin + touching).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: labels 20 wide keep 12 between them, those wanted at one place stand about it, and none leaves 0 to 200.
    #[test]
    fn labels_move_only_as_far_as_they_must() {
        let moved = |middles: &[f64]| {
            let wanted: Vec<[f64; 2]> = middles.iter().map(|middle| [*middle, 20.0]).collect();
            moved_apart(&wanted, 12.0, [0.0, 200.0])
        };
        assert_eq!(moved(&[50.0, 150.0]), [50.0, 150.0]);
        assert_eq!(moved(&[50.0, 50.0]), [34.0, 66.0]);
        assert_eq!(moved(&[50.0, 50.0, 140.0]), [34.0, 66.0, 140.0]);
        assert_eq!(moved(&[40.0, 70.0, 100.0]), [38.0, 70.0, 102.0]);
        assert_eq!(moved(&[190.0, 195.0]), [158.0, 190.0]);
        assert_eq!(moved(&[0.0]), [10.0]);
        assert!(moved(&[]).is_empty());
    }
}
