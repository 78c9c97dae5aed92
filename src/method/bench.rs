//! One tree on the bench: cuts are laid on it and judged by what the methods ask. It knows no
//! method's own rule.

use crate::figures::{AtCommit, CaseTree, Cuts, Stretch, at_commit, cautious_extras, stretch};
use crate::figures::{Layout, Model, Release, TreeInput, WorstCase, worst_case};
use crate::mechanics::holding::{Demand, Faced};
use crate::mechanics::splitting::Strength;
use crate::mechanics::strap::thickness_min_of;
use crate::method::judgement::Judgement;
use crate::method::words::{on_tape, ratio_reaches, tape_above, tape_below};
use crate::plan::step::MethodName;
use crate::simulate::Stump;
use crate::units::{Angle, Force, Length, Moment};

/// The face's opening where the plan gives none. Source: open faces of 70 degrees and more
/// (opened in several rule sets).
const OPENING: Angle = Angle::deg(70.0);
/// The back cut's height above the apex where the plan gives none. Source: an inch and more
/// (opened in several rule sets).
const BACK_CUT_HEIGHT: Length = Length::cm(3.0);
/// The side lean from which it is said. Source: our judgement.
const SIDE_LEAN_SAID: Angle = Angle::deg(2.0);
/// The width to which a commit is solved, metres.
const WIDTH: f64 = 1.0e-9;

/// A tree on the bench.
pub(super) struct Bench<'a> {
    pub input: &'a TreeInput,
    pub model: &'a Model,
    pub table: &'a Judgement,
    pub tree: CaseTree,
}

/// A list of cuts, judged.
#[derive(Debug, Clone, Copy)]
pub(super) struct Assessed {
    pub layout: Layout,
    pub worst: WorstCase,
    /// Best estimate at commit.
    pub best: AtCommit,
    /// Centroid of the planned hinge.
    pub centroid: f64,
    /// What the planned hinge holds.
    pub hold: f64,
    /// Best demand about it.
    pub demand: f64,
    /// The stretch at the central demand and the slow rate.
    pub central: Option<Stretch>,
}

impl<'a> Bench<'a> {
    pub(super) fn new(input: &'a TreeInput, model: &'a Model, table: &'a Judgement) -> Self {
        Self {
            input,
            model,
            table,
            tree: model.central(),
        }
    }

    /// The diameter along the lay.
    pub(super) fn diameter(&self) -> f64 {
        self.model.stem.along().value()
    }

    /// Whether the crew calls it large.
    pub(super) fn large(&self) -> bool {
        (self.diameter() * 1000.0).round() >= (self.input.large.value() * 1000.0).round()
    }

    /// The lean of the weight.
    pub(super) fn lean(&self) -> f64 {
        libm::atan2(
            libm::hypot(self.tree.forward, self.tree.right),
            self.tree.height,
        )
    }

    /// The nose's width; none without a saw.
    pub(super) fn nose(&self) -> Option<f64> {
        self.input.saw.map(|saw| saw.nose.value())
    }

    /// The deepest face that every active rule set allows, at most a third; or the plan's own.
    pub(super) fn deepest_face(&self) -> f64 {
        self.input.overrides.face_depth.map_or_else(
            || tape_below(self.diameter() * self.input.face_share_max.clamp(0.0, 1.0 / 3.0)),
            Length::value,
        )
    }

    /// A face of a share of the diameter; or the plan's own.
    pub(super) fn face_of(&self, share: f64) -> f64 {
        self.input.overrides.face_depth.map_or_else(
            || tape_below(self.diameter() * share.min(self.input.face_share_max)),
            Length::value,
        )
    }

    /// A hinge of a share of the diameter; or the plan's own.
    pub(super) fn hinge_of(&self, share: f64) -> f64 {
        self.input.overrides.hinge.map_or_else(
            || on_tape((self.diameter() * share).min(self.table.hinge_max.value())),
            Length::value,
        )
    }

    /// The shares of the diameter that hinges are tried at, the thickest first.
    pub(super) fn hinge_shares(&self) -> Vec<f64> {
        let most = (self.table.hinge_share * 100.0).round() as i32;
        let least = (self.table.hinge_share_min * 100.0).round() as i32;
        (least..=most.max(least))
            .rev()
            .map(|hundredths| f64::from(hundredths) / 100.0)
            .collect()
    }

