//! The draws of one case on a solved field, compiled: surfaces, nominal path, bounds.

use serde_json::{Value, json};

use crate::{
    estimate::{
        Chain, Failure, Realisation,
        chain::{
            conditions::{Conditions, Outlook},
            draw::{Bend, Drawn},
            elastic::{
                ElasticModel,
                flat::Flat,
                response::{self, Readings},
                spread::Spread,
            },
        },
    },
    joint::Joint,
    resistance::Path,
};

/// What turns the conditions of a draw into its resistances.
#[derive(Clone, Debug)]
pub(in crate::estimate::chain) struct ElasticPlan<'a> {
    spread: &'a Spread,
    flat: Flat,
    /// The path that is moved, and the readings of the surfaces there.
    from: Drawn,
    read: Readings,
    /// The joint, where its out-of-flatness is stated with a spread.
    heights: Option<&'a Joint>,
}

impl ElasticModel {
    /// The plan of a case, with what its draws meet; works out the surfaces unless they are known.
    pub(in crate::estimate::chain) fn plan<'a>(
        &'a self,
        chain: &'a Chain,
        index: usize,
    ) -> Result<(Outlook<'a>, ElasticPlan<'a>), Failure> {
        let spread = self.spread_of(chain, index)?;
        let case = self.case(chain, index)?;
        let flat = Flat::of(&spread.response);
        let (from, read) = match &case.solved {
            Some(solved) => {
                let departure = spread.gauge.departure(&case.conditions);
                let shift = spread.shift((&case.conditions.forces, departure[0]), &[]);
                let here = flat.at(&departure);
                let read = std::array::from_fn(|reading| here[reading] + shift[reading]);
                (Drawn::of(solved.path()), read)
            }
            // Without force in the nominal state the draws stand on the ground level.
            None => (
                Drawn::of(&spread.response.base),
                flat.at(&response::NOMINAL),
            ),
        };
        let plan = ElasticPlan {
            spread,
            flat,
            from,
            read,
            heights: Some(chain.joint()).filter(|joint| joint.most_flatness_factor() > 1.0),
        };
        Ok((Outlook::of(chain, index, &case.warmth)?, plan))
    }
}

impl ElasticModel {
    /// Source to sink of a draw, form and flatness left out, on the level of the surfaces: as read
    /// from them, and solved. None where hardly any force is left.
    pub(in crate::estimate::chain) fn beside(
        &self,
        chain: &Chain,
        index: usize,
        at: &Realisation,
    ) -> Result<Option<[f64; 2]>, Failure> {
        let spread = self.spread_of(chain, index)?;
        let conditions = chain.conditions(index, at)?;
        let to = spread.gauge.departure(&conditions);
        if to[0] < response::LEAST_FORCE.ln() {
            return Ok(None);
        }
        let solved = self.drawn_for_itself(chain, (index, &conditions), at)?;
        let base = &spread.response.base;
        let shift = spread.shift((&conditions.forces, to[0]), &at.stated);
        let moved = (&response::NOMINAL, &to);
        let told = spread.response.shifted(base, moved, &shift).source_to_sink;
        Ok(Some([told, solved.source_to_sink]))
    }
}

impl ElasticPlan<'_> {
    /// The resistances of a draw under its conditions: those of `Spread::moved`, or of the surfaces
    /// alone where the nominal state is open.
    pub(in crate::estimate::chain) fn drawn(
        &self,
        conditions: &Conditions,
        at: &Realisation,
    ) -> Drawn {
        let (moved, force) = self.unformed(conditions, at);
        moved
            .with_form(self.spread.form(force, [at.field, self.flatness(at)]))
            .with_error(at.numerical)
    }

    /// The same with the faces bent every way by as much as in the draw.
    pub(in crate::estimate::chain) fn drawn_bent(
        &self,
        conditions: &Conditions,
        at: &Realisation,
    ) -> [Drawn; 3] {
        let (moved, force) = self.unformed(conditions, at);
        let height = self.flatness(at).abs();
        let places = Bend::ALL.map(|bend| bend.place(height));
        self.spread
            .forms(force, (at.field, places))
            .map(|form| moved.with_form(form).with_error(at.numerical))
    }

    /// The resistances before the model form, with the force over the nominal one as a logarithm.
    fn unformed(&self, conditions: &Conditions, at: &Realisation) -> (Drawn, f64) {
        let to = self.spread.gauge.departure(conditions);
        let open = self.spread.response.open.as_ref();
        let shift = self.spread.shift((&conditions.forces, to[0]), &at.stated);
        let moved = if let Some(open) = open.filter(|_| to[0] == f64::NEG_INFINITY) {
            Drawn::of(open).moved(&shift)
        } else {
            let there = self.flat.at(&to);
            self.moved(std::array::from_fn(|reading| {
                there[reading] + shift[reading]
            }))
        };
        (moved, to[0])
    }

    /// The path moved to other readings: that of `Response::applied`.
    fn moved(&self, there: Readings) -> Drawn {
        let by: Readings = std::array::from_fn(|reading| there[reading] - self.read[reading]);
        self.from.moved(&by)
    }

    /// Place of the out-of-flatness of a draw, 1 for the nominal height.
    fn flatness(&self, at: &Realisation) -> f64 {
        match self.heights {
            Some(joint) => at.flatness * joint.flatness_factor(&at.stated),
            None => at.flatness,
        }
    }
}

impl ElasticPlan<'_> {
    /// What the plan reads from, as data.
    pub(in crate::estimate::chain) fn tables(&self) -> Value {
        json!({
            "from": self.from.all(),
            "read": self.read,
            "surfaces": self.flat.tables(),
            "gauge": self.spread.gauge.tables(),
            "bounds": self.spread.bounds_tables(),
        })
    }
}

impl Drawn {
    /// With its readings moved by so much: what `moved` makes of a path.
    pub(in crate::estimate::chain) fn moved(&self, by: &Readings) -> Self {
        let [contact, perfect, added, node, interface, hottest, joint] = *by;
        let perfect_contact = self.perfect_contact * perfect.exp();
        let added_by_joint = if added.is_finite() {
            self.added_by_joint * added.exp()
        } else {
            let share = self.added_by_joint / self.source_to_sink + joint;
            perfect_contact * share / (1.0 - share)
        };
        let source_to_sink = perfect_contact + added_by_joint;
        let share = |value: f64, moved: f64| (value / self.source_to_sink + moved) * source_to_sink;
        Self {
            contact: self.contact * (-contact).exp(),
            perfect_contact,
            added_by_joint,
            source_to_sink,
            node_to_node: share(self.node_to_node, node),
            interface_drop: share(self.interface_drop, interface),
            hottest: share(self.hottest, hottest),
            ..*self
        }
    }

    /// What a path leaves behind.
    pub(in crate::estimate::chain) fn of(path: &Path) -> Self {
        Self {
            contact: path.contact.recip(),
            node_to_node: path.node_to_node,
            added_by_joint: path.added_by_joint,
            source_to_sink: path.source_to_sink,
            perfect_contact: path.perfect_contact,
            hottest: path.hottest,
            interface_drop: path.interface_drop,
            coolant_drop: path.coolant_drop.unwrap_or(0.0),
            heat: 1.0,
        }
    }
}
