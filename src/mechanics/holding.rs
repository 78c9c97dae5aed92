//! What the standing wood holds against bending, and the ligament at which a tree commits.
//! It never counts the wood's plastic reserve twice: the modulus of rupture already holds it.

use crate::mechanics::root;
use crate::mechanics::section::{Ellipse, Section, SectionError, Shape, Stem, Sums};
use crate::units::{Force, FractureEnergy, Length, Moment, Stress};

/// The share of the holding moment at which the tree first moves.
/// Source: green fibre stress at the proportional limit over the modulus of rupture,
/// 10,200/17,600 = 0.58, from the specific-gravity regressions of the Forest Products Laboratory
/// (opened in a reprint).
pub const FIRST_MOVEMENT: f64 = 0.58;

/// The strength of one wood, as the models use it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Wood {
    /// Modulus of rupture, green.
    pub mor: Stress,
    /// Modulus of elasticity, green.
    pub moe: Stress,
    /// Fracture energy of an opening crack along the grain.
    pub g1c: FractureEnergy,
    /// Fracture energy of a sliding crack along the grain.
    pub g2c: FractureEnergy,
}

/// What the tree asks of its stump, about the stump's centre.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Demand {
    /// The tree's weight.
    pub weight: Force,
    /// Its centre of weight, forward of the stump's centre.
    pub forward: Length,
    /// A moment beside the weight's, forward positive: wind, or doubt.
    pub extra: Moment,
}

impl Demand {
    /// The demand about the centroid of the standing wood.
    ///
    /// # Model
    /// `W (x_cg − x̄) + M_extra`; negative where the tree sits back.
    /// # Valid for
    /// A tree at rest.
    /// # Source
    /// Statics.
    pub fn about(&self, centroid: Length) -> Moment {
        self.weight * (self.forward - centroid) + self.extra
    }
}

/// The moment the standing wood holds.
///
/// # Model
/// `MOR · S`, with the elastic section modulus.
/// # Valid for
/// Clear green wood of the stump; knots, rot and frost are flags, not numbers.
/// # Source
/// The definition of the modulus of rupture (Wood Handbook, chapter 5).
pub fn hold_moment(section: &Section, mor: Stress) -> Moment {
    mor * section.modulus()
}

/// The standing wood of a plain back cut: what is left behind the face.
///
/// # Model
/// The strip from the ligament's rear edge to the face's apex.
/// # Valid for
/// Level, parallel cuts.
/// # Errors
/// [`SectionError::Empty`] where no wood is left.
/// # Source
/// Geometry.
pub fn ligament_section(
    stem: &Stem,
    face_depth: Length,
    ligament: Length,
) -> Result<Section, SectionError> {
    let apex = stem.along() * 0.5 - face_depth;
    stem.strip(apex - ligament, apex)
}

/// The ligament at which the demand meets a share of what the wood holds: 0.58 where it first
/// moves, 1 where it commits. Zero where the tree never does; the whole where it does at once.
///
/// # Model
/// `k·MOR·S(h) = W (x_cg − x̄(h)) + M_extra`, solved for `h`.
/// # Valid for
/// A plain back cut, slowly made.
/// # Source
/// Derived; checked by the worked examples in the tests.
pub fn meets_at(cut: &FacedStem<'_>, wood: &Wood, demand: &Demand, share: f64) -> Length {
    let faced = cut.plain();
    let load = Load::of(demand);
    let limit = share * wood.mor.value();
    Length::si(faced.meets(limit, load, 1.0e-13))
}

/// A stem with its face, before the back cut.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FacedStem<'a> {
    /// The stem.
    pub stem: &'a Stem,
    /// Depth of the face's apex from the front of the wood.
    pub face_depth: Length,
}

impl<'a> FacedStem<'a> {
    pub(crate) fn plain(&self) -> Faced<'a> {
        Faced::new(self.stem.shape(), self.face_depth.value(), None)
    }
}

/// Plain numbers of [`Demand`].
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Load {
    pub weight: f64,
    pub forward: f64,
    pub extra: f64,
}

