//! Cautions on torque, clamp force and strength.

use crate::diagnostic::registry::{
    Entry,
    Gravity::{Grave, Note, Range, Standing},
};

pub(super) const ENTRIES: &[Entry] = &[
    Note.entry(
        "preload/friction-scatter",
        "One torque is a band of clamp forces",
        [
            "A torque wrench measures friction first: of the torque on an M10 about 47 % turns the \
             head against its seat, 38 % the thread, and only 15 % stretches the bolt. With \
             friction estimated, VDI 2230 gives ±23 to ±28 % of clamp force, an unlubricated \
             screw by NASA practice ±35 %, an impact wrench ±60 %. Another lubricant, plating or \
             washer, cleaning or re-use moves the band itself.",
            "Use low and high, never the middle alone. Narrow the band by stating the lubricant and \
             a friction range measured on the real parts. Where the joint matters, measure preload \
             itself (elongation, ultrasonics, a load cell); checking torque afterwards does not.",
        ],
    ),
    Grave.entry(
        "preload/over-yield",
        "The bolt yields at the highest clamp force",
        [
            "At lowest friction and upper torque tolerance the combined stress of tension and \
             torsion (von Mises, running torque included) exceeds the yield strength. The bolt \
             stretches for good, its clamp force is no longer known, and further load can break it.",
            "Lower the torque to the largest one that passes, use a stronger grade or a larger \
             bolt, or narrow friction. Discard bolts that have passed yield. A responsible engineer \
             must release torques for hardware under the code that applies to it.",
        ],
    ),
    Range.entry(
        "preload/over-90-percent",
        "More than 90 % of yield while tightening",
        [
            "Torque tables in VDI 2230 stop at 90 % of the minimum yield strength in combined \
             stress, so that scatter and service loads have room. Above it only tightening by \
             angle or to yield keeps control.",
            "Lower the torque, or tighten by angle or yield control with a procedure proved on the \
             joint.",
        ],
    ),
    Grave.entry(
        "preload/over-proof",
        "Clamp force above the proof load",
        [
            "The proof stress (0.88 to 0.92 of yield for the classes of ISO 898-1) is the largest \
             tension a bolt must bear without lasting set. The usual aim is 75 % of proof load for \
             joints that are opened again.",
            "Lower the torque or take a stronger grade. The code that applies to the hardware and \
             the engineer responsible for it have the last word.",
        ],
    ),
    Grave.entry(
        "preload/head-pressure",
        "The head presses harder than the plate bears",
        [
            "The mean pressure under the head or nut exceeds the limit of the plate. The face \
             yields and creeps, and clamp force is lost after tightening. An M6 hexagon head at \
             7.3 kN makes 265 MPa, just past the 260 MPa of EN AW-6082; with an ISO 7089 washer it is \
             93 MPa.",
            "Put a hardened washer or a flanged head under it; that helps more than torque does. \
             The limits are guide values of VDI 2230, and editions differ by up to a factor two.",
        ],
    ),
    Grave.entry(
        "preload/short-engagement",
        "Too little thread engaged",
        [
            "The engaged thread strips before the bolt breaks, and stripping gives no warning. Full \
             strength takes about 1 d in steel and 2 d in soft aluminium (up to 2.5 d for stronger \
             bolts); NASA practice quotes at least 1.5 d.",
            "Use a longer bolt, a threaded insert or a through bolt with a nut; else lower the \
             torque to what the thread carries.",
        ],
    ),
    Range.entry(
        "preload/low-use",
        "The bolt is hardly used",
        [
            "The clamp force uses an unusually small part of the bolt's strength. That may be \
             meant, but it is also what N·m written as in·lbf (a factor 8.9), a wrong size or a \
             torque for a smaller screw looks like. A weakly stretched bolt loses a large part of \
             its force to settling and may loosen.",
            "Check the unit of the torque and the size and grade of the thread. If it is meant, a \
             smaller bolt at higher use keeps its force better.",
        ],
    ),
    Grave.entry(
        "preload/suspicious-torque",
        "The torque is far above what the bolt bears",
        [
            "The bolt would break or strip well before this torque. The usual cause is a unit: \
             1 N·m is 8.85 in·lbf, and 1 ft·lbf is 12 in·lbf.",
            "Check the unit, the thread and the grade. Do not tighten anything to this value.",
        ],
    ),
    Range.entry(
        "preload/running-torque",
        "Running torque of the locking feature",
        [
            "A locking nut or insert turns against its own friction before it clamps anything. \
             That torque is part of what the wrench shows but makes no clamp force. On small screws \
             it can be a large part of the whole. Whether a drawing torque includes it is a matter of \
             local practice.",
            "Measure the running torque on each fastener while it turns freely, add it to the \
             torque, state it as `running`, and reject parts below the required minimum.",
        ],
    ),
    Range.entry(
        "preload/no-yield-strength",
        "No yield strength for this grade",
        [
            "The grade has no yield strength that could be trusted, so strength use, largest torque \
             and proof load cannot be given. Clamp force and resistance do not depend on it.",
            "Take the yield strength from the maker's certificate and give it in the file.",
        ],
    ),
    Range.entry(
        "preload/countersunk",
        "Countersunk head",
        [
            "The seat is a cone. For a 90° head friction acts on a radius larger by 1/sin 45° = 1.41, \
             so the same torque clamps less, and small errors of angle put the load on a ring. The \
             wedge argument is standard mechanics, from memory.",
            "Expect a wider band than for a flat head; prefer a flat head and washer where the heat \
             matters.",
        ],
    ),
    Grave.entry(
        "preload/never-for-conductance",
        "Do not tighten beyond the limits to gain conductance",
        [
            "Above a light load the plates, not the contact spots, hold back the heat. On the \
             reference joint (two 80 × 80 × 5 mm aluminium plates, four M5) twelve times the force \
             brings 7 % in vacuum, and in air it makes the joint worse by 68 %, since the gap between \
             the bolts opens in proportion to force.",
            "Keep the torque that strength allows. More bolts, thicker plates, a filler or flatter \
             faces gain far more than torque does.",
        ],
    ),
    Standing.entry(
        "preload/no-torque-card",
        "The largest torque is an estimate, not a torque card",
        [
            "It follows from catalogue friction and minimum strengths, at assembly and in service under \
             the stated axial loads and temperatures. It knows nothing of damage, re-use, tool error \
             beyond the stated tolerance, other loads or the rules that apply to the hardware.",
            "Do not release it to a shop. Torques for hardware come from the applicable code or \
             standard, tests on the real stack and a responsible, qualified engineer.",
        ],
    ),
    Standing.entry(
        "preload/slip-and-fatigue",
        "Slip and fatigue are not checked",
        [
            "The estimate checks tightening and a steady load along the bolts alone. A joint under \
             vibration, shock, shear or changing load may slip, loosen or fail by fatigue at clamp forces that are thermally perfect.",
            "Check the joint for its loads by the applicable code (VDI 2230, NASA-STD-5020 and the \
             like), at low clamp force for slip and gapping and at high force for strength. The \
             engineer responsible for the structure decides.",
        ],
    ),
    Range.entry(
        "preload/insert",
        "Threaded insert",
        [
            "An insert may pull out of a soft parent before the bolt yields; its pull-out strength \
             depends on the parent and is not computed here. An insert that stands proud of the \
             face holds the plates apart round the bolt, exactly where the heat passes.",
            "Take the allowed torque and pull-out load from the insert's standard or test; set it \
             below the face and countersink the far plate if need be.",
        ],
    ),
    Range.entry(
        "preload/isolating-creep",
        "Isolating washers of a polymer creep",
        [
            "Polymers and their laminates yield slowly under a standing load, faster when warm. Washers \
             of them in the clamp lose thickness, and the bolt its force; no law of that loss is \
             applied here.",
            "Re-tighten after the first warm hours, use disc springs or a longer bolt, a thinner washer \
             of glass-fibre laminate, or a ceramic. Measure the force left before you rely on it.",
        ],
    ),
    Range.entry(
        "preload/settling-small-screw",
        "Small screw or short grip",
        [
            "Roughness settles by some 8 to 11 µm in all (guide values of VDI 2230, from memory). A \
             short, stiff bolt stretches hardly more: an M6 on 12 mm of aluminium loses 1.2 kN of \
             7.3 kN. The guide values start at M4; for smaller screws the loss can be far larger in \
             proportion.",
            "Re-tighten or re-measure after some thermal cycles; lengthen the grip with a sleeve, \
             use disc springs, avoid soft or coated seats.",
        ],
    ),
    Range.entry(
        "preload/no-bearing-limit",
        "No pressure limit known for this plate",
        [
            "No published limit for the pressure under the head is at hand for this material. Pure \
             copper, soft aluminium and polymers are not in the usual lists and creep at pressures \
             that steel ignores.",
            "Keep the pressure well below the yield strength of the plate, use a wide washer, and \
             look at the seat after a trial.",
        ],
    ),
    Range.entry(
        "preload/galling",
        "Stainless on stainless",
        [
            "Austenitic threads on austenitic threads seize. Dry friction lies at 0.20 to 0.50 and \
             jumps, so the clamp force at a given torque is both low and uncertain. Of high-strength \
             bolts, class 12.9 with electroplated zinc is prone to hydrogen embrittlement.",
            "Lubricate (MoS₂ paste: 0.10 to 0.20), turn slowly, mix the grades of bolt and nut. In \
             vacuum use lubricants approved for it.",
        ],
    ),
    Grave.entry(
        "preload/negative-service-force",
        "No clamp force left in service",
        [
            "After settling, relaxation and temperature change the low force reaches zero: the \
             plates part. The contact laws have no meaning there, and the joint rattles. A bolt \
             that shrinks less than its plates in the cold is the usual cause; aluminium contracts \
             0.41 % to 4 K, stainless steel 0.30 % (from memory).",
            "Lengthen the grip, add washers of low expansion (or disc springs), choose a bolt \
             material nearer to the plates, or raise the initial clamp force within its limits.",
        ],
    ),
    Grave.entry(
        "preload/hardly-clamped",
        "Next to no clamp force left in service",
        [
            "Less than a tenth of the low force is left after settling, relaxation and temperature change \
             (house rule, no source). Settling is a guide value, and so is relaxation: the joint may part \
             where they are a little larger. Contact conductance falls nearly in proportion to the force.",
            "Lengthen the grip, add washers of low expansion or disc springs, choose a bolt material nearer \
             to the plates, control the torque more closely, or raise the initial clamp force within its \
             limits.",
        ],
    ),
    Range.entry(
        "preload/temperature-not-acting",
        "Service far from assembly, and the clamp force stays",
        [
            "Bolt and plates expand differently, so the clamp force at service temperature differs \
             from that at assembly. A plain service temperature does not move the force; only the \
             cases hot and cold do.",
            "State `temperature = { hot = …, cold = …, assembly = … }` to let expansion act.",
        ],
    ),
    Grave.entry(
        "preload/separation",
        "The load may part the faces",
        [
            "A load along the bolts takes force from between the faces. At the least clamp force, after \
             losses, it must be able to grow by the stated factor before they part; a parted joint \
             conducts nothing there and works its bolts to death.",
            "Raise the preload within its limits, use more or larger bolts, narrow the scatter of \
             tightening. The factor that counts is that of the applicable code or standard; the \
             engineer responsible for the structure decides.",
        ],
    ),
    Grave.entry(
        "preload/over-in-service",
        "Load and temperature bring the bolt beyond its strength",
        [
            "Besides its preload the bolt bears its share of the load and what plates that expand more \
             than it add. Half of the torsion of tightening is counted as still there.",
            "Lower the torque, soften the stack with a longer bolt or disc springs, or take a stronger \
             or larger bolt. Bending, prying and fatigue are not counted: check them by the applicable \
             code with a responsible engineer.",
        ],
    ),
    Range.entry(
        "preload/springs-flat",
        "Disc springs lie flat",
        [
            "A disc spring pressed flat is a washer: settling and contraction then cost as much force as \
             without it. Disc springs work between about 15 and 75 % of their height.",
            "Nest more discs in parallel, take thicker ones, or less force; set the nominal clamp force near \
             three quarters of the force at flat.",
        ],
    ),
    Note.entry(
        "preload/split-washer",
        "A split spring washer keeps no force",
        [
            "It lies flat at a few percent of the clamp force of a bolt of class 8.8 and acts as a hard, \
             narrow washer from there on. Standards for it were withdrawn in several countries (common \
             practice, no source).",
            "Leave it out. Keep force by a longer bolt, disc springs or re-tightening; secure against \
             turning by a locking thread or adhesive.",
        ],
    ),
    Note.entry(
        "preload/soft-layer",
        "Bolts on a soft layer lose force to their neighbours",
        [
            "Tightening a bolt presses the layer further and relieves the bolts beside it; a soft gasket \
             tightened once round loses 20 to 40 % so (from memory). Afterwards the layer creeps.",
            "Tighten crosswise, in three passes to a third, two thirds and all of the torque, then once round \
             at full torque, and again after a day or the first warm cycle. State `losses.interaction` where \
             it was measured.",
        ],
    ),
    Range.entry(
        "preload/brittle",
        "A plate that breaks rather than yields",
        [
            "Ceramic, glass and semiconductors do not even out a stress: tension beside the seat and bending \
             from being pressed flat add up, and a scratch or a grain under the head is enough. The stresses \
             told are closed forms for clean, rounded seats.",
            "State `flexural_strength`; put a soft flat washer under the head, keep both faces flat, tighten \
             by a small, known torque. Prove the part by a test with a responsible engineer.",
        ],
    ),
    Grave.entry(
        "preload/brittle-over",
        "A brittle plate uses too much of its strength",
        [
            "More than a third of the stated strength in bending is used. Brittle parts of one lot scatter \
             by a third in strength and lose more with time under load.",
            "Take less force, a wider and softer seat, flatter faces or a thinner plate, which bends flat at \
             less stress. Prove the part by a test with a responsible engineer.",
        ],
    ),
];
