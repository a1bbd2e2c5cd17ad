//! Joint files as text: found, small enough, UTF-8.

use crate::{
    cli::{chain, console::Trouble},
    diagnostic::Fault,
    joint::{LONGEST_FILE, LONGEST_TABLE},
    report::number::plain,
};
use std::{
    fs,
    io::{self, IsTerminal, Read},
    path::{Path, PathBuf},
};

/// Largest joint file, bytes: no more is read than the reader takes.
const LARGEST: u64 = LONGEST_FILE as u64;

/// Largest checkpoint of a search, bytes; one of six bolts has some hundred kilobytes.
const LONGEST_CHECKPOINT: u64 = 100_000_000;

/// A joint file as read.
#[derive(Debug)]
pub struct Source {
    /// How messages call it: the path, or `<stdin>`.
    pub name: String,
    /// Its text.
    pub text: String,
    /// The folder of the tables that it names.
    pub folder: PathBuf,
    /// The tables that were read because it names them.
    pub tables: Vec<PathBuf>,
}

/// How messages call a path.
pub fn name(path: &Path) -> String {
    if is_stdin(path) {
        "<stdin>".to_owned()
    } else {
        plain(&path.display().to_string())
    }
}

/// Standard input can be read once only.
pub fn stdin_at_most_once(paths: &[PathBuf]) -> Result<(), Trouble> {
    if paths.iter().filter(|path| is_stdin(path)).count() > 1 {
        return Err(Trouble::usage(
            "`-` is named more than once, but standard input can be read once only",
            "write one of the joints to a file",
        ));
    }
    Ok(())
}

/// Whether someone would have to type the joint.
pub fn waits_for_keyboard(path: &Path) -> bool {
    is_stdin(path) && io::stdin().is_terminal()
}

/// The text of a joint file, or the fault that explains why there is none.
pub fn read(path: &Path) -> Result<Source, Fault> {
    let name = name(path);
    let bytes = if is_stdin(path) {
        limited(io::stdin().lock())
    } else {
        if path.is_dir() {
            return Err(fault(
                "file/not-found",
                format!("`{name}` is a folder, not a joint file"),
                joints(path)
                    .first()
                    .map(|name| format!("name a file in it: {}", path.join(name).display())),
            ));
        }
        opened(path).and_then(limited)
    }
    .map_err(|found| unreadable(path, &found))?;
    if bytes.len() as u64 > LARGEST {
        return Err(fault(
            "file/too-large",
            format!(
                "`{name}` is larger than {} MB; a joint file is a page of text",
                LARGEST / 1_000_000
            ),
            None,
        ));
    }
    let text = String::from_utf8(bytes).map_err(|found| not_utf8(&name, found.as_bytes()))?;
    if text
        .trim_matches(|letter: char| letter.is_whitespace() || letter == '\u{feff}')
        .is_empty()
    {
        return Err(fault(
            "file/empty",
            format!("`{name}` is empty"),
            Some("`ringsum new` prints a starter joint".to_owned()),
        ));
    }
    Ok(Source {
        name,
        text,
        folder: folder(path),
        tables: Vec::new(),
    })
}

/// The folder beside a joint file; for standard input the current one.
pub fn folder(path: &Path) -> PathBuf {
    match path.parent() {
        Some(parent) if !is_stdin(path) => parent.to_owned(),
        _ => PathBuf::new(),
    }
}

/// The text of a table that a joint file names, from a folder, or why there is none.
pub fn table(folder: &Path, name: &str) -> Result<String, String> {
    let path = folder.join(name);
    if path.is_dir() {
        return Err("it is a folder".to_owned());
    }
    let file = opened(&path).map_err(|found| match found.kind() {
        io::ErrorKind::NotFound => {
            format!("there is no file `{}`", plain(&path.display().to_string()))
        }
        _ => found.to_string(),
    })?;
    text_of_table(file)
}

/// A file to read. A pipe with a name is refused, because opening it waits until somebody writes, which
/// may be never; a pipe of the shell, `<(…)`, has no name.
fn opened(path: &Path) -> io::Result<fs::File> {
    #[cfg(unix)]
    {
        use std::os::unix::fs::FileTypeExt;
        let pipe = fs::metadata(path)?.file_type().is_fifo();
        if pipe && fs::canonicalize(path).is_ok() {
            return Err(io::Error::other(
                "it is a named pipe, which may never be written to; give its text on standard input",
            ));
        }
    }
    fs::File::open(path)
}

