//! The back cut and the hinge it leaves. It computes no strength.

use super::face::steps_at;
use super::{Facts, Found, Rule, cite, short};
use crate::parts::RuleSet;
use crate::plan::FaceKind;
use crate::plan::step::Cut;
use crate::source::Mark;
use crate::units::Length;

const HINGE: &str = "29 CFR 1910.266(h)(2)(vi)";
const HEIGHT: &str = "29 CFR 1910.266(h)(2)(vii)";

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-33",
        (
            "back cut in every tree",
            "Every tree has a back cut: none is pushed, pulled or wedged over an uncut rear. Steps written by hand are looked through.",
        ),
        cite(HINGE, Mark::Opened),
        in_every_tree,
    ),
    Rule::us_logging(
        "LOG-34",
        (
            "hinge left",
            "The back cut leaves a hinge that holds the tree to its stump for most of the fall and steers it. Steps that cut to the face leave none.",
        ),
        cite(HINGE, Mark::Opened),
        hinge_left,
    ),
    Rule::us_logging(
        "LOG-35",
        (
            "hinge of a usual thickness",
            "The rule has no figure. About a tenth of the diameter is common practice; far from it the size-up must have a reason, which the crew should hear.",
        ),
        cite(HINGE, Mark::Judgement),
        hinge_range,
    ),
    Rule::us_logging(
        "LOG-36",
        (
            "back cut above a level face cut",
            "With a face that has a level cut, the back cut lies above that level: the step left on the stump keeps the butt from coming back over it. An open face with two sloping cuts needs none, nor does a tree that is pulled over.",
        ),
        cite(HEIGHT, Mark::Opened),
        above,
    ),
    Rule::us_logging(
        "LOG-37",
        (
            "back cut an inch above",
            "Published guidance has at least one inch for faces with a level cut, and the level of the apex for an open face; below the apex the hinge is cut into.",
        ),
        cite(HEIGHT, Mark::Opened),
        inch,
    ),
];

fn in_every_tree(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let Some(cuts) = tree.cuts_by_hand() else {
            continue;
        };
        let back = |cut: &&Cut| {
            matches!(
                cut,
                Cut::BackCut { .. } | Cut::TiltedBackCut { .. } | Cut::StrapRelease
            )
        };
        if !cuts.iter().any(back) {
            found.push(Found::stop(
                steps_at(&tree),
                "the steps have no back cut".to_owned(),
                "add `cut: back-cut` with the place where it stops",
            ));
        }
    }
    found
}

fn hinge_left(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let Some(hinge) = tree.hinge_by_hand() else {
            continue;
        };
        if hinge.value <= Length::ZERO {
            found.push(Found::stop(
                hinge.at(),
                "this cut leaves no hinge".to_owned(),
                "stop the cut behind the face's apex, at the hinge's thickness",
            ));
        }
    }
    found
}

fn hinge_range(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let (figures, units) = (&set.figures, facts.plan.units);
    let mut found = vec![];
    for tree in facts.trees() {
        let Some(hinge) = tree.hinge().filter(|h| h.value > Length::ZERO) else {
            continue;
        };
        let stump = tree.tree.stump.value();
        let least = (stump * figures.hinge_share_least.value).min(figures.hinge_least_cap.value);
        let most = stump * figures.hinge_share_most.value;
        // To the nearest millimetre. A hinge as thick as the stem is the plan's own contradiction.
        let mm = |length: Length| length.in_mm().round();
        let usual = mm(least) <= mm(hinge.value) && mm(hinge.value) <= mm(most);
        if usual || hinge.value >= stump {
            continue;
        }
        let (which, help) = if hinge.value < least {
            (
                "thin",
                "leave more, or have the size-up show that it steers and holds",
            )
        } else {
            (
                "thick",
                "leave less: a thick hinge splits the stem or holds the tree up",
            )
        };
        found.push(Found::caution(
            hinge.at(),
            format!(
                "a hinge of {} is {which} for this stump; usual is {} to {}",
                short(units, hinge.value),
                short(units, least),
                short(units, most)
            ),
            help,
        ));
    }
    found
}

/// Whether a face has a level cut; nothing where its kind is not written.
fn is_level(kind: Option<FaceKind>) -> Option<bool> {
    kind.map(|kind| match kind {
        FaceKind::Conventional | FaceKind::Humboldt => true,
        FaceKind::Open => false,
    })
}

fn above(facts: &Facts<'_>, _: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let kind = tree.tree.face.kind.as_ref().map(|k| k.value);
        let pulled = tree.tree.line.is_some();
        let (Some(true), Some(height), false) = (is_level(kind), tree.back_cut_height(), pulled)
        else {
            continue;
        };
        if height.value <= Length::ZERO {
            found.push(Found::stop(
                height.at(),
                "the back cut does not lie above the face's level cut".to_owned(),
                "raise it above that level, at least an inch",
            ));
        }
    }
    found
}

fn inch(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let (least, units) = (set.figures.back_cut_height.value, facts.plan.units);
    let mut found = vec![];
    for tree in facts.trees() {
        let kind = tree.tree.face.kind.as_ref().map(|k| k.value);
        let (Some(level), Some(height)) = (is_level(kind), tree.back_cut_height()) else {
            continue;
        };
        // To the nearest millimetre. At or below a level cut the rule itself speaks.
        let low =
            0.0 < height.value.value() && height.value.in_mm().round() < least.in_mm().round();
        let message = if level && low {
            format!(
                "the back cut is {} above the level cut; guidance has at least {}",
                short(units, height.value),
                short(units, least)
            )
        } else if !level && height.value < Length::ZERO {
            "the back cut lies below the apex of an open face".to_owned()
        } else {
            continue;
        };
        found.push(Found::caution(height.at(), message, "raise the back cut"));
    }
    found
}
