//! What of a rectangle belongs to a plate, the heated zone or the faying faces: exact areas and
//! widths, so that nothing is missed however small it is.

use crate::{
    joint::{Outline, Zone},
    resistance::region::{Region, Side},
};

/// A circle: centre and radius, m.
pub(super) type Disc = ([f64; 2], f64);

/// Below this share of an area nothing is left but rounding.
const ROUNDING: f64 = 1e-12;

/// The part of a rectangle that lies inside some discs and outside of some holes.
#[derive(Clone, Debug)]
pub(super) struct Cover {
    low: [f64; 2],
    high: [f64; 2],
    /// Discs whose rim crosses the rectangle.
    discs: Vec<Disc>,
    /// Holes that reach into it and not into each other.
    holes: Vec<Disc>,
}

impl Cover {
    /// The whole rectangle.
    pub(super) fn new(low: [f64; 2], high: [f64; 2]) -> Self {
        Self {
            low,
            high,
            discs: Vec::new(),
            holes: Vec::new(),
        }
    }

    pub(super) fn on_plate(self, (outline, origin): &(Outline, [f64; 2])) -> Self {
        match *outline {
            Outline::Rectangle { size } => {
                self.on_rectangle(*origin, [0, 1].map(|k| origin[k] + size[k]))
            }
            Outline::Disc { radius } => self.on_disc((*origin, radius)),
            // `cells` refuses polygons before any grid is laid over them.
            Outline::Polygon { .. } => self,
        }
    }

    pub(super) fn in_zone(self, zone: Zone) -> Self {
        match zone {
            Zone::Face => self,
            Zone::Rectangle { centre, size } => self.on_rectangle(
                [0, 1].map(|k| centre[k] - 0.5 * size[k]),
                [0, 1].map(|k| centre[k] + 0.5 * size[k]),
            ),
            Zone::Disc { centre, radius } => self.on_disc((centre, radius)),
        }
    }

    pub(super) fn without(mut self, holes: impl Iterator<Item = Disc>) -> Self {
        if !self.is_empty() {
            let reaching = holes.filter(|(centre, radius)| self.nearest(*centre) < *radius);
            self.holes = reaching.collect();
        }
        self
    }

    fn on_rectangle(mut self, low: [f64; 2], high: [f64; 2]) -> Self {
        for k in 0..2 {
            self.low[k] = self.low[k].max(low[k]);
            self.high[k] = self.high[k].min(high[k]);
        }
        self
    }

    fn on_disc(mut self, disc: Disc) -> Self {
        if self.is_empty() || self.nearest(disc.0) >= disc.1 {
            self.high = self.low;
        } else if self.farthest(disc.0) > disc.1 {
            self.discs.push(disc);
        }
        self
    }

    fn is_empty(&self) -> bool {
        (0..2).any(|k| self.high[k] <= self.low[k])
    }

    /// Distance from a point to the rectangle, m.
    fn nearest(&self, point: [f64; 2]) -> f64 {
        let [x, y] = [0, 1].map(|k| {
            let beside = (self.low[k] - point[k]).max(point[k] - self.high[k]);
            beside.max(0.0)
        });
        x.hypot(y)
    }

    /// Distance from a point to the farthest corner of the rectangle, m.
    fn farthest(&self, point: [f64; 2]) -> f64 {
        let [x, y] = [0, 1].map(|k| (point[k] - self.low[k]).max(self.high[k] - point[k]));
        x.hypot(y)
    }

    /// m².
    pub(super) fn area(&self) -> f64 {
        if self.is_empty() {
            return 0.0;
        }
        let whole = self.area_inside(None);
        let pierced: f64 = self
            .holes
            .iter()
            .map(|hole| self.area_inside(Some(*hole)))
            .sum();
        let left = whole - pierced;
        if left > ROUNDING * whole { left } else { 0.0 }
    }

    /// Area inside the discs, and inside one hole, m².
    fn area_inside(&self, hole: Option<Disc>) -> f64 {
        let hole = hole.filter(|(centre, radius)| self.farthest(*centre) > *radius);
        if self.discs.is_empty() && hole.is_none() {
            return (self.high[0] - self.low[0]) * (self.high[1] - self.low[1]);
        }
        let middle = [0, 1].map(|k| 0.5 * (self.low[k] + self.high[k]));
        let mut sides = Vec::with_capacity(8);
        for k in 0..2 {
            for direction in [-1.0, 1.0] {
                let mut normal = [0.0; 2];
                normal[k] = direction;
                let offset = 0.5 * (self.high[k] - self.low[k]);
                sides.push(Side::Line { normal, offset });
            }
        }
        for (centre, radius) in self.discs.iter().chain(&hole) {
            sides.push(Side::Circle {
                centre: [centre[0] - middle[0], centre[1] - middle[1]],
                radius: *radius,
            });
        }
        Region::new(&sides).area_within(f64::INFINITY)
    }

    /// Length of a line across an axis that lies inside, m; none on the border of the rectangle.
    pub(super) fn width(&self, axis: usize, place: f64) -> f64 {
        let across = 1 - axis;
        if self.is_empty() || place <= self.low[axis] || place >= self.high[axis] {
            return 0.0;
        }
        let chord = |(centre, radius): &Disc| {
            let off = place - centre[axis];
            let half = (radius * radius - off * off).max(0.0).sqrt();
            [centre[across] - half, centre[across] + half]
        };
        let (mut low, mut high) = (self.low[across], self.high[across]);
        for disc in &self.discs {
            let [from, to] = chord(disc);
            low = low.max(from);
            high = high.min(to);
        }
        let pierced: f64 = self
            .holes
            .iter()
            .map(chord)
            .map(|[from, to]| (to.min(high) - from.max(low)).max(0.0))
            .sum();
        (high - low - pierced).max(0.0)
    }
}

#[cfg(test)]
mod tests {
    use std::f64::consts::PI;

    use super::*;

    #[test]
    fn a_hole_across_a_corner_takes_a_quarter_of_a_disc() {
        let cover = Cover::new([0.0; 2], [3.0, 2.0]).without([([0.0; 2], 1.0)].into_iter());
        assert!((cover.area() - (6.0 - 0.25 * PI)).abs() < 1e-14);
        assert!((cover.width(0, 0.6) - 1.2).abs() < 1e-14);
        assert!((cover.width(1, 0.8) - 2.4).abs() < 1e-14);
    }

    #[test]
    fn a_thin_heated_ring_keeps_its_area() {
        let zone = Zone::Disc {
            centre: [1.0, 1.0],
            radius: 0.505,
        };
        let ring = Cover::new([0.0; 2], [2.0; 2])
            .in_zone(zone)
            .without([([1.0, 1.0], 0.5)].into_iter());
        let exact = PI * (0.505 * 0.505 - 0.25);
        // Difference of two areas a hundred times as large.
        assert!((ring.area() / exact - 1.0).abs() < 1e-12);
    }

    #[test]
    fn what_lies_beyond_the_plate_is_nothing() {
        let plate = (Outline::Disc { radius: 1.0 }, [0.0; 2]);
        let beyond = Cover::new([0.8, 0.8], [1.0, 1.0]).on_plate(&plate);
        assert!(beyond.area() <= 0.0 && beyond.width(0, 0.9) <= 0.0);
        let plate = (Outline::Rectangle { size: [1.0, 1.0] }, [0.0; 2]);
        let over = Cover::new([0.5, 0.0], [2.0, 1.0]).on_plate(&plate);
        assert!((over.area() - 0.5).abs() < 1e-15);
        // The edge of a plate joins nothing.
        assert!(over.width(0, 1.0) <= 0.0);
    }
}
