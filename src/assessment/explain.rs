//! Every code of every room with its explanation, for whoever asks why. It explains nothing that
//! its room does not.

use crate::diagnostic::Explanation;
use crate::{document, plan, rules};

/// A code with its explanation and, of a rule, its rule set.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Explained {
    /// The explanation.
    pub explanation: Explanation,
    /// The rule set, where a published rule speaks.
    pub set: Option<&'static str>,
}

/// Every code, room by room.
pub fn all_explanations() -> Vec<Explained> {
    let own = [
        document::EXPLANATIONS,
        plan::EXPLANATIONS,
        super::EXPLANATIONS,
    ];
    let own = own.into_iter().flatten().map(|explanation| Explained {
        explanation: *explanation,
        set: None,
    });
    let published = rules::every().map(|rule| Explained {
        explanation: rule.explanation(),
        set: Some(rule.set),
    });
    own.chain(published).collect()
}
