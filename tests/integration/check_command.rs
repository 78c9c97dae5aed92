//! `check` from its command line: text and JSON to the letter, exit codes, files that are no
//! plan, parts folders, and that any text whatever ends in findings or in a plan.
#![expect(
    clippy::disallowed_methods,
    reason = "files that are no plan are made here, and the program itself is started"
)]

use std::collections::BTreeMap;
use std::path::Path;
use std::process::Command;

use proptest::prelude::*;
use stumpside::assessment::{self, Ground};
use stumpside::cli::command::check::{self, CheckArgs};
use stumpside::cli::exit::Exit;
use stumpside::cli::output::{Format, Output};
use stumpside::diagnostic::{Finding, Severity};
use stumpside::parts::{BUILT_IN, Parts};
use stumpside::plan::{self, Partial};
use stumpside::rules::SizeUp;
use stumpside::units::Duration;

use super::support::{DEMO_PLAN, demo_plan};

/// Exit, standard output and standard error of `check`.
fn run(plan: &Path, format: Format) -> (Exit, String, String) {
    let (mut data, mut talk) = (vec![], vec![]);
    let args = CheckArgs {
        plan: plan.to_owned(),
        format,
    };
    let mut output = Output::new(&mut data, &mut talk);
    let exit = check::run(&args, &mut output);
    let exit = output.finish(exit);
    let text = |bytes| String::from_utf8(bytes).unwrap();
    (exit, text(data), text(talk))
}

fn codes(findings: &[Finding]) -> Vec<&str> {
    findings.iter().map(|f| f.code).collect()
}

/// The same without the note on the time to leave, which every sized-up tree has.
fn codes_of_the_text(findings: &[Finding]) -> Vec<&'static str> {
    let codes = findings.iter().map(|f| f.code);
    codes.filter(|code| *code != "LOG-19").collect()
}

/// The codes that `check` gives of the demo plan with something put in its place.
fn with_change(from: &str, to: &str) -> Vec<&'static str> {
    assert!(DEMO_PLAN.contains(from));
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("plan.yaml");
    std::fs::write(&path, DEMO_PLAN.replacen(from, to, 1)).unwrap();
    codes_of_the_text(&check::findings_of(&check::read(&path).unwrap()))
}

#[test]
fn what_the_size_ups_say_is_found() {
    let none: [&str; 0] = [];
    assert_eq!(with_change("state: live", "state: live"), none);
    assert_eq!(
        with_change("state: live", "state: lodged"),
        ["LOG-27", "TREE-01"]
    );
    assert_eq!(
        with_change("state: live", "state: split"),
        ["LOG-27", "TREE-01"]
    );
    assert_eq!(
        with_change(
            "    steps: auto",
            "    defects: [{kind: crack}]\n    steps: auto"
        ),
        ["LOG-27", "TREE-01"]
    );
    let no_strap = "    steps: [{cut: face-slope, depth: 9 cm, opening: 70 deg}, {cut: face-floor, depth: 9 cm}, {cut: strap-release}, {cut: back-cut, to_hinge: 4 cm}]";
    assert!(with_change("    steps: auto", no_strap).contains(&"TREE-02"));
    assert_eq!(with_change("height: 22 m", "height: 12 m"), ["TREE-04"]);
}

#[test]
fn the_broken_plan_prints_its_picture() {
    let (exit, data, talk) = run(Path::new("demo-jobs/broken-plan/plan.yaml"), Format::Text);
    let picture = std::fs::read_to_string("tests/kit/check/broken-plan.txt").unwrap();
    assert_eq!(data, picture);
    assert_eq!(talk, "");
    assert_eq!(exit, Exit::No);
}

