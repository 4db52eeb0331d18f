//! Files that cannot be read, through every command that reads one: one clear sentence that names
//! the file, the exit code, nothing on standard output, nothing written.

use std::{
    ffi::OsStr,
    fs,
    path::{Path, PathBuf},
};

use plumbfold::cli::{Exit, Outcome};
use plumbfold_records::CURRENT_FORMAT;
use tempfile::{TempDir, tempdir};

use crate::{
    TESTS,
    run::{Said, figures, said},
};

/// A sound client, from which broken ones are made.
fn sound() -> String {
    fs::read_to_string(Path::new(TESTS).join("worked/long-thigh-woman.ron")).expect("shipped with the tests")
}

/// The sound client with one piece, which must be there once, replaced.
#[track_caller]
fn with(piece: &str, instead: &str) -> Vec<u8> {
    let text = sound();
    assert_eq!(text.matches(piece).count(), 1, "{piece:?} must stand once");
    text.replace(piece, instead).into_bytes()
}

/// The sound client up to a piece.
#[track_caller]
fn before(piece: &str) -> Vec<u8> {
    let text = sound();
    let (before, _) = text.split_once(piece).expect("the piece");
    before.as_bytes().to_vec()
}

/// What is wrong, the bytes, and what follows the name of the file up to the hint.
fn broken() -> Vec<(&'static str, Vec<u8>, String)> {
    let newer = format!(", format: found 9, written by a newer version, needs format {CURRENT_FORMAT} or older");
    let rows: Vec<(&'static str, Vec<u8>, &str)> = vec![
        ("empty", Vec::new(), ": found an empty file, needs a client file"),
        ("only spaces", b" \n\t\n".to_vec(), ": found an empty file, needs a client file"),
        (
            "truncated in a field",
            before("168.0"),
            ", line 8, visits[0].stature_cm: found the end of the file, needs the rest of it, up to the last closing bracket",
        ),
        (
            "truncated at its end",
            before("    )],\n)"),
            ", line 15, visits[0]: found the end of the file, needs the rest of it, up to the last closing bracket",
        ),
        (
            "text for a number",
            with("stature_cm: 168.0", "stature_cm: \"tall\""),
            ", line 8, visits[0].stature_cm: found the string \"tall\", needs 100 to 230 cm",
        ),
        (
            "number for a text",
            with("code: \"long-thigh-woman\"", "code: 7"),
            ", line 3, code: found 7, needs text in double quotes",
        ),
        (
            "not a number",
            with("mass_kg: 61.0", "mass_kg: NaN"),
            ", line 8, visits[0].mass_kg: found NaN, needs 25 to 250 kg",
        ),
        (
            "not finite",
            with("mass_kg: 61.0", "mass_kg: inf"),
            ", line 8, visits[0].mass_kg: found inf, needs 25 to 250 kg",
        ),
        (
            "1e400",
            with("mass_kg: 61.0", "mass_kg: 1e400"),
            ", line 8, visits[0].mass_kg: found 1e400, needs 25 to 250 kg",
        ),
        (
            "out of range",
            with("shank_cm: Some(39.8)", "shank_cm: Some(398)"),
            ", line 10, visits[0].build.shank_cm: found 398, needs 20 to 65 cm",
        ),
        (
            "unknown word",
            with("placement: ArmsForward", "placement: Backpack"),
            ", line 13, visits[0].tasks[0].placement: found Backpack, needs ArmsCrossed, ArmsForward, AtSides, HighBar, \
             LowBar, FrontRack, Goblet or Overhead",
        ),
        (
            "unknown field",
            with("mass_kg: 61.0", "weight_kg: 61.0"),
            ", line 8, visits[0].weight_kg: found a field not known here, needs ",
        ),
        (
            "field twice",
            with("mass_kg: 61.0", "mass_kg: 61.0, mass_kg: 61.0"),
            ", line 8, visits[0].mass_kg: found the field twice, needs each field once",
        ),
        ("field missing", with(" mass_kg: 61.0,", ""), ", line 15, visits[0].mass_kg: found no value, needs one"),
        (
            "10 MB of brackets",
            vec![b'('; 10_000_000],
            ": found more than 4 MB, needs a client file, which is far smaller",
        ),
        (
            "4 MB of brackets",
            vec![b'['; 4_000_000],
            ", line 1: found [[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[[…, needs fields in ( )",
        ),
        ("newer format", with("format: 1", "format: 9"), &newer),
        (
            "not UTF-8",
            b"(\n\xff\xfe)".to_vec(),
            ", line 2: found bytes that are not UTF-8 text, needs a client file in UTF-8",
        ),
        (
            "a picture",
            b"\x89PNG\r\n\x1a\n".to_vec(),
            ", line 1: found bytes that are not UTF-8 text, needs a client file in UTF-8",
        ),
    ];
    rows.into_iter().map(|(what, bytes, sentence)| (what, bytes, sentence.to_owned())).collect()
}

