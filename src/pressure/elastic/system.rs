//! Equations of a clamped stack: layers, loads, and the pairs of faces that may touch.

use std::f64::consts::TAU;

use crate::{
    numerics::columns::{
        Disc, Layer, Mirror, Operator, Plan, Region, Solid, Tie, gradient, lumped, span_loads,
    },
    pressure::elastic::{
        Annulus, Bolt, Compliance, End, FaceFriction, Failure, HeadModel, Layer as Material, Mesh,
        Problem, Stage, resolution,
    },
};

/// Weak springs over all volume, in Young's moduli per squared length of the plan; results do not
/// change to four digits for a tenth or ten times of it.
const GROUND: f64 = 1e-6;
/// The same through the thickness of all bodies but the last. They rest on the last one, whose springs
/// then carry no net force, so that next to nothing of a clamp force goes astray.
const GROUND_ABOVE: f64 = 1e-9;
/// Stiffness of stuck faces along themselves, Pa/m.
const STUCK: f64 = 1e14;
/// Stiffness of a rigid head against the plate over `E/(1 − ν²)` per spacing of the lines.
///
/// Columns just outside a seat hold a little of its area; a harder seat would hold them down as well and
/// so act as a wider one, a softer one as a narrower. What is left of that is an affair of the seat's edge
/// alone, which knows the plane modulus and the spacing but not the joint; so one number serves all plates.
/// Half and twice of it move the gap by 4 to 5 % at the finest grid, and the seat hardens with the grid.
const SEATED: f64 = 2.1;
/// Tension of the membrane that makes a head rigid over Young's modulus times bearing radius.
const MEMBRANE: f64 = 30.0;
/// Points around the wall of a thread.
const WALL_POINTS: usize = 720;

/// Equations, loads and contacts.
pub(super) struct System {
    /// Elasticity and ties.
    pub operator: Operator<Solid>,
    /// Loads of heads, nuts and threads, N.
    pub load: Vec<f64>,
    /// Pairs of faces: first the interfaces, upper first, then rigid heads and nuts.
    pub pairings: Vec<Pairing>,
    /// Unknowns of the faces of the plates themselves at every interface, upper and lower.
    pub plates: Vec<[usize; 2]>,
}

/// Two faces that press on each other where they close.
pub(super) struct Pairing {
    /// Normal displacement of the upper face.
    pub plus: usize,
    /// Normal displacement of the lower face.
    pub minus: usize,
    /// Area of every column, m².
    pub weight: Vec<f64>,
    /// Gap without any displacement, m.
    pub opening: Vec<f64>,
    /// Pressure over closure, Pa/m.
    pub stiffness: f64,
    /// Tie that carries the pressure.
    pub tie: usize,
    /// Ties that carry shear where faces stick.
    pub shear: Option<[usize; 2]>,
}

impl Pairing {
    /// Gap at a column, m.
    pub fn gap(&self, operator: &Operator<Solid>, displacement: &[f64], column: usize) -> f64 {
        self.opening[column] + displacement[operator.place(column, self.plus)]
            - displacement[operator.place(column, self.minus)]
    }
}

