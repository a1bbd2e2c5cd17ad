//! One stack with its terminals and conductivities, ready for any local conductance.

use std::sync::Arc;

use crate::resistance::{
    Failure,
    columns::{
        Conductivity, Health, Heat, Stack, Terminals,
        equations::{Arrangement, Equations, Family, Reduced, TOLERANCE},
        readings::{Reader, blocked},
        terminals::Ends,
    },
};

/// A stack with its terminals put on its columns: integrals over zones and rings, which neither
/// conductivities nor faces nor the conductance of bolts move.
#[derive(Clone, Debug)]
pub struct Placed {
    stack: Arc<Stack>,
    terminals: Terminals,
    ends: Arc<Ends>,
}

impl Placed {
    /// Works out the integrals.
    pub fn new(stack: &Arc<Stack>, terminals: &Terminals) -> Result<Self, Failure> {
        Ok(Self {
            ends: Arc::new(Ends::new(stack, terminals)?),
            stack: stack.clone(),
            terminals: terminals.clone(),
        })
    }

    /// The same places for terminals that differ in the conductance of bolts alone; none where they differ
    /// otherwise.
    ///
    /// Checked: `terminals_on_their_columns_serve_other_bolts_and_no_other_zones`.
    pub fn under(&self, terminals: &Terminals) -> Option<Self> {
        let own = &self.terminals;
        let same = own.source == terminals.source
            && own.sinks == terminals.sinks
            && own.bolts.len() == terminals.bolts.len()
            && own.bolts.iter().zip(&terminals.bolts).all(|(one, other)| {
                let strength = other.strength;
                super::Bolt { strength, ..*one } == *other
            });
        same.then(|| Self {
            stack: self.stack.clone(),
            terminals: terminals.clone(),
            ends: self.ends.clone(),
        })
    }
}

/// Conduction in a stack; each solution starts from the one before.
pub struct Conduction {
    placed: Placed,
    conductivity: Vec<Conductivity>,
    equations: Equations,
    reduced: Option<Reduced>,
    /// Residual asked for, over the load; readings are off by far less.
    pub tolerance: f64,
}

/// Perfect contact: touching faces share their temperatures. No force and no face moves it.
#[derive(Clone, Debug, PartialEq)]
pub struct Perfect {
    conductivity: Vec<Conductivity>,
    strengths: Vec<f64>,
    /// Mean of the heated zones to the mean sink surface, K/W.
    pub source_to_sink: f64,
    /// How it was come by.
    pub health: Health,
}

impl Perfect {
    /// Solves the stack as if its touching faces were one.
    ///
    /// Checked: `perfect_contact_is_the_limit_of_good_contact`.
    pub fn new(
        stack: &Stack,
        terminals: &Terminals,
        conductivity: &[Conductivity],
    ) -> Result<Self, Failure> {
        check(stack, terminals, conductivity)?;
        let ends = Ends::new(stack, terminals)?;
        Self::of(stack, &ends, (terminals, conductivity))
    }

    /// The same where the terminals are on their columns.
    pub fn placed(placed: &Placed, conductivity: &[Conductivity]) -> Result<Self, Failure> {
        let Placed {
            stack,
            terminals,
            ends,
        } = placed;
        check(stack, terminals, conductivity)?;
        Self::of(stack, ends, (terminals, conductivity))
    }

    fn of(
        stack: &Stack,
        ends: &Ends,
        (terminals, conductivity): (&Terminals, &[Conductivity]),
    ) -> Result<Self, Failure> {
        let mut equations =
            Equations::new(stack, ends, (terminals, conductivity), Arrangement::Merged);
        let health = equations.solve()?;
        let rise = equations.source_mean() - equations.sink_mean();
        Ok(Self {
            conductivity: conductivity.to_vec(),
            strengths: terminals.bolts.iter().map(|bolt| bolt.strength).collect(),
            source_to_sink: rise / equations.heat(),
            health,
        })
    }

    /// Stands where nobody asks for perfect contact: not a number.
    pub fn unknown() -> Self {
        Self {
            conductivity: Vec::new(),
            strengths: Vec::new(),
            source_to_sink: f64::NAN,
            health: Health {
                iterations: 0,
                residual: f64::NAN,
                balance: f64::NAN,
                unknowns: 0,
            },
        }
    }

