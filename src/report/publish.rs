//! Publishing: all files of a result at once, by one swap, or none.

use std::collections::BTreeSet;
use std::fs::{self, File};
use std::io::{self, Write};
use std::path::{Path, PathBuf};
use tempfile::TempDir;
use thiserror::Error;

/// Why results were not published.
#[derive(Debug, Error)]
pub enum PublishError {
    /// The target holds something that is not ours.
    #[error(
        "{target} holds '{stranger}', which this command did not write; nothing was replaced. Choose another folder with \
         --into, or replace it all with --force"
    )]
    NotOurs {
        /// The target folder.
        target: String,
        /// A file in it that no manifest of ours names.
        stranger: String,
    },
    /// The target is a file or a link.
    #[error("{target} is {what}, not a folder; nothing was replaced. Choose another folder with --into")]
    NoFolder {
        /// The target.
        target: String,
        /// What it is.
        what: &'static str,
    },
    /// The target is where the command runs.
    #[error(
        "{target} is the current folder, which cannot be replaced. Choose a folder of its own with --into"
    )]
    CurrentFolder {
        /// The target.
        target: String,
    },
    /// Published, but what was there before is still on the disk.
    #[error(
        "the results are published whole, but what they replaced could not be removed from {path}: {error}"
    )]
    LeftOver {
        /// Where it lies.
        path: String,
        /// What was said.
        error: io::Error,
    },
    /// The file system said no.
    #[error("cannot write {path}: {error}. Earlier results stand as they were")]
    Io {
        /// What was being written.
        path: String,
        /// What was said.
        error: io::Error,
    },
}

/// Whether a target may be replaced: it is not there, is empty, or holds only files that its own `run.json` of the same
/// command names.
///
/// # Errors
/// A file that is not ours, or a target that cannot be looked into.
pub fn may_replace(target: &Path, command: &str) -> Result<(), PublishError> {
    let at = |error| io_error(target, error);
    match fs::symlink_metadata(target) {
        Err(error) if error.kind() == io::ErrorKind::NotFound => return Ok(()),
        Err(error) => return Err(at(error)),
        Ok(found) if !found.is_dir() => {
            let what = if found.is_symlink() { "a link" } else { "a file" };
            return Err(PublishError::NoFolder { target: io_path(target), what });
        }
        Ok(_) => {}
    }
    let ours = manifest_files(target, command);
    let mut found = Vec::new();
    list(target, Path::new(""), &mut found).map_err(at)?;
    match found.into_iter().find(|file| !ours.contains(file)) {
        Some(stranger) => Err(PublishError::NotOurs { target: target.display().to_string(), stranger }),
        None => Ok(()),
    }
}

/// Writes all files beside the target, then swaps. `files` are paths within the target, with `/`.
///
/// # Errors
/// The current folder as a target, or a file system that refuses; then the target is as it was. Old results that cannot
/// be removed after the swap.
pub fn publish(files: &[(String, Vec<u8>)], target: &Path) -> Result<(), PublishError> {
    let here = std::env::current_dir().and_then(fs::canonicalize);
    if here.is_ok_and(|here| fs::canonicalize(target).is_ok_and(|target| target == here)) {
        return Err(PublishError::CurrentFolder { target: io_path(target) });
    }
    let parent = match target.parent() {
        Some(parent) if !parent.as_os_str().is_empty() => parent,
        _ => Path::new("."),
    };
    fs::create_dir_all(parent).map_err(|error| io_error(parent, error))?;
    let fresh = new_folder(parent).map_err(|error| io_error(parent, error))?;
    let mut folders = BTreeSet::from([fresh.path().to_owned()]);
    for (name, content) in files {
        let path = fresh.path().join(name);
        let folder = path.parent().unwrap_or(fresh.path()).to_owned();
        let shown = || io_path(&target.join(name));
        let write = || -> io::Result<()> {
            fs::create_dir_all(&folder)?;
            let mut file = File::create_new(&path)?;
            file.write_all(content)?;
            file.sync_all()
        };
        write().map_err(|error| PublishError::Io { path: shown(), error })?;
        folders.insert(folder);
    }
    for folder in folders.iter().rev() {
        sync_folder(folder).map_err(|error| io_error(target, error))?;
    }
    let replaced = swap(fresh, target).map_err(|error| io_error(target, error))?;
    // The swap stands already; a parent that cannot be synced does not undo it.
    let _ = sync_folder(parent);
    match replaced.map(|old| (remove(&old), old)) {
        Some((Err(error), old)) => Err(PublishError::LeftOver { path: io_path(&old), error }),
        _ => Ok(()),
    }
}

