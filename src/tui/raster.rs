//! A scene in characters, true to scale: a cell counts as twice as high as wide.

use crate::drawing::{Ink, Scene};

/// The scene in at most `columns` by `rows` characters, lay up; marks stand at the right.
pub(super) fn lines(scene: &Scene, columns: usize, rows: usize) -> Vec<String> {
    const MARK_COLUMNS: usize = 12;
    let wide = columns.saturating_sub(MARK_COLUMNS);
    if wide < 5 || rows < 3 {
        return vec![];
    }
    // Metres a cell: the larger of what width and height ask for, so that the whole stump fits.
    let by_width = 2.0 * scene.half_across / count(wide);
    let by_height = scene.half_along / count(rows);
    let cell = by_width.max(by_height);
    let mut lines: Vec<String> = (0..rows)
        .map(|row| {
            let forward = (count(rows) / 2.0 - count(row) - 0.5) * 2.0 * cell;
            (0..wide)
                .map(|column| {
                    let right = (count(column) + 0.5 - count(wide) / 2.0) * cell;
                    character(scene.ink_at(right, forward))
                })
                .collect()
        })
        .collect();
    let mut used = vec![false; rows];
    for mark in scene.marks.iter().rev() {
        let at = count(rows) / 2.0 - mark.along / (2.0 * cell) - 0.5;
        if let Some(row) = free_row(&used, at) {
            used[row] = true;
            let line = &mut lines[row];
            line.push(' ');
            line.push_str(&mark.text);
        }
    }
    lines
}

/// The nearest row to `at` that has no mark yet, within one row.
fn free_row(used: &[bool], at: f64) -> Option<usize> {
    let distance = |row: usize| (count(row) - at).abs();
    let free = (0..used.len()).filter(|row| !used[*row] && distance(*row) <= 1.5);
    free.min_by(|a, b| distance(*a).total_cmp(&distance(*b)))
}

const fn character(ink: Option<Ink>) -> char {
    match ink {
        None => ' ',
        Some(Ink::Wood) => '.',
        Some(Ink::Gone) => '_',
        Some(Ink::Next) => '=',
        Some(Ink::Hinge) => '|',
        Some(Ink::Strap) => '#',
        Some(Ink::Face) => '/',
    }
}

#[expect(
    clippy::cast_precision_loss,
    reason = "counts of screen cells are small"
)]
const fn count(n: usize) -> f64 {
    n as f64
}
