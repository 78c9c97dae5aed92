//! What lies over a work screen: help, words being written, a passphrase, the record code, leave.
//! The place below it is kept.

use ratatui::layout::Rect;

use super::View;
use super::paper::Paper;
use crate::session::{Session, Stage};
use crate::tui::desk::Overlay;

/// Draws what lies over the screen, if anything.
pub(super) fn draw(view: &View<'_>, paper: &mut Paper<'_>) {
    match &view.desk.overlay {
        Overlay::None => {}
        Overlay::Help => lines(paper, "HELP", &help(view)),
        Overlay::Words => lines(
            paper,
            "WRITE (SPACE is a letter here, Tab = done)",
            &written(view),
        ),
        Overlay::Passphrase { person, typed } => {
            let name = view.session.job.name_of(person);
            let stars = "*".repeat(typed.chars().count());
            lines(
                paper,
                "SIGN",
                &[
                    format!("Passphrase of {name}'s key:"),
                    format!("[ {stars} ]"),
                    String::new(),
                    "Enter = sign   Esc = do not sign".to_owned(),
                ],
            );
        }
        Overlay::Receipt => lines(paper, "RECORD CODE", &receipt(view)),
        Overlay::Leave => lines(
            paper,
            "LEAVE THE PROGRAM",
            &[
                "Everything shown as RECORDED is on disk.".to_owned(),
                "The place is kept; open the plan again to go on.".to_owned(),
                String::new(),
                "Enter = leave   any other key = stay".to_owned(),
            ],
        ),
    }
}

fn lines(paper: &mut Paper<'_>, title: &str, text: &[String]) {
    let (width, height) = paper.size();
    let box_width = width.saturating_sub(8).min(72).max(width.min(36));
    let inner = usize::from(box_width.saturating_sub(4));
    let all: Vec<String> = text
        .iter()
        .flat_map(|line| {
            let wrapped = super::paper::wrap(line, inner);
            if wrapped.is_empty() {
                vec![String::new()]
            } else {
                wrapped
            }
        })
        .collect();
    let rows = u16::try_from(all.len())
        .unwrap_or(u16::MAX)
        .saturating_add(4)
        .min(height);
    let (x, y) = ((width - box_width) / 2, (height - rows) / 2);
    paper.clear(Rect::new(x, y, box_width, rows));
    let edge = format!("+{}+", "-".repeat(usize::from(box_width.saturating_sub(2))));
    paper.text(x, y, &edge);
    paper.text(x, y + rows - 1, &edge);
    for row in y + 1..y + rows - 1 {
        paper.text(x, row, "|");
        paper.text(x + box_width - 1, row, "|");
    }
    paper.bold(x + 2, y + 1, title);
    for (row, line) in (y + 3..y + rows - 1).zip(&all) {
        paper.text(x + 2, row, line);
    }
}

/// What the present screen is for, its keys, and the record code.
fn help(view: &View<'_>) -> Vec<String> {
    let mut help = vec![
        about(view.session).to_owned(),
        String::new(),
        "SPACE  STOP, at once, for anyone, no reason asked first".to_owned(),
        "digits, Enter  the answer; then the step's own number, Enter".to_owned(),
        "arrows, Tab  next field     Esc  empty the fields".to_owned(),
        "h  how it was heard     m  keep place     u  take back the last step".to_owned(),
        "v  figures of the tree     w  write words     q, Enter  leave".to_owned(),
        String::new(),
        format!("Record code now: {}", view.code),
    ];
    help.extend(view.session.job.parts.tailgate.cautions.iter().cloned());
    if view.demo {
        help.push("DEMO KEYS: PROVES NOTHING.".to_owned());
    }
    help
}

fn about(session: &Session) -> &'static str {
    match session.stage {
        Stage::RollCall => "Who is here. Do, then confirm.",
        Stage::OwnHazards => "Each person names own hazards before any list is shown.",
        Stage::Questions => "Questions to named people; only `said it right` closes one.",
        Stage::Signing => "The leader signs the plan, then each person the briefing.",
        Stage::Choose => "Which tree is next; one that waits for another is kept back.",
        Stage::ShortTalk => "A short talk at the tree. Do, then confirm.",
        Stage::WalkUp => {
            "The pre-cut hazard checklist, and what is measured again. Do, then confirm."
        }
        Stage::Cuts => "Read, do, one step at a time. Values as measured.",
        Stage::HoldLine => "Nobody goes on until every item is answered and both say go.",
        Stage::AllClear => "What the tree did, the stump, three questions.",
        Stage::Closing => "Everyone counted and signed out; the leader closes.",
        Stage::Closed => "The day is closed.",
        Stage::Stopped => {
            "Stopped. The place is kept; on the way back every hold item is asked again."
        }
        Stage::TalkAgain => "Something changed. Say what it does; all sign again.",
    }
}

fn written(view: &View<'_>) -> Vec<String> {
    let tui_textarea::DataCursor(row, column) = view.desk.area.cursor();
    view.desk
        .area
        .lines()
        .iter()
        .enumerate()
        .map(|(index, line)| {
            if index != row {
                return line.clone();
            }
            let mut with_caret: String = line.chars().take(column).collect();
            with_caret.push('_');
            with_caret.extend(line.chars().skip(column));
            with_caret
        })
        .collect()
}

fn receipt(view: &View<'_>) -> Vec<String> {
    vec![
        view.code.to_owned(),
        String::new(),
        "Each person writes it down or takes a picture now.".to_owned(),
        "It shows later whether the record up to here was changed.".to_owned(),
        String::new(),
        "any key = back to the place".to_owned(),
    ]
}
