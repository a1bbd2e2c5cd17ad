//! The same joint in several media, side by side.

use crate::{
    estimate::{Band, Chain, Failure, Options, Realisation},
    joint::Medium,
};

use super::{Answer, draws};

/// A joint in one medium.
#[derive(Clone, Debug, PartialEq)]
pub struct InMedium {
    /// The medium.
    pub medium: Medium,
    /// Source to sink, K/W.
    pub source_to_sink: Band,
    /// What the joint adds, K/W.
    pub added_by_joint: Band,
    /// Mean of the source above the mean sink surface, K, when heat is stated.
    pub rise: Option<Band>,
}

/// The first case of a joint in each of several media, drawn with the same points.
///
/// Contact knows no gas, so that a medium costs its heat alone.
pub fn in_media(
    chain: &Chain,
    media: &[Medium],
    options: &Options,
) -> Result<Vec<InMedium>, Failure> {
    let heat = chain.joint().service.heat;
    media
        .iter()
        .map(|medium| {
            let there = chain.in_medium(medium.clone())?;
            let path = there.state(0, &Realisation::default())?.path;
            let (whole, added) = (path.source_to_sink, path.added_by_joint);
            let mut risen = Band::nominal(whole);
            let (source_to_sink, added_by_joint) = if options.draws == 0 {
                (Band::nominal(whole), Band::nominal(added))
            } else {
                let asked = [
                    Answer::SourceToSink,
                    Answer::AddedByJoint,
                    Answer::SourceRise,
                ];
                let draws = draws(&there, (0, &asked), options)?;
                risen = draws.band(Answer::SourceRise, whole);
                (
                    draws.band(Answer::SourceToSink, whole),
                    draws.band(Answer::AddedByJoint, added),
                )
            };
            Ok(InMedium {
                medium: medium.clone(),
                rise: heat.map(|heat| risen.times(heat)),
                source_to_sink,
                added_by_joint,
            })
        })
        .collect()
}