    /// Whether this is the perfect contact of such bodies and bolts in the same stack.
    pub fn serves(&self, terminals: &Terminals, conductivity: &[Conductivity]) -> bool {
        let near = |a: f64, b: f64| (a - b).abs() <= 1e-12 * a.abs();
        self.conductivity.len() == conductivity.len()
            && self.strengths.len() == terminals.bolts.len()
            && self.conductivity.iter().zip(conductivity).all(|(a, b)| {
                near(a.through, b.through) && (0..2).all(|k| near(a.along[k], b.along[k]))
            })
            && self
                .strengths
                .iter()
                .zip(&terminals.bolts)
                .all(|(a, bolt)| near(*a, bolt.strength))
    }
}

impl Conduction {
    /// Sets up the equations; conductivities in the order of the bodies.
    pub fn new(
        stack: &Arc<Stack>,
        terminals: &Terminals,
        conductivity: &[Conductivity],
    ) -> Result<Self, Failure> {
        check(stack, terminals, conductivity)?;
        let placed = Placed::new(stack, terminals)?;
        Ok(Self::of(&placed, conductivity))
    }

    /// The same where the terminals are on their columns.
    pub fn placed(placed: &Placed, conductivity: &[Conductivity]) -> Result<Self, Failure> {
        check(&placed.stack, &placed.terminals, conductivity)?;
        Ok(Self::of(placed, conductivity))
    }

    fn of(placed: &Placed, conductivity: &[Conductivity]) -> Self {
        let given = (&placed.terminals, conductivity);
        let equations = Equations::new(&placed.stack, &placed.ends, given, Arrangement::Apart);
        Self {
            placed: placed.clone(),
            conductivity: conductivity.to_vec(),
            equations,
            reduced: None,
            tolerance: TOLERANCE,
        }
    }

    /// Heat under local conductances, W/(m² K): one for every column of every part of an interface.
    ///
    /// ```text
    /// Σ_bodies ∫ k ∇T · ∇v + Σ_i h_i w_i (T_upper − T_lower)_i (v_upper − v_lower)_i
    ///     + Σ_bolts G (T̄_head − T̄_seat)(v̄_head − v̄_seat) + sinks = source
    /// ```
    ///
    /// | symbol | quantity | SI unit |
    /// |---|---|---|
    /// | `k` | conductivity of a body | W/(m K) |
    /// | `h_i` | local conductance at a column | W/(m² K) |
    /// | `w_i` | area of the faces at a column | m² |
    /// | `G` | strength of a bolt | W/K |
    ///
    /// Valid: steady, conductivities constant, no heat through the sides but where a terminal says
    /// so. Fails where source and sink differ by more than 1e-6.
    /// Source: the method of columns, this project; compared with its three-dimensional reference.
    /// Checked: `layout_cases_are_met_with_the_reference_fields`, `manufactured_heat_converges`.
    pub fn solve(&mut self, conductance: &[Vec<Vec<f64>>]) -> Result<Heat, Failure> {
        let conductances = self.conductances(conductance)?;
        if blocked(&self.placed.terminals, &self.placed.ends, &conductances) {
            return Ok(self.reader(&conductances).blocked());
        }
        self.equations.join(&conductances)?;
        self.equations.tolerance = self.tolerance;
        let health = self.equations.solve()?;
        self.read(&conductances, health)
    }

    /// Heat under local conductances as the best sum of the temperatures of a family: the one that
    /// leaves least energy of the error.
    ///
    /// ```text
    /// T = Σ a_m T_m,   Σ_n (T_mᵀ A T_n) a_n = T_mᵀ f
    /// ```
    ///
    /// `A` and `f` are those of [`Conduction::solve`]. The resistance is off by the square of what the
    /// temperatures are off by; how much that is the caller finds at states that are solved.
    /// Valid: between the states of the family. Source: the method of Ritz on a reduced basis.
    /// Checked: `states_between_solved_ones_are_sums_of_these`.
    pub fn combined(
        &mut self,
        family: &Family,
        conductance: &[Vec<Vec<f64>>],
    ) -> Result<Heat, Failure> {
        let conductances = self.conductances(conductance)?;
        if blocked(&self.placed.terminals, &self.placed.ends, &conductances) {
            return Ok(self.reader(&conductances).blocked());
        }
        if !family.fits(self.equations.rise.len()) {
            return Err(Failure::Misfit {
                what: "a family needs states of this stack",
            });
        }
        let known = self.reduced.take().filter(|known| known.serves(family));
        let reduced = known.unwrap_or_else(|| self.equations.reduced(family));
        let health = self.equations.combine(&reduced, &conductances);
        self.reduced = Some(reduced);
        self.read(&conductances, health?)
    }

