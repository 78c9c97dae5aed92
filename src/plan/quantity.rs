//! Reads one quantity: `number [± spread] unit`, feet and inches, bearings. Text in, SI out.
//! It never guesses a unit.

use std::fmt;

use crate::units::Bearing;

/// Kinds of units.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Kind {
    /// Metres.
    Length,
    /// Radians.
    Angle,
    /// Radians; written in degrees or as a grade.
    Slope,
    /// Kilograms.
    Mass,
    /// Newtons.
    Force,
    /// Pascals.
    Stress,
    /// kg/m³.
    Density,
    /// J/m².
    FractureEnergy,
    /// m/s.
    Speed,
    /// Volts.
    Voltage,
    /// m³.
    SweptVolume,
    /// Watts.
    Power,
    /// m²/s.
    CutRate,
    /// Seconds.
    Time,
}

/// Inch in metres, exact (international yard and pound agreement, 1959).
const INCH: f64 = 0.0254;
/// Pound in kilograms, exact (same agreement).
const POUND: f64 = 0.453_592_37;
/// Pound-force in newtons, from the pound and standard gravity.
const POUND_FORCE: f64 = POUND * crate::units::GRAVITY;

impl Kind {
    /// Unit words with the factor to SI. A factor of zero marks the grade, which is no factor.
    pub const fn units(self) -> &'static [(&'static str, f64)] {
        match self {
            Self::Length => &[
                ("mm", 1.0e-3),
                ("cm", 1.0e-2),
                ("m", 1.0),
                ("in", INCH),
                ("ft", 12.0 * INCH),
            ],
            Self::Angle => &[("deg", std::f64::consts::PI / 180.0)],
            Self::Slope => &[("deg", std::f64::consts::PI / 180.0), ("%", 0.0)],
            Self::Mass => &[("kg", 1.0), ("t", 1000.0), ("lb", POUND)],
            Self::Force => &[("N", 1.0), ("kN", 1.0e3), ("lbf", POUND_FORCE)],
            Self::Stress => &[
                ("MPa", 1.0e6),
                ("GPa", 1.0e9),
                ("psi", POUND_FORCE / (INCH * INCH)),
            ],
            Self::Density => &[
                ("kg/m³", 1.0),
                ("kg/m3", 1.0),
                ("lb/ft³", POUND / (1728.0 * INCH * INCH * INCH)),
                ("lb/ft3", POUND / (1728.0 * INCH * INCH * INCH)),
            ],
            Self::FractureEnergy => &[("J/m²", 1.0), ("J/m2", 1.0)],
            Self::Speed => &[
                ("m/s", 1.0),
                ("km/h", 1.0 / 3.6),
                ("mph", 0.447_04),
                ("kn", 1852.0 / 3600.0),
            ],
            Self::Voltage => &[("V", 1.0), ("kV", 1000.0)],
            Self::SweptVolume => &[("cc", 1.0e-6)],
            Self::Power => &[("kW", 1000.0), ("hp", 745.699_871_582_270_2)],
            Self::CutRate => &[
                ("cm²/s", 1.0e-4),
                ("cm2/s", 1.0e-4),
                ("in²/s", INCH * INCH),
                ("in2/s", INCH * INCH),
            ],
            Self::Time => &[("s", 1.0), ("min", 60.0), ("h", 3600.0)],
        }
    }

    /// The unit words in one string, for messages.
    pub fn unit_words(self) -> String {
        let words: Vec<&str> = self.units().iter().map(|(word, _)| *word).collect();
        words.join(", ")
    }
}

/// Why a text is no quantity.
#[derive(Debug, Clone, PartialEq)]
pub enum Refused {
    /// Nothing was written.
    Empty,
    /// A number with a decimal comma.
    Comma,
    /// A number without a unit.
    Bare,
    /// No number at its beginning.
    NoNumber,
    /// NaN or infinite, or too large to hold.
    NotFinite,
    /// A unit that is none of this kind.
    Unit(String),
    /// A negative spread.
    NegativeSpread,
}

impl fmt::Display for Refused {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Empty => f.write_str("nothing is written here"),
            Self::Comma => f.write_str("a decimal comma stands here"),
            Self::Bare => f.write_str("a number without its unit stands here"),
            Self::NoNumber => f.write_str("no number stands here"),
            Self::NotFinite => f.write_str("this is not a finite number"),
            Self::Unit(unit) => write!(f, "`{unit}` is not a unit for this"),
            Self::NegativeSpread => f.write_str("a spread cannot be negative"),
        }
    }
}

/// A quantity as read: SI value and written spread, if any.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Read {
    /// Central value in SI.
    pub value: f64,
    /// One standard deviation in SI, where written.
    pub spread: Option<f64>,
}

