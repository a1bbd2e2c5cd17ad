//! The checked ways of heat: where it enters the first plate, where it leaves the last.

/// Where heat enters the outer face of the first plate.
#[derive(Clone, Debug, PartialEq)]
pub enum Heating {
    /// One zone, or the whole face.
    One(Source),
    /// Several zones of uniform flux, each with its own heat; where they overlap fluxes add.
    Several(Vec<HeatedZone>),
}

/// A heated zone of the outer face.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Source {
    /// The heated zone.
    pub zone: Zone,
    /// One temperature over the zone instead of uniform flux.
    pub isothermal: bool,
}

/// One of several heated zones.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct HeatedZone {
    /// Where it lies.
    pub zone: Zone,
    /// Heat that enters there, W.
    pub heat: f64,
}

/// A part of an outer face, in the plate's own coordinates; those of the first plate are those of
/// the joint.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Zone {
    /// The whole outer face.
    Face,
    /// A rectangle parallel to the axes.
    Rectangle {
        /// Centre, m.
        centre: [f64; 2],
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
}

/// Where heat leaves the last plate, all to one temperature.
#[derive(Clone, Debug, PartialEq)]
pub enum Cooling {
    /// The whole back, or a round rim.
    Whole(Sink),
    /// Parts of the back and edges.
    Parts(Vec<CooledPart>),
}

/// A sink that closed forms know.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Sink {
    /// The whole back face at one temperature.
    IsothermalBack,
    /// A film on the whole back face, W/(m² K).
    Film(f64),
    /// The rim of a round plate at one temperature, back insulated.
    Rim,
}

/// A part of the last plate that gives off heat.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum CooledPart {
    /// A film on a part of the back.
    Film {
        /// The part.
        zone: Zone,
        /// Film coefficient, W/(m² K).
        coefficient: f64,
    },
    /// A part of the back at one temperature.
    Held(Zone),
    /// A straight edge at one temperature, over the whole thickness.
    Edge(Edge),
    /// The rim of a round plate at one temperature.
    Rim,
    /// The whole back radiates.
    Radiation {
        /// Hemispherical emissivity, 1.
        emissivity: f64,
    },
}

/// An edge of a rectangular plate in plan: x to the right, y up.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Edge {
    /// At the smallest x.
    Left,
    /// At the largest x.
    Right,
    /// At the smallest y.
    Lower,
    /// At the largest y.
    Upper,
}

impl Heating {
    /// The only zone; none of several.
    pub fn alone(&self) -> Option<Source> {
        match self {
            Self::One(source) => Some(*source),
            Self::Several(_) => None,
        }
    }

    /// Every zone with its part of the heat: watts of several, 1 of one.
    pub fn zones(&self) -> Vec<(Zone, f64)> {
        match self {
            Self::One(source) => vec![(source.zone, 1.0)],
            Self::Several(zones) => zones.iter().map(|each| (each.zone, each.heat)).collect(),
        }
    }
}

impl From<Source> for Heating {
    fn from(source: Source) -> Self {
        Self::One(source)
    }
}

impl Cooling {
    /// The only sink, where closed forms know it.
    pub fn alone(&self) -> Option<Sink> {
        match self {
            Self::Whole(sink) => Some(*sink),
            Self::Parts(_) => None,
        }
    }

    /// Whether a part of it radiates, so that its film follows the temperature.
    pub fn radiates(&self) -> bool {
        let Self::Parts(parts) = self else {
            return false;
        };
        parts
            .iter()
            .any(|part| matches!(part, CooledPart::Radiation { .. }))
    }
}

impl From<Sink> for Cooling {
    fn from(sink: Sink) -> Self {
        Self::Whole(sink)
    }
}

impl Zone {
    /// Its area, m², on a face of so much, m².
    pub fn area(self, face: f64) -> f64 {
        match self {
            Self::Face => face,
            Self::Rectangle { size, .. } => size[0] * size[1],
            Self::Disc { radius, .. } => std::f64::consts::PI * radius * radius,
        }
    }

    /// The same zone of a plate whose origin lies there, in joint coordinates.
    #[must_use]
    pub fn moved(self, [x, y]: [f64; 2]) -> Self {
        let shifted = |[a, b]: [f64; 2]| [a + x, b + y];
        match self {
            Self::Face => Self::Face,
            Self::Rectangle { centre, size } => Self::Rectangle {
                centre: shifted(centre),
                size,
            },
            Self::Disc { centre, radius } => Self::Disc {
                centre: shifted(centre),
                radius,
            },
        }
    }
}
