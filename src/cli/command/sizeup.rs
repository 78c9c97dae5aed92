//! `sizeup`: every figure of every tree with its band, the method proposed and why.

use std::path::PathBuf;

use clap::Args;
use serde_json::{Map, Value as Json, json};

use super::check::{self, finding_json, findings_of, print_findings};
use crate::assessment::{self, SizedTree};
use crate::cli::exit::Exit;
use crate::cli::output::{Format, Output};
use crate::diagnostic::Finding;
use crate::figures::{CaseState, TreeFigures};
use crate::method::Choice;
use crate::plan::{Plan, Tree};
use crate::shell::job_folder::PlanFile;
use crate::units::{Angle, Band, FromSi};

/// What `sizeup` takes.
#[derive(Debug, Clone, Args)]
pub struct SizeupArgs {
    /// The job plan.
    pub plan: PathBuf,
    /// Only this tree.
    #[arg(long, value_name = "ID")]
    pub tree: Option<String>,
    /// In which form the figures are printed.
    #[arg(long, value_enum, default_value_t)]
    pub format: Format,
}

/// A plan that was read, or the exit code where it was not.
pub(super) fn plan_or_exit(
    path: &std::path::Path,
    output: &mut Output<'_>,
) -> Result<(PlanFile, Plan), Exit> {
    let file = check::read(path).map_err(|error| {
        output.talk(&format!("stumpside: {error}"));
        Exit::Unreadable
    })?;
    match file.loaded.plan.clone() {
        Some(plan) => Ok((file, plan)),
        None => {
            print_findings(&file.source, &findings_of(&file), output);
            output.talk("stumpside: the plan cannot be sized up as it stands");
            Err(Exit::No)
        }
    }
}

/// Runs it.
pub fn run(args: &SizeupArgs, output: &mut Output<'_>) -> Exit {
    let (file, plan) = match plan_or_exit(&args.plan, output) {
        Ok(read) => read,
        Err(exit) => return exit,
    };
    let trees: Vec<(usize, &Tree)> = plan
        .trees
        .iter()
        .enumerate()
        .filter(|(_, t)| args.tree.as_ref().is_none_or(|id| *id == t.id.value))
        .collect();
    if trees.is_empty() {
        let id = args.tree.as_deref().unwrap_or("");
        output.talk(&format!(
            "stumpside: no tree `{id}` in {}",
            args.plan.display()
        ));
        return Exit::No;
    }
    let findings = findings_of(&file);
    let sized: Vec<(&Tree, SizedTree, Vec<&Finding>)> = trees
        .into_iter()
        .map(|(index, tree)| {
            let own = format!("trees[{index}]");
            let about = |f: &&Finding| f.path == own || f.path.starts_with(&format!("{own}."));
            (
                tree,
                assessment::size_up(&plan, tree, &[]),
                findings.iter().filter(about).collect(),
            )
        })
        .collect();
    match args.format {
        Format::Json => {
            let all: Vec<Json> = sized
                .iter()
                .map(|(tree, sized, findings)| tree_json(tree, sized, (&file, findings)))
                .collect();
            let object = json!({"format": 1, "plan": file.source.name(), "trees": all});
            output.data(&object.to_string());
        }
        Format::Text => {
            for (tree, sized, findings) in &sized {
                output.data_raw(super::sizeup_text::tree(tree, sized, findings).as_bytes());
            }
            for caution in &crate::parts::Parts::built_in().tailgate.cautions {
                output.data(caution);
            }
        }
    }
    Exit::Good
}

fn tree_json(tree: &Tree, sized: &SizedTree, (file, findings): (&PlanFile, &[&Finding])) -> Json {
    let mut m = Map::new();
    m.insert("id".into(), tree.id.value.clone().into());
    m.insert("species".into(), tree.species.value.clone().into());
    let figures = sized.size_up.as_ref().map(|s| &s.figures);
    weight(&mut m, figures);
    cuts(&mut m, figures);
    around(&mut m, figures, sized);
    m.insert("method".into(), method(sized));
    let findings: Vec<Json> = findings
        .iter()
        .map(|f| finding_json(&file.source, f))
        .collect();
    m.insert("findings".into(), findings.into());
    Json::Object(m)
}

