//! What is edited: one client, and which of its visits and tasks is on the desk.

use plumbfold_records::{Client, Task, Visit};

/// A client and the place in it. Depth, zoom and open panels are view state, not here.
#[derive(Clone, Debug, PartialEq)]
pub struct Document {
    /// The client, border units exactly as typed.
    pub client: Client,
    /// Which visit; always one there is.
    pub visit: usize,
    /// Which task of it; always one there is.
    pub task: usize,
}

impl Document {
    /// A client at the latest visit and its first task. A client always has both (records refuse
    /// anything else).
    #[must_use]
    pub fn new(client: Client) -> Self {
        let visit = client.latest_visit();
        Self { client, visit, task: 0 }
    }

    /// The visit on the desk.
    #[must_use]
    pub fn visit(&self) -> &Visit {
        &self.client.visits[self.visit]
    }

    /// The visit on the desk, to be edited.
    pub fn visit_mut(&mut self) -> &mut Visit {
        &mut self.client.visits[self.visit]
    }

    /// The task on the desk.
    #[must_use]
    pub fn task(&self) -> &Task {
        &self.visit().tasks[self.task]
    }

    /// The task on the desk, to be edited.
    pub fn task_mut(&mut self) -> &mut Task {
        let at = self.task;
        &mut self.visit_mut().tasks[at]
    }
}
