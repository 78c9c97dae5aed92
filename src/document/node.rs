//! Nodes: what a YAML text says, with the place of every part.

use crate::diagnostic::Place;

/// A node with its place in the text.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Node {
    /// Where it stands.
    pub place: Place,
    /// What it is.
    pub kind: NodeKind,
}

/// What a node is.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum NodeKind {
    /// A scalar; `plain` where it was written without quotes.
    Scalar {
        /// The text after escapes.
        text: String,
        /// Written without quotes.
        plain: bool,
    },
    /// A list.
    List(Vec<Node>),
    /// A mapping in the order written; keys are unique.
    Map(Vec<Entry>),
    /// Something the format refuses; its finding is made already, so nobody makes another.
    Refused,
}

/// A key with its value.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Entry {
    /// The key's text.
    pub key: String,
    /// Where the key stands.
    pub key_place: Place,
    /// The value.
    pub value: Node,
}

impl Node {
    /// The words for what it is, for messages.
    pub fn describe(&self) -> &'static str {
        match &self.kind {
            NodeKind::Scalar { text, .. } if text.trim().is_empty() => "nothing",
            NodeKind::Scalar { text, plain: true } if text == "~" => "nothing",
            NodeKind::Scalar { .. } => "a single value",
            NodeKind::List(_) => "a list",
            NodeKind::Map(_) => "a group of keys",
            NodeKind::Refused => "something refused",
        }
    }

    /// Whether nothing was written.
    pub fn is_empty(&self) -> bool {
        self.describe() == "nothing"
    }
}
