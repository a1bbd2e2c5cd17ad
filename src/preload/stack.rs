//! The clamped stack of a fastener in its joint: grip, compliance, guide settling.

use crate::{
    joint::{Engagement, Facing, Fastener, Isolating, Joint, Plate, peak_to_valley},
    preload::{
        losses::{Compliance, Contacts, Elasticity, Part, Working, growth, guide_values},
        resilience::{
            BoltShape, Clamped, ConeKind, FarEnd, HeadForm, StackLayer, bolt_compliance,
            stack_compliance,
        },
        springs::SpringStack,
        strength::seat_pressure,
    },
};

/// What the clamp force of one fastener passes through.
#[derive(Clone, Debug, PartialEq)]
pub struct Stack {
    /// Thickness of each clamped plate with its index, head side first, m.
    pub plates: Vec<(usize, f64)>,
    /// Thickness of all washers of the bolt's own material, m.
    pub washers: f64,
    /// Thickness of all isolating washers, m.
    pub isolating: f64,
    /// Disc springs under head or nut.
    pub springs: Option<SpringStack>,
    /// Grip: plates, all washers and the free length of the springs, m.
    pub grip: f64,
    /// Compliance of bolt and clamped parts, m/N.
    pub compliance: Compliance,
    /// Contacts that settle.
    pub contacts: Contacts,
}

/// Relative changes of length ΔL/L from assembly to service, 1.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Strains<'a> {
    /// Of every plate of the joint, in the joint's order.
    pub plates: &'a [f64],
    /// Of the washers.
    pub washers: f64,
    /// Of the isolating washers.
    pub isolating: f64,
    /// Of the bolt.
    pub bolt: f64,
}

impl Stack {
    /// What gives under the clamp force.
    pub fn elasticity(&self) -> Elasticity {
        Elasticity {
            compliance: self.compliance,
            springs: self.springs,
        }
    }

    /// Growth of the clamped parts over that of the bolt, m; springs and washers of the bolt's own
    /// material follow the bolt.
    pub fn growth(&self, strains: &Strains<'_>) -> f64 {
        let plates = self.plates.iter().map(|&(index, length)| Part {
            length,
            strain: strains.plates[index],
        });
        let washers = Part {
            length: self.washers,
            strain: strains.washers,
        };
        let isolating = Part {
            length: self.isolating,
            strain: strains.isolating,
        };
        let parts: Vec<Part> = plates.chain([washers, isolating]).collect();
        let bolt = Part {
            // Springs lengthen the bolt and follow it, so that their length falls out.
            length: self.grip - self.spring_length(),
            strain: strains.bolt,
        };
        growth(&parts, bolt)
    }

    fn spring_length(&self) -> f64 {
        self.springs.map_or(0.0, |springs| springs.free_length())
    }
}

