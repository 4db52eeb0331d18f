//! Opening and saving on a real disk.

use std::{fs, path::Path};

use plumbfold_records::{Client, Opened, open, save};
use tempfile::tempdir;

use crate::{FULL, client};

fn entries(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> = fs::read_dir(folder)
        .expect("there")
        .map(|entry| entry.expect("listed").file_name().to_string_lossy().into_owned())
        .collect();
    names.sort();
    names
}

fn changed() -> Client {
    let mut client = client(FULL);
    client.visits[0].note = "changed".to_owned();
    client
}

#[test]
fn what_was_saved_opens_again_and_nothing_is_left_beside_it() {
    let folder = tempdir().expect("a folder");
    let path = folder.path().join("a.ron");
    for client in [client(FULL), changed()] {
        save(&client, &path).expect("saved");
        assert_eq!(open(&path), Ok(Opened::Current(client)));
        assert_eq!(entries(folder.path()), ["a.ron"]);
    }
}

#[test]
fn a_broken_file_may_be_replaced_by_a_sound_one() {
    let folder = tempdir().expect("a folder");
    let path = folder.path().join("a.ron");
    fs::write(&path, "(format: 1, code: ").expect("written");
    assert_eq!(open(&path).expect_err("cut short").value, "the end of the file");
    save(&changed(), &path).expect("saved");
    assert_eq!(open(&path), Ok(Opened::Current(changed())));
}

#[test]
fn a_file_of_a_newer_format_is_never_overwritten() {
    let folder = tempdir().expect("a folder");
    let path = folder.path().join("a.ron");
    let newer = FULL.replace("format: 1", "format: 7");
    fs::write(&path, &newer).expect("written");
    let refused = save(&changed(), &path).expect_err("newer");
    assert_eq!((refused.field.as_deref(), refused.file.as_path()), (Some("format"), path.as_path()));
    assert_eq!(fs::read_to_string(&path).expect("there"), newer);
    assert_eq!(entries(folder.path()), ["a.ron"]);
}

#[test]
fn an_unfit_client_leaves_the_file_as_it_was() {
    let folder = tempdir().expect("a folder");
    let path = folder.path().join("a.ron");
    save(&changed(), &path).expect("saved");
    let mut unfit = client(FULL);
    unfit.visits[0].mass_kg = f64::NAN;
    let refused = save(&unfit, &path).expect_err("not a number");
    assert_eq!((refused.file.as_path(), refused.field.as_deref()), (path.as_path(), Some("visits[0].mass_kg")));
    assert_eq!(open(&path), Ok(Opened::Current(changed())));
    assert_eq!(entries(folder.path()), ["a.ron"]);
}

#[test]
fn what_is_no_file_is_refused_both_ways() {
    let folder = tempdir().expect("a folder");
    let inside = folder.path().join("folder.ron");
    fs::create_dir(&inside).expect("made");
    for refused in [open(&inside).err(), save(&changed(), &inside).err()] {
        let refused = refused.expect("a folder is no file");
        assert_eq!((refused.file.as_path(), refused.value.as_str()), (inside.as_path(), "a folder"));
    }
    let missing = folder.path().join("none.ron");
    assert_eq!(open(&missing).expect_err("missing").value, "no such file");
    let nowhere = folder.path().join("none").join("a.ron");
    assert_eq!(save(&changed(), &nowhere).expect_err("missing").value, "no such folder");
    assert_eq!(entries(folder.path()), ["folder.ron"]);
}

#[test]
fn a_file_too_large_is_not_read_and_not_replaced() {
    let folder = tempdir().expect("a folder");
    let path = folder.path().join("a.ron");
    let size = 10_000_000;
    fs::write(&path, "(".repeat(size)).expect("written");
    assert_eq!(open(&path).expect_err("large").value, "more than 4 MB");
    assert_eq!(save(&changed(), &path).expect_err("large").value, "more than 4 MB");
    assert_eq!(fs::metadata(&path).expect("there").len(), size as u64);
}

#[cfg(unix)]
mod unix {
    use std::os::unix::fs::{PermissionsExt, symlink};

    use super::*;

    #[test]
    fn only_the_owner_may_read_what_was_saved() {
        let folder = tempdir().expect("a folder");
        let path = folder.path().join("a.ron");
        fs::write(&path, "").expect("written");
        fs::set_permissions(&path, fs::Permissions::from_mode(0o644)).expect("set");
        save(&changed(), &path).expect("saved");
        assert_eq!(fs::metadata(&path).expect("there").permissions().mode() & 0o777, 0o600);
    }

    #[test]
    fn a_link_stays_a_link_and_what_it_leads_to_is_replaced() {
        let folder = tempdir().expect("a folder");
        let (path, link) = (folder.path().join("a.ron"), folder.path().join("link.ron"));
        save(&client(FULL), &path).expect("saved");
        symlink(&path, &link).expect("linked");
        save(&changed(), &link).expect("saved");
        assert!(fs::symlink_metadata(&link).expect("there").is_symlink());
        assert_eq!(open(&path), Ok(Opened::Current(changed())));
    }

    #[test]
    fn links_that_lead_in_a_circle_or_nowhere_are_refused() {
        let folder = tempdir().expect("a folder");
        let (a, b) = (folder.path().join("a.ron"), folder.path().join("b.ron"));
        symlink(&a, &b).expect("linked");
        assert_eq!(open(&b).expect_err("nowhere").value, "no such file");
        symlink(&b, &a).expect("linked");
        for refused in [open(&a).err(), save(&changed(), &a).err()] {
            let refused = refused.expect("a circle");
            assert!(refused.value.starts_with("a fault of the system ("), "{refused}");
            assert_eq!(refused.file, a);
        }
        assert_eq!(entries(folder.path()), ["a.ron", "b.ron"]);
    }

    #[test]
    fn a_device_is_refused_without_reading_it() {
        assert_eq!(open(Path::new("/dev/zero")).expect_err("endless").value, "a device or pipe");
    }

    #[test]
    fn without_permission_nothing_is_read_or_written() {
        let folder = tempdir().expect("a folder");
        let path = folder.path().join("a.ron");
        save(&client(FULL), &path).expect("saved");
        let mode = |path: &Path, mode| fs::set_permissions(path, fs::Permissions::from_mode(mode)).expect("set");
        mode(&path, 0o000);
        if fs::read(&path).is_ok() {
            // Root reads and writes everything; there is nothing to see.
            return;
        }
        assert_eq!(open(&path).expect_err("closed").value, "a file you may not read");
        mode(&path, 0o600);
        mode(folder.path(), 0o500);
        let refused = save(&changed(), &path).expect_err("closed");
        mode(folder.path(), 0o700);
        assert_eq!(refused.value, "a folder you may not write to");
        assert_eq!(open(&path), Ok(Opened::Current(client(FULL))));
    }
}
