//! Values that the file states with a spread of their own, and how bolts scatter together.

use crate::joint::{
    Bounds, CooledPart, Cooling, Engagement, Facing, FillerKind, Joint, Medium, Sink,
};

/// Lengths nearer to each other than this are one, relative.
const SAME_LENGTH: f64 = 1e-9;

/// A stated value with its spread.
#[derive(Clone, Debug, PartialEq)]
pub struct Uncertain {
    /// Which value.
    pub what: What,
    /// Where it may lie, SI.
    pub bounds: Bounds,
}

/// Which value of the joint is uncertain by its own statement.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum What {
    /// Conductivity of the filler of an interface.
    FillerConductivity(usize),
    /// Thickness of a layer, or of a paste as applied.
    FillerThickness(usize),
    /// Both boundaries of a layer together.
    FillerBoundary(usize),
    /// Thinnest bond line of a paste.
    FillerThinnest(usize),
    /// Emissivity of the faces of a plate.
    Emissivity(usize),
    /// Thickness of a plate.
    Thickness(usize),
    /// Height of the known bow of a plate, whichever way it goes.
    Bow(usize),
    /// Out-of-flatness of a face of a plate that is stated without its shape.
    Flatness(usize, Facing),
    /// Film coefficient of the sink, of several the one of this number.
    Film(usize),
    /// Absolute pressure of the gas.
    GasPressure,
    /// Heat of the joint.
    Heat,
}

impl What {
    /// Whether another value makes another body, another way out for the heat, or gaps that conduct many
    /// times as well, which nothing but a solution of its own can tell.
    pub fn remakes(self) -> bool {
        matches!(
            self,
            Self::Thickness(_) | Self::Bow(_) | Self::Film(_) | Self::GasPressure
        )
    }

    /// Whether the plates touch otherwise under another value.
    pub fn moves_contact(self) -> bool {
        matches!(self, Self::Thickness(_) | Self::Bow(_))
    }
}

/// How much of the scatter of friction a bolt has for itself.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bolts {
    /// Share of the variance that is a bolt's own, 1: 0 for one lot, 1 for independent bolts.
    pub own: f64,
}

impl Bolts {
    /// All bolts lie alike.
    pub const ONE_LOT: Self = Self { own: 0.0 };
    /// Every bolt for itself.
    pub const INDEPENDENT: Self = Self { own: 1.0 };

    /// How this is called.
    pub fn words(&self) -> String {
        if self.own <= 0.0 {
            "one lot, all alike".into()
        } else if self.own >= 1.0 {
            "independent of each other".into()
        } else {
            format!("{:.0} % of the variance each for itself", 100.0 * self.own)
        }
    }
}

impl Joint {
    /// A stated spread at its place in a realisation; none where the file states none.
    fn stated(&self, what: What, places: &[f64]) -> Option<f64> {
        let index = self.uncertain.iter().position(|each| each.what == what)?;
        let place = places.get(index).copied().unwrap_or(0.0);
        Some(self.uncertain[index].bounds.at(place))
    }

    /// The filler of an interface with its stated spreads at their places.
    pub fn filler_at(&self, interface: usize, places: &[f64]) -> Option<FillerKind> {
        let mut kind = self.filler(interface)?.kind.clone();
        let move_to = |value: &mut f64, what: What| {
            if let Some(there) = self.stated(what, places) {
                *value = there;
            }
        };
        match &mut kind {
            FillerKind::Fluid { conductivity } => {
                move_to(conductivity, What::FillerConductivity(interface));
            }
            FillerKind::Foil {
                conductivity,
                thickness,
                ..
            } => {
                move_to(conductivity, What::FillerConductivity(interface));
                move_to(thickness, What::FillerThickness(interface));
            }
            FillerKind::Layer {
                conductivity,
                thickness,
                boundary,
            } => {
                move_to(conductivity, What::FillerConductivity(interface));
                move_to(thickness, What::FillerThickness(interface));
                move_to(boundary, What::FillerBoundary(interface));
            }
            FillerKind::Paste {
                conductivity,
                thinnest,
                applied,
                ..
            } => {
                move_to(conductivity, What::FillerConductivity(interface));
                // A stated bond line is both at once.
                if thinnest.total_cmp(applied).is_eq() {
                    move_to(thinnest, What::FillerThickness(interface));
                }
                move_to(applied, What::FillerThickness(interface));
                move_to(thinnest, What::FillerThinnest(interface));
            }
            FillerKind::Table { .. } => {}
        }
        Some(kind)
    }

    /// Numbers of the stated spreads that make another joint of it: see [`What::remakes`].
    pub fn remaking(&self) -> Vec<usize> {
        let stated = self.uncertain.iter().enumerate();
        stated
            .filter(|(_, each)| each.what.remakes() && each.bounds.is_spread())
            .filter(|(_, each)| each.what != What::GasPressure || self.gas_conducts())
            .map(|(index, _)| index)
            .collect()
    }

    /// The joint whose file states these values, SI, in place of the spreads of these numbers.
    ///
    /// A thread that is engaged over the whole of its plate goes with it, and one that a thinner plate
    /// does not hold ends with it.
    ///
    /// Checked: `a_remade_joint_is_the_one_of_its_file`.
    #[must_use]
    pub fn remade(&self, values: &[(usize, f64)]) -> Self {
        let mut joint = self.clone();
        for (index, value) in values {
            joint.uncertain[*index].bounds = Bounds::exact(*value);
            match self.uncertain[*index].what {
                What::Thickness(plate) => joint.thicken(plate, *value),
                What::Bow(plate) => {
                    let bow = &mut joint.plates[plate].bow;
                    *bow = bow.map(|stated| value.copysign(stated));
                }
                What::Film(number) => joint.cool(number, *value),
                What::GasPressure => {
                    if let Medium::Gas { pressure, .. } = &mut joint.service.medium {
                        *pressure = *value;
                    }
                }
                _ => {}
            }
        }
        joint
    }

