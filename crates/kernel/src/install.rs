//! Making the kernel known to Jupyter.

use std::ffi::OsString;
use std::io;
use std::path::{Path, PathBuf};

use serde_json::json;

use crate::message::PROTOCOL_VERSION;
use crate::requests::LANGUAGE;

/// The kernel's picture in a launcher.
const LOGO: &str = include_str!("../assets/logo.svg");

/// Where to install what.
#[derive(Clone, Debug)]
pub struct InstallOptions {
    /// The prefix below which Jupyter looks, such as a Python environment; without one, the
    /// user's own folder of Jupyter data.
    pub prefix: Option<PathBuf>,
    /// The program that Jupyter is to start, with `kernel` and the connection file as arguments.
    pub program: PathBuf,
}

/// Why the kernel isn't installed.
#[derive(Debug, thiserror::Error)]
pub enum InstallError {
    /// There is no such program.
    #[error("there is no program at {}: {source}", path.display())]
    NoProgram {
        /// Where it was sought.
        path: PathBuf,
        /// Why it wasn't found.
        source: io::Error,
    },
    /// The program's path isn't Unicode, which a kernel specification can't tell.
    #[error("the path of the program, {}, is not Unicode text; move it to one that is", path.display())]
    NotUnicode {
        /// The path.
        path: PathBuf,
    },
    /// The user has no folder for data.
    #[error("no home folder is known; give a prefix, or set JUPYTER_DATA_DIR")]
    NoFolder,
    /// A file can't be written.
    #[error("can't write {}: {source}", path.display())]
    NotWritten {
        /// The file or folder.
        path: PathBuf,
        /// Why.
        source: io::Error,
    },
}

/// Writes the kernel specification and returns its folder. What an earlier installation wrote
/// there is replaced.
///
/// # Errors
/// When the program doesn't exist or a file can't be written.
pub fn install(options: InstallOptions) -> Result<PathBuf, InstallError> {
    let data = match options.prefix {
        Some(prefix) => absolute(&prefix)?.join("share").join("jupyter"),
        None => user_data(&|name| std::env::var_os(name)).ok_or(InstallError::NoFolder)?,
    };
    let folder = data.join("kernels").join(LANGUAGE);
    let specification = specification(&options.program)?;
    std::fs::create_dir_all(&folder)
        .map_err(|source| InstallError::NotWritten { path: folder.clone(), source })?;
    write(&folder.join("kernel.json"), &specification)?;
    write(&folder.join("logo-svg.svg"), LOGO)?;
    Ok(folder)
}

fn specification(program: &Path) -> Result<String, InstallError> {
    let program = absolute(program)?;
    if let Err(source) = std::fs::metadata(&program) {
        return Err(InstallError::NoProgram { path: program, source });
    }
    let Some(program) = program.to_str() else {
        return Err(InstallError::NotUnicode { path: program });
    };
    let content = json!({
        "argv": [program, "kernel", "{connection_file}"],
        "display_name": "Tussock",
        "language": LANGUAGE,
        "interrupt_mode": "message",
        "kernel_protocol_version": PROTOCOL_VERSION,
        "metadata": {},
    });
    Ok(format!("{content:#}\n"))
}

fn absolute(path: &Path) -> Result<PathBuf, InstallError> {
    std::path::absolute(path)
        .map_err(|source| InstallError::NotWritten { path: path.to_owned(), source })
}

fn write(path: &Path, text: &str) -> Result<(), InstallError> {
    std::fs::write(path, text)
        .map_err(|source| InstallError::NotWritten { path: path.to_owned(), source })
}

/// The folder in which Jupyter looks for a user's own kernels, by its rules for each system.
fn user_data(variable: &dyn Fn(&str) -> Option<OsString>) -> Option<PathBuf> {
    let folder = |name: &str| variable(name).filter(|value| !value.is_empty()).map(PathBuf::from);
    if let Some(chosen) = folder("JUPYTER_DATA_DIR") {
        return Some(chosen);
    }
    if cfg!(windows) {
        return folder("APPDATA").map(|data| data.join("jupyter"));
    }
    let home = folder("HOME");
    if cfg!(target_os = "macos") {
        return home.map(|home| home.join("Library").join("Jupyter"));
    }
    let share = || home.map(|home| home.join(".local").join("share"));
    folder("XDG_DATA_HOME").or_else(share).map(|data| data.join("jupyter"))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn data_with(variables: &[(&str, &str)]) -> Option<PathBuf> {
        user_data(&|name| {
            variables.iter().find(|(known, _)| *known == name).map(|(_, value)| value.into())
        })
    }

    #[test]
    #[cfg(target_os = "linux")]
    fn the_users_folder_follows_jupyters_rules() {
        let home = ("HOME", "/home/ann");
        let found = |variables: &[(&str, &str)]| data_with(variables).unwrap();
        assert_eq!(found(&[home]), Path::new("/home/ann/.local/share/jupyter"));
        assert_eq!(found(&[home, ("XDG_DATA_HOME", "/data")]), Path::new("/data/jupyter"));
        assert_eq!(found(&[home, ("XDG_DATA_HOME", "")]), found(&[home]));
        assert_eq!(found(&[home, ("JUPYTER_DATA_DIR", "/j")]), Path::new("/j"));
        assert_eq!(data_with(&[]), None);
    }

    #[test]
    fn the_specification_starts_the_program_by_its_absolute_path() {
        let prefix = std::env::temp_dir().join(format!("tussock-install-{}", std::process::id()));
        let program = std::env::current_exe().unwrap();
        let options = InstallOptions { prefix: Some(prefix.clone()), program: program.clone() };
        let folder = install(options.clone()).unwrap();
        assert_eq!(folder, prefix.join("share/jupyter/kernels/tussock"));
        // A second time, over the first.
        install(options).unwrap();

        let text = std::fs::read_to_string(folder.join("kernel.json")).unwrap();
        let content: serde_json::Value = serde_json::from_str(&text).unwrap();
        assert_eq!(content["argv"], json!([program, "kernel", "{connection_file}"]));
        assert_eq!(content["interrupt_mode"], "message");
        assert_eq!(content["display_name"], "Tussock");
        assert!(folder.join("logo-svg.svg").exists());
        std::fs::remove_dir_all(prefix).unwrap();
    }

    #[test]
    fn a_program_that_does_not_exist_is_not_installed() {
        let options = InstallOptions { prefix: None, program: "/nowhere/tussock".into() };
        assert!(matches!(install(options), Err(InstallError::NoProgram { .. })));
    }
}
