//! Scatter of inputs to low, nominal and high, and what dominates.
//!
//! Whole joints are drawn with a scrambled Sobol sequence from a fixed seed and run through the
//! chain; quantiles are read from the outcomes. Bolts of one joint share one friction (one lot of
//! lubricant) unless the file says otherwise: independent bolts average out.

mod answer;
mod comparison;
mod draws;
mod indices;
mod inputs;
mod media;
mod minimum;
mod ranking;
mod remedies;
mod requirement;
mod shares;
mod sweep;
mod trials;
mod verification;
mod window;
mod worst;

pub use answer::Answer;
pub use comparison::{Compared, Comparison, Contender, Sense, Verdict, comparison, side_by_side};
pub use draws::{Draws, draws};
pub use indices::{Bases, FEWEST_BASES, Index, Share, indices};
pub use inputs::{BENDING, HEAT, Input, Moves, NUMERICAL, inputs};
pub use media::{InMedium, in_media};
pub use ranking::{Ranked, Ranking, RankingOptions, Scale, Target, ranking};
pub(crate) use sweep::worst_case;
pub use sweep::{CONFIDENCE, Others, SweepOptions, sweep_along, sweep_beside, torque_sweep};
pub use trials::Alternative;
pub use verification::{Verification, verification};
pub use window::{FIRST, LAST, NOTHING, REQUIREMENT};

use crate::{
    estimate::{
        self, Band, Bent, CaseResult, Chain, Checkpoint, Driver, Estimate, Failure, Options,
        PlaneResult, Results, Rise, Sampling,
    },
    joint::{Cooling, Joint, What},
};

use requirement::judge;

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
    let mut bent: Vec<Option<Bent>> = Vec::new();
    if options.draws > 0 {
        for case in 0..found.cases.len() {
            let draws = draws(chain, (case, &requirement::asked(joint)), options)?;
            apply(&draws, joint, &mut found.cases[case]);
            bent.push(requirement::bent(joint, &draws));
            found.cases[case].worst = worst::worst(&chain.draw_plan(case)?, &draws.inputs);
            found.cases[case].draw_error = chain.draw_error(case);
        }
    }
    found.caution_of_draws();
    bent.resize(found.cases.len(), None);
    let trusted = !found.flatness_decides();
    for (case, bent) in found.cases.iter_mut().zip(bent) {
        judge(joint, case, (trusted, bent));
    }
    Ok(found)
}

fn apply(draws: &Draws, joint: &Joint, case: &mut CaseResult) {
    let band = |nominal: PlaneResult, answer: Answer| PlaneResult {
        resistance: draws.band(answer, nominal.resistance.nominal),
    };
    case.results = Results {
        contact: band(case.results.contact, Answer::Contact),
        node_to_node: band(case.results.node_to_node, Answer::NodeToNode),
        added_by_joint: band(case.results.added_by_joint, Answer::AddedByJoint),
        source_to_sink: band(case.results.source_to_sink, Answer::SourceToSink),
        perfect_contact: band(case.results.perfect_contact, Answer::PerfectContact),
    };
    if let (Some(heat), Some(rise)) = (joint.service.heat, &mut case.rise) {
        *rise = rises(draws, joint, (heat, rise));
    }
    case.sampling = sampling(draws);
    case.bent = draws.bent(Answer::SourceToSink);
    case.drivers = drivers(draws);
}

/// Temperature rises with their bands.
fn rises(draws: &Draws, joint: &Joint, (heat, nominal): (f64, &Rise)) -> Rise {
    let band = |nominal: Band, answer: Answer| {
        let drawn = draws.band(answer, nominal.nominal / heat);
        drawn.times(heat)
    };
    if !joint.scatters_heat() {
        let [source, hottest, drop] = [
            band(nominal.source, Answer::SourceToSink),
            band(nominal.hottest, Answer::Hottest),
            band(nominal.interface_drop, Answer::InterfaceDrop),
        ];
        let above = nominal
            .coolant_drop
            .map(|drop| [source.plus(drop), hottest.plus(drop)]);
        return Rise {
            source,
            hottest,
            interface_drop: drop,
            above_coolant: above,
            ..*nominal
        };
    }
    let drop = nominal.coolant_drop.map(Band::nominal);
    let drop = drop.map(|drop| band(drop, Answer::CoolantDrop));
    let ends = drop.and_then(|drop| drop.low.zip(drop.high));
    let alone = || coolant_ends(joint, nominal.coolant_drop?);
    let above = [Answer::AboveCoolant, Answer::HottestAboveCoolant];
    Rise {
        source: band(nominal.source, Answer::SourceRise),
        hottest: band(nominal.hottest, Answer::HottestRise),
        interface_drop: band(nominal.interface_drop, Answer::DropRise),
        coolant_drop: nominal.coolant_drop,
        coolant_drop_ends: alone().or(ends.map(|(low, high)| [low, high])),
        above_coolant: nominal
            .above_coolant
            .map(|each| [band(each[0], above[0]), band(each[1], above[1])]),
    }
}

/// Drop to the coolant at the quantiles of the film, K; none where the film has no spread or the heat
/// has one, and where heat leaves by more ways than one.
///
/// ```text
/// ΔT = Q/(h A)
/// ```
///
/// `h` is the film, `A` its area, `Q` the heat of the joint, all of which crosses it: exact, no draw is asked.
fn coolant_ends(joint: &Joint, nominal: f64) -> Option<[f64; 2]> {
    let alone = match &joint.sink {
        Cooling::Whole(_) => true,
        Cooling::Parts(parts) => parts.len() == 1,
    };
    let alone = alone && joint.spread_of(What::Heat).is_none();
    let film = joint.spread_of(What::Film(0)).filter(|_| alone)?;
    let [low, high] = QUANTILES.map(|quantile| film.at(2.0 * quantile - 1.0));
    Some([high, low].map(|film_there| nominal * film.nominal / film_there))
}

/// How well the draws know the ends of the bands.
fn sampling(draws: &Draws) -> Option<Sampling> {
    let course = draws.course(Answer::SourceToSink).into_iter();
    Some(Sampling {
        scrambles: draws.scrambles(),
        contact: draws.errors(Answer::Contact)?,
        node_to_node: draws.errors(Answer::NodeToNode)?,
        added_by_joint: draws.errors(Answer::AddedByJoint)?,
        source_to_sink: draws.errors(Answer::SourceToSink)?,
        course: course
            .map(|(draws, [low, high])| Checkpoint { draws, low, high })
            .collect(),
    })
}

/// Share of the variance of ln R (source to sink) by input, largest first.
fn drivers(draws: &Draws) -> Vec<Driver> {
    let shares = draws.shares.correlated();
    let inputs = draws.inputs.iter().zip(shares);
    let mut drivers: Vec<Driver> = Vec::new();
    for (input, share) in inputs {
        // Inputs of one name, such as the scatter of every bolt, are independent: their shares add.
        match drivers.iter_mut().find(|known| known.input == input.name) {
            Some(known) => known.share += share,
            None => drivers.push(Driver {
                input: input.name,
                share,
                remedy: input.remedy,
            }),
        }
    }
    drivers.sort_by(|one, other| other.share.total_cmp(&one.share));
    drivers
}
