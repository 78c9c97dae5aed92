//! The entry of one species and what can be asked of it. It never computes a stem.

use crate::source::{Mark, Source};
use crate::species::GreenWood;
use crate::units::{Density, FractureEnergy, Stress};

/// Softwood or hardwood.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum WoodType {
    /// A conifer.
    Softwood,
    /// A broadleaf.
    Hardwood,
}

/// The ten groups of the national biomass equations.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum BiomassGroup {
    /// Group 1.
    CedarLarch,
    /// Group 2.
    DouglasFir,
    /// Group 3.
    TrueFirHemlock,
    /// Group 4.
    Pine,
    /// Group 5.
    Spruce,
    /// Group 6.
    AspenAlderCottonwoodWillow,
    /// Group 7.
    SoftMapleBirch,
    /// Group 8.
    MixedHardwood,
    /// Group 9.
    HardMapleOakHickoryBeech,
    /// Group 10, by the diameter at the root collar.
    JuniperOakMesquite,
}

impl BiomassGroup {
    /// Every group in the table's order.
    pub const ALL: [Self; 10] = [
        Self::CedarLarch,
        Self::DouglasFir,
        Self::TrueFirHemlock,
        Self::Pine,
        Self::Spruce,
        Self::AspenAlderCottonwoodWillow,
        Self::SoftMapleBirch,
        Self::MixedHardwood,
        Self::HardMapleOakHickoryBeech,
        Self::JuniperOakMesquite,
    ];
}

/// What sets a wood apart where stems split.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Trait {
    /// Nothing noted.
    Plain,
    /// Ring-porous wood.
    RingPorous,
    /// A ring-porous oak: its fracture energy is capped.
    RingPorousOak,
    /// Known for tension wood and high growth stress.
    GrowthStress,
}

/// One value of a species in words, for the page that says where figures come from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct KnownValue {
    /// What it is.
    pub what: &'static str,
    /// The number in the unit named.
    pub value: f64,
    /// The unit.
    pub unit: &'static str,
    /// Where it is from.
    pub source: Source,
}

/// Everything known of one species.
#[derive(Debug, Clone, PartialEq)]
pub struct Species {
    /// The name as the strength table writes it, the genus first.
    pub table_name: &'static str,
    /// The scientific name, from memory.
    pub scientific: &'static str,
    /// Softwood or hardwood.
    pub wood_type: WoodType,
    /// The biomass group.
    pub group: BiomassGroup,
    /// What sets it apart.
    pub wood_trait: Trait,
    /// The row of the green-weight table that serves it.
    pub green: GreenWood,
    /// Whether that row is the species' own or the unknown conifer's or hardwood's.
    pub green_source: Source,
    /// Oven-dry mass over green volume, a ratio to water.
    pub specific_gravity_green: f64,
    /// Oven-dry mass over volume at 12 % moisture, a ratio to water, where published.
    pub specific_gravity_12: Option<f64>,
    /// Where that ratio is from.
    pub specific_gravity_12_source: Source,
    /// Modulus of rupture, green.
    pub mor: Stress,
    /// Modulus of elasticity, green, from bending.
    pub moe: Stress,
    /// Work to maximum load, green, kJ/m³.
    pub work_to_maximum_load: Option<f64>,
    /// Crushing strength along the grain, green.
    pub crushing: Option<Stress>,
    /// Compression across the grain at the proportional limit, green.
    pub compression_across: Option<Stress>,
    /// Shear along the grain, green.
    pub shear: Option<Stress>,
    /// Tension across the grain, green.
    pub tension_across: Option<Stress>,
    /// Where the strengths are from.
    pub strength_source: Source,
    /// Green moisture of the heartwood, per cent of the oven-dry mass, with its mark.
    pub moisture_heart: Option<(f64, Source)>,
    /// Green moisture of the sapwood, per cent of the oven-dry mass, with its mark.
    pub moisture_sap: Option<(f64, Source)>,
}

/// Where the fracture-energy formula is from.
const FRACTURE_SOURCE: Source = Source {
    cite: "Larsen and Gustafsson 1990, CIB-W18A/23-19-2: G = 1.04 density − 146 J/m², within 35 %",
    mark: Mark::Memory,
};

/// Where the cap of the ring-porous oaks is from.
const OAK_CAP_SOURCE: Source = Source {
    cite: "Reiterer and others 2002, wedge splitting of dry oak: about 350 J/m²",
    mark: Mark::Memory,
};

/// The cap of the ring-porous oaks, J/m².
const OAK_CAP: f64 = 350.0;

impl Species {
    /// The name in the order it is spoken, such as `northern red oak`.
    pub fn name(&self) -> String {
        match self.table_name.split_once(", ") {
            Some((genus, rest)) if genus == "Douglas-fir" => format!("{rest} {genus}"),
            Some((genus, rest)) => format!("{rest} {}", genus.to_lowercase()),
            None => self.table_name.to_lowercase(),
        }
    }

