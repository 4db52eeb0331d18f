//! Every documented bound, at both ends, through the text of a file.

use plumbfold_core::bounds::{Field, bounds};
use plumbfold_records::write;

use crate::{FULL, FULL_2, client, problem, replaced};

/// Where a field of the bounds table stands in the full file: the piece of text, the same with `@`
/// for the number, the path a problem names, and the bounds the format documents.
type Place = (&'static str, &'static str, &'static str, f64, f64);

/// Every place where the full file of either format holds a number of this field.
fn places(field: Field) -> &'static [Place] {
    match field {
        Field::Stature => &[("stature_cm: 168.25", "stature_cm: @", "visits[0].stature_cm", 100.0, 230.0)],
        Field::Mass => &[("mass_kg: 61.5", "mass_kg: @", "visits[0].mass_kg", 25.0, 250.0)],
        Field::Age => &[("age_years: Some(34)", "age_years: Some(@)", "visits[0].age_years", 5.0, 110.0)],
        Field::Shank => &[("shank_cm: Some(39.8)", "shank_cm: Some(@)", "visits[0].build.shank_cm", 20.0, 65.0)],
        Field::Thigh => &[("thigh_cm: Some(42.4)", "thigh_cm: Some(@)", "visits[0].build.thigh_cm", 20.0, 65.0)],
        Field::Trunk => &[("trunk_cm: Some(48.1)", "trunk_cm: Some(@)", "visits[0].build.trunk_cm", 25.0, 75.0)],
        Field::Foot => &[("foot_cm: Some(24.5)", "foot_cm: Some(@)", "visits[0].build.foot_cm", 14.0, 36.0)],
        Field::AnkleHeight => {
            &[("ankle_height_cm: Some(6.9)", "ankle_height_cm: Some(@)", "visits[0].build.ankle_height_cm", 3.0, 14.0)]
        }
        Field::HeelToAnkle => &[(
            "heel_to_ankle_cm: Some(6.2)",
            "heel_to_ankle_cm: Some(@)",
            "visits[0].build.heel_to_ankle_cm",
            2.0,
            12.0,
        )],
        Field::UpperArm => {
            &[("upper_arm_cm: Some(31.7)", "upper_arm_cm: Some(@)", "visits[0].build.upper_arm_cm", 15.0, 50.0)]
        }
        Field::Forearm => {
            &[("forearm_cm: Some(24.3)", "forearm_cm: Some(@)", "visits[0].build.forearm_cm", 12.0, 40.0)]
        }
        Field::Hand => &[("hand_cm: Some(18.1)", "hand_cm: Some(@)", "visits[0].build.hand_cm", 10.0, 27.0)],
        Field::KneeToWall => &[
            ("left_cm: Some(-1.5)", "left_cm: Some(@)", "visits[0].joints.ankle.left_cm", -15.0, 25.0),
            ("right_cm: Some(8)", "right_cm: Some(@)", "visits[0].joints.ankle.right_cm", -15.0, 25.0),
        ],
        Field::AnkleRange => &[
            (KNEE_TO_WALL, "Degrees(left: Some(@))", "visits[0].joints.ankle.left", -10.0, 60.0),
            (KNEE_TO_WALL, "Degrees(right: Some(@))", "visits[0].joints.ankle.right", -10.0, 60.0),
        ],
        Field::HipRange => &[
            ("left: Some(112.0)", "left: Some(@)", "visits[0].joints.hip.left", 40.0, 170.0),
            ("right: Some(118.0)", "right: Some(@)", "visits[0].joints.hip.right", 40.0, 170.0),
            (KNEE_TO_CHEST, "PelvisHeld(left: Some(@))", "visits[0].joints.hip.left", 40.0, 170.0),
            (KNEE_TO_CHEST, "PelvisHeld(right: Some(@))", "visits[0].joints.hip.right", 40.0, 170.0),
            (KNEE_TO_CHEST, "RockBack(left: Some(@))", "visits[0].joints.hip.left", 40.0, 170.0),
            (KNEE_TO_CHEST, "RockBack(right: Some(@))", "visits[0].joints.hip.right", 40.0, 170.0),
            ("hip_deg: Some(95.0)", "hip_deg: Some(@)", "visits[0].caps.hip_deg", 40.0, 170.0),
        ],
        Field::KneeRange => &[
            ("left: Some(128.0)", "left: Some(@)", "visits[0].joints.knee.left", 20.0, 170.0),
            ("right: Some(131.0)", "right: Some(@)", "visits[0].joints.knee.right", 20.0, 170.0),
            ("knee_deg: Some(100.0)", "knee_deg: Some(@)", "visits[0].caps.knee_deg", 20.0, 170.0),
        ],
        Field::Reach => {
            &[("reach_limit_deg: 185.0", "reach_limit_deg: @", "visits[0].joints.reach_limit_deg", 90.0, 260.0)]
        }
        Field::Load => &[
            ("load_kg: 8.0", "load_kg: @", "visits[0].tasks[0].load_kg", 0.0, 400.0),
            ("load_kg: Some(20.0)", "load_kg: Some(@)", "visits[0].caps.load_kg", 0.0, 400.0),
        ],
        Field::Footwear => {
            &[("footwear_drop_mm: 10.0", "footwear_drop_mm: @", "visits[0].tasks[0].footwear_drop_mm", 0.0, 80.0)]
        }
        Field::HeelRaise => {
            &[("heel_raise_mm: 15.0", "heel_raise_mm: @", "visits[0].tasks[0].heel_raise_mm", 0.0, 80.0)]
        }
        Field::Stance => &[(
            "stance_width_cm: Some(32.0)",
            "stance_width_cm: Some(@)",
            "visits[0].tasks[0].stance_width_cm",
            5.0,
            120.0,
        )],
        Field::ToeOut => &[("toe_out_deg: 12.0", "toe_out_deg: @", "visits[0].tasks[0].toe_out_deg", -10.0, 60.0)],
        Field::Bend => &[("bend: Degrees(25.0)", "bend: Degrees(@)", "visits[0].tasks[0].bend", 0.0, 90.0)],
        Field::Lean => &[(
            "lean_limit_deg: Some(55.0)",
            "lean_limit_deg: Some(@)",
            "visits[0].tasks[0].lean_limit_deg",
            10.0,
            85.0,
        )],
        Field::Goal => {
            &[("goal_thigh_deg: 80.0", "goal_thigh_deg: @", "visits[0].tasks[0].goal_thigh_deg", 0.0, 140.0)]
        }
        Field::WeightLeft => &[(
            "weight_left_percent: Some(47.5)",
            "weight_left_percent: Some(@)",
            "visits[0].tasks[0].weight_left_percent",
            0.0,
            100.0,
        )],
        Field::Slope => &[("slope: Some(0.41)", "slope: Some(@)", "visits[0].tasks[0].rule.slope", 0.0, 1.5)],
        Field::Ratio => &[("Usual(slope: Some(0.41))", "ArmRatio(@)", "visits[0].tasks[0].rule", 0.1, 10.0)],
        Field::HeldShank => &[("HeldShank(25.0)", "HeldShank(@)", "visits[0].tasks[1].rule", -10.0, 60.0)],
        Field::Strength => &[
            ("ankle: 0.8", "ankle: @", "visits[0].strength.ankle", 0.1, 5.0),
            ("knee: 1.2", "knee: @", "visits[0].strength.knee", 0.1, 5.0),
            ("hip: 1.1", "hip: @", "visits[0].strength.hip", 0.1, 5.0),
            ("low_back: 0.9", "low_back: @", "visits[0].strength.low_back", 0.1, 5.0),
        ],
        Field::SupportFraction => &[
            ("edge_back: Some(0.2)", "edge_back: Some(@)", "visits[0].tasks[0].support.edge_back", 0.0, 1.0),
            ("zone_back: 0.35", "zone_back: @", "visits[0].tasks[0].support.zone_back", 0.0, 1.0),
            ("aim: 0.45", "aim: @", "visits[0].tasks[0].support.aim", 0.0, 1.0),
            ("zone_front: 0.55", "zone_front: @", "visits[0].tasks[0].support.zone_front", 0.0, 1.0),
            ("edge_front: Some(0.75)", "edge_front: Some(@)", "visits[0].tasks[0].support.edge_front", 0.0, 1.0),
        ],
        Field::SeenThigh => &[
            ("(thigh_deg: 60.0", "(thigh_deg: @", "visits[0].tasks[0].seen.thigh_deg", 0.0, 140.0),
            (
                "pain_from_thigh_deg: Some(52.0)",
                "pain_from_thigh_deg: Some(@)",
                "visits[0].tasks[0].seen.pain_from_thigh_deg",
                0.0,
                140.0,
            ),
        ],
        Field::SeenShank => &[("shank_deg: 22.0", "shank_deg: @", "visits[0].tasks[0].seen.shank_deg", -10.0, 60.0)],
        Field::SeenTrunk => &[("trunk_deg: 50.0", "trunk_deg: @", "visits[0].tasks[0].seen.trunk_deg", -10.0, 90.0)],
        Field::Pain => &[("pain_0_10: Some(3)", "pain_0_10: Some(@)", "visits[0].tasks[0].seen.pain_0_10", 0.0, 10.0)],
    }
}

