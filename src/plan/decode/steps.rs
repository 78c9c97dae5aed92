//! Steps written by hand.

use super::reader::{Group, Reader};
use crate::document::Node;
use crate::plan::Spanned;
use crate::plan::step::{Cut, Edge, Step, StepAct, Task, Timing};
use crate::units::{Duration, Length};

const KNOWN: &[&str] = &[
    "cut",
    "check",
    "hold",
    "do",
    "depth",
    "opening",
    "from_hinge",
    "from_rear",
    "to_hinge",
    "to_rear",
    "hinge",
    "width",
    "tilt",
    "timing",
    "seconds",
    "note",
];

const KINDS: [&str; 4] = ["cut", "check", "hold", "do"];

#[derive(Clone, Copy)]
enum Word {
    FaceSlope,
    FaceFloor,
    Plunge,
    HingeTrim,
    BackCut,
    TiltedBackCut,
    ReliefLeft,
    ReliefRight,
    StrapRelease,
}

const CUTS: &[(&str, Word)] = &[
    ("face-slope", Word::FaceSlope),
    ("face-floor", Word::FaceFloor),
    ("plunge", Word::Plunge),
    ("hinge-trim", Word::HingeTrim),
    ("back-cut", Word::BackCut),
    ("tilted-back-cut", Word::TiltedBackCut),
    ("relief-left", Word::ReliefLeft),
    ("relief-right", Word::ReliefRight),
    ("strap-release", Word::StrapRelease),
];

/// At most this many steps at a tree.
const LIMIT_STEPS: usize = 40;

pub(super) fn steps(reader: &mut Reader, node: &Node, route: &str) -> Vec<Spanned<Step>> {
    let mut steps = vec![];
    let count = reader.list(node, route).len();
    if count > LIMIT_STEPS {
        let message = format!("{count} steps stand here; at most {LIMIT_STEPS} are read");
        reader.stop(
            "PLAN-14",
            (node.place, route),
            (
                message,
                "a crew keeps no more in mind: write the sequence shorter",
            ),
        );
        return steps;
    }
    for (index, item) in reader.list(node, route).iter().enumerate() {
        let route = format!("{route}[{index}]");
        if let Some(value) = step(reader, item, &route) {
            steps.push(Spanned {
                value,
                place: item.place,
            });
        }
    }
    steps
}

fn step(reader: &mut Reader, node: &Node, route: &str) -> Option<Step> {
    let group = reader.group(node, route, KNOWN)?;
    let kinds: Vec<&str> = KINDS
        .into_iter()
        .filter(|k| group.get(k).is_some())
        .collect();
    let [kind] = kinds.as_slice() else {
        if !KINDS.iter().all(|k| group.lacks(k)) && kinds.is_empty() {
            return None;
        }
        let message = "a step is one of `cut`, `check`, `hold` and `do`".to_owned();
        reader.stop(
            "PLAN-15",
            (group.place, route),
            (message, "write exactly one of the four"),
        );
        return None;
    };
    let act = match *kind {
        "cut" => StepAct::Cut(cut(reader, &group)?),
        "check" => StepAct::Check {
            what: reader.text_at(&group, "check")?.value,
        },
        "hold" => StepAct::Hold {
            who: reader
                .texts_at(&group, "hold")
                .into_iter()
                .map(|w| w.value)
                .collect(),
        },
        _ => StepAct::Do(task(reader, &group)?),
    };
    let timing = group.get("timing").and_then(|n| {
        let words = [
            ("at leisure", Timing::AtLeisure),
            ("brisk", Timing::Brisk),
            ("hold", Timing::Hold),
        ];
        reader.word(n, &group.path("timing"), &words)
    });
    let seconds = reader.quantity_at::<Duration>(&group, "seconds", "trees[].steps[].seconds");
    let note = reader.text_at(&group, "note").map(|n| n.value);
    Some(Step {
        act,
        timing: timing.map_or(Timing::AtLeisure, |t| t.value),
        seconds: seconds.map(|s| s.value()),
        note,
    })
}

fn task(reader: &mut Reader, group: &Group<'_>) -> Option<Task> {
    let words = [
        ("wedge", Task::Wedge),
        ("clear", Task::Clear),
        ("line-tension", Task::LineTension),
        ("retreat", Task::Retreat),
    ];
    let node = group.get("do")?;
    reader
        .word(node, &group.path("do"), &words)
        .map(|w| w.value)
}

fn cut(reader: &mut Reader, group: &Group<'_>) -> Option<Cut> {
    let node = group.get("cut")?;
    let word = reader.word(node, &group.path("cut"), CUTS)?.value;
    match word {
        Word::FaceSlope => {
            let depth = length(reader, group, "depth");
            let opening = reader.need(group, "opening", "70 deg").and_then(|n| {
                reader.quantity(n, &group.path("opening"), "trees[].steps[].opening")
            });
            Some(Cut::FaceSlope {
                depth: depth?,
                opening: opening?.value(),
            })
        }
        Word::FaceFloor => Some(Cut::FaceFloor {
            depth: length(reader, group, "depth")?,
        }),
        Word::Plunge => {
            let front = length(reader, group, "from_hinge");
            let rear = length(reader, group, "from_rear");
            Some(Cut::Plunge {
                front: Edge::FromHinge(front?),
                rear: Edge::FromRear(rear?),
            })
        }
        Word::HingeTrim => Some(Cut::HingeTrim {
            hinge: length(reader, group, "hinge")?,
        }),
        Word::BackCut => Some(Cut::BackCut {
            to: edge(reader, group)?,
        }),
        Word::TiltedBackCut => {
            let to = edge(reader, group);
            let tilt = reader
                .need(group, "tilt", "20 deg")
                .and_then(|n| reader.quantity(n, &group.path("tilt"), "trees[].steps[].tilt"));
            Some(Cut::TiltedBackCut {
                to: to?,
                tilt: tilt?.value(),
            })
        }
        Word::ReliefLeft => {
            let width = length(reader, group, "width");
            let to = edge(reader, group);
            Some(Cut::ReliefLeft {
                width: width?,
                to: to?,
            })
        }
        Word::ReliefRight => {
            let width = length(reader, group, "width");
            let to = edge(reader, group);
            Some(Cut::ReliefRight {
                width: width?,
                to: to?,
            })
        }
        Word::StrapRelease => Some(Cut::StrapRelease),
    }
}

fn length(reader: &mut Reader, group: &Group<'_>, key: &str) -> Option<Length> {
    let node = reader.need(group, key, "5 cm")?;
    let row = format!("trees[].steps[].{key}");
    reader
        .quantity(node, &group.path(key), &row)
        .map(|q| q.value())
}

/// Where a cut stops: `to_hinge` behind the face's apex, or `to_rear` from the rearmost wood.
fn edge(reader: &mut Reader, group: &Group<'_>) -> Option<Edge> {
    match (group.get("to_hinge"), group.get("to_rear")) {
        (Some(_), None) => length(reader, group, "to_hinge").map(Edge::FromHinge),
        (None, Some(_)) => length(reader, group, "to_rear").map(Edge::FromRear),
        (None, None) if !group.lacks("to_hinge") || !group.lacks("to_rear") => None,
        (None, None) | (Some(_), Some(_)) => {
            let message = "this cut needs one place where it stops".to_owned();
            let help = "write `to_hinge: 5 cm` (behind the face's apex) or `to_rear: 6 cm` (from the rear), one of the two";
            reader.stop("PLAN-15", (group.place, &group.route), (message, help));
            None
        }
    }
}
