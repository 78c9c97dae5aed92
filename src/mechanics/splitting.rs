//! The moment that runs a crack up the stem from the edge of a cut (barber chair): an energy
//! balance of the two slabs. It knows no growth stress, frost, check or rot: those are flags.

use crate::mechanics::bisect;
use crate::mechanics::holding::{Faced, FacedStem, Wood};
use crate::mechanics::section::{Stem, Sums};
use crate::units::{Area, Density, Force, FractureEnergy, Length, Moment, SecondMoment, Stress};

/// Sliding over opening fracture energy.
/// Source: tests of softwoods give 2 to 4 (from memory); three is used throughout.
pub const SLIDING_OVER_OPENING: f64 = 3.0;

/// The fracture energy of an opening crack along the grain, from the density.
///
/// # Model
/// `G_Ic = 1.04·ρ − 146 J/m²`, ρ at 12 % moisture; never below zero.
/// # Valid for
/// Within 35 %; best for softwoods of 300 to 500 kg/m³.
/// # Source
/// Larsen and Gustafsson 1990, CIB-W18A/23-19-2 (from memory).
pub fn fracture_energy(density_12: Density) -> FractureEnergy {
    FractureEnergy::si((1.04 * density_12.value() - 146.0).max(0.0))
}

/// What a crack up the stem would release.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Release {
    /// All of it.
    pub total: FractureEnergy,
    /// The opening part.
    pub opening: FractureEnergy,
    /// The sliding part.
    pub sliding: FractureEnergy,
}

/// One of the two parts that a crack divides.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Slab {
    /// Its area.
    pub area: Area,
    /// Its centroid, forward of the stump's centre.
    pub forward: Length,
    /// Second moment about its own centroid, along the lay.
    pub i_inline: SecondMoment,
}

/// The parts of the section that a crack from a cut's edge would divide.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Slabs {
    pub(crate) front: Sums,
    pub(crate) back: Sums,
    pub(crate) full: Sums,
    pub(crate) width: f64,
}

impl Slabs {
    /// The slabs before and behind an edge of a cut, with the crack's width there.
    pub fn at_edge(stem: &Stem, edge: Length) -> Self {
        let shape = stem.shape();
        let front = shape.beyond(edge.value());
        let full = shape.beyond(-shape.ellipse.a);
        Self {
            front,
            back: full.minus(front),
            full,
            width: shape.wood_chord(edge.value()),
        }
    }

    /// The front slab, where it has any wood.
    pub fn front(&self) -> Option<Slab> {
        Slab::of(self.front)
    }

    /// The back slab, where it has any wood.
    pub fn back(&self) -> Option<Slab> {
        Slab::of(self.back)
    }

    /// The crack's width.
    pub fn width(&self) -> Length {
        Length::si(self.width)
    }

    /// What a moment would release.
    ///
    /// # Model
    /// `G = M²/(2Eb)·(1/I_f − 1/I_0)`, opening part with `1/(I_f + I_b)` for `1/I_0`.
    /// # Valid for
    /// A crack long against the face's height, level cuts, a stem with straight grain.
    /// # Source
    /// Beam energy; the parting of modes after Williams 1988; checked by finite elements.
    pub fn release(&self, wood: &Wood, moment: Moment) -> Release {
        let factor =
            moment.value() * moment.value() / (2.0 * wood.moe.value() * self.width.max(1.0e-12));
        let (opening, sliding) = self.flexibility();
        Release {
            total: FractureEnergy::si(factor * (opening + sliding)),
            opening: FractureEnergy::si(factor * opening),
            sliding: FractureEnergy::si(factor * sliding),
        }
    }

    /// What a moment would release with the tree's weight in the slab, a smaller figure.
    ///
    /// # Model
    /// `M_f = M − W x̄_f`, `G = [M_f²/I_f − M²/I_0 + W²(1/A_f − 1/A_0)]/(2Eb)`.
    /// # Valid for
    /// As [`Slabs::release`]; leaving it out is the careful side.
    /// # Source
    /// Derived from the same balance.
    pub fn release_with_weight(
        &self,
        wood: &Wood,
        moment: Moment,
        weight: Force,
    ) -> FractureEnergy {
        let m = moment.value();
        let w = weight.value();
        let front = m - w * self.front.centroid();
        let sum = front * front / self.front.inline() - m * m / self.full.inline()
            + w * w * (1.0 / self.front.area - 1.0 / self.full.area);
        FractureEnergy::si(sum / (2.0 * wood.moe.value() * self.width.max(1.0e-12)))
    }

    /// The moment that splits, opening and sliding weighed together.
    ///
    /// # Model
    /// `√{2Eb / [(1/I_f − 1/(I_f+I_b))/G_Ic + (1/(I_f+I_b) − 1/I_0)/G_IIc]}`.
    /// # Valid for
    /// As [`Slabs::release`]. `None` where no crack can run: no wood behind the edge.
    /// # Source
    /// Linear mixed-mode criterion (it fits propagation: Yoshihara 2013, abstract opened).
    pub fn split_moment(&self, wood: &Wood) -> Option<Moment> {
        let value = split_mixed(self, &Strength::of(wood));
        value.is_finite().then(|| Moment::si(value))
    }