/// A band in SI, or null.
fn band<T: FromSi>(band: Option<Band<T>>) -> Json {
    band.map_or(
        Json::Null,
        |b| json!({"low": b.low.to_si(), "best": b.best.to_si(), "high": b.high.to_si()}),
    )
}

/// A band some of whose ends cannot be said.
fn gaps<T: FromSi>(band: Option<Band<Option<T>>>) -> Json {
    let end = |value: Option<T>| value.map_or(Json::Null, |v| v.to_si().into());
    band.map_or(
        Json::Null,
        |b| json!({"low": end(b.low), "best": end(b.best), "high": end(b.high)}),
    )
}

fn degrees(band: Option<Band<Angle>>) -> Json {
    band.map_or(
        Json::Null,
        |b| json!({"low": b.low.in_deg(), "best": b.best.in_deg(), "high": b.high.in_deg()}),
    )
}

fn ratio(b: Band<f64>) -> Json {
    json!({"low": b.low, "best": b.best, "high": b.high})
}

fn weight(m: &mut Map<String, Json>, f: Option<&TreeFigures>) {
    let centre = f.and_then(|f| f.centre);
    m.insert("mass_kg".into(), band(f.and_then(|f| f.mass)));
    m.insert("weight_n".into(), band(f.and_then(|f| f.weight)));
    m.insert("stem_mass_kg".into(), band(f.and_then(|f| f.stem_mass)));
    m.insert("crown_mass_kg".into(), band(f.and_then(|f| f.crown_mass)));
    m.insert(
        "cg".into(),
        json!({
            "forward_m": band(centre.map(|c| c.forward)),
            "right_m": band(centre.map(|c| c.right)),
            "height_m": band(centre.map(|c| c.height)),
        }),
    );
    m.insert(
        "effective_lean_deg".into(),
        degrees(f.and_then(|f| f.effective_lean)),
    );
    m.insert(
        "lean_toward_deg".into(),
        f.and_then(|f| f.lean_toward).map(|b| b.in_deg()).into(),
    );
    m.insert(
        "inline_lean_deg".into(),
        degrees(f.and_then(|f| f.inline_lean)),
    );
    m.insert("side_lean_deg".into(), degrees(f.and_then(|f| f.side_lean)));
    m.insert(
        "moment_inline_nm".into(),
        band(f.and_then(|f| f.moment_inline)),
    );
    m.insert("moment_side_nm".into(), band(f.and_then(|f| f.moment_side)));
    m.insert("wind_moment_nm".into(), band(f.and_then(|f| f.wind_moment)));
}

