//! What keeps faces apart before any bolt is tightened: bow, measured map, thermal sag.

use crate::joint::{Bimetal, Facing, Joint, Plate, Sag};

/// Gaps below this leave a joint flat, m: far below any roughness.
const FLAT: f64 = 1e-12;

impl Plate {
    /// Gap of a paraboloid against a flat at a point of the joint, m.
    ///
    /// ```text
    /// concave, h > 0:  g = h (1 − r²/R²)
    /// convex,  h < 0:  g = |h| r²/R²
    /// ```
    ///
    /// | symbol | quantity | SI unit |
    /// |---|---|---|
    /// | `h` | height over `R`, positive concave | m |
    /// | `r` | distance from the centre of the outline (of a polygon: of its bounds) | m |
    /// | `R` | half the diagonal of the bounds; of a disc its radius | m |
    ///
    /// Valid: on the plate, where 0 ≤ g ≤ |h|. Source: definition of this program. Checked: `a_bow_opens_the_middle_or_the_corners`.
    pub fn flatness_gap(&self, point: [f64; 2], height: f64) -> f64 {
        let [x, y] = self.own(point);
        let centre = self.outline.centre();
        let share = (x - centre[0]).hypot(y - centre[1]) / self.outline.bow_radius();
        if height < 0.0 {
            -height * share * share
        } else {
            height * (1.0 - share * share)
        }
    }
}

impl Joint {
    /// Gap between the two faces of an interface (0 is the warmest) as they come together, before any
    /// force, at a point of the joint, m.
    ///
    /// The sum over both faces of bow, flatness map (from its highest point down) and thermal sag. A
    /// plate between others is bent as a whole: what is concave on one side is convex on the other.
    /// A plane distance is no gap: the plates come together until they touch somewhere, so the
    /// result counts up to a constant and a tilt. Out-of-flatness that is stated without its shape,
    /// feet and the bending by bolts are not in it.
    ///
    /// Checked: `gaps_of_both_faces_add`, `heat_opens_the_first_plate_and_domes_the_second`,
    /// `a_plate_between_others_is_bent_as_a_whole`.
    pub fn initial_gap(&self, interface: usize, point: [f64; 2]) -> f64 {
        let faces = [(interface, Facing::Cold), (interface + 1, Facing::Warm)];
        let faces = faces.into_iter().map(|(index, facing)| {
            let plate = &self.plates[index];
            let between = index > 0 && index < self.plates.len() - 1;
            let turned = if between && facing == Facing::Cold {
                -1.0
            } else {
                1.0
            };
            let bow = plate.flatness_gap(point, turned * plate.bow.unwrap_or(0.0));
            let map = plate
                .flatness_map
                .as_ref()
                .map_or(0.0, |map| map.highest() - map.height_at(plate.own(point)));
            bow + map + plate.flatness_gap(point, turned * self.sag_height(index))
        });
        faces.sum()
    }

    /// Whether the faces lie flat on each other before any force: no bow, map or sag that says
    /// otherwise.
    ///
    /// Checked: `a_joint_without_bow_map_and_sag_is_flat`.
    pub fn is_flat(&self) -> bool {
        self.plates.iter().enumerate().all(|(index, plate)| {
            let map = plate.flatness_map.as_ref();
            plate.bow.unwrap_or(0.0).abs() <= FLAT
                && map.is_none_or(|map| map.highest() - map.lowest() <= FLAT)
                && self.sag_height(index).abs() <= FLAT
        })
    }

    /// Height by which a face is out of flat, m: bow or map with thermal sag, else the flatness that is
    /// stated without its shape with it; none where nothing is stated.
    ///
    /// Checked: `a_face_is_out_of_flat_by_whatever_states_it`.
    pub fn out_of_flat(&self, plate: usize, facing: Facing) -> Option<f64> {
        let stated = &self.plates[plate];
        let map = stated.flatness_map.as_ref();
        let shape = match (stated.bow, map) {
            (None, None) => match (facing, &stated.underside) {
                (Facing::Cold, Some(underside)) => underside.flatness,
                _ => stated.flatness,
            },
            (bow, map) => Some(
                bow.map_or(0.0, f64::abs) + map.map_or(0.0, |map| map.highest() - map.lowest()),
            ),
        };
        let sag = stated.sag.as_ref().map(|_| self.sag_height(plate).abs());
        match (shape, sag) {
            (None, None) => None,
            (shape, sag) => Some(shape.unwrap_or(0.0) + sag.unwrap_or(0.0)),
        }
    }

