//! The right panel: the lit step with its call, its numbers, its caution, and the last two done.

use ratatui::layout::Rect;

use super::View;
use super::gauge;
use super::header::cut;
use super::paper::{Paper, wrap};
use crate::briefing::{Field, Form, Item, Kind};
use crate::parts::What;
use crate::session::{Done, Session, Stage, Value};
use crate::tui::answer::{self, Slot};
use crate::tui::desk::Picture;
use crate::tui::words;

/// Draws the panel.
pub(super) fn draw(view: &View<'_>, paper: &mut Paper<'_>, part: Rect) {
    let session = view.session;
    let width = part.width;
    let bottom = part.y + part.height;
    if view.desk.picture == Picture::Figures && session.card().is_some() {
        super::side::figures(view, paper, part);
        return;
    }
    let Some(item) = session.lit() else {
        resting(view, paper, part);
        return;
    };
    if item.kind == Kind::Go {
        go(view, paper, (part, &item));
        return;
    }
    let total = session.items().len();
    let clock = words::clock(view.now.utc_ms, view.offset_min);
    paper.text(
        part.x,
        part.y,
        &format!("NOW, STEP {} OF {total}", item.number),
    );
    paper.text(part.x + width.saturating_sub(8), part.y, &clock);
    let mut row = part.y + 2;
    let inner = |row: u16| Rect::new(part.x, row, width, bottom.saturating_sub(row + 4));
    row += paper.wrapped_bold(inner(row), &item.name.to_uppercase());
    row = changes(session, paper, inner(row + 1)).unwrap_or(row);
    if session.stage != Stage::TalkAgain {
        row += paper.wrapped(inner(row), &format!("Call: \"{}\"", item.call));
        row += paper.wrapped(inner(row), &asked(session, &item));
    }
    if let Some(timing) = &item.timing {
        row += paper.wrapped_bold(inner(row), &format!("Pace: {timing}"));
    }
    if let Some(sentence) = item.sentence.as_ref().filter(|_| item.form == Form::Sign) {
        row += paper.wrapped_bold(inner(row), &format!("\"{sentence}\""));
        if item.form == Form::Sign && session.stage != Stage::TalkAgain {
            row += paper.wrapped(
                inner(row),
                &format!("signed over the record so far, {}", view.code),
            );
        }
    }
    row = form(view, paper, (inner(row + 1), &item));
    if let Some((word, line)) = &item.caution {
        row += paper.wrapped_bold(inner(row), &format!("{word}  {line}"));
    }
    let _ = row;
    foot(view, paper, part);
}

/// A go at the hold line: the measured facts, then the gauge whole, nothing between.
fn go(view: &View<'_>, paper: &mut Paper<'_>, (part, item): (Rect, &Item)) {
    let session = view.session;
    let name = session.job.name_of(&item.asked_of);
    paper.bold(
        part.x,
        part.y,
        &format!("{}: {name}", item.name.to_uppercase()),
    );
    if let Form::Choose(options) = &item.form {
        let choices: Vec<String> = (1..)
            .zip(options)
            .map(|(digit, option)| format!("{digit}  {}", option.say))
            .collect();
        paper.text(part.x + 1, part.y + 1, &choices.join("     "));
    }
    let slots = answer::slots(item, session.job.units);
    for (index, slot) in slots.iter().enumerate() {
        field_line(view, paper, (part.x, part.y + 2), (index, slot, item));
    }
    number_line(view, paper, (part.x, part.y + 3), item);
    let row = part.y + 5;
    let facts = measured_facts(session);
    let used = paper.wrapped_bold(Rect::new(part.x, row, part.width, 2), &facts);
    let from = row + used;
    let bottom = part.y + part.height;
    gauge::draw(
        view,
        paper,
        Rect::new(part.x, from, part.width, bottom.saturating_sub(from + 4)),
    );
    foot(view, paper, part);
}

