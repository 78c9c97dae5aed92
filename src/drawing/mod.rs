//! A scene in metres: shapes with an ink, and marks. It knows neither characters nor SVG, and
//! never what a shape means on the ground.

/// What a shape is drawn with; the drawer chooses the character or the stroke.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Ink {
    /// Wood still standing.
    Wood,
    /// Wood that is gone.
    Gone,
    /// The next cut.
    Next,
    /// The hinge.
    Hinge,
    /// The strap.
    Strap,
    /// The face.
    Face,
}

/// A strip of an ellipse about the origin, between two lines across the lay.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Strip {
    /// Rear line, metres forward of the centre.
    pub from: f64,
    /// Front line.
    pub to: f64,
    /// What it is drawn with.
    pub ink: Ink,
}

/// A mark beside the scene, at a distance along the lay.
#[derive(Debug, Clone, PartialEq)]
pub struct Mark {
    /// Metres forward of the centre.
    pub along: f64,
    /// The words.
    pub text: String,
}

/// A stump seen from above, the lay up: later strips lie over earlier ones.
#[derive(Debug, Clone, PartialEq)]
pub struct Scene {
    /// Half the wood along the lay, metres.
    pub half_along: f64,
    /// Half the wood across the lay, metres.
    pub half_across: f64,
    /// Strips, lowest first.
    pub strips: Vec<Strip>,
    /// Marks at the right.
    pub marks: Vec<Mark>,
}

impl Scene {
    /// The ink at a point, metres right of and forward of the centre; nothing outside the stump.
    pub fn ink_at(&self, right: f64, forward: f64) -> Option<Ink> {
        let (x, y) = (right / self.half_across, forward / self.half_along);
        if x * x + y * y > 1.0 {
            return None;
        }
        let over = self
            .strips
            .iter()
            .rev()
            .find(|s| s.from <= forward && forward <= s.to);
        Some(over.map_or(Ink::Wood, |s| s.ink))
    }
}
