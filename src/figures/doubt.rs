//! Which input's doubt matters most, and how to shrink it. It never says that the rest is sure.

use crate::figures::model::draw;
use crate::figures::sobol::{DIMENSIONS, normals};

/// An input with doubt.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum DoubtInput {
    /// The lean's angle or direction, or the offset of a weight known from elsewhere.
    Lean,
    /// The mass, by diameter and height or known from elsewhere.
    Mass,
    /// The crown's offset or its share of the mass.
    Crown,
    /// The stump's diameters.
    Stump,
    /// The hinge as it will be made.
    Hinge,
    /// The face as it will be made.
    Face,
    /// The wood's strength and stiffness.
    Strength,
    /// The wood's resistance to splitting.
    Splitting,
    /// The wind.
    Wind,
}

impl DoubtInput {
    const ALL: [(Self, &'static [usize]); 9] = [
        (Self::Lean, &[draw::LEAN, draw::TOWARD]),
        (Self::Mass, &[draw::MASS, draw::DBH]),
        (
            Self::Crown,
            &[draw::CROWN_FORWARD, draw::CROWN_RIGHT, draw::CROWN_SHARE],
        ),
        (Self::Stump, &[draw::STUMP]),
        (Self::Hinge, &[draw::HINGE]),
        (Self::Face, &[draw::FACE]),
        (Self::Strength, &[draw::MOR, draw::MOE]),
        (Self::Splitting, &[draw::ENERGY]),
        (Self::Wind, &[draw::WIND]),
    ];

    /// The input in words.
    pub const fn words(self) -> &'static str {
        match self {
            Self::Lean => "lean",
            Self::Mass => "mass",
            Self::Crown => "crown",
            Self::Stump => "diameter at the cut",
            Self::Hinge => "hinge thickness as cut",
            Self::Face => "face depth as cut",
            Self::Strength => "strength of the wood",
            Self::Splitting => "splitting strength of the wood",
            Self::Wind => "wind",
        }
    }

    /// How to shrink the doubt.
    pub const fn how_to_shrink(self) -> &'static str {
        match self {
            Self::Lean => "measure the lean again from two places at a right angle",
            Self::Mass => {
                "measure breast-height diameter and height again, or pull the tree a little and read the line"
            }
            Self::Crown => "measure the four crown radii again from below the crown's edge",
            Self::Stump => "measure the wood across the cut both ways, with the bark off",
            Self::Hinge => {
                "mark the hinge line on both sides before cutting and measure at both ends"
            }
            Self::Face => "mark the face's depth on both sides and check it before the back cut",
            Self::Strength => {
                "look for rot, frost and dead wood; the wood itself will not be surer than this"
            }
            Self::Splitting => {
                "look for shakes, cracks, forks and tension wood; the wood itself will not be surer than this"
            }
            Self::Wind => "wait for still air, and read the wind at the tree before the back cut",
        }
    }
}

/// An input and the share of the margin's doubt that it brings.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Doubt {
    /// The input.
    pub input: DoubtInput,
    /// Its share of all that the inputs explain, 0 to 1.
    pub share: f64,
}

/// The inputs by how much their doubt matters, the most first.
///
/// # Model
/// Squared regression coefficients of ln(margin) on the standard-normal inputs of the cases; the
/// inputs are near enough to independent that each coefficient is its own projection.
pub(super) fn ranked(margins: &[f64]) -> Vec<Doubt> {
    let logs: Vec<f64> = margins
        .iter()
        .map(|margin| libm::log(margin.clamp(1.0e-6, 1.0e6)))
        .collect();
    let mean = logs.iter().sum::<f64>() / logs.len() as f64;
    let mut slopes = [0.0; DIMENSIONS];
    let mut squares = [0.0; DIMENSIONS];
    for (row, log) in normals().iter().zip(&logs) {
        for ((slope, square), z) in slopes.iter_mut().zip(&mut squares).zip(row) {
            *slope += z * (log - mean);
            *square += z * z;
        }
    }
    let part = |index: usize| {
        let slope = slopes[index] / squares[index];
        slope * slope
    };
    let all: f64 = (0..DIMENSIONS).map(part).sum();
    let mut ranked: Vec<Doubt> = DoubtInput::ALL
        .into_iter()
        .map(|(input, indices)| Doubt {
            input,
            share: indices.iter().map(|index| part(*index)).sum::<f64>() / all.max(1.0e-300),
        })
        .collect();
    ranked.sort_by(|one, other| {
        other
            .share
            .total_cmp(&one.share)
            .then(one.input.cmp(&other.input))
    });
    ranked
}
