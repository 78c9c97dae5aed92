//! Sequences on the virtual stump: each names what it must come to, most are wrong on purpose.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]

use stumpside::mechanics::holding::{Demand, Wood, ligament_section};
use stumpside::mechanics::section::{Cavity, Stem};
use stumpside::mechanics::splitting::{Slabs, fracture_energy};
use stumpside::plan::step::{Cut, Edge, Step, StepAct, Task, Timing};
use stumpside::simulate::{Run, State, Stump, Verdict, run};
use stumpside::units::{Angle, Density, Force, Length, Moment, Stress};

fn wood(mor: f64, moe: f64, gravity_12: f64) -> Wood {
    let g1c = fracture_energy(Density::si(1120.0 * gravity_12));
    Wood {
        mor: Stress::si(mor * 1.0e6),
        moe: Stress::si(moe * 1.0e9),
        g1c,
        g2c: g1c * 3.0,
    }
}

/// White ash of 0.6 m that asks 95 kN·m: the worked example whose plain back cut splits.
pub fn ash() -> Stump {
    Stump {
        stem: Stem::new(Length::m(0.6), Length::m(0.6)).unwrap(),
        wood: wood(66.0, 9.9, 0.60),
        demand: Demand {
            weight: Force::ZERO,
            forward: Length::ZERO,
            extra: Moment::si(95_000.0),
        },
        wedge_room: Length::cm(15.0),
    }
}

/// Northern red oak of 0.5 m with its weight so far forward.
pub fn oak(forward: f64) -> Stump {
    Stump {
        stem: Stem::new(Length::m(0.5), Length::m(0.5)).unwrap(),
        wood: wood(57.0, 9.3, 0.63),
        demand: Demand {
            weight: Force::si(18_000.0),
            forward: Length::m(forward),
            extra: Moment::ZERO,
        },
        wedge_room: Length::cm(15.0),
    }
}

fn step(act: StepAct) -> Step {
    Step {
        act,
        timing: Timing::AtLeisure,
        seconds: None,
        note: None,
    }
}

pub fn cuts(cuts: &[Cut]) -> Vec<Step> {
    cuts.iter().map(|cut| step(StepAct::Cut(*cut))).collect()
}

pub fn face(depth: f64) -> [Cut; 2] {
    let depth = Length::m(depth);
    [
        Cut::FaceSlope {
            depth,
            opening: Angle::deg(70.0),
        },
        Cut::FaceFloor { depth },
    ]
}

pub fn from_hinge(metres: f64) -> Edge {
    Edge::FromHinge(Length::m(metres))
}

pub fn plain(depth: f64, hinge: f64) -> Vec<Step> {
    let [slope, floor] = face(depth);
    cuts(&[
        slope,
        floor,
        Cut::BackCut {
            to: from_hinge(hinge),
        },
    ])
}

pub fn plunge(depth: f64, hinge: f64, strap: f64) -> Vec<Step> {
    let [slope, floor] = face(depth);
    cuts(&[
        slope,
        floor,
        Cut::Plunge {
            front: from_hinge(hinge + 0.025),
            rear: from_hinge(hinge + 0.115),
        },
        Cut::HingeTrim {
            hinge: Length::m(hinge),
        },
        Cut::BackCut {
            to: Edge::FromRear(Length::m(strap)),
        },
        Cut::StrapRelease,
    ])
}

pub fn judged(stump: &Stump, steps: &[Step]) -> Run {
    let run = run(stump, steps).unwrap();
    for state in &run.states {
        assert!(state.hold_moment.value() >= 0.0);
        for ratio in [state.hold_ratio, state.split_ratio].into_iter().flatten() {
            assert!(ratio.is_finite() && ratio >= 0.0, "{state:?}");
        }
    }
    run
}

