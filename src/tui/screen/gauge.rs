//! The margin gauge: only after both own calls are on the record, below the facts, opening
//! nothing. Four states in words, twenty equal cases, never a lone number.

use ratatui::layout::Rect;

use super::View;
use super::paper::Paper;
use crate::briefing::Card;
use crate::tui::words;

/// Draws the gauge; gives the rows used.
pub(super) fn draw(view: &View<'_>, paper: &mut Paper<'_>, part: Rect) -> u16 {
    let Some(card) = view.session.card() else {
        return 0;
    };
    let mut row = 0;
    for line in lines(card) {
        if row >= part.height {
            break;
        }
        row += paper.wrapped(
            Rect::new(part.x, part.y + row, part.width, part.height - row),
            &line,
        );
    }
    row
}

/// The gauge in lines, readable over a radio.
pub(super) fn lines(card: &Card) -> Vec<String> {
    let state = state_words(&card.state);
    if state == "CANNOT SAY" {
        return vec![
            "MARGIN  ? ? ?  State: CANNOT SAY".to_owned(),
            "The person in charge at the tree decides.".to_owned(),
        ];
    }
    let past = usize::try_from(card.past).unwrap_or(0);
    let of = usize::try_from(card.of).unwrap_or(0);
    let marks = format!(
        "{}{}",
        "! ".repeat(past),
        "o ".repeat(of.saturating_sub(past))
    );
    let counted = match past {
        0 => format!("none of these {of} past it"),
        n => format!("{n} of {of} past it"),
    };
    let worst = card.worst_ppm.map_or("CANNOT SAY".to_owned(), times);
    let range = card
        .figure("split_ratio_at_commit")
        .map_or(String::new(), |figure| {
            let [low, best, high] = figure.band.map(times);
            format!("Splits at {best} times what is asked ({low} to {high})")
        });
    vec![
        format!("MARGIN  {}", marks.trim_end()),
        format!("State: {state}, {counted}"),
        range,
        format!("Worst credible: at {worst} times; the limit is 1.0"),
        format!("Most doubt: {}", card.doubt.split(';').next().unwrap_or("")),
        format!(
            "To shrink it:{}",
            card.doubt.split(';').nth(1).unwrap_or(" -")
        ),
        "Left out: gusts, ground, knots, hidden rot".to_owned(),
        "The person in charge at the tree decides.".to_owned(),
    ]
}

/// A ratio in parts in a million as a number with two figures at most.
fn times(ppm: i64) -> String {
    let tenths = words::rounded(ppm, 100_000);
    if tenths.abs() >= 100 {
        format!("{}", words::rounded(tenths, 10))
    } else {
        format!("{}.{}", tenths / 10, (tenths % 10).abs())
    }
}

/// A state word of the machine output in the words of the screen.
pub(super) fn state_words(state: &str) -> &'static str {
    match state {
        "within-limit" => "WITHIN LIMIT",
        "near-limit" => "NEAR LIMIT",
        "past-limit" => "PAST LIMIT",
        _ => "CANNOT SAY",
    }
}
