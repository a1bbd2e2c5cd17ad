//! What a joint weighs, as far as the catalogue knows it.

use std::f64::consts::PI;

use crate::{
    catalog,
    joint::{Engagement, Fastener, Isolating, Joint, Patch, Plate},
};

/// Threads that stand out of a nut, in pitches (common practice, no source).
const BEYOND_NUT: f64 = 2.0;

/// Mass of the parts of a joint, kg.
#[derive(Clone, Debug, PartialEq)]
pub struct Mass {
    /// Bolts with heads, nuts and washers.
    pub fasteners: f64,
    /// Plates without their holes, feet and ribs included.
    pub plates: f64,
    /// Layers between the faces whose thickness and density are known.
    pub fillers: f64,
    /// What is not counted, in words: parts whose size or density is not known.
    pub left_out: Vec<String>,
}

impl Mass {
    /// All that is counted, kg.
    pub fn total(&self) -> f64 {
        self.fasteners + self.plates + self.fillers
    }
}

impl Joint {
    /// Mass of plates, fasteners and fillers.
    ///
    /// ```text
    /// m = Σ ρ A t + Σ ρ_b (V_head + V_nut + V_washers + π d₂² l/4) + Σ ρ_f A_f t_f
    /// ```
    ///
    /// | symbol | quantity | SI unit |
    /// |---|---|---|
    /// | `A`, `t` | area without holes and openings, thickness of a plate | m², m |
    /// | `A_f`, `t_f` | area on which both faces of an interface lie, without holes, on a grid of points; thickness of its layer | m², m |
    /// | `V` | volumes of the parts, from the seats of the catalogue | m³ |
    /// | `d₂`, `l` | pitch diameter; grip with nut and two pitches, or with the engaged thread | m |
    ///
    /// Valid: fasteners within about 10 %, which catalogue masses of standard screws allow to check.
    /// Source: volumes of simple bodies, of this program.
    /// Checked: `mass_of_a_joint_by_hand`, `screws_weigh_what_tables_say`.
    pub fn mass(&self) -> Mass {
        let mut left_out = Vec::new();
        let mut plates = 0.0;
        for (index, plate) in self.plates.iter().enumerate() {
            match plate.material.density.as_ref() {
                _ if plate.sandwich.is_some() => {
                    left_out.push(format!(
                        "{}: the density of its core is not known",
                        plate.name
                    ));
                }
                Some(density) => plates += density.value * self.volume(index),
                None => left_out.push(format!(
                    "{}: {} has no density",
                    plate.name, plate.material.name
                )),
            }
        }
        let mut fasteners = 0.0;
        for (group, fastener) in self.fasteners.iter().enumerate() {
            match self.bolt(fastener, &mut left_out) {
                Some(each) => fasteners += self.clamping_of(group) as f64 * each,
                None => left_out.push(format!(
                    "{} {}: no density",
                    fastener.thread.name, fastener.grade.name
                )),
            }
        }
        let mut fillers = 0.0;
        for interface in 0..self.interfaces() {
            let Some(filler) = self.filler(interface) else {
                continue;
            };
            match (filler.density, filler.thickness) {
                (Some(density), Some(thickness)) => {
                    fillers += density * thickness * self.faying_area(interface);
                }
                (None, _) => left_out.push(format!("{}: no density", filler.name)),
                (_, None) => {
                    left_out.push(format!("{}: it flows to no known thickness", filler.name));
                }
            }
        }
        left_out.dedup();
        Mass {
            fasteners,
            plates,
            fillers,
            left_out,
        }
    }

