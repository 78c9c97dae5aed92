//! One tree in plain numbers, for sums done thousands of times: its weight, where it stands, and
//! how each may differ from the reading. It knows no cut but the stump's outline.

use thiserror::Error;

use crate::figures::input::TreeInput;
use crate::figures::read::{condition, crown_body, spread, stump, tree, two_masses, wind_moment};
use crate::figures::sobol::{DIMENSIONS, Normals};
use crate::mechanics::holding::{Load, Wood};
use crate::mechanics::section::{SectionError, Stem};
use crate::mechanics::stem::PROFILE;
use crate::units::{GRAVITY, Length, Moment};

/// The normal quantile of one-sided 95 %.
pub(super) const ONE_SIDED_95: f64 = 1.644_853_626_951_472_7;
/// Doubt of the crown's share of the mass, one standard deviation of its logarithm.
/// Source: published shares lie between half and 1.3 times the equations' (opened); derived.
const CROWN_SHARE_DOUBT: f64 = 0.25;
/// How the mass goes with the diameter. Source: the biomass equations' exponents, 2.3 to 2.5.
const MASS_BY_DIAMETER: f64 = 2.4;
/// The share of the trunk's strength past which a lean and a weight are taken for mis-measured.
/// Source: knots lower a stem's bending strength to 0.85 of clear wood's (from memory).
const TRUNK_SHARE: f64 = 0.85;

/// What the doubts are drawn for, in the order of the cases' coordinates.
pub(super) mod draw {
    pub const LEAN: usize = 0;
    pub const TOWARD: usize = 1;
    pub const MASS: usize = 2;
    pub const CROWN_FORWARD: usize = 3;
    pub const CROWN_RIGHT: usize = 4;
    pub const CROWN_SHARE: usize = 5;
    pub const DBH: usize = 6;
    pub const STUMP: usize = 7;
    pub const HINGE: usize = 8;
    pub const FACE: usize = 9;
    pub const MOR: usize = 10;
    pub const MOE: usize = 11;
    pub const ENERGY: usize = 12;
    pub const WIND: usize = 13;
    pub const RATE: usize = 14;
}

/// Why a tree's figures cannot be said.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum CannotSay {
    /// A reading that is missing.
    #[error("no {0} is given")]
    Missing(&'static str),
    /// A reading out of the models' range.
    #[error("the {what} is {value} {unit}, and the models hold from {least} to {most}")]
    OutOfRange {
        /// Which reading.
        what: &'static str,
        /// Its value in the unit named.
        value: f64,
        /// The unit.
        unit: &'static str,
        /// The least.
        least: f64,
        /// The most.
        most: f64,
    },
    /// A section that cannot be made.
    #[error(transparent)]
    Section(#[from] SectionError),
    /// A weight and lean that no trunk would carry.
    #[error(
        "lean and weight ask {:.0} kN·m of a trunk that carries {:.0}: one of them is mis-measured",
        .asked.value() / 1000.0, .carried.value() / 1000.0
    )]
    MoreThanTheTrunkCarries {
        /// What they ask.
        asked: Moment,
        /// What the trunk carries.
        carried: Moment,
    },
    /// Something seen at the tree that no sum covers.
    #[error("{0}: no sum here covers it")]
    Condition(&'static str),
}

/// One tree in plain numbers.
#[derive(Debug, Clone, PartialEq)]
pub struct Model {
    pub(crate) wood: Wood,
    pub(crate) stem: Stem,
    pub(crate) height: Option<f64>,
    pub(crate) crown: Option<CrownBody>,
    pub(crate) wind: f64,
    pub(crate) two_masses: Option<(f64, f64)>,
    pub(crate) concern: Option<CannotSay>,
    tree: Tree,
    /// The side the weight stands on, so that a tree and its mirror image have mirrored cases.
    hand: f64,
    stump_spread: (f64, f64),
}

