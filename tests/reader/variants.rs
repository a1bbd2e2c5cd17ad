//! `[[variant]]`: what it may override, and how.

use ringsum::joint::{self, Joint, Tightening, Version};

const BASE: &str = r#"
[service]
medium = "vacuum"
[[plate]]
name = "lid"
material = "Al 6061-T6"
thickness = "5 mm"
size = ["80 mm", "60 mm"]
finish = "milled"
[[plate]]
name = "case"
material = "Al 6061-T6"
thickness = "8 mm"
size = ["80 mm", "60 mm"]
finish = "milled"
[fastener]
thread = "M4"
grade = "8.8"
head = "socket"
torque = "2 N·m"
friction = { class = "B" }
pattern = { kind = "grid", count = [2, 2], margin = "10 mm" }
"#;

fn versions(variants: &str, sets: &[&str]) -> Vec<Version> {
    let sets: Vec<String> = sets.iter().map(|set| (*set).to_owned()).collect();
    let text = format!("{BASE}{variants}");
    joint::read_versions(&text, &sets, &|_| Err("no tables".into()))
        .unwrap_or_else(|faults| panic!("{faults:#?}"))
}

/// The one variant as the same overrides on the command line would have it.
fn same(variant: &str, sets: &[&str]) {
    let found = versions(&format!("[[variant]]\nname = \"other\"\n{variant}\n"), &[]);
    assert_eq!(found.len(), 2, "{variant}");
    assert_eq!(found[1].name.as_deref(), Some("other"));
    let by_sets = versions("", sets).remove(0).joint;
    assert_eq!(found[1].joint, by_sets, "{variant}");
    assert_ne!(found[1].joint, found[0].joint, "{variant}");
}

#[test]
fn a_variant_overrides_what_set_overrides() {
    same(
        "plate.lid.thickness = \"6 mm\"",
        &["plate.lid.thickness=\"6 mm\""],
    );
    same(
        "\"plate.lid.thickness\" = \"6 mm\"",
        &["plate.lid.thickness=\"6 mm\""],
    );
    same(
        "\"fastener[1].torque\" = \"3 N·m\"",
        &["fastener.torque=\"3 N·m\""],
    );
    same(
        "fastener.torque.tolerance = \"5 %\"",
        &["fastener.torque.tolerance=\"5 %\""],
    );
    same("fastener.thread = \"M5\"", &["fastener.thread=M5"]);
    same(
        "fastener.pattern.count = [3, 2]",
        &["fastener.pattern.count=[3, 2]"],
    );
    same("service.medium = \"air\"", &["service.medium=air"]);
    same(
        "plate.case.size = [\"90 mm\", \"70 mm\"]",
        &["plate.case.size=[\"90 mm\", \"70 mm\"]"],
    );
    same("filler = \"graphite foil\"", &["filler=graphite foil"]);
    same("cost = 2.5", &["cost=2.5"]);
    // A table in braces replaces what stood there, a headed one leads on.
    same(
        "fastener.pattern = { kind = \"edge\", count = [3, 3], margin = \"10 mm\" }",
        &["fastener.pattern={ kind = \"edge\", count = [3, 3], margin = \"10 mm\" }"],
    );
    same(
        "[variant.fastener]\nthread = \"M5\"\ntorque = \"4 N·m\"",
        &["fastener.thread=M5", "fastener.torque=\"4 N·m\""],
    );
    // What a new key excludes goes.
    same(
        "fastener.preload = \"3 kN\"",
        &["fastener.preload=\"3 kN\""],
    );
}

#[test]
fn a_variant_in_braces_is_one_as_well() {
    let text = format!("variant = [{{ name = \"tight\", fastener.torque = \"3 N·m\" }}]\n{BASE}");
    let found = joint::read_versions(&text, &[], &|_| Err("no tables".into())).expect("sound");
    let torque = |joint: &Joint| match &joint.fasteners[0].tightening {
        Tightening::Torque(tightening) => tightening.torque,
        Tightening::Preload(_) => f64::NAN,
    };
    assert_eq!(
        found
            .iter()
            .map(|each| torque(&each.joint))
            .collect::<Vec<f64>>(),
        [2.0, 3.0]
    );
}

#[test]
fn overrides_of_the_command_line_act_on_every_variant_and_last() {
    let found = versions(
        "[[variant]]\nname = \"a\"\nplate.lid.thickness = \"6 mm\"\n[[variant]]\nname = \"b\"\nservice.medium = \"air\"\n",
        &["plate.lid.thickness=\"7 mm\""],
    );
    for version in &found {
        assert!(
            (version.joint.plates[0].thickness - 7e-3).abs() < 1e-12,
            "{version:?}"
        );
    }
}

#[test]
fn a_joint_with_variants_reads_as_stated() {
    let with = format!("{BASE}[[variant]]\nname = \"a\"\nplate.lid.thickness = \"6 mm\"\n");
    assert_eq!(joint::read(&with), joint::read(BASE));
    assert_eq!(joint::variant_names(&with), ["a"]);
    assert_eq!(joint::variant_names("no = [toml"), Vec::<String>::new());
    let set = joint::read_with(BASE, &["variant=[]".to_owned()]).expect_err("no field");
    assert!(set.faults[0].1.message.contains("cannot be overridden"));
}
