//! The species against rows of the published strength table, and names as people say them.
//! Source: Wood Handbook, Table 5-3a (rows read in a copy where not marked otherwise).

use stumpside::source::Mark;
use stumpside::species::{self, BiomassGroup, WoodType};

#[test]
fn every_species_is_there_with_sound_values() {
    assert_eq!(species::all().len(), 91);
    for one in species::all() {
        // The regression of green bending strength on specific gravity, 17,600·SG^1.25 psi,
        // bounds each row; source: Forest Products Laboratory, opened in a reprint.
        let by_gravity = 17_600.0 * libm::pow(one.specific_gravity_green, 1.25) * 6_895.0;
        let ratio = one.mor.value() / by_gravity;
        assert!((0.75..1.6).contains(&ratio), "{}: {ratio}", one.name());
        assert!(one.moe.value() > 4.0e9 && one.moe.value() < 14.0e9);
        assert!(one.specific_gravity_12() >= one.specific_gravity_green);
        assert!(one.fracture_energy().value() > 200.0);
        assert!(!one.known_values().is_empty());
        assert_eq!(
            species::find(one.table_name).unwrap().table_name,
            one.table_name
        );
        assert_eq!(
            species::find(&one.name()).unwrap().table_name,
            one.table_name
        );
        assert_eq!(
            species::find(one.scientific).unwrap().table_name,
            one.table_name
        );
    }
}

#[test]
fn rows_read_in_the_handbook() {
    for (name, mor, moe, green, dry) in [
        ("white ash", 66.0, 9.9, 0.55, 0.60),
        ("northern red oak", 57.0, 9.3, 0.56, 0.63),
        ("white oak", 57.0, 8.6, 0.60, 0.68),
        ("sugar maple", 65.0, 10.7, 0.56, 0.63),
        ("yellow-poplar", 41.0, 8.4, 0.40, 0.42),
        ("coast Douglas-fir", 53.0, 10.8, 0.45, 0.48),
        ("western hemlock", 46.0, 9.0, 0.42, 0.45),
        ("loblolly pine", 50.0, 9.7, 0.47, 0.51),
        ("Engelmann spruce", 32.0, 7.1, 0.33, 0.35),
    ] {
        let one = species::find(name).unwrap();
        assert_eq!(one.mor.value(), mor * 1.0e6, "{name}");
        assert!((one.moe.value() - moe * 1.0e9).abs() < 1.0, "{name}");
        assert_eq!(one.specific_gravity_green, green, "{name}");
        assert_eq!(one.specific_gravity_12, Some(dry), "{name}");
        assert_eq!(one.strength_source.mark, Mark::Opened, "{name}");
    }
}

#[test]
fn names_are_found_as_they_are_said() {
    for (said, table_name) in [
        ("northern red oak", "Oak, northern red"),
        ("Oak, Northern Red", "Oak, northern red"),
        ("QUERCUS RUBRA", "Oak, northern red"),
        ("Douglas-fir, coast", "Douglas-fir, coast"),
        ("coast Douglas-fir", "Douglas-fir, coast"),
        ("Pseudotsuga menziesii", "Douglas-fir, coast"),
        ("eastern redcedar", "Redcedar, eastern"),
        ("balsam poplar", "Cottonwood, balsam poplar"),
        ("tamarack", "Tamarack"),
        ("Sequoia sempervirens", "Redwood, old-growth"),
    ] {
        assert_eq!(
            species::find(said).unwrap().table_name,
            table_name,
            "{said}"
        );
    }
    for unknown in ["", "red", "oak", "ironwood of nowhere"] {
        assert!(species::find(unknown).is_none(), "{unknown}");
    }
}

#[test]
fn near_names_are_offered() {
    let names = |said: &str| -> Vec<String> {
        species::nearest(said)
            .iter()
            .map(|one| one.name())
            .collect()
    };
    assert_eq!(names("nothern red oka")[0], "northern red oak");
    assert_eq!(names("douglas fir")[0], "coast Douglas-fir");
    assert_eq!(names("red oak").len(), 3);
    assert!(names("red oak").contains(&"northern red oak".to_owned()));
    assert!(names("quercus ruba").contains(&"northern red oak".to_owned()));
}

#[test]
fn traits_and_groups() {
    let oak = species::find("northern red oak").unwrap();
    assert!(oak.ring_porous() && !oak.growth_stress());
    // Ring-porous oaks are capped; the formula alone would give 588 J/m².
    assert_eq!(oak.fracture_energy().value(), 350.0);
    assert_eq!(oak.group, BiomassGroup::HardMapleOakHickoryBeech);
    let live = species::find("live oak").unwrap();
    assert!(!live.ring_porous());
    for name in ["American beech", "quaking aspen", "eastern cottonwood"] {
        assert!(species::find(name).unwrap().growth_stress(), "{name}");
    }
    assert_eq!(
        species::find("tamarack").unwrap().wood_type,
        WoodType::Softwood
    );
    let scarlet = species::find("scarlet oak").unwrap();
    assert_eq!(scarlet.green_source.mark, Mark::Derived);
    assert_eq!(scarlet.green.wood_gravity, scarlet.specific_gravity_green);
}
