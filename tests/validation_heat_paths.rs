//! Heat in and out as in practice, from the joint file through the elastic chain: several zones,
//! strips, edges, radiation, layered plates, isolating washers.
//!
//! Each check stands beside a solution of its own: closed forms of one dimension, the series of
//! Saint-Venant, a fin that radiates by the fourth power solved here, symmetry and superposition.

#[path = "shared/joints.rs"]
mod joints;

use std::{f64::consts::PI, sync::Arc};

use joints::{read, read_with};
use ringsum::{
    estimate::{Chain, Choice, Fineness, Options, Realisation, State, Watch},
    joint::{Joint, STEFAN_BOLTZMANN},
    numerics::columns::Plan,
    resistance::{
        Path,
        columns::{
            Body, Bolt, Conductivity, Edge, Rim, Seat, Sink, Slab, Source, Stack, Terminals, Zone,
            solve_both,
        },
    },
    uncertainty,
};

/// More than any of these joints takes, bytes.
const MEMORY: u64 = 4_000_000_000;
/// Length, width and thickness of both plates together, m.
const LENGTH: f64 = 0.1;
const WIDTH: f64 = 0.04;
const THICKNESS: f64 = 0.004;
/// Conductivity in the plane, W/(m K).
const IN_PLANE: f64 = 150.0;
/// Conducts so well through the thickness that every column has one temperature: 4 mm of it are
/// 4e-8 m² K/W, against 6e-4 m² K/W and more along the plates.
const SHEET: &str = "{ in_plane = \"150 W/(m·K)\", through = \"1e5 W/(m·K)\" }";

/// Two equal plates with one M1.6 in the middle, whose hole takes 6e-4 of the face.
fn text(upper: &str, lower: &str) -> String {
    format!(
        r#"
[service]
medium = "vacuum"
[[plate]]
name = "upper"
material = "Al 6061-T6"
thickness = "2 mm"
size = ["100 mm", "40 mm"]
finish = {{ roughness = "Ra 0.8 µm", flatness = "0 mm" }}
{upper}
[[plate]]
name = "lower"
material = "Al 6061-T6"
thickness = "2 mm"
size = ["100 mm", "40 mm"]
finish = {{ roughness = "Ra 0.8 µm", flatness = "0 mm" }}
{lower}
[fastener]
thread = "M1.6"
grade = "A2-70"
bearing = "3 mm"
hole = "1.8 mm"
preload = "200 N"
shank_path = false
at = [["50 mm", "20 mm"]]
"#
    )
}

fn state(joint: &Joint, fineness: Fineness) -> State {
    let choice = Choice::elastic(fineness, MEMORY);
    let chain = Chain::of(joint, choice, &Watch::none()).expect("a field");
    chain.state(0, &Realisation::default()).expect("a state")
}

/// The path of a joint, whose bounds must hold.
fn path(joint: &Joint, fineness: Fineness) -> Path {
    let path = state(joint, fineness).path;
    // Rounding: where nothing is lost between the faces the bound is met.
    let least = path.resistance_lower * (1.0 - 1e-9);
    assert!(path.source_to_sink >= least, "{path:?}");
    assert!(path.added_by_joint >= 0.0, "{path:?}");
    path
}

/// Source to sink in perfect contact, K/W.
fn perfect(upper: &str, lower: &str) -> f64 {
    path(&read(&text(upper, lower)), Fineness::Fast).perfect_contact
}

/// The same of plates that conduct along themselves alone.
fn sheet(upper: &str, lower: &str) -> f64 {
    let layered = |keys: &str| format!("conductivity = {SHEET}\n{keys}");
    perfect(&layered(upper), &layered(lower))
}

fn near(found: f64, expected: f64, tolerance: f64, what: &str) {
    let off = found / expected - 1.0;
    assert!(
        off.abs() < tolerance,
        "{what}: {found} for {expected}, {off:+.2e}"
    );
}

/// A hole in even flux lengthens the way by 2 π r²/W, here 0.13 mm; the columns do the rest.
const ONE_DIMENSIONAL: f64 = 2e-3;