impl System {
    /// The equations of a problem on its mesh.
    ///
    /// With a mirror the mesh is the part of it that stands for the whole: nothing moves across the
    /// mirror there.
    pub fn new(problem: &Problem, mesh: &Mesh, mirror: Option<&Mirror>) -> Result<Self, Failure> {
        problem.tell(Stage::Matrices, 0, f64::NAN);
        let mut groups: Vec<usize> = mesh.bodies.iter().map(|body| 3 * body.nodes).collect();
        groups.resize(groups.len() + resolution::loose(problem), 1);
        let mut operator = Operator::new(&mesh.plan, &groups);
        let whole = mirror.map_or(&mesh.plan, Mirror::whole);
        for (group, (body, own)) in problem.bodies.iter().zip(&mesh.bodies).enumerate() {
            let rests = group + 1 == mesh.bodies.len();
            for (material, layer) in body.layers.iter().zip(&own.layers) {
                let mut add = |shares: &[f64], moduli: [f64; 2]| {
                    operator.add_layer(&Layer {
                        shares,
                        group,
                        first_node: layer.first_node,
                        heights: &layer.heights,
                        degree: layer.degree,
                        constants: solid((moduli, material.thickness), whole, rests),
                    });
                };
                let own = [material.youngs_modulus, material.poisson];
                match material.inlay.zip(layer.inlay.as_ref()) {
                    Some((inlay, filled)) => {
                        add(&layer.region.without(filled).shares(), own);
                        add(&filled.shares(), [inlay.youngs_modulus, inlay.poisson]);
                    }
                    None => add(&layer.shares, own),
                }
            }
        }
        let across = mirror.map_or([false; 2], Mirror::across);
        for (axis, _) in across.into_iter().enumerate().filter(|(_, held)| *held) {
            for (group, body) in mesh.bodies.iter().enumerate() {
                let first = operator.unknown(group, axis, 0);
                operator.hold(axis, first..first + body.nodes);
            }
        }
        let mut system = Self {
            load: operator.zeros(),
            operator,
            pairings: Vec::new(),
            plates: Vec::new(),
        };
        for interface in 0..problem.interfaces.len() {
            system.add_interface(problem, mesh, interface)?;
        }
        system.add_seats(problem, mesh)?;
        Ok(system)
    }

    fn add_interface(
        &mut self,
        problem: &Problem,
        mesh: &Mesh,
        interface: usize,
    ) -> Result<(), Failure> {
        let (operator, meeting) = (&mut self.operator, &problem.interfaces[interface]);
        let face = &mesh.faces[interface];
        let [upper, lower] = [interface, interface + 1];
        let top = mesh.bodies[lower].nodes - 1;
        let mut opening = vec![0.0; mesh.plan.columns()];
        for (column, gap) in opening.iter_mut().enumerate() {
            if face.weight[column] > 0.0 || face.open_weight[column] > 0.0 {
                *gap = (meeting.gap)(mesh.plan.place(column));
                if !gap.is_finite() {
                    return Err(Failure::Unsound {
                        what: "the initial gap is not a number everywhere".into(),
                    });
                }
            }
        }
        let slack = || lumped(&vec![0.0; mesh.plan.columns()]);
        let mut tie = |component: usize| {
            operator.add_tie(Tie {
                plus: operator.unknown(upper, component, 0),
                minus: Some(operator.unknown(lower, component, top)),
                stencil: slack(),
            })
        };
        let normal = tie(2);
        let shear = match meeting.faces {
            FaceFriction::Frictionless => None,
            FaceFriction::Stuck => Some([tie(0), tie(1)]),
        };
        self.pairings.push(Pairing {
            plus: operator.unknown(upper, 2, 0),
            minus: operator.unknown(lower, 2, top),
            weight: face.weight.clone(),
            opening,
            stiffness: meeting.compliance.stiffness(),
            tie: normal,
            shear,
        });
        let above = mesh.bodies[upper].main_layer().first_node;
        let below = mesh.bodies[lower].main_layer().last_node();
        self.plates.push([
            operator.unknown(upper, 2, above),
            operator.unknown(lower, 2, below),
        ]);
        Ok(())
    }

