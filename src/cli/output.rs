//! Files written whole or not at all, never over another without being told to, and never over one that
//! the command line names as input.
//!
//! A file is written under a temporary name in the folder it belongs to and then renamed. Where
//! the target is a symbolic link, the file it points to is replaced and the link stays.

use crate::{cli::console::Trouble, figures::Format};
use std::{
    fs,
    io::{self, Write},
    path::{Path, PathBuf},
};

/// What to do with a file that exists.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Existing {
    /// Refuse.
    Keep,
    /// Replace it.
    Replace,
}

/// Which files a command may write: none that exists unless told to, and never one that it is told to
/// read; [`Target::apart`] tells tables that a joint file names apart.
#[derive(Clone, Copy, Debug)]
pub struct Permit<'a> {
    existing: Existing,
    inputs: &'a [PathBuf],
}

impl<'a> Permit<'a> {
    /// From `--force` and the files that are read.
    pub fn new(force: bool, inputs: &'a [PathBuf]) -> Self {
        Self {
            existing: if force {
                Existing::Replace
            } else {
                Existing::Keep
            },
            inputs,
        }
    }

    /// A file that may be written, checked before anything is computed.
    pub fn target(self, path: &Path) -> Result<Target, Trouble> {
        apart(path, self.inputs)?;
        Target::new(path, self.existing)
    }
}

/// Refuses a path that is one of the files that are read.
fn apart(path: &Path, inputs: &[PathBuf]) -> Result<(), Trouble> {
    let real = |path: &Path| fs::canonicalize(path).ok();
    let written = real(path);
    // `-` is standard input, not a file of that name.
    let read = |input: &&PathBuf| {
        input.as_path() != Path::new("-") && written.is_some() && real(input) == written
    };
    match inputs.iter().find(read) {
        None => Ok(()),
        Some(input) => Err(Trouble::usage(
            format!(
                "`{}` would be written over `{}`, which is read",
                path.display(),
                input.display()
            ),
            "name another file; what is read is never replaced, not with --force either",
        )),
    }
}

/// A file that may be written, checked before anything is computed.
#[derive(Debug)]
pub struct Target {
    /// The path the user gave.
    pub path: PathBuf,
    real: PathBuf,
    existing: Existing,
}

impl Target {
    /// Checks that the file may be written; its folder must exist.
    pub fn new(path: &Path, existing: Existing) -> Result<Self, Trouble> {
        let shown = path.display();
        if path.file_name().is_none() {
            return Err(Trouble::usage(
                format!("`{shown}` is not the name of a file"),
                "name the file to write",
            ));
        }
        let target = |real: PathBuf| Self {
            path: path.to_owned(),
            real,
            existing,
        };
        match fs::symlink_metadata(path) {
            Err(found) if found.kind() == io::ErrorKind::NotFound => {
                let folder = folder(path);
                if folder.is_dir() {
                    return Ok(target(path.to_owned()));
                }
                return Err(Trouble::usage(
                    format!("there is no folder `{}`", folder.display()),
                    "make the folder first",
                ));
            }
            Err(found) => {
                return Err(Trouble::Failure(format!(
                    "`{shown}` cannot be written: {found}"
                )));
            }
            Ok(_) => {}
        }
        let real = fs::canonicalize(path).map_err(|_| {
            Trouble::usage(
                format!("`{shown}` is a link to a file that does not exist"),
                "name the file itself",
            )
        })?;
        if real.is_dir() {
            return Err(Trouble::usage(
                format!("`{shown}` is a folder"),
                "name a file in it",
            ));
        }
        if !real.is_file() {
            return Err(Trouble::usage(
                format!("`{shown}` is not an ordinary file"),
                "name a file; without one the result is printed",
            ));
        }
        if existing == Existing::Keep {
            return Err(Trouble::usage(
                format!("`{shown}` exists already"),
                "--force replaces it",
            ));
        }
        Ok(target(real))
    }

    /// Refuses to be one of the tables that a joint file names, which are known once it is read.
    pub fn apart(&self, tables: &[PathBuf]) -> Result<(), Trouble> {
        apart(&self.path, tables)
    }

    /// Writes the file whole.
    pub fn write(&self, bytes: &[u8]) -> Result<(), Trouble> {
        self.replace(bytes).map_err(|found| {
            Trouble::Failure(format!(
                "`{}` cannot be written: {}",
                self.path.display(),
                without_temporary_path(&found)
            ))
        })
    }

