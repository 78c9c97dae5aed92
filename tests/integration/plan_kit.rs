//! The kit of plans: each file states in its first lines what must be found in it, and nothing
//! else may be. Most are broken on purpose.
#![expect(
    clippy::disallowed_methods,
    reason = "the kit's files are read and listed here"
)]

use std::collections::{BTreeMap, BTreeSet};
use std::path::{Path, PathBuf};

use stumpside::assessment::{self, Ground, all_explanations};
use stumpside::cli::command::check;
use stumpside::diagnostic::{Finding, SourceText};
use stumpside::parts::Parts;
use stumpside::rules;

/// The species that the kit's plans may name.
const SPECIES: [&str; 4] = ["northern red oak", "red pine", "red alder", "white ash"];

fn kit() -> Vec<PathBuf> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/kit/plans");
    let mut files: Vec<PathBuf> = std::fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .collect();
    files.sort();
    files
}

/// What a plan's first lines state: code, line and column of each finding.
fn stated(bytes: &[u8]) -> Vec<(String, usize, usize)> {
    let text = String::from_utf8_lossy(bytes);
    let mut finds = vec![];
    let mut nothing = false;
    for line in text.trim_start_matches('\u{feff}').lines() {
        let Some(what) = line.strip_prefix("# finds: ") else {
            break;
        };
        if what == "nothing" {
            nothing = true;
            continue;
        }
        let (code, place) = what.split_once(' ').expect("a code and a place");
        let (line, column) = place.split_once(':').expect("line:column");
        finds.push((
            code.to_owned(),
            line.parse().unwrap(),
            column.parse().unwrap(),
        ));
    }
    assert!(
        nothing == finds.is_empty(),
        "each plan states what it finds"
    );
    finds.sort();
    finds
}

fn found(path: &Path) -> (SourceText, Vec<Finding>) {
    let file = check::read(path).unwrap();
    let mut findings = file.loaded.findings.clone();
    let knows_species = |name: &str| {
        if SPECIES.contains(&name) {
            Ok(())
        } else {
            Err(vec![SPECIES[0].to_owned()])
        }
    };
    if let Some(partial) = &file.loaded.partial {
        let ground = Ground {
            parts: &Parts::built_in(),
            knows_species: &knows_species,
            size_ups: &BTreeMap::new(),
        };
        findings.extend(assessment::look_through(partial, &ground));
    }
    (file.source, findings)
}

#[test]
fn each_plan_gives_the_findings_it_states_and_no_others() {
    let mut wrong = String::new();
    for path in kit() {
        let stated = stated(&std::fs::read(&path).unwrap());
        let (source, findings) = found(&path);
        let mut got: Vec<(String, usize, usize)> = findings
            .iter()
            .map(|finding| {
                let at = source.line_column(finding.place.start);
                (finding.code.to_owned(), at.line, at.column)
            })
            .collect();
        got.sort();
        if got != stated {
            let words: Vec<&str> = findings.iter().map(|f| f.message.as_str()).collect();
            wrong.push_str(&format!(
                "{}\n  stated {stated:?}\n  found  {got:?}\n  {words:?}\n",
                path.display()
            ));
        }
        for finding in &findings {
            assert!(!finding.message.is_empty() && !finding.help.is_empty());
        }
    }
    assert!(wrong.is_empty(), "{wrong}");
}

#[test]
fn every_code_has_a_plan_that_fires_it() {
    let mut fired: BTreeSet<String> = BTreeSet::new();
    let mut plans = 0;
    for path in kit() {
        plans += 1;
        let stated = stated(&std::fs::read(&path).unwrap());
        fired.extend(stated.into_iter().map(|(code, ..)| code));
    }
    assert!(plans >= 45, "{plans} plans in the kit");
    // These need more than a plan's text: a size-up, a parts folder. Their tests
    // stand in `check_command`.
    let elsewhere = [
        "JOB-09", "JOB-10", "JOB-33", "LOG-19", "TREE-01", "TREE-02", "TREE-03", "TREE-04",
    ];
    for explained in all_explanations() {
        let code = explained.explanation.code;
        assert!(
            fired.contains(code) != elsewhere.contains(&code),
            "{code} has its plan in the kit or is listed as tested elsewhere"
        );
    }
}

#[test]
fn every_rule_has_a_plan_that_does_not_fire_it() {
    let good: Vec<PathBuf> = kit()
        .into_iter()
        .filter(|path| stated(&std::fs::read(path).unwrap()).is_empty())
        .collect();
    assert!(good.len() >= 10, "{} good plans", good.len());
    // Every rule of the set is on in each of them.
    let set = &Parts::built_in().rule_sets["us-logging"];
    for rule in rules::every() {
        assert!(set.line(rule.code).is_some(), "{} is on", rule.code);
    }
    for path in good {
        let file = check::read(&path).unwrap();
        let plan = file.loaded.plan.expect("a good plan reads");
        assert_eq!(plan.job.rules.len(), 1, "{}", path.display());
    }
}
