//! Groups of like fasteners, and whether they fit the plates.

use crate::{
    catalog::{self, Grade, Thread},
    diagnostic::Fault,
    joint::{
        Engagement, Fastener, Flange, LockWasher, MOST_PLACES, MOST_PLATES,
        collector::{Collector, Wording, fault},
        isolating,
        lands::{self, Land, Site},
        loads,
        materials::Own,
        patterns,
        plates::PlateDraft,
        record::Record,
        sandwich,
        seats::{self, Bolt, Parts, Seats, unknown_plate},
        tightening,
        tree::short,
        walk::too_many,
    },
    units::{self, Quantity},
};

/// Reads all fastener groups; none when one of them is faulty.
pub(super) fn read(
    file: &Record,
    (plates, own): (&[PlateDraft], &Own),
    collector: &mut Collector,
) -> Option<Vec<Fastener>> {
    let records = file.records("fastener");
    let mut fasteners = Vec::with_capacity(records.len());
    let mut sites = Vec::with_capacity(records.len());
    for record in records {
        let (fastener, site) = group(record, (plates, own), collector);
        fasteners.extend(fastener);
        sites.extend(site);
    }
    let bolts: usize = sites.iter().map(|site| site.places.len()).sum();
    if bolts > MOST_PLACES {
        collector.report(too_many("fastener", &file.span("fastener"), bolts));
        return None;
    }
    for site in &sites {
        lands::fit(site, plates, collector);
    }
    lands::apart(&sites, collector);
    if records.is_empty() && file.has("fastener") && !file.is_faulty("fastener") {
        collector.report(
            fault(
                "fastener/no-place",
                &file.span("fastener"),
                "no bolt holds the plates",
            )
            .expecting("expected a [[fastener]]"),
        );
    }
    (fasteners.len() == records.len() && !fasteners.is_empty()).then_some(fasteners)
}

/// Tells the faults of fasteners that do not depend on the plates, when these are not known.
pub(super) fn read_alone(file: &Record, collector: &mut Collector) {
    for record in file.records("fastener") {
        let thread = thread(record, collector);
        grade(record, thread, collector);
        Parts::read(record, thread, collector);
        tightening::read(record, collector);
    }
}

/// A group, and its site even when other parts of the group are faulty.
fn group(
    record: &Record,
    (plates, own): (&[PlateDraft], &Own),
    collector: &mut Collector,
) -> (Option<Fastener>, Option<Site>) {
    let thread = thread(record, collector);
    let grade = grade(record, thread, collector);
    let parts = Parts::read(record, thread, collector);
    let head_plate = head_plate(record, plates, collector);
    let tightening = tightening::read(record, collector);
    let places = patterns::read(record, plates[0].outline.as_ref(), collector);
    let seated = thread.zip(head_plate).and_then(|(thread, head_plate)| {
        let far = plates.len() - 1 - head_plate;
        let engagement = engagement(record, thread, &plates[far], collector)?;
        let bolt = Bolt {
            record,
            thread,
            engagement,
            head_plate,
            parts,
        };
        let holes = seats::holes(bolt, plates, collector)?;
        let flange = sandwich::flange(
            record,
            (engagement, holes[far]),
            [&plates[head_plate], &plates[far]],
            collector,
        )?;
        Some(Seated {
            engagement,
            flange,
            head_plate,
            count: plates.len(),
            holes,
            seats: seats::read(bolt, [holes[head_plate], holes[far]], collector)?,
        })
    });
    let engagement = seated.map(|seated| seated.engagement);
    let isolating = isolating::read(record, (engagement, own), collector);
    let land = seated.map_or_else(Land::default, Seated::land);
    let site = places.map(|places| Site { land, places });
    let axial_load = loads::axial(record, collector);
    let disc_springs = loads::springs(record, collector);
    let insert_hold = loads::insert(record, collector);
    let lock_washer = match record.flag("split_washer") {
        None if record.has("split_washer") => None,
        Some(true) => Some(LockWasher::Split),
        Some(false) | None => Some(LockWasher::None),
    };
    let shank_path = record
        .flag("shank_path")
        .or((!record.has("shank_path")).then_some(true));
    let fastener = || {
        let seated = seated?;
        Some(Fastener {
            thread: thread?.clone(),
            grade: grade?.clone(),
            head_seat: seated.seats.head,
            nut_seat: seated.seats.nut,
            friction_radius: seated.seats.friction_radius,
            conical_seat: seated.seats.conical,
            hole_radius: seated.holes[..plates.len()].to_vec(),
            washer_thickness: seated.seats.washer_thickness,
            washers: seated.seats.washers,
            hardware: seated.seats.hardware,
            cylindrical_head: seated.seats.cylindrical,
            engagement: seated.engagement,
            flange: seated.flange,
            tightening: tightening?,
            head_plate: seated.head_plate,
            shank_path: shank_path?,
            isolating: isolating?,
            axial_load: axial_load?,
            disc_springs: disc_springs?,
            lock_washer: lock_washer?,
            insert_hold: insert_hold?,
            places: site
                .as_ref()?
                .places
                .iter()
                .map(|(point, _)| *point)
                .collect(),
        })
    };
    (fastener(), site)
}

/// How a bolt sits in its plates.
#[derive(Clone, Copy, Debug)]
struct Seated {
    engagement: Engagement,
    flange: Option<Flange>,
    head_plate: usize,
    /// Number of plates.
    count: usize,
    holes: [f64; MOST_PLATES],
    seats: Seats,
}

