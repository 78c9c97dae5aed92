//! The wood left standing: pieces along the lay, corners relieved, cavities. Closed forms where
//! edges are parallel to the hinge, quadrature where a corner is relieved. It judges nothing.

use crate::geometry::Point;
use crate::mechanics::integrate;
use crate::mechanics::section::{Cavity, Ellipse, Section, Stem, Sums};
use crate::units::Length;

/// One piece of standing wood.
#[derive(Debug, Clone, PartialEq)]
pub struct StandingPiece {
    /// Its rear edge, forward of the stump's centre.
    pub from: Length,
    /// Its front edge.
    pub to: Length,
    /// The outline's corners (forward is `y`, right is `x`), where relieved corners bound it;
    /// empty where its edges and the stem's outline do.
    pub corners: Vec<Point>,
    /// The cavities it holds.
    pub holes: Vec<Cavity>,
}

/// A rear corner taken off from the side.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Relief {
    /// Width taken, from the outside of the wood.
    pub width: f64,
    /// How far forward it reaches.
    pub front: f64,
}

/// What stands.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Standing {
    /// Pieces along the lay, the rearmost first.
    pub pieces: Vec<(f64, f64)>,
    pub left: Option<Relief>,
    pub right: Option<Relief>,
}

/// A stretch between two edges with even bounds across the lay.
struct Stretch {
    from: f64,
    to: f64,
    left: f64,
    right: f64,
}

impl Standing {
    pub(super) fn whole(stem: &Stem) -> Self {
        let a = stem.ellipse().a;
        Self {
            pieces: vec![(-a, a)],
            left: None,
            right: None,
        }
    }

    /// Takes away all wood between two edges.
    pub(super) fn remove(&mut self, from: f64, to: f64) {
        let mut kept = Vec::with_capacity(self.pieces.len() + 1);
        for (rear, front) in self.pieces.drain(..) {
            if front <= from || rear >= to {
                kept.push((rear, front));
                continue;
            }
            if rear < from {
                kept.push((rear, from));
            }
            if front > to {
                kept.push((to, front));
            }
        }
        self.pieces = kept;
    }

    fn relieved(&self, piece: (f64, f64)) -> bool {
        [self.left, self.right]
            .into_iter()
            .flatten()
            .any(|relief| relief.width > 0.0 && relief.front > piece.0)
    }

    /// The stretches of a piece, each with even bounds across the lay.
    fn stretches(&self, outline: Ellipse, piece: (f64, f64)) -> Vec<Stretch> {
        let half = outline.a * outline.k;
        let mut edges = vec![piece.0, piece.1];
        for relief in [self.left, self.right].into_iter().flatten() {
            if relief.front > piece.0 && relief.front < piece.1 {
                edges.push(relief.front);
            }
        }
        edges.sort_by(f64::total_cmp);
        edges
            .windows(2)
            .map(|pair| {
                let bound = |relief: Option<Relief>| {
                    relief
                        .filter(|relief| relief.front > pair[0])
                        .map_or(half, |relief| half - relief.width)
                };
                Stretch {
                    from: pair[0],
                    to: pair[1],
                    left: -bound(self.left),
                    right: bound(self.right),
                }
            })
            .collect()
    }

    pub(super) fn piece_sums(&self, stem: &Stem, piece: (f64, f64)) -> Sums {
        if !self.relieved(piece) {
            return stem.shape().strip(piece.0, piece.1);
        }
        let outline = stem.ellipse();
        let mut sums = Sums::default();
        for stretch in self.stretches(outline, piece) {
            sums = sums.plus(bounded(&Oval::outline(outline), &stretch));
            for hole in stem.holes() {
                sums = sums.minus(bounded(&Oval::hole(hole.x, hole.y, hole.r), &stretch));
            }
        }
        sums
    }

    /// Every piece together.
    pub(super) fn sums(&self, stem: &Stem) -> Sums {
        self.pieces.iter().fold(Sums::default(), |sums, piece| {
            sums.plus(self.piece_sums(stem, *piece))
        })
    }

    /// The section of all that stands, where any wood does.
    pub(super) fn section(&self, stem: &Stem) -> Option<Section> {
        let sums = self.sums(stem);
        let (rear, front) = (self.pieces.first()?.0, self.pieces.last()?.1);
        if sums.area <= 1.0e-12 {
            return None;
        }
        let half_width = self
            .pieces
            .iter()
            .flat_map(|piece| self.stretches(stem.ellipse(), *piece))
            .map(|stretch| {
                let reach = stem.shape().half_width(stretch.from, stretch.to);
                reach.min(stretch.right.max(-stretch.left))
            })
            .fold(0.0, f64::max);
        Some(sums.section(rear, front, half_width))
    }

    /// The width of wood along the rear edge of a piece.
    pub(super) fn rear_width(&self, stem: &Stem, piece: (f64, f64)) -> f64 {
        let full = stem.shape().wood_chord(piece.0);
        let half = 0.5 * stem.ellipse().chord(piece.0);
        self.stretches(stem.ellipse(), piece)
            .first()
            .map_or(full, |stretch| {
                let (left, right) = (stretch.left.max(-half), stretch.right.min(half));
                full.min((right - left).max(0.0))
            })
    }

