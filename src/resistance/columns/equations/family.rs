//! Temperatures as sums of known ones: the same equations in as many unknowns.

use std::sync::Arc;

use nalgebra::{DMatrix, DVector};

use crate::resistance::{
    Failure,
    columns::{
        Health,
        equations::{Equations, stopped},
    },
};

/// Share of its length that temperatures must add to those before them; less is what their own
/// solution leaves, and would be blown up.
const NEWS: f64 = 1e-5;

/// Temperatures of solved states of one stack and one uniform temperature: orthonormal, they span
/// these.
///
/// With the uniform one what enters leaves again, to rounding.
#[derive(Clone, Debug, Default)]
pub struct Family {
    members: Arc<Vec<Vec<f64>>>,
}

impl Family {
    /// The family of some states, from [`crate::resistance::columns::Conduction::state`].
    pub fn of<'a>(states: impl IntoIterator<Item = &'a [f64]>) -> Self {
        let mut members = Vec::new();
        for state in states {
            take(&mut members, state);
        }
        // Last: it pulls at stiffly held faces, and would bring that into the others.
        if let Some(length) = members.first().map(Vec::len) {
            take(&mut members, &vec![1.0; length]);
        }
        Self {
            members: Arc::new(members),
        }
    }

    /// Whether it has members, all of such a length.
    pub(in crate::resistance::columns) fn fits(&self, length: usize) -> bool {
        let mut members = self.members.iter();
        !self.members.is_empty() && members.all(|member| member.len() == length)
    }
}

/// Takes what is new in a state for a member.
fn take(members: &mut Vec<Vec<f64>>, state: &[f64]) {
    let mut new = state.to_vec();
    // Twice is enough, whatever is left.
    for _ in 0..2 {
        for member in members.iter() {
            let along = dot(member, &new);
            add(&mut new, -along, member);
        }
    }
    let left = dot(&new, &new).sqrt();
    if left > NEWS * dot(state, state).sqrt() {
        for value in &mut new {
            *value /= left;
        }
        members.push(new);
    }
}

/// The equations of one set of conductivities in the members of a family.
pub(in crate::resistance::columns) struct Reduced {
    family: Family,
    /// Bodies, sinks and bolts.
    apart: DMatrix<f64>,
    load: DVector<f64>,
    /// For every part of every interface, column by column, what every member drops there.
    drops: Vec<Vec<Vec<f64>>>,
}

impl Reduced {
    /// Whether these are the equations in the members of a family.
    pub(in crate::resistance::columns) fn serves(&self, family: &Family) -> bool {
        Arc::ptr_eq(&self.family.members, &family.members)
    }
}

impl Equations {
    /// The equations in the members of a family; the bodies are parted for it.
    pub(in crate::resistance::columns) fn reduced(&mut self, family: &Family) -> Reduced {
        let members = family.members.as_slice();
        let columns = self.operator.plan().columns();
        for tie in self.ties.iter().flatten() {
            self.operator.set_tie(*tie, &vec![0.0; columns]);
        }
        let mut apart = DMatrix::zeros(members.len(), members.len());
        let mut image = self.operator.zeros();
        for (row, member) in members.iter().enumerate() {
            self.operator.product(member, &mut image);
            for (place, other) in members.iter().enumerate().take(row + 1) {
                let energy = dot(other, &image);
                apart[(row, place)] = energy;
                apart[(place, row)] = energy;
            }
        }
        let load = members.iter().map(|member| dot(member, &self.load));
        let drops = |tie: &usize| {
            let [plus, minus] = self.operator.ends(*tie);
            let mut drops = Vec::with_capacity(columns * members.len());
            for column in 0..columns {
                let [plus, minus] = [plus, minus].map(|at| self.operator.place(column, at));
                drops.extend(members.iter().map(|member| member[plus] - member[minus]));
            }
            drops
        };
        let faces = self.ties.iter();
        Reduced {
            family: family.clone(),
            apart,
            load: DVector::from_iterator(members.len(), load),
            drops: faces.map(|ties| ties.iter().map(drops).collect()).collect(),
        }
    }

    /// Takes the best sum of the members under some conductances, W/K, for the temperatures.
    pub(in crate::resistance::columns) fn combine(
        &mut self,
        reduced: &Reduced,
        conductances: &[Vec<Vec<f64>>],
    ) -> Result<Health, Failure> {
        let count = reduced.family.members.len();
        let mut matrix = reduced.apart.clone();
        let faces = conductances.iter().flatten();
        for (conductances, drops) in faces.zip(reduced.drops.iter().flatten()) {
            for (conductance, drops) in conductances.iter().zip(drops.chunks_exact(count)) {
                if *conductance > 0.0 {
                    for (row, one) in drops.iter().enumerate() {
                        let scaled = conductance * one;
                        for (place, other) in drops.iter().enumerate().take(row + 1) {
                            matrix[(row, place)] += scaled * other;
                        }
                    }
                }
            }
        }
        // The factor reads the lower triangle alone.
        let factor = matrix.cholesky().ok_or_else(|| stopped(0, f64::NAN))?;
        let weights = factor.solve(&reduced.load);
        self.rise.fill(0.0);
        for (weight, member) in weights.iter().zip(reduced.family.members.iter()) {
            add(&mut self.rise, *weight, member);
        }
        let heat = self.heat();
        Ok(Health {
            iterations: 0,
            residual: f64::NAN,
            balance: ((self.drained() - heat) / heat).abs(),
            unknowns: count,
        })
    }
}