/// The crown as a body in the wind.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct CrownBody {
    pub base: f64,
    pub length: f64,
    pub width: f64,
    pub coefficient: f64,
}

/// One case of a tree.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct CaseTree {
    pub stem: f64,
    pub crown: f64,
    pub mass: f64,
    pub forward: f64,
    pub right: f64,
    pub height: f64,
    /// About the stump; none where no stem is known.
    pub inertia: Option<f64>,
}

impl CaseTree {
    pub(crate) fn weight(&self) -> f64 {
        self.mass * GRAVITY
    }

    pub(crate) fn load(&self, extra: f64) -> Load {
        Load {
            weight: self.weight(),
            forward: self.forward,
            extra,
        }
    }
}

#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Tree {
    Built(Parts, Axis),
    Weighed(Scale, Option<Parts>),
}

/// Masses of stem and crown.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Parts {
    pub stem: f64,
    pub crown: f64,
    pub stem_height: f64,
    pub crown_height: f64,
    pub top: f64,
    pub gyration: f64,
    pub mass_doubt: f64,
    pub dbh_doubt: f64,
}

/// The leaning axis and the crown's offset from it, along and across the lay.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Axis {
    pub lean: f64,
    pub lean_spread: f64,
    pub turn: f64,
    pub turn_spread: f64,
    pub crown: (f64, f64),
    pub crown_spread: (f64, f64),
}

/// A weight known from elsewhere.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Scale {
    pub mass: f64,
    pub mass_doubt: f64,
    pub offset: f64,
    pub offset_spread: f64,
    pub turn: f64,
    pub height: f64,
}

impl Model {
    /// The tree in plain numbers.
    ///
    /// # Errors
    /// Every reason why it cannot be said, in a fixed order.
    pub fn new(input: &TreeInput) -> Result<Self, Vec<CannotSay>> {
        let mut reasons = Vec::new();
        let stem = stump(input).map_err(|reason| reasons.push(reason)).ok();
        let tree = tree(input).map_err(|more| reasons.extend(more)).ok();
        let (Some(stem), Some(tree)) = (stem, tree) else {
            return Err(reasons);
        };
        let crown = crown_body(input);
        let mut model = Self {
            wood: input.wood_values(),
            stump_spread: (
                spread(input.stump_along) / stem.along().value(),
                spread(input.stump_across) / stem.across().value(),
            ),
            stem,
            height: input.height.map(Length::value),
            wind: wind_moment(input, crown),
            crown,
            two_masses: two_masses(input),
            concern: None,
            tree,
            hand: 1.0,
        };
        if model.central().right < 0.0 {
            model.hand = -1.0;
        }
        model.concern = model.overload().or_else(|| condition(input));
        Ok(model)
    }

    /// The tree by its central readings.
    pub(crate) fn central(&self) -> CaseTree {
        self.case(&[0.0; DIMENSIONS])
    }

    /// The tree with its readings off by so many standard deviations each.
    #[inline]
    pub(crate) fn case(&self, normals: &Normals) -> CaseTree {
        match self.tree {
            Tree::Built(parts, axis) => self.built(&parts, &axis, normals),
            Tree::Weighed(scale, parts) => self.weighed(&scale, parts, normals),
        }
    }

    fn built(&self, parts: &Parts, axis: &Axis, normals: &Normals) -> CaseTree {
        let (stem, crown) = parts.masses(normals);
        let mass = stem + crown;
        let lean = axis.lean + axis.lean_spread * normals[draw::LEAN];
        let turn = axis.turn + self.hand * axis.turn_spread * normals[draw::TOWARD];
        let (sine, cosine) = libm::sincos(turn);
        let height = (stem * parts.stem_height + crown * parts.crown_height) / mass;
        let shift = height * libm::tan(lean);
        let share = crown / mass;
        let forward = axis.crown.0 + axis.crown_spread.0 * normals[draw::CROWN_FORWARD];
        let right = axis.crown.1 + self.hand * axis.crown_spread.1 * normals[draw::CROWN_RIGHT];
        CaseTree {
            stem,
            crown,
            mass,
            forward: shift * cosine + share * forward,
            right: shift * sine + share * right,
            height,
            inertia: Some(parts.inertia(stem, crown)),
        }
    }

