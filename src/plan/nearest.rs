//! The nearest known word to one that is not known, by the fewest letters changed.

/// The nearest of the known words, where one is near enough to be meant.
pub fn nearest<'a>(word: &str, known: impl Iterator<Item = &'a str>) -> Option<&'a str> {
    let limit = (word.chars().count() / 3).max(1) + 1;
    known
        .map(|k| (changes(&word.to_lowercase(), &k.to_lowercase()), k))
        .filter(|(changes, _)| *changes <= limit)
        .min_by_key(|(changes, k)| (*changes, *k))
        .map(|(_, k)| k)
}

/// Levenshtein's distance (1966): insertions, deletions and substitutions.
fn changes(a: &str, b: &str) -> usize {
    let b: Vec<char> = b.chars().collect();
    let mut row: Vec<usize> = (0..=b.len()).collect();
    for (i, ca) in a.chars().enumerate() {
        let mut diagonal = i;
        let mut left = i + 1;
        if let Some(first) = row.first_mut() {
            *first = left;
        }
        for (cell, cb) in row.iter_mut().skip(1).zip(&b) {
            let cost = usize::from(ca != *cb);
            let next = (diagonal + cost).min(*cell + 1).min(left + 1);
            diagonal = *cell;
            *cell = next;
            left = next;
        }
    }
    row.last().copied().unwrap_or(0)
}
