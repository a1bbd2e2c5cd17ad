//! The README: short, every block runs and prints what it shows, its counts are those of the tests.

use ringsum::diagnostic::registry;
use std::{collections::BTreeMap, fs, path::Path, process::Command};

/// One command of a block and the lines shown under it.
struct Shown {
    command: String,
    output: Vec<String>,
}

/// Every block of the text; one that is no block of commands would be read by nobody, and is refused.
fn blocks(text: &str) -> Vec<Vec<Shown>> {
    let mut blocks = Vec::new();
    let mut lines = text.lines();
    while let Some(line) = lines.next() {
        if !["```", "~~~", "    "]
            .iter()
            .any(|mark| line.starts_with(mark))
        {
            continue;
        }
        assert_eq!(line, "```console", "a block that nothing runs");
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
        assert!(!block.is_empty(), "a block without a command");
        blocks.push(block);
    }
    blocks
}

#[test]
fn it_stays_short() {
    let readme = fs::read_to_string("README.md").expect("the README is there");
    assert!(readme.lines().count() < 200, "{}", readme.lines().count());
}

#[test]
fn its_links_lead_to_files_and_its_topics_are_explained() {
    let readme = fs::read_to_string("README.md").expect("the README is there");
    let links: Vec<&str> = readme
        .split("](")
        .skip(1)
        .filter_map(|rest| rest.split(')').next())
        .collect();
    assert!(links.contains(&"figures/evidence.svg"), "{links:?}");
    for link in links {
        assert!(Path::new(link).exists(), "{link}");
    }
    // `ringsum explain CODE`, and the topics in backticks behind the first.
    let handbook = readme
        .split("`ringsum explain joint-file`")
        .nth(1)
        .and_then(|rest| rest.split_once("The laws"))
        .expect("the topics are named");
    let topics = handbook.0.split('`').skip(1).step_by(2);
    let named: Vec<&str> = readme
        .split("`ringsum explain ")
        .skip(1)
        .filter_map(|rest| rest.split('`').next())
        .chain(topics)
        .collect();
    for code in &named {
        assert!(registry::entry(code).is_some(), "{code}");
    }
    for topic in registry::entries()
        .iter()
        .filter_map(|entry| entry.code.strip_prefix("topic/"))
    {
        assert!(named.contains(&topic), "{topic} is not named");
    }
}

#[test]
fn its_evidence_is_what_the_tests_kept() {
    let readme = fs::read_to_string("README.md").expect("the README is there");
    let told: Vec<[usize; 2]> = readme
        .lines()
        .filter_map(|line| {
            let cells: Vec<&str> = line.split('|').map(str::trim).collect();
            match cells.as_slice() {
                ["", _, checks, outside, ""] => Some([checks.parse().ok()?, outside.parse().ok()?]),
                _ => None,
            }
        })
        .collect();
    // In the order of the table; the joints of several bolts are solved on two grids.
    let parts = [
        &["measured"][..],
        &["preload"],
        &["conductance"],
        &["round"],
        &["columns_fine", "columns_fast"],
    ];
    let mut kept = Vec::new();
    for files in parts {
        let mut counts = [0, 0];
        for file in files {
            let text = fs::read_to_string(format!("figures/evidence/{file}.json"))
                .expect("the part is kept");
            let part: serde_json::Value = serde_json::from_str(&text).expect("JSON");
            for row in part["rows"].as_array().expect("rows") {
                let end = |at: usize| row["accepted"][at].as_f64().expect("two ends");
                for found in row["found"].as_array().expect("values") {
                    let found = found.as_f64().expect("a number");
                    counts[0] += 1;
                    if !(end(0)..=end(1)).contains(&found) {
                        counts[1] += 1;
                        let values = row["values"].as_str().expect("a text");
                        assert!(
                            readme.contains(&format!("({values})")),
                            "the miss `{values}` is not told"
                        );
                    }
                }
            }
        }
        kept.push(counts);
    }
    assert_eq!(told, kept);
    let all: usize = kept.iter().map(|counts| counts[0]).sum();
    assert!(
        readme.contains(&format!("\n{all} values stand beside")),
        "{all}"
    );
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
    assert_eq!(ran, 11, "commands of the README that ran");
}

fn copy(from: &Path, to: &Path) {
    fs::create_dir_all(to).expect("the folder can be made");
    for entry in fs::read_dir(from).expect("the folder is there") {
        let path = entry.expect("the entry is readable").path();
        let name = path.file_name().expect("a file has a name");
        fs::copy(&path, to.join(name)).expect("the file can be copied");
    }
}
