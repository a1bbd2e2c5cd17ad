//! A joint prepared for the chain, and one run through it.

use crate::{
    conductance::{Curve, Local},
    diagnostic::Caution,
    estimate::{
        Band, BoltResult, Failure, PressureResult, Realisation, Strength,
        forces::{self, Group},
        surfaces,
    },
    joint::{Bounds, Engagement, Fastener, Joint, MeasuredKind, Medium, Outline, Plate},
    pressure::{self, Cone, Pair},
    resistance::{
        Calibration, Cells, Load, Path, Plan, PlanGrid, Site, cells, cells::DEFAULT_RINGS,
        plan_grid,
    },
};

/// What the joint may cost beyond or below the closed-form field and the networks, as factors on
/// what it adds; one bolt in the middle of two discs, in vacuum.
///
/// From 43 reference solutions: the ring network errs by 0 to +10 % (Bi ≤ 1, worst +22 % at
/// Bi 10), a rigid head or stuck faces lower the resistance by 1 to 4 %, the closed-form field
/// moves it by ±1.4 %.
const ROUND_FORM: [f64; 2] = [0.85, 1.03];
/// The same for the plan grid of several bolts in vacuum.
///
/// On two joints solved in three dimensions it read what the joint adds 7 and 11 % high; a tapped
/// far plate raised it by 5 %, rigid heads lowered it by 3 % (judgement on these).
const PLAN_FORM: [f64; 2] = [0.83, 1.05];
/// Upper factor for bare faces in a gas: the cone knows no gap, and the true joint added 1.4 and
/// 1.8 times as much on the same two joints.
const OPEN_GAP: f64 = 1.8;
/// Added to the upper factor where the far plate holds the thread: the cone stands for a head on
/// both faces, and a tapped plate raised the resistance of the reference joints by 4 and 5 %.
const TAPPED: f64 = 0.05;
/// Upper factor for a filled joint, whose layer thickens where the plates part (judgement).
const OPEN_LAYER: f64 = 1.2;
/// Fineness of the plan grid: within 1.5 % of a grid three times as fine on the six-bolt demo.
const FINENESS: f64 = 0.6;
/// Relative difference of conductivity below which two cases share a calibration.
const ALIKE: f64 = 0.01;
/// Length of bolt in the head and in the nut through which heat enters and leaves, in diameters.
///
/// Source: the substitution lengths of VDI 2230 for stiffness, 0.5 d and 0.4 d, from memory; heat
/// takes the same shape of path (judgement).
const SHANK_ENDS: f64 = 0.9;

/// A joint with all that no draw changes worked out.
#[derive(Clone, Debug)]
pub struct Chain<'a> {
    joint: &'a Joint,
    groups: Vec<Group>,
    /// Group of each bolt.
    group_of: Vec<usize>,
    pairs: Vec<Pair>,
    cones: Vec<Cone>,
    cells: Cells,
    /// The plates whole, where bolts share them; none for one bolt in the middle of two discs.
    grid: Option<PlanGrid>,
    /// What the plan grid makes of the cells' answer, for each case.
    calibrations: Vec<Calibration>,
    /// Model form, as a factor on what the joint adds.
    form: Bounds,
}

/// One run through the chain.
#[derive(Clone, Debug)]
pub struct State {
    /// What heat met.
    pub conditions: Conditions,
    /// Resistances, model form applied.
    pub path: Path,
}

/// What heat meets in a joint: forces, faces, conductivities.
#[derive(Clone, Debug)]
pub struct Conditions {
    /// Clamp force of each bolt in service, N.
    pub forces: Vec<f64>,
    /// The faces: local conductance against pressure.
    pub faces: Faces,
    /// Conductivity of both plates, W/(m K).
    pub conductivity: [f64; 2],
    /// Conductance of each shank, W/K.
    pub shanks: Vec<f64>,
}

impl Conditions {
    /// The same as the networks take it.
    pub fn load(&self) -> Load<'_, impl Fn(f64) -> f64> {
        Load {
            conductance: |pressure: f64| self.faces.conductance(pressure),
            conductivity: self.conductivity,
            forces: &self.forces,
            shanks: &self.shanks,
        }
    }
}

/// The faces of a joint at one realisation.
#[derive(Clone, Debug)]
pub struct Faces {
    /// The laws.
    pub local: Local,
    /// Measured W/K per bolt as conductance over pressure, W/(m² K Pa), where a force law is given.
    pub per_pascal: Option<f64>,
}

impl Faces {
    /// Local conductance at a pressure, W/(m² K); 0 Pa is the open gap.
    pub fn conductance(&self, pressure: f64) -> f64 {
        match self.per_pascal {
            Some(factor) => factor * pressure + self.local.total(0.0),
            None => self.local.total(pressure),
        }
    }

