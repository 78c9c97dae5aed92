//! One finding and the counting of many.

use crate::diagnostic::Place;

/// How much a finding weighs.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Severity {
    /// The plan is not to be carried out as it stands.
    Stop,
    /// Someone named must look at it.
    Caution,
    /// Worth knowing.
    Note,
}

impl Severity {
    /// The word in the output.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Stop => "stop",
            Self::Caution => "caution",
            Self::Note => "note",
        }
    }
}

/// The published rule that speaks.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct RuleRef {
    /// The rule set's name, such as `us-logging`.
    pub set: String,
    /// Document and paragraph.
    pub source: String,
}

/// Something found in a plan: what, where, and the way out.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Finding {
    /// Stable code, never reused.
    pub code: &'static str,
    /// How much it weighs.
    pub severity: Severity,
    /// What is wrong and what was expected.
    pub message: String,
    /// Where in the text; the whole file where it is about something missing at the top.
    pub place: Place,
    /// The route to the value, such as `trees[0].face.depth`.
    pub path: String,
    /// The rule that speaks, where one does.
    pub rule: Option<RuleRef>,
    /// The way out: what to type or do.
    pub help: String,
}

/// How many findings of each severity.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct Count {
    /// Stop findings.
    pub stop: usize,
    /// Caution findings.
    pub caution: usize,
    /// Note findings.
    pub note: usize,
}

/// Counts findings by severity.
pub fn count(findings: &[Finding]) -> Count {
    let of = |severity| findings.iter().filter(|f| f.severity == severity).count();
    Count {
        stop: of(Severity::Stop),
        caution: of(Severity::Caution),
        note: of(Severity::Note),
    }
}

/// Puts findings in the order of their places, then of their codes.
pub fn sort(findings: &mut [Finding]) {
    findings.sort_by(|a, b| (a.place, a.code, &a.message).cmp(&(b.place, b.code, &b.message)));
}
