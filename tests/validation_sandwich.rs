//! Sandwich panels and proud inserts against closed forms: slabs, a fin, a beam, a solid plate.

#[path = "validation_sandwich/heat.rs"]
mod heat;
#[path = "validation_sandwich/joints.rs"]
mod joints;
#[path = "validation_sandwich/mechanics.rs"]
mod mechanics;

/// Equal spacing over a length.
fn even(length: f64, parts: usize) -> Vec<f64> {
    (0..=parts)
        .map(|k| length * k as f64 / parts as f64)
        .collect()
}