    /// The same for many points up to a pressure, from a table of the law where it has no corner.
    pub fn over_many_points(&self, highest_pressure: f64) -> impl Fn(f64) -> f64 {
        let curve = match self.per_pascal {
            Some(_) => None,
            None => Curve::up_to(&self.local, highest_pressure),
        };
        move |pressure| match &curve {
            Some(curve) => curve.total(pressure),
            None => self.conductance(pressure),
        }
    }
}

impl<'a> Chain<'a> {
    /// Prepares a joint: resilience, pressure cones, cells.
    pub fn new(joint: &'a Joint) -> Result<Self, Failure> {
        let groups = joint
            .fasteners
            .iter()
            .map(|fastener| Group::new(joint, fastener))
            .collect::<Result<Vec<Group>, Failure>>()?;
        let group_of: Vec<usize> = joint
            .fasteners
            .iter()
            .enumerate()
            .flat_map(|(index, fastener)| fastener.places.iter().map(move |_| index))
            .collect();
        let pairs: Vec<Pair> = joint
            .bolts()
            .map(|(fastener, place)| pair(joint, fastener, place))
            .collect();
        let cones: Vec<Cone> = pairs
            .iter()
            .map(|pair| pressure::cone(pair, joint.contact.cone, joint.contact.shape))
            .collect();
        let sites = joint
            .bolts()
            .zip(&cones)
            .map(|((fastener, at), cone)| Site {
                at,
                hole_radius: fastener.hole_radius,
                cone: *cone,
            })
            .collect();
        let plates = [joint.warm(), joint.cold()];
        let cells = cells(&Plan {
            outlines: plates.map(|plate| (plate.outline, plate.origin)),
            thickness: plates.map(|plate| plate.thickness),
            sites,
            source: joint.source,
            sink: joint.sink,
            rings: DEFAULT_RINGS,
        });
        let mut chain = Self {
            joint,
            groups,
            group_of,
            pairs,
            cones,
            grid: (!cells.is_round()).then(|| plan_grid(&cells, FINENESS)),
            cells,
            calibrations: Vec::new(),
            form: Bounds::exact(1.0),
        };
        chain.calibrate()?;
        chain.form = chain.form_bounds()?;
        Ok(chain)
    }

    /// Holds the cells against the plan grid at the nominal inputs of each case.
    ///
    /// A case whose plates conduct as those of an earlier one takes its calibration: what is left
    /// between them, force and faces, the cells follow by themselves.
    fn calibrate(&mut self) -> Result<(), Failure> {
        let Some(grid) = &self.grid else {
            return Ok(());
        };
        let mut known: Vec<([f64; 2], Calibration)> = Vec::new();
        for case in 0..self.joint.service.cases.len() {
            let nominal = self.conditions(case, &Realisation::default())?;
            let alike = known.iter().find(|(conductivity, _)| {
                conductivity
                    .iter()
                    .zip(nominal.conductivity)
                    .all(|(one, other)| (one / other - 1.0).abs() < ALIKE)
            });
            let calibration = if let Some((_, calibration)) = alike {
                *calibration
            } else {
                let load = nominal.load();
                Calibration::between(&self.cells.solve(&load), &grid.solve(&load))
            };
            known.push((nominal.conductivity, calibration));
        }
        self.calibrations = known
            .into_iter()
            .map(|(_, calibration)| calibration)
            .collect();
        Ok(())
    }

