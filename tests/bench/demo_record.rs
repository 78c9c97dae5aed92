//! Makes the demo job's finished record anew: the built program is driven through the whole job,
//! and a copy of its record with one digit of one measured value changed is laid beside it. Run it
//! after the demo plan, its parts or its keys changed.

#![expect(
    clippy::unwrap_used,
    clippy::disallowed_methods,
    reason = "a tool for contributors opens files and stops at the first surprise"
)]

use std::path::Path;

#[path = "../integration/driver.rs"]
#[expect(
    dead_code,
    reason = "this needs less of the person at the terminal than the tests"
)]
mod driver;

fn main() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let arguments = ["demo", "--job", job.to_str().unwrap()];
    let mut terminal = driver::Terminal::start(&arguments, (80, 24), folder.path());
    terminal.wait("roll call", |s| s.contains("> 1 >"));
    while !terminal.screen().contains("THE DAY IS CLOSED") {
        terminal.answer();
    }
    terminal.keys("q\r");
    assert_eq!(terminal.end().0, 0);
    let demo = Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-jobs/heron-bench");
    let record = std::fs::read_to_string(job.join("record.jsonl")).unwrap();
    let lay_down = |name: &str, record: &str| {
        let to = demo.join(name);
        std::fs::create_dir_all(&to).unwrap();
        std::fs::write(to.join("record.jsonl"), record).unwrap();
        std::fs::copy(job.join("allowed_signers"), to.join("allowed_signers")).unwrap();
    };
    lay_down("finished", &record);
    // The hinge of the last tree, a centimetre thinner in the copy than it was.
    let honest = "\"measured_um\":54000";
    let at = record.rfind(honest).unwrap();
    let tampered = format!(
        "{}\"measured_um\":44000{}",
        &record[..at],
        &record[at + honest.len()..]
    );
    lay_down("tampered", &tampered);
}
