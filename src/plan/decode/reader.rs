//! The small tools every decoder uses: groups of keys, lists, texts, words. Each one turns a
//! mistake into one finding with its place and its way out, and goes on. It never guesses a value.

use std::collections::BTreeSet;

use crate::diagnostic::{Finding, Place, Severity};
use crate::document::{Entry, MERGE, Node, NodeKind};
use crate::plan::Spanned;
use crate::plan::nearest::{nearest, slip_of};

/// Collects findings while decoding.
#[derive(Debug, Default)]
pub(super) struct Reader {
    /// What was found so far.
    pub(super) findings: Vec<Finding>,
    /// Routes whose value is refused, so that nobody says anything more about them.
    pub(super) spoiled: Vec<String>,
    /// Ids of entries that could not be read whole.
    pub(super) unread: BTreeSet<String>,
}

/// A group of keys with its route.
#[derive(Debug, Clone)]
pub(super) struct Group<'a> {
    entries: &'a [Entry],
    /// Missing keys that an unknown key was meant for; no second finding says they are missing.
    meant: Vec<&'static str>,
    /// The route to the group, empty at the top.
    pub(super) route: String,
    /// Where the group stands.
    pub(super) place: Place,
}

impl<'a> Group<'a> {
    /// The value under a key; nothing where the key is missing.
    pub(super) fn get(&self, key: &str) -> Option<&'a Node> {
        self.entries.iter().find(|e| e.key == key).map(|e| &e.value)
    }

    /// Whether a key is missing without a finding of its own having said so.
    pub(super) fn lacks(&self, key: &str) -> bool {
        let spoken_for = self.meant.contains(&key) || self.get(MERGE).is_some();
        self.get(key).is_none_or(Node::is_empty) && !spoken_for
    }

    /// The route of a key in this group.
    pub(super) fn path(&self, key: &str) -> String {
        if self.route.is_empty() {
            key.to_owned()
        } else {
            format!("{}.{key}", self.route)
        }
    }

    /// The entries, for groups whose keys are the author's own.
    pub(super) fn entries(&self) -> &'a [Entry] {
        self.entries
    }
}

impl Reader {
    /// Adds a stop finding.
    pub(super) fn stop(&mut self, code: &'static str, at: (Place, &str), words: (String, &str)) {
        self.spoiled.push(at.1.to_owned());
        self.findings.push(Finding {
            code,
            severity: Severity::Stop,
            message: words.0,
            place: at.0,
            path: at.1.to_owned(),
            rule: None,
            help: words.1.to_owned(),
        });
    }

    /// Keeps the id of an entry that could not be read whole, so that whoever names it is not
    /// told that it does not exist.
    pub(super) fn whole_or_unread(&mut self, id: Option<&Spanned<String>>, whole: bool) {
        if let (Some(id), false) = (id, whole) {
            self.unread.insert(id.value.clone());
        }
    }

