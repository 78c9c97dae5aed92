//! What the size-ups say of the plan's trees, as findings: no method, steps that split, a method
//! by hand that its own sum is against. It sizes nothing up itself.

use super::sized::SizedTree;
use crate::diagnostic::{Finding, Place, Severity};
use crate::method::Choice;
use crate::plan::Tree;
use crate::simulate::Verdict;

/// Findings of one tree.
pub(super) fn of(tree: &Tree, sized: &SizedTree) -> Vec<Finding> {
    let mut found = vec![];
    for held in &sized.held_back {
        found.push(finding(
            "TREE-01",
            Severity::Stop,
            (tree, "state"),
            held.clone(),
        ));
    }
    let Some(size_up) = &sized.size_up else {
        return found;
    };
    if size_up.choice == Choice::Refuse && sized.held_back.is_empty() {
        let all = size_up
            .refused
            .iter()
            .filter(|r| r.method.is_none())
            .chain(&size_up.refused);
        let why = all
            .map(|r| r.reason.as_str())
            .next()
            .unwrap_or("no method fits");
        let words = format!("no cutting method is proposed for {}: {why}", tree.id.value);
        found.push(finding("TREE-01", Severity::Stop, (tree, "method"), words));
    }
    match &sized.run {
        Some(Err(error)) => {
            found.push(finding(
                "TREE-02",
                Severity::Stop,
                (tree, "steps"),
                format!("the steps cannot be carried out: {error}"),
            ));
        }
        Some(Ok(run))
            if matches!(
                run.verdict,
                Verdict::Splits | Verdict::Pinches | Verdict::SitsBack
            ) =>
        {
            let words = match (run.verdict, run.first(run.verdict)) {
                (verdict, Some(state)) => format!(
                    "on the virtual stump this sequence {}: step {}, {}, {:.0} cm into the cut",
                    word(verdict),
                    state.step,
                    state.cut.word(),
                    state.progress.in_cm()
                ),
                (verdict, None) => format!("on the virtual stump this sequence {}", word(verdict)),
            };
            let place = if sized.by_hand { "steps" } else { "method" };
            found.push(finding("TREE-03", Severity::Stop, (tree, place), words));
        }
        Some(Ok(_)) | None => {}
    }
    if let Some((by_mass, by_volume)) = size_up.figures.mass_by_two_routes {
        let apart = (by_mass - by_volume).abs() / by_mass.max(by_volume);
        if apart > MASS_ROUTES_APART {
            let words = format!(
                "two estimates of the mass are {:.0} % apart ({:.0} and {:.0} kg); the heavier is used",
                apart * 100.0,
                by_mass.value(),
                by_volume.value()
            );
            found.push(finding("TREE-04", Severity::Caution, (tree, "dbh"), words));
        }
    }
    found
}

/// Estimates further apart are said. Source: our judgement, a quarter.
const MASS_ROUTES_APART: f64 = 0.25;

const fn word(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Splits => "splits the stem",
        Verdict::Pinches => "pinches the bar",
        Verdict::SitsBack => "lets the tree sit back",
        Verdict::Holds => "holds",
        Verdict::Moves => "lets the tree go",
    }
}

fn finding(
    code: &'static str,
    severity: Severity,
    (tree, key): (&Tree, &str),
    message: String,
) -> Finding {
    let help = match code {
        "TREE-01" => {
            "see `stumpside sizeup` for every reason; ask the qualified person, or bring what would change the answer"
        }
        "TREE-02" => "put the steps in an order a saw can follow: face, then plunge or back cut",
        "TREE-03" => {
            "see `stumpside simulate` for the centimetre; let `method: auto` and `steps: auto` choose, or cut less before the hinge is thin"
        }
        _ => "measure diameter and height again, or give `weigh`",
    };
    Finding {
        code,
        severity,
        message,
        place: place_of(tree, key),
        path: format!("{}.{key}", tree.route),
        rule: None,
        help: help.to_owned(),
    }
}

/// Where the key is written, or where the tree begins.
fn place_of(tree: &Tree, key: &str) -> Place {
    let written = match key {
        "method" => tree.method.as_ref().map(|m| m.place),
        "state" => tree.state.as_ref().map(|s| s.place),
        "dbh" => tree.dbh.as_ref().map(|d| d.place),
        "steps" => tree.steps.as_ref().and_then(|s| s.first()).map(|s| s.place),
        _ => None,
    };
    written.unwrap_or(tree.id.place)
}
