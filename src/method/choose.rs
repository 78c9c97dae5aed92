//! Chooses the method of one tree, in a fixed order from the least guarded to refusal. Every
//! choice and every refusal comes with its sentence; a refusal is an answer, not a failure.

use crate::figures::SiteStop;
use crate::method::bench::{Assessed, Bench, stump_of_model};
use crate::method::lay_out::steps;
use crate::method::{brisk, plunge, relieved, rigged, straight, tilted, wedged};
use crate::plan::step::{Cut, MethodName};
use crate::simulate::{Run, Verdict, run};

/// What is proposed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Choice {
    /// A method.
    Proposed(MethodName),
    /// None: not with a chainsaw alone, or not on these readings.
    Refuse,
}

/// A method, or every method, with the sentence why not.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Refusal {
    /// The method; `None` for all of them.
    pub method: Option<MethodName>,
    /// Why not.
    pub reason: String,
}

/// A choice with what it rests on.
#[derive(Debug, Clone)]
pub(super) struct Chosen {
    pub choice: Choice,
    pub cut: Assessed,
    pub reasons: Vec<String>,
    pub refused: Vec<Refusal>,
}

/// Chooses; or judges the method chosen by hand.
pub(super) fn choose(bench: &Bench<'_>) -> Chosen {
    let stops = stops(bench);
    if !stops.is_empty() {
        return Chosen {
            choice: Choice::Refuse,
            cut: bench.assess(bench.plain(MethodName::StraightBackCut)),
            reasons: Vec::new(),
            refused: stops,
        };
    }
    bench
        .input
        .overrides
        .method
        .map_or_else(|| by_sum(bench), |method| by_hand(bench, method))
}

/// What forbids every method.
fn stops(bench: &Bench<'_>) -> Vec<Refusal> {
    let site = bench.input.site_stops.iter().map(|stop| {
        match stop {
            SiteStop::NoWayOut => "no way out is open: clear one and walk it, then size up again",
            SiteStop::PowerLineInReach => {
                "a power line is within reach of the tree: ask its owner, and size up again when it is dead or the tree is shorter"
            }
            SiteStop::ApprovalMissing => {
                "the approval that the rules ask for is missing: ask the person the plan names"
            }
        }
        .to_owned()
    });
    let concern = bench
        .model
        .concern
        .map(|concern| format!("{concern}: ask the qualified person, or measure again"));
    site.chain(concern)
        .map(|reason| Refusal {
            method: None,
            reason,
        })
        .collect()
}

fn by_sum(bench: &Bench<'_>) -> Chosen {
    let mut tried = Tried {
        bench,
        refused: Vec::new(),
    };
    let plain = bench.assess(bench.plain(MethodName::StraightBackCut));
    let found = if plain.demand < 0.0 {
        tried.back_leaner(&plain)
    } else {
        tried.head_leaner(&plain)
    };
    let refused = tried.refused;
    match found {
        Some((cut, mut reasons)) => {
            reasons.extend(cut.side_reason(bench));
            Chosen {
                choice: Choice::Proposed(cut.layout.method),
                cut,
                reasons,
                refused,
            }
        }
        None => Chosen {
            choice: Choice::Refuse,
            cut: plain,
            reasons: Vec::new(),
            refused,
        },
    }
}

type Found = Option<(Assessed, Vec<String>)>;

struct Tried<'a> {
    bench: &'a Bench<'a>,
    refused: Vec<Refusal>,
}

impl Tried<'_> {
    /// Takes a method that its own rule and the virtual stump agree on; else keeps the sentence.
    fn take(
        &mut self,
        method: MethodName,
        judged: Result<(Assessed, Vec<String>), String>,
    ) -> Found {
        let agreed = judged.and_then(|(cut, reasons)| {
            agrees(self.bench, &cut)?;
            Ok((cut, reasons))
        });
        match agreed {
            Ok(found) => Some(found),
            Err(reason) => {
                self.refused.push(Refusal {
                    method: Some(method),
                    reason,
                });
                None
            }
        }
    }

    fn head_leaner(&mut self, plain: &Assessed) -> Found {
        let bench = self.bench;
        let as_method = |method| named(plain, method);
        let cut = as_method(MethodName::StraightBackCut);
        let judged = straight::judge(bench, &cut).map(|reasons| (cut, reasons));
        let found = self.take(MethodName::StraightBackCut, judged);
        if found.is_some() {
            return found.map(|found| with_wedge(bench, found));
        }
        let cut = as_method(MethodName::BriskBackCut);
        let judged = brisk::judge(bench, &cut).map(|reasons| (cut, reasons));
        let found = self.take(MethodName::BriskBackCut, judged);
        if found.is_some() {
            return found.map(|found| with_wedge(bench, found));
        }
        let found = self.take(MethodName::PlungeWithStrap, plunge::find(bench));
        if found.is_some() {
            return found.map(|found| with_wedge(bench, found));
        }
        self.take(MethodName::SideRelievedBackCut, relieved::find(bench))
    }

    fn back_leaner(&mut self, plain: &Assessed) -> Found {
        let bench = self.bench;
        self.refused.push(Refusal {
            method: Some(MethodName::StraightBackCut),
            reason: format!(
                "the tree sits back: its weight stands {:.0} cm behind the planned hinge",
                100.0 * (plain.centroid - bench.tree.forward)
            ),
        });
        let sound = |cut: &Assessed| {
            straight::ratios(bench, cut)?;
            cut.side_refusal().map_or(Ok(()), Err)
        };
        if let Some(reasons) = wedged::set_in_straight(bench, plain) {
            self.refused.clear();
            let cut = named(plain, MethodName::StraightBackCut);
            let judged = sound(&cut).map(|()| (cut, reasons));
            let found = self.take(MethodName::StraightBackCut, judged);
            if found.is_some() {
                return found;
            }
        }
        let cut = named(plain, MethodName::WedgedBackCut);
        let judged = sound(&cut)
            .and_then(|()| wedged::judge(bench, &cut))
            .map(|reasons| (cut, reasons));
        let found = self.take(MethodName::WedgedBackCut, judged);
        if found.is_some() {
            return found;
        }
        let cut = named(plain, MethodName::RiggedBackCut);
        let judged = sound(&cut)
            .and_then(|()| rigged::judge(bench, &cut))
            .map(|reasons| (cut, reasons));
        self.take(MethodName::RiggedBackCut, judged)
    }
}

