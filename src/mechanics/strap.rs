//! The strap left at the rear after a plunge: its tension, its least thickness, and what the two
//! edges of the slot would release while it holds. It never judges the hinge after release.

use crate::mechanics::holding::{Demand, Load, Wood};
use crate::mechanics::root;
use crate::mechanics::section::{Shape, Stem, Sums};
use crate::units::{Force, FractureEnergy, Length, Moment, Stress};

/// The share of the modulus of rupture a strap may carry when its thickness is chosen.
/// Source: derived with the model; half, for knots, rot and uneven cuts.
pub const WORKING_SHARE: f64 = 0.5;
/// How much thicker than the failing thickness a strap is left. Source: as above.
pub const THICKNESS_FACTOR: f64 = 1.5;
/// The least strap as a share of the diameter along the lay.
/// Source: saw manuals leave a tenth to a fifth (opened).
pub const LEAST_SHARE_OF_DIAMETER: f64 = 0.10;

/// A hinge and a strap with the slot between them.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Slotted<'a> {
    /// The stem.
    pub stem: &'a Stem,
    /// Depth of the face's apex from the front of the wood.
    pub face_depth: Length,
    /// Thickness of the hinge.
    pub hinge: Length,
    /// Thickness of the strap, from the rear of the wood.
    pub strap: Length,
}

/// What goes on while the strap holds.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Held {
    /// The strap's tension, the hinge's own bending left out.
    pub tension: Force,
    /// Its mean stress by that tension.
    pub mean_stress: Stress,
    /// The tension with hinge and strap bending together.
    pub tension_together: Force,
    /// The hinge's share of the bending.
    pub hinge_moment: Moment,
    /// The strap's share of the bending.
    pub strap_moment: Moment,
    /// Stress of the strap's outer fibres.
    pub outer_stress: Stress,
    /// Stress of the strap's inner fibres.
    pub inner_stress: Stress,
    /// What a crack from the hinge's edge of the slot would release, an upper bound.
    pub release_front: FractureEnergy,
    /// What a crack from the strap's edge of the slot would release, an upper bound.
    pub release_back: FractureEnergy,
}

/// What goes on in stump and stem while the strap holds.
///
/// # Model
/// Tension `F = (M_tree − W x̄_h)/(x̄_h − x̄_s)`; stresses and releases with hinge and strap as
/// one section: `G = [F²/A_1 + M_1²/I_1 + F²/A_2 + M_2²/I_2 − M²/I_0]/(2Eb)` at either edge.
/// # Valid for
/// A slot right through the stem; the releases are upper bounds (finite elements give half).
/// `None` where hinge or strap has no wood.
/// # Source
/// Beam energy, derived; the worked example in the tests.
pub fn held(slot: &Slotted<'_>, wood: &Wood, demand: &Demand) -> Option<Held> {
    let parts = Parts::new(slot.stem.shape(), slot.edges());
    if parts.hinge.area <= 0.0 || parts.strap.area <= 0.0 {
        return None;
    }
    let tension = parts.tension(Load::of(demand));
    let together = parts.together(Load::of(demand));
    let (front, back) = parts.releases(&together, wood.moe.value());
    Some(Held {
        tension: Force::si(tension),
        mean_stress: Stress::si(tension / parts.strap.area),
        tension_together: Force::si(together.force),
        hinge_moment: Moment::si(together.hinge),
        strap_moment: Moment::si(together.strap),
        outer_stress: Stress::si(together.stress_at(parts.rear)),
        inner_stress: Stress::si(together.stress_at(parts.strap_edge)),
        release_front: FractureEnergy::si(front),
        release_back: FractureEnergy::si(back),
    })
}

/// The strap whose mean stress would reach a limit.
///
/// # Model
/// `F(s)/A(s) = limit`, solved for the strap's thickness `s`.
/// # Valid for
/// As [`held`]. Zero where the tree does not pull on the strap.
/// # Source
/// Derived; the worked example in the tests.
pub fn failing_thickness(slot: &Slotted<'_>, limit: Stress, demand: &Demand) -> Length {
    let (face, hinge, _) = slot.edges();
    let cut = (slot.stem.shape(), face, hinge);
    Length::si(failing(cut, limit.value(), Load::of(demand)))
}

/// The least strap to leave.
///
/// # Model
/// The larger of 1.5 times the strap failing at half the modulus of rupture, and a tenth of the
/// diameter along the lay.
/// # Valid for
/// As [`held`].
/// # Source
/// Saw manuals' tenth to fifth of the diameter (opened), with the computed figure beside it.
pub fn thickness_min(slot: &Slotted<'_>, wood: &Wood, demand: &Demand) -> Length {
    let (face, hinge, _) = slot.edges();
    let cut = (slot.stem.shape(), face, hinge);
    Length::si(thickness_min_of(cut, wood.mor.value(), Load::of(demand)))
}

