//! Input of absurd size or kind, and outputs that take no more: a clear fault soon, no half file.
#![cfg(unix)]

use std::{
    fs::{self, File},
    io::Write,
    os::unix::{fs::PermissionsExt, process::ExitStatusExt},
    path::Path,
    process::{Command, Output, Stdio},
    time::{Duration, Instant},
};
use tempfile::{TempDir, tempdir};

#[path = "hostile/owed.rs"]
mod owed;

const RINGSUM: &str = env!("CARGO_BIN_EXE_ringsum");
const LID: &str = include_str!("../joints/service_lid.toml");

/// A refusal takes milliseconds, that of a table of a million lines some 0.7 s, on an idle machine; the
/// rest is for a busy one. What grows with the square of the size takes minutes.
const SOON: Duration = Duration::from_secs(15);

fn ringsum(folder: &TempDir) -> Command {
    let mut command = Command::new(RINGSUM);
    command
        .current_dir(folder.path())
        .env_remove("CLICOLOR_FORCE")
        .env("NO_COLOR", "1")
        .stdin(Stdio::null());
    command
}

fn told(output: &Output) -> String {
    String::from_utf8(output.stderr.clone()).expect("messages are UTF-8")
}

/// A run that must end soon with code 2 and say all of these.
fn refused(folder: &TempDir, arguments: &[&str], says: &[&str]) -> String {
    let begun = Instant::now();
    let output = ringsum(folder)
        .args(arguments)
        .output()
        .expect("the test can do this");
    let took = begun.elapsed();
    let told = told(&output);
    assert_eq!(output.status.code(), Some(2), "{arguments:?}: {told}");
    assert!(took < SOON, "{arguments:?} took {took:?}");
    for said in says {
        assert!(
            told.contains(said),
            "{arguments:?} does not say `{said}`:\n{told}"
        );
    }
    // A fault is read by a person: a page of it at most.
    assert!(
        told.len() < 200_000,
        "{arguments:?} tells {} bytes",
        told.len()
    );
    told
}

fn folder_with(text: impl AsRef<[u8]>) -> TempDir {
    let folder = tempdir().expect("the test can do this");
    fs::write(folder.path().join("joint.toml"), text).expect("the test can do this");
    folder
}

fn names(folder: &Path) -> Vec<String> {
    let entries = fs::read_dir(folder).expect("the test can do this");
    let mut names: Vec<String> = entries
        .map(|entry| {
            entry
                .expect("the test can do this")
                .file_name()
                .into_string()
                .expect("the test can do this")
        })
        .collect();
    names.sort();
    names
}

#[test]
fn files_that_are_too_large_are_refused_unread() {
    let folder = folder_with("");
    // Sparse: a terabyte that takes no room on the disk.
    let huge = File::create(folder.path().join("huge.toml")).expect("the test can do this");
    huge.set_len(1 << 40).expect("the test can do this");
    for command in [
        "check",
        "estimate",
        "report --out page.html",
        "draw --out out",
        "arrange",
    ] {
        let arguments: Vec<&str> = command.split(' ').chain(["huge.toml"]).collect();
        refused(&folder, &arguments, &["huge.toml", "larger than 1 MB"]);
    }
    fs::rename(
        folder.path().join("huge.toml"),
        folder.path().join("huge.csv"),
    )
    .expect("the test can do this");
    refused(
        &folder,
        &["fit", "huge.csv"],
        &["huge.csv", "larger than 10 MB"],
    );
    fs::write(folder.path().join("joint.toml"), LID).expect("the test can do this");
    for (state, says) in [
        ("huge.csv", "larger than 100 MB"),
        ("/dev/zero", "is not an ordinary file"),
    ] {
        refused(
            &folder,
            &["arrange", "joint.toml", "--resume", state],
            &[state, says],
        );
    }
}

