//! What each TEXT code means. It never finds anything.

use crate::diagnostic::Explanation;
use crate::source::{Mark, Source};

/// The plan format is this project's own; YAML is an open standard.
const FORMAT: Source = Source {
    cite: "job plan format 1; YAML 1.2.2, core schema",
    mark: Mark::Judgement,
};

const fn text(code: &'static str, title: &'static str, text: &'static str) -> Explanation {
    Explanation {
        code,
        title,
        text,
        source: FORMAT,
    }
}

/// Every TEXT code.
pub const EXPLANATIONS: &[Explanation] = &[
    text(
        "TEXT-01",
        "not UTF-8",
        "A plan is UTF-8 text. Bytes that are not can stand for different signs on different machines, so nothing of the file is used.",
    ),
    text(
        "TEXT-02",
        "hidden character",
        "A control, bidirectional or zero-width character can make a line read differently from what it says. A crew must see what the program reads, so each one is refused.",
    ),
    text(
        "TEXT-03",
        "not readable as YAML",
        "The text breaks YAML's own rules at this place, so what follows cannot be read. Usual causes: a tab in the indentation, a bracket or quote left open, a colon in a text without quotes.",
    ),
    text(
        "TEXT-04",
        "key twice",
        "A key that stands twice in a group has two values, and nobody can say which was meant. The first is used to look for more mistakes.",
    ),
    text(
        "TEXT-05",
        "anchor, alias or merge key",
        "A value written in one place and used in another cannot be read where it counts, and a change to it changes trees nobody is looking at. Each value stands where it belongs.",
    ),
    text(
        "TEXT-06",
        "tag",
        "Tags change what a value means. A plan has quantities, words and texts only, and each field knows which.",
    ),
    text(
        "TEXT-07",
        "second document",
        "A file holds one plan. A second part after a `---` line could be overlooked by people and by programs.",
    ),
    text(
        "TEXT-08",
        "directive",
        "`%` lines change how the text is read; a plan has none.",
    ),
    text(
        "TEXT-09",
        "past a limit of size",
        "A plan has at most 4 MiB, a million values and 64 levels. Past that it is no plan that a crew reads.",
    ),
    text(
        "TEXT-10",
        "nothing in the file",
        "The file holds no plan: it is empty or has comments only.",
    ),
    text(
        "TEXT-11",
        "key that is no word",
        "A key is a single word. A list or a group as a key is YAML, but no plan.",
    ),
];
