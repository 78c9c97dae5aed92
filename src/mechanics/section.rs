//! The stump's cross-section: areas and second moments of what lies between two cuts, in closed
//! form, for a round or oval stem with round cavities. It never says what the section carries.
//!
//! `x` runs forward along the lay, `y` to the right, from the centre of the stump; wood only.

use thiserror::Error;

use crate::units::{Area, Length, SecondMoment, SectionModulus};

/// Why a section cannot be made.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum SectionError {
    /// A diameter that is not above zero.
    #[error("a stem's diameter must be more than zero, and this one is {} cm", .0.in_cm())]
    Diameter(Length),
    /// A cavity of no size, or one that breaks the stem's outline.
    #[error(
        "a cavity of {} cm must lie wholly inside the stem: one that breaks the outline is beyond the model",
        .0.in_cm()
    )]
    Cavity(Length),
    /// A strip that leaves no wood.
    #[error("between {} m and {} m along the lay no wood is left", .from.value(), .to.value())]
    Empty {
        /// The strip's rear edge.
        from: Length,
        /// The strip's front edge.
        to: Length,
    },
}

/// A round cavity in the stump.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Cavity {
    /// Its diameter.
    pub diameter: Length,
    /// Its centre, forward of the stump's centre.
    pub forward: Length,
    /// Its centre, right of the stump's centre.
    pub right: Length,
}

/// The outline of the stump, wood only, with its cavities.
#[derive(Debug, Clone, PartialEq)]
pub struct Stem {
    along: Length,
    across: Length,
    holes: Vec<Hole>,
}

/// A section of standing wood.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Section {
    /// Its area.
    pub area: Area,
    /// Its centroid, forward of the stump's centre.
    pub forward: Length,
    /// Its centroid, right of the stump's centre.
    pub right: Length,
    /// Second moment about its own centroid, for bending along the lay.
    pub i_inline: SecondMoment,
    /// Second moment about its own centroid, for bending across the lay.
    pub i_side: SecondMoment,
    /// The rearmost wood.
    pub rear: Length,
    /// The foremost wood.
    pub front: Length,
    /// The farthest wood from the centre line, across the lay.
    pub half_width: Length,
}

impl Section {
    /// The elastic section modulus for bending along the lay, of the weaker edge.
    ///
    /// # Model
    /// `I / max(centroid − rear, front − centroid)`.
    /// # Valid for
    /// Elastic bending about the axis parallel to the hinge.
    /// # Source
    /// Elementary beam theory.
    pub fn modulus(&self) -> SectionModulus {
        let reach = (self.forward - self.rear).max(self.front - self.forward);
        SectionModulus::si(self.i_inline.value() / reach.value())
    }

    /// The elastic section modulus for bending across the lay.
    ///
    /// # Model
    /// `I_side / half width`.
    /// # Valid for
    /// Elastic bending about the lay; the section taken as alike on both sides.
    /// # Source
    /// Elementary beam theory.
    pub fn side_modulus(&self) -> SectionModulus {
        SectionModulus::si(self.i_side.value() / self.half_width.value())
    }
}

impl Stem {
    /// A sound stem of two diameters, along and across the lay.
    ///
    /// # Errors
    /// [`SectionError::Diameter`] where one is not above zero.
    pub fn new(along: Length, across: Length) -> Result<Self, SectionError> {
        for diameter in [along, across] {
            if diameter <= Length::ZERO {
                return Err(SectionError::Diameter(diameter));
            }
        }
        Ok(Self {
            along,
            across,
            holes: Vec::new(),
        })
    }

    /// The same stem with a cavity.
    ///
    /// # Errors
    /// [`SectionError::Cavity`] where it breaks the outline or has no size.
    pub fn with_cavity(mut self, cavity: Cavity) -> Result<Self, SectionError> {
        let hole = Hole {
            x: cavity.forward.value(),
            y: cavity.right.value(),
            r: 0.5 * cavity.diameter.value(),
        };
        if hole.r <= 0.0 || !hole.lies_inside(self.ellipse()) {
            return Err(SectionError::Cavity(cavity.diameter));
        }
        self.holes.push(hole);
        Ok(self)
    }

