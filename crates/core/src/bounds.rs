//! The one table of bounded inputs. It drives fields, validation and messages.
//!
//! Values are in the units of client files and screens (cm, mm, degrees, kg), since that is where
//! a person meets a bound. The bounds themselves are ours (assumed): wide enough for any adult or
//! older child, narrow enough to catch a slip of the keyboard.

/// The unit in which a person types a value.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Unit {
    /// Centimetres.
    Cm,
    /// Millimetres.
    Mm,
    /// Kilograms.
    Kg,
    /// Degrees.
    Deg,
    /// Years.
    Years,
    /// Per cent.
    Percent,
    /// A bare number.
    One,
}

impl Unit {
    /// The symbol as written after a number, with its leading space where it has one.
    #[must_use]
    pub const fn suffix(self) -> &'static str {
        match self {
            Self::Cm => " cm",
            Self::Mm => " mm",
            Self::Kg => " kg",
            Self::Deg => "°",
            Self::Years => " years",
            Self::Percent => " %",
            Self::One => "",
        }
    }
}

/// One bounded input.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bounds {
    /// Name in words, as shown in messages.
    pub name: &'static str,
    /// Unit of all numbers here.
    pub unit: Unit,
    /// Least allowed value.
    pub min: f64,
    /// Greatest allowed value.
    pub max: f64,
    /// Step of an arrow key.
    pub step: f64,
    /// Where a field starts when nothing was entered.
    pub default: f64,
    /// One line on what it is or how it is measured.
    pub help: &'static str,
}

impl Bounds {
    /// Whether a value is finite and within the bounds.
    #[must_use]
    pub fn holds(&self, value: f64) -> bool {
        value.is_finite() && value >= self.min && value <= self.max
    }

    /// The allowed range in words, such as `100 to 230 cm`.
    #[must_use]
    pub fn allowed(&self) -> String {
        format!("{} to {}{}", self.min, self.max, self.unit.suffix())
    }
}