/// The stack of a fastener.
///
/// With a nut every plate is clamped; with a tapped hole or insert only the plates on the head's side of the
/// far one. Taken: thread free over the whole grip, head as long as a hexagon's, washers steel rings of the
/// seat's annulus (with a nut one at each end), isolating washers rings of their own material there, an insert as stiff as the plate that holds it, and as outer diameter twice the distance to the nearest
/// plate edge or the distance to the nearest bolt of the group, whichever is smaller. A longer plain shank
/// makes the bolt stiffer and the losses larger.
///
/// Valid: as [`bolt_compliance`] and [`stack_compliance`].
/// Source: VDI 2230-1 by [`bolt_compliance`] and [`stack_compliance`].
/// Checked: `stack_of_a_joint_repeats_example_a`, `tapped_stack_clamps_the_head_plate_alone`.
pub fn stack(joint: &Joint, fastener: &Fastener) -> Stack {
    let order = from_head(joint, fastener);
    let (clamped, far) = match fastener.engagement {
        Engagement::Nut => (&order[..], FarEnd::Nut),
        Engagement::Tapped { .. } | Engagement::Insert { .. } => {
            let (before, last) = order.split_at(order.len() - 1);
            let youngs_modulus = joint.plates[last[0]].material.youngs_modulus.value;
            (before, FarEnd::Tapped { youngs_modulus })
        }
    };
    let plates: Vec<(usize, f64)> = clamped
        .iter()
        .map(|&index| (index, joint.plates[index].thickness))
        .collect();
    let washers = fastener.washer_thickness;
    let isolating = fastener.isolating.as_ref().map_or(0.0, Isolating::height);
    let springs = fastener.disc_springs.as_ref().map(SpringStack::from);
    let grip = washers
        + isolating
        + plates.iter().map(|(_, thickness)| thickness).sum::<f64>()
        + springs.map_or(0.0, |springs| springs.free_length());
    Stack {
        compliance: Compliance {
            bolt: bolt_compliance(&BoltShape {
                thread: &fastener.thread,
                youngs_modulus: fastener.grade.youngs_modulus,
                shank: 0.0,
                free_thread: grip,
                head: if fastener.cylindrical_head {
                    HeadForm::Socket
                } else {
                    HeadForm::Hexagon
                },
                far,
            })
            .total(),
            plates: parts_compliance(joint, fastener, &plates),
        },
        contacts: contacts(fastener, plates.len()),
        plates,
        washers,
        isolating,
        springs,
        grip,
    }
}

/// Settling of the whole stack by the guide values, axial, m.
///
/// ```text
/// f_Z = f_thread + s f_seat + n f_interface     s = 2 with a nut, 1 tapped; n inner interfaces
/// ```
///
/// The class of roughness is that of the roughest face of the joint: Rz taken as 5 Rq.
/// Valid: M4 and larger. Source: VDI 2230-1 guide values, from memory.
pub fn guide_settling(joint: &Joint, stack: &Stack) -> f64 {
    let roughest = joint
        .plates
        .iter()
        .flat_map(|plate| [Facing::Warm, Facing::Cold].map(|side| plate.face(side)))
        .map(|finish| finish.roughness.nominal)
        .fold(0.0, f64::max);
    guide_values(peak_to_valley(roughest), Working::Axial).of_stack(stack.contacts)
}

/// Indices of the plates from the head to the far end.
fn from_head(joint: &Joint, fastener: &Fastener) -> Vec<usize> {
    let indices = 0..joint.plates.len();
    if fastener.head_plate == 0 {
        indices.collect()
    } else {
        indices.rev().collect()
    }
}

fn contacts(fastener: &Fastener, clamped: usize) -> Contacts {
    let plates = clamped as u32;
    let washers = fastener.washers
        + fastener
            .isolating
            .as_ref()
            .map_or(0, |washers| washers.count)
        // Each disc brings one contact more.
        + fastener
            .disc_springs
            .map_or(0, |springs| springs.parallel * springs.series);
    match fastener.engagement {
        // Between n clamped plates lie n − 1 interfaces, with a tapped plate behind them n.
        Engagement::Nut => Contacts {
            seats: 2,
            interfaces: plates - 1 + washers,
        },
        Engagement::Tapped { .. } | Engagement::Insert { .. } => Contacts {
            seats: 1,
            interfaces: plates + washers,
        },
    }
}