    /// The cuts of a method with a face, a hinge and a way the rear is left.
    pub(super) fn layout(
        &self,
        method: MethodName,
        depths: (f64, f64),
        release: Release,
    ) -> Layout {
        let (face, hinge) = depths;
        Layout {
            method,
            face_depth: Length::si(face),
            opening: self.input.overrides.opening.unwrap_or(OPENING),
            hinge: Length::si(hinge),
            back_cut_height: self
                .input
                .overrides
                .back_cut_height
                .unwrap_or(BACK_CUT_HEIGHT),
            strap: self
                .input
                .overrides
                .strap
                .unwrap_or_else(|| Length::si(self.strap(face, hinge))),
            release,
        }
    }

    /// The strap for the demand's cautious end.
    fn strap(&self, face: f64, hinge: f64) -> f64 {
        let shape = self.model.stem.shape();
        let faced = Faced::new(shape, face, None);
        let centroid = faced.ligament(hinge.min(faced.whole())).centroid;
        let (up, _) = cautious_extras(self.model, centroid);
        let mor = self.model.wood.mor.value();
        tape_above(thickness_min_of(
            (shape, face, hinge),
            mor,
            self.tree.load(up),
        ))
    }

    /// A back cut from the rear with the deepest face, its hinge thinned until the worst credible
    /// ratio of the hinge alone reaches 1.
    pub(super) fn plain(&self, method: MethodName) -> Layout {
        let face = self.deepest_face();
        let mut hinge = self.hinge_of(self.table.hinge_share);
        for share in self.hinge_shares() {
            hinge = self.hinge_of(share);
            let alone = self.layout(method, (face, hinge), Release::Strap);
            let worst = worst_case(self.input, self.model, &alone);
            if ratio_reaches(worst.split_ratio, 1.0) {
                break;
            }
        }
        self.layout(method, (face, hinge), Release::FromRear)
    }

    pub(super) fn assess(&self, layout: Layout) -> Assessed {
        let cuts = Cuts::of(&layout);
        let faced = cuts.faced(self.model.stem.shape());
        let strength = Strength::of(&self.model.wood);
        let load = self.tree.load(0.0);
        let best = at_commit(&faced, &cuts, &strength, (load, WIDTH));
        let hinge = faced.ligament(cuts.hinge.min(faced.whole()));
        Assessed {
            layout,
            worst: worst_case(self.input, self.model, &layout),
            best,
            centroid: hinge.centroid,
            hold: strength.mor * hinge.modulus,
            demand: load.about(hinge.centroid),
            central: match cuts.release {
                Release::Strap => None,
                Release::FromRear | Release::Tongue { .. } => stretch(
                    self.input,
                    self.model,
                    (&faced, cuts.hinge),
                    (load, best.commit),
                ),
            },
        }
    }
}

impl Assessed {
    /// Whether the side lean asks too much of the hinge; a sentence where it does.
    pub(super) fn side_refusal(&self) -> Option<String> {
        let ratio = self.worst.side_ratio?;
        (!ratio_reaches(ratio, 1.0)).then(|| {
            format!(
                "at worst the hinge has only {ratio:.2} of the side strength that the side lean asks: set a line on the side away from the lean, or choose a lay nearer to the lean"
            )
        })
    }

    /// What a side lean asks, in a sentence, from the lean at which it is worth saying.
    pub(super) fn side_reason(&self, bench: &Bench<'_>) -> Option<String> {
        let lean = libm::atan2(bench.tree.right, bench.tree.height);
        let ratio = self.worst.side_ratio?;
        let wanted = bench.table.side_ratio_wanted;
        let worth = lean.abs() >= SIDE_LEAN_SAID.value() || !ratio_reaches(ratio, wanted);
        worth.then(|| {
            let side = if lean < 0.0 { "left" } else { "right" };
            format!(
                "the weight leans {:.1} deg to the {side} of the lay: at worst the hinge has {ratio:.2} times the side strength asked; wedge or line on that side, and nobody stands under it",
                lean.abs().to_degrees()
            )
        })
    }

    /// Whether only the demand's back end is negative: a wedge goes in before the hinge.
    pub(super) fn wants_wedge(&self) -> bool {
        self.demand >= 0.0 && self.worst.demand_back.value() < 0.0
    }
}

/// The virtual stump of a tree by its central readings.
pub(super) fn stump_of_model(input: &TreeInput, model: &Model, table: &Judgement) -> Stump {
    let tree = model.central();
    let nose = input.saw.map_or(Length::ZERO, |saw| saw.nose);
    Stump {
        stem: model.stem.clone(),
        wood: model.wood,
        demand: Demand {
            weight: Force::si(tree.weight()),
            forward: Length::si(tree.forward),
            extra: Moment::ZERO,
        },
        wedge_room: nose + table.wedge_room,
    }
}
