//! YAML text to nodes with places, with every refusal of the format collected in one pass.
//! The only room that knows the YAML crate; it knows nothing of plans.

mod node;
mod read;
mod refuse;

pub use node::{Entry, Node, NodeKind};
pub use read::{Document, LIMIT_BYTES, read, read_part};
