//! The client's lines: plain, kind, few numbers. None uses a word of [`super::NEVER`].

use plumbfold_core::{
    Angle, Balance, Refusal,
    balance::{Standing, Toward},
};

use crate::format;

/// The one sentence of the client's view; `bend` is the bend beyond the hip.
#[must_use]
pub fn sentence(b: &Balance, bend: Angle) -> String {
    match b {
        Balance::Refused(r) => refusal(*r).to_owned(),
        Balance::Stands { standing, .. } => {
            let first = standing_line(standing);
            match back(bend) {
                Some(more) if matches!(standing, Standing::Steady | Standing::Drifting(_)) => {
                    format!("{}; {more}", first.trim_end_matches('.'))
                }
                _ => first.to_owned(),
            }
        }
    }
}

/// Where the weight is.
#[must_use]
pub const fn standing_line(s: &Standing) -> &'static str {
    match s {
        Standing::Steady => "Your weight is over the middle of your feet.",
        Standing::Drifting(Toward::Heels) => "Your weight is towards your heels here.",
        Standing::Drifting(Toward::Toes) => "Your weight is towards your toes here.",
        Standing::Tips { .. } => "Here you would want a hold, a wedge or a counterweight.",
    }
}

/// That the back bends, where it does.
#[must_use]
pub fn back(bend: Angle) -> Option<&'static str> {
    (bend.deg() >= 3.0).then_some("your back bends a little, and that is normal.")
}

/// Why the figure stops here.
#[must_use]
pub const fn refusal(r: Refusal) -> &'static str {
    match r {
        Refusal::Stance => "Your feet are too far apart for this; bring them closer.",
        Refusal::Ankle => "Your ankles have used their room here.",
        Refusal::Knee => "Your knees have used their room here.",
        Refusal::Hip => "Your hips have used their room here.",
    }
}

/// How deep in balance, as a chair.
#[must_use]
pub fn chair(seat_m: Option<f64>) -> String {
    match seat_m {
        Some(m) if m > 0.05 => {
            format!("Your ankles and hips let you sit to a {} chair in balance.", format::cm(m))
        }
        Some(_) => "Your ankles and hips let you sit all the way down in balance.".to_owned(),
        None => "A hold, a wedge or a counterweight helps you sit down here.".to_owned(),
    }
}

/// Beside the rail, where mid-foot balance ends.
#[must_use]
pub fn lower_than(seat_m: f64) -> String {
    format!("lower than {} you would want a hold, a wedge or a counterweight", format::cm(seat_m))
}

/// What the straightened trunk shows.
#[must_use]
pub const fn straightened(s: &Standing) -> &'static str {
    match s {
        Standing::Steady => "Held like this, your weight stays over the middle of your feet.",
        Standing::Drifting(Toward::Heels) => "Held this upright, your weight moves towards your heels.",
        Standing::Drifting(Toward::Toes) => "Held like this, your weight moves towards your toes.",
        Standing::Tips { toward: Toward::Heels, .. } => {
            "Held this upright, your weight is behind your heels; leaning forward brings it back over your feet."
        }
        Standing::Tips { toward: Toward::Toes, .. } => {
            "Held like this, your weight is in front of your toes; coming up brings it back over your feet."
        }
    }
}

/// Labels on the client's rail.
pub const RAIL_STEADY: &str = "weight mid-foot";
/// Labels on the client's rail.
pub const RAIL_DRIFTING: &str = "weight near the heels or toes";
/// Labels on the client's rail.
pub const RAIL_HOLD: &str = "with a hold";
/// Label of the seat height now.
#[must_use]
pub fn seat_now(seat_m: f64) -> String {
    format!("seat {}", format::cm(seat_m.max(0.0)))
}

/// Stands at the foot of the client's view and sheet.
pub const CAUTION: &str = "A simple model of your squat. Stop if pain is more than we agreed.";

#[cfg(test)]
mod tests {
    use super::*;
    use crate::words::breaks_never_list;

    fn every_sentence() -> Vec<String> {
        let standings = [
            Standing::Steady,
            Standing::Drifting(Toward::Heels),
            Standing::Drifting(Toward::Toes),
            Standing::Tips { toward: Toward::Heels, by_m: 0.031 },
            Standing::Tips { toward: Toward::Toes, by_m: 0.2 },
        ];
        let mut out: Vec<String> = Vec::new();
        for s in &standings {
            out.push(standing_line(s).to_owned());
            out.push(straightened(s).to_owned());
        }
        for r in [Refusal::Stance, Refusal::Ankle, Refusal::Knee, Refusal::Hip] {
            out.push(sentence(&Balance::Refused(r), Angle::ZERO));
        }
        out.extend(back(Angle::from_deg(20.0)).map(str::to_owned));
        for seat in [None, Some(-0.03), Some(0.02), Some(0.44), Some(0.93)] {
            out.push(chair(seat));
            out.extend(seat.map(lower_than));
            out.extend(seat.map(seat_now));
        }
        out.extend([RAIL_STEADY, RAIL_DRIFTING, RAIL_HOLD, CAUTION].map(str::to_owned));
        out
    }

    #[test]
    fn no_sentence_breaks_the_never_list() {
        let all = every_sentence();
        assert!(all.len() > 25);
        for s in all {
            assert_eq!(breaks_never_list(&s), None, "{s}");
            assert!(crate::fonts::has_glyphs(&s), "{s}");
        }
    }

    #[test]
    fn the_chair_is_the_seat_height_in_centimetres() {
        assert_eq!(chair(Some(0.4391)), "Your ankles and hips let you sit to a 44 cm chair in balance.");
        assert_eq!(seat_now(-0.02), "seat 0 cm");
    }

    #[test]
    fn the_sentence_tells_the_back_where_it_bends_and_holds() {
        use plumbfold_core::{Case, posture, sample};
        let (m, t) = sample::long_thigh_woman();
        let (case, _) = Case::new(&m, &t).expect("valid");
        let deep = posture(&case, Angle::from_deg(72.0));
        let bend = deep.posture().expect("a posture").bend;
        assert!(bend.deg() > 3.0);
        assert_eq!(
            sentence(&deep, bend),
            "Your weight is over the middle of your feet; your back bends a little, and that is normal."
        );
    }
}
