//! A tree's card from its size-up: figures as whole numbers, steps as rungs, reasons in words.

use super::card::{Card, Figure, StumpCard, UnitWord, rung_of};
use super::job::{micro, whole};
use crate::assessment::{self, Since, SizedTree};
use crate::figures::TreeFigures;
use crate::method::{Choice, SizeUp};
use crate::parts::{Parts, What};
use crate::plan::step::{Cut, Step, StepAct, Task};
use crate::plan::{Measured, Plan, Tree};
use crate::simulate::Verdict;
use crate::units::{Angle, Band, FromSi, Length, Speed};

/// Sizes a tree up with what was measured, in the record's units, and makes its card. A tree the
/// plan does not know gives an empty card that proposes nothing.
pub fn size_up(plan: &Plan, tree: &str, (measured, parts): (&[(What, i64)], &Parts)) -> Card {
    let Some(tree) = plan.trees.iter().find(|t| t.id.value == tree) else {
        return nothing();
    };
    // A hinge has two ends: the thin one holds less, the thick one splits sooner. Both are sized up
    // and the more guarded card goes on.
    let hinges: Vec<i64> = measured
        .iter()
        .filter(|(w, _)| *w == What::Hinge)
        .map(|(_, v)| *v)
        .collect();
    if let [first, second] = hinges.as_slice() {
        let with = |hinge: i64| -> Vec<(What, i64)> {
            let others = measured.iter().filter(|(w, _)| *w != What::Hinge).copied();
            others.chain([(What::Hinge, hinge)]).collect()
        };
        let cards = [with(*first), with(*second)].map(|m| of_tree(plan, tree, (&m, parts)));
        let [a, b] = cards;
        return if guarded(&b) > guarded(&a) { b } else { a };
    }
    of_tree(plan, tree, (measured, parts))
}

/// How guarded a card is: none proposed, then stops, then the lower worst credible ratio.
fn guarded(card: &Card) -> (bool, bool, i64) {
    (
        card.method.is_none(),
        !card.stops.is_empty(),
        card.worst_ppm.map_or(0, |ppm| -ppm),
    )
}

fn of_tree(plan: &Plan, tree: &Tree, (measured, parts): (&[(What, i64)], &Parts)) -> Card {
    let since: Vec<Since> = measured
        .iter()
        .filter_map(|(what, value)| since(*what, *value))
        .collect();
    let sized = assessment::size_up(plan, tree, &since);
    card(tree, &sized, parts)
}

fn since(what: What, value: i64) -> Option<Since> {
    let length = Length::si(number(value) / 1.0e6);
    match what {
        What::Stump => Some(Since::Stump(length)),
        What::Lean => Some(Since::Lean(Angle::deg(number(value) / 1_000.0))),
        What::Wind => Some(Since::Wind(Speed::si(number(value) / 1_000.0))),
        What::FaceDepth => Some(Since::FaceDepth(length)),
        What::Hinge => Some(Since::Hinge(length)),
        What::Strap => Some(Since::Strap(length)),
        What::BackCutHeight => Some(Since::BackCutHeight(length)),
        What::Bypass => Some(Since::Bypass(length)),
        What::Count | What::BehindHinge | What::BackCutDepth => None,
    }
}

#[expect(
    clippy::cast_precision_loss,
    reason = "recorded integers stay below 2^53"
)]
const fn number(value: i64) -> f64 {
    value as f64
}

fn nothing() -> Card {
    Card {
        method: None,
        state: "cannot-say".to_owned(),
        past: 0,
        of: 20,
        worst_ppm: None,
        doubt: String::new(),
        reasons: vec![],
        refused: vec![],
        stops: vec![],
        figures: vec![],
        stump: StumpCard {
            along_um: 0,
            across_um: 0,
            face_um: 0,
            hinge_um: 0,
        },
        rungs: vec![],
    }
}

