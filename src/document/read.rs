//! Walks the parser's events into nodes and collects what the format refuses.

use serde_yaml::granit_parser::{self, Event, Options, Parser, ScalarStyle, Span};

use super::node::{Entry, Node, NodeKind};
use super::refuse::{escaped, hidden_characters, is_hidden, refuse};
use crate::diagnostic::{Finding, Place};

/// The largest plan text, in bytes (4 MiB).
pub const LIMIT_BYTES: usize = 4 * 1024 * 1024;
const LIMIT_LEVELS: usize = 64;
const LIMIT_NODES: usize = 1_000_000;
/// The key YAML 1.1 merged groups with.
pub const MERGE: &str = "<<";

/// What was read: a root where the text has one, and every refusal.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Document {
    /// The first document's root node.
    pub root: Option<Node>,
    /// Every refusal, in the order found.
    pub findings: Vec<Finding>,
}

/// Reads a YAML text. Refused: anchors, aliases, merge keys, tags, directives, several documents,
/// duplicate keys, keys that are no single value, hidden characters, texts past a limit. A syntax
/// error ends the reading at its place.
pub fn read(text: &str) -> Document {
    if text.len() > LIMIT_BYTES {
        return Document::refused(too_long());
    }
    let mut walk = Walk::new(text);
    walk.findings.extend(hidden_characters(text));
    let options: Options = granit_parser::options! {
        strict_indentation: true,
        emit_anchor_events: true,
        emit_unresolved_aliases: true,
        emit_comments: false,
        flow_nesting_limit: LIMIT_LEVELS,
        block_nesting_limit: LIMIT_LEVELS,
    };
    let mut parser = Parser::new_from_str_with_options(text, options);
    while let Some(event) = parser.next_event() {
        match event {
            Ok((event, span)) => walk.take(event, span),
            Err(error) => {
                walk.syntax(&error);
                break;
            }
        }
        if walk.nodes > LIMIT_NODES {
            let message = format!("the text has more than {LIMIT_NODES} values");
            let end = Place::new(text.len(), text.len());
            walk.findings.push(refuse(
                "TEXT-09",
                end,
                message,
                "split the job into several plans",
            ));
            walk.root = None;
            break;
        }
    }
    walk.finish()
}

/// Bytes that are no text a plan could be in.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct NoText {
    /// As much as can be shown with the finding.
    pub shown: String,
    /// What is wrong.
    pub finding: Finding,
}

/// The text of a file's bytes.
///
/// # Errors
/// [`NoText`] for bytes that are past the limit or are no UTF-8 text.
pub fn text_of(bytes: &[u8]) -> Result<String, Box<NoText>> {
    if bytes.len() > LIMIT_BYTES {
        return Err(Box::new(NoText {
            shown: String::new(),
            finding: too_long(),
        }));
    }
    String::from_utf8(bytes.to_vec()).map_err(|error| {
        let from = error.utf8_error().valid_up_to();
        let shown = String::from_utf8_lossy(bytes).into_owned();
        let place = Place::new(from, from + '\u{fffd}'.len_utf8());
        let message = "the bytes from here on are not UTF-8 text".to_owned();
        let help = "save the file again as UTF-8; if it is no text at all, it is the wrong file";
        let finding = refuse("TEXT-01", place, message, help);
        Box::new(NoText { shown, finding })
    })
}

fn too_long() -> Finding {
    let message = format!("the file is longer than the {LIMIT_BYTES} bytes that are read");
    let help = "split the job into several plans";
    refuse("TEXT-09", Place::new(0, 0), message, help)
}

impl Document {
    fn refused(finding: Finding) -> Self {
        Self {
            root: None,
            findings: vec![finding],
        }
    }
}

struct Walk<'a> {
    text: &'a str,
    root: Option<Node>,
    open: Vec<Open>,
    documents: usize,
    nodes: usize,
    findings: Vec<Finding>,
}

/// A list or mapping being filled.
enum Open {
    List {
        start: usize,
        items: Vec<Node>,
    },
    Map {
        start: usize,
        entries: Vec<Entry>,
        /// The key whose value comes next; its name is missing where it was refused.
        key: Option<(Option<String>, Place)>,
    },
}

impl<'a> Walk<'a> {
    fn new(text: &'a str) -> Self {
        Self {
            text,
            root: None,
            open: vec![],
            documents: 0,
            nodes: 0,
            findings: vec![],
        }
    }

