//! Temperatures on a line through the joint, at all heights.

use crate::resistance::columns::Heat;

/// Direction of a section, and where it stands on the other axis.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Across {
    /// Along x at this y, m.
    X(f64),
    /// Along y at this x, m.
    Y(f64),
}

/// Temperatures of one body on a section.
#[derive(Clone, Debug, PartialEq)]
pub struct Section {
    /// Places along the section, m.
    pub along: Vec<f64>,
    /// Heights of the nodes above the lowest face of the stack, m.
    pub heights: Vec<f64>,
    /// For every place and height the temperature above the coolant, K/W; none where no solid is.
    pub rise: Vec<Vec<Option<f64>>>,
}

impl Heat {
    /// A section through every body, first body first; none where the line misses the plan.
    pub fn section(&self, across: Across) -> Option<Vec<Section>> {
        let plan = self.stack.plan();
        let first = [plan.x[0], plan.y[0]];
        let lines = match across {
            Across::X(_) => &plan.x,
            Across::Y(_) => &plan.y,
        };
        let point = |at: f64| match across {
            Across::X(y) => [at, y],
            Across::Y(x) => [x, at],
        };
        plan.around(point(first[usize::from(matches!(across, Across::Y(_)))]))?;
        let mut foot: f64 = self.stack.bodies.iter().map(super::Body::thickness).sum();
        let mut sections = Vec::new();
        for (index, body) in self.stack.bodies.iter().enumerate() {
            foot -= body.thickness();
            let nodes = body.nodes();
            let solid: Vec<Vec<f64>> = (0..nodes)
                .map(|node| self.stack.solid(index, node))
                .collect();
            let value = |at: f64, node: usize| {
                let around = plan.around(point(at))?;
                let mut sum = 0.0;
                for (column, weight) in around.into_iter().filter(|(_, weight)| *weight > 0.0) {
                    if solid[node][column] < 0.5 {
                        return None;
                    }
                    sum += weight * self.temperatures[index][column * nodes + node];
                }
                Some(sum)
            };
            sections.push(Section {
                along: lines.clone(),
                heights: body.heights().iter().map(|height| foot + height).collect(),
                rise: lines
                    .iter()
                    .map(|at| (0..nodes).map(|node| value(*at, node)).collect())
                    .collect(),
            });
        }
        Some(sections)
    }
}
