//! Two plates of 80 by 60 mm with two bolts, for the tests of this folder.

use crate::joint::{self, Joint};

/// The joint as a file.
pub const TEXT: &str = "
[service]
medium = \"vacuum\"
[[plate]]
name = \"box\"
material = \"Al 6061-T6\"
thickness = \"5 mm\"
size = [\"80 mm\", \"60 mm\"]
finish = \"milled\"
[[plate]]
name = \"panel\"
material = \"Al 6061-T6\"
thickness = \"5 mm\"
size = [\"80 mm\", \"60 mm\"]
finish = \"milled\"
[fastener]
thread = \"M4\"
grade = \"8.8\"
head = \"socket\"
torque = \"2 N·m\"
at = [[\"10 mm\", \"10 mm\"], [\"70 mm\", \"50 mm\"]]
";

/// The joint as read.
pub fn joint() -> Joint {
    joint::read(TEXT).expect("a good joint")
}
