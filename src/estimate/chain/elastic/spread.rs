//! How the nominal path moves with a draw: response, model form and flatness over the force.

use serde_json::{Value, json};

use crate::{
    estimate::{
        Chain, Failure,
        chain::{
            conditions::{Conditions, Faces},
            elastic::{
                ElasticModel,
                level::GROUND,
                pattern::Pattern,
                response::{self, Departure, Gauge, Readings, Response},
                solver::{Depth, Factors, State},
                variant::Variant,
            },
            form::with_form,
            remade::Remade,
        },
    },
    resistance::Path,
};

/// What the draws of a case need.
#[derive(Clone, Debug)]
pub(super) struct Spread {
    pub(super) gauge: Gauge,
    pub(super) response: Response,
    pattern: Pattern,
    bounds: Vec<Bounds>,
    /// Largest height of the out-of-flatness over the nominal one, 1.
    highest: f64,
    /// What stated values do that make another joint; none where there are none.
    remade: Option<Remade>,
}

/// Bounds at one force, as factors on what the joint adds.
#[derive(Clone, Copy, Debug)]
struct Bounds {
    /// Logarithm of the force over the nominal one.
    force: f64,
    /// Least and largest by the opposite choices of heads, friction and asperities.
    form: [f64; 2],
    /// Convex and concave; 1 where no flatness is loose.
    bent: [f64; 2],
    /// The same at the largest height that its spread allows.
    most_bent: [f64; 2],
}

impl Spread {
    /// What the forces of bolts, N, add to the readings beyond their sum, and what the stated spreads at
    /// their places do that make another joint; with the force over the nominal one, as a logarithm.
    pub(super) fn shift(&self, (forces, force): (&[f64], f64), places: &[f64]) -> Readings {
        let mut shift = self.pattern.shift(forces);
        if let Some(remade) = &self.remade {
            let more = remade.shift(force, places);
            for (sum, each) in shift.iter_mut().zip(more) {
                *sum += each;
            }
        }
        shift
    }

    /// A path moved from one departure to another, at a place of the model form and of flatness.
    pub(super) fn moved(
        &self,
        path: &Path,
        (from, to): (&Departure, &Departure),
        (shift, places): (&Readings, [f64; 2]),
    ) -> Path {
        let moved = self.response.shifted(path, (from, to), shift);
        with_form(moved, self.form(to[0], places))
    }

    /// Factor on what the joint adds at a force, by the places of the model form and of flatness.
    pub(super) fn form(&self, force: f64, [form, flatness]: [f64; 2]) -> f64 {
        let [factor] = self.forms(force, (form, [flatness]));
        factor
    }

    /// The same at several places of flatness.
    pub(super) fn forms<const N: usize>(
        &self,
        force: f64,
        (form, flatness): (f64, [f64; N]),
    ) -> [f64; N] {
        let bounds = self.bounds_at(force);
        let form = between(bounds.form, form);
        flatness.map(|place| form * bounds.bent_by(place, self.highest))
    }

    /// The bounds as data.
    pub(super) fn bounds_tables(&self) -> Vec<Value> {
        let bounds = self.bounds.iter();
        bounds
            .map(|each| {
                json!({
                    "force": each.force,
                    "form": each.form,
                    "bent": each.bent,
                    "most_bent": each.most_bent,
                })
            })
            .collect()
    }

    /// Bounds at a force: straight between those that are known, held beyond.
    fn bounds_at(&self, force: f64) -> Bounds {
        let right = self
            .bounds
            .partition_point(|bounds| bounds.force < force)
            .min(self.bounds.len() - 1);
        let (low, high) = (self.bounds[right.saturating_sub(1)], self.bounds[right]);
        let share = if high.force > low.force {
            ((force - low.force) / (high.force - low.force)).clamp(0.0, 1.0)
        } else {
            1.0
        };
        let mix = |a: [f64; 2], b: [f64; 2]| [0, 1].map(|end| a[end] + share * (b[end] - a[end]));
        Bounds {
            force,
            form: mix(low.form, high.form),
            bent: mix(low.bent, high.bent),
            most_bent: mix(low.most_bent, high.most_bent),
        }
    }
}

