//! Many draws of one case: the chain with everything worked out that no draw changes.

use serde_json::{Value, json};

use crate::estimate::{
    Chain, Failure, Realisation,
    chain::{
        Model,
        conditions::{Conditions, Outlook},
        elastic::ElasticPlan,
    },
};

/// What one draw leaves behind, K/W.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Drawn {
    /// Faying faces alone.
    pub contact: f64,
    /// Mean of the first plate to mean of the last.
    pub node_to_node: f64,
    /// What the joint adds to perfect contact.
    pub added_by_joint: f64,
    /// Mean of the heated zone to mean of the sink surface.
    pub source_to_sink: f64,
    /// Source to sink when the faces meet perfectly.
    pub perfect_contact: f64,
    /// Highest temperature of the first plate.
    pub hottest: f64,
    /// Mean drop across the faying faces.
    pub interface_drop: f64,
    /// From the mean sink surface to the coolant; 0 without a film.
    pub coolant_drop: f64,
    /// Heat over the nominal heat, 1.
    pub heat: f64,
}

/// Which way faces are bent whose flatness is stated as a height alone.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Bend {
    /// They meet in the middle and stand open at the edge.
    Convex,
    /// Not at all.
    Flat,
    /// They meet at the edge and stand open in the middle.
    Concave,
}

impl Bend {
    /// Every way, in the order in which draws tell them.
    pub const ALL: [Self; 3] = [Self::Convex, Self::Flat, Self::Concave];

    /// The way in which a draw is bent, by its place of flatness.
    pub fn of(place: f64) -> Self {
        if place < 0.0 {
            Self::Convex
        } else if place > 0.0 {
            Self::Concave
        } else {
            Self::Flat
        }
    }

    /// Its name for people.
    pub fn name(self) -> &'static str {
        match self {
            Self::Convex => "convex",
            Self::Flat => "flat",
            Self::Concave => "concave",
        }
    }

    /// Place of flatness of so much bending.
    pub(super) fn place(self, height: f64) -> f64 {
        match self {
            Self::Convex => -height,
            Self::Flat => 0.0,
            Self::Concave => height,
        }
    }
}

/// One case of a chain, compiled for its draws.
///
/// ```text
/// torque, losses → force;  faces, gas, filler → conductance at the gauge's pressure and gap;
/// both and the conductivities → surfaces of the response → resistances
/// ```
///
/// The laws are evaluated as they stand; only the surfaces behind them are approximate, and
/// [`Chain::draw_error`] tells how much. On the cone the networks are solved for every draw, and only
/// what makes another joint (a thickness, a film) is read beside them. It gives what [`Chain::state`]
/// gives, within rounding.
/// Checked: `tests/validation_draws.rs`.
#[derive(Clone, Debug)]
pub struct DrawPlan<'a> {
    chain: &'a Chain<'a>,
    case: usize,
    outlook: Outlook<'a>,
    field: Field<'a>,
    /// Whether heat or films scatter.
    heat_scatters: bool,
}

/// What stands for the field.
#[derive(Clone, Debug)]
enum Field<'a> {
    Cone,
    Elastic(Box<ElasticPlan<'a>>),
}

/// Room in which draws are worked out one after the other.
#[derive(Clone, Debug)]
pub struct Workspace(Conditions);

impl Chain<'_> {
    /// Source to sink of a draw as it is read from the surfaces of a solved field, and as solved for
    /// these very inputs on the level of the surfaces, K/W; form and flatness, which stand on bounds,
    /// are left at nominal. None on the cone, which solves every draw, and where hardly any force is
    /// left.
    pub fn draw_beside(&self, case: usize, at: &Realisation) -> Result<Option<[f64; 2]>, Failure> {
        match &self.model {
            Model::Cone(_) => Ok(None),
            Model::Elastic(model) => model.beside(self, case, at),
        }
    }

    /// The answers of a case at nominal.
    pub(crate) fn nominal_answers(&self, case: usize) -> Result<Drawn, Failure> {
        let state = self.state(case, &Realisation::default())?;
        Ok(Drawn::of(&state.path))
    }

    /// The plan of the draws of a case; on a solved field this works out their surfaces, once.
    pub fn draw_plan(&self, case: usize) -> Result<DrawPlan<'_>, Failure> {
        let (outlook, field) = match &self.model {
            Model::Cone(model) => {
                model.expect_draws(self, case)?;
                (Outlook::of(self, case, &self.cold(case))?, Field::Cone)
            }
            Model::Elastic(model) => {
                let (outlook, plan) = model.plan(self, case)?;
                (outlook, Field::Elastic(Box::new(plan)))
            }
        };
        Ok(DrawPlan {
            chain: self,
            case,
            outlook,
            field,
            heat_scatters: self.joint.scatters_heat(),
        })
    }
}

