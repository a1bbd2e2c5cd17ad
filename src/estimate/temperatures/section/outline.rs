//! The stack cut along a row of bolts as drawings show it, from the joint alone: nothing is solved.

use crate::{
    joint::{Joint, Plate},
    resistance::columns::Across,
};

use super::{
    SectionBolt, Solid,
    line::{heated, row},
    solid,
};

/// The stack cut along a row of bolts, the warm plate on top.
#[derive(Clone, Debug, PartialEq)]
pub struct StackOutline {
    /// The line of the cut.
    pub across: Across,
    /// From where to where the plates reach along the cut, m.
    pub range: [f64; 2],
    /// The plates, warm side first.
    pub plates: Vec<OutlinePlate>,
    /// The bolts that the cut meets, in order along it.
    pub bolts: Vec<SectionBolt>,
    /// Where the cut meets heated zones, m.
    pub heated: Vec<[f64; 2]>,
}

/// One plate on the cut.
#[derive(Clone, Debug, PartialEq)]
pub struct OutlinePlate {
    /// Its name.
    pub name: String,
    /// Lowest and highest place, feet and ribs included, m.
    pub heights: [f64; 2],
    /// What is solid, cut-outs and bolt holes left out.
    pub solid: Vec<Solid>,
}

/// The cut along the row of most bolts; none without bolts.
///
/// Heights count from the lowest face of the stack; the faces are drawn together, whatever gap lies
/// between them.
pub fn stack_outline(joint: &Joint) -> Option<StackOutline> {
    let (across, bolts) = row(joint)?;
    let axis = match across {
        Across::X(_) => 0,
        Across::Y(_) => 1,
    };
    let bounds: Vec<[f64; 4]> = joint.plates.iter().map(Plate::bounds).collect();
    let range = [
        bounds.iter().map(|b| b[axis]).fold(f64::INFINITY, f64::min),
        bounds
            .iter()
            .map(|b| b[axis + 2])
            .fold(f64::NEG_INFINITY, f64::max),
    ];
    let mut foot = 0.0;
    let mut plates: Vec<OutlinePlate> = Vec::with_capacity(joint.plates.len());
    for (index, plate) in joint.plates.iter().enumerate().rev() {
        let ribs = plate.ribs.iter().map(|rib| rib.height).fold(0.0, f64::max);
        let feet = plate.feet.as_ref().map_or(0.0, |feet| feet.height);
        let heights = [foot, foot + ribs + feet + plate.thickness];
        plates.push(OutlinePlate {
            name: plate.name.clone(),
            heights,
            solid: solid(joint, (index, plate), (across, range, heights)),
        });
        foot = heights[1];
    }
    plates.reverse();
    Some(StackOutline {
        heated: joint
            .source
            .zones()
            .into_iter()
            .filter_map(|(zone, _)| heated(zone, (across, range)))
            .collect(),
        across,
        range,
        plates,
        bolts,
    })
}
