//! Force balance, shapes and ranges of the closed form.

use proptest::prelude::*;

use super::*;

fn pair() -> Pair {
    Pair {
        hole_radius: 3.125e-3,
        bearing_radius: 5e-3,
        rim_radius: 30e-3,
        thickness: [5e-3, 5e-3],
        plane_modulus: [78e9, 78e9],
    }
}

const SHAPES: [ConeShape; 4] = [
    ConeShape::Fitted,
    ConeShape::Uniform,
    ConeShape::Linear,
    ConeShape::Polynomial,
];

/// ∫ p dA by the midpoint rule in y with x = 1 − (1 − y)³, which flattens the edge.
fn carried(cone: &Cone, force: f64) -> f64 {
    const STEPS: usize = 40_000;
    let width = cone.contact_radius - cone.hole_radius;
    (0..STEPS)
        .map(|step| {
            let y = (step as f64 + 0.5) / STEPS as f64;
            let radius = cone.hole_radius + width * (1.0 - (1.0 - y).powi(3));
            let stretch = 3.0 * width * (1.0 - y).powi(2) / STEPS as f64;
            2.0 * PI * radius * cone.pressure(radius, force) * stretch
        })
        .sum()
}

#[test]
fn contact_radius_of_equal_plates_as_thick_as_the_head_radius() {
    // Closed form by hand: a/b = 0.625, t_e/b = 1: tan φ = 0.52 − 0.075 = 0.445.
    let cone = cone(&pair(), ConeRule::Fitted, ConeShape::Fitted);
    assert!((cone.contact_radius / 5e-3 - 1.445).abs() < 1e-12);
}

#[test]
fn rim_ends_the_contact() {
    let narrow = Pair {
        rim_radius: 6e-3,
        ..pair()
    };
    let cone = cone(&narrow, ConeRule::HalfAngle(PI / 4.0), ConeShape::Linear);
    assert!((cone.contact_radius - 6e-3).abs() < 1e-15);
    assert!((carried(&cone, 1.0) - 1.0).abs() < 1e-7);
}

#[test]
fn half_angle_is_returned_as_given() {
    let cone = cone(&pair(), ConeRule::HalfAngle(0.5), ConeShape::Uniform);
    assert!((cone.half_angle - 0.5).abs() < 1e-12);
}

#[test]
fn vdi_angle_of_the_example_with_an_m10() {
    // Worked example of the VDI 2230 angle: d_w 14.63, l_K 40, D_A 40 mm: tan φ = 0.5259.
    let wide = Pair {
        hole_radius: 5.5e-3,
        bearing_radius: 14.63e-3 / 2.0,
        rim_radius: 20e-3,
        thickness: [20e-3, 20e-3],
        plane_modulus: [1.0, 1.0],
    };
    let cone = cone(&wide, ConeRule::Vdi, ConeShape::Linear);
    // The example prints four digits.
    assert!((cone.half_angle.tan() - 0.5259).abs() < 5e-5);
}

#[test]
fn straight_taper_has_the_peak_known_in_closed_form() {
    let cone = cone(&pair(), ConeRule::Fitted, ConeShape::Linear);
    let (a, c) = (cone.hole_radius, cone.contact_radius);
    let exact = 3.0 / (PI * (c - a) * (c + 2.0 * a));
    assert!((cone.peak_per_force / exact - 1.0).abs() < 1e-12);
}

#[test]
fn share_within_a_radius_runs_from_nothing_to_all() {
    for shape in SHAPES {
        let cone = cone(&pair(), ConeRule::Fitted, shape);
        assert!(cone.carried_within(cone.hole_radius).abs() < 1e-15);
        assert!((cone.carried_within(cone.contact_radius * (1.0 - 1e-15)) - 1.0).abs() < 1e-12);
        let half = cone.radius_holding(0.5);
        assert!((cone.carried_within(half) - 0.5).abs() < 1e-12);
    }
}

#[test]
fn leaving_the_checked_range_is_a_caution_with_its_numbers() {
    assert_eq!(pair().caution(), None);
    let thick = Pair {
        thickness: [25e-3, 25e-3],
        ..pair()
    };
    let caution = thick.caution().unwrap();
    assert_eq!(caution.code, "pressure/cone-range");
    assert!(caution.text.contains("5.000"), "{}", caution.text);
}

proptest! {
    #![proptest_config(crate::fixed_cases(40))]

    #[test]
    fn field_carries_the_force(
        hole in 1e-3..5e-3_f64,
        bearing in 1.25..2.6_f64,
        thickness in (0.2..4.0_f64, 0.2..4.0_f64),
        moduli in 0.34..2.9_f64,
        shape in 0..4_usize,
        rim in 1.3..8.0_f64,
    ) {
        let b = hole * bearing;
        let pair = Pair {
            hole_radius: hole,
            bearing_radius: b,
            rim_radius: b * rim,
            thickness: [b * thickness.0, b * thickness.1],
            plane_modulus: [70e9, 70e9 * moduli],
        };
        let cone = cone(&pair, ConeRule::Fitted, SHAPES[shape]);
        // The midpoint rule of the check is good to a few 1e-7 where x^α starts with α < 1.
        prop_assert!((carried(&cone, 2000.0) / 2000.0 - 1.0).abs() < 1e-6);
    }
}
