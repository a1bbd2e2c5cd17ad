//! Heat from source to sink through all cells, for one set of forces and conductances.

use crate::{
    joint::{Outline, Sink, Zone},
    resistance::{
        cells::{Cell, Cells, Plan, cells},
        column::{Flow, Inlet, Outlet, Plates},
        failure::Failure,
    },
};

/// What a draw changes: forces, laws and conductivities.
#[derive(Clone, Copy, Debug)]
pub struct Load<'a, H> {
    /// Local conductance of a pressure in Pa, W/(m² K); 0 Pa is the open gap.
    pub conductance: H,
    /// Conductivity of both plates, W/(m K).
    pub conductivity: [f64; 2],
    /// Clamp force of each bolt, N.
    pub forces: &'a [f64],
    /// Conductance of each bolt's shank from head to nut, W/K; 0 for none.
    pub shanks: &'a [f64],
}

/// Resistances of one joint between its planes, K/W unless said otherwise.
///
/// Temperatures refer to the mean sink surface; infinite where no path leads through.
#[derive(Clone, Debug, PartialEq)]
pub struct Path {
    /// Ring sum of the faying faces, shanks left out, W/K.
    pub contact: f64,
    /// Ring sum of each bolt's cell, W/K.
    pub contact_per_bolt: Vec<f64>,
    /// Mean of the heated zone to mean of the sink surface.
    pub source_to_sink: f64,
    /// From the mean sink surface to the coolant: `1/(h_s A)`; none without a film.
    pub coolant_drop: Option<f64>,
    /// Source to sink when the faces meet perfectly wherever both plates are.
    pub perfect_contact: f64,
    /// What the joint adds to perfect contact.
    pub added_by_joint: f64,
    /// Mean of the first plate to mean of the second.
    pub node_to_node: f64,
    /// Area mean of the drop across the faying faces.
    pub interface_drop: f64,
    /// Highest temperature of the outer face of the first plate.
    pub hottest: f64,
    /// Source to sink cannot be lower for the field and law used.
    pub resistance_lower: f64,
    /// Source to sink cannot be higher for the field and law used; one bolt in the middle of two
    /// equal discs heated all over.
    pub resistance_upper: Option<f64>,
}

/// The whole joint per watt through it; temperatures above the coolant, K/W.
#[derive(Clone, Copy, Debug)]
pub(super) struct Whole {
    pub(super) source: f64,
    hottest: f64,
    node_to_node: f64,
    interface: f64,
}

/// Conductances of the patches of one cell.
struct Faces {
    /// W/(m² K), shank included.
    conductance: Vec<f64>,
    /// Ring sum without the shank, W/K.
    contact: f64,
}

impl Whole {
    pub(super) const BLOCKED: Self = Self {
        source: f64::INFINITY,
        hottest: f64::INFINITY,
        node_to_node: f64::INFINITY,
        interface: f64::INFINITY,
    };
}

impl Cells {
    /// The resistances under a load.
    ///
    /// ```text
    /// R = Σ (Q_c/Q)² R_c     uniform flux: each cell carries the heat that enters above it
    /// 1/R = Σ 1/R_c          isothermal source: the cells act side by side
    /// ```
    ///
    /// Exact for one bolt in the middle of round plates. With several bolts two errors oppose: no
    /// heat crosses the borders of cells, which is too bad, and temperature depends on the distance
    /// from the bolt alone, which is too good. Against three-dimensional solutions in vacuum: 30 %
    /// too low for four bolts in the corners, 65 % too high where the source lies over two of six
    /// bolts. `plan_grid` does better and calibrates this.
    /// Source: rings in series and cells side by side, of this program.
    pub fn solve<H: Fn(f64) -> f64>(&self, load: &Load<H>) -> Path {
        let cells = &self.fine;
        let mut faces: Vec<Option<Faces>> = Vec::with_capacity(cells.len());
        let twins: Vec<usize> = (0..cells.len())
            .map(|index| self.twin(cells, index, load))
            .collect();
        for (index, cell) in cells.iter().enumerate() {
            faces.push((twins[index] == index).then(|| cell.faces(index, load, Shanks::Parallel)));
        }
        let contact_per_bolt: Vec<f64> = twins
            .iter()
            .map(|twin| faces[*twin].as_ref().map_or(0.0, |faces| faces.contact))
            .collect();
        let whole = self.whole(cells, &twins, load, |index| {
            faces[index].as_ref().map(|faces| faces.conductance.clone())
        });
        let alike: Vec<usize> = cells.iter().map(|cell| cell.like).collect();
        let perfect = self.whole(cells, &alike, load, |index| {
            Some(vec![
                f64::INFINITY;
                cells[index].rings.columns.patch_area.len()
            ])
        });
        self.path_of(load, &contact_per_bolt, [&whole, &perfect])
    }

