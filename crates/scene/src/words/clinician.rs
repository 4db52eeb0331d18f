//! The clinician's lines.

use plumbfold_core::{
    Angle, Balance, PerJoint,
    balance::{Standing, Toward},
};

use super::{list, names, notices};
use crate::format;

/// How far above the steady depth still counts as just above it.
const NEAR_END: f64 = 5.0;

/// How a posture stands: `balanced on mid-foot`, `balanced near the heels`,
/// `out of balance unaided, 4 cm behind the support`.
#[must_use]
pub fn standing(s: &Standing) -> String {
    match s {
        Standing::Steady => "balanced on mid-foot".to_owned(),
        Standing::Drifting(t) => format!("balanced near the {}", names::toward(*t)),
        Standing::Tips { toward, by_m } => format!("out of balance unaided, {}", beyond_support(*toward, *by_m)),
    }
}

/// `4 cm behind the support`, or less than a centimetre in words.
fn beyond_support(toward: Toward, by_m: f64) -> String {
    let side = match toward {
        Toward::Heels => "behind",
        Toward::Toes => "in front of",
    };
    let by = if by_m < 0.005 { "less than 1 cm".to_owned() } else { format::cm(by_m) };
    format!("{by} {side} the support")
}

/// The title over the figure. `steady` is the depth to which mid-foot balance reaches.
#[must_use]
pub fn headline(b: &Balance, thigh: Angle, steady: Option<Angle>) -> String {
    match b {
        Balance::Refused(r) => format!("No posture at this depth: {}", notices::refusal(*r)),
        Balance::Stands { standing: Standing::Steady, .. } => {
            let room = steady.map(|s| s.deg() - thigh.deg());
            match room {
                Some(r) if (-0.05..=NEAR_END).contains(&r) => {
                    "Balanced on mid-foot, just above where it runs out".to_owned()
                }
                _ => "Balanced on mid-foot".to_owned(),
            }
        }
        Balance::Stands { standing: s, .. } => super::capital(&standing(s)),
    }
}

/// How deep: `on mid-foot to 75° (seat 46 cm), out of balance unaided below 100° (seat 28 cm)`.
/// Each depth comes with its seat height in metres where one is known.
#[must_use]
pub fn depths(steady: Option<(Angle, Option<f64>)>, balance: Option<(Angle, Option<f64>)>) -> String {
    let spoken = |(a, seat): (Angle, Option<f64>)| match seat {
        Some(m) => format!("{} (seat {})", format::deg_up_to(a), format::cm(m)),
        None => format::deg_up_to(a),
    };
    match (steady, balance) {
        (None, None) => "not in balance even standing".to_owned(),
        (None, Some(b)) => {
            format!("not steady on mid-foot even standing; out of balance unaided below {}", spoken(b))
        }
        (Some(s), None) => format!("on mid-foot to {}", spoken(s)),
        (Some(s), Some(b)) if (b.0.deg() - s.0.deg()).abs() < 2.5 => {
            format!("on mid-foot to {}; out of balance unaided below that", spoken(s))
        }
        (Some(s), Some(b)) => {
            format!("on mid-foot to {}; out of balance unaided below {}", spoken(s), spoken(b))
        }
    }
}

/// Lean as a label: `lean 71°`.
#[must_use]
pub fn lean(trunk: Angle) -> String {
    format!("lean {}", format::deg(trunk))
}

/// Bend needed beyond the hip, where there is any to speak of.
#[must_use]
pub fn bend(bend: Angle) -> Option<String> {
    (bend.deg() >= 0.5).then(|| format!("bend needed beyond the hip {}", format::deg(bend)))
}

/// Both arms: `arms 2.1 : 1 (2 : 1 is common practice, not a norm)`; no ratio near standing.
#[must_use]
pub fn arms(ratio: Option<f64>) -> Option<String> {
    ratio
        .filter(|r| *r > 0.0 && *r < 20.0)
        .map(|r| format!("arms {} (2 : 1 is common practice, not a norm)", format::ratio(Some(r))))
}

/// Work shared between knee and hip from their net moments, where both extend.
#[must_use]
pub fn work_shared(moments_nm: &PerJoint<f64>) -> Option<String> {
    let (knee, hip) = (moments_nm.knee, moments_nm.hip);
    (knee > 1.0 && hip > 1.0).then(|| {
        let share = knee / (knee + hip);
        format!(
            "work shared knee {}, hip {}",
            format::percent(share),
            format::percent(1.0 - (share * 100.0).round() / 100.0)
        )
    })
}

/// Effort in words; the fit's stretch is told elsewhere.
#[must_use]
pub fn effort(effort: f64) -> &'static str {
    if effort < 0.30 {
        "light"
    } else if effort < 0.60 {
        "moderate"
    } else if effort <= 1.0 {
        "high"
    } else {
        "beyond typical untrained"
    }
}

/// What the straightened trunk shows: where the centre of mass then falls.
#[must_use]
pub fn straightened(trunk: Angle, standing: &Standing) -> String {
    let held = format!("Trunk held at {}", format::deg(trunk));
    match standing {
        Standing::Steady => format!("{held}: still over mid-foot."),
        Standing::Drifting(t) => format!("{held}: over the {}, still on the support.", names::toward(*t)),
        Standing::Tips { toward, by_m } => {
            let way = match toward {
                Toward::Heels => "back",
                Toward::Toes => "forward",
            };
            format!("{held}: the centre of mass is {}; unaided, this tips {way}.", beyond_support(*toward, *by_m))
        }
    }
}

