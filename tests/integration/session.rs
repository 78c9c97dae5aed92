//! The day's work: whole days pressed key by key, and properties over random keys.

use proptest::prelude::*;
use stumpside::briefing::{Form, Kind};
use stumpside::parts::What;
use stumpside::record::line::{self, Boot, Place};
use stumpside::record::{Stamp as FullStamp, facts};
use stumpside::session::{Answer, Fact, Recorded, Session, Stage, TreeEnd, replay};
use stumpside::tui::Key;

use crate::support::{Bench, card, demo_job, tries};

/// Answers every question with its first answer until the day is closed.
fn whole_day(bench: &mut Bench) {
    for _ in 0..400 {
        if bench.session.stage == Stage::Closed {
            return;
        }
        if bench.session.stage == Stage::Choose && bench.session.ends.len() == 3 {
            bench.keys("1\n1\n");
        } else {
            bench.answer(if bench.session.stretch.is_some() {
                1
            } else {
                0
            });
        }
    }
    panic!("the day does not end: {:?}", bench.session.stage);
}

#[test]
fn a_whole_day_of_three_trees_is_closed() {
    let mut bench = Bench::new();
    whole_day(&mut bench);
    assert_eq!(bench.session.ends.len(), 3);
    let closes = bench
        .facts
        .iter()
        .filter(|r| answer_kind(r) == Some(Kind::Close))
        .count();
    assert_eq!(closes, 1);
}

fn answer_of(recorded: &Recorded) -> Option<&Answer> {
    match &recorded.fact {
        Fact::Answer(answer) => Some(answer),
        _ => None,
    }
}

fn answer_kind(recorded: &Recorded) -> Option<Kind> {
    answer_of(recorded).map(|a| a.kind)
}

/// Each fact written as a line of the record and read back.
fn through_the_record(recorded: &[Recorded]) -> Vec<Recorded> {
    recorded
        .iter()
        .map(|r| {
            let draft = facts::draft(&r.fact, "en");
            let mut members = draft.members;
            if let Some(signer) = draft.signer {
                members.insert("signer".to_owned(), signer.into());
            }
            let stamp = FullStamp {
                utc_ms: r.stamp.utc_ms,
                off_min: 60,
                up_ms: r.stamp.up_ms,
                boot: Boot([1; 4]),
            };
            let place = Place {
                seq: r.seq,
                prev: [7; 32],
            };
            let bytes = line::encode(place, &stamp, &draft.kind, &members).unwrap();
            facts::fact(&line::parse(&bytes).unwrap()).unwrap()
        })
        .collect()
}

/// Checks over the facts alone, without the session's own bookkeeping: before every start of a
/// committing cut, every hold item and both goes were answered for that tree after the last stop,
/// restart or change.
fn hold_line_was_held(facts: &[Recorded]) {
    let expected = [
        "count",
        "out",
        "way-out",
        "wind",
        "call-leader",
        "call-sawyer",
        "go-leader",
        "go-sawyer",
    ];
    for (at, recorded) in facts.iter().enumerate() {
        let Fact::StretchStart { tree, .. } = &recorded.fact else {
            continue;
        };
        let voids = |r: &Recorded| match &r.fact {
            Fact::Stop { .. } | Fact::Resumed | Fact::TalkAgain { .. } | Fact::Reopened => true,
            Fact::SizedUp { changes, .. } => !changes.is_empty(),
            _ => false,
        };
        let since = facts[..at].iter().rposition(voids).map_or(0, |i| i + 1);
        for item in expected {
            let answered = facts[since..at].iter().any(|r| match &r.fact {
                Fact::Answer(a) => {
                    a.item == item
                        && a.tree.as_deref() == Some(tree)
                        && a.stage == Stage::HoldLine
                        && a.holds.is_none()
                }
                Fact::LookRevealed {
                    item: i,
                    tree: t,
                    equal,
                    stage,
                    second,
                    ..
                } => {
                    i == item
                        && t == tree
                        && *equal
                        && second.value == 1
                        && *stage == Stage::HoldLine
                }
                _ => false,
            });
            assert!(
                answered,
                "the cut began without `{item}` after the last change"
            );
        }
    }
}