    /// The moment that splits by the whole energy against the opening one: the careful figure.
    ///
    /// # Model
    /// `√[2Eb G_Ic/(1/I_f − 1/I_0)]`.
    /// # Valid for
    /// As [`Slabs::release`].
    /// # Source
    /// The way of EN 1995-1-1, 6.5.2, in the limit of pure bending.
    pub fn split_moment_total(&self, wood: &Wood) -> Option<Moment> {
        pure_bending_split(
            Length::si(self.width),
            (
                SecondMoment::si(self.front.inline()),
                SecondMoment::si(self.full.inline()),
            ),
            wood.moe,
            wood.g1c,
        )
    }

    fn flexibility(&self) -> (f64, f64) {
        let front = self.front.inline();
        let back = if self.back.area > 0.0 {
            self.back.inline()
        } else {
            0.0
        };
        let both = 1.0 / (front + back);
        (1.0 / front - both, both - 1.0 / self.full.inline())
    }
}

impl Slab {
    fn of(sums: Sums) -> Option<Self> {
        (sums.area > 0.0).then(|| Self {
            area: Area::si(sums.area),
            forward: Length::si(sums.centroid()),
            i_inline: SecondMoment::si(sums.inline()),
        })
    }
}

/// The moment that runs a crack along a beam of any section under bending alone: second moments
/// of the part that goes on carrying and of the whole.
///
/// # Model
/// `√[2Eb G_c/(1/I_f − 1/I_0)]`.
/// # Valid for
/// Shear left out: of a leaning tree it is less than a thousandth. `None` where the part is the
/// whole.
/// # Source
/// Exact for pure bending; the limit of Gustafsson 1988, CIB-W18A/21-10-1, and of EN 1995-1-1,
/// 6.5.2.
pub fn pure_bending_split(
    width: Length,
    inertias: (SecondMoment, SecondMoment),
    moe: Stress,
    energy: FractureEnergy,
) -> Option<Moment> {
    let (part, whole) = inertias;
    let flexibility = 1.0 / part.value() - 1.0 / whole.value();
    let square = 2.0 * moe.value() * width.value() * energy.value() / flexibility;
    (flexibility > 0.0 && square.is_finite()).then(|| Moment::si(square.max(0.0).sqrt()))
}

/// Where holding and splitting cross.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Crossing {
    /// The ligament there.
    pub ligament: Length,
    /// The moment there: a demand above it splits the stem in a plain back cut.
    pub moment: Moment,
}

/// Where holding and splitting cross, the first time the ligament grows from nothing.
///
/// # Model
/// `M_split(h) = MOR·S(h)`, first crossing from a thin ligament upward.
/// # Valid for
/// A plain back cut. `None` where they do not cross: the hinge always bends first.
/// # Source
/// Derived; checked by the worked examples in the tests.
pub fn crossing(cut: &FacedStem<'_>, wood: &Wood) -> Option<Crossing> {
    let faced = cut.plain();
    let strength = Strength::of(wood);
    let ligament = crossing_of(&faced, &strength)?;
    Some(Crossing {
        ligament: Length::si(ligament),
        moment: Moment::si(strength.mor * faced.ligament(ligament).modulus),
    })
}

/// How finely the first crossing is looked for, steps over the whole ligament.
const CROSSING_STEPS: i32 = 200;

pub(crate) fn crossing_of(faced: &Faced<'_>, strength: &Strength) -> Option<f64> {
    let whole = faced.whole();
    if whole <= 0.0 {
        return None;
    }
    let spare = |thickness: f64| {
        let ligament = faced.ligament(thickness);
        split_at(faced, thickness, strength) - strength.mor * ligament.modulus
    };
    let mut below = whole / f64::from(CROSSING_STEPS);
    if spare(below) <= 0.0 {
        return None;
    }
    for step in 2..CROSSING_STEPS {
        let above = whole * f64::from(step) / f64::from(CROSSING_STEPS);
        if spare(above) <= 0.0 {
            return Some(bisect(below, above, spare));
        }
        below = above;
    }
    None
}

/// Plain numbers of [`Wood`].
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Strength {
    pub mor: f64,
    pub moe: f64,
    pub g1c: f64,
    pub g2c: f64,
}

impl Strength {
    pub(crate) const fn of(wood: &Wood) -> Self {
        Self {
            mor: wood.mor.value(),
            moe: wood.moe.value(),
            g1c: wood.g1c.value(),
            g2c: wood.g2c.value(),
        }
    }
}

/// The splitting moment of a plain back cut with this ligament; infinite where no crack can run.
#[inline]
pub(crate) fn split_at(faced: &Faced<'_>, thickness: f64, strength: &Strength) -> f64 {
    let rear = faced.apex - thickness;
    let front = faced.shape.beyond(rear);
    let mut width = faced.shape.wood_chord(rear);
    if let Some(tongue) = faced.tongue
        && rear < tongue.front
    {
        width = width.min(tongue.width);
    }
    split_mixed(
        &Slabs {
            front,
            back: faced.full.minus(front),
            full: faced.full,
            width,
        },
        strength,
    )
}

/// The mixed-mode splitting moment of two slabs; infinite where no crack can run.
#[inline]
pub(crate) fn split_mixed(slabs: &Slabs, strength: &Strength) -> f64 {
    if slabs.back.area <= 0.0 || slabs.front.area <= 0.0 {
        return f64::INFINITY;
    }
    let (opening, sliding) = slabs.flexibility();
    let sum = opening / strength.g1c + sliding.max(0.0) / strength.g2c;
    (2.0 * strength.moe * slabs.width / sum).sqrt()
}
