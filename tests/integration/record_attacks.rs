//! The attacks on a record that the kit holds: how each is made, and what must come of it.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]

use ed25519_dalek::Signer as _;
use serde_json::json;
use stumpside::record::Verdict::{self, ClosedOk, Fail, Open};
use stumpside::record::code::RecordCode;
use stumpside::record::line::{self, hex};
use stumpside::record::signature::{Blob, message};

use crate::record_desk::{Desk, crew, key, objects, person, public, rehash, whole_day};

/// One case of the kit.
pub struct Case {
    pub name: &'static str,
    pub about: &'static str,
    pub expect: Verdict,
    /// A piece of a finding, a missing signature or a note that must be there.
    pub because: &'static str,
    pub crew: bool,
    pub code: Option<RecordCode>,
    pub bytes: Vec<u8>,
}

fn case(
    name: &'static str,
    about: &'static str,
    bytes: Vec<u8>,
    (expect, because): (Verdict, &'static str),
) -> Case {
    Case {
        name,
        about,
        expect,
        because,
        crew: false,
        code: None,
        bytes,
    }
}

fn code_of(bytes: &[u8], entry: usize) -> RecordCode {
    let line = bytes.split_inclusive(|b| *b == b'\n').nth(entry).unwrap();
    RecordCode::of(&line::parse(line).unwrap().hash)
}

fn edited() -> Vec<u8> {
    let whole = String::from_utf8(whole_day().bytes).unwrap();
    whole
        .replace("\"measured_um\":38000", "\"measured_um\":50000")
        .into_bytes()
}

fn leader_alone() -> Desk {
    let mut desk = Desk::open(crew());
    desk.say(
        "roll_call",
        json!({"present": ["odile", "tamsin", "rui"], "absent": []}),
    );
    desk.sign("brief_signed", json!({"who": "odile"}), "odile");
    desk.name("brief_signed", json!({"who": "tamsin"}));
    desk.sign(
        "step_done",
        json!({"tree": "T1", "step": 3, "who": "tamsin", "relayed": true}),
        "odile",
    );
    desk.sign("sign_out", json!({"who": "odile"}), "odile");
    desk.sign("close", json!({"who": "odile"}), "odile");
    desk
}

/// The same day with the bad measure made good, written by whoever holds all the keys.
fn rewritten() -> Vec<u8> {
    let mut desk = Desk::open(crew());
    desk.morning();
    desk.say("tree_chosen", json!({"tree": "T1", "keyed_by": "odile"}));
    desk.sign(
        "step_done",
        json!({"tree": "T1", "step": 3, "who": "tamsin", "measured_um": 50_000, "within": true}),
        "tamsin",
    );
    desk.go();
    desk.evening();
    desk.bytes
}

fn foreign_signature() -> Vec<u8> {
    let whole = whole_day().bytes;
    let mut lines = objects(&whole);
    let at = lines
        .iter()
        .position(|l| l.get("who").is_some_and(|w| w == "tamsin") && l.contains_key("sig"))
        .unwrap();
    let signed = whole.split_inclusive(|b| *b == b'\n').nth(at - 1).unwrap();
    let sig = key(3).sign(&message(signed)).to_bytes();
    lines[at].insert(
        "sig".into(),
        Blob::plain(public(3, "x"), sig).base64().into(),
    );
    rehash(&lines)
}

fn pasted_signature() -> Vec<u8> {
    let mut lines = objects(&whole_day().bytes);
    let sigs: Vec<usize> = (0..lines.len())
        .filter(|n| lines[*n].contains_key("sig") && lines[*n]["who"] == "tamsin")
        .collect();
    let older = lines[sigs[0]]["sig"].clone();
    lines[sigs[1]].insert("sig".into(), older);
    rehash(&lines)
}

fn other_namespace() -> Vec<u8> {
    use base64::Engine as _;
    use base64::engine::general_purpose::STANDARD;
    let mut lines = objects(&whole_day().bytes);
    let at = lines
        .iter()
        .position(|line| line.contains_key("sig"))
        .unwrap();
    let blob = STANDARD.decode(lines[at]["sig"].as_str().unwrap()).unwrap();
    let ours = b"\x00\x00\x00\x13stumpside-record-v1";
    let place = blob.windows(ours.len()).position(|w| w == ours).unwrap();
    let blob = [
        &blob[..place],
        b"\x00\x00\x00\x04file",
        &blob[place + ours.len()..],
    ]
    .concat();
    lines[at].insert("sig".into(), STANDARD.encode(blob).into());
    rehash(&lines)
}

fn without_lines(skip: &[usize]) -> Vec<u8> {
    let lines = objects(&whole_day().bytes);
    let kept: Vec<_> = lines
        .into_iter()
        .enumerate()
        .filter(|(n, _)| !skip.contains(n))
        .map(|(_, l)| l)
        .collect();
    rehash(&kept)
}

fn shortened_crew() -> Vec<u8> {
    let mut desk = Desk::open(vec![person("odile", "leader", Some(1))]);
    desk.say("present", json!({"who": "odile"}));
    desk.sign("brief_signed", json!({"who": "odile"}), "odile");
    desk.sign("sign_out", json!({"who": "odile"}), "odile");
    desk.sign("close", json!({"who": "odile"}), "odile");
    desk.bytes
}

fn cut_and_recover() -> Vec<u8> {
    let mut desk = Desk::open(crew());
    desk.morning();
    let junk = b"{\"v\":1,\"se\n";
    let mut hasher = <sha2::Sha256 as sha2::Digest>::new();
    sha2::Digest::update(&mut hasher, junk);
    let hash = hex(&sha2::Digest::finalize(hasher));
    desk.bytes.extend_from_slice(junk);
    desk.say(
        "recover",
        json!({"how": "torn", "torn_bytes": junk.len(), "torn_sha256": hash}),
    );
    desk.evening();
    desk.bytes
}

fn moved_clock() -> Vec<u8> {
    let mut desk = Desk::open(crew());
    desk.morning();
    desk.clock_shift_ms = -3_605_000;
    desk.cuts();
    desk.go();
    desk.evening();
    desk.bytes
}

fn behind_close() -> Vec<u8> {
    let mut desk = whole_day();
    desk.say("note", json!({"text": "and one more thing"}));
    desk.bytes
}

fn wrong_receipt() -> Vec<u8> {
    let mut desk = Desk::open(crew());
    desk.morning();
    let code = code_of(&desk.bytes, 2).to_string();
    desk.say(
        "receipt_shown",
        json!({"shown_seq": 3, "code": code, "to": ["rui"], "way": "radio"}),
    );
    desk.evening();
    desk.bytes
}

/// The same day under a clock three days late.
fn wrong_clock() -> Vec<u8> {
    let mut desk = Desk::open_shifted(-259_200_000);
    desk.morning();
    desk.cuts();
    desk.evening();
    desk.bytes
}

/// Every case of the kit.
pub fn cases() -> Vec<Case> {
    [changed_files(), other_days(), seen_from_outside()]
        .into_iter()
        .flatten()
        .collect()
}

/// What anybody does who has only the file, and the leader with his own key.
fn changed_files() -> Vec<Case> {
    vec![
        case(
            "edited",
            "A measure is made good in the file.",
            edited(),
            (Fail, "entry 10: it was changed"),
        ),
        case(
            "edited-and-rehashed",
            "The same, and every hash made anew.",
            rehash(&objects(&edited())),
            (Fail, "entry 10: the signature does not fit"),
        ),
        case(
            "deleted-and-rehashed",
            "The stepped cut and its signature are taken out, and every hash made anew.",
            without_lines(&[10, 11]),
            (Fail, "does not fit"),
        ),
        case(
            "signature-deleted",
            "Only a signature is taken out.",
            without_lines(&[11]),
            (Fail, "does not fit"),
        ),
        case(
            "foreign-key",
            "Tamsin's name, another key.",
            foreign_signature(),
            (Fail, "is not tamsin's"),
        ),
        case(
            "older-signature-pasted",
            "Tamsin's signature from the briefing under a later act.",
            pasted_signature(),
            (Fail, "does not fit"),
        ),
        case(
            "other-namespace",
            "A signature made for another purpose.",
            other_namespace(),
            (Fail, "one accepted form"),
        ),
        case(
            "behind-the-close",
            "An entry after the close.",
            behind_close(),
            (Fail, "it stands after the close"),
        ),
        case(
            "wrong-receipt",
            "A record code that is another entry's.",
            wrong_receipt(),
            (Fail, "is not entry 3's"),
        ),
    ]
}

/// Days that were written, cut, torn or dated in another way.
fn other_days() -> Vec<Case> {
    let whole = whole_day().bytes;
    let lines = whole.split_inclusive(|b| *b == b'\n');
    let cut = lines.take(12).collect::<Vec<_>>().concat();
    vec![
        case(
            "whole-day",
            "A day as it should be.",
            whole.clone(),
            (ClosedOk, "the crew list is the record's own"),
        ),
        case(
            "leader-alone",
            "The leader writes the day anew with his own key.",
            leader_alone().bytes,
            (Open, "tamsin"),
        ),
        case(
            "crew-shortened",
            "The leader names only himself: the record alone cannot show it.",
            shortened_crew(),
            (ClosedOk, "a leader could shorten his own"),
        ),
        case(
            "rewritten-with-all-keys",
            "Whoever holds all keys writes another day: the record alone cannot show it.",
            rewritten(),
            (ClosedOk, "give --crew with one from outside"),
        ),
        case(
            "cut-at-a-line",
            "The end is cut off.",
            cut,
            (Open, "give --crew with one from outside"),
        ),
        case(
            "cut-in-a-line",
            "The end is cut off within a line.",
            whole[..whole.len() - 40].to_vec(),
            (Fail, "cut short"),
        ),
        case(
            "clock-moved",
            "The wall clock was set back an hour during the day.",
            moved_clock(),
            (ClosedOk, "moved by -3605.000 s (not recorded)"),
        ),
        case(
            "junk-recovered",
            "A torn write, accounted for.",
            cut_and_recover(),
            (ClosedOk, "bytes of junk before it: 11"),
        ),
        case(
            "clock-wrong-all-day",
            "The clock was wrong from the morning on: the record alone cannot show it.",
            wrong_clock(),
            (ClosedOk, "are this laptop's word"),
        ),
    ]
}

/// The same seen with the office's crew list, or with a record code that was carried away.
fn seen_from_outside() -> Vec<Case> {
    let whole = whole_day().bytes;
    let from_office = Case {
        crew: true,
        ..case(
            "whole-day-seen-from-office",
            "The office's own crew list agrees.",
            whole.clone(),
            (ClosedOk, "not verifiable: rui"),
        )
    };
    let shortened = Case {
        crew: true,
        ..case(
            "crew-shortened-seen-from-office",
            "The leader names only himself; the office knows better.",
            shortened_crew(),
            (Fail, "the crew list names tamsin"),
        )
    };
    let against_code = Case {
        code: Some(code_of(&whole, 11)),
        ..case(
            "rewritten-with-all-keys-against-a-code",
            "Somebody wrote down the code after the bad measure.",
            rewritten(),
            (Fail, "is of no entry"),
        )
    };
    let against_early_code = Case {
        code: Some(code_of(&whole, 7)),
        ..case(
            "rewritten-with-all-keys-against-an-early-code",
            "A code from the briefing does not help against a later fork.",
            rewritten(),
            (ClosedOk, "is in this record"),
        )
    };
    vec![from_office, shortened, against_code, against_early_code]
}
