//! The nearest known word to one that is not known, by the fewest slips of the hand. It never
//! puts a word in place of another.

/// The nearest of the known words, where one is near enough to be meant.
pub fn nearest<'a>(word: &str, known: impl Iterator<Item = &'a str>) -> Option<&'a str> {
    within(word, known, (word.chars().count() / 3).max(1) + 1)
}

/// The known word that an unknown one is a slip of, where hardly another can be meant.
pub fn slip_of<'a>(word: &str, known: impl Iterator<Item = &'a str>) -> Option<&'a str> {
    within(word, known, (word.chars().count() / 3).max(1))
}

fn within<'a>(word: &str, known: impl Iterator<Item = &'a str>, limit: usize) -> Option<&'a str> {
    known
        .map(|k| (slips(&word.to_lowercase(), &k.to_lowercase()), k))
        .filter(|(slips, _)| *slips <= limit)
        .min_by_key(|(slips, k)| (*slips, *k))
        .map(|(_, k)| k)
}

/// Letters put in, left out, changed or swapped with their neighbour, each letter touched once
/// (Damerau 1964, in the form known as optimal string alignment).
fn slips(a: &str, b: &str) -> usize {
    let (a, b): (Vec<char>, Vec<char>) = (a.chars().collect(), b.chars().collect());
    let mut rows: Vec<Vec<usize>> = vec![(0..=b.len()).collect()];
    for (i, ca) in a.iter().enumerate() {
        let mut row = vec![i + 1];
        for (j, cb) in b.iter().enumerate() {
            let changed = rows[i][j] + usize::from(ca != cb);
            let mut least = changed.min(rows[i][j + 1] + 1).min(row[j] + 1);
            if i > 0 && j > 0 && *ca == b[j - 1] && a[i - 1] == *cb {
                least = least.min(rows[i - 1][j - 1] + 1);
            }
            row.push(least);
        }
        rows.push(row);
    }
    rows[a.len()][b.len()]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn slips_count_letters_put_in_left_out_changed_and_swapped() {
        for (a, b, count) in [
            ("lay", "lay", 0),
            ("lya", "lay", 1),
            ("hieght", "height", 1),
            ("heigt", "height", 1),
            ("heeight", "height", 1),
            ("lean", "lead", 1),
            ("", "saw", 3),
            ("kitten", "sitting", 3),
        ] {
            assert_eq!(slips(a, b), count, "{a} {b}");
            assert_eq!(slips(b, a), count, "{b} {a}");
        }
    }

    #[test]
    fn a_slip_is_nearer_than_a_hint() {
        let known = ["height", "hinge", "lay"];
        assert_eq!(slip_of("hieght", known.into_iter()), Some("height"));
        assert_eq!(slip_of("hing", known.into_iter()), Some("hinge"));
        assert_eq!(slip_of("at", known.into_iter()), None);
        assert_eq!(nearest("law", known.into_iter()), Some("lay"));
        assert_eq!(nearest("wedges", known.into_iter()), None);
    }
}
