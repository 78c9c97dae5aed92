//! The attacks on a record, each as a file of `tests/kit/record/` that declares its own outcome,
//! and the exhaustive ones: every bit, every cut, every line removed, doubled or swapped.
#![expect(clippy::disallowed_methods, reason = "a test reads its kit")]

use std::path::Path;

use rayon::iter::{IntoParallelIterator, ParallelIterator};
use serde_json::json;
use stumpside::record::code::RecordCode;
use stumpside::record::line;
use stumpside::record::signers;
use stumpside::record::verify::Tail;
use stumpside::record::{Draft, Options, Report, Trust, Verdict, verify};

use crate::record_attacks::{Case, cases};
use crate::record_desk::{Desk, crew, members, objects, office_list, public, small_day, whole_day};

fn by_roster(bytes: &[u8]) -> Report {
    verify(bytes, &Trust::Roster, &Options::default())
}

fn kit_text(case: &Case) -> Vec<u8> {
    let code = case
        .code
        .map_or_else(|| "none".to_owned(), |code| code.to_string());
    let trust = if case.crew {
        "office"
    } else {
        "the record's own"
    };
    let head = format!(
        "# about: {}\n# expect: {}\n# because: {}\n# crew: {trust}\n# code: {code}\n",
        case.about,
        case.expect.word(),
        case.because
    );
    [head.as_bytes(), &case.bytes].concat()
}

fn kit_dir() -> std::path::PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/kit/record")
}

/// What a report says, as one text to look for a piece in.
fn said(report: &Report) -> String {
    let bad = report
        .bad
        .iter()
        .map(|bad| format!("entry {}: {}\n", bad.entry, bad.why));
    let missing = report
        .unsigned_required
        .iter()
        .map(|m| format!("{} {} {}\n", m.kind, m.who, m.why));
    let notes = report.notes.iter().map(|note| format!("{note}\n"));
    bad.chain(missing).chain(notes).collect()
}

#[test]
fn every_kit_file_ends_as_it_declares() {
    let names: Vec<_> = std::fs::read_dir(kit_dir())
        .unwrap()
        .map(|f| f.unwrap().path())
        .collect();
    assert_eq!(
        names.len(),
        cases().len(),
        "a kit file for each case and no other"
    );
    for path in names {
        let file = std::fs::read(&path).unwrap();
        let mut body = file.as_slice();
        let mut head = Vec::new();
        while body.starts_with(b"# ") {
            let end = body.iter().position(|b| *b == b'\n').unwrap() + 1;
            head.push(String::from_utf8(body[..end].to_vec()).unwrap());
            body = &body[end..];
        }
        let field = |name: &str| {
            let start = format!("# {name}: ");
            head.iter()
                .find_map(|l| l.strip_prefix(&start))
                .unwrap()
                .trim_end()
                .to_owned()
        };
        let trust = match field("crew").as_str() {
            "office" => Trust::Crew(office_list()),
            _ => Trust::Roster,
        };
        let codes = RecordCode::read(&field("code")).into_iter().collect();
        let report = verify(body, &trust, &Options { codes });
        let said = said(&report);
        assert_eq!(
            report.verdict.word(),
            field("expect"),
            "{}\n{said}",
            path.display()
        );
        assert!(
            said.contains(&field("because")),
            "{}\n{said}",
            path.display()
        );
    }
}

#[test]
fn the_bytes_of_format_1_have_not_changed() {
    let fresh = Path::new(env!("CARGO_TARGET_TMPDIR")).join("kit-record");
    std::fs::create_dir_all(&fresh).unwrap();
    let mut differing = Vec::new();
    for case in cases() {
        let name = format!("{}.kit", case.name);
        let text = kit_text(&case);
        std::fs::write(fresh.join(&name), &text).unwrap();
        if std::fs::read(kit_dir().join(&name)).ok().as_ref() != Some(&text) {
            differing.push(name);
        }
    }
    assert!(
        differing.is_empty(),
        "these differ from those in {}: {differing:?}",
        fresh.display()
    );
}

