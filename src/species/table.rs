//! The table of species: one line each. Strengths of green wood, averages of small clear pieces.
//! A line is never edited without its source: the letter after the numbers says which.

use crate::source::{Mark, Source};
use crate::species::entry::{BiomassGroup, Species, Trait, WoodType};
use crate::species::green;
use crate::units::Stress;

const fn opened(cite: &'static str) -> Source {
    Source {
        cite,
        mark: Mark::Opened,
    }
}

const fn remembered(cite: &'static str) -> Source {
    Source {
        cite,
        mark: Mark::Memory,
    }
}

macro_rules! strength_source {
    (O1) => {
        opened("Wood Handbook, FPL-GTR-282 (2021), Table 5-3a, read in a copy")
    };
    (O2) => {
        opened("Wood Handbook, FPL-GTR-190 (2010), Table 5-3a, page read")
    };
    (O4) => {
        opened("Wood Handbook, Table 5-3a, rows quoted by an engineering data page")
    };
    (O5) => {
        opened("Wood Handbook, FPL-GTR-190 (2010), Table 5-3a, rows read in a copy")
    };
    (Mh) => {
        remembered("Wood Handbook, Table 5-3a, from memory, remembered well")
    };
    (Mm) => {
        remembered("Wood Handbook, Table 5-3a, from memory, remembered fairly")
    };
    (Ml) => {
        remembered("Wood Handbook, Table 5-3a, from memory, remembered poorly; editions differ")
    };
}

macro_rules! other_source {
    (O, $cite:literal) => {
        opened($cite)
    };
    (M, $cite:literal) => {
        remembered($cite)
    };
}

macro_rules! optional {
    (-, $make:expr) => {
        None
    };
    ($value:literal, $make:expr) => {
        Some($make($value))
    };
}

macro_rules! moisture {
    (-, $mark:ident) => {
        None
    };
    ($value:literal, $mark:ident) => {
        Some((
            $value,
            other_source!($mark, "Wood Handbook, Table 4-1, green moisture content"),
        ))
    };
}

macro_rules! wood_trait {
    (Plain) => {
        Trait::Plain
    };
    (Ring) => {
        Trait::RingPorous
    };
    (Oak) => {
        Trait::RingPorousOak
    };
    (Growth) => {
        Trait::GrowthStress
    };
}

const fn stress(kilopascals: f64) -> Stress {
    Stress::si(kilopascals * 1000.0)
}

const fn same(value: f64) -> f64 {
    value
}

/// The stand-in rows keep the species' own gravity.
const fn green_row(code: u16, gravity: f64) -> green::GreenWood {
    let mut row = green::row(code);
    if code == 299 || code == 998 {
        row.wood_gravity = gravity;
    }
    row
}

const fn green_source(code: u16) -> Source {
    if code == 299 || code == 998 {
        green::STAND_IN
    } else {
        green::OWN
    }
}

const fn wood_type(code: u16) -> WoodType {
    green::row(code).wood_type
}

macro_rules! species {
    ($($name:literal $scientific:literal $code:literal $group:ident $trait:ident:
       $sg:literal $mor:literal $moe:literal $wml:tt $cpar:tt $cperp:tt $shear:tt $tperp:tt
       $source:ident, $sg12:tt $sg12mark:ident, $heart:tt $heartmark:ident,
       $sap:tt $sapmark:ident;)*) => {
        [$(Species {
            table_name: $name,
            scientific: $scientific,
            wood_type: wood_type($code),
            group: BiomassGroup::$group,
            wood_trait: wood_trait!($trait),
            green: green_row($code, $sg),
            green_source: green_source($code),
            specific_gravity_green: $sg,
            specific_gravity_12: optional!($sg12, same),
            specific_gravity_12_source: other_source!(
                $sg12mark,
                "Wood Handbook, Table 5-3a, rows at 12 % moisture"
            ),
            mor: stress($mor),
            moe: Stress::si($moe * 1.0e6),
            work_to_maximum_load: optional!($wml, same),
            crushing: optional!($cpar, stress),
            compression_across: optional!($cperp, stress),
            shear: optional!($shear, stress),
            tension_across: optional!($tperp, stress),
            strength_source: strength_source!($source),
            moisture_heart: moisture!($heart, $heartmark),
            moisture_sap: moisture!($sap, $sapmark),
        },)*]
    };
}

