//! What the README and its companions promise, as far as a machine can tell.

use std::{
    ffi::OsStr,
    fs,
    path::{Path, PathBuf},
};

use tempfile::tempdir;

use crate::{TESTS, run::said, shape};

fn root() -> PathBuf {
    Path::new(TESTS).join("..")
}

fn document(name: &str) -> String {
    fs::read_to_string(root().join(name)).expect("at the root")
}

/// The first block of code of a language.
fn code<'a>(text: &'a str, language: &str) -> &'a str {
    let (_, rest) = text.split_once(&format!("```{language}\n")).expect("a block of code");
    rest.split_once("```").expect("its end").0
}

#[test]
fn the_client_file_of_the_readme_is_in_order() {
    let folder = tempdir().expect("a folder");
    let file = folder.path().join("demo-1.ron");
    fs::write(&file, code(&document("README.md"), "ron")).expect("written");
    let said = said(&[OsStr::new("check"), file.as_os_str()]);
    assert_eq!((said.code(), said.err.as_str()), (Some(0), ""));
}

#[test]
fn the_readme_names_every_figure_in_its_order() {
    let readme = document("README.md");
    let list =
        readme.split_once("in this order: ").and_then(|(_, list)| list.split_once(". Steady is")).expect("the list").0;
    // in brackets stand values, not names
    let mut depth = 0_i32;
    let names: String = list
        .chars()
        .filter(|c| {
            depth += i32::from(*c == '(') - i32::from(*c == ')');
            depth == 0
        })
        .collect();
    let named: Vec<&str> = names.split('`').skip(1).step_by(2).collect();
    assert_eq!(named, shape::top_keys().collect::<Vec<_>>());
}

#[test]
fn every_command_of_the_help_is_in_the_readme() {
    let readme = document("README.md");
    let help = said(&[OsStr::new("--help")]).out;
    let (_, commands) = help.split_once("Commands:\n").expect("commands");
    let names: Vec<&str> = commands.lines().map_while(|line| line.split_whitespace().next()).collect();
    assert!(names.len() > 3, "{help}");
    for name in names.into_iter().filter(|name| *name != "help") {
        assert!(readme.contains(&format!("| `plumbfold {name} ")), "{name}");
    }
}

#[test]
fn links_lead_somewhere() {
    for name in ["README.md", "DEVELOPERS.md", "CHANGELOG.md"] {
        let text = document(name);
        for link in text.split("](").skip(1).filter_map(|rest| rest.split_once(')')).map(|(link, _)| link) {
            assert!(link.starts_with("https://") || root().join(link).exists(), "{name}: {link}");
        }
    }
}

/// Every module that `DEVELOPERS.md` names in its code map is there, and none is left out.
#[test]
fn the_code_map_names_every_module() {
    let text = document("DEVELOPERS.md");
    for krate in ["core", "records", "scene", "desk"] {
        let (_, rest) = text.split_once(&format!("**`crates/{krate}`")).expect("a section");
        let section = rest.split("\n**`").next().and_then(|section| section.split("\n## ").next()).unwrap_or_default();
        let rows = section.lines().filter(|line| line.starts_with("| `"));
        let mut named: Vec<String> = rows
            .flat_map(|row| row.split('|').nth(1).unwrap_or_default().split('`').skip(1).step_by(2))
            .map(|name| name.trim_end_matches('/').to_owned())
            .collect();
        let mut there: Vec<String> = fs::read_dir(root().join("crates").join(krate).join("src"))
            .expect("a folder")
            .map(|entry| entry.expect("an entry").path())
            .map(|path| path.file_stem().expect("a name").to_string_lossy().into_owned())
            .filter(|name| name != "lib" && name != "main")
            .collect();
        named.sort_unstable();
        there.sort_unstable();
        // a module may be a file with a folder of its parts
        there.dedup();
        assert_eq!(named, there, "{krate}");
    }
}
