//! Notices and refusals in words, for the clinician.

use plumbfold_core::{Angle, Notice, Refusal};

use super::{capital, names};
use crate::format;

/// Stands wherever results stand.
pub const STANDING_CAUTION: &str = "A simple static model, not a diagnosis. Clinical judgement and local practice decide; stop if pain is more than agreed.";

/// Stands near moments, once.
pub const NET_MOMENTS_CAUTION: &str =
    "Net moments are work required at the joint, not joint force and not injury risk.";

/// What the model leaves out, in one sentence.
pub const LEFT_OUT: &str = "Static, both legs alike, heels down, head in line with the trunk; soft tissue counts through the measured ranges alone.";

/// Near the figure of a client for whom efforts and percentiles are withheld.
pub const FIGURE_ONLY: &str = "Figure and angles are shown; efforts and percentiles do not apply here.";

/// Why there is no posture at a depth.
#[must_use]
pub const fn refusal(r: Refusal) -> &'static str {
    match r {
        Refusal::Stance => "the legs do not reach this stance",
        Refusal::Ankle => "the ankle range is used up",
        Refusal::Knee => "the knee range is used up",
        Refusal::Hip => "the hip range and the bend we allow are used up",
    }
}

/// A notice as one sentence.
#[must_use]
pub fn notice(n: &Notice) -> String {
    match n {
        Notice::AgeUnknown => "Age not given: strength and support edges of a 30-year-old are used.".to_owned(),
        Notice::PastSurveyAge => {
            "Over 58 years: lengths not measured are estimated beyond the ages surveyed; measure them.".to_owned()
        }
        Notice::FigureOnly(s) => format!("{}: {}", capital(names::scope(*s)), lower(FIGURE_ONLY)),
        Notice::Care(s) => format!("{}: take care; results may apply less well.", capital(names::scope(*s))),
        Notice::LengthsUnlikely { share } => format!(
            "Ankle, shank, thigh and trunk add up to {} of the stature, usual is 82 %: check the lengths.",
            format::percent(*share)
        ),
        Notice::LoadCapped { asked_kg, used_kg } => {
            format!("Load {} is above the precaution: {} is used.", format::kg(*asked_kg), format::kg(*used_kg))
        }
        Notice::WeightUneven { share } => {
            format!("Demands are those of the leg that carries {} of the weight.", format::percent(*share))
        }
        Notice::NoSteadyStanding => {
            "Not steady on mid-foot even standing: no depth can be given; check lengths, load and heel.".to_owned()
        }
        Notice::NoStanding => "No balanced standing with these values: check lengths, load and heel.".to_owned(),
        Notice::KneesOffFeet { twist } => {
            format!("Knees and feet point {} apart: change toe-out or stance.", format::deg(*twist))
        }
        Notice::ArmsShort { by } => format!("Arms stay {} short of the vertical.", format::deg(angle_size(*by))),
        Notice::StrengthStretched => {
            "A joint is bent beyond the angles over which strength was measured: effort there is an extrapolation."
                .to_owned()
        }
        Notice::CalfContact => {
            "Beyond about 130° of knee flexion thigh and calf touch: the knee demand shown is too high.".to_owned()
        }
        Notice::WideStance => {
            "A stance over 0.40 of the stature: sideways moments are not computed, so nothing here praises it."
                .to_owned()
        }
    }
}

fn angle_size(a: Angle) -> Angle {
    Angle::from_rad(a.rad().abs())
}

fn lower(sentence: &str) -> String {
    let mut chars = sentence.chars();
    chars.next().map_or_else(String::new, |c| c.to_lowercase().chain(chars).collect())
}

#[cfg(test)]
mod tests {
    use super::*;
    use plumbfold_core::Scope;

    #[test]
    fn numbers_stand_in_their_sentences() {
        assert!(notice(&Notice::LoadCapped { asked_kg: 40.0, used_kg: 12.5 }).contains("40 kg"));
        assert!(notice(&Notice::LoadCapped { asked_kg: 40.0, used_kg: 12.5 }).contains("12.5 kg is used"));
        assert!(notice(&Notice::KneesOffFeet { twist: Angle::from_deg(17.6) }).contains("18° apart"));
        assert!(notice(&Notice::LengthsUnlikely { share: 0.751 }).contains("75 %"));
        assert!(notice(&Notice::WeightUneven { share: 0.6 }).contains("60 %"));
        assert!(notice(&Notice::ArmsShort { by: Angle::from_deg(-9.0) }).contains("9° short"));
        assert!(notice(&Notice::FigureOnly(Scope::Pregnant)).starts_with("Pregnant: figure and angles"));
    }

    #[test]
    fn every_notice_is_one_sentence_with_an_end() {
        let all = [
            Notice::AgeUnknown,
            Notice::PastSurveyAge,
            Notice::FigureOnly(Scope::Under18),
            Notice::Care(Scope::Osteoporosis),
            Notice::LengthsUnlikely { share: 0.9 },
            Notice::LoadCapped { asked_kg: 2.0, used_kg: 1.0 },
            Notice::WeightUneven { share: 0.7 },
            Notice::NoSteadyStanding,
            Notice::NoStanding,
            Notice::KneesOffFeet { twist: Angle::from_deg(20.0) },
            Notice::ArmsShort { by: Angle::from_deg(20.0) },
            Notice::StrengthStretched,
            Notice::CalfContact,
            Notice::WideStance,
        ];
        for n in all {
            let s = notice(&n);
            assert!(s.ends_with('.') && s.chars().next().is_some_and(char::is_uppercase), "{s}");
            assert!(crate::fonts::has_glyphs(&s), "{s}");
        }
    }
}
