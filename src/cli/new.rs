//! `new`: a starter joint file that `estimate` accepts as it stands, or one of the demos.

use crate::{
    cli::{
        chain,
        console::{Console, Outcome, Trouble},
        demos::{DEMOS, Demo},
        input,
        output::Permit,
    },
    report::{
        number::cut,
        table::{Side, aligned},
        text::WIDTH,
    },
};
use clap::Args;
use std::path::{Path, PathBuf};

/// The starter joint.
pub const TEMPLATE: &str = include_str!("template.toml");

/// What stands before a question in the list of demos, characters.
const NAMES: usize = 24;

/// Write a starter joint file, with comments, or a demo joint
#[derive(Debug, Args)]
pub struct New {
    /// File to write; without one the joint is printed
    file: Option<PathBuf>,
    /// Write this demo joint instead, with its tables; an unknown name lists the demos
    #[arg(long, value_name = "NAME")]
    from_demo: Option<String>,
    /// Replace the file if it exists
    #[arg(long)]
    force: bool,
}

impl New {
    /// Prints or writes the joint.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let demo = self.from_demo.as_deref().map(demo).transpose()?;
        let text = demo.map_or(TEMPLATE, Demo::written);
        let beside = demo.map_or(&[][..], |demo| demo.beside);
        let Some(path) = self.file.filter(|path| path != Path::new("-")) else {
            // Printed alone, a joint that reads a table beside it would be no joint.
            if let Some((table, _)) = beside.iter().find(|(name, _)| text.contains(name)) {
                return Err(Trouble::usage(
                    format!(
                        "this demo reads the table `{table}` beside it and cannot be printed alone"
                    ),
                    "name a file to write: both are written to its folder",
                ));
            }
            console.result(text)?;
            return Ok(Outcome::Done);
        };
        let permit = Permit::new(self.force, &[]);
        let folder = path.parent().map_or_else(PathBuf::new, Path::to_owned);
        // Every target is checked before the first is written.
        let mut files = vec![(permit.target(&path)?, text)];
        for (name, table) in beside {
            files.push((permit.target(&folder.join(name))?, table));
        }
        if let Some((target, _)) = files[1..].iter().find(|(target, _)| target.path == path) {
            return Err(Trouble::usage(
                format!("`{}` is the table of this demo", target.path.display()),
                "give the joint another name",
            ));
        }
        for (target, text) in files.iter().rev() {
            target.write(text.as_bytes())?;
        }
        let name = input::name(&path);
        let mut told = format!("wrote {name}");
        for (target, _) in &files[1..] {
            told = format!("{told} and {}", target.path.display());
        }
        console.message(&format!("{told}; next: ringsum estimate {name}\n"));
        Ok(Outcome::Done)
    }
}

/// The demo of a name.
fn demo(name: &str) -> Result<&'static Demo, Trouble> {
    let file = name.trim().trim_end_matches(".toml");
    let found = DEMOS.iter().find(|demo| demo.name == file);
    found.ok_or_else(|| {
        let known: Vec<String> = DEMOS.iter().map(|demo| demo.name.to_owned()).collect();
        let near = chain::nearest(file, &known)
            .map_or_else(String::new, |near| format!("did you mean `{near}`? "));
        let rows: Vec<Vec<String>> = DEMOS
            .iter()
            .map(|demo| vec![demo.name.to_owned(), cut(&demo.question(), WIDTH - NAMES)])
            .collect();
        let list = aligned(&[("demo", Side::Left), ("its question", Side::Left)], &rows);
        Trouble::usage(
            format!("there is no demo `{name}`"),
            format!("{near}the demos are\n{}", list.trim_end()),
        )
    })
}
