//! What is written reads again to the same bits.

use std::{fs, path::Path};

use plumbfold_records::{Opened, open, read, write};
use proptest::prelude::*;

use crate::{FULL, FULL_2, bits, client, strategies, with};

proptest! {
    #[test]
    fn a_written_client_reads_again_to_the_same_bits(client in strategies::client()) {
        let text = write(&client).expect("a valid client can be written");
        let opened = read(text.as_bytes(), Path::new("x.ron"));
        match opened {
            Ok(Opened::Current(again)) => {
                prop_assert_eq!(bits(&again), bits(&client));
                prop_assert_eq!(write(&again).expect("as before"), text);
            }
            other => prop_assert!(false, "{:?}", other),
        }
    }

    #[test]
    fn no_bytes_make_the_reader_panic(bytes in prop::collection::vec(any::<u8>(), 0..400)) {
        let _ = read(&bytes, Path::new("x.ron"));
    }

    #[test]
    fn no_change_of_one_byte_makes_the_reader_panic_or_a_sentence_of_two_lines(
        full in prop::sample::select(vec![FULL, FULL_2]),
        at in any::<prop::sample::Index>(),
        byte in any::<u8>(),
    ) {
        let mut bytes = full.as_bytes().to_vec();
        bytes[at.index(full.len())] = byte;
        if let Err(problem) = read(&bytes, Path::new("x.ron")) {
            let sentence = problem.to_string();
            prop_assert!(sentence.starts_with("x.ron") && sentence.ends_with('.'), "{}", sentence);
            prop_assert!(!sentence.contains('\n') && sentence.len() < 500, "{}", sentence);
        }
    }
}

#[test]
fn the_text_is_laid_out_like_the_documented_form() {
    let text = write(&client(&with("age_years: Some(34)", "age_years: Some(34.5)"))).expect("valid");
    let lines: Vec<&str> = text.lines().collect();
    assert_eq!(lines[0], "(");
    assert_eq!(lines[1], "    format: 1,");
    assert_eq!(lines[2], "    code: \"fixture-full\",");
    assert_eq!(lines[3], "    visits: [(");
    assert_eq!(lines[4], "        date: \"2024-02-29\",");
    assert!(text.contains("        age_years: Some(34.5),\n"));
    assert!(text.contains("pain_0_10: Some(3),"), "whole numbers stay whole");
    assert!(text.ends_with("    )],\n)\n"), "{text}");
    let mut at = 0;
    for name in [
        "date",
        "sex_model",
        "age_years",
        "stature_cm",
        "mass_kg",
        "scope",
        "build",
        "joints",
        "caps",
        "tasks",
        "note",
        "segments",
        "strength",
    ] {
        let found = text[at..].find(&format!("        {name}: "));
        at += found.unwrap_or_else(|| panic!("{name} is not in its place:\n{text}"));
    }
}

#[test]
fn defaults_are_not_written_out() {
    let least = client(include_str!("fixtures/v1-least.ron"));
    let text = write(&least).expect("valid");
    for name in ["segments", "strength", "support"] {
        assert!(!text.contains(name), "{name}:\n{text}");
    }
}

#[test]
fn demo_clients_are_eight_and_are_written_as_they_stand() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../demo-profiles");
    let mut files: Vec<_> = fs::read_dir(&folder)
        .expect("the folder of demo clients is there")
        .map(|entry| entry.expect("can be listed").path())
        .filter(|path| path.extension().is_some_and(|extension| extension == "ron"))
        .collect();
    files.sort();
    assert_eq!(files.len(), 8);
    for file in files {
        match open(&file) {
            Ok(Opened::Current(demo)) => {
                assert_eq!(file.file_stem().and_then(|stem| stem.to_str()), Some(demo.code.as_str()));
                assert_eq!(write(&demo).expect("valid"), fs::read_to_string(&file).expect("was just read"));
            }
            other => panic!("{}: {other:?}", file.display()),
        }
    }
}
