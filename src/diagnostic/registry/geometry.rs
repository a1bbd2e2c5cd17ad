//! Faults of geometry: plates, holes, fasteners and zones that cannot be.

use crate::diagnostic::registry::{Entry, fault};

pub(super) const ENTRIES: &[Entry] = &[
    fault(
        "plate/hole-outside",
        "A hole that leaves its plate",
        "The hole lies outside the plate or cuts its edge. The ring of material that carries the \
         clamp force is then open, and no pressure law for a closed ring holds.",
        "Check the place of the bolt, the size of both plates and the offset between them; places \
         are measured from the lower left corner of the first plate (round plate: its centre).",
    ),
    fault(
        "plate/holes-overlap",
        "Two holes that run into each other",
        "The distance of two bolts is smaller than their hole diameter: there is no material \
         between them.",
        "Check the places and the pattern; a unit slip in the pitch is the usual cause.",
    ),
    fault(
        "plate/hole-too-small",
        "A hole that its thread does not pass",
        "The clearance hole is smaller than the nominal diameter of the thread.",
        "Leave `hole` out to get the medium hole of ISO 273 (5.5 mm for M5, 9 mm for M8), or state \
         the hole that is drilled.",
    ),
    fault(
        "plate/head-beyond-edge",
        "A head or washer larger than its land",
        "The annulus under the head reaches beyond the edge of the plate, or the hole is so large \
         that the head no longer covers its rim. The force would enter through a part of the \
         annulus that does not exist.",
        "Move the bolt inwards, choose a smaller head or washer, or a smaller hole; `bearing` \
         states a seat of your own.",
    ),
    fault(
        "plate/no-overlap",
        "Plates that do not lie on each other",
        "The outlines of the two plates share no area, so there are no faying faces.",
        "Check `offset`: it places the corner of the first plate on the second.",
    ),
    fault(
        "fastener/count",
        "A number of fasteners that cannot be",
        "A pattern needs at least one bolt and can hold no more than fit; a joint without bolts is \
         not a bolted joint.",
        "Give the count or the places of at least one bolt.",
    ),
    fault(
        "fastener/no-place",
        "A fastener group without a place",
        "The group says what bolt it is but not where it sits.",
        "Add `at = [[\"7 mm\", \"7 mm\"], …]` or a `pattern`.",
    ),
    fault(
        "zone/outside",
        "A heated or cooled zone off its plate",
        "The zone reaches beyond the face it stands on, so part of its heat would enter nowhere.",
        "Check its centre and size; both are in the coordinates of the joint, from the lower left \
         corner of the first plate.",
    ),
    fault(
        "service/cold-contact",
        "A bare contact below about 30 K",
        "Bare metal contacts below about 30 K do not follow the room-temperature laws. At 4.2 K, \
         laws with cold conductivities give 24 to 49 W/K where bolted copper was measured at 0.01 to \
         0.26 W/K: 200 to 5000 times too much. Two copper pairs alone differed 26-fold by the \
         preparation of their faces.",
        "Give measured data, or an empirical force law G = a Fⁿ Tᵐ with its force and temperature \
         range. Indium foil or vacuum grease improved measured cold joints three- to tenfold.",
    ),
    fault(
        "material/cold-data",
        "A room-temperature property at cryogenic temperature",
        "The material has no data for this temperature. Properties change out of all proportion in \
         the cold: 6061-T6 conducts 155 W/(m·K) at 300 K, 84 at 77 K and 5 at 4 K; the expansion \
         coefficient tends to zero. A room-temperature value is not extended.",
        "Choose a material with a low-temperature fit, or give conductivity and integrated \
         contraction at the service temperature in the file.",
    ),
];