    /// Area on which both faces of an interface lie, holes left out, m²: exact where the overlap of two
    /// rectangles decides, else by the share of points of a grid over it.
    fn faying_area(&self, interface: usize) -> f64 {
        /// Points along each side: a curved edge is off by less than a percent.
        const POINTS: usize = 400;
        let plates = [interface, interface + 1].map(|plate| &self.plates[plate]);
        let [one, other] = plates.map(Plate::bounds);
        let low = [0, 1].map(|side| one[side].max(other[side]));
        let high = [2, 3].map(|side| one[side].min(other[side]));
        let size = [0, 1].map(|side| (high[side] - low[side]).max(0.0));
        let place = |side: usize, index: usize| {
            low[side] + size[side] * (index as f64 + 0.5) / POINTS as f64
        };
        let meet = |point: [f64; 2]| {
            plates.iter().all(|plate| {
                let feet = plate.feet.as_ref();
                let own = plate.own(point);
                plate.covers(point)
                    && feet.is_none_or(|feet| feet.at.iter().any(|foot| foot.depth(own) >= 0.0))
            })
        };
        let inside = (0..POINTS * POINTS)
            .filter(|index| meet([place(0, index % POINTS), place(1, index / POINTS)]))
            .count();
        let holes: f64 = self
            .fasteners
            .iter()
            .map(|fastener| {
                let [one, other] =
                    [interface, interface + 1].map(|plate| fastener.hole_radius[plate]);
                fastener.places.len() as f64 * disc(one.max(other))
            })
            .sum();
        size[0] * size[1] * inside as f64 / (POINTS * POINTS) as f64 - holes
    }

    /// Volume of a plate without its holes and openings, m³.
    fn volume(&self, index: usize) -> f64 {
        let plate = &self.plates[index];
        let holes: f64 = self
            .fasteners
            .iter()
            .map(|fastener| fastener.places.len() as f64 * disc(fastener.hole_radius[index]))
            .sum();
        let openings: f64 = plate.cutouts.iter().map(Patch::area).sum();
        let ribs: f64 = plate
            .ribs
            .iter()
            .map(|rib| rib.height * rib.patch.area())
            .sum();
        let feet = plate.feet.as_ref().map_or(0.0, |feet| {
            feet.height * feet.at.iter().map(Patch::area).sum::<f64>()
        });
        (plate.outline.area() - openings - holes) * plate.thickness + ribs + feet
    }

    /// Mass of one bolt with all that belongs to it, kg; none without a density.
    fn bolt(&self, fastener: &Fastener, left_out: &mut Vec<String>) -> Option<f64> {
        let material = catalog::material(&fastener.grade.like);
        let density = material?.density.as_ref()?.value;
        let hardware = fastener.hardware;
        let name = &fastener.thread.name;
        let mut volume = hardware.washers.unwrap_or(0.0);
        if hardware.washers.is_none() {
            left_out.push(format!("washers of {name}: no thickness in the catalogue"));
        }
        match hardware.head {
            Some(head) => volume += head,
            None => left_out.push(format!("head of {name}: only its seat is known")),
        }
        let far = self.far_plate(fastener);
        let clamped = self.plates.iter().enumerate();
        let threaded = !matches!(fastener.engagement, Engagement::Nut);
        let clamped = clamped.filter(|(index, _)| !(threaded && *index == far));
        let isolating = fastener.isolating.as_ref();
        let grip = clamped.map(|(_, plate)| plate.thickness).sum::<f64>()
            + fastener.washer_thickness
            + isolating.map_or(0.0, Isolating::height);
        let end = match fastener.engagement {
            Engagement::Nut => {
                if hardware.nut.is_none() {
                    left_out.push(format!("nut of {name}: not in the catalogue"));
                }
                let (nut, height) = hardware.nut.unwrap_or((0.0, 0.0));
                volume += nut;
                height + BEYOND_NUT * fastener.thread.pitch
            }
            Engagement::Tapped { length } | Engagement::Insert { length } => length,
        };
        volume += disc(0.5 * fastener.thread.pitch_diameter) * (grip + end);
        let mut mass = density * volume;
        if let Some(washers) = isolating {
            match washers.material.density.as_ref() {
                Some(own) => mass += own.value * fastener.head_seat.area() * washers.height(),
                None => left_out.push("isolating washers: no density".to_owned()),
            }
        }
        Some(mass)
    }
}

