//! Lays the cuts of a method out as steps, in lengths a tape can measure. It judges none.

use crate::figures::PLUNGE_CLEAR;
use crate::figures::Release;
use crate::method::bench::{Assessed, Bench};
use crate::method::tilted::TILT;
use crate::method::wedged::wedge_fits;
use crate::plan::step::{Cut, Edge, MethodName, Step, StepAct, Task, Timing};
use crate::units::{Duration, Length};

/// How much wood stays in front of a wedge beyond what would let the tree commit.
const BEFORE_COMMIT: f64 = 0.005;

/// The steps of a method for one tree.
pub(super) fn steps(bench: &Bench<'_>, cut: &Assessed) -> Vec<Step> {
    let mut steps = face(cut);
    match cut.layout.method {
        MethodName::StraightBackCut => {
            steps.extend(from_rear(bench, cut, Timing::AtLeisure));
        }
        MethodName::BriskBackCut => steps.extend(from_rear(bench, cut, Timing::Brisk)),
        MethodName::PlungeWithStrap => steps.extend(plunge(bench, cut)),
        MethodName::TiltedBackCut => steps.extend(tilted(bench, cut)),
        MethodName::SideRelievedBackCut => steps.extend(relieved(bench, cut)),
        MethodName::WedgedBackCut => steps.extend(wedged(bench, cut)),
        MethodName::RiggedBackCut => steps.extend(rigged(bench, cut)),
    }
    steps.push(act(StepAct::Do(Task::Retreat), Timing::Brisk));
    steps
}

fn act(act: StepAct, timing: Timing) -> Step {
    Step {
        act,
        timing,
        seconds: None,
        note: None,
    }
}

fn made(cut: Cut) -> Step {
    act(StepAct::Cut(cut), Timing::AtLeisure)
}

fn noted(step: Step, note: &str) -> Step {
    Step {
        note: Some(note.to_owned()),
        ..step
    }
}

fn check(what: &str) -> Step {
    act(
        StepAct::Check {
            what: what.to_owned(),
        },
        Timing::AtLeisure,
    )
}

fn hold() -> Step {
    let who = ["leader", "sawyer"].map(str::to_owned).to_vec();
    act(StepAct::Hold { who }, Timing::Hold)
}

/// The face: the sloping cut first, because on a leaner the level one pinches.
fn face(cut: &Assessed) -> Vec<Step> {
    let depth = cut.layout.face_depth;
    let slope = made(Cut::FaceSlope {
        depth,
        opening: cut.layout.opening,
    });
    let slope = if cut.demand > 0.0 {
        noted(
            slope,
            "first and steep: the wood under the lean is pressed and pinches a level cut",
        )
    } else {
        slope
    };
    vec![
        slope,
        made(Cut::FaceFloor { depth }),
        check("face"),
        check("bypass"),
    ]
}

/// Everybody counted, the ways clear, and both say go.
fn hold_line() -> Vec<Step> {
    vec![
        act(StepAct::Do(Task::Clear), Timing::AtLeisure),
        check("wind"),
        hold(),
    ]
}

/// The seconds of a back cut at the crew's rate.
fn timed(bench: &Bench<'_>, step: Step, area: f64) -> Step {
    let rate = bench.input.saw.map(|saw| saw.rate.value.value());
    Step {
        seconds: rate
            .filter(|rate| *rate > 0.0)
            .map(|rate| Duration::si(area / rate)),
        ..step
    }
}

/// The area between two edges along the lay.
fn area(bench: &Bench<'_>, from: f64, to: f64) -> f64 {
    bench.model.stem.shape().strip(from, to).area
}

fn hinge_edge(bench: &Bench<'_>, cut: &Assessed) -> f64 {
    0.5 * bench.diameter() - cut.layout.face_depth.value() - cut.layout.hinge.value()
}

/// Where the first part of a back cut stops for a wedge: behind bar and wedge.
fn wedge_stop(bench: &Bench<'_>, cut: &Assessed) -> Option<Length> {
    let depth = bench.nose()? + bench.table.wedge_room.value();
    let left = bench.diameter() - cut.layout.face_depth.value() - depth;
    let commits = cut.worst.commit.value();
    let enough = left >= cut.layout.hinge.value() && left >= commits + BEFORE_COMMIT;
    (wedge_fits(bench, cut) && enough).then(|| Length::si(depth))
}

