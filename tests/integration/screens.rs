//! The main screens as text, compared with the pictures kept under `tests/screens`; and what must
//! hold on every screen.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::style::{Color, Modifier};
use stumpside::session::{Stage, Stamp};
use stumpside::tui::{Ground, Key, Letters, Look, View, draw};

use crate::support::Bench;

const SIZES: [(u16, u16); 3] = [(80, 24), (120, 40), (40, 12)];

fn paint(bench: &Bench, (width, height): (u16, u16), look: Look) -> Buffer {
    let area = Rect::new(0, 0, width, height);
    let mut buffer = Buffer::empty(area);
    let now = Stamp {
        utc_ms: 1_700_000_100_000,
        up_ms: 100_000,
        boot: [1; 4],
    };
    let view = View {
        session: &bench.session,
        desk: &bench.desk,
        now: &now,
        offset_min: 60,
        look,
        code: "7Q2M-K0VX-3B9D-HSF8",
        demo: true,
    };
    draw(&view, area, &mut buffer);
    buffer
}

fn text(buffer: &Buffer) -> String {
    let width = usize::from(buffer.area.width);
    let line = |cells: &[ratatui::buffer::Cell]| {
        let line: String = cells.iter().map(ratatui::buffer::Cell::symbol).collect();
        line.trim_end().to_owned()
    };
    buffer
        .content
        .chunks(width)
        .map(line)
        .collect::<Vec<_>>()
        .join("\n")
}

const SUN: Look = Look {
    ground: Ground::Sun,
    letters: Letters::Full,
};
const PLAIN_ASCII: Look = Look {
    ground: Ground::Plain,
    letters: Letters::Ascii,
};

/// The day at its main moments, by name.
fn moments() -> Vec<(&'static str, Bench)> {
    let mut all = vec![];
    let mut bench = Bench::real();
    let until = |bench: &mut Bench, wanted: &dyn Fn(&Bench) -> bool| {
        for _ in 0..200 {
            if wanted(bench) {
                return;
            }
            bench.answer(if bench.session.stretch.is_some() {
                1
            } else {
                0
            });
        }
        panic!("the moment never comes: {:?}", bench.session.stage);
    };
    let lit = |bench: &Bench| bench.session.lit().map_or(String::new(), |i| i.id);
    all.push(("01-roll-call", bench.clone()));
    until(&mut bench, &|b| b.session.stage == Stage::OwnHazards);
    all.push(("02-own-hazards", bench.clone()));
    let mut writing = bench.clone();
    writing.keys("wdead limb over B");
    all.push(("03-writing", writing));
    until(&mut bench, &|b| b.session.stage == Stage::Questions);
    all.push(("04-questions", bench.clone()));
    until(&mut bench, &|b| b.session.stage == Stage::Signing);
    all.push(("05-signing", bench.clone()));
    until(&mut bench, &|b| b.session.stage == Stage::Choose);
    all.push(("06-next-tree", bench.clone()));
    until(&mut bench, &|b| b.session.stage == Stage::ShortTalk);
    all.push(("07-short-talk", bench.clone()));
    until(&mut bench, &|b| b.session.stage == Stage::WalkUp);
    all.push(("08-walk-up", bench.clone()));
    until(&mut bench, &|b| lit(b) == "lean");
    bench.keys("2\n7\n");
    all.push(("09-second-look-held", bench.clone()));
    bench.keys("2\n7\n");
    until(&mut bench, &|b| b.session.stage == Stage::Cuts);
    all.push(("10-cuts-waits-for-the-saw", bench.clone()));
    until(&mut bench, &|b| {
        b.session.tree.as_deref() == Some("T2") && b.session.stage == Stage::Cuts
    });
    all.push(("11-cuts-brisk", bench.clone()));
    until(&mut bench, &|b| b.session.stretch.is_some());
    all.push(("12-stretch-brisk", bench.clone()));
    until(&mut bench, &|b| {
        b.session.tree.as_deref() == Some("T3") && lit(b) == "step.plunge"
    });
    all.push(("13-cuts-plunge", bench.clone()));
    let mut stopped = bench.clone();
    stopped.keys(" ");
    stopped.answer(0);
    all.push(("14-stopped", stopped.clone()));
    stopped.answer(0);
    stopped.keys("2\n3\n");
    stopped.answer(0);
    stopped.answer(0);
    all.push(("15-talk-again", stopped));
    until(&mut bench, &|b| b.session.stage == Stage::HoldLine);
    all.push(("16-hold-line", bench.clone()));
    until(&mut bench, &|b| lit(b) == "go-leader");
    all.push(("17-hold-line-gauge", bench.clone()));
    until(&mut bench, &|b| b.session.stretch.is_some());
    all.push(("18-stretch-release", bench.clone()));
    until(&mut bench, &|b| b.session.stage == Stage::AllClear);
    all.push(("19-all-clear", bench.clone()));
    let mut help = bench.clone();
    help.press(Key::Char('?'));
    all.push(("20-help", help));
    until(&mut bench, &|b| {
        b.session.stage == Stage::Closing || b.session.stage == Stage::Choose
    });
    bench.keys("1\n1\n");
    all.push(("21-closing", bench.clone()));
    until(&mut bench, &|b| b.session.stage == Stage::Closed);
    all.push(("22-closed", bench));
    all
}

