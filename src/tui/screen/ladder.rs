//! The ladder at the left: every rung, the lit one marked by sign and weight, the hold line as a
//! line, the stump below.

use ratatui::layout::Rect;

use super::header::cut;
use super::paper::Paper;
use super::{View, shows_stump};
use crate::briefing::{Card, Item};
use crate::session::{Session, Stage};
use crate::tui::{raster, words};

/// What stands below the ladder.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Below {
    /// The stump, where the stage has one.
    Stump,
    /// Words only: the stump stands elsewhere.
    Words,
}

/// Draws the ladder.
pub(super) fn draw(view: &View<'_>, paper: &mut Paper<'_>, (part, below): (Rect, Below)) {
    let session = view.session;
    let lit = session.lit();
    let mut row = part.y;
    for line in rungs(session) {
        if row >= part.y + part.height {
            break;
        }
        match line {
            None => paper.bold(
                part.x,
                row,
                &format!(
                    "{:=<width$}",
                    " ==== HOLD LINE ",
                    width = usize::from(part.width) - 1
                ),
            ),
            Some(item) => rung(session, paper, (part, row), (&item, lit.as_ref())),
        }
        row += 1;
    }
    if shows_stump(session) && below == Below::Stump {
        stump(
            view,
            paper,
            Rect::new(
                part.x,
                row,
                part.width,
                (part.y + part.height).saturating_sub(row),
            ),
        );
    } else {
        side_lines(
            view,
            paper,
            Rect::new(
                part.x + 1,
                row + 1,
                part.width - 1,
                (part.y + part.height).saturating_sub(row + 1),
            ),
        );
    }
}

/// The rungs in order; nothing where the hold line stands.
fn rungs(session: &Session) -> Vec<Option<Item>> {
    let items = session.items();
    let hold_before = match (session.stage, session.card()) {
        (Stage::Cuts, Some(card)) => card
            .rungs
            .iter()
            .find(|r| r.commits)
            .map(|r| format!("step.{}", r.id)),
        _ => None,
    };
    let mut lines = vec![];
    for item in items {
        if hold_before.as_ref() == Some(&item.id) {
            lines.push(None);
        }
        lines.push(Some(item));
    }
    lines
}

fn rung(
    session: &Session,
    paper: &mut Paper<'_>,
    (part, row): (Rect, u16),
    (item, lit): (&Item, Option<&Item>),
) {
    let width = usize::from(part.width);
    let n = item.number;
    if lit.is_some_and(|l| l.id == item.id) {
        let name = item.name.to_uppercase();
        paper.lit(
            part.x,
            row,
            &format!("{:width$}", cut(&format!("> {n} > {name}"), width)),
        );
    } else if session.is_done(item) {
        paper.text(part.x, row, &cut(&format!("  {n} x {}", item.name), width));
    } else {
        paper.text(part.x, row, &cut(&format!("  {n} - {}", item.name), width));
    }
}

/// The stump from above with the next cut marked.
pub(super) fn stump(view: &View<'_>, paper: &mut Paper<'_>, part: Rect) {
    let Some(card) = view.session.card() else {
        return;
    };
    let lines = stump_lines(
        view.session,
        card,
        (part.width, part.height.saturating_sub(1)),
    );
    if lines.is_empty() {
        return;
    }
    paper.text(part.x, part.y, " STUMP FROM ABOVE, lay up");
    for (row, line) in (part.y + 1..).zip(&lines) {
        paper.text(part.x, row, line);
    }
}

fn stump_lines(session: &Session, card: &Card, (width, height): (u16, u16)) -> Vec<String> {
    let rung_of = |item: &str| item.strip_prefix("step.").map(str::to_owned);
    let done: Vec<String> = session
        .done
        .iter()
        .filter(|d| d.stands && d.stage == Stage::Cuts && d.tree == session.tree)
        .filter_map(|d| rung_of(&d.item))
        .collect();
    let next = if session.stage == Stage::Cuts {
        session.lit().and_then(|i| rung_of(&i.id))
    } else {
        card.rungs.iter().find(|r| r.commits).map(|r| r.id.clone())
    };
    let scene = crate::pictures::stump(card, &done, next.as_deref());
    raster::lines(&scene, usize::from(width), usize::from(height))
}

/// What stands below the ladder where there is no stump: the story of the job, or what matters now.
fn side_lines(view: &View<'_>, paper: &mut Paper<'_>, part: Rect) {
    let session = view.session;
    let job = &session.job;
    let mut words: Vec<String> = vec![];
    match session.stage {
        Stage::RollCall | Stage::Signing | Stage::Choose => words = story(session),
        Stage::OwnHazards => {
            words.push("Own hazards first. The list of kinds comes after.".to_owned());
            words.extend(story(session));
        }
        Stage::Questions => {
            words.push("Kinds of energy:".to_owned());
            words.push(job.parts.tailgate.kinds_of_energy.join(", "));
            let named: Vec<String> = session
                .hazards
                .iter()
                .map(|(_, what)| what.clone())
                .collect();
            words.push(format!("Named: {}", named.join("; ")));
        }
        Stage::Stopped => {
            words.push("The place is kept. Saw off. Nobody goes under the lean.".to_owned());
            words.push(format!("Record code {}", view.code));
            words.push("IF SOMEBODY IS HURT".to_owned());
            words.extend(job.emergency.iter().cloned());
        }
        Stage::ShortTalk
        | Stage::WalkUp
        | Stage::Cuts
        | Stage::HoldLine
        | Stage::AllClear
        | Stage::Closing
        | Stage::Closed
        | Stage::TalkAgain => {}
    }
    let mut row = part.y;
    for line in words {
        if row >= part.y + part.height {
            return;
        }
        row += paper.wrapped(
            Rect::new(part.x, row, part.width, part.y + part.height - row),
            &line,
        );
    }
}

/// The job in a few lines: the intent, then each tree with its method, lay and hazards.
fn story(session: &Session) -> Vec<String> {
    let job = &session.job;
    let mut story = vec![job.intent.clone()];
    for tree in &job.trees {
        let method = session
            .cards
            .get(&tree.id)
            .and_then(|c| c.method.as_deref())
            .unwrap_or("no method: ask");
        let lay = tree.lay_mdeg.map_or(String::new(), |l| {
            format!(", lay {:03}", words::rounded(l, 1_000))
        });
        story.push(format!("{}: {method}{lay}", tree.id));
        story.extend(
            tree.hazards
                .iter()
                .map(|(what, control, _)| format!(" {what}: {control}")),
        );
    }
    story
}