impl Bounds {
    /// Factor at a place of flatness, ±1 at the nominal height and so much at the largest: straight
    /// between none, nominal and largest.
    fn bent_by(&self, place: f64, highest: f64) -> f64 {
        if place.abs() <= 1.0 {
            return between(self.bent, place);
        }
        let end = usize::from(place > 0.0);
        let beyond = (place.abs() - 1.0) / (highest - 1.0);
        self.bent[end] + beyond * (self.most_bent[end] - self.bent[end])
    }
}

/// A factor between its ends: straight from the low one to 1 and on to the high one.
fn between([low, high]: [f64; 2], place: f64) -> f64 {
    if place < 0.0 {
        1.0 + place * (1.0 - low)
    } else {
        1.0 + place * (high - 1.0)
    }
}

impl ElasticModel {
    /// The spread of a case around its nominal conditions, on the ground level, over a range of
    /// force over the nominal.
    ///
    /// Contacts are solved from the nominal force outwards, so that each starts from the nearest.
    pub(super) fn spread(
        &self,
        chain: &Chain,
        (case, nominal): (usize, &Conditions),
        (range, known): ([f64; 2], Option<&Spread>),
    ) -> Result<Spread, Failure> {
        let stated = (GROUND, Variant::Stated);
        let base = self.solved(chain, stated, (nominal, &Factors::NONE))?;
        let gauge = Gauge::of(nominal, &base.met());
        let joint = chain.joint();
        for force in response::outwards(range) {
            let conditions = under(nominal, force);
            self.solver
                .expect(joint, (GROUND, Variant::Stated), &conditions)?;
        }
        let open = if range[0] <= 0.0 {
            // The gaps of the least force, and no pressure where the faces lie on each other: a
            // filler and gas conduct there all the same.
            let loose = Conditions {
                faces: nominal.faces.iter().map(Faces::unpressed).collect(),
                ..nominal.clone()
            };
            let [least, ..] = response::ends(range);
            let under = under(&loose, least);
            let solved = self.solved(chain, stated, (&under, &Factors::NONE))?;
            Some(solved.path().clone())
        } else {
            None
        };
        let steps = response::steps(joint.plates.len());
        let mut response = Response::through(
            (range, steps),
            |departures| {
                let states: Vec<State> = departures
                    .iter()
                    .map(|departure| departed(nominal, departure))
                    .collect();
                self.solver.paths(joint, GROUND, &states)
            },
            open,
        )?;
        let pattern = self.pattern(chain, nominal)?;
        if !pattern.is_common() {
            let probed = (&gauge, &response, &pattern);
            let error = self.pattern_error(chain, (case, nominal), probed)?;
            response.error = worse(response.error, error);
        }
        let bounds = if let Some(known) = known {
            // Ratios hardly know the temperature of a case; those of the first serve all.
            known.bounds.clone()
        } else {
            self.bounds(chain, nominal, range)?
        };
        // Its forces are counted from the nominal one of its case, so that none serves another.
        let remade = self.remade_answers(chain, (case, nominal), (range, &response))?;
        if let Some(remade) = &remade {
            response.error = worse(response.error, remade.error);
        }
        Ok(Spread {
            gauge,
            response,
            pattern,
            bounds,
            highest: joint.most_flatness_factor(),
            remade,
        })
    }

    /// Form and flatness over a range of force, from the nominal one outwards.
    fn bounds(
        &self,
        chain: &Chain,
        nominal: &Conditions,
        range: [f64; 2],
    ) -> Result<Vec<Bounds>, Failure> {
        let joint = chain.joint();
        let forms = self.solver.forms(joint);
        let mut variants = vec![Variant::Stated];
        variants.extend(forms);
        let loose = joint.most_loose_flatness() > 0.0;
        let highest = joint.most_flatness_factor();
        if loose {
            variants.extend([Variant::Bent(-1.0), Variant::Bent(1.0)]);
        }
        if highest > 1.0 {
            variants.extend([Variant::Bent(-highest), Variant::Bent(highest)]);
        }
        let mut forces = response::bounded(range, loose);
        forces.sort_by(|one, other| one.abs().total_cmp(&other.abs()));
        let state = |force: f64, variant: Variant| State {
            variant,
            conditions: under(nominal, force),
            factors: Factors::NONE,
            depth: Depth::Solved,
        };
        let states: Vec<State> = forces
            .iter()
            .flat_map(|force| variants.iter().map(|variant| state(*force, *variant)))
            .collect();
        let paths = self.solver.paths(joint, GROUND, &states)?;
        let at_force = |(force, paths): (&f64, &[Path])| {
            let ratio = |path: &Path| path.added_by_joint / paths[0].added_by_joint;
            let ratios: Vec<f64> = paths[1..].iter().map(ratio).collect();
            let (forms, bent) = ratios.split_at(forms.len());
            let form = forms.iter().fold([1.0_f64; 2], |[low, high], ratio| {
                [low.min(*ratio), high.max(*ratio)]
            });
            let (bent, most_bent) = match bent {
                [convex, concave] => ([*convex, *concave], [*convex, *concave]),
                [convex, concave, most @ ..] => ([*convex, *concave], [most[0], most[1]]),
                _ => ([1.0; 2], [1.0; 2]),
            };
            Bounds {
                force: *force,
                form,
                bent,
                most_bent,
            }
        };
        let parts = paths.chunks(variants.len());
        let mut bounds: Vec<Bounds> = forces.iter().zip(parts).map(at_force).collect();
        bounds.sort_by(|one, other| one.force.total_cmp(&other.force));
        Ok(bounds)
    }

