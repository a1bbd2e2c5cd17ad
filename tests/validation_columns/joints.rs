//! Rectangular bolted plates for tests and benches of the columns solver.

use ringsum::pressure::elastic::{
    Annulus, Body, Bolt, Compliance, End, FaceFriction, Failure, Field, Fineness, HeadModel,
    Interface, Layer, Problem, Through, solve,
};

/// Rectangular plates, upper first, each with its own size and corner.
#[derive(Clone)]
pub struct Plates {
    /// Least and greatest x, least and greatest y of each plate.
    pub bounds: Vec<[[f64; 2]; 2]>,
    pub thickness: Vec<f64>,
    pub youngs_modulus: Vec<f64>,
    pub poisson: f64,
    pub hole: f64,
    pub bearing: f64,
    pub forces: Vec<f64>,
    pub at: Vec<[f64; 2]>,
    /// Gap at the middle of the first plate that falls to 0 at its corners; negative the other way.
    pub bow: f64,
    pub head: HeadModel,
    pub faces: FaceFriction,
    pub compliance: Compliance,
    /// Length of a thread in the last plate; none is a nut.
    pub thread: Option<f64>,
    pub through: Option<Through>,
    pub fineness: Fineness,
    pub most_bytes: u64,
}

impl Plates {
    /// Two equal rectangles of reference aluminium with one corner at the origin.
    pub fn pair([length, width]: [f64; 2], thickness: [f64; 2], at: Vec<[f64; 2]>) -> Self {
        Self {
            bounds: vec![[[0.0, length], [0.0, width]]; 2],
            thickness: thickness.to_vec(),
            youngs_modulus: vec![70e9; 2],
            poisson: 0.33,
            hole: 0.00275,
            bearing: 0.00425,
            forces: vec![5000.0; at.len()],
            at,
            bow: 0.0,
            head: HeadModel::Uniform,
            faces: FaceFriction::Frictionless,
            compliance: Compliance::Hard,
            thread: None,
            through: None,
            fineness: Fineness::Fast,
            most_bytes: 1_000_000_000,
        }
    }

    /// Gap of the faces before any force.
    pub fn gap(&self, [x, y]: [f64; 2]) -> f64 {
        let [[x0, x1], [y0, y1]] = self.bounds[0];
        let square = (x - 0.5 * (x0 + x1)).powi(2) + (y - 0.5 * (y0 + y1)).powi(2);
        let corner = 0.25 * ((x1 - x0).powi(2) + (y1 - y0).powi(2));
        let bow = self.bow;
        if bow < 0.0 {
            -bow * square / corner
        } else {
            bow * (1.0 - square / corner)
        }
    }

    /// Calls `with` with the problem.
    pub fn posed<R>(&self, with: impl FnOnce(&Problem) -> R) -> R {
        let covers: Vec<_> = self
            .bounds
            .iter()
            .map(|[[x0, x1], [y0, y1]]| {
                move |[x, y]: [f64; 2]| (x0..=x1).contains(&&x) && (y0..=y1).contains(&&y)
            })
            .collect();
        let body = |(index, cover)| Body {
            layers: vec![Layer {
                cover,
                thickness: self.thickness[index],
                youngs_modulus: self.youngs_modulus[index],
                poisson: self.poisson,
                through: self.through,
                inlay: None,
            }],
            main: 0,
            bounds: self.bounds[index],
        };
        let seat = Annulus {
            inner: self.hole,
            outer: self.bearing,
        };
        let bolts = self.at.iter().zip(&self.forces).map(|(at, force)| Bolt {
            at: *at,
            head: seat,
            force: *force,
            hole_radii: vec![self.hole; self.bounds.len()],
            end: match self.thread {
                None => End::Nut(seat),
                Some(length) => End::Thread {
                    radius: self.hole,
                    length,
                },
            },
        });
        let gap = |point| self.gap(point);
        let interface = Interface {
            gap: &gap,
            faces: self.faces,
            compliance: self.compliance,
        };
        let covers = covers
            .iter()
            .map(|cover| cover as &(dyn Fn([f64; 2]) -> bool + Sync));
        with(&Problem {
            bodies: covers.enumerate().map(body).collect(),
            interfaces: vec![interface; self.bounds.len() - 1],
            bolts: bolts.collect(),
            stops: [Vec::new(), Vec::new()],
            head: self.head,
            fineness: self.fineness,
            most_bytes: self.most_bytes,
            progress: None,
        })
    }

    /// The field, or why there is none.
    pub fn try_field(&self) -> Result<Field, Failure> {
        self.posed(solve)
    }

    /// The field.
    pub fn field(&self) -> Field {
        self.try_field().expect("the joint has a field")
    }
}

/// Four M5 on 80 × 80 × 5 + 5 mm: case i of the reference.
pub fn case_i(fineness: Fineness) -> Plates {
    Plates {
        fineness,
        ..Plates::pair(
            [0.08, 0.08],
            [0.005, 0.005],
            crossings(&[0.01, 0.07], &[0.01, 0.07]),
        )
    }
}

/// Six M4 on 120 × 80 × 4 + 10 mm: case ii of the reference.
pub fn case_ii(fineness: Fineness) -> Plates {
    let at = crossings(&[0.01, 0.06, 0.11], &[0.01, 0.07]);
    Plates {
        hole: 0.00225,
        bearing: 0.0035,
        forces: vec![3000.0; at.len()],
        fineness,
        ..Plates::pair([0.12, 0.08], [0.004, 0.01], at)
    }
}

/// Points on the crossings of lines.
pub fn crossings(x: &[f64], y: &[f64]) -> Vec<[f64; 2]> {
    y.iter()
        .flat_map(|y| x.iter().map(move |x| [*x, *y]))
        .collect()
}
