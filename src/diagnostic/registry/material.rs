//! Cautions on materials.

use crate::diagnostic::registry::{
    Entry,
    Gravity::{Grave, Note, Range},
};

pub(super) const ENTRIES: &[Entry] = &[
    Range.entry(
        "material/room-temperature-data",
        "Room-temperature value away from room temperature",
        [
            "Conductivity, modulus or hardness of this material is known at room temperature alone \
             and is used at another. Between 250 and 400 K the error is a few per cent for most \
             metals. In the cold hardness rises (about 20 % for 6061 at 77 K, from memory), which is \
             not counted because joints are mostly tightened warm.",
            "Give the value at service temperature when it matters.",
        ],
    ),
    Range.entry(
        "material/above-range",
        "Above the temperature of the data",
        [
            "The temperature is above 400 K or above the end of the material's data. Age-hardened \
             aluminium loses strength for good from about 420 K (from memory), bolts relax, and \
             aluminium joints have lost all clamp force within a week when hot.",
            "Use data at temperature for plates and bolts, and check relaxation. Hot joints of \
             consequence need a responsible engineer.",
        ],
    ),
    Note.entry(
        "material/galvanic",
        "Metals far apart in the galvanic series",
        [
            "In moist or salty air the less noble face corrodes, most quickly where a small anode \
             meets a large cathode: aluminium or magnesium against copper, silver, graphite or \
             stainless steel. Corrosion products lift the faces apart and end the contact. The \
             ranking is common knowledge, given from memory.",
            "Plate one face towards the other (nickel, tin), seal the edge, keep moisture out; in \
             vacuum and dry nitrogen it does not act.",
        ],
    ),
    Grave.entry(
        "material/brittle",
        "Brittle plate under a bolt",
        [
            "Ceramics, glass, silicon, graphite and some castings break under bending that a metal \
             would forgive: one grain of dirt, a burr or a bowed partner is enough. The estimate \
             does not check stress in plates. Dust of beryllia is a serious health hazard.",
            "Use compliant washers and a filler, low and even clamp force in several steps, flat \
             clean faces; prove it by test. Handle beryllia by the safety rules that apply to it.",
        ],
    ),
];
