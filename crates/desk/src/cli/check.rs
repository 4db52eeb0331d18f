//! `plumbfold check`: whether files are in order.

use std::{
    io::Write,
    path::{Path, PathBuf},
};

use plumbfold_records::{Client, Problem};

use super::{Exit, choose, print, refuse};

/// One line on each file: what is in it on `out`, or what is wrong on `err`.
pub fn command(files: &[PathBuf], out: &mut dyn Write, err: &mut dyn Write) -> Exit {
    let mut exit = Exit::Fine;
    for file in files {
        let told = match checked(file) {
            Ok(client) => print(&line(file, &client), out, err),
            Err(problem) => refuse(&problem, err),
        };
        if told != Exit::Fine {
            exit = told;
        }
    }
    exit
}

/// The client, once every task of every visit could be computed.
fn checked(file: &Path) -> Result<Client, Problem> {
    let client = choose::client(file)?;
    for (visit, at) in client.visits.iter().enumerate() {
        for task in 0..at.tasks.len() {
            choose::case(file, &client, visit, task)?;
        }
    }
    Ok(client)
}

fn line(file: &Path, client: &Client) -> String {
    let count = |n: usize, one: &str| if n == 1 { format!("1 {one}") } else { format!("{n} {one}s") };
    let tasks = client.visits.iter().map(|visit| visit.tasks.len()).sum();
    let (visits, tasks) = (count(client.visits.len(), "visit"), count(tasks, "task"));
    format!("{}: in order, {}, {visits}, {tasks}\n", file.display(), client.code)
}