    /// How the readings answer to bolts that leave the common pattern, by differences on the ground
    /// level; contacts are solved one after the other.
    fn pattern(&self, chain: &Chain, nominal: &Conditions) -> Result<Pattern, Failure> {
        Pattern::through(&nominal.forces, chain.force_classes(), |forces| {
            self.under_forces(chain, nominal, forces)
        })
    }

    /// Error of the slopes of the pattern: source to sink at the least and at the most force of every
    /// bolt, and with every other class half way to its least and the rest to its most, relative.
    fn pattern_error(
        &self,
        chain: &Chain,
        (case, nominal): (usize, &Conditions),
        (gauge, response, pattern): (&Gauge, &Response, &Pattern),
    ) -> Result<f64, Failure> {
        let base = self.under_forces(chain, nominal, nominal.forces.clone())?;
        let ends = chain.force_ends(case).map(|end| {
            let floored = end.iter().zip(&nominal.forces);
            floored
                .map(|(end, nominal)| end.max(response::LEAST_FORCE * nominal))
                .collect::<Vec<f64>>()
        });
        let mixed = pattern.alternating(&ends);
        let [least, most] = ends;
        let mut error = 0.0;
        for forces in [least, most, mixed] {
            let shift = pattern.shift(&forces);
            let solved = self.under_forces(chain, nominal, forces.clone())?;
            let conditions = Conditions {
                forces,
                ..nominal.clone()
            };
            let from = gauge.departure(nominal);
            let to = gauge.departure(&conditions);
            let told = response.shifted(&base, (&from, &to), &shift).source_to_sink;
            error = worse(error, (told / solved.source_to_sink - 1.0).abs());
        }
        Ok(error)
    }

    /// The path on the ground level at nominal under other forces, N.
    fn under_forces(
        &self,
        chain: &Chain,
        nominal: &Conditions,
        forces: Vec<f64>,
    ) -> Result<Path, Failure> {
        let conditions = Conditions {
            forces,
            ..nominal.clone()
        };
        let stated = (GROUND, Variant::Stated);
        let solved = self.solved(chain, stated, (&conditions, &Factors::NONE))?;
        Ok(solved.path().clone())
    }
}

/// The state on the ground level away from nominal.
pub(super) fn departed(nominal: &Conditions, (departure, depth): &(Departure, Depth)) -> State {
    let [force, touching, parted, warm, cold, between] = *departure;
    State {
        variant: Variant::Stated,
        conditions: under(nominal, force),
        factors: Factors {
            touching: touching.exp(),
            parted: parted.exp(),
            conductivity: [warm.exp(), cold.exp(), between.exp()],
        },
        depth: *depth,
    }
}

/// Nominal conditions under all forces times a factor, given as its logarithm.
pub(super) fn under(nominal: &Conditions, force: f64) -> Conditions {
    Conditions {
        forces: nominal
            .forces
            .iter()
            .map(|each| each * force.exp())
            .collect(),
        ..nominal.clone()
    }
}

/// The larger of two errors; not a number where one of them is none.
pub(super) fn worse(one: f64, other: f64) -> f64 {
    if one.is_nan() || other.is_nan() {
        f64::NAN
    } else {
        one.max(other)
    }
}
