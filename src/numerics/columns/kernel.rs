//! Products of a column's equations with its neighbours' values, without an assembled matrix.

use std::ops::{Add, AddAssign, Mul, Sub, SubAssign};

use crate::numerics::columns::{Form, LANES, MOST_STENCILS, Square};

/// `f64` for the equations themselves, `f32` for what only guides their solution.
pub trait Number:
    Copy
    + Default
    + Send
    + Sync
    + Add<Output = Self>
    + Sub<Output = Self>
    + Mul<Output = Self>
    + AddAssign
    + SubAssign
    + PartialEq
    + 'static
{
    /// The nearest number.
    fn nearest(value: f64) -> Self;
}

impl Number for f64 {
    fn nearest(value: f64) -> Self {
        value
    }
}

impl Number for f32 {
    fn nearest(value: f64) -> Self {
        value as f32
    }
}

/// One polynomial element of a layer.
#[derive(Clone, Debug)]
pub struct Slab<T> {
    /// Its first node's unknown of component 0.
    pub first: usize,
    /// Distance between components.
    pub step: usize,
    /// Number of nodes.
    pub nodes: usize,
    /// Which set of stencils.
    pub set: usize,
    /// Matrices of the sums, transposed: `through[sum][from][into]`.
    pub through: [[[T; 4]; 4]; MOST_STENCILS],
}

/// A coupling: stencil ⊗ e eᵀ, where e is 1 at one unknown and −1 at the other, if any.
#[derive(Clone, Debug)]
pub struct Coupling<T> {
    /// Unknown with the sign +.
    pub plus: usize,
    /// Unknown with the sign −.
    pub minus: Option<usize>,
    /// Nine neighbours for every column.
    pub stencil: Vec<[T; 9]>,
}

/// The matrix on one plan.
#[derive(Clone, Debug)]
pub struct Matrix<F, T> {
    /// Lines across x, lines across y.
    pub lines: [usize; 2],
    /// Unknowns of one column with its padding.
    pub stride: usize,
    /// Elements.
    pub slabs: Vec<Slab<T>>,
    /// Sets of stencils, one for each layer: column, neighbour, stencil.
    pub sets: Vec<Vec<T>>,
    /// Couplings.
    pub couplings: Vec<Coupling<T>>,
    /// Unknowns that stay zero on the last line across x, and on the last across y.
    pub held: [Vec<usize>; 2],
    /// The form.
    pub form: std::marker::PhantomData<F>,
}

/// A neighbour 0..9 and the values of its column.
pub type Neighbour<'a, T> = (usize, &'a [T]);