fn new_folder(parent: &Path) -> io::Result<TempDir> {
    let mut builder = tempfile::Builder::new();
    builder.prefix(".thawline-");
    #[cfg(unix)]
    builder.permissions(std::os::unix::fs::PermissionsExt::from_mode(0o777));
    builder.tempdir_in(parent)
}

/// Puts the fresh folder where the target was; gives the place where what was there stands now.
fn swap(fresh: TempDir, target: &Path) -> io::Result<Option<PathBuf>> {
    if fs::symlink_metadata(target).is_err() {
        fs::rename(fresh.path(), target)?;
        let _ = fresh.keep();
        return Ok(None);
    }
    if exchange(fresh.path(), target)? {
        return Ok(Some(fresh.keep()));
    }
    let aside = fresh.path().with_extension("old");
    fs::rename(target, &aside)?;
    if let Err(error) = fs::rename(fresh.path(), target) {
        fs::rename(&aside, target)?;
        return Err(error);
    }
    let _ = fresh.keep();
    Ok(Some(aside))
}

/// Removes what was replaced, a folder or, with `--force`, anything else.
fn remove(old: &Path) -> io::Result<()> {
    if fs::symlink_metadata(old)?.is_dir() { fs::remove_dir_all(old) } else { fs::remove_file(old) }
}

/// Exchanges two paths at once; tells whether the file system can.
#[cfg(any(target_os = "linux", target_os = "macos"))]
fn exchange(a: &Path, b: &Path) -> io::Result<bool> {
    use rustix::fs::{CWD, RenameFlags, renameat_with};
    use rustix::io::Errno;
    match renameat_with(CWD, a, CWD, b, RenameFlags::EXCHANGE) {
        Ok(()) => Ok(true),
        Err(Errno::INVAL | Errno::NOSYS | Errno::NOTSUP) => Ok(false),
        Err(error) => Err(error.into()),
    }
}

#[cfg(not(any(target_os = "linux", target_os = "macos")))]
fn exchange(_: &Path, _: &Path) -> io::Result<bool> {
    Ok(false)
}

fn sync_folder(folder: &Path) -> io::Result<()> {
    if cfg!(unix) { File::open(folder)?.sync_all() } else { Ok(()) }
}

/// What a folder's `run.json` says is ours and of the same command; nothing where there is none.
fn manifest_files(target: &Path, command: &str) -> BTreeSet<String> {
    #[derive(serde::Deserialize)]
    struct Ours {
        program: String,
        command: String,
        files: BTreeSet<String>,
    }
    let text = fs::read(target.join("run.json")).unwrap_or_default();
    match serde_json::from_slice::<Ours>(&text) {
        Ok(ours) if ours.program == "thawline" && is_of(&ours.command, command) => ours.files,
        _ => BTreeSet::new(),
    }
}

fn is_of(line: &str, command: &str) -> bool {
    line.split_whitespace().nth(1) == Some(command)
}

fn list(top: &Path, within: &Path, found: &mut Vec<String>) -> io::Result<()> {
    for entry in fs::read_dir(top.join(within))? {
        let entry = entry?;
        let path: PathBuf = within.join(entry.file_name());
        if entry.file_type()?.is_dir() {
            list(top, &path, found)?;
        } else {
            let parts: Vec<String> = path.iter().map(|part| part.to_string_lossy().into_owned()).collect();
            found.push(parts.join("/"));
        }
    }
    Ok(())
}

fn io_error(path: &Path, error: io::Error) -> PublishError {
    PublishError::Io { path: io_path(path), error }
}

fn io_path(path: &Path) -> String {
    path.display().to_string()
}
