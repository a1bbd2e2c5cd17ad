//! `draw`: the fields of a joint as figures.

use crate::cli::{
    chain::{self, Encoding},
    check,
    console::{Console, Outcome, Trouble},
    output::{Existing, Target},
};
use clap::{Args, ValueEnum};
use std::{
    fs,
    path::{Path, PathBuf},
};

/// Draw pressure, local conductance and its growth around the bolts
#[derive(Debug, Args)]
pub struct Draw {
    /// Joint file; - reads standard input
    file: PathBuf,
    /// Folder for the figures; made if it does not exist
    #[arg(long, value_name = "DIR")]
    out: PathBuf,
    /// Format of the figures
    #[arg(
        long,
        value_enum,
        value_name = "svg|png|both",
        default_value = "svg",
        hide_possible_values = true
    )]
    format: Format,
    /// Override a field: --set 'plate.box.thickness="6 mm"'
    #[arg(long = "set", value_name = "KEY=VALUE")]
    sets: Vec<String>,
    /// Replace figures that exist
    #[arg(long)]
    force: bool,
}

/// Format of the figures.
#[derive(Clone, Copy, Debug, ValueEnum)]
enum Format {
    /// Drawing
    Svg,
    /// Picture
    Png,
    /// One of each
    Both,
}

impl Draw {
    /// Draws every figure; checks every target before computing.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let encodings: &[Encoding] = match self.format {
            Format::Svg => &[Encoding::Svg],
            Format::Png => &[Encoding::Png],
            Format::Both => &[Encoding::Svg, Encoding::Png],
        };
        let existing = Existing::from_force(self.force);
        let names = chain::FIGURES.iter().flat_map(|figure| {
            encodings
                .iter()
                .map(move |encoding| (figure, encoding, file_name(figure.name, *encoding)))
        });
        if self.out.exists() {
            if !self.out.is_dir() {
                return Err(Trouble::usage(
                    format!("`{}` is a file", self.out.display()),
                    "--out names a folder",
                ));
            }
            for (_, _, name) in names.clone() {
                Target::new(&self.out.join(name), existing)?;
            }
        }
        let (_, joint) =
            check::read(&self.file, &self.sets, console).map_err(|refused| refused.trouble())?;
        let drawn = names
            .map(|(figure, encoding, name)| Ok((name, (figure.draw)(&joint, *encoding)?)))
            .collect::<Result<Vec<_>, Trouble>>()?;
        make(&self.out)?;
        for (name, bytes) in drawn {
            let path = self.out.join(name);
            Target::new(&path, existing)?.write(&bytes)?;
            console.message(&format!("wrote {}\n", path.display()));
        }
        Ok(Outcome::Done)
    }
}

fn file_name(figure: &str, encoding: Encoding) -> String {
    match encoding {
        Encoding::Svg => format!("{figure}.svg"),
        Encoding::Png => format!("{figure}.png"),
    }
}

fn make(folder: &Path) -> Result<(), Trouble> {
    fs::create_dir_all(folder).map_err(|found| {
        Trouble::Failure(format!(
            "the folder `{}` cannot be made: {found}",
            folder.display()
        ))
    })
}
