//! The fall itself: a tree turning about its hinge, with no hinge and no air for the shortest
//! time, with the crown's drag for the long end. It never counts on the hinge to slow it.

use crate::mechanics::integrate;
use crate::mechanics::wind::AIR_DENSITY;
use crate::units::{Angle, Duration, Force, GRAVITY, Inertia, Length, Mass, Speed};

/// The crown's radius of gyration over its length. Source: derived, an ellipsoid's `1/√20`.
pub const CROWN_GYRATION: f64 = 0.22;

/// A tree as a turning body.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Body {
    /// Mass of the stem.
    pub stem: Mass,
    /// Mass of the crown.
    pub crown: Mass,
    /// The tree's height.
    pub height: Length,
    /// Height of the crown's centre.
    pub crown_centre: Length,
    /// Length of the crown.
    pub crown_length: Length,
}

/// The inertia of a tree about its foot.
///
/// # Model
/// `m_s·2H²/((p+2)(p+3)) + m_c(z_c² + (0.22 L_c)²)`.
/// # Valid for
/// Slender stems whose area goes as `(1 − x/L)^p`.
/// # Source
/// Derived; a thick cone adds less than a thousandth.
pub fn inertia(body: &Body, profile: f64) -> Inertia {
    let height = body.height.value();
    let centre = body.crown_centre.value();
    let gyration = CROWN_GYRATION * body.crown_length.value();
    let stem = body.stem.value() * 2.0 * height * height / ((profile + 2.0) * (profile + 3.0));
    let crown = body.crown.value() * (centre * centre + gyration * gyration);
    Inertia::si(stem + crown)
}

/// A tree turning about its hinge: only `λ = W r/I` matters.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Pendulum {
    lambda: f64,
}

impl Pendulum {
    /// A whole tree. `None` where it has no weight, arm or inertia.
    ///
    /// # Model
    /// `λ = W r/I`.
    /// # Valid for
    /// A rigid tree on a hinge that holds it in place.
    /// # Source
    /// Newton's law; Holloway 2008, ANZIAM Journal 49 (first page opened).
    pub fn new(weight: Force, radius: Length, inertia: Inertia) -> Option<Self> {
        let lambda = weight.value() * radius.value() / inertia.value();
        (lambda.is_finite() && lambda > 0.0).then_some(Self { lambda })
    }

    /// A bare stem of a profile. `None` where it has no height.
    ///
    /// # Model
    /// `λ = g(p+3)/(2L)`.
    /// # Valid for
    /// Slender stems.
    /// # Source
    /// Derived.
    pub fn of_profile(height: Length, profile: f64) -> Option<Self> {
        let lambda = GRAVITY * (profile + 3.0) / (2.0 * height.value());
        (lambda.is_finite() && lambda > 0.0).then_some(Self { lambda })
    }

    /// The shortest time from rest at one angle to another; `None` where it never starts.
    ///
    /// # Model
    /// `∫ dθ/√(2λ(cos θ0 − cos θ))` with `θ = θ0 cosh s`, by a 16-point rule.
    /// # Valid for
    /// Start angles from 0.1 degree; eight digits.
    /// # Source
    /// Derived; agrees with elliptic integrals and with an integrator of differential equations.
    pub fn time(&self, from: Angle, to: Angle) -> Option<Duration> {
        let (start, end) = (from.value(), to.value());
        if start <= 0.0 || end <= start {
            return None;
        }
        let integral = integrate(0.0, libm::acosh(end / start), |s| {
            let angle = start * libm::cosh(s);
            let product = libm::sin(0.5 * (angle + start)) * libm::sin(0.5 * (angle - start));
            start * libm::sinh(s) / (4.0 * product).sqrt()
        });
        finite(integral / self.lambda.sqrt())
    }

    /// The turning speed times a length: the speed of the tip, from rest at one angle to another.
    ///
    /// # Model
    /// `L·√(2λ(cos θ0 − cos θ))`.
    /// # Valid for
    /// No losses: the fastest.
    /// # Source
    /// Energy.
    pub fn tip_speed(&self, from: Angle, to: Angle, height: Length) -> Speed {
        let fall = libm::cos(from.value()) - libm::cos(to.value());
        Speed::si((2.0 * self.lambda * fall.max(0.0)).sqrt() * height.value())
    }

    /// The time in which a small tilt grows to another.
    ///
    /// # Model
    /// `acosh(θ1/θ0)/√λ`.
    /// # Valid for
    /// Tilts up to about ten degrees.
    /// # Source
    /// Derived.
    pub fn early_time(&self, from: Angle, to: Angle) -> Option<Duration> {
        let ratio = to / from;
        (ratio.is_finite() && ratio >= 1.0)
            .then(|| Duration::si(libm::acosh(ratio) / self.lambda.sqrt()))
    }

    /// The time with the crown's drag: the long end.
    ///
    /// # Model
    /// `ω² = 2λ/(1+4κ²)·{(2κ sin θ − cos θ) − (2κ sin θ0 − cos θ0) e^{−2κ(θ−θ0)}}`.
    /// # Valid for
    /// Drag by the square of the speed, `κ = K/I`, zero or more.
    /// # Source
    /// Derived; agrees with an integrator of differential equations.
    pub fn time_with_drag(&self, from: Angle, to: Angle, kappa: f64) -> Option<Duration> {
        let (start, end) = (from.value(), to.value());
        if start <= 0.0 || end <= start || kappa.is_nan() || kappa < 0.0 {
            return None;
        }
        let integral = integrate(0.0, libm::acosh(end / start), |s| {
            let angle = start * libm::cosh(s);
            start * libm::sinh(s) / self.speed_with_drag(start, angle, kappa)
        });
        finite(integral)
    }

    fn speed_with_drag(&self, start: f64, angle: f64, kappa: f64) -> f64 {
        let term = |at: f64| 2.0 * kappa * libm::sin(at) - libm::cos(at);
        let left = term(angle) - term(start) * libm::exp(-2.0 * kappa * (angle - start));
        (2.0 * self.lambda / (1.0 + 4.0 * kappa * kappa) * left.max(0.0)).sqrt()
    }

    /// The tip's speed with the crown's drag.
    ///
    /// # Model
    /// As [`Pendulum::time_with_drag`].
    /// # Valid for
    /// As [`Pendulum::time_with_drag`].
    /// # Source
    /// As [`Pendulum::time_with_drag`].
    pub fn tip_speed_with_drag(&self, span: (Angle, Angle), kappa: f64, height: Length) -> Speed {
        let (from, to) = span;
        let speed = self.speed_with_drag(from.value(), to.value().max(from.value()), kappa);
        Speed::si(speed * height.value())
    }
}

fn finite(seconds: f64) -> Option<Duration> {
    Duration::try_si(seconds).ok()
}

/// A crown of even width between two heights, moving through still air.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CrownDrag {
    /// Drag coefficient.
    pub coefficient: f64,
    /// Width.
    pub width: Length,
    /// Foot of the crown.
    pub from: Length,
    /// Top of the crown.
    pub to: Length,
}

/// The drag of a turning crown over the inertia.
///
/// # Model
/// `κ = ½ρC_d w (z2⁴ − z1⁴)/4 / I`.
/// # Valid for
/// A crown of even width.
/// # Source
/// Derived.
pub fn drag_over_inertia(crown: &CrownDrag, inertia: Inertia) -> f64 {
    let fourth = |length: Length| {
        let square = length.value() * length.value();
        square * square
    };
    0.5 * AIR_DENSITY
        * crown.coefficient
        * crown.width.value()
        * (fourth(crown.to) - fourth(crown.from))
        / 4.0
        / inertia.value()
}
