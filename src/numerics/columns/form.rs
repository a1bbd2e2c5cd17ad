//! Bilinear forms in product form: elasticity with three components, conduction with one.

use crate::numerics::columns::{Element, kernel::Number, stencil::Products};

/// A matrix through the thickness of one element.
pub type Square = [[f64; 4]; 4];

/// Most stencils, and most sums over neighbours, of any form.
pub const MOST_STENCILS: usize = 12;

/// Nodes treated at once.
pub const LANES: usize = 4;

/// One product: a stencil takes values of one component into a sum.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Term {
    /// The sum; each has its own matrix through the thickness.
    pub sum: usize,
    /// Component of the equation that the sum belongs to.
    pub into: usize,
    /// The stencil.
    pub stencil: usize,
    /// Component of the values.
    pub from: usize,
}

/// A bilinear form on columns, with its constants.
///
/// ```text
/// matrix = Σ_terms  stencil[term] ⊗ through[sum of term],   component `into` × component `from`
/// ```
pub trait Form: Copy + Send + Sync + 'static {
    /// Values at each node.
    const COMPONENTS: usize;
    /// Stencils kept.
    const STENCILS: usize;
    /// Component of the equation that each sum belongs to.
    const INTO: &'static [usize];
    /// All products.
    const TERMS: &'static [Term];

    /// Values of the stencils for one pair of corners of a filled cell.
    fn stencils(&self, products: &Products) -> [f64; MOST_STENCILS];

    /// Matrices of the sums through the thickness.
    fn through(&self, element: &Element) -> [Square; MOST_STENCILS];

    /// Adds the products of one neighbour to the sums, four nodes at once.
    ///
    /// `values` starts at the first node; components stand `step` apart. Lanes beyond an element's
    /// nodes carry what stands there in the column; the matrices through the thickness drop it.
    fn gather<T: Number>(
        coefficients: &[T],
        values: &[T],
        step: usize,
        sums: &mut [[T; LANES]; MOST_STENCILS],
    );
}

/// Isotropic elasticity; transverse shear with one midpoint along its own direction.
///
/// The midpoint rule is what keeps thin plates on wide cells from locking.
/// Checked: `a_thin_plate_bends_as_it_should`, `full_integration_locks`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Solid {
    /// First Lamé constant λ, Pa.
    pub first: f64,
    /// Shear modulus μ, Pa.
    pub shear: f64,
    /// Weak springs to the ground over the volume, N/m⁴, along the plan and through the thickness: they
    /// hold what loads in balance leave free.
    pub ground: [f64; 2],
}

const UU: usize = 0;
const VV: usize = 1;
const WW: usize = 2;
const UV: usize = 3;
const VU: usize = 4;
pub(super) const MASS: usize = 5;
pub(super) const MASS_X: usize = 6;
pub(super) const MASS_Y: usize = 7;
const X_VALUE: usize = 8;
const VALUE_X: usize = 9;
const Y_VALUE: usize = 10;
const VALUE_Y: usize = 11;

const fn term(sum: usize, into: usize, stencil: usize, from: usize) -> Term {
    Term {
        sum,
        into,
        stencil,
        from,
    }
}