    /// Heads on the first body, nuts and threads at the last.
    fn add_seats(&mut self, problem: &Problem, mesh: &Mesh) -> Result<(), Failure> {
        let last = mesh.bodies.len() - 1;
        let top = mesh.bodies[0].main_layer();
        let foot = mesh.bodies[last].main_layer();
        let mut heads = Seats::new(mesh, &top.region, -1.0);
        let mut nuts = Seats::new(mesh, &foot.region, 1.0);
        for bolt in problem.bolts.iter().filter(|bolt| bolt.force > 0.0) {
            heads.add(mesh, (bolt, bolt.head))?;
            match bolt.end {
                End::Nut(seat) => nuts.add(mesh, (bolt, seat))?,
                End::Thread { radius, length } => {
                    self.add_thread(mesh, bolt, [radius, length])?;
                }
            }
        }
        let head_node = self.operator.unknown(0, 2, top.last_node());
        let nut_node = self.operator.unknown(last, 2, foot.first_node);
        match problem.head {
            HeadModel::Uniform => {
                self.add_load(&heads, head_node);
                self.add_load(&nuts, nut_node);
            }
            HeadModel::Rigid => {
                let loose = last + 1;
                let outside =
                    [&problem.bodies[0], &problem.bodies[last]].map(|body| &body.layers[body.main]);
                let head = self.operator.unknown(loose, 0, 0);
                let of = |plate: &Material| Rigidity {
                    tension: MEMBRANE * plate.youngs_modulus * problem.bearing_radius(),
                    plane_modulus: plate.youngs_modulus / (1.0 - plate.poisson.powi(2)),
                    spacing: resolution::finest_spacing(problem),
                };
                self.add_load(&heads, head);
                let rigid = (head, of(outside[0]));
                self.add_rigid((mesh, &heads), [head, head_node], rigid);
                if resolution::loose(problem) == 2 {
                    let nut = self.operator.unknown(loose + 1, 0, 0);
                    self.add_load(&nuts, nut);
                    self.add_rigid((mesh, &nuts), [nut_node, nut], (nut, of(outside[1])));
                }
            }
        }
        Ok(())
    }

    fn add_load(&mut self, seats: &Seats, unknown: usize) {
        for (column, force) in seats.force.iter().enumerate() {
            self.load[self.operator.place(column, unknown)] += force;
        }
    }

    /// A seat that stays flat: a membrane so tight that it does not sag inside a ring, pressed on the
    /// plate by the load it carries.
    fn add_rigid(
        &mut self,
        (mesh, seats): (&Mesh, &Seats),
        [plus, minus]: [usize; 2],
        (membrane, rigidity): (usize, Rigidity),
    ) {
        let stencil = gradient(&mesh.plan, &seats.region.shares());
        self.operator.add_tie(Tie {
            plus: membrane,
            minus: None,
            stencil: stencil
                .into_iter()
                .map(|row| row.map(|value| rigidity.tension * value))
                .collect(),
        });
        let columns = mesh.plan.columns();
        let weight = seats.region.weights(&mesh.plan).into_iter();
        let finest = rigidity.spacing;
        let tie = self.operator.add_tie(Tie {
            plus,
            minus: Some(minus),
            stencil: lumped(&vec![0.0; columns]),
        });
        self.pairings.push(Pairing {
            plus,
            minus,
            // Every column yields by its own spacing: bolts of one joint have seats of several widths.
            weight: weight
                .zip(spacings(&mesh.plan))
                .map(|(area, own)| area * finest / own)
                .collect(),
            opening: vec![0.0; columns],
            stiffness: SEATED * rigidity.plane_modulus / finest,
            tie,
            shear: None,
        });
    }

    /// Shear of a thread on the wall of its hole, upwards, evenly over its length from the faying face.
    fn add_thread(
        &mut self,
        mesh: &Mesh,
        bolt: &Bolt,
        [radius, length]: [f64; 2],
    ) -> Result<(), Failure> {
        let last = mesh.bodies.len() - 1;
        let ring = ring_weights(&mesh.plan, bolt.at, radius);
        let mut parts = Vec::new();
        let mut below_face = 0.0;
        for layer in &mesh.bodies[last].layers {
            let thickness: f64 = layer.heights.iter().sum();
            let span = [thickness - (length - below_face), thickness];
            let filled = layer.region.weights(&mesh.plan);
            for (node, share) in span_loads(&layer.heights, layer.degree, span)
                .into_iter()
                .enumerate()
            {
                let unknown = self.operator.unknown(last, 2, layer.first_node + node);
                for (column, part) in &ring {
                    if filled[*column] > 0.0 && share != 0.0 {
                        parts.push((self.operator.place(*column, unknown), part * share));
                    }
                }
            }
            below_face += thickness;
        }
        let whole: f64 = parts.iter().map(|(_, part)| part).sum();
        if whole <= 0.0 || whole.is_nan() {
            return Err(Failure::Unsound {
                what: "a thread lies outside its body".into(),
            });
        }
        for (place, part) in parts {
            self.load[place] += bolt.force * part / whole;
        }
        Ok(())
    }
}