/// What was measured at this tree, the last value of each thing.
fn measured_facts(session: &Session) -> String {
    let mut facts: Vec<(String, String)> = vec![];
    let here = session
        .done
        .iter()
        .filter(|d| d.stands && d.tree == session.tree);
    for value in here.flat_map(|d| &d.values) {
        let Value::Measured {
            label, what, value, ..
        } = value
        else {
            continue;
        };
        if matches!(what, What::Count | What::Bypass | What::BehindHinge) {
            continue;
        }
        let words = words::measured(*what, *value, session.job.units);
        let name = match what {
            What::Hinge => "hinge",
            What::Strap => "strap",
            What::FaceDepth => "face",
            What::Wind
            | What::Stump
            | What::Lean
            | What::Count
            | What::BackCutHeight
            | What::Bypass
            | What::BehindHinge
            | What::BackCutDepth => label.as_str(),
        };
        match facts.iter_mut().find(|(known, _)| known == name) {
            // Two ends of one thing both count.
            Some((_, old))
                if matches!(what, What::Hinge | What::Strap | What::FaceDepth)
                    && !old.contains('/')
                    && *old != words =>
            {
                *old = format!("{old} / {words}");
            }
            Some((_, old)) => *old = words,
            None => facts.push((name.to_owned(), words)),
        }
    }
    let all: Vec<String> = facts
        .into_iter()
        .map(|(name, words)| format!("{name} {words}"))
        .collect();
    format!("MEASURED  {}", all.join(", "))
}

/// Message and the last two done steps, always in the same rows.
fn foot(view: &View<'_>, paper: &mut Paper<'_>, part: Rect) {
    let bottom = part.y + part.height;
    let width = usize::from(part.width);
    let session = view.session;
    let message = if view.desk.recording {
        "RECORDING".to_owned()
    } else if session.size_up_due.is_some() {
        "SIZING UP AGAIN".to_owned()
    } else if let Some((_, todo)) = &session.kept_open {
        format!("KEPT OPEN: {todo}")
    } else {
        view.desk.message.clone()
    };
    let lines = wrap(&message, width);
    let rows = u16::try_from(lines.len().min(3)).unwrap_or(1);
    for (row, line) in (bottom - 3 - rows..).zip(lines.iter().take(3)) {
        paper.bold(part.x, row, &format!("{line:width$}"));
    }
    paper.text(part.x, bottom - 3, "Last two done, RECORDED");
    let done: Vec<&Done> = session
        .done
        .iter()
        .filter(|d| d.stands && !d.shown.is_empty())
        .collect();
    for (row, done) in (bottom - 2..bottom).zip(done.iter().rev().take(2).rev()) {
        paper.text(part.x, row, &cut(&done_line(view, done), width));
    }
}

fn done_line(view: &View<'_>, done: &Done) -> String {
    let session = view.session;
    let name = done.shown.split(':').next().unwrap_or("");
    let clock = words::clock(done.stamp.utc_ms, view.offset_min);
    let values: Vec<String> = done
        .values
        .iter()
        .map(|v| value_words(session, v))
        .collect();
    format!(
        "{} {name}  {}  {clock} {} by {}",
        done.number,
        values.join(", "),
        session.job.name_of(&done.said.told_by),
        done.said.heard.word()
    )
}

fn value_words(session: &Session, value: &Value) -> String {
    match value {
        Value::Chosen { say, .. } => say.clone(),
        Value::Measured { what, value, .. } => words::measured(*what, *value, session.job.units),
        Value::Words(words) => words.lines().next().unwrap_or("").to_owned(),
        Value::Signed => "signed".to_owned(),
    }
}

/// Of whom it is asked; of a blind look, which of the two and that nobody tells.
fn asked(session: &Session, item: &Item) -> String {
    let name = |id: &str| session.job.name_of(id).to_owned();
    match (&item.blind_with, &session.held) {
        (Some(second), Some(_)) => {
            format!(
                "Second look, blind: {}. The first answer is HELD.",
                name(second)
            )
        }
        (Some(_), None) => format!(
            "First look: {}. Nobody else hears it yet.",
            name(&item.asked_of)
        ),
        (None, _) => format!("Asked of: {}", name(&item.asked_of)),
    }
}

/// What changed, where the crew talks again.
fn changes(session: &Session, paper: &mut Paper<'_>, part: Rect) -> Option<u16> {
    let talk = session
        .talk
        .as_ref()
        .filter(|_| session.stage == Stage::TalkAgain)?;
    let mut row = part.y;
    for change in &talk.changes {
        let line = format!("{}: was {}, is {}", change.what, change.old, change.new);
        row += paper.wrapped_bold(Rect::new(part.x, row, part.width, part.height), &line);
    }
    row += paper.wrapped(
        Rect::new(part.x, row, part.width, part.height),
        "Say what it does to lay, ways out, ring and the next step. \"We go\" is void; all sign again.",
    );
    Some(row + 1)
}

