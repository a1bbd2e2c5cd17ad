//! Cautions on the pressure between the faces, and what its closed form cannot carry.

use crate::diagnostic::registry::{
    Entry,
    Gravity::{Grave, Note, Range},
    fault,
};

pub(super) const ENTRIES: &[Entry] = &[
    fault(
        "pressure/beyond-cone",
        "A joint that the closed-form cone cannot carry",
        "The cone stands for rectangular and round plates of one thickness, flat all over, with \
         uniform heads, frictionless faces and hard contact. Outlines by points, cut-outs, feet, \
         ribs, flatness maps, thermal sag and other choices of [contact] need the elastic solution of the whole \
         joint; a number from the cone would stand for another joint.",
        "Leave out `--field cone`, or take the named fields out to see what the plain joint does.",
    ),
    Range.entry(
        "pressure/cone-beyond-edge",
        "The pressure cone reaches the edge",
        [
            "The contact would spread beyond the edge of a plate or into another hole. The field is \
             cut there and scaled up so that it still carries the whole clamp force. Real plates \
             then tilt and press hardest on the inner side.",
            "Trust the sum more than the picture; near an edge expect the local pressure to be off \
             by a quarter. Move the bolt inwards by about the radius of contact.",
        ],
    ),
    Range.entry(
        "pressure/cone-range",
        "The cone is used outside the plates it was fitted to",
        [
            "The fitted contact law covers thickness 0.15 to 4 head radii, head radius 1.25 to 2.6 \
             hole radii, a thickness ratio up to 6 and a ratio of moduli of 1/3 to 3. There it meets the \
             reference solutions within 4 % of contact radius. For a thick soft plate beneath a \
             thin stiff one the radius is up to 8.5 % low.",
            "Widen the band by hand, or state a half-angle of your own and see what it changes.",
        ],
    ),
    Range.entry(
        "pressure/overlap",
        "The contacts of neighbouring bolts overlap",
        [
            "The fields of neighbours are added. In truth each bolt also stiffens the other's \
             surroundings: for M5 on 5 + 5 mm the sum differs from the reference by 7 % at 26 mm \
             pitch and 14 % at 14 mm, where 25 MPa stand midway and the sum has none.",
            "Fine for the total force, weak for the shape. Treat closely pitched rows with a wider \
             band.",
        ],
    ),
    Range.entry(
        "pressure/flatness-ignored",
        "Out-of-flatness is not in the pressure field",
        [
            "The cone assumes flat faces. Bowed ones touch first at the crown or at the rim, and \
             part elsewhere. On the six-bolt reference a bow of 30 µm changed the gap by a fifth, \
             the resistance by 1 % in vacuum and 3 % in air; with thick plates or weak bolts it can \
             be far more: textbook tables of real faces suggest a factor 3 to 20 (a judgement).",
            "Keep flatness below the elastic deflection of the plates between bolts, pull bowed \
             bases flat from the middle, or fill the gap.",
        ],
    ),
    Range.entry(
        "pressure/thin-plate-wide-pitch",
        "Thin plates, bolts far apart",
        [
            "Contact reaches only a little beyond the head: 6.5 mm from the axis of an M5 on 5 + 5 mm. \
             Between bolts far apart the plates stand microns apart, and heat must run sideways in \
             thin metal. The spreading in the plates then rules the result, not the contact.",
            "Look at `source to sink` and not at `contact`. Thicker plates, closer pitch, bolts under \
             the source or a filler help; torque does not.",
        ],
    ),
    Range.entry(
        "pressure/tapped-cone",
        "Tapped hole or insert instead of a nut",
        [
            "A thread pulls on its plate from within, near the faying face, where a nut presses from \
             behind. On the six-bolt reference this changed the central gap by -35 %, and the \
             resistance by +4.8 % in vacuum and -4.7 % in air. The cone knows the thread by a rule \
             alone.",
            "Count 5 % of resistance as unknown.",
        ],
    ),
    Range.entry(
        "pressure/unequal-seats",
        "Head and nut press on different annuli",
        [
            "The fitted cone was made for equal seats on both sides. Unequal ones are replaced by \
             one seat between them; the contact lies nearer to the smaller one.",
            "Equal washers on both sides remove the doubt.",
        ],
    ),
    Range.entry(
        "pressure/large-hole",
        "The hole is far larger than ISO 273",
        [
            "A wide hole leaves the head only a narrow ring to press on: the pressure rises, the \
             contact moves outwards, and the head may dish the plate. ISO 273 gives 5.3, 5.5 and \
             5.8 mm for M5 (fine, medium, coarse).",
            "Use the medium hole, or a thick washer with a matching inner diameter.",
        ],
    ),
    Range.entry(
        "pressure/conical-seat",
        "The head sits in a cone",
        [
            "A countersunk head spreads its force over the depth of the plate and wedges the hole \
             open. The laws for flat annuli are used with the largest diameter of the head, which \
             is an assumption without a reference solution behind it.",
            "Treat the contact radius as uncertain by about a head's height (a judgement); prefer a flat head.",
        ],
    ),
    Range.entry(
        "pressure/gap-ignored",
        "The gap between the bolts is missing",
        [
            "Bolts bend thin plates apart outside their contact, by 4 to 8 µm on the reference joints, \
             in proportion to the force. The cone does not know this gap: in gas it takes the faces \
             as near to each other as their roughness allows everywhere. On the reference joints in \
             air the true joint added 1.4 and 1.8 times what the closed gap gives.",
            "Take the upper end of the band for a hot case, fill the joint, or leave out \
             `--field cone`: the contact of the whole joint is then solved with its gap.",
        ],
    ),
    Grave.entry(
        "pressure/flatness-decides",
        "Bow or flatness is too large for flat faces",
        [
            "The stated out-of-flatness of both faces exceeds 0.2 mm, or half of the filler's \
             thickness (judgement). It then decides where the faces touch and how thick the gap or \
             the filler is, and the cone, which takes the faces as flat, cannot tell.",
            "Measure and mend the faces, take a filler that is thicker than the gap, or leave out \
             `--field cone`: the contact is then solved with the bow as initial gap. No requirement counts \
             as met until then.",
        ],
    ),
    Range.entry(
        "pressure/filler-spreads",
        "The layer between the plates spreads the load",
        [
            "The cone is the pressure between bare plates: all force within a few millimetres of each \
             bolt, nothing between them. A pad, foil or paste is softer than the plates and carries \
             part of the force farther out. Where the filler's resistance falls with pressure the \
             faces between the bolts conduct better than told here.",
            "Compare with the filler's value at the mean pressure, total force over the area; where it \
             decides, state the `modulus` of the layer and leave out `--field cone`.",
        ],
    ),
    Range.entry(
        "pressure/flatness-stays-open",
        "The bolts do not close the faces",
        [
            "Bow, map, sag or stated flatness leaves a gap that is more than a quarter wider than that \
             between flat faces (judgement). A known shape is part of the solved field and of its \
             numbers. Flatness stated as a height alone has no shape: nominal takes flat faces, low \
             and high hold for them convex, flat and concave. Waves shorter than the plate and twist are in \
             neither.",
            "State the measured shape as `bow` or `flatness_map`. Stiffer bolts, a bolt in the middle, \
             flatter faces or a filler thicker than the gap close it.",
        ],
    ),
    Note.entry(
        "pressure/contact-at-edge",
        "Contact reaches an edge",
        [
            "The faces press each other at the edge of a plate, of a cut-out or of a foot. A sharp edge \
             on a wider face presses like a punch: the elastic pressure there grows without end as \
             the grid gets finer, and a real edge is chamfered, burred or yields. The force and the \
             resistance hardly feel it; the peak pressure does.",
            "Take the peak at the edge as no more than a sign; deburr and chamfer. Where the wider reach of \
             the pressure would help, move the bolt inwards or widen the foot.",
        ],
    ),
    Grave.entry(
        "pressure/head-off-foot",
        "A head or nut presses beside its foot",
        [
            "The plates touch on their feet alone, and less than nine tenths of a head's or nut's seat \
             stand over one (judgement). The rest of the clamp force goes to the feet by bending the plate. \
             That bending is in the pressure and the gap, but its stress is not checked, and the plates \
             are taken never to meet beside the feet.",
            "Put every bolt over a foot at least as wide as its washer. Where that cannot be, have the \
             bending of the plate checked by a stress engineer.",
        ],
    ),
    Range.entry(
        "pressure/filler-rigid",
        "A layer whose softness is not known",
        [
            "The layer conducts as told, but without a modulus it is taken to press like bare plates on \
             each other. A soft layer moves pressure from the bolts to the places between them: with \
             a gap pad on a plate of 4 mm 95 % of the force reached to 42 mm from the bolt axes, by the cone \
             of bare plates to 7 mm (demo of the battery plate). A layer thin and stiff against its plates changes little.",
            "State `modulus` under `[filler]`: the pressure over the strain of the layer pressed over its \
             whole face, at about the pressure met. For metals that flow, such as indium, this is \
             the best that can be told.",
        ],
    ),
    Range.entry(
        "pressure/elastic-limits",
        "A plate is pressed beyond its yield",
        [
            "Faces, head or nut press on average or at the peak beyond the yield strength of a plate \
             at nominal force. Yield begins inside the metal somewhat above that (about 1.1 to 1.6 times \
             yield beneath a flat round seat, from memory) and at sharp edges below it. Where metal \
             flows the pressure levels out, the contact widens a little, and the clamp force is lost as \
             the seat beds in. The elastic field has none of this.",
            "Wider washers, less force or a harder plate. Where the peak stands at an edge alone, see \
             `pressure/contact-at-edge`.",
        ],
    ),
    Grave.entry(
        "pressure/layer-squeezed",
        "The clamp force is too much for the layer",
        [
            "By its modulus the layer would close by more than half of its thickness (judgement), which \
             no pad does as a spring: it stiffens, tears, is pressed out at the edge, or the plates meet \
             at the bolts. The field takes it as soft all the way, so the pressure is told too even, and \
             the thickness that conducts too thick at the bolts. A pressed pad may also no longer insulate.",
            "Set the gap by stops or spacers, or use less force or a harder pad; state the modulus at the \
             pressure that is met. An engineer checks the electrical insulation of what is squeezed.",
        ],
    ),
];