#[test]
fn every_flipped_bit_fails() {
    let whole = small_day();
    assert_eq!(by_roster(&whole).verdict, Verdict::ClosedOk);
    let passed: Vec<usize> = (0..whole.len() * 8)
        .into_par_iter()
        .filter(|bit| {
            let mut flipped = whole.clone();
            flipped[bit / 8] ^= 1 << (bit % 8);
            by_roster(&flipped).verdict != Verdict::Fail
        })
        .collect();
    assert_eq!(
        passed,
        Vec::<usize>::new(),
        "bits whose change goes unnoticed"
    );
}

#[test]
fn a_changed_line_is_the_one_that_is_named() {
    let whole = whole_day().bytes;
    let lines: Vec<&[u8]> = whole.split_inclusive(|b| *b == b'\n').collect();
    for (n, line) in lines.iter().enumerate() {
        let mut changed = line.to_vec();
        let at = changed
            .windows(8)
            .position(|w| w == b"\"kind\":\"")
            .unwrap()
            + 8;
        changed[at] ^= 1;
        let mut all = lines.clone();
        all[n] = &changed;
        let report = by_roster(&all.concat());
        let first = report.bad.first().map(|bad| bad.entry);
        assert_eq!(first, Some(n as u64), "{}", said(&report));
    }
}

#[test]
fn every_cut_is_open_or_fails_and_never_closed() {
    let whole = small_day();
    for cut in 0..whole.len() {
        let report = by_roster(&whole[..cut]);
        let at_line_end = cut > 0 && whole[cut - 1] == b'\n';
        let expected = if at_line_end {
            Verdict::Open
        } else {
            Verdict::Fail
        };
        assert_eq!(report.verdict, expected, "cut at {cut}: {}", said(&report));
        let tail = if at_line_end || cut == 0 {
            Tail::Whole
        } else {
            Tail::Torn
        };
        assert_eq!(report.tail, tail, "cut at {cut}");
    }
}

#[test]
fn a_changed_link_is_the_line_that_is_named() {
    let whole = whole_day().bytes;
    let lines: Vec<&[u8]> = whole.split_inclusive(|b| *b == b'\n').collect();
    for n in 1..lines.len() {
        let mut changed = lines[n].to_vec();
        let at = changed
            .windows(8)
            .position(|w| w == b"\"prev\":\"")
            .unwrap()
            + 8;
        changed[at] = if changed[at] == b'0' { b'1' } else { b'0' };
        let mut all = lines.clone();
        all[n] = &changed;
        let report = by_roster(&all.concat());
        let first = report.bad.first().map(|bad| bad.entry);
        assert_eq!(first, Some(n as u64), "{}", said(&report));
    }
}

#[test]
fn every_line_removed_doubled_or_swapped_fails() {
    let whole = whole_day().bytes;
    let lines: Vec<&[u8]> = whole.split_inclusive(|b| *b == b'\n').collect();
    for n in 0..lines.len() {
        let mut doubled = lines.clone();
        doubled.insert(n, lines[n]);
        assert_eq!(
            by_roster(&doubled.concat()).verdict,
            Verdict::Fail,
            "{n} doubled"
        );
        if n + 1 < lines.len() {
            let mut removed = lines.clone();
            removed.remove(n);
            let report = by_roster(&removed.concat());
            assert_eq!(report.verdict, Verdict::Fail, "{n} removed");
            assert_eq!(report.bad[0].entry, n as u64, "{}", said(&report));
        }
        for other in n + 1..lines.len() {
            let mut swapped = lines.clone();
            swapped.swap(n, other);
            assert_eq!(
                by_roster(&swapped.concat()).verdict,
                Verdict::Fail,
                "{n} and {other} swapped"
            );
        }
    }
}

#[test]
fn many_bad_entries_are_all_named() {
    let whole = String::from_utf8(whole_day().bytes).unwrap();
    let changed = whole
        .replace("I have heard it", "I have Heard it")
        .replace("\"T1\"", "\"T9\"");
    let report = by_roster(changed.as_bytes());
    let entries: Vec<u64> = report.bad.iter().map(|bad| bad.entry).collect();
    for expected in [4, 6, 8, 10, 12, 14] {
        assert!(entries.contains(&expected), "{expected} in {entries:?}");
    }
    assert_eq!(report.verdict, Verdict::Fail);
    assert!(report.good < report.entries);
}

