//! How long it takes to get away. It times a walk, and never says that a way is clear.

use crate::units::{Angle, Duration, Length, Speed};

/// Seconds before the first step. Source: simple choice reaction (from memory: 0.7 to 1.5 s).
pub const REACTION: f64 = 0.8;
/// The quick and the slow end of the same.
pub const REACTION_RANGE: (f64, f64) = (0.7, 1.5);

/// Whether a way out has been cleared.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum WayState {
    /// Cleared and walked.
    Cleared,
    /// Not cleared.
    NotCleared,
}

/// The ground's rise along a bearing, as rise over run, from a slope and its downhill bearing.
///
/// # Model
/// `−grade·cos(turn from downhill)`.
/// # Valid for
/// Even slopes.
/// # Source
/// Geometry.
pub fn rise_along(grade: f64, turn_from_downhill: Angle) -> f64 {
    -grade * libm::cos(turn_from_downhill.value())
}

/// Walking speed on a slope.
///
/// # Model
/// `6·exp(−3.5·|S + 0.05|)` km/h, S rise over run.
/// # Valid for
/// Paths; 0.6 of it off paths.
/// # Source
/// Tobler 1993 (opened).
pub fn walking_speed(rise: f64) -> Speed {
    Speed::si(6.0 * libm::exp(-3.5 * (rise + 0.05).abs()) / 3.6)
}

/// The time from the signal to the end of a way out.
///
/// # Model
/// `t_r + length/(v·min(1, T(S)/T(0)))`, v 1.3 m/s cleared and 0.8 m/s not, T by Tobler.
/// # Valid for
/// A few metres, the saw left behind.
/// # Source
/// Derived; let the crew time themselves, one walk is better than any formula.
pub fn escape_time(length: Length, state: WayState, rise: f64) -> Duration {
    escape_time_with_reaction(length, state, rise, Duration::si(REACTION))
}

/// [`escape_time`] with a reaction time of its own.
///
/// # Model
/// As [`escape_time`].
/// # Valid for
/// As [`escape_time`].
/// # Source
/// As [`escape_time`].
pub fn escape_time_with_reaction(
    length: Length,
    state: WayState,
    rise: f64,
    reaction: Duration,
) -> Duration {
    let pace = match state {
        WayState::Cleared => 1.3,
        WayState::NotCleared => 0.8,
    };
    let slowed = (walking_speed(rise) / walking_speed(0.0)).min(1.0);
    reaction + Duration::si(length.value() / (pace * slowed))
}
