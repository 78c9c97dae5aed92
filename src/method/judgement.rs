//! The figures that are our own judgement, in one settable table. None is published; each was
//! tried over 2,964 trees (six species, thirteen diameters, nineteen leans, two crowns).

use crate::source::{Mark, Source};
use crate::units::{Angle, Duration, Length};

/// The judged figures that choose a method.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Judgement {
    /// The thickest hinge.
    pub hinge_max: Length,
    /// The hinge planned, as a share of the diameter.
    pub hinge_share: f64,
    /// The thinnest hinge that is proposed, as a share of the diameter.
    pub hinge_share_min: f64,
    /// The least central split ratio.
    pub central_ratio_min: f64,
    /// The longest stretch of a straight back cut.
    pub straight_stretch_max: Duration,
    /// The most lean of the weight for a straight back cut in a large tree.
    pub straight_lean_large_max: Angle,
    /// The longest brisk stretch.
    pub brisk_stretch_max: Duration,
    /// The most tilt at the hinge with the central demand.
    pub tilt_central_max: Angle,
    /// The most tilt at the hinge with the demand's cautious end.
    pub tilt_cautious_max: Angle,
    /// The smallest diameter for a plunge.
    pub plunge_diameter_min: Length,
    /// The least room for a plunge.
    pub plunge_room_min: Length,
    /// The largest diameter for a side-relieved back cut.
    pub relieved_diameter_max: Length,
    /// The most lift asked of a wedge.
    pub wedge_lift_max: Length,
    /// The room a wedge needs behind the bar's nose.
    pub wedge_room: Length,
    /// The worst credible side ratio below which side steering matters.
    pub side_ratio_wanted: f64,
}

/// The table in use.
pub const STANDARD: Judgement = Judgement {
    hinge_max: Length::cm(8.0),
    hinge_share: 0.10,
    hinge_share_min: 0.07,
    central_ratio_min: 1.7,
    straight_stretch_max: Duration::si(1.0),
    straight_lean_large_max: Angle::deg(5.0),
    brisk_stretch_max: Duration::si(5.0),
    tilt_central_max: Angle::deg(5.0),
    tilt_cautious_max: Angle::deg(10.0),
    plunge_diameter_min: Length::cm(25.0),
    plunge_room_min: Length::mm(15.0),
    relieved_diameter_max: Length::cm(30.0),
    wedge_lift_max: Length::cm(5.0),
    wedge_room: Length::cm(6.0),
    side_ratio_wanted: 2.0,
};

/// One line of the table, for the page that says where figures come from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct JudgementRow {
    /// What it is.
    pub what: &'static str,
    /// Its number in the unit named.
    pub value: f64,
    /// The unit.
    pub unit: &'static str,
    /// Where it is from.
    pub source: Source,
}

/// Where a judged figure is from.
const JUDGED: Source = Source {
    cite: "this project, tried over 2,964 trees",
    mark: Mark::Judgement,
};

/// Where the central ratio is from.
const DERIVED: Source = Source {
    cite: "a code's characteristic over mean fracture energy, and a load of three seconds: 1/0.589",
    mark: Mark::Derived,
};

/// Where the tenth is from.
const PRACTICE: Source = Source {
    cite: "hinge about a tenth of the diameter",
    mark: Mark::CommonPractice,
};

impl Judgement {
    /// Every line with its source.
    pub fn rows(&self) -> Vec<JudgementRow> {
        let row = |what, value, unit, source| JudgementRow {
            what,
            value,
            unit,
            source,
        };
        vec![
            row("thickest hinge", self.hinge_max.in_cm(), "cm", JUDGED),
            row(
                "hinge planned, share of the diameter",
                self.hinge_share,
                "",
                PRACTICE,
            ),
            row(
                "thinnest hinge, share of the diameter",
                self.hinge_share_min,
                "",
                JUDGED,
            ),
            row(
                "least central split ratio",
                self.central_ratio_min,
                "",
                DERIVED,
            ),
            row(
                "longest stretch of a straight back cut",
                self.straight_stretch_max.value(),
                "s",
                JUDGED,
            ),
            row(
                "most lean for a straight back cut in a large tree",
                self.straight_lean_large_max.in_deg(),
                "deg",
                JUDGED,
            ),
            row(
                "longest brisk stretch",
                self.brisk_stretch_max.value(),
                "s",
                JUDGED,
            ),
            row(
                "most tilt at the hinge, central demand",
                self.tilt_central_max.in_deg(),
                "deg",
                JUDGED,
            ),
            row(
                "most tilt at the hinge, cautious demand",
                self.tilt_cautious_max.in_deg(),
                "deg",
                JUDGED,
            ),
            row(
                "smallest diameter for a plunge",
                self.plunge_diameter_min.in_cm(),
                "cm",
                JUDGED,
            ),
            row(
                "least room for a plunge",
                self.plunge_room_min.in_mm(),
                "mm",
                JUDGED,
            ),
            row(
                "largest diameter for relieved corners",
                self.relieved_diameter_max.in_cm(),
                "cm",
                JUDGED,
            ),
            row(
                "most lift asked of a wedge",
                self.wedge_lift_max.in_cm(),
                "cm",
                JUDGED,
            ),
            row(
                "room a wedge needs behind the nose",
                self.wedge_room.in_cm(),
                "cm",
                JUDGED,
            ),
            row(
                "worst credible side ratio wanted",
                self.side_ratio_wanted,
                "",
                JUDGED,
            ),
        ]
    }
}
