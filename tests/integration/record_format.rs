//! The bytes of one line, read and refused, and the written page against the table of kinds.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]
#![expect(clippy::disallowed_methods, reason = "a test reads the written page")]

use proptest::prelude::*;
use serde_json::{Map, Value, json};
use stumpside::record::kind::KINDS;
use stumpside::record::line::{LineFault, Place, encode, parse, read_utc};
use stumpside::record::public_key::{KeyFault, PublicKey};
use stumpside::record::signers::{self, SignersFault};
use stumpside::record::{INTEGER_MAX, LINE_BYTES_MAX};

use crate::record_desk::{members, public, stamp};

const PLACE: Place = Place {
    seq: 5,
    prev: [0xab; 32],
};

fn line(value: Value) -> Result<Vec<u8>, LineFault> {
    encode(PLACE, &stamp(3), "note", &members(value))
}

fn with_member(text: &str) -> Vec<u8> {
    let plain = String::from_utf8(line(json!({"x": 1})).unwrap()).unwrap();
    plain.replace("\"x\":1", text).into_bytes()
}

#[test]
fn a_line_has_exactly_these_bytes() {
    let bytes = line(json!({"text": "quote \" slash \\ tab \t bell \u{7} chêne"})).unwrap();
    let prev = "ab".repeat(32);
    let expected = format!(
        "{{\"v\":1,\"seq\":5,\"prev\":\"{prev}\",\"utc\":\"2026-11-14T12:03:00.000Z\",\"off_min\":-300,\"up_ms\":1180000,\"boot\":\"1a2b3c4d\",\"kind\":\"note\",\"text\":\"quote \\\" slash \\\\ tab \\t bell \\u0007 chêne\"}}\n"
    );
    assert_eq!(String::from_utf8(bytes).unwrap(), expected);
}

#[test]
fn what_is_not_the_one_written_form_is_refused() {
    assert!(parse(&with_member("\"x\":1")).is_ok());
    for (member, fault) in [
        ("\"x\": 1", LineFault::NotCanonical),
        ("\"x\":1,\"x\":1", LineFault::NotCanonical),
        ("\"x\":\"\\u0041\"", LineFault::NotCanonical),
        ("\"x\":\"\\/\"", LineFault::NotCanonical),
        ("\"x\":1.0", LineFault::Number("x".into())),
        ("\"x\":-0", LineFault::Number("x".into())),
        ("\"x\":1e3", LineFault::Number("x".into())),
        ("\"x\":9007199254740992", LineFault::Number("x".into())),
        ("\"x\":-9007199254740992", LineFault::Number("x".into())),
        ("\"x\":18446744073709551616", LineFault::Number("x".into())),
        ("\"x\":{\"y\":[2.5]}", LineFault::Number("x".into())),
    ] {
        assert_eq!(parse(&with_member(member)), Err(fault), "{member}");
    }
    for member in ["\"x\":NaN", "\"x\":\"\\ud800\"", "\"x\":01", "\"x\":1}{"] {
        assert!(
            matches!(parse(&with_member(member)), Err(LineFault::NotJson(_))),
            "{member}"
        );
    }
    for member in [
        "\"x\":\"e\u{301}\"",
        "\"x\":\"a\u{202e}b\"",
        "\"e\u{301}\":1",
        "\"x\":[\"\u{2066}\"]",
    ] {
        assert!(
            matches!(parse(&with_member(member)), Err(LineFault::Text { .. })),
            "{member}"
        );
    }
    let most = format!("\"x\":{INTEGER_MAX},\"y\":-{INTEGER_MAX}");
    assert!(parse(&with_member(&most)).is_ok());
}

#[test]
fn the_head_of_a_line_is_strict() {
    let whole = String::from_utf8(line(json!({"x": 1})).unwrap()).unwrap();
    let changed = |from: &str, to: &str| parse(whole.replacen(from, to, 1).as_bytes());
    assert_eq!(changed("\"v\":1", "\"v\":2"), Err(LineFault::Version));
    assert_eq!(changed("\"v\":1", "\"v\":true"), Err(LineFault::Version));
    assert_eq!(
        changed("\"seq\":5", "\"seq\":-5"),
        Err(LineFault::Head("seq"))
    );
    assert_eq!(changed("abab", "ABab"), Err(LineFault::Head("prev")));
    assert_eq!(
        changed("\"boot\":\"1a2b3c4d\"", "\"boot\":\"1a2b3c4\""),
        Err(LineFault::Head("boot"))
    );
    assert_eq!(
        changed("\"off_min\":-300", "\"off_min\":-3000"),
        Err(LineFault::Head("off_min"))
    );
    assert_eq!(
        changed("\"kind\":\"note\"", "\"kind\":\"No te\""),
        Err(LineFault::Head("kind"))
    );
    assert_eq!(
        changed("\"v\":1,\"seq\":5", "\"seq\":5,\"v\":1"),
        Err(LineFault::Head("v"))
    );
    assert_eq!(changed(".000Z", "Z"), Err(LineFault::Head("utc")));
    assert_eq!(
        parse(whole.trim_end().as_bytes()),
        Err(LineFault::NotCanonical)
    );
    assert_eq!(parse(b"[1]\n"), parse(b"[1]\n"));
    assert!(matches!(parse(b"[1]\n"), Err(LineFault::NotJson(_))));
    assert_eq!(parse(b"\xff\n"), Err(LineFault::NotUtf8));
}

