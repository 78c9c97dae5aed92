//! Where a value comes from and how far to trust it.

/// How a value was taken from its source.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Mark {
    /// Read in the document named.
    Opened,
    /// Computed from opened values, by the derivation named.
    Derived,
    /// Written from memory of the document named, not opened.
    Memory,
    /// A fact of the trade: common practice, no source.
    CommonPractice,
    /// This project's own judgement, settable.
    Judgement,
}

impl Mark {
    /// The word shown beside a value.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Opened => "opened",
            Self::Derived => "derived",
            Self::Memory => "from memory",
            Self::CommonPractice => "common practice, no source",
            Self::Judgement => "our judgement",
        }
    }
}

/// A source: the document with page, table or equation, and the mark of the value.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Source {
    /// Author, year, title, and the table, page or equation.
    pub cite: &'static str,
    /// How the value was taken from it.
    pub mark: Mark,
}