fn from_rear(bench: &Bench<'_>, cut: &Assessed, timing: Timing) -> Vec<Step> {
    let rear = -0.5 * bench.diameter();
    let edge = hinge_edge(bench, cut);
    let mut steps = Vec::new();
    let mut begun = rear;
    let wedge = cut.demand < 0.0 || cut.wants_wedge();
    if let (true, Some(depth)) = (wedge, wedge_stop(bench, cut)) {
        begun = rear + depth.value();
        let first = made(Cut::BackCut {
            to: Edge::FromRear(depth),
        });
        steps.push(timed(bench, first, area(bench, rear, begun)));
        steps.push(act(StepAct::Do(Task::Wedge), Timing::AtLeisure));
    }
    steps.extend(hold_line());
    let last = act(
        StepAct::Cut(Cut::BackCut {
            to: Edge::FromHinge(cut.layout.hinge),
        }),
        timing,
    );
    steps.push(timed(bench, last, area(bench, begun, edge)));
    match timing {
        Timing::AtLeisure => {
            steps.push(check("hinge"));
            if cut.best.commit <= cut.layout.hinge.value() {
                steps.push(noted(
                    act(StepAct::Do(Task::Wedge), Timing::AtLeisure),
                    "drive it where the tree does not go by itself",
                ));
            }
        }
        Timing::Brisk | Timing::Hold => {}
    }
    steps
}

fn plunge(bench: &Bench<'_>, cut: &Assessed) -> Vec<Step> {
    let hinge = cut.layout.hinge;
    let strap = cut.layout.strap;
    let nose = Length::si(bench.nose().unwrap_or(0.0));
    let front = hinge + PLUNGE_CLEAR;
    let slot_rear = hinge_edge(bench, cut) - PLUNGE_CLEAR.value() - nose.value();
    let strap_edge = strap.value() - 0.5 * bench.diameter();
    let mut steps = vec![
        noted(
            made(Cut::Plunge {
                front: Edge::FromHinge(front),
                rear: Edge::FromHinge(front + nose),
            }),
            "start with the lower part of the nose at about 45 degrees, turn square once the nose is covered",
        ),
        check("plunge-place"),
        made(Cut::HingeTrim { hinge }),
        check("hinge"),
        timed(
            bench,
            made(Cut::BackCut {
                to: Edge::FromRear(strap),
            }),
            area(bench, strap_edge, slot_rear),
        ),
        check("strap"),
    ];
    if cut.wants_wedge() {
        steps.push(act(StepAct::Do(Task::Wedge), Timing::AtLeisure));
    }
    steps.extend(hold_line());
    let release = noted(
        act(StepAct::Cut(Cut::StrapRelease), Timing::Brisk),
        "from an outstretched, sideways stance, a little lower than the plunge",
    );
    let rear = -0.5 * bench.diameter();
    steps.push(timed(bench, release, area(bench, rear, strap_edge)));
    steps
}

fn tilted(bench: &Bench<'_>, cut: &Assessed) -> Vec<Step> {
    let rear = -0.5 * bench.diameter();
    let last = act(
        StepAct::Cut(Cut::TiltedBackCut {
            to: Edge::FromHinge(cut.layout.hinge),
            tilt: TILT,
        }),
        Timing::Brisk,
    );
    let mut steps = hold_line();
    steps.push(timed(
        bench,
        last,
        area(bench, rear, hinge_edge(bench, cut)),
    ));
    steps
}

fn relieved(bench: &Bench<'_>, cut: &Assessed) -> Vec<Step> {
    let tongue = match cut.layout.release {
        Release::Tongue { width } => width,
        Release::FromRear | Release::Strap => bench.model.stem.across(),
    };
    let width = (bench.model.stem.across() - tongue) * 0.5;
    let to = Edge::FromHinge(cut.layout.hinge);
    let mut steps = vec![
        made(Cut::ReliefLeft { width, to }),
        made(Cut::ReliefRight { width, to }),
        check("tongue"),
    ];
    steps.extend(hold_line());
    steps.push(timed(
        bench,
        act(StepAct::Cut(Cut::BackCut { to }), Timing::Brisk),
        (hinge_edge(bench, cut) + 0.5 * bench.diameter()) * tongue.value(),
    ));
    steps
}

fn wedged(bench: &Bench<'_>, cut: &Assessed) -> Vec<Step> {
    let mut steps = from_rear(bench, cut, Timing::AtLeisure);
    if steps.last().map(|step| &step.act) != Some(&StepAct::Do(Task::Wedge)) {
        steps.push(act(StepAct::Do(Task::Wedge), Timing::AtLeisure));
    }
    steps
}

fn rigged(bench: &Bench<'_>, cut: &Assessed) -> Vec<Step> {
    let rear = -0.5 * bench.diameter();
    let last = made(Cut::BackCut {
        to: Edge::FromHinge(cut.layout.hinge),
    });
    let mut steps = vec![
        noted(
            act(StepAct::Do(Task::LineTension), Timing::AtLeisure),
            "a first tension, so that the tree cannot sit back on the cut",
        ),
        check("line"),
    ];
    steps.extend(hold_line());
    steps.push(timed(
        bench,
        last,
        area(bench, rear, hinge_edge(bench, cut)),
    ));
    steps.push(check("hinge"));
    steps.push(noted(
        act(StepAct::Do(Task::LineTension), Timing::Hold),
        "the saw out and the sawyer away before the line brings the tree over",
    ));
    steps
}
