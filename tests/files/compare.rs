//! Comparing many numbers at once: everything out of tolerance is told, not only the first.

use serde_json::Value;

/// What was out of tolerance, and how many numbers were compared.
#[derive(Default)]
pub struct Report {
    over: Vec<String>,
    compared: usize,
}

impl Report {
    /// Two numbers and how far apart they may be; a NaN is never near.
    pub fn near(&mut self, what: &str, ours: f64, theirs: f64, tol: f64) {
        self.compared += 1;
        let off = (ours - theirs).abs();
        // so that a NaN is told
        if !matches!(off.partial_cmp(&tol), Some(std::cmp::Ordering::Less | std::cmp::Ordering::Equal)) {
            self.over.push(format!("{what}: {ours} against {theirs}, more than {tol} apart"));
        }
    }

    /// The same where there may be no number; there must be one on both sides or on neither.
    pub fn near_if_any(&mut self, what: &str, ours: Option<f64>, theirs: Option<f64>, tol: f64) {
        match (ours, theirs) {
            (Some(ours), Some(theirs)) => self.near(what, ours, theirs, tol),
            _ => self.same(what, &ours, &theirs),
        }
    }

    /// Two things that must be the same.
    pub fn same<T: PartialEq + std::fmt::Debug + ?Sized>(&mut self, what: &str, ours: &T, theirs: &T) {
        self.compared += 1;
        if ours != theirs {
            self.over.push(format!("{what}: {ours:?} against {theirs:?}"));
        }
    }

    /// Whether anything was out of tolerance so far.
    pub fn disagrees(&self) -> bool {
        !self.over.is_empty()
    }

    /// Fails where anything was out of tolerance, or fewer numbers were compared than there must be.
    #[track_caller]
    pub fn finish(self, at_least: usize) {
        let shown: Vec<&str> = self.over.iter().take(40).map(String::as_str).collect();
        assert!(shown.is_empty(), "{} of {} disagree:\n{}", self.over.len(), self.compared, shown.join("\n"));
        assert!(self.compared >= at_least, "only {} numbers were compared", self.compared);
    }
}

/// A number that must be there.
#[track_caller]
pub fn number(value: &Value) -> f64 {
    value.as_f64().unwrap_or_else(|| panic!("{value} is no number"))
}

/// A text that must be there.
#[track_caller]
pub fn text(value: &Value) -> &str {
    value.as_str().unwrap_or_else(|| panic!("{value} is no text"))
}

/// The fields of an object.
#[track_caller]
pub fn fields(value: &Value) -> impl Iterator<Item = (&str, &Value)> {
    value.as_object().unwrap_or_else(|| panic!("{value} is no object")).iter().map(|(key, value)| (key.as_str(), value))
}