fn same(a: &Session, b: &Session) {
    assert_eq!(a.stage, b.stage);
    assert_eq!(a.done, b.done);
    assert_eq!(a, b);
}

#[derive(Debug, Clone)]
enum Move {
    Answer(usize),
    Key(Key),
}

fn moves() -> impl Strategy<Value = Vec<Move>> {
    let key = prop_oneof![
        8 => (b'0'..=b'9').prop_map(|d| Key::Char(char::from(d))),
        4 => Just(Key::Enter),
        1 => Just(Key::Char(' ')),
        3 => prop::sample::select(vec!['u', 'm', 'h', 'v', 'd', 'o', 'w', 'q', '?', 'x']).prop_map(Key::Char),
        2 => prop::sample::select(vec![Key::Esc, Key::Tab, Key::Backspace, Key::Up, Key::Down]),
        1 => Just(Key::Interrupt),
    ];
    let one = prop_oneof![
        // Mostly the way on, so that random days get as far as the cuts.
        30 => Just(Move::Answer(0)),
        3 => (0_usize..9).prop_map(Move::Answer),
        3 => key.prop_map(Move::Key),
    ];
    prop::collection::vec(one, 1..220)
}

proptest! {
    #![proptest_config(ProptestConfig { cases: tries("STUMPSIDE_SEQUENCES", 300), ..ProptestConfig::default() })]

    #[test]
    fn random_keys_keep_live_and_replayed_state_equal_and_the_hold_line_held(moves in moves()) {
        let mut bench = Bench::new();
        for a_move in moves {
            match a_move {
                Move::Answer(variant) => bench.answer(variant),
                Move::Key(key) => bench.press(key),
            }
        }
        hold_line_was_held(&bench.facts);
        same(&bench.session, &replay(demo_job(), &through_the_record(&bench.facts)));
    }
}

#[test]
fn no_single_key_however_often_confirms_anything() {
    let mut bench = Bench::new();
    let mut probes = vec![];
    for c in ('0'..='9').chain(['u', 'm', 'h', 'v', 'd', 'o', 'w', 'q', 's', 'y', '?']) {
        probes.push(Key::Char(c));
    }
    probes.extend([
        Key::Enter,
        Key::Tab,
        Key::Esc,
        Key::Backspace,
        Key::Up,
        Key::Down,
    ]);
    // At every step of a whole day each key is tried a thousand times from the place it stands.
    for _ in 0..60 {
        for key in &probes {
            let mut probe = bench.clone();
            for _ in 0..200 {
                probe.press(key.clone());
            }
            let stretch = bench.session.stretch.is_some();
            let confirmed = probe.facts[bench.facts.len()..].iter().any(|r| {
                matches!(
                    r.fact,
                    Fact::Answer(_)
                        | Fact::LookHeld { .. }
                        | Fact::LookRevealed { .. }
                        | Fact::StretchStart { .. }
                )
            });
            assert!(
                !confirmed || stretch,
                "{key:?} alone confirmed something in {:?}",
                bench.session.stage
            );
        }
        bench.answer(0);
    }
}

#[test]
fn a_wrong_number_changes_nothing_and_is_counted() {
    let mut bench = Bench::new();
    let before = bench.session.clone();
    bench.keys("1\n2\n");
    same(&before, &bench.session);
    assert_eq!(bench.desk.refused, 1);
}

#[test]
fn a_stop_keeps_the_place_and_asks_the_hold_line_again() {
    let mut bench = Bench::new();
    while bench.session.stage != Stage::HoldLine {
        bench.answer(0);
    }
    for _ in 0..5 {
        bench.answer(0);
    }
    let lit = bench.session.lit().unwrap().id;
    assert_ne!(lit, "count");
    bench.keys(" ");
    assert_eq!(bench.session.stage, Stage::Stopped);
    while bench.session.stage == Stage::Stopped {
        bench.answer(0);
    }
    assert_eq!(bench.session.stage, Stage::HoldLine);
    assert_eq!(bench.session.lit().unwrap().id, "count");
}

