//! The wedged back cut of a mild back leaner, and the wedge set in a straight one. It never lifts
//! more than a published table or our own limit allows.

use crate::figures::cautious_extras;
use crate::mechanics::wedge::back_lean_allowed;
use crate::method::bench::{Assessed, Bench};
use crate::method::words::{cm, length_keeps};
use crate::units::Length;

/// How the weight stands to the hinge of a tree that sits back.
struct Back {
    /// The lift at the demand's back end.
    lift: f64,
    /// The same with the hinge's own moment to be overcome.
    lift_with_hinge: f64,
    /// How far the top leans back of its foot; negative where it leans forward.
    lean: f64,
    /// The back lean the published table allows; none where it has no line.
    allowed: Option<f64>,
    /// Whether a wedge fits behind the bar.
    room: bool,
}

/// How the weight stands.
fn back(bench: &Bench<'_>, cut: &Assessed) -> Back {
    let (_, down) = cautious_extras(bench.model, cut.centroid);
    let weight = bench.tree.weight();
    let behind = cut.centroid - bench.tree.forward - down / weight;
    let arm = bench.diameter() - cut.layout.face_depth.value();
    let lift = arm * behind / bench.tree.height;
    let height = bench.input.height.map_or(0.0, Length::value);
    let across = bench
        .input
        .dbh
        .map_or_else(|| bench.model.stem.along(), |dbh| dbh.value);
    Back {
        lift,
        lift_with_hinge: lift + arm * cut.hold / weight / bench.tree.height,
        lean: -bench.tree.forward / bench.tree.height * height,
        allowed: bench
            .input
            .height
            .and_then(|height| back_lean_allowed(height, across))
            .map(Length::value),
        room: wedge_fits(bench, cut),
    }
}

/// Whether the back cut leaves room for bar and wedge.
pub(super) fn wedge_fits(bench: &Bench<'_>, cut: &Assessed) -> bool {
    let layout = &cut.layout;
    let open = bench.diameter() - layout.face_depth.value() - layout.hinge.value();
    bench
        .nose()
        .is_some_and(|nose| length_keeps(nose + bench.table.wedge_room.value(), open))
}

/// Why a straight back cut with a wedge set is enough; `None` where it is not.
pub(super) fn set_in_straight(bench: &Bench<'_>, cut: &Assessed) -> Option<Vec<String>> {
    let back = back(bench, cut);
    let most = bench.table.wedge_lift_max.value();
    let enough = bench.tree.forward >= 0.0 && back.room && length_keeps(back.lift, most);
    enough.then(|| {
        vec![format!(
            "the weight stands over the stump but {} behind the hinge: a wedge set in the back cut lifts it {} at most",
            cm(cut.centroid - bench.tree.forward),
            cm(back.lift)
        )]
    })
}

/// Why the tree can be lifted over its hinge; or why not.
pub(super) fn judge(bench: &Bench<'_>, cut: &Assessed) -> Result<Vec<String>, String> {
    let back = back(bench, cut);
    let most = bench.table.wedge_lift_max.value();
    if !back.room {
        return Err(format!(
            "no wedge fits: behind bar and hinge it needs {} and the nose",
            cm(bench.table.wedge_room.value())
        ));
    }
    if !length_keeps(back.lift_with_hinge, most) {
        return Err(format!(
            "wedges would have to lift {} with the hinge's own stiffness at the demand's back end: more than {}",
            cm(back.lift_with_hinge),
            cm(most)
        ));
    }
    if bench.tree.forward < 0.0 {
        let allowed = back
            .allowed
            .ok_or("the published wedge table has no line for a tree so short for its diameter")?;
        if back.lean > allowed {
            return Err(format!(
                "the top leans back {:.1} m, and the published wedge table allows {allowed:.1} m",
                back.lean
            ));
        }
    }
    Ok(vec![format!(
        "the weight stands {} behind the hinge; a wedge lifts it over with {} at most",
        cm(cut.centroid - bench.tree.forward),
        cm(back.lift_with_hinge)
    )])
}
