//! Refuses what is no joint before a grid is laid over it.

use crate::pressure::elastic::{Annulus, Body, Bolt, End, Failure, Interface, Problem};

/// Whether every number of a problem can be computed with.
pub(super) fn sound(problem: &Problem) -> Result<(), Failure> {
    require(problem.bodies.len() >= 2, "there are fewer than two bodies")?;
    require(
        problem.interfaces.len() + 1 == problem.bodies.len(),
        "interfaces are not one fewer than bodies",
    )?;
    require(!problem.bolts.is_empty(), "there is no bolt")?;
    require(
        problem.bolts.iter().any(|bolt| bolt.force > 0.0),
        "no bolt clamps",
    )?;
    problem.bodies.iter().try_for_each(body)?;
    problem.interfaces.iter().try_for_each(interface)?;
    problem
        .bolts
        .iter()
        .try_for_each(|one| bolt(problem, one))?;
    require(
        problem.stops.iter().flatten().all(|stop| stop.is_finite()),
        "a stop is not a number",
    )
}

fn require(holds: bool, what: &str) -> Result<(), Failure> {
    if holds {
        Ok(())
    } else {
        Err(Failure::Unsound { what: what.into() })
    }
}

fn positive(value: f64) -> bool {
    value > 0.0 && value.is_finite()
}

fn body(body: &Body) -> Result<(), Failure> {
    require(body.main < body.layers.len(), "a body has no main layer")?;
    let spans = body
        .bounds
        .iter()
        .all(|[low, high]| low.is_finite() && high.is_finite() && low < high);
    require(spans, "the bounds of a body are not a rectangle")?;
    for layer in &body.layers {
        require(positive(layer.thickness), "a thickness is not positive")?;
        require(
            positive(layer.youngs_modulus),
            "a Young's modulus is not positive",
        )?;
        require(
            layer.poisson > -1.0 && layer.poisson < 0.5,
            "a Poisson's ratio is not between −1 and 0.5",
        )?;
        let inlay = layer.inlay.is_none_or(|inlay| {
            positive(inlay.youngs_modulus) && inlay.poisson > -1.0 && inlay.poisson < 0.5
        });
        require(inlay, "an inlay has no modulus or Poisson's ratio")?;
        let through = layer.through.is_none_or(|through| {
            (1..=8).contains(&through.elements) && (1..=3).contains(&through.degree)
        });
        require(through, "a layer has no polynomials of degree 1 to 3")?;
    }
    Ok(())
}

fn interface(interface: &Interface) -> Result<(), Failure> {
    require(
        positive(interface.compliance.stiffness()),
        "the stiffness of an interface is not positive",
    )
}

fn ring(ring: Annulus) -> bool {
    ring.inner >= 0.0 && ring.inner < ring.outer && ring.outer.is_finite()
}

fn bolt(problem: &Problem, bolt: &Bolt) -> Result<(), Failure> {
    require(
        bolt.at.iter().all(|at| at.is_finite()),
        "the place of a bolt is not a number",
    )?;
    require(
        bolt.force >= 0.0 && bolt.force.is_finite(),
        "the force of a bolt is below zero",
    )?;
    require(ring(bolt.head), "the seat of a head is not a ring")?;
    require(
        bolt.hole_radii.len() == problem.bodies.len(),
        "a bolt does not have one hole radius for each body",
    )?;
    require(
        bolt.hole_radii
            .iter()
            .all(|radius| *radius >= 0.0 && radius.is_finite()),
        "the radius of a hole is negative",
    )?;
    require(
        bolt.hole_radii[0] < bolt.head.outer,
        "a head falls through its hole",
    )?;
    let last = problem.bodies.len() - 1;
    match bolt.end {
        End::Nut(seat) => require(
            ring(seat) && bolt.hole_radii[last] < seat.outer,
            "the seat of a nut is not a ring outside its hole",
        ),
        End::Thread { radius, length } => {
            require(positive(radius), "the radius of a thread is not positive")?;
            let thickness = problem.bodies[last].thickness();
            // Rounding of a length computed from the same thickness is no fault.
            require(
                positive(length) && length <= thickness * (1.0 + 1e-9),
                "a thread is longer than its body is thick",
            )
        }
    }
}