#[test]
fn lists_without_end_are_refused_with_their_limit() {
    let entry = "[\"1 mm\", \"1 mm\"],";
    let start = LID.find("\nat = ").expect("the test can do this");
    let line = LID[start + 1..].find('\n').expect("the line ends");
    let end = start + 1 + line;
    let with = |count: usize| {
        format!(
            "{}\nat = [{}]\n{}",
            &LID[..start],
            entry.repeat(count),
            LID.get(end..).unwrap_or("")
        )
    };
    let folder = folder_with(with(20_000));
    refused(&folder, &["check", "joint.toml"], &["10000"]);
    // A million do not fit into the largest file.
    let folder = folder_with(with(1_000_000));
    refused(&folder, &["check", "joint.toml"], &["larger than 1 MB"]);
    for (table, count) in [
        ("[[plate]]\n", 90_000),
        ("[[fastener]]\n", 70_000),
        ("[[variant]]\n", 80_000),
    ] {
        let folder = folder_with(table.repeat(count));
        refused(
            &folder,
            &["check", "joint.toml"],
            &[&format!("{count} entries")],
        );
    }
}

#[test]
fn nesting_without_end_is_a_fault() {
    let folder = folder_with(format!("title = {}", "[".repeat(400_000)));
    refused(&folder, &["check", "joint.toml"], &["joint.toml:1"]);
    let folder = folder_with(format!("{LID}\na{} = 1\n", ".a".repeat(400_000)));
    refused(&folder, &["check", "joint.toml"], &["joint.toml"]);
    let folder = folder_with(format!("title = {}", "{a=".repeat(300_000)));
    refused(&folder, &["check", "joint.toml"], &["joint.toml:1"]);
    let set = format!("plate={}", "[".repeat(100_000));
    let folder = folder_with(LID);
    refused(&folder, &["check", "joint.toml", "--set", &set], &["--set"]);
}

#[test]
fn tables_of_measurements_without_end_are_refused() {
    let folder = folder_with("");
    let table = |name: &str, lines: usize| {
        let mut text = "pressure [MPa], h [W/(m²·K)]\n".to_owned();
        text.push_str(&"1, 2000\n".repeat(lines));
        fs::write(folder.path().join(name), text).expect("the test can do this");
    };
    table("long.csv", 1_000_000);
    refused(
        &folder,
        &["fit", "long.csv"],
        &["1000000 readings", "10000"],
    );
    table("longer.csv", 10_000_000);
    refused(&folder, &["fit", "longer.csv"], &["larger than 10 MB"]);
    let base = include_str!("../joints/bowed_base.toml");
    fs::write(folder.path().join("base.toml"), base).expect("the test can do this");
    let mut map = "x [mm], y [mm], z [µm]\n".to_owned();
    map.push_str(&"4, 4, -6.0\n".repeat(600_000));
    fs::write(folder.path().join("bowed_base_flatness.csv"), map).expect("the test can do this");
    refused(
        &folder,
        &["check", "base.toml"],
        &["600000 points", "100000"],
    );
    let map =
        File::create(folder.path().join("bowed_base_flatness.csv")).expect("the test can do this");
    map.set_len(1 << 40).expect("the test can do this");
    refused(&folder, &["check", "base.toml"], &["larger than 10 MB"]);
}

#[test]
fn numbers_of_the_command_line_have_limits() {
    let folder = folder_with(LID);
    let joint = "joint.toml";
    for (arguments, says) in [
        (["estimate", joint, "--draws", "1e9"], "10000000"),
        (
            ["estimate", joint, "--draws", "99999999999999999999"],
            "10000000",
        ),
        (["estimate", joint, "--draws", "-1"], "'-1'"),
        (["estimate", joint, "--jobs", "100000"], "1024"),
        (["estimate", joint, "--jobs", "0"], "--jobs"),
        (["arrange", joint, "--jobs", "100000"], "--jobs"),
        (["arrange", joint, "--solve", "4000000000"], "--solve"),
        (
            ["estimate", joint, "--shard", "1/99999999999999999999999"],
            "--shard",
        ),
        (["estimate", joint, "--shard", "0/0"], "--shard"),
        (["estimate", joint, "--seed", "-1"], "'-1'"),
        (["estimate", joint, "--memory", "1e30 GB"], "--memory"),
    ] {
        refused(&folder, &arguments, &[says]);
    }
}