impl<F: Form, T: Number> Matrix<F, T> {
    /// Adds to `image` what the neighbours contribute to the equations of a column.
    pub fn add_products(&self, column: usize, neighbours: &[Neighbour<'_, T>], image: &mut [T]) {
        for slab in &self.slabs {
            match slab.nodes {
                2 => self.add_slab::<2>(slab, column, neighbours, image),
                3 => self.add_slab::<3>(slab, column, neighbours, image),
                _ => self.add_slab::<4>(slab, column, neighbours, image),
            }
        }
        for coupling in &self.couplings {
            let row = &coupling.stencil[column];
            // Not negative as a whole, so nothing stands beside an empty diagonal.
            if row[4] == T::default() {
                continue;
            }
            let mut sum = T::default();
            for (neighbour, values) in neighbours {
                let minus = coupling.minus.map_or(T::default(), |at| values[at]);
                sum += row[*neighbour] * (values[coupling.plus] - minus);
            }
            image[coupling.plus] += sum;
            if let Some(minus) = coupling.minus {
                image[minus] -= sum;
            }
        }
    }

    fn add_slab<const N: usize>(
        &self,
        slab: &Slab<T>,
        column: usize,
        neighbours: &[Neighbour<'_, T>],
        image: &mut [T],
    ) {
        let own = &self.sets[slab.set][column * 9 * F::STENCILS..][..9 * F::STENCILS];
        let mut into = [[T::default(); LANES]; 3];
        let mut sums = [[T::default(); LANES]; MOST_STENCILS];
        for (neighbour, values) in neighbours {
            let coefficients = &own[neighbour * F::STENCILS..][..F::STENCILS];
            F::gather(coefficients, &values[slab.first..], slab.step, &mut sums);
        }
        for (sum, component) in F::INTO.iter().enumerate() {
            let result = &mut into[*component];
            for (factor, row) in sums[sum].iter().zip(&slab.through[sum][..N]) {
                for (result, entry) in result.iter_mut().zip(row) {
                    *result += *factor * *entry;
                }
            }
        }
        for (component, result) in into.iter().enumerate().take(F::COMPONENTS) {
            let image = &mut image[slab.first + component * slab.step..][..N];
            for (image, value) in image.iter_mut().zip(result) {
                *image += *value;
            }
        }
    }

    /// Unknowns of a column that stay zero.
    pub fn held_at(&self, column: usize) -> impl Iterator<Item = usize> + '_ {
        let [nx, ny] = self.lines;
        let on = [column / ny + 1 == nx, column % ny + 1 == ny];
        let lists = self.held.iter().zip(on).filter(|(_, on)| *on);
        lists.flat_map(|(held, _)| held.iter().copied())
    }

    /// Adds the block between a column and one of its neighbours: `add(row, column, value)`.
    ///
    /// Couplings for which `with` fails are left out.
    pub fn add_block(
        &self,
        (column, neighbour): (usize, usize),
        with: impl Fn(&Coupling<T>) -> bool,
        mut add: impl FnMut(usize, usize, T),
    ) {
        for slab in &self.slabs {
            let own = &self.sets[slab.set][(column * 9 + neighbour) * F::STENCILS..];
            for term in F::TERMS {
                let (row, from) = (
                    slab.first + term.into * slab.step,
                    slab.first + term.from * slab.step,
                );
                for b in 0..slab.nodes {
                    for a in 0..slab.nodes {
                        let value = own[term.stencil] * slab.through[term.sum][b][a];
                        add(row + a, from + b, value);
                    }
                }
            }
        }
        for coupling in self.couplings.iter().filter(|coupling| with(coupling)) {
            let value = coupling.stencil[column][neighbour];
            add(coupling.plus, coupling.plus, value);
            if let Some(minus) = coupling.minus {
                add(minus, minus, value);
                add(coupling.plus, minus, T::default() - value);
                add(minus, coupling.plus, T::default() - value);
            }
        }
    }

    /// The same matrix in other numbers.
    pub fn converted<S: Number>(&self, convert: impl Fn(T) -> S + Copy) -> Matrix<F, S> {
        Matrix {
            lines: self.lines,
            stride: self.stride,
            slabs: self
                .slabs
                .iter()
                .map(|slab| slab.converted(convert))
                .collect(),
            sets: self
                .sets
                .iter()
                .map(|set| set.iter().map(|value| convert(*value)).collect())
                .collect(),
            couplings: self
                .couplings
                .iter()
                .map(|coupling| coupling.converted(convert))
                .collect(),
            held: self.held.clone(),
            form: std::marker::PhantomData,
        }
    }
}

impl<T: Number> Slab<T> {
    fn converted<S: Number>(&self, convert: impl Fn(T) -> S + Copy) -> Slab<S> {
        Slab {
            first: self.first,
            step: self.step,
            nodes: self.nodes,
            set: self.set,
            through: self
                .through
                .map(|square| square.map(|row| row.map(convert))),
        }
    }
}

impl<T: Number> Coupling<T> {
    /// The same coupling in other numbers.
    pub fn converted<S: Number>(&self, convert: impl Fn(T) -> S + Copy) -> Coupling<S> {
        Coupling {
            plus: self.plus,
            minus: self.minus,
            stencil: self.stencil.iter().map(|row| row.map(convert)).collect(),
        }
    }
}

/// Through-thickness matrices in the order in which the kernel reads them.
pub fn turned(squares: &[Square; MOST_STENCILS]) -> [[[f64; 4]; 4]; MOST_STENCILS] {
    squares.map(|square| std::array::from_fn(|b| std::array::from_fn(|a| square[a][b])))
}
