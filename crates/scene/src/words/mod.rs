//! Every sentence made from results, in one place.
//!
//! The clinician's line and the client's line differ on purpose: [`clinician`] speaks the trade's
//! terms with numbers; [`client`] speaks plainly and never uses a word of [`NEVER`]. Depths are
//! spoken to 5° and 1 cm, arms to 1 cm.

pub mod client;
pub mod clinician;
pub mod names;
pub mod notices;
pub mod why;

pub use notices::STANDING_CAUTION as CAUTION;

/// Beginnings of words that a client's view or sheet never shows.
pub const NEVER: [&str; 18] = [
    "limit", "fail", "fall", "tip", "weak", "bad", "abnormal", "wrong", "cost", "round", "risk", "damage", "only", "%",
    "n·m", "ratio", "percent", "average",
];

/// The first word of [`NEVER`] that a sentence for the client uses, if any; also a ratio such as
/// `2.1 : 1`.
#[must_use]
pub fn breaks_never_list(sentence: &str) -> Option<&'static str> {
    let low = sentence.to_lowercase();
    if low.contains(" : ") {
        return Some("ratio");
    }
    // the start of any run of letters counts, whatever stands before it
    let words = || low.split(|c: char| !c.is_alphanumeric());
    NEVER.into_iter().find(|never| {
        let sign = never.chars().any(|c| !c.is_alphanumeric());
        if sign { low.contains(never) } else { words().any(|w| w.starts_with(never)) }
    })
}

/// A list in words: `a`, `a and b`, `a, b and c`.
#[must_use]
pub fn list(parts: &[&str]) -> String {
    match parts {
        [] => String::new(),
        [one] => (*one).to_owned(),
        [first @ .., last] => format!("{} and {last}", first.join(", ")),
    }
}

/// The same with a capital first letter.
#[must_use]
pub fn capital(sentence: &str) -> String {
    let mut chars = sentence.chars();
    chars.next().map_or_else(String::new, |c| c.to_uppercase().chain(chars).collect())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_list_catches_words_and_their_forms() {
        for (s, found) in [
            ("You fall backwards", "fall"),
            ("the limit is reached", "limit"),
            ("it tips back", "tip"),
            ("about 58 %", "%"),
            ("about 58%", "%"),
            ("it’s “wrong”", "wrong"),
            ("57 N·m", "n·m"),
            ("arms 2.1 : 1", "ratio"),
            ("Only here", "only"),
        ] {
            assert_eq!(breaks_never_list(s), Some(found), "{s}");
        }
        assert_eq!(breaks_never_list("your weight is over the middle of your feet"), None);
    }

    #[test]
    fn lists_and_capitals() {
        assert_eq!(list(&["a"]), "a");
        assert_eq!(list(&["a", "b", "c"]), "a, b and c");
        assert_eq!(capital("ankle"), "Ankle");
        assert_eq!(capital(""), "");
    }
}