/// The same cuts under another method's name.
fn named(cut: &Assessed, method: MethodName) -> Assessed {
    let mut cut = *cut;
    cut.layout.method = method;
    cut
}

fn with_wedge(bench: &Bench<'_>, found: (Assessed, Vec<String>)) -> (Assessed, Vec<String>) {
    let (cut, mut reasons) = found;
    if cut.wants_wedge() {
        reasons.push(if wedged::wedge_fits(bench, &cut) {
            "at the back end of the doubt the tree sits back: a wedge is set before the hinge is reached".to_owned()
        } else {
            "at the back end of the doubt the tree sits back, and no wedge fits behind the bar: keep a hand line or a pole ready".to_owned()
        });
    }
    (cut, reasons)
}

/// Whether the virtual stump agrees with a method's own rule.
fn agrees(bench: &Bench<'_>, cut: &Assessed) -> Result<(), String> {
    let stump = stump_of_model(bench.input, bench.model, bench.table);
    let run = run(&stump, &steps(bench, cut)).map_err(|error| error.to_string())?;
    disagreement(&run, cut.layout.method).map_or(Ok(()), Err)
}

/// What the virtual stump says against a method, in a sentence.
pub(super) fn disagreement(run: &Run, method: MethodName) -> Option<String> {
    let state = run.states.iter().find(|state| match state.verdict {
        Verdict::Holds => false,
        Verdict::Splits | Verdict::Pinches | Verdict::SitsBack => true,
        Verdict::Moves => match method {
            MethodName::StraightBackCut
            | MethodName::BriskBackCut
            | MethodName::TiltedBackCut
            | MethodName::SideRelievedBackCut => {
                !matches!(state.cut, Cut::BackCut { .. } | Cut::TiltedBackCut { .. })
            }
            MethodName::PlungeWithStrap => !matches!(state.cut, Cut::StrapRelease),
            MethodName::WedgedBackCut | MethodName::RiggedBackCut => true,
        },
    })?;
    Some(format!(
        "on the virtual stump the sequence comes to \"{}\" at step {} ({}), {:.0} cm into the cut",
        state.verdict.word(),
        state.step,
        state.cut.word(),
        state.progress.in_cm()
    ))
}

/// Judges the method chosen by hand; what the sums would choose is said beside it.
fn by_hand(bench: &Bench<'_>, method: MethodName) -> Chosen {
    let sum = by_sum(bench);
    let plain = || bench.assess(bench.plain(method));
    let (cut, judged) = match method {
        MethodName::StraightBackCut => {
            let cut = plain();
            (cut, straight::judge(bench, &cut))
        }
        MethodName::BriskBackCut => {
            let cut = plain();
            (cut, brisk::judge(bench, &cut))
        }
        MethodName::PlungeWithStrap => plunge::find(bench).map_or_else(
            |reason| (plunge::by_hand(bench), Err(reason)),
            |(cut, reasons)| (cut, Ok(reasons)),
        ),
        MethodName::TiltedBackCut => {
            let cut = tilted::by_hand(bench);
            (cut, Ok(tilted::reasons(&cut)))
        }
        MethodName::SideRelievedBackCut => relieved::find(bench).map_or_else(
            |reason| (relieved::by_hand(bench), Err(reason)),
            |(cut, reasons)| (cut, Ok(reasons)),
        ),
        MethodName::WedgedBackCut => {
            let cut = plain();
            (cut, wedged::judge(bench, &cut))
        }
        MethodName::RiggedBackCut => {
            let cut = plain();
            (cut, rigged::judge(bench, &cut))
        }
    };
    let mut reasons = vec![format!("{} was chosen by hand", method.word())];
    let mut refused = Vec::new();
    let mut against = |reason: String| {
        refused.push(Refusal {
            method: Some(method),
            reason,
        });
    };
    match judged {
        Ok(more) => reasons.extend(more),
        Err(reason) => against(reason),
    }
    if let Err(reason) = agrees(bench, &cut) {
        against(reason);
    }
    reasons.push(match sum.choice {
        Choice::Proposed(other) if other == method => "the sums would choose the same".to_owned(),
        Choice::Proposed(other) => format!("the sums would choose {}", other.word()),
        Choice::Refuse => "the sums would refuse every method".to_owned(),
    });
    Chosen {
        choice: Choice::Proposed(method),
        cut,
        reasons,
        refused,
    }
}
