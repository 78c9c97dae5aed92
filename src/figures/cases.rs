//! The 4,096 cases of one tree with one list of cuts, each figure a column. It keeps no case.

use crate::figures::input::TreeInput;
use crate::figures::layout::Layout;
use crate::figures::model::{CaseTree, Model, ONE_SIDED_95, draw};
use crate::figures::read::log_spread;
use crate::figures::sobol::{CASES, Normals, normals};
use crate::figures::worst::{COMMIT_WIDTH, Cuts, at_commit, side_ratio};
use crate::mechanics::holding::{Faced, Load};
use crate::mechanics::race::{COARSE, Course};
use crate::mechanics::rigging::PULL_FACTOR;
use crate::mechanics::section::{Ellipse, Shape};
use crate::mechanics::splitting::{Strength, crossing_of};
use crate::mechanics::strap::{Parts, thickness_min_of};
use crate::units::Angle;

/// The cuts as made, one standard deviation. Source: our judgement, with the crew's tolerances.
const HINGE_SPREAD: f64 = 0.005;
const FACE_SPREAD: f64 = 0.010;
/// Median of the modulus of rupture over its table value: the rate of loading.
const RATE_FACTOR: f64 = 1.15;
/// Coefficients of variation. Source: Wood Handbook, Table 5-6 (opened); 0.30 from memory.
const MOR_VARIATION: f64 = 0.16;
const MOE_VARIATION: f64 = 0.22;
const ENERGY_VARIATION: f64 = 0.30;
/// Median of the fracture energy over the formula's: green wood.
const ENERGY_MEDIAN: f64 = 0.8;
/// Correlation of strength and stiffness.
const CORRELATION: f64 = 0.7;
/// The tilt at the hinge that the needed rate keeps to. Source: our judgement, settable.
pub const TILT_LIMIT: Angle = Angle::deg(5.0);

/// One figure of every case.
pub(super) type Column = Vec<f64>;

/// The columns.
#[derive(Debug, Default)]
pub(super) struct Columns {
    pub mass: Column,
    pub stem: Column,
    pub crown: Column,
    pub forward: Column,
    pub right: Column,
    pub height: Column,
    pub slope: Column,
    pub inline: Column,
    pub side: Column,
    pub moment: Column,
    pub side_moment: Column,
    pub back_area: Column,
    pub commit: Column,
    pub split: Column,
    pub margin: Column,
    pub side_margin: Column,
    pub stretch: Column,
    pub stretch_area: Column,
    pub seconds: Column,
    pub to_commit: Column,
    pub rate_needed: Column,
    pub tilt: Column,
    pub tension: Column,
    pub strap: Column,
    pub lift: Column,
    pub pull: Column,
}

/// What all cases share.
pub(super) struct Setting<'a> {
    pub input: &'a TreeInput,
    pub model: &'a Model,
    pub layout: &'a Layout,
    pub lever: Option<f64>,
    mor: f64,
    moe: f64,
    energy: f64,
}

/// One case, or the best estimate.
#[derive(Debug, Clone, Copy)]
pub(super) struct Figures {
    pub tree: CaseTree,
    pub back_area: f64,
    pub commit: f64,
    pub split: f64,
    pub margin: f64,
    pub side_margin: f64,
    pub stretch: f64,
    pub stretch_area: f64,
    pub seconds: Option<f64>,
    pub to_commit: Option<f64>,
    pub rate_needed: Option<f64>,
    pub tilt: Option<f64>,
    pub tension: Option<f64>,
    pub strap: Option<f64>,
    pub lift: f64,
    pub pull: Option<f64>,
}

/// Everything of one case but the tree.
struct Made<'a> {
    shape: Shape<'a>,
    cuts: Cuts,
    strength: Strength,
    wind: f64,
    rate: Option<f64>,
}

/// How a case's race is run.
#[derive(Clone, Copy, PartialEq)]
enum Fineness {
    Best,
    Case,
}

impl<'a> Setting<'a> {
    pub(super) fn new(
        input: &'a TreeInput,
        model: &'a Model,
        layout: &'a Layout,
        lever: Option<f64>,
    ) -> Self {
        Self {
            input,
            model,
            layout,
            lever,
            mor: log_spread(MOR_VARIATION),
            moe: log_spread(MOE_VARIATION),
            energy: log_spread(ENERGY_VARIATION),
        }
    }

    /// The best estimate: central inputs, no rate factor, no wind.
    pub(super) fn best(&self) -> Figures {
        self.judge(self.model.central(), &self.planned(), Fineness::Best)
    }