#[test]
fn a_plain_back_cut_on_a_strong_leaner_splits_where_the_example_says() {
    // Source: worked example 3: the split curve is met with 0.177590 m of wood left, 0.302410 m
    // into the back cut.
    let run = judged(&ash(), &plain(0.12, 0.06));
    assert_eq!(run.verdict, Verdict::Splits);
    let first = run.first(Verdict::Splits).unwrap();
    assert_eq!(first.step, 3);
    assert!((first.progress.value() - 0.31).abs() < 1e-9, "{first:?}");
    let before = &run.states[run.states.iter().position(|it| it == first).unwrap() - 1];
    assert_eq!(before.verdict, Verdict::Holds);
    assert!(before.split_ratio.unwrap() > 1.0);
    let star = run.crossing.unwrap();
    assert!((star.ligament.value() - 0.0857168).abs() < 1e-7);
    assert!((star.moment.value() - 41_443.6).abs() < 0.1);
    // What has split stays split.
    assert!(
        run.states
            .iter()
            .skip_while(|state| state.verdict != Verdict::Splits)
            .all(|state| state.verdict == Verdict::Splits)
    );
}

#[test]
fn a_plunge_with_a_strap_on_the_same_tree_holds_until_release() {
    let run = judged(&ash(), &plunge(0.15, 0.055, 0.08));
    assert_eq!(run.verdict, Verdict::Moves);
    let moves = run.first(Verdict::Moves).unwrap();
    assert_eq!(moves.cut, Cut::StrapRelease);
    // Source: worked example 5, hinge alone after release.
    assert!((moves.split_ratio.unwrap() - 2.3021).abs() < 1e-4);
    assert!((moves.hold_moment.value() - 17_876.7).abs() < 0.1);
    let held: Vec<&State> = run
        .states
        .iter()
        .filter(|state| state.standing.len() == 2)
        .collect();
    assert!(held.len() > 10);
    let last = held.last().unwrap();
    // Hinge and strap as one section hold MOR over 13.6983 MPa of what is asked.
    assert!((last.hold_ratio.unwrap() - 66.0 / 13.6983).abs() < 1e-3);
    // The releases 120.65 and 223.37 J/m² against 552.88 and 1,658.64.
    let by_front = (552.88_f64 / 120.65).sqrt();
    let by_back = (1_658.64_f64 / 223.37).sqrt();
    assert!((last.split_ratio.unwrap() - by_front.min(by_back)).abs() < 1e-3);
}

#[test]
fn a_strap_too_thin_lets_the_tree_go_early() {
    // Source: worked example 5: at 0.0228 m the strap fails.
    let run = judged(&ash(), &plunge(0.15, 0.055, 0.02));
    let first = run
        .states
        .iter()
        .find(|state| state.verdict != Verdict::Holds)
        .unwrap();
    assert!(matches!(first.cut, Cut::BackCut { .. }), "{first:?}");
}

#[test]
fn a_mild_leaner_waits_for_the_saw() {
    let run = judged(&oak(0.3), &plain(0.125, 0.05));
    assert_eq!(run.verdict, Verdict::Holds);
    let last = run.states.last().unwrap();
    let hinge = ligament_section(&oak(0.3).stem, Length::m(0.125), Length::m(0.05)).unwrap();
    let section = last.section.unwrap();
    assert!((section.i_inline.value() - hinge.i_inline.value()).abs() < 1e-15);
    assert!((section.i_side.value() - hinge.i_side.value()).abs() < 1e-12);
    assert!((section.half_width.value() - hinge.half_width.value()).abs() < 1e-12);
    let asked = 18_000.0 * (0.3 - 9.960052e-2);
    assert!((last.moment.unwrap().value() - asked).abs() < 0.01);
    assert_eq!(last.standing.len(), 1);
    assert!(last.standing[0].corners.is_empty());
}

#[test]
fn a_moderate_leaner_commits_before_the_hinge() {
    // Source: worked example 2: 25 kN·m and 18 kN commit at 0.073683 m.
    let run = judged(&oak(25.0 / 18.0), &plain(0.125, 0.05));
    assert_eq!(run.verdict, Verdict::Moves);
    let moves = run.first(Verdict::Moves).unwrap();
    let left = 0.5 - 0.125 - moves.progress.value();
    assert!(left <= 0.073683 && left > 0.073683 - 0.01, "{left}");
}