    fn place(&self, span: Span) -> Place {
        let range = span.byte_range().unwrap_or(0..0);
        let end = range.end.min(self.text.len());
        let start = range.start.min(end);
        let trimmed = self
            .text
            .get(start..end)
            .map_or(end, |s| start + s.trim_end().len());
        Place::new(start, trimmed.max(start))
    }

    fn syntax(&mut self, error: &granit_parser::ScanError) {
        let byte = error
            .marker()
            .byte_offset()
            .unwrap_or(0)
            .min(self.text.len());
        self.root = None;
        self.open.clear();
        if self.hidden_before(byte) {
            // The hidden character on this line is what the parser stumbled over.
            return;
        }
        if error.info().contains("recursion limit") {
            let message = format!("more than {LIMIT_LEVELS} levels stand inside each other");
            let help = "a plan has at most six; look for brackets that are not closed";
            let place = Place::new(byte, byte + 1);
            self.findings.push(refuse("TEXT-09", place, message, help));
            return;
        }
        let message = format!("this is not readable as YAML: {}", error.info());
        let help = "look at this line and the one above: indentation by spaces, `key: value`, \
                    brackets closed, text with `: ` or `#` in quotes";
        self.findings
            .push(refuse("TEXT-03", Place::new(byte, byte + 1), message, help));
    }

    /// Whether a hidden character was found on the line of a byte, up to just past it.
    fn hidden_before(&self, byte: usize) -> bool {
        let line = self.text.get(..byte).unwrap_or("");
        let start = line.rfind('\n').map_or(0, |at| at + 1);
        self.findings.iter().any(|finding| {
            finding.code == "TEXT-02" && (start..=byte + 1).contains(&finding.place.start)
        })
    }

    fn take(&mut self, event: Event<'_>, span: Span) {
        let place = self.place(span);
        match event {
            Event::DocumentStart(_, version) => self.document_start(version.is_some(), place),
            Event::Scalar(text, style, _, tag) => {
                if tag.is_some() {
                    self.tag(place);
                }
                let refused = tag.is_some() || self.hides(&text, place);
                let kind = if refused {
                    NodeKind::Refused
                } else {
                    NodeKind::Scalar {
                        text: text.into_owned(),
                        plain: style == ScalarStyle::Plain,
                    }
                };
                self.node(Node { place, kind });
            }
            Event::SequenceStart(_, _, tag) => {
                if tag.is_some() {
                    self.tag(place);
                }
                self.start(Open::List {
                    start: place.start,
                    items: vec![],
                });
            }
            Event::MappingStart(_, _, tag) => {
                if tag.is_some() {
                    self.tag(place);
                }
                self.start(Open::Map {
                    start: place.start,
                    entries: vec![],
                    key: None,
                });
            }
            Event::SequenceEnd | Event::MappingEnd => self.end(place),
            Event::Anchor(_, name) => self.anchor(&name, place),
            Event::Alias(_) => self.alias(place),
            Event::UnresolvedAlias(_) => self.alias(place),
            Event::StreamStart | Event::StreamEnd | Event::DocumentEnd | _ => {}
        }
    }

    /// Whether a value has a hidden character in it, typed or written as an escape.
    fn hides(&mut self, text: &str, place: Place) -> bool {
        let Some(hidden) = text.chars().find(|c| is_hidden(*c)) else {
            return false;
        };
        let within = |f: &Finding| (place.start..place.end).contains(&f.place.start);
        let said = self
            .findings
            .iter()
            .any(|f| f.code == "TEXT-02" && within(f));
        if !said {
            self.findings.push(escaped(hidden, place));
        }
        true
    }

    fn document_start(&mut self, versioned: bool, place: Place) {
        self.documents += 1;
        if versioned {
            let message = "a `%YAML` directive is not used in plans".to_owned();
            self.findings.push(refuse(
                "TEXT-08",
                place,
                message,
                "delete the directive line",
            ));
        }
        if self.documents == 2 {
            let message = "a second document begins here; a plan is one document".to_owned();
            let help = "delete the `---` line, or put the second part in a file of its own";
            self.findings.push(refuse("TEXT-07", place, message, help));
        }
    }

    fn tag(&mut self, place: Place) {
        let message = "tags (`!name`) are not used in plans".to_owned();
        self.findings.push(refuse(
            "TEXT-06",
            place,
            message,
            "write the value without the tag",
        ));
    }

    fn anchor(&mut self, name: &str, place: Place) {
        let message = format!("anchors (`&{name}`) are not used in plans");
        let help = "write the values out where they belong, so that each has its own place";
        self.findings.push(refuse("TEXT-05", place, message, help));
    }

