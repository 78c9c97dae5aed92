//! The built program in a real terminal: the whole demo job, kills, signals, small windows.

use std::path::Path;
use std::time::Duration;

use crate::driver::{Terminal, keys_for, position};
use crate::support::{run, tries};

fn record_of(job: &Path) -> String {
    job.join("record.jsonl").to_str().unwrap().to_owned()
}

#[test]
fn the_whole_demo_job_is_briefed_and_its_record_verifies() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let mut terminal = Terminal::start(
        &["demo", "--job", job.to_str().unwrap()],
        (80, 24),
        folder.path(),
    );
    terminal.wait("roll call", |s| {
        s.contains("ROLL CALL") && s.contains("> 1 >")
    });
    let mut titles = std::collections::BTreeSet::new();
    for _ in 0..400 {
        let screen = terminal.screen();
        if screen.contains("THE DAY IS CLOSED") {
            break;
        }
        for title in [
            "ROLL CALL",
            "TAILGATE",
            "NEXT TREE",
            "SHORT TALK",
            "WALK-UP",
            "CUTS",
            "HOLD LINE",
            "seconds gone",
            "ALL CLEAR",
            "CLOSE",
        ] {
            if screen.contains(title) {
                titles.insert(title);
            }
        }
        terminal.answer();
    }
    assert!(
        terminal.screen().contains("THE DAY IS CLOSED"),
        "{}",
        terminal.screen()
    );
    assert_eq!(titles.len(), 10, "every stage was seen: {titles:?}");
    terminal.keys("q\r");
    let (code, sent, _) = terminal.end();
    assert_eq!(code, 0);
    assert_restored_once(&sent);
    let (code, text, _) = run(&["record", "verify", &record_of(&job), "--format", "json"]);
    assert_eq!(code, 0, "{text}");
    assert!(text.contains("\"verdict\":\"closed-ok\""), "{text}");
    assert!(text.contains("\"unsigned_required\":[]"), "{text}");
}

/// The terminal is taken once and given back once.
fn assert_restored_once(sent: &[u8]) {
    let count = |pattern: &[u8]| {
        sent.windows(pattern.len())
            .filter(|w| *w == pattern)
            .count()
    };
    assert_eq!((count(b"\x1b[?1049h"), count(b"\x1b[?1049l")), (1, 1));
}

/// Numbers without a pattern: Marsaglia's xorshift (2003).
struct Dice(u64);

impl Dice {
    fn throw(&mut self) -> u64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        self.0 >> 33
    }
}

/// Answers that stand in the record, in order, as their item and stage.
fn answers_on_disk(job: &Path) -> Vec<String> {
    answers_in(&job.join("record.jsonl"))
}

fn answers_in(record: &Path) -> Vec<String> {
    let text = std::fs::read_to_string(record).unwrap_or_default();
    text.lines()
        .filter_map(|line| serde_json::from_str::<serde_json::Value>(line).ok())
        .filter(|v| {
            v.get("values").is_some()
                || v["kind"] == "second_look_held"
                || v["kind"] == "second_look_revealed"
        })
        .map(|v| format!("{} {} {}", v["seq"], v["kind"], v["item"]))
        .collect()
}

