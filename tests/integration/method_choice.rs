//! What is proposed for made-up trees, and what every proposal must carry. The trees declare
//! their own method.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]

use stumpside::figures::{CaseState, Condition, Line, SiteStop};
use stumpside::method::{Choice, STANDARD, SizeUp, size_up};
use stumpside::plan::step::{Cut, MethodName, Step, StepAct, Task, Timing};
use stumpside::simulate::Verdict;
use stumpside::source::Mark;
use stumpside::units::{Angle, Force, Length};

use crate::sample::{MILD, Sample, input};

const BRISK: Sample = Sample {
    species: "white ash",
    stump_cm: 40.0,
    dbh_cm: 35.0,
    height_m: 19.0,
    lean_deg: 6.0,
    radii_m: [2.5, 3.5, 2.5, 2.0],
    ..MILD
};
const PLUNGE: Sample = Sample {
    species: "yellow-poplar",
    stump_cm: 62.0,
    dbh_cm: 55.0,
    height_m: 27.0,
    lean_deg: 8.0,
    radii_m: [3.0, 5.0, 3.5, 2.5],
    base_m: 10.0,
    toward: 100.0,
    lay: 95.0,
};
const RELIEVED: Sample = Sample {
    species: "red maple",
    stump_cm: 22.0,
    dbh_cm: 19.0,
    height_m: 14.0,
    lean_deg: 12.0,
    radii_m: [2.0, 3.0, 2.0, 1.5],
    base_m: 5.0,
    ..MILD
};
const BACK: Sample = Sample {
    lean_deg: 1.5,
    toward: 270.0,
    ..MILD
};
const FAR_BACK: Sample = Sample {
    lean_deg: 5.0,
    toward: 270.0,
    ..MILD
};

fn has(steps: &[Step], wanted: &StepAct) -> bool {
    steps.iter().any(|step| step.act == *wanted)
}

fn proposed(answer: &SizeUp, method: MethodName) {
    assert_eq!(
        answer.choice,
        Choice::Proposed(method),
        "{:?}",
        answer.refused
    );
    assert!(!answer.reasons.is_empty());
    assert_eq!(answer.layout.unwrap().method, method);
    assert!(matches!(
        answer.steps[0].act,
        StepAct::Cut(Cut::FaceSlope { .. })
    ));
    assert!(has(&answer.steps, &StepAct::Do(Task::Clear)));
    let last = answer.steps.last().unwrap();
    assert_eq!(last.act, StepAct::Do(Task::Retreat));
    let hold = answer
        .steps
        .iter()
        .position(|step| matches!(step.act, StepAct::Hold { .. }))
        .unwrap();
    let committing = answer
        .steps
        .iter()
        .rposition(|step| matches!(step.act, StepAct::Cut(_)))
        .unwrap();
    assert!(hold < committing);
}

#[test]
fn a_mild_leaner_waits_for_the_saw() {
    let answer = size_up(&input(MILD));
    proposed(&answer, MethodName::StraightBackCut);
    assert_eq!(answer.run.unwrap().verdict, Verdict::Holds);
    assert_eq!(answer.figures.cases.state, CaseState::WithinLimit);
    let brisk = answer.figures.brisk.unwrap();
    assert_eq!(brisk.stretch.best, Length::ZERO);
    assert_eq!(brisk.rate_needed.unwrap().best, None);
    assert_eq!(brisk.tilt_at_hinge.unwrap().best, Some(Angle::ZERO));
    // Of 36 cm behind a face of a third, no deeper than a tape's millimetre below it.
    let face = answer.figures.face.unwrap().depth.in_mm();
    assert!((face - 140.0).abs() < 1e-9, "{face}");
    let hinge = answer.figures.hinge_thickness.unwrap().in_mm();
    assert!((hinge - 42.0).abs() < 1e-9, "{hinge}");
}

#[test]
fn a_moderate_leaner_is_raced() {
    let answer = size_up(&input(BRISK));
    proposed(&answer, MethodName::BriskBackCut);
    assert_eq!(answer.run.unwrap().verdict, Verdict::Moves);
    let last = answer
        .steps
        .iter()
        .find(|step| matches!(step.act, StepAct::Cut(Cut::BackCut { .. })))
        .unwrap();
    assert_eq!(last.timing, Timing::Brisk);
    assert!(last.seconds.unwrap().value() > 5.0);
    assert!(answer.refused.iter().any(|refusal| {
        refusal.method == Some(MethodName::StraightBackCut) && refusal.reason.contains(" s")
    }));
}

#[test]
fn a_large_leaner_is_plunged_and_held() {
    let answer = size_up(&input(PLUNGE));
    proposed(&answer, MethodName::PlungeWithStrap);
    let run = answer.run.unwrap();
    assert_eq!(run.first(Verdict::Moves).unwrap().cut, Cut::StrapRelease);
    assert!(answer.figures.plunge.unwrap().fits);
    assert!(answer.figures.worst.unwrap().split_ratio >= 0.995);
    assert!(
        answer
            .reasons
            .iter()
            .any(|reason| reason.contains("one sixth"))
    );
    let strap = answer.figures.strap.unwrap();
    assert!(strap.thickness >= strap.thickness_min.best);
    assert_eq!(answer.refused.len(), 2);
}

#[test]
fn a_small_strong_leaner_is_relieved() {
    let answer = size_up(&input(RELIEVED));
    proposed(&answer, MethodName::SideRelievedBackCut);
    assert!(
        answer
            .steps
            .iter()
            .any(|step| matches!(step.act, StepAct::Cut(Cut::ReliefLeft { .. })))
    );
}