    fn replace(&self, bytes: &[u8]) -> io::Result<()> {
        let mut builder = tempfile::Builder::new();
        builder.prefix(".ringsum-");
        // A temporary file is private by default; a result is as readable as any other file.
        #[cfg(unix)]
        builder.permissions(std::os::unix::fs::PermissionsExt::from_mode(0o666));
        let mut file = builder.tempfile_in(folder(&self.real))?;
        file.write_all(bytes)?;
        match self.existing {
            Existing::Keep => file.persist_noclobber(&self.real)?,
            Existing::Replace => {
                if let Ok(metadata) = fs::metadata(&self.real) {
                    fs::set_permissions(file.path(), metadata.permissions())?;
                }
                file.persist(&self.real)?
            }
        };
        Ok(())
    }
}

/// A fault without the path of the temporary file behind it, for which nobody asked.
fn without_temporary_path(found: &io::Error) -> String {
    let told = found.to_string();
    match told.split_once(" at path ") {
        Some((fault, _)) => fault.to_owned(),
        None => told,
    }
}

/// The format of a figure by the ending of its file.
pub fn format(path: &Path) -> Result<Format, Trouble> {
    let ending = path
        .extension()
        .and_then(|ending| ending.to_str())
        .unwrap_or("")
        .to_ascii_lowercase();
    match ending.as_str() {
        "svg" => Ok(Format::Svg),
        "png" => Ok(Format::Png),
        _ => Err(Trouble::usage(
            format!("`{}` ends in neither .svg nor .png", path.display()),
            "the ending chooses the format of the figure",
        )),
    }
}

fn folder(path: &Path) -> &Path {
    match path.parent() {
        Some(parent) if parent != Path::new("") => parent,
        _ => Path::new("."),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn names(folder: &Path) -> Vec<String> {
        let mut names: Vec<String> = fs::read_dir(folder)
            .unwrap()
            .map(|entry| entry.unwrap().file_name().into_string().unwrap())
            .collect();
        names.sort();
        names
    }

    #[test]
    fn a_file_is_kept_unless_replacing_is_asked_for() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("figure.svg");
        Target::new(&path, Existing::Keep)
            .unwrap()
            .write(b"one")
            .unwrap();
        assert!(Target::new(&path, Existing::Keep).is_err());
        Target::new(&path, Existing::Replace)
            .unwrap()
            .write(b"two")
            .unwrap();
        assert_eq!(fs::read(&path).unwrap(), b"two");
        assert_eq!(names(folder.path()), ["figure.svg"]);
    }

    #[test]
    fn a_file_that_appears_in_between_is_kept() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("figure.svg");
        let target = Target::new(&path, Existing::Keep).unwrap();
        fs::write(&path, "another").unwrap();
        assert!(target.write(b"mine").is_err());
        assert_eq!(fs::read(&path).unwrap(), b"another");
        assert_eq!(names(folder.path()), ["figure.svg"]);
    }

    #[test]
    fn what_is_read_is_never_replaced() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("joint.toml");
        fs::write(&path, "read").unwrap();
        let inputs = [PathBuf::from("-"), path.clone()];
        let same = folder.path().join(".").join("joint.toml");
        for force in [false, true] {
            let told = format!("{:?}", Permit::new(force, &inputs).target(&same));
            assert!(told.contains("which is read"), "{told}");
        }
        let other = folder.path().join("other.toml");
        assert!(Permit::new(false, &inputs).target(&other).is_ok());
    }

    #[cfg(unix)]
    #[test]
    fn a_link_stays_and_its_file_is_replaced() {
        let folder = tempfile::tempdir().unwrap();
        let (file, link) = (folder.path().join("file"), folder.path().join("link"));
        fs::write(&file, "old").unwrap();
        std::os::unix::fs::symlink(&file, &link).unwrap();
        Target::new(&link, Existing::Replace)
            .unwrap()
            .write(b"new")
            .unwrap();
        assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
        assert_eq!(fs::read(&file).unwrap(), b"new");
    }

    #[cfg(unix)]
    #[test]
    fn devices_and_folders_are_refused_even_when_replacing() {
        for path in ["/dev/null", "/", "..", ""] {
            assert!(
                Target::new(Path::new(path), Existing::Replace).is_err(),
                "{path}"
            );
        }
    }
}
