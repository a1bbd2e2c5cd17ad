//! How long the stages of the chain take on the six-bolt demo.

use std::{hint::black_box, sync::OnceLock};

use ringsum::{
    estimate::{Chain, Options, Realisation},
    joint::{self, Joint},
    uncertainty,
};

fn main() {
    divan::main();
}

const TEXT: &str = include_str!("../joints/converter_box.toml");

fn demo() -> &'static Joint {
    static JOINT: OnceLock<Joint> = OnceLock::new();
    JOINT.get_or_init(|| joint::read(TEXT).expect("the demo joint is good"))
}

#[divan::bench]
fn read_the_file() -> Joint {
    joint::read(black_box(TEXT)).expect("the demo joint is good")
}

#[divan::bench]
fn prepare_the_chain() -> usize {
    let chain = Chain::new(black_box(demo())).expect("the demo joint has a chain");
    chain.cells().map_or(0, |cells| cells.cut_share.len())
}

#[divan::bench]
fn one_draw(bencher: divan::Bencher) {
    let chain = Chain::new(demo()).expect("the demo joint has a chain");
    bencher.bench_local(|| chain.state(0, black_box(&Realisation::default())));
}

#[divan::bench(args = [0, 1024])]
fn estimate(draws: u32) -> f64 {
    let options = Options { draws, seed: 1 };
    let found = uncertainty::estimate(demo(), &options).expect("the demo joint has a number");
    found.cases[0].results.source_to_sink.resistance.nominal
}
