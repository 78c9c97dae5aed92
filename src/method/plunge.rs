//! The plunge with a strap: the hinge is finished while the rear still holds, and the strap is
//! released on purpose. It is proposed only where the nose has room.

use crate::figures::PLUNGE_CLEAR;
use crate::figures::{Layout, Release};
use crate::method::bench::{Assessed, Bench};
use crate::method::words::{cm, ratio, ratio_reaches};
use crate::plan::step::MethodName;

/// The steps in which the face is tried, as a share of the diameter. Source: our judgement.
const FACE_STEP: f64 = 0.01;
/// Shallow and middling faces, and the deepest one.
const SIXTH: f64 = 1.0 / 6.0;
const QUARTER: f64 = 0.25;
const THIRD: f64 = 1.0 / 3.0;

/// The first hinge and face that hold off splitting after release and leave room for the nose.
pub(super) fn find(bench: &Bench<'_>) -> Result<(Assessed, Vec<String>), String> {
    let least = bench.table.plunge_diameter_min.value();
    if (bench.diameter() * 1000.0).round() < (least * 1000.0).round() {
        return Err(format!(
            "the wood is {} thick at the cut, and a plunge needs {}",
            cm(bench.diameter()),
            cm(least)
        ));
    }
    let nose = bench
        .nose()
        .ok_or("the saw is missing, and the nose must fit between hinge and strap")?;
    let mut closest: Option<Assessed> = None;
    let mut widest = f64::NEG_INFINITY;
    for wanted in [bench.table.side_ratio_wanted, 1.0] {
        for (hinge, face) in candidates(bench, wanted) {
            let depths = (face, hinge);
            let layout = bench.layout(MethodName::PlungeWithStrap, depths, Release::Strap);
            let room = room(bench, &layout, nose);
            widest = widest.max(room);
            if !fits(bench, room) {
                continue;
            }
            let cut = bench.assess(layout);
            let splits = !ratio_reaches(cut.worst.split_ratio, 1.0);
            let steers = cut
                .worst
                .side_ratio
                .is_none_or(|ratio| ratio_reaches(ratio, wanted));
            if !splits && steers {
                return Ok((cut, reasons(bench, &cut, room)));
            }
            closest.get_or_insert(cut);
        }
    }
    let Some(cut) = closest else {
        return Err(format!(
            "the nose has no room between hinge and strap: {} at most, and {} are wanted",
            cm(widest),
            cm(bench.table.plunge_room_min.value())
        ));
    };
    Err(cut.side_refusal().unwrap_or_else(|| {
        format!(
            "no hinge from {:.0} to {:.0} % and face from a sixth to a third that leave room for the nose hold off splitting after release: {} at worst at the first tried",
            100.0 * bench.table.hinge_share,
            100.0 * bench.table.hinge_share_min,
            ratio(cut.worst.split_ratio)
        )
    }))
}

/// A plunge laid out though no candidate held: for a method chosen by hand.
pub(super) fn by_hand(bench: &Bench<'_>) -> Assessed {
    let hinge = bench.hinge_of(bench.table.hinge_share);
    bench.assess(bench.layout(
        MethodName::PlungeWithStrap,
        (bench.face_of(SIXTH), hinge),
        Release::Strap,
    ))
}

/// Room beside nose, hinge, strap and the inch between plunge and hinge.
fn room(bench: &Bench<'_>, layout: &Layout, nose: f64) -> f64 {
    bench.diameter()
        - layout.face_depth.value()
        - layout.hinge.value()
        - PLUNGE_CLEAR.value()
        - nose
        - layout.strap.value()
}

fn fits(bench: &Bench<'_>, room: f64) -> bool {
    (room * 1000.0).round() >= (bench.table.plunge_room_min.value() * 1000.0).round()
}

/// Hinges and faces in the order they are tried. Where the side lean wants a longer hinge, the
/// faces go on to a third at once.
fn candidates(bench: &Bench<'_>, side_wanted: f64) -> Vec<(f64, f64)> {
    let shares = bench.hinge_shares();
    let deepest = THIRD.min(bench.input.face_share_max);
    let mut all = Vec::new();
    for share in &shares {
        for face in faces(SIXTH, QUARTER.min(deepest)) {
            all.push((bench.hinge_of(*share), bench.face_of(face)));
        }
    }
    let thin: &[f64] = if side_wanted > 1.0 {
        &shares
    } else {
        &shares[shares.len().saturating_sub(1)..]
    };
    for share in thin {
        for face in faces(QUARTER, deepest) {
            all.push((bench.hinge_of(*share), bench.face_of(face)));
        }
    }
    all.dedup();
    all
}

fn faces(from: f64, to: f64) -> Vec<f64> {
    let steps = ((to - from) / FACE_STEP + 1.0e-9).floor().max(0.0) as i32;
    let mut faces: Vec<f64> = (0..=steps)
        .map(|step| from + FACE_STEP * f64::from(step))
        .collect();
    if faces.last().is_none_or(|last| *last < to - 1.0e-9) && to > from {
        faces.push(to);
    }
    faces
}

pub(super) fn reasons(bench: &Bench<'_>, cut: &Assessed, room: f64) -> Vec<String> {
    let layout = &cut.layout;
    let mut reasons = vec![
        format!(
            "the strap of {} holds the tree while the hinge is finished; after release the hinge of {} bends before the stem splits, {} times at worst",
            cm(layout.strap.value()),
            cm(layout.hinge.value()),
            ratio(cut.worst.split_ratio)
        ),
        format!(
            "the nose fits between hinge and strap with {} to spare",
            cm(room)
        ),
    ];
    let face = layout.face_depth.value() / bench.diameter();
    let hinge = layout.hinge.value() / bench.diameter();
    if face > SIXTH + 0.005 || hinge < bench.table.hinge_share - 0.005 {
        reasons.push(format!(
            "a face of one sixth with a hinge of a tenth is common practice, but here it would leave too little against splitting after release: the face is {:.0} % and the hinge {:.0} % of the wood",
            100.0 * face,
            100.0 * hinge
        ));
    }
    reasons
}