impl DrawPlan<'_> {
    /// Room for draws.
    pub fn workspace(&self) -> Workspace {
        Workspace(self.outlook.at(&Realisation::default()))
    }

    /// The resistances at a realisation.
    pub fn drawn(&self, at: &Realisation, workspace: &mut Workspace) -> Result<Drawn, Failure> {
        let conditions = &mut workspace.0;
        self.outlook.put(at, conditions);
        let found = match (&self.field, &self.chain.model) {
            (Field::Elastic(plan), _) => plan.drawn(conditions, at),
            (Field::Cone, Model::Cone(model)) => {
                let path = model.path(self.chain, self.case, (conditions, at))?;
                Drawn::of(&path).with_error(at.numerical)
            }
            (Field::Cone, Model::Elastic(_)) => unreachable!("the plan is of this chain"),
        };
        if found.is_sound() {
            return Ok(self.heated(found, at));
        }
        // The chain itself knows what may be infinite, and names what may not.
        let state = self.chain.state(self.case, at)?;
        Ok(self.heated(Drawn::of(&state.path), at))
    }

    /// With the heat and the films of a draw.
    fn heated(&self, drawn: Drawn, at: &Realisation) -> Drawn {
        if !self.heat_scatters {
            return drawn;
        }
        let joint = self.chain.joint();
        Drawn {
            heat: joint.heat_factor(&at.stated),
            coolant_drop: drawn.coolant_drop * joint.coolant_factor(&at.stated),
            ..drawn
        }
    }
}

impl DrawPlan<'_> {
    /// The resistances at a realisation with its faces bent every way ([`Bend::ALL`]) by as much as there.
    pub fn drawn_bent(
        &self,
        at: &Realisation,
        workspace: &mut Workspace,
    ) -> Result<[Drawn; 3], Failure> {
        if let Field::Elastic(plan) = &self.field {
            let conditions = &mut workspace.0;
            self.outlook.put(at, conditions);
            let found = plan.drawn_bent(conditions, at);
            if found.iter().all(Drawn::is_sound) {
                return Ok(found.map(|drawn| self.heated(drawn, at)));
            }
        }
        let [convex, flat, concave] = Bend::ALL.map(|bend| {
            let bent = Realisation {
                flatness: bend.place(at.flatness.abs()),
                ..at.clone()
            };
            self.drawn(&bent, workspace)
        });
        Ok([convex?, flat?, concave?])
    }
}

impl DrawPlan<'_> {
    /// What a draw is read from on a solved field, as data: for programs that evaluate the same
    /// draws; nothing for the cone. Out-of-flatness, and what stated values do, are not in it.
    pub fn tables(&self) -> Value {
        match &self.field {
            Field::Cone => Value::Null,
            Field::Elastic(plan) => json!({
                "meets": self.outlook.tables(),
                "field": plan.tables(),
            }),
        }
    }
}

impl Drawn {
    /// The resistances that the field tells, in the order of the fields.
    pub fn all(&self) -> [f64; 7] {
        [
            self.contact,
            self.node_to_node,
            self.added_by_joint,
            self.source_to_sink,
            self.perfect_contact,
            self.hottest,
            self.interface_drop,
        ]
    }

    /// Whether every resistance is a number that can be: means of plates may stand either way round.
    fn is_sound(&self) -> bool {
        let signed = [
            self.node_to_node,
            self.added_by_joint,
            self.hottest,
            self.interface_drop,
        ];
        let unsigned = [self.contact, self.source_to_sink, self.perfect_contact];
        signed.iter().all(|value| value.is_finite())
            && unsigned
                .iter()
                .all(|value| value.is_finite() && *value > 0.0)
    }

    /// Moved by what the grid may err: all of it alike, but for the ring sum.
    pub(super) fn with_error(self, numerical: f64) -> Self {
        let factor = 1.0 + numerical;
        Self {
            contact: self.contact,
            node_to_node: self.node_to_node * factor,
            added_by_joint: self.added_by_joint * factor,
            source_to_sink: self.source_to_sink * factor,
            perfect_contact: self.perfect_contact * factor,
            hottest: self.hottest * factor,
            interface_drop: self.interface_drop * factor,
            ..self
        }
    }

    /// With the model form applied to what the joint adds.
    pub(super) fn with_form(self, form: f64) -> Self {
        let added = self.added_by_joint * form;
        let moved = added - self.added_by_joint;
        Self {
            added_by_joint: added,
            source_to_sink: self.source_to_sink + moved,
            hottest: self.hottest + moved,
            interface_drop: self.interface_drop * form,
            node_to_node: self.node_to_node + moved,
            ..self
        }
    }
}
