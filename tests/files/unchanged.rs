//! Whether the reference numbers still belong to the files that made them.

use std::{fs, path::Path};

use serde_json::Value;
use sha2::{Digest as _, Sha256};

use crate::{
    TESTS,
    compare::{fields, text},
};

fn hex(bytes: &[u8]) -> String {
    Sha256::digest(bytes).iter().map(|byte| format!("{byte:02x}")).collect()
}

#[test]
fn the_hash_is_sha_256() {
    // FIPS 180-2, appendix B.1
    assert_eq!(hex(b"abc"), "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
}

#[test]
fn the_reference_was_made_by_the_files_beside_it() {
    let folder = Path::new(TESTS).join("reference");
    let file = fs::read_to_string(folder.join("clients.json")).expect("shipped with the tests");
    let header = &serde_json::from_str::<Value>(&file).expect("JSON")["header"];
    let listed: Vec<(&str, &Value)> = fields(&header["sha256"]).collect();
    assert!(listed.len() >= 6, "{header}");
    let changed: Vec<&str> = listed
        .into_iter()
        .filter(|(name, then)| hex(&fs::read(folder.join(name)).expect("a listed file")) != text(then))
        .map(|(name, _)| name)
        .collect();
    assert!(
        changed.is_empty(),
        "{changed:?} changed and clients.json did not: run make_fixtures.py in tests/reference (five minutes)"
    );
}