fn card(tree: &Tree, sized: &SizedTree, parts: &Parts) -> Card {
    let mut card = nothing();
    card.stump = stump(tree, sized);
    card.refused.clone_from(&sized.held_back);
    let Some(size_up) = &sized.size_up else {
        card.refused
            .push("The species or the lay is not known: nothing can be said.".to_owned());
        return card;
    };
    card.reasons.clone_from(&size_up.reasons);
    card.refused.extend(size_up.refused.iter().map(refusal));
    cases(&mut card, size_up);
    card.figures = figures(&size_up.figures);
    card.stops = match &sized.run {
        Some(Ok(run)) => match run.verdict {
            Verdict::Splits | Verdict::Pinches | Verdict::SitsBack => vec!["TREE-03".to_owned()],
            Verdict::Holds | Verdict::Moves => vec![],
        },
        Some(Err(_)) => vec!["TREE-02".to_owned()],
        None => vec![],
    };
    if let (Choice::Proposed(method), true) = (size_up.choice, sized.may_be_cut()) {
        card.method = Some(method.word().to_owned());
        if sized.by_hand {
            // The cases are those of the program's own cuts; of the author's they say nothing.
            card.method = Some("steps written by hand".to_owned());
            card.state = "cannot-say".to_owned();
            card.worst_ppm = None;
        }
        rungs(&mut card, &sized.steps, parts);
    }
    card
}

fn refusal(refused: &crate::method::Refusal) -> String {
    match refused.method {
        Some(method) => format!("{}: {}", method.word(), refused.reason),
        None => refused.reason.clone(),
    }
}

fn stump(tree: &Tree, sized: &SizedTree) -> StumpCard {
    let layout = sized.size_up.as_ref().and_then(|s| s.layout);
    let written = |own: &Option<Measured<Length>>| own.as_ref().map_or(0, |m| micro(m.value()));
    let planned = tree.stump_across.as_ref().unwrap_or(&tree.stump).value();
    let (along, across) = sized.stump().unwrap_or((tree.stump.value(), planned));
    StumpCard {
        along_um: micro(along),
        across_um: micro(across),
        face_um: layout.map_or(written(&tree.face.depth), |l| micro(l.face_depth)),
        hinge_um: layout.map_or(written(&tree.hinge), |l| micro(l.hinge)),
    }
}

fn cases(card: &mut Card, size_up: &SizeUp) {
    let cases = &size_up.figures.cases;
    card.state = cases.state.word().to_owned();
    card.past = cases
        .past_limit
        .map_or(0, |n| i64::try_from(n).unwrap_or(0));
    card.of = i64::try_from(cases.of).unwrap_or(20);
    card.worst_ppm = size_up
        .figures
        .worst
        .as_ref()
        .map(|w| whole(w.split_ratio.min(1.0e6) * 1.0e6));
    card.doubt = size_up.figures.doubts.first().map_or(String::new(), |d| {
        format!("the {}; {}", d.input.words(), d.input.how_to_shrink())
    });
}

/// The figures a crew works from, in the order they are asked for.
fn figures(figures: &TreeFigures) -> Vec<Figure> {
    let mut all = vec![];
    add(&mut all, ("mass", UnitWord::G), figures.mass, 1_000.0);
    add_angle(&mut all, "effective_lean", figures.effective_lean);
    add_angle(&mut all, "inline_lean", figures.inline_lean);
    add_angle(&mut all, "side_lean", figures.side_lean);
    add(
        &mut all,
        ("moment_inline", UnitWord::MnM),
        figures.moment_inline,
        1_000.0,
    );
    if let Some(back_cut) = &figures.back_cut {
        add(
            &mut all,
            ("commit_ligament", UnitWord::Um),
            Some(back_cut.commit_ligament),
            1.0e6,
        );
        let ratio = back_cut.split_ratio_at_commit;
        let ppm = |r: f64| whole(r.min(1.0e6) * 1.0e6);
        all.push(Figure {
            name: "split_ratio_at_commit".to_owned(),
            unit: UnitWord::Ppm,
            band: [ppm(ratio.low), ppm(ratio.best), ppm(ratio.high)],
        });
    }
    if let Some(brisk) = &figures.brisk {
        add(
            &mut all,
            ("seconds_to_commit", UnitWord::Ms),
            brisk.seconds_to_commit,
            1_000.0,
        );
        add(
            &mut all,
            ("seconds_at_rate", UnitWord::Ms),
            brisk.seconds_at_rate,
            1_000.0,
        );
    }
    if let Some(strap) = &figures.strap {
        add(
            &mut all,
            ("strap_thickness_min", UnitWord::Um),
            Some(strap.thickness_min),
            1.0e6,
        );
    }
    let exact = |seconds: crate::units::Duration| Some(Band::exact(seconds));
    if let Some(fall) = &figures.fall {
        add(
            &mut all,
            ("fall_seconds_min", UnitWord::Ms),
            exact(fall.seconds_min),
            1_000.0,
        );
    }
    if let Some(escape) = &figures.escape {
        add(
            &mut all,
            ("escape_seconds", UnitWord::Ms),
            Some(escape.seconds),
            1_000.0,
        );
    }
    add(
        &mut all,
        ("ring", UnitWord::Um),
        figures.ring.map(Band::exact),
        1.0e6,
    );
    all
}

