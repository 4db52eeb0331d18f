//! Random clients, valid in every part.

use plumbfold_core::{
    bounds::{Field, bounds},
    measures::{PerJoint, Scope, Sex, Sides},
    tables::SegmentTable,
    task::Placement,
};
use plumbfold_records::{
    Ankle, Bend, Build, Caps, Client, Code, Compared, Date, Felt, Hip, Joints, Knee, PainAt, Rule, Seen, StoppedBy,
    Support, Task, Visit,
};
use proptest::{
    collection::vec,
    option,
    prelude::*,
    sample::{select, subsequence},
};

/// Any number within the bounds of a field, often one that is awkward to write.
pub fn number(field: Field) -> impl Strategy<Value = f64> + Clone {
    let bounds = *bounds(field);
    let awkward = [
        bounds.min,
        bounds.max,
        bounds.default,
        bounds.min.next_up(),
        bounds.max.next_down(),
        bounds.default.next_up(),
        -0.0,
        f64::MIN_POSITIVE,
        5e-324,
        1e-7,
        0.1 + 0.2,
    ];
    let awkward: Vec<f64> = awkward.into_iter().filter(|&value| bounds.holds(value)).collect();
    let whole = (bounds.min..=bounds.max).prop_map(move |value| value.round().clamp(bounds.min, bounds.max));
    prop_oneof![4 => bounds.min..=bounds.max, 1 => select(awkward), 1 => whole]
}

fn maybe(field: Field) -> impl Strategy<Value = Option<f64>> + Clone {
    option::of(number(field))
}

fn sides(field: Field) -> impl Strategy<Value = Sides<f64>> + Clone {
    (maybe(field), maybe(field)).prop_map(|(left, right)| Sides { left, right })
}

fn build() -> impl Strategy<Value = Build> {
    let legs = (maybe(Field::Shank), maybe(Field::Thigh), maybe(Field::Trunk), maybe(Field::Foot));
    let rest = (
        maybe(Field::AnkleHeight),
        maybe(Field::HeelToAnkle),
        maybe(Field::UpperArm),
        maybe(Field::Forearm),
        maybe(Field::Hand),
    );
    (legs, rest).prop_map(
        |(
            (shank_cm, thigh_cm, trunk_cm, foot_cm),
            (ankle_height_cm, heel_to_ankle_cm, upper_arm_cm, forearm_cm, hand_cm),
        )| Build {
            shank_cm,
            thigh_cm,
            trunk_cm,
            foot_cm,
            ankle_height_cm,
            heel_to_ankle_cm,
            upper_arm_cm,
            forearm_cm,
            hand_cm,
        },
    )
}

fn joints() -> impl Strategy<Value = Joints> {
    let ankle = prop_oneof![
        sides(Field::KneeToWall).prop_map(Ankle::KneeToWall),
        sides(Field::AnkleRange).prop_map(Ankle::Degrees),
        Just(Ankle::NotMeasured),
    ];
    let hip = prop_oneof![
        sides(Field::HipRange).prop_map(Hip::PelvisHeld),
        sides(Field::HipRange).prop_map(Hip::RockBack),
        sides(Field::HipRange).prop_map(Hip::KneeToChest),
        Just(Hip::NotMeasured),
    ];
    let knee = prop_oneof![sides(Field::KneeRange).prop_map(Knee::Degrees), Just(Knee::NotMeasured)];
    (ankle, hip, knee, number(Field::Reach)).prop_map(|(ankle, hip, knee, reach_limit_deg)| Joints {
        ankle,
        hip,
        knee,
        reach_limit_deg,
    })
}

fn support() -> impl Strategy<Value = Support> {
    let rising = vec(number(Field::SupportFraction), 5).prop_map(|mut all| {
        all.sort_by(f64::total_cmp);
        all
    });
    prop_oneof![
        Just(Support::default()),
        (rising, any::<bool>(), any::<bool>()).prop_map(|(all, back, front)| Support {
            edge_back: back.then_some(all[0]),
            zone_back: all[1],
            aim: all[2],
            zone_front: all[3],
            edge_front: front.then_some(all[4]),
        }),
    ]
}

fn seen() -> impl Strategy<Value = Seen> {
    let angles = (number(Field::SeenThigh), number(Field::SeenShank), number(Field::SeenTrunk));
    let rest = (
        any::<bool>(),
        maybe(Field::Pain),
        maybe(Field::SeenThigh),
        option::of(select(PainAt::ALL.to_vec())),
        option::of(select(StoppedBy::ALL.to_vec())),
    );
    (angles, rest).prop_map(
        |((thigh_deg, shank_deg, trunk_deg), (heels_lifted, pain_0_10, pain_from_thigh_deg, pain_at, stopped_by))| {
            Seen { thigh_deg, shank_deg, trunk_deg, heels_lifted, pain_0_10, pain_from_thigh_deg, pain_at, stopped_by }
        },
    )
}