#[test]
fn json_has_exactly_these_keys_in_this_order() {
    let plan = Path::new("tests/kit/plans/log-36-level.yaml");
    let (exit, data, talk) = run(plan, Format::Json);
    let expected = concat!(
        r#"{"code":"LOG-36","severity":"stop","#,
        r#""message":"the back cut does not lie above the face's level cut","#,
        r#""file":"tests/kit/plans/log-36-level.yaml","line":46,"column":24,"#,
        r#""end_line":46,"end_column":28,"path":"trees[0].back_cut.height","#,
        r#""rule":{"set":"us-logging","source":"29 CFR 1910.266(h)(2)(vii)"},"#,
        r#""help":"raise it above that level, at least an inch"}"#,
    );
    let json: serde_json::Value = serde_json::from_str(&data).unwrap();
    let keys: Vec<&String> = json.as_object().unwrap().keys().collect();
    assert_eq!(keys, ["format", "findings", "stop", "caution", "note"]);
    let found = json["findings"].as_array().unwrap();
    let one = found.iter().find(|f| f["code"] == "LOG-36").unwrap();
    assert_eq!(one.to_string(), expected);
    assert_eq!(
        (&json["format"], &json["stop"], &json["caution"]),
        (&1.into(), &1.into(), &0.into())
    );
    assert_eq!((exit, talk.as_str()), (Exit::No, ""));

    let folder = tempfile::tempdir().unwrap();
    let plan = folder.path().join("plan.yaml");
    let silent: Vec<&str> = DEMO_PLAN
        .lines()
        .filter(|l| !l.starts_with("stop_means"))
        .collect();
    std::fs::write(&plan, silent.join("\n")).unwrap();
    let (exit, data, _) = run(&plan, Format::Json);
    assert!(data.contains(r#""severity":"note""#) && data.contains(r#""rule":null"#));
    assert!(data.contains("\"stop\":0,\"caution\":0,\"note\":"));
    assert_eq!(exit, Exit::Good, "what is no stop leaves the answer yes");
}

#[test]
fn the_program_itself_ends_with_these_codes() {
    for (plan, code) in [
        ("demo-jobs/heron-bench/plan.yaml", 0),
        ("demo-jobs/broken-plan/plan.yaml", 1),
        ("tests/kit/plans/text-nothing.yaml", 1),
        ("demo-jobs/no-such-job/plan.yaml", 3),
        ("demo-jobs", 3),
    ] {
        let ended = Command::new(env!("CARGO_BIN_EXE_stumpside"))
            .args(["check", plan])
            .output()
            .unwrap();
        assert_eq!(ended.status.code(), Some(code), "{plan}");
        let talks = !ended.stderr.is_empty();
        assert_eq!(talks, code == 3, "{plan}: data on stdout, talk on stderr");
        assert_eq!(ended.stdout.is_empty(), code == 3, "{plan}");
    }
    let ended = Command::new(env!("CARGO_BIN_EXE_stumpside"))
        .args(["check", "--format", "xml", "demo-jobs"])
        .output()
        .unwrap();
    assert_eq!(ended.status.code(), Some(2));
}

#[test]
fn what_cannot_be_read_is_said_in_one_line() {
    for (path, why) in [
        ("demo-jobs/no-such-job/plan.yaml", "cannot be read"),
        ("demo-jobs", "directory"),
    ] {
        let (exit, data, talk) = run(Path::new(path), Format::Text);
        assert_eq!(exit, Exit::Unreadable);
        assert_eq!(data, "");
        assert_eq!(talk.lines().count(), 1, "{talk}");
        assert!(
            talk.contains(path) && talk.to_lowercase().contains(why),
            "{talk}"
        );
    }
}

/// Bytes that look like nothing, the same in every run.
fn noise(length: usize) -> Vec<u8> {
    let mut state: u64 = 0x2545_f491_4f6c_dd1d;
    let mut bytes = Vec::with_capacity(length);
    while bytes.len() < length {
        state ^= state << 13;
        state ^= state >> 7;
        state ^= state << 17;
        bytes.extend(state.to_le_bytes());
    }
    bytes.truncate(length);
    bytes
}

#[test]
fn files_that_are_no_plan_have_one_clear_finding() {
    let folder = tempfile::tempdir().unwrap();
    let most = stumpside::document::LIMIT_BYTES;
    let padded = |length: usize| {
        let mut text = DEMO_PLAN.to_owned();
        text.push('#');
        let line = format!("{}\n", "-".repeat(99));
        while text.len() + line.len() + 1 < length {
            text.push_str(&line.replacen('-', "#", 1));
        }
        text.push_str(&"#".repeat(length - text.len()));
        text.into_bytes()
    };
    for (name, bytes, code) in [
        ("noise of 10 MB", noise(10_000_000), Some("TEXT-09")),
        ("noise of 1 MB", noise(1_000_000), Some("TEXT-01")),
        ("a byte past the limit", padded(most + 1), Some("TEXT-09")),
        ("exactly at the limit", padded(most), None),
        ("nothing", vec![], Some("TEXT-10")),
        ("blanks", b" \n \n".to_vec(), Some("TEXT-10")),
        ("one long line", vec![b'a'; most], Some("PLAN-03")),
        ("a list", b"- 1\n- 2\n".to_vec(), Some("PLAN-03")),
    ] {
        let path = folder.path().join("plan.yaml");
        std::fs::write(&path, &bytes).unwrap();
        let file = check::read(&path).unwrap();
        let findings = check::findings_of(&file);
        assert_eq!(codes_of_the_text(&findings), Vec::from_iter(code), "{name}");
        let (exit, data, talk) = run(&path, Format::Text);
        assert_eq!(exit == Exit::Good, code.is_none(), "{name}");
        assert!(
            data.len() < 4_000,
            "{name}: the finding is shown, not the file"
        );
        assert_eq!(talk, "");
    }
}

#[test]
fn a_truncated_plan_is_refused_or_lacks_something() {
    // Inside a bracket the text itself is broken, and that is all that is said.
    let inside = DEMO_PLAN.find("fells_up_to").unwrap();
    let loaded = plan::load(&DEMO_PLAN[..inside]);
    assert_eq!(codes(&loaded.findings), ["TEXT-03"]);
    // After whole lines before the trees, whole groups are missing.
    let before_trees = DEMO_PLAN.find("\ntrees:").unwrap() + 1;
    let loaded = plan::load(&DEMO_PLAN[..before_trees]);
    assert_eq!(codes(&loaded.findings), ["PLAN-02"]);
    assert_eq!(loaded.findings[0].path, "trees");
    // Wherever it is cut, the end is a plan or a stop finding, never both and never neither.
    for end in (0..DEMO_PLAN.len()).step_by(7) {
        let loaded = plan::load(&DEMO_PLAN[..end]);
        let stops = loaded.findings.iter().any(|f| f.severity == Severity::Stop);
        assert_ne!(loaded.plan.is_some(), stops, "cut at byte {end}");
    }
}

/// Everything found in a text, looked through as far as it can be read.
fn look(text: &str) -> (bool, Vec<Finding>) {
    let loaded = plan::load(text);
    let mut findings = loaded.findings;
    if let Some(partial) = &loaded.partial {
        let ground = Ground {
            parts: &Parts::built_in(),
            knows_species: &|_| Ok(()),
            size_ups: &BTreeMap::new(),
        };
        findings.extend(assessment::look_through(partial, &ground));
    }
    (loaded.plan.is_some(), findings)
}

fn within_text(text: &str, findings: &[Finding]) {
    for finding in findings {
        let place = finding.place;
        assert!(place.start <= place.end, "{finding:?}");
        assert!(place.start <= text.len(), "{finding:?}");
    }
    let source = stumpside::diagnostic::SourceText::new("plan.yaml", text);
    let shown = stumpside::diagnostic::render_all(&source, findings);
    assert_eq!(shown.is_empty(), findings.is_empty());
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 96, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn any_text_ends_in_findings_or_in_a_plan(text in "\\PC{0,300}") {
        let (readable, findings) = look(&text);
        prop_assert!(readable || !findings.is_empty());
        within_text(&text, &findings);
    }

    #[test]
    fn any_text_of_yaml_signs_ends_in_findings_or_in_a_plan(
        text in "([ \\t\\n]|[-?:,#&*!|>%@\\[\\]{}'\"]|plan: 1\\n|trees:|crew:|job:|~|a|0){0,120}"
    ) {
        let (readable, findings) = look(&text);
        prop_assert!(readable || !findings.is_empty());
        within_text(&text, &findings);
    }

    #[test]
    fn any_slip_in_a_plan_ends_in_findings_or_in_a_plan(
        from in 0..DEMO_PLAN.len(), length in 0usize..40, put in "[ -~\\n\u{e9}\u{202e}]{0,6}"
    ) {
        let floor = |mut at: usize| {
            while !DEMO_PLAN.is_char_boundary(at) {
                at -= 1;
            }
            at
        };
        let (from, to) = (floor(from), floor((from + length).min(DEMO_PLAN.len())));
        let text = format!("{}{put}{}", &DEMO_PLAN[..from], &DEMO_PLAN[to.max(from)..]);
        let (readable, findings) = look(&text);
        prop_assert!(readable || !findings.is_empty());
        within_text(&text, &findings);
    }
}

#[test]
fn time_to_leave_is_looked_at_where_a_size_up_gives_it() {
    let partial = Partial::whole(demo_plan());
    let with = |escape: f64, fall: f64| {
        let sized = SizeUp {
            escape_seconds: Some(Duration::si(escape)),
            fall_seconds: Some(Duration::si(fall)),
            ..SizeUp::default()
        };
        let size_ups = BTreeMap::from([("T2".to_owned(), sized)]);
        let ground = Ground {
            parts: &Parts::built_in(),
            knows_species: &|_| Ok(()),
            size_ups: &size_ups,
        };
        assessment::look_through(&partial, &ground)
    };
    let findings = with(6.0, 4.0);
    assert_eq!(codes(&findings), ["LOG-19"]);
    assert_eq!(findings[0].path, "trees[1].ways_out");
    assert_eq!(codes(&with(3.9, 4.0)), Vec::<&str>::new());
}

/// A job with a parts folder whose rule set is the built-in one with something put in its place.
fn with_rules(from: &str, to: &str) -> (Exit, Vec<Finding>) {
    let folder = tempfile::tempdir().unwrap();
    let (_, set) = BUILT_IN
        .iter()
        .find(|(name, _)| *name == "rules/us-logging.yaml")
        .unwrap();
    assert!(set.contains(from));
    std::fs::create_dir_all(folder.path().join("parts/rules")).unwrap();
    std::fs::write(
        folder.path().join("parts/rules/us-logging.yaml"),
        set.replacen(from, to, 1),
    )
    .unwrap();
    let path = folder.path().join("plan.yaml");
    std::fs::write(&path, format!("{DEMO_PLAN}parts: parts\n")).unwrap();
    let findings = check::findings_of(&check::read(&path).unwrap());
    (run(&path, Format::Text).0, findings)
}

#[test]
fn a_parts_folder_may_change_the_figures_and_is_named() {
    let (exit, findings) = with_rules("{value: 20 ft", "{value: 30 ft");
    let mut expected = vec!["JOB-10"];
    expected.extend(["LOG-17"; 6]);
    assert_eq!(codes_of_the_text(&findings), expected);
    assert_eq!(exit, Exit::No);
}

#[test]
fn a_parts_folder_that_asks_for_unknown_rules_or_cannot_be_used_stops() {
    let (exit, findings) = with_rules("code: LOG-17", "code: LOG-99");
    assert_eq!(codes_of_the_text(&findings), ["JOB-09", "JOB-10"]);
    assert_eq!(exit, Exit::No);
    for (from, to) in [
        ("{value: 20 ft", "{value: 20"),
        ("{value: 20 ft", "{value: nan ft"),
        ("{value: 20 ft", "{value: -20 ft"),
        ("mark: opened", "mark: certain"),
        ("set: us-logging", "set: us-loging"),
    ] {
        let (exit, findings) = with_rules(from, to);
        assert_eq!(codes_of_the_text(&findings), ["JOB-33"], "{to}");
        assert_eq!(exit, Exit::No);
    }
}