#[test]
fn back_leaners_are_wedged_rigged_or_refused() {
    let answer = size_up(&input(BACK));
    proposed(&answer, MethodName::WedgedBackCut);
    assert!(has(&answer.steps, &StepAct::Do(Task::Wedge)));
    assert_eq!(answer.run.unwrap().verdict, Verdict::Holds);
    assert!(answer.figures.wedge_lift.unwrap().best > Length::ZERO);
    assert_eq!(answer.figures.fall, None);

    let far = size_up(&input(FAR_BACK));
    assert_eq!(far.choice, Choice::Refuse);
    assert!(far.refused.iter().any(|refusal| {
        refusal.method == Some(MethodName::RiggedBackCut)
            && refusal.reason.contains("a saw alone will not do")
    }));
    assert!(far.steps.is_empty() && far.run.is_none());

    let mut rigged = input(FAR_BACK);
    rigged.line = Some(Line {
        height: Length::m(9.0),
        anchor_east: Length::m(25.0),
        anchor_north: Length::m(1.0),
        redirects: 1,
        load_limit: Some(Force::si(20_000.0)),
    });
    let answer = size_up(&rigged);
    proposed(&answer, MethodName::RiggedBackCut);
    assert!(has(&answer.steps, &StepAct::Do(Task::LineTension)));
    let (pull, winch) = (answer.figures.pull.unwrap(), answer.figures.winch.unwrap());
    assert!((winch.best.value() * 0.9 - pull.best.value()).abs() < 1e-6);
    rigged.line.as_mut().unwrap().load_limit = Some(Force::si(2_000.0));
    let weak = size_up(&rigged);
    assert_eq!(weak.choice, Choice::Refuse);
    assert!(
        weak.refused
            .iter()
            .any(|refusal| refusal.reason.contains("load limit"))
    );
}

#[test]
fn what_forbids_the_work_refuses_every_method() {
    for stop in [
        SiteStop::NoWayOut,
        SiteStop::PowerLineInReach,
        SiteStop::ApprovalMissing,
    ] {
        let mut tree = input(MILD);
        tree.site_stops.push(stop);
        let answer = size_up(&tree);
        assert_eq!(answer.choice, Choice::Refuse);
        assert_eq!(answer.refused[0].method, None);
        // The figures are said all the same.
        assert!(answer.figures.mass.is_some());
    }
    for condition in [
        Condition::RotAtHinge,
        Condition::Crack,
        Condition::Shake,
        Condition::Fork,
        Condition::Hollow,
    ] {
        let mut tree = input(MILD);
        tree.conditions.push(condition);
        let answer = size_up(&tree);
        assert_eq!(answer.choice, Choice::Refuse, "{condition:?}");
        assert_eq!(answer.figures.cases.state, CaseState::CannotSay);
    }
}

#[test]
fn a_method_chosen_by_hand_is_judged_and_never_replaced() {
    let mut tree = input(Sample {
        lean_deg: 20.0,
        stump_cm: 70.0,
        dbh_cm: 62.0,
        height_m: 26.0,
        ..MILD
    });
    tree.overrides.method = Some(MethodName::StraightBackCut);
    tree.overrides.face_depth = Some(Length::cm(10.0));
    let answer = size_up(&tree);
    assert_eq!(answer.choice, Choice::Proposed(MethodName::StraightBackCut));
    assert_eq!(answer.run.as_ref().unwrap().verdict, Verdict::Splits);
    assert!(
        answer
            .refused
            .iter()
            .any(|refusal| refusal.reason.contains("splits"))
    );
    assert!(
        answer
            .approval_needed
            .iter()
            .any(|hint| hint.contains("speaks against"))
    );
    tree.overrides.method = Some(MethodName::TiltedBackCut);
    let answer = size_up(&tree);
    assert_eq!(answer.choice, Choice::Proposed(MethodName::TiltedBackCut));
    assert!(
        answer
            .reasons
            .iter()
            .any(|reason| reason.contains("as if level"))
    );
    for method in MethodName::ALL {
        tree.overrides.method = Some(method);
        let answer = size_up(&tree);
        assert_eq!(answer.choice, Choice::Proposed(method));
        assert!(!answer.steps.is_empty(), "{method:?}");
    }
}

#[test]
fn side_lean_is_said_and_a_side_too_weak_is_refused() {
    let side = size_up(&input(Sample {
        lean_deg: 6.0,
        toward: 150.0,
        ..MILD
    }));
    assert!(matches!(side.choice, Choice::Proposed(_)));
    assert!(
        side.reasons
            .iter()
            .any(|reason| reason.contains("right of the lay"))
    );
    let far = size_up(&input(Sample {
        lean_deg: 30.0,
        toward: 165.0,
        stump_cm: 40.0,
        dbh_cm: 35.0,
        height_m: 28.0,
        ..MILD
    }));
    assert!(far.figures.worst.unwrap().side_ratio.unwrap() < 1.0);
    assert_eq!(far.choice, Choice::Refuse);
    assert!(
        far.refused
            .iter()
            .any(|refusal| refusal.reason.contains("side lean"))
    );
}

#[test]
fn judged_figures_say_that_they_are_judged() {
    let rows = STANDARD.rows();
    assert_eq!(rows.len(), 15);
    assert!(
        rows.iter()
            .filter(|row| row.source.mark == Mark::Judgement)
            .count()
            >= 12
    );
}