    /// Height of the sag of a plate over its bow radius, m: positive concave at the faying face.
    fn sag_height(&self, plate: usize) -> f64 {
        let radius = self.plates[plate].outline.bow_radius();
        0.5 * self.sag_curvature(plate) * radius * radius
    }

    /// Curvature that temperatures give a plate (0 is the first), 1/m: positive concave at the
    /// faying face, open in the middle, of a plate between others at the face towards the warm side;
    /// zero where no sag is stated.
    ///
    /// ```text
    /// flux:     κ = ± α q″/k
    /// bimetal:  κ = 6 (α₂ − α₁) ΔT (1 + m)² / (t [3 (1 + m)² + (1 + mn)(m² + 1/(mn))])
    ///           m = t₁/t₂,  n = E₁/E₂,  t = t₁ + t₂
    /// ```
    ///
    /// | symbol | quantity | SI unit |
    /// |---|---|---|
    /// | `α` | linear expansion of the plate | 1/K |
    /// | `k` | conductivity of the plate through its thickness | W/(m K) |
    /// | `q″` | heat flux through the thickness, positive from the first plate to the second | W/m² |
    /// | `t₁`, `t₂` | thickness of the plate and of the layer on its outer face | m |
    /// | `E₁`, `E₂` | Young's moduli of both | Pa |
    /// | `ΔT` | change of temperature since both were flat together | K |
    ///
    /// Signs: heat goes down. It makes the outer face of the first plate the hotter one, its centre
    /// lifts, and the faying face is concave: `+`. Of every other plate the face towards the warm side
    /// is the hotter one and domes towards it: `−`. A layer that grows more than its plate makes
    /// the faying face concave, whichever plate it lies on.
    ///
    /// Valid: a thin plate free to bend, the flux the same all over, `α` and `k` at room
    /// temperature, one-way bending of the bimetal (a strip). `Sag::Heat` spreads the stated heat
    /// over the area of the outline, cut-outs not taken off; without stated heat it is zero.
    /// Source: flux, uniform gradient in a free plate, by definition; bimetal, Timoshenko 1925,
    /// from memory.
    /// Checked: `heat_opens_the_first_plate_and_domes_the_second`,
    /// `a_layered_plate_bends_by_what_it_conducts_through_its_thickness`,
    /// `a_bimetal_of_equal_layers_bends_by_the_textbook`.
    pub fn sag_curvature(&self, plate: usize) -> f64 {
        let own = &self.plates[plate];
        let down = if plate == 0 { 1.0 } else { -1.0 };
        let bent_by = |flux: f64| {
            let material = &own.material;
            let through = material.conductivity.value * material.through_ratio();
            down * material.expansion.value * flux / through
        };
        match &own.sag {
            None => 0.0,
            Some(Sag::Flux(flux)) => bent_by(*flux),
            Some(Sag::Heat) => bent_by(self.service.heat.unwrap_or(0.0) / own.outline.area()),
            Some(Sag::Curvature(curvature)) => *curvature,
            Some(Sag::Bimetal(layer)) => bimetal(own, layer),
        }
    }
}

fn bimetal(plate: &Plate, layer: &Bimetal) -> f64 {
    let m = plate.thickness / layer.thickness;
    let n = plate.material.youngs_modulus.value / layer.material.youngs_modulus.value;
    let strain = (layer.material.expansion.value - plate.material.expansion.value) * layer.change;
    let t = plate.thickness + layer.thickness;
    let square = (1.0 + m) * (1.0 + m);
    6.0 * strain * square / (t * (3.0 * square + (1.0 + m * n) * (m * m + 1.0 / (m * n))))
}

#[cfg(test)]
mod tests {
    use std::sync::Arc;

    use super::*;
    use crate::joint::{FlatnessMap, Outline, fixture};

