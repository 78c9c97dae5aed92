//! The record and the keys against stock tools: ssh-keygen and sha256sum, both ways.
//! `tests/all.sh` installs them; where they are missing these tests fail and say so.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]
#![expect(
    clippy::disallowed_methods,
    reason = "a test calls stock tools on files of its own"
)]

use std::io::Write;
use std::path::Path;
use std::process::{Command, Output, Stdio};

use ed25519_dalek::Signer as _;
use stumpside::record::NAMESPACE;
use stumpside::record::line::{self, hex};
use stumpside::record::public_key::PublicKey;
use stumpside::record::signature::{Blob, Touch, message, touched_message};
use stumpside::record::signers::{self, Signer};
use stumpside::shell::key_store::{self, KeyError, KeyStore, NewKey};

use crate::record_desk::{key, office_list, public, whole_day};

fn tool(name: &str, args: &[&str], input: &[u8]) -> Output {
    let mut child = Command::new(name)
        .args(args)
        .env("TZ", "UTC")
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap_or_else(|error| panic!("{name} is needed, tests/all.sh installs it: {error}"));
    child.stdin.take().unwrap().write_all(input).unwrap();
    child.wait_with_output().unwrap()
}

fn stock_accepts(dir: &Path, who: &str, (line, armoured): (&[u8], &str)) -> bool {
    let sig = dir.join("entry.sig");
    std::fs::write(&sig, armoured).unwrap();
    let list = dir.join("allowed_signers");
    let args = [
        "-Y",
        "verify",
        "-f",
        list.to_str().unwrap(),
        "-I",
        who,
        "-n",
        NAMESPACE,
        "-O",
        "verify-time=20261114120000Z",
        "-s",
        sig.to_str().unwrap(),
    ];
    tool("ssh-keygen", &args, line).status.success()
}

#[test]
fn the_stock_verifier_accepts_every_signature_of_a_day() {
    let dir = tempfile::tempdir().unwrap();
    std::fs::write(
        dir.path().join("allowed_signers"),
        signers::write(&office_list()),
    )
    .unwrap();
    let whole = whole_day().bytes;
    let lines: Vec<&[u8]> = whole.split_inclusive(|b| *b == b'\n').collect();
    let mut checked = 0;
    for pair in lines.windows(2) {
        let Some(sig) = line::parse(pair[1]).unwrap().sig else {
            continue;
        };
        let blob = Blob::read(&sig.sig).unwrap();
        assert!(stock_accepts(
            dir.path(),
            &sig.who,
            (pair[0], &blob.armoured())
        ));
        let other = if sig.who == "odile" {
            "tamsin"
        } else {
            "odile"
        };
        assert!(!stock_accepts(
            dir.path(),
            other,
            (pair[0], &blob.armoured())
        ));
        assert!(!stock_accepts(
            dir.path(),
            &sig.who,
            (pair[1], &blob.armoured())
        ));
        checked += 1;
    }
    assert_eq!(checked, 9);
}

#[test]
fn the_page_of_the_format_checks_a_record_by_hand() {
    let page = include_str!("../../src/record/FORMAT.md");
    let blocks: Vec<&str> = page.split("```\n").skip(1).step_by(2).collect();
    let dir = tempfile::tempdir().unwrap();
    std::fs::write(
        dir.path().join("allowed_signers"),
        signers::write(&office_list()),
    )
    .unwrap();
    std::fs::write(dir.path().join("record.jsonl"), whole_day().bytes).unwrap();
    let by_hand = |block: &str| {
        let script = format!("cd '{}' && {block}", dir.path().display());
        let done = tool("bash", &["-c", &script], b"");
        (
            done.status.success(),
            String::from_utf8(done.stdout).unwrap(),
        )
    };
    let (_, chain) = by_hand(blocks[0]);
    let hash = chain.split_whitespace().next().unwrap();
    assert!(chain.contains(&format!("\"prev\":\"{hash}\"")), "{chain}");
    assert!(by_hand(blocks[1]).0);
    let changed = String::from_utf8(whole_day().bytes)
        .unwrap()
        .replace("sawyer", "Sawyer");
    std::fs::write(dir.path().join("record.jsonl"), changed).unwrap();
    assert!(!by_hand(blocks[1]).0);
}

#[test]
fn sha256sum_gives_the_prev_of_every_next_line() {
    let whole = whole_day().bytes;
    let lines: Vec<&[u8]> = whole.split_inclusive(|b| *b == b'\n').collect();
    for pair in lines.windows(2) {
        let told = String::from_utf8(tool("sha256sum", &[], pair[0]).stdout).unwrap();
        let prev = hex(&line::parse(pair[1]).unwrap().prev);
        assert_eq!(told.split_whitespace().next(), Some(prev.as_str()));
    }
}

#[test]
fn a_security_keys_signature_is_accepted_by_both() {
    let dir = tempfile::tempdir().unwrap();
    let point = *key(5).verifying_key().as_bytes();
    let public = PublicKey::security_key(point, "ssh:", "tamsin");
    let id = "tamsin".to_owned();
    let signer = Signer {
        id,
        key: public.clone(),
        valid_after_ms: None,
        valid_before_ms: None,
    };
    std::fs::write(
        dir.path().join("allowed_signers"),
        signers::write(&[signer]),
    )
    .unwrap();
    let line = b"an entry\n";
    let signed = |touch: Touch| {
        let raw = key(5)
            .sign(&touched_message("ssh:", touch, &message(line)))
            .to_bytes();
        Blob::touched(public.clone(), raw, touch)
    };
    let blob = signed(Touch {
        flags: 1,
        counter: 77,
    });
    let read = Blob::read(&blob.base64()).unwrap();
    assert_eq!((read.bytes(), read.check(line)), (blob.bytes(), Ok(())));
    assert_eq!(blob.check(line), Ok(()));
    assert!(stock_accepts(
        dir.path(),
        "tamsin",
        (line, &blob.armoured())
    ));
    assert!(blob.check(b"another\n").is_err());
    assert!(
        signed(Touch {
            flags: 0,
            counter: 78
        })
        .check(line)
        .is_err(),
        "it must be touched"
    );
}