    /// The joint.
    pub fn joint(&self) -> &'a Joint {
        self.joint
    }

    /// The cells of the bolts.
    pub fn cells(&self) -> &Cells {
        &self.cells
    }

    /// Runs one case through the chain at one realisation.
    pub fn state(&self, case: usize, at: &Realisation) -> Result<State, Failure> {
        let conditions = self.conditions(case, at)?;
        let solved = self.cells.solve(&conditions.load());
        let path = match self.calibrations.get(case) {
            Some(calibration) => calibration.applied(solved),
            None => solved,
        };
        let path = with_form(path, self.form.at(at.field));
        self.check(case, &path)?;
        Ok(State { conditions, path })
    }

    /// Forces, faces and conductivities of one case at one realisation: all that heat meets.
    fn conditions(&self, case: usize, at: &Realisation) -> Result<Conditions, Failure> {
        let joint = self.joint;
        let by_group: Vec<f64> = joint
            .fasteners
            .iter()
            .zip(&self.groups)
            .map(|(fastener, group)| group.service_force(joint, fastener, (case, at)))
            .collect();
        let forces: Vec<f64> = self.group_of.iter().map(|group| by_group[*group]).collect();
        let temperature = joint.service.cases[case].temperature;
        let interface = surfaces::interface(joint, case, at)?;
        let per_pascal = self
            .force_law(&forces, temperature)
            .map(|law| law * interface.solid_factor);
        Ok(Conditions {
            forces,
            faces: Faces {
                local: interface.prepare(),
                per_pascal,
            },
            conductivity: [
                surfaces::conductivity(joint.warm(), temperature, at.conductivity[0])?,
                surfaces::conductivity(joint.cold(), temperature, at.conductivity[1])?,
            ],
            shanks: self.shanks(temperature)?,
        })
    }

    /// Error of the discretisation at the nominal state of the first case, relative to source to
    /// sink.
    ///
    /// All against half of the lines or rings; both networks are of second order in the spacing, so
    /// a third of the difference is left (six-bolt demo: 1.5 % against 1.3 % to a grid three times
    /// as fine).
    pub fn discretisation_error(&self, state: &State) -> f64 {
        let load = state.conditions.load();
        if self.grid.is_none() {
            return self.cells.ring_error(&load) / 3.0;
        }
        let coarse = plan_grid(&self.cells, 0.5 * FINENESS).source_to_sink(&load);
        (coarse / state.path.source_to_sink - 1.0).abs() / 3.0
    }

    /// Measured W/K per bolt as a local conductance over pressure, W/(m² K Pa).
    ///
    /// ```text
    /// h = p Σ G(F)/Σ F,   G = G₀ (F/F₀)ⁿ (T/T₀)ᵐ   so that ∫ h dA = Σ G, since ∫ p dA = Σ F
    /// ```
    fn force_law(&self, forces: &[f64], temperature: f64) -> Option<f64> {
        let MeasuredKind::ForceLaw {
            conductance,
            force,
            force_exponent,
            temperature: reference,
            temperature_exponent,
        } = self.joint.measured.as_ref()?.kind
        else {
            return None;
        };
        let warmth = (temperature / reference).powf(temperature_exponent);
        let whole: f64 = forces
            .iter()
            .map(|each| conductance * (each / force).powf(force_exponent) * warmth)
            .sum();
        let carried: f64 = forces.iter().sum();
        Some(if carried > 0.0 { whole / carried } else { 0.0 })
    }

    /// Conductance of each bolt's shank from head to nut, W/K.
    ///
    /// ```text
    /// G = k A_s/(l_K + 0.9 d)
    /// ```
    ///
    /// The contacts under head and nut conduct far better than the shank and are left out.
    fn shanks(&self, temperature: f64) -> Result<Vec<f64>, Failure> {
        let by_group = self
            .joint
            .fasteners
            .iter()
            .zip(&self.groups)
            .map(|(fastener, group)| {
                if !fastener.shank_path {
                    return Ok(0.0);
                }
                let conductivity = fastener
                    .grade
                    .conductivity_at(temperature)
                    .map_err(|fault| Failure::Cold(fault.to_string()))?;
                let thread = &fastener.thread;
                let length = group.stack.grip + SHANK_ENDS * thread.diameter;
                Ok(conductivity * thread.stress_area / length)
            })
            .collect::<Result<Vec<f64>, Failure>>()?;
        Ok(self.group_of.iter().map(|group| by_group[*group]).collect())
    }

    /// Bounds of the model form: of the network, and of what the cone does not know.
    fn form_bounds(&self) -> Result<Bounds, Failure> {
        let [low, mut high] = if self.grid.is_none() {
            ROUND_FORM
        } else {
            PLAN_FORM
        };
        let tapped = |group: &Fastener| !matches!(group.engagement, Engagement::Nut);
        if self.joint.fasteners.iter().any(tapped) {
            high += TAPPED;
        }
        high = if self.joint.filler.is_some() {
            high.max(OPEN_LAYER)
        } else {
            high + (OPEN_GAP - high) * self.gas_share()?
        };
        Ok(Bounds {
            low,
            nominal: 1.0,
            high,
        })
    }

    /// Share of what the gas takes off the joint's resistance, by the cells: 0 in vacuum, near 1
    /// where the gas carries nearly all.
    fn gas_share(&self) -> Result<f64, Failure> {
        if matches!(self.joint.service.medium, Medium::Vacuum) {
            return Ok(0.0);
        }
        let mut conditions = self.conditions(0, &Realisation::default())?;
        let filled = self.cells.solve(&conditions.load()).added_by_joint;
        let mut interface = conditions.faces.local.interface().clone();
        interface.gas = None;
        conditions.faces.local = interface.prepare();
        let empty = self.cells.solve(&conditions.load()).added_by_joint;
        let share = 1.0 - filled / empty;
        Ok(if share.is_finite() {
            share.clamp(0.0, 1.0)
        } else {
            1.0
        })
    }

    fn check(&self, case: usize, path: &Path) -> Result<(), Failure> {
        let readings = [
            ("contact", path.contact),
            ("perfect contact", path.perfect_contact),
        ];
        for (reading, value) in readings {
            if !value.is_finite() || value < 0.0 {
                return Err(Failure::NotFinite {
                    case: self.joint.service.cases[case].name,
                    reading: format!("{reading} = {value}"),
                });
            }
        }
        Ok(())
    }

    /// Every bolt of a case, at the nominal state.
    pub fn bolts(&self, case: usize, state: &State) -> Vec<BoltResult> {
        self.joint
            .bolts()
            .enumerate()
            .map(|(bolt, (fastener, at))| {
                let group = &self.groups[self.group_of[bolt]];
                let strength = group.strength(fastener);
                BoltResult {
                    at,
                    force: forces::assembly_band(fastener),
                    force_in_service: group.service_band(self.joint, fastener, case),
                    strength_use: strength.equivalent,
                    largest_torque: strength.largest_torque.map(|(torque, _)| torque),
                    contact_radius: self.cones[bolt].contact_radius,
                    contact_conductance: state.path.contact_per_bolt[bolt],
                }
            })
            .collect()
    }

    /// The pressure field of a state.
    pub fn pressure(&self, state: &State) -> PressureResult {
        PressureResult {
            peak: self.cells.peak_pressure(&state.conditions.forces),
            contact_area: self.cells.contact_area(),
            radius_95: self.cells.radius_holding(0.95, &state.conditions.forces),
            force: self.cells.force_carried(&state.conditions.forces),
            gap_max: None,
            gap_mean: None,
        }
    }

    /// Area of the faying faces, m².
    pub fn footprint(&self) -> f64 {
        self.cells.interface_area
    }

    /// Largest torque of a group, N m, and the limit that ends it.
    pub fn largest_torque(&self, group: usize) -> Option<(f64, &'static str)> {
        self.strength(group).largest_torque
    }

    /// What the bolts of a group bear.
    pub fn strength(&self, group: usize) -> Strength {
        self.groups[group].strength(&self.joint.fasteners[group])
    }

    /// Force at assembly of a group.
    pub fn force(&self, group: usize) -> Band {
        forces::assembly_band(&self.joint.fasteners[group])
    }

    /// Fastener groups with their preparation.
    pub(super) fn groups(&self) -> impl Iterator<Item = (&Fastener, &Group)> {
        self.joint.fasteners.iter().zip(&self.groups)
    }

    /// Cautions of the closed-form field that do not depend on the force.
    pub(super) fn field_cautions(&self) -> Vec<Caution> {
        let mut found: Vec<Caution> = Vec::new();
        for caution in self.pairs.iter().filter_map(Pair::caution) {
            if !found.contains(&caution) {
                found.push(caution);
            }
        }
        found
    }

    /// The cones of the bolts.
    pub fn cones(&self) -> &[Cone] {
        &self.cones
    }
}

