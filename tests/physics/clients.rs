//! Random valid clients: what was measured, and what is asked of them.

use plumbfold_core::{
    Angle, Bend, Case, Field, Measures, PerJoint, Placement, Rule, Scope, Seen, SegmentTable, Sex, Sides, Support,
    Task, bounds,
    measures::{AnkleRange, Caps, HipRange, KneeRange, Lengths},
    tables,
};
use proptest::{option, prelude::*, sample::select};

/// What was measured and what is asked.
pub type Client = (Measures, Task);

/// Any client that a client file could hold, however odd: every bounded input over its whole range,
/// independent of the others. Some are refused (a knee that cannot reach the wall, a foot on end).
pub fn any_valid() -> impl Strategy<Value = Client> {
    (any_measures(), any_task(true))
}

/// A client as one may walk in: lengths within 15 % of the usual for the stature, ranges and tasks
/// that occur.
pub fn plausible() -> impl Strategy<Value = Client> {
    let sex = prop_oneof![Just(Sex::Male), Just(Sex::Female)];
    (sex, 0.0..1.0, 18.0..38.0)
        .prop_flat_map(|(sex, tall, bmi)| {
            let stature_m = match sex {
                Sex::Male => 1.58 + 0.38 * tall,
                Sex::Female => 1.46 + 0.36 * tall,
            };
            (usual_measures(sex, stature_m, bmi * stature_m * stature_m), any_task(false))
        })
        .prop_map(|(m, mut t)| {
            // no load heavier than one and a half bodies
            t.load_kg *= 1.5 * m.mass_kg;
            (m, t)
        })
        .prop_filter("a knee that can reach the wall", |(m, t)| Case::new(m, t).is_ok())
}

/// Plausible, feet straight ahead and under the hips: all in the sagittal plane.
pub fn plane() -> impl Strategy<Value = Client> {
    plausible().prop_map(|(m, mut t)| {
        t.stance_m = None;
        t.toe_out = Angle::ZERO;
        (m, t)
    })
}

/// A thigh angle from standing to as deep as anyone goes, radians.
pub fn thigh() -> impl Strategy<Value = f64> {
    (0.0..140.0_f64).prop_map(f64::to_radians)
}

fn within(field: Field) -> std::ops::RangeInclusive<f64> {
    let b = bounds(field);
    b.min..=b.max
}

/// A value of a field now and then, in SI (`per` border units to one of ours).
fn maybe(field: Field, per: f64) -> impl Strategy<Value = Option<f64>> {
    option::of(within(field).prop_map(move |v| v / per))
}

fn angle(range: impl Strategy<Value = f64>) -> impl Strategy<Value = Angle> {
    range.prop_map(Angle::from_deg)
}

fn sides<T: std::fmt::Debug + Clone>(s: impl Strategy<Value = T> + Clone) -> impl Strategy<Value = Sides<T>> {
    (option::of(s.clone()), option::of(s)).prop_map(|(left, right)| Sides { left, right })
}

fn sex() -> impl Strategy<Value = Sex> {
    select(vec![Sex::Female, Sex::Male])
}

fn table() -> impl Strategy<Value = SegmentTable> {
    select(SegmentTable::ALL.to_vec())
}

fn any_lengths() -> impl Strategy<Value = Lengths> {
    (
        maybe(Field::Shank, 100.0),
        maybe(Field::Thigh, 100.0),
        maybe(Field::Trunk, 100.0),
        maybe(Field::Foot, 100.0),
        maybe(Field::AnkleHeight, 100.0),
        maybe(Field::HeelToAnkle, 100.0),
        maybe(Field::UpperArm, 100.0),
        maybe(Field::Forearm, 100.0),
        maybe(Field::Hand, 100.0),
    )
        .prop_map(
            |(shank_m, thigh_m, trunk_m, foot_m, ankle_height_m, heel_to_ankle_m, upper_arm_m, forearm_m, hand_m)| {
                Lengths {
                    shank_m,
                    thigh_m,
                    trunk_m,
                    foot_m,
                    ankle_height_m,
                    heel_to_ankle_m,
                    upper_arm_m,
                    forearm_m,
                    hand_m,
                }
            },
        )
}

