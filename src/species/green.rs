//! Green weights: basic specific gravity, moisture and bark share, by species row.
//! Source of every row: FIA database, reference table of species (USDA Forest Service; values
//! mostly from Miles and Smith 2009, Research Note NRS-38), opened. Nothing here is fitted.

use crate::source::{Mark, Source};
use crate::species::{KnownValue, WoodType};
use crate::units::Density;

/// One row of the green-weight table.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GreenWood {
    /// The number of the row in the reference table.
    pub code: u16,
    /// The row's name.
    pub name: &'static str,
    /// Softwood or hardwood.
    pub wood_type: WoodType,
    /// Basic specific gravity of the wood: oven-dry mass over green volume.
    pub wood_gravity: f64,
    /// Basic specific gravity of the bark.
    pub bark_gravity: f64,
    /// Green moisture of the wood, per cent of the oven-dry mass.
    pub wood_moisture: f64,
    /// Green moisture of the bark, per cent of the oven-dry mass.
    pub bark_moisture: f64,
    /// Bark volume, per cent of the wood volume.
    pub bark_volume: f64,
    /// Green mass over oven-dry mass, wood and bark together, as the table prints it.
    pub factor: f64,
}

/// Where a row of the species' own is from.
pub(super) const OWN: Source = Source {
    cite: "FIA database, reference table of species (USDA Forest Service)",
    mark: Mark::Opened,
};

/// Where the stand-in row is from.
pub(super) const STAND_IN: Source = Source {
    cite: "FIA database, rows of the unknown conifer and hardwood, for want of the species' own; \
           the wood's specific gravity from the strength table",
    mark: Mark::Derived,
};

impl GreenWood {
    /// Green mass over oven-dry mass, reckoned from the row's other columns.
    ///
    /// # Model
    /// `[f_w G_w (1+M_w) + f_b G_b (1+M_b)] / [f_w G_w + f_b G_b]`, with `f_b = B/(100+B)`.
    /// # Valid for
    /// Living trees; a young stem all of sapwood may be half as heavy again.
    /// # Source
    /// The rule behind the table's own multiplier; the moistures here are rounded to a tenth of a
    /// per cent, so the two agree to 0.0005, and the table's own is the one used.
    pub fn reckoned_factor(&self) -> f64 {
        let bark = self.bark_volume / (100.0 + self.bark_volume);
        let wood_dry = (1.0 - bark) * self.wood_gravity;
        let bark_dry = bark * self.bark_gravity;
        let green = wood_dry * (1.0 + self.wood_moisture / 100.0)
            + bark_dry * (1.0 + self.bark_moisture / 100.0);
        green / (wood_dry + bark_dry)
    }

    /// Density of the green wood.
    ///
    /// # Model
    /// `1000·G_w·(1 + M_w/100)`.
    /// # Valid for
    /// Living trees.
    /// # Source
    /// Derived from the row.
    pub fn wood_density(&self) -> Density {
        Density::si(1000.0 * self.wood_gravity * (1.0 + self.wood_moisture / 100.0))
    }

    /// Density of the green bark.
    ///
    /// # Model
    /// `1000·G_b·(1 + M_b/100)`.
    /// # Valid for
    /// Living trees.
    /// # Source
    /// Derived from the row.
    pub fn bark_density(&self) -> Density {
        Density::si(1000.0 * self.bark_gravity * (1.0 + self.bark_moisture / 100.0))
    }

    pub(super) fn known_values(&self, source: Source) -> Vec<KnownValue> {
        let rows = [
            ("specific gravity of the wood, basic", self.wood_gravity, ""),
            ("specific gravity of the bark, basic", self.bark_gravity, ""),
            ("green moisture of the wood", self.wood_moisture, "%"),
            ("green moisture of the bark", self.bark_moisture, "%"),
            ("bark volume over wood volume", self.bark_volume, "%"),
            ("green mass over dry mass", self.factor, ""),
        ];
        rows.into_iter()
            .map(|(what, value, unit)| KnownValue {
                what,
                value,
                unit,
                source,
            })
            .collect()
    }
}

/// The row with this number.
pub(super) const fn row(code: u16) -> GreenWood {
    let mut index = 0;
    while index < ROWS.len() {
        if ROWS[index].code == code {
            return ROWS[index];
        }
        index += 1;
    }
    panic!("the species table names only rows that are here");
}

macro_rules! rows {
    (@kind S) => { WoodType::Softwood };
    (@kind H) => { WoodType::Hardwood };
    ($($code:literal $name:literal $kind:ident $gw:literal $gb:literal $mw:literal $mb:literal $b:literal $k:literal;)*) => {
        [$(GreenWood {
            code: $code,
            name: $name,
            wood_type: rows!(@kind $kind),
            wood_gravity: $gw,
            bark_gravity: $gb,
            wood_moisture: $mw,
            bark_moisture: $mb,
            bark_volume: $b,
            factor: $k,
        },)*]
    };
}

