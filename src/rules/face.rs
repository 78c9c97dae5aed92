//! The face: in every tree, deep enough and not too deep, open enough. It lays out no face.

use super::{Facts, Found, Rule, TreeFacts, cite, degrees};
use crate::parts::RuleSet;
use crate::plan::FaceKind;
use crate::plan::step::Cut;
use crate::source::Mark;

const PARAGRAPH: &str = "29 CFR 1910.266(h)(2)(v)";

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-30",
        (
            "face in every tree",
            "Every tree has a face, and it is whole before the back cut begins. Steps left to the size-up have one; steps written by hand are looked through.",
        ),
        cite(PARAGRAPH, Mark::Opened),
        in_every_tree,
    ),
    Rule::us_logging(
        "LOG-31",
        (
            "depth of the face",
            "The rule wants a face of a size that steers the tree and keeps it from splitting, and has no figure. Published guidance has a quarter to a third of the diameter. A shallower one is common practice on strong leaners, where the wood under the lean pinches the bar; then this is a conflict to be weighed and not passed over.",
        ),
        cite(PARAGRAPH, Mark::Opened),
        depth,
    ),
    Rule::us_logging(
        "LOG-32",
        (
            "opening of the face",
            "A face that closes while the tree still stands high breaks the hinge. Published guidance has 70 degrees for an open face and 45 for the others.",
        ),
        cite(PARAGRAPH, Mark::Opened),
        opening,
    ),
];

/// Whether a cut makes the face, and whether it is made from behind.
fn part_of(cut: &Cut) -> (bool, bool) {
    match cut {
        Cut::FaceSlope { .. } | Cut::FaceFloor { .. } => (true, false),
        Cut::Plunge { .. }
        | Cut::HingeTrim { .. }
        | Cut::BackCut { .. }
        | Cut::TiltedBackCut { .. }
        | Cut::ReliefLeft { .. }
        | Cut::ReliefRight { .. }
        | Cut::StrapRelease => (false, true),
    }
}

fn in_every_tree(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let Some(cuts) = tree.cuts_by_hand() else {
            continue;
        };
        let sloped = cuts.iter().any(|c| matches!(c, Cut::FaceSlope { .. }));
        let floored = cuts.iter().any(|c| matches!(c, Cut::FaceFloor { .. }));
        let last_face = cuts.iter().rposition(|c| part_of(c).0);
        let first_back = cuts.iter().position(|c| part_of(c).1);
        let late = last_face.zip(first_back).is_some_and(|(f, b)| f > b);
        let message = match (sloped && floored, late) {
            (false, _) => "the steps have no whole face: a sloping cut and a floor cut",
            (true, true) => "the steps cut from behind before the face is whole",
            (true, false) => continue,
        };
        found.push(Found::stop(
            steps_at(&tree),
            message.to_owned(),
            "begin with `cut: face-slope` and `cut: face-floor`",
        ));
    }
    found
}

/// Where a tree's steps begin.
pub(super) fn steps_at(tree: &TreeFacts<'_>) -> (crate::diagnostic::Place, String) {
    let first = tree.tree.steps.as_ref().and_then(|steps| steps.first());
    let (place, path) = tree.at("steps");
    (first.map_or(place, |s| s.place), path)
}

fn depth(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let figures = &set.figures;
    // Compared in hundredths of the diameter.
    let hundredths = |share: f64| (share * 100.0).round();
    let (least, most) = (
        hundredths(figures.face_share_least.value),
        hundredths(figures.face_share_most.value),
    );
    let mut found = vec![];
    for tree in facts.trees() {
        let Some(face) = tree.face_depth() else {
            continue;
        };
        let share = hundredths(face.value / tree.tree.stump.value());
        // A face past the centre is the plan's own contradiction.
        if (least <= share && share <= most) || share > 50.0 {
            continue;
        }
        let which = if share < least { "shallower" } else { "deeper" };
        found.push(Found::caution(
            face.at(),
            format!("the face is {share:.0} % of the diameter, {which} than the guidance of {least:.0} to {most:.0} %"),
            "weigh it against pinch and splitting in the size-up, and say at the tailgate which you chose and why",
        ));
    }
    found
}

fn opening(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let (Some(opening), Some(kind)) = (tree.face_opening(), &tree.tree.face.kind) else {
            continue;
        };
        let least = match kind.value {
            FaceKind::Open => set.figures.opening_open.value,
            FaceKind::Conventional | FaceKind::Humboldt => set.figures.opening_other.value,
        };
        if (opening.value.in_deg() * 10.0).round() < (least.in_deg() * 10.0).round() {
            found.push(Found::caution(
                opening.at(),
                format!(
                    "the {} face opens {}; guidance has at least {}",
                    kind.value.word(),
                    degrees(opening.value),
                    degrees(least)
                ),
                "open the face further, so that it does not close before the tree is down",
            ));
        }
    }
    found
}