/// The text of a checkpoint, no longer than any search writes it.
pub fn checkpoint(path: &Path) -> io::Result<String> {
    let mut bytes = Vec::new();
    opened(path)?
        .take(LONGEST_CHECKPOINT + 1)
        .read_to_end(&mut bytes)?;
    if bytes.len() as u64 > LONGEST_CHECKPOINT {
        return Err(io::Error::other(format!(
            "it is larger than {} MB",
            LONGEST_CHECKPOINT / 1_000_000
        )));
    }
    String::from_utf8(bytes).map_err(|_| io::Error::other("it is not UTF-8 text"))
}

fn text_of_table(source: impl Read) -> Result<String, String> {
    let mut bytes = Vec::new();
    source
        .take(LONGEST_TABLE as u64 + 1)
        .read_to_end(&mut bytes)
        .map_err(|found| found.to_string())?;
    if bytes.len() > LONGEST_TABLE {
        return Err(format!(
            "it is larger than {} MB",
            LONGEST_TABLE / 1_000_000
        ));
    }
    String::from_utf8(bytes).map_err(|found| {
        let good = found.utf8_error().valid_up_to();
        let before = String::from_utf8_lossy(&found.as_bytes()[..good]);
        let line = before.matches('\n').count() + 1;
        format!("it is not UTF-8 text (line {line}); `um` needs no special sign")
    })
}

/// The text of a table of readings named on the command line.
pub fn points(path: &Path) -> Result<Source, Trouble> {
    let name = name(path);
    let text = if is_stdin(path) {
        text_of_table(io::stdin().lock())
    } else {
        table(Path::new(""), &path.display().to_string())
    };
    match text {
        Ok(text) => Ok(Source {
            name,
            text,
            folder: folder(path),
            tables: Vec::new(),
        }),
        Err(why) => Err(Trouble::usage(
            format!("`{name}` cannot be read: {why}"),
            "name a table of readings; `ringsum fit --help` shows its heading",
        )),
    }
}

fn is_stdin(path: &Path) -> bool {
    path == Path::new("-")
}

/// One byte more than allowed is enough to know.
fn limited(source: impl Read) -> io::Result<Vec<u8>> {
    let mut bytes = Vec::new();
    source.take(LARGEST + 1).read_to_end(&mut bytes)?;
    Ok(bytes)
}

fn fault(code: &'static str, message: String, help: Option<String>) -> Fault {
    Fault {
        code,
        message,
        span: 0..0,
        expected: String::new(),
        help,
    }
}

fn unreadable(path: &Path, found: &io::Error) -> Fault {
    let name = name(path);
    if found.kind() == io::ErrorKind::NotFound {
        let help = neighbour(path).map_or_else(
            || format!("`ringsum new {name}` writes a starter joint"),
            |near| format!("did you mean `{}`?", near.display()),
        );
        return fault(
            "file/not-found",
            format!("there is no file `{name}`"),
            Some(help),
        );
    }
    fault(
        "file/not-found",
        format!("`{name}` cannot be read: {found}"),
        None,
    )
}

/// A joint file in the same folder whose name is close.
fn neighbour(path: &Path) -> Option<PathBuf> {
    let folder = match path.parent() {
        Some(parent) if parent != Path::new("") => parent,
        _ => Path::new("."),
    };
    let wanted = path.file_name()?.to_str()?;
    let names = joints(folder);
    let with_ending = format!("{wanted}.toml");
    let near = if names.contains(&with_ending) {
        with_ending
    } else {
        chain::nearest(wanted, &names)?
    };
    Some(path.with_file_name(near))
}

/// The joint files of a folder, in order.
fn joints(folder: &Path) -> Vec<String> {
    let Ok(entries) = fs::read_dir(folder) else {
        return Vec::new();
    };
    let mut names: Vec<String> = entries
        .filter_map(|entry| entry.ok()?.file_name().into_string().ok())
        .filter(|name| Path::new(name).extension().is_some_and(|end| end == "toml"))
        .collect();
    names.sort();
    names
}

fn not_utf8(name: &str, bytes: &[u8]) -> Fault {
    let help = "save it as UTF-8; `um`, `degC` and `N*m` need no special signs".to_owned();
    if bytes.starts_with(&[0xFF, 0xFE]) || bytes.starts_with(&[0xFE, 0xFF]) {
        return fault(
            "file/not-utf8",
            format!("`{name}` is UTF-16, not UTF-8"),
            Some(help),
        );
    }
    let good = std::str::from_utf8(bytes).map_or_else(|found| found.valid_up_to(), str::len);
    let line = String::from_utf8_lossy(&bytes[..good])
        .matches('\n')
        .count()
        + 1;
    let found = bytes.get(good).map_or_else(String::new, |byte| {
        format!(": byte 0x{byte:02X} on line {line}")
    });
    fault(
        "file/not-utf8",
        format!("`{name}` is not UTF-8 text{found}"),
        Some(help),
    )
}