/// How rigid a seat is.
#[derive(Clone, Copy)]
struct Rigidity {
    /// Tension of its membrane, N/m.
    tension: f64,
    /// `E/(1 − ν²)` of the plate under it, Pa.
    plane_modulus: f64,
    /// Spacing of the lines where they are finest, m.
    spacing: f64,
}

/// Rings that press on one face.
struct Seats<'a> {
    face: &'a Region,
    region: Region,
    force: Vec<f64>,
    sign: f64,
}

impl<'a> Seats<'a> {
    fn new(mesh: &Mesh, face: &'a Region, sign: f64) -> Self {
        Self {
            face,
            region: Region::empty(&mesh.plan),
            force: vec![0.0; mesh.plan.columns()],
            sign,
        }
    }

    /// Adds the ring of a bolt, cut where the face ends, carrying exactly the bolt's force.
    fn add(&mut self, mesh: &Mesh, (bolt, seat): (&Bolt, Annulus)) -> Result<(), Failure> {
        let disc = |radius: f64| {
            let centre = bolt.at;
            Region::discs(&mesh.plan, &[Disc { centre, radius }])
        };
        let ring = disc(seat.outer).without(&disc(seat.inner)).and(self.face);
        let weights = ring.weights(&mesh.plan);
        let area: f64 = weights.iter().sum();
        if area <= 0.0 {
            return Err(Failure::Unsound {
                what: "a head or nut has no plate under it".into(),
            });
        }
        for (force, weight) in self.force.iter_mut().zip(weights) {
            *force += self.sign * bolt.force * weight / area;
        }
        self.region = self.region.or(&ring);
        Ok(())
    }
}

/// Bilinear weights of a circle, summing to the share of it that lies on the plan.
fn ring_weights(plan: &Plan, [x, y]: [f64; 2], radius: f64) -> Vec<(usize, f64)> {
    let part = (WALL_POINTS as f64).recip();
    (0..WALL_POINTS)
        .filter_map(|point| {
            let angle = TAU * (point as f64 + 0.5) * part;
            plan.around([x + radius * angle.cos(), y + radius * angle.sin()])
        })
        .flatten()
        .map(|(column, weight)| (column, weight * part))
        .collect()
}

/// Spacing of the lines about every column, the geometric mean of both directions, m.
fn spacings(plan: &Plan) -> Vec<f64> {
    let along = |lines: &[f64]| -> Vec<f64> {
        let last = lines.len() - 1;
        (0..=last)
            .map(|line| {
                let (before, after) = (line.saturating_sub(1), (line + 1).min(last));
                (lines[after] - lines[before]) / (after - before) as f64
            })
            .collect()
    };
    let (x, y) = (along(&plan.x), along(&plan.y));
    x.iter()
        .flat_map(|x| y.iter().map(move |y| (x * y).sqrt()))
        .collect()
}

fn solid(([modulus, ratio], thickness): ([f64; 2], f64), plan: &Plan, rests: bool) -> Solid {
    let span = |lines: &[f64]| lines[lines.len() - 1] - lines[0];
    let size = span(&plan.x).powi(2) + span(&plan.y).powi(2);
    let through = if rests { GROUND } else { GROUND_ABOVE };
    Solid {
        first: modulus * ratio / ((1.0 + ratio) * (1.0 - 2.0 * ratio)),
        shear: 0.5 * modulus / (1.0 + ratio),
        ground: [GROUND, through].map(|part| part * modulus / (size * thickness)),
    }
}

/// Stiffness of a pair's shear ties.
pub(super) fn stuck(compliance: Compliance) -> f64 {
    STUCK.min(compliance.stiffness())
}