#[test]
fn a_missing_person_is_named_at_briefing_and_close() {
    let mut desk = Desk::open(crew());
    desk.say("present", json!({"who": "odile"}));
    desk.say("present", json!({"who": "tamsin"}));
    desk.sign("brief_signed", json!({"who": "odile"}), "odile");
    desk.sign("sign_out", json!({"who": "odile"}), "odile");
    desk.sign("close", json!({"who": "odile"}), "odile");
    let report = by_roster(&desk.bytes);
    assert_eq!(report.verdict, Verdict::Open);
    let missing: Vec<_> = report
        .unsigned_required
        .iter()
        .map(|m| (m.kind.as_str(), m.who.as_str()))
        .collect();
    assert_eq!(
        missing,
        [("brief_signed", "tamsin"), ("sign_out", "tamsin")]
    );
}

#[test]
fn who_is_called_absent_need_not_sign_and_is_named_in_a_note() {
    let mut desk = Desk::open(crew());
    desk.say(
        "roll_call",
        json!({"present": ["odile"], "absent": ["tamsin", "rui"]}),
    );
    desk.sign("brief_signed", json!({"who": "odile"}), "odile");
    desk.sign("sign_out", json!({"who": "odile"}), "odile");
    desk.sign("close", json!({"who": "odile"}), "odile");
    let report = by_roster(&desk.bytes);
    assert_eq!(report.verdict, Verdict::ClosedOk, "{}", said(&report));
    assert!(said(&report).contains("tamsin is absent by the keyer's word"));
}

#[test]
fn a_close_by_another_than_the_leader_leaves_the_record_open() {
    let mut desk = Desk::open(crew());
    desk.morning();
    for who in ["odile", "tamsin"] {
        desk.sign("sign_out", json!({"who": who}), who);
    }
    desk.sign("close", json!({"who": "tamsin"}), "tamsin");
    let report = by_roster(&desk.bytes);
    assert_eq!(report.verdict, Verdict::Open);
    assert!(
        said(&report).contains("close odile only the leader closes a record"),
        "{}",
        said(&report)
    );
}

#[test]
fn a_key_counts_only_within_its_time() {
    let whole = whole_day().bytes;
    let mut list = office_list();
    list[1].valid_before_ms = Some(crate::record_desk::MORNING_MS + 60_000);
    let report = verify(&whole, &Trust::Crew(list.clone()), &Options::default());
    assert_eq!(report.verdict, Verdict::Fail);
    assert!(said(&report).contains("the key of tamsin was not valid at"));
    list[1].valid_before_ms = Some(crate::record_desk::MORNING_MS + 86_400_000);
    assert_eq!(signers::read(&signers::write(&list)).unwrap(), list);
    assert_eq!(
        verify(&whole, &Trust::Crew(list), &Options::default()).verdict,
        Verdict::ClosedOk
    );
}

#[test]
fn demo_keys_are_told_first() {
    let mut crew = crew();
    crew[0].key = Some(public(1, "DEMO odile: proves nothing"));
    let desk = Desk::open(crew);
    let report = by_roster(&desk.bytes);
    assert_eq!(report.notes[0], "DEMO KEYS: PROVES NOTHING");
    assert!(!said(&by_roster(&whole_day().bytes)).contains("DEMO"));
}

#[test]
fn an_unknown_kind_is_kept_chained_and_told() {
    let mut desk = Desk::open(crew());
    desk.say(
        "weather_song",
        json!({"text": "rain", "deep": {"er": [1, null, true]}}),
    );
    let report = by_roster(&desk.bytes);
    assert_eq!(report.verdict, Verdict::Open);
    assert!(said(&report).contains("the kind \"weather_song\" is unknown"));
    let entry = objects(&desk.bytes)[1].clone();
    assert_eq!(entry["deep"], json!({"er": [1, null, true]}));
}

#[test]
fn an_act_that_must_be_signed_is_not_written_without() {
    use stumpside::record::draft::{DraftFault, encode_batch};
    let draft = Draft::unsigned("go", members(json!({"who": "tamsin"})));
    let place = line::Place {
        seq: 1,
        prev: [0; 32],
    };
    let mut sign =
        |_: &str, _: &[u8]| -> Result<String, std::convert::Infallible> { panic!("asked to sign") };
    let outcome = encode_batch(place, &crate::record_desk::stamp(0), &[draft], &mut sign);
    assert!(matches!(outcome, Err(DraftFault::SignerMissing(kind)) if kind == "go"));
}
