//! Opening and saving one file.

use std::{
    fs::{self, File, OpenOptions},
    io::{self, ErrorKind, Read as _, Write as _},
    path::{Path, PathBuf},
    process,
    sync::atomic::{AtomicU32, Ordering},
};

use crate::{
    client::Client,
    problem::Problem,
    read::{Opened, SIZE_LIMIT_BYTES, read, too_large},
    write::write,
};

/// Reads a client file from the disk.
///
/// # Errors
/// Where there is no such file, it is a folder or a device, may not be read, leads nowhere, is too
/// large, or holds what [`read`] refuses.
pub fn open(path: &Path) -> Result<Opened, Problem> {
    read(&bytes(path)?, path)
}

fn bytes(path: &Path) -> Result<Vec<u8>, Problem> {
    // Asked before opening: opening a pipe would wait for a writer.
    let kind = fs::metadata(path).map_err(|error| failed(path, &error, Attempt::Reading))?;
    if !kind.is_file() {
        return Err(not_a_file(path, kind.file_type()));
    }
    let file = File::open(path).map_err(|error| failed(path, &error, Attempt::Reading))?;
    let mut bytes = Vec::new();
    let limit = SIZE_LIMIT_BYTES as u64 + 1;
    file.take(limit).read_to_end(&mut bytes).map_err(|error| failed(path, &error, Attempt::Reading))?;
    if bytes.len() > SIZE_LIMIT_BYTES { Err(too_large(path)) } else { Ok(bytes) }
}

/// Saves a client: the whole text goes to a new file beside `path`, to the disk, and then takes its
/// place in one step, so that either the old or the new file is there, never half of one. Only the
/// owner can read it (mode 0600 where there are modes).
///
/// # Errors
/// Where the client cannot be written, the disk refuses, or `path` holds a file of a newer format or
/// one too large to tell; then nothing has changed.
pub fn save(client: &Client, path: &Path) -> Result<(), Problem> {
    let text = write(client).map_err(|problem| Problem { file: path.to_owned(), ..problem })?;
    // A link stays a link: what it leads to is replaced.
    let target = fs::canonicalize(path).unwrap_or_else(|_| path.to_owned());
    may_replace(&target)?;
    let (beside, file) = create_beside(&target).map_err(|error| failed(path, &error, Attempt::Writing))?;
    match fill_and_swap(file, &text, &beside, &target) {
        Ok(()) => Ok(()),
        Err(error) => {
            // Best effort: what is left over is a stray file; the fault to report is the first one.
            let _ = fs::remove_file(&beside);
            Err(failed(path, &error, Attempt::Writing))
        }
    }
}

/// Whether the file in this place, if any, is one that may be replaced.
fn may_replace(target: &Path) -> Result<(), Problem> {
    let kind = match fs::metadata(target) {
        Ok(kind) => kind,
        Err(error) if error.kind() == ErrorKind::NotFound => return Ok(()),
        Err(error) => return Err(failed(target, &error, Attempt::Writing)),
    };
    if !kind.is_file() {
        return Err(not_a_file(target, kind.file_type()));
    }
    match read(&bytes(target)?, target) {
        Ok(Opened::Newer { format, .. }) => Err(newer(target, format)),
        // A broken file may be replaced by a sound one.
        Ok(Opened::Current(_)) | Err(_) => Ok(()),
    }
}

fn newer(path: &Path, format: u32) -> Problem {
    Problem {
        file: path.to_owned(),
        line: None,
        field: Some("format".to_owned()),
        value: format!("{format}, written by a newer version"),
        allowed: format!("a file of format {} or older, or none", crate::read::CURRENT_FORMAT),
        hint: "save under another name",
    }
}

fn create_beside(target: &Path) -> io::Result<(PathBuf, File)> {
    static COUNT: AtomicU32 = AtomicU32::new(0);
    /// More than enough: a name is taken only by what an earlier process of the same number left.
    const TRIES: u32 = 64;
    let name = target.file_name().ok_or(ErrorKind::InvalidInput)?;
    let mut options = OpenOptions::new();
    options.write(true).create_new(true);
    #[cfg(unix)]
    std::os::unix::fs::OpenOptionsExt::mode(&mut options, 0o600);
    let mut last = io::Error::from(ErrorKind::AlreadyExists);
    for _ in 0..TRIES {
        let mut beside = std::ffi::OsString::from(".");
        beside.push(name);
        beside.push(format!(".{}-{}.tmp", process::id(), COUNT.fetch_add(1, Ordering::Relaxed)));
        let beside = target.with_file_name(beside);
        match options.open(&beside) {
            Ok(file) => return Ok((beside, file)),
            Err(error) if error.kind() == ErrorKind::AlreadyExists => last = error,
            Err(error) => return Err(error),
        }
    }
    Err(last)
}

fn fill_and_swap(mut file: File, text: &str, beside: &Path, target: &Path) -> io::Result<()> {
    file.write_all(text.as_bytes())?;
    file.sync_all()?;
    drop(file);
    fs::rename(beside, target)?;
    sync_folder(target)
}

/// Brings the new name itself to the disk, where folders can be synced.
#[cfg(unix)]
fn sync_folder(target: &Path) -> io::Result<()> {
    let folder = target.parent().filter(|folder| !folder.as_os_str().is_empty()).unwrap_or(Path::new("."));
    File::open(folder)?.sync_all()
}

#[cfg(not(unix))]
fn sync_folder(_target: &Path) -> io::Result<()> {
    Ok(())
}

fn not_a_file(path: &Path, kind: fs::FileType) -> Problem {
    Problem {
        file: path.to_owned(),
        line: None,
        field: None,
        value: if kind.is_dir() { "a folder" } else { "a device or pipe" }.to_owned(),
        allowed: "a client file".to_owned(),
        hint: "choose a .ron file",
    }
}

#[derive(Clone, Copy)]
enum Attempt {
    Reading,
    Writing,
}

fn failed(path: &Path, error: &io::Error, attempt: Attempt) -> Problem {
    let (value, hint) = match (error.kind(), attempt) {
        (ErrorKind::NotFound, Attempt::Reading) => ("no such file", "check the name and the folder"),
        (ErrorKind::NotFound, Attempt::Writing) => ("no such folder", "choose a folder that exists"),
        (ErrorKind::PermissionDenied, Attempt::Reading) => {
            ("a file you may not read", "ask its owner for permission, or choose another")
        }
        (ErrorKind::PermissionDenied, Attempt::Writing) => ("a folder you may not write to", "choose another folder"),
        (ErrorKind::StorageFull, Attempt::Writing) => ("a full disk", "make room, or choose another disk"),
        (_, Attempt::Reading) => ("", "check the file and its disk, or choose another"),
        (_, Attempt::Writing) => ("", "choose another place, or check the disk"),
    };
    Problem {
        file: path.to_owned(),
        line: None,
        field: None,
        value: if value.is_empty() { format!("a fault of the system ({error})") } else { value.to_owned() },
        allowed: match attempt {
            Attempt::Reading => "a client file that can be read",
            Attempt::Writing => "a place that can be written",
        }
        .to_owned(),
        hint,
    }
}
