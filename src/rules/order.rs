//! Which tree is down before which, from what the plan writes as `after`. It never makes up an
//! order that is not written.

use std::collections::BTreeMap;

use crate::plan::Tree;

/// The written order of felling.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Order {
    /// By tree: which others are down before it, directly or by others.
    before: Vec<Vec<bool>>,
}

impl Order {
    /// The order that the trees' `after` lists give. Names that are no tree are passed over.
    pub fn new(trees: &[Tree]) -> Self {
        let index: BTreeMap<&str, usize> = trees
            .iter()
            .enumerate()
            .map(|(index, tree)| (tree.id.value.as_str(), index))
            .collect();
        let direct: Vec<Vec<usize>> = trees
            .iter()
            .map(|tree| {
                let named = tree.after.iter().map(|id| index.get(id.value.as_str()));
                named.flatten().copied().collect()
            })
            .collect();
        let before = (0..trees.len())
            .map(|from| reached(from, &direct))
            .collect();
        Self { before }
    }

    /// Whether the tree at `first` is down before the one at `then` is begun.
    pub fn is_before(&self, first: usize, then: usize) -> bool {
        self.before
            .get(then)
            .and_then(|row| row.get(first))
            .copied()
            .unwrap_or(false)
    }

    /// Whether either of two is down before the other.
    pub fn is_ordered(&self, one: usize, other: usize) -> bool {
        self.is_before(one, other) || self.is_before(other, one)
    }
}

fn reached(from: usize, direct: &[Vec<usize>]) -> Vec<bool> {
    let mut seen = vec![false; direct.len()];
    let mut open = direct.get(from).cloned().unwrap_or_default();
    while let Some(next) = open.pop() {
        if let Some(mark) = seen.get_mut(next)
            && !*mark
        {
            *mark = true;
            open.extend(direct.get(next).into_iter().flatten());
        }
    }
    seen
}
