//! `--units`: in which units people are told.

use crate::units::System;
use clap::{Args, ValueEnum};

/// In which units results are told.
#[derive(Clone, Copy, Debug, Args)]
pub struct Shown {
    /// Units of what is printed and drawn for people; JSON and tables of a folder are SI always
    #[arg(
        long,
        value_enum,
        value_name = "si|shop|inch",
        default_value = "si",
        hide_possible_values = true
    )]
    units: Units,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
enum Units {
    /// mm, µm, N·m, kN, `MPa`, °C
    Si,
    /// As si, with N/mm² and bar
    Shop,
    /// in, mil, in·lbf, lbf, psi, °F
    Inch,
}

impl Shown {
    /// The words that ask for it again; none for what is asked for without words.
    pub fn words(self) -> Vec<String> {
        let word = match self.units {
            Units::Si => return Vec::new(),
            Units::Shop => "shop",
            Units::Inch => "inch",
        };
        vec!["--units".to_owned(), word.to_owned()]
    }

    /// The system asked for.
    pub fn system(self) -> System {
        match self.units {
            Units::Si => System::Si,
            Units::Shop => System::Shop,
            Units::Inch => System::Inch,
        }
    }
}