#[test]
fn a_hundred_kills_lose_nothing_that_was_shown_as_recorded() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let mut random = Dice(0x9e37_79b9_7f4a_7c15);
    let mut acknowledged: Vec<String> = vec![];
    let mut kills = 0;
    while kills < tries("STUMPSIDE_KILLS", 100) {
        let mut terminal = Terminal::start(
            &["demo", "--job", job.to_str().unwrap()],
            (80, 24),
            folder.path(),
        );
        terminal.wait("a step or the end", |s| {
            s.contains("> 1 >")
                || s.contains(" > ")
                || s.contains("seconds gone")
                || s.contains("CLOSED")
                || s.contains("the day of this record is closed")
        });
        terminal.look();
        let kept = answers_on_disk(&job);
        assert!(
            kept.starts_with(&acknowledged),
            "what was shown as recorded is there after kill {kills}"
        );
        for _ in 0..random.throw() % 4 {
            let screen = terminal.screen();
            if screen.contains("THE DAY IS CLOSED") || screen.contains("record is closed") {
                break;
            }
            terminal.answer();
        }
        let closed = ["THE DAY IS CLOSED", "the day of this record is closed"];
        if closed.iter().any(|words| terminal.screen().contains(words)) {
            terminal.kill();
            std::fs::remove_dir_all(&job).unwrap();
            acknowledged.clear();
            continue;
        }
        // What the screen shows as done now is on disk already.
        acknowledged = answers_on_disk(&job);
        let keys = keys_for(&terminal.screen());
        terminal.keys(&keys);
        let moment = Duration::from_micros(random.throw() % 12_000);
        terminal.listen(moment);
        let before = position(&terminal.screen());
        let shown_again = answers_on_disk(&job);
        assert!(shown_again.starts_with(&acknowledged), "{before}");
        terminal.kill();
        kills += 1;
    }
    let (code, text, _) = run(&["record", "verify", &record_of(&job), "--format", "json"]);
    assert!(code == 6 || code == 0, "{code}: {text}");
    assert!(text.contains("\"bad\":[]"), "{text}");
}

#[test]
fn signals_end_it_with_the_terminal_restored() {
    use rustix::process::Signal;
    for signal in [Signal::TERM, Signal::HUP, Signal::INT] {
        let folder = tempfile::tempdir().unwrap();
        let job = folder.path().join("job");
        let mut terminal = Terminal::start(
            &["demo", "--job", job.to_str().unwrap()],
            (80, 24),
            folder.path(),
        );
        terminal.wait("roll call", |s| s.contains("> 1 >"));
        terminal.answer();
        terminal.signal(signal);
        let (code, sent, _) = terminal.end();
        assert_eq!(code, 130, "{signal:?}");
        assert_restored_once(&sent);
        assert!(String::from_utf8_lossy(&sent).contains("record code"));
    }
}

#[test]
fn a_terminal_that_goes_away_ends_it() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let job_word = job.to_str().unwrap();
    let mut terminal = Terminal::start(&["demo", "--job", job_word], (80, 24), folder.path());
    terminal.wait("roll call", |s| s.contains("> 1 >"));
    assert!(terminal.hang_up(), "the program ends with its terminal");
    // The record is free again and goes on.
    let mut again = Terminal::start(&["demo", "--job", job_word], (80, 24), folder.path());
    again.wait("roll call", |s| s.contains("> 1 >"));
}

#[test]
fn space_stops_from_every_work_screen_and_the_place_is_kept() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let mut terminal = Terminal::start(
        &["demo", "--job", job.to_str().unwrap()],
        (80, 24),
        folder.path(),
    );
    terminal.wait("roll call", |s| s.contains("> 1 >"));
    let mut stages = std::collections::BTreeSet::new();
    for _ in 0..90 {
        let screen = terminal.screen();
        let title = screen
            .lines()
            .next()
            .unwrap()
            .get(44..66)
            .unwrap_or("")
            .trim()
            .to_owned();
        if !screen.contains("seconds gone")
            && !screen.contains("any key = back")
            && stages.insert(title)
        {
            let before = crate::driver::lit_number(&screen);
            terminal.keys(" ");
            terminal.wait("stopped", |s| s.contains("STOPPED") && s.contains("> 1 >"));
            while terminal.screen().contains("STOPPED") {
                terminal.answer();
            }
            let after = terminal.screen();
            // At the hold line the items are asked again; elsewhere the place is the same.
            assert!(
                crate::driver::lit_number(&after) == before || after.contains("HOLD LINE"),
                "{after}"
            );
        }
        if terminal.screen().contains("ALL CLEAR") {
            break;
        }
        terminal.answer();
    }
    assert!(stages.len() >= 8, "{stages:?}");
}