#[test]
fn an_answer_that_something_changed_makes_everyone_sign_again() {
    let mut bench = Bench::new();
    while bench.session.stage != Stage::Cuts {
        bench.answer(0);
    }
    bench.answer(0);
    bench.keys(" ");
    bench.answer(0);
    bench.answer(0);
    bench.keys("2\n3\n");
    bench.answer(0);
    bench.answer(0);
    assert_eq!(bench.session.stage, Stage::TalkAgain);
    for _ in 0..3 {
        bench.answer(0);
    }
    assert_eq!(bench.session.stage, Stage::Cuts);
    assert_eq!(bench.session.lit().unwrap().id, "step.face-floor");
}

#[test]
fn in_the_stretch_only_the_tree_and_stop_count() {
    let mut bench = Bench::new();
    while bench.session.stretch.is_none() {
        bench.answer(0);
    }
    let facts = bench.facts.len();
    bench.keys("1\n2\nu m?qhv\t");
    assert!(bench.session.stretch.is_some());
    let stops = bench.facts[facts..]
        .iter()
        .filter(|r| matches!(r.fact, Fact::StretchStopCalled { .. }))
        .count();
    assert_eq!((stops, bench.facts.len() - facts), (1, 1));
    bench.keys("d");
    assert_eq!(bench.session.stage, Stage::AllClear);
}

#[test]
fn a_blind_look_is_held_as_a_commitment_and_unequal_answers_hold() {
    let mut bench = Bench::new();
    while bench.session.lit().unwrap().id != "lean" {
        bench.answer(0);
    }
    bench.keys("2\n7\n");
    let Some(Fact::LookHeld { commitment, .. }) = bench.facts.last().map(|r| r.fact.clone()) else {
        panic!("the first answer is held");
    };
    assert_eq!(commitment.len(), 64);
    bench.keys("9\n7\n");
    let Some(Fact::LookRevealed {
        equal,
        first,
        second,
        ..
    }) = bench.facts.last().map(|r| r.fact.clone())
    else {
        panic!("the second answer reveals both");
    };
    assert!(!equal);
    assert_eq!((first.value, second.value), (2_000, 9_000));
    assert_eq!(bench.session.lit().unwrap().id, "lean");
}

#[test]
fn more_heads_inside_than_the_sawyers_keep_the_hold_line_shut() {
    let mut bench = Bench::new();
    while bench.session.stage != Stage::HoldLine {
        bench.answer(0);
    }
    bench.keys("3\n1\n3\n1\n");
    assert_eq!(bench.session.lit().unwrap().id, "count");
    bench.keys("1\n1\n1\n1\n");
    assert_eq!(bench.session.lit().unwrap().id, "out");
}

#[test]
fn a_measured_answer_taken_back_is_sized_up_again() {
    let mut bench = Bench::new();
    while bench.session.lit().unwrap().id != "step.face-floor" {
        bench.answer(0);
    }
    let sized = |bench: &Bench| {
        bench
            .facts
            .iter()
            .filter(|r| matches!(r.fact, Fact::SizedUp { .. }))
            .count()
    };
    let before = sized(&bench);
    bench.keys("u");
    assert_eq!(bench.session.lit().unwrap().id, "step.face-slope");
    assert_eq!(sized(&bench), before + 1);
}

#[test]
fn a_tree_whose_sawyer_is_absent_is_not_begun() {
    let mut bench = Bench::new();
    bench.answer(0);
    bench.keys("2\n2\n");
    while bench.session.stage != Stage::Choose {
        bench.answer(0);
    }
    bench.keys("1\n1\n");
    assert_eq!(bench.session.stage, Stage::Choose);
    assert!(
        bench
            .session
            .kept_open
            .as_ref()
            .unwrap()
            .1
            .contains("Tamsin Okoro is not here")
    );
}

#[test]
fn after_a_restart_the_hold_line_is_asked_again() {
    let mut bench = Bench::new();
    while bench.session.lit().unwrap().id != "step.back-cut" {
        bench.answer(0);
    }
    assert!(bench.session.hold_line_passed());
    bench.reopen();
    assert_eq!(bench.session.stage, Stage::HoldLine);
    assert_eq!(bench.session.lit().unwrap().id, "count");
    while bench.session.stretch.is_none() {
        bench.answer(0);
    }
    bench.reopen();
    assert!(
        bench.session.stretch.is_some(),
        "only the tree ends a stretch"
    );
}

