//! The files of a study: read whole, within bounds, and digested.

use super::failure::Failure;
use crate::fault::{Fault, Place};
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
    let text = bytes.map_err(|error| described(&error, LONGEST_SCENARIO)).and_then(decode);
    let file =
        text.map(|(text, sha256)| InputFile { name: name.clone(), text, sha256 }).map_err(|found| {
            let fault = Fault {
                place: Place::File(name),
                found,
                expected: "a scenario: a TOML file in UTF-8".to_owned(),
                mend: "check the path; `thawline help` shows examples".to_owned(),
            };
            Failure::input(&[fault], "", "", false)
        })?;
    let folder = if is_stdin { PathBuf::new() } else { path.parent().unwrap_or(Path::new("")).to_owned() };
    let stem = if is_stdin { None } else { path.file_stem().map(|stem| stem.to_string_lossy().into_owned()) };
    Ok(ScenarioFile { file, folder, stem })
}

/// Reads a data file that a scenario names with `key`.
pub(super) fn read_data(folder: &Path, name: &str, key: &str) -> Result<InputFile, Fault> {
    let bytes = File::open(folder.join(name)).and_then(|file| bounded(file, LONGEST_DATA));
    let (text, sha256) =
        bytes.map_err(|error| described(&error, LONGEST_DATA)).and_then(decode).map_err(|found| {
            Fault::key(
                key,
                format!("{name}: {found}"),
                "a text file in UTF-8",
                "the path is relative to the scenario's folder",
            )
        })?;
    Ok(InputFile { name: name.to_owned(), text, sha256 })
}

fn bounded(file: impl Read, most: u64) -> io::Result<Vec<u8>> {
    let mut bytes = Vec::new();
    file.take(most + 1).read_to_end(&mut bytes)?;
    if bytes.len() as u64 > most { Err(ErrorKind::FileTooLarge.into()) } else { Ok(bytes) }
}

fn described(error: &io::Error, most: u64) -> String {
    match error.kind() {
        ErrorKind::NotFound => "there is no such file".to_owned(),
        ErrorKind::FileTooLarge => format!("the file is longer than {} MiB", most >> 20),
        _ => format!("it cannot be read: {error}"),
    }
}

fn decode(bytes: Vec<u8>) -> Result<(String, String), String> {
    let mut sha256 = String::with_capacity(64);
    for byte in Sha256::digest(&bytes) {
        let _ = write!(sha256, "{byte:02x}");
    }
    let text = String::from_utf8(bytes).map_err(|error| {
        let at = error.utf8_error().valid_up_to();
        let line = error.as_bytes()[..at].iter().filter(|byte| **byte == b'\n').count() + 1;
        format!("line {line} is not UTF-8")
    })?;
    if text.contains('\0') {
        return Err("it holds NUL bytes, so it is no plain text".to_owned());
    }
    Ok((text, sha256))
}