#[test]
fn small_windows_say_what_they_need_and_recover() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let mut terminal = Terminal::start(
        &["demo", "--job", job.to_str().unwrap()],
        (80, 24),
        folder.path(),
    );
    terminal.wait("roll call", |s| s.contains("> 1 >"));
    terminal.resize((30, 8));
    terminal.wait("what it needs", |s| s.contains("needs 40x12, has 30x8"));
    terminal.keys("1\r1\r");
    terminal.look();
    assert_eq!(
        answers_on_disk(&job),
        Vec::<String>::new(),
        "no hidden field takes an answer"
    );
    terminal.resize((40, 12));
    terminal.wait("the card", |s| s.contains("ROLL CALL, step 1"));
    terminal.resize((120, 40));
    terminal.wait("the wide screen", |s| s.contains("IF SOMEBODY IS HURT"));
    terminal.keys("q\r");
    assert_eq!(terminal.end().0, 0);
}

#[test]
fn the_ascii_look_sends_no_byte_above_0x7f_and_no_color_no_colour() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let arguments = ["demo", "--ascii", "--job", job.to_str().unwrap()];
    let mut terminal =
        Terminal::start_with(&arguments, (80, 24), (folder.path(), &[("NO_COLOR", "1")]));
    terminal.wait("roll call", |s| s.contains("> 1 >"));
    for _ in 0..30 {
        terminal.answer();
    }
    terminal.keys("q\r");
    let (code, sent, _) = terminal.end();
    assert_eq!(code, 0);
    assert_eq!(sent.iter().find(|b| **b > 0x7f), None);
    let text = String::from_utf8(sent).unwrap();
    let colours: Vec<&str> = text
        .split("\x1b[")
        .filter_map(|rest| rest.split_once('m'))
        .map(|(codes, _)| codes)
        .filter(|c| {
            c.split(';')
                .any(|n| matches!(n.parse::<u32>(), Ok(30..=38 | 40..=48 | 90..=107)))
        })
        .collect();
    assert_eq!(colours, Vec::<&str>::new());
}

#[test]
fn an_idle_screen_sends_little() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let mut terminal = Terminal::start(
        &["demo", "--job", job.to_str().unwrap()],
        (80, 24),
        folder.path(),
    );
    terminal.wait("roll call", |s| s.contains("> 1 >"));
    terminal.listen(Duration::from_millis(500));
    let before = terminal.sent.len();
    terminal.listen(Duration::from_secs(3));
    let a_second = (terminal.sent.len() - before) / 3;
    assert!(a_second <= 200, "{a_second} bytes a second");
    terminal.keys("q\r");
    assert_eq!(terminal.end().0, 0);
}

#[test]
fn a_write_that_fails_is_said_and_nothing_shown_as_recorded_is_lost() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let arguments = ["demo", "--job", job.to_str().unwrap()];
    // Sixty-four blocks of 512 bytes: the record outgrows them before the first tree is down.
    let limit = (folder.path(), &[("FILE_BLOCKS", "64")][..]);
    let mut terminal = Terminal::start_with(&arguments, (80, 24), limit);
    terminal.wait("roll call", |s| s.contains("> 1 >"));
    let failed = |s: &str| s.contains("NOT RECORDED");
    let mut acknowledged = 0;
    for _ in 0..200 {
        terminal.look();
        let screen = terminal.screen();
        if failed(&screen) && screen.contains("paper") {
            break;
        }
        let asks = !screen.contains("any key = back");
        let (before, again) = (position(&screen), failed(&screen));
        terminal.keys(&keys_for(&screen));
        let after = terminal.wait("an answer or the failure", |s| {
            position(s) != before || (failed(s) && !again) || s.contains("paper")
        });
        // The screen moved on without a word of failure: this answer is shown as recorded.
        acknowledged += usize::from(asks && position(&after) != before && !failed(&after));
    }
    assert!(failed(&terminal.screen()), "{}", terminal.screen());
    assert!(
        acknowledged > 10,
        "{acknowledged} answers were acknowledged first"
    );
    let newest = std::fs::read_dir(&job)
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|e| e == "jsonl"))
        .map(|path| answers_in(&path).len())
        .max();
    assert!(
        newest >= Some(acknowledged),
        "{newest:?} of {acknowledged} are on disk"
    );
    terminal.keys("q\r");
    let (code, sent, _) = terminal.end();
    assert_eq!(code, 4);
    assert!(String::from_utf8_lossy(&sent).contains("go on on paper"));
}