#[test]
fn bodies_of_absurd_size_are_refused_or_solved_but_never_hang() {
    let folder = folder_with(LID);
    for (set, says) in [
        ("plate.lid.size=[\"4 m\", \"60 mm\"]", "joint.toml"),
        ("plate.lid.thickness=\"1 km\"", "from 1 µm to 10 m"),
        ("plate.lid.thickness=\"1e-300 m\"", "--set"),
        ("plate.lid.size=[\"1e-9 m\", \"3 m\"]", "--set"),
        ("fastener.at=[[\"1e300 m\", \"0 mm\"]]", "--set"),
        ("plate.lid.thickness=\"1e999 m\"", "--set"),
    ] {
        refused(&folder, &["check", "joint.toml", "--set", set], &[says]);
    }
}

#[test]
fn what_is_no_file_of_text_is_refused() {
    let folder = folder_with(LID);
    let fifo = Command::new("mkfifo")
        .arg(folder.path().join("pipe"))
        .status()
        .expect("the test can do this");
    assert!(fifo.success());
    for (path, says) in [
        ("/dev/zero", "larger than 1 MB"),
        ("/dev/null", "is empty"),
        ("/dev/urandom", "/dev/urandom"),
        ("/", "is a folder"),
        (".", "is a folder"),
        ("pipe", "named pipe"),
        ("joint.toml/x", "joint.toml/x"),
    ] {
        refused(&folder, &["check", path], &[says]);
    }
    for path in ["pipe", "/dev/zero", "/"] {
        refused(&folder, &["fit", path], &[path]);
        refused(
            &folder,
            &["arrange", "joint.toml", "--resume", path],
            &[path],
        );
    }
    let base = include_str!("../joints/bowed_base.toml");
    for map in ["pipe", "/dev/zero", "."] {
        let text = base.replace("bowed_base_flatness.csv", map);
        fs::write(folder.path().join("base.toml"), text).expect("the test can do this");
        refused(&folder, &["check", "base.toml"], &["cannot be read"]);
    }
    let sixteen: Vec<u8> = LID.encode_utf16().flat_map(u16::to_le_bytes).collect();
    for (bytes, says) in [
        ([&[0xFF, 0xFE][..], &sixteen].concat(), "UTF-16"),
        (b"title = \"\xFF\"".to_vec(), "0xFF on line 1"),
        (b"title = \"\0\"".to_vec(), "joint.toml:1"),
        (vec![0; 900_000], "joint.toml"),
    ] {
        let folder = folder_with(bytes);
        refused(&folder, &["check", "joint.toml"], &[says]);
    }
}

#[test]
fn a_pipe_of_the_shell_is_read() {
    let folder = folder_with(LID);
    let Ok(output) = Command::new("bash")
        .current_dir(folder.path())
        .args(["-c", &format!("'{RINGSUM}' check <(cat joint.toml)")])
        .output()
    else {
        println!("skipped: there is no bash");
        return;
    };
    assert!(output.status.success(), "{}", told(&output));
}

#[test]
fn a_mark_at_the_start_and_other_line_ends_change_nothing() {
    let check = |text: String| {
        let folder = folder_with(text);
        let output = ringsum(&folder)
            .args([
                "estimate",
                "joint.toml",
                "--field",
                "cone",
                "--draws",
                "0",
                "--json",
            ])
            .output()
            .expect("the test can do this");
        assert!(output.stderr.is_empty(), "{}", told(&output));
        output.stdout
    };
    let plain = check(LID.to_owned());
    assert_eq!(check(format!("\u{feff}{LID}")), plain);
    assert_eq!(check(LID.replace('\n', "\r\n")), plain);
}

/// Runs of a shell whose files may grow to some kilobytes only, which stops a run while it writes.
fn short_of_room(folder: &TempDir, before: &str, arguments: &str) -> Output {
    let script = format!("ulimit -c 0; ulimit -f 1; {before} exec '{RINGSUM}' {arguments}");
    Command::new("sh")
        .current_dir(folder.path())
        .env("NO_COLOR", "1")
        .args(["-c", &script])
        .output()
        .expect("the test can do this")
}

/// Commands that write more than a kilobyte, and the files they would write.
const WRITERS: [&str; 4] = [
    "new other.toml",
    "estimate joint.toml --field cone --draws 0 --out out",
    "draw joint.toml --field cone --out out",
    "report joint.toml --field cone --draws 64 --out page.html",
];

