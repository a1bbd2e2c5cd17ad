//! Heat through the columns against exact solutions and three-dimensional references.

#[path = "validation_columns_heat/exact.rs"]
mod exact;
#[path = "validation_columns_heat/laws.rs"]
mod laws;
#[path = "validation_columns_heat/layout.rs"]
mod layout;

use std::sync::Arc;

use ringsum::{
    numerics::columns::{Disc, Plan, Region},
    resistance::columns::{Body, Conductivity, Heat, Perfect, Slab, Stack, Terminals, solve_both},
};

/// Equal spacing over a length.
fn even(length: f64, parts: usize) -> Vec<f64> {
    (0..=parts)
        .map(|k| length * k as f64 / parts as f64)
        .collect()
}

/// A plate with its shares, of equal elements.
fn plate(shares: &[f64], (thickness, elements, degree): (f64, usize, usize)) -> Body {
    Body {
        layers: vec![Slab {
            shares: shares.to_vec(),
            heights: vec![thickness / elements as f64; elements],
            degree,
        }],
    }
}

/// Shares of a plan but for some holes.
fn holed(plan: &Plan, holes: &[Disc]) -> Vec<f64> {
    let whole = Region::sample(plan, &|_| true);
    whole.without(&Region::discs(plan, holes)).shares()
}

/// Solves a stack and holds what must hold for every solution.
fn solved(
    stack: Stack,
    terminals: &Terminals,
    conductivity: &[Conductivity],
    conductance: &[Vec<Vec<f64>>],
) -> (Heat, Perfect) {
    let stack = Arc::new(stack);
    let (_, heat, perfect) =
        solve_both(&stack, (terminals, conductivity), conductance).expect("it is solved");
    sound(&heat, &perfect);
    (heat, perfect)
}

/// Heat that enters leaves, to the bar of the project; bounds hold up to the residual.
fn sound(heat: &Heat, perfect: &Perfect) {
    assert!(heat.health.balance < 1e-8, "{:?}", heat.health);
    assert!(perfect.health.balance < 1e-8, "{:?}", perfect.health);
    let lower = heat.path(perfect).resistance_lower;
    assert!(
        heat.source_to_sink >= lower - 1e-7 * lower.abs(),
        "{} {lower}",
        heat.source_to_sink
    );
}