macro_rules! fields {
    ($($(#[$doc:meta])* $field:ident = $name:literal, $unit:ident, $min:literal..$max:literal, $step:literal, $default:literal, $help:literal;)*) => {
        /// Which bounded input.
        #[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
        pub enum Field { $($(#[$doc])* #[doc = $help] $field,)* }

        impl Field {
            /// Every bounded input.
            pub const ALL: &'static [Field] = &[$(Field::$field,)*];
        }

        /// The bounds of an input.
        #[must_use]
        pub const fn bounds(field: Field) -> &'static Bounds {
            match field {
                $(Field::$field => &Bounds {
                    name: $name, unit: Unit::$unit, min: $min, max: $max, step: $step, default: $default, help: $help,
                },)*
            }
        }
    };
}

fields! {
    Stature = "Stature", Cm, 100.0..230.0, 0.5, 170.0, "Standing height without shoes";
    Mass = "Mass", Kg, 25.0..250.0, 0.5, 70.0, "Body mass";
    Age = "Age", Years, 5.0..110.0, 1.0, 30.0, "Age in years; rows of the strength table and support edges follow it";
    Shank = "Shank", Cm, 20.0..65.0, 0.1, 41.0, "Lateral malleolus to lateral femoral epicondyle";
    Thigh = "Thigh", Cm, 20.0..65.0, 0.1, 40.0, "Lateral femoral epicondyle to greater trochanter";
    Trunk = "Trunk", Cm, 25.0..75.0, 0.1, 52.0, "Greater trochanter to acromion, standing upright";
    Foot = "Foot", Cm, 14.0..36.0, 0.1, 26.0, "Back of the heel to the longest toe";
    AnkleHeight = "Ankle height", Cm, 3.0..14.0, 0.1, 7.0, "Lateral malleolus above the floor";
    HeelToAnkle = "Heel to ankle", Cm, 2.0..12.0, 0.1, 6.5, "Back of the heel to the malleolus, along the foot";
    UpperArm = "Upper arm", Cm, 15.0..50.0, 0.1, 33.0, "Acromion to elbow crease";
    Forearm = "Forearm", Cm, 12.0..40.0, 0.1, 26.0, "Elbow crease to wrist";
    Hand = "Hand", Cm, 10.0..27.0, 0.1, 19.0, "Wrist to tip of the middle finger";
    KneeToWall = "Knee to wall", Cm, -15.0..25.0, 0.5, 10.0, "Longest toe to the wall, heel down and knee touching, barefoot; negative: toes at the wall, knee short by so much";
    AnkleRange = "Ankle dorsiflexion", Deg, -10.0..60.0, 1.0, 35.0, "Weight-bearing dorsiflexion, knee bent";
    HipRange = "Hip flexion", Deg, 40.0..170.0, 1.0, 100.0, "Hip flexion by the way of measuring chosen";
    KneeRange = "Knee flexion", Deg, 20.0..170.0, 1.0, 140.0, "Knee flexion";
    Reach = "Arm reach limit", Deg, 90.0..260.0, 1.0, 200.0, "How far the arms go up past the front, from hanging down: 180° is in line with the trunk";
    Load = "Load", Kg, 0.0..400.0, 1.0, 0.0, "Load carried";
    Footwear = "Footwear drop", Mm, 0.0..80.0, 1.0, 0.0, "Heel of the shoe above its ball";
    HeelRaise = "Wedge", Mm, 0.0..80.0, 1.0, 0.0, "Wedge or plate under the heels";
    Stance = "Stance", Cm, 5.0..120.0, 1.0, 17.0, "Between the ankle centres; empty: under the hips";
    ToeOut = "Toe-out", Deg, -10.0..60.0, 1.0, 0.0, "Feet turned out, each";
    Bend = "Back may bend", Deg, 0.0..90.0, 1.0, 45.0, "Bend beyond the hip that we allow, pelvis and low back together";
    Lean = "Lean limit", Deg, 10.0..85.0, 1.0, 60.0, "Trunk lean we choose to stay within";
    Goal = "Goal", Deg, 0.0..140.0, 1.0, 90.0, "Thigh angle to reach; 90° is thigh level";
    WeightLeft = "Weight on the left leg", Percent, 0.0..100.0, 1.0, 50.0, "Share of body weight on the left leg";
    Slope = "Usual shank per thigh", One, 0.0..1.5, 0.01, 0.33, "Shank lean gained per degree of thigh";
    Ratio = "Hip arm to knee arm", One, 0.1..10.0, 0.1, 2.0, "Hip arm divided by knee arm";
    HeldShank = "Held shank", Deg, -10.0..60.0, 1.0, 25.0, "Shank angle held through the descent";
    Strength = "Strength factor", One, 0.1..5.0, 0.05, 1.0, "Against a typical untrained adult of the same sex and age";
    SupportFraction = "Support fraction", One, 0.0..1.0, 0.01, 0.5, "Fraction of the foot from the heel";
    SeenThigh = "Seen thigh", Deg, 0.0..140.0, 1.0, 60.0, "Thigh angle seen at the lowest point";
    SeenShank = "Seen shank", Deg, -10.0..60.0, 1.0, 20.0, "Shank angle seen at the lowest point";
    SeenTrunk = "Seen trunk", Deg, -10.0..90.0, 1.0, 40.0, "Trunk lean seen at the lowest point";
    Pain = "Pain", One, 0.0..10.0, 1.0, 0.0, "Pain as the client rates it, 0 to 10";
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_row_is_in_order_and_its_default_allowed() {
        for &field in Field::ALL {
            let b = bounds(field);
            assert!(b.min < b.max && b.step > 0.0, "{field:?}");
            assert!(b.holds(b.default), "{field:?}");
            assert!(!b.holds(f64::NAN) && !b.holds(f64::INFINITY));
        }
    }
}
