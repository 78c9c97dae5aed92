//! Finding a species by its name, spoken or scientific, and the nearest names to an unknown one.
//! A name is never guessed: what does not match is offered, not taken.

use crate::species::Species;
use crate::species::table::SPECIES;

/// Names in use for a species beside the table's own, from common knowledge.
const OTHER_NAMES: [(&str, &str); 8] = [
    ("balsam poplar", "Cottonwood, balsam poplar"),
    ("pecan", "Hickory, pecan"),
    ("blackgum", "Tupelo, black"),
    ("sycamore", "Sycamore, American"),
    ("tulip tree", "Yellow-poplar"),
    ("red alder", "Alder, red"),
    ("eastern larch", "Tamarack"),
    ("bald cypress", "Baldcypress"),
];

/// Every species in the table's order.
pub fn all() -> &'static [Species] {
    &SPECIES
}

/// The species of this common or scientific name, in any order of words and any case.
pub fn find(name: &str) -> Option<&'static Species> {
    let wanted = sorted_words(name);
    if wanted.is_empty() {
        return None;
    }
    let by_name = SPECIES.iter().find(|species| {
        sorted_words(species.table_name) == wanted || sorted_words(species.scientific) == wanted
    });
    if by_name.is_some() {
        return by_name;
    }
    let other = OTHER_NAMES
        .iter()
        .find(|(other, _)| sorted_words(other) == wanted);
    if let Some((_, table_name)) = other {
        return SPECIES
            .iter()
            .find(|species| species.table_name == *table_name);
    }
    // A genus and species that the table divides further stands for the first of its divisions.
    SPECIES.iter().find(|species| {
        species
            .scientific
            .split(" var.")
            .next()
            .is_some_and(|plain| plain != species.scientific && sorted_words(plain) == wanted)
    })
}

/// Up to three species whose names come nearest, the nearest first.
pub fn nearest(name: &str) -> Vec<&'static Species> {
    let wanted = sorted_words(name);
    let mut ranked: Vec<(usize, usize, &'static Species)> = SPECIES
        .iter()
        .enumerate()
        .map(|(place, species)| {
            let common = difference(&wanted, &sorted_words(species.table_name));
            let scientific = difference(&wanted, &sorted_words(species.scientific));
            (common.min(scientific), place, species)
        })
        .collect();
    ranked.sort_by_key(|(difference, place, _)| (*difference, *place));
    ranked
        .into_iter()
        .take(3)
        .map(|(_, _, species)| species)
        .collect()
}

/// The words of a name in lower case and in order of the alphabet.
fn sorted_words(name: &str) -> Vec<String> {
    let mut words: Vec<String> = name
        .split(|letter: char| !letter.is_alphanumeric())
        .filter(|word| !word.is_empty())
        .map(str::to_lowercase)
        .collect();
    words.sort();
    words
}

/// How far two names differ: each word of one against its nearest of the other, both ways.
fn difference(one: &[String], other: &[String]) -> usize {
    let one_way = |from: &[String], to: &[String]| -> usize {
        from.iter()
            .map(|word| {
                to.iter()
                    .map(|against| edits(word, against))
                    .min()
                    .unwrap_or(word.chars().count())
            })
            .sum()
    };
    2 * one_way(one, other) + one_way(other, one)
}

/// The edits that turn one word into the other: insert, remove or replace a letter.
fn edits(one: &str, other: &str) -> usize {
    let other: Vec<char> = other.chars().collect();
    let mut row: Vec<usize> = (0..=other.len()).collect();
    for (line, letter) in one.chars().enumerate() {
        let mut corner = row[0];
        row[0] = line + 1;
        for (column, against) in other.iter().enumerate() {
            let replaced = corner + usize::from(letter != *against);
            corner = row[column + 1];
            row[column + 1] = replaced.min(row[column] + 1).min(corner + 1);
        }
    }
    row[other.len()]
}
