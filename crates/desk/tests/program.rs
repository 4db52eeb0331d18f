//! The program as it is started from a shell, on a machine without a display.

use std::{
    fs,
    path::{Path, PathBuf},
    process::{Command, Output},
};

use tempfile::{TempDir, tempdir};

/// The name of the picture that the bare command leaves where there is no display.
const DEMO_SHEET: &str = "plumbfold-demo.png";
/// Least width of a sheet, pixels.
const LEAST_WIDTH_PX: u32 = 1600;

fn program(folder: &Path, args: &[&str]) -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_plumbfold"));
    command.args(args).current_dir(folder).env_remove("DISPLAY").env_remove("WAYLAND_DISPLAY");
    command
}

/// Exit code, standard output, standard error.
fn ended(command: &mut Command) -> (Option<i32>, String, String) {
    let Output { status, stdout, stderr } = command.output().expect("the program starts");
    let utf8 = |bytes| String::from_utf8(bytes).expect("UTF-8");
    (status.code(), utf8(stdout), utf8(stderr))
}

fn run(folder: &Path, args: &[&str]) -> (Option<i32>, String, String) {
    ended(&mut program(folder, args))
}

fn demo(name: &str) -> String {
    let file = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../demo-profiles").join(format!("{name}.ron"));
    file.to_str().expect("a path in UTF-8").to_owned()
}

fn names(folder: &Path) -> Vec<String> {
    let entries = fs::read_dir(folder).expect("a folder");
    let mut names: Vec<String> =
        entries.map(|entry| entry.expect("an entry").file_name().to_string_lossy().into_owned()).collect();
    names.sort_unstable();
    names
}

/// Width in pixels of a PNG, and the names of its pieces in order, each once.
#[track_caller]
fn picture(bytes: &[u8]) -> (u32, Vec<String>) {
    let four = |at: usize| -> [u8; 4] { bytes[at..at + 4].try_into().expect("four bytes") };
    assert!(bytes.starts_with(b"\x89PNG\r\n\x1a\n"), "no PNG");
    let (mut pieces, mut at) = (Vec::new(), 8);
    while at < bytes.len() {
        pieces.push(String::from_utf8(four(at + 4).to_vec()).expect("a name"));
        at += 12 + u32::from_be_bytes(four(at)) as usize;
    }
    assert_eq!(at, bytes.len(), "cut short");
    pieces.dedup();
    (u32::from_be_bytes(four(16)), pieces)
}

/// A PNG wide enough that holds pixels and nothing that tells of its maker or time.
#[track_caller]
fn assert_sheet(file: &Path) {
    let bytes = fs::read(file).expect("a picture");
    let (width, pieces) = picture(&bytes);
    assert!(width >= LEAST_WIDTH_PX, "{width} pixels wide");
    assert!(bytes.len() > 20_000, "{} bytes are an empty page", bytes.len());
    assert!(pieces.starts_with(&["IHDR".to_owned()]) && pieces.ends_with(&["IDAT".to_owned(), "IEND".to_owned()]));
    let others: Vec<_> =
        pieces.iter().filter(|name| !["IHDR", "pHYs", "sRGB", "IDAT", "IEND"].contains(&name.as_str())).collect();
    assert!(others.is_empty(), "{others:?}");
}

/// One sentence on a line of its own.
#[track_caller]
fn assert_sentence(said: &str, parts: &[&str]) {
    assert!(said.ends_with(".\n") && said.lines().count() == 1, "{said:?}");
    for part in parts {
        assert!(said.contains(part), "{said:?} says nothing of {part:?}");
    }
}

#[test]
fn without_a_display_the_bare_command_says_so_and_leaves_the_demo_sheet() {
    let folder = tempdir().expect("a folder");
    let (code, out, err) = run(folder.path(), &[]);
    assert_eq!((code, err.as_str()), (Some(0), ""), "{out}");
    assert!(out.contains("there is no display") && out.contains(DEMO_SHEET) && out.ends_with(".\n"), "{out:?}");
    assert_eq!(names(folder.path()), [DEMO_SHEET]);
    assert_sheet(&folder.path().join(DEMO_SHEET));
}

#[test]
fn an_empty_display_is_none() {
    let folder = tempdir().expect("a folder");
    let mut command = program(folder.path(), &[]);
    let (code, out, _) = ended(command.env("DISPLAY", "").env("WAYLAND_DISPLAY", ""));
    assert_eq!(code, Some(0));
    assert!(out.contains("there is no display"), "{out:?}");
}

