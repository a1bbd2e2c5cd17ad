//! The program: hands its arguments to the library and its exit code to the shell.

fn main() -> std::process::ExitCode {
    ringsum::cli::run(std::env::args_os())
}
