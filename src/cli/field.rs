//! The options that choose the pressure field and how finely it is solved.

use crate::cli::{
    chain::{Choice, Fineness, Watch},
    console::Trouble,
};
use clap::{Args, ValueEnum};
use std::io::{self, IsTerminal, Write};

/// How the pressure between the faces is found.
#[derive(Clone, Copy, Debug, Args)]
pub struct Field {
    /// Pressure field: elastic (solved, with gap, bow, edges) or cone (closed form, a quick look)
    #[arg(
        long = "field",
        value_enum,
        value_name = "FIELD",
        default_value = "elastic",
        hide_possible_values = true
    )]
    kind: Kind,
    /// How finely the elastic field is solved: fast, normal or fine [default: normal]
    #[arg(long, value_enum, value_name = "LEVEL", hide_possible_values = true)]
    resolution: Option<Level>,
    /// Most memory the elastic field may take [default: 1 GB]
    #[arg(long, value_name = "SIZE", value_parser = memory)]
    memory: Option<u64>,
}

/// Bytes the elastic field may take unless told otherwise.
const MEMORY: u64 = 1_000_000_000;

#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
enum Kind {
    /// Solved
    Elastic,
    /// Closed form
    Cone,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
enum Level {
    /// A preview
    Fast,
    /// For work
    Normal,
    /// For the record
    Fine,
}

impl Field {
    /// The same as arguments; nothing where all is as usual.
    pub fn words(self) -> Vec<String> {
        let mut words = Vec::new();
        if self.kind == Kind::Cone {
            words.extend(["--field".to_owned(), "cone".to_owned()]);
        }
        let level = self.resolution.and_then(|level| level.to_possible_value());
        if let Some(level) = level {
            words.extend(["--resolution".to_owned(), level.get_name().to_owned()]);
        }
        if let Some(memory) = self.memory {
            let megabytes = memory.div_ceil(1_000_000);
            words.extend(["--memory".to_owned(), format!("{megabytes} MB")]);
        }
        words
    }

    /// The same for the chain; what belongs to the elastic field alone is refused beside the cone.
    pub fn choice(self) -> Result<Choice, Trouble> {
        match self.kind {
            Kind::Cone if self.resolution.is_some() || self.memory.is_some() => {
                Err(Trouble::usage(
                    "--resolution and --memory speak of the elastic field",
                    "leave out --field cone, or leave them out",
                ))
            }
            Kind::Cone => Ok(Choice::Cone),
            Kind::Elastic => Ok(Choice::elastic(
                match self.resolution.unwrap_or(Level::Normal) {
                    Level::Fast => Fineness::Fast,
                    Level::Normal => Fineness::Normal,
                    Level::Fine => Fineness::Fine,
                },
                self.memory.unwrap_or(MEMORY),
            )),
        }
    }
}

/// Tells at a terminal how far a long solution has come, on one line that is wiped at the end.
pub fn watch() -> Watch {
    if !io::stderr().is_terminal() {
        return Watch::none();
    }
    Watch::telling(|line| {
        let mut out = io::stderr().lock();
        // Nobody is lost when a terminal takes no more.
        let _ = write!(out, "\r\x1b[2K{line}");
        let _ = out.flush();
    })
}

/// A size in memory: `800 MB`, `2 GB`.
fn memory(text: &str) -> Result<u64, String> {
    let trimmed = text.trim();
    let split = trimmed
        .find(|c: char| c.is_ascii_alphabetic())
        .unwrap_or(trimmed.len());
    let (number, unit) = trimmed.split_at(split);
    let factor = match unit {
        "MB" => 1e6,
        "GB" => 1e9,
        _ => {
            return Err("a size carries its unit, MB or GB: --memory \"2 GB\"".to_owned());
        }
    };
    match number.trim().parse::<f64>() {
        Ok(value) if value.is_finite() && value > 0.0 && value * factor < 1e15 => {
            Ok((value * factor) as u64)
        }
        _ => Err(format!(
            "`{number}` is no size; write a number above zero and MB or GB: --memory \"2 GB\""
        )),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sizes_carry_their_unit() {
        assert_eq!(memory("2 GB"), Ok(2_000_000_000));
        assert_eq!(memory("800MB"), Ok(800_000_000));
        for bad in ["2", "", "GB", "-1 GB", "nan GB", "1 TB", "inf GB", "1e9 GB"] {
            assert!(memory(bad).is_err(), "{bad}");
        }
    }
}
