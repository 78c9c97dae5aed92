//! A figure with its doubt: what was read with its spread, and what was computed with its band.

/// A computed figure: the 5 % and 95 % quantiles of the cases, and the figure for the central
/// inputs. `best` may lie outside `low..high` where the cases are skewed.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Band<T> {
    /// The 5 % quantile of the cases.
    pub low: T,
    /// The figure for the central inputs.
    pub best: T,
    /// The 95 % quantile of the cases.
    pub high: T,
}

impl<T: Copy> Band<T> {
    /// A band without doubt: a figure fixed by the plan.
    pub const fn exact(value: T) -> Self {
        Self {
            low: value,
            best: value,
            high: value,
        }
    }

    /// The band of another quantity, computed end by end.
    pub fn map<U>(self, f: impl Fn(T) -> U) -> Band<U> {
        Band {
            low: f(self.low),
            best: f(self.best),
            high: f(self.high),
        }
    }
}

/// A reading: its central value and one standard deviation.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Reading<T> {
    /// The central value.
    pub value: T,
    /// One standard deviation, zero or more.
    pub spread: T,
}

impl<T: Copy> Reading<T> {
    /// A reading with its spread.
    pub const fn new(value: T, spread: T) -> Self {
        Self { value, spread }
    }
}