    /// Temperatures of the last solution, for a [`Family`].
    pub fn state(&self) -> &[f64] {
        &self.equations.rise
    }

    fn read(&self, conductances: &[Vec<Vec<f64>>], health: Health) -> Result<Heat, Failure> {
        let heat = self.reader(conductances).heat(&self.equations, health);
        for (reading, value) in [
            ("source to sink", heat.source_to_sink),
            ("hottest", heat.hottest.rise),
            ("node to node", heat.node_to_node),
        ] {
            if !value.is_finite() {
                return Err(Failure::NotFinite {
                    network: "heat through the columns",
                    reading,
                    value,
                });
            }
        }
        Ok(heat)
    }

    /// Conductivities of the bodies.
    pub fn conductivity(&self) -> &[Conductivity] {
        &self.conductivity
    }

    fn reader<'a>(&'a self, conductances: &'a [Vec<Vec<f64>>]) -> Reader<'a> {
        Reader {
            stack: &self.placed.stack,
            terminals: &self.placed.terminals,
            conductivity: &self.conductivity,
            ends: &self.placed.ends,
            conductances,
        }
    }

    /// Local conductance times area, W/K; refuses what is no conductance.
    fn conductances(&self, conductance: &[Vec<Vec<f64>>]) -> Result<Vec<Vec<Vec<f64>>>, Failure> {
        let stack = &self.placed.stack;
        let faces = &stack.faces;
        let columns = stack.plan.columns();
        let fits = conductance.len() == faces.len()
            && conductance.iter().zip(faces).all(|(values, parts)| {
                values.len() == parts.len() && values.iter().all(|part| part.len() == columns)
            });
        if !fits {
            return Err(Failure::Misfit {
                what: "local conductance needs one value for every column of every part",
            });
        }
        let mut all = Vec::new();
        for (values, parts) in conductance.iter().zip(faces) {
            let mut own = Vec::new();
            for (values, part) in values.iter().zip(parts) {
                let mut products = Vec::with_capacity(columns);
                for (value, weight) in values.iter().zip(&part.weights) {
                    // Where no area belongs to a column its conductance does not matter.
                    if *weight > 0.0 && !(value.is_finite() && *value >= 0.0) {
                        return Err(Failure::NotFinite {
                            network: "heat through the columns",
                            reading: "local conductance",
                            value: *value,
                        });
                    }
                    products.push(if *weight > 0.0 { value * weight } else { 0.0 });
                }
                own.push(products);
            }
            all.push(own);
        }
        Ok(all)
    }
}

/// Real and perfect contact at once: neither needs the other, so both cores can have one.
pub fn solve_both(
    stack: &Arc<Stack>,
    (terminals, conductivity): (&Terminals, &[Conductivity]),
    conductance: &[Vec<Vec<f64>>],
) -> Result<(Conduction, Heat, Perfect), Failure> {
    check(stack, terminals, conductivity)?;
    let placed = Placed::new(stack, terminals)?;
    let (real, perfect) = rayon::join(
        || {
            let mut conduction = Conduction::of(&placed, conductivity);
            let heat = conduction.solve(conductance)?;
            Ok::<_, Failure>((conduction, heat))
        },
        || Perfect::of(stack, &placed.ends, (terminals, conductivity)),
    );
    let (conduction, heat) = real?;
    Ok((conduction, heat, perfect?))
}

fn check(
    stack: &Stack,
    terminals: &Terminals,
    conductivity: &[Conductivity],
) -> Result<(), Failure> {
    let sound =
        conductivity.len() == stack.bodies.len() && conductivity.iter().all(|k| k.is_sound());
    if !sound {
        return Err(Failure::Misfit {
            what: "every body needs conductivities above zero",
        });
    }
    let holds = |bolt: &super::Bolt| bolt.strength.is_finite() && bolt.strength >= 0.0;
    if !terminals.bolts.iter().all(holds) {
        return Err(Failure::Misfit {
            what: "a bolt needs a conductance, zero or above",
        });
    }
    Ok(())
}