#[test]
fn a_strip_to_an_edge_is_length_over_conductivity_and_section() {
    // T̄ over the heated strip of width w at the left end: (L − w)/(k A) + w/(3 k A), by hand.
    let heated = "heated = { centre = [\"5 mm\", \"20 mm\"], size = [\"10 mm\", \"40 mm\"] }";
    let found = sheet(heated, "cooled = { edge = \"right\" }");
    let section = IN_PLANE * WIDTH * THICKNESS;
    let expected = (LENGTH - 0.01 + 0.01 / 3.0) / section;
    near(found, expected, ONE_DIMENSIONAL, "strip to edge");
}

#[test]
fn one_two_and_four_edges_are_those_of_a_heated_sheet() {
    let of = |edges: &str| sheet("", &format!("cooled = {{ edge = {edges} }}"));
    let section = IN_PLANE * WIDTH * THICKNESS;
    let [left, right] = ["\"left\"", "\"right\""].map(of);
    // ∫ of T'' = −q from an insulated end to a held one: L/(3 k A).
    near(right, LENGTH / (3.0 * section), ONE_DIMENSIONAL, "one edge");
    // Mirrored; the grid need not be.
    near(left, right, 1e-4, "left as right");
    // Two halves of half the length side by side.
    let both = of("[\"left\", \"right\"]");
    near(both, right / 4.0, ONE_DIMENSIONAL, "two edges");
    // Lower and upper: the same across, length and width exchanged.
    let across = of("[\"lower\", \"upper\"]");
    let other = WIDTH / (12.0 * IN_PLANE * LENGTH * THICKNESS);
    near(across, other, 5e-3, "across");
    // All four: mean of ∇²u = −1 over a rectangle is J/(4 A), J of Saint-Venant's torsion
    // (Timoshenko & Goodier, from memory): J = a b³/3 (1 − 192/π⁵ b/a Σ tanh(nπa/2b)/n⁵), n odd.
    let (a, b) = (LENGTH, WIDTH);
    let sum: f64 = (0..20)
        .map(|k| {
            let n = f64::from(2 * k + 1);
            (n * PI * a / (2.0 * b)).tanh() / n.powi(5)
        })
        .sum();
    let torsion = a * b.powi(3) / 3.0 * (1.0 - 192.0 / PI.powi(5) * b / a * sum);
    let expected = torsion / (4.0 * a * b) / (IN_PLANE * THICKNESS * a * b);
    near(of("\"all\""), expected, 5e-3, "four edges");
    assert!(of("\"all\"") < across.min(both));
}

/// Mean of a uniformly heated sheet above the mean of a strip of it under a film, K/W.
///
/// Beside the strip T'' = −q/(k t); under it k t T'' = h T − q; the flux into the strip's ends is all
/// that is heated beside it. Solved in closed form.
fn strip(film: f64, [from, to]: [f64; 2]) -> f64 {
    let kt = IN_PLANE * THICKNESS;
    let q = 1.0 / (LENGTH * WIDTH);
    let m = (film / kt).sqrt();
    let width = to - from;
    let (left, right) = (from, LENGTH - to);
    // T = q/h + c₁ cosh(m s) + c₂ sinh(m s) from the left end, where −k t T' = q left; at the other
    // k t T' = q right.
    let c2 = -q * left / (kt * m);
    let end = q * right / kt;
    let c1 = (end / m - c2 * (m * width).cosh()) / (m * width).sinh();
    let at = |s: f64| q / film + c1 * (m * s).cosh() + c2 * (m * s).sinh();
    let under =
        q / film * width + c1 * (m * width).sinh() / m + c2 * ((m * width).cosh() - 1.0) / m;
    let beside = |length: f64, foot: f64| foot * length + q * length.powi(3) / (3.0 * kt);
    let whole = under + beside(left, at(0.0)) + beside(right, at(width));
    whole / LENGTH - under / width
}

#[test]
fn a_cooled_strip_is_a_fin() {
    let lower = |film: f64| {
        format!(
            "cooled = {{ film = \"{film} W/(m²·K)\", centre = [\"45 mm\", \"20 mm\"], size = [\"30 mm\", \"40 mm\"] }}"
        )
    };
    for film in [300.0, 20_000.0] {
        let found = sheet("", &lower(film));
        let expected = strip(film, [0.03, 0.06]);
        near(found, expected, 5e-3, "strip");
    }
    // A strip that is held is the limit of a stiff film.
    let held = "cooled = { face = \"isothermal\", centre = [\"45 mm\", \"20 mm\"], size = [\"30 mm\", \"40 mm\"] }";
    near(
        sheet("", held),
        strip(1e8, [0.03, 0.06]),
        5e-3,
        "held strip",
    );
}