fn parts_compliance(joint: &Joint, fastener: &Fastener, plates: &[(usize, f64)]) -> f64 {
    let layers: Vec<StackLayer> = plates
        .iter()
        .map(|&(index, thickness)| StackLayer {
            thickness,
            youngs_modulus: joint.plates[index].material.youngs_modulus.value,
            hole_diameter: 2.0 * fastener.hole_radius[index],
        })
        .collect();
    // A hole as wide as the seat leaves no cone; the reader refuses it, here it must only not divide by zero.
    let widest = layers
        .iter()
        .map(|layer| layer.hole_diameter)
        .fold(0.0, f64::max);
    let seat_diameter = (2.0 * fastener.head_seat.outer_radius).max(1.02 * widest);
    let clamped = Clamped {
        seat_diameter,
        hole_diameter: widest,
        grip: layers.iter().map(|layer| layer.thickness).sum(),
        outer_diameter: land_diameter(joint, fastener).max(seat_diameter),
        kind: match fastener.engagement {
            Engagement::Nut => ConeKind::Through,
            Engagement::Tapped { .. } | Engagement::Insert { .. } => ConeKind::Tapped,
        },
    };
    // Pressure over the seat per force is one over its area.
    // Washers are taken to be of the bolt's material.
    let washers = fastener.washer_thickness / fastener.grade.youngs_modulus
        * seat_pressure(&fastener.head_seat, 1.0);
    // Isolating washers are taken as prisms under the seat, too thin for a cone.
    let isolating = fastener.isolating.as_ref().map_or(0.0, |washers| {
        washers.height() / (washers.material.youngs_modulus.value * fastener.head_seat.area())
    });
    washers + isolating + stack_compliance(&clamped, &layers)
}

/// Diameter of plate that belongs to one bolt, smallest of the group, m.
fn land_diameter(joint: &Joint, fastener: &Fastener) -> f64 {
    let edges = fastener.places.iter().flat_map(|place| {
        joint
            .plates
            .iter()
            .map(move |plate| 2.0 * edge_distance(plate, *place))
    });
    let pitches = fastener
        .places
        .iter()
        .enumerate()
        .flat_map(|(index, place)| {
            fastener.places[index + 1..]
                .iter()
                .map(move |other| (place[0] - other[0]).hypot(place[1] - other[1]))
        });
    edges.chain(pitches).fold(f64::INFINITY, f64::min)
}