#[test]
fn a_signature_made_by_the_stock_tool_is_the_very_same() {
    let dir = tempfile::tempdir().unwrap();
    let path = dir.path().join("rui");
    let path_text = path.to_str().unwrap();
    let made = tool(
        "ssh-keygen",
        &[
            "-q",
            "-t",
            "ed25519",
            "-N",
            "five words",
            "-C",
            "rui",
            "-f",
            path_text,
        ],
        b"",
    );
    assert!(made.status.success());
    let mut keys = KeyStore::default();
    assert!(matches!(
        keys.unlock("rui", &path, None),
        Err(KeyError::PassphraseNeeded(_))
    ));
    assert!(matches!(
        keys.unlock("rui", &path, Some("six words")),
        Err(KeyError::WrongPassphrase(_))
    ));
    assert!(matches!(keys.sign("rui", b"x"), Err(KeyError::Locked(_))));
    let public = keys.unlock("rui", &path, Some("five words")).unwrap();
    assert_eq!(
        public,
        key_store::read_public(&dir.path().join("rui.pub")).unwrap()
    );
    let line = b"{\"v\":1}\n";
    let ours = Blob::read(&keys.sign("rui", line).unwrap()).unwrap();
    let open = dir.path().join("open");
    std::fs::copy(&path, &open).unwrap();
    let opened = tool(
        "ssh-keygen",
        &[
            "-q",
            "-p",
            "-P",
            "five words",
            "-N",
            "",
            "-f",
            open.to_str().unwrap(),
        ],
        b"",
    );
    assert!(opened.status.success(), "{opened:?}");
    let signed = tool(
        "ssh-keygen",
        &["-Y", "sign", "-n", NAMESPACE, "-f", open.to_str().unwrap()],
        line,
    );
    assert_eq!(String::from_utf8(signed.stdout).unwrap(), ours.armoured());
    keys.lock("rui");
    assert!(!keys.is_unlocked("rui"));
}

#[test]
fn the_stock_tool_opens_the_keys_we_make() {
    let dir = tempfile::tempdir().unwrap();
    let new = NewKey {
        id: "rui",
        comment: "rui Rui",
        passphrase: Some("five words"),
    };
    let made = key_store::make(dir.path(), new).unwrap();
    let path = dir.path().join("keys/rui");
    let shown = tool(
        "ssh-keygen",
        &["-y", "-P", "five words", "-f", path.to_str().unwrap()],
        b"",
    );
    let shown = PublicKey::read(&String::from_utf8(shown.stdout).unwrap()).unwrap();
    assert_eq!(shown.blob(), made.blob());
    let wrong = tool(
        "ssh-keygen",
        &["-y", "-P", "six words", "-f", path.to_str().unwrap()],
        b"",
    );
    assert!(!wrong.status.success());
    let print = tool(
        "ssh-keygen",
        &[
            "-l",
            "-f",
            dir.path().join("keys/rui.pub").to_str().unwrap(),
        ],
        b"",
    );
    assert!(
        String::from_utf8(print.stdout)
            .unwrap()
            .contains(&made.fingerprint())
    );
}

#[test]
fn blobs_the_stock_tool_lets_pass_are_refused_here() {
    use base64::Engine as _;
    use base64::engine::general_purpose::STANDARD;
    let line = b"an entry\n";
    let raw = key(1).sign(&message(line)).to_bytes();
    let blob = Blob::plain(public(1, ""), raw);
    assert_eq!(Blob::read(&blob.base64()).unwrap().check(line), Ok(()));
    let bytes = blob.bytes();
    let mut version = bytes.clone();
    version[9] = 0;
    let trailing = [bytes.as_slice(), b"x"].concat();
    let reserved_at = bytes
        .windows(10)
        .position(|w| w == b"\0\0\0\0\0\0\0\x06sh")
        .unwrap();
    let reserved = [
        &bytes[..reserved_at],
        b"\0\0\0\x01x",
        &bytes[reserved_at + 4..],
    ]
    .concat();
    for (what, changed) in [
        ("version", version),
        ("trailing", trailing),
        ("reserved", reserved),
    ] {
        assert!(Blob::read(&STANDARD.encode(changed)).is_err(), "{what}");
    }
    let mut larger = raw;
    add_group_order(&mut larger[32..]);
    let malleable = Blob::plain(public(1, ""), larger);
    assert!(
        Blob::read(&malleable.base64())
            .unwrap()
            .check(line)
            .is_err(),
        "S + L is refused"
    );
}

/// Adds the order of the group, little-endian: the other number that satisfies a lax verifier.
fn add_group_order(s: &mut [u8]) {
    const ORDER: [u8; 32] = [
        0xed, 0xd3, 0xf5, 0x5c, 0x1a, 0x63, 0x12, 0x58, 0xd6, 0x9c, 0xf7, 0xa2, 0xde, 0xf9, 0xde,
        0x14, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0x10,
    ];
    let mut carry = 0_u16;
    for (digit, more) in s.iter_mut().zip(ORDER) {
        let sum = u16::from(*digit) + u16::from(more) + carry;
        *digit = sum as u8;
        carry = sum >> 8;
    }
}