impl Form for Solid {
    const COMPONENTS: usize = 3;
    const STENCILS: usize = 12;
    const INTO: &'static [usize] = &[0, 0, 0, 0, 1, 1, 1, 1, 2, 2, 2, 2];
    const TERMS: &'static [Term] = &[
        term(0, 0, UU, 0),
        term(0, 0, UV, 1),
        term(1, 0, MASS_X, 0),
        term(2, 0, X_VALUE, 2),
        term(3, 0, VALUE_X, 2),
        term(4, 1, VU, 0),
        term(4, 1, VV, 1),
        term(5, 1, MASS_Y, 1),
        term(6, 1, Y_VALUE, 2),
        term(7, 1, VALUE_Y, 2),
        term(8, 2, WW, 2),
        term(9, 2, MASS, 2),
        term(10, 2, X_VALUE, 0),
        term(10, 2, Y_VALUE, 1),
        term(11, 2, VALUE_X, 0),
        term(11, 2, VALUE_Y, 1),
    ];

    fn stencils(&self, products: &Products) -> [f64; MOST_STENCILS] {
        let (first, shear) = (self.first, self.shear);
        let long = first + 2.0 * shear;
        let mut values = [0.0; MOST_STENCILS];
        values[UU] = long * products.xx + shear * products.yy;
        values[VV] = long * products.yy + shear * products.xx;
        values[WW] = shear * (products.xx + products.yy);
        values[UV] = first * products.xy + shear * products.yx;
        values[VU] = first * products.yx + shear * products.xy;
        values[MASS] = products.mass;
        values[MASS_X] = products.mass_x;
        values[MASS_Y] = products.mass_y;
        values[X_VALUE] = products.x_value;
        values[VALUE_X] = products.value_x;
        values[Y_VALUE] = products.y_value;
        values[VALUE_Y] = products.value_y;
        values
    }

    fn through(&self, element: &Element) -> [Square; MOST_STENCILS] {
        let (first, shear) = (self.first, self.shear);
        let sum = |slope: f64, ground: f64| combined(slope, &element.slope, ground, &element.mass);
        let none = [[0.0; 4]; 4];
        let mixed = |factor: f64| combined(factor, &element.mixed, 0.0, &none);
        let turned = |factor: f64| combined(factor, &transposed(&element.mixed), 0.0, &none);
        let sheared = sum(shear, self.ground[0]);
        [
            element.mass,
            sheared,
            mixed(first),
            turned(shear),
            element.mass,
            sheared,
            mixed(first),
            turned(shear),
            element.mass,
            sum(first + 2.0 * shear, self.ground[1]),
            mixed(shear),
            turned(first),
        ]
    }

    // Kept apart, so that the compiler sees whole vectors in memory; inlined, it takes them to pieces.
    #[inline(never)]
    fn gather<T: Number>(
        coefficients: &[T],
        values: &[T],
        step: usize,
        sums: &mut [[T; LANES]; MOST_STENCILS],
    ) {
        let c: &[T; 12] = coefficients.first_chunk().expect("twelve stencils");
        let u: &[T; LANES] = values.first_chunk().expect("a padded column");
        let v: &[T; LANES] = values[step..].first_chunk().expect("a padded column");
        let w: &[T; LANES] = values[2 * step..].first_chunk().expect("a padded column");
        add(&mut sums[0], c[UU], u);
        add(&mut sums[0], c[UV], v);
        add(&mut sums[1], c[MASS_X], u);
        add(&mut sums[2], c[X_VALUE], w);
        add(&mut sums[3], c[VALUE_X], w);
        add(&mut sums[4], c[VU], u);
        add(&mut sums[4], c[VV], v);
        add(&mut sums[5], c[MASS_Y], v);
        add(&mut sums[6], c[Y_VALUE], w);
        add(&mut sums[7], c[VALUE_Y], w);
        add(&mut sums[8], c[WW], w);
        add(&mut sums[9], c[MASS], w);
        add(&mut sums[10], c[X_VALUE], u);
        add(&mut sums[10], c[Y_VALUE], v);
        add(&mut sums[11], c[VALUE_X], u);
        add(&mut sums[11], c[VALUE_Y], v);
    }
}

/// Conduction: −∇·(k ∇T), one value for each direction.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Scalar {
    /// Conductivity along x and y.
    pub along: [f64; 2],
    /// Conductivity through the thickness.
    pub through: f64,
}

impl Form for Scalar {
    const COMPONENTS: usize = 1;
    const STENCILS: usize = 2;
    const INTO: &'static [usize] = &[0, 0];
    const TERMS: &'static [Term] = &[term(0, 0, 0, 0), term(1, 0, 1, 0)];

    fn stencils(&self, products: &Products) -> [f64; MOST_STENCILS] {
        let mut values = [0.0; MOST_STENCILS];
        values[0] = self.along[0] * products.xx + self.along[1] * products.yy;
        values[1] = products.mass;
        values
    }

    fn through(&self, element: &Element) -> [Square; MOST_STENCILS] {
        let none = [[0.0; 4]; 4];
        let mut squares = [none; MOST_STENCILS];
        squares[0] = element.mass;
        squares[1] = combined(self.through, &element.slope, 0.0, &none);
        squares
    }

    #[inline(never)]
    fn gather<T: Number>(
        coefficients: &[T],
        values: &[T],
        _step: usize,
        sums: &mut [[T; LANES]; MOST_STENCILS],
    ) {
        let c: &[T; 2] = coefficients.first_chunk().expect("two stencils");
        let u: &[T; LANES] = values.first_chunk().expect("a padded column");
        add(&mut sums[0], c[0], u);
        add(&mut sums[1], c[1], u);
    }
}

#[expect(clippy::inline_always, reason = "one vector operation each")]
#[inline(always)]
fn add<T: Number>(sum: &mut [T; LANES], factor: T, values: &[T; LANES]) {
    for (sum, value) in sum.iter_mut().zip(values) {
        *sum += factor * *value;
    }
}

fn combined(a: f64, one: &Square, b: f64, other: &Square) -> Square {
    std::array::from_fn(|i| std::array::from_fn(|j| a * one[i][j] + b * other[i][j]))
}

fn transposed(square: &Square) -> Square {
    std::array::from_fn(|i| std::array::from_fn(|j| square[j][i]))
}
