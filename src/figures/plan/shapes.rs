//! What lies in plan: the edges of plates, what is cut out of them or stands on them, the bolts.

use crate::figures::{plan::View, sheet::circle};

/// The edge of one plate.
#[derive(Clone, Debug, PartialEq)]
pub struct PlanOutline {
    /// Name of the plate.
    pub name: String,
    /// Its edge.
    pub shape: PlanShape,
}

/// A part of a plate that shows in plan.
#[derive(Clone, Debug, PartialEq)]
pub struct PlanDetail {
    /// What it is.
    pub kind: DetailKind,
    /// Its edge.
    pub shape: PlanShape,
}

/// What a part of a plate is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum DetailKind {
    /// An opening through the plate.
    CutOut,
    /// A raised face, with air around it.
    Foot,
    /// A rib on the outer face.
    Rib,
}

/// A shape in plan, joint coordinates, m.
#[derive(Clone, Debug, PartialEq)]
pub enum PlanShape {
    /// A rectangle parallel to the axes.
    Rectangle {
        /// Lower left corner, m.
        corner: [f64; 2],
        /// Width and height, m.
        size: [f64; 2],
    },
    /// A disc.
    Disc {
        /// Centre, m.
        centre: [f64; 2],
        /// Radius, m.
        radius: f64,
    },
    /// A polygon, m.
    Polygon(Vec<[f64; 2]>),
}

/// One bolt in plan.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PlanBolt {
    /// Axis, joint coordinates, m.
    pub at: [f64; 2],
    /// Radius of the hole between the faces, m.
    pub hole_radius: f64,
    /// Outer radius under the head or washer, m.
    pub head_radius: f64,
    /// Radius where contact ends, m; none where it is not a circle.
    pub contact_radius: Option<f64>,
}

impl PlanShape {
    /// Whether the shape covers a place.
    pub(super) fn covers(&self, [x, y]: [f64; 2]) -> bool {
        match self {
            Self::Rectangle { corner, size } => {
                (0.0..=size[0]).contains(&(x - corner[0]))
                    && (0.0..=size[1]).contains(&(y - corner[1]))
            }
            Self::Disc { centre, radius } => (x - centre[0]).hypot(y - centre[1]) <= *radius,
            Self::Polygon(points) => {
                let mut inside = false;
                for (index, a) in points.iter().enumerate() {
                    let b = points[(index + 1) % points.len()];
                    if (a[1] > y) != (b[1] > y)
                        && x < a[0] + (y - a[1]) / (b[1] - a[1]) * (b[0] - a[0])
                    {
                        inside = !inside;
                    }
                }
                inside
            }
        }
    }

    /// The edge on the sheet.
    pub(super) fn edge(&self, view: &View) -> Vec<[f64; 2]> {
        match self {
            Self::Rectangle {
                corner: [x, y],
                size: [w, h],
            } => [[*x, *y], [x + w, *y], [x + w, y + h], [*x, y + h]]
                .map(|p| view.point(p))
                .to_vec(),
            Self::Disc { centre, radius } => {
                circle(view.point(*centre), radius * view.points_per_metre)
            }
            Self::Polygon(points) => points.iter().map(|p| view.point(*p)).collect(),
        }
    }
}
