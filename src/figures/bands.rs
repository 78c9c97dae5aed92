//! Quantiles of many cases. It draws nothing and judges nothing.

use crate::units::Band;

/// The place of a quantile among sorted values: the middle of its step.
fn place(count: usize, share: f64) -> usize {
    let at = libm::floor(share * count as f64) as usize;
    at.min(count.saturating_sub(1))
}

/// The 5 % and 95 % quantiles of the cases with the figure for the central inputs.
/// Values that are not numbers never come here: an infinite one is a case past every end.
pub(super) fn band(cases: &mut [f64], best: f64) -> Band<f64> {
    let (low, high) = (place(cases.len(), 0.05), place(cases.len(), 0.95));
    let low = *cases.select_nth_unstable_by(low, f64::total_cmp).1;
    let high = *cases.select_nth_unstable_by(high, f64::total_cmp).1;
    Band { low, best, high }
}

/// The twenty equal cases: quantiles 2.5, 7.5 … 97.5 %.
pub(super) fn twenty(cases: &mut [f64]) -> [f64; 20] {
    cases.sort_unstable_by(f64::total_cmp);
    std::array::from_fn(|index| cases[place(cases.len(), 0.025 + 0.05 * index as f64)])
}
