//! `draw`: the fields of a joint as figures.

use crate::{
    cli::{
        batch::Batch,
        chain::{self, Task},
        check,
        console::{Console, Outcome, Trouble},
        drawings,
        field::Field,
        input,
        output::Permit,
        results,
        shown::Shown,
    },
    figures::Format,
    joint::Joint,
};
use clap::{Args, ValueEnum};
use std::{
    iter,
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
    /// Joint files; - reads standard input
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    /// Folder for the figures, of several joints one in it for each; made if it does not exist
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
    /// Write the maps as tables too, SI: one CSV of every interface in every case
    ///
    /// Values are read between the columns of the solution, each for itself. `flux_W_per_m2` times the area
    /// of a point adds up to the heat, less what shanks carry. Conductance times temperature difference
    /// does not beside the bolts, where both change fastest.
    #[arg(long)]
    maps: bool,
    #[command(flatten)]
    field: Field,
    #[command(flatten)]
    shown: Shown,
    #[command(flatten)]
    batch: Batch,
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
    /// Draws every figure of every file; checks every target before computing.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let files = self.batch.files(&self.files);
        input::stdin_at_most_once(&files)?;
        let folders: Vec<PathBuf> = if self.files.len() > 1 {
            results::apart(&self.files, "")?;
            let folder = |path: &PathBuf| self.out.join(results::stem(path));
            files.iter().map(folder).collect()
        } else {
            vec![self.out.clone(); files.len()]
        };
        for folder in iter::once(&self.out).chain(&folders) {
            self.check(folder)?;
        }
        self.batch.run(&files, console, &|index, path, console| {
            let (source, joint) =
                check::read(path, &self.sets, console).map_err(|refused| refused.trouble())?;
            self.drawn((&joint, &source.tables), &folders[index], console)
                .map_err(|trouble| trouble.of_file(&source.name))?;
            Ok(Outcome::Done)
        })
    }

    /// Refuses a folder that is none or holds figures that are to be kept.
    fn check(&self, folder: &Path) -> Result<(), Trouble> {
        results::folder(folder)?;
        if !folder.exists() {
            return Ok(());
        }
        for name in drawings::NAMES {
            for format in self.format.each() {
                self.permit().target(&path(folder, (name, *format)))?;
            }
        }
        Ok(())
    }

    /// Draws the figures of one joint into its folder, and tells each as it is written.
    fn drawn(
        &self,
        (joint, tables): (&Joint, &[PathBuf]),
        folder: &Path,
        console: &mut Console,
    ) -> Result<(), Trouble> {
        let task = Task {
            joint,
            choice: self.field.choice()?,
            watch: self.batch.watch(),
        };
        let interface = chain::interface(joint, self.interface)?;
        if self.maps && folder.exists() {
            // A table that is to be kept is found before anything is solved.
            for name in chain::map_names(joint) {
                self.permit().target(&folder.join(name))?.apart(tables)?;
            }
        }
        let fields = chain::fields(&task, interface, COLUMNS)?;
        let mut files = Vec::new();
        for (name, drawing) in drawings::of_joint(joint, &fields) {
            for format in self.format.each() {
                let bytes = chain::render(&drawing, *format, self.shown.system())?;
                files.push((path(folder, (name, *format)), bytes));
            }
        }
        if self.maps {
            for (name, text) in chain::tables(&task, COLUMNS)? {
                files.push((folder.join(name), text.into_bytes()));
            }
        }
        results::make(folder)?;
        for (path, bytes) in files {
            self.permit().target(&path)?.write(&bytes)?;
            console.wrote(&path);
        }
        Ok(())
    }

    fn permit(&self) -> Permit<'_> {
        Permit::new(self.force, &self.files)
    }
}

impl Formats {
    fn each(self) -> &'static [Format] {
        match self {
            Self::Svg => &[Format::Svg],
            Self::Png => &[Format::Png],
            Self::Both => &[Format::Svg, Format::Png],
        }
    }
}

fn path(folder: &Path, (name, format): (&str, Format)) -> PathBuf {
    folder.join(match format {
        Format::Svg => format!("{name}.svg"),
        Format::Png => format!("{name}.png"),
    })
}
