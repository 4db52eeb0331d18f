//! Whether the numbers still belong to the scripts that made them, and to which versions.

use std::{fs, path::Path};

use serde_json::Value;
use sha2::{Digest as _, Sha256};

use crate::reference::{FOLDER, file, text};

fn hex(bytes: &[u8]) -> String {
    Sha256::digest(bytes).iter().map(|byte| format!("{byte:02x}")).collect()
}

/// Files of a header that are no longer what they were when the numbers were made.
fn changed(header: &Value) -> Vec<&str> {
    let listed = header["sha256"].as_object().expect("hashes by file");
    let now = |name: &str| hex(&fs::read(Path::new(FOLDER).join(name)).expect("a listed file"));
    listed.iter().filter(|(name, then)| now(name) != text(then)).map(|(name, _)| name.as_str()).collect()
}

#[test]
fn the_hash_is_sha_256() {
    // FIPS 180-2, appendix B.1
    assert_eq!(hex(b"abc"), "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
}

#[test]
fn the_numbers_were_made_by_the_scripts_beside_them() {
    for (json, script) in WRITTEN {
        let header = &file(json)["header"];
        let changed = changed(header);
        assert!(changed.is_empty(), "{changed:?} changed and {json} did not: run {script} in tests/reference");
        for needed in [script, "chain.py", "tables.json"] {
            assert!(header["sha256"][needed].is_string(), "{json} does not say which {needed} made it");
        }
    }
}

/// A header with another hash is told.
#[test]
fn a_changed_script_is_seen() {
    for (json, script) in WRITTEN {
        let mut header = file(json)["header"].clone();
        header["sha256"][script] = hex(b"another script").into();
        assert_eq!(changed(&header), [script]);
    }
}

/// The versions that the scripts ran with are those that are pinned.
#[test]
fn the_versions_are_the_pinned_ones() {
    let pinned =
        fs::read_to_string(Path::new(FOLDER).join("requirements-outside.txt")).expect("shipped with the tests");
    let pins: Vec<(&str, &str)> = pinned.lines().filter_map(|line| line.split_once("==")).collect();
    assert!(pins.len() >= 4, "{pinned}");
    for (json, _) in WRITTEN {
        let header = &file(json)["header"];
        let ran: Vec<_> = pins.iter().filter(|(package, _)| header[package].is_string()).collect();
        assert!(ran.len() >= 2, "{json} names no packages");
        for (package, version) in ran {
            assert_eq!(text(&header[package]), *version, "{json}: {package}");
        }
    }
}

/// Each file of numbers and the script that writes it.
const WRITTEN: [(&str, &str); 2] = [("statics.json", "statics.py"), ("optima.json", "optima.py")];
