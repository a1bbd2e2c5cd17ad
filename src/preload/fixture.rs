//! An M6 through two aluminium plates, for the tests of this folder.

use std::f64::consts::PI;

use crate::{
    catalog::{Datum, Grade, Material, MaterialKind, Status, Thread},
    joint::{
        Bolts, Bounds, Compliance, ConeRule, ConeShape, Contact, Engagement, FaceFriction,
        Fastener, Finish, Friction, Hardware, HeadModel, InsertHold, Joint, Law, LockWasher,
        Medium, Outline, Plate, Seat, Service, Sink, Source, Tightening, TorqueTightening, Zone,
    },
    numerics::distribution::Shape,
    preload::springs::{Disc, SpringStack},
};

/// Four sets of one disc 16 × 8.2 × 0.9 mm, cone 0.35 mm: flat at 1.32 kN.
pub const fn spring_stack() -> SpringStack {
    SpringStack {
        disc: Disc {
            outer_diameter: 16e-3,
            inner_diameter: 8.2e-3,
            thickness: 0.9e-3,
            cone_height: 0.35e-3,
            youngs_modulus: 206e9,
            poisson: 0.3,
        },
        parallel: 1,
        series: 4,
    }
}

/// Metric thread by its formulas, from diameter and pitch in m.
pub fn metric(diameter: f64, pitch: f64) -> Thread {
    let stress_diameter = diameter - 0.938194 * pitch;
    Thread {
        name: format!("M{}", diameter * 1e3),
        inch: false,
        diameter,
        pitch,
        pitch_diameter: diameter - 0.649519 * pitch,
        minor_diameter: diameter - 1.226869 * pitch,
        nut_minor_diameter: diameter - 1.082532 * pitch,
        stress_diameter,
        stress_area: PI / 4.0 * stress_diameter.powi(2),
    }
}

pub fn datum(value: f64) -> Datum {
    Datum {
        value,
        range: None,
        shape: Shape::Uniform,
        status: Status::Judgement,
        source: String::new(),
    }
}

/// Class 8.8.
pub fn grade() -> Grade {
    Grade {
        name: "8.8".into(),
        standard: "ISO 898-1".into(),
        diameters: None,
        tensile: datum(800e6),
        yield_strength: Some(datum(640e6)),
        proof: Some(datum(580e6)),
        youngs_modulus: 205e9,
        expansion: 11.5e-6,
        conductivity: datum(45.0),
        like: "steel".into(),
    }
}

/// 7 N·m, 5 %, class B friction, hexagon head in a medium hole.
pub fn m6() -> Fastener {
    let friction = Bounds::uniform([0.08, 0.12, 0.16]);
    let seat = Seat {
        inner_radius: 3.3e-3,
        outer_radius: 4.44e-3,
    };
    Fastener {
        thread: metric(6e-3, 1e-3),
        grade: grade(),
        head_seat: seat,
        nut_seat: Some(seat),
        friction_radius: 3.87e-3,
        conical_seat: false,
        hole_radius: vec![3.3e-3; 2],
        washer_thickness: 0.0,
        washers: 0,
        hardware: Hardware {
            head: None,
            nut: None,
            washers: None,
        },
        cylindrical_head: false,
        engagement: Engagement::Nut,
        tightening: Tightening::Torque(TorqueTightening {
            torque: 7.0,
            tolerance: 0.05,
            running: 0.0,
            running_stated: false,
            tool: Shape::Uniform,
            running_spread: None,
            friction: Friction::Coefficients {
                thread: friction,
                head: friction,
            },
            scatter: None,
        }),
        flange: None,
        head_plate: 0,
        shank_path: true,
        isolating: None,
        axial_load: None,
        disc_springs: None,
        lock_washer: LockWasher::None,
        insert_hold: InsertHold::default(),
        places: vec![[20e-3, 20e-3], [60e-3, 20e-3]],
    }
}

/// The same fastener with its torque tightening changed.
pub fn m6_with(change: impl FnOnce(&mut TorqueTightening)) -> Fastener {
    let mut fastener = m6();
    if let Tightening::Torque(tightening) = &mut fastener.tightening {
        change(tightening);
    }
    fastener
}

pub fn aluminium() -> Material {
    Material {
        name: "Al".into(),
        aliases: Vec::new(),
        kind: MaterialKind::Metal,
        family: "aluminium".into(),
        conductivity: datum(167.0),
        conductivity_fit: None,
        through: None,
        youngs_modulus: datum(70e9),
        poisson: datum(0.33),
        expansion: datum(23.6e-6),
        contraction: None,
        density: None,
        hardness: None,
        microhardness: None,
        microhardness_spread: None,
        yield_strength: Some(datum(276e6)),
        bearing_limit: Some(datum(400e6)),
        note: None,
    }
}

fn plate(name: &str, thickness: f64) -> Plate {
    Plate {
        name: name.into(),
        material: aluminium(),
        thickness,
        outline: Outline::Rectangle {
            size: [80e-3, 40e-3],
        },
        origin: [0.0, 0.0],
        finish: Finish {
            roughness: Bounds::exact(1e-6),
            slope: 0.12,
            slope_factor: 1.5,
            slope_spread: None,
            coating: None,
        },
        flatness: None,
        underside: None,
        bow: None,
        flatness_map: None,
        sag: None,
        cutouts: Vec::new(),
        feet: None,
        ribs: Vec::new(),
        sandwich: None,
        flexural_strength: None,
    }
}

/// Two plates of 12 and 8 mm, M6 at two places 40 mm apart and 20 mm from the edges.
pub fn joint() -> Joint {
    Joint {
        title: "fixture".into(),
        service: Service {
            medium: Medium::Vacuum,
            cases: Vec::new(),
            assembly_temperature: 293.15,
            heat: None,
            require: None,
        },
        plates: vec![plate("upper", 12e-3), plate("lower", 8e-3)],
        source: Source {
            zone: Zone::Face,
            isothermal: false,
        }
        .into(),
        sink: Sink::IsothermalBack.into(),
        fasteners: vec![m6()],
        contact: Contact {
            law: Law::ElasticPlastic,
            law_factor: 1.15,
            cone: ConeRule::Fitted,
            shape: ConeShape::Fitted,
            emissivity: vec![[0.1; 2]],
            head_model: HeadModel::Uniform,
            faces: FaceFriction::Frictionless,
            compliance: Compliance::Hard,
        },
        fillers: vec![None],
        measured: None,
        losses: None,
        cost: None,
        missing: Vec::new(),
        arrange: None,
        uncertain: Vec::new(),
        bolts_scatter: Bolts::ONE_LOT,
        assumptions: Vec::new(),
    }
}