#[test]
fn times_are_read_only_in_their_one_form() {
    assert_eq!(read_utc("1970-01-01T00:00:00.001Z"), Some(1));
    assert_eq!(
        read_utc("2024-02-29T23:59:59.999Z"),
        Some(1_709_251_199_999)
    );
    for wrong in [
        "2023-02-29T00:00:00.000Z",
        "2024-02-29 23:59:59.999Z",
        "2024-02-29T23:59:59.9Z",
        "2024-02-29T24:00:00.000Z",
        "1969-12-31T23:59:59.999Z",
        "2024-2-29T23:59:59.999Z",
    ] {
        assert_eq!(read_utc(wrong), None, "{wrong}");
    }
}

#[test]
fn a_line_past_the_limit_is_refused() {
    let fill = |bytes: usize| json!({"text": "x".repeat(bytes)});
    let overhead = line(fill(0)).unwrap().len();
    assert_eq!(
        line(fill(LINE_BYTES_MAX - overhead)).map(|l| l.len()),
        Ok(LINE_BYTES_MAX)
    );
    assert_eq!(
        line(fill(LINE_BYTES_MAX - overhead + 1)),
        Err(LineFault::TooLong(LINE_BYTES_MAX + 1))
    );
}

#[test]
fn members_that_repeat_the_head_are_refused() {
    assert_eq!(line(json!({"seq": 3})), Err(LineFault::NotCanonical));
    assert_eq!(line(json!({"kind": "go"})), Err(LineFault::NotCanonical));
}

#[test]
fn crew_lists_are_read_narrowly() {
    let key = public(1, "odile").line();
    let list = |options: &str| signers::read(&format!("odile {options}{key}\n"));
    assert_eq!(list("").unwrap()[0].key, public(1, "odile"));
    let dated = list("namespaces=\"git,stumpside-record-v1\",valid-after=\"20260101Z\",valid-before=\"20270101120000Z\" ").unwrap();
    assert_eq!(
        dated[0].valid_after_ms,
        read_utc("2026-01-01T00:00:00.000Z")
    );
    assert_eq!(
        dated[0].valid_before_ms,
        read_utc("2027-01-01T12:00:00.000Z")
    );
    assert_eq!(list("namespaces=\"git\" "), Err(SignersFault::Empty));
    assert!(matches!(
        list("cert-authority "),
        Err(SignersFault::Option { .. })
    ));
    assert!(matches!(
        list("valid-after=\"20260101\" "),
        Err(SignersFault::Time { .. })
    ));
    assert!(matches!(
        list("valid-after=\"20261301Z\" "),
        Err(SignersFault::Time { .. })
    ));
    assert!(matches!(
        signers::read(&format!("* {key}\n")),
        Err(SignersFault::Name { .. })
    ));
    assert!(matches!(
        signers::read("odile ssh-rsa AAAA\n"),
        Err(SignersFault::Key {
            fault: KeyFault::Kind(_),
            ..
        })
    ));
    assert_eq!(PublicKey::read("ssh-ed25519 AAAA"), Err(KeyFault::Blob));
}

#[test]
fn the_written_page_names_every_kind_with_its_fields() {
    let path = concat!(env!("CARGO_MANIFEST_DIR"), "/src/record/FORMAT.md");
    let page = std::fs::read_to_string(path).unwrap();
    let rows: Vec<&str> = page
        .lines()
        .filter(|line| line.starts_with("| `"))
        .collect();
    let expected: Vec<String> = KINDS
        .iter()
        .map(|kind| {
            let fields: Vec<String> = kind
                .fields
                .split(' ')
                .map(|field| format!("`{field}`"))
                .collect();
            format!(
                "| `{}` | {} | {} | {} |",
                kind.name,
                kind.meaning,
                fields.join(" "),
                kind.seal.words()
            )
        })
        .collect();
    assert_eq!(rows, expected);
}

fn value() -> impl Strategy<Value = Value> {
    let number = -(INTEGER_MAX as i64)..=(INTEGER_MAX as i64);
    let leaf = prop_oneof![
        Just(Value::Null),
        any::<bool>().prop_map(Value::from),
        number.prop_map(Value::from),
        any::<String>().prop_map(|text| Value::from(stumpside::record::text::clean(&text))),
    ];
    leaf.prop_recursive(3, 16, 4, |inner| {
        prop_oneof![
            prop::collection::vec(inner.clone(), 0..4).prop_map(Value::from),
            prop::collection::btree_map("[a-z_]{1,6}", inner, 0..4)
                .prop_map(|map| Value::Object(map.into_iter().collect::<Map<_, _>>())),
        ]
    })
}

proptest! {
    #[test]
    fn what_is_written_reads_back(members in prop::collection::btree_map("x[a-z_]{0,8}", value(), 0..5)) {
        let members: Map<String, Value> = members.into_iter().collect();
        let bytes = encode(PLACE, &stamp(1), "note", &members).unwrap();
        let read = parse(&bytes).unwrap();
        prop_assert_eq!(read.members, members);
        prop_assert_eq!(read.stamp, Some(stamp(1)));
        prop_assert_eq!(encode(PLACE, &stamp(1), "note", &parse(&bytes).unwrap().members).unwrap(), bytes);
    }

    #[test]
    fn no_bytes_make_the_verifier_panic_or_pass(bytes in prop::collection::vec(any::<u8>(), 0..400)) {
        use stumpside::record::{Options, Trust, Verdict, verify};
        let report = verify(&bytes, &Trust::Roster, &Options::default());
        prop_assert_eq!(report.verdict, Verdict::Fail);
    }
}
