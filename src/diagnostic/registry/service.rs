//! Cautions on the use of the joint and of the numbers.

use crate::diagnostic::registry::{
    Entry,
    Gravity::{Grave, Note, Range, Standing},
};

pub(super) const ENTRIES: &[Entry] = &[
    Grave.entry(
        "service/air-flatters-vacuum",
        "A result in air says little about vacuum",
        [
            "In air most heat crosses between the bolts through a few microns of gas. Without it the \
             reference joint (four M5 on 80 × 80 × 5 mm aluminium) adds 0.278 instead of 0.084 K/W, \
             more than three times as much. A bench test in air can hide a joint that fails in orbit or \
             in a cryostat; leak and partial pressure matter down to about 1 Pa.",
            "Estimate and test in the medium of service. Below 100 Pa gas conductance falls in \
             proportion to pressure.",
        ],
    ),
    Range.entry(
        "service/gas-out-of-table",
        "A gas colder or warmer than its table",
        [
            "Conductivity and mean free path of the gas are known between two temperatures and are held at \
             the nearer end outside. A colder gas conducts less than is reckoned (carbon dioxide at 200 K by \
             about a third, by the slope of its table), a warmer one more, and below its boiling point it \
             is no gas at all.",
            "State the medium that is there at that temperature, or `vacuum` where it has condensed; \
             `ringsum list gases` tells the range of each.",
        ],
    ),
    Grave.entry(
        "service/vacuum-materials",
        "A material that is at odds with vacuum",
        [
            "Cadmium and zinc evaporate in vacuum when warm (noticeably from about 75 and 130 °C, \
             from memory) and coat cold optics and insulators. Pure tin, zinc and cadmium grow \
             whiskers that short circuits. Silicone oil creeps and outgasses, and contaminates \
             optics, contacts and bonding faces.",
            "Choose platings, lubricants and fillers released for your vacuum or space programme \
             (outgassing by ASTM E595 or the ECSS equivalent); the contamination engineer decides.",
        ],
    ),
    Grave.entry(
        "service/isolation-and-bonding",
        "Electrical insulation and protective bonding are not checked",
        [
            "A thermal joint is often an electrical one. Anodised faces, pads and pastes insulate \
             until a bolt, a burr or a scratch bridges them; an intended earth path may be \
             broken by the very same layers. Neither creepage, breakdown nor bonding resistance is \
             computed here.",
            "Check insulation and protective bonding by the electrical safety code that applies, by \
             measurement on the assembled joint, with a person qualified for it.",
        ],
    ),
    Grave.entry(
        "service/hot-surface",
        "A surface hot or cold enough to hurt",
        [
            "Bare metal burns skin at about 65 °C within a second, 55 °C in ten seconds and 51 °C in a \
             minute (the order of ISO 13732-1, from memory); metal far below freezing tears it. The \
             temperatures given here are estimates with a band and not limits of safety.",
            "Guard, mark or insulate what can be touched, by the safety rules that apply to the \
             product.",
        ],
    ),
    Standing.entry(
        "service/defer",
        "An estimate for comparing designs",
        [
            "The results compare designs and size margins. They are no release. Pressure equipment, \
             lifting gear, flight hardware, medical and other safety-critical joints have codes that \
             fix method, margins and tests.",
            "Apply the local code. A responsible, qualified engineer decides; measure the real \
             joint where people or hardware depend on it.",
        ],
    ),
    Note.entry(
        "service/spreading-limited",
        "The plates hold back the heat, not the contact",
        [
            "`contact` is far smaller a resistance than what the joint adds between source and sink. \
             On the reference joint the contact alone is 0.0026 K/W, and the joint adds 0.278 K/W in \
             vacuum, because heat must converge through thin plates to a few square centimetres. \
             Better faces or more torque cannot help here, and the value per bolt does not scale \
             with the number of bolts.",
            "Use `source to sink` for requirements; see `explain planes`. Thicker or better \
             conducting plates, bolts beneath the source and fillers help.",
        ],
    ),
    Note.entry(
        "resistance/cell",
        "The plates between several bolts are taken as sheets",
        [
            "Both plates lie on one plan grid with a mean temperature through each thickness, and \
             heat passes freely between bolts. The pressure field still comes from each bolt's own \
             cone: it knows neither the gap that opens between bolts nor what lies there. Against \
             two reference joints solved in three dimensions (four M5 and six M4, vacuum) source to \
             sink reads 6 and 10 % high; in gas the open gap, which is missing, matters more. Rings \
             and draws use each bolt's nearest-bolt cell, brought to the grid's level.",
            "Good for a quick look; where a few per cent or a gas gap decide, leave out `--field cone`: \
             the whole joint is then solved.",
        ],
    ),
    Range.entry(
        "resistance/draw-error",
        "The draws are read from surfaces that err",
        [
            "Under the elastic field the draws are not solved one by one: solutions over the whole \
             range of force, each with steps in contact, gap and both conductivities, carry \
             surfaces of second order, and the draws are read from them. They are tried at four \
             more places; the largest error there is told.",
            "Low and high may be off by so much of the nominal value. Narrow the widest input \
             (friction, as a rule), or estimate the joint at its least and at its most force.",
        ],
    ),
    Range.entry(
        "resistance/narrow-zone",
        "A heated or cooled zone narrow against its plate",
        [
            "Through the thickness of a plate the temperature is followed by polynomials that are good for zones \
             1.5 thicknesses wide or more. Below that the heat right at the zone's face squeezes on a length they \
             do not see, on the coarsest grid and on the finest: source to sink and the hottest point read low. \
             What is told is the rise of such a square on a half-space, 0.4732/(k √A), times the share that may be \
             missed; it counts as numerical error, and a requirement is not met for sure where it passes 5 %.",
            "Add the local spreading under the part by hand, or state the zone as wide as the part's base spreads \
             its heat. What the joint adds hardly feels it.",
        ],
    ),
    Range.entry(
        "resistance/grid-error",
        "The grid is coarse for this joint",
        [
            "The error told is the difference to a coarser grid, relative to source to sink, and it \
             passes 5 %. With the cone, lines of the plan grid run across the whole joint, and the \
             number of its nodes is bounded so that an estimate takes seconds: thousands of bolts get \
             a coarser grid than they should, which reads too high. Under a heated zone narrower than \
             its plate is thick no grid of this kind helps, because plates are taken as sheets. The \
             elastic field conducts in three dimensions on lines that gather around the bolts; a small \
             heated zone away from them leaves it coarse.",
            "With the elastic field take a finer `--resolution`; instead of the cone take the elastic field. Or \
             estimate a part of the joint that repeats, heated and cooled in proportion; a regular \
             lattice needs one bolt with its share of both plates. Heat a wider zone, or solve the \
             spreading under a small one by itself.",
        ],
    ),
    Range.entry(
        "resistance/edge-sink",
        "Heat leaves at an edge",
        [
            "With the sink at the rim the plate's own length is part of the path, the bolts near the \
             rim carry most and far bolts little. A plate taken as a sheet errs by 4 to 5 % in \
             vacuum there.",
            "Move bolts towards the cooled edge; compare with a mesh when the margin is thin.",
        ],
    ),
    Note.entry(
        "resistance/bypass",
        "Heat through the bolts",
        [
            "Shank, head and washer conduct beside the faces. With metal contact this changes the \
             resistance by 0.05 to 0.15 %; with a filler or gas gap and no contact between the \
             faces by up to 4 %; in a mount meant to isolate it may be most of the heat.",
            "To isolate, use bolts of titanium or stainless steel with insulating washers and \
             bushes, and count their contacts.",
        ],
    ),
    Range.entry(
        "resistance/small-source",
        "The heated zone is small against its plate's thickness",
        [
            "The plan grid lets heat turn sideways only as fast as a flux that is even over the \
             thickness. Under a source narrower than about three thicknesses this is too much \
             resistance: against a solution in three dimensions on the six-bolt demo 14 % at two \
             thicknesses, 30 % at 0.8, 75 % at 0.4. Source to sink and perfect contact are high \
             alike; their difference, what the joint adds, much less.",
            "Use what the joint adds together with a spreading resistance of the source from a \
             handbook or a mesh, or heat the true footprint of the component.",
        ],
    ),
];
