//! What drives the band of one answer: indices, what an input does alone, what knowing it would buy.

use crate::{
    estimate::{Band, Chain, DrawPlan, Failure, Options, Realisation, Workspace},
    uncertainty::{
        Answer, Bases, HEAT, Index, Input, QUANTILES,
        draws::{Task, placed},
        indices, inputs,
        remedies::remedy,
        sweep::worst_case,
    },
};

/// The answer whose band is looked into.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Target {
    /// Heated zone to sink surface, K/W.
    SourceToSink,
    /// Faying faces alone, K/W.
    Contact,
    /// What the joint adds to perfect contact, K/W.
    AddedByJoint,
    /// Mean of the first plate to mean of the last, K/W.
    NodeToNode,
    /// Mean of the heated zone above the mean sink surface at the stated heat, K.
    Rise,
}

impl Target {
    /// Its name for people.
    pub fn name(self) -> &'static str {
        match self {
            Self::SourceToSink => "source to sink",
            Self::Contact => "contact only",
            Self::AddedByJoint => "added by the joint",
            Self::NodeToNode => "node to node",
            Self::Rise => "rise of the source",
        }
    }

    /// Its unit.
    pub fn unit(self) -> &'static str {
        match self {
            Self::Rise => "K",
            _ => "K/W",
        }
    }

    fn answer(self) -> Answer {
        match self {
            Self::SourceToSink => Answer::SourceToSink,
            Self::Rise => Answer::SourceRise,
            Self::Contact => Answer::Contact,
            Self::AddedByJoint => Answer::AddedByJoint,
            Self::NodeToNode => Answer::NodeToNode,
        }
    }
}

/// What to rank by how many draws.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct RankingOptions {
    /// The answer.
    pub target: Target,
    /// Draws of every band, and base points of the indices, with their seed.
    pub draws: Options,
}

/// Inputs by how much of the spread of one answer is theirs.
#[derive(Clone, Debug, PartialEq)]
pub struct Ranking {
    /// Title of the joint.
    pub title: String,
    /// The case in which the joint stands worst.
    pub case: &'static str,
    /// The field: `cone` or `elastic`.
    pub field: &'static str,
    /// The resolution.
    pub resolution: &'static str,
    /// The answer.
    pub target: Target,
    /// Draws of every band, and base points of the indices.
    pub draws: u32,
    /// Their seed.
    pub seed: u64,
    /// The band of the answer.
    pub band: Band,
    /// Largest error of the surfaces that the draws are read from, relative to source to sink.
    pub draw_error: Option<f64>,
    /// Share of the variance that no input has alone.
    pub interaction: f64,
    /// Whether the shares are those of the logarithm of the answer.
    pub scale: Scale,
    /// The inputs, the one first whose knowledge narrows the band most; of those that do so alike the ones
    /// first whose share is told.
    pub inputs: Vec<Ranked>,
}

/// What the shares are of.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Scale {
    /// The logarithm of the answer: a factor up counts as much as one down.
    Logarithm,
    /// The answer itself, which is not above zero in all draws.
    Itself,
}

impl Scale {
    fn of(self, value: f64) -> f64 {
        match self {
            Self::Logarithm => value.ln(),
            Self::Itself => value,
        }
    }
}

/// One input.
#[derive(Clone, Debug, PartialEq)]
pub struct Ranked {
    /// Its name.
    pub input: &'static str,
    /// What the engineer can do about it.
    pub remedy: String,
    /// Its indices.
    pub index: Index,
    /// The answer with this input alone at its 5 % and at its 95 % quantile, all others nominal.
    pub alone: [f64; 2],
    /// The band if this input were known to be nominal.
    pub known: Band,
}

impl Ranking {
    /// Inputs whose share in total is not told apart from nothing, nor from each other.
    pub fn not_told_apart(&self) -> Vec<&'static str> {
        let inputs = self.inputs.iter();
        inputs
            .filter(|each| !each.index.total.is_told())
            .map(|each| each.input)
            .collect()
    }
}

impl Ranked {
    /// Share of the width of the band that goes when this input is known; negative where the nominal
    /// value is one at which the others do more.
    pub fn narrowing(&self, whole: &Band) -> f64 {
        1.0 - width(&self.known) / width(whole)
    }
}

/// Width of a band; nothing without ends.
fn width(band: &Band) -> f64 {
    band.high
        .zip(band.low)
        .map_or(0.0, |(high, low)| high - low)
}

