//! The stretch: a clock counting up and nothing else. Nothing is asked, opened or moved.

use super::View;
use super::header::cut;
use super::paper::Paper;
use crate::briefing::Rung;
use crate::session::{Session, Stretch};
use crate::tui::words;

/// Draws it.
pub(super) fn draw(view: &View<'_>, stretch: &Stretch, paper: &mut Paper<'_>) {
    let (width, height) = paper.size();
    let session = view.session;
    let since = if view.now.boot == stretch.start.boot {
        view.now.up_ms - stretch.start.up_ms
    } else {
        view.now.utc_ms - stretch.start.utc_ms
    };
    let seconds = (since.max(0) / 1_000).min(9_999);
    let bar = "#".repeat(usize::from(width));
    paper.text(0, 0, &bar);
    paper.text(0, height - 2, &bar);
    let rung = session.card().and_then(|card| {
        card.rungs
            .iter()
            .find(|r| format!("step.{}", r.id) == stretch.item)
            .cloned()
    });
    let title = match rung.as_ref().map(|r| (r.word.as_str(), r.timing.as_str())) {
        Some(("strap-release", _)) => "RELEASE THE STRAP",
        Some(("wedge-over", _)) => "WEDGE IT OVER",
        Some((_, "brisk")) => "FINISH THE CUT",
        Some(_) | None => "BACK CUT TO THE HINGE",
    };
    let top = if height < 18 { 1 } else { 2 };
    centred(paper, top, title);
    for (row, line) in (top + 1 + u16::from(height >= 18)..).zip(digits(seconds)) {
        centred(paper, row, &line);
    }
    let below = top + if height >= 18 { 8 } else { 6 };
    centred(paper, below, "seconds gone");
    if height >= 18 {
        centred(paper, below + 1, &planned(session, rung.as_ref()));
        centred(paper, 12, "NO CALLS TO THE SAWYER. EYES ON THE TOP.");
        centred(
            paper,
            14,
            "STOP called here means what you agreed at the briefing:",
        );
        centred(paper, 15, &session.job.stop_means);
    }
    let stops = match stretch.stops {
        0 => String::new(),
        n => format!("STOP called, recorded ({n})"),
    };
    centred(paper, height - 3, &stops);
    paper.text(
        1,
        height - 1,
        "SPACE = STOP called   d = it is down   o = on the stump yet, sat back",
    );
}

/// The plan in words: a number to look at before, never a bar or a countdown.
fn planned(session: &Session, rung: Option<&Rung>) -> String {
    let seconds = |ms: i64| words::rounded(ms, 1_000);
    let figure = |name: &str| {
        session
            .card()
            .and_then(|c| c.figure(name))
            .map(|f| f.band.map(seconds))
    };
    let brisk = rung.is_some_and(|r| r.timing == "brisk" && r.word != "strap-release");
    match (
        brisk,
        figure("seconds_to_commit"),
        figure("seconds_at_rate"),
        rung.and_then(|r| r.planned_ms),
    ) {
        (true, Some([low, best, high]), Some([_, _, most]), _) => {
            format!(
                "Plan: it starts to go at about {best} s ({low} to {high}), the hinge within {most} s more"
            )
        }
        (_, _, _, Some(ms)) => format!("Plan: about {} s", seconds(ms)),
        (_, _, _, None) => String::new(),
    }
}

fn centred(paper: &mut Paper<'_>, row: u16, words: &str) {
    let (width, _) = paper.size();
    let words = cut(words, usize::from(width));
    let at = (usize::from(width) - words.chars().count()) / 2;
    paper.bold(u16::try_from(at).unwrap_or(0), row, &words);
}

/// A number in digits five rows high.
fn digits(number: i64) -> [String; 5] {
    let mut rows: [String; 5] = Default::default();
    for digit in number.to_string().chars() {
        let pattern = pattern(digit);
        for (row, bits) in rows.iter_mut().zip(pattern) {
            row.push_str(bits);
            row.push_str("  ");
        }
    }
    rows
}

const fn pattern(digit: char) -> [&'static str; 5] {
    match digit {
        '1' => ["  #  ", " ##  ", "  #  ", "  #  ", " ### "],
        '2' => ["#####", "    #", "#####", "#    ", "#####"],
        '3' => ["#####", "    #", " ####", "    #", "#####"],
        '4' => ["#   #", "#   #", "#####", "    #", "    #"],
        '5' => ["#####", "#    ", "#####", "    #", "#####"],
        '6' => ["#####", "#    ", "#####", "#   #", "#####"],
        '7' => ["#####", "    #", "   # ", "  #  ", "  #  "],
        '8' => ["#####", "#   #", "#####", "#   #", "#####"],
        '9' => ["#####", "#   #", "#####", "    #", "#####"],
        _ => ["#####", "#   #", "#   #", "#   #", "#####"],
    }
}
