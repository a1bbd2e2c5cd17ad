//! Faults of the joint itself: plates, holes, fasteners, zones and materials that cannot be.

use crate::diagnostic::registry::{Entry, fault};

pub(super) const ENTRIES: &[Entry] = &[
    fault(
        "arrange/bolts",
        "Numbers of bolts that cannot be tried",
        "A search of layouts tries from the fewest to the most bolts; the fewest come first, and \
         more than 60 would take a search too long to be of use.",
        "State `bolts = [4, 12]` in `[arrange]`, or one number.",
    ),
    fault(
        "plate/hole-outside",
        "A hole that leaves its plate",
        "The hole lies outside the plate or cuts its edge. The ring of material that carries the \
         clamp force is then open, and no pressure law for a closed ring holds.",
        "Check the place of the bolt, the size of both plates and the offset between them; places \
         are measured from the lower left corner of the first plate (round plate: its centre; outline: as its points).",
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
        "The clearance hole is smaller than the nominal diameter of the thread, or the hole of the plate that holds \
         the thread than half of it.",
        "Leave `hole` out to get the medium hole of ISO 273 (5.5 mm for M5, 9 mm for M8), or state \
         the hole that is drilled.",
    ),
    fault(
        "plate/hole-too-wide",
        "A hole too wide for the thread it holds",
        "The plate holds the thread, tapped or in an insert, and the hole at its face is more than two and a half \
         thread diameters wide (house rule, no source): the clamp force would press on nothing there.",
        "Leave `hole` of that plate out, or give the diameter of the insert or of the recess at the face. If the \
         bolt passes the plate, give `engagement = { kind = \"nut\" }`.",
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
        "zone/heat-sum",
        "Heated zones that do not add up to the heat",
        "Each of several zones states its own heat, and their sum is the heat of the joint. The service \
         states another.",
        "Correct one of them, or leave the heat of the service out.",
    ),
    fault(
        "cooled/too-much-heat",
        "More heat than the back can radiate",
        "At the temperature stated for the sink surface the back radiates less than the heat of the joint, \
         even to surroundings at absolute zero.",
        "State the surroundings (`radiation = { emissivity = 0.8, temperature = \"-60 °C\" }`) and leave the \
         temperature of the service out: the sink then takes the temperature that gives off the heat. Or \
         enlarge the back, or coat it.",
    ),
    fault(
        "zone/no-metal",
        "A heated or cooled zone that is mostly hole",
        "Less than half of the zone is metal of its plate; the rest lies in bolt holes and cut-outs. Heat enters \
         and leaves through metal alone, so that the little metal would have to take all of it.",
        "Check its centre and size against the bolts and cut-outs; both are in the coordinates of its own plate. \
         Half of it or more on metal is allowed: a wide zone may span holes.",
    ),
    fault(
        "cooled/below-zero",
        "A film too poor for the heat",
        "The temperature of the service is that of the sink surface. To carry the heat, the film needs a \
         coolant colder than absolute zero.",
        "Check the unit of `film` (still air takes about 5 to 10, water 500 to 5000 W/(m²·K)), the cooled area and \
         the heat.",
    ),
    fault(
        "geometry/size-limit",
        "A size beyond the limits of this program",
        "Sizes beyond these are more likely a wrong unit than a bolted joint, and nothing was checked there: 3 m \
         along a plate; 0.5 m of thickness of a plate, or of height of a rib or foot; a thickness of ten times the \
         shortest side in plan; a thickness below 50 µm; a head, nut or washer ten thread diameters across.",
        "Check the unit. Of a larger structure describe the part around the joint; a long bar may be cut where \
         its temperature is even.",
    ),
    fault(
        "zone/outside",
        "A heated or cooled zone off its plate",
        "The zone reaches beyond the face it stands on, so part of its heat would enter nowhere.",
        "Check its centre and size; both are in the coordinates of its own plate, from the lower left \
         corner (round plate: its centre; outline: as its points).",
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
    fault(
        "plate/count",
        "Too few or too many plates",
        "A joint has two plates or a stack of up to six, the warm one first.",
        "State every plate in a [[plate]] of its own. A thin shim may stand as a [filler] of model \"layer\".",
    ),
    fault(
        "plate/misplaced",
        "A key of the other plate",
        "Heat enters the first plate and leaves the last, and `offset` says where the plate above lies on this one. \
         A plate between others has two faying faces and no outer one: it has neither feet, ribs, map nor second \
         layer, and no head sits on it; it alone has a `finish_below`.",
        "Put `heated` into the first [[plate]], `cooled` into the last, `offset` into any but the first; heads sit \
         on the first or the last.",
    ),
    fault(
        "filler/interface",
        "A filler or a measurement without its interface",
        "Three plates have two interfaces, four have three. A filler lies in one of them, between two \
         plates that lie on each other, and each interface has one filler at most. Own measurements \
         stand for the one interface of two plates.",
        "State `between = [\"base\", \"shim\"]` in each [[filler]]. State what was measured of a layer as \
         its `table` of area resistance.",
    ),
    fault(
        "plate/not-round",
        "A rim asked of a plate that is not round",
        "Cooling at the rim is defined for round plates.",
        "Cool the back of a rectangular plate: `cooled = { film = \"500 W/(m²·K)\" }` or `{ face = \"isothermal\" }`.",
    ),
    fault(
        "plate/no-such-edge",
        "An edge asked of a plate that has none",
        "Straight edges by name (`left`, `right`, `lower`, `upper`, `all`) belong to plates with a `size`.",
        "Cool a round plate at its rim (`edge = \"rim\"`), one with an `outline` on zones of its back.",
    ),
    fault(
        "plate/heads-overlap",
        "Two heads, washers or nuts overlap",
        "Two seats need the same place on a plate, so that one of the bolts cannot be fitted.",
        "Move the bolts apart, or take smaller heads or washers.",
    ),
    fault(
        "fastener/no-seat",
        "The head finds no land to press on",
        "The hole is as large as the seat of the head or nut, or the catalogue has no seat for this thread.",
        "Take a smaller hole or a washer, or state the outer diameter of the seat: `bearing = \"8.5 mm\"`.",
    ),
    fault(
        "material/missing-property",
        "A property that bare contact needs is not known",
        "The conductance of bare spots goes with the hardness of the softer face; this material has none.",
        "State `hardness` (Meyer, about 1.08 times the Vickers number in MPa × 9.81) or `microhardness`, fill the joint, or give `[measured]`.",
    ),
    fault(
        "outline/points",
        "Too few or repeated points of an outline",
        "An outline is a polygon of at least three different points; it closes from the last to the \
         first by itself.",
        "List every corner once, in order along the edge.",
    ),
    fault(
        "outline/crossing",
        "An outline that meets itself",
        "Two edges cross, touch or fold back on each other, so that inside and outside are not \
         defined. Most often two points stand in the wrong order.",
        "List the corners in the order in which they follow each other along the edge; an opening \
         is one of the `cutouts`.",
    ),
    fault(
        "outline/no-area",
        "An outline without area",
        "All points of the outline lie on one line.",
        "Check the coordinates; each point is x, then y.",
    ),
    fault(
        "plate/part-outside",
        "A cut-out, foot or rib off its plate",
        "Feet and ribs stand on the plate, and cut-outs are made in it: each must lie within it (a \
         cut-out within the rectangle around the outline).",
        "Check its place: it is in the plate's own coordinates, as the outline is, whatever the \
         offset.",
    ),
    fault(
        "plate/swallowed",
        "Cut-outs that leave nothing of a plate",
        "Together the cut-outs cover the plate, so that nothing is left to conduct.",
        "Check the sizes; a cut-out is what is missing, not what stays.",
    ),
    fault(
        "plate/bolt-in-cutout",
        "A bolt in a cut-out",
        "The hole or the seat of head or nut reaches into a cut-out: there the ring of plate that \
         carries the clamp force is open.",
        "Move the bolt or the cut-out apart by at least the radius of the seat.",
    ),
    fault(
        "plate/head-on-rib",
        "A head or nut on a rib",
        "The seat would rest on a rib or wall instead of on the plate, and press there.",
        "Move the bolt, or end the rib before the seat.",
    ),
    fault(
        "plate/rib-heights",
        "Ribs of too many heights",
        "The solver takes up to four heights of ribs per plate; each is a plate of its own thickness \
         to it.",
        "Give ribs of nearly the same height one height.",
    ),
    fault(
        "plate/feet",
        "Feet on both plates",
        "Feet of one plate stand on the plain face of the other. With feet on both it is not clear \
         what touches what.",
        "State feet on one of the two plates only, with the whole height between the faces.",
    ),
    fault(
        "plate/sandwich",
        "A sandwich panel that cannot be",
        "A sandwich is two face sheets of the plate's material on a core, `thickness` being that of the \
         whole. It lies first or last, its faces are plain, it is not cooled at its edges, and the bolts \
         end in inserts that reach through the face sheet: a head, a nut or a thread in the sheet would \
         crush the core.",
        "Check `sandwich` and `engagement`: `sandwich = { face_sheet = \"0.5 mm\", core_conductivity = \
         \"1.2 W/(m·K)\" }` and `engagement = { kind = \"insert\", length = \"12 mm\", flange = \"14 mm\" }`.",
    ),
    fault(
        "fastener/flange",
        "A flange that is none",
        "The flange of an insert lies on the faying face around the hole. It is wider than the hole, and \
         only inserts have one.",
        "State the outer diameter of the flange, or leave `flange` and `proud` out.",
    ),
];