/// The places that format 2 adds.
fn places_added(field: Field) -> &'static [Place] {
    match field {
        Field::Goal => &[(
            "depth_thigh_deg: Some(84.0)",
            "depth_thigh_deg: Some(@)",
            "visits[0].tasks[0].felt.depth_thigh_deg",
            0.0,
            140.0,
        )],
        Field::Pain => &[("pain_0_10: Some(2)", "pain_0_10: Some(@)", "visits[0].tasks[0].felt.pain_0_10", 0.0, 10.0)],
        _ => &[],
    }
}

/// Every place of every format, with the full file it is to be looked for in.
fn all_places() -> impl Iterator<Item = (&'static str, Field, &'static Place)> {
    Field::ALL.iter().flat_map(|&field| {
        let of = move |text, places: &'static [Place]| places.iter().map(move |place| (text, field, place));
        of(FULL, places(field)).chain(of(FULL_2, places(field))).chain(of(FULL_2, places_added(field)))
    })
}

const KNEE_TO_WALL: &str = "KneeToWall(left_cm: Some(-1.5), right_cm: Some(8))";
const KNEE_TO_CHEST: &str = "KneeToChest(left: Some(112.0), right: Some(118.0))";

fn typed(text: &str, place: &Place, number: &str) -> String {
    replaced(text, place.0, &place.1.replace('@', number))
}