fn ankle(
    wall_cm: std::ops::RangeInclusive<f64>,
    deg: std::ops::RangeInclusive<f64>,
) -> impl Strategy<Value = AnkleRange> {
    prop_oneof![
        Just(AnkleRange::NotMeasured),
        sides(wall_cm.prop_map(|cm| cm / 100.0)).prop_map(AnkleRange::KneeToWall),
        sides(deg.prop_map(Angle::from_deg)).prop_map(AnkleRange::Degrees),
    ]
}

fn hip(deg: std::ops::RangeInclusive<f64>) -> impl Strategy<Value = HipRange> {
    let s = sides(deg.prop_map(Angle::from_deg));
    prop_oneof![
        Just(HipRange::NotMeasured),
        (s, 0..3).prop_map(|(s, way)| match way {
            0 => HipRange::PelvisHeld(s),
            1 => HipRange::RockBack(s),
            _ => HipRange::KneeToChest(s),
        }),
    ]
}

fn knee(deg: std::ops::RangeInclusive<f64>) -> impl Strategy<Value = KneeRange> {
    prop_oneof![Just(KneeRange::NotMeasured), sides(deg.prop_map(Angle::from_deg)).prop_map(KneeRange::Degrees)]
}

fn strength() -> impl Strategy<Value = PerJoint<f64>> {
    let f = || within(Field::Strength);
    (f(), f(), f(), f()).prop_map(|(ankle, knee, hip, low_back)| PerJoint { ankle, knee, hip, low_back })
}

fn any_measures() -> impl Strategy<Value = Measures> {
    let build = (within(Field::Stature), within(Field::Mass), any_lengths());
    let joints = (
        ankle(within(Field::KneeToWall), within(Field::AnkleRange)),
        hip(within(Field::HipRange)),
        knee(within(Field::KneeRange)),
        angle(within(Field::Reach)),
    );
    let caps = (
        option::weighted(0.2, angle(within(Field::KneeRange))),
        option::weighted(0.2, angle(within(Field::HipRange))),
        option::weighted(0.2, within(Field::Load)),
    );
    let scope = proptest::collection::vec(select(Scope::ALL.to_vec()), 0..2);
    (sex(), option::of(within(Field::Age)), build, joints, caps, scope, table(), strength()).prop_map(
        |(sex, age_years, (cm, mass_kg, lengths), (ankle, hip, knee, reach_limit), caps, scope, table, strength)| {
            let (knee_cap, hip_cap, load_kg) = caps;
            Measures {
                sex,
                age_years,
                stature_m: cm / 100.0,
                mass_kg,
                scope,
                lengths,
                ankle,
                hip,
                knee,
                reach_limit,
                caps: Caps { knee: knee_cap, hip: hip_cap, load_kg },
                table,
                strength,
            }
        },
    )
}

fn usual_lengths(sex: Sex, stature_m: f64) -> impl Strategy<Value = Lengths> {
    let fit = tables::from_stature(sex);
    let ln_mm = (stature_m * 1000.0).ln();
    let one = |(a, b): (f64, f64)| {
        let usual_m = (a + b * ln_mm).exp() / 1000.0;
        option::of((0.85 * usual_m)..(1.15 * usual_m))
    };
    (one(fit.shank), one(fit.thigh), one(fit.trunk), one(fit.foot), one(fit.malleolus), one(fit.upper_arm)).prop_map(
        |(shank_m, thigh_m, trunk_m, foot_m, ankle_height_m, upper_arm_m)| Lengths {
            shank_m,
            thigh_m,
            trunk_m,
            foot_m,
            ankle_height_m,
            upper_arm_m,
            ..Lengths::default()
        },
    )
}

fn usual_measures(sex: Sex, stature_m: f64, mass_kg: f64) -> impl Strategy<Value = Measures> {
    let joints = (ankle(1.0..=17.0, 15.0..=50.0), hip(70.0..=130.0), knee(100.0..=155.0), angle(150.0..=220.0));
    let caps = (option::weighted(0.1, angle(60.0..120.0)), option::weighted(0.1, angle(60.0..100.0)));
    (usual_lengths(sex, stature_m), 18.0..80.0, joints, caps, table(), strength()).prop_map(
        move |(lengths, age, (ankle, hip, knee, reach_limit), (knee_cap, hip_cap), table, strength)| Measures {
            sex,
            age_years: Some(age),
            stature_m,
            mass_kg,
            scope: Vec::new(),
            lengths,
            ankle,
            hip,
            knee,
            reach_limit,
            caps: Caps { knee: knee_cap, hip: hip_cap, load_kg: None },
            table,
            strength,
        },
    )
}

