//! Arguments, files, progress and exit codes: the only input and output.

use std::{ffi::OsString, process::ExitCode};

/// Runs the program and returns its exit code.
pub fn run(_arguments: impl IntoIterator<Item = OsString>) -> ExitCode {
    ExitCode::SUCCESS
}
