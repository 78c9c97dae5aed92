//! The first line, with the tree and the age of the wind, and the one-line footer.

use super::View;
use super::paper::Paper;
use crate::briefing::Form;
use crate::parts::What;
use crate::session::{Session, Stage, Value};
use crate::tui::desk::Overlay;
use crate::tui::words;

/// Draws the header and its rule.
pub(super) fn draw(view: &View<'_>, paper: &mut Paper<'_>) {
    let session = view.session;
    let left = tree_line(session);
    let title = session.stage.title();
    let right = wind_line(view);
    let (width, height) = paper.size();
    let room = usize::from(width);
    paper.bold(1, 0, &cut(&left, room * 55 / 100));
    let title_at = usize::from(width) * 57 / 100;
    let stage_style = matches!(
        session.stage,
        Stage::Stopped | Stage::HoldLine | Stage::TalkAgain
    );
    let at = u16::try_from(title_at).unwrap_or(0);
    if stage_style {
        paper.lit(at, 0, &format!(" {title} "))
    } else {
        paper.bold(at + 1, 0, title)
    }
    let right_at = room.saturating_sub(right.chars().count() + 1);
    paper.text(u16::try_from(right_at).unwrap_or(0), 0, &right);
    paper.rule(1);
    paper.rule(height - 2);
}

/// A text cut to a width, with a point where it was cut.
pub(super) fn cut(text: &str, width: usize) -> String {
    if text.chars().count() <= width {
        return text.to_owned();
    }
    let mut short: String = text.chars().take(width.saturating_sub(2)).collect();
    short.push_str("..");
    short
}

/// The tree with its measured facts, or the job.
pub(super) fn tree_line(session: &Session) -> String {
    let job = &session.job;
    let Some(tree) = session.tree.as_deref().and_then(|id| job.tree(id)) else {
        return format!("{}, {}", job.name, job.date);
    };
    let measured = |wanted: What| {
        let here = session
            .done
            .iter()
            .rev()
            .filter(|d| d.stands && d.tree == session.tree);
        here.flat_map(|d| &d.values).find_map(|value| match value {
            Value::Measured { what, value, .. } if *what == wanted => Some(*value),
            Value::Measured { .. } | Value::Chosen { .. } | Value::Words(_) | Value::Signed => None,
        })
    };
    let stump = words::length(measured(What::Stump).unwrap_or(tree.stump_um), job.units);
    // A blind look is not led by the plan's own figure.
    let blind = session
        .lit()
        .is_some_and(|i| i.blind_with.is_some() && i.id == "lean");
    let planned = tree.lean_mdeg.filter(|_| !blind);
    let lean = match (planned, tree.lean_toward_mdeg) {
        (Some((angle, _)), Some(toward)) => {
            format!(
                ", lean {} to {:03}",
                words::measured(What::Lean, measured(What::Lean).unwrap_or(angle), job.units),
                words::rounded(toward, 1_000)
            )
        }
        _ => String::new(),
    };
    let lay = tree.lay_mdeg.map_or(String::new(), |lay| {
        format!(", lay {:03}", words::rounded(lay, 1_000))
    });
    format!("{} {} {stump}{lean}{lay}", tree.id, tree.species)
}

/// The last wind read, with its age.
fn wind_line(view: &View<'_>) -> String {
    let stands = view.session.done.iter().rev().filter(|d| d.stands);
    let read = stands.into_iter().find_map(|done| {
        done.values.iter().find_map(|value| match value {
            Value::Measured {
                what: What::Wind,
                value,
                ..
            } => Some((*value, done.stamp.utc_ms)),
            Value::Measured { .. } | Value::Chosen { .. } | Value::Words(_) | Value::Signed => None,
        })
    });
    match read {
        Some((speed, at)) => {
            let age = view.now.utc_ms - at;
            let old = if age > 30 * 60_000 { " OLD" } else { "" };
            format!(
                "wind {}, {}{old}",
                words::measured(What::Wind, speed, view.session.job.units),
                words::age(age)
            )
        }
        None if view.session.stage.at_tree() => "wind not read".to_owned(),
        None => words::clock(view.now.utc_ms, view.offset_min),
    }
}

/// The footer: what this screen takes, in one line.
pub(super) fn footer(view: &View<'_>, paper: &mut Paper<'_>) {
    let (width, height) = paper.size();
    paper.text(
        1,
        height - 1,
        &cut(&footer_words(view), usize::from(width) - 2),
    );
}

/// The footer's words.
pub(super) fn footer_words(view: &View<'_>) -> String {
    let session = view.session;
    if view.desk.overlay == Overlay::Words {
        return "SPACE is a letter here   Tab = done writing".to_owned();
    }
    let Some(item) = session.lit() else {
        let closed = session.stage == Stage::Closed;
        let first = if closed {
            "The day is closed."
        } else {
            "SPACE = STOP"
        };
        return format!("{first}   q then Enter = leave   ? help");
    };
    let n = item.number;
    let how = match item.form {
        Form::Choose(_) => format!("digit, Enter, {n}, Enter = done"),
        Form::Measure(_) => format!("number, Enter, {n}, Enter = done"),
        Form::Words(_) => format!("w = write   {n}, Enter = done"),
        Form::Sign => format!("{n}, Enter = sign"),
        Form::Start => format!("{n}, Enter = the cut begins"),
    };
    let undo = match session.stage {
        Stage::ShortTalk | Stage::WalkUp | Stage::Cuts => "   u undo",
        Stage::RollCall
        | Stage::OwnHazards
        | Stage::Questions
        | Stage::Signing
        | Stage::Choose
        | Stage::HoldLine
        | Stage::AllClear
        | Stage::Closing
        | Stage::Closed
        | Stage::Stopped
        | Stage::TalkAgain => "",
    };
    let stop = if session.stage == Stage::Stopped {
        "stopped"
    } else {
        "SPACE = STOP"
    };
    format!("{stop}   {how}{undo}   ? help")
}
