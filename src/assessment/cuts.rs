//! Cuts that contradict the stem, each other, or the means at hand. It lays out no cut.

use super::look::{Look, within};
use crate::plan::step::MethodName;
use crate::rules::{Found, Told, TreeFacts, short};
use crate::units::Length;

type Coded = Vec<(&'static str, Found)>;

/// Two figures for the same cut that differ by more than this contradict each other.
const SAME_CUT: Length = Length::mm(1.0);

fn is_thicker_than_stem(tree: &TreeFacts<'_>) -> Option<Told<Length>> {
    tree.hinge().filter(|h| h.value >= tree.tree.stump.value())
}

fn is_past_centre(tree: &TreeFacts<'_>) -> Option<Told<Length>> {
    tree.face_depth()
        .filter(|f| f.value > tree.tree.stump.value() * 0.5)
}

/// A hinge that takes the whole stem.
pub(super) fn hinge_thicker_than_stem(look: &Look<'_>) -> Coded {
    let units = look.plan().units;
    let mut found = vec![];
    for tree in look.trees() {
        if let Some(hinge) = is_thicker_than_stem(&tree) {
            let message = format!(
                "a hinge of {} is as thick as the stem, {}",
                short(units, hinge.value),
                short(units, tree.tree.stump.value())
            );
            let help = "look at the number and its unit; about a tenth of the diameter is usual";
            found.push(("JOB-17", Found::stop(hinge.at(), message, help)));
        }
    }
    found
}

/// A face that goes past the centre.
pub(super) fn face_past_centre(look: &Look<'_>) -> Coded {
    let units = look.plan().units;
    let mut found = vec![];
    for tree in look.trees() {
        if let Some(face) = is_past_centre(&tree) {
            let message = format!(
                "a face of {} goes past the centre of {}",
                short(units, face.value),
                short(units, tree.tree.stump.value())
            );
            let help = "look at the number and its unit; up to a third of the diameter is usual";
            found.push(("JOB-18", Found::stop(face.at(), message, help)));
        }
    }
    found
}

/// Face, hinge and strap that take more wood than there is.
pub(super) fn no_room(look: &Look<'_>) -> Coded {
    let units = look.plan().units;
    let mut found = vec![];
    for tree in look.trees() {
        if is_thicker_than_stem(&tree).is_some() || is_past_centre(&tree).is_some() {
            continue;
        }
        let (Some(face), Some(hinge)) = (tree.face_depth(), tree.hinge()) else {
            continue;
        };
        let room = tree.tree.stump.value() - face.value - hinge.value;
        let (at, message) = match &tree.tree.strap {
            Some(strap) if strap.value() >= room => (
                within(strap.place, &tree.tree.route, "strap.thickness"),
                format!(
                    "a strap of {} has no room: {} is left behind face and hinge",
                    short(units, strap.value()),
                    short(units, room.max(Length::ZERO))
                ),
            ),
            None if room <= Length::ZERO => (
                hinge.at(),
                "face and hinge together take the whole stem".to_owned(),
            ),
            Some(_) | None => continue,
        };
        let help = "face, hinge, bar and strap must fit into the diameter one behind the other";
        found.push(("JOB-19", Found::stop(at, message, help)));
    }
    found
}

/// Steps written by hand that differ from the tree's own figures.
pub(super) fn steps_differ(look: &Look<'_>) -> Coded {
    let units = look.plan().units;
    let mut found = vec![];
    for tree in look.trees() {
        let face = tree.face_by_hand().zip(tree.tree.face.depth.as_ref());
        let hinge = tree.hinge_by_hand().zip(tree.tree.hinge.as_ref());
        for (what, pair) in [("face", face), ("hinge", hinge)] {
            let Some((step, planned)) = pair else {
                continue;
            };
            if (step.value - planned.value()).abs() > SAME_CUT {
                let message = format!(
                    "this step leaves a {what} of {}; the tree's own figure is {}",
                    short(units, step.value),
                    short(units, planned.value())
                );
                let help = "write the same figure in both places, or in the steps only";
                found.push(("JOB-20", Found::stop(step.at(), message, help)));
            }
        }
    }
    found
}

/// A bar that does not reach.
pub(super) fn bar_too_short(look: &Look<'_>) -> Coded {
    let units = look.plan().units;
    let mut found = vec![];
    for tree in &look.plan().trees {
        let Some(id) = &tree.saw else { continue };
        let Some(saw) = look.saw(id) else { continue };
        let along = tree.stump.value();
        let across = tree.stump_across.as_ref().map_or(along, |a| a.value());
        let wide = along.max(across);
        let bar = saw.bar.value();
        if wide <= bar {
            continue;
        }
        let at = within(id.place, &tree.route, "saw");
        let message = format!(
            "a bar of {} in a stump of {}",
            short(units, bar),
            short(units, wide)
        );
        found.push((
            "JOB-21",
            if wide > bar * 2.0 {
                let help = "take a saw with a longer bar: not even cuts from both sides meet";
                Found::stop(at, message, help)
            } else {
                let help = "take a longer bar, or plan every cut from both sides";
                Found::caution(at, message, help)
            },
        ));
    }
    found
}

/// A method chosen by hand without what it needs.
pub(super) fn method_lacks_means(look: &Look<'_>) -> Coded {
    let mut found = vec![];
    for tree in &look.plan().trees {
        let Some(method) = &tree.method else { continue };
        let (message, help) = match method.value {
            MethodName::RiggedBackCut if tree.line.is_none() => (
                "this method pulls the tree and no line is planned",
                "add `line: {height: 9 m, anchor: [25 m, 4 m], load_limit: 20 kN}`",
            ),
            MethodName::WedgedBackCut if tree.wedges.as_ref().is_none_or(|w| w.value == 0) => (
                "this method lifts the tree and no wedges are planned",
                "add `wedges: 3`",
            ),
            MethodName::StraightBackCut
            | MethodName::BriskBackCut
            | MethodName::PlungeWithStrap
            | MethodName::TiltedBackCut
            | MethodName::SideRelievedBackCut
            | MethodName::WedgedBackCut
            | MethodName::RiggedBackCut => continue,
        };
        let at = within(method.place, &tree.route, "method");
        found.push(("JOB-22", Found::stop(at, message.to_owned(), help)));
    }
    found
}