#[test]
fn the_main_screens_are_as_kept() {
    let mut settings = insta::Settings::clone_current();
    settings.set_snapshot_path("../screens");
    settings.set_prepend_module_to_snapshot(false);
    settings.set_omit_expression(true);
    settings.bind(|| {
        for (name, bench) in moments() {
            for (width, height) in SIZES {
                let picture = text(&paint(&bench, (width, height), SUN));
                insta::assert_snapshot!(format!("{name}-{width}x{height}"), picture);
            }
            let ascii = text(&paint(&bench, (80, 24), PLAIN_ASCII));
            insta::assert_snapshot!(format!("{name}-ascii"), ascii);
        }
    });
}

#[test]
fn every_screen_keeps_the_manners() {
    let moments = moments();
    let mut seen: std::collections::BTreeMap<String, &str> = std::collections::BTreeMap::new();
    for (name, bench) in &moments {
        let sun = paint(bench, (80, 24), SUN);
        for cell in &sun.content {
            // Both colours are set everywhere: black on white or its reverse; nothing dim, nothing blinks.
            let pair = (cell.fg, cell.bg);
            assert!(
                matches!(
                    pair,
                    (Color::Black, Color::White) | (Color::White, Color::Black)
                ),
                "{name}: {pair:?}"
            );
            assert!(
                !cell
                    .modifier
                    .intersects(Modifier::DIM | Modifier::SLOW_BLINK | Modifier::RAPID_BLINK),
                "{name}"
            );
        }
        let plain = paint(bench, (80, 24), PLAIN_ASCII);
        let words = text(&plain);
        assert!(words.is_ascii(), "{name}");
        let lit = words.lines().filter(|l| l.starts_with("> ")).count();
        let overlay = bench.desk.overlay != stumpside::tui::Overlay::None;
        if !overlay && bench.session.stretch.is_none() && bench.session.stage != Stage::Closed {
            assert_eq!(lit, 1, "{name}: exactly one step is lit\n{words}");
        }
        let lower = words.to_lowercase();
        assert!(
            !lower
                .split(|c: char| !c.is_alphabetic())
                .any(|w| w == "safe"),
            "{name}"
        );
        // Without any colour, two different moments still differ in words.
        if let Some(other) = seen.insert(words, name) {
            panic!("{name} looks like {other}");
        }
    }
}

#[test]
fn the_gauge_is_never_shown_before_both_own_calls() {
    let shown = |bench: &Bench| text(&paint(bench, (120, 40), SUN)).contains("MARGIN");
    for (name, bench) in moments() {
        let both = name.starts_with("17");
        assert_eq!(shown(&bench), both, "{name}");
    }
}

#[test]
fn any_size_draws_without_a_fault() {
    let moments = moments();
    for (_, bench) in &moments {
        for width in (1..=130).step_by(7) {
            for height in (1..=45).step_by(4) {
                let picture = text(&paint(bench, (width, height), SUN));
                assert!(!picture.is_empty() || width < 3, "{width}x{height}");
            }
        }
    }
}