    fn thicken(&mut self, plate: usize, thickness: f64) {
        let before = self.plates[plate].thickness;
        self.plates[plate].thickness = thickness;
        let last = self.plates.len() - 1;
        for fastener in &mut self.fasteners {
            if last - fastener.head_plate != plate {
                continue;
            }
            if let Engagement::Tapped { length } | Engagement::Insert { length } =
                &mut fastener.engagement
            {
                if (*length / before - 1.0).abs() < SAME_LENGTH {
                    *length = thickness;
                }
                *length = length.min(thickness);
            }
        }
    }

    fn cool(&mut self, number: usize, film: f64) {
        match &mut self.sink {
            Cooling::Whole(Sink::Film(coefficient)) => *coefficient = film,
            Cooling::Whole(_) => {}
            Cooling::Parts(parts) => {
                let films = parts.iter_mut().filter_map(|part| match part {
                    CooledPart::Film { coefficient, .. } => Some(coefficient),
                    _ => None,
                });
                if let Some(coefficient) = films.into_iter().nth(number) {
                    *coefficient = film;
                }
            }
        }
    }

    /// Out-of-flatness that is stated without its shape, all faces together, at the places of its
    /// spreads over that at nominal, 1; 1 where none is stated.
    pub fn flatness_factor(&self, places: &[f64]) -> f64 {
        self.flatness_sum(&|bounds, index| bounds.at(places.get(index).copied().unwrap_or(0.0)))
    }

    /// The largest such factor.
    pub fn most_flatness_factor(&self) -> f64 {
        self.flatness_sum(&|bounds, _| bounds.high)
    }

    fn flatness_sum(&self, height: &dyn Fn(&Bounds, usize) -> f64) -> f64 {
        let faces: f64 = (0..self.interfaces())
            .map(|interface| self.loose_flatness(interface))
            .sum();
        let uncertain = self.uncertain.iter().enumerate();
        let more: f64 = uncertain
            .filter(|(_, each)| matches!(each.what, What::Flatness(..)))
            .map(|(index, each)| height(&each.bounds, index) - each.bounds.nominal)
            .sum();
        if faces > 0.0 { 1.0 + more / faces } else { 1.0 }
    }

    /// Whether the out-of-flatness of a plate is stated with a spread.
    pub fn spreads_flatness(&self, plate: usize) -> bool {
        self.uncertain
            .iter()
            .any(|each| matches!(each.what, What::Flatness(of, _) if of == plate))
    }

    /// Heat at the places of its spread over the nominal one, 1.
    pub fn heat_factor(&self, places: &[f64]) -> f64 {
        let heat = self.service.heat.zip(self.stated(What::Heat, places));
        heat.map_or(1.0, |(nominal, there)| there / nominal)
    }

    /// Drop to the coolant at the places of the films over that at nominal, 1.
    ///
    /// ```text
    /// ΔT = Q/Σ h A
    /// ```
    ///
    /// All heat `Q` crosses the films `h` on areas `A`, and the mean sink surface is weighted with what it
    /// conducts, so that this holds however the heat divides. Holes in the back are left out of the areas,
    /// which divide among several films alone.
    /// Valid: films to one coolant, held even over their areas. Source: the balance of heat.
    /// Checked: `films_side_by_side_drop_as_their_sum`.
    pub fn coolant_factor(&self, places: &[f64]) -> f64 {
        let zones: Vec<(f64, f64)> = match &self.sink {
            Cooling::Whole(Sink::Film(coefficient)) => vec![(*coefficient, 1.0)],
            Cooling::Whole(_) => return 1.0,
            Cooling::Parts(parts) => parts
                .iter()
                .filter_map(|part| match part {
                    CooledPart::Film { zone, coefficient } => {
                        Some((*coefficient, zone.area(self.cold().outline.area())))
                    }
                    _ => None,
                })
                .collect(),
        };
        let (mut nominal, mut there) = (0.0, 0.0);
        for (number, (coefficient, area)) in zones.into_iter().enumerate() {
            let drawn = self.stated(What::Film(number), places);
            nominal += coefficient * area;
            there += drawn.unwrap_or(coefficient) * area;
        }
        if there > 0.0 { nominal / there } else { 1.0 }
    }

    /// Whether heat or films are stated with a spread, so that temperatures scatter by themselves.
    pub fn scatters_heat(&self) -> bool {
        self.uncertain
            .iter()
            .any(|each| matches!(each.what, What::Heat | What::Film(_)) && each.bounds.is_spread())
    }

    /// Whether gas stands in any interface.
    pub fn gas_conducts(&self) -> bool {
        let open = (0..self.interfaces()).any(|interface| self.filler(interface).is_none());
        open && matches!(self.service.medium, Medium::Gas { .. })
    }

    /// A value that is stated with a spread of its own; none where it has none.
    pub fn spread_of(&self, what: What) -> Option<Bounds> {
        let stated = self.uncertain.iter().find(|each| each.what == what)?;
        stated.bounds.is_spread().then_some(stated.bounds)
    }

    /// Emissivity of a face of an interface, with the stated spread of its plate at its place.
    pub fn emissivity_at(&self, (interface, side): (usize, usize), places: &[f64]) -> f64 {
        self.stated(What::Emissivity(interface + side), places)
            .unwrap_or(self.contact.emissivity[interface][side])
    }
}