/// A folder in which nothing must appear or change but what a test puts there.
struct Folder(TempDir);

impl Folder {
    fn new() -> Self {
        Self(tempdir().expect("a folder"))
    }

    fn path(&self, name: &str) -> PathBuf {
        self.0.path().join(name)
    }

    fn put(&self, name: &str, bytes: &[u8]) -> PathBuf {
        let file = self.path(name);
        fs::write(&file, bytes).expect("written");
        file
    }

    fn names(&self) -> Vec<String> {
        let entries = fs::read_dir(self.0.path()).expect("a folder");
        let mut names: Vec<String> =
            entries.map(|entry| entry.expect("an entry").file_name().to_string_lossy().into_owned()).collect();
        names.sort_unstable();
        names
    }
}

/// Every command that reads a client file, on this one.
fn commands<'a>(file: &'a Path, output: &'a Path) -> Vec<Vec<&'a OsStr>> {
    let (file, word) = (file.as_os_str(), |word: &'static str| OsStr::new(word));
    vec![
        vec![word("check"), file],
        vec![word("figures"), file],
        vec![word("figures"), file, word("--json")],
        vec![word("reasons"), file],
        vec![word("reasons"), file, word("--json")],
        vec![word("sheet"), file, word("-o"), output.as_os_str()],
        vec![word("open"), file],
    ]
}

#[track_caller]
fn assert_refused(said: &Said, file: &Path, sentence: &str) {
    assert_eq!((said.code(), said.out.as_str()), (Some(1), ""), "{said:?}");
    let line = said.err.strip_suffix('\n').unwrap_or_else(|| panic!("{:?} ends without a line", said.err));
    assert!(!line.contains('\n') && line.ends_with('.'), "{line:?} is no sentence on a line");
    let about = line.strip_prefix(&file.display().to_string()).unwrap_or_else(|| panic!("{line:?} names no file"));
    let hint = about.strip_prefix(sentence).unwrap_or_else(|| panic!("{about:?} is not {sentence:?} and a hint"));
    assert!(hint.contains("; ") && hint.len() > 8, "{hint:?} says nothing of what to do");
}

#[test]
fn every_bad_file_is_one_sentence_whatever_was_asked_of_it() {
    let folder = Folder::new();
    let output = folder.path("out.png");
    for (what, bytes, sentence) in broken() {
        let file = folder.put("client.ron", &bytes);
        for args in commands(&file, &output) {
            assert_refused(&said(&args), &file, &sentence);
        }
        assert!(fs::read(&file).expect("there") == bytes, "{what}: the file has changed");
        assert_eq!(folder.names(), ["client.ron"], "{what}");
    }
}

#[test]
fn what_is_no_file_is_refused_alike() {
    let folder = Folder::new();
    let output = folder.path("out.png");
    let inner = folder.path("inner");
    fs::create_dir(&inner).expect("a folder");
    for (file, sentence) in [
        (inner, ": found a folder, needs a client file"),
        (folder.path("none.ron"), ": found no such file, needs a client file that can be read"),
        (folder.path("none/none.ron"), ": found no such file, needs a client file that can be read"),
    ] {
        for args in commands(&file, &output) {
            assert_refused(&said(&args), &file, sentence);
        }
        assert_eq!(folder.names(), ["inner"]);
    }
}

/// Starting the program as somebody else is left to the tests of the program itself.
#[cfg(unix)]
#[test]
fn a_file_without_permission_is_refused_alike() {
    use std::os::unix::fs::PermissionsExt as _;
    let folder = Folder::new();
    let file = folder.put("client.ron", sound().as_bytes());
    fs::set_permissions(&file, fs::Permissions::from_mode(0o000)).expect("set");
    if fs::read(&file).is_ok() {
        println!("not tested: this user, root perhaps, may read every file");
        return;
    }
    for args in commands(&file, &folder.path("out.png")) {
        assert_refused(&said(&args), &file, ": found a file you may not read, needs a client file that can be read");
    }
}

#[test]
fn a_byte_order_mark_changes_nothing() {
    let folder = Folder::new();
    let plain = folder.put("plain.ron", sound().as_bytes());
    let marked = folder.put("marked.ron", format!("\u{feff}{}", sound()).as_bytes());
    assert_eq!(figures(&plain, &[]), figures(&marked, &[]));
    assert_eq!(said(&[OsStr::new("check"), marked.as_os_str()]).code(), Some(0));
    let sheet = said(&[OsStr::new("sheet"), marked.as_os_str(), OsStr::new("-o"), folder.path("a.png").as_os_str()]);
    assert!(matches!(sheet.outcome, Outcome::Sheet(_)), "{sheet:?}");
}

#[test]
fn lengths_that_cannot_fit_the_stature_are_told_and_not_refused() {
    let folder = Folder::new();
    let file = folder.put("client.ron", &with("stature_cm: 168.0", "stature_cm: 200.0"));
    let found = figures(&file, &["--thigh", "20"]);
    let notices = found["notices"].as_array().expect("a list");
    assert!(notices.iter().any(|notice| notice.as_str().is_some_and(|n| n.contains("usual is 82 %"))), "{notices:?}");
    let fits = figures(&folder.put("fits.ron", sound().as_bytes()), &["--thigh", "20"]);
    assert_eq!(fits["notices"], serde_json::json!([]));
}

#[test]
fn check_goes_through_all_files_and_fails_when_one_does() {
    let folder = Folder::new();
    let good = folder.put("good.ron", sound().as_bytes());
    let bad = folder.put("bad.ron", b"");
    let all = said(&[OsStr::new("check"), bad.as_os_str(), good.as_os_str()]);
    assert_eq!(all.code(), Some(1));
    assert_eq!(all.out, format!("{}: in order, long-thigh-woman, 1 visit, 1 task\n", good.display()));
    assert!(all.err.starts_with(&bad.display().to_string()) && all.err.lines().count() == 1, "{}", all.err);
    assert_eq!(said(&[OsStr::new("check"), good.as_os_str()]).code(), Some(0));
}

#[test]
fn wrong_usage_is_two_and_says_so_on_standard_error() {
    let folder = Folder::new();
    let file = folder.put("client.ron", sound().as_bytes());
    let file = file.to_str().expect("a path of this test");
    for args in [
        &["squat"][..],
        &["figures"],
        &["figures", file, "--thigh", "140.5"],
        &["figures", file, "--thigh", "deep"],
        &["figures", file, "--visit", "-1"],
        &["sheet", file],
        &["sheet", file, "-o", "sheet.jpg"],
        &["check"],
        &["open"],
        &["open", file, "more"],
        &["--nothing"],
    ] {
        let words: Vec<&OsStr> = args.iter().map(OsStr::new).collect();
        let said = said(&words);
        assert_eq!((said.code(), said.out.as_str()), (Some(2), ""), "{args:?}");
        assert!(said.err.starts_with("error: "), "{args:?}: {}", said.err);
    }
    assert_eq!(folder.names(), ["client.ron"]);
}

#[test]
fn the_three_exit_codes_are_zero_one_and_two() {
    assert_eq!([Exit::Fine, Exit::BadInput, Exit::WrongUsage].map(Exit::code), [0, 1, 2]);
}
