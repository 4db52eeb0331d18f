//! The tables that the reference solver reads, against the program's, number by number and both
//! ways: neither has one that the other lacks.

use std::{collections::BTreeMap, fs, path::Path};

use plumbfold_core::{
    Placement, SegmentTable, Sex,
    tables::{self, ArmFrame, CapacityRows, FromStature, Inertia, LoadSite},
};
use serde_json::Value;

use crate::{TESTS, compare::Report};

/// Parts of the file with no counterpart in the program: words, and the population that nothing in
/// this version draws on.
const LEFT_OUT: [&str; 3] = ["units", "note_segments", "population"];

const SEXES: [(&str, Sex); 2] = [("m", Sex::Male), ("f", Sex::Female)];

/// A number, a word or nothing, by the way to it.
#[derive(Debug, PartialEq)]
enum Leaf {
    Number(f64),
    Word(String),
    None,
}

type Leaves = BTreeMap<String, Leaf>;

fn flatten(leaves: &mut Leaves, path: &str, value: &Value) {
    let below = |key: &str| if path.is_empty() { key.to_owned() } else { format!("{path}.{key}") };
    match value {
        Value::Object(fields) => fields.iter().for_each(|(key, value)| flatten(leaves, &below(key), value)),
        Value::Array(items) => {
            items.iter().enumerate().for_each(|(at, value)| flatten(leaves, &below(&at.to_string()), value));
        }
        Value::Number(number) => {
            leaves.insert(path.to_owned(), Leaf::Number(number.as_f64().expect("a number")));
        }
        Value::String(word) => {
            leaves.insert(path.to_owned(), Leaf::Word(word.clone()));
        }
        Value::Null => {
            leaves.insert(path.to_owned(), Leaf::None);
        }
        Value::Bool(_) => panic!("{path}: true or false is no number"),
    }
}

fn of_the_reference() -> Leaves {
    let text = fs::read_to_string(Path::new(TESTS).join("reference/tables.json")).expect("shipped with the tests");
    let mut all: Value = serde_json::from_str(&text).expect("JSON");
    for name in LEFT_OUT {
        assert!(all.as_object_mut().expect("an object").remove(name).is_some(), "{name} is not there any more");
    }
    let mut leaves = Leaves::new();
    flatten(&mut leaves, "", &all);
    leaves
}

/// Collects the program's numbers under the names of the file.
struct Ours(Leaves);

impl Ours {
    fn number(&mut self, path: String, value: f64) {
        assert!(self.0.insert(path, Leaf::Number(value)).is_none());
    }

    fn word(&mut self, path: String, word: &str) {
        assert!(self.0.insert(path, Leaf::Word(word.to_owned())).is_none());
    }

    fn inertia(&mut self, path: &str, i: Inertia) {
        let cm = if path.ends_with(".head") { "above_shoulder" } else { "cm" };
        for (key, value) in [("mass", i.mass), (cm, i.cm), ("rg", i.rg)] {
            self.number(format!("{path}.{key}"), value);
        }
    }

    fn segments(&mut self) {
        for (name, table) in [
            ("segments", SegmentTable::DeLeva),
            ("segments_dempster_winter", SegmentTable::DempsterWinter),
            ("segments_dumas", SegmentTable::Dumas),
        ] {
            for (letter, sex) in SEXES {
                let s = tables::segments(table, sex);
                for (part, i) in [
                    ("pelvis", s.pelvis),
                    ("thorax", s.thorax),
                    ("head", s.head),
                    ("thigh", s.thigh),
                    ("shank", s.shank),
                    ("foot", s.foot),
                    ("upper_arm", s.upper_arm),
                    ("forearm", s.forearm),
                    ("hand", s.hand),
                ] {
                    self.inertia(&format!("{name}.{letter}.{part}"), i);
                }
            }
        }
    }

    fn lengths(&mut self) {
        for (letter, sex) in SEXES {
            let &FromStature { foot, shank, thigh, trunk, upper_arm, forearm, hand, malleolus } =
                tables::from_stature(sex);
            for (part, (a, b)) in [
                ("foot", foot),
                ("shank", shank),
                ("thigh", thigh),
                ("trunk", trunk),
                ("upper_arm", upper_arm),
                ("forearm", forearm),
                ("hand", hand),
                ("malleolus", malleolus),
            ] {
                self.number(format!("estimate_from_stature.{letter}.{part}.0"), a);
                self.number(format!("estimate_from_stature.{letter}.{part}.1"), b);
            }
        }
    }