#[test]
fn what_cannot_be_opened_is_said_once_with_its_exit_code() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let job_word = job.to_str().unwrap();
    let start = |arguments: &[&str]| Terminal::start(arguments, (80, 24), folder.path());
    let refused = |arguments: &[&str], code: u32, words: &str| {
        let mut terminal = start(arguments);
        while terminal.listen(Duration::from_secs(1)) {}
        let (ended, sent, _) = terminal.end();
        let said = String::from_utf8_lossy(&sent).into_owned();
        assert_eq!(ended, code, "{said}");
        assert!(said.contains(words), "{said}");
        assert!(!said.contains("\x1b[?1049h"), "no screen was taken");
    };
    let mut first = start(&["demo", "--job", job_word]);
    first.wait("roll call", |s| s.contains("> 1 >"));
    first.answer();
    let plan = job.join("plan.yaml");
    let before = std::fs::read(job.join("record.jsonl")).unwrap();
    // A second program on the same record.
    refused(
        &["brief", plan.to_str().unwrap()],
        4,
        "another program holds the record open",
    );
    first.keys("q\r");
    assert_eq!(first.end().0, 0);
    // Another plan on a record.
    let other = folder.path().join("other.yaml");
    let text = std::fs::read_to_string(&plan)
        .unwrap()
        .replace("keys/", &format!("{job_word}/keys/"));
    std::fs::write(&other, text).unwrap();
    refused(
        &["brief", other.to_str().unwrap(), "--job", job_word],
        1,
        "about another plan",
    );
    // A job folder that cannot be made, a plan that is not there, a folder as a plan.
    refused(
        &["brief", plan.to_str().unwrap(), "--job", "/dev/null/job"],
        4,
        "/dev/null/job",
    );
    refused(&["brief", "nowhere.yaml"], 3, "nowhere.yaml");
    refused(&["brief", job_word], 3, job_word);
    assert!(
        std::fs::read(job.join("record.jsonl"))
            .unwrap()
            .starts_with(&before)
    );
}

#[test]
fn a_key_with_a_passphrase_is_asked_for_and_a_wrong_one_signs_nothing() {
    let folder = tempfile::tempdir().unwrap();
    let job = folder.path().join("job");
    let (code, _, talk) = run(&["demo", "--copy-only", "--job", job.to_str().unwrap()]);
    assert_eq!(code, 0, "{talk}");
    // The spotter's demo key gives way to one of his own with a passphrase.
    for name in ["keys/rui", "keys/rui.pub"] {
        std::fs::remove_file(job.join(name)).unwrap();
    }
    let secret = folder.path().join("secret");
    std::fs::write(&secret, "wet bark\n").unwrap();
    let arguments = [
        "crew",
        "add",
        "rui",
        "--name",
        "Rui Halloran",
        "--job",
        job.to_str().unwrap(),
        "--passphrase-file",
        secret.to_str().unwrap(),
    ];
    let (code, _, talk) = run(&arguments);
    assert_eq!(code, 0, "{talk}");
    let plan = job.join("plan.yaml");
    let mut terminal = Terminal::start(&["brief", plan.to_str().unwrap()], (80, 24), folder.path());
    terminal.wait("roll call", |s| s.contains("> 1 >"));
    while !terminal.screen().contains("BRIEFED: RUI") {
        terminal.answer();
    }
    let count = || answers_on_disk(&job).len();
    let before = count();
    terminal.keys("4\r");
    terminal.wait("the passphrase", |s| {
        s.contains("Passphrase of Rui Halloran's key")
    });
    terminal.keys("dry bark\r");
    terminal.wait("the refusal", |s| s.contains("wrong passphrase"));
    assert_eq!(count(), before);
    assert!(!terminal.screen().contains("dry bark"));
    terminal.keys("4\r");
    terminal.wait("the passphrase", |s| {
        s.contains("Passphrase of Rui Halloran's key")
    });
    terminal.keys("wet bark\r");
    terminal.wait("the code to carry away", |s| s.contains("any key = back"));
    assert_eq!(count(), before + 1);
    assert!(!String::from_utf8_lossy(&terminal.sent).contains("wet bark"));
}
