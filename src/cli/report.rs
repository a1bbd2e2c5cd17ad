//! `report`: everything about a joint on one page that is handed over.

use crate::{
    cli::{
        batch::Batch,
        chain::{self, Asked, Effort, Entry, Handed, Task},
        check,
        compare::{plot, versions_of},
        console::{Console, Outcome, Trouble},
        drawings,
        draws::Draws,
        field::Field,
        input::{self, Source},
        output::{Permit, Target},
        results::{self, stem},
        shown::Shown,
    },
    figures::{Drawing, FigureError},
    joint::{self, Joint, Version},
    report::page::{self, Contents, Fields, Figure, Figures},
    units::System,
};
use clap::Args;
use sha2::{Digest, Sha256};
use std::{
    fmt::Write,
    path::{Path, PathBuf},
};

const EXAMPLES: &str = "\
Examples:
  ringsum report joint.toml --out joint.html
  ringsum report joint.toml --out joint.html --thorough
  ringsum report joints/*.toml --out pages --jobs 2";

/// Points across a map, and across one whose values are read under the pointer.
const COLUMNS: usize = 400;
const POINTED: usize = 96;

/// Everything about a joint on one page: drawing, inputs, chain with its laws, results, torque
/// window, drivers, cautions
///
/// The page is one HTML file that needs no network and prints on A4.
#[derive(Debug, Args)]
#[command(after_help = EXAMPLES)]
pub struct Report {
    /// Joint files; - reads standard input
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    /// The page, PAGE.html; of several files a folder, one page for each
    #[arg(long, value_name = "PAGE")]
    out: PathBuf,
    #[command(flatten)]
    field: Field,
    #[command(flatten)]
    draws: Draws,
    /// Override a field: --set 'plate.box.thickness="6 mm"'
    #[arg(long = "set", value_name = "KEY=VALUE")]
    sets: Vec<String>,
    /// Take a variant of the joint by its name
    #[arg(long, value_name = "NAME")]
    variant: Option<String>,
    /// Number of torques in the torque table
    #[arg(long, value_name = "N", default_value_t = TORQUES,
          value_parser = clap::value_parser!(u32).range(2..=200))]
    torques: u32,
    /// Draw also the torque table and the variants, on the field of the results; takes its time
    #[arg(long)]
    thorough: bool,
    #[command(flatten)]
    shown: Shown,
    /// Exit with 3 when a caution speaks of a joint
    #[arg(long)]
    strict: bool,
    #[command(flatten)]
    batch: Batch,
    /// Replace pages that exist
    #[arg(long)]
    force: bool,
}

impl Report {
    /// Makes every page, also after a file at fault; checks every target before computing.
    pub fn run(self, console: &mut Console) -> Result<Outcome, Trouble> {
        let files = self.batch.files(&self.files);
        input::stdin_at_most_once(&files)?;
        let targets = self.targets(&files)?;
        self.batch.run(&files, console, &|index, path, console| {
            self.one(path, &targets[index], console)
        })
    }

    /// Where each page goes: the page itself, or a folder with one for each file.
    fn targets(&self, files: &[PathBuf]) -> Result<Vec<Target>, Trouble> {
        let permit = Permit::new(self.force, &self.files);
        let ending = self.out.extension().and_then(|ending| ending.to_str());
        let is_page = ending.is_some_and(|ending| {
            ending.eq_ignore_ascii_case("html") || ending.eq_ignore_ascii_case("htm")
        });
        if is_page {
            if self.files.len() > 1 {
                return Err(Trouble::usage(
                    format!(
                        "`{}` is one page, and several files are named",
                        self.out.display()
                    ),
                    "name a folder: --out pages",
                ));
            }
            return Ok(vec![permit.target(&self.out)?]);
        }
        results::apart(&self.files, ".html")?;
        if self.out.is_file() || (!self.out.is_dir() && results::ends_like_a_file(&self.out)) {
            return Err(Trouble::usage(
                format!("`{}` does not end in .html", self.out.display()),
                "name a page, `joint.html`, or a folder",
            ));
        }
        results::make(&self.out)?;
        let page = |path: &PathBuf| self.out.join(format!("{}.html", stem(path)));
        files
            .iter()
            .map(|path| permit.target(&page(path)))
            .collect()
    }

    fn one(&self, path: &Path, target: &Target, console: &mut Console) -> Result<Outcome, Trouble> {
        let (source, versions) =
            check::read_versions(path, &self.sets, console).map_err(|refused| refused.trouble())?;
        let (place, joint) = self.chosen(&source, &versions)?;
        let task = Task {
            joint,
            choice: self.field.choice()?,
            watch: self.batch.watch(),
        };
        let asked = Asked {
            options: self.draws.options(),
            effort: if self.thorough {
                Effort::Whole
            } else {
                Effort::Split
            },
            torques: self.torques as usize,
            columns: COLUMNS,
            pointed: POINTED,
        };
        let entries: Vec<Entry> = versions_of(None, versions.clone()).collect();
        let found = chain::handed(&task, &entries, &asked)
            .map_err(|trouble| trouble.of_file(&source.name))?;
        let (figures, undrawn) = figures(joint, (&entries, &found), self.shown.system())?;
        let left_out = [found.left_out.as_slice(), &undrawn].concat();
        let stated = joint::stated(&source.text, (&self.sets, place));
        let page = page::page(&Contents {
            joint,
            source: page::Source {
                name: &source.name,
                text: &source.text,
                digest: &digest(&source.text),
                command: &self.command(path, target),
            },
            stated: &stated,
            estimate: &found.fields.nominal,
            figures: &figures,
            fields: Some(Fields {
                map: &found.pointed.map,
                heat: found.pointed.heat.as_ref(),
                watts: joint.service.heat,
            }),
            torque: found.torque.as_ref(),
            media: &found.media,
            ranking: found.ranking.as_ref(),
            comparison: found.comparison.as_ref().map(|(comparison, _)| comparison),
            units: self.shown.system(),
            left_out: &left_out,
        })
        .map_err(|why| Trouble::Failure(format!("{}: the page failed: {why}", source.name)))?;
        target.write(page.as_bytes())?;
        console.wrote(&target.path);
        Ok(if self.strict && found.fields.nominal.has_cautions() {
            Outcome::Cautioned
        } else {
            Outcome::Done
        })
    }

    /// The version asked for, with the place of its variant.
    fn chosen<'a>(
        &self,
        source: &Source,
        versions: &'a [Version],
    ) -> Result<(Option<usize>, &'a Joint), Trouble> {
        let stated = || Trouble::Failure(format!("{}: no joint was read", source.name));
        let Some(name) = &self.variant else {
            let first = versions.first().ok_or_else(stated)?;
            return Ok((None, &first.joint));
        };
        let found = versions
            .iter()
            .position(|version| version.name.as_ref() == Some(name));
        if let Some(place) = found {
            // The joint as stated stands before its variants.
            return Ok((place.checked_sub(1), &versions[place].joint));
        }
        let names: Vec<&str> = versions
            .iter()
            .filter_map(|each| each.name.as_deref())
            .collect();
        Err(Trouble::usage(
            format!("`{}` has no variant `{name}`", source.name),
            if names.is_empty() {
                "it has no variants: add a `[[variant]]` with its name".to_owned()
            } else {
                format!("its variants are {}", names.join(", "))
            },
        ))
    }

    /// The command that makes a page again.
    fn command(&self, path: &Path, target: &Target) -> String {
        let mut words = vec![
            "ringsum".to_owned(),
            "report".to_owned(),
            path.display().to_string(),
            "--out".to_owned(),
            target.path.display().to_string(),
        ];
        words.extend(self.field.words());
        let defaults = Draws::default();
        if self.draws.draws != defaults.draws {
            words.extend(["--draws".to_owned(), self.draws.draws.to_string()]);
        }
        if self.draws.seed != defaults.seed {
            words.extend(["--seed".to_owned(), self.draws.seed.to_string()]);
        }
        for set in &self.sets {
            words.extend(["--set".to_owned(), set.clone()]);
        }
        if let Some(variant) = &self.variant {
            words.extend(["--variant".to_owned(), variant.clone()]);
        }
        if self.torques != TORQUES {
            words.extend(["--torques".to_owned(), self.torques.to_string()]);
        }
        if self.thorough {
            words.push("--thorough".to_owned());
        }
        words.extend(self.shown.words());
        let words: Vec<String> = words.iter().map(|word| quoted(word)).collect();
        words.join(" ")
    }
}

/// Torques of the table unless told otherwise.
const TORQUES: u32 = 9;

/// A word as a shell takes it.
fn quoted(word: &str) -> String {
    let plain = |letter: char| letter.is_alphanumeric() || "-_./=+:,@".contains(letter);
    if !word.is_empty() && word.chars().all(plain) {
        word.to_owned()
    } else {
        format!("'{}'", word.replace('\'', r"'\''"))
    }
}

/// SHA-256 of a text, hexadecimal.
fn digest(text: &str) -> String {
    Sha256::digest(text.as_bytes())
        .iter()
        .fold(String::new(), |mut digits, byte| {
            // Writing to a string cannot fail.
            let _ = write!(digits, "{byte:02x}");
            digits
        })
}

/// Every drawing of a page, and which could not be drawn.
fn figures(
    joint: &Joint,
    (entries, found): (&[Entry], &Handed),
    units: System,
) -> Result<(Figures, Vec<String>), Trouble> {
    let drawn = |drawing: &Drawing, caption: &str, plan: bool| -> Result<Figure, FigureError> {
        let [svg, narrow] = chain::both_widths(drawing, units)?;
        Ok(Figure {
            svg,
            narrow,
            caption: caption.to_owned(),
            plan,
        })
    };
    let plain = |drawing: &Drawing, caption: &str| drawn(drawing, caption, false).map(Some);
    let mut undrawn = Vec::new();
    let mut all = Figures {
        joint: plain(
            &Drawing::Joint(Box::new(drawings::plan_and_cut(joint))),
            "The joint in plan and cut along a row of bolts, to one scale; heads and nuts in their usual proportions.",
        )?,
        ..Figures::default()
    };
    for (name, drawing) in drawings::of_joint(joint, &found.fields) {
        let (caption, plan) = drawings::told(name);
        all.fields.push(drawn(&drawing, caption, plan)?);
    }
    for fields in &found.further {
        let between = joint.interface_name(fields.interface);
        for (name, drawing) in drawings::of_further(joint, fields) {
            let (caption, _) = drawings::told(name);
            let caption = format!("{between}: {caption}");
            all.fields.push(drawn(&drawing, &caption, false)?);
        }
    }
    if let Some(sweep) = &found.torque {
        all.torque = plain(
            &Drawing::Torque(Box::new(sweep.clone())),
            "Resistance against torque, with what strength allows.",
        )?;
    }
    if let Some(ranking) = &found.ranking {
        all.drivers = plain(
            &Drawing::Tornado(Box::new(ranking.clone())),
            "Source to sink with each input alone at its 5 % and at its 95 %, all others nominal.",
        )?;
    }
    if let Some((comparison, maps)) = &found.comparison {
        let drawn = plain(
            &Drawing::Comparison(Box::new(plot(entries, (comparison, maps)))),
            "Source to sink and contact pressure of every version.",
        );
        match drawn {
            Ok(figure) => all.comparison = figure,
            Err(FigureError::TooLong(_)) => undrawn.push(
                "Figure of the variants: they are too many for one; the table tells them all."
                    .to_owned(),
            ),
            Err(fault) => return Err(fault.into()),
        }
    }
    Ok((all, undrawn))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_digest_is_sha_256() {
        // FIPS 180-4, example "abc".
        assert_eq!(
            digest("abc"),
            "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad"
        );
    }

    #[test]
    fn words_are_quoted_for_a_shell() {
        assert_eq!(quoted("joints/a.toml"), "joints/a.toml");
        assert_eq!(quoted("a=\"6 mm\""), "'a=\"6 mm\"'");
        assert_eq!(quoted("it's"), r"'it'\''s'");
    }
}