impl Seated {
    fn land(self) -> Land {
        let mut seats = [0.0; MOST_PLATES];
        seats[self.head_plate] = self.seats.head.outer_radius;
        let (far, part) = match (self.seats.nut, self.flange) {
            (None, Some(flange)) => (flange.radius, "flange"),
            (nut, _) => (nut.map_or(0.0, |nut| nut.outer_radius), "nut"),
        };
        seats[self.count - 1 - self.head_plate] = far;
        Land {
            holes: self.holes,
            seats,
            far: part,
            head_plate: self.head_plate,
        }
    }
}

fn thread(record: &Record, collector: &mut Collector) -> Option<&'static Thread> {
    let name = record.text("thread")?;
    let thread = catalog::thread(name);
    if thread.is_none() {
        // A thread of other digits is another thread, not a slip.
        let known = catalog::threads()
            .iter()
            .map(|thread| thread.name.as_str())
            .filter(|known| digits(known) == digits(name) || known.contains(name.trim()));
        collector.report(
            fault(
                "name/unknown",
                &record.span("thread"),
                format!("no thread is called `{}`", short(name)),
            )
            .expecting("expected a thread such as `M5` or `1/4-20`")
            .help("`ringsum list threads` names all")
            .nearest(name, known),
        );
    }
    thread
}

fn digits(name: &str) -> String {
    name.chars().filter(char::is_ascii_digit).collect()
}

/// The grade in the size of the thread; where the thread is faulty its name is only checked.
fn grade(
    record: &Record,
    thread: Option<&Thread>,
    collector: &mut Collector,
) -> Option<&'static Grade> {
    let name = record.text("grade")?;
    let size = thread.map_or_else(String::new, |thread| format!(" for {}", thread.name));
    let grade = if let Some(thread) = thread {
        catalog::grade(name, thread.diameter)
    } else {
        let mut sizes = catalog::threads().iter();
        sizes.find_map(|thread| catalog::grade(name, thread.diameter))
    };
    if grade.is_none() {
        let known = catalog::grades().iter().map(|grade| grade.name.as_str());
        collector.report(
            fault(
                "name/unknown",
                &record.span("grade"),
                format!("no strength grade `{}`{size}", short(name)),
            )
            .expecting("expected a grade such as `8.8` or `A2-70`")
            .help("`ringsum list grades` names all")
            .nearest(name, known),
        );
    }
    grade
}

fn head_plate(record: &Record, plates: &[PlateDraft], collector: &mut Collector) -> Option<usize> {
    let Some(name) = record.text("from") else {
        return (!record.has("from")).then_some(0);
    };
    let place = plates.iter().position(|plate| plate.name == name);
    if place.is_none() {
        collector.report(unknown_plate(name, &record.span("from"), plates));
    }
    let outer = place.filter(|place| *place == 0 || *place == plates.len() - 1);
    if place.is_some() && outer.is_none() {
        collector.report(
            fault(
                "plate/misplaced",
                &record.span("from"),
                format!("plate `{}` lies between others", short(name)),
            )
            .expecting("expected the first or the last plate")
            .help("bolts clamp the whole stack: their heads sit on one of its outer faces"),
        );
    }
    outer
}

fn engagement(
    record: &Record,
    thread: &Thread,
    far: &PlateDraft,
    collector: &mut Collector,
) -> Option<Engagement> {
    let table = match record.record("engagement") {
        Some(table) => table,
        None if record.has("engagement") => return None,
        None => {
            collector.assume(record.at("engagement"), "nut", "not stated");
            return Some(Engagement::Nut);
        }
    };
    let kind = table.text("kind")?;
    if kind == "nut" {
        return Some(Engagement::Nut);
    }
    let length = match table.number("length") {
        Some(length) => {
            if let Some([thickness, most]) = far.thickness_ends() {
                let fits = length <= thickness * (1.0 + 1e-9);
                let spread = thickness < most;
                collector.require(fits, || {
                    too_long(table, (length, spread), (&far.name, thickness))
                });
            }
            length
        }
        None if table.has("length") => return None,
        None => {
            let thickness = far.thickness?;
            let (length, why) = if kind == "insert" {
                (
                    thickness.min(1.5 * thread.diameter),
                    "not stated; inserts are usually 1.5 diameters long",
                )
            } else {
                (thickness, "not stated; the thread goes through the plate")
            };
            collector.assume(
                table.at("length"),
                units::show(length, Quantity::Length),
                why,
            );
            length
        }
    };
    Some(if kind == "insert" {
        Engagement::Insert { length }
    } else {
        Engagement::Tapped { length }
    })
}

/// A thread longer than the plate it is cut in, or than the thinnest that its spread allows.
fn too_long(
    table: &Record,
    (length, spread): (f64, bool),
    (plate, thickness): (&str, f64),
) -> Fault {
    let thickness = units::show(thickness, Quantity::Length);
    let (how, help) = if spread {
        (
            format!("may be as thin as {thickness} by the spread of its `thickness`"),
            "leave `length` out: the thread then goes through the plate, as thick as it is; or state what the \
             thinnest plate holds",
        )
    } else {
        (
            format!("is {thickness} thick"),
            "the thread ends with the plate: state what is engaged in it",
        )
    };
    fault(
        "value/range",
        &table.span("length"),
        format!(
            "{} of thread are engaged in plate `{}`, which {how}",
            units::show(length, Quantity::Length),
            short(plate)
        ),
    )
    .expecting(format!("at most {thickness}"))
    .help(help)
}
