//! `record` and `crew` as people and programs call them: exact output and exit codes.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]
#![expect(clippy::disallowed_methods, reason = "a test lays out job folders")]

use std::io;
use std::path::Path;

use clap::Parser;
use serde_json::Value;
use stumpside::cli::command::{crew, record};
use stumpside::cli::exit::Exit;
use stumpside::cli::output::Output;
use stumpside::shell::passphrase::Asked;

use crate::record_desk::{small_day, whole_day};

#[derive(Parser)]
enum Line {
    Record(record::RecordArgs),
    Crew(crew::CrewArgs),
}

struct Ran {
    exit: Exit,
    data: String,
    talk: String,
}

fn run(words: &[&str], answers: &[&str]) -> Ran {
    let line = Line::try_parse_from([&["stumpside"], words].concat()).unwrap();
    let (mut data, mut talk) = (Vec::new(), Vec::new());
    let mut output = Output::new(&mut data, &mut talk);
    let mut answers = answers.iter();
    let mut ask = || match answers.next() {
        Some(answer) => Ok(Asked::Typed((*answer).to_owned().into())),
        None => Err(io::Error::other("no terminal")),
    };
    let exit = match &line {
        Line::Record(args) => record::run(args, &mut output),
        Line::Crew(args) => crew::run(args, &mut output, &mut ask),
    };
    let exit = output.finish(exit);
    Ran {
        exit,
        data: String::from_utf8(data).unwrap(),
        talk: String::from_utf8(talk).unwrap(),
    }
}

fn put(dir: &Path, name: &str, bytes: &[u8]) -> String {
    let path = dir.join(name);
    std::fs::write(&path, bytes).unwrap();
    path.to_str().unwrap().to_owned()
}

#[test]
fn verify_answers_with_the_exit_codes_of_its_verdicts() {
    let dir = tempfile::tempdir().unwrap();
    let whole = small_day();
    let good = put(dir.path(), "good.jsonl", &whole);
    let end = whole[..whole.len() - 1]
        .iter()
        .rposition(|b| *b == b'\n')
        .unwrap()
        + 1;
    let open = put(dir.path(), "open.jsonl", &whole[..end]);
    let bad = put(dir.path(), "bad.jsonl", &whole[..end - 1]);
    let gone = dir.path().join("gone.jsonl").to_str().unwrap().to_owned();
    let exit = |files: &[&str]| run(&[&["record", "verify"], files].concat(), &[]).exit;
    assert_eq!(exit(&[&good]), Exit::Good);
    assert_eq!(exit(&[&open]), Exit::Open);
    assert_eq!(exit(&[&bad]), Exit::No);
    assert_eq!(exit(&[&gone]), Exit::Unreadable);
    assert_eq!(exit(&[&open, &bad, &good]), Exit::No);
    assert_eq!(exit(&[&good, &gone, &bad]), Exit::Unreadable);
    assert_eq!(exit(&[&good, &open]), Exit::Open);
    let codes = [
        Exit::Good,
        Exit::No,
        Exit::Usage,
        Exit::Unreadable,
        Exit::Unwritable,
        Exit::Fault,
        Exit::Open,
        Exit::Interrupted,
    ];
    assert_eq!(codes.map(Exit::code), [0, 1, 2, 3, 4, 5, 6, 130]);
}

#[test]
fn verify_json_has_the_keys_of_the_machine_form_in_order() {
    let dir = tempfile::tempdir().unwrap();
    let file = put(dir.path(), "record.jsonl", &whole_day().bytes);
    let ran = run(&["record", "verify", &file, "--format", "json"], &[]);
    let object: Value = serde_json::from_str(&ran.data).unwrap();
    assert_eq!(object["format"], 1);
    let record = object["records"][0].as_object().unwrap();
    let keys: Vec<&str> = record.keys().map(String::as_str).collect();
    assert_eq!(
        keys,
        [
            "file",
            "entries",
            "good",
            "bad",
            "unknown_keys",
            "tail",
            "head",
            "record_code",
            "signers",
            "unsigned_required",
            "verdict",
            "notes"
        ]
    );
    assert_eq!(record["entries"], 24);
    assert_eq!(record["good"], 24);
    assert_eq!(record["signers"], serde_json::json!(["odile", "tamsin"]));
    assert_eq!(record["verdict"], "closed-ok");
    assert_eq!(record["head"].as_str().unwrap().len(), 64);
    assert_eq!(ran.exit, Exit::Good);
}