impl Slotted<'_> {
    fn edges(&self) -> (f64, f64, f64) {
        (
            self.face_depth.value(),
            self.hinge.value(),
            self.strap.value(),
        )
    }
}

/// A shape with the depth of its face and the thickness of its hinge.
pub(crate) type CutShape<'a> = (Shape<'a>, f64, f64);

pub(crate) fn thickness_min_of(cut: CutShape<'_>, mor: f64, load: Load) -> f64 {
    let (shape, face, hinge) = cut;
    let least = LEAST_SHARE_OF_DIAMETER * 2.0 * shape.ellipse.a;
    let parts = Parts::new(shape, (face, hinge, least / THICKNESS_FACTOR));
    if parts.tension(load) <= WORKING_SHARE * mor * parts.strap.area {
        return least;
    }
    THICKNESS_FACTOR * failing(cut, WORKING_SHARE * mor, load)
}

fn failing(cut: CutShape<'_>, limit: f64, load: Load) -> f64 {
    let (shape, face, hinge) = cut;
    let spare = |thickness: f64| {
        let parts = Parts::new(shape, (face, hinge, thickness));
        limit * parts.strap.area - parts.tension(load)
    };
    let diameter = 2.0 * shape.ellipse.a;
    let most = diameter - face - hinge;
    let least = 1.0e-6 * diameter;
    if most <= least || spare(least) >= 0.0 {
        return 0.0;
    }
    if spare(most) <= 0.0 {
        return most;
    }
    root((least, most), 1.0e-12, spare)
}

/// Sections of the slotted stump in plain numbers.
pub(crate) struct Parts {
    pub hinge: Sums,
    pub strap: Sums,
    pub full: Sums,
    front: Sums,
    rest: Sums,
    hinge_width: f64,
    strap_width: f64,
    strap_edge: f64,
    rear: f64,
}

/// Hinge and strap bending as one section.
pub(crate) struct Together {
    pub force: f64,
    hinge: f64,
    strap: f64,
    moment: f64,
    pub centroid: f64,
    pub inertia: f64,
}

impl Together {
    fn stress_at(&self, x: f64) -> f64 {
        self.moment * (self.centroid - x) / self.inertia
    }
}

impl Parts {
    /// The sections left by a face, a hinge and a strap of these depths and thicknesses.
    pub(crate) fn new(shape: Shape<'_>, edges: (f64, f64, f64)) -> Self {
        let (face, hinge, strap) = edges;
        let a = shape.ellipse.a;
        let apex = a - face;
        let hinge_edge = apex - hinge;
        let strap_edge = -a + strap;
        let full = shape.beyond(-a);
        let front = shape.beyond(hinge_edge);
        let rest = shape.beyond(strap_edge);
        Self {
            hinge: front.minus(shape.beyond(apex)),
            strap: full.minus(rest),
            full,
            front,
            rest,
            hinge_width: shape.wood_chord(hinge_edge),
            strap_width: shape.wood_chord(strap_edge),
            strap_edge,
            rear: -a,
        }
    }

    /// The strap's tension, the hinge's own bending left out.
    pub(crate) fn tension(&self, load: Load) -> f64 {
        let hinge = self.hinge.centroid();
        (load.about(hinge) / (hinge - self.strap.centroid())).max(0.0)
    }

    pub(crate) fn together(&self, load: Load) -> Together {
        let both = self.hinge.plus(self.strap);
        let centroid = both.centroid();
        let inertia = both.inline();
        let moment = load.about(centroid);
        Together {
            force: moment * self.strap.area * (centroid - self.strap.centroid()) / inertia,
            hinge: moment * self.hinge.inline() / inertia,
            strap: moment * self.strap.inline() / inertia,
            moment,
            centroid,
            inertia,
        }
    }

    /// Releases at the hinge's edge and at the strap's edge of the slot.
    pub(crate) fn releases(&self, together: &Together, moe: f64) -> (f64, f64) {
        let force = together.force;
        let whole = together.moment * together.moment / self.full.inline();
        let part =
            |sums: &Sums, moment: f64| force * force / sums.area + moment * moment / sums.inline();
        let back = self.full.minus(self.front);
        let front_moment = together.hinge + force * (self.hinge.centroid() - self.front.centroid());
        let back_moment = together.strap + force * (back.centroid() - self.strap.centroid());
        let at_hinge = part(&self.front, front_moment) + part(&back, back_moment) - whole;
        let rest_moment = together.hinge + force * (self.hinge.centroid() - self.rest.centroid());
        let at_strap = part(&self.rest, rest_moment) + part(&self.strap, together.strap) - whole;
        (
            (at_hinge / (2.0 * moe * self.hinge_width)).max(0.0),
            (at_strap / (2.0 * moe * self.strap_width)).max(0.0),
        )
    }
}
