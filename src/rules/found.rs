//! What a check found, before it has its code and its rule. It never weighs one finding against
//! another.

use crate::diagnostic::{Finding, Place, RuleRef, Severity};

/// Something found: how much it weighs, where, what and the way out.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Found {
    severity: Severity,
    place: Place,
    path: String,
    message: String,
    help: String,
}

impl Found {
    /// The plan is not to be carried out as it stands.
    pub fn stop(at: (Place, String), message: String, help: &str) -> Self {
        Self::new(Severity::Stop, at, (message, help))
    }

    /// Someone named must look at it.
    pub fn caution(at: (Place, String), message: String, help: &str) -> Self {
        Self::new(Severity::Caution, at, (message, help))
    }

    /// Worth knowing.
    pub fn note(at: (Place, String), message: String, help: &str) -> Self {
        Self::new(Severity::Note, at, (message, help))
    }

    fn new(severity: Severity, at: (Place, String), words: (String, &str)) -> Self {
        Self {
            severity,
            place: at.0,
            path: at.1,
            message: words.0,
            help: words.1.to_owned(),
        }
    }

    /// The finding with its code and the rule that speaks.
    pub fn into_finding(self, code: &'static str, rule: Option<RuleRef>) -> Finding {
        Finding {
            code,
            severity: self.severity,
            message: self.message,
            place: self.place,
            path: self.path,
            rule,
            help: self.help,
        }
    }
}
