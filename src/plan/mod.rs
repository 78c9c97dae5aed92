//! The job plan: YAML nodes with places in, typed values with places out. The room owns the step
//! and cut types; it never checks one value against another and never opens a file.

mod codes;
mod decode;
pub mod fields;
mod ground;
mod model;
mod nearest;
pub mod quantity;
pub mod step;
mod tree;

pub use codes::EXPLANATIONS;
pub use decode::{Loaded, Partial, TOP_KEYS, load};
pub use ground::*;
pub use model::*;
pub use nearest::nearest;
pub use tree::*;