fn felt() -> impl Strategy<Value = Felt> {
    (select(Compared::ALL.to_vec()), maybe(Field::Goal), maybe(Field::Pain))
        .prop_map(|(compared, depth_thigh_deg, pain_0_10)| Felt { compared, depth_thigh_deg, pain_0_10 })
}

fn task() -> impl Strategy<Value = Task> {
    let bend = prop_oneof![
        Just(Bend::KeepSmall),
        Just(Bend::KeepSome),
        Just(Bend::Free),
        number(Field::Bend).prop_map(Bend::Degrees),
    ];
    let rule = prop_oneof![
        maybe(Field::Slope).prop_map(|slope| Rule::Usual { slope }),
        Just(Rule::LeastEffort),
        number(Field::Ratio).prop_map(Rule::ArmRatio),
        number(Field::HeldShank).prop_map(Rule::HeldShank),
    ];
    let set_up = (
        select(Placement::ALL.to_vec()),
        number(Field::Load),
        number(Field::Footwear),
        number(Field::HeelRaise),
        maybe(Field::Stance),
        number(Field::ToeOut),
    );
    let choices = (bend, maybe(Field::Lean), number(Field::Goal), maybe(Field::WeightLeft), rule);
    // A point that is not "." for any character keeps names on one line.
    ("[^\\p{C}\\p{Z}][^\\p{C}]{0,20}", set_up, choices, option::of(seen()), option::of(felt()), support()).prop_map(
        |(
            name,
            (placement, load_kg, footwear_drop_mm, heel_raise_mm, stance_width_cm, toe_out_deg),
            (bend, lean_limit_deg, goal_thigh_deg, weight_left_percent, rule),
            seen,
            felt,
            support,
        )| Task {
            name,
            placement,
            load_kg,
            footwear_drop_mm,
            heel_raise_mm,
            stance_width_cm,
            toe_out_deg,
            bend,
            lean_limit_deg,
            goal_thigh_deg,
            weight_left_percent,
            rule,
            seen,
            felt,
            support,
        },
    )
}

fn tasks() -> impl Strategy<Value = Vec<Task>> {
    vec(task(), 1..4).prop_map(|mut tasks| {
        for (at, task) in tasks.iter_mut().enumerate() {
            task.name = format!("{at} {}", task.name);
        }
        tasks
    })
}

fn date() -> impl Strategy<Value = Date> {
    (1i16..=9999, 1i8..=12, 1i8..=31).prop_filter_map("a real day", |(y, m, d)| Date::new(y, m, d).ok())
}

fn visit() -> impl Strategy<Value = Visit> {
    let who = (
        date(),
        select(vec![Sex::Female, Sex::Male]),
        maybe(Field::Age),
        number(Field::Stature),
        number(Field::Mass),
        subsequence(Scope::ALL.to_vec(), 0..=Scope::ALL.len()).prop_shuffle(),
    );
    let caps = (maybe(Field::KneeRange), maybe(Field::HipRange), maybe(Field::Load), any::<String>()).prop_map(
        |(knee_deg, hip_deg, load_kg, source)| Caps {
            knee_deg,
            hip_deg,
            load_kg,
            source: source.chars().take(200).collect(),
        },
    );
    let factor = || prop_oneof![Just(1.0), number(Field::Strength)];
    let strength = (factor(), factor(), factor(), factor()).prop_map(|(ankle, knee, hip, low_back)| PerJoint {
        ankle,
        knee,
        hip,
        low_back,
    });
    let rest = (any::<String>(), select(SegmentTable::ALL.to_vec()), strength);
    (who, build(), joints(), caps, tasks(), rest).prop_map(
        |(
            (date, sex_model, age_years, stature_cm, mass_kg, scope),
            build,
            joints,
            caps,
            tasks,
            (note, segments, strength),
        )| Visit {
            date,
            sex_model,
            age_years,
            stature_cm,
            mass_kg,
            scope,
            build,
            joints,
            caps,
            tasks,
            note,
            segments,
            strength,
        },
    )
}

/// A client that can be written.
pub fn client() -> impl Strategy<Value = Client> {
    ("[^\\p{C}\\p{Z}./\\\\:*?\"<>|]{1,40}", vec(visit(), 1..3))
        .prop_map(|(code, visits)| Client { code: Code::new(code).expect("a code that holds"), visits })
}
