//! How fine the grid is: lines in the plan, polynomials through the layers, and what that costs.

use crate::{
    numerics::columns::{Fine, Plan, Stop, lines},
    pressure::elastic::{
        Bolt, End, FaceFriction, Failure, Fineness, HeadModel, Layer, Problem, Through, symmetry,
    },
};

/// Size of a grid.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Size {
    /// Columns: crossings of grid lines.
    pub columns: usize,
    /// Unknown displacements.
    pub unknowns: usize,
    /// Memory that the solution takes, bytes; an upper estimate.
    pub bytes: u64,
}

/// Growth of the spacing away from bolts, lengths per length.
const GROWTH: f64 = 0.25;
/// Half width of the fine part around an axis, in bearing radii.
const REACH: f64 = 1.5;
/// Widest spacing, in bearing radii.
const WIDEST: f64 = 0.7;
/// Narrowest seat that still sets the spacing, in bearing radii.
const NARROWEST_SEAT: f64 = 0.15;
/// Thickness over bearing radius up to which a quadratic will do: when a look is enough, and else. With
/// it in plates as thick as a bearing radius, pressure on the reference joints misses 9 % whatever the
/// lines; a cubic leaves 6 %.
const THIN_AT_A_GLANCE: f64 = 1.5;
const FOIL: f64 = 0.5;
/// Thickness over bearing radius up to which a fine plate is thin, and up to which one element will do.
const THIN: f64 = 1.2;
const ONE_ELEMENT: f64 = 2.5;
/// Thickness over bearing radius that one of several elements may have.
const ELEMENT: f64 = 2.5;
/// Lines in one direction above which nothing is laid out any more.
const MOST_LINES: usize = 4000;

impl Fineness {
    /// Spacing near a bolt over the width of its seat.
    fn factor(self) -> f64 {
        match self {
            Self::Coarse => 1.0,
            Self::Fast => 0.62,
            Self::Normal => 0.5,
            Self::Fine => 0.33,
        }
    }

    /// Polynomials through a layer of this thickness in bearing radii.
    fn through(self, thickness: f64) -> Through {
        let several = ((thickness / ELEMENT).ceil() as usize).clamp(2, 8);
        let (elements, degree) = match self {
            Self::Coarse if thickness <= THIN_AT_A_GLANCE => (1, 2),
            Self::Fast if thickness <= FOIL => (1, 2),
            Self::Coarse | Self::Fast if thickness > ONE_ELEMENT => (several, 2),
            Self::Normal if thickness > ONE_ELEMENT => (several, 3),
            Self::Fine if thickness > THIN => (several, 3),
            _ => (1, 3),
        };
        Through { elements, degree }
    }
}

/// Polynomials through a layer.
pub(super) fn through(problem: &Problem, layer: &Layer) -> Through {
    layer.through.unwrap_or_else(|| {
        problem
            .fineness
            .through(layer.thickness / problem.bearing_radius())
    })
}

/// Nodes through a body.
pub(super) fn nodes(problem: &Problem, body: usize) -> usize {
    let layers = problem.bodies[body].layers.iter();
    1 + layers
        .map(|layer| through(problem, layer))
        .map(|through| through.elements * through.degree)
        .sum::<usize>()
}

/// Grid lines of the plan; where the joint may mirror they do, about a line in the middle.
pub(super) fn plan(problem: &Problem) -> Result<Plan, Failure> {
    let middles = symmetry::middles(problem);
    let [x, y] = [0, 1].map(|axis| {
        let fine: Vec<Fine> = problem
            .bolts
            .iter()
            .map(|bolt| around(bolt, axis, problem.fineness))
            .collect();
        let laid = |stops: &[Stop]| lines(stops, &fine, GROWTH, WIDEST * problem.bearing_radius());
        let stops = stops(problem, axis);
        match middles[axis] {
            Some(middle) => {
                let mut half = laid(&below(&stops, middle));
                let beyond = half.iter().rev().skip(1).map(|at| 2.0 * middle - at);
                let beyond: Vec<f64> = beyond.collect();
                half.extend(beyond);
                half
            }
            None => laid(&stops),
        }
    });
    if x.len() < 2 || y.len() < 2 || x.len() > MOST_LINES || y.len() > MOST_LINES {
        return Err(Failure::Unsound {
            what: "no grid of reasonable size covers the bodies".into(),
        });
    }
    Ok(Plan::new(x, y))
}

/// Stops up to the line of a mirror, with the images of those beyond it and one on the line.
fn below(stops: &[Stop], middle: f64) -> Vec<Stop> {
    let folded = stops.iter().map(|stop| Stop {
        at: middle - (stop.at - middle).abs(),
        rank: stop.rank,
    });
    let line = Stop {
        at: middle,
        rank: 0,
    };
    folded.chain([line]).collect()
}