#[test]
fn a_back_leaner_sits_back_unless_a_wedge_comes_first() {
    let run = judged(&oak(-0.2), &plain(0.125, 0.05));
    assert_eq!(run.verdict, Verdict::SitsBack);
    let first = run.first(Verdict::SitsBack).unwrap();
    assert!((first.progress.value() - 0.16).abs() < 1e-9);
    let mut steps = plain(0.125, 0.05);
    steps.insert(2, step(StepAct::Do(Task::Wedge)));
    steps.insert(
        2,
        step(StepAct::Cut(Cut::BackCut {
            to: Edge::FromRear(Length::cm(15.0)),
        })),
    );
    assert_eq!(judged(&oak(-0.2), &steps).verdict, Verdict::Holds);
    let mut steps = plain(0.125, 0.05);
    steps.insert(2, step(StepAct::Do(Task::LineTension)));
    assert_eq!(judged(&oak(-0.2), &steps).verdict, Verdict::Holds);
}

#[test]
fn a_level_face_cut_first_on_a_strong_leaner_pinches() {
    let [slope, floor] = face(0.12);
    let run = judged(&ash(), &cuts(&[floor, slope]));
    assert_eq!(run.verdict, Verdict::Pinches);
    let freed = || {
        run.states
            .iter()
            .filter(|state| matches!(state.cut, Cut::FaceSlope { .. }))
    };
    assert_eq!(freed().count(), 1);
    assert!(freed().all(|state| state.verdict == Verdict::Holds));
    assert_eq!(
        judged(&ash(), &cuts(&[slope, floor])).verdict,
        Verdict::Holds
    );
    assert_eq!(
        judged(&oak(0.3), &cuts(&[floor, slope])).verdict,
        Verdict::Holds
    );
}

#[test]
fn relieved_corners_by_quadrature_agree_with_polygons() {
    // Source: `tests/scripts/section_values.py`, the same general-purpose polygon library.
    let stump = Stump {
        stem: Stem::new(Length::m(0.26), Length::m(0.24))
            .unwrap()
            .with_cavity(Cavity {
                diameter: Length::m(0.05),
                forward: Length::m(-0.02),
                right: Length::m(0.03),
            })
            .unwrap(),
        ..oak(0.4)
    };
    let [slope, floor] = face(0.06);
    let to = from_hinge(0.03);
    let steps = cuts(&[
        slope,
        floor,
        Cut::ReliefLeft {
            width: Length::m(0.07),
            to,
        },
        Cut::ReliefRight {
            width: Length::m(0.08),
            to: from_hinge(0.05),
        },
    ]);
    let run = judged(&stump, &steps);
    let last = run.states.last().unwrap();
    let section = last.section.unwrap();
    let found = [
        section.area.value(),
        section.forward.value(),
        section.right.value(),
        section.i_inline.value(),
        section.i_side.value(),
    ];
    for (value, polygon) in found.into_iter().zip(RELIEVED) {
        assert!(
            (value - polygon).abs() <= 1e-7 * polygon.abs(),
            "{value} {polygon}"
        );
    }
    assert!(last.standing[0].corners.len() > 20);
    assert_eq!(last.standing[0].holes.len(), 1);
    // No back cut yet, so no edge behind which a crack could start.
    assert_eq!(last.split_moment, None);
}

#[test]
fn a_relieved_back_cut_takes_the_tongue_as_the_cracks_width() {
    let [slope, floor] = face(0.06);
    let to = from_hinge(0.03);
    let width = Length::m(0.06);
    let stump = Stump {
        stem: Stem::new(Length::m(0.24), Length::m(0.24)).unwrap(),
        ..oak(0.4)
    };
    let steps = cuts(&[
        slope,
        floor,
        Cut::ReliefLeft { width, to },
        Cut::ReliefRight { width, to },
        Cut::BackCut {
            to: from_hinge(0.08),
        },
    ]);
    let run = judged(&stump, &steps);
    let last = run.states.last().unwrap();
    let edge = Length::m(0.12 - 0.06 - 0.08);
    let full = Slabs::at_edge(&stump.stem, edge);
    let narrower = (0.12 / full.width().value()).sqrt();
    let wanted = full.split_moment(&stump.wood).unwrap().value() * narrower;
    assert!((last.split_moment.unwrap().value() - wanted).abs() < 1e-6 * wanted);
}

/// Area, centroid forward and right, second moments along and across the lay.
const RELIEVED: [f64; 5] = [
    2.1575584271e-02,
    -1.0227388774e-02,
    5.4929969972e-04,
    8.1405469318e-05,
    4.5009693730e-05,
];
