//! From a file and the options to one squat of one client.

use std::path::{Path, PathBuf};

use plumbfold_core::{Case, Notice};
use plumbfold_records::{Client, Opened, Problem, Visit, open};

use super::args::Selection;

/// One squat of one client.
#[derive(Clone, Debug, PartialEq)]
pub struct Chosen {
    /// The file.
    pub file: PathBuf,
    /// The client in it.
    pub client: Client,
    /// Place of the visit in the list, from 0.
    pub visit: usize,
    /// Place of the task in the visit's list, from 0.
    pub task: usize,
    /// Thigh angle, degrees.
    pub thigh_deg: f64,
}

/// The client that a file holds.
pub fn client(file: &Path) -> Result<Client, Problem> {
    match open(file)? {
        Opened::Current(client) => Ok(client),
        Opened::Newer { format, .. } => Err(problem(
            file,
            Some("format"),
            format!("{format}, written by a newer version"),
            format!("format {} or older", plumbfold_records::CURRENT_FORMAT),
            "update this program to open it",
        )),
    }
}

/// The squat that the options name.
pub fn chosen(of: &Selection) -> Result<Chosen, Problem> {
    let client = client(&of.file)?;
    let visit = match of.visit {
        None => client.latest_visit(),
        Some(number) => number.checked_sub(1).filter(|&at| at < client.visits.len()).ok_or_else(|| {
            let last = client.visits.len();
            problem(
                &of.file,
                None,
                format!("no visit {number}"),
                if last == 1 { "visit 1".to_owned() } else { format!("a visit from 1 to {last}") },
                "choose another with --visit",
            )
        })?,
    };
    // A file that was read has a visit, and each visit a task.
    let no_visit = || problem(&of.file, None, "no visit".to_owned(), "at least one".to_owned(), "add one");
    let at: &Visit = client.visits.get(visit).ok_or_else(no_visit)?;
    let task = match &of.task {
        None => 0,
        Some(name) => at.task_named(name).ok_or_else(|| {
            let names: Vec<String> = at.tasks.iter().map(|task| format!("\"{}\"", task.name)).collect();
            problem(
                &of.file,
                Some(&format!("visits[{visit}].tasks")),
                format!("no task \"{name}\""),
                names.join(" or "),
                "choose one with --task",
            )
        })?,
    };
    let goal = at.tasks.get(task).map(|task| task.goal_thigh_deg).ok_or_else(no_visit)?;
    let thigh_deg = of.thigh.unwrap_or(goal);
    Ok(Chosen { file: of.file.clone(), client, visit, task, thigh_deg })
}

/// The case of one task, or why it cannot be computed.
pub fn case(file: &Path, client: &Client, visit: usize, task: usize) -> Result<(Case, Vec<Notice>), Problem> {
    let impossible = |field: String, value, allowed, hint| problem(file, Some(&field), value, allowed, hint);
    let at = client.visits.get(visit);
    let Some((measures, model)) = at.and_then(|at| Some((at.measures(), at.task(task)?))) else {
        let field = format!("visits[{visit}].tasks[{task}]");
        return Err(impossible(field, "no task".to_owned(), "one".to_owned(), "choose another"));
    };
    Case::new(&measures, &model).map_err(|invalid| {
        let value = format!("{} {}", invalid.name.to_lowercase(), invalid.value);
        impossible(format!("visits[{visit}]"), value, invalid.allowed, invalid.hint)
    })
}

impl Chosen {
    /// The case with the notices it comes with.
    ///
    /// # Errors
    /// A [`Problem`] where the values, each within its bounds, make no possible body together.
    pub fn case(&self) -> Result<(Case, Vec<Notice>), Problem> {
        case(&self.file, &self.client, self.visit, self.task)
    }

    /// Name of the task.
    #[must_use]
    pub fn task_name(&self) -> &str {
        let task = self.client.visits.get(self.visit).and_then(|visit| visit.tasks.get(self.task));
        task.map_or("", |task| task.name.as_str())
    }
}

pub fn problem(file: &Path, field: Option<&str>, value: String, allowed: String, hint: &'static str) -> Problem {
    Problem { file: file.to_owned(), line: None, field: field.map(str::to_owned), value, allowed, hint }
}