/// Ranks the inputs of a joint by how much narrower the band of one answer gets when they are known, in
/// its worst case.
pub fn ranking(chain: &Chain, options: &RankingOptions) -> Result<Ranking, Failure> {
    let joint = chain.joint();
    let case = worst_case(chain)?;
    let plan = chain.draw_plan(case)?;
    let mut inputs = inputs(chain);
    // Heat moves no resistance.
    inputs.retain(|input| options.target == Target::Rise || input.name != HEAT);
    let heat = match options.target {
        Target::Rise => joint.service.heat.unwrap_or(f64::NAN),
        _ => 1.0,
    };
    let matters = matters(&inputs);
    let asked = Asked {
        plan: &plan,
        inputs: &inputs,
        matters: &matters,
        answer: options.target.answer(),
        heat,
        draws: options.draws,
    };
    let nominal = asked.value(&Realisation::default(), &mut plan.workspace())?;
    let (scale, indices) = asked.indices()?;
    let mut ranked = Vec::with_capacity(matters.len());
    for (matter, index) in matters.iter().zip(indices) {
        let input = &inputs[matter[0]];
        ranked.push(Ranked {
            input: input.name,
            remedy: remedy(joint, input),
            index,
            alone: asked.alone(matter)?,
            known: asked.band(nominal, matter)?,
        });
    }
    let first: f64 = ranked.iter().map(|each| each.index.first.value).sum();
    let band = asked.band(nominal, &[])?;
    // A variance may be that of few extreme draws; what a reader buys is a narrower band. Below a part in
    // a hundred of it bands are alike, and a share that its interval does not tell ranks nothing.
    ranked.sort_by(|one, other| {
        let narrowing = |each: &Ranked| (100.0 * each.narrowing(&band)).round();
        let told = |each: &Ranked| each.index.total.is_told();
        let total = |each: &Ranked| each.index.total.value;
        narrowing(other)
            .total_cmp(&narrowing(one))
            .then(told(other).cmp(&told(one)))
            .then(total(other).total_cmp(&total(one)))
    });
    Ok(Ranking {
        title: joint.title.clone(),
        case: joint.service.cases[case].name,
        field: chain.field_name(),
        resolution: chain.resolution_name(),
        target: options.target,
        draws: options.draws.draws,
        seed: options.draws.seed,
        band,
        draw_error: chain.draw_error(case),
        interaction: 1.0 - first,
        scale,
        inputs: ranked,
    })
}

/// Inputs of one name as one matter, by their places, in the order of the first of each.
fn matters(inputs: &[Input]) -> Vec<Vec<usize>> {
    let mut found: Vec<Vec<usize>> = Vec::new();
    for (place, input) in inputs.iter().enumerate() {
        let same = |matter: &&mut Vec<usize>| inputs[matter[0]].name == input.name;
        match found.iter_mut().find(same) {
            Some(matter) => matter.push(place),
            None => found.push(vec![place]),
        }
    }
    found
}

/// The answer that is looked into, with what it takes to draw it.
struct Asked<'a> {
    plan: &'a DrawPlan<'a>,
    inputs: &'a [Input],
    matters: &'a [Vec<usize>],
    answer: Answer,
    heat: f64,
    draws: Options,
}

impl Asked<'_> {
    fn value(&self, at: &Realisation, workspace: &mut Workspace) -> Result<f64, Failure> {
        Ok(self.heat * self.answer.of(&self.plan.drawn(at, workspace)?))
    }

    /// Indices of the logarithm; of the answer itself where it is not above zero in some draw.
    fn indices(&self) -> Result<(Scale, Vec<Index>), Failure> {
        let bases = Bases {
            inputs: self.inputs.len(),
            groups: self.matters,
            points: self.draws.draws,
            seed: self.draws.seed,
        };
        let of = |scale: Scale| -> Result<Vec<Index>, Failure> {
            indices(
                &bases,
                || self.plan.workspace(),
                |point, workspace| {
                    let at = placed(self.inputs, point, &[]);
                    Ok(scale.of(self.value(&at, workspace)?))
                },
            )
        };
        let found = of(Scale::Logarithm)?;
        if found.iter().all(|index| index.total.value.is_finite()) {
            return Ok((Scale::Logarithm, found));
        }
        Ok((Scale::Itself, of(Scale::Itself)?))
    }

    /// The answer with one matter alone at the ends of its band.
    fn alone(&self, matter: &[usize]) -> Result<[f64; 2], Failure> {
        let mut workspace = self.plan.workspace();
        let mut at_quantile = |quantile: f64| {
            let mut at = Realisation::default();
            for input in matter {
                (self.inputs[*input].place)(&mut at, quantile);
            }
            self.value(&at, &mut workspace)
        };
        let [low, high] = QUANTILES;
        Ok([at_quantile(low)?, at_quantile(high)?])
    }

    /// The band around the nominal answer, with some inputs known to be nominal.
    fn band(&self, nominal: f64, known: &[usize]) -> Result<Band, Failure> {
        let task = Task {
            plan: self.plan,
            inputs: self.inputs,
            answers: &[self.answer],
            options: &self.draws,
            quantiles: QUANTILES,
            known,
        };
        let drawn = task.drawn()?;
        Ok(drawn
            .band(self.answer, nominal / self.heat)
            .times(self.heat))
    }
}