fn cuts(m: &mut Map<String, Json>, f: Option<&TreeFigures>) {
    let face = f.and_then(|f| f.face).map_or(Json::Null, |face| {
        json!({
            "depth_m": face.depth.value(),
            "opening_deg": face.opening.in_deg(),
            "hinge_length_m": face.hinge_length.value(),
        })
    });
    m.insert("face".into(), face);
    let hinge = f.and_then(|f| f.hinge_thickness).map(|h| h.value());
    m.insert("hinge".into(), json!({"thickness_m": hinge}));
    let back_cut = f.and_then(|f| f.back_cut).map_or(Json::Null, |b| {
        json!({
            "area_m2": b.area.best.value(),
            "commit_ligament_m": band(Some(b.commit_ligament)),
            "split_ratio_at_commit": ratio(b.split_ratio_at_commit),
        })
    });
    m.insert("back_cut".into(), back_cut);
    let tilt = |b: Band<Option<Angle>>| {
        let end = |a: Option<Angle>| a.map(Angle::in_deg);
        json!({"low": end(b.low), "best": end(b.best), "high": end(b.high)})
    };
    let brisk = f.and_then(|f| f.brisk).map_or(Json::Null, |b| {
        json!({
            "stretch_m": band(Some(b.stretch)),
            "area_m2": band(Some(b.area)),
            "seconds_at_rate": band(b.seconds_at_rate),
            "rate_needed_m2_s": gaps(b.rate_needed),
            "tilt_at_hinge_deg": b.tilt_at_hinge.map_or(Json::Null, tilt),
            "seconds_to_commit": band(b.seconds_to_commit),
        })
    });
    m.insert("brisk".into(), brisk);
    let strap = f.and_then(|f| f.strap).map_or(Json::Null, |s| {
        json!({"tension_n": band(Some(s.tension)), "thickness_min_m": band(Some(s.thickness_min))})
    });
    m.insert("strap".into(), strap);
    let plunge = f.and_then(|f| f.plunge);
    m.insert(
        "plunge".into(),
        plunge.map_or(
            Json::Null,
            |p| json!({"fits": p.fits, "room_m": p.room.value()}),
        ),
    );
    let margin = f.and_then(|f| f.side_margin).map_or(
        Json::Null,
        |b| json!({"low": b.low, "best": b.best, "high": b.high}),
    );
    m.insert("side".into(), json!({"margin": margin}));
}

fn around(m: &mut Map<String, Json>, f: Option<&TreeFigures>, sized: &SizedTree) {
    let rigging = f
        .and_then(|f| f.pull)
        .map_or(Json::Null, |pull| json!({"pull_n": band(Some(pull))}));
    m.insert("rigging".into(), rigging);
    let wedge = f
        .and_then(|f| f.wedge_lift)
        .map_or(Json::Null, |lift| json!({"lift_m": band(Some(lift))}));
    m.insert("wedge".into(), wedge);
    let fall = f.and_then(|f| f.fall).map_or(Json::Null, |fall| {
        json!({"seconds_min": fall.seconds_min.value(), "tip_speed_m_s": fall.tip_speed.value()})
    });
    m.insert("fall".into(), fall);
    let escape = f
        .and_then(|f| f.escape.as_ref())
        .map_or(Json::Null, |escape| {
            let by_way: Vec<Json> = escape
                .by_way
                .iter()
                .map(|(id, s)| json!({"id": id, "seconds": s.value()}))
                .collect();
            json!({"seconds": band(Some(escape.seconds)), "by_way": by_way})
        });
    m.insert("escape".into(), escape);
    let ring = f.and_then(|f| f.ring).map(|r| r.value());
    m.insert(
        "zone".into(),
        json!({"radius_m": ring, "conflicts": sized.ring_conflicts}),
    );
    let cases = f.map_or(json!({"of": 20, "past_limit": null, "state": CaseState::CannotSay.word()}), |f| {
        json!({"of": f.cases.of, "past_limit": f.cases.past_limit, "state": f.cases.state.word()})
    });
    m.insert("cases".into(), cases);
}

/// The method proposed with reasons and refusals; null where none is.
fn method(sized: &SizedTree) -> Json {
    let Some(size_up) = &sized.size_up else {
        return json!({
            "proposed": null,
            "reasons": [],
            "refused": [{"method": null, "reason": "the species or the lay is not known"}],
        });
    };
    let proposed = match (size_up.choice, sized.held_back.is_empty()) {
        (Choice::Proposed(method), true) => Some(method.word()),
        (Choice::Proposed(_) | Choice::Refuse, _) => None,
    };
    let mut refused: Vec<Json> = sized
        .held_back
        .iter()
        .map(|reason| json!({"method": null, "reason": reason}))
        .collect();
    refused.extend(
        size_up
            .refused
            .iter()
            .map(|r| json!({"method": r.method.map(|m| m.word()), "reason": r.reason})),
    );
    json!({"proposed": proposed, "reasons": size_up.reasons, "refused": refused})
}
