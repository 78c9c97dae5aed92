//! One tree and the whole site: figures, method and findings together. Here the plan is held
//! against itself and against the rule sets it names. Nothing found is caused by something found
//! already.

mod codes;
mod cuts;
mod day;
mod explain;
mod inputs;
mod look;
mod references;
mod sets;
mod sized;
mod site;
mod trees;
mod verdicts;
mod ways;

use std::collections::BTreeMap;

pub use codes::EXPLANATIONS;
pub use explain::{Explained, all_explanations};

use rayon::prelude::*;

use crate::diagnostic::{Finding, Severity};
use crate::method::Choice;
use crate::parts::Parts;
use crate::plan::{Partial, Plan, Tree};
use crate::rules::{self, Facts, SizeUp};
use crate::species;
use look::{Check, Look};

pub use inputs::{Since, distance, lean, tree_input};
pub use sized::{SizedTree, size_up};

/// Says whether a species is known, or which known ones are nearest.
pub type KnowsSpecies<'a> = &'a dyn Fn(&str) -> Result<(), Vec<String>>;

/// What a plan is held against.
#[derive(Clone, Copy)]
pub struct Ground<'a> {
    /// The rule sets, built in or from the plan's own folder.
    pub parts: &'a Parts,
    /// Whether a species is known.
    pub knows_species: KnowsSpecies<'a>,
    /// What size-ups give, by tree id; empty where none were made.
    pub size_ups: &'a BTreeMap<String, SizeUp>,
}

/// Every check of the plan against itself.
const CHECKS: &[Check] = &[
    references::unknown_ids,
    references::cycles,
    references::leader_role,
    references::sawyer_role,
    references::rescue_sawyer,
    references::double_ids,
    sets::unknown_set,
    sets::no_set,
    sets::unknown_rules,
    sets::replaced_set,
    trees::unknown_species,
    trees::lacks,
    trees::crown_unknown,
    trees::crown_above_top,
    trees::stump_and_dbh,
    trees::defect_outside,
    cuts::hinge_thicker_than_stem,
    cuts::face_past_centre,
    cuts::no_room,
    cuts::steps_differ,
    cuts::bar_too_short,
    cuts::method_lacks_means,
    ways::into_the_lay,
    ways::too_few,
    day::wind_expected,
    day::gust_below_wind,
    day::trained_later,
    day::uncontrolled_hazard,
    day::stop_means,
    site::two_sawyers,
    site::no_voltage,
    site::no_position,
];

/// Every finding about a plan's values against each other and the built-in rules. Species are
/// taken as they stand and no tree is sized up.
pub fn findings(plan: &Plan) -> Vec<Finding> {
    let ground = Ground {
        parts: &Parts::built_in(),
        knows_species: &|_| Ok(()),
        size_ups: &BTreeMap::new(),
    };
    look_through(&Partial::whole(plan.clone()), &ground)
}

/// Every finding about a plan that could be read, its trees sized up: the plan against itself and
/// the rules, then what the size-ups say of trees that nothing else stops.
pub fn sized_findings(plan: &Plan, parts: &Parts) -> Vec<Finding> {
    let sized: Vec<SizedTree> = plan
        .trees
        .par_iter()
        .map(|tree| size_up(plan, tree, &[]))
        .collect();
    let of_rules = plan
        .trees
        .iter()
        .zip(&sized)
        .map(|(tree, sized)| (tree.id.value.clone(), for_rules(sized)));
    let size_ups: BTreeMap<String, SizeUp> = of_rules.collect();
    let ground = Ground {
        parts,
        knows_species: &knows_species,
        size_ups: &size_ups,
    };
    let mut findings = look_through(&Partial::whole(plan.clone()), &ground);
    for (tree, sized) in plan.trees.iter().zip(&sized) {
        let stopped = |f: &Finding| f.severity == Severity::Stop && is_of(f, tree);
        if !findings.iter().any(stopped) {
            findings.extend(verdicts::of(tree, sized));
        }
    }
    findings
}

/// Whether a species is known, or which known ones are nearest.
///
/// # Errors
/// The nearest names, where it is not known.
pub fn knows_species(name: &str) -> Result<(), Vec<String>> {
    match species::find(name) {
        Some(_) => Ok(()),
        None => Err(species::nearest(name)
            .iter()
            .map(|s| s.table_name.to_owned())
            .collect()),
    }
}

