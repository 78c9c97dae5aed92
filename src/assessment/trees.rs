//! What a tree lacks, and measurements of it that contradict each other. It fills in nothing.

use super::look::{Look, within};
use crate::diagnostic::Place;
use crate::rules::{Found, TreeFacts, long, short};

type Coded = Vec<(&'static str, Found)>;

/// A stump at the cut is wider than the stem at breast height; below this share of it one of the
/// two was misread. Our judgement.
const STUMP_SHARE_LEAST: f64 = 0.9;
/// The widest butt swell that is believed. Our judgement.
const STUMP_SHARE_MOST: f64 = 1.8;

/// Species nobody knows.
pub(super) fn unknown_species(look: &Look<'_>) -> Coded {
    let mut found = vec![];
    for tree in &look.plan().trees {
        let Err(near) = (look.ground.knows_species)(&tree.species.value) else {
            continue;
        };
        let message = format!("the species `{}` is not known", tree.species.value);
        let help = if near.is_empty() {
            "write its common or its scientific name, or give `wood` values of its own".to_owned()
        } else {
            format!("nearest names: {}", near.join("; "))
        };
        let at = within(tree.species.place, &tree.route, "species");
        found.push(("JOB-11", Found::stop(at, message, &help)));
    }
    found
}

/// What nobody can size up or fell a tree without.
pub(super) fn lacks(look: &Look<'_>) -> Coded {
    let mut found = vec![];
    for tree in look.trees() {
        let t = tree.tree;
        let weighed = t.weigh.as_ref().is_some_and(|w| w.centre.is_some());
        let stops = [
            (t.lay.is_none(), "lay", "lay: 110 deg"),
            (t.sawyer.is_none(), "sawyer", "sawyer: id"),
            (t.height.is_none(), "height", "height: 22 m"),
            (
                t.lean.is_none() && !weighed,
                "lean",
                "lean: {angle: 6 deg, toward: 118 deg}",
            ),
        ];
        for (_, key, example) in stops.iter().filter(|(lacking, ..)| *lacking) {
            found.push(lack(&tree, key, example, Found::stop));
        }
        if t.saw.is_none() {
            found.push(lack(&tree, "saw", "saw: id", Found::caution));
        }
    }
    found
}

fn lack(
    tree: &TreeFacts<'_>,
    key: &str,
    example: &str,
    make: fn((Place, String), String, &str) -> Found,
) -> (&'static str, Found) {
    let message = format!("{} has no `{key}`", tree.tree.id.value);
    let help = format!("add `{example}`");
    ("JOB-12", make(tree.at(key), message, &help))
}

/// A crown whose weight to one side nobody knows.
pub(super) fn crown_unknown(look: &Look<'_>) -> Coded {
    let mut found = vec![];
    for tree in look.trees() {
        let weighed = tree.tree.weigh.as_ref().is_some_and(|w| w.centre.is_some());
        if weighed {
            continue;
        }
        let (key, message) = match &tree.tree.crown {
            None => (
                "crown",
                "nothing is known of the crown, which can outweigh the stem's lean",
            ),
            Some(crown) if crown.radii.is_none() => (
                "crown.radii",
                "the crown's radii are missing, so nobody can say to which side it weighs",
            ),
            Some(_) => continue,
        };
        let help = "pace the crown's edge to four sides: `crown: {base: 8 m, radii: {n: 2 m, e: 6 m, s: 4.5 m, w: 1.5 m}}`";
        let found_here = Found::caution(tree.at(key), message.to_owned(), help);
        found.push(("JOB-13", found_here));
    }
    found
}

/// A crown that begins above the tree's top.
pub(super) fn crown_above_top(look: &Look<'_>) -> Coded {
    let units = look.plan().units;
    let mut found = vec![];
    for tree in look.trees() {
        let (Some(crown), Some(height)) = (&tree.tree.crown, tree.height()) else {
            continue;
        };
        if crown.base.value() >= height {
            let message = format!(
                "the crown begins at {}, the tree ends at {}",
                long(units, crown.base.value()),
                long(units, height)
            );
            let at = within(crown.base.place, &tree.tree.route, "crown.base");
            let help = "measure both again; the base is the height of the lowest live branches";
            found.push(("JOB-14", Found::stop(at, message, help)));
        }
    }
    found
}

/// A diameter at the cut that does not go with the one at breast height.
pub(super) fn stump_and_dbh(look: &Look<'_>) -> Coded {
    let units = look.plan().units;
    let mut found = vec![];
    for tree in &look.plan().trees {
        let Some(dbh) = &tree.dbh else { continue };
        let along = tree.stump.value();
        let across = tree.stump_across.as_ref().map_or(along, |a| a.value());
        let share = (along + across) / 2.0 / dbh.value();
        if (STUMP_SHARE_LEAST..=STUMP_SHARE_MOST).contains(&share) {
            continue;
        }
        let message = format!(
            "a stump of {} does not go with {} at breast height",
            short(units, (along + across) / 2.0),
            short(units, dbh.value())
        );
        let at = within(tree.stump.place, &tree.route, "stump");
        let help = "measure both again: the wood at the cut, and over bark at breast height";
        found.push(("JOB-15", Found::caution(at, message, help)));
    }
    found
}

/// Defects that lie outside the wood.
pub(super) fn defect_outside(look: &Look<'_>) -> Coded {
    let units = look.plan().units;
    let mut found = vec![];
    for tree in &look.plan().trees {
        let along = tree.stump.value();
        let across = tree.stump_across.as_ref().map_or(along, |a| a.value());
        for defect in &tree.defects {
            if let Some(size) = &defect.size
                && size.value() > along.max(across)
            {
                let message = format!(
                    "a defect of {} does not fit into this stump",
                    short(units, size.value())
                );
                let at = within(size.place, &defect.route, "size");
                let help = "the size is a diameter at the cut; measure it again";
                found.push(("JOB-16", Found::stop(at, message, help)));
            } else if let Some([forward, right]) = &defect.offset {
                let x = 2.0 * (forward.value() / along);
                let y = 2.0 * (right.value() / across);
                if libm::hypot(x, y) > 1.0 {
                    let message = "the defect's centre lies outside the wood".to_owned();
                    let at = within(forward.place, &defect.route, "offset");
                    let help = "offsets are from the stump's centre: forward along the lay, then right of it";
                    found.push(("JOB-16", Found::stop(at, message, help)));
                }
            }
        }
    }
    found
}
