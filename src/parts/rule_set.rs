//! A rule set: which rules are on, their figures, and what each rests on. It holds no rule's
//! working; the room `rules` computes.

use serde::Deserialize;

use crate::plan::quantity::{self, Kind};
use crate::source::Mark;
use crate::units::{Angle, Length, Voltage};

/// A rule set as read from `plans/rules/`.
#[derive(Debug, Clone, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct RuleSet {
    /// Its name, as written in a plan.
    pub set: String,
    /// Its title.
    pub title: String,
    /// Which edition it follows.
    pub edition: String,
    /// What it is for.
    pub scope: String,
    /// When its sources were read.
    pub read: String,
    /// The sentence that local law decides.
    pub local_law: String,
    /// The figures.
    pub figures: Figures,
    /// Where first-aid kits must be.
    pub kits: Vec<KitPlace>,
    /// How far a back leaner may lean for wedges.
    pub wedges: WedgeTable,
    /// The rules that are on.
    pub rules: Vec<RuleLine>,
}

impl RuleSet {
    /// The line of a rule, where it is on.
    pub fn line(&self, code: &str) -> Option<&RuleLine> {
        self.rules.iter().find(|line| line.code == code)
    }
}

/// One rule that is on.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct RuleLine {
    /// Its code.
    pub code: String,
    /// Document and paragraph.
    pub source: String,
    /// How it was taken from there.
    #[serde(deserialize_with = "mark")]
    pub mark: Mark,
    /// What was read of it.
    pub read_in: String,
}

/// The figures of a set.
#[derive(Debug, Clone, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Figures {
    /// Tree lengths to others' work areas.
    pub ring_tree_lengths: Figure<f64>,
    /// The same where stems roll or slide.
    pub ring_tree_lengths_on_slope: Figure<f64>,
    /// The slope from which stems roll or slide.
    pub roll_slope: Figure<Angle>,
    /// Tree lengths to machines.
    pub machine_tree_lengths: Figure<f64>,
    /// Tree lengths to a danger tree that stands.
    pub danger_tree_lengths: Figure<f64>,
    /// Turn from the lay to a way out, either side.
    pub way_out_turn: Figure<Angle>,
    /// How far it may differ.
    pub way_out_tolerance: Figure<Angle>,
    /// Its least length.
    pub way_out_length: Figure<Length>,
    /// Least angle between a way out and the side the tree leans to.
    pub way_out_off_lean: Figure<Angle>,
    /// The lean from which its direction counts.
    pub lean_that_counts: Figure<Angle>,
    /// The lean from which it is unusually hazardous.
    pub heavy_lean: Figure<Angle>,
    /// The diameter from which a tree is very large.
    pub large_stump: Figure<Length>,
    /// The height from which a tree is very tall.
    pub tall_tree: Figure<Length>,
    /// Half-angle of the ground a tree may come down on.
    pub lay_sector: Figure<Angle>,
    /// Difference of level that counts as none.
    pub level_tolerance: Figure<Length>,
    /// Least distance to a power line.
    pub line_distance: Figure<Length>,
    /// Up to this voltage.
    pub line_voltage: Figure<Voltage>,
    /// More distance for each step of this voltage.
    pub line_step_voltage: Figure<Voltage>,
    /// How much more.
    pub line_step: Figure<Length>,
    /// Least face depth over the diameter.
    pub face_share_least: Figure<f64>,
    /// Most face depth over the diameter.
    pub face_share_most: Figure<f64>,
    /// Least opening of an open face.
    pub opening_open: Figure<Angle>,
    /// Least opening of other faces.
    pub opening_other: Figure<Angle>,
    /// Least hinge over the diameter.
    pub hinge_share_least: Figure<f64>,
    /// Past this thickness the share asks for no more.
    pub hinge_least_cap: Figure<Length>,
    /// Most hinge over the diameter.
    pub hinge_share_most: Figure<f64>,
    /// Least height of the back cut above a level face cut.
    pub back_cut_height: Figure<Length>,
}

