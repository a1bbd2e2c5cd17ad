//! Heat through layers and parts of layers: series, parallel, a sheet as a fin over its core.

use std::f64::consts::PI;

use ringsum::{
    numerics::columns::{Disc, Fine, Plan, Region, Stop, lines},
    resistance::columns::{
        Body, Conductivity, Part, Perfect, Sink, Slab, Source, Stack, Terminals, Zone,
    },
};

use crate::even;

fn slab(plan: &Plan, height: f64) -> Slab {
    Slab {
        shares: vec![1.0; plan.cells()],
        heights: vec![height],
        degree: 2,
    }
}

fn terminals(source: Source) -> Terminals {
    Terminals {
        source,
        sinks: vec![Sink::Held(Zone::Face)],
        bolts: Vec::new(),
    }
}

/// Source to sink as if the bodies were one, K/W.
fn merged(stack: &Stack, source: Source, conductivity: &[Conductivity]) -> f64 {
    let found = Perfect::new(stack, &terminals(source), conductivity).expect("it is solved");
    found.source_to_sink
}

// Textbook, from memory: slabs in series, R = Σ t/(k A). Uniform over the plan; 1e-9 is the residual.
#[test]
fn layers_in_series_conduct_as_the_slab() {
    let plan = Plan::new(even(0.06, 5), even(0.04, 4));
    let layers = [0.5e-3, 19e-3, 0.7e-3];
    let panel = Body {
        layers: layers.map(|height| slab(&plan, height)).to_vec(),
    };
    let base = Body {
        layers: vec![slab(&plan, 4e-3)],
    };
    let core = Part {
        shares: vec![1.0; plan.cells()],
        conductivity: Conductivity::layered(0.6, 1.2),
    };
    let stack = Stack::new(plan, vec![base, panel]).expect("it fits");
    let stack = stack.made_of((1, 1), vec![core]).expect("it fits");
    let conductivity = [167.0, 120.0].map(Conductivity::isotropic);
    let whole = Source::Flux(vec![(Zone::Face, 1.0)]);
    let found = merged(&stack, whole, &conductivity);
    let exact = (4e-3 / 167.0 + 1.2e-3 / 120.0 + 19e-3 / 1.2) / (0.06 * 0.04);
    let off = found / exact - 1.0;
    assert!(off.abs() < 1e-9, "{off}");
}

// Textbook, from memory: conductances of parallel parts add. With one ratio of both halves in either body
// no heat crosses from part to part; 3e-4: held faces give by 1e-4 of a slab, and more under better parts.
#[test]
fn parts_beside_each_other_conduct_in_parallel() {
    let plan = Plan::new(even(0.06, 6), even(0.04, 4));
    let body = |height: f64| Body {
        layers: vec![slab(&plan, height)],
    };
    let half = Region::sample(&plan, &|[x, _]| x < 0.02).shares();
    let part = |conductivity: f64| Part {
        shares: half.clone(),
        conductivity: Conductivity::isotropic(conductivity),
    };
    let stack = Stack::new(plan.clone(), vec![body(4e-3), body(9e-3)]).expect("it fits");
    let stack = stack.made_of((0, 0), vec![part(50.0)]).expect("it fits");
    let stack = stack.made_of((1, 0), vec![part(5.0)]).expect("it fits");
    let conductivity = [10.0, 1.0].map(Conductivity::isotropic);
    let source = Source::Isothermal(vec![Zone::Face]);
    let found = merged(&stack, source, &conductivity);
    let of = |k: f64, width: f64| width * 0.04 / (4e-3 / k + 9e-3 / (0.1 * k));
    let exact = 1.0 / (of(50.0, 0.02) + of(10.0, 0.04));
    let off = found / exact - 1.0;
    assert!(off.abs() < 3e-4, "{off}");
}

/// Modified Bessel functions I₁ and K₁ by their integrals.
fn bessel(x: f64) -> [f64; 2] {
    let parts = 20_000;
    let sum = |from: f64, to: f64, f: &dyn Fn(f64) -> f64| {
        let step = (to - from) / f64::from(parts);
        let middles = (0..parts).map(|part| from + (f64::from(part) + 0.5) * step);
        step * middles.map(f).sum::<f64>()
    };
    let i = sum(0.0, PI, &|angle| (x * angle.cos()).exp() * angle.cos()) / PI;
    let k = sum(0.0, 12.0, &|t| (-x * t.cosh()).exp() * t.cosh());
    [i, k]
}

