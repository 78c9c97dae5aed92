//! The figures of the tree, each with its band, and the stump where there is room for it.

use ratatui::layout::Rect;

use super::View;
use super::gauge::state_words;
use super::ladder;
use super::paper::Paper;
use crate::briefing::{Figure, UnitWord};
use crate::plan::DisplayUnits;
use crate::tui::words;

/// The right column of a wide screen.
pub(super) fn draw(view: &View<'_>, paper: &mut Paper<'_>, part: Rect) {
    if view.session.card().is_none() {
        people(view, paper, part);
        return;
    }
    let half = part.height / 2;
    ladder::stump(view, paper, Rect::new(part.x, part.y, part.width, half));
    figures(
        view,
        paper,
        Rect::new(
            part.x,
            part.y + half + 1,
            part.width,
            part.height - half - 1,
        ),
    );
}

/// Everyone present, and the emergency card.
fn people(view: &View<'_>, paper: &mut Paper<'_>, part: Rect) {
    let job = &view.session.job;
    let mut row = part.y;
    paper.bold(part.x, row, "HERE");
    row += 1;
    for id in view.session.people_present() {
        paper.text(part.x, row, job.name_of(&id));
        row += 1;
    }
    row += 1;
    paper.bold(part.x, row, "IF SOMEBODY IS HURT");
    row += 1;
    for line in &job.emergency {
        row += paper.wrapped(Rect::new(part.x, row, part.width, 3), line);
    }
}

/// The card's figures: low, best, high.
pub(super) fn figures(view: &View<'_>, paper: &mut Paper<'_>, part: Rect) {
    let Some(card) = view.session.card() else {
        return;
    };
    let method = card
        .method
        .as_deref()
        .unwrap_or("not with a chainsaw alone");
    paper.bold(part.x, part.y, method);
    let mut row = part.y + 1;
    paper.text(part.x, row, "best (low to high)");
    row += 1;
    for figure in &card.figures {
        if row + 2 >= part.y + part.height {
            break;
        }
        paper.text(part.x, row, &figure_line(figure, view.session.job.units));
        row += 1;
    }
    if view.session.hold_line_passed() || !view.session.stage.at_tree() {
        paper.text(part.x, row, &format!("state: {}", state_words(&card.state)));
    }
}

/// A figure's name as the crew says it.
fn spoken(name: &str) -> &str {
    match name {
        "effective_lean" => "lean by weight",
        "inline_lean" => "  along the lay",
        "side_lean" => "  to the right",
        "moment_inline" => "moment along",
        "commit_ligament" => "goes at",
        "split_ratio_at_commit" => "split over asked",
        "seconds_to_commit" => "cut to going",
        "seconds_at_rate" => "going to hinge",
        "strap_thickness_min" => "strap at least",
        "fall_seconds_min" => "falls in",
        "escape_seconds" => "out by way",
        other => other,
    }
}

fn figure_line(figure: &Figure, units: DisplayUnits) -> String {
    let [low, best, high] = figure.band.map(|value| in_words(value, figure.unit, units));
    let name = spoken(&figure.name);
    let number = |words: &str| words.split(' ').next().unwrap_or("").to_owned();
    if low == high {
        return format!("{name:<16} {best}");
    }
    format!("{name:<16} {best} ({} to {})", number(&low), number(&high))
}

fn in_words(value: i64, unit: UnitWord, units: DisplayUnits) -> String {
    match unit {
        UnitWord::Um if value.abs() >= 2_000_000 => words::distance(value, units),
        UnitWord::Um => words::length(value, units),
        UnitWord::Mdeg => tenths(value, "deg"),
        UnitWord::Ms => tenths(value, "s"),
        UnitWord::G => format!("{} kg", words::rounded(value, 1_000)),
        UnitWord::Mn => format!("{} kN", words::rounded(value, 1_000_000)),
        UnitWord::MnM => format!("{} kNm", words::rounded(value, 1_000_000)),
        UnitWord::Ppm => tenths(words::rounded(value, 1_000), ""),
        UnitWord::MmS => tenths(value, "m/s"),
    }
}

/// Thousandths as a number with one decimal.
fn tenths(thousandths: i64, unit: &str) -> String {
    let tenths = words::rounded(thousandths, 100);
    let sign = if tenths < 0 { "-" } else { "" };
    format!("{sign}{}.{} {unit}", tenths.abs() / 10, tenths.abs() % 10)
        .trim_end()
        .to_owned()
}
