//! One tree and the whole site: figures, method and findings together.

mod inputs;
mod sized;

use crate::diagnostic::Finding;
use crate::plan::Plan;

pub use inputs::{Since, distance, tree_input};
pub use sized::{SizedTree, size_up};

/// Every finding about a plan's values against each other, the trees and the rules.
pub fn findings(_plan: &Plan) -> Vec<Finding> {
    vec![]
}