/// All files below a folder that bear a name a user would look for.
fn asked_for(folder: &Path) -> Vec<String> {
    let mut found = Vec::new();
    for name in names(folder) {
        let path = folder.join(&name);
        if path.is_dir() {
            found.extend(asked_for(&path));
        } else if !name.starts_with(".ringsum-") && name != "joint.toml" {
            found.push(name);
        }
    }
    found
}

#[test]
fn what_is_killed_while_it_writes_leaves_no_half_file() {
    for writer in WRITERS {
        let folder = folder_with(LID);
        let output = short_of_room(&folder, "", writer);
        // The system ends a program that writes beyond its limit, unless it ignores the signal.
        assert!(output.status.signal().is_some(), "{writer}: {output:?}");
        assert_eq!(asked_for(folder.path()), [""; 0], "{writer}");
    }
}

#[test]
fn what_finds_no_room_says_so_and_leaves_nothing() {
    for writer in WRITERS {
        let folder = folder_with(LID);
        let output = short_of_room(&folder, "trap '' XFSZ;", writer);
        assert_eq!(output.status.code(), Some(1), "{writer}: {output:?}");
        assert!(told(&output).contains("cannot be written"), "{output:?}");
        assert_eq!(asked_for(folder.path()), [""; 0], "{writer}");
        let left = |folder: &Path| {
            names(folder)
                .iter()
                .any(|name| name.starts_with(".ringsum-"))
        };
        assert!(!left(folder.path()), "{writer}");
        let out = folder.path().join("out");
        assert!(!out.is_dir() || !left(&out), "{writer}");
    }
}

#[test]
fn what_is_replaced_stays_whole_when_there_is_no_room() {
    let folder = folder_with(LID);
    fs::write(folder.path().join("page.html"), "before").expect("the test can do this");
    let writer = "report joint.toml --field cone --draws 64 --out page.html --force";
    for before in ["", "trap '' XFSZ;"] {
        let output = short_of_room(&folder, before, writer);
        assert!(!output.status.success(), "{output:?}");
        assert_eq!(
            fs::read_to_string(folder.path().join("page.html")).expect("the test can do this"),
            "before"
        );
    }
}

#[test]
fn a_full_output_is_a_failure_and_a_closed_one_is_not() {
    let folder = folder_with(LID);
    let arguments = [
        &["list"][..],
        &["schema"],
        &["new"],
        &["explain"],
        &["check", "joint.toml", "--json"],
        &["estimate", "joint.toml", "--field", "cone", "--draws", "0"],
    ];
    for arguments in arguments {
        let (reader, writer) = std::io::pipe().expect("the test can do this");
        drop(reader);
        let closed = ringsum(&folder).args(arguments).stdout(writer).output();
        let closed = closed.expect("the test can do this");
        if arguments != ["schema"] || closed.status.code() != Some(2) {
            assert!(closed.stderr.is_empty(), "{arguments:?}: {closed:?}");
            assert!(closed.status.success(), "{arguments:?}: {closed:?}");
        }
        let Ok(full) = fs::OpenOptions::new().write(true).open("/dev/full") else {
            println!("skipped: there is no /dev/full");
            continue;
        };
        let output = ringsum(&folder).args(arguments).stdout(full).output();
        let output = output.expect("the test can do this");
        if output.status.code() != Some(2) {
            assert_eq!(output.status.code(), Some(1), "{arguments:?}: {output:?}");
            assert!(!output.stderr.is_empty(), "{arguments:?}");
        }
    }
}

#[test]
fn folders_that_take_no_file_are_told() {
    let folder = folder_with(LID);
    let draw =
        |out: &str| ["draw", "joint.toml", "--field", "cone", "--out", out].map(str::to_owned);
    let run = |arguments: &[String]| {
        ringsum(&folder)
            .args(arguments)
            .output()
            .expect("the test can do this")
    };

    // Before anything is solved, for which there is not enough memory.
    refused(
        &folder,
        &[
            "draw",
            "joint.toml",
            "--out",
            "joint.toml/out",
            "--memory",
            "1MB",
        ],
        &["`joint.toml` is a file"],
    );

    let locked = folder.path().join("locked");
    fs::create_dir(&locked).expect("the test can do this");
    fs::set_permissions(&locked, fs::Permissions::from_mode(0o555)).expect("the test can do this");
    if File::create(locked.join("probe")).is_ok() {
        println!("skipped: this user may write into read-only folders");
        return;
    }
    let output = run(&draw("locked"));
    assert_eq!(output.status.code(), Some(1), "{output:?}");
    assert!(told(&output).contains("cannot be written"), "{output:?}");
    assert_eq!(names(&locked), [""; 0]);
}

