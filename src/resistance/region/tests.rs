//! Areas against shapes known by hand and against counting points.

use proptest::prelude::*;

use super::*;

fn rectangle(low: [f64; 2], high: [f64; 2]) -> Vec<Side> {
    vec![
        Side::Line {
            normal: [1.0, 0.0],
            offset: high[0],
        },
        Side::Line {
            normal: [-1.0, 0.0],
            offset: -low[0],
        },
        Side::Line {
            normal: [0.0, 1.0],
            offset: high[1],
        },
        Side::Line {
            normal: [0.0, -1.0],
            offset: -low[1],
        },
    ]
}

#[test]
fn circle_in_a_square_keeps_its_area_until_it_touches() {
    let square = Region::new(&rectangle([-1.0, -1.0], [1.0, 1.0]));
    assert!((square.area_within(0.7) - PI * 0.49).abs() < 1e-14);
    assert!((square.area_within(f64::INFINITY) - 4.0).abs() < 1e-14);
    // r = √(5/4): four segments of half-angle acos(1/r) stand out.
    let r: f64 = 1.25_f64.sqrt();
    let out = (1.0 / r).acos();
    let exact = PI * r * r - 4.0 * (r * r * out - 0.5);
    assert!((square.area_within(r) - exact).abs() < 1e-13);
    assert!((square.farthest() - 2.0_f64.sqrt()).abs() < 1e-14);
}

#[test]
fn a_side_told_twice_counts_once() {
    let mut sides = rectangle([-1.0, -2.0], [3.0, 1.0]);
    sides.extend(rectangle([-1.0, -2.0], [3.0, 1.0]));
    assert!((Region::new(&sides).area_within(f64::INFINITY) - 12.0).abs() < 1e-13);
}

#[test]
fn two_discs_share_the_lens_known_by_hand() {
    // Unit discs one radius apart: lens = 2π/3 − √3/2.
    let lens = Region::new(&[
        Side::Circle {
            centre: [0.0, 0.0],
            radius: 1.0,
        },
        Side::Circle {
            centre: [1.0, 0.0],
            radius: 1.0,
        },
    ]);
    let exact = TAU / 3.0 - 3.0_f64.sqrt() / 2.0;
    assert!((lens.area_within(f64::INFINITY) - exact).abs() < 1e-13);
    assert!((lens.area_within(2.0) - exact).abs() < 1e-13);
}

#[test]
fn arcs_without_a_disc_lose_its_width() {
    let whole = [Arc {
        start: 0.0,
        sweep: TAU,
    }];
    // A disc of radius 1 about (1, 0) hides 120° of the unit circle.
    let left: f64 = outside_disc(&whole, 1.0, ([1.0, 0.0], 1.0))
        .iter()
        .map(|arc| arc.sweep)
        .sum();
    assert!((left - 2.0 * TAU / 3.0).abs() < 1e-13);
}

#[test]
fn the_farthest_point_is_a_corner_or_the_far_side_of_a_circle() {
    let circle = |x: f64, radius: f64| Side::Circle {
        centre: [x, 0.0],
        radius,
    };
    let line = |normal: [f64; 2], offset: f64| Side::Line { normal, offset };
    // The far side of a whole circle.
    let whole = Region::new(&[circle(0.5, 1.0)]);
    assert!((whole.farthest() - 1.5).abs() < 1e-14);
    // Cut at x = 0.2 the circle about (0.5, 0) ends in corners at y = ±√(1 − 0.09).
    let part = Region::new(&[circle(0.5, 1.0), line([1.0, 0.0], 0.2)]);
    let corner = 0.2_f64.hypot(0.91_f64.sqrt());
    assert!((part.farthest() - corner).abs() < 1e-14);
    // On either side of y = x/2 + 0.3 the same corners, or the far side.
    let normal = [-0.5, 1.0].map(|part: f64| part / 1.25_f64.sqrt());
    let offset = 0.3 / 1.25_f64.sqrt();
    // Where they meet: x² − x + 1/4 + (x/2 + 0.3)² = 1.
    let (a, b, c) = (1.25, -0.7, 0.25 + 0.09 - 1.0);
    let root = f64::sqrt(b * b - 4.0 * a * c);
    let corners = [-1.0, 1.0].map(|sign| {
        let x: f64 = (-b + sign * root) / (2.0 * a);
        x.hypot(0.5 * x + 0.3)
    });
    let above = Region::new(&[circle(0.5, 1.0), line(normal.map(|part| -part), -offset)]);
    assert!((above.farthest() - corners[0].max(corners[1])).abs() < 1e-13);
    let below = Region::new(&[circle(0.5, 1.0), line(normal, offset)]);
    assert!((below.farthest() - 1.5).abs() < 1e-13);
    // A lens of unit circles about 0 and (1, 0): its points lie at (0.5, ±√0.75), its far side at 1.
    let lens = Region::new(&[circle(0.0, 1.0), circle(1.0, 1.0)]);
    assert!((lens.farthest() - 1.0).abs() < 1e-14);
}

#[test]
fn a_region_holds_the_disc_that_touches_its_nearest_side() {
    let circle = Side::Circle {
        centre: [0.3, 0.4],
        radius: 2.0,
    };
    let line = Side::Line {
        normal: [0.0, 1.0],
        offset: 1.7,
    };
    // 2 − 0.5 from the circle, 1.7 from the line.
    for (sides, nearest) in [
        (vec![circle], 1.5),
        (vec![line], 1.7),
        (vec![line, circle], 1.5),
    ] {
        let region = Region::new(&sides);
        assert!(region.holds_disc(nearest - 1e-9) && !region.holds_disc(nearest + 1e-9));
    }
}

const STEPS: u32 = 4000;

proptest! {
    #![proptest_config(crate::fixed_cases(60))]

    #[test]
    fn area_grows_by_the_arcs(
        low in (-3.0..-0.2_f64, -3.0..-0.2_f64),
        high in (0.2..3.0_f64, 0.2..3.0_f64),
        cut in (0.0..TAU, 0.3..2.0_f64),
        disc in (-1.0..1.0_f64, -1.0..1.0_f64, 1.5..3.0_f64),
        radius in 0.1..4.0_f64,
    ) {
        let mut sides = rectangle([low.0, low.1], [high.0, high.1]);
        sides.push(Side::Line { normal: [cut.0.cos(), cut.0.sin()], offset: cut.1 });
        sides.push(Side::Circle { centre: [disc.0, disc.1], radius: disc.2 });
        let region = Region::new(&sides);
        let counted: f64 = (0..STEPS)
            .map(|step| {
                let r = radius * (f64::from(step) + 0.5) / f64::from(STEPS);
                let sweep: f64 = region.arcs(r).iter().map(|arc| arc.sweep).sum();
                r * sweep * radius / f64::from(STEPS)
            })
            .sum();
        // The midpoint rule meets square-root kinks where circles touch sides: about n^-1.5.
        prop_assert!((region.area_within(radius) - counted).abs() < 1e-4 * radius * radius);
    }

    #[test]
    fn a_region_beside_the_axis_has_its_area(
        low in (0.3..2.0_f64, -2.0..2.0_f64),
        size in (0.1..2.0_f64, 0.1..2.0_f64),
    ) {
        let region = Region::new(&rectangle([low.0, low.1], [low.0 + size.0, low.1 + size.1]));
        prop_assert!((region.area_within(f64::INFINITY) - size.0 * size.1).abs() < 1e-12);
        prop_assert!(region.area_within(0.29).abs() < 1e-12);
    }
}
