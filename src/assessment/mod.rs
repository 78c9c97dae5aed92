//! One tree and the whole site: figures, method and findings together.

use crate::diagnostic::Finding;
use crate::plan::Plan;

/// Every finding about a plan's values against each other, the trees and the rules.
pub fn findings(_plan: &Plan) -> Vec<Finding> {
    vec![]
}
