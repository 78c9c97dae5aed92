//! A source text with its name, and places in it as byte spans.

/// A span of bytes in a source text, `start..end`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Default)]
pub struct Place {
    /// First byte.
    pub start: usize,
    /// One past the last byte.
    pub end: usize,
}

impl Place {
    /// A span.
    pub const fn new(start: usize, end: usize) -> Self {
        Self { start, end }
    }
}

/// A line and a column, both from 1; columns count characters.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct LineColumn {
    /// Line, from 1.
    pub line: usize,
    /// Column in characters, from 1.
    pub column: usize,
}

/// A text with the name it is shown under.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct SourceText {
    name: String,
    text: String,
    line_starts: Vec<usize>,
}

impl SourceText {
    /// A text under a name, usually the path as typed.
    pub fn new(name: impl Into<String>, text: impl Into<String>) -> Self {
        let text = text.into();
        let mut line_starts = vec![0];
        line_starts.extend(
            text.bytes()
                .enumerate()
                .filter(|(_, b)| *b == b'\n')
                .map(|(i, _)| i + 1),
        );
        Self {
            name: name.into(),
            text,
            line_starts,
        }
    }

    /// The name it is shown under.
    pub fn name(&self) -> &str {
        &self.name
    }

    /// The whole text.
    pub fn text(&self) -> &str {
        &self.text
    }

    /// Line and column of a byte; past the end it is the end.
    pub fn line_column(&self, byte: usize) -> LineColumn {
        let byte = byte.min(self.text.len());
        let line = self.line_starts.partition_point(|start| *start <= byte);
        let start = self.line_starts.get(line - 1).copied().unwrap_or(0);
        let column = self.text.get(start..byte).map_or(0, |s| s.chars().count()) + 1;
        LineColumn { line, column }
    }
}
