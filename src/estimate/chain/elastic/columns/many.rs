//! Heat of many loads that differ little: some solved, the rest sums of these.

use rayon::prelude::*;

use crate::{
    estimate::chain::{
        conditions::Conditions,
        elastic::{
            columns::heat::{Conductances, Plates, bridged, has_feet},
            solver::Depth,
        },
    },
    resistance::{
        self, Path,
        columns::{Conduction, Conductivity, Family, Heat, Perfect, Terminals},
    },
};

/// Residual of a solution for the draws, over the load: surfaces through its readings are off by
/// far more.
const TOLERANCE: f64 = 1e-6;
/// Loads that one core solves one after the other, each from the one before; sums that it makes.
const SHORT: usize = 6;
const LONG: usize = 24;

/// What the heat of a state is made of.
#[derive(Clone, Debug)]
pub(super) struct Load {
    pub(super) faces: Conductances,
    /// Conductivity of every plate in its plane, W/(m K).
    pub(super) in_plane: Vec<f64>,
    pub(super) depth: Depth,
}

/// Loads that one core takes, of one set of conductivities.
struct Chain<'a> {
    loads: Vec<(usize, &'a Load)>,
    conductivity: Vec<Conductivity>,
    perfect: Perfect,
}

/// Temperatures of the solved loads, and of the same with perfect feet.
type Families = [Family; 2];

/// The same before they are families.
type States = [Vec<Vec<f64>>; 2];

/// A path with the number of its load.
type Numbered = (usize, Path);

impl Plates {
    /// Paths of many loads under the terminals of some conditions.
    pub(super) fn paths(
        &self,
        loads: &[Load],
        conditions: &Conditions,
    ) -> Result<Vec<Path>, resistance::Failure> {
        let terminals = self.terminals.under(conditions);
        let (between, solved): (Vec<_>, Vec<_>) = loads
            .iter()
            .enumerate()
            .partition(|(_, load)| load.depth == Depth::Between);
        let under = (conditions, &terminals);
        let solved = self
            .chains((solved, SHORT), under)?
            .par_iter()
            .map(|chain| self.solved(chain, &terminals))
            .collect::<Result<Vec<_>, _>>()?;
        let members = |feet: usize| {
            let states = solved.iter().flat_map(|(_, states)| &states[feet]);
            Family::of(states.map(Vec::as_slice))
        };
        let families = [members(0), members(1)];
        let between = self
            .chains((between, LONG), under)?
            .par_iter()
            .map(|chain| self.between(chain, (&terminals, &families)))
            .collect::<Result<Vec<_>, _>>()?;
        let solved = solved.into_iter().flat_map(|(paths, _)| paths);
        let mut all: Vec<Numbered> = solved.chain(between.into_iter().flatten()).collect();
        all.sort_by_key(|(number, _)| *number);
        Ok(all.into_iter().map(|(_, path)| path).collect())
    }

    /// Loads of equal conductivities together, each in parts of so many, with their perfect contact.
    fn chains<'a>(
        &self,
        (loads, most): (Vec<(usize, &'a Load)>, usize),
        (conditions, terminals): (&Conditions, &Terminals),
    ) -> Result<Vec<Chain<'a>>, resistance::Failure> {
        let mut sets: Vec<Vec<(usize, &Load)>> = Vec::new();
        for each in loads {
            let alike = |set: &&mut Vec<(usize, &Load)>| set[0].1.in_plane == each.1.in_plane;
            match sets.iter_mut().find(alike) {
                Some(set) => set.push(each),
                None => sets.push(vec![each]),
            }
        }
        let with_perfect = |set: Vec<(usize, &'a Load)>| {
            let conductivity = self.conductivity(&set[0].1.in_plane);
            let asked = set
                .iter()
                .any(|(_, load)| load.depth != Depth::SourceToSink);
            let perfect = if asked {
                self.perfect(conditions, (terminals, &conductivity))?
            } else {
                Perfect::unknown()
            };
            let parts = set.chunks(most).map(|part| Chain {
                loads: part.to_vec(),
                conductivity: conductivity.clone(),
                perfect: perfect.clone(),
            });
            Ok(parts.collect::<Vec<_>>())
        };
        let chains: Vec<Vec<Chain>> = sets
            .into_par_iter()
            .map(with_perfect)
            .collect::<Result<_, resistance::Failure>>()?;
        Ok(chains.into_iter().flatten().collect())
    }

    /// Solves loads one after the other; their paths and temperatures.
    fn solved(
        &self,
        chain: &Chain,
        terminals: &Terminals,
    ) -> Result<(Vec<Numbered>, States), resistance::Failure> {
        let placed = self.placed(terminals)?;
        let mut conduction = Conduction::placed(&placed, &chain.conductivity)?;
        conduction.tolerance = TOLERANCE;
        let mut paths = Vec::new();
        let mut states: States = [Vec::new(), Vec::new()];
        for (number, load) in &chain.loads {
            let heat = conduction.solve(&load.faces)?;
            states[0].push(conduction.state().to_vec());
            let mut floor = None;
            if has_feet(&load.faces) {
                floor = Some(conduction.solve(&bridged(&load.faces))?.source_to_sink);
                states[1].push(conduction.state().to_vec());
            }
            paths.push((*number, self.beside(&heat, (chain, floor), load.depth)?));
        }
        Ok((paths, states))
    }

    /// Paths of loads as sums of solved ones.
    fn between(
        &self,
        chain: &Chain,
        (terminals, families): (&Terminals, &Families),
    ) -> Result<Vec<Numbered>, resistance::Failure> {
        let placed = self.placed(terminals)?;
        let conduction = || Conduction::placed(&placed, &chain.conductivity);
        let mut loaded = conduction()?;
        let mut bridge = None;
        let mut paths = Vec::new();
        for (number, load) in &chain.loads {
            let heat = loaded.combined(&families[0], &load.faces)?;
            let mut floor = None;
            if has_feet(&load.faces) {
                let feet = match &mut bridge {
                    Some(known) => known,
                    none => none.insert(conduction()?),
                };
                let perfect = feet.combined(&families[1], &bridged(&load.faces))?;
                floor = Some(perfect.source_to_sink);
            }
            paths.push((*number, self.beside(&heat, (chain, floor), load.depth)?));
        }
        Ok(paths)
    }

    fn beside(
        &self,
        heat: &Heat,
        (chain, floor): (&Chain, Option<f64>),
        depth: Depth,
    ) -> Result<Path, resistance::Failure> {
        match depth {
            Depth::SourceToSink => Ok(heat.path(&chain.perfect)),
            _ => self.path(heat, (&chain.perfect, floor)),
        }
    }
}
