//! The files of a study: read whole, within bounds, and digested.

use super::failure::Failure;
use crate::fault::{Fault, Place};
use crate::table::{Encoding, decode};
use sha2::{Digest, Sha256};
use std::fmt::Write;
use std::fs::File;
use std::io::{self, ErrorKind, Read};
use std::path::{Path, PathBuf};

/// A scenario is never longer, bytes.
const LONGEST_SCENARIO: u64 = 1 << 20;
/// A data file is never longer, bytes.
const LONGEST_DATA: u64 = 64 << 20;

/// A file as it was read.
#[derive(Debug, Clone)]
pub(super) struct InputFile {
    /// As the user or the scenario names it.
    pub name: String,
    pub text: String,
    /// SHA-256 of its bytes, in hexadecimal.
    pub sha256: String,
}

/// The scenario's text and the folder that its paths are relative to.
pub(super) struct ScenarioFile {
    pub file: InputFile,
    pub folder: PathBuf,
    /// The last part of its name without the ending; none for standard input.
    pub stem: Option<String>,
}

/// Reads the scenario; `-` is standard input.
pub(super) fn read_scenario(path: &Path) -> Result<ScenarioFile, Failure> {
    let is_stdin = path.as_os_str() == "-";
    let name = if is_stdin { "standard input".to_owned() } else { path.display().to_string() };
    let bytes = if is_stdin {
        bounded(io::stdin().lock(), LONGEST_SCENARIO)
    } else {
        File::open(path).and_then(|file| bounded(file, LONGEST_SCENARIO))
    };
    let refused = |found: String, mend: String| {
        let expected = "a scenario: a TOML file in UTF-8".to_owned();
        let fault = Fault { place: Place::File(name.clone()), found, expected, mend };
        Failure::input(&[fault], "", "", false)
    };
    let bytes = bytes.map_err(|error| {
        let mend = "check the path; `thawline help` shows examples".to_owned();
        refused(described(&error, LONGEST_SCENARIO), mend)
    })?;
    let sha256 = digest(&bytes);
    let text = decode(bytes, Encoding::Utf8)
        .map_err(|no| refused(no.found, "save the scenario as plain text in UTF-8".to_owned()))?;
    let file = InputFile { name: name.clone(), text, sha256 };
    let folder = if is_stdin { PathBuf::new() } else { path.parent().unwrap_or(Path::new("")).to_owned() };
    let stem = if is_stdin { None } else { path.file_stem().map(|stem| stem.to_string_lossy().into_owned()) };
    Ok(ScenarioFile { file, folder, stem })
}

/// Reads a data file that a scenario names with `key`.
pub(super) fn read_data(
    folder: &Path,
    name: &str,
    key: &str,
    encoding: Encoding,
) -> Result<InputFile, Fault> {
    let bytes = File::open(folder.join(name))
        .and_then(|file| bounded(file, LONGEST_DATA))
        .map_err(|error| unopened(&error, name, key))?;
    let sha256 = digest(&bytes);
    let text = decode(bytes, encoding)
        .map_err(|no| Fault::key(key, format!("{name}: {}", no.found), "a text table", no.mend))?;
    Ok(InputFile { name: name.to_owned(), text, sha256 })
}

/// What keeps a data file from being opened, where its content is not wanted yet.
pub(super) fn missing_file(folder: &Path, name: &str, key: &str) -> Option<Fault> {
    let error = File::open(folder.join(name)).err()?;
    Some(unopened(&error, name, key))
}

fn unopened(error: &io::Error, name: &str, key: &str) -> Fault {
    Fault::key(
        key,
        format!("{name}: {}", described(error, LONGEST_DATA)),
        "a file that can be read",
        "the path is relative to the scenario's folder",
    )
}

fn bounded(file: impl Read, most: u64) -> io::Result<Vec<u8>> {
    let mut bytes = Vec::new();
    file.take(most + 1).read_to_end(&mut bytes)?;
    if bytes.len() as u64 > most { Err(ErrorKind::FileTooLarge.into()) } else { Ok(bytes) }
}

fn described(error: &io::Error, most: u64) -> String {
    match error.kind() {
        ErrorKind::NotFound => "there is no such file".to_owned(),
        ErrorKind::IsADirectory => "it is a folder, not a file".to_owned(),
        ErrorKind::PermissionDenied => "you are not allowed to read it".to_owned(),
        ErrorKind::FileTooLarge => format!("the file is longer than {} MiB", most >> 20),
        _ => format!("it cannot be read: {error}"),
    }
}

fn digest(bytes: &[u8]) -> String {
    let mut sha256 = String::with_capacity(64);
    for byte in Sha256::digest(bytes) {
        let _ = write!(sha256, "{byte:02x}");
    }
    sha256
}
