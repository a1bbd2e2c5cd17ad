//! Every console block of the README runs, and prints what the README says it prints.

use std::{collections::BTreeMap, fs, path::Path, process::Command};

/// One command of a block and the lines shown under it.
struct Shown {
    command: String,
    output: Vec<String>,
}

fn blocks(text: &str) -> Vec<Vec<Shown>> {
    let mut blocks = Vec::new();
    let mut lines = text.lines();
    while let Some(line) = lines.next() {
        if line != "```console" {
            continue;
        }
        let mut block: Vec<Shown> = Vec::new();
        for line in lines.by_ref().take_while(|line| *line != "```") {
            if let Some(command) = line.strip_prefix("$ ") {
                block.push(Shown {
                    command: command.to_owned(),
                    output: Vec::new(),
                });
            } else {
                let shown = block.last_mut().expect("output follows a command");
                shown.output.push(line.to_owned());
            }
        }
        blocks.push(block);
    }
    blocks
}

#[test]
fn every_block_runs_and_prints_what_it_shows() {
    let readme = fs::read_to_string("README.md").expect("the README is there");
    let folder = tempfile::tempdir().expect("a folder to work in");
    copy(Path::new("joints"), &folder.path().join("joints"));
    let mut ran = 0;
    // The same command is shown twice, and a solved field takes its time.
    let mut told: BTreeMap<String, String> = BTreeMap::new();
    for shown in blocks(&readme).into_iter().flatten() {
        let words: Vec<&str> = shown.command.split_whitespace().collect();
        let arguments = match words.as_slice() {
            ["ringsum", rest @ ..] | ["cargo", "run", "--release", "--", rest @ ..] => rest,
            // This is what runs now.
            ["cargo", "test", "--profile", "quick"] => continue,
            _ => panic!(
                "the README shows `{}`, which nothing here runs",
                shown.command
            ),
        };
        let printed = told.entry(arguments.join(" ")).or_insert_with(|| {
            let output = Command::new(snapbox::cmd::cargo_bin!("ringsum"))
                .args(arguments)
                .current_dir(folder.path())
                .env("NO_COLOR", "1")
                .output()
                .expect("the program starts");
            let printed = String::from_utf8(output.stdout).expect("results are text");
            assert!(output.status.success(), "{}: {printed}", shown.command);
            printed
        });
        for line in shown.output.iter().filter(|line| *line != "…") {
            assert!(
                printed.lines().any(|printed| printed == line),
                "`{}` does not print\n{line}\nbut\n{printed}",
                shown.command
            );
        }
        ran += 1;
    }
    assert_eq!(ran, 14, "commands of the README that ran");
}

fn copy(from: &Path, to: &Path) {
    fs::create_dir_all(to).expect("the folder can be made");
    for entry in fs::read_dir(from).expect("the folder is there") {
        let path = entry.expect("the entry is readable").path();
        let name = path.file_name().expect("a file has a name");
        fs::copy(&path, to.join(name)).expect("the file can be copied");
    }
}