    fn alias(&mut self, place: Place) {
        let refused = Node {
            place,
            kind: NodeKind::Refused,
        };
        if let Some(Open::Map {
            key: Some((name, _)),
            ..
        }) = self.open.last()
            && name.as_deref() == Some(MERGE)
        {
            // The merge key's own finding says it all.
            return self.node(refused);
        }
        let message = "aliases (`*name`) are not used in plans".to_owned();
        let help = "write the values out where they belong, so that each has its own place";
        self.findings.push(refuse("TEXT-05", place, message, help));
        self.node(refused);
    }

    fn start(&mut self, open: Open) {
        if let Some(Open::Map { key: None, .. }) = self.open.last() {
            let message = "a key must be a single word, not a list or a group".to_owned();
            let start = match &open {
                Open::List { start, .. } | Open::Map { start, .. } => *start,
            };
            let place = Place::new(start, start + 1);
            self.findings
                .push(refuse("TEXT-11", place, message, "write `key: value`"));
        }
        self.open.push(open);
    }

    fn end(&mut self, place: Place) {
        let end = place.end;
        let node = match self.open.pop() {
            Some(Open::List { start, items }) => {
                let end = end.max(items.last().map_or(start, |n| n.place.end));
                Node {
                    place: Place::new(start, end),
                    kind: NodeKind::List(items),
                }
            }
            Some(Open::Map { start, entries, .. }) => {
                let end = end.max(entries.last().map_or(start, |e| e.value.place.end));
                Node {
                    place: Place::new(start, end),
                    kind: NodeKind::Map(entries),
                }
            }
            None => return,
        };
        self.node(node);
    }

    fn node(&mut self, node: Node) {
        self.nodes += 1;
        match self.open.last_mut() {
            None => {
                if self.documents <= 1 {
                    self.root = Some(node);
                }
            }
            Some(Open::List { items, .. }) => items.push(node),
            Some(Open::Map { entries, key, .. }) => match key.take() {
                None => *key = Some(key_of(&node)),
                // A refused key stays as a merge key does: whoever reads the group knows that it is
                // not whole.
                Some((None, key_place)) => {
                    let key = MERGE.to_owned();
                    let value = node;
                    if !entries.iter().any(|e| e.key == key) {
                        entries.push(Entry {
                            key,
                            key_place,
                            value,
                        });
                    }
                }
                Some((Some(name), key_place)) => {
                    if let Some(finding) = refused_key(&name, key_place, entries) {
                        self.findings.push(finding);
                    }
                    // A merge key stays, so that whoever reads the group knows it is not whole.
                    if !entries.iter().any(|e| e.key == name) {
                        entries.push(Entry {
                            key: name,
                            key_place,
                            value: node,
                        });
                    }
                }
            },
        }
    }

    fn finish(mut self) -> Document {
        let empty = self.root.as_ref().is_none_or(Node::is_empty);
        if empty && self.findings.is_empty() {
            let message = "the file holds no plan".to_owned();
            let help = "a plan begins with `plan: 1`";
            self.findings
                .push(refuse("TEXT-10", Place::new(0, 0), message, help));
        }
        Document {
            root: self.root.filter(|r| !r.is_empty()),
            findings: self.findings,
        }
    }
}

fn key_of(node: &Node) -> (Option<String>, Place) {
    match &node.kind {
        NodeKind::Scalar { text, .. } => (Some(text.clone()), node.place),
        NodeKind::List(_) | NodeKind::Map(_) | NodeKind::Refused => (None, node.place),
    }
}

/// A duplicate or merge key is refused; the first value stands.
fn refused_key(name: &str, place: Place, entries: &[Entry]) -> Option<Finding> {
    if name == MERGE {
        let message = "merge keys (`<<`) are not used in plans".to_owned();
        return Some(refuse("TEXT-05", place, message, "write the keys out"));
    }
    entries.iter().find(|e| e.key == name).map(|_| {
        let message = format!("the key `{name}` stands twice in this group");
        refuse(
            "TEXT-04",
            place,
            message,
            "keep one of the two and delete the other",
        )
    })
}

/// Reads one of the program's own parts into its type. Plans never come this way.
///
/// # Errors
/// The reader's own words, with line and column.
pub fn read_part<T: serde::de::DeserializeOwned>(text: &str) -> Result<T, String> {
    serde_yaml::from_str(text).map_err(|error| error.to_string())
}