    /// The path with another solution of the plates: contact and bounds are those of the cells.
    pub(super) fn path<H: Fn(f64) -> f64>(
        &self,
        load: &Load<H>,
        whole: &Whole,
        perfect: &Whole,
    ) -> Path {
        let mut contact: Vec<f64> = Vec::with_capacity(self.fine.len());
        for (index, cell) in self.fine.iter().enumerate() {
            let twin = self.twin(&self.fine, index, load);
            contact.push(if twin == index {
                cell.faces(index, load, Shanks::None).contact
            } else {
                contact[twin]
            });
        }
        self.path_of(load, &contact, [whole, perfect])
    }

    fn path_of<H: Fn(f64) -> f64>(
        &self,
        load: &Load<H>,
        contact_per_bolt: &[f64],
        [whole, perfect]: [&Whole; 2],
    ) -> Path {
        let contact: f64 = contact_per_bolt.iter().sum();
        let film = self.film_drop();
        let source_to_sink = whole.source - film;
        let perfect_contact = perfect.source - film;
        Path {
            source_to_sink,
            perfect_contact,
            added_by_joint: source_to_sink - perfect_contact,
            coolant_drop: matches!(self.plan.sink, Sink::Film(_)).then_some(film),
            node_to_node: whole.node_to_node,
            interface_drop: whole.interface,
            hottest: whole.hottest - film,
            resistance_lower: self.lower(contact, load),
            resistance_upper: self.upper(load),
            contact,
            contact_per_bolt: contact_per_bolt.to_vec(),
        }
    }

    /// Difference of source to sink between all and half of the rings, relative.
    ///
    /// The method is of second order in the ring width, so the error left is about a third of it.
    pub fn ring_error<H: Fn(f64) -> f64>(&self, load: &Load<H>) -> Result<f64, Failure> {
        let coarse = cells(&Plan {
            rings: (self.plan.rings / 2).max(4),
            ..self.plan.clone()
        })?;
        let [fine, coarse] = [self, &coarse].map(|cells| cells.solve(load).source_to_sink);
        Ok(((coarse - fine) / fine).abs())
    }

    /// The first cell whose solution serves this one: same rings, same forces, same shank.
    fn twin<H>(&self, cells: &[Cell], index: usize, load: &Load<H>) -> usize {
        let first = cells[index].like;
        let same = |a: f64, b: f64| (a - b).abs() <= 1e-12 * a.abs();
        let lonely = !self.overlaps[index] && !self.overlaps[first];
        let forces = same(load.forces[first], load.forces[index])
            && (lonely
                || load
                    .forces
                    .iter()
                    .all(|force| same(load.forces[first], *force)));
        if forces && same(load.shanks[first], load.shanks[index]) {
            first
        } else {
            index
        }
    }

    /// Mean sink surface above the coolant, K/W.
    pub(super) fn film_drop(&self) -> f64 {
        match self.plan.sink {
            Sink::Film(film) => (film * self.plate_area[1]).recip(),
            Sink::IsothermalBack | Sink::Rim => 0.0,
        }
    }

    pub(super) fn plates(&self, conductivity: [f64; 2]) -> Plates {
        Plates {
            thickness: self.plan.thickness,
            conductivity,
            inlet: if self.plan.source.isothermal {
                Inlet::Temperature
            } else {
                Inlet::Flux(self.source_area.recip())
            },
            outlet: match self.plan.sink {
                Sink::Film(film) => Outlet::Film(film),
                Sink::IsothermalBack => Outlet::Film(f64::INFINITY),
                Sink::Rim => Outlet::Rim,
            },
        }
    }

    /// Solves each distinct cell once and adds them up.
    fn whole<H>(
        &self,
        cells: &[Cell],
        twins: &[usize],
        load: &Load<H>,
        conductance: impl Fn(usize) -> Option<Vec<f64>>,
    ) -> Whole {
        let plates = self.plates(load.conductivity);
        let mut sum = Flow {
            hottest: f64::NEG_INFINITY,
            ..Flow::default()
        };
        let mut solved: Vec<Option<Flow>> = Vec::with_capacity(cells.len());
        for (index, cell) in cells.iter().enumerate() {
            let heated = cell
                .rings
                .columns
                .source_area
                .iter()
                .any(|area| *area > 0.0);
            let flow = if !heated {
                // No heat enters here: the cell stays at the coolant's temperature.
                Some(Flow::default())
            } else if twins[index] == index {
                conductance(index).and_then(|values| cell.rings.flow(&plates, &values))
            } else {
                solved[twins[index]]
            };
            solved.push(flow);
            let Some(flow) = flow else {
                if self.plan.source.isothermal {
                    continue;
                }
                return Whole::BLOCKED;
            };
            sum.heat += flow.heat;
            sum.source += flow.source;
            sum.hottest = sum.hottest.max(flow.hottest);
            sum.interface += flow.interface;
            for plate in 0..2 {
                sum.plate[plate] += flow.plate[plate];
            }
        }
        self.whole_of(&sum)
    }