/// Reads a quantity of a kind.
///
/// # Errors
/// [`Refused`], with the reason.
pub fn read(text: &str, kind: Kind) -> Result<Read, Refused> {
    let text = text.trim();
    if text.is_empty() {
        return Err(Refused::Empty);
    }
    if kind == Kind::Length
        && let Some(read) = feet_and_inches(text)?
    {
        return Ok(read);
    }
    let (value, rest) = number(text)?;
    let rest = rest.trim_start();
    let (spread, rest) = match rest.strip_prefix('±').or_else(|| rest.strip_prefix("+-")) {
        Some(after) => {
            let (spread, rest) = number(after.trim_start())?;
            (Some(spread), rest.trim_start())
        }
        None => (None, rest),
    };
    if rest.is_empty() {
        return Err(Refused::Bare);
    }
    let found = kind.units().iter().find(|(word, _)| *word == rest);
    let (word, factor) = found.ok_or_else(|| Refused::Unit(rest.to_owned()))?;
    let si = |x: f64| {
        if *word == "%" {
            libm::atan(x / 100.0)
        } else {
            x * factor
        }
    };
    let (value_si, spread_si) = match (*word, spread) {
        ("%", Some(spread)) => {
            let half = (si(value + spread) - si(value - spread)) / 2.0;
            (si(value), Some(half))
        }
        (_, spread) => (si(value), spread.map(si)),
    };
    checked(value_si, spread_si)
}

fn checked(value: f64, spread: Option<f64>) -> Result<Read, Refused> {
    if !value.is_finite() || spread.is_some_and(|s| !s.is_finite()) {
        return Err(Refused::NotFinite);
    }
    if spread.is_some_and(|s| s < 0.0) {
        return Err(Refused::NegativeSpread);
    }
    Ok(Read { value, spread })
}

/// `6 ft 4 in`; nothing where the text is of another form.
fn feet_and_inches(text: &str) -> Result<Option<Read>, Refused> {
    let Some(rest) = text.strip_suffix("in") else {
        return Ok(None);
    };
    let Some((feet, inches)) = rest.split_once("ft") else {
        return Ok(None);
    };
    let (feet, after_feet) = number(feet.trim())?;
    let (inches, after_inches) = number(inches.trim())?;
    if !after_feet.is_empty() || !after_inches.is_empty() {
        return Err(Refused::NoNumber);
    }
    checked((feet * 12.0 + inches) * INCH, None).map(Some)
}

/// The number at a text's beginning and what follows it.
fn number(text: &str) -> Result<(f64, &str), Refused> {
    let lower = text.to_ascii_lowercase();
    let unsigned = lower.trim_start_matches(['+', '-']).trim_start_matches('.');
    if unsigned.starts_with("nan") || unsigned.starts_with("inf") {
        return Err(Refused::NotFinite);
    }
    let end = number_end(text);
    let (head, rest) = text.split_at(end);
    if rest.starts_with(',') && rest[1..].starts_with(|c: char| c.is_ascii_digit()) {
        return Err(Refused::Comma);
    }
    let value: f64 = head.parse().map_err(|_| Refused::NoNumber)?;
    if !value.is_finite() {
        return Err(Refused::NotFinite);
    }
    Ok((value, rest))
}

fn number_end(text: &str) -> usize {
    let bytes = text.as_bytes();
    let digits_from = |mut at: usize| {
        while bytes.get(at).is_some_and(u8::is_ascii_digit) {
            at += 1;
        }
        at
    };
    let mut at = usize::from(matches!(bytes.first(), Some(b'+' | b'-')));
    at = digits_from(at);
    if bytes.get(at) == Some(&b'.') {
        at = digits_from(at + 1);
    }
    if matches!(bytes.get(at), Some(b'e' | b'E')) {
        let sign = usize::from(matches!(bytes.get(at + 1), Some(b'+' | b'-')));
        let end = digits_from(at + 1 + sign);
        if end > at + 1 + sign {
            at = end;
        }
    }
    at
}

/// The sixteen compass words, clockwise from north.
pub const COMPASS: [&str; 16] = [
    "N", "NNE", "NE", "ENE", "E", "ESE", "SE", "SSE", "S", "SSW", "SW", "WSW", "W", "WNW", "NW",
    "NNW",
];

/// Reads a bearing: degrees in 0..=360 with their unit, or a compass word.
///
/// # Errors
/// [`Refused`], with the reason; a bearing outside 0..=360 degrees is refused as no number.
pub fn read_bearing(text: &str) -> Result<Bearing, Refused> {
    let text = text.trim();
    let upper = text.to_ascii_uppercase();
    if let Some(index) = COMPASS.iter().position(|word| *word == upper) {
        let sector = u8::try_from(index).map_or(0.0, f64::from);
        return Ok(Bearing::deg(sector * 22.5));
    }
    let read = read(text, Kind::Angle)?;
    let degrees = read.value.to_degrees();
    // Half a millidegree of room for the rounding of the unit's factor.
    if (-0.0005..=360.0005).contains(&degrees) && read.spread.is_none() {
        Ok(Bearing::deg(degrees))
    } else {
        Err(Refused::NoNumber)
    }
}