/// The rows: number, name, softwood or hardwood, gravity of wood and bark, moisture of wood and
/// bark in per cent, bark volume in per cent, green over dry mass.
#[rustfmt::skip]
#[expect(
    clippy::approx_constant,
    reason = "one measured ratio happens to look like the root of two"
)]
const ROWS: [GreenWood; 60] = rows! {
    12 "balsam fir" S 0.33 0.40 118.5 100.3 12.0 2.1623;
    15 "white fir" S 0.37 0.56 103.6 63.1 12.0 1.9735;
    17 "grand fir" S 0.35 0.57 106.1 63.1 12.0 1.9903;
    68 "E. redcedar" S 0.44 0.40 34.8 60.3 12.0 1.3726;
    71 "tamarack" S 0.49 0.30 53.7 97.6 14.0 1.5718;
    73 "western larch" S 0.48 0.33 60.3 65.1 14.0 1.6068;
    91 "Norway spruce" S 0.36 0.44 59.2 80.6 12.56 1.6205;
    93 "Engelmann spruce" S 0.33 0.51 89.4 79.1 11.2 1.8788;
    94 "white spruce" S 0.37 0.39 51.6 76.7 13.0 1.5462;
    97 "red spruce" S 0.37 0.32 47.3 75.3 13.0 1.5010;
    98 "Sitka spruce" S 0.33 0.55 60.2 80.7 12.5 1.6376;
    105 "jack pine" S 0.40 0.41 100.3 91.5 14.0 1.9922;
    108 "lodgepole pine" S 0.38 0.38 64.5 64.5 8.9 1.6447;
    110 "shortleaf pine" S 0.47 0.35 77.3 60.3 16.0 1.7548;
    111 "slash pine" S 0.54 0.35 72.1 87.7 18.0 1.7376;
    121 "longleaf pine" S 0.54 0.45 63.2 88.8 14.0 1.6589;
    122 "ponderosa pine" S 0.38 0.35 89.8 32.8 25.6 1.7891;
    125 "red pine" S 0.41 0.27 64.2 89.9 16.0 1.6663;
    129 "E. white pine" S 0.34 0.47 65.0 70.5 16.0 1.6597;
    130 "Scotch pine" S 0.43 0.40 76.1 68.4 16.13 1.7512;
    131 "loblolly pine" S 0.47 0.33 80.7 99.1 16.6 1.8264;
    202 "Douglas-fir" S 0.45 0.44 35.3 89.4 17.3 1.4315;
    211 "redwood" S 0.36 0.43 122.6 15.5 18.0 2.0364;
    241 "N. white-cedar" S 0.29 0.42 98.9 90.8 14.0 1.9756;
    242 "W. redcedar" S 0.31 0.37 39.6 55.9 10.6 1.4142;
    261 "E. hemlock" S 0.38 0.46 110.9 98.6 17.0 2.0877;
    263 "W. hemlock" S 0.42 0.50 56.5 101.9 15.8 1.6365;
    299 "unknown conifer" S 0.41 0.42 74.3 70.5 14.31 1.7381;
    312 "bigleaf maple" H 0.44 0.48 71.2 113.7 10.0 1.7536;
    316 "red maple" H 0.49 0.60 63.5 79.0 8.6 1.6500;
    317 "silver maple" H 0.44 0.57 67.5 79.9 8.6 1.6879;
    318 "sugar maple" H 0.56 0.54 57.4 89.9 15.6 1.6165;
    351 "red alder" H 0.37 0.56 99.2 74.6 12.0 1.9545;
    371 "yellow birch" H 0.55 0.62 71.9 60.3 9.8 1.7075;
    375 "paper birch" H 0.48 0.56 73.6 51.7 12.6 1.7079;
    403 "pignut hickory" H 0.66 0.60 65.1 60.3 16.0 1.6449;
    407 "shagbark hickory" H 0.64 0.72 60.3 33.5 16.0 1.5618;
    510 "eucalyptus spp." H 0.52 0.53 75.1 80.5 15.16 1.7585;
    531 "American beech" H 0.56 0.67 54.5 89.0 6.0 1.5684;
    541 "white ash" H 0.55 0.50 45.7 89.1 16.0 1.5120;
    544 "green ash" H 0.53 0.48 57.2 70.3 16.0 1.5888;
    552 "honeylocust" H 0.60 0.50 60.3 89.1 15.0 1.6346;
    602 "black walnut" H 0.51 0.33 79.1 89.4 15.0 1.8003;
    611 "sweetgum" H 0.46 0.42 74.2 90.8 15.0 1.7619;
    621 "yellow-poplar" H 0.40 0.38 95.0 123.5 18.0 1.9917;
    693 "blackgum" H 0.46 0.44 101.0 71.2 14.0 1.9748;
    731 "sycamore" H 0.46 0.60 81.2 84.3 8.0 1.8145;
    740 "cottonwood/poplar spp." H 0.35 0.46 106.3 87.7 18.44 2.0269;
    746 "quaking aspen" H 0.35 0.50 128.9 101.9 14.4 2.2433;
    762 "black cherry" H 0.47 0.63 53.4 90.8 9.2 1.5755;
    802 "white oak" H 0.60 0.56 68.3 88.9 16.0 1.7094;
    812 "S. red oak" H 0.52 0.68 97.2 48.5 22.0 1.8634;
    823 "bur oak" H 0.58 0.54 74.1 89.9 16.0 1.7612;
    833 "N. red oak" H 0.56 0.68 83.1 90.9 20.0 1.8466;
    837 "black oak" H 0.56 0.60 83.1 89.6 18.5 1.8422;
    901 "black locust" H 0.66 0.29 40.8 87.9 15.0 1.4374;
    920 "willow spp." H 0.36 0.50 127.0 99.0 16.0 2.2191;
    951 "basswood" H 0.32 0.48 105.3 90.3 10.5 2.0330;
    972 "American elm" H 0.46 0.44 94.0 78.5 14.0 1.9217;
    998 "unknown hardwood" H 0.52 0.53 75.1 80.5 15.16 1.7585;
};
