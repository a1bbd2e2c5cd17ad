//! `draw`: the fields of a joint as figures.

use crate::{
    cli::{
        chain::{self, Task},
        check,
        console::{Console, Outcome, Trouble},
        drawings,
        field::{self, Field},
        output::{Existing, Target},
    },
    figures::Format,
};
use clap::{Args, ValueEnum};
use std::{
    fs,
    path::{Path, PathBuf},
};

/// Cells across a map: finer than print shows.
const COLUMNS: usize = 400;

/// Draw maps of pressure and gap, conductance, temperature and heat flux, and a section
///
/// A last figure tells the conductance within a radius of each bolt. With --field cone it draws
/// pressure and conductance alone.
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
    format: Formats,
    /// Interface that the maps show, counted from 1 at the warm side
    #[arg(long, value_name = "N", default_value_t = 1)]
    interface: usize,
    #[command(flatten)]
    field: Field,
    /// Override a field: --set 'plate.box.thickness="6 mm"'
    #[arg(long = "set", value_name = "KEY=VALUE")]
    sets: Vec<String>,
    /// Replace figures that exist
    #[arg(long)]
    force: bool,
}

/// Format of the figures.
#[derive(Clone, Copy, Debug, ValueEnum)]
enum Formats {
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
        let formats: &[Format] = match self.format {
            Formats::Svg => &[Format::Svg],
            Formats::Png => &[Format::Png],
            Formats::Both => &[Format::Svg, Format::Png],
        };
        let existing = Existing::from_force(self.force);
        if self.out.exists() {
            if !self.out.is_dir() {
                return Err(Trouble::usage(
                    format!("`{}` is a file", self.out.display()),
                    "--out names a folder",
                ));
            }
            for name in drawings::NAMES {
                for format in formats {
                    Target::new(&self.path(name, *format), existing)?;
                }
            }
        }
        let (_, joint) =
            check::read(&self.file, &self.sets, console).map_err(|refused| refused.trouble())?;
        let task = Task {
            joint: &joint,
            choice: self.field.choice()?,
            watch: field::watch(),
        };
        let interface = chain::interface(&joint, self.interface)?;
        let fields = chain::fields(&task, interface, COLUMNS)?;
        let mut files = Vec::new();
        for (name, drawing) in drawings::of_joint(&joint, &fields) {
            for format in formats {
                let bytes = chain::render(&drawing, *format)?;
                files.push((self.path(name, *format), bytes));
            }
        }
        make(&self.out)?;
        for (path, bytes) in files {
            Target::new(&path, existing)?.write(&bytes)?;
            console.message(&format!("wrote {}\n", path.display()));
        }
        Ok(Outcome::Done)
    }

    fn path(&self, name: &str, format: Format) -> PathBuf {
        self.out.join(match format {
            Format::Svg => format!("{name}.svg"),
            Format::Png => format!("{name}.png"),
        })
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