#[test]
fn a_second_run_replaces_the_sheet_of_the_first() {
    let folder = tempdir().expect("a folder");
    let file = folder.path().join(DEMO_SHEET);
    assert_eq!(run(folder.path(), &[]).0, Some(0));
    let first = fs::read(&file).expect("a picture");
    let long_ago = std::time::SystemTime::UNIX_EPOCH + std::time::Duration::from_secs(86_400);
    fs::File::options().write(true).open(&file).and_then(|file| file.set_modified(long_ago)).expect("set");
    assert_eq!(run(folder.path(), &[]).0, Some(0));
    assert_ne!(fs::metadata(&file).and_then(|file| file.modified()).expect("a time"), long_ago);
    assert!(fs::read(&file).expect("a picture") == first, "the demo sheet is the same every time");
    assert_eq!(names(folder.path()), [DEMO_SHEET]);
}

#[test]
fn a_file_of_that_name_from_elsewhere_is_left_alone() {
    let narrow = narrow_png();
    for foreign in [&b""[..], b"holiday", &narrow] {
        let folder = tempdir().expect("a folder");
        let file = folder.path().join(DEMO_SHEET);
        fs::write(&file, foreign).expect("written");
        let (code, out, err) = run(folder.path(), &[]);
        assert_eq!((code, out.as_str()), (Some(1), ""), "{err}");
        assert!(err.contains("there is no display") && err.contains(DEMO_SHEET), "{err:?}");
        assert!(err.ends_with(".\n") && err.lines().count() == 1, "{err:?}");
        assert!(fs::read(&file).expect("there") == foreign, "the file has changed");
    }
}

/// The head of a picture of 64 pixels.
fn narrow_png() -> Vec<u8> {
    let mut bytes = b"\x89PNG\r\n\x1a\n\0\0\0\rIHDR".to_vec();
    for number in [64_u32, 64] {
        bytes.extend(number.to_be_bytes());
    }
    bytes.extend([8, 2, 0, 0, 0]);
    bytes
}

#[test]
fn a_file_to_open_without_a_display_is_an_error_that_names_it() {
    let folder = tempdir().expect("a folder");
    let file = demo("demo-hip");
    let (code, out, err) = run(folder.path(), &["open", &file]);
    assert_eq!((code, out.as_str()), (Some(1), ""), "{err}");
    assert!(err.starts_with(&file) && err.contains("there is no display") && err.lines().count() == 1, "{err:?}");
    assert!(names(folder.path()).is_empty());
}

#[test]
fn a_sheet_is_a_picture_of_every_demo_client() {
    let folder = tempdir().expect("a folder");
    let profiles = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../demo-profiles");
    let mut sheets = Vec::new();
    for entry in fs::read_dir(profiles).expect("a folder") {
        let file = entry.expect("an entry").path();
        let sheet = format!("{}.png", file.file_stem().expect("a name").to_string_lossy());
        let said = run(folder.path(), &["sheet", file.to_str().expect("a path in UTF-8"), "-o", &sheet]);
        assert_eq!(said, (Some(0), String::new(), String::new()), "{}", file.display());
        assert_sheet(&folder.path().join(&sheet));
        sheets.push(sheet);
    }
    sheets.sort_unstable();
    assert_eq!(sheets.len(), 8);
    assert_eq!(names(folder.path()), sheets);
}

#[test]
fn visit_task_and_depth_choose_what_is_drawn() {
    let folder = tempdir().expect("a folder");
    let file = demo("demo-ankle");
    let mut pictures = Vec::new();
    for options in [&["--thigh", "30"][..], &["--thigh", "60"], &["--visit", "1", "--thigh", "60"]] {
        let args: Vec<&str> = ["sheet", &file, "-o", "a.png"].iter().chain(options).copied().collect();
        assert_eq!(run(folder.path(), &args).0, Some(0), "{options:?}");
        let picture = fs::read(folder.path().join("a.png")).expect("a picture");
        assert!(!pictures.contains(&picture), "{options:?} draws what was drawn before");
        pictures.push(picture);
    }
}

#[test]
fn the_exit_codes_reach_the_shell() {
    let folder = tempdir().expect("a folder");
    fs::write(folder.path().join("broken.ron"), "(").expect("written");
    assert_eq!(run(folder.path(), &["check", &demo("demo-hip")]).0, Some(0));
    let (code, out, err) = run(folder.path(), &["check", "broken.ron"]);
    assert_eq!((code, out.as_str()), (Some(1), ""));
    assert_sentence(&err, &["broken.ron, line 1"]);
    assert_eq!(run(folder.path(), &["sheet", "broken.ron", "-o", "a.png"]), (Some(1), String::new(), err));
    let (code, out, err) = run(folder.path(), &["sheet", &demo("demo-hip"), "-o", "a.gif"]);
    assert_eq!((code, out.as_str()), (Some(2), ""));
    assert!(err.starts_with("error: "), "{err}");
    assert_eq!(names(folder.path()), ["broken.ron"]);
}

