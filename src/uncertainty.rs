//! Scatter of inputs to low, nominal and high, and what dominates.
//!
//! Whole joints are drawn with a scrambled Sobol sequence from a fixed seed and run through the
//! chain; quantiles are read from the outcomes. Bolts of one joint share one friction (one lot of
//! lubricant), which is the unfavourable reading: independent bolts would average out.

mod comparison;
mod inputs;
mod media;
mod minimum;
mod sweep;

pub use comparison::{Compared, Comparison, Contender, Sense, Verdict, comparison, side_by_side};
pub use inputs::{Input, inputs};
pub use media::{InMedium, in_media};
pub(crate) use sweep::worst_case;
pub use sweep::{SweepOptions, sweep_along, torque_sweep};

use rayon::prelude::*;

use crate::{
    estimate::{
        self, Band, CaseResult, Chain, Driver, Estimate, Failure, LARGE_ERROR, Met, Options,
        PlaneResult, Realisation, RequirementResult, Results, Rise, State,
    },
    joint::{Joint, Limit, Plane, Requirement, RequirementKind},
    numerics::sampling::{Sobol, quantile},
};

/// Quantiles that bound every band.
pub const QUANTILES: [f64; 2] = [0.05, 0.95];

/// The chain at nominal inputs, the band of the draws around it, and what dominates the band.
pub fn estimate(joint: &Joint, options: &Options) -> Result<Estimate, Failure> {
    along(&Chain::new(joint)?, options)
}

/// The same for a joint whose chain is prepared.
pub fn along(chain: &Chain, options: &Options) -> Result<Estimate, Failure> {
    let joint = chain.joint();
    let mut found = estimate::nominal(chain, options)?;
    if options.draws > 0 {
        for case in 0..found.cases.len() {
            let draws = draws(chain, case, options)?;
            apply(&draws, joint, &mut found.cases[case]);
            found.cases[case].draw_error = chain.draw_error(case);
        }
    }
    found.caution_of_draws();
    let trusted = !found.flatness_decides();
    for case in &mut found.cases {
        judge(joint, case, trusted);
    }
    Ok(found)
}

/// What one draw leaves behind: resistances in K/W, and where every input lay.
#[derive(Clone, Debug)]
pub(crate) struct Drawn {
    /// Faying faces alone.
    contact: f64,
    node_to_node: f64,
    added_by_joint: f64,
    source_to_sink: f64,
    perfect_contact: f64,
    hottest: f64,
    interface_drop: f64,
    readings: Vec<f64>,
}

/// The draws of one case with the inputs they moved.
pub(crate) struct Draws {
    inputs: Vec<Input>,
    drawn: Vec<Drawn>,
}

/// Draws whole joints; the order of the draws, not of the threads, orders the outcome.
pub(crate) fn draws(chain: &Chain, case: usize, options: &Options) -> Result<Draws, Failure> {
    chain.expect_draws(case)?;
    let inputs = inputs(chain);
    let sobol = Sobol::new(inputs.len(), options.seed);
    let drawn = (0..options.draws)
        .into_par_iter()
        .map_init(
            || vec![0.0; inputs.len()],
            |point, index| {
                sobol.point(index, point);
                let mut at = Realisation::default();
                for (input, u) in inputs.iter().zip(point.iter()) {
                    (input.place)(&mut at, *u);
                }
                let state = chain.state(case, &at)?;
                let readings = inputs.iter().map(|input| (input.reading)(&at)).collect();
                Ok(outcome(&state, readings))
            },
        )
        .collect::<Result<Vec<Drawn>, Failure>>()?;
    Ok(Draws { inputs, drawn })
}

fn outcome(state: &State, readings: Vec<f64>) -> Drawn {
    Drawn {
        contact: state.path.contact.recip(),
        node_to_node: state.path.node_to_node,
        added_by_joint: state.path.added_by_joint,
        source_to_sink: state.path.source_to_sink,
        perfect_contact: state.path.perfect_contact,
        hottest: state.path.hottest,
        interface_drop: state.path.interface_drop,
        readings,
    }
}

impl Draws {
    /// The band of one outcome around its nominal value; it always holds the nominal.
    pub(crate) fn band(&self, nominal: f64, of: impl Fn(&Drawn) -> f64) -> Band {
        let mut values: Vec<f64> = self.drawn.iter().map(of).collect();
        values.sort_by(f64::total_cmp);
        let [low, high] = QUANTILES.map(|p| quantile(&values, p));
        Band {
            low: Some(low.min(nominal)),
            nominal,
            high: Some(high.max(nominal)),
        }
    }

    /// Band of the source-to-sink resistance.
    pub(crate) fn source_to_sink(&self, nominal: f64) -> Band {
        self.band(nominal, |drawn| drawn.source_to_sink)
    }

    /// Band of the contact-only resistance.
    pub(crate) fn contact(&self, nominal: f64) -> Band {
        self.band(nominal, |drawn| drawn.contact)
    }

    /// Band of what the joint adds.
    pub(crate) fn added_by_joint(&self, nominal: f64) -> Band {
        self.band(nominal, |drawn| drawn.added_by_joint)
    }