#[test]
fn verify_names_the_first_bad_entry_and_the_limits_of_trust() {
    let dir = tempfile::tempdir().unwrap();
    let text = String::from_utf8(whole_day().bytes)
        .unwrap()
        .replace("38 mm", "50 mm");
    let file = put(dir.path(), "record.jsonl", text.as_bytes());
    let ran = run(&["record", "verify", dir.path().to_str().unwrap()], &[]);
    assert!(
        ran.data.contains("  FAIL: this record does not verify\n"),
        "{}",
        ran.data
    );
    assert!(ran.data.contains("  first bad entry: 10\n"), "{}", ran.data);
    assert!(ran.data.contains("never who pressed it"));
    assert_eq!(ran.exit, Exit::No);
    let receipt = run(&["record", "receipt", &file], &[]);
    assert_eq!((receipt.exit, receipt.data.as_str()), (Exit::No, ""));
}

#[test]
fn verify_takes_the_crew_and_the_codes_from_outside() {
    use stumpside::record::signers;
    let dir = tempfile::tempdir().unwrap();
    let file = put(dir.path(), "record.jsonl", &whole_day().bytes);
    let list = signers::write(&crate::record_desk::office_list());
    let office = put(dir.path(), "office", list.as_bytes());
    let shown = run(&["record", "receipt", &file, "--ascii"], &[]);
    let code = shown
        .data
        .lines()
        .next()
        .unwrap()
        .strip_prefix("record code  ")
        .unwrap()
        .to_owned();
    let verify = |more: &[&str]| run(&[&["record", "verify", file.as_str()], more].concat(), &[]);
    assert_eq!(
        verify(&["--crew", &office, "--code", &code.to_lowercase()]).exit,
        Exit::Good
    );
    assert_eq!(verify(&["--code", "0000-0000-0000-0000"]).exit, Exit::No);
    assert_eq!(verify(&["--code", "0000-0000"]).exit, Exit::Usage);
    let one = list.lines().next().unwrap();
    let short = put(dir.path(), "short", format!("{one}\n").as_bytes());
    let ran = verify(&["--crew", &short]);
    assert_eq!(ran.exit, Exit::No);
    assert!(
        ran.data.contains("tamsin has no key on the crew list"),
        "{}",
        ran.data
    );
    assert!(ran.data.contains("  UNKNOWN KEY SHA256:"), "{}", ran.data);
    let nonsense = put(
        dir.path(),
        "nonsense",
        b"* cert-authority ssh-ed25519 AAAA\n",
    );
    assert_eq!(verify(&["--crew", &nonsense]).exit, Exit::Unreadable);
}

#[test]
fn show_prints_one_line_an_entry_and_no_control_reaches_the_terminal() {
    use crate::record_desk::{Desk, crew};
    let dir = tempfile::tempdir().unwrap();
    let mut desk = Desk::open(crew());
    desk.say(
        "note",
        serde_json::json!({"text": "a\u{1b}[2Jb", "keyed_by": "odile"}),
    );
    let file = put(dir.path(), "record.jsonl", &desk.bytes);
    let ran = run(&["record", "show", &file], &[]);
    let second = ran.data.lines().nth(1).unwrap();
    assert_eq!(
        second,
        "        1  2026-11-14 07:01:00 -05:00  note  text: a\\u{1b}[2Jb · keyed_by: odile"
    );
    assert!(!ran.data.contains('\u{1b}'));
    assert_eq!(ran.exit, Exit::Open);
}