/// The path with the model form applied to what the joint adds.
fn with_form(path: Path, form: f64) -> Path {
    let added = path.added_by_joint * form;
    let moved = added - path.added_by_joint;
    Path {
        added_by_joint: added,
        source_to_sink: path.source_to_sink + moved,
        hottest: path.hottest + moved,
        interface_drop: path.interface_drop * form,
        node_to_node: path.node_to_node + moved,
        ..path
    }
}

/// Two plates and a bolt as the closed form sees them.
///
/// Where head and nut press on different annuli the smaller counts: it makes the contact smaller.
fn pair(joint: &Joint, fastener: &Fastener, place: [f64; 2]) -> Pair {
    let plates = [joint.warm(), joint.cold()];
    let [hole_1, hole_2] = fastener.hole_radius;
    let head = fastener.head_seat.outer_radius;
    let bearing_radius = match (fastener.engagement, fastener.nut_seat) {
        (Engagement::Nut, Some(nut)) => head.min(nut.outer_radius),
        _ => head,
    };
    Pair {
        hole_radius: hole_1.max(hole_2),
        bearing_radius,
        rim_radius: plates
            .map(|plate| rim(plate, place))
            .into_iter()
            .fold(f64::INFINITY, f64::min),
        thickness: plates.map(|plate| plate.thickness),
        plane_modulus: plates.map(|plate| {
            let nu = plate.material.poisson.value;
            plate.material.youngs_modulus.value / (1.0 - nu * nu)
        }),
    }
}

/// Radius of the rim of a round plate about a bolt in its centre, m; elsewhere the plate is wide.
fn rim(plate: &Plate, place: [f64; 2]) -> f64 {
    match plate.outline {
        Outline::Disc { radius }
            if (place[0] - plate.origin[0]).hypot(place[1] - plate.origin[1]) < 1e-6 * radius =>
        {
            radius
        }
        _ => f64::INFINITY,
    }
}
