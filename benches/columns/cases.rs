//! The joints that the columns solver is timed on.

use ringsum::pressure::elastic::{
    Annulus, Body, Bolt, Compliance, End, Faces, Fineness, Head, Interface, Layer, Problem,
};

/// Rectangular plates of one size with equal bolts.
#[derive(Clone)]
pub struct Plates {
    pub name: &'static str,
    pub size: [f64; 2],
    pub thickness: [f64; 2],
    pub hole: f64,
    pub bearing: f64,
    pub force: f64,
    pub at: Vec<[f64; 2]>,
    pub bow: f64,
}

pub fn case_i() -> Plates {
    Plates {
        name: "case i",
        size: [0.08, 0.08],
        thickness: [0.005, 0.005],
        hole: 0.00275,
        bearing: 0.00425,
        force: 5000.0,
        at: grid(&[0.01, 0.07], &[0.01, 0.07]),
        bow: 0.0,
    }
}

pub fn case_ii() -> Plates {
    Plates {
        name: "case ii",
        size: [0.12, 0.08],
        thickness: [0.004, 0.01],
        hole: 0.00225,
        bearing: 0.0035,
        force: 3000.0,
        at: grid(&[0.01, 0.06, 0.11], &[0.01, 0.07]),
        bow: 0.0,
    }
}

pub fn sixteen() -> Plates {
    let x = [0.008, 0.0415, 0.075, 0.1085, 0.142];
    let mut at = grid(&x, &[0.008, 0.092]);
    at.extend(grid(&[0.008, 0.142], &[0.029, 0.05, 0.071]));
    Plates {
        name: "16 bolts",
        size: [0.15, 0.1],
        thickness: [0.005, 0.008],
        hole: 0.00225,
        bearing: 0.0035,
        force: 3000.0,
        at,
        bow: 30e-6,
    }
}

fn grid(x: &[f64], y: &[f64]) -> Vec<[f64; 2]> {
    y.iter()
        .flat_map(|y| x.iter().map(move |x| [*x, *y]))
        .collect()
}

/// Calls `with` with the problem.
pub fn posed<R>(plates: &Plates, fineness: Fineness, with: impl FnOnce(&Problem) -> R) -> R {
    let [length, width] = plates.size;
    let cover = move |[x, y]: [f64; 2]| (0.0..=length).contains(&x) && (0.0..=width).contains(&y);
    let bow = plates.bow;
    let gap = move |[x, y]: [f64; 2]| {
        let half = [0.5 * length, 0.5 * width];
        let square = (x - half[0]).powi(2) + (y - half[1]).powi(2);
        let part = square / (half[0] * half[0] + half[1] * half[1]);
        bow * (1.0 - part)
    };
    let body = |thickness: f64| Body {
        layers: vec![Layer {
            cover: &cover,
            thickness,
            youngs_modulus: 70e9,
            poisson: 0.33,
            through: None,
        }],
        main: 0,
        bounds: [[0.0, length], [0.0, width]],
    };
    let seat = Annulus {
        inner: plates.hole,
        outer: plates.bearing,
    };
    let bolts = plates.at.iter().map(|at| Bolt {
        at: *at,
        head: seat,
        force: plates.force,
        hole_radii: vec![plates.hole; 2],
        end: End::Nut(seat),
    });
    with(&Problem {
        bodies: plates.thickness.map(body).to_vec(),
        interfaces: vec![Interface {
            gap: &gap,
            faces: Faces::Frictionless,
            compliance: Compliance::Hard,
        }],
        bolts: bolts.collect(),
        stops: [Vec::new(), Vec::new()],
        head: Head::Uniform,
        fineness,
        most_bytes: 2_000_000_000,
        progress: None,
    })
}
