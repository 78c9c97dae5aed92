//! Nodes to a plan: one file a part. All findings in one run; a plan comes out only where no
//! finding stops it being read.

mod people;
mod reader;
mod site;
mod steps;
mod trees;
mod values;
mod work;

use std::collections::BTreeSet;

use crate::diagnostic::{Finding, Place, Severity};
use crate::document::{self, Node, NodeKind};
use crate::plan::{DisplayUnits, Plan};
use reader::Reader;

/// What reading a plan gave: a plan where it could be read, and everything found.
#[derive(Debug, Clone, PartialEq)]
pub struct Loaded {
    /// The plan, where nothing in it stops it being understood.
    pub plan: Option<Plan>,
    /// The plan as far as it could be read, to be looked through for more mistakes and never to
    /// be worked from.
    pub partial: Option<Partial>,
    /// Every finding of text and values, in no order.
    pub findings: Vec<Finding>,
}

/// A plan as far as it could be read.
#[derive(Debug, Clone, PartialEq)]
pub struct Partial {
    /// What was read; entries that could not be read whole are left out.
    pub plan: Plan,
    /// Routes whose value is refused already.
    pub spoiled: Vec<String>,
    /// Ids of the entries left out.
    pub unread: BTreeSet<String>,
}

impl Partial {
    /// A plan that was read whole.
    pub const fn whole(plan: Plan) -> Self {
        Self {
            plan,
            spoiled: vec![],
            unread: BTreeSet::new(),
        }
    }

    /// Whether something at or within a route, or around it, is refused already.
    pub fn is_spoiled(&self, route: &str) -> bool {
        self.spoiled
            .iter()
            .any(|spoiled| within(spoiled, route) || within(route, spoiled))
    }

    /// Whether a list has entries whose ids are not known, so that nobody can say which are in it.
    pub fn is_open(&self, list: &str) -> bool {
        self.spoiled.iter().any(|spoiled| {
            let Some(rest) = spoiled.strip_prefix(list) else {
                return false;
            };
            let after_index = rest.split_once(']').map_or(rest, |(_, after)| after);
            after_index.is_empty() || after_index == ".id"
        })
    }
}

/// Whether a route is another one or leads into it.
fn within(inner: &str, outer: &str) -> bool {
    let rest = inner.strip_prefix(outer);
    rest.is_some_and(|rest| rest.is_empty() || rest.starts_with(['.', '[']))
}

/// The keys at the top of a plan.
pub const TOP_KEYS: &[&str] = &[
    "plan",
    "units",
    "job",
    "crew",
    "language",
    "stop_means",
    "signals",
    "parts",
    "tolerances",
    "emergency",
    "limits",
    "saws",
    "site",
    "trees",
];

/// Reads a plan's text, format 1.
pub fn load(text: &str) -> Loaded {
    let document = document::read(text);
    let mut reader = Reader::default();
    let plan = document
        .root
        .as_ref()
        .and_then(|root| top(&mut reader, root, text.len()));
    let mut findings = document.findings;
    findings.extend(reader.findings);
    let readable = findings.iter().all(|f| f.severity != Severity::Stop);
    let partial = plan.map(|plan| Partial {
        plan,
        spoiled: reader.spoiled,
        unread: reader.unread,
    });
    let whole = partial.as_ref().filter(|_| readable);
    Loaded {
        plan: whole.map(|partial| partial.plan.clone()),
        partial,
        findings,
    }
}

fn top(reader: &mut Reader, root: &Node, length: usize) -> Option<Plan> {
    let group = reader.group(root, "", TOP_KEYS)?;
    if !version(reader, &group) {
        return None;
    }
    let units = group.get("units").and_then(|node| {
        reader.word(
            node,
            "units",
            &[("metric", DisplayUnits::Metric), ("us", DisplayUnits::Us)],
        )
    });
    let job = reader
        .need(&group, "job", "{name: …, date: …, leader: …}")
        .and_then(|n| work::job(reader, n));
    let crew = reader
        .need(&group, "crew", "[{id: …, name: …, roles: [leader]}]")
        .map(|n| people::crew(reader, n));
    let saws = group.get("saws").map_or(vec![], |n| work::saws(reader, n));
    let trees = reader
        .need(&group, "trees", "[{id: T1, species: …}]")
        .map(|n| trees::trees(reader, n));
    let signals = signals(reader, &group);
    let tolerances = group
        .get("tolerances")
        .map(|n| work::tolerances(reader, n))
        .unwrap_or_default();
    let limits = group
        .get("limits")
        .map(|n| work::limits(reader, n))
        .unwrap_or_default();
    let emergency = group
        .get("emergency")
        .and_then(|n| people::emergency(reader, n));
    let site = group
        .get("site")
        .map(|n| site::site(reader, n))
        .unwrap_or_default();
    Some(Plan {
        units: units.map_or(DisplayUnits::Metric, |u| u.value),
        language: reader.text_at(&group, "language"),
        stop_means: reader.text_at(&group, "stop_means"),
        parts: reader.text_at(&group, "parts"),
        signals,
        job: job.unwrap_or_else(|| work::no_job(root.place)),
        crew: crew.unwrap_or_default(),
        tolerances,
        emergency,
        limits,
        saws,
        site,
        trees: trees.unwrap_or_default(),
        place: Place::new(length, length),
    })
}

/// Whether the rest can be read: a plan of another format has other keys.
fn version(reader: &mut Reader, group: &reader::Group<'_>) -> bool {
    let Some(node) = reader.need(group, "plan", "1") else {
        return true;
    };
    let known = matches!(&node.kind, NodeKind::Scalar { text, .. } if text == "1");
    if !known {
        let message = "this is not a plan of format 1".to_owned();
        reader.stop(
            "PLAN-13",
            (node.place, "plan"),
            (
                message,
                "write `plan: 1`; this program reads no other format",
            ),
        );
    }
    known
}

fn signals(
    reader: &mut Reader,
    group: &reader::Group<'_>,
) -> Vec<(String, crate::plan::Spanned<String>)> {
    let Some(inner) = group
        .get("signals")
        .and_then(|n| reader.open_group(n, "signals"))
    else {
        return vec![];
    };
    let mut signals = vec![];
    for entry in inner.entries() {
        if let Some(text) = reader.text(&entry.value, &inner.path(&entry.key)) {
            signals.push((entry.key.clone(), text));
        }
    }
    signals
}
