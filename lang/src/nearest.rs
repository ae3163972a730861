//! The nearest name to a misspelt one.

/// The candidate nearest to `wanted` by edits (optimal string alignment, Damerau 1964: insertions, deletions,
/// substitutions, swaps of neighbours), if it is near enough to be what was meant. Capitals count as half an edit.
pub fn nearest<'a>(wanted: &str, candidates: impl IntoIterator<Item = &'a str>) -> Option<&'a str> {
    let limit = 2 * (wanted.chars().count().div_ceil(3)).max(1);
    let scored = candidates.into_iter().map(|candidate| (distance(wanted, candidate), candidate));
    scored.filter(|(distance, _)| *distance <= limit).min_by_key(|(distance, _)| *distance).map(|(_, c)| c)
}

/// Twice the number of edits.
fn distance(a: &str, b: &str) -> usize {
    let (a, b): (Vec<char>, Vec<char>) = (a.chars().collect(), b.chars().collect());
    let mut rows = vec![vec![0; b.len() + 1]; a.len() + 1];
    for (i, row) in rows.iter_mut().enumerate() {
        row[0] = 2 * i;
    }
    rows[0] = (0..=b.len()).map(|j| 2 * j).collect();
    for i in 1..=a.len() {
        for j in 1..=b.len() {
            let change = match (a[i - 1], b[j - 1]) {
                (x, y) if x == y => 0,
                (x, y) if x.to_lowercase().eq(y.to_lowercase()) => 1,
                _ => 2,
            };
            let mut best = (rows[i - 1][j] + 2).min(rows[i][j - 1] + 2).min(rows[i - 1][j - 1] + change);
            if i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1] {
                best = best.min(rows[i - 2][j - 2] + 2);
            }
            rows[i][j] = best;
        }
    }
    rows[a.len()][b.len()]
}

#[cfg(test)]
mod tests {
    use super::nearest;

    #[test]
    fn finds_what_was_meant_and_nothing_far_fetched() {
        let names = ["season", "apiary", "hive"];
        assert_eq!(nearest("saeson", names), Some("season"));
        assert_eq!(nearest("Apiary", names), Some("apiary"));
        assert_eq!(nearest("hives", names), Some("hive"));
        assert_eq!(nearest("weather", names), None);
    }
}
