//! The demo joints, carried in the program so that they are there without a clone.

/// A demo joint with the files beside it.
#[derive(Clone, Copy, Debug)]
pub struct Demo {
    /// What it is called.
    pub name: &'static str,
    /// The joint file.
    pub text: &'static str,
    /// Tables that go with it, each with its file name.
    pub beside: &'static [(&'static str, &'static str)],
}

impl Demo {
    /// The question it answers: the comment at its head.
    pub fn question(&self) -> String {
        let lines = self
            .text
            .lines()
            .skip_while(|line| line.starts_with("#:"))
            .map_while(|line| line.strip_prefix('#'));
        let words: Vec<&str> = lines.flat_map(str::split_whitespace).collect();
        words.join(" ")
    }

    /// The joint file without the line that names a schema, which stands beside it nowhere else.
    pub fn written(&self) -> &'static str {
        match self.text.split_once('\n') {
            Some((first, rest)) if first.starts_with("#:schema") => rest,
            _ => self.text,
        }
    }
}

/// Every demo joint, by name.
pub const DEMOS: &[Demo] = &[
    Demo {
        name: "avionics_shim",
        text: include_str!("../../joints/avionics_shim.toml"),
        beside: &[],
    },
    Demo {
        name: "battery_plate",
        text: include_str!("../../joints/battery_plate.toml"),
        beside: &[],
    },
    Demo {
        name: "bowed_base",
        text: include_str!("../../joints/bowed_base.toml"),
        beside: &[(
            "bowed_base_flatness.csv",
            include_str!("../../joints/bowed_base_flatness.csv"),
        )],
    },
    Demo {
        name: "bracket_feet",
        text: include_str!("../../joints/bracket_feet.toml"),
        beside: &[],
    },
    Demo {
        name: "busbar_lap",
        text: include_str!("../../joints/busbar_lap.toml"),
        beside: &[],
    },
    Demo {
        name: "converter_box",
        text: include_str!("../../joints/converter_box.toml"),
        beside: &[],
    },
    Demo {
        name: "cryogenic_strap",
        text: include_str!("../../joints/cryogenic_strap.toml"),
        beside: &[],
    },
    Demo {
        name: "honeycomb_panel",
        text: include_str!("../../joints/honeycomb_panel.toml"),
        beside: &[],
    },
    Demo {
        name: "isolating_mount",
        text: include_str!("../../joints/isolating_mount.toml"),
        beside: &[],
    },
    Demo {
        name: "led_bar",
        text: include_str!("../../joints/led_bar.toml"),
        beside: &[],
    },
    Demo {
        name: "led_board",
        text: include_str!("../../joints/led_board.toml"),
        beside: &[],
    },
    Demo {
        name: "power_module",
        text: include_str!("../../joints/power_module.toml"),
        beside: &[],
    },
    Demo {
        name: "rf_flange",
        text: include_str!("../../joints/rf_flange.toml"),
        beside: &[],
    },
    Demo {
        name: "rig_coupon",
        text: include_str!("../../joints/rig_coupon.toml"),
        beside: &[
            (
                "rig_coupon_points.csv",
                include_str!("../../joints/rig_coupon_points.csv"),
            ),
            (
                "rig_coupon_torque.csv",
                include_str!("../../joints/rig_coupon_torque.csv"),
            ),
        ],
    },
    Demo {
        name: "sensor_lid",
        text: include_str!("../../joints/sensor_lid.toml"),
        beside: &[],
    },
    Demo {
        name: "service_lid",
        text: include_str!("../../joints/service_lid.toml"),
        beside: &[],
    },
    Demo {
        name: "uhv_absorber",
        text: include_str!("../../joints/uhv_absorber.toml"),
        beside: &[],
    },
];

#[cfg(test)]
mod tests {
    use super::*;
    use std::{collections::BTreeMap, fs};

    #[test]
    fn what_is_carried_is_what_stands_in_the_folder() {
        let mut kept = BTreeMap::new();
        for entry in fs::read_dir("joints").unwrap() {
            let path = entry.unwrap().path();
            let name = path.file_name().unwrap().to_string_lossy().into_owned();
            if path.extension().is_some_and(|ending| ending != "json") {
                kept.insert(name, fs::read_to_string(&path).unwrap());
            }
        }
        let mut carried = BTreeMap::new();
        for demo in DEMOS {
            carried.insert(format!("{}.toml", demo.name), demo.text.to_owned());
            for (name, text) in demo.beside {
                carried.insert((*name).to_owned(), (*text).to_owned());
            }
        }
        assert_eq!(carried, kept);
    }

    #[test]
    fn every_demo_asks_its_question() {
        for demo in DEMOS {
            assert!(demo.question().len() > 30, "{}", demo.name);
            assert!(demo.written().starts_with("# "), "{}", demo.name);
        }
    }
}
