//! Who and what is how far away, and what lies in the lay. Distances are on level ground.

use super::ground::Sector;
use super::{Facts, Found, Rule, TreeFacts, cite, long};
use crate::diagnostic::Place;
use crate::parts::RuleSet;
use crate::plan::{Feature, FeatureKind};
use crate::source::Mark;

/// The rules of this family.
pub(super) const RULES: &[Rule] = &[
    Rule::us_logging(
        "LOG-20",
        (
            "others at two tree lengths",
            "A tree must not be able to fall into a place where others work: at least two tree lengths lie between, and more where stems can roll or slide. For the slope the set takes two and a half, from another agency's guidance; downhill the run-out has no published end.",
        ),
        cite("29 CFR 1910.266(d)(6)(ii)", Mark::Opened),
        work_areas,
    ),
    Rule::us_logging(
        "LOG-21",
        (
            "machines at two tree lengths",
            "No machine that yards works within two tree lengths of manual felling, unless it pulls this very tree.",
        ),
        cite("29 CFR 1910.266(h)(1)(iii)", Mark::Opened),
        machines,
    ),
    Rule::us_logging(
        "LOG-22",
        (
            "nothing in the lay that must not be struck",
            "No tree is felled so that it endangers anyone or comes down on a building, a road, a machine or a place of work. The check takes the tree at the cautious end of its height and the ground 45 degrees either side of the lay. A tree that stays is a caution: what is struck throws pieces and hangs up.",
        ),
        cite("29 CFR 1910.266(h)(1)(i)", Mark::Opened),
        lay,
    ),
];

/// The features of a kind.
pub(super) fn features_of<'a>(
    facts: &Facts<'a>,
    kind: FeatureKind,
) -> impl Iterator<Item = &'a Feature> {
    let all = facts.plan.site.features.iter();
    all.filter(move |f| f.kind.value == kind)
}

/// A feature's place in the plan, for findings about it and a tree.
fn at(tree: &TreeFacts<'_>, key: &str) -> (Place, String) {
    let place = match key {
        "lay" => tree.tree.lay.as_ref().map(|l| l.place),
        _ => tree.tree.at.as_ref().map(|[east, _]| east.place),
    };
    (
        place.unwrap_or(tree.tree.id.place),
        format!("{}.{key}", tree.tree.route),
    )
}

fn work_areas(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let figures = &set.figures;
    let slope = facts.plan.site.slope.as_ref();
    let rolls = slope.is_some_and(|s| s.angle.value() >= figures.roll_slope.value);
    let lengths = if rolls {
        figures.ring_tree_lengths_on_slope.value
    } else {
        figures.ring_tree_lengths.value
    };
    let why = if rolls { " on this slope" } else { "" };
    too_near(facts, (FeatureKind::WorkArea, lengths), |far| {
        (
            format!(
                "others work {} away{why}; at least {} is wanted",
                far.0, far.1
            ),
            "move them, or fell while nobody is there and write the area out of the plan",
        )
    })
}

fn machines(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let lengths = set.figures.machine_tree_lengths.value;
    too_near(facts, (FeatureKind::Machine, lengths), |far| {
        (
            format!(
                "a machine works {} away; at least {} is wanted",
                far.0, far.1
            ),
            "move or stop the machine while this tree is felled",
        )
    })
}

fn too_near(
    facts: &Facts<'_>,
    (kind, lengths): (FeatureKind, f64),
    words: impl Fn((String, String)) -> (String, &'static str),
) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let (Some(spot), Some(height)) = (tree.spot(), tree.height()) else {
            continue;
        };
        let sized = tree.size_up.and_then(|s| s.ring_radius);
        let ring = sized.map_or(height * lengths, |ring| ring.max(height * lengths));
        for feature in features_of(facts, kind) {
            let Some(distance) = spot.to_feature(feature) else {
                continue;
            };
            // To the nearest millimetre.
            if distance.in_mm().round() >= ring.in_mm().round() {
                continue;
            }
            let units = facts.plan.units;
            let (message, help) = words((long(units, distance), long(units, ring)));
            let message = format!("`{}`: {message}", feature.id.value);
            found.push(Found::stop(at(&tree, "at"), message, help));
        }
    }
    found
}

/// Ground a tree may come down on, where its lay and height are known.
pub(super) fn sector(tree: &TreeFacts<'_>, set: &RuleSet) -> Option<Sector> {
    Some(Sector {
        along: tree.tree.lay.as_ref()?.value,
        half_angle: set.figures.lay_sector.value,
        reach: tree.height_high()?,
    })
}

fn lay(facts: &Facts<'_>, set: &RuleSet) -> Vec<Found> {
    let mut found = vec![];
    for tree in facts.trees() {
        let (Some(spot), Some(sector)) = (tree.spot(), sector(&tree, set)) else {
            continue;
        };
        for feature in &facts.plan.site.features {
            let found_as: Make = match feature.kind.value {
                FeatureKind::Road
                | FeatureKind::Building
                | FeatureKind::WorkArea
                | FeatureKind::Machine => must_not_be_struck,
                FeatureKind::StandingTree => may_hang_up,
                // Power lines have a rule of their own; the rest may be felled onto.
                FeatureKind::PowerLine
                | FeatureKind::Track
                | FeatureKind::Landing
                | FeatureKind::Fence
                | FeatureKind::Water => continue,
            };
            if spot.meets(feature, &sector) {
                let message = format!(
                    "the {} `{}` lies where this tree may come down, up to {} along the lay",
                    feature.kind.value.word(),
                    feature.id.value,
                    long(facts.plan.units, sector.reach)
                );
                found.push(found_as(at(&tree, "lay"), message));
            }
        }
    }
    found
}

type Make = fn((Place, String), String) -> Found;

fn must_not_be_struck(at: (Place, String), message: String) -> Found {
    let help =
        "turn the lay, or clear, close and guard what lies there and write it out of the plan";
    Found::stop(at, message, help)
}

fn may_hang_up(at: (Place, String), message: String) -> Found {
    let help = "turn the lay past it, or say in `hazards` what is done about pieces thrown and a tree hung up";
    Found::caution(at, message, help)
}