    /// Diameter along the lay.
    pub const fn along(&self) -> Length {
        self.along
    }

    /// Diameter across the lay.
    pub const fn across(&self) -> Length {
        self.across
    }

    /// The cavities.
    pub fn cavities(&self) -> Vec<Cavity> {
        self.holes
            .iter()
            .map(|hole| Cavity {
                diameter: Length::si(2.0 * hole.r),
                forward: Length::si(hole.x),
                right: Length::si(hole.y),
            })
            .collect()
    }

    /// The wood between two edges parallel to the hinge.
    ///
    /// # Model
    /// Closed forms of the circular segment, scaled across the lay for an oval, less the cavities.
    /// # Valid for
    /// Level, parallel cuts through a round or oval stem.
    /// # Errors
    /// [`SectionError::Empty`] where no wood lies between.
    /// # Source
    /// Geometry, checked against polygons and against quadrature.
    pub fn strip(&self, from: Length, to: Length) -> Result<Section, SectionError> {
        let shape = self.shape();
        let sums = shape.strip(from.value(), to.value());
        if sums.area <= 0.0 {
            return Err(SectionError::Empty { from, to });
        }
        let a = shape.ellipse.a;
        let rear = from.value().clamp(-a, a);
        let front = to.value().clamp(-a, a);
        Ok(sums.section(rear, front, shape.half_width(rear, front)))
    }

    /// The whole section.
    ///
    /// # Errors
    /// [`SectionError::Empty`] where the cavities leave nothing.
    pub fn whole(&self) -> Result<Section, SectionError> {
        let reach = self.along * 0.5;
        self.strip(-reach, reach)
    }

    /// The width of wood at an edge across the lay.
    ///
    /// # Model
    /// The chord of the outline less the chords of the cavities it meets.
    /// # Valid for
    /// Cavities that do not overlap.
    /// # Source
    /// Geometry.
    pub fn width_at(&self, forward: Length) -> Length {
        Length::si(self.shape().wood_chord(forward.value()))
    }

    pub(crate) const fn ellipse(&self) -> Ellipse {
        Ellipse {
            a: 0.5 * self.along.value(),
            k: self.across.value() / self.along.value(),
        }
    }

    pub(crate) fn shape(&self) -> Shape<'_> {
        Shape {
            ellipse: self.ellipse(),
            holes: &self.holes,
        }
    }

    pub(crate) fn holes(&self) -> &[Hole] {
        &self.holes
    }
}

/// Area, first moments and second moments about the stump's centre, in SI units.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub(crate) struct Sums {
    pub area: f64,
    pub x: f64,
    pub y: f64,
    pub xx: f64,
    pub yy: f64,
}

impl Sums {
    pub(crate) fn plus(self, other: Self) -> Self {
        Self {
            area: self.area + other.area,
            x: self.x + other.x,
            y: self.y + other.y,
            xx: self.xx + other.xx,
            yy: self.yy + other.yy,
        }
    }

    pub(crate) fn minus(self, other: Self) -> Self {
        Self {
            area: self.area - other.area,
            x: self.x - other.x,
            y: self.y - other.y,
            xx: self.xx - other.xx,
            yy: self.yy - other.yy,
        }
    }

    pub(crate) fn centroid(&self) -> f64 {
        self.x / self.area
    }

    pub(crate) fn inline(&self) -> f64 {
        self.xx - self.x * self.x / self.area
    }

    pub(crate) fn side(&self) -> f64 {
        self.yy - self.y * self.y / self.area
    }