/// Name, scientific name (from memory), green-weight row, biomass group, trait: specific gravity
/// green; MOR in kPa, MOE in MPa, work to
/// maximum load in kJ/m³, crushing, compression across, shear, tension across in kPa, source;
/// specific gravity at 12 %, mark; moisture of heartwood and sapwood in per cent, marks.
#[rustfmt::skip]
pub(super) static SPECIES: [Species; 91] = species! {
    "Alder, red" "Alnus rubra" 351 AspenAlderCottonwoodWillow Plain: 0.37 45000.0 8100.0 55.0 20400.0 1700.0 5300.0 2700.0 Mh, 0.41 O, - O, 97.0 O;
    "Ash, black" "Fraxinus nigra" 998 MixedHardwood Ring: 0.45 41000.0 7200.0 83.0 15900.0 2400.0 5900.0 3400.0 Mh, 0.49 O, 95.0 O, - O;
    "Ash, green" "Fraxinus pennsylvanica" 544 MixedHardwood Ring: 0.53 66000.0 9700.0 81.0 29000.0 5000.0 8700.0 4100.0 Mh, 0.56 O, - O, 58.0 O;
    "Ash, white" "Fraxinus americana" 541 MixedHardwood Ring: 0.55 66000.0 9900.0 108.0 27500.0 4600.0 9300.0 4100.0 O1, 0.60 O, 46.0 O, 44.0 O;
    "Aspen, bigtooth" "Populus grandidentata" 998 AspenAlderCottonwoodWillow Growth: 0.36 37000.0 7700.0 39.0 17200.0 1400.0 5000.0 - Mh, 0.39 O, 95.0 O, 113.0 O;
    "Aspen, quaking" "Populus tremuloides" 746 AspenAlderCottonwoodWillow Growth: 0.35 35000.0 5900.0 44.0 14800.0 1200.0 4600.0 1600.0 Mh, 0.38 O, 95.0 O, 113.0 O;
    "Basswood, American" "Tilia americana" 951 MixedHardwood Plain: 0.32 34000.0 7200.0 37.0 15300.0 1200.0 4100.0 1900.0 Mh, 0.37 O, 81.0 O, 133.0 O;
    "Beech, American" "Fagus grandifolia" 531 HardMapleOakHickoryBeech Growth: 0.56 59000.0 9500.0 82.0 24500.0 3700.0 8900.0 5000.0 Mh, 0.64 O, 55.0 O, 72.0 O;
    "Birch, paper" "Betula papyrifera" 375 SoftMapleBirch Plain: 0.48 44000.0 8100.0 112.0 16300.0 1900.0 5800.0 2600.0 Mh, 0.55 O, 89.0 O, 72.0 O;
    "Birch, sweet" "Betula lenta" 998 SoftMapleBirch Plain: 0.60 65000.0 11400.0 108.0 25800.0 3200.0 8500.0 3000.0 Mh, 0.65 O, 75.0 O, 70.0 O;
    "Birch, yellow" "Betula alleghaniensis" 371 SoftMapleBirch Plain: 0.55 57000.0 10300.0 111.0 23300.0 3000.0 7700.0 3000.0 Mh, 0.62 O, 74.0 O, 72.0 O;
    "Cherry, black" "Prunus serotina" 762 MixedHardwood Plain: 0.47 55000.0 9000.0 88.0 24400.0 2500.0 7800.0 3900.0 O1, 0.50 O, 58.0 O, - O;
    "Chestnut, American" "Castanea dentata" 998 MixedHardwood Ring: 0.40 39000.0 6400.0 48.0 17000.0 2100.0 5500.0 3000.0 Mm, 0.43 O, 120.0 M, - O;
    "Cottonwood, balsam poplar" "Populus balsamifera" 740 AspenAlderCottonwoodWillow Growth: 0.31 27000.0 5200.0 29.0 11700.0 1000.0 3400.0 - Mm, 0.34 O, - O, - O;
    "Cottonwood, black" "Populus trichocarpa" 740 AspenAlderCottonwoodWillow Growth: 0.31 34000.0 7400.0 34.0 15200.0 1100.0 4200.0 1900.0 Mh, 0.35 O, 162.0 M, 146.0 M;
    "Cottonwood, eastern" "Populus deltoides" 740 AspenAlderCottonwoodWillow Growth: 0.37 37000.0 7000.0 50.0 15700.0 1400.0 4700.0 2800.0 Mh, 0.40 O, 162.0 M, 146.0 M;
    "Elm, American" "Ulmus americana" 972 MixedHardwood Ring: 0.46 50000.0 7700.0 81.0 20100.0 2500.0 6900.0 4100.0 Mh, 0.50 O, 95.0 M, 92.0 M;
    "Elm, rock" "Ulmus thomasii" 998 MixedHardwood Ring: 0.57 66000.0 8200.0 137.0 26100.0 4200.0 8800.0 - Mh, 0.63 O, 44.0 M, 57.0 M;
    "Elm, slippery" "Ulmus rubra" 998 MixedHardwood Ring: 0.48 55000.0 8500.0 106.0 22900.0 2900.0 7700.0 4400.0 Mh, 0.53 O, - O, - O;
    "Hackberry" "Celtis occidentalis" 998 MixedHardwood Ring: 0.49 45000.0 6600.0 100.0 18300.0 2800.0 7400.0 4300.0 Mh, 0.53 O, 61.0 M, 65.0 M;
    "Hickory, bitternut" "Carya cordiformis" 998 HardMapleOakHickoryBeech Ring: 0.60 71000.0 9700.0 138.0 31500.0 5500.0 8500.0 - Mm, 0.66 O, 80.0 M, 54.0 M;
    "Hickory, pecan" "Carya illinoinensis" 998 HardMapleOakHickoryBeech Ring: 0.60 68000.0 9400.0 101.0 27500.0 5400.0 10200.0 4700.0 Mm, 0.66 O, - O, - O;
    "Hickory, mockernut" "Carya tomentosa" 998 HardMapleOakHickoryBeech Ring: 0.64 77000.0 10800.0 180.0 30900.0 5600.0 8800.0 - Mh, 0.72 O, 70.0 M, 52.0 M;
    "Hickory, pignut" "Carya glabra" 403 HardMapleOakHickoryBeech Ring: 0.66 81000.0 11400.0 219.0 33200.0 6300.0 9400.0 - Mh, 0.75 O, 71.0 M, 49.0 M;
    "Hickory, shagbark" "Carya ovata" 407 HardMapleOakHickoryBeech Ring: 0.64 76000.0 10800.0 163.0 31600.0 5800.0 10500.0 - Mh, 0.72 O, 69.0 M, 52.0 M;
    "Honeylocust" "Gleditsia triacanthos" 552 MixedHardwood Ring: 0.60 70000.0 8900.0 87.0 30500.0 7900.0 11400.0 6400.0 Mh, - O, - O, - O;
    "Locust, black" "Robinia pseudoacacia" 901 MixedHardwood Ring: 0.66 95000.0 12800.0 106.0 46900.0 8000.0 12100.0 5300.0 Mh, 0.69 O, - O, - O;
    "Maple, bigleaf" "Acer macrophyllum" 312 SoftMapleBirch Plain: 0.44 51000.0 7600.0 60.0 22300.0 3100.0 7700.0 4100.0 Mh, 0.48 O, - O, - O;
    "Maple, black" "Acer nigrum" 998 HardMapleOakHickoryBeech Plain: 0.52 54000.0 9200.0 88.0 22500.0 4100.0 7800.0 5000.0 Mm, 0.57 O, - O, - O;
    "Maple, red" "Acer rubrum" 316 SoftMapleBirch Plain: 0.49 53000.0 9600.0 79.0 22600.0 2800.0 7900.0 - Mh, 0.54 O, - O, - O;
    "Maple, silver" "Acer saccharinum" 317 SoftMapleBirch Plain: 0.44 40000.0 6500.0 76.0 17200.0 2600.0 7200.0 3900.0 Mh, 0.47 O, 58.0 M, 97.0 M;
    "Maple, sugar" "Acer saccharum" 318 HardMapleOakHickoryBeech Plain: 0.56 65000.0 10700.0 92.0 27700.0 4400.0 10100.0 - O1, 0.63 O, 65.0 O, 72.0 O;
    "Oak, black" "Quercus velutina" 837 HardMapleOakHickoryBeech Oak: 0.56 57000.0 8100.0 84.0 23900.0 4900.0 8400.0 - Mh, 0.61 O, - O, - O;
    "Oak, laurel" "Quercus laurifolia" 998 HardMapleOakHickoryBeech Oak: 0.56 54000.0 9600.0 77.0 21900.0 3900.0 8100.0 5300.0 O4, 0.63 O, - O, - O;
    "Oak, northern red" "Quercus rubra" 833 HardMapleOakHickoryBeech Oak: 0.56 57000.0 9300.0 91.0 23700.0 4200.0 8300.0 5200.0 O1, 0.63 O, 80.0 O, 69.0 O;
    "Oak, pin" "Quercus palustris" 998 HardMapleOakHickoryBeech Oak: 0.58 57000.0 9100.0 97.0 25400.0 5000.0 8900.0 5500.0 Mm, 0.63 O, - O, - O;
    "Oak, scarlet" "Quercus coccinea" 998 HardMapleOakHickoryBeech Oak: 0.60 72000.0 10200.0 103.0 28200.0 5700.0 9700.0 4800.0 Mm, 0.67 O, - O, - O;
    "Oak, southern red" "Quercus falcata" 812 HardMapleOakHickoryBeech Oak: 0.52 48000.0 7900.0 55.0 20900.0 3800.0 6400.0 3300.0 Mm, 0.59 O, 83.0 M, 75.0 M;
    "Oak, water" "Quercus nigra" 998 HardMapleOakHickoryBeech Oak: 0.56 61000.0 10700.0 77.0 25800.0 4300.0 8500.0 5700.0 Mm, 0.63 O, 81.0 M, 81.0 M;
    "Oak, bur" "Quercus macrocarpa" 823 HardMapleOakHickoryBeech Oak: 0.58 50000.0 6100.0 74.0 22700.0 4700.0 9300.0 5500.0 O4, 0.64 O, - O, - O;
    "Oak, chestnut" "Quercus montana" 998 HardMapleOakHickoryBeech Oak: 0.57 55000.0 9400.0 65.0 24300.0 3700.0 8300.0 4800.0 Mm, 0.66 O, - O, - O;
    "Oak, live" "Quercus virginiana" 998 HardMapleOakHickoryBeech Plain: 0.80 82000.0 10900.0 85.0 37400.0 14100.0 15200.0 - Mm, 0.88 O, - O, - O;
    "Oak, post" "Quercus stellata" 998 HardMapleOakHickoryBeech Oak: 0.60 56000.0 7500.0 76.0 24000.0 5900.0 8800.0 5400.0 Mm, 0.67 O, - O, - O;
    "Oak, white" "Quercus alba" 802 HardMapleOakHickoryBeech Oak: 0.60 57000.0 8600.0 80.0 24500.0 4600.0 8600.0 5300.0 O1, 0.68 O, 64.0 O, 78.0 O;
    "Sweetgum" "Liquidambar styraciflua" 611 MixedHardwood Plain: 0.46 49000.0 8300.0 70.0 21000.0 2600.0 6800.0 3700.0 Mh, 0.52 O, 79.0 M, 137.0 M;
    "Sycamore, American" "Platanus occidentalis" 731 MixedHardwood Plain: 0.46 45000.0 7300.0 52.0 20100.0 2500.0 6900.0 4300.0 Mh, 0.49 O, 114.0 M, 130.0 M;
    "Tupelo, black" "Nyssa sylvatica" 693 MixedHardwood Plain: 0.46 48000.0 7100.0 55.0 21000.0 3300.0 7600.0 3900.0 Mh, 0.50 O, 87.0 M, 115.0 M;
    "Walnut, black" "Juglans nigra" 602 MixedHardwood Plain: 0.51 66000.0 9800.0 101.0 29600.0 3400.0 8400.0 3900.0 Mh, 0.55 O, 90.0 M, 73.0 M;
    "Willow, black" "Salix nigra" 920 AspenAlderCottonwoodWillow Plain: 0.36 33000.0 5400.0 76.0 14100.0 1200.0 4700.0 - Mm, 0.39 O, - O, - O;
    "Yellow-poplar" "Liriodendron tulipifera" 621 MixedHardwood Plain: 0.40 41000.0 8400.0 52.0 18300.0 1900.0 5400.0 3500.0 O1, 0.42 O, 83.0 O, 106.0 O;
    "Baldcypress" "Taxodium distichum" 299 CedarLarch Plain: 0.42 46000.0 8100.0 46.0 24700.0 2800.0 5600.0 2100.0 Mh, 0.46 M, 121.0 O, 171.0 O;
    "Redcedar, eastern" "Juniperus virginiana" 68 CedarLarch Plain: 0.44 48000.0 4500.0 103.0 24600.0 4800.0 7000.0 2300.0 Mm, 0.47 O, 33.0 O, - O;
    "Cedar, incense" "Calocedrus decurrens" 299 CedarLarch Plain: 0.35 43000.0 5800.0 44.0 21700.0 2600.0 5700.0 1900.0 Mm, 0.37 O, 40.0 O, 213.0 O;
    "Cedar, northern white" "Thuja occidentalis" 241 CedarLarch Plain: 0.29 29000.0 4400.0 39.0 13700.0 1600.0 4300.0 1700.0 Mh, 0.31 O, - O, - O;
    "Cedar, Port-Orford" "Chamaecyparis lawsoniana" 299 CedarLarch Plain: 0.39 45000.0 9000.0 51.0 21600.0 2100.0 5800.0 1200.0 Mm, 0.43 O, 50.0 O, 98.0 O;
    "Redcedar, western" "Thuja plicata" 242 CedarLarch Plain: 0.31 35900.0 6500.0 34.0 19100.0 1700.0 5300.0 1600.0 O5, 0.32 O, 58.0 O, 249.0 O;
    "Cedar, yellow" "Callitropsis nootkatensis" 299 CedarLarch Plain: 0.42 44000.0 7900.0 63.0 21000.0 2400.0 5800.0 2300.0 Mm, 0.44 O, 32.0 O, 166.0 O;
    "Douglas-fir, coast" "Pseudotsuga menziesii var. menziesii" 202 DouglasFir Plain: 0.45 53000.0 10800.0 52.0 26100.0 2600.0 6200.0 2100.0 O1, 0.48 O, 37.0 O, 115.0 O;
    "Douglas-fir, interior west" "Pseudotsuga menziesii (interior west)" 202 DouglasFir Plain: 0.46 53000.0 10400.0 50.0 26700.0 2900.0 6500.0 2000.0 O1, 0.50 O, - O, - O;
    "Douglas-fir, interior north" "Pseudotsuga menziesii var. glauca" 202 DouglasFir Plain: 0.45 51000.0 9700.0 56.0 23900.0 2500.0 6600.0 2300.0 O1, 0.48 O, - O, - O;
    "Douglas-fir, interior south" "Pseudotsuga menziesii (interior south)" 202 DouglasFir Plain: 0.43 47000.0 8000.0 55.0 21400.0 2300.0 6600.0 1700.0 O4, 0.46 M, - O, - O;
    "Fir, balsam" "Abies balsamea" 12 TrueFirHemlock Plain: 0.33 38000.0 8600.0 32.0 18100.0 1300.0 4600.0 1200.0 O1, 0.35 O, 88.0 O, 173.0 O;
    "Fir, California red" "Abies magnifica" 299 TrueFirHemlock Plain: 0.36 40000.0 8100.0 44.0 19000.0 2300.0 5300.0 2600.0 O1, 0.38 O, - O, - O;
    "Fir, grand" "Abies grandis" 17 TrueFirHemlock Plain: 0.35 40000.0 8600.0 39.0 20300.0 1900.0 5100.0 1700.0 O1, 0.37 O, 91.0 O, 136.0 O;
    "Fir, noble" "Abies procera" 299 TrueFirHemlock Plain: 0.37 43000.0 9500.0 41.0 20800.0 1900.0 5500.0 1600.0 O1, 0.39 O, 34.0 O, 115.0 O;
    "Fir, Pacific silver" "Abies amabilis" 299 TrueFirHemlock Plain: 0.40 44000.0 9800.0 41.0 21600.0 1500.0 5200.0 1700.0 O1, 0.43 O, 55.0 O, 164.0 O;
    "Fir, subalpine" "Abies lasiocarpa" 299 TrueFirHemlock Plain: 0.31 34000.0 7200.0 - 15900.0 1300.0 4800.0 - O1, 0.32 O, - O, - O;
    "Fir, white" "Abies concolor" 15 TrueFirHemlock Plain: 0.37 41000.0 8000.0 39.0 20000.0 1900.0 5200.0 2100.0 O1, 0.39 O, 98.0 O, 160.0 O;
    "Hemlock, eastern" "Tsuga canadensis" 261 TrueFirHemlock Plain: 0.38 44000.0 7400.0 46.0 21200.0 2500.0 5900.0 1600.0 O1, 0.40 O, 97.0 O, 119.0 O;
    "Hemlock, western" "Tsuga heterophylla" 263 TrueFirHemlock Plain: 0.42 46000.0 9000.0 48.0 23200.0 1900.0 5900.0 2000.0 O1, 0.45 O, 85.0 O, 170.0 O;
    "Larch, western" "Larix occidentalis" 73 CedarLarch Plain: 0.48 53000.0 10100.0 71.0 25900.0 2800.0 6000.0 2300.0 O1, 0.52 O, 54.0 O, 119.0 O;
    "Pine, eastern white" "Pinus strobus" 129 Pine Plain: 0.34 34000.0 6800.0 36.0 16800.0 1500.0 4700.0 1700.0 Mh, 0.35 M, - O, - O;
    "Pine, jack" "Pinus banksiana" 105 Pine Plain: 0.40 41000.0 7400.0 50.0 20300.0 2100.0 5200.0 2500.0 O1, 0.43 O, - O, - O;
    "Pine, loblolly" "Pinus taeda" 131 Pine Plain: 0.47 50000.0 9700.0 57.0 24200.0 2700.0 5900.0 1800.0 O1, 0.51 O, 33.0 O, 110.0 O;
    "Pine, lodgepole" "Pinus contorta" 108 Pine Plain: 0.38 38000.0 7400.0 39.0 18000.0 1700.0 4700.0 1500.0 O1, 0.41 O, 41.0 O, 120.0 O;
    "Pine, longleaf" "Pinus palustris" 121 Pine Plain: 0.54 59000.0 11000.0 61.0 29800.0 3300.0 7200.0 2300.0 O1, 0.59 O, 31.0 O, 106.0 O;
    "Pine, ponderosa" "Pinus ponderosa" 122 Pine Plain: 0.38 35000.0 6900.0 36.0 16900.0 1900.0 4800.0 2100.0 O2, 0.40 M, 40.0 M, 148.0 M;
    "Pine, red" "Pinus resinosa" 125 Pine Plain: 0.41 40000.0 8800.0 42.0 18800.0 1800.0 4800.0 2100.0 O2, 0.46 M, 32.0 M, 134.0 M;
    "Pine, shortleaf" "Pinus echinata" 110 Pine Plain: 0.47 51000.0 9600.0 57.0 24300.0 2400.0 6300.0 2200.0 O1, 0.51 O, 32.0 M, 122.0 M;
    "Pine, slash" "Pinus elliottii" 111 Pine Plain: 0.54 60000.0 10500.0 66.0 26300.0 3700.0 6600.0 - O1, 0.59 O, - O, - O;
    "Pine, sugar" "Pinus lambertiana" 299 Pine Plain: 0.34 34000.0 7100.0 37.0 17000.0 1400.0 5000.0 1900.0 O2, 0.36 M, 98.0 M, 219.0 M;
    "Pine, Virginia" "Pinus virginiana" 299 Pine Plain: 0.45 50000.0 8400.0 75.0 23600.0 2700.0 6100.0 2800.0 O2, 0.48 M, - O, - O;
    "Pine, western white" "Pinus monticola" 299 Pine Plain: 0.35 32000.0 8200.0 34.0 16800.0 1300.0 4700.0 1800.0 O2, 0.38 M, 62.0 M, 148.0 M;
    "Redwood, old-growth" "Sequoia sempervirens" 211 CedarLarch Plain: 0.38 52000.0 8100.0 51.0 29000.0 2900.0 5500.0 1800.0 O2, 0.40 M, 86.0 M, 210.0 M;
    "Redwood, young-growth" "Sequoia sempervirens (young growth)" 211 CedarLarch Plain: 0.34 41000.0 6600.0 39.0 21400.0 1900.0 6100.0 2100.0 O2, 0.35 M, - O, - O;
    "Spruce, black" "Picea mariana" 299 Spruce Plain: 0.38 42000.0 9500.0 51.0 19600.0 1700.0 5100.0 700.0 Ml, 0.42 M, 52.0 M, 113.0 M;
    "Spruce, Engelmann" "Picea engelmannii" 93 Spruce Plain: 0.33 32000.0 7100.0 35.0 15000.0 1400.0 4400.0 1700.0 O1, 0.35 O, 51.0 O, 173.0 O;
    "Spruce, red" "Picea rubens" 97 Spruce Plain: 0.37 41000.0 9200.0 48.0 18800.0 1800.0 5200.0 1500.0 Mm, 0.40 M, - O, - O;
    "Spruce, Sitka" "Picea sitchensis" 98 Spruce Plain: 0.33 34000.0 7900.0 43.0 16200.0 1400.0 4400.0 1700.0 Mm, 0.36 M, 41.0 M, 142.0 M;
    "Spruce, white" "Picea glauca" 94 Spruce Plain: 0.37 39000.0 7400.0 41.0 17700.0 1700.0 4800.0 1500.0 Mm, 0.40 M, - O, - O;
    "Tamarack" "Larix laricina" 71 CedarLarch Plain: 0.49 50000.0 8500.0 50.0 24000.0 2700.0 5900.0 1800.0 Mm, 0.53 M, 49.0 M, - O;
};