    /// Every case.
    pub(super) fn run(&self) -> Columns {
        let mut columns = Columns::with_room();
        for row in normals() {
            let case = self.judge(self.model.case(row), &self.made(row), Fineness::Case);
            columns.push(&case);
        }
        columns
    }

    /// Where holding and splitting cross: best, and moments and ligaments of the cases; infinite
    /// where the hinge always bends first.
    pub(super) fn crossings(&self) -> (Option<(f64, f64)>, Column, Column) {
        let of = |made: &Made<'_>| {
            let faced = Faced::new(made.shape, made.cuts.face, None);
            crossing_of(&faced, &made.strength).map(|thickness| {
                (
                    thickness,
                    made.strength.mor * faced.ligament(thickness).modulus,
                )
            })
        };
        let (mut moments, mut ligaments) = (Vec::new(), Vec::new());
        for row in normals() {
            let crossing = of(&self.made(row)).unwrap_or((f64::INFINITY, f64::INFINITY));
            ligaments.push(crossing.0);
            moments.push(crossing.1);
        }
        (of(&self.planned()), moments, ligaments)
    }

    fn planned(&self) -> Made<'_> {
        Made {
            shape: self.model.stem.shape(),
            cuts: Cuts::of(self.layout),
            strength: Strength::of(&self.model.wood),
            wind: 0.0,
            rate: self.input.saw.map(|saw| saw.rate.value.value()),
        }
    }

    fn made(&self, row: &Normals) -> Made<'_> {
        let base = Strength::of(&self.model.wood);
        let mor = row[draw::MOR];
        let moe = CORRELATION * mor + (1.0 - CORRELATION * CORRELATION).sqrt() * row[draw::MOE];
        let energy = ENERGY_MEDIAN * libm::exp(self.energy * row[draw::ENERGY]);
        let (along, across) = self.model.diameters(row);
        let along = along.max(0.2 * self.model.stem.along().value());
        let across = across.max(0.2 * self.model.stem.across().value());
        let planned = Cuts::of(self.layout);
        Made {
            shape: Shape {
                ellipse: Ellipse {
                    a: 0.5 * along,
                    k: across / along,
                },
                holes: self.model.stem.holes(),
            },
            cuts: Cuts {
                face: (planned.face + FACE_SPREAD * row[draw::FACE]).clamp(0.0, 0.95 * along),
                hinge: (planned.hinge + HINGE_SPREAD * row[draw::HINGE]).max(0.002),
                release: planned.release,
            },
            strength: Strength {
                mor: base.mor * RATE_FACTOR * libm::exp(self.mor * mor),
                moe: base.moe * libm::exp(self.moe * moe),
                g1c: base.g1c * energy,
                g2c: base.g2c * energy,
            },
            wind: self.model.wind / ONE_SIDED_95 * row[draw::WIND],
            rate: self.input.saw.map(|saw| {
                let rate = saw.rate.value.value();
                (rate + saw.rate.spread.value().abs() * row[draw::RATE]).max(0.1 * rate)
            }),
        }
    }

    fn judge(&self, tree: CaseTree, made: &Made<'_>, fineness: Fineness) -> Figures {
        let width = match fineness {
            Fineness::Best => 1.0e-13,
            Fineness::Case => COMMIT_WIDTH,
        };
        let faced = made.cuts.faced(made.shape);
        let plain = Faced {
            tongue: None,
            ..faced
        };
        let load = tree.load(made.wind);
        let at = at_commit(&faced, &made.cuts, &made.strength, (load, width));
        let hinge = made.cuts.hinge.min(faced.whole());
        let standing = plain.ligament(hinge);
        let hold = made.strength.mor * standing.modulus;
        let sideways = tree.weight() * tree.right;
        let back_area = (faced.full.area - faced.beyond_apex.area - standing.sums.area).max(0.0);
        let stretch_area = if at.commit > hinge {
            (faced.ligament(at.commit).sums.area - faced.ligament(hinge).sums.area).max(0.0)
        } else {
            0.0
        };
        let race = self.race(&tree, made, (&faced, &at.commit, fineness));
        let per_rate = |area: f64| made.rate.map(|rate| area / rate);
        let behind = standing.centroid - tree.forward;
        let (tension, strap) = self.strap(made, load);
        Figures {
            back_area,
            commit: at.commit,
            split: at.split_ratio,
            margin: at.margin,
            side_margin: side_ratio(&plain, hinge, made.strength.mor, sideways),
            stretch: (at.commit - hinge).max(0.0),
            stretch_area,
            seconds: per_rate(stretch_area),
            to_commit: per_rate((back_area - stretch_area).max(0.0)),
            rate_needed: race.0,
            tilt: race.1,
            tension,
            strap,
            lift: (2.0 * made.shape.ellipse.a - made.cuts.face) * behind / tree.height,
            pull: self.lever.map(|lever| {
                let moment = tree.weight() * behind + hold - made.wind;
                (PULL_FACTOR * moment / lever).max(0.0)
            }),
            tree,
        }
    }

    /// The needed rate (zero where there is no race) and the tilt (infinite past 90 degrees).
    fn race(
        &self,
        tree: &CaseTree,
        made: &Made<'_>,
        start: (&Faced<'_>, &f64, Fineness),
    ) -> (Option<f64>, Option<f64>) {
        let (faced, commit, fineness) = start;
        let (Some(inertia), Some(rate)) = (tree.inertia, made.rate) else {
            return (None, None);
        };
        if *commit <= made.cuts.hinge {
            return (Some(0.0), Some(0.0));
        }
        let course = Course {
            mor: made.strength.mor,
            load: tree.load(made.wind),
            height: tree.height,
            inertia,
            rate,
            commit: *commit,
            hinge: made.cuts.hinge,
        };
        let (needed, step) = match fineness {
            Fineness::Best => (
                course
                    .rate_needed(faced, TILT_LIMIT.value())
                    .map(|rate| rate.0),
                0.02,
            ),
            Fineness::Case => (course.rate_needed_small(faced, TILT_LIMIT.value()), COARSE),
        };
        let tilt = course.run(faced, step).tilt.unwrap_or(f64::INFINITY);
        (Some(needed.unwrap_or(0.0)), Some(tilt))
    }

    /// The strap's tension as planned, and its least thickness.
    fn strap(&self, made: &Made<'_>, load: Load) -> (Option<f64>, Option<f64>) {
        let (face, hinge) = (made.cuts.face, made.cuts.hinge);
        let parts = Parts::new(made.shape, (face, hinge, self.layout.strap.value()));
        if parts.hinge.area <= 0.0 || parts.strap.area <= 0.0 {
            return (None, None);
        }
        (
            Some(parts.tension(load)),
            Some(thickness_min_of(
                (made.shape, face, hinge),
                made.strength.mor,
                load,
            )),
        )
    }
}

