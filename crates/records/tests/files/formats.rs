//! The formats beside each other: which one is written, and what the older becomes in the newer.

use plumbfold_records::{CURRENT_FORMAT, Client, Compared, Felt, PainAt, write};
use proptest::prelude::*;

use crate::{FULL, FULL_2, bits, client, replaced, strategies, with_2, without_additions};

const LEAST: &str = include_str!("fixtures/v1-least.ron");

/// The format that the text of a client says it has.
fn format_written(client: &Client) -> u32 {
    let text = write(client).expect("a valid client can be written");
    let line = text.lines().find_map(|line| line.strip_prefix("    format: ")).expect("a line for the format");
    line.trim_end_matches(',').parse().expect("a number")
}

fn as_format_2(text: &str) -> String {
    replaced(text, "format: 1", "format: 2")
}

#[test]
fn every_field_added_by_format_2_is_read() {
    let full = client(FULL_2);
    let [main, held] = full.visits[0].tasks.as_slice() else { panic!("two tasks in the fixture") };
    let felt = Felt { compared: Compared::Easier, depth_thigh_deg: Some(84.0), pain_0_10: Some(2.0) };
    assert_eq!(main.felt, Some(felt));
    assert_eq!(main.seen.expect("given in the fixture").pain_at, Some(PainAt::Knee));
    assert_eq!((held.felt, held.seen), (None, None));
}

#[test]
fn all_else_in_format_2_is_as_in_format_1() {
    let mut rest = without_additions(client(FULL_2));
    assert_ne!(rest, client(FULL_2));
    rest.code = client(FULL).code;
    assert_eq!(bits(&rest), bits(&client(FULL)));
}

#[test]
fn a_file_of_format_1_is_one_of_format_2_with_nothing_added() {
    for text in [FULL, LEAST] {
        let old = client(text);
        assert_eq!(bits(&old), bits(&client(&as_format_2(text))));
        assert_eq!(bits(&old), bits(&without_additions(old.clone())));
    }
}

#[test]
fn each_word_of_the_added_choices_is_read_and_written() {
    for (word, compared) in ["Easier", "Same", "Harder"].into_iter().zip(Compared::ALL) {
        let found = client(&with_2("Easier", word));
        assert_eq!(found.visits[0].tasks[0].felt.expect("given").compared, compared);
        assert!(write(&found).expect("valid").contains(&format!("felt: Some((compared: {word}, ")));
    }
    for (word, pain_at) in ["Ankle", "Knee", "Hip", "LowBack"].into_iter().zip(PainAt::ALL) {
        let found = client(&with_2("pain_at: Some(Knee)", &format!("pain_at: Some({word})")));
        assert_eq!(found.visits[0].tasks[0].seen.expect("given").pain_at, Some(pain_at));
        assert!(write(&found).expect("valid").contains(&format!("pain_at: Some({word}), ")));
    }
}

#[test]
fn what_felt_holds_beside_the_answer_may_be_left_out() {
    let felt = "felt: Some((compared: Easier, depth_thigh_deg: Some(84.0), pain_0_10: Some(2)))";
    let short = client(&with_2(felt, "felt: Some((compared: Harder))"));
    let expected = Felt { compared: Compared::Harder, depth_thigh_deg: None, pain_0_10: None };
    assert_eq!(short.visits[0].tasks[0].felt, Some(expected));
}

#[test]
fn the_lowest_format_that_loses_nothing_is_written() {
    assert_eq!(CURRENT_FORMAT, 2);
    let plain = client(FULL);
    assert_eq!(format_written(&plain), 1);
    assert_eq!(format_written(&client(&as_format_2(FULL))), 1, "by what is in it, not by what it was");
    assert_eq!(format_written(&client(FULL_2)), 2);
    // Either alone asks for format 2, wherever it stands.
    let mut felt = plain.clone();
    felt.visits[0].tasks[1].felt = Some(Felt { compared: Compared::Same, depth_thigh_deg: None, pain_0_10: None });
    assert_eq!(format_written(&felt), 2);
    let mut hurts = plain;
    hurts.visits.push(hurts.visits[0].clone());
    hurts.visits[1].tasks[0].seen.as_mut().expect("given in the fixture").pain_at = Some(PainAt::LowBack);
    assert_eq!(format_written(&hurts), 2);
}

#[test]
fn what_was_not_noted_is_not_written_in_format_2_either() {
    let mut client = client(FULL_2);
    client.visits[0].tasks[0].felt = None;
    let text = write(&client).expect("valid");
    assert!(text.contains("    format: 2,\n") && !text.contains("felt"), "{text}");
}

proptest! {
    #[test]
    fn the_format_follows_from_what_was_noted(client in strategies::client()) {
        let plain = without_additions(client.clone());
        prop_assert_eq!(format_written(&plain), 1);
        prop_assert_eq!(format_written(&client), if client == plain { 1 } else { 2 });
    }

    #[test]
    fn a_text_of_format_1_reads_to_the_same_bits_in_format_2(client in strategies::client()) {
        let text = write(&without_additions(client)).expect("a valid client can be written");
        let in_2 = text.replacen("    format: 1,", "    format: 2,", 1);
        prop_assert_ne!(&in_2, &text);
        prop_assert_eq!(bits(&crate::client(&in_2)), bits(&crate::client(&text)));
    }
}
