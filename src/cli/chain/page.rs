//! What a page tells of a joint, gathered from as few solved chains as will do.

use crate::{
    cli::{
        chain::{Choice, Entry, Fields, Losses, Task, compared},
        console::Trouble,
    },
    estimate::{self, Chain, Failure, FieldMap, Fineness, Options, TorqueSweep},
    joint::{Joint, Medium, Tightening},
    uncertainty::{
        self, Comparison, FEWEST_BASES, InMedium, Ranking, RankingOptions, SweepOptions, Target,
    },
};

/// How much of a page stands on the field that its results stand on.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Effort {
    /// Torque table and variants stand on a fast field, nominal alone.
    Split,
    /// All of it, with its draws.
    Whole,
}

/// What is asked of a page.
#[derive(Clone, Copy, Debug)]
pub struct Asked {
    /// Draws and seed.
    pub options: Options,
    /// Where to save time.
    pub effort: Effort,
    /// Number of torques.
    pub torques: usize,
    /// Points across a map.
    pub columns: usize,
    /// Points across a map whose values are read under the pointer.
    pub pointed: usize,
}

/// What a page tells.
#[derive(Clone, Debug)]
pub struct Handed {
    /// Results with their bands, and the fields for the drawings.
    pub fields: Fields,
    /// The fields of the interfaces of a stack after the first.
    pub further: Vec<Fields>,
    /// The fields for the pointer.
    pub pointed: Pointed,
    /// Resistance against torque; none where no group is tightened by torque.
    pub torque: Option<TorqueSweep>,
    /// The joint in its own medium and in another.
    pub media: Vec<InMedium>,
    /// What drives the band; none without draws.
    pub ranking: Option<Ranking>,
    /// The variants with their pressures; none where there is one version.
    pub comparison: Option<(Comparison, Vec<FieldMap>)>,
    /// What could not be computed, and why.
    pub left_out: Vec<String>,
}

/// Fields at the points of the pointer.
#[derive(Clone, Debug)]
pub struct Pointed {
    /// Pressure, gap and conductance.
    pub map: FieldMap,
    /// Temperatures and flux; none for the cone.
    pub heat: Option<estimate::HeatMap>,
}

/// Works out what a page tells; versions of the joint beside it are compared.
///
/// One chain is solved for results, fields, drivers and media. The torque table takes the same chain
/// where it is as coarse, or where all is asked for; else one of its own, which is fast.
pub fn handed(task: &Task, versions: &[Entry], asked: &Asked) -> Result<Handed, Trouble> {
    let quick = match asked.effort {
        Effort::Whole => task.choice,
        Effort::Split => faster(task.choice),
    };
    let chain = task.chain()?;
    let along = || {
        let estimate = uncertainty::along(&chain, &asked.options)?;
        let mapped = |interface: usize| {
            Ok::<Fields, Failure>(Fields {
                map: estimate::field_map(&chain, interface, asked.columns)?,
                interface,
                rings: estimate::ring_tables(&chain, interface)?,
                heat: estimate::heat_map(&chain, interface, asked.columns)?,
                section: None,
                nominal: estimate.clone(),
            })
        };
        let further = (1..chain.joint().interfaces()).map(mapped);
        Ok(Handed {
            media: media(&chain, &estimate)?,
            ranking: ranking(&chain, &asked.options)?,
            further: further.collect::<Result<Vec<Fields>, Failure>>()?,
            pointed: Pointed {
                map: estimate::field_map(&chain, 0, asked.pointed)?,
                heat: estimate::heat_map(&chain, 0, asked.pointed)?,
            },
            fields: Fields {
                section: estimate::stack_section(&chain)?,
                ..mapped(0)?
            },
            torque: None,
            comparison: None,
            left_out: Vec::new(),
        })
    };
    let options = match asked.effort {
        Effort::Whole => asked.options,
        Effort::Split => Options {
            draws: 0,
            ..asked.options
        },
    };
    let sweep = by_torque(task.joint).map(|group| SweepOptions {
        group,
        from: None,
        to: None,
        steps: asked.torques,
        confidence: uncertainty::CONFIDENCE,
        chain: options,
    });
    let (found, swept) = if quick == task.choice {
        let found = task.watched(along);
        let swept = sweep.map(|sweep| uncertainty::sweep_along(&chain, &sweep));
        task.watch.tell("");
        (found, swept)
    } else {
        // The fast contact is a step on the way to the other, so it is solved once. From there on neither
        // chain knows of what the other learns, and both may be solved side by side.
        let lent = match &sweep {
            Some(_) => Some(task.watched(|| {
                chain.expect_contact(Fineness::Fast)?;
                chain.at_fineness(Fineness::Fast)
            })?),
            None => None,
        };
        let beside = |chain: Chain| {
            let sweep = sweep.as_ref()?;
            Some(uncertainty::sweep_along(&chain, sweep))
        };
        rayon::join(|| task.watched(along), || lent.and_then(beside))
    };
    let mut found = found?;
    match swept {
        Some(Ok(swept)) => found.torque = Some(swept),
        Some(Err(why)) => found.left_out.push(format!("Torque table: {why}.")),
        None => {}
    }
    if versions.len() > 1 {
        let asked = (&options, Losses::Left, Some(SMALL));
        match compared(versions, (quick, &task.watch), asked) {
            Ok(compared) => found.comparison = Some(compared),
            Err(Trouble::Failure(why)) => found.left_out.push(format!("Variants: {why}.")),
            Err(trouble) => return Err(trouble),
        }
    }
    Ok(found)
}

/// Points across a small map.
const SMALL: usize = 160;
/// Base points of the shares beyond which a page tells no more.
const MOST_BASES: u32 = 4096;

/// The choice with the least waiting.
fn faster(choice: Choice) -> Choice {
    match choice {
        Choice::Cone => Choice::Cone,
        Choice::Elastic { memory, .. } => Choice::elastic(Fineness::Fast, memory),
    }
}

/// The first group that is tightened by torque.
fn by_torque(joint: &Joint) -> Option<usize> {
    let by = |group: &crate::joint::Fastener| matches!(group.tightening, Tightening::Torque(_));
    joint.fasteners.iter().position(by)
}

/// The joint in its own medium, as it was estimated, and in the other that tests are made in.
fn media(chain: &Chain, estimate: &estimate::Estimate) -> Result<Vec<InMedium>, Failure> {
    let Some(case) = estimate.cases.first() else {
        return Ok(Vec::new());
    };
    let own = chain.joint().service.medium.clone();
    let other = match own {
        Medium::Vacuum => Medium::named("air", None).ok(),
        Medium::Gas { .. } => Some(Medium::Vacuum),
    };
    let mut media = vec![InMedium {
        medium: own,
        source_to_sink: case.results.source_to_sink.resistance,
        added_by_joint: case.results.added_by_joint.resistance,
        rise: case.rise.map(|rise| rise.source),
    }];
    let nominal = Options { draws: 0, seed: 1 };
    let other: Vec<Medium> = other.into_iter().collect();
    media.extend(uncertainty::in_media(chain, &other, &nominal)?);
    Ok(media)
}

fn ranking(chain: &Chain, options: &Options) -> Result<Option<Ranking>, Failure> {
    if options.draws == 0 {
        return Ok(None);
    }
    let options = RankingOptions {
        target: Target::SourceToSink,
        draws: Options {
            draws: options.draws.clamp(FEWEST_BASES, MOST_BASES),
            ..*options
        },
    };
    uncertainty::ranking(chain, &options).map(Some)
}