    fn constants(&mut self) {
        for (name, value) in [
            ("shoulder_centre_below_acromion", tables::SHOULDER_CENTRE_BELOW_ACROMION),
            ("heel_to_ankle", tables::HEEL_TO_ANKLE),
            ("heel_to_ball", tables::HEEL_TO_BALL),
            ("hip_half_spacing", tables::HIP_HALF_SPACING),
            ("knee_front", tables::KNEE_FRONT),
            ("grip", tables::GRIP),
            ("hip_above_seat", tables::HIP_ABOVE_SEAT_M),
            ("usual_shank_at_standing_deg", tables::USUAL_SHANK_AT_STANDING_DEG),
            ("usual_shank_per_thigh", tables::USUAL_SHANK_PER_THIGH),
        ] {
            self.number(format!("constants.{name}"), value);
        }
        for (letter, sex) in SEXES {
            self.number(format!("constants.lumbosacral_height.{letter}"), tables::lumbosacral_height(sex));
            self.number(format!("constants.knee_to_chest_less.{letter}"), tables::knee_to_chest_less_deg(sex));
        }
    }

    fn placements(&mut self) {
        for placement in Placement::ALL {
            let (path, hold) = (format!("placements.{}", placement.key()), tables::hold(placement));
            let frame = match hold.frame {
                ArmFrame::Trunk => "trunk",
                ArmFrame::World => "world",
                ArmFrame::Overhead => "overhead",
            };
            self.word(format!("{path}.frame"), frame);
            self.number(format!("{path}.upper_arm"), hold.upper_arm_deg);
            self.number(format!("{path}.forearm"), hold.forearm_deg);
            match hold.load {
                LoadSite::Hands => self.word(format!("{path}.load"), "hands"),
                LoadSite::Trunk { along, forward } => {
                    self.number(format!("{path}.load.0"), along);
                    self.number(format!("{path}.load.1"), forward);
                }
            }
        }
    }

    fn capacity(&mut self) {
        for (letter, sex) in SEXES {
            let c = tables::capacity(sex);
            for (joint, rows) in [("ankle", &c.ankle), ("knee", &c.knee), ("hip", &c.hip)] {
                let CapacityRows { young, older, eldest } = rows;
                for (age, row) in [("young", young), ("older", older), ("eldest", eldest)] {
                    let path = format!("capacity.{joint}.{letter}.{age}");
                    for (at, value) in [row.c1, row.c2, row.c3].into_iter().enumerate() {
                        self.number(format!("{path}.{at}"), value);
                    }
                    // no end of the fitted range
                    let to = if row.to_rad.is_finite() { Leaf::Number(row.to_rad) } else { Leaf::None };
                    assert!(self.0.insert(format!("{path}.3"), to).is_none());
                }
            }
            self.number(format!("capacity.lumbosacral.{letter}"), c.lumbosacral);
        }
    }
}

fn of_the_program() -> Leaves {
    let mut ours = Ours(Leaves::new());
    ours.segments();
    ours.lengths();
    ours.constants();
    ours.placements();
    ours.capacity();
    ours.0
}

#[test]
fn every_number_of_the_reference_is_the_programs() {
    let (ours, theirs) = (of_the_program(), of_the_reference());
    let names = |leaves: &Leaves| leaves.keys().cloned().collect::<Vec<_>>();
    assert_eq!(names(&ours), names(&theirs));
    let mut report = Report::default();
    for (path, theirs) in &theirs {
        match (&ours[path], theirs) {
            // the last bit may be lost in reading a decimal
            (Leaf::Number(ours), Leaf::Number(theirs)) => report.near(path, *ours, *theirs, 1e-15),
            (ours, theirs) => report.same(path, ours, theirs),
        }
    }
    report.finish(3 * 2 * 9 * 3 + 2 * 8 * 2 + 2 * 9 * 4);
}
