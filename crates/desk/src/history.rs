//! Undo and redo: snapshots of the document, one gesture one step.

use crate::{action::GestureId, document::Document};

/// Most steps kept.
const STEPS: usize = 300;

/// What was, and what was taken back.
#[derive(Clone, Debug, Default)]
pub struct History {
    past: Vec<Document>,
    future: Vec<Document>,
    gesture: Option<GestureId>,
}

impl History {
    /// Keeps the state before a change. Changes of one gesture keep the state before its first.
    pub fn keep(&mut self, before: &Document, gesture: Option<GestureId>) {
        if gesture.is_none() || gesture != self.gesture {
            self.past.push(before.clone());
            if self.past.len() > STEPS {
                self.past.remove(0);
            }
        }
        self.gesture = gesture;
        self.future.clear();
    }

    /// Drops a step that a gesture left without a change.
    pub fn drop_if_unchanged(&mut self, now: &Document) {
        if self.past.last() == Some(now) {
            self.past.pop();
            self.gesture = None;
        }
    }

    /// The state before the last step, in exchange for the present one.
    pub fn undo(&mut self, now: &Document) -> Option<Document> {
        let before = self.past.pop()?;
        self.future.push(now.clone());
        self.gesture = None;
        Some(before)
    }

    /// The state after the step taken back last, in exchange for the present one.
    pub fn redo(&mut self, now: &Document) -> Option<Document> {
        let after = self.future.pop()?;
        self.past.push(now.clone());
        self.gesture = None;
        Some(after)
    }

    /// Whether there is a step to take back.
    #[must_use]
    pub fn can_undo(&self) -> bool {
        !self.past.is_empty()
    }

    /// Whether there is a step to make again.
    #[must_use]
    pub fn can_redo(&self) -> bool {
        !self.future.is_empty()
    }
}
