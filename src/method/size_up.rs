//! One tree sized up: figures, choice, cuts, steps, and the virtual stump's word on them.

use crate::figures::{CannotSay, CaseState, Layout, Model, TreeFigures, TreeInput, figures};
use crate::method::bench::{Bench, stump_of_model};
use crate::method::choose::{Choice, Refusal, choose, disagreement};
use crate::method::judgement::{Judgement, STANDARD};
use crate::method::lay_out::steps;
use crate::method::wind_limit::wind_limit;
use crate::plan::step::{MethodName, Step};
use crate::simulate::{Run, Stump, run};
use crate::units::Speed;

/// The answer for one tree.
#[derive(Debug, Clone, PartialEq)]
pub struct SizeUp {
    /// Every figure.
    pub figures: TreeFigures,
    /// What is proposed.
    pub choice: Choice,
    /// Why, in sentences.
    pub reasons: Vec<String>,
    /// What was not proposed and why.
    pub refused: Vec<Refusal>,
    /// The cuts the figures rest on; `None` where nothing can be said.
    pub layout: Option<Layout>,
    /// The steps of the method proposed; empty where none is.
    pub steps: Vec<Step>,
    /// The steps on the virtual stump.
    pub run: Option<Run>,
    /// Where approval, or somebody to ask, is wanted.
    pub approval_needed: Vec<String>,
    /// The wind at which the choice would change; `None` where none up to storm does.
    pub wind_limit: Option<Speed>,
}

/// Sizes up one tree with the standard table.
pub fn size_up(input: &TreeInput) -> SizeUp {
    size_up_with(input, &STANDARD)
}

/// Sizes up one tree with a table of judged figures.
pub fn size_up_with(input: &TreeInput, table: &Judgement) -> SizeUp {
    let model = match Model::new(input) {
        Ok(model) => model,
        Err(reasons) => return cannot_say(input, &reasons),
    };
    let bench = Bench::new(input, &model, table);
    let chosen = choose(&bench);
    let layout = chosen.cut.layout;
    let figures = figures(input, Ok(&model), Some(&layout));
    let (steps, run) = match chosen.choice {
        Choice::Proposed(_) => {
            let steps = steps(&bench, &chosen.cut);
            let run = run(&stump_of_model(input, &model, table), &steps).ok();
            (steps, run)
        }
        Choice::Refuse => (Vec::new(), None),
    };
    SizeUp {
        approval_needed: approvals(input, &figures, (chosen.choice, run.as_ref())),
        wind_limit: wind_limit(input, table, chosen.choice),
        figures,
        choice: chosen.choice,
        reasons: chosen.reasons,
        refused: chosen.refused,
        layout: Some(layout),
        steps,
        run,
    }
}

/// Nothing can be sized up: every reason is a refusal of all methods.
fn cannot_say(input: &TreeInput, reasons: &[CannotSay]) -> SizeUp {
    SizeUp {
        figures: figures(input, Err(reasons), None),
        choice: Choice::Refuse,
        reasons: Vec::new(),
        refused: reasons
            .iter()
            .map(|reason| Refusal {
                method: None,
                reason: format!("{reason}: without it nothing can be said"),
            })
            .collect(),
        layout: None,
        steps: Vec::new(),
        run: None,
        approval_needed: vec!["ask the qualified person, or bring the missing reading".to_owned()],
        wind_limit: None,
    }
}

fn approvals(
    input: &TreeInput,
    figures: &TreeFigures,
    answer: (Choice, Option<&Run>),
) -> Vec<String> {
    let (choice, run) = answer;
    let mut wanted = Vec::new();
    match choice {
        Choice::Refuse => wanted.push(
            "no method is proposed: ask the qualified person before anybody starts a saw"
                .to_owned(),
        ),
        Choice::Proposed(method) => {
            match method {
                MethodName::PlungeWithStrap => wanted.push(
                    "some rules want the supervisor's approval for felling a heavy leaner: ask before the plunge".to_owned(),
                ),
                MethodName::RiggedBackCut => wanted.push(
                    "who sets the line checks rope, blocks and anchor against their working load".to_owned(),
                ),
                MethodName::TiltedBackCut | MethodName::SideRelievedBackCut => wanted.push(
                    "little is published of this cut: ask the qualified person".to_owned(),
                ),
                MethodName::StraightBackCut
                | MethodName::BriskBackCut
                | MethodName::WedgedBackCut => {}
            }
            if run.is_some_and(|run| disagreement(run, method).is_some()) {
                wanted.push(
                    "the virtual stump speaks against this sequence: ask the qualified person"
                        .to_owned(),
                );
            }
        }
    }
    match figures.cases.state {
        CaseState::WithinLimit => {}
        CaseState::NearLimit | CaseState::PastLimit | CaseState::CannotSay => {
            wanted.push(format!(
                "the state is {}: ask the qualified person",
                figures.cases.state.words()
            ));
        }
    }
    if let Some((one, other)) = figures.mass_by_two_routes
        && input.weigh.is_none()
    {
        let apart = one.value().max(other.value()) / one.value().min(other.value());
        if apart > 1.25 {
            wanted.push(format!(
                "two estimates of the mass are {:.0} % apart ({:.0} and {:.0} kg): measure diameter and height again",
                100.0 * (apart - 1.0),
                one.value(),
                other.value()
            ));
        }
    }
    wanted
}

/// The virtual stump of one tree, for steps written by hand.
///
/// # Errors
/// Every reason why the tree's figures cannot be said.
pub fn stump_of(input: &TreeInput) -> Result<Stump, Vec<CannotSay>> {
    Model::new(input).map(|model| stump_of_model(input, &model, &STANDARD))
}
