//! `simulate`: a tree's steps on the virtual stump, judged after each step and at each centimetre
//! of a progressive cut.

use std::path::PathBuf;

use clap::Args;
use serde_json::{Value as Json, json};

use super::sizeup::plan_or_exit;
use crate::assessment::{self, SizedTree};
use crate::cli::exit::Exit;
use crate::cli::output::{Format, Output};
use crate::plan::Tree;
use crate::plan::step::{Cut, Edge};
use crate::simulate::{Run, State};
use crate::units::{Band, FromSi, Length};

/// What `simulate` takes.
#[derive(Debug, Clone, Args)]
pub struct SimulateArgs {
    /// The job plan.
    pub plan: PathBuf,
    /// The tree.
    #[arg(long, value_name = "ID")]
    pub tree: String,
    /// In which form the states are printed.
    #[arg(long, value_enum, default_value_t)]
    pub format: Format,
}

/// Runs it. Whatever the verdict, it was asked for: no only where there is nothing to simulate.
pub fn run(args: &SimulateArgs, output: &mut Output<'_>) -> Exit {
    let (_, plan) = match plan_or_exit(&args.plan, output) {
        Ok(read) => read,
        Err(exit) => return exit,
    };
    let Some(tree) = plan.trees.iter().find(|t| t.id.value == args.tree) else {
        output.talk(&format!(
            "stumpside: no tree `{}` in {}",
            args.tree,
            args.plan.display()
        ));
        return Exit::No;
    };
    let sized = assessment::size_up(&plan, tree, &[]);
    match &sized.run {
        Some(Ok(run)) => {
            match args.format {
                Format::Json => output.data(&json_of(tree, &sized, run).to_string()),
                Format::Text => output.data_raw(text_of(tree, &sized, run).as_bytes()),
            }
            Exit::Good
        }
        Some(Err(error)) => {
            output.talk(&format!("stumpside: tree {}: {error}", args.tree));
            Exit::No
        }
        None => {
            output.talk(&format!(
                "stumpside: tree {}: no steps can be simulated; see `stumpside sizeup`",
                args.tree
            ));
            Exit::No
        }
    }
}

fn json_of(tree: &Tree, sized: &SizedTree, run: &Run) -> Json {
    let (moment, ligament) = crossing(sized);
    let states: Vec<Json> = run.states.iter().map(state_json).collect();
    json!({
        "format": 1,
        "tree": tree.id.value,
        "m_star_nm": moment,
        "h_star_m": ligament,
        "verdict": run.verdict.word(),
        "states": states,
    })
}

/// Where holding and splitting cross, as bands; ends are null where the hinge always bends first.
fn crossing(sized: &SizedTree) -> (Json, Json) {
    fn ends<T: FromSi>(band: Band<Option<T>>) -> Json {
        let end = |v: Option<T>| v.map(FromSi::to_si);
        json!({"low": end(band.low), "best": end(band.best), "high": end(band.high)})
    }
    match sized.crossing() {
        Some(band) => (ends(band.moment), ends(band.ligament)),
        None => (Json::Null, Json::Null),
    }
}

fn state_json(state: &State) -> Json {
    let standing: Vec<Json> = state
        .standing
        .iter()
        .map(|piece| {
            let corners: Vec<Json> = piece.corners.iter().map(|c| json!([c.y, c.x])).collect();
            let holes: Vec<Json> = piece
                .holes
                .iter()
                .map(|h| json!({"diameter_m": h.diameter.value(), "forward_m": h.forward.value(), "right_m": h.right.value()}))
                .collect();
            json!({"from_m": piece.from.value(), "to_m": piece.to.value(), "corners": corners, "holes": holes})
        })
        .collect();
    let section = state.section.map_or(Json::Null, |s| {
        json!({
            "area_m2": s.area.value(),
            "centroid_forward_m": s.forward.value(),
            "i_inline_m4": s.i_inline.value(),
            "i_side_m4": s.i_side.value(),
        })
    });
    json!({
        "step": state.step,
        "cut": state.cut.word(),
        "progress_m": state.progress.value(),
        "standing": standing,
        "remaining_area_m2": state.remaining_area.value(),
        "section": section,
        "moment_nm": state.moment.map(FromSi::to_si),
        "hold_moment_nm": state.hold_moment.value(),
        "split_moment_nm": state.split_moment.map(FromSi::to_si),
        "hold_ratio": state.hold_ratio,
        "split_ratio": state.split_ratio,
        "verdict": state.verdict.word(),
    })
}

fn text_of(tree: &Tree, sized: &SizedTree, run: &Run) -> String {
    let mut text = format!(
        "{}  {}, on the virtual stump\n",
        tree.id.value, tree.species.value
    );
    if sized.by_hand {
        text.push_str("steps written by hand, judged as they are\n");
    }
    if let Some(crossing) = &run.crossing {
        text.push_str(&format!(
            "a demand above {:.0} kN m splits this stem in a plain back cut (at {:.0} cm of wood left)\n",
            crossing.moment.value() / 1_000.0,
            crossing.ligament.in_cm()
        ));
    }
    text.push_str("step  cut              progress  asked kNm  holds kNm  splits kNm  verdict\n");
    for state in &run.states {
        let number =
            |value: Option<f64>| value.map_or("-".to_owned(), |v| format!("{:.1}", v / 1_000.0));
        text.push_str(&format!(
            "{:>4}  {:<15} {:>6.1} cm {:>10} {:>10} {:>11}  {}\n",
            state.step,
            state.cut.word(),
            state.progress.in_cm(),
            number(state.moment.map(FromSi::to_si)),
            number(Some(state.hold_moment.value())),
            number(state.split_moment.map(FromSi::to_si)),
            state.verdict.word()
        ));
    }
    text.push_str(&format!("verdict: {}\n", run.verdict.word()));
    text.push_str("A model of level cuts in sound wood, at best values. The person in charge at the tree decides.\n");
    text
}

/// A cut with its places, in centimetres.
pub(super) fn cut_words(cut: &Cut) -> String {
    let cm = |length: &Length| format!("{:.1} cm", length.in_cm());
    let edge = |edge: &Edge| match edge {
        Edge::FromHinge(length) => format!("{} behind the apex", cm(length)),
        Edge::FromRear(length) => format!("{} from the rear", cm(length)),
    };
    let place = match cut {
        Cut::FaceSlope { depth, opening } => {
            format!("{} deep, face opens {:.0} deg", cm(depth), opening.in_deg())
        }
        Cut::FaceFloor { depth } => format!("{} deep", cm(depth)),
        Cut::Plunge { front, rear } => format!("from {} to {}", edge(front), edge(rear)),
        Cut::HingeTrim { hinge } => format!("hinge {}", cm(hinge)),
        Cut::BackCut { to } => format!("to {}", edge(to)),
        Cut::TiltedBackCut { to, tilt } => {
            format!("to {}, tilted {:.0} deg", edge(to), tilt.in_deg())
        }
        Cut::ReliefLeft { width, to } | Cut::ReliefRight { width, to } => {
            format!("{} wide, to {}", cm(width), edge(to))
        }
        Cut::StrapRelease => "a little lower, from outside".to_owned(),
    };
    format!("{}, {place}", cut.word())
}
