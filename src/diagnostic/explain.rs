//! What a code means: one entry a code, kept in the room that finds it. It never decides whether
//! a plan has the finding.

use crate::source::Source;

/// The explanation of one code.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Explanation {
    /// The code, never reused.
    pub code: &'static str,
    /// What it is about, in a few words.
    pub title: &'static str,
    /// Why it matters and what is expected.
    pub text: &'static str,
    /// What it rests on.
    pub source: Source,
}
