//! YAML text to nodes with places, with every refusal of the format collected in one pass.
//! The only room that knows the YAML crate; it knows nothing of plans.

mod codes;
mod node;
mod read;
mod refuse;

pub use codes::EXPLANATIONS;
pub use node::{Entry, Node, NodeKind};
pub use read::{Document, LIMIT_BYTES, MERGE, NoText, read, read_part, text_of};
