//! Layers of several conductivities: cores beside inserts.

use std::borrow::Cow;

use crate::resistance::{
    Failure,
    columns::{Conductivity, Stack},
};

/// Shares of a cell that are none.
const ROUNDING: f64 = 1e-12;

/// A part of a layer with a conductivity of its own, whatever that of its body.
#[derive(Clone, Debug, PartialEq)]
pub struct Part {
    /// Share of every cell of the plan that it fills; together with the other parts of its layer at most
    /// what the layer fills.
    pub shares: Vec<f64>,
    /// Its conductivity.
    pub conductivity: Conductivity,
}

impl Stack {
    /// The same bodies with parts of a layer (0 is the lowest of its body) of other conductivities; what
    /// they leave of the layer keeps that of the body.
    ///
    /// Checked: `layers_in_series_conduct_as_the_slab`, `parts_beside_each_other_conduct_in_parallel`.
    pub fn made_of(
        mut self,
        (body, layer): (usize, usize),
        parts: Vec<Part>,
    ) -> Result<Self, Failure> {
        let whole = self
            .bodies
            .get(body)
            .and_then(|body| body.layers.get(layer));
        let sound = |part: &Part| {
            part.shares.len() == self.plan.cells()
                && part.shares.iter().all(|share| (0.0..=1.0).contains(share))
                && part.conductivity.is_sound()
        };
        let fits = whole.is_some_and(|whole| {
            let mut cells = whole.shares.iter().enumerate();
            parts.iter().all(sound)
                && cells.all(|(cell, share)| {
                    let filled: f64 = parts.iter().map(|part| part.shares[cell]).sum();
                    filled <= share + ROUNDING
                })
        });
        if !fits {
            return Err(Failure::Misfit {
                what: "parts of a layer need a share for every cell of it and conductivities above zero",
            });
        }
        self.parts.insert((body, layer), parts);
        Ok(self)
    }

    /// Whether every layer conducts as its body does.
    pub(super) fn is_plain(&self) -> bool {
        self.parts.is_empty()
    }

    /// What a layer is made of: shares of the cells with their conductivity, given that of its body.
    pub(super) fn made(
        &self,
        (body, layer): (usize, usize),
        conductivity: Conductivity,
    ) -> Vec<(Cow<'_, [f64]>, Conductivity)> {
        let whole = &self.bodies[body].layers[layer].shares;
        let Some(parts) = self.parts.get(&(body, layer)) else {
            return vec![(Cow::Borrowed(whole), conductivity)];
        };
        let rest = whole.iter().enumerate().map(|(cell, share)| {
            let left = share - parts.iter().map(|part| part.shares[cell]).sum::<f64>();
            if left > ROUNDING { left } else { 0.0 }
        });
        let rest: Vec<f64> = rest.collect();
        let mut made = Vec::with_capacity(parts.len() + 1);
        if rest.iter().any(|share| *share > 0.0) {
            made.push((Cow::Owned(rest), conductivity));
        }
        made.extend(
            parts
                .iter()
                .map(|part| (Cow::Borrowed(part.shares.as_slice()), part.conductivity)),
        );
        made
    }
}