    /// Sums over the plates brought to one watt.
    pub(super) fn whole_of(&self, sum: &Flow) -> Whole {
        if sum.heat.is_nan() || sum.heat <= 0.0 {
            return Whole::BLOCKED;
        }
        let [first, second] = [0, 1].map(|plate| sum.plate[plate] / self.plate_area[plate]);
        Whole {
            source: if self.plan.source.isothermal {
                sum.heat.recip()
            } else {
                sum.source / self.source_area / sum.heat
            },
            hottest: sum.hottest / sum.heat,
            node_to_node: (first - second) / sum.heat,
            interface: sum.interface / self.interface_area / sum.heat,
        }
    }

    /// Isothermal planes at the outer faces and at the interface can only help the heat.
    ///
    /// ```text
    /// 1/R ≤ 1/(t1/(k1 A1) + 1/G + t2/(k2 A2)) + Σ G_shank
    /// ```
    ///
    /// A held rim lets heat leave the second plate before it crosses its thickness: no second term.
    fn lower<H>(&self, contact: f64, load: &Load<H>) -> f64 {
        let through = [0, 1].map(|plate| {
            self.plan.thickness[plate] / (load.conductivity[plate] * self.plate_area[plate])
        });
        let second = match self.plan.sink {
            Sink::Film(_) | Sink::IsothermalBack => through[1],
            Sink::Rim => 0.0,
        };
        let series = through[0] + contact.recip() + second;
        (series.recip() + load.shanks.iter().sum::<f64>()).recip()
    }

    /// The network without shank where it is an admissible field: a path beside it only helps.
    fn upper<H: Fn(f64) -> f64>(&self, load: &Load<H>) -> Option<f64> {
        self.is_round().then(|| {
            let bare = self.whole(&self.fine, &[0], load, |index| {
                let faces = self.fine[index].faces(index, load, Shanks::None);
                Some(faces.conductance)
            });
            bare.source - self.film_drop()
        })
    }

    /// One bolt in the middle of two equal discs, heated all over.
    pub fn is_round(&self) -> bool {
        const ROUNDING: f64 = 1e-9;
        let [(first, origin), (second, middle)] = &self.plan.outlines;
        let (Outline::Disc { radius }, Outline::Disc { radius: other }) = (first, second) else {
            return false;
        };
        let (radius, other) = (*radius, *other);
        let near = |a: f64, b: f64| (a - b).abs() <= ROUNDING * radius;
        let site = &self.plan.sites[0];
        self.plan.sites.len() == 1
            && self.plan.empty.is_empty()
            && self.plan.source.zone == Zone::Face
            && near(radius, other)
            && near(site.hole_radius[0], site.hole_radius[1])
            && (0..2).all(|k| near(origin[k], site.at[k]) && near(middle[k], site.at[k]))
    }
}

/// Whether shanks conduct beside the faying faces.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Shanks {
    /// Beside the interface under the head, spread by area.
    Parallel,
    /// Not at all.
    None,
}

impl Cell {
    /// Conductance of every patch.
    ///
    /// A shank joins the outer faces; beside the interface, in the rings under its head, it errs
    /// far less than beside the whole path.
    fn faces<H: Fn(f64) -> f64>(&self, bolt: usize, load: &Load<H>, shanks: Shanks) -> Faces {
        let open = (load.conductance)(0.0);
        let shank = match shanks {
            Shanks::Parallel => load.shanks[bolt],
            Shanks::None => 0.0,
        };
        let mut contact = 0.0;
        let mut conductance = Vec::with_capacity(self.rings.columns.patch_area.len());
        for (ring, share) in self.head_share.iter().enumerate() {
            let patches =
                self.rings.columns.first_patch[ring]..self.rings.columns.first_patch[ring + 1];
            let area: f64 = self.rings.columns.patch_area[patches.clone()].iter().sum();
            let beside = if *share > 0.0 {
                shank * share / area
            } else {
                0.0
            };
            for patch in patches {
                let local = if self.patches.of(patch).is_empty() {
                    open
                } else {
                    (load.conductance)(self.patches.pressure(patch, load.forces))
                };
                contact += self.rings.columns.patch_area[patch] * local;
                conductance.push(local + beside);
            }
        }
        Faces {
            conductance,
            contact,
        }
    }
}
