//! What is said of a file that can't be opened.

use std::io::{Error, ErrorKind};
use std::path::Path;

use super::error::ReadError;

pub(super) fn unreadable(path: &Path, error: &Error) -> ReadError {
    let tried = path.display().to_string();
    #[expect(clippy::wildcard_enum_match_arm, reason = "the list of kinds is open")]
    match error.kind() {
        ErrorKind::NotFound | ErrorKind::NotADirectory => not_found(path, tried),
        ErrorKind::IsADirectory => {
            ReadError::Unreadable { path: tried, reason: "it is a folder".into() }
        }
        ErrorKind::PermissionDenied => ReadError::Unreadable {
            path: tried,
            reason: "you have no permission to read it".into(),
        },
        _ if path.is_dir() => {
            ReadError::Unreadable { path: tried, reason: "it is a folder".into() }
        }
        _ => ReadError::Unreadable { path: tried, reason: error.to_string() },
    }
}

fn not_found(path: &Path, tried: String) -> ReadError {
    let folder = path.parent().filter(|folder| !folder.as_os_str().is_empty());
    let Ok(entries) = std::fs::read_dir(folder.unwrap_or(Path::new("."))) else {
        return ReadError::NoSuchFolder { path: tried };
    };
    let mut names: Vec<String> = entries
        .filter_map(|entry| entry.ok()?.file_name().into_string().ok())
        .filter(|name| !name.starts_with('.'))
        .collect();
    names.sort();
    let wanted =
        path.file_name().map(|name| name.to_string_lossy().to_lowercase()).unwrap_or_default();
    let allowed = (wanted.chars().count() / 3).max(1);
    let near = names
        .iter()
        .map(|name| (strsim::damerau_levenshtein(&wanted, &name.to_lowercase()), name))
        .filter(|(edits, _)| *edits <= allowed)
        .min_by_key(|(edits, _)| *edits)
        .map(|(_, name)| name.clone());
    let extensions = [".csv", ".tsv", ".tab", ".txt"];
    let is_table = |name: &String| extensions.iter().any(|end| name.to_lowercase().ends_with(end));
    let tables = names.into_iter().filter(is_table).collect();
    ReadError::NotFound { path: tried, near, tables }
}
