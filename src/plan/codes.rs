//! What each PLAN code means. It never finds anything.

use crate::diagnostic::Explanation;
use crate::source::{Mark, Source};

/// The plan format is this project's own.
const FORMAT: Source = Source {
    cite: "job plan format 1",
    mark: Mark::Judgement,
};

const fn plan(code: &'static str, title: &'static str, text: &'static str) -> Explanation {
    Explanation {
        code,
        title,
        text,
        source: FORMAT,
    }
}

/// Every PLAN code.
pub const EXPLANATIONS: &[Explanation] = &[
    plan(
        "PLAN-01",
        "unknown key",
        "A key the format does not know is never passed over: what was meant by it would be missing without a word. The nearest known key is named; where that one is missing, no second finding says so.",
    ),
    plan(
        "PLAN-02",
        "something missing",
        "The format cannot do without this value. The way out shows an example.",
    ),
    plan(
        "PLAN-03",
        "wrong shape",
        "A single value, a list or a group of keys stands where another of the three belongs.",
    ),
    plan(
        "PLAN-04",
        "number without its unit",
        "A bare number can be read in the wrong unit, and 12 can be inches or centimetres. Every quantity carries its unit.",
    ),
    plan(
        "PLAN-05",
        "unit that does not belong here",
        "The unit is not known, or measures something else than this field holds.",
    ),
    plan(
        "PLAN-06",
        "no number",
        "A finite number belongs here. Words, `nan`, infinities and numbers with leading zeros where whole numbers belong are refused.",
    ),
    plan(
        "PLAN-07",
        "outside what can be meant",
        "The number is outside the range a person could mean in this field: usually the unit or a digit is wrong.",
    ),
    plan(
        "PLAN-08",
        "unknown word",
        "The field takes one of a few words, or an id of letters, digits and hyphens. `true` and `false` are the only words of truth; `yes`, `no`, `on` and `off` are plain texts.",
    ),
    plan(
        "PLAN-09",
        "decimal comma",
        "A comma is a decimal sign in some places and parts thousands in others. A plan uses the point.",
    ),
    plan(
        "PLAN-10",
        "id twice",
        "Two people or two trees with the same id cannot be told apart in the record.",
    ),
    plan(
        "PLAN-11",
        "no bearing",
        "A bearing is degrees clockwise from true north with their unit, from 0 to 360, or a compass word. It has no spread of its own.",
    ),
    plan(
        "PLAN-12",
        "no date",
        "A date is year, month and day, `2026-11-14`, and a day that exists.",
    ),
    plan(
        "PLAN-13",
        "another format",
        "The first key says which format the plan is written in. Keys and meanings of another format are not guessed.",
    ),
    plan(
        "PLAN-14",
        "too many",
        "A plan has at most 2,000 trees, 200 people and 2,000 features. A larger job is several plans.",
    ),
    plan(
        "PLAN-15",
        "step that is not one step",
        "A step written by hand is exactly one cut, check, hold or other work, and a cut stops at exactly one place.",
    ),
];
