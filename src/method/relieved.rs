//! The side-relieved back cut of a small strong leaner: both rear corners relieved, the tongue
//! between them cut from behind. It is never proposed for a stem of more than a hand's work.

use crate::figures::{Release, cautious_extras};
use crate::mechanics::holding::{Demand, FIRST_MOVEMENT};
use crate::method::bench::{Assessed, Bench, stump_of_model};
use crate::method::lay_out::steps;
use crate::method::words::{cm, ratio, ratio_reaches};
use crate::plan::step::{Cut, MethodName, StepAct};
use crate::simulate::run;
use crate::units::{Length, Moment};

/// Widths of the tongue that are tried, as a share of the diameter across the lay.
/// Source: our judgement.
const TONGUES: [f64; 7] = [0.30, 0.35, 0.40, 0.45, 0.50, 0.55, 0.60];

/// The narrowest tongue that holds while the corners are relieved and does not split after.
pub(super) fn find(bench: &Bench<'_>) -> Result<(Assessed, Vec<String>), String> {
    let most = bench.table.relieved_diameter_max.value();
    if (bench.diameter() * 1000.0).round() > (most * 1000.0).round() {
        return Err(format!(
            "the wood is {} thick at the cut: corners are relieved only up to {}",
            cm(bench.diameter()),
            cm(most)
        ));
    }
    let mut last = None;
    for share in TONGUES {
        let cut = lay(bench, share);
        let held = held_while_relieved(bench, &cut);
        let splits = !ratio_reaches(cut.worst.split_ratio, 1.0);
        if !splits && held.is_some_and(|held| held >= 1.0 / FIRST_MOVEMENT) {
            if let Some(side) = cut.side_refusal() {
                return Err(side);
            }
            return Ok((cut, reasons(&cut)));
        }
        last = Some((cut, held));
    }
    let (cut, held) = last.ok_or("no tongue could be tried")?;
    Err(format!(
        "even the widest tongue holds {} times the cautious demand while the corners are relieved (wanted {}) and splits at {} of what is asked at worst",
        held.map_or_else(|| "none".to_owned(), ratio),
        ratio(1.0 / FIRST_MOVEMENT),
        ratio(cut.worst.split_ratio)
    ))
}

/// Corners relieved by half though no tongue held: for a method chosen by hand.
pub(super) fn by_hand(bench: &Bench<'_>) -> Assessed {
    lay(bench, 0.50)
}

fn lay(bench: &Bench<'_>, share: f64) -> Assessed {
    let across = bench.model.stem.across().value();
    let width = Length::si((share * across * 1000.0).round() / 1000.0);
    let plain = bench.plain(MethodName::SideRelievedBackCut);
    let depths = (plain.face_depth.value(), plain.hinge.value());
    bench.assess(bench.layout(
        MethodName::SideRelievedBackCut,
        depths,
        Release::Tongue { width },
    ))
}

/// What the wood holds over the cautious demand when both corners are off and the tongue is
/// whole.
fn held_while_relieved(bench: &Bench<'_>, cut: &Assessed) -> Option<f64> {
    let (up, _) = cautious_extras(bench.model, cut.centroid);
    let mut stump = stump_of_model(bench.input, bench.model, bench.table);
    stump.demand = Demand {
        extra: Moment::si(up),
        ..stump.demand
    };
    let relieving: Vec<_> = steps(bench, cut)
        .into_iter()
        .take_while(|step| !matches!(step.act, StepAct::Cut(Cut::BackCut { .. })))
        .collect();
    run(&stump, &relieving).ok()?.states.last()?.hold_ratio
}

pub(super) fn reasons(cut: &Assessed) -> Vec<String> {
    vec![
        "the stem is too small for a plunge and leans too strongly for a plain back cut: both rear corners are relieved first".to_owned(),
        format!(
            "the tongue holds while the corners are relieved, and the stem splits at {} times what is asked, {} at worst",
            ratio(cut.best.split_ratio),
            ratio(cut.worst.split_ratio)
        ),
    ]
}
