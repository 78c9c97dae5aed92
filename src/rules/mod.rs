//! Published rules as checks over facts: one file a family, one constant a rule. A rule reads what
//! the plan and, where there is one, the size-up say; it never changes either, and never says that
//! a tree is without danger.

mod approval;
mod back_cut;
mod calls;
mod danger;
mod face;
mod facts;
mod felling_order;
mod first_aid;
mod found;
mod ground;
mod order;
mod positions;
mod power_line;
mod steps;
mod training;
mod ways_out;
mod wedges;
mod words;

pub use facts::{Facts, SizeUp, Told, TreeFacts};
pub use found::Found;
pub use ground::{Spot, turn};
pub use order::Order;
pub use words::{degrees, long, short};

use crate::diagnostic::{Explanation, Finding, RuleRef};
use crate::parts::RuleSet;
use crate::source::{Mark, Source};

/// A rule that computes.
#[derive(Debug, Clone, Copy)]
pub struct Rule {
    /// Its code, unique and never used again.
    pub code: &'static str,
    /// What it is about, in a few words.
    pub title: &'static str,
    /// Why it is there and what it looks at.
    pub explain: &'static str,
    /// Document and paragraph, and how it was taken from there.
    pub source: Source,
    /// The rule set it was written for.
    pub set: &'static str,
    /// Looks at the facts with a set's figures.
    pub run: fn(&Facts<'_>, &RuleSet) -> Vec<Found>,
}

impl Rule {
    /// A rule of the United States logging set.
    const fn us_logging(
        code: &'static str,
        (title, explain): (&'static str, &'static str),
        source: Source,
        run: fn(&Facts<'_>, &RuleSet) -> Vec<Found>,
    ) -> Self {
        Self {
            code,
            title,
            explain,
            source,
            set: "us-logging",
            run,
        }
    }

    /// The rule as the explanation of its code.
    pub const fn explanation(&self) -> Explanation {
        Explanation {
            code: self.code,
            title: self.title,
            text: self.explain,
            source: self.source,
        }
    }
}

/// Every rule, in the order of the codes.
pub const ALL: &[&[Rule]] = &[
    first_aid::RULES,
    calls::RULES,
    training::RULES,
    ways_out::RULES,
    positions::RULES,
    power_line::RULES,
    approval::RULES,
    danger::RULES,
    felling_order::RULES,
    face::RULES,
    back_cut::RULES,
    steps::RULES,
    wedges::RULES,
];

/// A source with its mark.
const fn cite(cite: &'static str, mark: Mark) -> Source {
    Source { cite, mark }
}

/// The rule of a code.
pub fn find(code: &str) -> Option<&'static Rule> {
    every().find(|rule| rule.code == code)
}

/// Every rule.
pub fn every() -> impl Iterator<Item = &'static Rule> {
    ALL.iter().flat_map(|family| family.iter())
}

/// Runs every rule that a set has switched on. Codes the program does not know are passed over;
/// [`unknown_codes`] names them.
pub fn run(facts: &Facts<'_>, set: &RuleSet) -> Vec<Finding> {
    let mut findings = vec![];
    for rule in every() {
        let Some(line) = set.line(rule.code) else {
            continue;
        };
        let reference = RuleRef {
            set: set.set.clone(),
            source: line.source.clone(),
        };
        for found in (rule.run)(facts, set) {
            findings.push(found.into_finding(rule.code, Some(reference.clone())));
        }
    }
    findings
}

/// The codes of a set that name no rule.
pub fn unknown_codes(set: &RuleSet) -> Vec<&str> {
    let codes = set.rules.iter().map(|line| line.code.as_str());
    codes.filter(|code| find(code).is_none()).collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::parts::Parts;

    #[test]
    fn the_built_in_set_and_the_rules_say_the_same_of_their_sources() {
        let parts = Parts::built_in();
        let set = &parts.rule_sets["us-logging"];
        assert_eq!(unknown_codes(set), Vec::<&str>::new());
        for rule in every() {
            let line = set.line(rule.code).unwrap();
            assert_eq!(rule.source.cite, line.source, "{}", rule.code);
            assert_eq!(rule.source.mark, line.mark, "{}", rule.code);
            assert_eq!(rule.set, set.set, "{}", rule.code);
        }
        let codes: Vec<&str> = every().map(|rule| rule.code).collect();
        let mut sorted = codes.clone();
        sorted.sort_unstable();
        sorted.dedup();
        assert_eq!(codes, sorted, "codes are unique and in order");
        assert!(codes.len() >= 18);
    }
}
