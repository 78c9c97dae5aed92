//! Ways out that contradict the lay, or are too few. Rules of their length and angle are published
//! ones and stand in the room `rules`.

use super::look::{Look, within};
use crate::rules::{Found, degrees, turn};

type Coded = Vec<(&'static str, Found)>;

/// A way out into the half of the ground where the tree comes down.
pub(super) fn into_the_lay(look: &Look<'_>) -> Coded {
    let mut found = vec![];
    for tree in &look.plan().trees {
        let Some(lay) = &tree.lay else { continue };
        for way in &tree.ways_out {
            let off = turn(lay.value, way.bearing.value);
            // In tenths of a degree.
            if (off.in_deg() * 10.0).round() < 900.0 {
                let message = format!(
                    "way out {} leads into the lay's own half, {} from the lay",
                    way.id.value,
                    degrees(off)
                );
                let at = within(way.bearing.place, &way.route, "bearing");
                let help = "lead it back and to the side: 135 deg from the lay on either side";
                found.push(("JOB-23", Found::stop(at, message, help)));
            }
        }
    }
    found
}

/// No way out, or only one.
pub(super) fn too_few(look: &Look<'_>) -> Coded {
    let mut found = vec![];
    for tree in look.trees() {
        let id = &tree.tree.id.value;
        let help =
            "plan two: `ways_out: [{id: A, bearing: 245 deg, length: 8 m, cleared: true}, …]`";
        match tree.tree.ways_out.as_slice() {
            [] => {
                let message = format!("{id} has no way out");
                let none = Found::stop(tree.at("ways_out"), message, help);
                found.push(("JOB-24", none));
            }
            [only] => {
                let message = format!("{id} has one way out; a second is wanted when it is lost");
                let at = within(only.id.place, &tree.tree.route, "ways_out");
                found.push(("JOB-24", Found::caution(at, message, help)));
            }
            _ => {}
        }
    }
    found
}