fn around(bolt: &Bolt, axis: usize, fineness: Fineness) -> Fine {
    let seat = |inner: f64, outer: f64| (outer - inner).max(NARROWEST_SEAT * outer);
    let head = seat(bolt.head.inner.max(bolt.hole_radii[0]), bolt.head.outer);
    let (width, outer) = match bolt.end {
        End::Nut(nut) => {
            let hole = bolt.hole_radii.last().copied().unwrap_or(0.0);
            let below = seat(nut.inner.max(hole), nut.outer);
            (head.min(below), bolt.head.outer.max(nut.outer))
        }
        End::Thread { .. } => (head, bolt.head.outer),
    };
    Fine {
        at: bolt.at[axis],
        reach: REACH * outer,
        spacing: fineness.factor() * width,
    }
}

/// Spacing of the lines near the bolt that asks for the finest.
pub(super) fn finest_spacing(problem: &Problem) -> f64 {
    let spacings = problem
        .bolts
        .iter()
        .map(|bolt| around(bolt, 0, problem.fineness).spacing);
    spacings.fold(f64::INFINITY, f64::min)
}

/// Ends of all bodies first, then edges, then bolt axes.
fn stops(problem: &Problem, axis: usize) -> Vec<Stop> {
    let ends: Vec<f64> = problem
        .bodies
        .iter()
        .flat_map(|body| body.bounds[axis])
        .collect();
    let low = ends.iter().copied().fold(f64::INFINITY, f64::min);
    let high = ends.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    let edges = problem.stops[axis].iter().chain(&ends);
    let edges = edges.map(|at| Stop { at: *at, rank: 1 });
    let axes = problem.bolts.iter().map(|bolt| Stop {
        at: bolt.at[axis],
        rank: 2,
    });
    edges
        .chain(axes)
        .filter(|stop| low <= stop.at && stop.at <= high)
        .collect()
}

/// Loose unknowns of a column: the rigid head and the rigid nut.
pub(super) fn loose(problem: &Problem) -> usize {
    let nuts = problem
        .bolts
        .iter()
        .any(|bolt| matches!(bolt.end, End::Nut(_)));
    match problem.head {
        HeadModel::Uniform => 0,
        HeadModel::Rigid => 1 + usize::from(nuts),
    }
}

/// Columns, unknowns and memory on a plan.
///
/// Counted for the whole even where a mirror leaves a part: forces of other draws and of lost bolts need
/// not mirror, and must find their room too.
pub(super) fn size(problem: &Problem, plan: &Plan) -> Size {
    // Bytes of one column, from what is kept of it: stencils in double precision and, with the
    // coarser levels' third, in single; inverse blocks; vectors; masks.
    const DOUBLE: f64 = 8.0;
    const SINGLE_LEVELS: f64 = 4.0 * 4.0 / 3.0;
    const STENCILS: f64 = 9.0 * 12.0;
    const DOUBLE_VECTORS: f64 = 11.0;
    const SINGLE_VECTORS: f64 = 3.0;
    const MASK: f64 = 32.0;
    // The coarsest factor, the program itself and what the allocator keeps.
    const FIXED: f64 = 40e6;
    let bodies = 0..problem.bodies.len();
    let stored = |layer: &Layer| 1 + usize::from(layer.inlay.is_some());
    let every = problem.bodies.iter().flat_map(|body| &body.layers);
    let layers: usize = every.map(stored).sum();
    let groups: Vec<usize> = bodies.map(|body| 3 * nodes(problem, body)).collect();
    let block = groups.iter().sum::<usize>() + loose(problem);
    let squares: usize = groups.iter().map(|n| n * n.next_multiple_of(4)).sum();
    let stuck = problem
        .interfaces
        .iter()
        .filter(|one| one.faces == FaceFriction::Stuck)
        .count();
    let ties = problem.interfaces.len() + 2 * stuck + 2 * loose(problem);
    let stencils = (layers as f64 * 12.0 + ties as f64) / 12.0 * STENCILS;
    let column = stencils * (DOUBLE + DOUBLE / 4.0 + SINGLE_LEVELS)
        + squares as f64 * SINGLE_LEVELS
        + block as f64 * (DOUBLE_VECTORS * DOUBLE + SINGLE_VECTORS * SINGLE_LEVELS)
        + MASK * (2 * layers + 6 * problem.interfaces.len()) as f64;
    let columns = plan.columns();
    Size {
        columns,
        unknowns: columns * block,
        bytes: (columns as f64 * column + FIXED) as u64,
    }
}
