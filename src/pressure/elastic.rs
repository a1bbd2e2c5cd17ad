//! Elastic contact of bolted plates: any plan, any number of bolts, bodies and layers.

mod check;
mod field;
mod mesh;
mod newton;
mod problem;
mod readings;
mod resolution;
mod symmetry;
mod system;
mod table;

pub use crate::joint::{FaceFriction, HeadModel};
pub use field::{FaceField, Field, Health, Place};
pub use mesh::{Mesh, MeshBody, MeshFace, MeshLayer};
pub use problem::{
    Annulus, Body, Bolt, Compliance, Cover, End, Fineness, Height, Inlay, Interface, Layer,
    Problem, Progress, Stage, Through,
};
pub use resolution::Size;
pub use table::Table;

pub use readings::Face;

use newton::Start;
use system::System;

/// Why there is no field.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum Failure {
    /// A solver gave up.
    #[error("{solver} did not converge in {iterations} iterations (residual {residual:.2e})")]
    NotConverged {
        /// Which solver.
        solver: &'static str,
        /// Iterations done.
        iterations: usize,
        /// What was left, in the solver's own measure.
        residual: f64,
    },
    /// The grid would not fit.
    #[error(
        "the grid has {unknowns} unknowns and takes {} MB, more than the limit of {} MB",
        bytes / 1_000_000,
        limit / 1_000_000
    )]
    TooLarge {
        /// Unknown displacements.
        unknowns: usize,
        /// Memory that the solution would take, bytes.
        bytes: u64,
        /// Memory allowed, bytes.
        limit: u64,
    },
    /// Two faces never meet.
    #[error("the faces of interface {interface} do not touch anywhere")]
    NoContact {
        /// Which interface, the uppermost being 0.
        interface: usize,
    },
    /// The input describes no joint.
    #[error("the joint cannot be solved: {what}")]
    Unsound {
        /// What is wrong.
        what: String,
    },
}

/// Size of the grid that a problem asks for, before anything is allocated.
pub fn size(problem: &Problem) -> Result<Size, Failure> {
    check::sound(problem)?;
    Ok(resolution::size(problem, &resolution::plan(problem)?))
}

/// Solves the contact.
///
/// ```text
/// J(u) = ½ uᵀ K u − fᵀ u + Σ_i w_i ½ κ ⟨−g_i⟩²  →  least,      g_i = g0_i + w_i,upper − w_i,lower
/// p_i  = κ ⟨−g_i⟩
/// ```
///
/// | symbol | quantity | SI unit |
/// |---|---|---|
/// | `K` | elasticity of all bodies on columns, weak springs included | N/m |
/// | `f` | loads of heads, nuts and threads | N |
/// | `w_i` | faying area of a column | m² |
/// | `κ` | stiffness of the interface | Pa/m |
/// | `g_i` | gap; negative is closure | m |
///
/// Semismooth Newton steps, which are those of a primal–dual active set: contact where the last gap
/// was negative, one linear solution each, the exact least along the step where a full step would
/// raise the energy. Loads are in balance; weak springs hold the rigid motions. Of a joint that mirrors
/// about one or two lines a half or a quarter is solved.
///
/// Valid: linear elasticity, small displacements, first loading; faces slide freely or stick where
/// they touch. Contact area converges slowest (some per cent); radii that hold a share of the force
/// converge to tenths of a per cent.
/// Source: Hintermüller, Ito and Kunisch 2003, SIAM J. Optim. 13, 865–888, for the equivalence.
/// Checked: `layout_cases_are_met_when_fine`, `one_bolt_presses_as_in_a_round_pair` and the rest of
/// `tests/validation_columns.rs`.
pub fn solve(problem: &Problem) -> Result<Field, Failure> {
    solve_started(problem, &Start::Bolts, None)
}

/// Solves the contact from where a field of the same grid stood: other forces, other gaps.
///
/// A field of another grid is no help and no harm.
pub fn solve_from(problem: &Problem, previous: &Field) -> Result<Field, Failure> {
    solve_started(problem, &Start::Field(previous), None)
}

/// The same for the bodies and holes of that field, whose mesh is taken over: other forces, gaps, faces or
/// heads.
///
/// Of a field of another grid nothing is taken.
pub fn solve_again(problem: &Problem, previous: &Field) -> Result<Field, Failure> {
    solve_started(problem, &Start::Field(previous), Some(&previous.mesh))
}

/// Solves the contact from where a field of a coarser grid touches.
///
/// The grid only decides how many steps it takes.
pub fn solve_from_coarser(problem: &Problem, coarser: &Field) -> Result<Field, Failure> {
    solve_started(problem, &Start::Coarser(coarser), None)
}

/// Solves the contact from a stated set of touching columns, the same for every interface.
///
/// The set only decides how many steps it takes.
pub fn solve_from_set(
    problem: &Problem,
    touches: &(dyn Fn([f64; 2]) -> bool + Sync),
) -> Result<Field, Failure> {
    solve_started(problem, &Start::Set(touches), None)
}

fn solve_started(problem: &Problem, start: &Start, known: Option<&Mesh>) -> Result<Field, Failure> {
    check::sound(problem)?;
    let plan = resolution::plan(problem)?;
    let size = resolution::size(problem, &plan);
    if size.bytes > problem.most_bytes {
        return Err(Failure::TooLarge {
            unknowns: size.unknowns,
            bytes: size.bytes,
            limit: problem.most_bytes,
        });
    }
    // Inside the pool from here on: short parallel parts then start at once.
    rayon::join(
        || {
            problem.tell(Stage::Grid, 0, f64::NAN);
            let mesh = match known {
                Some(mesh) if mesh.plan == plan => mesh.clone(),
                _ => Mesh::new(problem, plan)?,
            };
            if let Some(mirror) = symmetry::mirror(problem, &mesh) {
                return symmetry::solve(problem, (mesh, &mirror), start);
            }
            let system = System::new(problem, &mesh, None)?;
            newton::solve(problem, (mesh, system), start)
        },
        || (),
    )
    .0
}
