//! Published and worked figures, one file a source. Nothing here is tuned to the code.
#![expect(
    clippy::unwrap_used,
    reason = "functions that tests share stand outside the test functions"
)]

mod biomass;
mod escape_and_rigging;
mod fall;
mod green_weight;
mod race;
mod section;
mod species_table;
mod split_derived;
mod split_examples;
mod tree_centre;

/// Whether two numbers agree to the digits printed.
#[track_caller]
fn near(value: f64, printed: f64, last_digit: f64) {
    assert!(
        (value - printed).abs() <= 0.5001 * last_digit,
        "{value} is not {printed} to {last_digit}"
    );
}

/// Whether two numbers agree to a share of the printed one.
#[track_caller]
fn within(value: f64, printed: f64, share: f64) {
    assert!(
        (value - printed).abs() <= share * printed.abs(),
        "{value} is not {printed} within {share}"
    );
}