/// The fields, the choices, the step's number, how it was heard.
fn form(view: &View<'_>, paper: &mut Paper<'_>, (part, item): (Rect, &Item)) -> u16 {
    let mut row = part.y;
    if let Form::Choose(options) = &item.form {
        for (digit, option) in (1..).zip(options) {
            let held = if option.holds.is_some() {
                "  (keeps it open)"
            } else {
                ""
            };
            paper.text(part.x + 1, row, &format!("{digit}  {}{held}", option.say));
            row += 1;
        }
    }
    if let Form::Words(wanted) = &item.form {
        row += paper.wrapped(
            Rect::new(part.x, row, part.width, 2),
            &format!("Wanted: {wanted}"),
        );
        row += paper.wrapped(
            Rect::new(part.x, row, part.width, 4),
            &format!("Written: {}", view.desk.words()),
        );
    }
    if let Form::Measure(fields) = &item.form {
        // A blind look is not led by the plan's own figure.
        for field in fields.iter().filter(|_| item.blind_with.is_none()) {
            if let Some(plan) = plan_line(view.session, field) {
                paper.text(part.x, row, &plan);
                row += 1;
            }
        }
    }
    let slots = answer::slots(item, view.session.job.units);
    for (index, slot) in slots.iter().enumerate() {
        field_line(view, paper, (part.x, row), (index, slot, item));
        row += 1;
    }
    number_line(view, paper, (part.x, row), item);
    row + 3
}

fn plan_line(session: &Session, field: &Field) -> Option<String> {
    let planned = field.planned?;
    let units = session.job.units;
    let words = |value: i64| words::measured(field.what, value, units);
    let (low, high) = (
        planned.value - planned.tolerance,
        planned.value + planned.tolerance,
    );
    Some(format!(
        "Plan, {}: {} ({} to {})",
        field.label,
        words(planned.value),
        words(low.max(0)),
        words(high)
    ))
}

fn field_line(
    view: &View<'_>,
    paper: &mut Paper<'_>,
    (x, row): (u16, u16),
    (index, slot, item): (usize, &Slot, &Item),
) {
    let typed = view.desk.fields.get(index).cloned().unwrap_or_default();
    let shown = if item.blind_with.is_some() {
        "*".repeat(typed.len())
    } else {
        typed
    };
    let caret = if view.desk.focus == index { ">" } else { " " };
    let label = format!("{:<16}", cut(&slot.label, 16));
    let field = format!("{caret} {label} [ {shown:<5} ] {}", slot.unit);
    if view.desk.focus == index {
        paper.bold(x, row, &field)
    } else {
        paper.text(x, row, &field)
    }
}

fn number_line(view: &View<'_>, paper: &mut Paper<'_>, (x, row): (u16, u16), item: &Item) {
    let last = view.desk.focus >= answer::slots(item, view.session.job.units).len();
    let caret = if last { ">" } else { " " };
    let label = format!("step's number, {}", item.number);
    let field = format!("{caret} {label:<16} [ {:<5} ] then Enter", view.desk.number);
    if last {
        paper.bold(x, row, &field)
    } else {
        paper.text(x, row, &field)
    }
    paper.text(
        x,
        row + 1,
        &format!("  heard by {}", view.desk.heard.word()),
    );
}

/// The panel where nothing is asked: the closed day.
fn resting(view: &View<'_>, paper: &mut Paper<'_>, part: Rect) {
    let session = view.session;
    if view.desk.recording {
        paper.bold(part.x, part.y, "RECORDING");
        return;
    }
    let mut row = part.y;
    let mut line = |paper: &mut Paper<'_>, words: &str| {
        row += paper.wrapped(Rect::new(part.x, row, part.width, part.height), words) + 1;
    };
    if session.stage == Stage::Closed {
        line(paper, "THE DAY IS CLOSED, RECORDED");
        line(paper, &format!("Record code: {}", view.code));
        line(
            paper,
            "Each person writes it down or takes a picture: it shows later whether this record was changed.",
        );
        if view.demo {
            line(paper, "DEMO KEYS: PROVES NOTHING.");
        }
    }
}