    /// Corner and centre of both plates of the fixture, 80 by 60 mm.
    const CORNER: [f64; 2] = [0.0, 0.0];
    const CENTRE: [f64; 2] = [40e-3, 30e-3];
    /// Micrometres of gap, a few products and differences.
    const ROUNDING: f64 = 1e-19;

    fn near(one: f64, other: f64) -> bool {
        (one - other).abs() < ROUNDING
    }

    #[test]
    fn a_bow_opens_the_middle_or_the_corners() {
        let mut plate = fixture::joint().plates[0].clone();
        assert!(near(plate.flatness_gap(CENTRE, 30e-6), 30e-6));
        assert!(near(plate.flatness_gap(CORNER, 30e-6), 0.0));
        assert!(near(plate.flatness_gap(CENTRE, -30e-6), 0.0));
        assert!(near(plate.flatness_gap(CORNER, -30e-6), 30e-6));
        // Half of the half diagonal of 50 mm.
        assert!(near(plate.flatness_gap([15e-3, 30e-3], 30e-6), 22.5e-6));
        plate.outline = Outline::Disc { radius: 50e-3 };
        assert!(near(plate.flatness_gap([0.0, 25e-3], 30e-6), 22.5e-6));
    }

    /// A plane that falls by 10 µm from corner to corner.
    fn tilted() -> Option<Arc<FlatnessMap>> {
        let corners = vec![
            [0.0, 0.0, 5e-6],
            [0.08, 0.0, 0.0],
            [0.0, 0.06, 0.0],
            [0.08, 0.06, -5e-6],
        ];
        FlatnessMap::new(corners).map(Arc::new)
    }

    #[test]
    fn a_face_is_out_of_flat_by_whatever_states_it() {
        let mut joint = fixture::joint();
        joint.plates[0].flatness = None;
        assert_eq!(joint.out_of_flat(0, Facing::Cold), None);
        joint.plates[0].flatness = Some(40e-6);
        assert_eq!(joint.out_of_flat(0, Facing::Cold), Some(40e-6));
        joint.plates[0].bow = Some(-30e-6);
        assert_eq!(joint.out_of_flat(0, Facing::Cold), Some(30e-6));
        joint.plates[0].bow = None;
        joint.plates[0].flatness_map = tilted();
        assert!(near(
            joint.out_of_flat(0, Facing::Cold).unwrap_or(0.0),
            10e-6
        ));
    }

    #[test]
    fn gaps_of_both_faces_add() {
        let mut joint = fixture::joint();
        joint.plates[0].bow = Some(30e-6);
        joint.plates[1].flatness_map = tilted();
        assert!(near(joint.initial_gap(0, CORNER), 0.0));
        assert!(near(joint.initial_gap(0, CENTRE), 35e-6));
        assert!(near(joint.initial_gap(0, [0.08, 0.06]), 10e-6));
    }

    #[test]
    fn a_joint_without_bow_map_and_sag_is_flat() {
        let mut joint = fixture::joint();
        assert!(joint.is_flat());
        joint.plates[1].sag = Some(Sag::Curvature(0.02));
        assert!(!joint.is_flat());
        joint.plates[1].sag = Some(Sag::Curvature(0.0));
        joint.plates[0].bow = Some(0.0);
        assert!(joint.is_flat());
        joint.plates[0].bow = Some(-1e-6);
        assert!(!joint.is_flat());
    }

    #[test]
    fn heat_opens_the_first_plate_and_domes_the_second() {
        let mut joint = fixture::joint();
        let material = &joint.plates[0].material;
        let expected = material.expansion.value * 20e3 / material.conductivity.value;
        for plate in &mut joint.plates {
            plate.sag = Some(Sag::Flux(20e3));
        }
        assert!((joint.sag_curvature(0) / expected - 1.0).abs() < 1e-15);
        assert!((joint.sag_curvature(1) / expected + 1.0).abs() < 1e-15);
        joint.plates[1].sag = None;
        // The hot outer side lifts the centre: open in the middle by κ R²/2.
        let height = 0.5 * expected * 50e-3 * 50e-3;
        assert!(near(joint.initial_gap(0, CENTRE), height));
        assert!(near(joint.initial_gap(0, CORNER), 0.0));
        joint.plates.swap(0, 1);
        // The domed face touches in the middle and parts at the corners.
        assert!(near(joint.initial_gap(0, CENTRE), 0.0));
        assert!(near(joint.initial_gap(0, CORNER), height));
    }

