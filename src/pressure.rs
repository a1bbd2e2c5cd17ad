//! Clamp force to contact pressure and to the gap between the faces.
//!
//! [`elastic`] solves the contact of the whole joint, bodies of any plan and any number of bolts;
//! [`round`] that of one bolt in round plates, in radius and height. Both let faces press and part, never
//! pull, and carry exactly the clamp force. [`mod@cone`] is the closed form fitted to `round`: milliseconds, but
//! no gap, no edges and no neighbours.

mod beta;
pub mod cone;
pub mod elastic;
pub mod round;

pub use cone::{Cone, Pair, Profile, cone};
