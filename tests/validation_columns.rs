//! Elastic contact of bolted plates on columns: exact fields, a body-fitted reference, symmetry.
//!
//! Reference fields in `data/layout` were computed for this project with body-fitted quadratic hexes;
//! good to 0.3 % in gap and 2 % in contact area. Effects of modelling choices are those of the same
//! study, found with columns. Single bolts in `data/single_bolt.json` were computed for this project with
//! scikit-fem (`benches/peer/thread_contact.py`), which meets the round solver with a nut to 3e-4 of the force.

#[path = "validation_columns/awkward.rs"]
mod awkward;
#[path = "validation_columns/cases.rs"]
mod cases;
#[path = "evidence/note.rs"]
mod evidence;
#[path = "validation_columns/joints.rs"]
mod joints;
#[path = "validation_columns/laws.rs"]
mod laws;
#[path = "validation_columns/shapes.rs"]
mod shapes;
#[path = "validation_columns/single.rs"]
mod single;
#[path = "validation_columns/tables.rs"]
mod tables;