fn add<T: FromSi>(
    all: &mut Vec<Figure>,
    (name, unit): (&str, UnitWord),
    band: Option<Band<T>>,
    scale: f64,
) {
    if let Some(band) = band {
        let end = |value: T| whole(value.to_si() * scale);
        all.push(Figure {
            name: name.to_owned(),
            unit,
            band: [end(band.low), end(band.best), end(band.high)],
        });
    }
}

fn add_angle(all: &mut Vec<Figure>, name: &str, band: Option<Band<Angle>>) {
    if let Some(band) = band {
        let end = |angle: Angle| whole(angle.in_deg() * 1_000.0);
        all.push(Figure {
            name: name.to_owned(),
            unit: UnitWord::Mdeg,
            band: [end(band.low), end(band.best), end(band.high)],
        });
    }
}

/// The rungs, each id once. What the hold line, the walk-up or a cut's own answer asks already is
/// no rung of its own: a stage has at most nine. The hold line stands before the committing cut:
/// the release where a slot is opened, the first cut that opens the rear otherwise, whatever the
/// author's own hold says.
fn rungs(card: &mut Card, steps: &[Step], parts: &Parts) {
    let stump = card.stump;
    let plunged = steps
        .iter()
        .any(|s| matches!(s.act, StepAct::Cut(Cut::Plunge { .. })));
    let mut committed = false;
    for step in steps {
        let released = matches!(step.act, StepAct::Cut(Cut::StrapRelease));
        let commits = released || (!plunged && opens_the_rear(step));
        if asked_elsewhere(step) {
            continue;
        }
        let mut rung = rung_of(step, (&stump, plunged), &parts.cuts);
        // A wedge after the hinge is reached is there to drive the tree over.
        if rung.word == "wedge" && card.rungs.iter().any(|r| r.word == "back-cut") {
            rung.word = "wedge-over".to_owned();
            rung.id.clone_from(&rung.word);
        }
        let same = card.rungs.iter().filter(|r| r.word == rung.word).count();
        if same > 0 {
            rung.id = format!("{}-{}", rung.word, same + 1);
        }
        rung.commits = commits && !committed;
        committed |= rung.commits;
        card.rungs.push(rung);
    }
}

fn opens_the_rear(step: &Step) -> bool {
    match &step.act {
        StepAct::Cut(Cut::BackCut { .. } | Cut::TiltedBackCut { .. } | Cut::StrapRelease) => true,
        StepAct::Do(Task::LineTension) => true,
        StepAct::Cut(_) | StepAct::Check { .. } | StepAct::Hold { .. } | StepAct::Do(_) => false,
    }
}

fn asked_elsewhere(step: &Step) -> bool {
    match &step.act {
        StepAct::Check { what } => what != "face",
        StepAct::Do(Task::Clear | Task::Retreat) | StepAct::Hold { .. } => true,
        StepAct::Do(Task::Wedge | Task::LineTension) | StepAct::Cut(_) => false,
    }
}