/// Seen against computed, from the steady depth and the thigh angle seen.
#[must_use]
pub fn seen_and_computed(steady: Option<Angle>, seen: Angle) -> String {
    let seen_words = format::deg_spoken(seen);
    let Some(steady) = steady else {
        return format!("Seen {seen_words}; measures allow no steady depth: check lengths, load and heel.");
    };
    let allow = format::deg_spoken(steady);
    let beyond = seen.deg() - steady.deg();
    if beyond < -10.0 {
        format!(
            "Measures allow about {allow}, seen {seen_words}: build and range do not explain the difference; look at strength, pain, confidence, practice."
        )
    } else if beyond <= 10.0 {
        format!("Measures allow about {allow}, seen {seen_words}: build and range account for where it stops.")
    } else {
        format!(
            "Seen {seen_words}, deeper than the {allow} the measures allow on mid-foot: look at the heels, and measure again."
        )
    }
}

/// Lengths drawn dashed because they come from the stature.
#[must_use]
pub fn estimated(parts: &[&str]) -> Option<String> {
    (!parts.is_empty()).then(|| format!("Dashed: estimated from stature ({})", list(parts)))
}

/// Ranges taken as usual because nobody measured them.
#[must_use]
pub fn assumed(ranges: &[(&str, Angle)]) -> Option<String> {
    let parts: Vec<String> = ranges.iter().map(|(name, a)| format!("{name} {}", format::deg(*a))).collect();
    let parts: Vec<&str> = parts.iter().map(String::as_str).collect();
    (!parts.is_empty()).then(|| format!("Not measured, assumed: {}", list(&parts)))
}

#[cfg(test)]
mod tests {
    use super::*;
    use plumbfold_core::{Case, Refusal, depths as solve, posture, sample};

    fn deg(d: f64) -> Angle {
        Angle::from_deg(d)
    }

    #[test]
    fn standing_says_where_and_by_how_much() {
        assert_eq!(standing(&Standing::Steady), "balanced on mid-foot");
        assert_eq!(standing(&Standing::Drifting(Toward::Toes)), "balanced near the toes");
        assert_eq!(
            standing(&Standing::Tips { toward: Toward::Heels, by_m: 0.0412 }),
            "out of balance unaided, 4 cm behind the support"
        );
        assert_eq!(
            standing(&Standing::Tips { toward: Toward::Toes, by_m: 0.002 }),
            "out of balance unaided, less than 1 cm in front of the support"
        );
    }

    #[test]
    fn the_headline_follows_the_solved_balance() {
        let (m, t) = sample::long_thigh_woman();
        let (case, _) = Case::new(&m, &t).expect("valid");
        let steady = solve(&case).steady.expect("a depth");
        let at = |thigh: Angle| headline(&posture(&case, thigh), thigh, Some(steady));
        assert_eq!(at(deg(20.0)), "Balanced on mid-foot");
        assert_eq!(at(steady - deg(2.0)), "Balanced on mid-foot, just above where it runs out");
        assert!(at(steady + deg(3.0)).starts_with("Balanced near the heels"), "{}", at(steady + deg(3.0)));
        assert_eq!(
            headline(&Balance::Refused(Refusal::Ankle), deg(90.0), None),
            "No posture at this depth: the ankle range is used up"
        );
    }

    #[test]
    fn depths_are_spoken_to_five_degrees_and_one_centimetre() {
        assert_eq!(
            depths(Some((deg(76.2), Some(0.4581))), Some((deg(101.0), Some(0.281)))),
            "on mid-foot to 75° (seat 46 cm); out of balance unaided below 100° (seat 28 cm)"
        );
        assert_eq!(
            depths(Some((deg(76.2), None)), Some((deg(77.0), None))),
            "on mid-foot to 75°; out of balance unaided below that"
        );
        assert_eq!(depths(None, None), "not in balance even standing");
    }

    #[test]
    fn shares_add_up_to_a_hundred() {
        let m = PerJoint { ankle: 10.0, knee: 36.0, hip: 57.0, low_back: 100.0 };
        assert_eq!(work_shared(&m).as_deref(), Some("work shared knee 39 %, hip 61 %"));
        assert_eq!(work_shared(&PerJoint { hip: -3.0, ..m }), None);
    }

    #[test]
    fn the_demonstration_counts_from_the_support() {
        let s = straightened(deg(20.0), &Standing::Tips { toward: Toward::Heels, by_m: 0.092 });
        assert_eq!(s, "Trunk held at 20°: the centre of mass is 9 cm behind the support; unaided, this tips back.");
    }

    #[test]
    fn seen_against_computed_points_where_to_look() {
        assert!(seen_and_computed(Some(deg(85.0)), deg(60.0)).contains("do not explain"));
        assert!(seen_and_computed(Some(deg(75.0)), deg(72.0)).contains("account for"));
        assert!(seen_and_computed(Some(deg(75.0)), deg(95.0)).contains("look at the heels"));
    }

    #[test]
    fn small_things_are_left_unsaid() {
        assert_eq!(bend(deg(0.2)), None);
        assert_eq!(bend(deg(30.2)).as_deref(), Some("bend needed beyond the hip 30°"));
        assert_eq!(arms(Some(-4.0)), None);
        assert_eq!(arms(Some(2.07)).as_deref(), Some("arms 2.1 : 1 (2 : 1 is common practice, not a norm)"));
        assert_eq!(estimated(&[]), None);
        assert_eq!(effort(0.1), "light");
        assert_eq!(effort(1.2), "beyond typical untrained");
    }
}