#[test]
fn the_table_holds_the_documented_bounds() {
    for (_, field, &(_, _, path, min, max)) in all_places() {
        assert_eq!((bounds(field).min, bounds(field).max), (min, max), "{path}");
    }
}

#[test]
fn every_field_of_the_table_has_a_place() {
    for &field in Field::ALL {
        assert!(all_places().any(|(_, of, _)| of == field), "{field:?}");
    }
}

#[test]
fn both_ends_are_read_and_what_lies_beyond_is_refused() {
    for (full, field, place) in all_places() {
        let &(_, _, path, min, max) = place;
        for end in [min, max] {
            let text = typed(full, place, &format!("{end:?}"));
            if field == Field::SupportFraction {
                // In bounds, though out of order for some of the five.
                if let Err(refused) = plumbfold_records::read(text.as_bytes(), "x.ron".as_ref()) {
                    assert_eq!(refused.allowed, "fractions in rising order from heel to toe", "{path} = {end}");
                }
            } else {
                // And it can be written again.
                assert!(write(&client(&text)).is_ok(), "{path} = {end}");
            }
        }
        for beyond in [min.next_down(), max.next_up(), min - 1.0, max + 1.0, -1e300, 1e300] {
            let number = format!("{beyond:?}");
            let refused = problem(&typed(full, place, &number));
            assert_eq!(refused.field.as_deref(), Some(path), "{number}");
            assert_eq!(refused.value, number, "{path}");
            assert_eq!(refused.allowed, bounds(field).allowed(), "{path}");
        }
    }
}

#[test]
fn what_is_no_finite_number_is_refused_in_every_field() {
    for (full, field, place) in all_places() {
        let path = place.2;
        for number in
            ["NaN", "-NaN", "inf", "-inf", "1e400", "-1e400", "\"40\"", "true", "(1)", "forty", "NaNf64", "inff32"]
        {
            let refused = problem(&typed(full, place, number));
            assert_eq!(refused.field.as_deref(), Some(path), "{number}");
            assert_eq!(refused.allowed, bounds(field).allowed(), "{path} = {number}");
            assert!(!refused.value.is_empty(), "{path} = {number}");
        }
    }
}