    /// Share of the variance of ln R (source to sink) by input, largest first.
    ///
    /// ```text
    /// share = corr(x, ln R)²
    /// ```
    ///
    /// The first-order share where ln R is linear in the inputs; what is left to 1 is curvature
    /// and interaction.
    fn drivers(&self) -> Vec<Driver> {
        let outcome: Vec<f64> = self
            .drawn
            .iter()
            .map(|drawn| drawn.source_to_sink.ln())
            .collect();
        let mut drivers: Vec<Driver> = self
            .inputs
            .iter()
            .enumerate()
            .map(|(place, input)| Driver {
                input: input.name,
                share: correlation(
                    self.drawn.iter().map(|drawn| drawn.readings[place]),
                    &outcome,
                )
                .powi(2),
                remedy: input.remedy,
            })
            .collect();
        drivers.sort_by(|one, other| other.share.total_cmp(&one.share));
        drivers
    }
}

/// Pearson correlation; 0 where either side does not move or is not finite.
fn correlation(inputs: impl Iterator<Item = f64> + Clone, outcome: &[f64]) -> f64 {
    let count = outcome.len() as f64;
    let mean_in = inputs.clone().sum::<f64>() / count;
    let mean_out = outcome.iter().sum::<f64>() / count;
    let (mut both, mut of_in, mut of_out) = (0.0, 0.0, 0.0);
    for (x, y) in inputs.zip(outcome) {
        both += (x - mean_in) * (y - mean_out);
        of_in += (x - mean_in).powi(2);
        of_out += (y - mean_out).powi(2);
    }
    let correlation = both / (of_in * of_out).sqrt();
    if correlation.is_finite() {
        correlation
    } else {
        0.0
    }
}

fn apply(draws: &Draws, joint: &Joint, case: &mut CaseResult) {
    let band = |nominal: PlaneResult, of: fn(&Drawn) -> f64| PlaneResult {
        resistance: draws.band(nominal.resistance.nominal, of),
    };
    case.results = Results {
        contact: band(case.results.contact, |drawn| drawn.contact),
        node_to_node: band(case.results.node_to_node, |drawn| drawn.node_to_node),
        added_by_joint: band(case.results.added_by_joint, |drawn| drawn.added_by_joint),
        source_to_sink: band(case.results.source_to_sink, |drawn| drawn.source_to_sink),
        perfect_contact: band(case.results.perfect_contact, |drawn| drawn.perfect_contact),
    };
    if let (Some(heat), Some(rise)) = (joint.service.heat, &mut case.rise) {
        let scaled = |nominal: f64, of: fn(&Drawn) -> f64| {
            let band = draws.band(nominal / heat, of);
            Band {
                low: band.low.map(|low| low * heat),
                nominal,
                high: band.high.map(|high| high * heat),
            }
        };
        *rise = Rise {
            source: scaled(rise.source.nominal, |drawn| drawn.source_to_sink),
            hottest: scaled(rise.hottest.nominal, |drawn| drawn.hottest),
            interface_drop: scaled(rise.interface_drop.nominal, |drawn| drawn.interface_drop),
            coolant_drop: rise.coolant_drop,
        };
    }
    case.drivers = draws.drivers();
}

/// Holds the requirement against the unfavourable end of the band; a field that is not trusted
/// leaves what it meets uncertain.
fn judge(joint: &Joint, case: &mut CaseResult, trusted: bool) {
    case.requirement = joint.service.require.and_then(|require| {
        let band = limited(case, require)?;
        let unfavourable = match require.bound {
            Limit::Most => band.high,
            Limit::Least => band.low,
        };
        let holds = |value: f64| match require.bound {
            Limit::Most => value <= require.limit,
            Limit::Least => value >= require.limit,
        };
        // What the grid does not resolve meets nothing for sure.
        let trusted = trusted && case.numerical_error <= LARGE_ERROR;
        let met = match (holds(band.nominal), unfavourable.map(holds)) {
            (true, Some(true)) if trusted => Met::Yes,
            (true, _) => Met::Uncertain,
            (false, _) => Met::No,
        };
        Some(RequirementResult {
            kind: require.kind,
            limit: require.limit,
            bound: require.bound,
            value: unfavourable.unwrap_or(band.nominal),
            met,
        })
    });
}

/// The band of the limited quantity; none where it needs heat and none is stated.
fn limited(case: &CaseResult, require: Requirement) -> Option<Band> {
    Some(match require.kind {
        RequirementKind::Rise => case.rise?.source,
        RequirementKind::HottestRise => case.rise?.hottest,
        RequirementKind::InterfaceDrop => case.rise?.interface_drop,
        RequirementKind::Resistance(plane) => resistance(case, plane),
        RequirementKind::Conductance(plane) => resistance(case, plane).inverse(),
    })
}

fn resistance(case: &CaseResult, plane: Plane) -> Band {
    match plane {
        Plane::Contact => case.results.contact,
        Plane::NodeToNode => case.results.node_to_node,
        Plane::AddedByJoint => case.results.added_by_joint,
        Plane::SourceToSink => case.results.source_to_sink,
    }
    .resistance
}
