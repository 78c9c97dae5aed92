//! Findings as text for people: the line of the plan, the place underlined, the way out.

use annotate_snippets::{AnnotationKind, Level, Renderer, Snippet, renderer::DecorStyle};

use crate::diagnostic::{Count, Finding, Severity, SourceText};

/// Every finding as text, in the order given. Plain characters, no colour.
pub fn render_all(source: &SourceText, findings: &[Finding]) -> String {
    findings
        .iter()
        .map(|finding| render_one(source, finding))
        .collect()
}

/// One line that counts the findings.
pub fn render_summary(source: &SourceText, count: Count) -> String {
    format!(
        "{}: {} to stop for, {} to look at, {} to know\n",
        source.name(),
        count.stop,
        count.caution,
        count.note
    )
}

fn render_one(source: &SourceText, finding: &Finding) -> String {
    let level = match finding.severity {
        Severity::Stop => Level::ERROR.with_name("stop"),
        Severity::Caution => Level::WARNING.with_name("caution"),
        Severity::Note => Level::NOTE.with_name("note"),
    };
    let (start, end) = printable_span(source.text(), finding);
    let title = level.primary_title(&finding.message).id(finding.code);
    let snippet = Snippet::source(source.text())
        .path(source.name())
        .annotation(
            AnnotationKind::Primary
                .span(start..end)
                .label(finding.path.as_str()),
        );
    let mut group = title.element(snippet);
    let rule = finding
        .rule
        .as_ref()
        .map(|rule| format!("{}: {}", rule.set, rule.source));
    if let Some(rule) = &rule {
        group = group.element(Level::NOTE.with_name("rule").message(rule.as_str()));
    }
    if !finding.help.is_empty() {
        group = group.element(
            Level::HELP
                .with_name("way out")
                .message(finding.help.as_str()),
        );
    }
    let renderer = Renderer::plain().decor_style(DecorStyle::Ascii);
    format!("{}\n\n", renderer.render(&[group]))
}

/// A span inside the text, on character borders, at most to the end of its first line.
fn printable_span(text: &str, finding: &Finding) -> (usize, usize) {
    let mut start = finding.place.start.min(text.len());
    while !text.is_char_boundary(start) {
        start -= 1;
    }
    let line_end = text[start..].find('\n').map_or(text.len(), |i| start + i);
    let mut end = finding.place.end.clamp(start, line_end.max(start));
    while !text.is_char_boundary(end) {
        end -= 1;
    }
    (start, end)
}