/// Error of the mean rise over an evenly heated disc on a sheet over its core, with cells of a share of
/// the disc's radius; the fin's answer is
///
/// ```text
/// R = (1 − 2 I₁(ma) K₁(ma)) t_c/(k_c π a²),  m² = k_c/(t_c k t)
/// ```
fn fin(share: f64) -> f64 {
    let (sheet, core) = ((150.0, 0.5e-3), (1.0, 10e-3));
    let (radius, half) = (0.02, 0.22);
    let stops = [-half, half, 0.0].map(|at| Stop { at, rank: 0 });
    let fine = [Fine {
        at: 0.0,
        reach: 1.5 * radius,
        spacing: share * radius,
    }];
    let along = lines(&stops, &fine, 0.25, 0.6 * share.sqrt() * radius);
    let plan = Plan::new(along.clone(), along);
    let upper = Body {
        layers: vec![slab(&plan, 0.4 * sheet.1)],
    };
    // Lowest first: the core below the rest of the sheet.
    let lower = Body {
        layers: vec![slab(&plan, core.1), slab(&plan, 0.6 * sheet.1)],
    };
    let part = Part {
        shares: vec![1.0; plan.cells()],
        conductivity: Conductivity::layered(1e-3, core.0),
    };
    let stack = Stack::new(plan, vec![upper, lower]).expect("it fits");
    let stack = stack.made_of((1, 0), vec![part]).expect("it fits");
    let disc = Zone::Disc {
        centre: [0.0, 0.0],
        radius,
    };
    let source = Source::Flux(vec![(disc, 1.0)]);
    let found = merged(&stack, source, &[Conductivity::isotropic(sheet.0); 2]);
    let through = core.0 / core.1;
    let [i, k] = bessel(radius * (through / (sheet.0 * sheet.1)).sqrt());
    let exact = (1.0 - 2.0 * i * k) / (through * PI * radius * radius);
    found / exact - 1.0
}

// Disc on a sheet over a core that is held below (textbook, from memory); here ma = 0.73. Cells of a
// quarter and of an eighth of the radius: 1 % and 3 ‰, of which the drop through the sheet is 0.1 ‰ and
// the square sheet that ends after 8 lengths of decay below 1 ‰.
#[test]
fn a_sheet_spreads_as_a_fin_over_its_core() {
    let [coarse, fine] = [0.25, 0.125].map(fin);
    assert!(coarse.abs() < 1e-2, "{coarse} {fine}");
    assert!(
        fine.abs() < 3e-3 && fine.abs() < 0.5 * coarse.abs(),
        "{coarse} {fine}"
    );
}

#[test]
fn parts_that_do_not_fit_are_refused() {
    let plan = Plan::new(even(0.06, 3), even(0.04, 2));
    let disc = Disc {
        centre: [0.03, 0.02],
        radius: 0.01,
    };
    let holed = Region::sample(&plan, &|_| true).without(&Region::discs(&plan, &[disc]));
    let body = |shares: Vec<f64>| Body {
        layers: vec![Slab {
            shares,
            heights: vec![4e-3],
            degree: 2,
        }],
    };
    let made = |at: (usize, usize), part: Part| {
        let bodies = vec![body(holed.shares()), body(vec![1.0; plan.cells()])];
        let stack = Stack::new(plan.clone(), bodies).expect("it fits");
        stack.made_of(at, vec![part]).is_ok()
    };
    let part = |share: f64, conductivity: f64| Part {
        shares: vec![share; 6],
        conductivity: Conductivity::isotropic(conductivity),
    };
    assert!(made((1, 0), part(1.0, 2.0)));
    // More than the layer fills, no such layer, no such body, nothing that conducts, too few shares.
    assert!(!made((0, 0), part(1.0, 2.0)));
    assert!(!made((1, 1), part(1.0, 2.0)) && !made((2, 0), part(1.0, 2.0)));
    assert!(!made((1, 0), part(1.0, 0.0)) && !made((1, 0), part(f64::NAN, 1.0)));
    let short = Part {
        shares: vec![1.0; 5],
        conductivity: Conductivity::isotropic(1.0),
    };
    assert!(!made((1, 0), short));
}
