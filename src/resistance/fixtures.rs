//! Joints that the tests of this module share.

use crate::{
    joint::{ConeRule, ConeShape, Outline, Sink, Source, Zone},
    pressure::{Pair, cone},
    resistance::{Load, Path, Plan, Site, cells::DEFAULT_RINGS},
};

const MODULUS: f64 = 70e9 / (1.0 - 0.33 * 0.33);
pub(super) const WHOLE_FACE: Source = Source {
    zone: Zone::Face,
    isothermal: false,
};

pub(super) fn pair(radii: [f64; 2], rim_radius: f64, thickness: [f64; 2]) -> Pair {
    Pair {
        hole_radius: radii[0],
        bearing_radius: radii[1],
        rim_radius,
        thickness,
        plane_modulus: [MODULUS; 2],
    }
}

pub(super) fn site(at: [f64; 2], pair: &Pair) -> Site {
    Site {
        at,
        hole_radius: [pair.hole_radius; 2],
        cone: cone(pair, ConeRule::Fitted, ConeShape::Fitted),
    }
}

/// The law of the reference joints: 1.25 k m/σ (p/H)^0.95, W/(m² K).
pub(super) fn power_law(pressure: f64) -> f64 {
    let roughness = 2.0_f64.sqrt() * 1.13137e-6;
    let slope = 2.0_f64.sqrt() * 0.1060660;
    1.25 * 167.0 * slope / roughness * (pressure / 1200e6).powf(0.95)
}

pub(super) fn load<'a, H>(conductance: H, forces: &'a [f64], shanks: &'a [f64]) -> Load<'a, H> {
    Load {
        conductance,
        conductivity: [167.0; 2],
        forces,
        shanks,
    }
}

/// The reference round joint: one M6 in two discs of 60 mm.
pub(super) fn round(rings: usize) -> Plan {
    let disc = Outline::Disc { radius: 0.03 };
    Plan {
        outlines: [(disc.clone(), [0.0; 2]), (disc, [0.0; 2])],
        thickness: [5e-3; 2],
        empty: Vec::new(),
        sites: vec![site([0.0; 2], &pair([3.125e-3, 5e-3], 0.03, [5e-3; 2]))],
        source: WHOLE_FACE,
        sink: Sink::IsothermalBack,
        rings,
    }
}

fn heated_in_the_middle(size: [f64; 2], thickness: [f64; 2], sites: Vec<Site>) -> Plan {
    let outline = Outline::Rectangle { size };
    Plan {
        outlines: [(outline.clone(), [0.0; 2]), (outline, [0.0; 2])],
        thickness,
        empty: Vec::new(),
        sites,
        source: Source {
            zone: Zone::Rectangle {
                centre: size.map(|side| 0.5 * side),
                size: [0.04, 0.04],
            },
            isothermal: false,
        },
        sink: Sink::Film(2000.0),
        rings: DEFAULT_RINGS,
    }
}

/// Reference case i: four M5 in the corners of two plates of 80 mm by 80 mm.
pub(super) fn case_i() -> Plan {
    let pair = pair([2.75e-3, 4.25e-3], f64::INFINITY, [5e-3; 2]);
    let places = [[0.01, 0.01], [0.07, 0.01], [0.01, 0.07], [0.07, 0.07]];
    let sites = places.map(|at| site(at, &pair)).to_vec();
    heated_in_the_middle([0.08, 0.08], [5e-3; 2], sites)
}

/// Reference case ii: six M4 along the long edges, 4 mm on 10 mm.
pub(super) fn case_ii() -> Plan {
    let thickness = [4e-3, 10e-3];
    let pair = pair([2.25e-3, 3.5e-3], f64::INFINITY, thickness);
    let places = [0.01, 0.07].map(|y| [0.01, 0.06, 0.11].map(|x| [x, y]));
    let sites = places.concat().iter().map(|at| site(*at, &pair)).collect();
    heated_in_the_middle([0.12, 0.08], thickness, sites)
}

/// A small plate offset on a larger one, bolts near edges and near each other.
pub(super) fn crowded(places: &[[f64; 2]]) -> Plan {
    let thickness = [4e-3, 9e-3];
    let pair = pair([2.25e-3, 4e-3], f64::INFINITY, thickness);
    Plan {
        outlines: [
            (Outline::Rectangle { size: [0.05, 0.04] }, [0.0; 2]),
            (Outline::Disc { radius: 0.05 }, [0.02, 0.025]),
        ],
        thickness,
        empty: Vec::new(),
        sites: places.iter().map(|at| site(*at, &pair)).collect(),
        source: WHOLE_FACE,
        sink: Sink::Film(800.0),
        rings: DEFAULT_RINGS,
    }
}

pub(super) const CROWD: [[f64; 2]; 4] = [
    [0.006, 0.008],
    [0.017, 0.010],
    [0.040, 0.035],
    [0.042, 0.006],
];

/// Fails unless the two answers agree within a relative tolerance.
pub(super) fn assert_same(one: &Path, other: &Path, tolerance: f64) {
    for (a, b) in [
        (one.contact, other.contact),
        (one.source_to_sink, other.source_to_sink),
        (one.perfect_contact, other.perfect_contact),
        (one.node_to_node, other.node_to_node),
        (one.interface_drop, other.interface_drop),
        (one.hottest, other.hottest),
        (one.resistance_lower, other.resistance_lower),
    ] {
        assert!((a / b - 1.0).abs() < tolerance, "{one:?}\n{other:?}");
    }
}

/// A square lattice of M4, heated all over: every bolt is as every other.
pub(super) fn lattice(side: usize, pitch: f64) -> Plan {
    let pair = pair([2.25e-3, 3.5e-3], f64::INFINITY, [5e-3; 2]);
    let middle = |index: usize| (index as f64 + 0.5) * pitch;
    let outline = Outline::Rectangle {
        size: [side as f64 * pitch; 2],
    };
    Plan {
        outlines: [(outline.clone(), [0.0; 2]), (outline, [0.0; 2])],
        thickness: [5e-3; 2],
        empty: Vec::new(),
        sites: (0..side * side)
            .map(|index| site([middle(index % side), middle(index / side)], &pair))
            .collect(),
        source: WHOLE_FACE,
        sink: Sink::Film(500.0),
        rings: DEFAULT_RINGS,
    }
}