    /// The ratio at 12 % moisture: published, or reckoned from the green one.
    ///
    /// # Model
    /// Where not published, `G12 = G / (1 − 0.265·0.6·G)`, shrinkage in proportion to `G`.
    /// # Valid for
    /// Sound wood of ordinary density.
    /// # Source
    /// Wood Handbook, chapter 4 (from memory), for the one species without a published ratio.
    pub fn specific_gravity_12(&self) -> f64 {
        self.specific_gravity_12.unwrap_or_else(|| {
            let green = self.specific_gravity_green;
            green / (1.0 - 0.265 * 0.6 * green)
        })
    }

    /// The density at 12 % moisture, water included.
    ///
    /// # Model
    /// `1120·G12`.
    /// # Valid for
    /// 12 % moisture.
    /// # Source
    /// The definition of the ratio, derived.
    pub fn density_12(&self) -> Density {
        Density::si(1120.0 * self.specific_gravity_12())
    }

    /// The fracture energy of an opening crack along the grain, capped for ring-porous oaks.
    ///
    /// # Model
    /// `1.04·density − 146 J/m²`; a ring-porous oak at most 350 J/m².
    /// # Valid for
    /// Softwoods of 300 to 500 kg/m³ by the tests behind it; other woods within 35 % and worse.
    /// # Source
    /// Larsen and Gustafsson 1990 (from memory); the cap after Reiterer and others (from memory).
    pub fn fracture_energy(&self) -> FractureEnergy {
        FractureEnergy::si((1.04 * self.density_12().value() - 146.0).max(0.0))
            .min(self.fracture_energy_cap())
    }

    /// The most the fracture energy is taken to be: a cap for ring-porous oaks, none otherwise.
    ///
    /// # Model
    /// 350 J/m² for a ring-porous oak.
    /// # Valid for
    /// Values reckoned from density; a measured one is used as given.
    /// # Source
    /// Reiterer and others 2002 (from memory).
    pub const fn fracture_energy_cap(&self) -> FractureEnergy {
        match self.wood_trait {
            Trait::RingPorousOak => FractureEnergy::si(OAK_CAP),
            Trait::Plain | Trait::RingPorous | Trait::GrowthStress => FractureEnergy::si(f64::MAX),
        }
    }

    /// Where the fracture energy is from.
    pub fn fracture_source(&self) -> Source {
        let formula = 1.04 * self.density_12().value() - 146.0;
        match self.wood_trait {
            Trait::RingPorousOak if formula > OAK_CAP => OAK_CAP_SOURCE,
            Trait::RingPorousOak | Trait::Plain | Trait::RingPorous | Trait::GrowthStress => {
                FRACTURE_SOURCE
            }
        }
    }

    /// Whether the wood is ring-porous.
    pub fn ring_porous(&self) -> bool {
        match self.wood_trait {
            Trait::RingPorous | Trait::RingPorousOak => true,
            Trait::Plain | Trait::GrowthStress => false,
        }
    }

    /// Whether the wood is known for tension wood and growth stress.
    pub fn growth_stress(&self) -> bool {
        match self.wood_trait {
            Trait::GrowthStress => true,
            Trait::Plain | Trait::RingPorous | Trait::RingPorousOak => false,
        }
    }

    /// Every value with its source, in a fixed order.
    pub fn known_values(&self) -> Vec<KnownValue> {
        let mut values = self.density_values();
        values.extend(self.strength_values());
        values.push(KnownValue {
            what: "fracture energy, opening crack along the grain",
            value: self.fracture_energy().value(),
            unit: FractureEnergy::UNIT,
            source: self.fracture_source(),
        });
        values.extend(self.green.known_values(self.green_source));
        values
    }

    fn density_values(&self) -> Vec<KnownValue> {
        let mut values = vec![
            KnownValue {
                what: "specific gravity, green",
                value: self.specific_gravity_green,
                unit: "",
                source: self.strength_source,
            },
            KnownValue {
                what: "specific gravity at 12 % moisture",
                value: self.specific_gravity_12(),
                unit: "",
                source: self.specific_gravity_12_source,
            },
        ];
        let moistures = [
            ("green moisture of the heartwood", self.moisture_heart),
            ("green moisture of the sapwood", self.moisture_sap),
        ];
        for (what, entry) in moistures {
            if let Some((value, source)) = entry {
                values.push(KnownValue {
                    what,
                    value,
                    unit: "%",
                    source,
                });
            }
        }
        values
    }

    fn strength_values(&self) -> Vec<KnownValue> {
        let strengths = [
            ("modulus of rupture, green", Some(self.mor)),
            ("modulus of elasticity, green", Some(self.moe)),
            ("crushing strength along the grain, green", self.crushing),
            (
                "compression across the grain, green",
                self.compression_across,
            ),
            ("shear along the grain, green", self.shear),
            ("tension across the grain, green", self.tension_across),
        ];
        let mut values: Vec<KnownValue> = strengths
            .into_iter()
            .filter_map(|(what, value)| {
                value.map(|stress| KnownValue {
                    what,
                    value: stress.value(),
                    unit: Stress::UNIT,
                    source: self.strength_source,
                })
            })
            .collect();
        if let Some(work) = self.work_to_maximum_load {
            values.push(KnownValue {
                what: "work to maximum load, green",
                value: work,
                unit: "kJ/m³",
                source: self.strength_source,
            });
        }
        values
    }
}