#[test]
fn a_tree_refused_at_work_is_left_never_cut_and_never_down() {
    let mut bench = Bench::new();
    while bench.session.lit().unwrap().id != "step.face-floor" {
        bench.answer(0);
    }
    let mut card = bench.session.cards["T1"].clone();
    card.method = None;
    card.rungs.clear();
    card.refused = vec!["the stem is hollow".to_owned()];
    bench.size_up_as("T1", card);
    while bench.session.stage == Stage::TalkAgain {
        bench.answer(0);
    }
    assert_eq!(bench.session.stage, Stage::Cuts);
    let item = bench.session.lit().unwrap();
    assert!(item.id.starts_with("held-back") && item.call.contains("the stem is hollow"));
    bench.answer(0);
    assert_eq!(bench.session.ends["T1"], TreeEnd::LeftStanding);
    // What waits for it is kept back.
    let choices = match bench.session.lit().unwrap().form {
        Form::Choose(options) => options,
        other => panic!("{other:?}"),
    };
    let second = choices
        .iter()
        .find(|o| o.stands_for.as_deref() == Some("T2"))
        .unwrap();
    assert_eq!(second.holds.as_deref(), Some("T1 was left standing."));
}

#[test]
fn a_lodged_tree_is_not_down_for_the_next() {
    let mut bench = Bench::new();
    while bench.session.lit().is_none_or(|i| i.id != "outcome") {
        bench.answer(if bench.session.stretch.is_some() {
            1
        } else {
            0
        });
    }
    bench.keys("3\n2\n");
    while bench.session.stage == Stage::AllClear {
        bench.answer(0);
    }
    assert_eq!(
        bench.session.ends["T1"],
        TreeEnd::Standing("lodged".to_owned())
    );
    let Form::Choose(options) = bench.session.lit().unwrap().form else {
        panic!("a choice")
    };
    let second = options
        .iter()
        .find(|o| o.stands_for.as_deref() == Some("T2"))
        .unwrap();
    assert_eq!(second.holds.as_deref(), Some("T1 is not down: lodged."));
}

#[test]
fn a_method_changed_at_the_hold_line_moves_the_line_to_its_own_committing_cut() {
    let mut bench = Bench::new();
    while bench.session.stage != Stage::HoldLine {
        bench.answer(0);
    }
    bench.size_up_as("T1", card("plunge-with-strap"));
    while bench.session.stage == Stage::TalkAgain {
        bench.answer(0);
    }
    assert_eq!(bench.session.stage, Stage::Cuts);
    while bench.session.stage == Stage::Cuts {
        assert_ne!(bench.session.lit().unwrap().id, "step.strap-release");
        bench.answer(0);
    }
    assert_eq!(bench.session.stage, Stage::HoldLine);
}

#[test]
fn not_now_is_no_go_and_is_not_signed() {
    let mut bench = Bench::new();
    while bench.session.lit().unwrap().id != "go-leader" {
        bench.answer(0);
    }
    bench.keys("2\n7\n");
    let last = bench
        .facts
        .last()
        .map(|r| answer_of(r).unwrap().clone())
        .unwrap();
    assert_eq!(
        (last.kind, last.sentence, last.signer),
        (Kind::HoldItem, None, None)
    );
    assert_eq!(bench.session.lit().unwrap().id, "go-leader");
}

#[test]
fn a_stop_before_the_roll_call_does_not_lock_the_day() {
    let mut bench = Bench::new();
    bench.keys(" ");
    bench.answer(0);
    bench.answer(0);
    bench.keys("3\n3\n");
    bench.answer(2);
    bench.answer(0);
    assert_eq!(bench.session.stage, Stage::RollCall);
    assert!(bench.session.lit().is_some());
}

#[test]
fn both_ends_of_a_hinge_reach_the_size_up() {
    let plan = crate::support::demo_plan();
    let parts = stumpside::parts::Parts::built_in();
    let of = |hinges: &[i64]| {
        let measured: Vec<_> = hinges.iter().map(|um| (What::Hinge, *um)).collect();
        stumpside::briefing::size_up(&plan, "T3", (&measured, &parts))
    };
    let (thin, thick) = (of(&[54_000, 54_000]), of(&[60_000, 60_000]));
    assert_eq!(
        of(&[54_000, 60_000]).worst_ppm,
        thick.worst_ppm.min(thin.worst_ppm)
    );
}
