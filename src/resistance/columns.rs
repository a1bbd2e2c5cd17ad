//! Heat through stacked bodies in three dimensions, on the columns that carry their contact.
//!
//! ```text
//! ∇·(k ∇T) = 0 in every body,   q = h (T_upper − T_lower) where two of them meet
//! ```
//!
//! `stack` holds the bodies and where they meet; `terminals` says where heat enters, leaves and goes
//! along bolts; `conduction` solves it for one set of conductivities and any local conductance; `heat`
//! is what comes out. Linear and steady; all temperatures are per watt through the joint, K/W.
//!
//! ```
//! use std::sync::Arc;
//!
//! use ringsum::{
//!     numerics::columns::Plan,
//!     resistance::columns::{
//!         Body, Conduction, Conductivity, Perfect, Sink, Slab, Source, Stack, Terminals, Zone,
//!     },
//! };
//!
//! let lines = |count: usize| (0..=count).map(|k| k as f64 * 0.01).collect::<Vec<f64>>();
//! let plan = Plan::new(lines(8), lines(6));
//! let plate = |thickness: f64| Body {
//!     layers: vec![Slab { shares: vec![1.0; 48], heights: vec![thickness], degree: 2 }],
//! };
//! // Warm side first: body 0 lies on body 1.
//! let stack = Arc::new(Stack::new(plan, vec![plate(0.005), plate(0.004)])?);
//! let terminals = Terminals {
//!     source: Source::Flux(vec![(Zone::Rectangle { low: [0.02, 0.02], high: [0.05, 0.04] }, 1.0)]),
//!     sinks: vec![Sink::Film { zone: Zone::Face, coefficient: 2000.0 }],
//!     bolts: Vec::new(),
//! };
//! let conductivity = [Conductivity::isotropic(167.0); 2];
//! let mut conduction = Conduction::new(&stack, &terminals, &conductivity)?;
//! let heat = conduction.solve(&stack.uniform(1000.0))?;
//! let perfect = Perfect::new(&stack, &terminals, &conductivity)?;
//! let path = heat.path(&perfect);
//! assert!(path.added_by_joint > 0.2);
//! # Ok::<(), ringsum::resistance::Failure>(())
//! ```

mod clip;
mod conduction;
mod equations;
mod heat;
mod nodal;
mod parts;
mod readings;
mod rims;
mod section;
mod stack;
mod terminals;
mod zone;

pub use conduction::{Conduction, Perfect, Placed, solve_both};
pub use equations::Family;
pub use heat::{Health, Heat, Hottest};
pub use nodal::nodal;
pub use parts::Part;
pub use section::{Across, Section};
pub use stack::{Body, Conductivity, Meeting, Side, Slab, Stack};
pub use terminals::{Bolt, Edge, Rim, Seat, Sink, Source, Terminals};
pub use zone::Zone;

#[cfg(test)]
mod tests;