#[test]
fn a_sheet_into_a_folder_that_is_not_there_is_refused() {
    let folder = tempdir().expect("a folder");
    let (code, out, err) = run(folder.path(), &["sheet", &demo("demo-hip"), "-o", "none/a.png"]);
    assert_eq!((code, out.as_str()), (Some(1), ""));
    assert_sentence(&err, &["none/a.png: found ", "; choose another place"]);
    assert!(names(folder.path()).is_empty());
}

/// Where permissions are those of Unix. Root may write anywhere, so as root the program is started
/// as nobody, from a copy that nobody may start.
#[cfg(unix)]
mod closed {
    use std::os::unix::{fs::PermissionsExt as _, process::CommandExt as _};

    use super::*;

    /// The user who owns nothing.
    const NOBODY: u32 = 65_534;

    /// A folder that holds the program, a client file, and what a test closes.
    struct Place {
        folder: TempDir,
        as_nobody: bool,
    }

    fn mode(path: &Path, mode: u32) {
        fs::set_permissions(path, fs::Permissions::from_mode(mode)).expect("set");
    }

    impl Place {
        fn new() -> Self {
            let folder = tempdir().expect("a folder");
            mode(folder.path(), 0o755);
            let place = Self { folder, as_nobody: false };
            let probe = place.path("probe");
            fs::write(&probe, "").expect("written");
            mode(&probe, 0o000);
            let as_nobody = fs::read(&probe).is_ok();
            fs::remove_file(&probe).expect("removed");
            fs::copy(env!("CARGO_BIN_EXE_plumbfold"), place.path("program")).expect("copied");
            mode(&place.path("program"), 0o755);
            fs::copy(demo("demo-hip"), place.path("client.ron")).expect("copied");
            mode(&place.path("client.ron"), 0o644);
            fs::create_dir(place.path("closed")).expect("a folder");
            mode(&place.path("closed"), 0o555);
            Self { as_nobody, ..place }
        }

        fn path(&self, name: &str) -> PathBuf {
            self.folder.path().join(name)
        }

        /// Runs the program in a folder of the place.
        fn run(&self, inner: &str, args: &[&str]) -> (Option<i32>, String, String) {
            let mut command = Command::new(self.path("program"));
            command.args(args).current_dir(self.path(inner)).env_remove("DISPLAY").env_remove("WAYLAND_DISPLAY");
            if self.as_nobody {
                command.uid(NOBODY).gid(NOBODY);
            }
            ended(&mut command)
        }
    }

    #[test]
    fn a_folder_that_may_not_be_written_to_is_told() {
        let place = Place::new();
        let (code, out, err) = place.run("closed", &[]);
        assert_eq!((code, out.as_str()), (Some(1), ""), "{err}");
        assert!(err.contains("there is no display") && err.contains(DEMO_SHEET), "{err:?}");
        assert!(err.ends_with(".\n") && err.lines().count() == 1, "{err:?}");
        let (code, out, err) = place.run("closed", &["sheet", "../client.ron", "-o", "a.png"]);
        assert_eq!((code, out.as_str()), (Some(1), ""));
        assert_sentence(&err, &["a.png: found ", "needs a place that can be written"]);
        assert!(names(&place.path("closed")).is_empty());
        // the same in a folder that may be written to
        fs::create_dir(place.path("open")).expect("a folder");
        mode(&place.path("open"), 0o777);
        assert_eq!(place.run("open", &["sheet", "../client.ron", "-o", "a.png"]).0, Some(0));
    }

    #[test]
    fn a_client_file_that_may_not_be_read_is_told() {
        let place = Place::new();
        mode(&place.path("client.ron"), 0o000);
        for args in [
            &["check", "../client.ron"][..],
            &["figures", "../client.ron"],
            &["figures", "../client.ron", "--json"],
            &["sheet", "../client.ron", "-o", "a.png"],
            &["open", "../client.ron"],
        ] {
            let (code, out, err) = place.run("closed", args);
            assert_eq!((code, out.as_str()), (Some(1), ""), "{args:?}");
            assert_sentence(&err, &["../client.ron: found a file you may not read"]);
        }
        mode(&place.path("client.ron"), 0o644);
        assert_eq!(place.run("closed", &["check", "../client.ron"]).0, Some(0));
    }
}