    pub(crate) fn section(&self, rear: f64, front: f64, half_width: f64) -> Section {
        Section {
            area: Area::si(self.area),
            forward: Length::si(self.centroid()),
            right: Length::si(self.y / self.area),
            i_inline: SecondMoment::si(self.inline()),
            i_side: SecondMoment::si(self.side()),
            rear: Length::si(rear),
            front: Length::si(front),
            half_width: Length::si(half_width),
        }
    }
}

/// An oval: half the diameter along the lay, and the ratio of the diameters, across to along.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Ellipse {
    pub a: f64,
    pub k: f64,
}

impl Ellipse {
    /// All that lies at or beyond an edge.
    #[inline]
    pub(crate) fn beyond(&self, edge: f64) -> Sums {
        let cosine = (edge / self.a).clamp(-1.0, 1.0);
        let sine = (1.0 - cosine * cosine).sqrt();
        let angle = libm::acos(cosine);
        let product = cosine * sine;
        // sin 4φ / 4 in terms of the sine and cosine of φ.
        let quarter = product * (2.0 * cosine * cosine - 1.0);
        let square = self.a * self.a * self.k;
        Sums {
            area: square * (angle - product),
            x: 2.0 / 3.0 * square * self.a * sine * sine * sine,
            y: 0.0,
            xx: 0.25 * square * self.a * self.a * (angle - quarter),
            yy: 2.0 / 3.0
                * square
                * self.a
                * self.a
                * self.k
                * self.k
                * (0.375 * angle - 0.5 * product + 0.125 * quarter),
        }
    }

    #[inline]
    pub(crate) fn chord(&self, edge: f64) -> f64 {
        2.0 * self.k * (self.a * self.a - edge * edge).max(0.0).sqrt()
    }
}

/// A round cavity in plain numbers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Hole {
    pub x: f64,
    pub y: f64,
    pub r: f64,
}

impl Hole {
    fn beyond(&self, edge: f64) -> Sums {
        let own = Ellipse { a: self.r, k: 1.0 }.beyond(edge - self.x);
        Sums {
            area: own.area,
            x: own.x + self.x * own.area,
            y: self.y * own.area,
            xx: own.xx + 2.0 * self.x * own.x + self.x * self.x * own.area,
            yy: own.yy + self.y * self.y * own.area,
        }
    }

    fn chord(&self, edge: f64) -> f64 {
        let off = edge - self.x;
        2.0 * (self.r * self.r - off * off).max(0.0).sqrt()
    }

    fn lies_inside(&self, outline: Ellipse) -> bool {
        (0..72).all(|step| {
            let turn = f64::from(step) * std::f64::consts::PI / 36.0;
            let x = (self.x + self.r * libm::cos(turn)) / outline.a;
            let y = (self.y + self.r * libm::sin(turn)) / (outline.a * outline.k);
            x * x + y * y <= 1.0
        })
    }
}

/// The outline and its cavities, in plain numbers, for sums done thousands of times.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Shape<'a> {
    pub ellipse: Ellipse,
    pub holes: &'a [Hole],
}

impl Shape<'_> {
    #[inline]
    pub(crate) fn beyond(&self, edge: f64) -> Sums {
        let mut sums = self.ellipse.beyond(edge);
        for hole in self.holes {
            sums = sums.minus(hole.beyond(edge));
        }
        sums
    }

    pub(crate) fn strip(&self, from: f64, to: f64) -> Sums {
        if to <= from {
            return Sums::default();
        }
        self.beyond(from).minus(self.beyond(to))
    }

    #[inline]
    pub(crate) fn wood_chord(&self, edge: f64) -> f64 {
        let hollow: f64 = self.holes.iter().map(|hole| hole.chord(edge)).sum();
        (self.ellipse.chord(edge) - hollow).max(0.0)
    }

    /// Half the greatest width of the outline between two edges.
    pub(crate) fn half_width(&self, rear: f64, front: f64) -> f64 {
        let widest = 0.0_f64.clamp(rear.min(front), front.max(rear));
        0.5 * self.ellipse.chord(widest)
    }
}
