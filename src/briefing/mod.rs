//! What is asked, of whom, in which form it is answered, and the card of each tree as it is
//! shown. Nothing here knows what has been answered.

mod card;
mod item;
mod job;
mod ladder;

pub use card::{Card, Figure, Removed, Rung, StumpCard, UnitWord, rung_of};
pub use item::{AskedValue, Field, Form, Item, Kind, Option_, Signs};
pub use job::{Job, JobPerson, JobTree, Tolerance};
pub use ladder::{
    choose, closing, cuts, hold_line, list, own_hazards, questions, roll_call, signing, talk_again,
};

/// tmp
pub fn size_up(
    plan: &crate::plan::Plan,
    tree: &str,
    (_m, parts): (&[(crate::parts::What, i64)], &crate::parts::Parts),
) -> Card {
    use crate::plan::step::*;
    use crate::units::*;
    let t = plan.trees.iter().find(|t| t.id.value == tree).unwrap();
    let d = job::micro(t.stump.value());
    let stump = StumpCard {
        along_um: d,
        across_um: d,
        face_um: d / 4,
        hinge_um: d / 10,
    };
    let l = |um: i64| Length::si(um as f64 / 1e6);
    let s = |act, timing| Step {
        act,
        timing,
        seconds: None,
        note: None,
    };
    let steps = vec![
        s(
            StepAct::Cut(Cut::FaceSlope {
                depth: l(d / 4),
                opening: Angle::deg(70.0),
            }),
            Timing::AtLeisure,
        ),
        s(
            StepAct::Cut(Cut::FaceFloor { depth: l(d / 4) }),
            Timing::AtLeisure,
        ),
        s(
            StepAct::Check {
                what: "face".into(),
            },
            Timing::AtLeisure,
        ),
        s(
            StepAct::Cut(Cut::Plunge {
                front: Edge::FromHinge(l(d / 10 + 25000)),
                rear: Edge::FromRear(l(d / 3)),
            }),
            Timing::AtLeisure,
        ),
        s(
            StepAct::Cut(Cut::HingeTrim { hinge: l(d / 10) }),
            Timing::AtLeisure,
        ),
        s(
            StepAct::Cut(Cut::BackCut {
                to: Edge::FromRear(l(d / 8)),
            }),
            Timing::AtLeisure,
        ),
        s(StepAct::Cut(Cut::StrapRelease), Timing::Hold),
    ];
    let mut rungs: Vec<Rung> = steps
        .iter()
        .map(|s| rung_of(s, &stump, &parts.cuts))
        .collect();
    rungs.last_mut().unwrap().commits = true;
    Card {
        method: Some("plunge-with-strap".into()),
        state: "near-limit".into(),
        past: 3,
        of: 20,
        worst_ppm: Some(1_100_000),
        doubt: "the lean reading; sight it again from the other side".into(),
        reasons: vec![],
        refused: vec![],
        stops: vec![],
        figures: vec![],
        stump,
        rungs,
    }
}
