//! The known word that a mistyped one most likely meant.

/// The nearest of `known` by the fewest letters changed, added, dropped or exchanged with their neighbour; none where
/// even the nearest is far. A word of which the typed one is the beginning comes before all others.
pub(super) fn nearest<'k>(typed: &str, known: impl IntoIterator<Item = &'k str>) -> Option<&'k str> {
    let length = typed.chars().count();
    let close_enough = (length / 3).max(2).min(length.saturating_sub(1));
    let known: Vec<&str> = known.into_iter().collect();
    let lower = typed.to_lowercase();
    if length > 0
        && let Some(word) = known.iter().find(|word| word.to_lowercase().ends_with(&lower))
    {
        return Some(word);
    }
    known
        .into_iter()
        .map(|word| (distance(typed, word), word))
        .filter(|(distance, word)| {
            *distance <= close_enough || word.starts_with(typed) || typed.starts_with(word)
        })
        .min_by_key(|(distance, word)| (!word.starts_with(typed), *distance))
        .map(|(_, word)| word)
}

fn distance(a: &str, b: &str) -> usize {
    let (a, b): (Vec<char>, Vec<char>) = (a.chars().collect(), b.chars().collect());
    let mut table = vec![vec![0; b.len() + 1]; a.len() + 1];
    for (i, row) in table.iter_mut().enumerate() {
        row[0] = i;
    }
    table[0] = (0..=b.len()).collect();
    for i in 1..=a.len() {
        for j in 1..=b.len() {
            let change = usize::from(a[i - 1] != b[j - 1]);
            let mut least = (table[i - 1][j] + 1).min(table[i][j - 1] + 1).min(table[i - 1][j - 1] + change);
            if i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1] {
                least = least.min(table[i - 2][j - 2] + 1);
            }
            table[i][j] = least;
        }
    }
    table[a.len()][b.len()]
}

#[cfg(test)]
mod tests {
    use super::nearest;

    #[test]
    fn slips_are_recognised_and_strangers_are_not() {
        let known = ["melt_base_c", "degree_rule", "rain_snow"];
        assert_eq!(nearest("melt_bsae_c", known), Some("melt_base_c"));
        assert_eq!(nearest("degree", known), Some("degree_rule"));
        assert_eq!(nearest("albedo", known), None);
        assert_eq!(
            nearest("demand_hm3", ["demand_cfs", "demand_hm3_per_month"]),
            Some("demand_hm3_per_month")
        );
        assert_eq!(nearest("F", ["degC", "degF", "K"]), Some("degF"));
        assert_eq!(nearest("celsius", ["degC", "degF", "K"]), None);
    }
}