impl Columns {
    fn with_room() -> Self {
        let column = || Vec::with_capacity(CASES);
        Self {
            mass: column(),
            stem: column(),
            crown: column(),
            forward: column(),
            right: column(),
            height: column(),
            slope: column(),
            inline: column(),
            side: column(),
            moment: column(),
            side_moment: column(),
            back_area: column(),
            commit: column(),
            split: column(),
            margin: column(),
            side_margin: column(),
            stretch: column(),
            stretch_area: column(),
            seconds: column(),
            to_commit: column(),
            rate_needed: column(),
            tilt: column(),
            tension: column(),
            strap: column(),
            lift: column(),
            pull: column(),
        }
    }

    fn push(&mut self, case: &Figures) {
        let tree = &case.tree;
        let weight = tree.weight();
        self.mass.push(tree.mass);
        self.stem.push(tree.stem);
        self.crown.push(tree.crown);
        self.forward.push(tree.forward);
        self.right.push(tree.right);
        self.height.push(tree.height);
        let away = (tree.forward * tree.forward + tree.right * tree.right).sqrt();
        self.slope.push(away / tree.height);
        self.inline.push(tree.forward / tree.height);
        self.side.push(tree.right / tree.height);
        self.moment.push(weight * tree.forward);
        self.side_moment.push(weight * tree.right);
        self.back_area.push(case.back_area);
        self.commit.push(case.commit);
        self.split.push(case.split);
        self.margin.push(case.margin);
        self.side_margin.push(case.side_margin);
        self.stretch.push(case.stretch);
        self.stretch_area.push(case.stretch_area);
        self.seconds.push(case.seconds.unwrap_or(f64::INFINITY));
        self.to_commit.push(case.to_commit.unwrap_or(f64::INFINITY));
        self.rate_needed
            .push(case.rate_needed.unwrap_or(f64::INFINITY));
        self.tilt.push(case.tilt.unwrap_or(f64::INFINITY));
        self.tension.push(case.tension.unwrap_or(f64::INFINITY));
        self.strap.push(case.strap.unwrap_or(f64::INFINITY));
        self.lift.push(case.lift);
        self.pull.push(case.pull.unwrap_or(f64::INFINITY));
    }
}