#[test]
fn an_output_that_cannot_be_written_is_told() {
    let dir = tempfile::tempdir().unwrap();
    let file = put(dir.path(), "record.jsonl", &small_day());
    let line = Line::try_parse_from(["stumpside", "record", "verify", &file]).unwrap();
    let Line::Record(args) = line else {
        panic!("another command")
    };
    let mut full = std::fs::OpenOptions::new()
        .write(true)
        .open("/dev/full")
        .unwrap();
    let mut talk = Vec::new();
    let mut output = Output::new(&mut full, &mut talk);
    let exit = record::run(&args, &mut output);
    assert_eq!(output.finish(exit), Exit::Unwritable);
    assert!(
        String::from_utf8(talk)
            .unwrap()
            .contains("cannot be written")
    );
}

#[test]
fn crew_add_makes_a_key_once_and_prints_the_line_for_the_plan() {
    use std::os::unix::fs::PermissionsExt;
    let dir = tempfile::tempdir().unwrap();
    let job = dir.path().join("job");
    let job_text = job.to_str().unwrap();
    let add = [
        "crew",
        "add",
        "tamsin",
        "--name",
        "Tamsin Okoro",
        "--job",
        job_text,
    ];
    let ran = run(&add, &["five words", "five words"]);
    assert_eq!(ran.exit, Exit::Good, "{}", ran.talk);
    assert_eq!(
        ran.data,
        "  - {id: tamsin, name: \"Tamsin Okoro\", roles: [], key: keys/tamsin.pub}\n"
    );
    let mode = |path: &str| {
        std::fs::metadata(job.join(path))
            .unwrap()
            .permissions()
            .mode()
            & 0o777
    };
    assert_eq!((mode("keys"), mode("keys/tamsin")), (0o700, 0o600));
    let before = std::fs::read(job.join("keys/tamsin")).unwrap();
    let again = run(&add, &["five words", "five words"]);
    assert_eq!(again.exit, Exit::Unwritable);
    assert_eq!(std::fs::read(job.join("keys/tamsin")).unwrap(), before);
    let listed = run(&["crew", "list", job_text], &[]);
    assert!(
        listed.data.starts_with("tamsin  ssh-ed25519  SHA256:"),
        "{}",
        listed.data
    );
    assert!(
        listed.data.ends_with("private half here\n"),
        "{}",
        listed.data
    );
    let plan = put(&job, "plan.yaml", b"plan: 1\n");
    assert_eq!(run(&["crew", "list", &plan], &[]).data, listed.data);
}

#[test]
fn crew_add_refuses_what_it_cannot_do() {
    let dir = tempfile::tempdir().unwrap();
    let job = dir.path().to_str().unwrap();
    let add = |more: &[&str], answers: &[&str]| {
        run(
            &[&["crew", "add", "rui", "--name", "Rui", "--job", job], more].concat(),
            answers,
        )
    };
    assert_eq!(add(&[], &["one", "two"]).exit, Exit::No);
    assert_eq!(add(&[], &["", ""]).exit, Exit::Usage);
    assert_eq!(add(&[], &[]).exit, Exit::Unreadable);
    assert_eq!(
        add(&["--key", "/nowhere/key.pub"], &[]).exit,
        Exit::Unreadable
    );
    assert_eq!(
        add(&["--passphrase-file", "/nowhere/file"], &[]).exit,
        Exit::Unreadable
    );
    assert!(!dir.path().join("keys/rui").exists());
    let bad_id = run(
        &[
            "crew",
            "add",
            "Rui B",
            "--name",
            "Rui",
            "--job",
            job,
            "--no-passphrase",
        ],
        &[],
    );
    assert_eq!(bad_id.exit, Exit::Usage);
    let bad_name = run(
        &[
            "crew",
            "add",
            "rui",
            "--name",
            "R\u{202e}ui",
            "--job",
            job,
            "--no-passphrase",
        ],
        &[],
    );
    assert_eq!(bad_name.exit, Exit::Usage);
    let words = [
        "stumpside",
        "crew",
        "add",
        "rui",
        "--name",
        "R",
        "--key",
        "f",
        "--demo",
    ];
    assert!(Line::try_parse_from(words).is_err());
}