fn disc(radius: f64) -> f64 {
    PI * radius * radius
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::joint::read;

    fn joint(head: &str, [upper, lower]: [&str; 2]) -> Joint {
        read(&format!(
            r#"
            [service]
            medium = "vacuum"
            [[plate]]
            material = "Al 6061-T6"
            thickness = "{upper}"
            size = ["80 mm", "60 mm"]
            finish = "milled"
            [[plate]]
            material = "Al 6061-T6"
            thickness = "{lower}"
            size = ["80 mm", "60 mm"]
            finish = "milled"
            [fastener]
            grade = "8.8"
            preload = "1 kN"
            at = [["20 mm", "30 mm"], ["60 mm", "30 mm"]]
            {head}
            "#
        ))
        .expect("the joint is whole")
    }

    #[test]
    fn screws_weigh_what_tables_say() {
        // Trade tables, steel, from memory, within 3 %: M5 x 16 ISO 4762 3.98 g and M8 x 30 ISO 4017
        // 16.9 g; the volumes are good to 10 %.
        let tapped = "engagement = { kind = \"tapped\", length = \"10 mm\" }\n";
        let m5 = format!("thread = \"M5\"\nhead = \"socket\"\n{tapped}");
        let m8 = format!("thread = \"M8\"\nhead = \"hex\"\n{tapped}");
        for (text, plates, grams) in [
            (m5, ["6 mm", "10 mm"], 3.98),
            (m8, ["20 mm", "10 mm"], 16.9),
        ] {
            let found = 1e3 * joint(&text, plates).mass().fasteners / 2.0;
            assert!((found / grams - 1.0).abs() < 0.1, "{found} g, not {grams}");
        }
    }

    #[test]
    fn mass_of_a_joint_by_hand() {
        // Own computation: 80 × 60 × (5 + 5) mm less two holes of 5.5 mm, at 2700 kg/m³: 0.128317 kg.
        let whole = joint(
            "thread = \"M5\"\nhead = \"hex\"\nhole = \"5.5 mm\"",
            ["5 mm", "5 mm"],
        );
        let mass = whole.mass();
        assert!(
            (mass.plates / 0.128_317 - 1.0).abs() < 1e-5,
            "{}",
            mass.plates
        );
        // Steel of 7850 kg/m³ within 0.5 %: head 0.8660 · 8.08² · 3.5 = 197.9, nut of 4.7 mm
        // (0.8660 · 8.08² − π/4 · 4.480²) · 4.7 = 191.6, rod π/4 · 4.480² · (10 + 4.7 + 1.6) = 256.9 mm³:
        // 646.4 mm³, 5.074 g each. The catalogue rounds its seats.
        let each = mass.fasteners / 2.0;
        assert!((each / 5.074e-3 - 1.0).abs() < 0.01, "{each}");
        assert!(mass.left_out.is_empty(), "{:?}", mass.left_out);
        // A bolt that is left out weighs nothing, and its hole stays.
        let one = whole.without(&[1]).expect("one is left").mass();
        assert!((one.fasteners / each - 1.0).abs() < 1e-12);
        assert!((one.plates - mass.plates).abs() < 1e-15);
    }

    #[test]
    fn a_foil_weighs_its_faces_and_what_has_no_density_is_named() {
        let bolts = "thread = \"M5\"\nhead = \"hex\"\nhole = \"5.5 mm\"";
        let with =
            |filler: &str| joint(&format!("{bolts}\n[filler]\n{filler}"), ["5 mm"; 2]).mass();
        // Own computation: 80 × 60 mm less two holes of 5.5 mm, 0.1 mm of 7310 kg/m³: 3.474 g.
        let indium = with("name = \"indium foil\"");
        assert!(
            (indium.fillers / 3.474_1e-3 - 1.0).abs() < 1e-4,
            "{}",
            indium.fillers
        );
        assert!(indium.left_out.is_empty(), "{:?}", indium.left_out);
        assert!((indium.total() - indium.plates - indium.fasteners - indium.fillers).abs() < 1e-15);
        let grease = with("name = \"filled grease\"");
        assert!(grease.fillers <= 0.0);
        assert_eq!(grease.left_out, ["filled grease: no density"]);
    }
}