#[test]
fn two_strips_of_a_film_are_one_twice_as_wide() {
    let strips = |zones: &[(f64, f64)]| {
        let tables: Vec<String> = zones
            .iter()
            .map(|(x, width)| {
                format!(
                    "{{ film = \"2000 W/(m²·K)\", centre = [\"{x} mm\", \"20 mm\"], size = [\"{width} mm\", \"40 mm\"] }}"
                )
            })
            .collect();
        sheet("", &format!("cooled = [{}]", tables.join(", ")))
    };
    let [one, two] = [
        strips(&[(50.0, 20.0)]),
        strips(&[(45.0, 10.0), (55.0, 10.0)]),
    ];
    // The same film either way; another line in the grid.
    near(two, one, 1e-3, "two strips");
}

type Reading = fn(&Path) -> f64;

#[test]
fn two_zones_superpose() {
    let heated = |first: f64, second: f64| {
        let upper = format!(
            "heated = [
              {{ centre = [\"25 mm\", \"12 mm\"], diameter = \"16 mm\", heat = \"{first:e} W\" }},
              {{ centre = [\"65 mm\", \"22 mm\"], size = [\"30 mm\", \"20 mm\"], heat = \"{second:e} W\" }},
            ]"
        );
        let lower = "cooled = { film = \"3000 W/(m²·K)\", centre = [\"50 mm\", \"20 mm\"], size = [\"90 mm\", \"10 mm\"] }";
        let joint = read(&text(&upper, lower));
        // The heat of the joint is the sum.
        let sum = joint.service.heat.expect("a sum");
        near(sum, first + second, 1e-12, "sum");
        path(&joint, Fineness::Fast)
    };
    // Mean by heat over the heat: R(q₁, q₂) = (q₁² R₁₁ + 2 q₁ q₂ R₁₂ + q₂² R₂₂)/(q₁ + q₂)².
    let [first, second, even, uneven] = [[1.0, 1e-9], [1e-9, 1.0], [1.0, 1.0], [3.0, 1.0]]
        .map(|[first, second]| heated(first, second));
    let readings: [Reading; 2] = [|path| path.source_to_sink, |path| path.perfect_contact];
    for reading in readings {
        let [r11, r22] = [&first, &second].map(reading);
        let r12 = (4.0 * reading(&even) - r11 - r22) / 2.0;
        let told = (9.0 * r11 + 6.0 * r12 + r22) / 16.0;
        // The equations are linear; gas and radiation follow the temperature of the plates, which
        // differs by two kelvin between these loads.
        near(reading(&uneven), told, 3e-4, "superposed");
        // Neither zone heats the other as much as itself.
        assert!(r12 < r11.min(r22));
    }
    // Node to node is a difference of means and adds up without cross terms.
    let told = (3.0 * first.node_to_node + second.node_to_node) / 4.0;
    near(uneven.node_to_node, told, 3e-4, "node to node");
}

#[test]
fn zones_that_overlap_add_their_fluxes() {
    // A rectangle clear of the hole, and its two halves: the same flux as one heat, or as three that overlap.
    let of = |[whole, left, right]: [f64; 3]| {
        let zone = |x: f64, width: f64, heat: f64| {
            format!(
                "{{ centre = [\"{x} mm\", \"20 mm\"], size = [\"{width} mm\", \"20 mm\"], heat = \"{heat:e} W\" }}"
            )
        };
        let zones = [
            zone(25.0, 40.0, whole),
            zone(15.0, 20.0, left),
            zone(35.0, 20.0, right),
        ];
        let upper = format!("heated = [{}]", zones.join(", "));
        perfect(&upper, "cooled = { film = \"800 W/(m²·K)\" }")
    };
    let one = of([10.0, 1e-9, 1e-9]);
    let halves = of([1e-9, 5.0, 5.0]);
    let three = of([4.0, 3.0, 3.0]);
    // The same loads, added in another order; 1e-9 W of them elsewhere.
    near(halves, one, 1e-6, "halves");
    near(three, one, 1e-6, "overlap");
    // One half of it alone is another source.
    assert!(of([1e-9, 10.0, 1e-9]) > 1.02 * one);
}

/// A sheet that radiates by the fourth power, heated over its first `share`: mean of the heated part
/// above the mean of the back, and that mean, K. Finite volumes, Newton.
fn radiating_fin(emissivity: f64, heat: f64, (surroundings, share): (f64, f64)) -> (f64, f64) {
    const CELLS: usize = 2000;
    let step = LENGTH / CELLS as f64;
    let link = IN_PLANE * THICKNESS / step;
    let heated = (share * CELLS as f64).round() as usize;
    let source = |cell: usize| {
        if cell < heated {
            heat / (WIDTH * heated as f64)
        } else {
            0.0
        }
    };
    let mut t = vec![300.0_f64; CELLS];
    for _ in 0..30 {
        // Residual and slope of every cell, then the tridiagonal system by elimination.
        let (mut diagonal, mut right) = (vec![0.0; CELLS], vec![0.0; CELLS]);
        for cell in 0..CELLS {
            let radiated = t[cell].powi(4) - surroundings.powi(4);
            right[cell] = source(cell) - emissivity * STEFAN_BOLTZMANN * step * radiated;
            diagonal[cell] = 4.0 * emissivity * STEFAN_BOLTZMANN * step * t[cell].powi(3);
            for other in [cell.wrapping_sub(1), cell + 1] {
                if other < CELLS {
                    right[cell] += link * (t[other] - t[cell]);
                    diagonal[cell] += link;
                }
            }
        }
        for cell in 1..CELLS {
            let factor = link / diagonal[cell - 1];
            diagonal[cell] -= factor * link;
            right[cell] += factor * right[cell - 1];
        }
        let mut last = 0.0;
        for cell in (0..CELLS).rev() {
            last = (right[cell] + link * last) / diagonal[cell];
            t[cell] += last;
        }
    }
    let mean = t.iter().sum::<f64>() / CELLS as f64;
    let warm = t[..heated].iter().sum::<f64>() / heated as f64;
    (warm - mean, mean)
}

#[test]
fn the_slope_meets_a_fin_that_radiates_by_the_fourth_power() {
    let heated = "heated = { centre = [\"10 mm\", \"20 mm\"], size = [\"20 mm\", \"40 mm\"] }";
    let (emissivity, heat) = (0.85, 0.6);
    // Towards the cold the chord is a third of the slope, towards warmer surroundings two thirds.
    for surroundings in [100.0, 220.0] {
        // Sheets that conduct little feel how the flux grows where they are warm.
        let thin = |keys: &str| {
            format!(
                "conductivity = {{ in_plane = \"5 W/(m·K)\", through = \"1e5 W/(m·K)\" }}\n{keys}"
            )
        };
        let scale = IN_PLANE / 5.0;
        // Scaled so that the fin of this file, of 150 W/(m K), is the same in all numbers that count.
        let (rise, mean) = radiating_fin(emissivity * scale, heat * scale, (surroundings, 0.2));
        let cooled = format!("cooled = {{ radiation = {{ emissivity = {emissivity} }} }}");
        let file = text(&thin(heated), &thin(&cooled));
        let temperature = format!("service.temperature=\"{mean} K\"");
        let joint = read_with(&file, &[&temperature, "service.heat=\"0.6 W\""]);
        let found = heat * path(&joint, Fineness::Fast).perfect_contact;
        // The rise is 6 % of the temperature; its square is what the slope leaves out, the hole beside.
        near(found, rise, 6e-3, "rise by the slope");
        // From the surroundings the reader finds the same sink, as far as one temperature stands for
        // the whole back: 6 (rise/T)²/4 of the heat.
        let stated = format!(
            "cooled = {{ radiation = {{ emissivity = {emissivity}, temperature = \"{surroundings} K\" }} }}"
        );
        let joint = read_with(
            &text(&thin(heated), &thin(&stated)),
            &["service.heat=\"0.6 W\""],
        );
        near(joint.service.cases[0].temperature, mean, 0.01, "sink");
    }
}

#[test]
fn a_radiating_back_has_no_coolant() {
    let joint = read_with(
        &text(
            "",
            "cooled = [{ radiation = 0.8 }, { film = \"5 W/(m²·K)\" }]",
        ),
        &["service.heat=\"1 W\"", "service.temperature=\"40 °C\""],
    );
    let surroundings = joint
        .assumptions
        .iter()
        .find(|each| each.field.ends_with("radiation.temperature"))
        .expect("told");
    // By hand: 250 W/m² = 5 (313.15 − Tₑ) + 0.8 σ (313.15⁴ − Tₑ⁴) at Tₑ = 288.0 K: 125.8 + 124.1.
    assert!(surroundings.value.contains("14.8"), "{surroundings:?}");
    assert_eq!(path(&joint, Fineness::Fast).coolant_drop, None);
}

#[test]
fn a_layered_plate_is_an_isotropic_one_stretched() {
    // z' = z √(k_r/k_z), k' = √(k_r k_z): the equations of an isotropic plate, face fluxes unchanged.
    let (in_plane, through) = (200.0, 12.5);
    let heated = "heated = { centre = [\"40 mm\", \"18 mm\"], diameter = \"14 mm\" }";
    let cooled = "cooled = { film = \"4000 W/(m²·K)\" }";
    let file = |conductivity: &str| {
        let keys = |own: &str| format!("conductivity = {conductivity}\n{own}");
        text(&keys(heated), &keys(cooled))
    };
    let layered =
        format!("{{ in_plane = \"{in_plane} W/(m·K)\", through = \"{through} W/(m·K)\" }}");
    let found = path(&read(&file(&layered)), Fineness::Fast);
    let stretch = f64::sqrt(in_plane / through);
    let mean = f64::sqrt(in_plane * through);
    let even = format!("{{ in_plane = \"{mean} W/(m·K)\", through = \"{mean} W/(m·K)\" }}");
    let thickness = format!("{} mm", 2.0 * stretch);
    let sets = ["upper", "lower"].map(|plate| format!("plate.{plate}.thickness=\"{thickness}\""));
    let other = read_with(&file(&even), &sets.each_ref().map(String::as_str));
    let expected = path(&other, Fineness::Fast);
    // Two grids of one problem: 0.96 % apart here at fast, 0.2 % at normal.
    near(
        found.perfect_contact,
        expected.perfect_contact,
        0.012,
        "stretched",
    );
    // Neither of the two conductivities alone comes near.
    for one in [in_plane, through] {
        let even = format!("{{ in_plane = \"{one} W/(m·K)\", through = \"{one} W/(m·K)\" }}");
        let plain = path(&read(&file(&even)), Fineness::Fast);
        let off = plain.perfect_contact / found.perfect_contact - 1.0;
        assert!(off.abs() > 0.2, "{one} W/(m K): {off}");
    }
}

#[test]
fn round_plates_carry_layers_as_the_columns_do() {
    let text = std::fs::read_to_string("tests/data/joints/round_single.toml").expect("it is there");
    let layers = ["upper", "lower"].map(|plate| {
        format!(
            "plate.{plate}.conductivity={{ in_plane = \"200 W/(m·K)\", through = \"20 W/(m·K)\" }}"
        )
    });
    let film = "plate.lower.cooled={ film = \"2000 W/(m²·K)\" }";
    let heated = "plate.upper.heated={ diameter = \"24 mm\" }";
    let sets = [layers[0].as_str(), layers[1].as_str(), film, heated];
    let round = path(&read_with(&text, &sets), Fineness::Normal);
    // Only columns follow a bolt that stands aside.
    let aside = [&sets[..], &["fastener.at=[[\"1 µm\", \"0 mm\"]]"]].concat();
    let columns = path(&read_with(&text, &aside), Fineness::Normal);
    // Plates of one conductivity differ by 0.5 and 2.5 % between the two ways: the columns smear the
    // edge of so small a contact, the more the sharper the flux turns there.
    near(
        columns.perfect_contact,
        round.perfect_contact,
        0.01,
        "perfect",
    );
    near(columns.source_to_sink, round.source_to_sink, 0.045, "whole");
    let even = path(&read_with(&text, &sets[2..]), Fineness::Normal);
    assert!((even.perfect_contact / round.perfect_contact - 1.0).abs() > 0.05);
}

const WASHERS: &str = "fastener.isolating={ material = { name = \"cast\", conductivity = \"0.25 W/(m·K)\", youngs_modulus = \"20 GPa\", expansion = \"12 µm/(m·K)\", kind = \"polymer\" }, thickness = \"1 mm\" }";

/// The joint of the washers: M5 through 4 mm, seats of 9 mm over 5.5 mm.
fn bolted(sets: &[&str]) -> Joint {
    let text = text("", "cooled = { film = \"500 W/(m²·K)\" }");
    let own = [
        "fastener.thread=M5",
        "fastener.bearing=\"9 mm\"",
        "fastener.hole=\"5.5 mm\"",
        "fastener.shank_path=true",
        "fastener.preload=\"3 kN\"",
        "fastener.at=[[\"20 mm\", \"20 mm\"]]",
    ];
    read_with(&text, &[&own[..], sets].concat())
}

#[test]
fn isolating_washers_stand_in_series_with_the_shank() {
    let [bare, washed, one] = [
        vec![],
        vec![WASHERS],
        vec![WASHERS, "fastener.isolating.under=head"],
    ]
    .map(|sets| {
        let joint = bolted(&sets);
        let chain = Chain::new(&joint).expect("a cone");
        let state = chain.state(0, &Realisation::default()).expect("a state");
        (state.conditions.shanks[0].recip(), joint)
    });
    // By hand: M5 has 14.18 mm² (ISO 898-1); grip 4 mm and 0.9 · 5 mm of ends.
    let per_length = bare.0 / 8.5e-3;
    let conductivity = 1.0 / (per_length * 14.18e-6);
    assert!((14.0..17.0).contains(&conductivity), "{conductivity}");
    // Two washers: 2 mm more of shank, and 2 mm over 0.25 W/(m K) on π/4 (9² − 5.5²) mm² = 39.86 mm².
    let washers = 2e-3 / (0.25 * 39.859e-6);
    near(washed.0, bare.0 + 2e-3 * per_length + washers, 1e-4, "both");
    let half = bare.0 + 1e-3 * per_length + washers / 2.0;
    near(one.0, half, 1e-4, "under the head");
    // A taller stack of a soft ring: more compliant, and its creep is told.
    let told = |joint: &Joint| {
        let options = Options { draws: 0, seed: 1 };
        let found = uncertainty::estimate(joint, &options).expect("a number");
        let mut codes = found.cautions.into_iter().map(|caution| caution.code);
        codes.any(|code| code == "preload/isolating-creep")
    };
    assert!(told(&washed.1) && !told(&bare.1));
}

#[test]
fn every_way_of_heat_at_once_keeps_its_balance() {
    let lines = |count: usize, length: f64| -> Vec<f64> {
        let step = |k: usize| length * k as f64 / count as f64;
        (0..=count).map(step).collect()
    };
    let plan = Plan::new(lines(40, LENGTH), lines(16, WIDTH));
    let plate = |thickness: f64| Body {
        layers: vec![Slab {
            shares: vec![1.0; 40 * 16],
            heights: vec![thickness],
            degree: 2,
        }],
    };
    let stack = Stack::new(plan, vec![plate(2e-3), plate(3e-3)]).expect("it fits");
    let stack = Arc::new(stack);
    let disc = |x: f64, radius: f64| Zone::Disc {
        centre: [x, 0.018],
        radius,
    };
    let terminals = Terminals {
        source: Source::Flux(vec![(disc(0.02, 0.008), 12.0), (disc(0.07, 0.012), 30.0)]),
        sinks: vec![
            Sink::Film {
                zone: Zone::Rectangle {
                    low: [0.03, 0.0],
                    high: [0.043, WIDTH],
                },
                coefficient: 5000.0,
            },
            Sink::Film {
                zone: Zone::Face,
                coefficient: 12.0,
            },
            Sink::Rim(Rim::Straight(Edge::East)),
            Sink::Held(disc(0.08, 0.006)),
        ],
        bolts: vec![Bolt {
            at: [0.05, 0.02],
            head: [0.003, 0.005],
            seat: Seat::Nut {
                annulus: [0.003, 0.005],
            },
            strength: 0.05,
        }],
    };
    let conductivity = [
        Conductivity::layered(500.0, 6.0),
        Conductivity::layered(20.0, 80.0),
    ];
    let (_, heat, perfect) =
        solve_both(&stack, (&terminals, &conductivity), &stack.uniform(3000.0))
            .expect("it is solved");
    assert!(heat.health.balance < 1e-8, "{:?}", heat.health);
    assert!(perfect.health.balance < 1e-8, "{:?}", perfect.health);
    let path = heat.path(&perfect);
    assert!(path.source_to_sink >= path.resistance_lower);
    // Means of the zones by their heat are the mean of the source.
    let mean = (12.0 * heat.zones[0] + 30.0 * heat.zones[1]) / 42.0;
    near(heat.source_to_sink, mean, 1e-12, "mean by heat");
}