#[test]
fn crew_add_marks_demo_keys_and_takes_public_keys() {
    use crate::record_desk::public;
    let dir = tempfile::tempdir().unwrap();
    let job = dir.path().to_str().unwrap();
    let demo = run(
        &[
            "crew",
            "add",
            "odile",
            "--name",
            "Odile",
            "--job",
            job,
            "--demo",
            "--no-passphrase",
        ],
        &[],
    );
    assert!(
        demo.talk.contains("DEMO KEY: PROVES NOTHING"),
        "{}",
        demo.talk
    );
    let theirs = put(
        dir.path(),
        "theirs.pub",
        format!("{}\n", public(4, "rui@home").line()).as_bytes(),
    );
    let taken = run(
        &[
            "crew",
            "add",
            "rui",
            "--name",
            "Rui \"Quick\" Vale",
            "--job",
            job,
            "--key",
            &theirs,
        ],
        &[],
    );
    assert_eq!(
        taken.data,
        "  - {id: rui, name: \"Rui \\\"Quick\\\" Vale\", roles: [], key: keys/rui.pub}\n"
    );
    let listed = run(&["crew", "list", job], &[]).data;
    let lines: Vec<&str> = listed.lines().collect();
    assert!(
        lines[0].ends_with("private half here  DEMO: PROVES NOTHING"),
        "{listed}"
    );
    assert!(lines[1].ends_with("private half elsewhere"), "{listed}");
}

#[test]
fn the_demo_jobs_finished_record_verifies_and_its_tampered_copy_does_not() {
    let demo = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-jobs/heron-bench");
    let verify = |name: &str| {
        let file = demo.join(name).join("record.jsonl");
        let output = std::process::Command::new(env!("CARGO_BIN_EXE_stumpside"))
            .args([
                "record",
                "verify",
                file.to_str().unwrap(),
                "--format",
                "json",
            ])
            .output()
            .unwrap();
        let text = String::from_utf8(output.stdout).unwrap();
        (
            output.status.code(),
            serde_json::from_str::<serde_json::Value>(&text).unwrap()["records"][0].clone(),
        )
    };
    let (code, report) = verify("finished");
    assert_eq!(
        (code, report["verdict"].as_str()),
        (Some(0), Some("closed-ok")),
        "{report}"
    );
    // It is about the demo plan as it stands.
    let plan = std::fs::read(demo.join("plan.yaml")).unwrap();
    let first = std::fs::read_to_string(demo.join("finished/record.jsonl")).unwrap();
    let opening: serde_json::Value = serde_json::from_str(first.lines().next().unwrap()).unwrap();
    let hash = <sha2::Sha256 as sha2::Digest>::digest(&plan);
    let hex: String = hash.iter().map(|b| format!("{b:02x}")).collect();
    assert_eq!(
        opening["plan_sha256"], hex,
        "run `cargo bench --bench demo_record` after changing the demo plan"
    );
    let (code, report) = verify("tampered");
    assert_eq!((code, report["verdict"].as_str()), (Some(1), Some("fail")));
    let changed = report["bad"][0]["entry"].as_u64().unwrap();
    let tampered = std::fs::read_to_string(demo.join("tampered/record.jsonl")).unwrap();
    let line = usize::try_from(changed).unwrap();
    assert_ne!(
        tampered.lines().nth(line),
        first.lines().nth(line),
        "the first bad entry is the one changed"
    );
}
