//! The pull a line must give to bring a tree over its hinge, and what that asks of blocks.
//! It never approves a knot, an anchor or a strap.

use crate::units::{Angle, Force, Length, Moment};

/// The margin on the pull. Source: derived, our judgement.
pub const PULL_FACTOR: f64 = 1.5;
/// What a good block passes on. Source: Donzelli 1999 (abstract opened), 0.9 for a good block.
pub const BLOCK_EFFICIENCY: f64 = 0.9;

/// A point or a direction at the stump: forward, right, up, in metres.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Place {
    /// Forward along the lay.
    pub forward: Length,
    /// Right of the lay.
    pub right: Length,
    /// Above the cut.
    pub up: Length,
}

/// The lever of a line about the hinge, for turning the tree along the lay.
///
/// # Model
/// `z_a t_x − x_a t_z`, with the line's unit vector `t` in three dimensions and the place of
/// attachment counted from the hinge's centroid.
/// # Valid for
/// A straight line. `None` where both ends are one place.
/// # Source
/// Statics.
pub fn lever(attachment: Place, anchor: Place, hinge_forward: Length) -> Option<Length> {
    let along = (anchor.forward - attachment.forward).value();
    let across = (anchor.right - attachment.right).value();
    let up = (anchor.up - attachment.up).value();
    let length = (along * along + across * across + up * up).sqrt();
    if length <= 0.0 {
        return None;
    }
    let x = (attachment.forward - hinge_forward).value();
    Some(Length::si(
        (attachment.up.value() * along - x * up) / length,
    ))
}

/// The tension at the tree that a moment asks for, with the margin.
///
/// # Model
/// `1.5·M/lever`; nothing where no moment is asked.
/// # Valid for
/// A lever above zero; `None` otherwise: the line cannot turn the tree along the lay.
/// # Source
/// Statics; the margin is our judgement.
pub fn pull(moment: Moment, lever: Length) -> Option<Force> {
    (lever > Length::ZERO)
        .then(|| Force::si((PULL_FACTOR * moment.value() / lever.value()).max(0.0)))
}

/// The tension at the winch for a tension at the tree.
///
/// # Model
/// `T/0.9ⁿ` over `n` redirects.
/// # Valid for
/// Good blocks; a karabiner passes on half.
/// # Source
/// As [`BLOCK_EFFICIENCY`].
pub fn winch_tension(at_tree: Force, redirects: u8) -> Force {
    (0..redirects).fold(at_tree, |tension, _| tension / BLOCK_EFFICIENCY)
}

/// The load on a block whose two rope legs meet at an angle.
///
/// # Model
/// `2T cos(β/2)`.
/// # Valid for
/// Equal tension in both legs; 2T is the most.
/// # Source
/// Statics.
pub fn block_load(tension: Force, between_legs: Angle) -> Force {
    tension * (2.0 * libm::cos(0.5 * between_legs.value()))
}

/// The moment of a pull square or askew to a stem.
///
/// # Model
/// `r F sin φ`.
/// # Valid for
/// A pull at a known angle to the stem.
/// # Source
/// Arboriculture Australia, tree rescue manual, page 122 (opened).
pub fn pull_moment(height: Length, pull: Force, to_stem: Angle) -> Moment {
    Moment::si(height.value() * pull.value() * libm::sin(to_stem.value()))
}

/// The share a wrap of rope or cable holds back.
///
/// # Model
/// `e^{μφ}`, in a notch of angle β `e^{μφ/sin(β/2)}`.
/// # Valid for
/// A notch wider than nothing; the full turn for a plain stump.
/// # Source
/// The capstan equation; Kimbell 1981 for a notched stump (abstract opened).
pub fn capstan_ratio(friction: f64, wrap: Angle, notch: Angle) -> f64 {
    libm::exp(friction * wrap.value() / libm::sin(0.5 * notch.value()))
}