    fn weighed(&self, scale: &Scale, parts: Option<Parts>, normals: &Normals) -> CaseTree {
        let mass = scale.mass * libm::exp(scale.mass_doubt * normals[draw::MASS]);
        let offset = scale.offset + scale.offset_spread * normals[draw::LEAN];
        let (sine, cosine) = libm::sincos(scale.turn);
        let (stem, crown) = parts.map_or((mass, 0.0), |parts| {
            let factor = mass / (parts.stem + parts.crown);
            (parts.stem * factor, parts.crown * factor)
        });
        CaseTree {
            stem,
            crown,
            mass,
            forward: offset * cosine,
            right: offset * sine,
            height: scale.height,
            inertia: parts.map(|parts| parts.inertia(stem, crown)),
        }
    }

    /// Diameters along and across the lay in a case.
    pub(super) fn diameters(&self, normals: &Normals) -> (f64, f64) {
        let off = normals[draw::STUMP];
        (
            self.stem.along().value() * (1.0 + self.stump_spread.0 * off),
            self.stem.across().value() * (1.0 + self.stump_spread.1 * off),
        )
    }

    fn overload(&self) -> Option<CannotSay> {
        let tree = self.central();
        let asked = tree.weight() * libm::hypot(tree.forward, tree.right);
        let whole = self.stem.whole().ok()?;
        let carried = TRUNK_SHARE * self.wood.mor.value() * whole.modulus().value();
        (asked >= carried).then(|| CannotSay::MoreThanTheTrunkCarries {
            asked: Moment::si(asked),
            carried: Moment::si(carried),
        })
    }

    /// Changes of the demand about a centroid, up and down, at one-sided 95 % of each doubt, put
    /// together as the root of the sum of squares.
    pub(super) fn demand_doubt(&self, of: impl Fn(&CaseTree) -> f64) -> (f64, f64) {
        let central = of(&self.central());
        let (mut up, mut down) = (self.wind * self.wind, self.wind * self.wind);
        let groups: [&[usize]; 4] = [
            &[draw::LEAN],
            &[draw::MASS, draw::DBH],
            &[draw::CROWN_FORWARD],
            &[draw::CROWN_RIGHT, draw::TOWARD],
        ];
        for doubt in groups.into_iter().flatten() {
            let mut most = 0.0_f64;
            let mut least = 0.0_f64;
            for sign in [-1.0, 1.0] {
                let mut normals = [0.0; DIMENSIONS];
                normals[*doubt] = sign * ONE_SIDED_95;
                let change = of(&self.case(&normals)) - central;
                most = most.max(change);
                least = least.min(change);
            }
            up += most * most;
            down += least * least;
        }
        (up.sqrt(), down.sqrt())
    }
}

impl Parts {
    #[inline]
    fn masses(&self, normals: &Normals) -> (f64, f64) {
        let total = (self.stem + self.crown)
            * libm::exp(
                self.mass_doubt * normals[draw::MASS]
                    + MASS_BY_DIAMETER * self.dbh_doubt * normals[draw::DBH],
            );
        let share = self.crown / (self.stem + self.crown)
            * libm::exp(CROWN_SHARE_DOUBT * normals[draw::CROWN_SHARE]);
        let share = share.min(0.95);
        (total * (1.0 - share), total * share)
    }

    #[inline]
    fn inertia(&self, stem: f64, crown: f64) -> f64 {
        stem * 2.0 * self.top * self.top / ((PROFILE + 2.0) * (PROFILE + 3.0))
            + crown * (self.crown_height * self.crown_height + self.gyration * self.gyration)
    }
}