/// Distance of a place from the nearest edge of a plate, m; negative outside.
fn edge_distance(plate: &Plate, place: [f64; 2]) -> f64 {
    plate.depth(place)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{
        joint::{DiscSprings, Outline, Seat},
        preload::fixture::{joint, metric},
    };

    /// Example A of the resilience chain as a joint: M10 through 40 mm of steel, 40 mm of plate to each bolt.
    fn example_a() -> Joint {
        let mut joint = joint();
        for (plate, thickness) in joint.plates.iter_mut().zip([25e-3, 15e-3]) {
            plate.thickness = thickness;
            plate.material.youngs_modulus.value = 205e9;
        }
        let seat = Seat {
            inner_radius: 5.5e-3,
            outer_radius: 7.315e-3,
        };
        let fastener = &mut joint.fasteners[0];
        fastener.thread = metric(10e-3, 1.5e-3);
        fastener.head_seat = seat;
        fastener.nut_seat = Some(seat);
        fastener.hole_radius = vec![5.5e-3; 2];
        joint
    }

    #[test]
    fn stack_of_a_joint_repeats_example_a() {
        let joint = example_a();
        let found = stack(&joint, &joint.fasteners[0]);
        // Computed for this project by an independent program, four digits: 0.1 %.
        assert!((found.compliance.plates / 7.070e-10 - 1.0).abs() < 1e-3);
        // By hand, all thread: 0.3105 + 40/(205 · 52.30) + 0.4664 + 0.2484 in 1e-9 m/N.
        assert!((found.compliance.bolt / 4.756e-9 - 1.0).abs() < 1e-3);
        assert!((found.grip - 40e-3).abs() < 1e-12);
        // Rq 1 µm is Rz 5 µm: 3 + 2·2.5 + 1.5 µm.
        assert!((guide_settling(&joint, &found) - 9.5e-6).abs() < 1e-12);
    }

    #[test]
    fn tapped_stack_clamps_the_head_plate_alone() {
        let mut joint = joint();
        joint.fasteners[0].engagement = Engagement::Tapped { length: 8e-3 };
        let found = stack(&joint, &joint.fasteners[0]);
        assert_eq!(found.plates, [(0, 12e-3)]);
        assert_eq!((found.contacts.seats, found.contacts.interfaces), (1, 1));
        joint.fasteners[0].head_plate = 1;
        assert_eq!(stack(&joint, &joint.fasteners[0]).plates, [(1, 8e-3)]);
    }

    #[test]
    fn washers_lengthen_the_grip_and_soften_the_stack() {
        let bare = example_a();
        let mut washed = example_a();
        washed.fasteners[0].washer_thickness = 4e-3;
        washed.fasteners[0].washers = 2;
        let [bare, washed] = [&bare, &washed].map(|joint| stack(joint, &joint.fasteners[0]));
        assert!((washed.grip - bare.grip - 4e-3).abs() < 1e-12);
        // 4 mm of steel ring over 73.1 mm²: 0.267e-9 m/N, three digits.
        let softer = washed.compliance.plates - bare.compliance.plates;
        assert!((softer / 0.267e-9 - 1.0).abs() < 2e-3, "{softer}");
        assert!(washed.contacts.interfaces == bare.contacts.interfaces + 2);
    }

    #[test]
    fn springs_lengthen_the_bolt_and_each_disc_settles() {
        let bare = example_a();
        let mut sprung = example_a();
        sprung.fasteners[0].disc_springs = Some(DiscSprings {
            outer_diameter: 20e-3,
            inner_diameter: 10.2e-3,
            thickness: 1.1e-3,
            cone_height: 0.45e-3,
            youngs_modulus: 206e9,
            poisson: 0.3,
            parallel: 1,
            series: 4,
        });
        let [bare, sprung] = [&bare, &sprung].map(|joint| stack(joint, &joint.fasteners[0]));
        // 4 (0.45 + 1.1) mm.
        assert!((sprung.grip - bare.grip - 6.2e-3).abs() < 1e-12);
        // 6.2 mm of thread M10 more: 6.2/(205 · 52.30) in 1e-9 m/N.
        let longer = sprung.compliance.bolt - bare.compliance.bolt;
        assert!((longer / 5.783e-10 - 1.0).abs() < 1e-3, "{longer}");
        let equal = Strains {
            plates: &[1e-3, 1e-3],
            washers: 1e-3,
            isolating: 1e-3,
            bolt: 1e-3,
        };
        assert!(sprung.growth(&equal).abs() < 1e-15);
        assert_eq!(sprung.contacts.interfaces, bare.contacts.interfaces + 4);
    }

    #[test]
    fn near_edge_makes_a_slender_softer_stack() {
        let wide = example_a();
        let mut near = example_a();
        near.fasteners[0].places[0] = [10e-3, 20e-3];
        let [wide, near] = [&wide, &near].map(|joint| stack(joint, &joint.fasteners[0]));
        assert!(near.compliance.plates > wide.compliance.plates);
        let mut disc = example_a();
        disc.plates[0].outline = Outline::Disc { radius: 30e-3 };
        disc.fasteners[0].places = vec![[20e-3, 0.0]];
        disc.plates[1].origin = [-40e-3, -20e-3];
        let disc = stack(&disc, &disc.fasteners[0]);
        // 10 mm from the rim of the disc, as from the edge of the rectangle.
        assert!((disc.compliance.plates / near.compliance.plates - 1.0).abs() < 1e-9);
    }

    #[test]
    fn only_the_difference_of_expansion_moves_the_force() {
        let mut joint = example_a();
        joint.fasteners[0].washer_thickness = 4e-3;
        joint.fasteners[0].washers = 2;
        let found = stack(&joint, &joint.fasteners[0]);
        let equal = Strains {
            plates: &[1e-3, 1e-3],
            washers: 1e-3,
            isolating: 1e-3,
            bolt: 1e-3,
        };
        // Metres of a stack 44 mm long: rounding alone.
        assert!(found.growth(&equal).abs() < 1e-15);
        let hotter = Strains {
            plates: &[2e-3, 1e-3],
            ..equal
        };
        // 25 mm more by 1e-3: 25 µm.
        assert!((found.growth(&hotter) / 25e-6 - 1.0).abs() < 1e-9);
    }
}