#[test]
fn out_names_a_folder_and_says_so() {
    let folder = folder_with(LID);
    fs::write(folder.path().join("taken"), "mine").expect("the test can do this");
    for command in ["draw", "estimate"] {
        let arguments = |out| [command, "joint.toml", "--field", "cone", "--out", out];
        refused(
            &folder,
            &arguments("taken"),
            &["`taken` is a file", "name a folder"],
        );
        refused(
            &folder,
            &arguments("x.svg"),
            &["`x.svg` is the name of a file", "name a folder"],
        );
        refused(
            &folder,
            &arguments("result.json"),
            &["`result.json` is the name of a file", "name a folder"],
        );
    }
    refused(
        &folder,
        &["report", "joint.toml", "--out", "page.pdf"],
        &["`page.pdf` does not end in .html", "name a page"],
    );
    assert_eq!(names(folder.path()), ["joint.toml", "taken"]);
}

#[test]
fn a_map_that_exists_is_refused_before_anything_is_solved() {
    let folder = folder_with(LID);
    fs::create_dir(folder.path().join("out")).expect("the test can do this");
    let map = folder.path().join("out/map_1_service.csv");
    // Not enough to solve: who solves first, tells of the memory.
    let arguments = "draw joint.toml --maps --out out --memory 1MB";
    let arguments: Vec<&str> = arguments.split(' ').collect();
    refused(&folder, &arguments, &["--memory"]);
    fs::write(&map, "kept").expect("the test can do this");
    refused(&folder, &arguments, &["map_1_service.csv", "--force"]);
    assert_eq!(fs::read(&map).expect("the test can do this"), b"kept");
    assert_eq!(names(&folder.path().join("out")), ["map_1_service.csv"]);
}

#[test]
fn a_link_is_written_through_only_when_replacing_is_asked_for() {
    let folder = folder_with(LID);
    let (real, link) = (
        folder.path().join("real.html"),
        folder.path().join("page.html"),
    );
    fs::write(&real, "before").expect("the test can do this");
    std::os::unix::fs::symlink(&real, &link).expect("the test can do this");
    let page = [
        "report",
        "joint.toml",
        "--field",
        "cone",
        "--draws",
        "64",
        "--out",
        "page.html",
    ];
    refused(&folder, &page, &["`page.html` exists already", "--force"]);
    assert_eq!(
        fs::read_to_string(&real).expect("the test can do this"),
        "before"
    );
    let output = ringsum(&folder)
        .args(page)
        .arg("--force")
        .output()
        .expect("the test can do this");
    assert!(output.status.success(), "{}", told(&output));
    assert!(
        fs::symlink_metadata(&link)
            .expect("the test can do this")
            .is_symlink()
    );
    assert!(
        fs::read_to_string(&real)
            .expect("the test can do this")
            .contains("</html>")
    );

    fs::remove_file(&real).expect("the test can do this");
    refused(&folder, &page, &["is a link to a file that does not exist"]);
    assert!(!real.exists());
}

#[test]
fn standard_input_without_end_is_refused() {
    let folder = folder_with("");
    let begun = Instant::now();
    let mut child = ringsum(&folder)
        .args(["check", "-"])
        .stdin(Stdio::piped())
        .stdout(Stdio::null())
        .stderr(Stdio::piped())
        .spawn()
        .expect("the test can do this");
    let mut stdin = child.stdin.take().expect("the test can do this");
    // The program stops reading long before this is written.
    let writer = std::thread::spawn(move || {
        let block = vec![b'#'; 1 << 16];
        while stdin.write_all(&block).is_ok() {}
    });
    let output = child.wait_with_output().expect("the test can do this");
    writer.join().expect("the test can do this");
    assert_eq!(output.status.code(), Some(2));
    assert!(told(&output).contains("<stdin>"), "{}", told(&output));
    assert!(begun.elapsed() < SOON);
}