fn rule() -> impl Strategy<Value = Rule> {
    prop_oneof![
        option::of(within(Field::Slope)).prop_map(|slope| Rule::Usual { slope }),
        Just(Rule::LeastEffort),
        within(Field::Ratio).prop_map(Rule::ArmRatio),
        angle(within(Field::HeldShank)).prop_map(Rule::HeldShank),
    ]
}

fn bend() -> impl Strategy<Value = Bend> {
    prop_oneof![
        Just(Bend::Free),
        Just(Bend::KeepSome),
        Just(Bend::KeepSmall),
        angle(within(Field::Bend)).prop_map(Bend::Degrees),
    ]
}

fn seen() -> impl Strategy<Value = Seen> {
    (angle(within(Field::SeenThigh)), angle(within(Field::SeenShank)), angle(within(Field::SeenTrunk)))
        .prop_map(|(thigh, shank, trunk)| Seen { thigh, shank, trunk })
}

/// Five fractions in rising order, anywhere or near the usual.
fn support(anywhere: bool) -> impl Strategy<Value = Support> {
    let five = if anywhere { proptest::array::uniform5(0.0..=1.0).boxed() } else { usual_five().boxed() };
    (five, any::<(bool, bool)>()).prop_map(|(mut f, (back, front))| {
        f.sort_by(f64::total_cmp);
        Support {
            edge_back: back.then_some(f[0]),
            zone_back: f[1],
            aim: f[2],
            zone_front: f[3],
            edge_front: front.then_some(f[4]),
        }
    })
}

fn usual_five() -> impl Strategy<Value = [f64; 5]> {
    (0.10..0.30, 0.35..0.45, 0.46..0.54, 0.55..0.65, 0.70..0.85).prop_map(|(a, b, c, d, e)| [a, b, c, d, e])
}

/// A task; `anywhere` in the bounds, else as tasks are, with the load as a share still to be scaled.
fn any_task(anywhere: bool) -> impl Strategy<Value = Task> {
    let most = |field: Field, usual: f64| if anywhere { bounds(field).max } else { usual };
    let load = (any::<bool>(), 0.0..=most(Field::Load, 1.0)).prop_map(|(some, kg)| if some { kg } else { 0.0 });
    let raise = (0.0..=most(Field::Footwear, 25.0), any::<bool>(), 0.0..=most(Field::HeelRaise, 50.0));
    let least_toe_out = if anywhere { bounds(Field::ToeOut).min } else { 0.0 };
    let stance = (
        option::of((if anywhere { 5.0 } else { 10.0 })..=most(Field::Stance, 70.0)),
        prop_oneof![Just(0.0), least_toe_out..=most(Field::ToeOut, 35.0)],
    );
    let limits = (bend(), option::weighted(0.3, angle(within(Field::Lean))), angle(within(Field::Goal)));
    let how = (option::weighted(0.3, 0.0..=1.0), rule(), option::weighted(0.3, seen()));
    let support = prop_oneof![Just(Support::default()), support(anywhere)];
    (select(Placement::ALL.to_vec()), load, raise, stance, limits, how, support).prop_map(
        |(placement, load_kg, (drop_mm, worn, wedge_mm), (stance_cm, toe_out), limits, how, support)| {
            let ((bend, lean_limit, goal), (weight_left, rule, seen)) = (limits, how);
            Task {
                placement,
                load_kg,
                footwear_drop_m: if worn { drop_mm / 1000.0 } else { 0.0 },
                heel_raise_m: if worn { 0.0 } else { wedge_mm / 1000.0 },
                stance_m: stance_cm.map(|cm| cm / 100.0),
                toe_out: Angle::from_deg(toe_out),
                bend,
                lean_limit,
                goal,
                weight_left,
                rule,
                seen,
                support,
            }
        },
    )
}
