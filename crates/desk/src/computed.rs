//! What follows from the document, computed once and kept while it holds.

use plumbfold_core::{
    Angle, Balance, Case, Invalid, Measures, Notice, Posture, Reasons, Standing, Step, Study, Task, map::Map, pose,
    reasons, standing, stops::with_usual_ranges, study, takes::Change,
};
use plumbfold_scene::map::map_of;

use crate::document::Document;

/// The study of the task on the desk.
#[derive(Clone, Debug)]
pub struct Computed {
    measures: Measures,
    task: Task,
    /// The study and its notices, or why there is none.
    pub outcome: Result<Results, Invalid>,
}

/// What was computed.
#[derive(Clone, Debug)]
pub struct Results {
    /// Depths and descent.
    pub study: Study,
    /// The same with average lengths for this stature.
    pub average: Study,
    /// The same with usual ranges.
    pub usual: Study,
    /// Why not lower, and what it would take.
    pub reasons: Reasons,
    /// Where it balances.
    pub map: Map,
    /// Whether reasons and map are those from before a drag that still goes on.
    pub renewing: bool,
    /// What must be told.
    pub notices: Vec<Notice>,
    /// Deepest thigh angle with any posture, degrees.
    pub deepest_deg: f64,
}

impl Computed {
    /// Computes for a document.
    #[must_use]
    pub fn new(doc: &Document) -> Option<Self> {
        let (measures, task) = (doc.visit().measures(), doc.visit().task(doc.task)?);
        let outcome = Case::new(&measures, &task).map(|(case, notices)| results(&case, notices));
        Some(Self { measures, task, outcome })
    }

    /// Computes for a document during a drag: what moves at once, the rest after it.
    #[must_use]
    pub fn during_drag(doc: &Document, old: &Results) -> Option<Self> {
        let (measures, task) = (doc.visit().measures(), doc.visit().task(doc.task)?);
        let outcome = Case::new(&measures, &task).map(|(case, notices)| renewed(&case, notices, old));
        Some(Self { measures, task, outcome })
    }

    /// Whether part of it waits for the end of a drag.
    #[must_use]
    pub fn waits(&self) -> bool {
        self.results().is_some_and(|r| r.renewing)
    }

    /// Whether this still holds for a document.
    #[must_use]
    pub fn holds_for(&self, doc: &Document) -> bool {
        doc.visit().task(doc.task).is_some_and(|t| t == self.task) && doc.visit().measures() == self.measures
    }

    /// The results, where there are any.
    #[must_use]
    pub fn results(&self) -> Option<&Results> {
        self.outcome.as_ref().ok()
    }
}

fn results(case: &Case, notices: Vec<Notice>) -> Results {
    let study = study(case);
    let average = plumbfold_core::study(&case.with_average_lengths());
    let usual = plumbfold_core::study(&with_usual_ranges(case));
    let map = map_of(&study);
    let reasons = reasons(case);
    Results { average, usual, reasons, map, renewing: false, notices, deepest_deg: deepest(case), study }
}

/// What is seen move while something is dragged; what takes longer stays as it was, and is marked.
fn renewed(case: &Case, notices: Vec<Notice>, old: &Results) -> Results {
    let study = study(case);
    Results { notices, deepest_deg: deepest(case), study, renewing: true, ..old.clone() }
}

/// Deepest thigh angle, from standing, at which there is a posture at all (degrees, to 0.01°).
fn deepest(case: &Case) -> f64 {
    let there = |deg: f64| Step::at(case, Angle::from_deg(deg)).balance.posture().is_some();
    let mut last = 0.0;
    let mut deg = 0.0;
    while deg < 140.0 {
        deg += 2.0;
        if !there(deg) {
            let (mut a, mut b) = (last, deg);
            while b - a > 0.01 {
                let mid = 0.5 * (a + b);
                if there(mid) { a = mid } else { b = mid }
            }
            return a;
        }
        last = deg;
    }
    140.0
}

impl Results {
    /// The posture at a depth, with its readings; beyond the deepest there is, the deepest.
    #[must_use]
    pub fn at(&self, depth_deg: f64) -> Step {
        Step::at(&self.study.case, Angle::from_deg(depth_deg.clamp(0.0, self.deepest_deg)))
    }

    /// The study after changes made one after the other; none where one does not go with the task.
    #[must_use]
    pub fn tried(&self, changes: &[Change]) -> Option<Study> {
        let mut case = self.study.case.clone();
        for c in changes {
            case = case.changed(c).ok()?;
        }
        Some(study(&case))
    }

    /// A posture with the trunk held at another lean, and how it then stands.
    #[must_use]
    pub fn straightened(&self, p: &Posture, lean: Angle) -> Option<(Posture, Standing)> {
        let held = pose(&self.study.case, p.shank, p.thigh, lean)?;
        Some((held, standing(&self.study.case, &held)))
    }

    /// The posture that the handles move while matching: the squat seen, else the computed one.
    #[must_use]
    pub fn matched(&self, depth_deg: f64) -> Option<Posture> {
        match self.seen() {
            Some(seen) => seen.posture().copied(),
            None => self.at(depth_deg).balance.posture().copied(),
        }
    }

    /// A seen squat as a posture, and how it stands.
    #[must_use]
    pub fn seen(&self) -> Option<Balance> {
        let seen = self.study.case.task().seen?;
        let posture = pose(&self.study.case, seen.shank, seen.thigh, seen.trunk)?;
        Some(Balance::Stands { standing: standing(&self.study.case, &posture), posture })
    }
}