    /// A group whose keys are known; unknown ones become findings that name the nearest.
    pub(super) fn group<'a>(
        &mut self,
        node: &'a Node,
        route: &str,
        known: &[&'static str],
    ) -> Option<Group<'a>> {
        let mut group = self.open_group(node, route)?;
        for entry in group.entries {
            if entry.key == MERGE || known.contains(&entry.key.as_str()) {
                continue;
            }
            let missing = known.iter().copied().filter(|k| group.get(k).is_none());
            let meant = slip_of(&entry.key, missing);
            let near = meant.or_else(|| nearest(&entry.key, known.iter().copied()));
            if let Some(meant) = meant {
                self.spoiled.push(group.path(meant));
                group.meant.push(meant);
            }
            let message = format!("the key `{}` is not known here", entry.key);
            let help = match near {
                Some(near) => format!("did you mean `{near}`? Known keys: {}", known.join(", ")),
                None => format!("known keys: {}", known.join(", ")),
            };
            let path = group.path(&entry.key);
            self.stop("PLAN-01", (entry.key_place, &path), (message, &help));
        }
        Some(group)
    }

    /// A group whose keys are the author's own.
    pub(super) fn open_group<'a>(&mut self, node: &'a Node, route: &str) -> Option<Group<'a>> {
        match &node.kind {
            NodeKind::Map(entries) => Some(Group {
                entries,
                meant: vec![],
                route: route.to_owned(),
                place: node.place,
            }),
            NodeKind::Scalar { .. } | NodeKind::List(_) | NodeKind::Refused => {
                self.shape(node, route, "a group of keys, such as `{key: value}`");
                None
            }
        }
    }

    /// The value under a key that must be there.
    pub(super) fn need<'a>(
        &mut self,
        group: &Group<'a>,
        key: &str,
        example: &str,
    ) -> Option<&'a Node> {
        if group.lacks(key) {
            let message = format!("`{key}` is missing");
            let place = group
                .get(key)
                .map_or(Place::new(group.place.start, group.place.start + 1), |n| {
                    n.place
                });
            self.stop(
                "PLAN-02",
                (place, &group.path(key)),
                (message, &format!("add `{key}: {example}`")),
            );
        }
        let node = group.get(key).filter(|n| !n.is_empty());
        if node.is_none() {
            self.spoiled.push(group.path(key));
        }
        node
    }

    /// A list.
    pub(super) fn list<'a>(&mut self, node: &'a Node, route: &str) -> &'a [Node] {
        match &node.kind {
            NodeKind::List(items) => items,
            NodeKind::Scalar { .. } | NodeKind::Map(_) | NodeKind::Refused => {
                self.shape(node, route, "a list, such as `[one, two]`");
                &[]
            }
        }
    }

    /// A text; empty ones are refused.
    pub(super) fn text(&mut self, node: &Node, route: &str) -> Option<Spanned<String>> {
        match &node.kind {
            NodeKind::Scalar { text, .. } if !node.is_empty() && !text.trim().is_empty() => {
                Some(Spanned {
                    value: text.trim().to_owned(),
                    place: node.place,
                })
            }
            NodeKind::Scalar { .. } | NodeKind::List(_) | NodeKind::Map(_) | NodeKind::Refused => {
                self.shape(node, route, "a text");
                None
            }
        }
    }

    /// An optional text under a key.
    pub(super) fn text_at(&mut self, group: &Group<'_>, key: &str) -> Option<Spanned<String>> {
        let node = group.get(key)?;
        self.text(node, &group.path(key))
    }

    /// A list of texts under a key.
    pub(super) fn texts_at(&mut self, group: &Group<'_>, key: &str) -> Vec<Spanned<String>> {
        let Some(node) = group.get(key) else {
            return vec![];
        };
        let route = group.path(key);
        let items = self.list(node, &route);
        let mut texts = vec![];
        for (index, item) in items.iter().enumerate() {
            texts.extend(self.text(item, &format!("{route}[{index}]")));
        }
        texts
    }

    /// One of a set of words.
    pub(super) fn word<T: Copy>(
        &mut self,
        node: &Node,
        route: &str,
        words: &[(&'static str, T)],
    ) -> Option<Spanned<T>> {
        let text = self.text(node, route)?;
        if let Some((_, value)) = words.iter().find(|(word, _)| *word == text.value) {
            return Some(Spanned {
                value: *value,
                place: text.place,
            });
        }
        let all: Vec<&str> = words.iter().map(|(word, _)| *word).collect();
        let message = format!("`{}` is not one of the words known here", text.value);
        let help = match nearest(&text.value, all.iter().copied()) {
            Some(near) => format!("did you mean `{near}`? Words: {}", all.join(", ")),
            None => format!("words: {}", all.join(", ")),
        };
        self.stop("PLAN-08", (text.place, route), (message, &help));
        None
    }

    /// A value of the wrong shape. What the text's own rules refused is passed over in silence.
    pub(super) fn shape(&mut self, node: &Node, route: &str, wanted: &str) {
        if node.kind == NodeKind::Refused {
            self.spoiled.push(route.to_owned());
            return;
        }
        if node.is_empty() {
            let message = "nothing is written behind this key".to_owned();
            let help = format!("write {wanted}, or delete the key");
            return self.stop("PLAN-02", (node.place, route), (message, &help));
        }
        let message = format!("{} stands here; expected {wanted}", node.describe());
        self.stop(
            "PLAN-03",
            (node.place, route),
            (
                message,
                "write it in the form shown in the README's plan table",
            ),
        );
    }
}

/// The text of a scalar, empty for anything else.
pub(super) fn scalar(node: &Node) -> &str {
    match &node.kind {
        NodeKind::Scalar { text, .. } => text,
        NodeKind::List(_) | NodeKind::Map(_) | NodeKind::Refused => "",
    }
}
