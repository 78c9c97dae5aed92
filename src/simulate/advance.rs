//! How far a cut has come and what it has taken from the standing wood. It judges nothing.

use crate::simulate::standing::{Relief, Standing};
use crate::simulate::stump::Stump;

/// Where a cut goes, resolved on this stump.
#[derive(Debug, Clone, Copy)]
pub(super) enum Advance {
    /// From the front rearward to an edge.
    FromFront(f64),
    /// From the rear forward, from one edge to another.
    FromRear(f64, f64),
    /// From the slot rearward, from one edge to another.
    Rearward(f64, f64),
    /// From the slot forward, from one edge to another.
    Forward(f64, f64),
    /// A slot all at once, between its edges.
    Slot(f64, f64),
    /// A corner from the left, to a width, reaching forward to an edge.
    Left(f64, f64),
    /// A corner from the right.
    Right(f64, f64),
    /// The strap, all at once, up to the rear edge of the hinge.
    Release(f64),
}

/// How far a cut goes in all. A cut through air has no length.
pub(super) fn length_of(advance: &Advance, before: &Standing, stump: &Stump) -> f64 {
    let front = before
        .pieces
        .last()
        .map_or(-stump.stem.ellipse().a, |piece| piece.1);
    let length = match *advance {
        Advance::FromFront(edge) => front - edge,
        Advance::FromRear(from, to) | Advance::Forward(from, to) => to.min(front) - from,
        Advance::Rearward(from, to) => from - to.max(-stump.stem.ellipse().a),
        Advance::Left(width, _) | Advance::Right(width, _) => {
            width.min(stump.stem.across().value())
        }
        Advance::Slot(..) | Advance::Release(_) => 0.0,
    };
    length.max(0.0)
}

pub(super) fn advance_by(standing: &mut Standing, advance: &Advance, progress: f64, stump: &Stump) {
    let reach = stump.stem.along().value();
    match *advance {
        Advance::FromFront(edge) => {
            let front = standing.pieces.last().map_or(-reach, |piece| piece.1);
            standing.remove((front - progress).max(edge), reach);
        }
        Advance::FromRear(from, to) => standing.remove(-reach, (from + progress).min(to)),
        Advance::Rearward(from, to) => standing.remove((from - progress).max(to), from),
        Advance::Forward(from, to) => standing.remove(from, (from + progress).min(to)),
        Advance::Slot(from, to) => standing.remove(from, to),
        Advance::Release(to) => standing.remove(-reach, to),
        Advance::Left(width, front) => {
            standing.left = Some(wider(standing.left, progress.min(width), front));
        }
        Advance::Right(width, front) => {
            standing.right = Some(wider(standing.right, progress.min(width), front));
        }
    }
}

/// A corner cut again takes the larger of both.
fn wider(before: Option<Relief>, width: f64, front: f64) -> Relief {
    before.map_or(Relief { width, front }, |relief| Relief {
        width: relief.width.max(width),
        front: relief.front.max(front),
    })
}
