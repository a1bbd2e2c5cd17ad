//! The closed-form cone against this program's own solution of the elastic contact.
//!
//! The cone was fitted to an independent finite-element program; the solver here is a second one,
//! itself checked in `validation_round.rs`. Between the fitted cases the cone may only be trusted
//! as far as this test asks.

use std::f64::consts::TAU;

use ringsum::{
    joint::{ConeRule, ConeShape},
    numerics::{quadrature, sampling::Sobol},
    pressure::{
        Pair, cone,
        round::{FaceFriction, HeadModel, Problem, solve},
    },
};

/// A pair of plates inside the range of the fit; bearing radius 1.
fn problem(at: &[f64]) -> Problem {
    let between = |place: f64, low: f64, high: f64| low * (high / low).powf(place);
    let thin = between(at[0], 0.25, 2.0);
    Problem {
        hole_radius: between(at[1], 0.45, 0.78),
        bearing_radius: 1.0,
        rim_radius: 8.0,
        thickness: [thin, thin * between(at[2], 1.0, 3.0)],
        youngs_modulus: [1.0, between(at[3], 1.0 / 2.0, 3.0)],
        poisson: [0.33; 2],
        head: HeadModel::Uniform,
        faces: FaceFriction::Frictionless,
        tolerance: 0.003,
    }
}

#[test]
fn cone_stays_near_the_solved_contact() {
    let sobol = Sobol::new(4, 7);
    let mut at = [0.0; 4];
    let mut worst = [0.0f64; 2];
    for index in 0..48 {
        sobol.point(index, &mut at);
        let problem = problem(&at);
        let solved = solve(&problem).expect("the contact converges");
        let modulus =
            |plate: usize| problem.youngs_modulus[plate] / (1.0 - problem.poisson[plate].powi(2));
        let fitted = cone(
            &Pair {
                hole_radius: problem.hole_radius,
                bearing_radius: problem.bearing_radius,
                rim_radius: problem.rim_radius,
                thickness: problem.thickness,
                plane_modulus: [modulus(0), modulus(1)],
            },
            ConeRule::Fitted,
            ConeShape::Fitted,
        );
        // ∫ p^0.95 dA of both fields: the ring sum up to a factor.
        let ring_sum = |pressure: &dyn Fn(f64) -> f64, edge: f64| {
            let sum = |r: f64| TAU * r * pressure(r).max(0.0).powf(0.95);
            quadrature::adaptive(sum, &[problem.hole_radius, 1.0f64.min(edge), edge], 1e-6).value
        };
        let off = [
            fitted.contact_radius / solved.contact_radius - 1.0,
            ring_sum(&|r| fitted.pressure(r, 1.0), fitted.contact_radius)
                / ring_sum(&|r| solved.pressure(r, 1.0), solved.contact_radius)
                - 1.0,
        ];
        for (worst, off) in worst.iter_mut().zip(off) {
            *worst = worst.max(off.abs());
        }
    }
    // What the fit claims on its own cases.
    assert!(worst[0] < 0.04, "contact radius off by {}", worst[0]);
    assert!(worst[1] < 0.006, "ring sum off by {}", worst[1]);
    println!(
        "worst: contact radius {:.4}, ring sum {:.4}",
        worst[0], worst[1]
    );
}