    /// The pieces as they are shown.
    pub(super) fn shown(&self, stem: &Stem) -> Vec<StandingPiece> {
        self.pieces
            .iter()
            .map(|piece| StandingPiece {
                from: Length::si(piece.0),
                to: Length::si(piece.1),
                corners: if self.relieved(*piece) {
                    self.corners(stem.ellipse(), *piece)
                } else {
                    Vec::new()
                },
                holes: stem
                    .cavities()
                    .into_iter()
                    .filter(|hole| {
                        let reach = 0.5 * hole.diameter.value();
                        hole.forward.value() + reach > piece.0
                            && hole.forward.value() - reach < piece.1
                    })
                    .collect(),
            })
            .collect()
    }

    /// The outline of a relieved piece: right side forward, then left side back.
    fn corners(&self, outline: Ellipse, piece: (f64, f64)) -> Vec<Point> {
        const STEPS: i32 = 16;
        let (mut right, mut left) = (Vec::new(), Vec::new());
        for stretch in self.stretches(outline, piece) {
            for step in 0..=STEPS {
                let share = f64::from(step) / f64::from(STEPS);
                let forward = stretch.from + share * (stretch.to - stretch.from);
                let half = 0.5 * outline.chord(forward);
                right.push(Point {
                    x: stretch.right.min(half),
                    y: forward,
                });
                left.push(Point {
                    x: stretch.left.max(-half),
                    y: forward,
                });
            }
        }
        left.reverse();
        right.extend(left);
        right.dedup();
        right
    }
}

/// An oval anywhere: the outline, or a cavity.
struct Oval {
    x: f64,
    y: f64,
    along: f64,
    across: f64,
}

impl Oval {
    fn outline(ellipse: Ellipse) -> Self {
        Self {
            x: 0.0,
            y: 0.0,
            along: ellipse.a,
            across: ellipse.a * ellipse.k,
        }
    }

    fn hole(x: f64, y: f64, r: f64) -> Self {
        Self {
            x,
            y,
            along: r,
            across: r,
        }
    }

    /// The turn `φ` with `x = centre − along·cos φ`.
    fn turn(&self, x: f64) -> f64 {
        libm::acos(((self.x - x) / self.along).clamp(-1.0, 1.0))
    }
}

/// The sums of an oval within a stretch, by quadrature over the turn, parted where the outline
/// meets a bound so that every part is smooth.
fn bounded(oval: &Oval, stretch: &Stretch) -> Sums {
    let (start, end) = (oval.turn(stretch.from), oval.turn(stretch.to));
    let mut turns = vec![start, end];
    for bound in [stretch.left, stretch.right] {
        let sine = ((bound - oval.y) / oval.across).abs();
        if sine < 1.0 {
            let turn = libm::asin(sine);
            for meeting in [turn, std::f64::consts::PI - turn] {
                if meeting > start && meeting < end {
                    turns.push(meeting);
                }
            }
        }
    }
    turns.sort_by(f64::total_cmp);
    let over = |part: &dyn Fn(f64, f64, f64) -> f64| -> f64 {
        turns
            .windows(2)
            .map(|pair| {
                integrate(pair[0], pair[1], |turn| {
                    let (sine, cosine) = libm::sincos(turn);
                    let half = oval.across * sine;
                    let low = stretch.left.max(oval.y - half);
                    let high = stretch.right.min(oval.y + half);
                    if high <= low {
                        return 0.0;
                    }
                    part(oval.x - oval.along * cosine, low, high) * oval.along * sine
                })
            })
            .sum()
    };
    Sums {
        area: over(&|_, low, high| high - low),
        x: over(&|x, low, high| x * (high - low)),
        y: over(&|_, low, high| 0.5 * (high * high - low * low)),
        xx: over(&|x, low, high| x * x * (high - low)),
        yy: over(&|_, low, high| (high * high * high - low * low * low) / 3.0),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quadrature_agrees_with_the_closed_forms() {
        let stem = Stem::new(Length::m(0.55), Length::m(0.48)).unwrap();
        let outline = stem.ellipse();
        for (from, to) in [(-0.275, 0.275), (-0.275, -0.2), (0.05, 0.14), (-0.01, 0.0)] {
            let stretch = Stretch {
                from,
                to,
                left: -1.0,
                right: 1.0,
            };
            let found = bounded(&Oval::outline(outline), &stretch);
            let closed = stem.shape().strip(from, to);
            for (one, other) in [
                (found.area, closed.area),
                (found.x, closed.x),
                (found.xx, closed.xx),
                (found.yy, closed.yy),
            ] {
                let scale = other.abs().max(1.0e-9);
                assert!(
                    (one - other).abs() < 1.0e-8 * scale,
                    "{from} {to}: {one} {other}"
                );
            }
        }
    }
}
