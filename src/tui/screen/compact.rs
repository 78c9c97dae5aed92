//! The card for small windows and far readers: one step, its call, its field.

use ratatui::layout::Rect;

use super::View;
use super::gauge;
use super::header::{cut, footer_words, tree_line};
use super::paper::Paper;
use crate::briefing::{Form, Item, Kind};
use crate::session::{Session, Stage};
use crate::tui::{answer, words};

/// Draws it.
pub(super) fn draw(view: &View<'_>, paper: &mut Paper<'_>) {
    let (width, height) = paper.size();
    let session = view.session;
    paper.bold(0, 0, &cut(&tree_line(session), usize::from(width)));
    let Some(item) = session.lit() else {
        paper.bold(0, 2, session.stage.title());
        paper.text(0, 4, view.code);
        paper.text(0, height - 1, &cut(&footer_words(view), usize::from(width)));
        return;
    };
    let total = session.items().len();
    paper.text(
        0,
        1,
        &format!("{}, step {} of {total}", session.stage.title(), item.number),
    );
    let mut row = 2;
    paper.lit(
        0,
        row,
        &cut(
            &format!("> {} > {}", item.number, item.name.to_uppercase()),
            usize::from(width),
        ),
    );
    row += 1;
    row += paper.wrapped(Rect::new(0, row, width, 2), &item.call);
    let room = height.saturating_sub(row + 4);
    if let Some(who) = second_look(session, &item) {
        paper.bold(0, row, &cut(&who, usize::from(width)));
        row += 1;
    }
    if let Some(talk) = session
        .talk
        .as_ref()
        .filter(|_| session.stage == Stage::TalkAgain)
    {
        let all: Vec<String> = talk
            .changes
            .iter()
            .map(|c| format!("{}: {} -> {}", c.what, c.old, c.new))
            .collect();
        row += paper.wrapped_bold(
            Rect::new(0, row, width, room.saturating_sub(2)),
            &all.join("; "),
        );
    }
    if item.kind == Kind::Go
        && let Some(card) = session.card()
    {
        for line in gauge::lines(card)
            .iter()
            .skip(1)
            .take(3)
            .filter(|l| !l.is_empty())
        {
            paper.text(0, row, &cut(line, usize::from(width)));
            row += 1;
        }
    }
    let room = height.saturating_sub(row + 3);
    if let Form::Choose(options) = &item.form {
        let all: Vec<String> = (1..)
            .zip(options)
            .map(|(n, o)| format!("{n} {}", o.say))
            .collect();
        paper.wrapped(Rect::new(0, row, width, room), &all.join("  "));
    } else if let Form::Measure(fields) = &item.form {
        let one = |f: &crate::briefing::Field| match f.planned.filter(|_| item.blind_with.is_none())
        {
            Some(plan) => format!(
                "{}: plan {}",
                f.label,
                words::measured(f.what, plan.value, session.job.units)
            ),
            None => f.label.clone(),
        };
        let all: Vec<String> = fields.iter().map(one).collect();
        paper.wrapped(Rect::new(0, row, width, room), &all.join(", "));
    } else if let Some(sentence) = &item.sentence {
        paper.wrapped(Rect::new(0, row, width, room), sentence);
    }
    let slots = answer::slots(&item, session.job.units);
    let typed: Vec<String> = slots
        .iter()
        .enumerate()
        .map(|(i, slot)| {
            let typed = view.desk.fields.get(i).map_or("", String::as_str);
            let shown = if item.blind_with.is_some() {
                "*".repeat(typed.len())
            } else {
                typed.to_owned()
            };
            format!("[{shown:<4}] {}", slot.unit)
        })
        .collect();
    let line = format!("{} number [{}]", typed.join(" "), view.desk.number);
    paper.bold(0, height - 3, &cut(line.trim_start(), usize::from(width)));
    let message = match (&session.kept_open, view.desk.recording) {
        (_, true) => "RECORDING".to_owned(),
        (_, false) if session.size_up_due.is_some() => "SIZING UP AGAIN".to_owned(),
        (Some((_, todo)), false) => todo.clone(),
        (None, false) => view.desk.message.clone(),
    };
    paper.text(0, height - 2, &cut(&message, usize::from(width)));
    paper.text(0, height - 1, &cut(&footer_words(view), usize::from(width)));
}

/// Whose look is asked, of a value given twice.
fn second_look(session: &Session, item: &Item) -> Option<String> {
    let second = item.blind_with.as_ref()?;
    Some(match &session.held {
        Some(_) => format!("Second look, blind: {}. HELD.", session.job.name_of(second)),
        None => format!("First look: {}", session.job.name_of(&item.asked_of)),
    })
}
