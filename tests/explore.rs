use ringsum::{
    joint::*,
    pressure::{Pair, cone},
    resistance::{Load, Plan, Site, cells},
};
fn law(p: f64) -> f64 {
    let s = 2f64.sqrt() * 1.13137e-6;
    let m = 2f64.sqrt() * 0.1060660;
    1.25 * 167.0 * m / s * (p / 1200e6).powf(0.95)
}
fn site(at: [f64; 2], a: f64, b: f64, ro: f64, t: [f64; 2]) -> Site {
    let e = 70e9 / (1.0 - 0.33f64 * 0.33);
    Site {
        at,
        hole_radius: [a, a],
        cone: cone(
            &Pair {
                hole_radius: a,
                bearing_radius: b,
                rim_radius: ro,
                thickness: t,
                plane_modulus: [e, e],
            },
            ConeRule::Fitted,
            ConeShape::Fitted,
        ),
    }
}
fn show(name: &str, plan: &Plan, f: f64) {
    for gap in [
        0.0,
        2.6e-5 * 1e3 * 1e3 / (1e3 * (4e-6 + 0.37e-6) * 1e3) * 0.0 + 0.026 / (5e-6 + 0.37e-6),
    ] {
        let c = cells(plan);
        let forces = vec![f; plan.sites.len()];
        let sh = vec![0.0; forces.len()];
        let load = Load {
            conductance: |p: f64| law(p) + gap,
            conductivity: [167.0; 2],
            forces: &forces,
            shanks: &sh,
        };
        let p = c.solve(&load);
        println!(
            "{name} gap {gap}: {p:?}\n   err {:e} cut {:?} area {:.6e} r95 {} force {} pa {:?} peak {}",
            c.ring_error(&load),
            c.cut_share,
            c.contact_area(),
            c.radius_holding(0.95, &forces),
            c.force_carried(&forces),
            c.plate_area,
            c.peak_pressure(&forces)
        );
        let t = std::time::Instant::now();
        for _ in 0..1000 {
            std::hint::black_box(c.solve(&load));
        }
        println!("   {:?} per solve", t.elapsed() / 1000);
    }
}
#[test]
fn explore() {
    for n in [40, 100, 200, 400, 1600] {
        let d = Outline::Disc { radius: 0.03 };
        let plan = Plan {
            outlines: [(d, [0.0, 0.0]), (d, [0.0, 0.0])],
            thickness: [5e-3; 2],
            sites: vec![site([0.0, 0.0], 3.125e-3, 5e-3, 0.03, [5e-3; 2])],
            source: Source {
                zone: Zone::Face,
                isothermal: false,
            },
            sink: Sink::IsothermalBack,
            rings: n,
        };
        show(&format!("round {n}"), &plan, 2000.0);
    }
    for n in [100, 200] {
        let r = Outline::Rectangle { size: [0.08, 0.08] };
        let at = [[0.01, 0.01], [0.07, 0.01], [0.01, 0.07], [0.07, 0.07]];
        for iso in [false, true] {
            let plan = Plan {
                outlines: [(r, [0.0, 0.0]), (r, [0.0, 0.0])],
                thickness: [5e-3; 2],
                sites: at
                    .iter()
                    .map(|a| site(*a, 2.75e-3, 4.25e-3, f64::INFINITY, [5e-3; 2]))
                    .collect(),
                source: Source {
                    zone: Zone::Rectangle {
                        centre: [0.04, 0.04],
                        size: [0.04, 0.04],
                    },
                    isothermal: iso,
                },
                sink: Sink::Film(2000.0),
                rings: n,
            };
            show(&format!("case i {n} iso {iso}"), &plan, 5000.0);
            let r = Outline::Rectangle { size: [0.12, 0.08] };
            let at = [
                [0.01, 0.01],
                [0.06, 0.01],
                [0.11, 0.01],
                [0.01, 0.07],
                [0.06, 0.07],
                [0.11, 0.07],
            ];
            let t = [4e-3, 10e-3];
            let plan = Plan {
                outlines: [(r, [0.0, 0.0]), (r, [0.0, 0.0])],
                thickness: t,
                sites: at
                    .iter()
                    .map(|a| site(*a, 2.25e-3, 3.5e-3, f64::INFINITY, t))
                    .collect(),
                source: Source {
                    zone: Zone::Rectangle {
                        centre: [0.06, 0.04],
                        size: [0.04, 0.04],
                    },
                    isothermal: iso,
                },
                sink: Sink::Film(2000.0),
                rings: n,
            };
            show(&format!("case ii {n} iso {iso}"), &plan, 3000.0);
        }
    }
}
