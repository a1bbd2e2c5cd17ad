//! The plates of a joint as a stack: its interfaces, the faces that meet there, what fills them.

use crate::joint::{Facing, Fastener, Filler, FillerKind, Finish, Joint, Plate};

impl Joint {
    /// Number of interfaces: one less than plates.
    pub fn interfaces(&self) -> usize {
        self.plates.len() - 1
    }

    /// The plates that meet at an interface (0 is the warmest), warm one first.
    pub fn meeting(&self, interface: usize) -> [&Plate; 2] {
        [&self.plates[interface], &self.plates[interface + 1]]
    }

    /// The faces that meet at an interface, warm one first.
    pub fn finishes(&self, interface: usize) -> [&Finish; 2] {
        let [warm, cold] = self.meeting(interface);
        [warm.face(Facing::Cold), cold.face(Facing::Warm)]
    }

    /// Names of the plates that meet at an interface: `base / shim`.
    pub fn interface_name(&self, interface: usize) -> String {
        let [warm, cold] = self.meeting(interface);
        format!("{} / {}", warm.name, cold.name)
    }

    /// What fills an interface instead of the medium.
    pub fn filler(&self, interface: usize) -> Option<&Filler> {
        self.fillers.get(interface)?.as_ref()
    }

    /// Every filler, from warm to cold.
    pub fn every_filler(&self) -> impl Iterator<Item = &Filler> {
        self.fillers.iter().flatten()
    }

    /// Whether a layer, a paste or a table stands between the faces of an interface, so that no
    /// asperities meet; a fluid lets them.
    pub fn is_layered(&self, interface: usize) -> bool {
        self.filler(interface)
            .is_some_and(|filler| !matches!(filler.kind, FillerKind::Fluid { .. }))
    }

    /// Whether heat crosses an interface by the solid spots of its faces: neither a layer nor own
    /// measurements stand for them.
    pub fn is_bare(&self, interface: usize) -> bool {
        self.measured.is_none() && !self.is_layered(interface)
    }

    /// Out-of-flatness of both faces of an interface that is stated without its shape, m.
    pub fn loose_flatness(&self, interface: usize) -> f64 {
        let [warm, cold] = self.meeting(interface);
        warm.loose_flatness(Facing::Cold) + cold.loose_flatness(Facing::Warm)
    }

    /// The same of the interface that has most, m.
    pub fn most_loose_flatness(&self) -> f64 {
        (0..self.interfaces())
            .map(|interface| self.loose_flatness(interface))
            .fold(0.0, f64::max)
    }

    /// Index of the plate that holds nut or thread of a fastener.
    pub fn far_plate(&self, fastener: &Fastener) -> usize {
        self.plates.len() - 1 - fastener.head_plate
    }
}

impl Plate {
    /// Its face towards one side; of the first and the last plate only one is a faying face.
    pub fn face(&self, facing: Facing) -> &Finish {
        match (facing, &self.underside) {
            (Facing::Cold, Some(underside)) => &underside.finish,
            _ => &self.finish,
        }
    }

    /// Out-of-flatness of a face that is stated without its shape, m; 0 beside a bow or a map,
    /// which have one.
    pub fn loose_flatness(&self, facing: Facing) -> f64 {
        if self.bow.is_some() || self.flatness_map.is_some() {
            return 0.0;
        }
        let stated = match (facing, &self.underside) {
            (Facing::Cold, Some(underside)) => underside.flatness,
            _ => self.flatness,
        };
        stated.unwrap_or(0.0)
    }
}

impl Fastener {
    /// The widest of its holes, m.
    pub fn widest_hole(&self) -> f64 {
        self.hole_radius.iter().copied().fold(0.0, f64::max)
    }

    /// Hole radius in the first and in the last plate, m.
    pub fn outer_holes(&self) -> [f64; 2] {
        [
            self.hole_radius[0],
            self.hole_radius[self.hole_radius.len() - 1],
        ]
    }
}

#[cfg(test)]
mod tests {
    use crate::joint::{Underside, fixture};

    #[test]
    fn a_plate_between_others_has_two_faces() {
        let mut joint = fixture::joint();
        let mut shim = joint.plates[0].clone();
        shim.name = "shim".into();
        shim.flatness = Some(5e-6);
        let mut finish = shim.finish.clone();
        finish.slope = 0.3;
        shim.underside = Some(Underside {
            finish,
            flatness: Some(7e-6),
        });
        joint.plates.insert(1, shim);
        assert_eq!(joint.interfaces(), 2);
        assert_eq!(joint.interface_name(1), "shim / panel");
        let [above, below] = [0, 1].map(|interface| joint.finishes(interface));
        assert!(above[1].slope < 0.3 && (below[0].slope - 0.3).abs() < 1e-15);
        // Stated values, passed on.
        assert!((joint.loose_flatness(0) - 5e-6).abs() < 1e-20);
        assert!((joint.loose_flatness(1) - 7e-6).abs() < 1e-20);
        assert!((joint.most_loose_flatness() - 7e-6).abs() < 1e-20);
    }
}