    // The gradient of the flux lies along the thickness: 20 kW/m² over 2 W/(m K) are 10 K/mm,
    // whatever the plate conducts in its plane. 1e-12 is rounding.
    #[test]
    fn a_layered_plate_bends_by_what_it_conducts_through_its_thickness() {
        let text = fixture::TEXT.replacen(
            "thickness = \"5 mm\"",
            "thickness = \"5 mm\"\nsag = { flux = \"20 kW/m²\" }\n\
             conductivity = { in_plane = \"200 W/(m·K)\", through = \"2 W/(m·K)\" }",
            1,
        );
        let joint = crate::joint::read(&text).expect("a layered plate");
        let expansion = joint.plates[0].material.expansion.value;
        let found = joint.sag_curvature(0);
        assert!((found / (expansion * 1e4) - 1.0).abs() < 1e-12, "{found}");
    }

    #[test]
    fn a_plate_between_others_is_bent_as_a_whole() {
        let mut joint = fixture::joint();
        let mut shim = joint.plates[0].clone();
        shim.bow = Some(20e-6);
        shim.sag = Some(Sag::Flux(20e3));
        joint.plates.insert(1, shim);
        let height = 0.5 * joint.sag_curvature(1).abs() * 50e-3 * 50e-3;
        assert!(joint.sag_curvature(1) < 0.0 && height < 20e-6);
        // The bow opens the middle towards the warm side, the flux the corners.
        assert!(near(joint.initial_gap(0, CENTRE), 20e-6));
        assert!(near(joint.initial_gap(0, CORNER), height));
        // Below it is the other way round, and both gaps together are even.
        for point in [CORNER, CENTRE, [15e-3, 30e-3]] {
            let both = joint.initial_gap(0, point) + joint.initial_gap(1, point);
            assert!(near(both, 20e-6 + height), "{both}");
        }
    }

    #[test]
    fn stated_heat_is_spread_over_the_plate() {
        let mut joint = fixture::joint();
        joint.plates[0].sag = Some(Sag::Heat);
        joint.service.heat = Some(96.0);
        let by_heat = joint.sag_curvature(0);
        // 96 W over 80 by 60 mm are 20 kW/m².
        joint.plates[0].sag = Some(Sag::Flux(20e3));
        assert!((by_heat / joint.sag_curvature(0) - 1.0).abs() < 1e-14);
    }

    #[test]
    fn a_bimetal_of_equal_layers_bends_by_the_textbook() {
        let mut joint = fixture::joint();
        let plate = &joint.plates[0];
        let mut layer = plate.material.clone();
        layer.expansion.value += 10e-6;
        let mut bimetal = Bimetal {
            material: layer,
            thickness: plate.thickness,
            change: 40.0,
        };
        // Equal thickness and modulus: κ = 3 Δα ΔT/(2 t), Timoshenko 1925 (from memory).
        let expected = 1.5 * 10e-6 * 40.0 / (2.0 * plate.thickness);
        joint.plates[0].sag = Some(Sag::Bimetal(Box::new(bimetal.clone())));
        assert!((joint.sag_curvature(0) / expected - 1.0).abs() < 1e-10);
        // A stiff thin layer: by the moments of a film, κ = 6 Δα ΔT E₂ t₂/(E₁ t₁²), off by t₂/t₁.
        bimetal.thickness = plate_share(&joint, 1e-4);
        let thin = 6.0 * 10e-6 * 40.0 * 1e-4 / joint.plates[0].thickness;
        joint.plates[0].sag = Some(Sag::Bimetal(Box::new(bimetal.clone())));
        assert!((joint.sag_curvature(0) / thin - 1.0).abs() < 1e-3);
        // Cooling turns it over; on the second plate the sign is the same.
        bimetal.change = -40.0;
        joint.plates[1].sag = Some(Sag::Bimetal(Box::new(bimetal)));
        assert!((joint.sag_curvature(1) / joint.sag_curvature(0) + 1.0).abs() < 1e-12);
    }

    fn plate_share(joint: &Joint, share: f64) -> f64 {
        share * joint.plates[0].thickness
    }
}