/// A figure with what it rests on.
#[derive(Debug, Clone, PartialEq, Deserialize)]
#[serde(
    try_from = "RawFigure",
    bound(deserialize = "T: FigureValue, Figure<T>: TryFrom<RawFigure, Error = String>")
)]
pub struct Figure<T> {
    /// The figure.
    pub value: T,
    /// What it rests on.
    pub source: String,
    /// How it was taken from there.
    pub mark: Mark,
}

/// A figure as written.
#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct RawFigure {
    value: String,
    source: String,
    mark: String,
}

/// A value a figure can have: a quantity with its unit, or a plain number.
pub trait FigureValue: Sized {
    /// Reads it.
    ///
    /// # Errors
    /// In words, what is wrong with the text.
    fn read(text: &str) -> Result<Self, String>;
}

impl FigureValue for f64 {
    fn read(text: &str) -> Result<Self, String> {
        match text.parse::<Self>() {
            Ok(value) if value.is_finite() && value > 0.0 => Ok(value),
            Ok(_) | Err(_) => Err(format!("`{text}` is no number above nothing")),
        }
    }
}

impl FigureValue for Length {
    fn read(text: &str) -> Result<Self, String> {
        si(text, Kind::Length).map(Self::si)
    }
}

impl FigureValue for Angle {
    fn read(text: &str) -> Result<Self, String> {
        si(text, Kind::Angle).map(Self::si)
    }
}

impl FigureValue for Voltage {
    fn read(text: &str) -> Result<Self, String> {
        si(text, Kind::Voltage).map(Self::si)
    }
}

fn si(text: &str, kind: Kind) -> Result<f64, String> {
    let read = quantity::read(text, kind).map_err(|refused| format!("`{text}`: {refused}"))?;
    if read.value > 0.0 {
        Ok(read.value)
    } else {
        Err(format!("`{text}` is not above nothing"))
    }
}

impl<T: FigureValue> TryFrom<RawFigure> for Figure<T> {
    type Error = String;

    fn try_from(raw: RawFigure) -> Result<Self, String> {
        Ok(Self {
            value: T::read(&raw.value)?,
            source: raw.source,
            mark: mark_of(&raw.mark)?,
        })
    }
}

/// A place that needs a first-aid kit.
#[derive(Debug, Clone, PartialEq, Eq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct KitPlace {
    /// The place.
    pub place: String,
    /// Words by which a kit's place is known to be this one.
    pub words: Vec<String>,
    /// Needed only where the site has a feature of this kind.
    pub feature: Option<String>,
}

/// Largest back lean at the top by height over diameter.
#[derive(Debug, Clone, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct WedgeTable {
    /// What it rests on.
    pub source: String,
    /// How it was taken from there.
    #[serde(deserialize_with = "mark")]
    pub mark: Mark,
    /// Rows in rising order of the ratio.
    pub rows: Vec<WedgeRow>,
}

/// One row of the wedge table.
#[derive(Debug, Clone, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct WedgeRow {
    /// Height over diameter at breast height.
    pub ratio: f64,
    /// Largest back lean at the top.
    #[serde(deserialize_with = "length")]
    pub lean: Length,
}

impl WedgeTable {
    /// The largest back lean at the top: of the last row not past the ratio, nothing below the
    /// first.
    pub fn back_lean_most(&self, ratio: f64) -> Option<Length> {
        let row = self.rows.iter().rev().find(|row| row.ratio <= ratio);
        row.map(|row| row.lean)
    }
}

fn mark_of(word: &str) -> Result<Mark, String> {
    let all = [
        Mark::Opened,
        Mark::Derived,
        Mark::Memory,
        Mark::CommonPractice,
        Mark::Judgement,
    ];
    let found = all.into_iter().find(|mark| mark.word() == word);
    found.ok_or_else(|| format!("`{word}` is no mark of a value"))
}

fn mark<'de, D: serde::Deserializer<'de>>(reader: D) -> Result<Mark, D::Error> {
    let word = String::deserialize(reader)?;
    mark_of(&word).map_err(serde::de::Error::custom)
}

fn length<'de, D: serde::Deserializer<'de>>(reader: D) -> Result<Length, D::Error> {
    let text = String::deserialize(reader)?;
    Length::read(&text).map_err(serde::de::Error::custom)
}