/// What the rules ask of a size-up, at best values.
fn for_rules(sized: &SizedTree) -> SizeUp {
    let Some(size_up) = &sized.size_up else {
        return SizeUp::default();
    };
    let figures = &size_up.figures;
    SizeUp {
        method: match size_up.choice {
            Choice::Proposed(method) => Some(method),
            Choice::Refuse => None,
        },
        face_depth: figures.face.map(|f| f.depth),
        face_opening: figures.face.map(|f| f.opening),
        hinge: figures.hinge_thickness,
        back_cut_height: size_up.layout.map(|l| l.back_cut_height),
        strap: figures.strap.map(|s| s.thickness),
        effective_lean: figures.effective_lean.map(|b| b.best),
        lean_toward: figures.lean_toward,
        side_lean: figures.side_lean.map(|b| b.best),
        ring_radius: figures.ring,
        escape_seconds: figures.escape.as_ref().map(|e| e.seconds.high),
        fall_seconds: figures.fall.map(|f| f.seconds_min),
    }
}

/// Every finding about a plan as far as it could be read. What is refused already is not said
/// again in other words.
pub fn look_through(partial: &Partial, ground: &Ground<'_>) -> Vec<Finding> {
    let facts = Facts::new(&partial.plan, ground.size_ups);
    let look = Look {
        facts: &facts,
        partial,
        ground,
    };
    let mut findings: Vec<Finding> = CHECKS
        .iter()
        .flat_map(|check| check(&look))
        .map(|(code, found)| found.into_finding(code, None))
        .collect();
    for named in &partial.plan.job.rules {
        if let Some(set) = ground.parts.rule_sets.get(&named.value) {
            findings.extend(rules::run(&facts, set));
        }
    }
    findings.retain(|finding| !partial.is_spoiled(&finding.path));
    let unsure = trees_of_unsure_order(partial, &findings);
    findings.retain(|finding| {
        let of_order = FROM_ORDER.contains(&finding.code);
        !of_order || !unsure.iter().any(|tree| is_of(finding, tree))
    });
    without_echoes(findings)
}

/// Codes that say a tree is not down yet: nothing is said where its `after` has a finding.
const FROM_ORDER: &[&str] = &["LOG-26", "LOG-28", "LOG-29", "JOB-30"];

fn is_of(finding: &Finding, tree: &Tree) -> bool {
    let rest = finding.path.strip_prefix(&tree.route);
    rest.is_some_and(|rest| rest.starts_with('.'))
}

/// The trees whose `after` is refused or names no tree.
fn trees_of_unsure_order<'a>(partial: &'a Partial, findings: &[Finding]) -> Vec<&'a Tree> {
    let trees = partial.plan.trees.iter();
    trees
        .filter(|tree| {
            let after = format!("{}.after", tree.route);
            let named = tree
                .after
                .iter()
                .any(|id| partial.unread.contains(&id.value));
            named
                || partial.is_spoiled(&after)
                || findings
                    .iter()
                    .any(|f| f.code == "JOB-01" && f.path.starts_with(&after))
        })
        .collect()
}

/// Two sets may say the same; the heavier word stands. A tree without ways out is said once.
fn without_echoes(mut findings: Vec<Finding>) -> Vec<Finding> {
    findings.sort_by(|a, b| (a.code, a.severity, &a.path).cmp(&(b.code, b.severity, &b.path)));
    let mut kept: Vec<Finding> = vec![];
    for finding in findings {
        let echo = kept.iter().any(|other| {
            let same = (other.code, &other.path, other.place)
                == (finding.code, &finding.path, finding.place);
            let sets = other.rule.as_ref().map(|r| &r.set);
            same && sets != finding.rule.as_ref().map(|r| &r.set)
        });
        if !echo {
            kept.push(finding);
        }
    }
    let by_rule: Vec<String> = kept
        .iter()
        .filter(|f| f.code == "LOG-15")
        .map(|f| f.path.clone())
        .collect();
    kept.retain(|f| f.code != "JOB-24" || !by_rule.contains(&f.path));
    kept
}