fn dot(one: &[f64], other: &[f64]) -> f64 {
    let (blocks, others) = (one.as_chunks::<4>(), other.as_chunks::<4>());
    let mut sums = [0.0; 4];
    for (x, y) in blocks.0.iter().zip(others.0) {
        for (lane, sum) in sums.iter_mut().enumerate() {
            *sum += x[lane] * y[lane];
        }
    }
    let rest = blocks.1.iter().zip(others.1);
    sums.iter().sum::<f64>() + rest.map(|(x, y)| x * y).sum::<f64>()
}

fn add(to: &mut [f64], factor: f64, other: &[f64]) {
    for (to, other) in to.iter_mut().zip(other) {
        *to += factor * other;
    }
}

#[cfg(test)]
mod tests {
    use std::sync::Arc;

    use super::*;
    use crate::{
        numerics::columns::Plan,
        resistance::columns::{
            Body, Conduction, Conductivity, Sink, Slab, Source, Stack, Terminals, Zone,
        },
    };

    /// Two plates of 60 × 40 mm, heated in a corner, cooled by a film.
    fn conduction(conductivity: f64) -> (Arc<Stack>, Conduction) {
        let lines = |count: usize| (0..=count).map(|at| at as f64 * 0.005).collect();
        let plan = Plan::new(lines(12), lines(8));
        let plate = |thickness: f64| Body {
            layers: vec![Slab {
                shares: vec![1.0; 96],
                heights: vec![thickness],
                degree: 2,
            }],
        };
        let stack = Arc::new(Stack::new(plan, vec![plate(0.004), plate(0.006)]).unwrap());
        let heated = Zone::Rectangle {
            low: [0.005, 0.005],
            high: [0.02, 0.02],
        };
        let terminals = Terminals {
            source: Source::Flux(vec![(heated, 1.0)]),
            sinks: vec![Sink::Film {
                zone: Zone::Face,
                coefficient: 2000.0,
            }],
            bolts: Vec::new(),
        };
        let plates = [conductivity, 167.0].map(Conductivity::isotropic);
        let conduction = Conduction::new(&stack, &terminals, &plates).unwrap();
        (stack, conduction)
    }

    /// Local conductance that falls from one side to the other, times a factor.
    fn faces(stack: &Stack, factor: f64) -> Vec<Vec<Vec<f64>>> {
        let mut faces = stack.uniform(1.0);
        for (column, value) in faces[0][0].iter_mut().enumerate() {
            *value = factor * 2000.0 * (1.0 - 12.0 * stack.plan().place(column)[0]);
        }
        faces
    }

    #[test]
    fn states_between_solved_ones_are_sums_of_these() {
        let mut states = Vec::new();
        for (conductivity, factor) in [(100.0, 1.0), (100.0, 2.0), (100.0, 0.5), (120.0, 1.0)] {
            let (stack, mut conduction) = conduction(conductivity);
            conduction.solve(&faces(&stack, factor)).unwrap();
            states.push(conduction.state().to_vec());
        }
        let family = Family::of(states.iter().map(Vec::as_slice));
        assert_eq!(family.members.len(), 5);
        // A member is met within what its solution leaves; others by the square of what their
        // temperatures miss, some 1e-3 here.
        for (conductivity, factor, tolerance) in
            [(100.0, 2.0, 1e-8), (100.0, 1.4, 1e-5), (110.0, 0.8, 1e-5)]
        {
            let (stack, mut solved) = conduction(conductivity);
            let whole = solved.solve(&faces(&stack, factor)).unwrap();
            let (_, mut summed) = conduction(conductivity);
            let sum = summed.combined(&family, &faces(&stack, factor)).unwrap();
            let off = sum.source_to_sink / whole.source_to_sink - 1.0;
            assert!(off.abs() < tolerance, "{conductivity} {factor}: {off:e}");
            // Fewer unknowns are stiffer: less rises above the coolant under the same heat.
            let rise =
                |heat: &crate::resistance::columns::Heat| heat.source_to_sink + heat.sink_mean;
            assert!(rise(&sum) <= rise(&whole) * (1.0 + 1e-9));
            // Rounding alone.
            assert!(sum.health.balance < 1e-12, "{:e}", sum.health.balance);
        }
    }

    #[test]
    fn what_adds_nothing_is_no_member() {
        let one = [1.0, 2.0, 3.0, 4.0, 5.0];
        let twice = one.map(|value| 2.0 * value);
        let other = [1.0, 0.0, 0.0, 0.0, 0.0];
        let family = Family::of([&one[..], &twice[..], &other[..]]);
        // The uniform temperature is new as well.
        assert_eq!(family.members.len(), 3);
        // Rounding alone.
        assert!(dot(&family.members[0], &family.members[1]).abs() < 1e-15);
    }
}