impl Load {
    pub(crate) const fn of(demand: &Demand) -> Self {
        Self {
            weight: demand.weight.value(),
            forward: demand.forward.value(),
            extra: demand.extra.value(),
        }
    }

    #[inline]
    pub(crate) fn about(&self, centroid: f64) -> f64 {
        self.weight * (self.forward - centroid) + self.extra
    }
}

/// A tongue left between two relieved corners: its width, and where the corners' cuts end.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Tongue {
    pub width: f64,
    pub front: f64,
}

impl Tongue {
    /// The edge behind which the outline is narrower than the tongue.
    fn narrow_from(&self, outline: Ellipse) -> f64 {
        let share = self.width / (2.0 * outline.a * outline.k);
        -outline.a * (1.0 - share * share).max(0.0).sqrt()
    }
}

/// A faced stem in plain numbers, with what lies beyond its apex and the whole kept at hand.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Faced<'a> {
    pub shape: Shape<'a>,
    pub apex: f64,
    pub beyond_apex: Sums,
    pub full: Sums,
    pub tongue: Option<Tongue>,
}

/// The wood left behind the face, in plain numbers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Ligament {
    pub sums: Sums,
    pub centroid: f64,
    pub modulus: f64,
    pub rear: f64,
    pub width: f64,
}

impl<'a> Faced<'a> {
    pub(crate) fn new(shape: Shape<'a>, face_depth: f64, tongue: Option<Tongue>) -> Self {
        let apex = shape.ellipse.a - face_depth;
        Self {
            shape,
            apex,
            beyond_apex: shape.beyond(apex),
            full: shape.beyond(-shape.ellipse.a),
            tongue,
        }
    }

    /// The largest ligament: no back cut at all.
    pub(crate) fn whole(&self) -> f64 {
        self.apex + self.shape.ellipse.a
    }

    /// The standing wood with this ligament.
    #[inline]
    pub(crate) fn ligament(&self, thickness: f64) -> Ligament {
        let rear = self.apex - thickness;
        let mut width = self.shape.wood_chord(rear);
        let sums = match self.tongue {
            Some(tongue) if rear < tongue.front => {
                width = width.min(tongue.width);
                let hinge = self.shape.beyond(tongue.front).minus(self.beyond_apex);
                // At the very rear the outline is narrower than the tongue.
                let narrow = tongue.narrow_from(self.shape.ellipse);
                let mut sums = hinge.plus(rectangle(rear.max(narrow), tongue.front, tongue.width));
                if rear < narrow {
                    sums = sums.plus(self.shape.strip(rear, narrow));
                }
                sums
            }
            Some(_) | None => self.shape.beyond(rear).minus(self.beyond_apex),
        };
        let centroid = sums.centroid();
        let reach = (centroid - rear).max(self.apex - centroid);
        Ligament {
            sums,
            centroid,
            modulus: sums.inline() / reach,
            rear,
            width,
        }
    }

    /// The ligament at which a stress limit times the modulus meets the load.
    pub(crate) fn meets(&self, limit: f64, load: Load, width: f64) -> f64 {
        let spare = |thickness: f64| {
            let ligament = self.ligament(thickness);
            limit * ligament.modulus - load.about(ligament.centroid)
        };
        let most = self.whole() * (1.0 - 1.0e-9);
        if most <= 0.0 {
            return 0.0;
        }
        let least = 1.0e-4 * most;
        if spare(least) >= 0.0 {
            return 0.0;
        }
        if spare(most) <= 0.0 {
            return most;
        }
        root((least, most), width, spare)
    }
}

/// A rectangle behind the hinge, about the stump's centre.
fn rectangle(from: f64, to: f64, width: f64) -> Sums {
    let length = to - from;
    let area = length * width;
    let middle = 0.5 * (from + to);
    Sums {
        area,
        x: area * middle,
        y: 0.0,
        xx: area * (middle * middle + length * length / 12.0),
        yy: area * width * width / 12.0,
    }
}
