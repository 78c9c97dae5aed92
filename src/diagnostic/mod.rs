//! Findings: data with a code, a severity, a place and a way out. This room turns them into
//! words and never decides what is wrong.

mod explain;
mod finding;
mod render;
mod text;

pub use explain::Explanation;
pub use finding::{Count, Finding, RuleRef, Severity, count, sort};
pub use render::{render_all, render_summary};
pub use text::{LineColumn, Place, SourceText};
