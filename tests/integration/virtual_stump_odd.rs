//! Odd cuts on the virtual stump: judged as they are, or refused with the step's number.

use stumpside::plan::step::Cut;
use stumpside::simulate::{SimulateError, Verdict, run};
use stumpside::units::Length;

use crate::virtual_stump::{ash, cuts, face, from_hinge, judged, oak, plain, plunge};

#[test]
fn odd_cuts_are_judged_and_never_panic() {
    // A face past the centre and on to the far side, a back cut through the hinge, a plunge with
    // no room, a hinge of nothing, reliefs that meet.
    let through = judged(&oak(1.0), &plain(0.125, 0.0));
    assert_eq!(through.verdict, Verdict::Moves);
    let last = through.states.last().unwrap();
    assert_eq!((last.section, last.moment), (None, None));
    let deep = judged(&oak(0.3), &plain(0.48, 0.05));
    assert_eq!(deep.verdict, Verdict::Moves);
    let all = judged(&oak(0.3), &plain(0.9, 0.0));
    assert_eq!(all.states.last().unwrap().remaining_area.value(), 0.0);
    // A plunge with no room runs out at the rear: no strap is left to release.
    assert_eq!(
        run(&ash(), &plunge(0.3, 0.2, 0.2)),
        Err(SimulateError::NoStrap { step: 6 })
    );
    // A strap thicker than the stem: the back cut goes through everything, and none is left.
    assert_eq!(
        run(&ash(), &plunge(0.15, 0.055, 0.7)),
        Err(SimulateError::NoStrap { step: 6 })
    );
    let [slope, floor] = face(0.12);
    let to = from_hinge(0.05);
    let width = Length::m(0.4);
    let meeting = cuts(&[
        slope,
        floor,
        Cut::ReliefLeft { width, to },
        Cut::ReliefRight { width, to },
        Cut::BackCut { to },
    ]);
    assert_eq!(judged(&ash(), &meeting).states.last().unwrap().step, 5);
    assert!(judged(&ash(), &[]).states.is_empty());
}

#[test]
fn what_means_nothing_is_an_error_with_its_step() {
    let [slope, _] = face(0.12);
    let strap = run(&ash(), &cuts(&[slope, Cut::StrapRelease])).unwrap_err();
    assert_eq!(strap, SimulateError::NoStrap { step: 2 });
    let early = cuts(&[Cut::BackCut {
        to: from_hinge(0.05),
    }]);
    let error = run(&ash(), &early).unwrap_err();
    assert_eq!(error, SimulateError::NoFace { step: 1 });
    assert!(error.to_string().contains("step 1"));
    let reversed = cuts(&[
        slope,
        Cut::Plunge {
            front: from_hinge(0.2),
            rear: from_hinge(0.1),
        },
    ]);
    assert_eq!(
        run(&ash(), &reversed),
        Err(SimulateError::SlotReversed { step: 2 })
    );
    let hinge = Length::cm(5.0);
    let shut = cuts(&[slope, Cut::HingeTrim { hinge }]);
    assert_eq!(
        run(&ash(), &shut),
        Err(SimulateError::NothingOpen { step: 2 })
    );
    let depth = Length::cm(-3.0);
    let below = run(&ash(), &cuts(&[Cut::FaceFloor { depth }])).unwrap_err();
    assert_eq!(
        below,
        SimulateError::BelowZero {
            step: 1,
            length: depth
        }
    );
}
